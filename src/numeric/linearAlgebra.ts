/** Small dense linear algebra: symmetric solve by Cholesky, least squares by Householder QR. */

/** Rows of numbers, all of one length. */
export type Matrix = readonly (readonly number[])[];

/**
 * A pivot below this part of its row's or column's own size is rounding.
 * Well above n·ε for a dozen columns; NIST's hardest linear sets keep 1e-10.
 */
const RANK_TOLERANCE = 1e-13;

export type CholeskyResult = { readonly status: 'factored'; readonly lower: Matrix } | { readonly status: 'notPositiveDefinite' };

function checkShape(matrix: Matrix, columns: number, what: string): void {
  if (columns < 1 || matrix.some((row) => row.length !== columns)) throw new RangeError(`${what}: rows of unequal or no length`);
}

/**
 * Lower triangular L with A = L Lᵀ, of a symmetric positive definite A (its lower triangle is read).
 *
 * Source: Golub & Van Loan, Matrix Computations, Cholesky factorisation (from memory).
 * @throws RangeError when A is not square
 */
export function cholesky(a: Matrix): CholeskyResult {
  const n = a.length;
  checkShape(a, n, 'cholesky');
  const lower = Array.from({ length: n }, () => Array.from({ length: n }, () => 0));
  for (let i = 0; i < n; i += 1) {
    for (let j = 0; j <= i; j += 1) {
      let sum = a[i]![j]!;
      for (let k = 0; k < j; k += 1) sum -= lower[i]![k]! * lower[j]![k]!;
      if (j < i) lower[i]![j] = sum / lower[j]![j]!;
      else if (sum > RANK_TOLERANCE * a[i]![i]!) lower[i]![i] = Math.sqrt(sum);
      else return { status: 'notPositiveDefinite' };
    }
  }
  return { status: 'factored', lower };
}

export type SolveResult = { readonly status: 'solved'; readonly x: readonly number[] } | { readonly status: 'notPositiveDefinite' };

/** x with L x = b, L lower triangular with no zero on its diagonal. */
export function forwardSubstitute(lower: Matrix, b: readonly number[]): number[] {
  const x = [...b];
  for (let i = 0; i < x.length; i += 1) {
    let sum = x[i]!;
    for (let k = 0; k < i; k += 1) sum -= lower[i]![k]! * x[k]!;
    x[i] = sum / lower[i]![i]!;
  }
  return x;
}

/** x with Lᵀ x = b, L lower triangular with no zero on its diagonal. */
export function transposeSubstitute(lower: Matrix, b: readonly number[]): number[] {
  const x = [...b];
  for (let i = x.length - 1; i >= 0; i -= 1) {
    let sum = x[i]!;
    for (let k = i + 1; k < x.length; k += 1) sum -= lower[k]![i]! * x[k]!;
    x[i] = sum / lower[i]![i]!;
  }
  return x;
}

/**
 * x with A x = b, A symmetric positive definite.
 *
 * @throws RangeError when the sizes do not fit
 */
export function solveSymmetric(a: Matrix, b: readonly number[]): SolveResult {
  if (b.length !== a.length) throw new RangeError(`solveSymmetric: ${a.length} rows, ${b.length} right-hand sides`);
  const factored = cholesky(a);
  if (factored.status !== 'factored') return factored;
  return { status: 'solved', x: transposeSubstitute(factored.lower, forwardSubstitute(factored.lower, b)) };
}

/** Columns C as Q R: q by column, orthonormal; R upper triangular. */
export interface ColumnBasis {
  readonly q: Matrix;
  readonly r: Matrix;
  readonly fullRank: boolean;
}

const product = (a: readonly number[], b: readonly number[]): number => a.reduce((sum, value, i) => sum + value * b[i]!, 0);

/** Rounds of taking the basis out of a vector: the second takes away what rounding left of the first. */
const ROUNDS = 2;

/** What of v stands upright on the basis, and the coefficients of the rest, v = Σ c_k q_k + upright. */
export function uprightTo(q: Matrix, v: readonly number[]): { readonly upright: number[]; readonly coefficients: number[] } {
  const upright = [...v];
  const coefficients = q.map(() => 0);
  for (let round = 0; round < ROUNDS; round += 1) {
    for (const [k, column] of q.entries()) {
      const c = product(column, upright);
      coefficients[k]! += c;
      for (let i = 0; i < upright.length; i += 1) upright[i]! -= c * column[i]!;
    }
  }
  return { upright, coefficients };
}

/**
 * Orthonormal basis of columns, by Gram–Schmidt done twice. For few columns whose basis itself is asked for; a column whose part
 * upright on those before it is below RANK_TOLERANCE of its length adds nothing and loses full rank.
 *
 * Source: "twice is enough", Kahan and Parlett, in Parlett, The Symmetric Eigenvalue Problem (1980), from memory.
 */
export function columnBasis(columns: Matrix): ColumnBasis {
  const q: number[][] = [];
  const r = columns.map(() => columns.map(() => 0));
  let fullRank = true;
  for (const [k, column] of columns.entries()) {
    const { upright, coefficients } = uprightTo(q, column);
    const length = Math.sqrt(product(upright, upright));
    coefficients.forEach((c, j) => (r[j]![k] = c));
    r[k]![k] = length;
    if (!(length > RANK_TOLERANCE * Math.sqrt(product(column, column)))) fullRank = false;
    q.push(upright.map((value) => (length > 0 ? value / length : 0)));
  }
  return { q, r, fullRank };
}

