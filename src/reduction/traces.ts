/** Sampled traces: each shot and tap a jump of the velocity, all jumps of a record solved together, to records like any other. */
import { ownParts, pooledMean } from '../metrology/pooled.ts';
import { anchor, combine, exact, propagate, standardUncertainty, type Anchor, type Uncertain } from '../metrology/uncertain.ts';
import { problem, type Problem } from '../problems/problems.ts';
import { angleOfReading, swingFromMark, swingFromRest } from '../readings/angle.ts';
import type { CellRead } from '../readings/cellReads.ts';
import { WAYS } from '../readings/ways.ts';
import type { Choices, Session, Trace } from '../session/session.ts';
import { pickedThrow } from '../traces/pickPeak.ts';
import { residualSpectrum, type ResidualSpectrum } from '../traces/residualSpectrum.ts';
import { betterFrom } from '../traces/steadyTrain.ts';
import { restAt, swingOver } from '../traces/swingModel.ts';
import { readQuantity } from '../units/quantity.ts';
import type { Dimension } from '../units/units.ts';
import { cameraRemarks, cameraTold, scaleOfArc, type CameraTrack } from './camera.ts';
import { readingDimension, type BenchRead } from './entries.ts';
import { uncertainJumps } from './jumpSources.ts';
import type { SessionRecord } from './sheets.ts';
import type { Swing } from './shots.ts';
import { valueOf, type ConfigurationName } from './stand.ts';
import type { Scale } from './swings.ts';
import type { Timing } from './timings.ts';
import { fitTrace, type Expected, type TimedEvent, type TraceFit, type TraceFitted } from './traceFit.ts';
import { readTrace, type TraceLibrary, type TraceRead } from './traceRead.ts';
import type { CameraTold, TraceEventTold, TraceTold, TrainTold } from './traceResults.ts';
import type { WideSwing } from './wideSwings.ts';

/** A trace read and fitted, in the unit of its own column. */
export interface TraceKnown {
  readonly trace: Trace;
  readonly read: TraceRead;
  readonly fitted: TraceFitted;
  readonly jumps: readonly Uncertain[];
  /** (ω_n, ζ) as uncertain values, shared by all that rests on them. */
  readonly frequency: Anchor | null;
  readonly ratio: Anchor | null;
}

/** A step of position beyond this many u is a fault. */
const STEP_FAULT = 4;
/** Cells that a record of a trace has none of. */
const NO_CELLS = {
  rest: null, restAfter: null, firstSwing: null, restDown: null, firstSwingDown: null, nextSwings: [], nextSwingsDown: [], voltage: null, pressure: null, hammerIn: null, hammerRebound: null, hammerFollow: null, tapForce: null, tapDuration: null,
  weight: null, loading: null, unloading: null, swingsTime: null, cycles: 1, amplitude: null, massHung: null, massHungAt: null, maximumTime: null, swingBefore: null, timeSinceMaximum: null, problems: [], cells: [], edited: [],
} as const;

/** Reads and fits every trace of the session; what is expected of the swing serves where a record shows none. */
export function knownTraces(session: Session, library: TraceLibrary, bench: BenchRead, expected: Expected, problems: Problem[]): readonly TraceKnown[] {
  return session.traces.map((trace) => {
    const read = readTrace(trace, library, session.choices, bench);
    const fitted = fitTrace(trace, read, expected);
    problems.push(...read.problems, ...fitted.problems);
    const { found } = fitted;
    if (!found) return { trace, read, fitted, jumps: [], frequency: null, ratio: null };
    const { fit, factors, factorOfSwing } = found;
    if (read.camera) problems.push(...cameraRemarks(trace.name, cameraOf(found, read.camera, session.choices, bench), session.choices.readingWay));
    const variance = fit.noise ** 2;
    const [ww, wz, zz] = fit.covariance.map((value) => value * variance * factorOfSwing) as [number, number, number];
    const { jumps, frequency, ratio } = uncertainJumps(trace.id, read.inVolts ? 'voltage' : readingDimension(session.choices), {
      jumps: fit.jumps, noiseCovariance: (i, j) => variance * Math.sqrt(factors[i]! * factors[j]!) * fit.noiseCovariance(i, j), covariance: [ww, wz, zz], byFrequency: fit.byFrequency, byRatio: fit.byRatio,
      frequency: fit.frequency, ratio: fit.ratio,
    });
    return { trace, read, fitted, jumps, frequency, ratio };
  });
}

/** Its rest in the middle of the record. */
const cameraOf = ({ samples: { t }, fit }: TraceFit, camera: CameraTrack, choices: Choices, bench: BenchRead): CameraTold => cameraTold(camera, restAt(fit.model, (t[0]! + t[t.length - 1]!) / 2), choices, bench);

