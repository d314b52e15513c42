/**
 * Least-squares adjustment: unknowns and every input they rest on are found together, each input's stated value being one of the observations,
 * so that what several items share stays shared and a common scale error cannot drag the result outside the data.
 */
import { cholesky, leastSquares, type Matrix } from '../numeric/linearAlgebra.ts';
import { incompleteGamma } from '../numeric/specialFunctions.ts';
import type { Source } from './source.ts';
import { contributions, type Uncertain } from './uncertain.ts';

export interface AdjustmentInput {
  readonly y: Uncertain;
  /** A quantity that is positive and multiplies: it moves with its sources as x₀ exp(Σ c_s δ_s/x₀), so that products of powers stay exact. */
  readonly positive: boolean;
}

type Numbers = Readonly<Record<string, number>>;

export interface AdjustmentItem {
  readonly id: string;
  readonly label: string;
  readonly inputs: Readonly<Record<string, AdjustmentInput>>;
  /** Predicted less measured, as a logarithm or as a part of itself; 0 where the item is met exactly. Captures nothing. */
  readonly residual: (unknowns: Numbers, inputs: Numbers) => number;
}

export interface Unknown {
  readonly name: string;
  readonly start: number;
  readonly positive: boolean;
}

export interface AdjustedItemResult {
  readonly id: string;
  readonly label: string;
  /** (Measured − what the other items say of it) over the u of that difference; null where no other item checks it. */
  readonly deviation: number | null;
  /** Part of the item that the others check, 0 … 1. */
  readonly redundancy: number;
  /** Change of each unknown if the item were left out: relative for a positive unknown; null where it could not be. */
  readonly without: Numbers | null;
}

export interface Adjustment {
  readonly status: 'adjusted';
  readonly unknowns: Readonly<Record<string, Uncertain>>;
  readonly chiSquared: number;
  /** Items less unknowns. */
  readonly dof: number;
  /** Chance of a χ² as large or larger; null where nothing is checked. */
  readonly probability: number | null;
  readonly items: readonly AdjustedItemResult[];
  /** Adjusted less stated value of each source, in its u; largest first. */
  readonly moved: readonly { readonly source: Source; readonly shift: number }[];
  readonly iterations: number;
}

export type Adjusted = Adjustment | { readonly status: 'underdetermined' | 'notConverged'; readonly unknowns?: undefined };

/** Relative uncertainty that every item has at least: two items that rest on the very same readings would else contradict each other in the last digits. */
const FLOOR = 1e-7;
const ITERATIONS = 60;
/** Change of an unknown, in its u, below which the adjustment has settled. */
const SETTLED = 1e-8;
/** …and of a source, in its u: two items that rest on one source alone leave the rounding of their slopes in it. */
const SETTLED_SOURCE = 1e-6;
/** An item of which the others check less than this part is not checked. */
const CHECKED = 1e-7;
/** Step of the half-differences for the slopes, in u of the input or as a part of the unknown. */
const STEP = 1e-4;

/** One input with its sources by index. */
interface Input {
  readonly name: string;
  readonly centre: number;
  readonly positive: boolean;
  readonly parts: readonly (readonly [index: number, c: number])[];
}

interface Prepared {
  readonly unknowns: readonly Unknown[];
  readonly items: readonly { readonly item: AdjustmentItem; readonly inputs: readonly Input[] }[];
  readonly sources: readonly Source[];
}

function prepare(unknowns: readonly Unknown[], items: readonly AdjustmentItem[]): Prepared {
  const index = new Map<Source, number>();
  const inputOf = ([name, { y, positive }]: [string, AdjustmentInput]): Input => ({
    name, centre: y.value, positive: positive && y.value > 0,
    parts: [...contributions(y)].filter(([, c]) => c !== 0).map(([source, c]) => {
      if (!index.has(source)) index.set(source, index.size);
      return [index.get(source)!, c] as const;
    }),
  });
  const prepared = items.map((item) => ({ item, inputs: Object.entries(item.inputs).map(inputOf) }));
  return { unknowns, items: prepared, sources: [...index.keys()] };
}

function valueOf({ centre, positive, parts }: Input, delta: Float64Array): number {
  let moved = 0;
  for (const [s, c] of parts) moved += c * delta[s]!;
  return positive ? centre * Math.exp(moved / centre) : centre + moved;
}

/** Values, slopes by unknown (A) and by source (B, sparse) of every item at one place. */
interface Linear {
  readonly g: readonly number[];
  readonly A: number[][];
  readonly B: readonly ReadonlyMap<number, number>[];
}

const unknownsAt = (unknowns: readonly Unknown[], p: readonly number[]): Record<string, number> =>
  Object.fromEntries(unknowns.map(({ name, positive }, k) => [name, positive ? Math.exp(p[k]!) : p[k]!]));

