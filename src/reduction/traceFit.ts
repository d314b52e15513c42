/** The fit of one trace: its shots found or brought on to its clock, its swing, and how far its noise is from white. */
import { problem, type Place, type Problem } from '../problems/problems.ts';
import type { TimedTrain, TraceEvent } from '../readings/traceEvents.ts';
import type { Trace } from '../session/session.ts';
import { clockOffset } from '../traces/clockOffset.ts';
import { maskOf } from '../traces/faults.ts';
import { whiteFactor } from '../traces/fittedAway.ts';
import { findJumps } from '../traces/findShots.ts';
import { binned, everyFor, liveliest } from '../traces/binned.ts';
import { noiseCorrelation, varianceFactor, type NoiseCorrelation } from '../traces/noiseColour.ts';
import { noFireJumps, type NoFire } from '../traces/noFire.ts';
import { fitSwing, type SwingFit, type SwingFitResult } from '../traces/swingFit.ts';
import { likelyFrequencies } from '../traces/swingStart.ts';
import { ripple, steadyDeflection, type SteadyDeflection } from '../traces/steadyTrain.ts';
import { firstAtOrAfter, type Oscillation, type SwingSamples } from '../traces/swingSums.ts';
import type { TraceRead } from './traceRead.ts';
import type { Stretch, TraceTold } from './traceResults.ts';

/** A shot of a trace: when it was listed to be, on the record's clock. */
export interface TimedEvent extends TraceEvent {
  readonly listed: number;
}

export interface TraceFit {
  /** As the record has them, and the means of some that the fit is made of in a long one. */
  readonly samples: SwingSamples;
  readonly every: number;
  readonly events: readonly TimedEvent[];
  readonly stretches: readonly Stretch[];
  readonly offset: TraceTold['offset'];
  readonly fit: SwingFit;
  /** By how much the residuals' correlation widens the variance of each jump, and of frequency and damping. */
  readonly factors: readonly number[];
  readonly factorOfSwing: number;
  /** What the same fit makes of the record where nothing was fired. */
  readonly noFire: NoFire | null;
  readonly trains: readonly TrainFit[];
  /** A train that is none, in the longest quiet stretch: what its deflection would be known to. */
  readonly quietTrain: { readonly seconds: number; readonly u: number } | null;
}

export interface TrainFit {
  readonly train: TimedTrain;
  readonly steady: SteadyDeflection;
}

export interface TraceFitted {
  /** null where no swing could be fitted. */
  readonly found: TraceFit | null;
  readonly stretches: readonly Stretch[];
  readonly events: readonly TimedEvent[];
  readonly offset: TraceTold['offset'];
  readonly problems: readonly Problem[];
}

/** What the bench says of the swing: for records that show none, or something else more strongly. */
export type Expected = Oscillation | null;

/** A frequency off the expected one by more than this factor is something else's. */
const FAR = 2;
/** First guess of the damping where shots are to be found. */
const SOME_DAMPING = 0.01;
const FINDING_ROUNDS = 2;
/** Pulses that leave more of their own than this part of the deflection are no steady push. */
const RIPPLES = 0.2;
/** Periods beside a train in which a found jump is the train's own. */
const BESIDE_TRAIN = 0.5;
/** Least periods of a train that is thought of. */
const QUIET_PERIODS = 3;
/** A found jump of fewer u is none. */
const CLEAR = 4;
/** Part of a period by which listed and found times may differ, and by which found ones are moved by the fit. */
const TOLERANCE = 1 / 8;
/** Jumps whose own correlation factor is worked out; those between take that of the nearest. */
const FACTORS = 16;
/** Periods over which the residuals' correlation is followed, and samples at the most. */
const CORRELATED_PERIODS = 4;
const MOST_LAGS = 20_000;

const FITTED = new WeakMap<TraceRead, { readonly key: string; readonly fitted: TraceFitted }>();

