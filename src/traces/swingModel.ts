/** The fitted swing of a struck pendulum as few numbers: its state at the start of each stretch between shots, and the rest line. */

export interface SwingStretch {
  /** s, the first sample or the shot that begins it. */
  readonly begins: number;
  /** x about the rest line, and x′/ω_n, just after; unit of the reading. */
  readonly position: number;
  readonly velocity: number;
}

export interface SwingModel {
  /** ω_n, rad/s, > 0. */
  readonly frequency: number;
  /** ζ, 0 ≤ ζ < 1. */
  readonly ratio: number;
  /** In order of time. */
  readonly stretches: readonly SwingStretch[];
  /** Rest line: straight from knot to knot, level beyond the outer ones; unit of the reading. */
  readonly rest: { readonly times: readonly number[]; readonly values: readonly number[] };
}

/** The rest line at t. */
export function restAt({ rest: { times, values } }: SwingModel, t: number): number {
  const last = times.length - 1;
  if (t <= times[0]!) return values[0]!;
  if (t >= times[last]!) return values[last]!;
  let [low, high] = [0, last];
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (times[middle]! <= t) low = middle;
    else high = middle;
  }
  return values[low]! + ((values[high]! - values[low]!) * (t - times[low]!)) / (times[high]! - times[low]!);
}

/**
 * The model at each of the times, in the unit of the reading.
 * Valid: times rising; before the first stretch its own motion is carried backward.
 */
export function swingOver(model: SwingModel, times: ArrayLike<number>): Float64Array {
  const { frequency: w, ratio: z, stretches } = model;
  const root = Math.sqrt(1 - z * z);
  const found = new Float64Array(times.length);
  let k = 0;
  for (let i = 0; i < times.length; i++) {
    const t = times[i]!;
    while (k + 1 < stretches.length && stretches[k + 1]!.begins <= t) k += 1;
    const { begins, position, velocity } = stretches[k]!;
    const s = t - begins;
    const e = Math.exp(-z * w * s);
    const [c, d] = [e * Math.cos(w * root * s), (e * Math.sin(w * root * s)) / root];
    found[i] = restAt(model, t) + (c + z * d) * position + d * velocity;
  }
  return found;
}
