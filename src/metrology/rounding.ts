/** The rounding of readings to a division: what of it is common to many readings and does not average. */

/** Harmonics of the rounding error that are summed; the tenth is below 1e-3 of the first even without any spread. */
const HARMONICS = 40;

/**
 * u of the part of the rounding error that is common to many readings of one division a, where the readings would
 * spread by σ before rounding: u² = Σ_k a²/(2π²k²) e^{−4π²k²σ²/a²}; a²/12 at σ = 0 (all on one division: it does not
 * average), nothing from σ ≈ a/2 on (the rounding errors are independent).
 *
 * Valid: a > 0, σ ≥ 0, Gaussian spread, position within the division unknown. Unit of a.
 * Source: derived from the characteristic function of the spread (quantisation theory, B. Widrow; from memory).
 */
export function commonRounding(division: number, spread: number): number {
  let sum = 0;
  const x = 2 * Math.PI * (spread / division);
  for (let k = 1; k <= HARMONICS; k++) sum += Math.exp(-((k * x) ** 2)) / (2 * Math.PI ** 2 * k * k);
  // What the harmonics left out hold at σ = 0: the sum to infinity is 1/12.
  if (x === 0) return division / Math.sqrt(12);
  return division * Math.sqrt(Math.min(sum, 1 / 12));
}
