/**
 * What fools people at the bench, sized for one bench: each as a physical quantity and as a share of the impulse bit, the first swing or
 * the stiffness. Sizes, not corrections: they say what to check. Source of the list: methods 1.18; each formula derived.
 */

/** κ N·m/rad, M kg, d m, g m/s², r_t m, and what a shot does: I N·s, θ_p rad. */
export interface Bench {
  readonly stiffness: number;
  readonly mass: number;
  readonly centreOfMass: number;
  readonly g: number;
  readonly leverArm: number;
  readonly impulse: number;
  readonly firstSwing: number;
}

/** A push that adds to the impulse bit. */
export interface ImpulseEffect {
  /** N·s. */
  readonly impulse: number;
  /** Of the impulse bit. */
  readonly share: number;
}

/** A torque that moves the rest. */
export interface RestEffect {
  /** rad. */
  readonly rest: number;
  /** Of the first swing. */
  readonly share: number;
}

/** A restoring torque beside κ. */
export interface StiffnessEffect {
  /** N·m/rad. */
  readonly stiffness: number;
  /** Of κ. Its share of I: half of it with the inertia known, all of it with the period timed and κ from masses; none with taps in place. */
  readonly share: number;
}

/** Vacuum permittivity, F/m. Source: CODATA 2018 (from memory). */
const PERMITTIVITY = 8.8541878128e-12;

const impulseEffect = ({ impulse: bit }: Bench, impulse: number): ImpulseEffect => ({ impulse, share: impulse / Math.abs(bit) });
const restEffect = ({ firstSwing }: Bench, rest: number): RestEffect => ({ rest, share: rest / Math.abs(firstSwing) });
const stiffnessEffect = ({ stiffness: kappa }: Bench, stiffness: number): StiffnessEffect => ({ stiffness, share: stiffness / kappa });

function check(bench: Bench, positive: Readonly<Record<string, number>> = {}): void {
  for (const [name, value] of Object.entries({ stiffness: bench.stiffness, leverArm: bench.leverArm, ...positive })) {
    if (!(value > 0)) throw new RangeError(`bench effect: ${name} ${value} is not positive`);
  }
  if (!(bench.impulse !== 0 && bench.firstSwing !== 0)) throw new RangeError('bench effect: impulse bit and first swing are needed');
}

/** Energy stored in a capacitor bank: E = ½ C V² · J. Valid: C ≥ 0 F; V in V. Source: any physics handbook; methods 4. */
export const storedEnergy = ({ capacitance, voltage }: Readonly<Record<'capacitance' | 'voltage', number>>): number => 0.5 * capacitance * voltage * voltage;

/**
 * Discharge leads from a capacitor off the arm push with ½ i² dL/dx: ½ L′ E/R, since ∫ i² dt = E/R.
 *
 * L′ H/m, E J, R Ω of the whole discharge circuit. Valid: all the energy spent in R.
 */
export function leadsImpulse(bench: Bench, { inductancePerLength, energy, resistance }: Readonly<Record<'inductancePerLength' | 'energy' | 'resistance', number>>): ImpulseEffect {
  check(bench, { resistance });
  return impulseEffect(bench, (0.5 * inductancePerLength * energy) / resistance);
}

/** The charge of one shot through a lead across the Earth's field: Q l B, with the field at right angles. C, m, T. */
export function earthFieldImpulse(bench: Bench, { charge, length, field }: Readonly<Record<'charge' | 'length' | 'field', number>>): ImpulseEffect {
  check(bench);
  return impulseEffect(bench, charge * length * field);
}

/**
 * A charged arm is drawn to what stands opposite: F = ½ ε₀ A V²/s², at the lever arm; rest moved by F r_t/κ.
 *
 * A m², V, s m. Valid: parallel faces, s small against their size, displacement small against s.
 */
