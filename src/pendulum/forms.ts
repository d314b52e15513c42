/** Moment of inertia and static moment of the pendulum's forms about the pivot; module-level functions of numbers. */

/** J = m L². Point bob at L. Valid: m, L > 0. */
export const bobInertia = ({ m, L }: Readonly<Record<'m' | 'L', number>>): number => m * L * L;
/** M d = m L. Point bob. */
export const bobMoment = ({ m, L }: Readonly<Record<'m' | 'L', number>>): number => m * L;
/** J = m L²/3. Uniform rigid strip hinged at its end. Source: any mechanics handbook; methods 1.1. */
export const stripInertia = ({ m, L }: Readonly<Record<'m' | 'L', number>>): number => (m * L * L) / 3;
/** M d = m L/2. Uniform rigid strip. */
export const stripMoment = ({ m, L }: Readonly<Record<'m' | 'L', number>>): number => (m * L) / 2;
/** J_i = m r² + J_own: one part of a body (parallel axes, Steiner). r signed, below the pivot positive. */
export const partInertia = ({ m, r, J }: Readonly<Record<'m' | 'r' | 'J', number>>): number => m * r * r + J;
/** (M d)_i = m r: static moment of one part; negative above the pivot. */
export const partMoment = ({ m, r }: Readonly<Record<'m' | 'r', number>>): number => m * r;

/** κ = M g d + k_f · N·m/rad · total small-angle stiffness. */
export const stiffness = ({ moment, g, flexure }: Readonly<Record<'moment' | 'g' | 'flexure', number>>): number => moment * g + flexure;
/** p = M g d/κ · 1 · gravity share of the stiffness. */
export const gravityShare = ({ moment, g, stiffness: kappa }: Readonly<Record<'moment' | 'g' | 'stiffness', number>>): number => (moment * g) / kappa;
/** ω_n = √(κ/J) · rad/s. */
export const naturalFrequency = ({ inertia, stiffness: kappa }: Readonly<Record<'inertia' | 'stiffness', number>>): number => Math.sqrt(kappa / inertia);
/** T₀ = 2π√(J/κ) · s · undamped, small swing. */
export const smallPeriod = ({ inertia, stiffness: kappa }: Readonly<Record<'inertia' | 'stiffness', number>>): number => 2 * Math.PI * Math.sqrt(inertia / kappa);
/** Route A: J = κ T₀²/4π². */
export const inertiaOfPeriod = ({ stiffness: kappa, period }: Readonly<Record<'stiffness' | 'period', number>>): number => (kappa * period * period) / (4 * Math.PI ** 2);
/** Route B: κ = 4π² J/T₀². */
export const stiffnessOfPeriod = ({ inertia, period }: Readonly<Record<'inertia' | 'period', number>>): number => (4 * Math.PI ** 2 * inertia) / (period * period);

/**
 * Calibration factor from geometry: K = √(J κ) = J ω_n = κ/ω_n · N·m·s/rad · angular impulse per damping-corrected,
 * small-angle-equivalent first swing. Source: derived from J ω_n φ = r_t I (methods 1.1).
 */
export const geometryFactor = ({ inertia, stiffness: kappa }: Readonly<Record<'inertia' | 'stiffness', number>>): number => Math.sqrt(inertia * kappa);

/**
 * Change of the calibration factor between the configuration of the taps and that of the shots:
 * K_f/K_c = √(J_f κ_f/(J_c κ_c)). Damping is corrected in each configuration on its own. Source: methods 1.11, derived.
 */
export const configurationChange = ({ inertiaShots, stiffnessShots, inertiaTaps, stiffnessTaps }: Readonly<Record<'inertiaShots' | 'stiffnessShots' | 'inertiaTaps' | 'stiffnessTaps', number>>): number =>
  Math.sqrt((inertiaShots * stiffnessShots) / (inertiaTaps * stiffnessTaps));

/**
 * Damping ratio carried to another configuration with the damping torque c unchanged: ζ = c/(2√(J κ)), so
 * ζ_to = ζ_from √(J κ)_from/√(J κ)_to.
 */
export const dampingCarried = ({ ratio, factorFrom, factorTo }: Readonly<Record<'ratio' | 'factorFrom' | 'factorTo', number>>): number => (ratio * factorFrom) / factorTo;
