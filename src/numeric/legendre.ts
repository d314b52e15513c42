/** Legendre polynomials and the Gauss rule that belongs to them. */

/** P_0 … P_{degree + 1} at x · 1 · |x| ≤ 1. Source: three-term recurrence, Abramowitz & Stegun 22.7.10 (from memory). */
export function legendre(degree: number, eta: number): Float64Array {
  const p = new Float64Array(degree + 2);
  p[0] = 1;
  p[1] = eta;
  for (let j = 1; j <= degree; j += 1) p[j + 1] = ((2 * j + 1) * eta * p[j]! - j * p[j - 1]!) / (j + 1);
  return p;
}

/** ∫ over −1 … 1 ≈ Σ weight · f(point). */
export interface GaussRule {
  readonly points: readonly number[];
  readonly weights: readonly number[];
}

const NEWTON_STEPS = 8;

/**
 * Gauss–Legendre rule, exact for polynomials of degree 2·count − 1.
 *
 * Source: Abramowitz & Stegun 25.4.29 (from memory); Newton's method from the usual cosine start.
 * @throws RangeError when the count is not a whole number from 1 on
 */
export function gaussRule(count: number): GaussRule {
  if (!(Number.isInteger(count) && count >= 1)) throw new RangeError(`gaussRule: ${count} points`);
  const points: number[] = [];
  const weights: number[] = [];
  for (let i = 0; i < count; i += 1) {
    let x = Math.cos((Math.PI * (i + 0.75)) / (count + 0.5));
    let slope = 1;
    for (let turn = 0; turn < NEWTON_STEPS; turn += 1) {
      const p = legendre(count, x);
      slope = (count * (p[count - 1]! - x * p[count]!)) / (1 - x * x);
      x -= p[count]! / slope;
    }
    points.push(x);
    weights.push(2 / ((1 - x * x) * slope * slope));
  }
  return { points, weights };
}
