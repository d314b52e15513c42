/** One sampled record of a pendulum that is struck at known times: its frequency and damping, every jump, the rest line, and what noise leaves unknown of each. */
import { solveSymmetric } from '../numeric/linearAlgebra.ts';
import { ALL, freeSteps, isPlace, NONE, placeAt, Struck, type Free, type Place } from './struck.ts';
import { described } from './swingDescribed.ts';
import type { SwingModel } from './swingModel.ts';
import { likelyFrequencies } from './swingStart.ts';
import { firstAtOrAfter, productIn, squaresIn, type Column, type Oscillation, type SwingSamples } from './swingSums.ts';

export interface SwingOptions {
  /** ω_n as expected, rad/s: the search keeps within a factor 2 of it. */
  readonly near?: number;
  /** ω_n to within some per cent: no search. */
  readonly start?: Oscillation;
  /** ω_n and ζ as they are, where the record shows no swing to tell them by. */
  readonly fixed?: Oscillation;
  /** Times that one sample averages over, s. */
  readonly exposure?: number;
  /** Straight stretches of the rest line, 0 for a level one; absent: as many as the record calls for. */
  readonly stretches?: number;
  /** Event times may be moved so far, s; 0: not at all. */
  readonly refineWithin?: number;
  /** Times at which the swing begins anew, position and all: after a stretch in which it was pushed. */
  readonly anew?: readonly number[];
}

export interface SwingFit extends Oscillation {
  readonly status: 'fitted';
  /** Event times as used, s; u of those that were moved, null of the others. */
  readonly times: readonly number[];
  readonly timeU: readonly (number | null)[];
  /** Jumps of x′ over ω_n, unit of x. */
  readonly jumps: readonly number[];
  /** Covariance of (ω_n, ζ) with white noise. */
  readonly covariance: readonly [number, number, number];
  readonly byFrequency: readonly number[];
  readonly byRatio: readonly number[];
  /** Covariance of two jumps at given ω_n and ζ, with white noise; 0 beyond `neighbours`. */
  readonly noiseCovariance: (i: number, j: number) => number;
  readonly neighbours: number;
  /** Jump k as Σ w_i x_i: the weights of the samples within some periods of it. */
  readonly weightsOf: (k: number) => { readonly from: number; readonly weights: Float64Array };
  readonly model: SwingModel;
  /** 0 where a sample was left out. */
  readonly residuals: Float64Array;
  readonly sumOfSquares: number;
  readonly dof: number;
  /** sd of the residuals. */
  readonly noise: number;
  /** Steps of position at the events over their u by white noise; a swing has none. */
  readonly stepsInU: readonly number[];
}

export type SwingFitResult = SwingFit | { readonly status: 'tooFewSamples' | 'noSwing' } | { readonly status: 'notTold'; readonly segment: number };

const ROUNDS = 30;
/** Settled where the next step is this part of an u; after a step of CLOSE what is left is far less than that. */
const SETTLED = 1e-5;
const CLOSE = 1e-4;
const NEAR = 1e-2;
const PEAKS_TRIED = 6;
const START_RATIOS: readonly number[] = [0.002, 0.01, 0.04, 0.15, 0.4];
const FIRST_RATIOS: readonly number[] = [0.01, 0.15];
const PROMISING = 2;
/** The search goes on this many samples of a long record, taken evenly. */
const SEARCHED = 20_000;
/** Samples a period that the search keeps. */
const KEPT_A_PERIOD = 12;
const SEARCHED_STRETCHES = 16;
const EVENTS_SEARCHED = 10;
/** A start that leaves more than this part of the squares calls for a search over a grid of so many frequencies. */
const POORLY = 0.2;
const WELL = 0.02;
const GRID = 30;
/** Part of Σ (x − x̄)² that is lost in differences. */
const ROUNDING = 1e-10;
const LEAST_RATIO = -0.4;
const GREATEST_RATIO = 0.95;
/** Periods between knots of the rest line at the closest, and the most stretches between knots. */
const PERIODS_A_KNOT = 5;
const FINEST = 64;
const REFINING_ROUNDS = 12;
/** A swing that takes less off the sum of squares than this ratio of variances is none. */
const LEAST_RATIO_OF_VARIANCES = 12;