export function electrostaticPull(bench: Bench, { area, voltage, gap }: Readonly<Record<'area' | 'voltage' | 'gap', number>>): RestEffect & { readonly force: number } {
  check(bench, { gap });
  const force = (0.5 * PERMITTIVITY * area * voltage * voltage) / (gap * gap);
  return { force, ...restEffect(bench, (force * bench.leverArm) / bench.stiffness) };
}

/**
 * First maximum from the charged rest, over that from the true rest, less 1: √(1 + z²) − z − 1, where the charge holds
 * the pendulum at z θ_p along the swing and lets go as the shot fires.
 *
 * Valid: small swing, little damping. Source: methods 1.18.2, derived.
 */
export const chargedRestChange = (z: number): number => Math.sqrt(1 + z * z) - z - 1;

/** Friction torque of the pivot over κ, and what it does to the first swing. */
export interface PivotFriction extends RestEffect {
  /** √(1 + 2 θ_f/θ_p) − 1: by so much the launch is underrated. */
  readonly launchGain: number;
}

/**
 * Pivot friction with a lever (rolling lever of an edge or ball; friction coefficient × pin radius): θ_f = M g lever/κ.
 * The rest is known only to ± θ_f. Lever in m.
 */
export function pivotFriction(bench: Bench, lever: number): PivotFriction {
  check(bench);
  if (!(lever >= 0)) throw new RangeError(`bench effect: lever ${lever} m is negative`);
  const effect = restEffect(bench, (bench.mass * bench.g * lever) / bench.stiffness);
  return { ...effect, launchGain: Math.sqrt(1 + 2 * effect.share) - 1 };
}

/** A knife edge of radius ρ rolling on a flat adds M g ρ to κ. m. */
export function edgeRolling(bench: Bench, edgeRadius: number): StiffnessEffect {
  check(bench);
  return stiffnessEffect(bench, bench.mass * bench.g * edgeRadius);
}

/**
 * A wire or hose led to the arm adds EI/l (free to turn at its end) to 4EI/l (clamped at both): I = π d⁴/64 less the bore.
 *
 * E Pa, diameters and length m. Valid: straight, several wires add. Insulation creeps.
 */
export function wireStiffness(
  bench: Bench,
  { modulus, diameter, bore, length }: Readonly<Record<'modulus' | 'diameter' | 'bore' | 'length', number>>,
): { readonly least: StiffnessEffect; readonly largest: StiffnessEffect } {
  check(bench, { diameter, length });
  if (!(bore >= 0 && bore < diameter)) throw new RangeError(`bench effect: bore ${bore} m in a diameter of ${diameter} m`);
  const least = (modulus * Math.PI * (diameter ** 4 - bore ** 4)) / (64 * length);
  return { least: stiffnessEffect(bench, least), largest: stiffnessEffect(bench, 4 * least) };
}

/** A stand that tilts in the swing plane moves the rest by as much. rad. */
export function standTilt(bench: Bench, tilt: number): RestEffect {
  check(bench);
  return restEffect(bench, tilt);
}

/** Axis of a torsion stand tilted by φ from upright: up to M g d_cm sin φ beside κ, d_cm from the axis to the centre of mass. */
export function torsionAxisTilt(bench: Bench, { tilt, offAxis }: Readonly<Record<'tilt' | 'offAxis', number>>): StiffnessEffect {
  check(bench);
  return stiffnessEffect(bench, bench.mass * bench.g * offAxis * Math.sin(tilt));
}

/**
 * A mass on a bracket that stands out along the swing: warmed by ΔT it goes α l ΔT further out, and the rest moves by
 * m g α l ΔT/κ. Expansion 1/K, kg, m, K.
 */
export function heatedBracket(
  bench: Bench,
  { mass, length, expansion, warming }: Readonly<Record<'mass' | 'length' | 'expansion' | 'warming', number>>,
): RestEffect & { readonly centreOfMassMoved: number } {
  check(bench, { mass: bench.mass });
  const moved = expansion * length * warming;
  return { centreOfMassMoved: (mass * moved) / bench.mass, ...restEffect(bench, (mass * bench.g * moved) / bench.stiffness) };
}

