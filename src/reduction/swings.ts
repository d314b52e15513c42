/** Fourth step: the damping ratio of each configuration, from successive turning points or as typed. */
import { fromLimits, fromResolution, type Source } from '../metrology/source.ts';
import { ownParts, pooledMean, weightsOf } from '../metrology/pooled.ts';
import { anchor, combine, exact, ofSource, propagate, standardUncertainty, withSensitivities, type Anchor, type Uncertain } from '../metrology/uncertain.ts';
import { ratioFromSwings, ratioOfDecrement, ratioOfPeakTime, type RatioFromSwings, type TurningPoint } from '../pendulum/damping.ts';
import { dampingCarried, naturalFrequency } from '../pendulum/forms.ts';
import { problem, type Place, type Problem, type ProblemCode } from '../problems/problems.ts';
import { angleOfReading } from '../readings/angle.ts';
import type { ReadingWay, StandNumbers } from '../readings/ways.ts';
import type { EntryName } from '../session/entries.ts';
import type { Choices, Session } from '../session/session.ts';
import { carriedTerm, decayTold, lawOf, termFromSwings, type DecayTold, type Law } from './decayLaws.ts';
import { readQuantity } from '../units/quantity.ts';
import { unitNamed } from '../units/units.ts';
import { GREATEST, readingDimension, type BenchRead } from './entries.ts';
import type { Readings, ReadingSpread } from './readings.ts';
import { factorOfBody, type ByConfiguration, type ConfigurationName, type Stand } from './stand.ts';
import { placeOf, type SessionRecord } from './sheets.ts';

export interface Damping {
  readonly ratio: Readonly<Record<ConfigurationName, Anchor>>;
  /** β, per radian, and θ_f, rad; exactly 0 unless their law holds. */
  readonly quadratic: Readonly<Record<ConfigurationName, Anchor>>;
  readonly friction: Readonly<Record<ConfigurationName, Anchor>>;
  readonly law: Law;
  readonly way: Choices['dampingWay'];
  /** Records (or typed free swings) that the damping rests on. */
  readonly records: number;
  /** How the amplitude of the longest swing falls, by each law; null where the damping is not from swings. */
  readonly decay: (() => DecayTold | null) | null;
  /** Viscous ratio of each configuration from its own swings alone, for comparing the two; null without swings of it. */
  readonly seen: ByConfiguration<Uncertain | null>;
}

/** One swing's turning points as angles with the slope ∂θ/∂reading of each. */
export interface Turning {
  readonly configuration: ConfigurationName;
  readonly place: Place;
  readonly rest: { readonly reading: Uncertain; readonly angle: number; readonly slope: number } | null;
  readonly points: readonly { readonly number: number; readonly reading: Uncertain; readonly angle: number }[];
  readonly slopes: readonly number[];
  readonly gravityShare: number;
  readonly ratio: Uncertain | null;
  /** Of the fit of the viscous ratio. */
  readonly status: RatioFromSwings['status'];
}

/** Scale of the stand: the lengths that the way of reading needs, the ruler's scale and its plumb mark. */
export interface Scale {
  readonly way: ReadingWay;
  /** By entry name; the shape of the screen stands among them as a number. */
  readonly stand: Readonly<Record<string, Uncertain>>;
  readonly sideToSide: boolean;
  readonly scale: Uncertain;
  /** The same of the sheets whose readings were read with an instrument that has a calibration ± of its own. */
  readonly bySheet: ReadonlyMap<string, Uncertain>;
  readonly mark: Uncertain | null;
  /** −1 where the scale's numbers fall as the pendulum swings out. */
  readonly sense: 1 | -1;
}

/** Fewer swings than this leave the damping to chance. */
const FEW = 3;

const both = (value: Anchor): Readonly<Record<ConfigurationName, Anchor>> => ({ shots: value, taps: value });