/** The fit rests on the trace alone, and on the bench only where the trace shows no swing of its own: an edit of the bench finds it ready. */
export function fitTrace(trace: Trace, read: TraceRead, expected: Expected): TraceFitted {
  const key = expected ? `${expected.frequency.toPrecision(3)} ${expected.ratio.toPrecision(2)}` : '';
  const kept = FITTED.get(read);
  if (kept && (kept.key === key || !leansOnBench(kept.fitted, expected))) return kept.fitted;
  const fitted = fitAfresh(trace, read, expected);
  FITTED.set(read, { key, fitted });
  return fitted;
}

const isFar = (frequency: number, expected: Expected): boolean => expected !== null && Math.abs(Math.log(frequency / expected.frequency)) > Math.log(FAR);

function leansOnBench({ found }: TraceFitted, expected: Expected): boolean {
  return !found || found.fit.covariance[0] === 0 || isFar(found.fit.frequency, expected);
}

function fitAfresh(trace: Trace, read: TraceRead, expected: Expected): TraceFitted {
  const none: TraceFitted = { found: null, stretches: read.stretches, events: [], offset: null, problems: [] };
  if (!read.samples) return none;
  const { t, x } = read.samples;
  const place: Place = { sheetName: trace.name };
  const problems: Problem[] = [];
  const trains = read.trains.map(({ from, to, ...train }) => ({ ...train, from: Math.max(from, t[0]!), to: Math.min(to, t[t.length - 1]!) })).filter(({ from, to }) => to > from);
  const pushed = trains.map(({ from, to }): Stretch => ({ from, to, why: 'train' }));
  const good = maskOf(t, read.stretches.filter(({ why }) => why !== 'gap'));
  const use = maskOf(t, [...read.stretches.filter(({ why }) => why !== 'gap'), ...pushed]);
  const bare: SwingSamples = { t, x, use };
  const anew = trains.map(({ to }) => to).filter((to) => to < t[t.length - 1]!);
  const timed = timedEvents(trace, read, bare, expected, trains, place, problems);
  const inside = timed.events.filter(({ time }) => time > t[0]! && time < t[t.length - 1]! && !anew.includes(time));
  if (inside.length < timed.events.length) problems.push(problem('trace-events-outside', 'doubt', place, { events: timed.events.length - inside.length, from: t[0]!, to: t[t.length - 1]! }));
  const blanks = read.blank > 0 ? inside.map(({ time }): Stretch => ({ from: time, to: time + read.blank, why: 'blanked' })) : [];
  if (blanks.length > 0) {
    const off = maskOf(t, blanks);
    for (let i = 0; i < use.length; i++) if (off[i] === 0) use[i] = 0;
  }
  const listed = apart(inside, bare, place, problems);
  if (trace.eventsFrom === 'list' && read.events.length === 0) {
    const unlisted = jumpsOf(bare, expected, anew).length;
    if (unlisted > 0) problems.push(problem('trace-jumps-unlisted', 'doubt', place, { jumps: unlisted }));
  }
  const stretches = [...read.stretches, ...blanks, ...pushed].sort((a, b) => a.from - b.from);
  const { few, every, exposure } = meansOf(bare, read.exposure, expected);
  const asked: Asked = { exposure, refine: read.refine, anew };
  const { events, fit } = trace.eventsFrom === 'found' ? clearJumps(listed, few, asked, expected) : { events: listed, fit: fitWithBench(few, listed.map(({ time }) => time), asked, false, expected) };
  const told = { stretches, events, offset: timed.offset };
  if (trace.eventsFrom === 'found') problems.push(problem('trace-jumps-found', 'note', place, { jumps: events.length }));
  if (fit.status !== 'fitted') {
    const from = fit.status === 'notTold' ? (events[fit.segment - 1]?.time ?? t[0]!) : 0;
    problems.push(problem('trace-not-fitted', 'stops', place, { why: fit.status, from }));
    return { ...none, ...told, problems };
  }
  if (fit.covariance[0] === 0) problems.push(problem('trace-swing-from-bench', 'note', place, {}));
  const moved = fit.times.map((time, k) => Math.abs(time - events[k]!.time)).filter((by, k) => fit.timeU[k] !== null && by > 0);
  if (moved.length > 0 && trace.eventsFrom !== 'found') problems.push(problem('trace-times-moved', 'note', place, { times: moved.length, most: Math.max(...moved) }));
  const swing: Oscillation = { frequency: fit.frequency, ratio: fit.ratio };
  const quiet = between(t, [...fit.times, ...trains.map(({ from }) => from)].sort((a, b) => a - b), read.blank).map((one) => ({ ...one, from: Math.max(one.from, ...trains.filter(({ from, to }) => from <= one.from && to > one.from).map(({ to }) => to)) })).filter(({ from, to }) => to > from);
  const noFire = noFireJumps(few, swing, quiet, exposure);
  const whole = every === 1 ? { t, x, use: good } : binned({ t, x, use: good }, every).samples;
  const trainFits = trains.flatMap((train): TrainFit[] => {
    const steady = steadyDeflection(whole, swing, { on: train.from, off: train.to }, aboutTrain(t, train, [...fit.times, ...trains.flatMap(({ from, to }) => [from, to])]));
    if (!steady) problems.push(problem('trace-train-not-fitted', 'stops', place, { from: train.from, to: train.to }));
    else if (ripple(train.rate, swing) > RIPPLES) problems.push(problem('trace-train-slow', 'doubt', place, { rate: train.rate, percent: 100 * ripple(train.rate, swing) }));
    return steady ? [{ train, steady }] : [];
  });
  return { ...told, problems, found: { samples: bare, every, ...told, fit, ...factorsOf(fit, few), noFire, trains: trainFits, quietTrain: trainInQuiet(few, swing, quiet) } };
}

