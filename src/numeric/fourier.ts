/** Fourier transforms of real records: power at each frequency, and sums of lagged products. */
import FFT from 'fft.js';

/** Smallest power of two that holds n, at least 2. */
export const powerOfTwo = (n: number): number => 2 ** Math.max(1, Math.ceil(Math.log2(n)));

/** The tables of a size are made once. */
const PLANS = new Map<number, FFT>();

function planOf(n: number): FFT {
  const plan = PLANS.get(n) ?? new FFT(n);
  PLANS.set(n, plan);
  return plan;
}

/** |Σ x_k e^{−2πijk/N}|² for j = 0 … N/2. Valid: N = x.length a power of two. */
export function powers(x: Float64Array): Float64Array {
  const n = x.length;
  // Typed arrays in place of the library's plain ones, which take longer to make than to transform.
  const out = new Float64Array(2 * n);
  planOf(n).realTransform(out, x);
  const found = new Float64Array(n / 2 + 1);
  for (let j = 0; j <= n / 2; j++) found[j] = out[2 * j]! ** 2 + out[2 * j + 1]! ** 2;
  return found;
}

/** Σ_k x_k x_{k+l} for l = 0 … lags. Valid: lags < x.length. Source: Wiener–Khinchin theorem, the record padded with zeros. */
export function laggedProducts(x: Float64Array, lags: number): Float64Array {
  const n = powerOfTwo(x.length + lags + 1);
  const padded = new Float64Array(n);
  padded.set(x);
  const fft = planOf(n);
  const out = new Float64Array(2 * n);
  fft.realTransform(out, padded);
  fft.completeSpectrum(out);
  for (let j = 0; j < n; j++) {
    out[2 * j] = out[2 * j]! ** 2 + out[2 * j + 1]! ** 2;
    out[2 * j + 1] = 0;
  }
  const back = new Float64Array(2 * n);
  fft.inverseTransform(back, out);
  const found = new Float64Array(lags + 1);
  for (let l = 0; l <= lags; l++) found[l] = back[2 * l]!;
  return found;
}