/** Gauss–Newton steps from a start, all linear unknowns solved exactly at each. */
function descend(struck: Struck, start: Place, stretches: number, free: Free = NONE): Place {
  let here = start;
  // Sums of squares are differences of larger sums.
  const rounding = ROUNDING * struck.deviations;
  for (let round = 0; round < ROUNDS; round++) {
    const stepped = struck.solve(here.sums, here.o, stretches, free, here.solved);
    if (stepped.status !== 'solved') return here;
    const shared = stepped.shared.length;
    const [dw, dz] = [stepped.shared[shared - 2]!, stepped.shared[shared - 1]!];
    const { variances } = stepped;
    const [ww, zz] = [variances[shared - 2]!, variances[shared - 1]!];
    const noise2 = Math.max(here.solved.sumOfSquares, rounding) / Math.max(1, struck.count - shared - struck.segments - 1);
    const inU = Math.max(Math.abs(dw) / Math.sqrt(ww * noise2), Math.abs(dz) / Math.sqrt(zz * noise2));
    if (!(inU > SETTLED)) return here;
    let next: Place | null = null;
    // So near to the end the sums of squares differ by rounding alone: the step is taken as it is.
    const isNear = inU < NEAR;
    for (let part = 1; part > 1e-3; part /= 2) {
      const o = { frequency: here.o.frequency + part * dw, ratio: Math.min(GREATEST_RATIO, Math.max(LEAST_RATIO, here.o.ratio + part * dz)) };
      if (!(o.frequency > 0)) continue;
      const tried = placeAt(struck, o, stretches, free);
      if (isPlace(tried) && (isNear || tried.solved.sumOfSquares <= here.solved.sumOfSquares + rounding)) {
        next = tried;
        break;
      }
    }
    if (!next) return here;
    here = next;
    if (inU < CLOSE) return here;
  }
  return here;
}

const upTo = ({ t, x, use }: SwingSamples, n: number): SwingSamples => ({ t: t.subarray(0, n), x: x.subarray(0, n), ...(use ? { use: use.subarray(0, n) } : {}) });

/** Every s-th sample, so that little more than `SEARCHED` are left. */
function thinned({ t, x, use }: SwingSamples, every: number): SwingSamples {
  if (every <= 1) return use ? { t, x, use } : { t, x };
  const n = Math.floor((t.length - 1) / every) + 1;
  const pick = <Kind extends Float64Array | Uint8Array>(from: Kind, into: Kind): Kind => {
    for (let i = 0; i < n; i++) into[i] = from[i * every]!;
    return into;
  };
  return { t: pick(t, new Float64Array(n)), x: pick(x, new Float64Array(n)), ...(use ? { use: pick(use, new Uint8Array(n)) } : {}) };
}

/** The frequency and damping from which all of the samples are fitted. */
function startOf(samples: SwingSamples, events: readonly number[], { near, exposure = 0, anew = [] }: SwingOptions): Oscillation | SwingFitResult {
  const { t } = samples;
  const n = t.length;
  const omegas = likelyFrequencies(samples, PEAKS_TRIED, near === undefined ? undefined : [near / 2, near * 2]);
  const spacing = (t[n - 1]! - t[0]!) / (n - 1);
  const [low, high] = near === undefined ? [(2 * Math.PI * 1.5) / (t[n - 1]! - t[0]!), Math.PI / (2 * spacing)] : [near / 2, near * 2];
  if (!(high > low)) return { status: 'noSwing' };
  const everyBySwing = Math.floor((2 * Math.PI) / (KEPT_A_PERIOD * spacing * Math.max(low, ...omegas)));
  // Frequency and damping are the same all along: the first events tell where they are.
  const many = events.length > EVENTS_SEARCHED ? firstAtOrAfter(t, events[EVENTS_SEARCHED]!, 0) : n;
  const few = thinned(upTo(samples, many), Math.max(1, Math.min(Math.floor(many / SEARCHED), everyBySwing)));
  const struck = new Struck(few, events.slice(0, EVENTS_SEARCHED), exposure, SEARCHED_STRETCHES, new Set(anew));
  const stretchesAt = (omega: number): number => Math.min(SEARCHED_STRETCHES, finestFor(few, omega));
  let best: Place | null = null;
  let failed: SwingFitResult = { status: 'noSwing' };
  const attempt = (omega: number, ratios: readonly number[] = START_RATIOS): number => {
    let least = Infinity;
    for (const ratio of ratios) {
      // The peak stands at the damped frequency.
      const tried = placeAt(struck, { frequency: omega / Math.sqrt(1 - ratio * ratio), ratio }, stretchesAt(omega));
      if (!isPlace(tried)) failed = tried;
      else {
        least = Math.min(least, tried.solved.sumOfSquares);
        if (!best || tried.solved.sumOfSquares < best.solved.sumOfSquares) best = tried;
      }
    }
    return least;
  };
  // All peaks with little and with much damping; the best of them with all.
  const promising = omegas.map((omega) => ({ omega, least: attempt(omega, FIRST_RATIOS) })).sort((one, other) => one.least - other.least);
  for (const { omega } of promising.slice(0, PROMISING)) attempt(omega, START_RATIOS.filter((ratio) => !FIRST_RATIOS.includes(ratio)));
  const found = (): Place | null => best;
  const nearest = found();
  // Evenly fired shots make lines of their own beside the swing's: from them it is a few steps.
  if (nearest && nearest.solved.sumOfSquares > WELL * struck.deviations) best = descend(struck, nearest, stretchesAt(nearest.o.frequency));
  // Where damping is strong the peaks say little: a swing may be anywhere.
  if ((found()?.solved.sumOfSquares ?? Infinity) > POORLY * struck.deviations) for (let k = 0; k <= GRID; k++) attempt(low * (high / low) ** (k / GRID));
  const start = found();
  return start ? descend(struck, start, stretchesAt(start.o.frequency)).o : failed;
}