function linearise({ unknowns, items }: Prepared, p: readonly number[], scale: readonly number[], delta: Float64Array): Linear {
  const at = unknownsAt(unknowns, p);
  const moved = unknowns.map((_, k) => [1, -1].map((sign) => unknownsAt(unknowns, p.map((value, j) => (j === k ? value + sign * STEP * scale[k]! : value)))));
  const g: number[] = [];
  const A: number[][] = [];
  const B: Map<number, number>[] = [];
  for (const { item, inputs } of items) {
    const x: Record<string, number> = Object.fromEntries(inputs.map((input) => [input.name, valueOf(input, delta)]));
    g.push(item.residual(at, x));
    A.push(moved.map(([above, below], k) => (item.residual(above!, x) - item.residual(below!, x)) / (2 * STEP * scale[k]!)));
    const row = new Map<number, number>();
    for (const { name, centre, positive, parts } of inputs) {
      if (parts.length === 0) continue;
      const here = x[name]!;
      const u = Math.sqrt(parts.reduce((sum, [, c]) => sum + c * c, 0));
      const h = STEP * u * (positive ? here / centre : 1);
      const slope = (item.residual(at, { ...x, [name]: here + h }) - item.residual(at, { ...x, [name]: here - h })) / (2 * STEP * u);
      for (const [s, c] of parts) row.set(s, (row.get(s) ?? 0) + slope * c);
    }
    B.push(row);
  }
  return { g, A, B };
}

function productOf(B: Linear['B']): number[][] {
  return B.map((a, i) => B.map((b, j) => {
    if (j > i) return 0;
    let sum = i === j ? FLOOR ** 2 : 0;
    const [small, large] = a.size <= b.size ? [a, b] : [b, a];
    for (const [s, x] of small) sum += x * (large.get(s) ?? 0);
    return sum;
  }));
}

/** L⁻¹ b. */
function whitened(lower: Matrix, b: readonly number[]): number[] {
  const x = [...b];
  for (let i = 0; i < x.length; i++) {
    let sum = x[i]!;
    for (let k = 0; k < i; k++) sum -= lower[i]![k]! * x[k]!;
    x[i] = sum / lower[i]![i]!;
  }
  return x;
}

/** L⁻ᵀ b. */
function unwhitened(lower: Matrix, b: readonly number[]): number[] {
  const x = [...b];
  for (let i = x.length - 1; i >= 0; i--) {
    let sum = x[i]!;
    for (let k = i + 1; k < x.length; k++) sum -= lower[k]![i]! * x[k]!;
    x[i] = sum / lower[i]![i]!;
  }
  return x;
}

const transposed = (m: Matrix): number[][] => (m[0] ?? []).map((_, k) => m.map((row) => row[k]!));
const dot = (a: readonly number[], b: readonly number[]): number => a.reduce((sum, x, i) => sum + x * b[i]!, 0);

interface Step {
  readonly lower: Matrix;
  /** L⁻¹A by unknown. */
  readonly columns: readonly (readonly number[])[];
  /** (AᵀV⁻¹A)⁻¹. */
  readonly covariance: Matrix;
  readonly change: readonly number[];
  /** V⁻¹(w + A dp). */
  readonly pulls: readonly number[];
  readonly chiSquared: number;
}

function stepOf({ g, A, B }: Linear, delta: Float64Array): Step | 'underdetermined' | 'notConverged' {
  if (![...g, ...A.flat()].every(Number.isFinite)) return 'notConverged';
  const factored = cholesky(productOf(B));
  if (factored.status !== 'factored') return 'notConverged';
  const { lower } = factored;
  const w = g.map((value, i) => {
    let moved = 0;
    for (const [s, slope] of B[i]!) moved += slope * delta[s]!;
    return value - moved;
  });
  const columns = transposed(A).map((column) => whitened(lower, column));
  const white = whitened(lower, w);
  // Columns of one size, so that the rank is judged by the items and not by the units.
  const sizes = columns.map((column) => Math.sqrt(dot(column, column)));
  if (sizes.some((size) => !(size > 0))) return 'underdetermined';
  const solved = leastSquares(transposed(columns.map((column, k) => column.map((x) => x / sizes[k]!))), white.map((x) => -x));
  if (solved.status !== 'solved') return 'underdetermined';
  const change = solved.x.map((x, k) => x / sizes[k]!);
  const covariance = solved.covariance.map((row, j) => row.map((c, k) => c / (sizes[j]! * sizes[k]!)));
  const residual = white.map((x, i) => x + columns.reduce((sum, column, k) => sum + column[i]! * change[k]!, 0));
  return { lower, columns, covariance, change, pulls: unwhitened(lower, residual), chiSquared: dot(residual, residual) };
}

