/** Fourth step: the damping ratio of each configuration, from successive turning points or as typed. */
import { fromResolution, type Source } from '../metrology/source.ts';
import { ownParts, pooledMean, weightsOf } from '../metrology/pooled.ts';
import { anchor, exact, ofSource, propagate, standardUncertainty, withSensitivities, type Anchor, type Uncertain } from '../metrology/uncertain.ts';
import { ratioFromSwings, ratioOfDecrement, type TurningPoint } from '../pendulum/damping.ts';
import { dampingCarried } from '../pendulum/forms.ts';
import { problem, type Problem } from '../problems/problems.ts';
import { angleOfReading } from '../readings/angle.ts';
import type { ReadingWay, StandNumbers } from '../readings/ways.ts';
import type { Session } from '../session/session.ts';
import { readQuantity } from '../units/quantity.ts';
import { unitNamed } from '../units/units.ts';
import { GREATEST, readingDimension, type BenchRead } from './entries.ts';
import type { Readings, ReadingSpread } from './readings.ts';
import { factorOfBody, type ConfigurationName, type Stand } from './stand.ts';
import { placeOf, type SessionRecord } from './sheets.ts';

export interface Damping {
  readonly ratio: Readonly<Record<ConfigurationName, Anchor>>;
  readonly way: 'swings' | 'decrement' | 'ratio' | 'none';
  /** Records (or typed free swings) that the ratio rests on. */
  readonly records: number;
}

/** Scale of the stand: the lengths that the way of reading needs, the ruler's scale and its plumb mark. */
export interface Scale {
  readonly way: ReadingWay;
  /** By entry name; the shape of the screen stands among them as a number. */
  readonly stand: Readonly<Record<string, Uncertain>>;
  readonly sideToSide: boolean;
  readonly scale: Uncertain;
  readonly mark: Uncertain | null;
  /** −1 where the scale's numbers fall as the pendulum swings out. */
  readonly sense: 1 | -1;
}

/** Fewer swings than this leave the damping to chance. */
const FEW = 3;

export function dampingOf(
  session: Session, bench: BenchRead, stand: Stand, scale: Scale | null, records: readonly SessionRecord[], readings: ReadonlyMap<string, Readings>,
  spread: ReadingSpread, counts: (record: SessionRecord) => boolean, problems: Problem[],
): Damping {
  const { dampingWay } = session.choices;
  const typedRatio = bench.entries.get('dampingRatio')?.value;
  const typedDecrement = bench.entries.get('logDecrement')?.value;
  if (dampingWay === 'ratio' && typedRatio) return { ratio: carried(typedRatio, stand), way: 'ratio', records: 0 };
  if (dampingWay === 'decrement' && typedDecrement) return { ratio: carried(propagate(({ d }) => ratioOfSigned(d), { d: typedDecrement }), stand), way: 'decrement', records: 0 };
  const none = { shots: anchor(exact(0)), taps: anchor(exact(0)) };
  if (dampingWay !== 'swings' || !scale) {
    problems.push(problem('damping-none', dampingWay === 'none' ? 'note' : 'doubt', {}, {}));
    return { ratio: none, way: 'none', records: 0 };
  }
  const found = swingsByConfiguration(session, stand, scale, records, readings, spread, counts, problems);
  const total = found.shots.length + found.taps.length;
  if (total === 0) {
    problems.push(problem('damping-none', 'doubt', {}, {}));
    return { ratio: none, way: 'none', records: 0 };
  }
  if (total < FEW) problems.push(problem('damping-from-few', 'note', {}, { records: total }));
  const oneConfiguration = !stand.masses || stand.masses.shots === stand.masses.taps;
  if (oneConfiguration) {
    const ratio = pooledRatio([...found.shots, ...found.taps], 'all', problems);
    return { ratio: { shots: ratio, taps: ratio }, way: 'swings', records: total };
  }
  if (found.shots.length > 0 && found.taps.length > 0) {
    return { ratio: { shots: pooledRatio(found.shots, 'shots', problems), taps: pooledRatio(found.taps, 'taps', problems) }, way: 'swings', records: total };
  }
  const from: ConfigurationName = found.shots.length > 0 ? 'shots' : 'taps';
  problems.push(problem('damping-carried-over', 'note', {}, { from }));
  return { ratio: carried(pooledRatio(found[from], from, problems), stand, from), way: 'swings', records: total };
}

