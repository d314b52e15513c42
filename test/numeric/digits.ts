/** How many digits of a number agree with a reference: NIST's log relative error. */

/** −log₁₀ of the relative difference; 17 where the two are the same double. The absolute difference counts against a reference of zero. */
export function digits(found: number, reference: number): number {
  if (found === reference) return 17;
  return -Math.log10(Math.abs(reference === 0 ? found : found / reference - 1));
}