/** J = Q R reduced to what least squares needs. */
export interface Triangle {
  /** R, n × n upper triangular. */
  readonly r: Matrix;
  /** The first n components of Qᵀy. */
  readonly qty: readonly number[];
  /** Sum of squares of the other components: what no x can take away. */
  readonly rest: number;
  readonly columnNorms: readonly number[];
  readonly fullRank: boolean;
}

/** Length of a column from one row on. */
function columnNorm(a: Matrix, column: number, from: number): number {
  let sum = 0;
  for (let i = from; i < a.length; i += 1) sum += a[i]![column]! ** 2;
  return Math.sqrt(sum);
}

/**
 * Householder QR of J (m × n) applied to y. Rank is lost where what a column adds to those before it is below `rankTolerance` of its length.
 *
 * Source: Golub & Van Loan, Matrix Computations, Householder QR (from memory).
 * @throws RangeError when m < n or the sizes do not fit
 */
export function triangularise(j: Matrix, y: readonly number[], rankTolerance = RANK_TOLERANCE): Triangle {
  const m = j.length;
  const n = j[0]?.length ?? 0;
  checkShape(j, n, 'triangularise');
  if (m < n || y.length !== m) throw new RangeError(`triangularise: ${m} rows, ${n} columns, ${y.length} observations`);
  const a = j.map((row) => [...row]);
  const b = [...y];
  const columnNorms = Array.from({ length: n }, (_, c) => columnNorm(a, c, 0));
  let fullRank = true;
  for (let c = 0; c < n; c += 1) {
    const norm = columnNorm(a, c, c);
    if (!(norm > rankTolerance * columnNorms[c]!)) fullRank = false;
    if (norm === 0) continue;
    const diagonal = a[c]![c]! > 0 ? -norm : norm;
    // v = column − diagonal·e, with v·v/2 = −diagonal·v_c
    const head = a[c]![c]! - diagonal;
    const half = -diagonal * head;
    for (let k = c + 1; k < n; k += 1) {
      let dot = head * a[c]![k]!;
      for (let i = c + 1; i < m; i += 1) dot += a[i]![c]! * a[i]![k]!;
      const share = dot / half;
      a[c]![k]! -= share * head;
      for (let i = c + 1; i < m; i += 1) a[i]![k]! -= share * a[i]![c]!;
    }
    let dot = head * b[c]!;
    for (let i = c + 1; i < m; i += 1) dot += a[i]![c]! * b[i]!;
    const share = dot / half;
    b[c]! -= share * head;
    for (let i = c + 1; i < m; i += 1) b[i]! -= share * a[i]![c]!;
    a[c]![c] = diagonal;
  }
  const r = a.slice(0, n).map((row, i) => row.map((value, k) => (k < i ? 0 : value)));
  const rest = b.slice(n).reduce((sum, value) => sum + value * value, 0);
  return { r, qty: b.slice(0, n), rest, columnNorms, fullRank };
}

/** x with R x = b, R upper triangular with no zero on its diagonal. */
export function backSubstitute(r: Matrix, b: readonly number[]): number[] {
  const n = b.length;
  const x = [...b];
  for (let i = n - 1; i >= 0; i -= 1) {
    let sum = x[i]!;
    for (let k = i + 1; k < n; k += 1) sum -= r[i]![k]! * x[k]!;
    x[i] = sum / r[i]![i]!;
  }
  return x;
}

/** (RᵀR)⁻¹ = R⁻¹R⁻ᵀ. */
export function inverseOfGram(r: Matrix): Matrix {
  const n = r.length;
  const inverse = Array.from({ length: n }, (_, c) => backSubstitute(r, Array.from({ length: n }, (__, i) => (i === c ? 1 : 0))));
  // inverse[c] is column c of R⁻¹.
  return Array.from({ length: n }, (_, i) => Array.from({ length: n }, (__, k) => inverse.reduce((sum, column) => sum + column[i]! * column[k]!, 0)));
}

export interface LeastSquaresSolution {
  readonly status: 'solved';
  readonly x: readonly number[];
  /** (JᵀJ)⁻¹: the covariance of x for observations of unit variance. */
  readonly covariance: Matrix;
  /** y − J x. */
  readonly residuals: readonly number[];
  readonly sumOfSquares: number;
  /** m − n. */
  readonly dof: number;
}
export type LeastSquaresResult = LeastSquaresSolution | { readonly status: 'rankDeficient' };

/**
 * x that minimises |y − J x|², with (JᵀJ)⁻¹. Weighted: multiply each row and observation by 1/u first.
 *
 * @throws RangeError when the sizes do not fit or a number is not finite
 */
export function leastSquares(j: Matrix, y: readonly number[]): LeastSquaresResult {
  if (!y.every(Number.isFinite) || !j.every((row) => row.every(Number.isFinite))) throw new RangeError('leastSquares: a number is not finite');
  if (j.length < (j[0]?.length ?? 0)) return { status: 'rankDeficient' };
  const triangle = triangularise(j, y);
  if (!triangle.fullRank) return { status: 'rankDeficient' };
  const x = backSubstitute(triangle.r, triangle.qty);
  const residuals = j.map((row, i) => row.reduce((sum, value, k) => sum - value * x[k]!, y[i]!));
  return {
    status: 'solved',
    x,
    covariance: inverseOfGram(triangle.r),
    residuals,
    sumOfSquares: residuals.reduce((sum, value) => sum + value * value, 0),
    dof: y.length - x.length,
  };
}
