/** A train of pulses far faster than the swing, read as a steady deflection: the mean impulse bit is κθ/(r ℓ). */
import { solveSymmetric } from '../numeric/linearAlgebra.ts';
import { noiseCorrelation, varianceFactor } from './noiseColour.ts';
import { firstAtOrAfter, type Oscillation, type SwingSamples } from './swingSums.ts';

export interface SteadyDeflection {
  /** Deflection of the place of rest while the train went, unit of x. */
  readonly deflection: number;
  /** u by the noise, its correlation included. */
  readonly u: number;
  /** Slopes of the deflection by ω_n and by ζ. */
  readonly byFrequency: number;
  readonly byRatio: number;
  /** s of the record that it rests on. */
  readonly from: number;
  readonly to: number;
  readonly samples: number;
}

/** Natural periods of rest before and after the train that are taken in, where there are as many. */
const REACH = 10;
const FEWEST = 20;
const STEP = 1e-4;
/** Lags of the noise, as a part of the samples. */
const LAGS = 0.25;

interface Train {
  /** s. */
  readonly on: number;
  readonly off: number;
}

interface Solved {
  readonly deflection: number;
  readonly variance: number;
  readonly weights: Float64Array;
  readonly residuals: Float64Array;
  readonly noise: number;
}

/** Of a pendulum pushed from s = 0 on towards a new rest one away: where it is. */
function pushed(s: number, { frequency: w, ratio: z }: Oscillation): number {
  if (s <= 0) return 0;
  const root = Math.sqrt(1 - z * z);
  return 1 - Math.exp(-z * w * s) * (Math.cos(w * root * s) + (z / root) * Math.sin(w * root * s));
}

/** Rest line, the swing that was there, and the deflection, all linear at a given ω_n and ζ. */
function solveAt(t: Float64Array, x: Float64Array, use: Uint8Array, o: Oscillation, { on, off }: Train): Solved | null {
  const n = t.length;
  const [begin, span] = [t[0]!, t[n - 1]! - t[0]!];
  const root = Math.sqrt(1 - o.ratio * o.ratio);
  const columns = Array.from({ length: 5 }, () => new Float64Array(n));
  for (let i = 0; i < n; i++) {
    if (use[i] === 0) continue;
    const s = t[i]! - begin;
    const e = Math.exp(-o.ratio * o.frequency * s);
    columns[0]![i] = pushed(t[i]! - on, o) - pushed(t[i]! - off, o);
    columns[1]![i] = 1;
    columns[2]![i] = s / span - 0.5;
    columns[3]![i] = e * Math.cos(o.frequency * root * s);
    columns[4]![i] = e * Math.sin(o.frequency * root * s);
  }
  const product = (a: Float64Array, b: Float64Array): number => {
    let sum = 0;
    for (let i = 0; i < n; i++) if (use[i] !== 0) sum += a[i]! * b[i]!;
    return sum;
  };
  const normal = columns.map((a) => columns.map((b) => product(a, b)));
  const solved = solveSymmetric(normal, columns.map((a) => product(a, x)));
  const first = solveSymmetric(normal, [1, 0, 0, 0, 0]);
  if (solved.status !== 'solved' || first.status !== 'solved') return null;
  const residuals = new Float64Array(n);
  const weights = new Float64Array(n);
  let [squares, count] = [0, 0];
  for (let i = 0; i < n; i++) {
    if (use[i] === 0) continue;
    residuals[i] = x[i]! - solved.x.reduce((sum, value, j) => sum + value * columns[j]![i]!, 0);
    weights[i] = first.x.reduce((sum, value, j) => sum + value * columns[j]![i]!, 0);
    squares += residuals[i]! ** 2;
    count += 1;
  }
  return { deflection: solved.x[0]!, variance: first.x[0]!, weights, residuals, noise: Math.sqrt(squares / Math.max(1, count - 5)) };
}

