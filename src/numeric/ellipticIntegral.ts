/** The complete elliptic integral of the first kind. */

/** The arithmetic–geometric mean doubles its digits each round: ten rounds suffice for any m that a double can hold. */
const ROUND_LIMIT = 40;

/**
 * K(m) = ∫₀^{π/2} dφ/√(1 − m sin²φ) = π/(2 agm(1, √(1 − m))), parameter m = k².
 *
 * Valid: m < 1. Relative accuracy some 1e-15 where 1 − m is exact.
 * Source: DLMF 19.8.5 (from memory).
 * @throws RangeError when m is not below 1
 */
export function completeEllipticK(m: number): number {
  if (!(m < 1 && m > -Infinity)) throw new RangeError(`completeEllipticK: m is ${m}`);
  let a = 1;
  let g = Math.sqrt(1 - m);
  for (let k = 0; k < ROUND_LIMIT && Math.abs(a - g) > 1e-8 * a; k += 1) [a, g] = [(a + g) / 2, Math.sqrt(a * g)];
  // One more round leaves (a − g)²/(8a), below a double's resolution.
  return Math.PI / (a + g);
}