/** What a fit is asked for beside the samples: the time that each averages over, and how far times may be moved; s. */
interface Asked {
  readonly exposure: number;
  readonly refine: number;
  /** Where the swing begins anew, after a train. */
  readonly anew: readonly number[];
}

/** The record as the fit takes it: a long one by means of some samples, as many as the swing that is expected, or stands out, allows. */
function meansOf(samples: SwingSamples, exposure: number, expected: Expected): { readonly few: SwingSamples; readonly every: number; readonly exposure: number } {
  if (everyFor(samples, 0) === 1) return { few: samples, every: 1, exposure };
  const every = everyFor(samples, FAR * (expected?.frequency ?? likelyFrequencies(liveliest(samples), 1)[0] ?? Infinity));
  if (every === 1) return { few: samples, every, exposure };
  const made = binned(samples, every);
  return { few: made.samples, every, exposure: Math.hypot(exposure, made.blur) };
}

/** From the strike or train before a train to the one after it. */
function aboutTrain(t: Float64Array, { from, to }: TimedTrain, times: readonly number[]): readonly [number, number] {
  return [Math.max(t[0]!, ...times.filter((time) => time < from)), Math.min(t[t.length - 1]!, ...times.filter((time) => time > to))];
}

/** What a train in the middle third of the longest quiet stretch would be known to; null where that is short. */
function trainInQuiet(samples: SwingSamples, swing: Oscillation, quiet: readonly { readonly from: number; readonly to: number }[]): TraceFit['quietTrain'] {
  const longest = [...quiet].sort((a, b) => b.to - b.from - (a.to - a.from))[0];
  const third = longest ? (longest.to - longest.from) / 3 : 0;
  if (!longest || third * swing.frequency < QUIET_PERIODS * 2 * Math.PI) return null;
  const steady = steadyDeflection(samples, swing, { on: longest.from + third, off: longest.to - third }, [longest.from, longest.to]);
  return steady && { seconds: third, u: steady.u };
}

