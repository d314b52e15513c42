/** A plume caught on a target: how the momentum that arrives stands to the thruster's impulse bit. */

/** k_B/m_u · J/(kg·K) · of an atomic mass unit. Source: CODATA 2018 (k_B exact; m_u from memory). */
const GAS_CONSTANT_OF_UNIT_MASS = 1.380649e-23 / 1.6605390666e-27;

/** Relative masses of what plumes are made of. Source: IUPAC standard atomic weights (from memory). */
export const SPECIES_MASS = {
  hydrogen: 1.008,
  carbon: 12.011,
  nitrogenMolecule: 28.014,
  oxygen: 15.999,
  fluorine: 18.998,
  titanium: 47.867,
  copper: 63.546,
  argon: 39.948,
  xenon: 131.293,
  tungsten: 183.84,
} as const;
export type Species = keyof typeof SPECIES_MASS;

/** I = I_target/(f_cap β_m): thruster's impulse bit from the momentum delivered to the target. Valid: f_cap in (0, 1], β_m > 0. Source: methods 1.14. */
export function thrusterImpulse({ delivered, momentumFactor, captured }: Readonly<Record<'delivered' | 'momentumFactor' | 'captured', number>>): number {
  if (!(momentumFactor > 0 && captured > 0)) throw new RangeError(`target: momentum factor ${momentumFactor}, captured ${captured}`);
  return delivered / (captured * momentumFactor);
}

/**
 * Mean and standard deviation of 1/β_m where β_m is only known to lie within two limits, rectangular:
 * mean ln(b/a)/(b − a), variance 1/(ab) − mean². For 1 … 2: ln 2 and 0.140, a fifth of it, common to all shots.
 *
 * Valid: 0 < a < b. Source: derived; methods 1.14.
 * @throws RangeError outside.
 */
export function inverseOfUndeclaredFactor(least = 1, largest = 2): { readonly mean: number; readonly deviation: number } {
  if (!(least > 0 && largest > least)) throw new RangeError(`momentum factor: ${least} … ${largest} is no range`);
  const mean = Math.log(largest / least) / (largest - least);
  return { mean, deviation: Math.sqrt(1 / (least * largest) - mean * mean) };
}

/**
 * Speed of diffuse re-emission, mean normal momentum per mass leaving a wall: √(π k T_w/(2 m)) · m/s.
 *
 * Valid: T_w > 0 K, relative mass > 0; fully accommodated. Source: kinetic theory, derived; methods 1.14 (N₂ at 300 K: 374 m/s).
 * @throws RangeError outside.
 */
export function reemissionSpeed({ wallTemperature, relativeMass }: Readonly<Record<'wallTemperature' | 'relativeMass', number>>): number {
  if (!(wallTemperature > 0 && relativeMass > 0)) throw new RangeError(`re-emission: wall ${wallTemperature} K, relative mass ${relativeMass}`);
  return Math.sqrt((Math.PI * GAS_CONSTANT_OF_UNIT_MASS * wallTemperature) / (2 * relativeMass));
}

/**
 * Momentum factor of a flat wall that gives the plume back diffusely: β_m = 1 + √(π k T_w/2m)/v_in.
 *
 * Sputtering and ablation of the target come on top and can exceed it; a cup that opens towards the plume tends to 2.
 * Valid: v_in > 0 m/s; above 2 the plume is too slow for this to be a beam. Source: as reemissionSpeed.
 */
export function diffuseMomentumFactor({ plumeSpeed, wallTemperature, relativeMass }: Readonly<Record<'plumeSpeed' | 'wallTemperature' | 'relativeMass', number>>): number {
  if (!(plumeSpeed > 0)) throw new RangeError(`momentum factor: plume speed ${plumeSpeed} m/s is not positive`);
  return 1 + reemissionSpeed({ wallTemperature, relativeMass }) / plumeSpeed;
}

/** Half-angle at which a round target of a radius is seen from a source on its axis: a = atan(R/z), rad. Valid: R, z > 0 m. */
export function halfAngleSeen({ radius, distance }: Readonly<Record<'radius' | 'distance', number>>): number {
  if (!(radius > 0 && distance > 0)) throw new RangeError(`target: radius ${radius} m at ${distance} m`);
  return Math.atan2(radius, distance);
}

function checkPlume(exponent: number): void {
  if (!(exponent > -1)) throw new RangeError(`plume: exponent ${exponent} of the cosine is not above −1`);
}

/**
 * Share of the axial momentum that a target of half-angle a catches from a plume j ∝ cosⁿφ: f_cap = 1 − cosⁿ⁺²(a).
 *
 * Valid: n > −1, 0 ≤ a ≤ π/2, one exhaust speed, all that arrives counted. Source: ∫ cosⁿ⁺¹φ sin φ dφ, derived; methods 1.14.
 * @throws RangeError outside.
 */
export function captureFraction({ exponent, halfAngle }: Readonly<Record<'exponent' | 'halfAngle', number>>): number {
  checkPlume(exponent);
  if (!(halfAngle >= 0 && halfAngle <= Math.PI / 2)) throw new RangeError(`capture: half-angle ${halfAngle} rad is not in 0 … π/2`);
  // cos a = 1 − 2 sin²(a/2), kept through log1p for a small target.
  return halfAngle === Math.PI / 2 ? 1 : -Math.expm1((exponent + 2) * Math.log1p(-2 * Math.sin(halfAngle / 2) ** 2));
}

/** Mean cosine of a plume j ∝ cosⁿφ: (n + 1)/(n + 2), axial momentum over mass times speed. Valid: n > −1. Source: derived; methods 1.14. */
export function meanCosine(exponent: number): number {
  checkPlume(exponent);
  return (exponent + 1) / (exponent + 2);
}