/** Stretches of the rest line, in powers of two, by the Bayesian information criterion. Source: Schwarz, Ann. Statist. 6 (1978) 461, from memory. */
function stretchesOf(struck: Struck, place: Place): { readonly stretches: number; readonly place: Place } {
  let best = { stretches: 1, place };
  let least = Infinity;
  const rounding = ROUNDING * struck.deviations;
  for (let stretches = 1; stretches <= struck.finest; stretches *= 2) {
    const solved = stretches === 1 ? place.solved : struck.solve(place.sums, place.o, stretches, NONE, null);
    if (solved.status !== 'solved') break;
    const score = struck.count * Math.log(Math.max(solved.sumOfSquares, rounding, 1e-300)) + stretches * Math.log(struck.count);
    if (score < least) {
      least = score;
      best = { stretches, place: { ...place, solved } };
    }
  }
  return best;
}

/** Knots no closer than some periods, in a power of two. */
function finestFor(samples: SwingSamples, frequency: number): number {
  const { t } = samples;
  const periods = ((t[t.length - 1]! - t[0]!) * frequency) / (2 * Math.PI);
  let finest = 1;
  while (finest < FINEST && periods / (2 * finest) >= PERIODS_A_KNOT) finest *= 2;
  return finest;
}

/** Samples whose exposure holds an event show neither motion. */
function withoutStraddling(samples: SwingSamples, events: readonly number[], exposure: number): SwingSamples {
  if (exposure <= 0 || events.length === 0) return samples;
  const use = samples.use ? samples.use.slice() : new Uint8Array(samples.t.length).fill(1);
  for (const event of events) for (let i = firstAtOrAfter(samples.t, event - exposure / 2, 0); i < use.length && samples.t[i]! < event + exposure / 2; i++) use[i] = 0;
  return { ...samples, use };
}

/**
 * ω_n and ζ by variable projection: at each pair the rest line, the start and the jumps are solved exactly, and Gauss–Newton steps lower the sum of squares.
 *
 * Valid: viscous damping, small swings, events in order and inside the record.
 * Source: Golub & Pereyra, SIAM J. Numer. Anal. 10 (1973) 413, from memory.
 */
export function fitSwing(given: SwingSamples, strikes: readonly number[], options: SwingOptions = {}): SwingFitResult {
  const { exposure = 0, refineWithin = 0, anew = [] } = options;
  const events = anew.length === 0 ? strikes : [...strikes, ...anew].sort((a, b) => a - b);
  const samples = withoutStraddling(given, events, exposure);
  if (samples.t.length < 8 + 2 * events.length) return { status: 'tooFewSamples' };
  const start = options.fixed ?? options.start ?? startOf(samples, events, options);
  if ('status' in start) return start;
  const finest = options.stretches === undefined ? finestFor(samples, start.frequency) : Math.max(1, options.stretches);
  let struck = new Struck(samples, events, exposure, finest, new Set(anew));
  if (struck.count < 8 + 2 * events.length) return { status: 'tooFewSamples' };
  const first = placeAt(struck, start, options.stretches ?? 1);
  if (!isPlace(first)) return first;
  const began = options.stretches === undefined ? stretchesOf(struck, first) : { stretches: options.stretches, place: first };
  const { stretches } = began;
  let { place } = began;
  if (!options.fixed) {
    place = descend(struck, place, stretches);
    if (!swings(struck, place, stretches)) return { status: 'noSwing' };
  }
  let times = events;
  let timeU: readonly (number | null)[] = events.map(() => null);
  if (refineWithin > 0 && events.length > 0 && !options.fixed) {
    const refined = refine(samples, events, { struck, place, stretches }, refineWithin);
    ({ struck, place } = refined);
    times = struck.events;
    timeU = refined.timeU;
  }
  return described(struck, place, stretches, times, timeU, options.fixed !== undefined);
}