/** Half-differences may step below zero; the ratio stays odd there. */
const ratioOfSigned = (d: number): number => Math.sign(d) * ratioOfDecrement(Math.abs(d));

function carried(ratio: Uncertain, stand: Stand, from: ConfigurationName = 'shots'): Readonly<Record<ConfigurationName, Anchor>> {
  const kept = anchor(ratio);
  const masses = stand.masses;
  if (!masses || masses.shots === masses.taps) return { shots: kept, taps: kept };
  const to: ConfigurationName = from === 'shots' ? 'taps' : 'shots';
  const moved = anchor(propagate(dampingCarried, { ratio: kept, factorFrom: factorOfBody(masses[from]), factorTo: factorOfBody(masses[to]) }));
  return from === 'shots' ? { shots: kept, taps: moved } : { shots: moved, taps: kept };
}

function pooledRatio(items: readonly Uncertain[], id: string, problems: Problem[]): Anchor {
  const ownU = ownParts(items);
  const pooled = pooledMean(items, ownU, {
    id: `damping.scatter.${id}`, label: 'Scatter of the damping ratio', symbol: 'ζ', dimension: 'number', weights: weightsOf(ownU),
    family: { id: `damping.scatter.${id}`, label: 'Scatter of the damping ratio among the swings' },
  });
  if (pooled.mean.value < 0) {
    problems.push(problem('swings-not-decaying', 'doubt', {}, { ratio: pooled.mean.value }));
    return anchor({ ...pooled.mean, value: 0 });
  }
  return anchor(pooled.mean);
}

type Found = Record<ConfigurationName, Uncertain[]>;

function swingsByConfiguration(
  session: Session, stand: Stand, scale: Scale, records: readonly SessionRecord[], readings: ReadonlyMap<string, Readings>,
  spread: ReadingSpread, counts: (record: SessionRecord) => boolean, problems: Problem[],
): Found {
  const found: Found = { shots: [], taps: [] };
  for (const record of records) {
    const r = readings.get(record.id);
    if (!r || record.kind === 'zero' || !counts(record)) continue;
    const turning = [...(r.first ? [{ number: 0, reading: r.first }] : []), ...r.next];
    if (turning.length < 2 || turning.length + (r.rest ? 1 : 0) < 3) continue;
    const configuration: ConfigurationName = record.kind === 'tap' ? 'taps' : 'shots';
    const ratio = ratioOfRecord(r.rest, turning, scale, stand.masses?.[configuration].gravityShare.value ?? stand.shareUnknown);
    if (ratio) found[configuration].push(ratio);
    else problems.push(problem('swings-not-decaying', 'note', placeOf(record), {}));
  }
  const typed = typedFreeSwing(session, spread, problems);
  if (typed.length >= 3) {
    const ratio = ratioOfRecord(null, typed.map((reading, number) => ({ number, reading })), scale, stand.masses?.shots.gravityShare.value ?? stand.shareUnknown);
    if (ratio) found.shots.push(ratio);
    else problems.push(problem('swings-not-decaying', 'note', { entry: 'freeSwing' }, {}));
  }
  return found;
}

/** Secant steps in which the plumb point of a free swing is found from the swing itself; five reach the last digits of the widest. */
const PLUMB_STEPS = 12;

