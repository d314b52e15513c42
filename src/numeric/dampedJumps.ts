/** A damped oscillation that is struck at known times: its state before, every jump of its velocity, and a drifting rest line, solved together by least squares. */
import { cholesky, type Matrix } from './linearAlgebra.ts';

/** Samples in order; times strictly rising. */
export interface Samples {
  readonly t: ArrayLike<number>;
  readonly x: ArrayLike<number>;
}

export interface Oscillation {
  /** ω_n, rad per unit of time, > 0. */
  readonly frequency: number;
  /** ζ, 0 ≤ ζ < 1. */
  readonly ratio: number;
}

export interface StruckFit {
  readonly status: 'solved';
  /** Jumps of x′ over ω_n at the events, in the unit of x: the amplitude that an undamped swing from rest would have. */
  readonly jumps: readonly number[];
  /** Jumps of x itself, where they were let free; else zeros. */
  readonly steps: readonly number[];
  /** Rest line: z₀ at the middle of the record, z₁ per half of its length. */
  readonly rest: readonly [number, number];
  /** x and x′/ω_n about the rest line at the first sample. */
  readonly start: readonly [number, number];
  /** Σ r². */
  readonly sumOfSquares: number;
  /** Samples less unknowns. */
  readonly dof: number;
  readonly residuals: Float64Array;
  /** Inverse of the normal matrix: times σ² the covariance of (start, rest, jumps, steps) in that order. */
  readonly inverse: Matrix;
  /** Column of the k-th jump, and of the k-th step, in `inverse`. */
  readonly columnOfJump: (k: number) => number;
  readonly columnOfStep: (k: number) => number;
}

export type StruckResult = StruckFit | { readonly status: 'tooFewSamples' | 'notTold' };

/** State (x, x′/ω_n) after s from the state before: the free damped motion. */
function freeMotion(s: number, { frequency: w, ratio: z }: Oscillation): readonly [number, number, number, number] {
  const root = Math.sqrt(1 - z * z);
  const e = Math.exp(-z * w * s);
  const [c, d] = [e * Math.cos(w * root * s), (e * Math.sin(w * root * s)) / root];
  return [c + z * d, d, -d, c - z * d];
}

/** A segment between two events, with what its samples say of the state at its start and of the rest line. */
interface Segment {
  readonly from: number;
  readonly to: number;
  readonly begins: number;
}

/** An influence that has died out to this part is left out. */
const DIED_OUT = 1e-14;

/**
 * x(t) = z₀ + z₁ τ + free damped motion, whose x′ jumps at each event by ω_n × jump (and x by a step, where `steps`).
 *
 * Within a segment x is a row of two numbers times the state at its start, so that the samples are gone through once: linear in the samples.
 * Valid: events in order, inside the record; more samples than unknowns; every event has samples after it that tell it.
 * Source: linear least squares by the normal equations, columns scaled; derived.
 * @throws RangeError where ζ or ω_n is out of its range
 */
export function solveStruck({ t, x }: Samples, events: readonly number[], oscillation: Oscillation, steps = false): StruckResult {
  if (!(oscillation.frequency > 0 && oscillation.ratio >= 0 && oscillation.ratio < 1)) throw new RangeError(`struck oscillation: ω ${oscillation.frequency}, ζ ${oscillation.ratio}`);
  const n = t.length;
  const unknowns = 4 + events.length * (steps ? 2 : 1);
  if (n <= unknowns) return { status: 'tooFewSamples' };
  const [middle, half] = [(t[0]! + t[n - 1]!) / 2, (t[n - 1]! - t[0]!) / 2 || 1];
  const segments = segmentsOf(t, events);
  const normal = Array.from({ length: unknowns }, () => new Float64Array(unknowns));
  const right = new Float64Array(unknowns);
  const columnOfJump = (k: number): number => 4 + k;
  const columnOfStep = (k: number): number => 4 + events.length + k;
  // How the unknowns make the state at the start of each segment: two rows, sparse.
  let state: ReadonlyMap<number, readonly [number, number]> = new Map([[0, [1, 0]], [1, [0, 1]]]);
  const states: ReadonlyMap<number, readonly [number, number]>[] = [];
  for (const [k, segment] of segments.entries()) {
    if (k > 0) {
      const [a, b, c, d] = freeMotion(segment.begins - segments[k - 1]!.begins, oscillation);
      const moved = new Map<number, readonly [number, number]>();
      for (const [column, [p, v]] of state) {
        const next = [a * p + b * v, c * p + d * v] as const;
        if (Math.hypot(...next) > DIED_OUT) moved.set(column, next);
      }
      moved.set(columnOfJump(k - 1), [0, 1]);
      if (steps) moved.set(columnOfStep(k - 1), [1, 0]);
      state = moved;
    }
    states.push(state);
    addSegment({ t, x }, segment, state, oscillation, middle, half, normal, right);
  }
  const solved = solveNormal(normal, right);
  if (!solved) return { status: 'notTold' };
  const { solution, inverse } = solved;
  const residuals = new Float64Array(n);
  let sumOfSquares = 0;
  for (const [k, { from, to, begins }] of segments.entries()) {
    let [p, v] = [0, 0];
    for (const [column, [byP, byV]] of states[k]!) {
      p += byP * solution[column]!;
      v += byV * solution[column]!;
    }
    for (let i = from; i < to; i++) {
      const [c, d] = freeMotion(t[i]! - begins, oscillation);
      const r = x[i]! - (solution[2]! + (solution[3]! * (t[i]! - middle)) / half + c * p + d * v);
      residuals[i] = r;
      sumOfSquares += r * r;
    }
  }
  return {
    status: 'solved', jumps: events.map((_, k) => solution[columnOfJump(k)]!), steps: events.map((_, k) => (steps ? solution[columnOfStep(k)]! : 0)),
    rest: [solution[2]!, solution[3]!], start: [solution[0]!, solution[1]!], sumOfSquares, dof: n - unknowns, residuals, inverse, columnOfJump, columnOfStep,
  };
}

