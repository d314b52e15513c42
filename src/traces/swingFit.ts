/** One sampled record of a pendulum that is struck at known times: its frequency and damping, every jump, the rest line, and what noise leaves unknown of each. */
import { solveSymmetric } from '../numeric/linearAlgebra.ts';
import { solveChain, type ChainCovariances, type ChainSolved, type JointValue, type Link } from '../numeric/struckChain.ts';
import type { SwingModel } from './swingModel.ts';
import { likelyFrequencies } from './swingStart.ts';
import { cellsOf, evenBlocks, firstAtOrAfter, motionColumns, motionOver, productIn, slopeColumns, squaresIn, swingSums, exposureFactor, type Cell, type Column, type Oscillation, type SwingSamples } from './swingSums.ts';

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
/** Settled where the next step is this part of an u. */
const SETTLED = 1e-5;
const PEAKS_TRIED = 6;
const START_RATIOS = [0.002, 0.01, 0.04, 0.15, 0.4] as const;
/** The search goes on this many samples of a long record, taken evenly. */
const SEARCHED = 20_000;
/** Samples a period that the search keeps. */
const KEPT_A_PERIOD = 12;
const SEARCHED_STRETCHES = 16;
const EVENTS_SEARCHED = 25;
/** A start that leaves more than this part of the squares calls for a search over a grid of so many frequencies. */
const POORLY = 0.2;
const GRID = 30;
/** Part of Σ (x − x̄)² that is lost in differences. */
const ROUNDING = 1e-13;
const LEAST_RATIO = -0.4;
const GREATEST_RATIO = 0.95;
/** Periods between knots of the rest line at the closest, and the most stretches between knots. */
const PERIODS_A_KNOT = 5;
const FINEST = 64;
/** Jumps further apart in order than this share noise through the rest line alone, which is little. */
const NEIGHBOURS = 40;
/** Periods about an event in which its weights are given. */
const PERIODS_OF_WEIGHTS = 12;
const REFINING_ROUNDS = 12;
/** A swing that takes less off the sum of squares than this ratio of variances is none. */
const LEAST_RATIO_OF_VARIANCES = 12;

/** The record with its events: what stays the same whatever the frequency. */
class Struck {
  readonly samples: SwingSamples;
  readonly events: readonly number[];
  readonly cells: readonly Cell[];
  readonly even: Uint8Array;
  readonly base: number;
  readonly exposure: number;
  /** Stretches between the finest knots. */
  readonly finest: number;
  readonly count: number;
  readonly firstCell: Int32Array;
  /** Σ (x − x̄)² of the samples in use. */
  readonly deviations: number;

  constructor(samples: SwingSamples, events: readonly number[], exposure: number, finest: number) {
    this.samples = samples;
    this.events = events;
    this.exposure = exposure;
    this.finest = finest;
    const { t, x, use } = samples;
    const [from, span] = [t[0]!, t[t.length - 1]! - t[0]!];
    this.cells = cellsOf(samples, events, Array.from({ length: finest + 1 }, (_, j) => from + (span * j) / finest));
    this.even = evenBlocks(samples, this.cells);
    let [count, sum] = [0, 0];
    for (let i = 0; i < x.length; i++) if (!use || use[i] !== 0) {
      count += 1;
      sum += x[i]!;
    }
    this.count = count;
    this.base = count > 0 ? sum / count : 0;
    let squares = 0;
    for (let i = 0; i < x.length; i++) if (!use || use[i] !== 0) squares += (x[i]! - this.base) ** 2;
    this.deviations = squares;
    this.firstCell = new Int32Array(events.length + 2).fill(this.cells.length);
    for (let c = this.cells.length - 1; c >= 0; c--) this.firstCell[this.cells[c]!.segment] = c;
    for (let k = events.length; k >= 0; k--) if (this.firstCell[k] === this.cells.length || this.firstCell[k]! > this.firstCell[k + 1]!) this.firstCell[k] = this.firstCell[k + 1]!;
  }

  get segments(): number {
    return this.events.length + 1;
  }

  begins(k: number): number {
    return k === 0 ? this.samples.t[0]! : this.events[k - 1]!;
  }

  sums(o: Oscillation): Float64Array {
    return swingSums(this.samples, this.cells, this.even, o, this.base, this.exposure);
  }