export function dampingOf(
  session: Session, bench: BenchRead, stand: Stand, scale: Scale | null, records: readonly SessionRecord[], readings: ReadonlyMap<string, Readings>,
  spread: ReadingSpread, counts: (record: SessionRecord) => boolean, problems: Problem[],
): Damping {
  const { dampingWay: way, dampingLaw } = session.choices;
  const zero = both(anchor(exact(0)));
  const undamped: Damping = { ratio: zero, quadratic: zero, friction: zero, law: 'viscous', way: 'none', records: 0, decay: null, seen: { shots: null, taps: null } };
  const typed = (name: EntryName): Uncertain | null => bench.entries.get(name)?.value ?? null;
  const [ratio, decrement, quadratic, friction] = [typed('dampingRatio'), typed('logDecrement'), typed('quadraticDamping'), typed('frictionAngle')];
  if (way === 'ratio' && ratio) return { ...undamped, ratio: carried(ratio, stand), way };
  if (way === 'decrement' && decrement) return { ...undamped, ratio: carried(propagate(({ d }) => ratioOfSigned(d), { d: decrement }), stand), way };
  if (way === 'maximumTime') {
    const told = ratioOfMaximumTime(typed('firstMaximumTime'), stand, problems);
    return told ? { ...undamped, ratio: carried(told, stand), way } : undamped;
  }
  if (way === 'quadratic' && quadratic) return { ...undamped, quadratic: carriedByBody(anchor(quadratic), stand, 'inertia'), law: 'quadratic', way };
  if (way === 'friction' && friction) return { ...undamped, friction: carriedByBody(anchor(friction), stand, 'stiffness'), law: 'friction', way };
  const found = way === 'swings' && scale ? swingsFound(session, stand, scale, records, readings, spread, counts, problems) : [];
  if (found.length === 0) {
    // A trace's jumps carry its own damping.
    const onlyTraces = records.length === 0 && session.traces.length > 0;
    if (!onlyTraces && (way === 'none' || records.length > 0)) problems.push(problem('damping-none', way === 'none' ? 'note' : 'doubt', {}, {}));
    return undamped;
  }
  if (found.length < FEW) problems.push(problem('damping-from-few', 'note', {}, { records: found.length }));
  const law = lawOf(dampingLaw, found, problems);
  const decay = (): DecayTold | null => decayTold(law, found);
  if (law === 'viscous') return { ...undamped, ratio: ratioByConfiguration(found, stand, problems), way, records: found.length, decay, seen: { shots: seenOf(found, 'shots'), taps: seenOf(found, 'taps') } };
  const from: ConfigurationName = found.some((swing) => swing.configuration === 'shots') ? 'shots' : 'taps';
  const term = termFromSwings(law, differ(stand) ? found.filter((swing) => swing.configuration === from) : found, problems);
  if (!term) return undamped;
  return { ...undamped, [law]: carriedByBody(term, stand, law === 'quadratic' ? 'inertia' : 'stiffness', from), law, way, records: found.length, decay };
}

function carriedByBody(term: Anchor, stand: Stand, by: 'inertia' | 'stiffness', from: ConfigurationName = 'shots'): Readonly<Record<ConfigurationName, Anchor>> {
  const masses = stand.masses;
  if (!masses) return both(term);
  const to = (name: ConfigurationName): Anchor => {
    const moved = carriedTerm(term, masses[from][by], masses[name][by]);
    // What rubs at the pivot does so in any gas; what the gas takes does not.
    return by === 'inertia' && name !== from ? inOtherGas(moved, stand) : moved;
  };
  return { shots: to('shots'), taps: to('taps') };
}

/** Damping measured in gas of one pressure and used in that of another: from none of it to twice as much, as limits. */
function inOtherGas(carriedOver: Anchor, stand: Stand): Anchor {
  if (!stand.gasDiffers || carriedOver.value === 0) return carriedOver;
  return anchor(combine([[1, carriedOver], [1, ofSource({
    id: 'damping.gas', label: 'Damping carried over to gas of another pressure', symbol: 'ζ', dimension: 'number', estimate: 0, u: fromLimits(Math.abs(carriedOver.value)), distribution: 'rectangular', dof: Infinity,
  })]]));
}

/** The two configurations are damped differently. */
const differ = (stand: Stand): boolean => stand.gasDiffers || (stand.masses !== null && stand.masses.shots !== stand.masses.taps);

function ratioByConfiguration(found: readonly Turning[], stand: Stand, problems: Problem[]): Readonly<Record<ConfigurationName, Anchor>> {
  const of = (name: ConfigurationName): readonly Uncertain[] => found.flatMap((swing) => (swing.configuration === name && swing.ratio ? [swing.ratio] : []));
  const [shots, taps] = [of('shots'), of('taps')];
  if (!differ(stand)) return both(pooledRatio([...shots, ...taps], 'all', problems));
  if (shots.length > 0 && taps.length > 0) return { shots: pooledRatio(shots, 'shots', problems), taps: pooledRatio(taps, 'taps', problems) };
  const from: ConfigurationName = shots.length > 0 ? 'shots' : 'taps';
  problems.push(problem('damping-carried-over', stand.gasDiffers ? 'doubt' : 'note', {}, { from, gas: stand.gasDiffers ? 'differs' : 'same' }));
  return carried(pooledRatio(from === 'shots' ? shots : taps, from, problems), stand, from);
}