/** The stretches between the events. */
function between(t: Float64Array, times: readonly number[], blank: number): readonly { readonly from: number; readonly to: number }[] {
  return [t[0]!, ...times].map((from, k) => ({ from: k === 0 ? from : from + blank, to: times[k] ?? t[t.length - 1]! }));
}

/** The found jumps that stand clear of the noise when all are solved together; what does not, a gap or a sway made. */
function clearJumps(found: readonly TimedEvent[], samples: SwingSamples, asked: Asked, expected: Expected): { readonly events: readonly TimedEvent[]; readonly fit: SwingFitResult } {
  let events = found;
  for (;;) {
    const fit = fitWithBench(samples, events.map(({ time }) => time), asked, true, expected);
    if (fit.status !== 'fitted') return { events, fit };
    const { factors } = factorsOf(fit, samples);
    const clear = events.filter((_, k) => Math.abs(fit.jumps[k]!) > CLEAR * fit.noise * Math.sqrt(factors[k]! * fit.noiseCovariance(k, k)));
    if (clear.length === events.length) return { events, fit };
    events = clear;
  }
}

/** Fitted by itself; where it shows no swing, or one far from the bench's, with what the bench says. */
function fitWithBench(samples: SwingSamples, times: readonly number[], { exposure, refine, anew }: Asked, found: boolean, expected: Expected): SwingFitResult {
  const options = { exposure, refineWithin: refine, anew };
  const own = fitSwing(samples, times, options);
  const settled = own.status === 'fitted' && found && refine === 0 ? fitSwing(samples, times, { exposure, anew, start: { frequency: own.frequency, ratio: own.ratio }, refineWithin: (TOLERANCE * 2 * Math.PI) / own.frequency }) : own;
  if (!expected || (settled.status === 'fitted' && !isFar(settled.frequency, expected))) return settled;
  const near = fitSwing(samples, times, { ...options, near: expected.frequency });
  if (near.status === 'fitted') return near;
  const fixed = fitSwing(samples, times, { exposure, anew, fixed: expected });
  return fixed.status === 'fitted' ? fixed : settled;
}

/** The events on the record's clock: as listed and moved by the offset, or as found. */
function timedEvents(trace: Trace, read: TraceRead, samples: SwingSamples, expected: Expected, trains: readonly TimedTrain[], place: Place, problems: Problem[]): { readonly events: readonly TimedEvent[]; readonly offset: TraceTold['offset'] } {
  if (trace.eventsFrom === 'found') {
    const anew = trains.map(({ to }) => to);
    const jumps = jumpsOf(samples, expected, anew).filter((time) => trains.every(({ from, to }) => time < from - BESIDE_TRAIN * periodOf(samples, expected) || time > to + BESIDE_TRAIN * periodOf(samples, expected)));
    return { events: jumps.map((time, i) => ({ id: `found${i + 1}`, time, listed: time, kind: 'shot', impulse: '' })), offset: null };
  }
  if (read.offset !== null || trace.eventsFrom === 'trigger') {
    const offset = trace.eventsFrom === 'trigger' ? 0 : (read.offset ?? 0);
    return { events: read.events.map((event) => ({ ...event, time: event.time + offset, listed: event.time + offset })), offset: offset === 0 ? null : { value: offset, u: null, found: false } };
  }
  const period = periodOf(samples, expected);
  const result = clockOffset(read.events.map(({ time }) => time), jumpsOf(samples, expected), TOLERANCE * period);
  if (result.status !== 'found') {
    problems.push(problem('trace-offset-open', 'doubt', place, { why: result.status, one: result.status === 'ambiguous' ? result.offsets[0]! : 0, other: result.status === 'ambiguous' ? result.offsets[1]! : 0 }));
    return { events: read.events.map((event) => ({ ...event, listed: event.time })), offset: null };
  }
  problems.push(problem('trace-offset-found', 'note', place, { offset: result.offset, u: result.u, matched: result.matched, listed: read.events.length }));
  const span = samples.t[samples.t.length - 1]! - samples.t[0]!;
  const { drift } = result;
  if (drift && Math.abs(drift.value) > 4 * drift.u && Math.abs(drift.value) * span > 0.02 * period) problems.push(problem('trace-clock-drifts', 'doubt', place, { perMillion: 1e6 * drift.value, over: Math.abs(drift.value) * span }));
  return { events: read.events.map((event) => ({ ...event, time: event.time + result.offset, listed: event.time + result.offset })), offset: { value: result.offset, u: result.u, found: true } };
}