/** ζ of one record, with its readings' contributions by the fit's sensitivities; null where the swings do not decay. */
function ratioOfRecord(rest: Uncertain | null, turning: readonly { readonly number: number; readonly reading: Uncertain }[], scale: Scale, gravityShare: number): Uncertain | null {
  const middle = (turning[0]!.reading.value + turning[1]!.reading.value) / 2;
  let mark = scale.mark?.value ?? rest?.value ?? middle;
  const stand: StandNumbers = Object.fromEntries(Object.entries(scale.stand).map(([name, value]) => [name, value.value]));
  const angle = (x: number): number => scale.sense * angleOfReading(scale.way, x, mark, scale.scale.value, stand);
  const slopeAt = (x: number, h: number): number => (h === 0 ? 0 : (angle(x + h) - angle(x - h)) / (2 * h));
  const fitFrom = (): ReturnType<typeof ratioFromSwings> => {
    const points: TurningPoint[] = turning.map(({ number, reading }) => ({ number, angle: angle(reading.value) }));
    return ratioFromSwings(rest ? angle(rest.value) : null, points, gravityShare);
  };
  try {
    let fit = fitFrom();
    // With neither mark nor rest the plumb point is where the swing comes to rest: only there is the scale's curvature the same on both sides.
    if (scale.mark === null && rest === null && scale.way !== 'angle') {
      let before = mark;
      mark += fit.rest / slopeAt(mark, 1e-3 * Math.abs(turning[0]!.reading.value - middle));
      for (let i = 0; i < PLUMB_STEPS && fit.status === 'found' && mark !== before; i++) {
        const restBefore = fit.rest;
        fit = fitFrom();
        if (Math.abs(fit.rest) <= 1e-14 * Math.abs(fit.amplitude) || fit.rest === restBefore) break;
        const next = mark - (fit.rest * (mark - before)) / (fit.rest - restBefore);
        before = mark;
        mark = next;
      }
    }
    if (fit.status !== 'found') return null;
    const inputs = [...(rest ? [rest] : []), ...turning.map((t) => t.reading)];
    return withSensitivities(fit.dampingRatio, inputs.map((x, i) => [fit.sensitivities[i]! * slopeAt(x.value, standardUncertainty(x)), x] as const));
  } catch (failure) {
    if (failure instanceof RangeError) return null;
    throw failure;
  }
}

/** The free swing typed on the bench: a list of turning readings, its unit after the last (or each). */
function typedFreeSwing(session: Session, spread: ReadingSpread, problems: Problem[]): readonly Uncertain[] {
  const text = session.freeSwing.trim();
  if (text === '') return [];
  const dimension = readingDimension(session.choices);
  const cells = text.split(/[;\n\t]+|,\s+|\s+(?=[-−+]?[\d.,])/).map((cell) => cell.trim()).filter((cell) => cell !== '');
  const unitIfNone = { length: 'mm', angle: 'mrad', pixel: 'px', count: 'counts' }[dimension as 'length'] ?? 'mm';
  const unitTyped = /[^\d.,\s+\-−()]+\S*$/.exec(cells.at(-1) ?? '')?.[0];
  // A unit that is none of this dimension is told by the last cell itself.
  const unitOfLast = (unitTyped === undefined ? null : unitNamed(unitTyped, dimension)?.symbol) ?? unitIfNone;
  const readings: Uncertain[] = [];
  for (const [i, cell] of cells.entries()) {
    const got = readQuantity(cell, dimension, unitOfLast);
    if (!got.ok || Math.abs(got.value) > GREATEST || (got.spread ?? 0) > GREATEST) {
      problems.push(problem('entry-not-a-number', 'stops', { entry: 'freeSwing' }, { label: `Free swing, turning point ${i + 1}`, found: cell, unit: unitOfLast }));
      return [];
    }
    const u = got.spread ?? Math.hypot(fromResolution(spread.division > 0 ? spread.division : 10 ** -got.decimals * got.unit.factor), spread.eye);
    const source: Source = {
      id: `freeSwing.${i}`, label: `Free swing, turning point ${i + 1}`, symbol: 'x', dimension, estimate: got.value, u, distribution: 'rectangular', dof: Infinity,
      family: { id: 'readings.freeSwings', label: 'Readings of the free swings' },
    };
    readings.push(ofSource(source));
  }
  return readings;
}