/** Mean of the ratios of one configuration's own swings. */
function seenOf(found: readonly Turning[], name: ConfigurationName): Uncertain | null {
  const own = found.flatMap((swing) => (swing.configuration === name && swing.ratio ? [swing.ratio] : []));
  return own.length === 0 ? null : pooledRatio(own, `seen.${name}`, []);
}

/** Half-differences may step below zero; the ratio stays odd there. */
const ratioOfSigned = (d: number): number => Math.sign(d) * ratioOfDecrement(Math.abs(d));

function carried(ratio: Uncertain, stand: Stand, from: ConfigurationName = 'shots'): Readonly<Record<ConfigurationName, Anchor>> {
  const kept = anchor(ratio);
  const masses = stand.masses;
  const to: ConfigurationName = from === 'shots' ? 'taps' : 'shots';
  const same = !masses || masses.shots === masses.taps;
  const moved = inOtherGas(same ? kept : anchor(propagate(dampingCarried, { ratio: kept, factorFrom: factorOfBody(masses[from]), factorTo: factorOfBody(masses[to]) })), stand);
  return from === 'shots' ? { shots: kept, taps: moved } : { shots: moved, taps: kept };
}

function pooledRatio(items: readonly Uncertain[], id: string, problems: Problem[]): Anchor {
  const ownU = ownParts(items);
  const pooled = pooledMean(items, ownU, {
    id: `damping.scatter.${id}`, label: 'Scatter of the damping ratio', symbol: 'ζ', dimension: 'number', weights: weightsOf(ownU),
    family: { id: `damping.scatter.${id}`, label: 'Scatter of the damping ratio among the swings' },
  });
  if (pooled.mean.value < 0) {
    problems.push(problem('swings-grow', 'doubt', {}, { value: -pooled.mean.value }));
    return anchor({ ...pooled.mean, value: 0 });
  }
  return anchor(pooled.mean);
}

/** ζ from the time to the first maximum and the natural frequency that masses and lengths make, as fired; null where they give none. */
function ratioOfMaximumTime(time: Uncertain | null, stand: Stand, problems: Problem[]): Uncertain | null {
  if (!time) return null;
  const body = stand.masses?.shots;
  if (!body) {
    problems.push(problem('maximum-time-needs-the-body', 'doubt', { entry: 'firstMaximumTime' }, {}));
    return null;
  }
  const frequency = propagate(naturalFrequency, { inertia: body.inertia, stiffness: body.stiffness });
  const late = (): null => {
    problems.push(problem('maximum-time-too-late', 'doubt', { entry: 'firstMaximumTime' }, { found: time.value, quarter: Math.PI / (2 * frequency.value) }));
    return null;
  };
  try {
    const ratio = propagate(({ t, w }) => ratioOfPeakTime(w * t), { t: time, w: frequency });
    if (ratio.value >= 0) return ratio;
    return ratio.value > -LATE_BY_CHANCE * standardUncertainty(ratio) ? { ...ratio, value: 0 } : late();
  } catch (failure) {
    if (!(failure instanceof RangeError)) throw failure;
    return late();
  }
}

/** A time to the first maximum that is too long by up to so many of its u tells no damping at all. */
const LATE_BY_CHANCE = 2;

