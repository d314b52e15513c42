/** Fourier transforms of real records: power at each frequency, and sums of lagged products. */
import FFT from 'fft.js';

/** Smallest power of two that holds n, at least 2. */
export const powerOfTwo = (n: number): number => 2 ** Math.max(1, Math.ceil(Math.log2(n)));

/** |Σ x_k e^{−2πijk/N}|² for j = 0 … N/2. Valid: N = x.length a power of two. */
export function powers(x: Float64Array): Float64Array {
  const n = x.length;
  const fft = new FFT(n);
  const out = fft.createComplexArray();
  fft.realTransform(out, x);
  return Float64Array.from({ length: n / 2 + 1 }, (_, j) => out[2 * j]! ** 2 + out[2 * j + 1]! ** 2);
}

/** Σ_k x_k x_{k+l} for l = 0 … lags. Valid: lags < x.length. Source: Wiener–Khinchin theorem, the record padded with zeros. */
export function laggedProducts(x: Float64Array, lags: number): Float64Array {
  const n = powerOfTwo(x.length + lags + 1);
  const padded = new Float64Array(n);
  padded.set(x);
  const fft = new FFT(n);
  const out = fft.createComplexArray();
  fft.realTransform(out, padded);
  fft.completeSpectrum(out);
  for (let j = 0; j < n; j++) {
    out[2 * j] = out[2 * j]! ** 2 + out[2 * j + 1]! ** 2;
    out[2 * j + 1] = 0;
  }
  const back: number[] = fft.createComplexArray();
  fft.inverseTransform(back, out);
  return Float64Array.from({ length: lags + 1 }, (_, l) => back[2 * l]!);
}
