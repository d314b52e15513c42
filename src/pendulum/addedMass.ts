/** Inertia by added masses: two periods, a pair on a cross-arm, several timings as a fit; how well each place tells it, and where to hang instead. */
import { leastSquares, type LeastSquaresResult } from '../numeric/linearAlgebra.ts';
import { inertiaOfTwoPeriods, periodWithMass, twoPeriodSensitivity, unchangedDistance, type HungMass, type TimedMass } from './calibrationMass.ts';
import { stiffnessOfPeriod } from './forms.ts';

type Numbers<Name extends string> = Readonly<Record<Name, number>>;

/** J, kg·m², and κ, N·m/rad, without the mass. 'notPositive': what the periods give is no pendulum. 'samePeriod': T₁ = T₀ tells nothing. */
export type TwoPeriods =
  | { readonly status: 'found' | 'notPositive'; readonly inertia: number; readonly stiffness: number }
  | { readonly status: 'samePeriod' };

/** Periods nearer to each other than this part of them are one period: no timing parts them. */
const SAME_PERIOD = 1e-9;

function checkPeriods(what: string, without: number, loaded: number): void {
  if (!(without > 0 && loaded > 0 && without < Infinity && loaded < Infinity)) throw new RangeError(`${what}: periods ${without} s and ${loaded} s`);
}

/**
 * J = [m r² + J_c − m g r T₁²/4π²]/(T₁²/T₀² − 1), κ = 4π²J/T₀²; about an upright axis g = 0, the torsion formula
 * J = (m r² + J_c) T₀²/(T₁² − T₀²).
 *
 * Symbols: m, kg, > 0; r, m, below the pivot positive; J_c, kg·m², ≥ 0; T₀ `without`, T₁ `with`, s, undamped and at no amplitude.
 * Source: methods 1.8 (b), (c).
 * @throws RangeError where a period is not positive
 */
export function bodyOfTwoPeriods(timed: Numbers<'mass' | 'distance' | 'ownInertia' | 'g' | 'without' | 'with'>): TwoPeriods {
  checkPeriods('two periods', timed.without, timed.with);
  if (Math.abs(timed.with / timed.without - 1) < SAME_PERIOD) return { status: 'samePeriod' };
  const inertia = inertiaOfTwoPeriods(timed);
  const stiffness = stiffnessOfPeriod({ inertia, period: timed.without });
  return { status: inertia > 0 ? 'found' : 'notPositive', inertia, stiffness };
}

/**
 * Two equal masses m each, a to either side of the pivot, h below it (0: at its height), as one hung mass: 2m at h with 2(m a² + J_c).
 *
 * At h = 0 there is no gravity term, T₁ > T₀ always, and the rest stays where it is. Source: methods 1.8, derived.
 */
export const pairAsOne = ({ mass, arm, height, ownInertia }: Numbers<'mass' | 'arm' | 'height' | 'ownInertia'>): Numbers<'mass' | 'distance' | 'ownInertia'> =>
  ({ mass: 2 * mass, distance: height, ownInertia: 2 * (mass * arm * arm + ownInertia) });

/**
 * Angle by which a single mass out on a cross-arm at the pivot's height tilts the rest: θ = atan(m g a/κ) · rad; gravity restoring alone.
 * Source: m g a cos θ = κ sin θ; derived.
 */
export const tiltOfSingle = ({ mass, arm, g, stiffness }: Numbers<'mass' | 'arm' | 'g' | 'stiffness'>): number => Math.atan((mass * g * arm) / stiffness);

/** ∂ln J/∂ln of m, r and J_c of the mass; with twoPeriodSensitivity, all that J by two periods follows but g. */
export interface MassSensitivity {
  readonly toMass: number;
  readonly toDistance: number;
  readonly toOwnInertia: number;
}

/**
 * J ∝ N = m(r² − r l₁) + J_c, l₁ = g T₁²/4π²: ∂ln J/∂ln m = m(r² − r l₁)/N, ∂ln J/∂ln r = m(2r² − r l₁)/N, ∂ln J/∂ln J_c = J_c/N.
 *
 * Near the place of no change r counts many times over. Valid: T₁ ≠ T₀. Source: derived.
 */