/** Thermal expansion of aluminium, 1/K, and change of a metal flexure's modulus, 1/K (−0.03 … −0.05 %). Typical, from memory. */
export const ALUMINIUM_EXPANSION = 23e-6;
export const MODULUS_CHANGE = -4e-4;

/** Change of κ by a flexure warmed by ΔT: change of modulus × ΔT × k_f, k_f = κ − M g d. */
export function warmedFlexure(bench: Bench, { warming, perKelvin }: Readonly<Record<'warming' | 'perKelvin', number>>): StiffnessEffect {
  check(bench);
  return stiffnessEffect(bench, perKelvin * warming * Math.max(0, bench.stiffness - bench.mass * bench.g * bench.centreOfMass));
}

/**
 * Body on two parallel wires 2s apart, struck e off its centre of mass and read b off it: yaw swing over true swing, b e/(k s),
 * and yaw over swing frequency, s/k. k yaw radius of gyration. All in m. One wire has no yaw stiffness.
 *
 * Valid: s, k > 0. Source: methods 1.18.7, derived (I e = M k² ψ′, ω_yaw = ω s/k).
 */
export function yawOnWires({ offLine, readOff, gyration, halfSpacing }: Readonly<Record<'offLine' | 'readOff' | 'gyration' | 'halfSpacing', number>>): {
  readonly share: number;
  readonly frequencyRatio: number;
} {
  if (!(gyration > 0 && halfSpacing > 0)) throw new RangeError(`yaw: gyration ${gyration} m, half spacing ${halfSpacing} m`);
  return { share: (readOff * offLine) / (gyration * halfSpacing), frequencyRatio: halfSpacing / gyration };
}

/** Largest share by which a reading may stand from the rigid formula, and whether its first local maximum is to be trusted. */
export interface PlateOnTape {
  readonly least: number;
  readonly largest: number;
  readonly firstMaximumMisleads: boolean;
}

/**
 * A plate hung on a limp tape is a double pendulum: within 2 % of the rigid formula where read at the plate's centre of
 * mass; 10 … 26 % high where read at its bottom edge and struck at 2/3 … 0.8 of its height, and its first local maximum
 * 5 … 57 % low.
 *
 * Valid: plate height 0.1 … 0.6 of the tape's length, light tape. Source: methods 1.18.8 (computed there).
 */
export const plateOnTape = (readAt: 'centreOfMass' | 'bottomEdge'): PlateOnTape =>
  readAt === 'centreOfMass' ? { least: -0.02, largest: 0.02, firstMaximumMisleads: false } : { least: 0.1, largest: 0.26, firstMaximumMisleads: true };

/** The plume's centre wanders along the arm by Δr, m: Δr/r_t of the impulse bit. */
export function plumeWander(bench: Bench, wander: number): ImpulseEffect {
  check(bench);
  return { impulse: (Math.abs(bench.impulse) * wander) / bench.leverArm, share: wander / bench.leverArm };
}

/** A hose that enters along the thrust pushes with p A; a drop of the pressure by a share for a time gives p A × drop × time. Pa, m, 1, s. */
export function hosePush(
  bench: Bench,
  { pressure, bore, drop, duration }: Readonly<Record<'pressure' | 'bore' | 'drop' | 'duration', number>>,
): ImpulseEffect & { readonly force: number } {
  check(bench);
  const force = (pressure * Math.PI * bore * bore) / 4;
  return { force, ...impulseEffect(bench, force * drop * duration) };
}

/** Moisture in a polymer of the weighed part: kg, and how many shots of a mass bit weigh as much. Valid: mass bit > 0 kg. */
export function moistureInWeighing({ polymer, moisture, massBit }: Readonly<Record<'polymer' | 'moisture' | 'massBit', number>>): { readonly mass: number; readonly shots: number } {
  if (!(massBit > 0)) throw new RangeError(`moisture: mass bit ${massBit} kg is not positive`);
  const mass = polymer * moisture;
  return { mass, shots: mass / massBit };
}