export function recordOf(trace: Trace, event: Pick<TimedEvent, 'id' | 'kind' | 'impulse'>, time: number, number: number): SessionRecord {
  const cell = (value: number, unit: string, text: string, spread: number | null = null): CellRead => ({ value, spread, decimals: 3, unit, text });
  const impulse = event.impulse === '' ? null : readQuantity(event.impulse, 'impulse', 'mN·s');
  return {
    ...NO_CELLS, id: `${trace.id}/${event.id}`, line: String(number), sheet: trace.id, sheetName: trace.name, kind: event.kind, kindBy: 'person', label: `${trace.name} ${number}`, note: '',
    time: cell(time, 's', time.toPrecision(9)), tapImpulse: impulse?.ok ? cell(impulse.value, impulse.unit.symbol, event.impulse, impulse.spread) : null,
  };
}

/** Records of the run from the jumps of all traces. */
export function swingsOfTraces(known: readonly TraceKnown[], bench: BenchRead, scale: Scale | null, wide: ReadonlyMap<string, WideSwing>, problems: Problem[]): readonly Swing[] {
  if (!scale) return [];
  return known.flatMap(({ trace, read, fitted, jumps }) => {
    const { found } = fitted;
    if (!found) return [];
    const sensor = read.inVolts ? sensorOf(bench) : null;
    if (read.inVolts && !sensor) {
      problems.push(problem('trace-sensor-slope-missing', 'stops', { sheetName: trace.name, entry: 'sensorSlope' }, {}));
      return [];
    }
    const arcScale = scaleOfArc(trace.id, read.camera);
    return found.events.map((event, k) => swingOfJump(recordOf(trace, event, found.fit.times[k]!, k + 1), { jump: jumps[k]!, dimension: read.inVolts ? 'voltage' : WAYS[scale.way].reads === 'pixel' && scale.way === 'cameraPivotMarker' ? 'angle' : WAYS[scale.way].reads, rest: restAt(found.fit.model, found.fit.times[k]!), stepInU: stepOf(found, k), sensor, correction: wide.get(trace.id)?.corrections[k] ?? 0, arcScale }, scale, problems));
  });
}

/** The step over its u with the residuals' correlation. */
const stepOf = ({ fit, factors }: TraceFit, k: number): number => fit.stepsInU[k]! / Math.sqrt(factors[k]!);

interface Sensor {
  readonly slope: Uncertain;
  readonly offset: Uncertain;
}

/** The sensor's line x = a + b V, its two parameters correlated as typed. Source: GUM F.1.2.3 (from memory). */
function sensorOf(bench: BenchRead): Sensor | null {
  const slope = valueOf(bench, 'sensorSlope');
  if (!slope || slope.value === 0) return null;
  const offset = valueOf(bench, 'sensorOffset') ?? exact(0);
  const r = Math.max(-1, Math.min(1, valueOf(bench, 'sensorCorrelation')?.value ?? 0));
  const [ua, ub] = [standardUncertainty(offset), standardUncertainty(slope)];
  if (r === 0 || ua === 0 || ub === 0) return { slope, offset };
  const own = Math.sqrt(1 - r * r);
  return { slope, offset: { ...combine([[own, offset], [(r * ua) / ub, slope]]), value: offset.value } };
}

interface JumpFacts {
  readonly jump: Uncertain;
  readonly dimension: Dimension;
  readonly rest: number;
  readonly stepInU: number;
  readonly sensor: Sensor | null;
  /** What the full pendulum's equation adds, rad. */
  readonly correction: number;
  /** 1 with the u of a radius that the arc itself told; null where the pivot was told. */
  readonly arcScale: Uncertain | null;
}

const lengthOf = (jump: Uncertain, sensor: Sensor | null): Uncertain => (sensor ? propagate(({ b, v }) => b * v, { b: sensor.slope, v: jump }) : jump);

/** Angle of a throw from the rest, whichever way the scale runs: about the plumb mark where there is one; else the rest line is taken as the plumb point. */
function unsignedAngle(length: Uncertain, rest: number, sensor: Sensor | null, scale: Scale): Uncertain {
  const from = sensor ? propagate(({ a, b }) => a + b * rest, { a: sensor.offset, b: sensor.slope }) : exact(rest);
  return scale.mark
    ? propagate(swingFromMark(scale.way), { ...scale.stand, first: combine([[1, from], [1, length]]), rest: from, mark: scale.mark, scale: scale.scale })
    : propagate(swingFromRest(scale.way), { ...scale.stand, first: length, rest: exact(0), scale: scale.scale });
}