export function massSensitivity(hung: HungMass): MassSensitivity {
  const { mass, distance: r, ownInertia } = hung;
  const own = r * hung.g * (periodWithMass(hung) / (2 * Math.PI)) ** 2;
  const N = mass * (r * r - own) + ownInertia;
  return { toMass: (mass * (r * r - own)) / N, toDistance: (mass * (2 * r * r - own)) / N, toOwnInertia: ownInertia / N };
}

/** What one place would leave of J: relative u of each timing, u of the place in m, relative u of the mass. */
export type Knowledge = Numbers<'uWithout' | 'uWith' | 'uDistance' | 'uMass'>;

/** u(J)/J that two timings with this mass at this place leave; Infinity where they tell nothing. Source: GUM 5.1.2 with the sensitivities above. */
export function inertiaLeftUnknown(hung: HungMass, { uWithout, uWith, uDistance, uMass }: Knowledge): number {
  if (!(hung.stiffness + hung.mass * hung.g * hung.distance > 0)) return Infinity;
  const { toWith, toWithout } = twoPeriodSensitivity(hung);
  const { toMass, toDistance } = massSensitivity(hung);
  const perMetre = hung.distance === 0 ? 0 : toDistance / hung.distance;
  const total = Math.hypot(toWith * uWith, toWithout * uWithout, toMass * uMass, perMetre * uDistance);
  return Number.isFinite(total) ? total : Infinity;
}

/** Where the place lies: above the pivot; so near it that the mass's own inertia lengthens the period; between there and the place of no change; beyond that, or anywhere below the pivot where there is no such place. */
export type PlaceRegion = 'abovePivot' | 'nearPivot' | 'shorter' | 'beyond';

export interface HangingPlace {
  readonly region: PlaceRegion;
  /** r, m, below the pivot positive. */
  readonly distance: number;
  /** T₁ there, s. */
  readonly period: number;
  /** u(J)/J. */
  readonly leaves: number;
}

/** Nobody hangs a mass finer than this part of the range; the minimum is flat. */
const PLACES = 400;

/**
 * The best place of each region within [least, most], best first; empty where none tells J to better than `hopeless`.
 *
 * Symbols: distances in m, above the pivot negative; hopeless: u(J)/J.
 * Source: least u(J)/J of inertiaLeftUnknown; regions by the places of no change (unchangedDistance, and J_c/m over it).
 * @throws RangeError where least is not below most
 */
export function bestPlaces(hung: Omit<HungMass, 'distance'>, known: Knowledge, { least, most, hopeless }: Numbers<'least' | 'most' | 'hopeless'>): readonly HangingPlace[] {
  if (!(least < most)) throw new RangeError(`places for a mass: from ${least} m to ${most} m`);
  const outer = unchangedDistance(hung);
  const inner = outer === null ? null : hung.ownInertia / hung.mass / outer;
  const regionOf = (r: number): PlaceRegion => (r < 0 ? 'abovePivot' : outer === null || inner === null ? 'beyond' : r < inner ? 'nearPivot' : r < outer ? 'shorter' : 'beyond');
  const best = new Map<PlaceRegion, { readonly distance: number; readonly leaves: number }>();
  for (let i = 0; i <= PLACES; i++) {
    const distance = (least * (PLACES - i) + most * i) / PLACES;
    const leaves = inertiaLeftUnknown({ ...hung, distance }, known);
    const region = regionOf(distance);
    if (leaves < hopeless && leaves < (best.get(region)?.leaves ?? Infinity)) best.set(region, { distance, leaves });
  }
  return [...best]
    .map(([region, { distance, leaves }]) => ({ region, distance, period: periodWithMass({ ...hung, distance }), leaves }))
    .sort((a, b) => a.leaves - b.leaves);
}

/** One timing with its u(T), s, > 0. */
export type TimedMassWithU = TimedMass & Numbers<'uPeriod'>;

export interface TimingsFit {
  /** 'notPositive': the timings fit, but to no pendulum. */
  readonly status: 'fitted' | 'notPositive';
  readonly inertia: number;
  readonly stiffness: number;
  /** From u(T) alone: masses and places go through the sensitivities of an adjustment. */
  readonly uInertia: number;
  readonly uStiffness: number;
  readonly covariance: number;
  readonly chiSquared: number;
  /** Timings less two. */
  readonly dof: number;
  /** Residual of each timing over its u(T), positive where it was timed longer than fitted. */
  readonly residuals: readonly number[];
  /** ∂J/∂T_i and ∂κ/∂T_i. */
  readonly byPeriod: readonly Numbers<'inertia' | 'stiffness'>[];
}

