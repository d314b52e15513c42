/** Sampled traces: each shot and tap a jump of the velocity, all jumps of a record solved together, to records like any other. */
import type { Source } from '../metrology/source.ts';
import { anchor, combine, ofSource, propagate, exact, type Anchor, type Uncertain } from '../metrology/uncertain.ts';
import { cholesky } from '../numeric/linearAlgebra.ts';
import { problem, type Problem } from '../problems/problems.ts';
import { swingFromRest } from '../readings/angle.ts';
import type { CellRead } from '../readings/cellReads.ts';
import { readTrace, readTraceEvents, type TraceEvent, type TraceRead } from '../readings/traceText.ts';
import type { Choices, Trace } from '../session/session.ts';
import { fitSwing, type SwingFit, type SwingFitResult } from '../traces/swingFit.ts';
import { readQuantity } from '../units/quantity.ts';
import type { Dimension } from '../units/units.ts';
import { readingDimension } from './entries.ts';
import type { TraceTold } from './results.ts';
import type { SessionRecord } from './sheets.ts';
import type { Swing } from './shots.ts';
import type { Scale } from './swings.ts';

export interface TracesRead {
  readonly swings: readonly Swing[];
  readonly told: readonly TraceTold[];
}

/** Wider swings are not those of the linear equation that the jumps are solved with, rad: sin θ and θ part by 0.13 % there. */
const SMALL_SWING = (5 * Math.PI) / 180;
/** A step of position beyond this many u is a fault. */
const STEP_FAULT = 4;
/** Records that no one has read as such: cells that a trace has none of. */
const NO_CELLS = {
  rest: null, restAfter: null, firstSwing: null, restDown: null, firstSwingDown: null, nextSwings: [], nextSwingsDown: [], voltage: null, pressure: null, hammerIn: null, hammerRebound: null, hammerFollow: null, tapForce: null, tapDuration: null,
  weight: null, loading: null, unloading: null, swingsTime: null, cycles: 1, amplitude: null, massHung: null, massHungAt: null, maximumTime: null, swingBefore: null, timeSinceMaximum: null, problems: [], cells: [], edited: [],
} as const;

function recordOf(trace: Trace, event: TraceEvent, number: number): SessionRecord {
  const cell = (value: number, unit: string, text: string, spread: number | null = null): CellRead => ({ value, spread, decimals: 3, unit, text });
  const impulse = event.impulse === '' ? null : readQuantity(event.impulse, 'impulse', 'mN·s');
  return {
    ...NO_CELLS, id: `${trace.id}/${number}`, line: String(number), sheet: trace.id, sheetName: trace.name, kind: event.kind, kindBy: 'person', label: `${trace.name} ${number}`, note: '',
    time: cell(event.time, 's', String(event.time)), tapImpulse: impulse?.ok ? cell(impulse.value, impulse.unit.symbol, event.impulse, impulse.spread) : null,
  };
}

/** Jumps as uncertain values: noise with its covariance as independent sources, ω_n and ζ of the record common to them. */
function jumpsOf(trace: Trace, fit: SwingFit, dimension: Dimension): readonly Uncertain[] {
  const { linear, noise, colour, covariance: [ww, wz, zz], byFrequency, byRatio } = fit;
  const k = linear.jumps.length;
  if (k === 0) return [];
  const variance = noise * noise * colour;
  const block = linear.jumps.map((_, i) => linear.jumps.map((__, j) => variance * linear.inverse[linear.columnOfJump(i)]![linear.columnOfJump(j)]!));
  const factored = cholesky(block);
  const lower = factored.status === 'factored' ? factored.lower : block.map((row, i) => row.map((value, j) => (i === j ? Math.sqrt(Math.max(0, value)) : 0)));
  const unit = (id: string, label: string): Source => ({ id: `${trace.id}.${id}`, label, symbol: 'x', dimension, estimate: 0, u: 1, distribution: 'normal', dof: Infinity, family: { id: `traces.noise`, label: 'Noise of the traces' } });
  const noiseSources = Array.from({ length: k }, (_, i) => unit(`noise${i + 1}`, 'Noise of the trace'));
  // (ω, ζ) by the lower triangle of their covariance.
  const l00 = Math.sqrt(Math.max(0, ww));
  const l10 = l00 === 0 ? 0 : wz / l00;
  const l11 = Math.sqrt(Math.max(0, zz - l10 * l10));
  const shared: readonly Anchor[] = ['frequency', 'ratio'].map((name) => anchor(ofSource({ ...unit(name, 'Frequency and damping of the trace'), dimension: 'number', family: { id: 'traces.oscillation', label: 'Frequency and damping of the traces' } })));
  return linear.jumps.map((jump, i) => {
    const own = new Map<Source, number>();
    for (let j = 0; j <= i; j++) if (lower[i]![j] !== 0) own.set(noiseSources[j]!, lower[i]![j]!);
    return combine([[1, { value: jump, own, through: new Map() }], [byFrequency[i]! * l00 + byRatio[i]! * l10, shared[0]!], [byRatio[i]! * l11, shared[1]!]]);
  });
}