/** Angle of a throw in the unit of the trace's column; null where the geometry does not reach, or a sensor's slope is wanted. */
export function throwAngle(jump: Uncertain, rest: number, inVolts: boolean, scale: Scale, bench: BenchRead): Uncertain | null {
  const sensor = inVolts ? sensorOf(bench) : null;
  if (inVolts && !sensor) return null;
  try {
    const unsigned = unsignedAngle(lengthOf(jump, sensor), rest, sensor, scale);
    return scale.sense === 1 ? unsigned : combine([[-1, unsigned]]);
  } catch (failure) {
    if (!(failure instanceof RangeError)) throw failure;
    return null;
  }
}

function swingOfJump(record: SessionRecord, { jump, dimension, rest, stepInU, sensor, correction, arcScale }: JumpFacts, scale: Scale, problems: Problem[]): Swing {
  const place = { sheetName: record.sheetName, record: record.id };
  const swing: Swing = { record, configuration: record.kind === 'tap' ? 'taps' : 'shots', readings: { restFrom: null, rest: null, first: null, next: [] }, angle: null, launch: null, jump: { value: jump, dimension } };
  if (Math.abs(stepInU) > STEP_FAULT) problems.push(problem('trace-position-step', 'doubt', place, { time: record.time!.value, inU: stepInU }));
  const length = lengthOf(jump, sensor);
  try {
    const unsigned = unsignedAngle(length, rest, sensor, scale);
    const solved = correction === 0 ? unsigned : combine([[1, unsigned], [1, exact(correction)]]);
    const scaled = arcScale ? propagate(({ a, s }) => a * s, { a: solved, s: arcScale }) : solved;
    const angle = scale.sense === 1 ? scaled : combine([[-1, scaled]]);
    return { ...swing, angle, launch: { full: angle, smallAngle: angle } };
  } catch (failure) {
    if (!(failure instanceof RangeError)) throw failure;
    problems.push(problem('record-reading-beyond-radius', 'stops', place, { reading: Math.abs(length.value), radius: (scale.stand['readingRadius'] ?? scale.stand['screenDistance'])?.value ?? 0 }));
    return swing;
  }
}

/** Angle of a small throw in the unit of the trace's column, rad; null where the geometry does not reach. */
export function angleOfThrow(jump: number, inVolts: boolean, scale: Scale, bench: BenchRead): number | null {
  const slope = inVolts ? valueOf(bench, 'sensorSlope')?.value : 1;
  const stand = Object.fromEntries(Object.entries(scale.stand).map(([name, { value }]) => [name, value]));
  try {
    return slope === undefined ? null : Math.abs(angleOfReading(scale.way, slope * jump, 0, scale.scale.value, stand));
  } catch (failure) {
    if (!(failure instanceof RangeError)) throw failure;
    return null;
  }
}

/** With taps alone in it a trace shows the pendulum as it was tapped. */
export const configurationOf = ({ events }: Pick<TraceFit, 'events'>): ConfigurationName => (events.length > 0 && events.every(({ kind }) => kind === 'tap') ? 'taps' : 'shots');

const LEFT = new WeakMap<TraceFit, { readonly spectrum: ResidualSpectrum | null; readonly noise: number }>();

/** What the fit leaves of the samples themselves: by frequency, and its sd. */
function leftOver({ samples: { t, x, use }, every, fit }: TraceFit, spacing: number): { readonly spectrum: ResidualSpectrum | null; readonly noise: number } {
  let [squares, count] = [0, 0];
  const residualsIn = (from: number, to: number): Float64Array => {
    if (every === 1) return fit.residuals.slice(from, to);
    const found = swingOver(fit.model, t.subarray(from, to));
    for (let i = from; i < to; i++) {
      if (use && use[i] === 0) found[i - from] = 0;
      else {
        found[i - from] = x[i]! - found[i - from]!;
        squares += found[i - from]! ** 2;
        count += 1;
      }
    }
    return found;
  };
  const spectrum = residualSpectrum(t.length, residualsIn, spacing);
  return { spectrum, noise: count > 0 ? Math.sqrt(squares / count) : fit.noise };
}

/** Natural periods that the traces show, as timings of the pendulum as it hung then: with taps alone in it as tapped, else as fired. */
export function timingsOfTraces(known: readonly TraceKnown[], wide: ReadonlyMap<string, WideSwing>): readonly Timing[] {
  return known.flatMap(({ trace, fitted, frequency }): Timing[] => {
    const { found } = fitted;
    if (!found || !frequency || found.fit.covariance[0] === 0) return [];
    const configuration = configurationOf(found);
    const factor = wide.get(trace.id)?.frequencyFactor ?? 1;
    const period = anchor(propagate(({ w }) => (2 * Math.PI) / (factor * w), { w: frequency }));
    const pooled = pooledMean([period], ownParts([period]), { id: `traces.period.${trace.id}`, label: 'Scatter of the timings', symbol: 'T', dimension: 'time', family: { id: 'traces.oscillation', label: 'Frequency and damping of the traces' } });
    return [{ id: `trace.${trace.id}`, configuration, hung: null, period, pooled, records: [], trace: trace.name }];
  });
}