function segmentsOf(t: ArrayLike<number>, events: readonly number[]): readonly Segment[] {
  const n = t.length;
  const found: Segment[] = [];
  let i = 0;
  for (let k = 0; k <= events.length; k++) {
    const from = i;
    const end = events[k] ?? Infinity;
    while (i < n && t[i]! < end) i += 1;
    found.push({ from, to: i, begins: k === 0 ? t[0]! : events[k - 1]! });
  }
  return found;
}

/** Adds the samples of one segment: Gram sums of (c, d, 1, τ) and x, then spread over the unknowns that make the state. */
function addSegment({ t, x }: Samples, { from, to, begins }: Segment, state: ReadonlyMap<number, readonly [number, number]>, oscillation: Oscillation, middle: number, half: number, normal: readonly Float64Array[], right: Float64Array): void {
  const g = new Float64Array(10);
  const y = new Float64Array(4);
  for (let i = from; i < to; i++) {
    const [c, d] = freeMotion(t[i]! - begins, oscillation);
    const tau = (t[i]! - middle) / half;
    const value = x[i]!;
    g[0]! += c * c; g[1]! += c * d; g[2]! += d * d; g[3]! += c; g[4]! += d; g[5]! += c * tau; g[6]! += d * tau; g[7]! += 1; g[8]! += tau; g[9]! += tau * tau;
    y[0]! += c * value; y[1]! += d * value; y[2]! += value; y[3]! += tau * value;
  }
  const columns = [...state];
  for (const [i, [p, v]] of columns) {
    for (const [j, [q, u]] of columns) normal[i]![j]! += p * q * g[0]! + (p * u + v * q) * g[1]! + v * u * g[2]!;
    const [z0, z1] = [p * g[3]! + v * g[4]!, p * g[5]! + v * g[6]!];
    normal[i]![2]! += z0; normal[2]![i]! += z0; normal[i]![3]! += z1; normal[3]![i]! += z1;
    right[i]! += p * y[0]! + v * y[1]!;
  }
  normal[2]![2]! += g[7]!; normal[2]![3]! += g[8]!; normal[3]![2]! += g[8]!; normal[3]![3]! += g[9]!;
  right[2]! += y[2]!; right[3]! += y[3]!;
}

function solveNormal(normal: readonly Float64Array[], right: Float64Array): { readonly solution: readonly number[]; readonly inverse: Matrix } | null {
  const size = normal.map((row, i) => Math.sqrt(row[i]!));
  if (size.some((value) => !(value > 0))) return null;
  const scaled = normal.map((row, i) => Array.from(row, (value, j) => value / (size[i]! * size[j]!)));
  const factored = cholesky(scaled);
  if (factored.status !== 'factored') return null;
  const { lower } = factored;
  const m = lower.length;
  // L⁻¹, then (L Lᵀ)⁻¹ = L⁻ᵀ L⁻¹.
  const below = Array.from({ length: m }, () => new Float64Array(m));
  for (let j = 0; j < m; j++) {
    below[j]![j] = 1 / lower[j]![j]!;
    for (let i = j + 1; i < m; i++) {
      let sum = 0;
      for (let k = j; k < i; k++) sum -= lower[i]![k]! * below[k]![j]!;
      below[i]![j] = sum / lower[i]![i]!;
    }
  }
  const inverse = Array.from({ length: m }, (_, i) => Array.from({ length: m }, (__, j) => {
    let sum = 0;
    for (let k = Math.max(i, j); k < m; k++) sum += below[k]![i]! * below[k]![j]!;
    return sum / (size[i]! * size[j]!);
  }));
  return { solution: inverse.map((row) => row.reduce((sum, value, j) => sum + value * right[j]!, 0)), inverse };
}
