/** One step of a combined adjustment, and what it says of each item, in coordinates in which the items are independent with unit variance. */
import { backSubstitute, cholesky, columnBasis, forwardSubstitute, inverseOfGram, transposeSubstitute, uprightTo, type Matrix } from '../numeric/linearAlgebra.ts';

/** Items at one place: values, slopes by unknown and by source, and what each is allowed beyond its sources. */
export interface LinearItems {
  /** g by item. */
  readonly g: readonly number[];
  /** ∂g/∂p, a row for each item. */
  readonly A: Matrix;
  /** ∂g/∂δ, a row for each item; a source stands at δ = 0 with unit variance. */
  readonly B: readonly Float64Array[];
  /** Standard uncertainty that an item has beside its sources; > 0. */
  readonly floor: readonly number[];
}

export interface Step {
  /** dp. */
  readonly change: readonly number[];
  /** (AᵀV⁻¹A)⁻¹. */
  readonly covariance: Matrix;
  /** V⁻¹(w + A dp): δ′ = −Bᵀ pulls. */
  readonly pulls: readonly number[];
  readonly chiSquared: number;
  /** Cholesky factor of V. */
  readonly lower: Matrix;
  /** L⁻¹A = Q R. */
  readonly q: Matrix;
  readonly r: Matrix;
  /** L⁻¹(w + A dp). */
  readonly residual: readonly number[];
}

function dot(a: ArrayLike<number>, b: ArrayLike<number>): number {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += a[i]! * b[i]!;
  return sum;
}

/** V = B Bᵀ + floor², lower triangle. */
const varianceOf = ({ B, floor }: LinearItems): Matrix => B.map((a, i) => B.map((b, j) => (j > i ? 0 : dot(a, b) + (i === j ? floor[i]! ** 2 : 0))));

/**
 * dp and δ′ that meet g + A dp + B(δ′ − δ) = 0 with the least Σ δ′²: with w = g − Bδ and V = B Bᵀ,
 * dp = −(AᵀV⁻¹A)⁻¹AᵀV⁻¹w, δ′ = −BᵀV⁻¹(w + A dp). V is items × items, however many the sources are.
 *
 * Source: Mikhail & Ackermann, Observations and Least Squares (1976), combined adjustment (from memory).
 */
export function stepOf(linear: LinearItems, delta: Float64Array): Step | 'underdetermined' | 'notFinite' {
  const { g, A, B } = linear;
  const V = varianceOf(linear);
  if (![...g, ...A.flat(), ...V.flat()].every(Number.isFinite)) return 'notFinite';
  const factored = cholesky(V);
  if (factored.status !== 'factored') return 'notFinite';
  const { lower } = factored;
  const { q, r, fullRank } = columnBasis((A[0] ?? []).map((_, k) => forwardSubstitute(lower, A.map((row) => row[k]!))));
  if (!fullRank) return 'underdetermined';
  const { upright, coefficients } = uprightTo(q, forwardSubstitute(lower, g.map((value, i) => value - dot(B[i]!, delta))));
  return {
    change: backSubstitute(r, coefficients).map((x) => -x), covariance: inverseOfGram(r), pulls: transposeSubstitute(lower, upright),
    chiSquared: dot(upright, upright), lower, q, r, residual: upright,
  };
}

/** ((AᵀV⁻¹A)⁻¹AᵀV⁻¹)_ki by unknown k: how far the unknown goes with the item, dp_k = −gain dg_i. */
export function gainsOf({ lower, q, r }: Step, item: number): readonly number[] {
  return backSubstitute(r, q.map((column) => dot(column, unit(lower, item))));
}

/** L⁻¹e_i. */
const unit = (lower: Matrix, item: number): number[] => forwardSubstitute(lower, lower.map((_, i) => (i === item ? 1 : 0)));

export interface Check {
  /** P_ii/(V⁻¹)_ii, 0 … 1: part of what the item says by itself that the others say too. */
  readonly redundancy: number;
  /** e_i/√P_ii: (the item less what the others say of it) over the u of that difference. */
  readonly deviation: number;
  /** dp if the item were left out. */
  readonly without: readonly number[];
}

/** Below this part of its own length nothing but rounding stands upright on the unknowns: no other item checks this one. */
const CHECKED = 1e-10;

/**
 * What the other items say of one; null where they say nothing. With e = V⁻¹(w + A dp) and P = V⁻¹ − V⁻¹A(AᵀV⁻¹A)⁻¹AᵀV⁻¹ = L⁻ᵀ(1 − QQᵀ)L⁻¹,
 * P_ii is the squared length of the part of L⁻¹e_i upright on Q, so that an exact item beside uncertain ones loses no digits.
 *
 * Source: normalised deviation after Baarda, A testing procedure for use in geodetic networks (1968), for correlated items; deletion of an observation (both from memory).
 */
export function checkOf(step: Step, item: number): Check | null {
  const own = unit(step.lower, item);
  const { upright } = uprightTo(step.q, own);
  const P = dot(upright, upright);
  const all = dot(own, own);
  if (!(P > CHECKED ** 2 * all)) return null;
  const e = dot(upright, step.residual);
  return { redundancy: P / all, deviation: e / Math.sqrt(P), without: gainsOf(step, item).map((gain) => (gain * e) / P) };
}
