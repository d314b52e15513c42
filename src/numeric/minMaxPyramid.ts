/** A long record thinned for a picture: the least and greatest sample of blocks, and of blocks of blocks, so that any stretch of it is drawn as it is seen. */

export interface MinMaxPyramid {
  /** By level: index of the least and of the greatest sample of each block, one after the other. Level 0 has blocks of FIRST samples, each further one of FACTOR times as many. */
  readonly levels: readonly Int32Array[];
}

/** Samples of the finest blocks, and blocks of the next level. */
const FIRST = 64;
const FACTOR = 8;

/** Valid: no NaN among the values. */
export function buildPyramid(values: Float32Array): MinMaxPyramid {
  const levels: Int32Array[] = [];
  let blocks = Math.ceil(values.length / FIRST);
  const first = new Int32Array(2 * blocks);
  for (let b = 0; b < blocks; b++) {
    let [low, high] = [b * FIRST, b * FIRST];
    for (let i = b * FIRST + 1; i < Math.min(values.length, (b + 1) * FIRST); i++) {
      if (values[i]! < values[low]!) low = i;
      if (values[i]! > values[high]!) high = i;
    }
    [first[2 * b], first[2 * b + 1]] = [low, high];
  }
  levels.push(first);
  while (blocks > FACTOR) {
    const below = levels.at(-1)!;
    const next = Math.ceil(blocks / FACTOR);
    const level = new Int32Array(2 * next);
    for (let b = 0; b < next; b++) {
      let [low, high] = [below[2 * b * FACTOR]!, below[2 * b * FACTOR + 1]!];
      for (let c = b * FACTOR + 1; c < Math.min(blocks, (b + 1) * FACTOR); c++) {
        if (values[below[2 * c]!]! < values[low]!) low = below[2 * c]!;
        if (values[below[2 * c + 1]!]! > values[high]!) high = below[2 * c + 1]!;
      }
      [level[2 * b], level[2 * b + 1]] = [low, high];
    }
    levels.push(level);
    blocks = next;
  }
  return { levels };
}

/** Index of the least and of the greatest sample in [from, to). Valid: from < to. */
export function extremesIn(values: Float32Array, { levels }: MinMaxPyramid, from: number, to: number): readonly [number, number] {
  let [low, high] = [from, from];
  const take = (l: number, h: number): void => {
    if (values[l]! < values[low]!) low = l;
    if (values[h]! > values[high]!) high = h;
  };
  let at = from;
  while (at < to) {
    let level = -1;
    let size = FIRST;
    while (level + 1 < levels.length && at % size === 0 && at + size <= to) {
      level += 1;
      size *= FACTOR;
    }
    if (level < 0) {
      take(at, at);
      at += 1;
      continue;
    }
    const block = at / (size / FACTOR);
    take(levels[level]![2 * block]!, levels[level]![2 * block + 1]!);
    at += size / FACTOR;
  }
  return [low, high];
}

/** When the samples were taken: evenly from a first one, or each at its own time, s. */
export type SampleTimes = { readonly from: number; readonly step: number; readonly count: number } | Float64Array;

/** What the page has of a trace: samples in single precision, enough for a picture. */
export interface TracePicture {
  readonly times: SampleTimes;
  /** SI unit of the reading, less `base`, which single precision would take digits from. */
  readonly values: Float32Array;
  readonly base: number;
  readonly pyramid: MinMaxPyramid;
}

export const timeAt = (times: SampleTimes, i: number): number => (times instanceof Float64Array ? times[i]! : times.from + i * times.step);

/** First sample not before a time. */
export function indexAt(times: SampleTimes, time: number): number {
  if (!(times instanceof Float64Array)) return Math.min(times.count, Math.max(0, Math.ceil((time - times.from) / times.step - 1e-9)));
  let [low, high] = [0, times.length];
  while (low < high) {
    const middle = (low + high) >> 1;
    if (times[middle]! < time) low = middle + 1;
    else high = middle;
  }
  return low;
}

export interface Thinned {
  readonly t: readonly number[];
  readonly y: readonly number[];
}

/**
 * The record from one time to another for so many columns of the picture: every sample where there are few, else the least and the greatest of
 * each column in their order. The samples just outside are taken in, so that the line goes on to the edge.
 */
export function windowOf({ times, values, base, pyramid }: TracePicture, from: number, to: number, columns: number): Thinned {
  const n = values.length;
  const [first, last] = [Math.max(0, indexAt(times, from) - 1), Math.min(n, indexAt(times, to) + 1)];
  const indices: number[] = [];
  if (last - first <= 2 * columns) for (let i = first; i < last; i++) indices.push(i);
  else {
    for (let c = 0; c < columns; c++) {
      const [a, b] = [first + Math.floor(((last - first) * c) / columns), first + Math.floor(((last - first) * (c + 1)) / columns)];
      if (a >= b) continue;
      const [low, high] = extremesIn(values, pyramid, a, b);
      if (low === high) indices.push(low);
      else indices.push(Math.min(low, high), Math.max(low, high));
    }
  }
  return { t: indices.map((i) => timeAt(times, i)), y: indices.map((i) => values[i]! + base) };
}
