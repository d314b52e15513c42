/** Samples that tell nothing of the swing: at the end of the sensor's range, struck by a spike, or in a stretch that is left out. */
import { solveSymmetric } from '../numeric/linearAlgebra.ts';
import { extentOf } from '../numeric/samples.ts';

/** From one time to another, s; both ends belong to it. */
export interface Span {
  readonly from: number;
  readonly to: number;
}

/** Samples in a row at the end of the range that make it an end. */
const FEWEST_AT_END = 3;

/** The least step between two values that differ, of the neighbours in the record; 0 where all are the same. */
export function leastStep(x: Float64Array): number {
  let least = Infinity;
  for (let i = 1; i < x.length; i++) {
    const step = Math.abs(x[i]! - x[i - 1]!);
    if (step > 0 && step < least) least = step;
  }
  return Number.isFinite(least) ? least : 0;
}

/**
 * Runs of samples at the greatest or least value of the record whose neighbours lie clearly off it: the swing went on beyond.
 * The turn of a coarsely read swing stands on its last division too, but comes to it by one step.
 *
 * Valid: samples in order.
 */
export function clippedSpans(t: Float64Array, x: Float64Array): readonly Span[] {
  const [low, high] = extentOf(x);
  if (!(high > low)) return [];
  const step = leastStep(x);
  return [low, high].flatMap((end) => {
    const runs = runsAt(x, end);
    let [far, edges] = [0, 0];
    for (const [from, to] of runs) for (const beside of [from - 1, to + 1]) {
      const value = x[beside];
      if (value === undefined) continue;
      edges += 1;
      if (Math.abs(value - end) > 1.5 * step) far += 1;
    }
    return far * 2 > edges ? runs.map(([from, to]) => ({ from: t[from]!, to: t[to]! })) : [];
  }).sort((a, b) => a.from - b.from);
}

/** Runs at a value, of FEWEST_AT_END samples or more; first and last index. */
function runsAt(x: Float64Array, value: number): readonly (readonly [number, number])[] {
  const runs: (readonly [number, number])[] = [];
  for (let i = 0; i < x.length; i++) {
    if (x[i] !== value) continue;
    const from = i;
    while (i + 1 < x.length && x[i + 1] === value) i += 1;
    if (i - from + 1 >= FEWEST_AT_END) runs.push([from, i]);
  }
  return runs;
}

/** Samples that the usual deviation is taken from. */
const LOOKED_AT = 40_000;
/** A sample this many usual deviations off a curve through its neighbours is a spike; by chance of normal noise once in 10¹². */
const SPIKE = 8;
/** Of samples so close in a row that stand off, the whole run is one spike. */
const LONGEST_SPIKE = 40;

/** Samples on either side of a run that is looked at again. */
const BESIDE = 6;
/** A sample of a spike is off the curves from both sides by this part of what made it suspect. */
const OFF_BOTH = 0.5;

/** A strike bends the record without a spike: each sample goes on from one side or from the other. */
function isKink(t: Float64Array, x: Float64Array, from: number, to: number, off: (i: number) => number): boolean {
  if (from < BESIDE || to + BESIDE >= x.length) return false;
  let most = 0;
  for (let i = from; i <= to; i++) most = Math.max(most, Math.abs(off(i)));
  const [before, after] = [parabola(t, x, from - BESIDE), parabola(t, x, to + 1)];
  for (let i = from; i <= to; i++) if (Math.min(Math.abs(x[i]! - before(t[i]!)), Math.abs(x[i]! - after(t[i]!))) > OFF_BOTH * most) return false;
  return true;
}

/** The least-squares parabola through `BESIDE` samples from one on. */
function parabola(t: Float64Array, x: Float64Array, first: number): (time: number) => number {
  const middle = (t[first]! + t[first + BESIDE - 1]!) / 2;
  const half = (t[first + BESIDE - 1]! - t[first]!) / 2 || 1;
  const normal = [[0, 0, 0], [0, 0, 0], [0, 0, 0]];
  const right = [0, 0, 0];
  for (let i = first; i < first + BESIDE; i++) {
    const s = (t[i]! - middle) / half;
    const row = [1, s, s * s];
    row.forEach((a, j) => {
      right[j]! += a * x[i]!;
      row.forEach((b, k) => (normal[j]![k]! += a * b));
    });
  }
  const solved = solveSymmetric(normal, right);
  const [a, b, c] = solved.status === 'solved' ? solved.x : [x[first]!, 0, 0];
  return (time) => {
    const s = (time - middle) / half;
    return a! + s * (b! + s * c!);
  };
}

/**
 * Isolated samples, or short runs of them, off the cubic through two neighbours on each side.
 *
 * Valid: several samples a period; of uneven times the test is coarser. Source: fourth difference of the record, its scale by the median.
 */
export function spikeSpans(t: Float64Array, x: Float64Array): readonly Span[] {
  const n = x.length;
  if (n < 20) return [];
  const off = (i: number): number => x[i]! - (4 * (x[i - 1]! + x[i + 1]!) - x[i - 2]! - x[i + 2]!) / 6;
  const every = Math.max(1, Math.floor(n / LOOKED_AT));
  const sizes: number[] = [];
  for (let i = 2; i < n - 2; i += every) sizes.push(Math.abs(off(i)));
  sizes.sort((a, b) => a - b);
  // Of values on few divisions more than half of the differences may be 0.
  const usual = Math.max(1.4826 * sizes[sizes.length >> 1]!, leastStep(x) / 2);
  if (!(usual > 0)) return [];
  const marked: number[] = [];
  for (let i = 2; i < n - 2; i++) if (Math.abs(off(i)) > SPIKE * usual) marked.push(i);
  const spans: Span[] = [];
  for (let k = 0; k < marked.length; k++) {
    const from = marked[k]!;
    while (k + 1 < marked.length && marked[k + 1]! - marked[k]! <= 3) k += 1;
    const to = marked[k]!;
    // A run as long as that is no spike: noise of another size, or a step.
    if (to - from <= LONGEST_SPIKE && !isKink(t, x, from, to, off)) spans.push({ from: t[from]!, to: t[to]! });
  }
  return spans;
}

/** 1 for samples to be used, 0 for those within a span. */
export function maskOf(t: Float64Array, spans: readonly Span[]): Uint8Array {
  const use = new Uint8Array(t.length).fill(1);
  for (const { from, to } of spans) {
    let [low, high] = [0, t.length];
    while (low < high) {
      const middle = (low + high) >> 1;
      if (t[middle]! < from) low = middle + 1;
      else high = middle;
    }
    for (let i = low; i < t.length && t[i]! <= to; i++) use[i] = 0;
  }
  return use;
}