const periodOf = (samples: SwingSamples, expected: Expected): number => (2 * Math.PI) / (expected?.frequency ?? likelyFrequencies(samples, 1)[0] ?? Infinity);

/** Times of the jumps of a swing that nobody listed: found roughly, then with the frequency and damping that they tell. */
function jumpsOf(all: SwingSamples, expected: Expected, anew: readonly number[] = []): readonly number[] {
  const { few: samples, exposure } = meansOf(all, 0, expected);
  let swing: Oscillation | null = expected;
  if (!swing) {
    const [frequency] = likelyFrequencies(samples, 1);
    if (frequency === undefined) return [];
    swing = { frequency, ratio: SOME_DAMPING };
  }
  let times: readonly number[] = [];
  for (let round = 0; round < FINDING_ROUNDS; round++) {
    times = findJumps(samples, swing).map(({ time }) => time);
    const fit = fitSwing(samples, times, { exposure, anew });
    if (fit.status !== 'fitted' || isFar(fit.frequency, expected)) break;
    swing = { frequency: fit.frequency, ratio: Math.max(0, fit.ratio) };
  }
  return times;
}

/** Events with a sample in use between each and the next; of two without, the first. */
function apart(events: readonly TimedEvent[], { t, use }: SwingSamples, place: Place, problems: Problem[]): readonly TimedEvent[] {
  const kept: TimedEvent[] = [];
  for (const event of [...events].sort((a, b) => a.time - b.time)) {
    const last = kept.at(-1);
    let between = last === undefined;
    if (last) for (let i = firstAtOrAfter(t, last.time, 0); i < t.length && t[i]! < event.time && !between; i++) between = use?.[i] !== 0;
    if (between) kept.push(event);
    else problems.push(problem('trace-too-close', 'doubt', place, { time: last!.time }));
  }
  return kept;
}

function factorsOf(fit: SwingFit, samples: SwingSamples): Pick<TraceFit, 'factors' | 'factorOfSwing'> {
  const { t, use } = samples;
  const spacing = (t[t.length - 1]! - t[0]!) / (t.length - 1);
  const lags = Math.min(MOST_LAGS, Math.ceil((CORRELATED_PERIODS * 2 * Math.PI) / (fit.frequency * spacing)));
  const correlation = noiseCorrelation(fit.residuals, use, lags);
  const kept = whiteFactor(fit, samples, (lags * spacing * fit.frequency) / (2 * Math.PI));
  const n = fit.jumps.length;
  const every = Math.max(1, Math.ceil(n / FACTORS));
  const worked = new Map<number, number>();
  for (let k = 0; k < n; k += every) worked.set(k, varianceFactor(correlation, fit.weightsOf(k).weights, kept));
  const factors = fit.jumps.map((_, k) => worked.get(every * Math.floor(k / every))!);
  return { factors, factorOfSwing: n > 0 ? [...factors].sort((a, b) => a - b)[n >> 1]! : swingFactor(correlation, fit, spacing, kept) };
}

/** Without a jump: the factor of a free swing of some periods. */
function swingFactor(correlation: NoiseCorrelation, { frequency, ratio }: SwingFit, spacing: number, kept: number): number {
  const n = correlation.correlation.length;
  return varianceFactor(correlation, Float64Array.from({ length: n }, (_, i) => Math.exp(-Math.max(0, ratio) * frequency * i * spacing) * Math.sin(frequency * i * spacing)), kept);
}