/**
 * Adjustment of the unknowns p and of all sources δ (each in its u, stated at 0): min Σ δ_s² with g_i(p, x(δ)) = 0 for every item.
 *
 * Iterated Gauss–Helmert: with g + A dp + B(δ′ − δ) = 0 and V = B Bᵀ, dp = −(AᵀV⁻¹A)⁻¹AᵀV⁻¹w and δ′ = −BᵀV⁻¹(w + A dp), w = g − Bδ;
 * slopes are taken anew at the adjusted unknowns and inputs, which is what keeps a shared scale error from pulling the result
 * below all data (R. W. Peelle's puzzle, 1987, from memory). u is never scaled by √(χ²/ν).
 *
 * Valid: at least as many items as unknowns; residuals near 0 at `start`. Unknowns keep their contributions by source.
 * Source: Mikhail & Ackermann, Observations and Least Squares (1976), combined adjustment; normalised deviation after
 * Baarda (1968): e_i/√P_ii with e = V⁻¹r, P = V⁻¹ − V⁻¹A(AᵀV⁻¹A)⁻¹AᵀV⁻¹ (both from memory).
 * @throws RangeError where a positive unknown starts at or below zero
 */
export function adjust({ unknowns, items }: { readonly unknowns: readonly Unknown[]; readonly items: readonly AdjustmentItem[] }): Adjusted {
  if (unknowns.some(({ positive, start }) => positive && !(start > 0))) throw new RangeError('adjust: a positive unknown starts at or below zero');
  if (items.length < unknowns.length) return { status: 'underdetermined' };
  const prepared = prepare(unknowns, items);
  const p = unknowns.map(({ start, positive }) => (positive ? Math.log(start) : start));
  const scale = unknowns.map(({ start, positive }) => (positive ? 1 : Math.max(Math.abs(start), FLOOR)));
  const delta = new Float64Array(prepared.sources.length);
  for (let iteration = 1; iteration <= ITERATIONS; iteration++) {
    const linear = linearise(prepared, p, scale, delta);
    const step = stepOf(linear, delta);
    if (step === 'underdetermined' || step === 'notConverged') return { status: step };
    const before = Float64Array.from(delta);
    delta.fill(0);
    for (const [i, row] of linear.B.entries()) for (const [s, slope] of row) delta[s]! -= slope * step.pulls[i]!;
    step.change.forEach((dp, k) => (p[k]! += dp));
    const still = step.change.every((dp, k) => Math.abs(dp) <= SETTLED * Math.sqrt(step.covariance[k]![k]!)) && delta.every((value, s) => Math.abs(value - before[s]!) <= SETTLED_SOURCE);
    if (still) return resultOf(prepared, p, delta, iteration);
  }
  return { status: 'notConverged' };
}

function resultOf(prepared: Prepared, p: readonly number[], delta: Float64Array, iterations: number): Adjusted {
  const { unknowns, items, sources } = prepared;
  const linear = linearise(prepared, p, unknowns.map(({ start, positive }) => (positive ? 1 : Math.max(Math.abs(start), FLOOR))), delta);
  const step = stepOf(linear, delta);
  if (step === 'underdetermined' || step === 'notConverged') return { status: step };
  const { lower, columns, covariance, pulls } = step;
  // gains[k][i] = ((AᵀV⁻¹A)⁻¹AᵀV⁻¹)_ki
  const gains = unknowns.map((_, k) => unwhitened(lower, (columns[0] ?? []).map((__, i) => columns.reduce((sum, column, j) => sum + covariance[k]![j]! * column[i]!, 0))));
  const values = unknownsAt(unknowns, p);
  const found = Object.fromEntries(unknowns.map(({ name, positive }, k): [string, Uncertain] => {
    const own = new Map<Source, number>();
    const size = positive ? values[name]! : 1;
    for (const [i, row] of linear.B.entries()) for (const [s, slope] of row) own.set(sources[s]!, (own.get(sources[s]!) ?? 0) - size * gains[k]![i]! * slope);
    return [name, { value: values[name]!, own, through: new Map() }];
  }));
  const inverse = items.map((_, i) => unwhitened(lower, whitened(lower, items.map((__, j) => (i === j ? 1 : 0)))));
  const itemResults = items.map(({ item }, i): AdjustedItemResult => {
    // P_ii = (V⁻¹)_ii − Σ_k (V⁻¹A)_ik gain_ki
    const hidden = unknowns.reduce((sum, _, k) => sum + dot(inverse[i]!, linear.A.map((row) => row[k]!)) * gains[k]![i]!, 0);
    const P = inverse[i]![i]! - hidden;
    const redundancy = 1 - unknowns.reduce((sum, _, k) => sum + linear.A[i]![k]! * gains[k]![i]!, 0);
    if (!(P > CHECKED * inverse[i]![i]!)) return { id: item.id, label: item.label, deviation: null, redundancy: Math.max(0, redundancy), without: null };
    const without = Object.fromEntries(unknowns.map(({ name }, k) => [name, (gains[k]![i]! * pulls[i]!) / P]));
    return { id: item.id, label: item.label, deviation: -pulls[i]! / Math.sqrt(P), redundancy, without };
  });
  const dof = items.length - unknowns.length;
  const moved = sources.map((source, s) => ({ source, shift: delta[s]! })).sort((a, b) => Math.abs(b.shift) - Math.abs(a.shift));
  return { status: 'adjusted', unknowns: found, chiSquared: step.chiSquared, dof, probability: dof > 0 ? incompleteGamma(dof / 2, step.chiSquared / 2).upper : null, items: itemResults, moved, iterations };
}
