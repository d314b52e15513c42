/** The swing that goes on before a shot: of a phase that is known, or of one that is not; typed for all shots, or read at each. */
import { fromResolution, type Source } from '../metrology/source.ts';
import { anchor, ofSource, propagate, type Anchor, type Uncertain } from '../metrology/uncertain.ts';
import { jumpToMaximum, swingOfPhase } from '../pendulum/alreadySwinging.ts';
import { problem, type Problem } from '../problems/problems.ts';
import type { CellRead } from '../readings/cellReads.ts';
import { WAYS } from '../readings/ways.ts';
import type { Choices } from '../session/session.ts';
import { unitNamed } from '../units/units.ts';
import { readingDimension, type BenchRead } from './entries.ts';
import type { ReadingSpread } from './readings.ts';
import { scaleOfSheet } from './scale.ts';
import { placeOf, type SessionRecord } from './sheets.ts';
import { valueOf } from './stand.ts';
import type { Scale } from './swings.ts';

/** The swing before one shot. */
export interface SwingBefore {
  /** A₀, rad, where its phase is not known; 0 at rest, or with its phase. */
  readonly amplitude: number;
  /** x_f and v_f/ω_n at the shot, rad; null where the phase is not known. */
  readonly state: { readonly deflection: Uncertain; readonly speed: Uncertain } | null;
}

export interface Background {
  readonly shots: SwingBefore;
  /** Taps are struck at any time: the phase typed for the shots is not theirs. */
  readonly taps: SwingBefore;
  /** Of records with a swing before of their own, by id. */
  readonly own: ReadonlyMap<string, SwingBefore>;
}

const STILL: SwingBefore = { amplitude: 0, state: null };
export const AT_REST: Background = { shots: STILL, taps: STILL, own: new Map() };

export const swingBefore = ({ shots, taps, own }: Background, record: Pick<SessionRecord, 'id' | 'kind'>): SwingBefore => own.get(record.id) ?? (record.kind === 'tap' ? taps : shots);

export interface BackgroundFacts {
  readonly bench: BenchRead;
  readonly choices: Choices;
  readonly scale: Scale | null;
  readonly frequency: Uncertain | null;
  readonly ratio: Anchor;
  readonly spread: ReadingSpread;
}

export function backgroundOf(records: readonly SessionRecord[], facts: BackgroundFacts, problems: Problem[]): Background {
  const { bench, choices, scale, ratio } = facts;
  if (!choices.correctBackground || !scale) return AT_REST;
  const typed = valueOf(bench, 'backgroundSwing');
  const amplitude = typed && amplitudeOf(typed, scale);
  if (typed && !amplitude) problems.push(problem('background-swing-off-scale', 'doubt', { entry: 'backgroundSwing' }, {}));
  const because = choices.form === 'filmStrip' ? 'film' : ratio.value < 1 ? null : 'damping';
  const phase = phaseOf(facts);
  const timed = records.filter((record) => record.timeSinceMaximum !== null);
  const someSwing = (amplitude?.value ?? 0) > 0 || records.some((record) => record.swingBefore !== null);
  if (because && someSwing && (phase || timed.length > 0)) problems.push(problem('background-phase-not-used', 'note', { entry: 'backgroundPhase' }, { because }));
  const known = because ? null : phase;
  const own = new Map<string, SwingBefore>();
  for (const record of records) {
    if (!record.swingBefore && !record.timeSinceMaximum) continue;
    const A = record.swingBefore ? amplitudeRead(record, record.swingBefore, facts, problems) : amplitude;
    const at = record.timeSinceMaximum && !because ? phaseAfter(timeRead(record, record.timeSinceMaximum, bench), facts) : record.kind === 'tap' ? null : known;
    if (A) own.set(record.id, stateOf(A, at, ratio, false));
  }
  const shots = amplitude ? stateOf(amplitude, known, ratio, true) : STILL;
  return { shots, taps: amplitude ? stateOf(amplitude, null, ratio, true) : STILL, own };
}

