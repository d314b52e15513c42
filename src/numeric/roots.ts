/** A root of a function of one variable between two points where its sign differs. */

/** Bisection alone needs some 1100 halvings at worst; Brent's method needs some ten for a smooth function. */
const ITERATION_LIMIT = 200;

export type RootResult =
  | { readonly status: 'found'; readonly x: number; readonly iterations: number }
  /** The signs at the ends agree · a value on the way is not finite · the limit of iterations was reached. */
  | { readonly status: 'notBracketed' | 'notFinite' | 'limit' };

/**
 * x between a and b with f(x) = 0, by Brent's method.
 *
 * Valid: f continuous, with different signs at the ends (or zero at one).
 * `tolerance` is absolute in x; rounding of x is added to it. 0 gives all digits that f has.
 * Source: R. P. Brent, Algorithms for Minimization without Derivatives, 1973, ch. 4 (from memory).
 * @throws RangeError when an end is not finite or the tolerance is negative
 */
export function rootBetween(f: (x: number) => number, from: number, to: number, tolerance = 0): RootResult {
  if (!Number.isFinite(from) || !Number.isFinite(to)) throw new RangeError(`rootBetween: from ${from} to ${to}`);
  if (!(tolerance >= 0)) throw new RangeError(`rootBetween: the tolerance is ${tolerance}`);
  let a = from;
  let b = to;
  let fa = f(a);
  let fb = f(b);
  if (!Number.isFinite(fa) || !Number.isFinite(fb)) return { status: 'notFinite' };
  if (fa === 0) return { status: 'found', x: a, iterations: 0 };
  if (fb !== 0 && fa > 0 === fb > 0) return { status: 'notBracketed' };
  // b is the best point, c the other side of the root, a the point before b.
  let c = a;
  let fc = fa;
  let step = b - a;
  let before = step;
  for (let k = 0; k < ITERATION_LIMIT; k += 1) {
    if (Math.abs(fc) < Math.abs(fb)) {
      [a, b, c] = [b, c, b];
      [fa, fb, fc] = [fb, fc, fb];
    }
    const least = 2 * Number.EPSILON * Math.abs(b) + tolerance / 2;
    const middle = (c - b) / 2;
    if (Math.abs(middle) <= least || fb === 0) return { status: 'found', x: b, iterations: k };
    const proposed = Math.abs(before) >= least && Math.abs(fa) > Math.abs(fb) ? interpolate({ a, b, c, fa, fb, fc }) : null;
    const accepted = proposed !== null && proposed * middle > 0 && Math.abs(proposed) < Math.min(1.5 * Math.abs(middle) - least / 2, Math.abs(before) / 2);
    before = accepted ? step : middle;
    step = accepted ? proposed : middle;
    a = b;
    fa = fb;
    b += Math.abs(step) > least ? step : Math.sign(middle) * least;
    fb = f(b);
    if (!Number.isFinite(fb)) return { status: 'notFinite' };
    if (fb > 0 === fc > 0) {
      c = a;
      fc = fa;
      step = b - a;
      before = step;
    }
  }
  return { status: 'limit' };
}

/** Step from b by the secant (a = c) or inverse quadratic interpolation. */
function interpolate(p: { a: number; b: number; c: number; fa: number; fb: number; fc: number }): number {
  const s = p.fb / p.fa;
  if (p.a === p.c) return (s * (p.c - p.b)) / (s - 1);
  const q = p.fa / p.fc;
  const r = p.fb / p.fc;
  const over = s * ((p.c - p.b) * q * (q - r) - (p.b - p.a) * (r - 1));
  return -over / ((q - 1) * (r - 1) * (s - 1));
}
