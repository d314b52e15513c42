/** Noise that is not white: how much wider its correlation makes a linear estimate, from the residuals themselves. */
import { laggedProducts } from '../numeric/fourier.ts';

export interface NoiseCorrelation {
  /** ρ(l) for l = 0 … lags, tapered (Parzen); ρ(0) = 1. */
  readonly correlation: Float64Array;
  /** Residuals that it rests on. */
  readonly count: number;
}

/** The correlation is taken from this many residuals at the most, of the middle of the record. */
const MOST = 65_536;

/** Parzen's taper, which leaves no variance negative. Source: Priestley, Spectral Analysis and Time Series (1981) 6.2.3, from memory. */
export const parzen = (u: number): number => (u <= 0.5 ? 1 - 6 * u * u * (1 - u) : 2 * (1 - u) ** 3);

/**
 * Autocorrelation of the residuals up to `lags` samples; those that were left out count for nothing.
 * Valid: samples evenly spaced, or nearly so.
 */
export function noiseCorrelation(residuals: Float64Array, use: Uint8Array | undefined, lags: number): NoiseCorrelation {
  const n = Math.min(residuals.length, MOST);
  const from = (residuals.length - n) >> 1;
  const r = residuals.slice(from, from + n);
  const ones = Float64Array.from({ length: n }, (_, i) => (use === undefined || use[from + i] !== 0 ? 1 : 0));
  for (let i = 0; i < n; i++) if (ones[i] === 0) r[i] = 0;
  const most = Math.max(0, Math.min(lags, Math.floor(n / 4)));
  const products = laggedProducts(r, most);
  const pairs = laggedProducts(ones, most);
  const variance = products[0]! / Math.max(1, pairs[0]!);
  return {
    correlation: Float64Array.from(products, (sum, l) => (l === 0 ? 1 : variance > 0 && pairs[l]! > 0.5 ? (parzen(l / (most + 1)) * sum) / pairs[l]! / variance : 0)),
    count: pairs[0]!,
  };
}

/** What a factor is worth that chance alone would make of white noise: so many of its own u. */
const BY_CHANCE = 2;
/** No correlation makes an estimate more certain than this part of its variance. */
const LEAST = 0.05;

/**
 * Variance of Σ w_i x_i with the correlation over that with white noise as strong: 1 + 2 Σ ρ(l) Σ_i w_i w_{i+l}/Σ w².
 * 1 where the difference is no more than white noise itself would show. `kept`: what the fit leaves of it on the average (fittedAway.ts).
 *
 * Source: variance of a sum of correlated values (GUM 5.2.2); u of the sum by Bartlett's formula for white noise, var ρ(l) = 1/n (from memory).
 */
export function varianceFactor({ correlation, count }: NoiseCorrelation, weights: Float64Array, kept = 1): number {
  const lags = Math.min(correlation.length - 1, weights.length - 1);
  if (lags < 1) return 1;
  const products = laggedProducts(weights, lags);
  const whole = products[0]!;
  if (!(whole > 0)) return 1;
  let [factor, chance] = [1, 0];
  for (let l = 1; l <= lags; l++) {
    const part = (2 * products[l]!) / whole;
    factor += part * correlation[l]!;
    chance += (part * parzen(l / correlation.length)) ** 2 / count;
  }
  const corrected = factor / kept;
  return Math.abs(corrected - 1) < (BY_CHANCE * Math.sqrt(chance)) / kept ? 1 : Math.max(LEAST, corrected);
}