/** Every swing with enough turning points, of the records that count and of the free swing typed. */
function swingsFound(
  session: Session, stand: Stand, scale: Scale, records: readonly SessionRecord[], readings: ReadonlyMap<string, Readings>,
  spread: ReadingSpread, counts: (record: SessionRecord) => boolean, problems: Problem[],
): readonly Turning[] {
  const found: Turning[] = [];
  const needsRatio = session.choices.dampingLaw !== 'quadratic' && session.choices.dampingLaw !== 'friction';
  const oneSided: Place[] = [];
  const take = (place: Place, configuration: ConfigurationName, rest: Uncertain | null, given: readonly Point[]): void => {
    if (neverCrosses(rest, given)) {
      oneSided.push(place);
      return;
    }
    const points = untilStandstill(given);
    if (points.length < given.length) problems.push(problem('swing-stopped', 'note', place, {}));
    if (points.length < 2 || points.length + (rest ? 1 : 0) < 3) return;
    const share = stand.masses?.[configuration].gravityShare.value ?? stand.shareUnknown;
    const turning = turningOf(rest, points, scale, share);
    if (turning && (turning.ratio || !needsRatio)) found.push({ ...turning, configuration, place, gravityShare: share });
    else problems.push(problem(CODE_OF_STATUS[turning?.status ?? 'notDecaying'], 'note', place, {}));
  };
  for (const record of records) {
    const r = readings.get(record.id);
    if (!r || record.kind === 'zero' || scale.sideToSide || !counts(record)) continue;
    const points = [...(r.first ? [{ number: 0, reading: r.first }] : []), ...r.next];
    if (points.length < 2 || points.length + (r.rest ? 1 : 0) < 3) continue;
    take(placeOf(record), record.kind === 'tap' ? 'taps' : 'shots', r.rest, points);
  }
  const typed = typedFreeSwing(session, spread, problems);
  if (typed.length >= 3) take({ entry: 'freeSwing' }, 'shots', null, typed.map((reading, number) => ({ number, reading })));
  const [place] = oneSided;
  const ofEntry = oneSided.find(({ entry }) => entry !== undefined);
  if (place) problems.push(problem('swings-never-cross-rest', 'doubt', oneSided.length === 1 ? place : ofEntry ?? {}, { records: oneSided.length }));
  return found;
}

const CODE_OF_STATUS: Readonly<Record<Turning['status'], ProblemCode>> = { found: 'swings-not-decaying', notDecaying: 'swings-not-decaying', tooFew: 'swings-too-few', noLimit: 'swings-fit-unsettled' };

/** The swing dies away on one side of its rest, though every other turning point should lie beyond it. */
function neverCrosses(rest: Uncertain | null, points: readonly Point[]): boolean {
  if (points.every(({ number }) => (number - points[0]!.number) % 2 === 0)) return false;
  const values = points.map(({ reading }) => reading.value);
  if (rest) {
    const out = values.map((x) => (x - rest.value) * Math.sign(values[0]! - rest.value));
    return out[0]! > 0 && out.every((x, i) => x >= 0 && (i === 0 || x < out[i - 1]!));
  }
  const steps = values.slice(1).map((x, i) => (x - values[i]!) * Math.sign(values[1]! - values[0]!));
  return values.length > 2 && steps.every((step, i) => step > 0 && (i === 0 || step < steps[i - 1]!));
}

/** The turning points to the one at which the pendulum stands: readings that only repeat it are none. */
function untilStandstill(points: readonly Point[]): readonly Point[] {
  const stands = points.findIndex((point, i) => i > 1 && point.number === points[i - 1]!.number + 1 && point.reading.value === points[i - 1]!.reading.value);
  return stands < 0 ? points : points.slice(0, stands);
}

interface Point {
  readonly number: number;
  readonly reading: Uncertain;
}

/** Secant steps in which the plumb point of a free swing is found from the swing itself; five reach the last digits of the widest. */
const PLUMB_STEPS = 12;

/** One swing's angles about its plumb point and its viscous ratio with its readings' contributions; null where no swing decays so. */
function turningOf(rest: Uncertain | null, turning: readonly Point[], scale: Scale, gravityShare: number): Pick<Turning, 'rest' | 'points' | 'slopes' | 'ratio' | 'status'> | null {
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
    if (scale.mark === null && rest === null && scale.way !== 'angle' && scale.way !== 'cameraPivotMarker') {
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
    const slopeOf = (x: Uncertain): number => slopeAt(x.value, standardUncertainty(x));
    const inputs = [...(rest ? [rest] : []), ...turning.map((t) => t.reading)];
    return {
      rest: rest && { reading: rest, angle: angle(rest.value), slope: slopeOf(rest) },
      points: turning.map(({ number, reading }) => ({ number, reading, angle: angle(reading.value) })),
      slopes: turning.map(({ reading }) => slopeOf(reading)),
      status: fit.status,
      ratio: fit.status === 'found' ? withSensitivities(fit.dampingRatio, inputs.map((x, i) => [fit.sensitivities[i]! * slopeOf(x), x] as const)) : null,
    };
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