  /** Hats of the two knots about a cell, with `stretches` of the rest line (a part of `finest`). */
  hats(cell: Cell, stretches: number): { readonly at: number; readonly first: Column; readonly second: Column } {
    if (stretches === 0) return { at: 0, first: [0, 0, 0, 0, 1, 0], second: [0, 0, 0, 0, 0, 0] };
    const each = this.finest / stretches;
    const at = Math.floor(cell.knot / each);
    const into = cell.knot / each - at;
    return { at, first: [0, 0, 0, 0, 1 - into, -1 / each], second: [0, 0, 0, 0, into, 1 / each] };
  }

  links(o: Oscillation, free: Free, slopes: Slopes | null, shared: number): readonly (Link | null)[] {
    return this.events.map((_, k): Link | null => {
      if (free(k)) return null;
      const m = motionOver(this.begins(k + 1) - this.begins(k), o);
      if (!slopes) return { a: m.pp, b: m.pv, drive: [] };
      const [byFrequency, byRatio] = m.slopes(slopes.positions[k]!, slopes.velocities[k]!).position;
      return { a: m.pp, b: m.pv, drive: [[shared - 2, byFrequency], [shared - 1, byRatio]] };
    });
  }

  /** Everything at (ω, ζ): states, jumps and rest line, and with `slopes` the step that lowers the sum of squares. */
  solve(sums: Float64Array, o: Oscillation, stretches: number, free: Free, slopes: Slopes | null): ReturnType<typeof solveChain> {
    const knots = stretches + 1;
    const shared = knots + (slopes ? 2 : 0);
    const n = shared + 3;
    const last = n - 1;
    const { p, v } = motionColumns(o);
    return solveChain(this.segments, shared, this.links(o, free, slopes, shared), (k, form) => {
      for (let c = this.firstCell[k]!; c < this.firstCell[k + 1]! && this.cells[c]!.segment === k; c++) {
        const { at, first, second } = this.hats(this.cells[c]!, stretches);
        const columns: (readonly [number, Column])[] = [[0, p], [1, v], [2 + at, first]];
        if (stretches > 0) columns.push([3 + at, second]);
        if (slopes) {
          const by = slopeColumns(o, slopes.positions[k]!, slopes.velocities[k]!);
          columns.push([shared, by.frequency], [shared + 1, by.ratio]);
        }
        for (const [i, [row, one]] of columns.entries()) {
          for (const [column, other] of columns.slice(i)) form[Math.min(row, column) * n + Math.max(row, column)]! += productIn(sums, c, one, other);
          form[row * n + last]! += productIn(sums, c, one, null);
        }
        form[last * n + last]! += squaresIn(sums, c);
      }
    });
  }
}

/** Whether the position may step at an event. */
type Free = (event: number) => boolean;
const NONE: Free = () => false;
const ALL: Free = () => true;

interface Slopes {
  readonly positions: Float64Array;
  readonly velocities: Float64Array;
}

interface Place {
  readonly o: Oscillation;
  readonly sums: Float64Array;
  readonly solved: ChainSolved;
}

function placeAt(struck: Struck, o: Oscillation, stretches: number, free: Free = NONE): Place | { readonly status: 'notTold'; readonly segment: number } {
  const sums = struck.sums(o);
  const solved = struck.solve(sums, o, stretches, free, null);
  return solved.status === 'solved' ? { o, sums, solved } : solved;
}