/** Whether the swing takes more off the squares than chance would. */
function swings(struck: Struck, { solved, sums }: Place, stretches: number): boolean {
  const all = struck.deviations;
  const bare = restAlone(struck, sums, stretches);
  const many = struck.segments + 3;
  const dof = Math.max(1, struck.count - many - stretches - 1);
  // A record that a straight line fits to the last digits swings by rounding alone.
  return bare > 1e-20 * all && (bare - solved.sumOfSquares) / many > (LEAST_RATIO_OF_VARIANCES * solved.sumOfSquares) / dof;
}

/** Σ r² about the rest line without any swing. */
function restAlone(struck: Struck, sums: Float64Array, stretches: number): number {
  const many = stretches + 1;
  const normal = Array.from({ length: many }, () => new Array<number>(many).fill(0));
  const right = new Array<number>(many).fill(0);
  let squares = 0;
  struck.cells.forEach((cell, c) => {
    const { at, first, second } = struck.hats(cell, stretches);
    const columns: readonly (readonly [number, Column])[] = stretches > 0 ? [[at, first], [at + 1, second]] : [[0, first]];
    for (const [i, one] of columns) {
      for (const [j, other] of columns) normal[i]![j]! += productIn(sums, c, one, other);
      right[i]! += productIn(sums, c, one, null);
    }
    squares += squaresIn(sums, c);
  });
  const solved = solveSymmetric(normal, right);
  return solved.status === 'solved' ? Math.max(0, squares - solved.x.reduce((sum, value, i) => sum + value * right[i]!, 0)) : Infinity;
}

/** Moves event times by −step/(ω_n jump), within bounds and in their order; at those that were moved the position is left free from then on. */
function refine(samples: SwingSamples, listed: readonly number[], from: { readonly struck: Struck; readonly place: Place; readonly stretches: number }, within: number): { readonly struck: Struck; readonly place: Place; readonly timeU: readonly (number | null)[] } {
  let { struck, place } = from;
  let timeU: readonly (number | null)[] = listed.map(() => null);
  for (let round = 0; round < REFINING_ROUNDS; round++) {
    // Wrong times bend frequency and damping where the position is held together.
    place = descend(struck, place, from.stretches, ALL);
    const steps = freeSteps(struck, place, from.stretches);
    if (!steps) break;
    const u = steps.u.map((unit, k) => Math.abs((steps.noise * unit) / (place.o.frequency * steps.jump[k]!)));
    // A time that the record tells no better than its bounds stays as listed.
    const moved = struck.events.map((time, k) => (u[k]! < within && !struck.isAnew[k] ? Math.min(listed[k]! + within, Math.max(listed[k]! - within, time - steps.step[k]! / (place.o.frequency * steps.jump[k]!))) : listed[k]!));
    if (!moved.every((time, k) => (k === 0 || time > moved[k - 1]!) && time > samples.t[0]! && time < samples.t[samples.t.length - 1]!)) break;
    const next = new Struck(withoutStraddling(samples, moved, struck.exposure), moved, struck.exposure, struck.finest, struck.anew);
    const tried = placeAt(next, place.o, from.stretches, ALL);
    if (!isPlace(tried)) break;
    const largest = Math.max(...moved.map((time, k) => Math.abs(time - struck.events[k]!)));
    [struck, place] = [next, tried];
    timeU = Array.from(u, (value, k) => (value < within && !struck.isAnew[k] ? value : null));
    if (largest < 1e-4 * Math.min(...u)) break;
  }
  const free: Free = (k) => timeU[k] !== null;
  const held = placeAt(struck, place.o, from.stretches, free);
  return { struck, place: isPlace(held) ? descend(struck, held, from.stretches, free) : place, timeU };
}