/** null where the scale does not reach so far. */
function amplitudeOf(read: Uncertain, { way: name, scale, stand: lengths }: Scale): Uncertain | null {
  const way = WAYS[name];
  try {
    return propagate(({ read: x, scale: s, ...stand }) => Math.abs(way.angle(s * x, stand)), { ...lengths, read, scale });
  } catch (failure) {
    if (failure instanceof RangeError) return null;
    throw failure;
  }
}

function stateOf(amplitude: Uncertain, phase: Uncertain | null, ratio: Anchor, common: boolean): SwingBefore {
  if (amplitude.value === 0) return STILL;
  if (!phase) return { amplitude: amplitude.value, state: null };
  const inputs = { amplitude, phase, ratio };
  const [deflection, speed] = [propagate((x) => swingOfPhase(x).deflection, inputs), propagate((x) => swingOfPhase(x).speed, inputs)];
  return { amplitude: 0, state: common ? { deflection: anchor(deflection), speed: anchor(speed) } : { deflection, speed } };
}

/** Phase as typed, or ω_d times the time since the last maximum on the side of the thrust. */
function phaseOf(facts: BackgroundFacts): Uncertain | null {
  const typed = valueOf(facts.bench, 'backgroundPhase');
  const time = valueOf(facts.bench, 'backgroundTime');
  return typed ?? (time && phaseAfter(time, facts));
}

const phaseAfter = (time: Uncertain, { frequency, ratio }: BackgroundFacts): Uncertain | null =>
  frequency && ratio.value < 1 ? propagate(({ t, w, z }) => t * w * Math.sqrt(Math.max(0, (1 - z) * (1 + z))), { t: time, w: frequency, z: ratio }) : null;

const READ_EACH_TIME = { id: 'background.readings', label: 'Swing before the shot, as read each time' } as const;

function amplitudeRead(record: SessionRecord, cell: CellRead, { choices, scale, spread }: BackgroundFacts, problems: Problem[]): Uncertain | null {
  const dimension = readingDimension(choices);
  if (!unitNamed(cell.unit, dimension)) {
    problems.push(problem('reading-wrong-kind-of-unit', 'doubt', placeOf(record), { found: cell.text, unit: cell.unit, role: 'swingBefore', dimension }));
    return null;
  }
  const u = cell.spread ?? Math.hypot(fromResolution(spread.division), spread.eye);
  const source: Source = { id: `${record.id}.swingBefore`, label: 'Swing before the shot', symbol: 'A_0', dimension, estimate: cell.value, u, distribution: cell.spread === null ? 'rectangular' : 'normal', dof: Infinity, family: READ_EACH_TIME };
  const amplitude = amplitudeOf(ofSource(source), { ...scale!, scale: scaleOfSheet(scale!, record.sheet) });
  if (!amplitude) problems.push(problem('background-swing-off-scale', 'doubt', placeOf(record), {}));
  return amplitude;
}

function timeRead(record: SessionRecord, cell: CellRead, bench: BenchRead): Uncertain {
  const unit = unitNamed(cell.unit, 'time');
  // The watch is started at the maximum and stopped at the shot.
  const u = cell.spread ?? Math.hypot(fromResolution(10 ** -cell.decimals * Math.abs(unit?.factor ?? 1)), Math.SQRT2 * (valueOf(bench, 'timingSpread')?.value ?? 0));
  return ofSource({ id: `${record.id}.timeSinceMaximum`, label: 'Time since the maximum before the shot', symbol: 't_0', dimension: 'time', estimate: cell.value, u, distribution: cell.spread === null ? 'rectangular' : 'normal', dof: Infinity, family: READ_EACH_TIME });
}

type LaunchInputs = Readonly<Record<'angle' | 'ratio' | 'quadratic' | 'friction' | 'share' | 'deflection' | 'speed', number>>;
/** φ of the full pendulum; with p = 0 of the small swing. */
export const launchFromSwing = ({ angle, deflection, speed, share, ...damping }: LaunchInputs): number => jumpToMaximum(angle, { deflection, speed }, damping, share);
export const smallLaunchFromSwing = (x: LaunchInputs): number => launchFromSwing({ ...x, share: 0 });
