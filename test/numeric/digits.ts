/** How many digits of a number agree with a reference: NIST's log relative error. */

/** −log₁₀ of the relative difference; 17 where the two are the same double. The absolute difference counts against a reference of zero. */
export function digits(found: number, reference: number): number {
  if (found === reference) return 17;
  return -Math.log10(Math.abs(reference === 0 ? found : found / reference - 1));
}

/** The fewest digits to which the named numbers agree with those expected; NaN, which no bound admits, where one is missing. */
export function fewestDigits(found: object, expected: Readonly<Record<string, number | string | undefined>>): number {
  const of = new Map<string, unknown>(Object.entries(found));
  return Math.min(...Object.entries(expected).map(([name, value]) => digits(Number(of.get(name)), Number(value))));
}
