/** Shots that nobody listed: the times at which a swing's velocity jumps while its position goes on. */
import type { Oscillation, SwingSamples } from './swingSums.ts';

export interface FoundJump {
  /** s. */
  readonly time: number;
  /** Jump of x′ over ω_n, unit of x. */
  readonly jump: number;
  /** Over the usual size of what the same filter makes of the record's noise. */
  readonly score: number;
}

/** The record is put into so many bins a period. */
const BINS_A_PERIOD = 48;
/** Reach of the filter to each side, bins. */
const REACH = BINS_A_PERIOD / 6;
/** A jump that stands out less is not taken; by chance of normal noise once in some 10⁹ bins. */
const STANDS_OUT = 6.5;
/** Jumps closer than this part of a period are one. */
const CLOSEST = 0.3;
/** Periods to each side over which the rest line counts as straight. */
const SLOW = 2;
/** A jump smaller than this part of the largest is the filter's own side of it. */
const SMALLEST = 0.03;

/**
 * Times at which the second-order recurrence of the free swing fails: x(t+τ) − 2e^{−ζωτ}cos(ω_dτ) x(t) + e^{−2ζωτ} x(t−τ) is zero for a
 * free swing about zero, and a pulse of known shape where the velocity jumps; that shape is looked for.
 *
 * Valid: ω_n and ζ known to some per cent; ten or more samples a period. Source: derived; matched filter for white noise.
 */
export function findJumps(samples: SwingSamples, { frequency: w, ratio: z }: Oscillation): readonly FoundJump[] {
  const period = (2 * Math.PI) / w;
  const step = Math.max(period / BINS_A_PERIOD, (samples.t[samples.t.length - 1]! - samples.t[0]!) / Math.max(1, samples.t.length - 1));
  const x = evenBins(samples, step);
  const reach = Math.max(2, Math.round((REACH * (period / BINS_A_PERIOD)) / step));
  if (x.length < 6 * reach) return [];
  const root = Math.sqrt(1 - z * z);
  const tau = reach * step;
  const e = Math.exp(-z * w * tau);
  const [turn, fall] = [2 * e * Math.cos(w * root * tau), e * e];
  const response = (s: number): number => (s <= 0 ? 0 : (Math.exp(-z * w * s) * Math.sin(w * root * s)) / root);
  // What a jump at bin 0 makes of the recurrence at bin k.
  const shape = Array.from({ length: 2 * reach + 1 }, (_, k) => {
    const s = (k - reach) * step;
    return response(s + tau) - turn * response(s) + fall * response(s - tau);
  });
  const size = shape.reduce((sum, value) => sum + value * value, 0);
  const found = new Float64Array(x.length);
  const raw = new Float64Array(x.length - 2 * reach);
  for (let i = 0; i < raw.length; i++) raw[i] = x[i + 2 * reach]! - turn * x[i + reach]! + fall * x[i]!;
  // What the rest line makes of it changes slowly.
  const slow = slowLevel(raw, Math.round((SLOW * period) / step));
  const wrong = new Float64Array(x.length);
  for (let i = 0; i < raw.length; i++) wrong[i + reach] = raw[i]! - slow[i]!;
  for (let i = 2 * reach; i < x.length - 2 * reach; i++) {
    let sum = 0;
    for (let k = -reach; k <= reach; k++) sum += wrong[i + k]! * shape[k + reach]!;
    found[i] = sum / size;
  }
  return peaksOf(found, 2 * reach, Math.max(2, Math.round((CLOSEST * period) / step))).map(({ at, height, score }) => ({ time: samples.t[0]! + at * step, jump: height, score }));
}