const isPlace = (found: Place | { readonly status: 'notTold' }): found is Place => 'o' in found;

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
    const [ww, zz] = [stepped.variances[shared - 2]!, stepped.variances[shared - 1]!];
    const noise2 = Math.max(here.solved.sumOfSquares, rounding) / Math.max(1, struck.count - shared - struck.segments - 1);
    if (dw * dw <= SETTLED ** 2 * ww * noise2 && dz * dz <= SETTLED ** 2 * zz * noise2) return here;
    let next: Place | null = null;
    for (let part = 1; part > 1e-3; part /= 2) {
      const o = { frequency: here.o.frequency + part * dw, ratio: Math.min(GREATEST_RATIO, Math.max(LEAST_RATIO, here.o.ratio + part * dz)) };
      if (!(o.frequency > 0)) continue;
      const tried = placeAt(struck, o, stretches, free);
      if (isPlace(tried) && tried.solved.sumOfSquares <= here.solved.sumOfSquares + rounding) {
        next = tried;
        break;
      }
    }
    if (!next) return here;
    here = next;
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
function startOf(samples: SwingSamples, events: readonly number[], { near, exposure = 0 }: SwingOptions): Oscillation | SwingFitResult {
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
  const struck = new Struck(few, events.slice(0, EVENTS_SEARCHED), exposure, SEARCHED_STRETCHES);
  const stretchesAt = (omega: number): number => Math.min(SEARCHED_STRETCHES, finestFor(few, omega));
  let best: Place | null = null;
  let failed: SwingFitResult = { status: 'noSwing' };
  const attempt = (omega: number): void => {
    for (const ratio of START_RATIOS) {
      // The peak stands at the damped frequency.
      const tried = placeAt(struck, { frequency: omega / Math.sqrt(1 - ratio * ratio), ratio }, stretchesAt(omega));
      if (!isPlace(tried)) failed = tried;
      else if (!best || tried.solved.sumOfSquares < best.solved.sumOfSquares) best = tried;
    }
  };
  for (const omega of omegas) attempt(omega);
  // Where damping is strong the peaks say little: a swing may be anywhere.
  const found = (): Place | null => best;
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
export function fitSwing(given: SwingSamples, events: readonly number[], options: SwingOptions = {}): SwingFitResult {
  const { exposure = 0, refineWithin = 0 } = options;
  const samples = withoutStraddling(given, events, exposure);
  if (samples.t.length < 8 + 2 * events.length) return { status: 'tooFewSamples' };
  const start = options.fixed ?? options.start ?? startOf(samples, events, options);
  if ('status' in start) return start;
  const finest = options.stretches === undefined ? finestFor(samples, start.frequency) : Math.max(1, options.stretches);
  let struck = new Struck(samples, events, exposure, finest);
  if (struck.count < 8 + 2 * events.length) return { status: 'tooFewSamples' };
  const first = placeAt(struck, start, options.stretches ?? 1);
  if (!isPlace(first)) return first;
  let { stretches, place } = options.stretches === undefined ? stretchesOf(struck, first) : { stretches: options.stretches, place: first };
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

/** Position step and jump of velocity at each event with both left free, and their u with unit noise. */
function freeSteps(struck: Struck, { sums, o }: Place, stretches: number): { readonly step: Float64Array; readonly jump: Float64Array; readonly u: Float64Array; readonly noise: number } | null {
  const free = struck.solve(sums, o, stretches, ALL, null);
  if (free.status !== 'solved') return null;
  const covariances = free.covariances();
  const many = struck.events.length;
  const [step, jump, u] = [new Float64Array(many), new Float64Array(many), new Float64Array(many)];
  for (let k = 0; k < many; k++) {
    const m = motionOver(struck.begins(k + 1) - struck.begins(k), o);
    const [p, v] = [free.positions[k]!, free.velocities[k]!];
    step[k] = free.positions[k + 1]! - (m.pp * p + m.pv * v);
    jump[k] = free.velocities[k + 1]! - (m.vp * p + m.vv * v);
    u[k] = Math.sqrt(Math.max(0, covariances.ofJoint(k, { nextPosition: 1, nextVelocity: 0, position: -m.pp, velocity: -m.pv, shared: [] })));
  }
  const dof = struck.count - 2 * struck.segments - (stretches + 1) - 2;
  return { step, jump, u, noise: dof > 0 ? Math.sqrt(free.sumOfSquares / dof) : 0 };
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
    const moved = struck.events.map((time, k) => (u[k]! < within ? Math.min(listed[k]! + within, Math.max(listed[k]! - within, time - steps.step[k]! / (place.o.frequency * steps.jump[k]!))) : listed[k]!));
    if (!moved.every((time, k) => (k === 0 || time > moved[k - 1]!) && time > samples.t[0]! && time < samples.t[samples.t.length - 1]!)) break;
    const next = new Struck(withoutStraddling(samples, moved, struck.exposure), moved, struck.exposure, struck.finest);
    const tried = placeAt(next, place.o, from.stretches, ALL);
    if (!isPlace(tried)) break;
    const largest = Math.max(...moved.map((time, k) => Math.abs(time - struck.events[k]!)));
    [struck, place] = [next, tried];
    timeU = Array.from(u, (value) => (value < within ? value : null));
    if (largest < 1e-4 * Math.min(...u)) break;
  }
  const free: Free = (k) => timeU[k] !== null;
  const held = placeAt(struck, place.o, from.stretches, free);
  return { struck, place: isPlace(held) ? descend(struck, held, from.stretches, free) : place, timeU };
}

function described(struck: Struck, place: Place, stretches: number, times: readonly number[], timeU: readonly (number | null)[], isFixed: boolean): SwingFitResult {
  const { o, sums, solved } = place;
  const joint = struck.solve(sums, o, stretches, (k) => timeU[k] !== null, isFixed ? null : solved);
  if (joint.status !== 'solved') return joint;
  const covariances = joint.covariances();
  const [iw, iz] = [stretches + 1, stretches + 2];
  const S = covariances.shared;
  const [ww, wz, zz] = isFixed ? [0, 0, 0] : [S[iw]![iw]!, S[iw]![iz]!, S[iz]![iz]!];
  const det = ww * zz - wz * wz;
  const jointAt = (k: number): JointValue => {
    const m = motionOver(struck.begins(k + 1) - struck.begins(k), o);
    const [byFrequency, byRatio] = m.slopes(solved.positions[k]!, solved.velocities[k]!).velocity;
    return { nextPosition: 0, nextVelocity: 1, position: -m.vp, velocity: -m.vv, shared: isFixed ? [] : [[iw, -byFrequency], [iz, -byRatio]] };
  };
  const many = struck.events.length;
  const values = struck.events.map((_, k) => jointAt(k));
  const jumps = values.map((value, k) => solved.velocities[k + 1]! + value.position * solved.positions[k]! + value.velocity * solved.velocities[k]!);
  const withShared = values.map((value, k) => covariances.withShared(k, value));
  const by = withShared.map((row) => isFixed ? ([0, 0] as const) : [(row[iw]! * zz - row[iz]! * wz) / det, (row[iz]! * ww - row[iw]! * wz) / det] as const);
  const neighbours = Math.min(NEIGHBOURS, Math.max(0, many - 1));
  const rows = values.map((value, k) => {
    const earlier = covariances.withEarlier(k, value, (j) => values[j]!, neighbours);
    return Float64Array.from({ length: earlier.length + 1 }, (_, d) => (d === 0 ? covariances.ofJoint(k, value) : earlier[d - 1]!) - (isFixed ? 0 : by[k]![0] * withShared[k - d]![iw]! + by[k]![1] * withShared[k - d]![iz]!));
  });
  const model = modelOf(struck, place, stretches);
  const { residuals, sumOfSquares } = residualsOf(struck, place, stretches);
  const dof = struck.count - many - 2 - (stretches + 1) - 2;
  const steps = freeSteps(struck, place, stretches);
  return {
    ...o, status: 'fitted', times, timeU, jumps, covariance: [ww, wz, zz], byFrequency: by.map(([w]) => w), byRatio: by.map(([, z]) => z), neighbours,
    noiseCovariance: (i, j) => rows[Math.max(i, j)]![Math.abs(i - j)] ?? 0,
    weightsOf: (k) => weightsAt(struck, place, stretches, covariances, values[k]!, k),
    model, residuals, sumOfSquares, dof, noise: Math.sqrt(sumOfSquares / Math.max(1, dof)),
    stepsInU: struck.events.map((_, k) => (steps && steps.noise > 0 && steps.u[k]! > 0 ? steps.step[k]! / (steps.noise * steps.u[k]!) : 0)),
  };
}

function modelOf(struck: Struck, { o, solved }: Place, stretches: number): SwingModel {
  const { t } = struck.samples;
  const [from, span] = [t[0]!, t[t.length - 1]! - t[0]!];
  return {
    frequency: o.frequency, ratio: o.ratio,
    stretches: Array.from({ length: struck.segments }, (_, k) => ({ begins: struck.begins(k), position: solved.positions[k]!, velocity: solved.velocities[k]! })),
    rest: { times: Array.from({ length: stretches + 1 }, (_, j) => from + (span * j) / Math.max(1, stretches)), values: Array.from(solved.shared.slice(0, stretches + 1), (value) => value + struck.base) },
  };
}

/** Calls back with every sample in use: C and D of its stretch, as seen over the exposure, and the hats of the rest line. */
function eachSample(struck: Struck, o: Oscillation, stretches: number, cells: readonly [number, number], take: (i: number, cell: Cell, c: number, d: number, knot: number, first: number, second: number) => void): void {
  const root = Math.sqrt(1 - o.ratio * o.ratio);
  const [fall, turn] = [-o.ratio * o.frequency, o.frequency * root];
  const [kr, ki] = exposureFactor(fall, turn, struck.exposure);
  const { t, use } = struck.samples;
  for (let k = cells[0]; k < cells[1]; k++) {
    const cell = struck.cells[k]!;
    const { at, first, second } = struck.hats(cell, stretches);
    for (let i = cell.from; i < cell.to; i++) {
      if (use && use[i] === 0) continue;
      const s = t[i]! - cell.begins;
      const e = Math.exp(fall * s);
      const [p, q] = [e * Math.cos(turn * s), e * Math.sin(turn * s)];
      const u = (t[i]! - cell.knotTime) / cell.knotStep;
      take(i, cell, kr * p - ki * q, kr * q + ki * p, at, first[4] + first[5] * u, second[4] + second[5] * u);
    }
  }
}

function residualsOf(struck: Struck, { o, solved }: Place, stretches: number): { readonly residuals: Float64Array; readonly sumOfSquares: number } {
  const { x } = struck.samples;
  const residuals = new Float64Array(x.length);
  const root = Math.sqrt(1 - o.ratio * o.ratio);
  let sumOfSquares = 0;
  eachSample(struck, o, stretches, [0, struck.cells.length], (i, cell, c, d, knot, first, second) => {
    const [p, v] = [solved.positions[cell.segment]!, solved.velocities[cell.segment]!];
    const r = x[i]! - struck.base - (c * p + (d * (o.ratio * p + v)) / root + first * solved.shared[knot]! + (second === 0 ? 0 : second * solved.shared[knot + 1]!));
    residuals[i] = r;
    sumOfSquares += r * r;
  });
  return { residuals, sumOfSquares };
}

/** The samples' part in jump k: each row of the problem times the covariances of the jump with the unknowns. */
function weightsAt(struck: Struck, { o, solved }: Place, stretches: number, covariances: ChainCovariances, value: JointValue, k: number): { readonly from: number; readonly weights: Float64Array } {
  const reach = (PERIODS_OF_WEIGHTS * 2 * Math.PI) / o.frequency;
  const event = struck.events[k]!;
  let [first, last] = [k, k + 1];
  while (first > 0 && struck.begins(first) > event - reach) first -= 1;
  while (last < struck.segments - 1 && struck.begins(last + 1) < event + reach) last += 1;
  const { positions, velocities } = covariances.withStates(k, value, first, last);
  const gamma = covariances.withShared(k, value);
  const [iw, iz] = [stretches + 1, stretches + 2];
  const { t } = struck.samples;
  const [from, to] = [firstAtOrAfter(t, event - reach, 0), firstAtOrAfter(t, event + reach, 0)];
  const weights = new Float64Array(to - from);
  const root = Math.sqrt(1 - o.ratio * o.ratio);
  eachSample(struck, o, stretches, [struck.firstCell[first]!, struck.firstCell[last + 1]!], (i, cell, c, d, knot, one, other) => {
    if (i < from || i >= to) return;
    const [P, V] = [positions[cell.segment - first]!, velocities[cell.segment - first]!];
    const by = slopeColumns(o, solved.positions[cell.segment]!, solved.velocities[cell.segment]!);
    const s = t[i]! - cell.begins;
    const slope = (column: Column): number => column[0] * c + column[1] * d + s * (column[2] * c + column[3] * d);
    weights[i - from] = c * P + (d * (o.ratio * P + V)) / root + one * gamma[knot]! + (other === 0 ? 0 : other * gamma[knot + 1]!) + (iw < gamma.length ? slope(by.frequency) * gamma[iw]! + slope(by.ratio) * gamma[iz]! : 0);
  });
  return { from, weights };
}
