/** What each tap gave: its impulse as stated, by the hammer's angles or by a force held for a while, with what belongs to it and what all taps share. */
import type { Source } from '../metrology/source.ts';
import { exact, ofSource, propagate, type Uncertain } from '../metrology/uncertain.ts';
import { compactImpulse, compactSpeed, compoundImpulse, compoundSpeed, hammerInertia } from '../pendulum/hammer.ts';
import { pulseCorrection } from '../pendulum/pulse.ts';
import { problem, type Problem } from '../problems/problems.ts';
import type { CellRead } from '../readings/cellReads.ts';
import { ENTRIES, type EntryName } from '../session/entries.ts';
import type { Choices } from '../session/session.ts';
import type { Dimension } from '../units/units.ts';
import type { BenchRead } from './entries.ts';
import { impulseOfPulse, pulsesForTaps, type ForceRecordsRead } from './forceRecords.ts';
import { familyOf } from './readings.ts';
import type { Swing } from './shots.ts';
import { placeOf, type SessionRecord } from './sheets.ts';
import { valueOf } from './stand.ts';

/** One tap with a known impulse. */
export interface TapKnown {
  readonly swing: Swing;
  /** I_h as stated, times the hammer's calibration, N·s. */
  readonly impulse: Uncertain;
  readonly angularImpulse: Uncertain;
}

export interface TapFacts {
  readonly bench: BenchRead;
  readonly choices: Choices;
  readonly gravity: Uncertain | null;
  readonly forceRecords: ForceRecordsRead;
  /** ω_n and ζ of the pendulum as tapped, for a force that is not short. */
  readonly frequency: Uncertain | null;
  readonly ratio: Uncertain;
}

const angularImpulseOfTap = ({ impulse, arm }: Readonly<Record<'impulse' | 'arm', number>>): number => impulse * arm;

/** The number of one cell as a source of this tap alone. */
function cellSource(record: SessionRecord, cell: CellRead, part: string, words: Pick<Source, 'label' | 'symbol'> & { readonly dimension: Dimension }, u: number): Uncertain {
  return ofSource({ ...words, id: `${record.id}.${part}`, estimate: cell.value, u: cell.spread ?? u, distribution: 'normal', dof: Infinity, family: familyOf('tap') });
}

type Found = Uncertain | Problem | null;

function statedImpulse(record: SessionRecord, cell: CellRead, spread: number): Uncertain {
  return cellSource(record, cell, 'impulse', { label: 'Impulse of one tap', symbol: 'I_h', dimension: 'impulse' }, spread * Math.abs(cell.value));
}

/** I_h of a swinging hammer. The zero of its protractor is common to all taps: an angle drawn outward is read less it, one on the far side more it. */
function byHammer(record: SessionRecord, drawn: CellRead, { bench, choices, gravity }: TapFacts, spread: number): Found {
  const { hammerRebound, hammerFollow } = record;
  if (hammerRebound && hammerFollow && hammerRebound.value !== 0 && hammerFollow.value !== 0) return problem('tap-both-rebound-and-follow', 'stops', placeOf(record), {});
  const u = bench.entries.get('hammerAngleSpread')?.read.value ?? 0;
  const zero = valueOf(bench, 'hammerZero') ?? exact(0);
  const angle = (cell: CellRead | null, part: string, label: string, sign: 1 | -1): Uncertain =>
    cell ? propagate(({ a, z }) => a - sign * z, { a: cellSource(record, cell, part, { label, symbol: 'φ_h', dimension: 'angle' }, u), z: zero }) : exact(0);
  const blow = { drawn: angle(drawn, 'drawn', 'Hammer drawn back', 1), rebound: angle(hammerRebound, 'rebound', 'Hammer’s rebound', 1), follow: angle(hammerFollow, 'follow', 'Hammer’s follow-through', -1) };
  const need = (name: EntryName): Uncertain | Problem => valueOf(bench, name) ?? problem('hammer-entry-missing', 'stops', placeOf(record), { label: `${ENTRIES[name].label} (${ENTRIES[name].symbol})` });
  const [mass, length] = [need('hammerMass'), need('hammerLength')];
  if (!gravity) return null;
  if ('code' in mass) return mass;
  if ('code' in length) return length;
  const own = ofTapAlone(record, spread);
  try {
    const stays = choices.hammerAfter !== 'leaves';
    if (choices.hammerForm === 'compact') {
      const bare = stays ? propagate(({ m, v }) => m * v, { m: mass, v: propagate(compactSpeed, { g: gravity, length, angle: blow.drawn }) }) : propagate(compactImpulse, { g: gravity, mass, length, ...blow });
      return times(bare, own);
    }
    const contact = need('hammerContact');
    if ('code' in contact) return contact;
    const period = valueOf(bench, 'hammerPeriod');
    const inertia = valueOf(bench, 'hammerInertia') ?? (period && propagate(hammerInertia, { mass, centre: length, period, g: gravity }));
    if (!inertia) return problem('hammer-entry-missing', 'stops', placeOf(record), { label: `${ENTRIES.hammerPeriod.label} (${ENTRIES.hammerPeriod.symbol})` });
    const hammer = { g: gravity, mass, centre: length, inertia };
    const bare = stays
      ? propagate(({ J, w, l }) => (J * w) / l, { J: inertia, w: propagate(compoundSpeed, { ...hammer, angle: blow.drawn }), l: contact })
      : propagate(compoundImpulse, { ...hammer, contact, ...blow });
    return times(bare, own);
  } catch (failure) {
    if (!(failure instanceof RangeError)) throw failure;
    const widest = Math.max(...[drawn, hammerRebound, hammerFollow].map((cell) => Math.abs(cell?.value ?? 0)));
    return problem('hammer-angle-too-wide', 'stops', placeOf(record), { degrees: (widest * 180) / Math.PI });
  }
}

