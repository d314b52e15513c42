/** Eigenvalues and eigenvectors of a dense real symmetric matrix. */

export type SymmetricEigenResult =
  | {
      readonly status: 'found';
      /** Ascending. */
      readonly values: Float64Array;
      /** n × n, row k the unit eigenvector of values[k]. */
      readonly vectors: Float64Array;
    }
  /** An eigenvalue did not settle · an entry is not finite. */
  | { readonly status: 'limit' | 'notFinite' };

/** QL needs one to three turns an eigenvalue; ten times that is a matrix gone wrong. */
const TURNS = 40;

/** Of a matrix whose largest entry is near 1: what is smaller than this moves no place of any eigenvalue, and its square is still a number. */
const NEGLIGIBLE = 1e-100;

/**
 * A = Σ λ_k v_k v_kᵀ by Householder's reduction to three diagonals and implicitly shifted QL.
 *
 * The error of each eigenvalue is of the order of the last place of the largest one, not of its own.
 * `a` is row by row, n × n; its lower triangle is read, and it is left as it was.
 * Source: Golub & Van Loan, Matrix Computations, symmetric tridiagonal QR; Bowdler, Martin, Reinsch & Wilkinson,
 * Numer. Math. 11 (1968) 293 (both from memory).
 * @throws RangeError when the size does not fit
 */
export function symmetricEigen(n: number, a: Float64Array): SymmetricEigenResult {
  if (!(Number.isInteger(n) && n > 0 && a.length === n * n)) throw new RangeError(`symmetricEigen: ${a.length} entries for n = ${n}`);
  if (!a.every(Number.isFinite)) return { status: 'notFinite' };
  const largest = a.reduce((most, entry) => Math.max(most, Math.abs(entry)), 0);
  // A power of two, so that no digit changes.
  const scale = largest === 0 ? 1 : 2 ** Math.floor(Math.log2(largest));
  const { diagonal, beside, basis } = threeDiagonals(n, a.map((entry) => entry / scale));
  if (!diagonalise(diagonal, beside, basis)) return { status: 'limit' };
  const order = Array.from({ length: n }, (_, k) => k).sort((i, j) => diagonal[i]! - diagonal[j]!);
  const values = Float64Array.from(order, (k) => diagonal[k]! * scale);
  const vectors = new Float64Array(n * n);
  order.forEach((k, row) => vectors.set(basis.subarray(k * n, (k + 1) * n), row * n));
  return { status: 'found', values, vectors };
}

interface ThreeDiagonals {
  readonly diagonal: Float64Array;
  /** beside[k] couples k and k + 1; the last is 0. */
  readonly beside: Float64Array;
  /** Rows: the basis in which A has three diagonals. */
  readonly basis: Float64Array;
}

/** QᵀAQ with three diagonals; A is used up: the reflections are kept in the columns that they have emptied, then multiplied out. */
function threeDiagonals(n: number, a: Float64Array): ThreeDiagonals {
  for (let i = 0; i < n; i += 1) for (let j = 0; j < i; j += 1) a[j * n + i] = a[i * n + j]!;
  const diagonal = new Float64Array(n);
  const beside = new Float64Array(n);
  const halves = new Float64Array(n);
  const v = new Float64Array(n);
  const p = new Float64Array(n);
  for (let k = 0; k < n - 1; k += 1) {
    diagonal[k] = a[k * n + k]!;
    let sum = 0;
    for (let i = k + 1; i < n; i += 1) sum += a[k * n + i]! ** 2;
    const norm = sum > NEGLIGIBLE ** 2 ? Math.sqrt(sum) : 0;
    const head = a[k * n + k + 1]!;
    const target = head > 0 ? -norm : norm;
    beside[k] = target;
    // v = row − target·e, half = v·v/2; a row already empty needs no reflection.
    const half = norm === 0 ? 0 : target * (target - head);
    halves[k] = half;
    if (half === 0) continue;
    for (let i = k + 1; i < n; i += 1) v[i] = a[k * n + i]!;
    v[k + 1] = head - target;
    let vp = 0;
    for (let i = k + 1; i < n; i += 1) {
      let dot = 0;
      for (let j = k + 1, at = i * n + k + 1; j < n; j += 1, at += 1) dot += a[at]! * v[j]!;
      p[i] = dot / half;
      vp += v[i]! * p[i]!;
    }
    const share = vp / (2 * half);
    for (let i = k + 1; i < n; i += 1) p[i]! -= share * v[i]!;
    for (let i = k + 1; i < n; i += 1) {
      const vi = v[i]!;
      const pi = p[i]!;
      for (let j = k + 1, at = i * n + k + 1; j < n; j += 1, at += 1) a[at]! -= vi * p[j]! + pi * v[j]!;
    }
    for (let i = k + 1; i < n; i += 1) a[k * n + i] = v[i]!;
  }
  diagonal[n - 1] = a[n * n - 1]!;
  const basis = new Float64Array(n * n);
  for (let i = 0; i < n; i += 1) basis[i * n + i] = 1;
  // From the last reflection to the first, so that each meets only the block that it changes: rows r ← r − v (v·columns)/half.
  for (let k = n - 2; k >= 0; k -= 1) {
    const half = halves[k]!;
    if (half === 0) continue;
    for (let row = k + 1; row < n; row += 1) {
      let dot = 0;
      for (let i = k + 1; i < n; i += 1) dot += a[k * n + i]! * basis[row * n + i]!;
      dot /= half;
      for (let i = k + 1; i < n; i += 1) basis[row * n + i]! -= dot * a[k * n + i]!;
    }
  }
  return { diagonal, beside, basis };
}

/** Implicit QL with Wilkinson's shift; d becomes the eigenvalues, the rows of z their vectors. False where one did not settle. */
function diagonalise(d: Float64Array, e: Float64Array, z: Float64Array): boolean {
  const n = d.length;
  for (let l = 0; l < n; l += 1) {
    for (let turn = 0; ; turn += 1) {
      let m = l;
      while (m < n - 1 && Math.abs(e[m]!) > NEGLIGIBLE + Number.EPSILON * (Math.abs(d[m]!) + Math.abs(d[m + 1]!))) m += 1;
      if (m === l) break;
      if (turn === TURNS) return false;
      const half = (d[l + 1]! - d[l]!) / (2 * e[l]!);
      let g = d[m]! - d[l]! + e[l]! / (half + (half < 0 ? -1 : 1) * Math.hypot(half, 1));
      let s = 1;
      let c = 1;
      let p = 0;
      let cut = false;
      for (let i = m - 1; i >= l; i -= 1) {
        const f = s * e[i]!;
        const b = c * e[i]!;
        const square = f * f + g * g;
        const r = square > NEGLIGIBLE ** 2 ? Math.sqrt(square) : Math.hypot(f, g);
        e[i + 1] = r;
        if (r === 0) {
          d[i + 1]! -= p;
          e[m] = 0;
          cut = true;
          break;
        }
        s = f / r;
        c = g / r;
        g = d[i + 1]! - p;
        const q = (d[i]! - g) * s + 2 * c * b;
        p = s * q;
        d[i + 1] = g + p;
        g = c * q - b;
        for (let k = 0, low = i * n, high = (i + 1) * n; k < n; k += 1, low += 1, high += 1) {
          const zLow = z[low]!;
          const zHigh = z[high]!;
          z[high] = s * zLow + c * zHigh;
          z[low] = c * zLow - s * zHigh;
        }
      }
      if (cut) continue;
      d[l]! -= p;
      e[l] = g;
      e[m] = 0;
    }
  }
  return true;
}
