/** A calibration mass hung on the pendulum: the period with it, where it leaves the period as it is, and J back from the two periods. */
import { leastSquares } from '../numeric/linearAlgebra.ts';
import { smallPeriod } from './forms.ts';

type Numbers<Name extends string> = Readonly<Record<Name, number>>;

/** Pendulum and mass: J, kg·m², and κ, N·m/rad, without the mass; m, kg; r below the pivot positive, m; J_x about its own centre, kg·m². */
export type HungMass = Numbers<'inertia' | 'stiffness' | 'g' | 'mass' | 'distance' | 'ownInertia'>;

/**
 * T₁ = 2π √[(J + m r² + J_x)/(κ + m g r)] · s · undamped small period with the mass. About an upright axis g = 0.
 *
 * Source: methods 1.8, derived.
 * @throws RangeError where the mass stands so high above the pivot that nothing restores.
 */
export function periodWithMass({ inertia, stiffness, g, mass, distance, ownInertia }: HungMass): number {
  const kappa = stiffness + mass * g * distance;
  if (!(kappa > 0)) throw new RangeError(`calibration mass: at ${distance} m nothing brings the pendulum back`);
  return smallPeriod({ inertia: inertia + mass * distance * distance + ownInertia, stiffness: kappa });
}

/**
 * Distance r at which the mass leaves the period as it is: m r² + J_x = m r l with l = g J/κ = g T₀²/4π², flexure or not;
 * of the two roots the one away from the pivot. Between them the period falls, beyond them it grows. m.
 *
 * null where there is none: about an upright axis (g = 0), or J_x so large that the period grows wherever it hangs.
 * Source: methods 1.8 (J_x = 0: l), derived.
 */
export function unchangedDistance({ inertia, stiffness, g, mass, ownInertia }: Omit<HungMass, 'distance'>): number | null {
  const l = (g * inertia) / stiffness;
  const square = l * l - (4 * ownInertia) / mass;
  return l > 0 && square >= 0 ? (l + Math.sqrt(square)) / 2 : null;
}

/**
 * J = [m r² + J_x − m g r T₁²/4π²]/(T₁²/T₀² − 1) · kg·m² · of the pendulum without the mass, from both periods.
 *
 * Valid: T₁ ≠ T₀; ill-conditioned near there. Source: methods 1.8 (b).
 */
export const inertiaOfTwoPeriods = ({ mass, distance, ownInertia, g, without, with: loaded }: Numbers<'mass' | 'distance' | 'ownInertia' | 'g' | 'without' | 'with'>): number =>
  (mass * distance * distance + ownInertia - (mass * g * distance * loaded * loaded) / (4 * Math.PI ** 2)) / ((loaded / without) ** 2 - 1);

/** How J from the two periods follows each of them: ∂ln J/∂ln T₁ and ∂ln J/∂ln T₀ · 1. */
export interface TwoPeriodSensitivity {
  readonly toWith: number;
  readonly toWithout: number;
}

/** ∂ln J/∂ln T₀ = 2T₁²/(T₁² − T₀²), ∂ln J/∂ln T₁ = −2T₁²/(T₁² − T₀²)·(1 + m g r/κ). Valid: T₁ ≠ T₀. Source: methods 1.8. */
export function twoPeriodSensitivity(hung: HungMass): TwoPeriodSensitivity {
  const ratio = (periodWithMass(hung) / smallPeriod(hung)) ** 2;
  const toWithout = (2 * ratio) / (ratio - 1);
  return { toWithout, toWith: -toWithout * (1 + (hung.mass * hung.g * hung.distance) / hung.stiffness) };
}

/** One timing: T₀ with a mass m at r (m = 0: without). */
export type TimedMass = Numbers<'period' | 'mass' | 'radius' | 'ownInertia'>;

export type BodyOfPeriods = { readonly status: 'found'; readonly inertia: number; readonly stiffness: number } | { readonly status: 'tooFew' | 'notTold' };

/**
 * J and κ from periods with several masses: T_i²(κ + m_i g r_i) = 4π²(J + m_i r_i² + J_c), linear in J and κ, least squares with each
 * equation over T_i². For two timings it is inertiaOfTwoPeriods. `inertia` may come out negative where the timings tell it badly.
 *
 * Source: methods 1.8 (b), (d), derived.
 */
export function bodyOfPeriods(timings: readonly TimedMass[], g: number): BodyOfPeriods {
  if (timings.length < 2) return { status: 'tooFew' };
  const rows = timings.map(({ period }) => [-(((2 * Math.PI) / period) ** 2), 1]);
  const right = timings.map(({ period, mass, radius, ownInertia }) => ((2 * Math.PI) / period) ** 2 * (mass * radius * radius + ownInertia) - mass * g * radius);
  const solved = leastSquares(rows, right);
  return solved.status === 'solved' ? { status: 'found', inertia: solved.x[0]!, stiffness: solved.x[1]! } : { status: 'notTold' };
}
