/** A long record thinned for a picture: the least and greatest sample of blocks, and of blocks of blocks, so that any stretch of it is drawn as it is seen. */

/** Blocks of one size: the least and the greatest sample of each, and where they stand. Of a block of gaps alone: Infinity and −Infinity. */
export interface MinMaxLevel {
  readonly low: Float32Array;
  readonly high: Float32Array;
  readonly lowAt: Int32Array;
  readonly highAt: Int32Array;
}

export interface MinMaxPyramid {
  /** Level 0 has blocks of FIRST samples, each further one of FACTOR times as many. */
  readonly levels: readonly MinMaxLevel[];
}

/** When the samples were taken: evenly from a first one, or each at its own time, s. */
export type SampleTimes = { readonly from: number; readonly step: number } | Float64Array;

/** What the page has of a trace: samples in single precision, enough for a picture. */
export interface TracePicture {
  readonly times: SampleTimes;
  /** SI unit of the reading; NaN: no sample. */
  readonly values: Float32Array;
  readonly pyramid: MinMaxPyramid;
}

/** A stretch of the record as it is drawn; null: the line is broken there. */
export interface Envelope {
  readonly times: readonly number[];
  readonly values: readonly (number | null)[];
}

/** Samples of the finest blocks, and blocks of the next level. */
const FIRST = 64;
const FACTOR = 8;

const emptyLevel = (blocks: number): MinMaxLevel => ({ low: new Float32Array(blocks).fill(Infinity), high: new Float32Array(blocks).fill(-Infinity), lowAt: new Int32Array(blocks), highAt: new Int32Array(blocks) });

/** Extremes of blocks, and of blocks of blocks. Samples that are NaN count for nothing. */
export function buildPyramid(values: Float32Array): MinMaxPyramid {
  const n = values.length;
  let blocks = Math.ceil(n / FIRST);
  const first = emptyLevel(blocks);
  for (let b = 0; b < blocks; b++) {
    let [low, high, lowAt, highAt] = [Infinity, -Infinity, 0, 0];
    const to = Math.min(n, (b + 1) * FIRST);
    for (let i = b * FIRST; i < to; i++) {
      const value = values[i]!;
      if (value < low) {
        low = value;
        lowAt = i;
      }
      if (value > high) {
        high = value;
        highAt = i;
      }
    }
    first.low[b] = low; first.high[b] = high; first.lowAt[b] = lowAt; first.highAt[b] = highAt;
  }
  const levels = [first];
  while (blocks > FACTOR) {
    const below = levels.at(-1)!;
    const next = Math.ceil(blocks / FACTOR);
    const level = emptyLevel(next);
    for (let c = 0; c < blocks; c++) {
      const b = Math.floor(c / FACTOR);
      if (below.low[c]! < level.low[b]!) {
        level.low[b] = below.low[c]!;
        level.lowAt[b] = below.lowAt[c]!;
      }
      if (below.high[c]! > level.high[b]!) {
        level.high[b] = below.high[c]!;
        level.highAt[b] = below.highAt[c]!;
      }
    }
    levels.push(level);
    blocks = next;
  }
  return { levels };
}

/** Index of the least and of the greatest sample in [from, to); null where all of them are NaN. */
export function extremesIn(values: Float32Array, { levels }: MinMaxPyramid, from: number, to: number): readonly [number, number] | null {
  let [low, high, lowAt, highAt] = [Infinity, -Infinity, -1, -1];
  let at = from;
  while (at < to) {
    let level = -1;
    let size = 1;
    for (let next = FIRST; level + 1 < levels.length && at % next === 0 && at + next <= to; next *= FACTOR) {
      level += 1;
      size = next;
    }
    if (level < 0) {
      const value = values[at]!;
      if (value < low) [low, lowAt] = [value, at];
      if (value > high) [high, highAt] = [value, at];
    } else {
      const block = at / size;
      const { low: lows, high: highs, lowAt: lowsAt, highAt: highsAt } = levels[level]!;
      if (lows[block]! < low) [low, lowAt] = [lows[block]!, lowsAt[block]!];
      if (highs[block]! > high) [high, highAt] = [highs[block]!, highsAt[block]!];
    }
    at += size;
  }
  return lowAt < 0 ? null : [lowAt, highAt];
}

export const timeOf = (times: SampleTimes, i: number): number => (times instanceof Float64Array ? times[i]! : times.from + i * times.step);

/** First sample of `count` not before a time. */
export function indexAt(times: SampleTimes, count: number, time: number): number {
  if (!(times instanceof Float64Array)) return Math.min(count, Math.max(0, Math.ceil((time - times.from) / times.step - 1e-9)));
  let [low, high] = [0, times.length];
  while (low < high) {
    const middle = (low + high) >> 1;
    if (times[middle]! < time) low = middle + 1;
    else high = middle;
  }
  return low;
}

/**
 * The record from one time to another for so many columns of the picture: every sample where there are few, else the least and the greatest of
 * each column in their order. The samples just outside are taken in, so that the line goes on to the edge; where samples are NaN it is broken.
 */
export function window({ times, values, pyramid }: TracePicture, from: number, to: number, columns: number): Envelope {
  const n = values.length;
  const [first, last] = [indexAt(times, n, from), indexAt(times, n, to)];
  const found: { readonly times: number[]; readonly values: (number | null)[] } = { times: [], values: [] };
  const put = (i: number): void => {
    const value = values[i]!;
    found.times.push(timeOf(times, i));
    found.values.push(Number.isNaN(value) ? null : value);
  };
  if (last - first <= 2 * columns) {
    for (let i = Math.max(0, first - 1); i < Math.min(n, last + 1); i++) put(i);
    return found;
  }
  if (first > 0) put(first - 1);
  // Columns of time, not of samples: a burst of fast samples must not take the columns of the slow ones beside it.
  for (let c = 0, a = first; c < columns; c++) {
    const b = c === columns - 1 ? last : Math.min(last, indexAt(times, n, from + ((to - from) * (c + 1)) / columns));
    if (a >= b) continue;
    const extremes = extremesIn(values, pyramid, a, b);
    if (!extremes) put(a);
    else if (extremes[0] === extremes[1]) put(extremes[0]);
    else {
      put(Math.min(...extremes));
      put(Math.max(...extremes));
    }
    a = b;
  }
  if (last < n) put(last);
  return found;
}
