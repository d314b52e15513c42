/** A long record as the means of a few samples each: all that a slow swing tells, in far fewer numbers. */
import type { SwingSamples } from './swingSums.ts';

/** Samples that a fit is made of where a record has more, if the swing leaves enough of them a period. */
const ENOUGH = 100_000;
const LEAST_A_PERIOD = 48;
/** A bin longer than so many times its samples' usual length has a gap in it. */
const GAP = 1.5;

/** Samples in a row that tell how fast a swing is, and places in the record that they are sought at. */
const LOOKED_AT = 32_768;
const PLACES = 24;

/** The part of a long record in which most happens. */
export function liveliest({ t, x, use }: SwingSamples): SwingSamples {
  const n = t.length;
  if (n <= LOOKED_AT) return { t, x, ...(use ? { use } : {}) };
  let [best, most] = [0, -1];
  for (let k = 0; k < PLACES; k++) {
    const from = Math.floor((k * (n - LOOKED_AT)) / (PLACES - 1));
    let [count, sum, squares] = [0, 0, 0];
    for (let i = from; i < from + LOOKED_AT; i += 8) {
      if (use && use[i] === 0) continue;
      const y = x[i]! - x[from]!;
      count += 1;
      sum += y;
      squares += y * y;
    }
    const spread = count > 0 ? squares / count - (sum / count) ** 2 : 0;
    if (spread > most) [best, most] = [from, spread];
  }
  const to = best + LOOKED_AT;
  return { t: t.subarray(best, to), x: x.subarray(best, to), ...(use ? { use: use.subarray(best, to) } : {}) };
}

/** How many samples go into one; 1 where the record is short, or a period has few. `frequency`: the fastest that the swing may have, rad/s; 0: not known. */
export function everyFor({ t }: SwingSamples, frequency: number): number {
  const n = t.length;
  const spacing = (t[n - 1]! - t[0]!) / Math.max(1, n - 1);
  return Math.max(1, Math.min(Math.floor(n / ENOUGH), frequency > 0 ? Math.floor((2 * Math.PI) / (frequency * spacing * LEAST_A_PERIOD)) : Infinity));
}

/**
 * Means of `every` samples, each at its mean time, with the time that such a mean averages over, s.
 * A mean is in use where more than half of its samples are, and is of those alone.
 *
 * Source: the mean of m samples dt apart blurs as an exposure of dt √(m² − 1) does, to second order; derived.
 */
export function binned({ t, x, use }: SwingSamples, every: number): { readonly samples: SwingSamples; readonly blur: number } {
  const n = Math.floor(t.length / every);
  const spacing = (t[t.length - 1]! - t[0]!) / Math.max(1, t.length - 1);
  const [times, values, used] = [new Float64Array(n), new Float64Array(n), new Uint8Array(n)];
  for (let b = 0; b < n; b++) {
    const from = b * every;
    let [count, sumT, sumX] = [0, 0, 0];
    for (let i = from; i < from + every; i++) {
      if (use && use[i] === 0) continue;
      count += 1;
      sumT += t[i]! - t[from]!;
      sumX += x[i]!;
    }
    const isWhole = t[from + every - 1]! - t[from]! <= GAP * (every - 1) * spacing;
    used[b] = isWhole && 2 * count > every ? 1 : 0;
    times[b] = used[b] === 1 ? t[from]! + sumT / count : (t[from]! + t[from + every - 1]!) / 2;
    values[b] = used[b] === 1 ? sumX / count : 0;
  }
  return { samples: { t: times, x: values, use: used }, blur: spacing * Math.sqrt(every * every - 1) };
}