/** 1 with what one tap has by itself beside its angles or its force. */
function ofTapAlone(record: SessionRecord, spread: number): Uncertain {
  return ofSource({ id: `${record.id}.tap`, label: 'Each tap by itself', symbol: 'u_tap', dimension: 'number', estimate: 1, u: spread, distribution: 'normal', dof: Infinity, family: familyOf('tap') });
}

const times = (y: Uncertain, f: Uncertain): Uncertain => propagate(({ a, b }) => a * b, { a: y, b: f });

/** I = F τ, as the first swing feels it: over the correction of a rectangular pulse of that length. */
function byForce(record: SessionRecord, { frequency, ratio }: TapFacts, spread: number): Found {
  const { tapForce, tapDuration } = record;
  if (!tapForce || !tapDuration) return problem('tap-force-without-time', 'stops', placeOf(record), {});
  const force = cellSource(record, tapForce, 'force', { label: 'Force of one tap', symbol: 'F', dimension: 'force' }, 0);
  const duration = cellSource(record, tapDuration, 'duration', { label: 'Length of one tap’s force', symbol: 'τ', dimension: 'time' }, 0);
  const felt = ({ f, t, w, z }: Readonly<Record<'f' | 't' | 'w' | 'z', number>>): number => {
    const found = pulseCorrection({ shape: 'rectangular', duration: Math.max(0, t), naturalFrequency: w, dampingRatio: Math.max(0, z) });
    if (found.status !== 'corrected') throw new RangeError('tap: the force reaches the first maximum');
    return (f * t) / found.factor;
  };
  try {
    const bare = frequency ? propagate(felt, { f: force, t: duration, w: frequency, z: ratio }) : propagate(({ f, t }) => f * t, { f: force, t: duration });
    return times(bare, ofTapAlone(record, spread));
  } catch (failure) {
    if (!(failure instanceof RangeError)) throw failure;
    return problem('pulse-reaches-the-peak', 'stops', placeOf(record), {});
  }
}

/** Has this record any sign of a known impulse? */
const isStated = ({ tapImpulse, hammerIn, tapForce, tapDuration }: SessionRecord): boolean => [tapImpulse, hammerIn, tapForce, tapDuration].some((cell) => cell !== null);

export function tapsOf(swings: readonly Swing[], facts: TapFacts, problems: Problem[]): readonly TapKnown[] {
  const { bench } = facts;
  const taps = swings.filter((s) => s.record.kind === 'tap');
  if (taps.length === 0) return [];
  const arm = valueOf(bench, 'tapLeverArm');
  if (!arm && (facts.forceRecords.pulses.length > 0 || taps.some((t) => isStated(t.record)))) problems.push(problem('entry-missing', 'stops', { entry: 'tapLeverArm' }, { label: 'Lever arm of the tap' }));
  const common = valueOf(bench, 'hammerFactor') ?? exact(1);
  const pulses = pulsesForTaps(taps.map(({ record }) => record), facts.forceRecords, problems);
  const spread = bench.entries.get('tapSpread')?.read.value ?? 0;
  const known: TapKnown[] = [];
  for (const swing of taps) {
    const { record } = swing;
    const pulse = pulses.get(record.id);
    if (!isStated(record) && !pulse) {
      problems.push(problem('record-tap-without-impulse', 'note', placeOf(record), {}));
      continue;
    }
    if (!arm) continue;
    const bare: Found = pulse ? times(impulseOfPulse(record, pulse), ofTapAlone(record, spread)) : record.tapImpulse ? statedImpulse(record, record.tapImpulse, spread) : record.hammerIn ? byHammer(record, record.hammerIn, facts, spread) : byForce(record, facts, spread);
    if (bare === null) continue;
    if ('code' in bare) {
      problems.push(bare);
      continue;
    }
    const impulse = propagate(({ h, i }) => h * i, { h: common, i: bare });
    known.push({ swing, impulse, angularImpulse: propagate(angularImpulseOfTap, { impulse, arm }) });
  }
  return known;
}