/** Single shots are taken to be fired as far apart as those of the record; without them, some periods. */
const SHOTS_APART = 5;

function betterRate({ fit, quietTrain }: TraceFit, uJump: number | null): number | null {
  if (!quietTrain || uJump === null || uJump === 0) return null;
  const gaps = fit.times.slice(1).map((time, k) => time - fit.times[k]!).sort((a, b) => a - b);
  const gap = gaps[gaps.length >> 1] ?? (SHOTS_APART * 2 * Math.PI) / fit.frequency;
  return betterFrom(fit.frequency, quietTrain.u, uJump, Math.max(1, quietTrain.seconds / gap));
}

/** What the page is told of each trace; impulses by the records that its jumps became. */
export function traceTold({ trace, read, fitted, frequency, ratio }: TraceKnown, choices: Choices, bench: BenchRead, wide: WideSwing | null, impulseOfThrow: ((jump: number, inVolts: boolean) => number | null) | null, trains: readonly TrainTold[]): TraceTold {
  const { found } = fitted;
  const { samples, timeline, camera } = read;
  const dimension = choices.readingWay === 'cameraPivotMarker' ? 'angle' : WAYS[choices.readingWay].reads;
  const bare: TraceTold = {
    id: trace.id, name: trace.name, rows: read.record?.rows ?? null, columns: read.columns, uses: { time: read.uses.time ?? null, reading: read.uses.reading ?? null, trigger: read.uses.trigger ?? null },
    from: samples?.t[0] ?? 0, to: samples?.t[samples.t.length - 1] ?? 0, spacing: timeline?.spacing.usual ?? 0, dimension: read.inVolts ? 'voltage' : dimension, offset: fitted.offset, stretches: fitted.stretches, fitted: null, trains, camera: null,
    events: fitted.events.map((event): TraceEventTold => ({ id: event.id, record: null, kind: event.kind, listed: event.listed, time: event.time, timeU: null, jump: null, stepInU: 0, picked: null })),
  };
  if (!found || !frequency || !ratio) return bare;
  const { fit, factors } = found;
  const factor = wide?.frequencyFactor ?? 1;
  const uOf = (k: number): number => {
    const [p, q] = [fit.byFrequency[k]!, fit.byRatio[k]!];
    const [ww, wz, zz] = fit.covariance;
    return fit.noise * Math.sqrt(Math.max(0, factors[k]! * fit.noiseCovariance(k, k) + found.factorOfSwing * (p * p * ww + 2 * p * q * wz + q * q * zz)));
  };
  const byNoise = fit.jumps.map((_, k) => fit.noise * Math.sqrt(factors[k]! * fit.noiseCovariance(k, k)));
  const { noFire } = found;
  const least = byNoise.length === 0 ? (noFire?.sd ?? null) : Math.min(...byNoise);
  const impulseOf = (jump: number): number | null => impulseOfThrow && impulseOfThrow(jump, read.inVolts);
  const byFit = fit.noise * Math.sqrt(found.factorOfSwing);
  if (!LEFT.has(found)) LEFT.set(found, leftOver(found, bare.spacing));
  const { spectrum, noise } = LEFT.get(found)!;
  return {
    ...bare, camera: camera && cameraOf(found, camera, choices, bench),
    events: found.events.map((event, k): TraceEventTold => ({
      id: event.id, record: `${trace.id}/${event.id}`, kind: event.kind, listed: event.listed, time: fit.times[k]!, timeU: fit.timeU[k]!, jump: { value: fit.jumps[k]!, u: uOf(k) }, stepInU: stepOf(found, k),
      picked: pickedThrow(found.samples, fit.model, fit.times[k]!, fit.times[k + 1] ?? Infinity),
    })),
    fitted: {
      period: { value: (2 * Math.PI) / (factor * frequency.value), u: ((2 * Math.PI) / frequency.value ** 2) * standardUncertainty(frequency) }, ratio: { value: ratio.value, u: standardUncertainty(ratio) },
      noise, colour: noise > 0 ? (found.factorOfSwing * found.every * fit.noise ** 2) / noise ** 2 : 1, model: fit.model, spectrum: { frequency: spectrum?.frequency ?? [], amplitude: spectrum?.amplitude ?? [] }, hums: spectrum?.lines ?? [],
      least, noiseEquivalent: least === null ? null : impulseOf(least),
      trainsBetterFrom: betterRate(found, least),
      noFire: noFire && { jumps: noFire.jumps.length, sd: noFire.sd, impulse: impulseOf(noFire.sd), overFit: byFit === 0 ? null : Math.sqrt(noFire.jumps.reduce((sum, jump, k) => sum + (jump / (byFit * noFire.units[k]!)) ** 2, 0) / noFire.jumps.length) },
    },
  };
}
