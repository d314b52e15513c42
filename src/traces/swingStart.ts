/** Where the search for a swing's frequency begins: the tallest peaks of the record's spectrum. */
import { powers, powerOfTwo } from '../numeric/fourier.ts';
import type { SwingSamples } from './swingSums.ts';

/** Bins that the record is put into for its spectrum. */
const MOST_BINS = 65_536;
/** Bins of a spectrum of fewer than this hold no peak. */
const FEWEST_BINS = 16;
/** Peaks that are kept: among them is any that stands in a range asked for. */
const MOST_PEAKS = 1000;
/** Peaks slower than so many cycles in the record are its drift. */
const FEWEST_CYCLES = 1.2;

/** The record in even bins of time, its straight line taken off; bins without a sample are 0. */
function evenly({ t, x, use }: SwingSamples): { readonly values: Float64Array; readonly step: number; readonly filled: number } {
  const n = t.length;
  const span = t[n - 1]! - t[0]!;
  // A bin a sample at the middle spacing; fewer where there are more samples than bins.
  const bins = Math.min(MOST_BINS, powerOfTwo(n));
  const step = span / Math.min(n - 1, bins - 1);
  const [sums, counts] = [new Float64Array(bins), new Float64Array(bins)];
  let [sn, sx, st, sxt, stt] = [0, 0, 0, 0, 0];
  for (let i = 0; i < n; i++) {
    if (use && use[i] === 0) continue;
    const [u, y] = [(t[i]! - t[0]!) / span, x[i]!];
    sn += 1; sx += y; st += u; sxt += u * y; stt += u * u;
  }
  const det = sn * stt - st * st;
  const slope = det > 0 ? (sn * sxt - st * sx) / det : 0;
  const level = (sx - slope * st) / Math.max(1, sn);
  for (let i = 0; i < n; i++) {
    if (use && use[i] === 0) continue;
    const bin = Math.min(bins - 1, Math.round((t[i]! - t[0]!) / step));
    sums[bin]! += x[i]! - level - (slope * (t[i]! - t[0]!)) / span;
    counts[bin]! += 1;
  }
  return { values: sums.map((sum, i) => (counts[i]! > 0 ? sum / counts[i]! : 0)), step, filled: Math.min(n, bins) };
}

/**
 * Frequencies ω, rad/s, of the tallest peaks, tallest first.
 * `within`: peaks outside this range are passed over.
 * Valid: samples in order. Source: periodogram with a Hann window, peak by a parabola through three of its bins.
 */
export function likelyFrequencies(samples: SwingSamples, many: number, within: readonly [number, number] = [0, Infinity]): readonly number[] {
  return peaksOf(samples).filter((omega) => omega >= within[0] && omega <= within[1]).slice(0, many);
}

/** Asked for again at every step of a reduction. */
const PEAKS = new WeakMap<Float64Array, { readonly use: Uint8Array | undefined; readonly found: readonly number[] }>();

function peaksOf(samples: SwingSamples): readonly number[] {
  const kept = PEAKS.get(samples.x);
  if (kept && kept.use === samples.use) return kept.found;
  const found = samples.t.length < FEWEST_BINS ? [] : findPeaks(samples);
  PEAKS.set(samples.x, { use: samples.use, found });
  return found;
}

/** Places of the peaks, rad/s, the tallest first. */
function findPeaks(samples: SwingSamples): readonly number[] {
  const { values, step, filled } = evenly(samples);
  for (let i = 0; i < filled; i++) values[i]! *= 0.5 - 0.5 * Math.cos((2 * Math.PI * (i + 0.5)) / filled);
  // A peak between two bins of the record's own length would be cut by half: twice as many.
  const padded = new Float64Array(powerOfTwo(2 * values.length));
  padded.set(values);
  const found = powers(padded);
  const unit = (2 * Math.PI) / (padded.length * step);
  const cycle = padded.length / filled;
  const peaks: { readonly at: number; readonly power: number }[] = [];
  for (let j = Math.max(1, Math.floor(FEWEST_CYCLES * cycle)); j < found.length - 1; j++) {
    const [a, b, c] = [found[j - 1]!, found[j]!, found[j + 1]!];
    if (b >= a && b > c) peaks.push({ at: j, power: b });
  }
  return peaks.sort((a, b) => b.power - a.power).slice(0, MOST_PEAKS).map(({ at }) => {
    const [la, lb, lc] = [found[at - 1]!, found[at]!, found[at + 1]!].map((value) => Math.log(Math.max(value, 1e-300)));
    const bend = la! - 2 * lb! + lc!;
    return (at + (bend < 0 ? (la! - lc!) / (2 * bend) : 0)) * unit;
  });
}