/** Means over even bins; one without a sample lies on the line between its neighbours. */
function evenBins({ t, x, use }: SwingSamples, step: number): Float64Array {
  const bins = Math.floor((t[t.length - 1]! - t[0]!) / step) + 1;
  const [sums, counts] = [new Float64Array(bins), new Float64Array(bins)];
  for (let i = 0; i < t.length; i++) {
    if (use && use[i] === 0) continue;
    const bin = Math.min(bins - 1, Math.round((t[i]! - t[0]!) / step));
    sums[bin]! += x[i]!;
    counts[bin]! += 1;
  }
  const values = sums.map((sum, i) => (counts[i]! > 0 ? sum / counts[i]! : NaN));
  let last = -1;
  for (let i = 0; i < bins; i++) {
    if (Number.isNaN(values[i]!)) continue;
    for (let j = last + 1; j < i; j++) values[j] = last < 0 ? values[i]! : values[last]! + ((values[i]! - values[last]!) * (j - last)) / (i - last);
    last = i;
  }
  for (let j = last + 1; j < bins; j++) values[j] = last < 0 ? 0 : values[last]!;
  return values;
}

/** Median over `half` values to each side, taken at intervals and joined by straight lines: the pulses of a few jumps do not move it. */
function slowLevel(x: Float64Array, half: number): Float64Array {
  const every = Math.max(1, half >> 2);
  const at = Array.from({ length: Math.floor((x.length - 1) / every) + 1 }, (_, k) => {
    const about = x.slice(Math.max(0, k * every - half), k * every + half + 1).sort();
    return about[about.length >> 1]!;
  });
  return x.map((_, i) => {
    const k = Math.floor(i / every);
    const next = at[k + 1] ?? at[k]!;
    return at[k]! + ((next - at[k]!) * (i - k * every)) / every;
  });
}

function peaksOf(found: Float64Array, edge: number, apart: number): readonly { readonly at: number; readonly height: number; readonly score: number }[] {
  const sizes = Array.from(found.subarray(edge, found.length - edge), Math.abs).sort((a, b) => a - b);
  if (sizes.length === 0) return [];
  const usual = 1.4826 * sizes[sizes.length >> 1]!;
  const largest = sizes[sizes.length - 1]!;
  const least = Math.max(STANDS_OUT * usual, SMALLEST * largest);
  const peaks: { readonly at: number; readonly height: number; readonly score: number }[] = [];
  for (let i = edge; i < found.length - edge; i++) {
    const here = Math.abs(found[i]!);
    if (!(here > least)) continue;
    let isTop = true;
    for (let k = Math.max(edge, i - apart); k <= Math.min(found.length - edge - 1, i + apart) && isTop; k++) if (Math.abs(found[k]!) > here || (Math.abs(found[k]!) === here && k < i)) isTop = false;
    if (!isTop) continue;
    const [a, b, c] = [Math.abs(found[i - 1]!), here, Math.abs(found[i + 1]!)];
    const bend = a - 2 * b + c;
    peaks.push({ at: i + (bend < 0 ? (a - c) / (2 * bend) : 0), height: found[i]!, score: usual > 0 ? here / usual : Infinity });
  }
  return peaks;
}

/** Hysteresis of a trigger about the middle of its range, as a part of it. */
const HYSTERESIS = 0.2;

/** Times at which a trigger rises through the middle of its range, between the two samples. Valid: samples in order; a trigger that falls at the shot is turned over first. */
export function risesOf(t: Float64Array, trigger: Float64Array): readonly number[] {
  let [low, high] = [Infinity, -Infinity];
  for (const value of trigger) if (!Number.isNaN(value)) {
    low = Math.min(low, value);
    high = Math.max(high, value);
  }
  if (!(high > low)) return [];
  const half = (low + high) / 2;
  const armedBelow = half - HYSTERESIS * (high - low);
  const rises: number[] = [];
  let armed = false;
  for (let i = 0; i < t.length; i++) {
    const value = trigger[i]!;
    if (value < armedBelow) armed = true;
    if (!armed || !(value >= half)) continue;
    armed = false;
    const before = trigger[i - 1]!;
    rises.push(before < half ? t[i - 1]! + ((t[i]! - t[i - 1]!) * (half - before)) / (value - before) : t[i]!);
  }
  return rises;
}