/** The weights hold κ + m g r, known to the timings' own accuracy after the second round. */
const WEIGHT_ROUNDS = 5;

/**
 * J and κ of several timings, weighted by u(T): f_i = (4π²/T_i²)(J + m_i r_i² + J_ci) − κ − m_i g r_i = 0 with u(f_i) = 2(κ + m_i g r_i) u(T_i)/T_i.
 *
 * 'tooFew': fewer than two. 'notTold': timings that part nothing (all with the same mass at one place, or all at the place of no change).
 * Source: methods 1.8 (d); linear least squares, derived.
 * @throws RangeError where a period or its u is not positive
 */
export function fitOfTimings(timings: readonly TimedMassWithU[], g: number): TimingsFit | { readonly status: 'tooFew' | 'notTold' } {
  for (const { period, uPeriod } of timings) if (!(period > 0 && uPeriod > 0)) throw new RangeError(`timing: ${period} s with u ${uPeriod} s`);
  if (timings.length < 2) return { status: 'tooFew' };
  const square = timings.map(({ period }) => ((2 * Math.PI) / period) ** 2);
  const added = timings.map(({ mass, radius, ownInertia }) => ({ inertia: mass * radius * radius + ownInertia, stiffness: mass * g * radius }));
  let weights = timings.map(({ period, uPeriod }) => period / uPeriod);
  const solve = (): LeastSquaresResult => leastSquares(
    timings.map((_, i) => [square[i]! * weights[i]!, -weights[i]!]),
    timings.map((_, i) => (added[i]!.stiffness - square[i]! * added[i]!.inertia) * weights[i]!),
  );
  let solved = solve();
  for (let round = 0; round < WEIGHT_ROUNDS && solved.status === 'solved'; round++) {
    const bare = solved.x[1]!;
    const total = added.map(({ stiffness }) => bare + stiffness);
    // No pendulum has no weights of its own: the first ones then tell that it is none.
    if (!total.every((kappa) => kappa > 0)) break;
    weights = timings.map(({ period, uPeriod }, i) => period / (2 * total[i]! * uPeriod));
    solved = solve();
  }
  if (solved.status !== 'solved') return { status: 'notTold' };
  const { covariance: C, residuals, sumOfSquares } = solved;
  const [inertia, stiffness] = [solved.x[0]!, solved.x[1]!];
  const byPeriod = timings.map(({ period }, i) => {
    // Aᵀ W f = 0 differentiated: A and f both hold T_i; the weights stay. f = −residual/weight.
    const [w2, dSquare] = [weights[i]! ** 2, (-2 * square[i]!) / period];
    const df = dSquare * (inertia + added[i]!.inertia);
    const right = [w2 * square[i]! * df - weights[i]! * dSquare * residuals[i]!, -w2 * df] as const;
    return { inertia: -(C[0]![0]! * right[0] + C[0]![1]! * right[1]), stiffness: -(C[1]![0]! * right[0] + C[1]![1]! * right[1]) };
  });
  const sumOver = (term: (by: Numbers<'inertia' | 'stiffness'>) => number): number => timings.reduce((sum, { uPeriod }, i) => sum + term(byPeriod[i]!) * uPeriod ** 2, 0);
  return {
    status: inertia > 0 && stiffness > 0 ? 'fitted' : 'notPositive', inertia, stiffness,
    uInertia: Math.sqrt(sumOver((by) => by.inertia ** 2)), uStiffness: Math.sqrt(sumOver((by) => by.stiffness ** 2)), covariance: sumOver((by) => by.inertia * by.stiffness),
    // A longer period makes f fall, and the residual of the linear equation is −f.
    chiSquared: sumOfSquares, dof: timings.length - 2, residuals, byPeriod,
  };
}

/** Undamped small period of one timing by the fitted body, s. @throws RangeError where nothing restores */
export const periodFitted = ({ inertia, stiffness }: Numbers<'inertia' | 'stiffness'>, { mass, radius, ownInertia }: Omit<TimedMass, 'period'>, g: number): number =>
  periodWithMass({ inertia, stiffness, g, mass, distance: radius, ownInertia });
