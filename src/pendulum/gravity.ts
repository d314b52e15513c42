/** Local gravity from latitude and height. */

/** WGS 84 constants. Source: NIMA TR8350.2 (from memory; reference values in test/reference). */
const EQUATOR = 9.7803253359;
const K = 0.00193185265241;
const E2 = 0.00669437999014;
const SEMI_MAJOR = 6378137;
const FLATTENING = 1 / 298.257223563;
const M = 0.00344978650684;

/**
 * Normal gravity, Somigliana's formula on the WGS 84 ellipsoid with the second-order change with height:
 *
 *   γ = γ_e (1 + k sin²φ)/√(1 − e² sin²φ),  g = γ [1 − 2(1 + f + m − 2f sin²φ) h/a + 3 h²/a²]
 *
 * Valid: latitude φ in rad, |φ| ≤ π/2; height h in m, −500 … 10 000 (2e-7 of the exact field at 1 000 m). m/s².
 * Source: NIMA TR8350.2 (WGS 84), eqs. 4-1 and 4-3, equation numbers from memory; Moritz, Geodetic Reference System 1980.
 */
export function normalGravity({ latitude, height }: Readonly<Record<'latitude' | 'height', number>>): number {
  const s2 = Math.sin(latitude) ** 2;
  const surface = (EQUATOR * (1 + K * s2)) / Math.sqrt(1 - E2 * s2);
  const h = height / SEMI_MAJOR;
  return surface * (1 - 2 * (1 + FLATTENING + M - 2 * FLATTENING * s2) * h + 3 * h * h);
}

/**
 * u of the real field about the normal one: gravity anomalies of some tens of mGal are usual away from high mountains.
 * m/s². Common practice, no source.
 */
export const GRAVITY_ANOMALY = 5e-4;