/**
 * The deflection of a train from the record about it. Its push begins and ends at once and is the same all along; the swings that it makes
 * on going on and off are part of the model, so that nothing need come to rest.
 * null where the record holds too little of it, or no rest beside it.
 *
 * Valid: pulses far faster than the swing; no other strike within `within`. Derived; mean of a train of impulses: force r I.
 */
export function steadyDeflection({ t, x, use }: SwingSamples, o: Oscillation, train: Train, within: readonly [from: number, to: number]): SteadyDeflection | null {
  const reach = (REACH * 2 * Math.PI) / o.frequency;
  const [from, to] = [Math.max(within[0], train.on - reach), Math.min(within[1], train.off + reach)];
  const [first, last] = [firstAtOrAfter(t, from, 0), firstAtOrAfter(t, to, 0)];
  if (last - first < 2 * FEWEST) return null;
  const [times, values] = [t.subarray(first, last), x.subarray(first, last)];
  const used = use ? use.subarray(first, last) : new Uint8Array(last - first).fill(1);
  let [during, beside] = [0, 0];
  for (let i = 0; i < times.length; i++) if (used[i] !== 0) {
    if (times[i]! >= train.on && times[i]! < train.off) during += 1;
    else beside += 1;
  }
  if (during < FEWEST || beside < FEWEST) return null;
  const middle = solveAt(times, values, used, o, train);
  const by = (up: Oscillation, down: Oscillation, long: number): number => {
    const [a, b] = [solveAt(times, values, used, up, train), solveAt(times, values, used, down, train)];
    return a && b ? (a.deflection - b.deflection) / long : 0;
  };
  if (!middle) return null;
  const correlation = noiseCorrelation(middle.residuals, used, Math.floor(LAGS * times.length));
  return {
    deflection: middle.deflection, u: middle.noise * Math.sqrt(middle.variance * varianceFactor(correlation, middle.weights)),
    byFrequency: by({ ...o, frequency: o.frequency * (1 + STEP) }, { ...o, frequency: o.frequency * (1 - STEP) }, 2 * STEP * o.frequency),
    byRatio: by({ ...o, ratio: o.ratio + STEP }, { ...o, ratio: o.ratio - STEP }, 2 * STEP), from: times[0]!, to: times[times.length - 1]!, samples: during + beside,
  };
}

/**
 * Ripple from crest to crest over the deflection itself, of pulses r a second: of each pulse, and of the swing that it makes.
 * Valid: r above the natural frequency. Source: periodic motion of a struck oscillator, derived.
 */
export function ripple(rate: number, { frequency: w, ratio: z }: Oscillation): number {
  const root = Math.sqrt(1 - z * z);
  const long = 1 / rate;
  const e = Math.exp(-z * w * long);
  const [c, d] = [e * Math.cos(w * root * long), (e * Math.sin(w * root * long)) / root];
  // State (p, v) just after a pulse that comes back after one: p = (c + z d) p + d v, v = −d p + (c − z d) v + 1.
  const [a11, a12, a21, a22] = [1 - c - z * d, -d, d, 1 - c + z * d];
  const det = a11 * a22 - a12 * a21;
  const [p, v] = [-a12 / det, a11 / det];
  let [low, high] = [Infinity, -Infinity];
  for (let k = 0; k <= 64; k++) {
    const s = (k / 64) * long;
    const f = Math.exp(-z * w * s);
    const [cs, ds] = [f * Math.cos(w * root * s), (f * Math.sin(w * root * s)) / root];
    const x = (cs + z * ds) * p + ds * v;
    low = Math.min(low, x);
    high = Math.max(high, x);
  }
  // A pulse of jump 1 at r a second deflects by r/ω.
  return ((high - low) * w) / rate;
}

/**
 * Repetition rate from which the steady reading knows the mean impulse bit better than n shots, each fired by itself in the same time:
 * u_I = κ u_θ/(r ℓ) against κ u_J/(ω ℓ √n), so r* = ω √n u_θ/u_J. In pulses a second.
 */
export const betterFrom = (frequency: number, uDeflection: number, uJump: number, shots: number): number => (frequency * Math.sqrt(shots) * uDeflection) / uJump;