/** The fit rests on the samples and the times alone; an edit of the bench asks for it again. */
const FITTED = new WeakMap<object, { readonly times: string; readonly fit: SwingFitResult }>();

function fitOnce(samples: NonNullable<TraceRead['samples']>, times: readonly number[]): SwingFitResult {
  const key = times.join(' ');
  const kept = FITTED.get(samples);
  if (kept?.times === key) return kept.fit;
  const fit = fitSwing(samples, times);
  FITTED.set(samples, { times: key, fit });
  return fit;
}

export function tracesOf(traces: readonly Trace[], choices: Choices, scale: Scale | null, problems: Problem[]): TracesRead {
  const swings: Swing[] = [];
  const told: TraceTold[] = [];
  for (const trace of traces) {
    const dimension = readingDimension(choices);
    const read = readTrace(trace.name, trace.text, dimension);
    const place = { sheetName: trace.name };
    problems.push(...read.problems);
    const listed = readTraceEvents(trace.events, `trace.${trace.id}`);
    problems.push(...listed.problems);
    const [from, to] = read.samples ? [read.samples.t[0]!, read.samples.t.at(-1)!] : [0, 0];
    const all: readonly TraceEvent[] = listed.events.length > 0 ? listed.events : read.triggered.map((time) => ({ time, kind: 'shot', impulse: '', line: 0 }));
    const events = all.filter(({ time }) => time > from && time < to);
    if (read.samples && events.length < all.length) problems.push(problem('trace-events-outside', 'doubt', place, { events: all.length - events.length, from, to }));
    const fit = read.samples && fitOnce(read.samples, events.map(({ time }) => time));
    const bare = { id: trace.id, name: trace.name, samples: read.samples?.t.length ?? 0, from, to, events: events.length };
    if (!fit || fit.status !== 'fitted') {
      if (fit) problems.push(problem('trace-not-fitted', 'stops', place, { why: fit.status }));
      told.push({ ...bare, period: null, ratio: null, noise: null, colour: null, least: null });
      continue;
    }
    const T = (2 * Math.PI) / fit.frequency;
    told.push({
      ...bare, period: { value: T, u: (T * Math.sqrt(Math.max(0, fit.covariance[0]))) / fit.frequency }, ratio: { value: fit.ratio, u: Math.sqrt(Math.max(0, fit.covariance[2])) }, noise: fit.noise, colour: fit.colour,
      least: events.length === 0 ? null : Math.min(...events.map((_, k) => fit.noise * Math.sqrt(fit.colour * fit.linear.inverse[fit.linear.columnOfJump(k)]![fit.linear.columnOfJump(k)]!))),
    });
    if (!scale) continue;
    const jumps = jumpsOf(trace, fit, dimension);
    events.forEach((event, k) => swings.push(swingOfJump(recordOf(trace, event, k + 1), jumps[k]!, fit.stepsInU[k]!, scale, problems)));
  }
  return { swings, told };
}

function swingOfJump(record: SessionRecord, jump: Uncertain, stepInU: number, scale: Scale, problems: Problem[]): Swing {
  const place = { sheetName: record.sheetName, record: record.id };
  const swing: Swing = { record, configuration: record.kind === 'tap' ? 'taps' : 'shots', readings: { restFrom: null, rest: null, first: null, next: [] }, angle: null, launch: null };
  if (Math.abs(stepInU) > STEP_FAULT) problems.push(problem('trace-position-step', 'doubt', place, { time: record.time!.value, inU: stepInU }));
  try {
    const turned = propagate(swingFromRest(scale.way), { ...scale.stand, first: jump, rest: exact(0), scale: scale.scale });
    const angle = scale.sense === 1 ? turned : combine([[-1, turned]]);
    if (Math.abs(angle.value) > SMALL_SWING) problems.push(problem('trace-large-swing', 'doubt', place, { degrees: (angle.value * 180) / Math.PI }));
    return { ...swing, angle, launch: { full: angle, smallAngle: angle } };
  } catch (failure) {
    if (!(failure instanceof RangeError)) throw failure;
    problems.push(problem('record-reading-beyond-radius', 'stops', place, { reading: Math.abs(jump.value), radius: (scale.stand['readingRadius'] ?? scale.stand['screenDistance'])?.value ?? 0 }));
    return swing;
  }
}

