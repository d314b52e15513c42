/** Which damping law a free swing follows: each law fitted to the turning points, and whether the readings tell them apart. */
import { chiSquareCdf, fCdf } from '../numeric/quantiles.ts';
import { fitLeastSquares } from '../numeric/nonlinearLeastSquares.ts';
import type { Matrix } from '../numeric/linearAlgebra.ts';
import type { TurningPoint } from './damping.ts';
import { turningPointsOf, UNDAMPED } from './dampingLaws.ts';
import type { Damping } from './dampingLaws.ts';

export type DampingTerm = keyof Damping;
export const DAMPING_TERMS: readonly DampingTerm[] = ['ratio', 'quadratic', 'friction'];

/** Turning points of one free swing, all read on one scale. */
export interface DecayReadings {
  readonly points: readonly TurningPoint[];
  /** Standard uncertainty of each angle, rad, one a point; independent of each other. */
  readonly u: readonly number[];
  /** The rest read on the same scale, rad; null: fitted. With a rubbing pivot the rest read is not the rest of the swing: give its u at least θ_f/√3. */
  readonly rest: { readonly angle: number; readonly u: number } | null;
  readonly gravityShare: number;
}

export interface DecayFit {
  readonly status: 'found';
  readonly terms: readonly DampingTerm[];
  readonly damping: Damping;
  /** Rest and turning point 0 from it, rad. */
  readonly rest: number;
  readonly amplitude: number;
  /** In the order: rest, amplitude, then the terms; for readings of the stated u. */
  readonly covariance: Matrix;
  /** ∂(first term)/∂(reading), in the order: rest (where read), then the turning points. */
  readonly sensitivities: readonly number[];
  readonly chiSquared: number;
  /** Readings less unknowns; 0: the fit goes through every reading and χ² says nothing. */
  readonly dof: number;
}
/** tooFew: fewer readings than unknowns · notDecaying: the second turning point is not on the side where its number puts it · noLimit: the fit did not settle. */
export type DecayFitResult = DecayFit | { readonly status: 'tooFew' | 'notDecaying' | 'noLimit' };

/** Amplitude as each law makes it a straight line against the cycle number: ln A, 1/A, A. For figures. Valid: A > 0. */
export function straightened(term: DampingTerm, amplitude: number): number {
  if (!(amplitude > 0)) throw new RangeError(`decay line: amplitude ${amplitude} is not positive`);
  return term === 'ratio' ? Math.log(amplitude) : term === 'quadratic' ? 1 / amplitude : amplitude;
}

/**
 * Slope per full cycle of that line, small swing and weak damping: −2πζ (−δ), 8β/3, −4θ_f.
 * Source: methods 1.3 (energy lost in a cycle, first order in the damping).
 */
export const slopeOfStraightened = (term: DampingTerm, parameter: number): number =>
  term === 'ratio' ? -2 * Math.PI * parameter : term === 'quadratic' ? (8 * parameter) / 3 : -4 * parameter;

/** Rest, first amplitude and parameter near enough for the fit to start from. */
function startOf({ points, rest }: DecayReadings, term: DampingTerm): { rest: number; amplitude: number; parameter: number } | null {
  const [a, b, c] = [points[0]!, points[1]!, points[2]];
  const sameSide = (b.number - a.number) % 2 === 0;
  const swingMean = c && b.number === a.number + 1 && c.number === a.number + 2 ? (a.angle + 2 * b.angle + c.angle) / 4 : (a.angle + b.angle) / 2;
  const z = rest?.angle ?? (sameSide && c ? (a.angle + c.angle) / 2 : swingMean);
  const first = a.angle - z;
  if (first === 0) return null;
  const fallen = (point: TurningPoint): number => ((point.angle - z) / first) * ((point.number - a.number) % 2 === 0 ? 1 : -1);
  // The last point not yet below a third tells the decay best (methods 1.4); later ones may be lost in the scatter.
  const far = points.findLast((point, i) => i > 0 && fallen(point) > 1 / 3) ?? b;
  if (!(fallen(far) > 0 && fallen(b) > 0)) return null;
  const swing = Math.abs(first);
  const cycles = (far.number - a.number) / 2;
  const perCycle = (straightened(term, swing * fallen(far)) - straightened(term, swing)) / cycles;
  const parameter = perCycle / slopeOfStraightened(term, 1);
  // Back to turning point 0, on the side on which it stands.
  const grown = straightened(term, swing) - (perCycle * a.number) / 2;
  const amplitude = term === 'ratio' ? Math.exp(grown) : term === 'quadratic' ? 1 / Math.max(grown, 1 / 3) : grown;
  if (!(amplitude < Math.PI)) return null;
  return { rest: z, amplitude: Math.sign(first) * (a.number % 2 === 0 ? 1 : -1) * amplitude, parameter };
}

const dampingOf = (terms: readonly DampingTerm[], values: readonly number[]): Damping =>
  terms.reduce((damping, term, i) => ({ ...damping, [term]: values[i]! }), UNDAMPED);

function check({ points, u, rest }: DecayReadings): void {
  const positive = u.length === points.length && u.every((x) => x > 0) && (rest === null || rest.u > 0);
  if (!positive) throw new RangeError('decay: one positive standard uncertainty a reading is needed');
}

/**
 * Rest, first amplitude and damping by weighted least squares on the turning points, each following from the one
 * before by the equation of motion of the full pendulum with these damping terms (one, or several at once).
 * The estimate is signed, so that noise does not bias a mean of many.
 *
 * Valid: at least as many readings (the rest counts as one) as unknowns; numbers rising; ζ < 1.
 * Source: methods 1.3 in the limit of a small swing and weak damping; the covariance is (JᵀJ)⁻¹.
 */
export function fitDecay(terms: readonly DampingTerm[], readings: DecayReadings): DecayFitResult {
  check(readings);
  const { points, u, rest, gravityShare } = readings;
  if (points.length < 2 || points.length + (rest === null ? 0 : 1) < terms.length + 2) return { status: 'tooFew' };
  const begin = terms[0] === undefined ? null : startOf(readings, terms[0]);
  if (begin === null) return { status: 'notDecaying' };
  const last = points[points.length - 1]!.number;
  const residuals = ([z, amplitude, ...values]: readonly number[]): readonly number[] => {
    const angles = turningPointsOrNothing(amplitude!, dampingOf(terms, values), gravityShare, last);
    const swings = points.map((point, i) => (angles === null ? Number.NaN : (z! + angles[point.number]! - point.angle) / u[i]!));
    return rest === null ? swings : [(z! - rest.angle) / rest.u, ...swings];
  };
  const scale = Math.abs(begin.amplitude);
  const sizes: Readonly<Record<DampingTerm, number>> = { ratio: 0.01, quadratic: 0.01 / scale, friction: 0.01 * scale };
  const start = [begin.rest, begin.amplitude, begin.parameter, ...terms.slice(1).map(() => 0)];
  if (!residuals(start).every(Number.isFinite)) return { status: 'notDecaying' };
  const fit = fitLeastSquares(residuals, start, { scales: [scale, scale, ...terms.map((term) => sizes[term])], iterationLimit: 200 });
  if (fit.status !== 'converged') return { status: 'noLimit' };
  const [z, amplitude, ...values] = fit.parameters;
  const weights = [...(rest === null ? [] : [rest.u]), ...u];
  return {
    status: 'found',
    terms,
    damping: dampingOf(terms, values),
    rest: z!,
    amplitude: amplitude!,
    covariance: fit.covariance,
    sensitivities: fit.jacobian.map((row, i) => row.reduce((sum, slope, j) => sum + fit.covariance[2]![j]! * slope, 0) / weights[i]!),
    chiSquared: fit.sumOfSquares,
    dof: fit.dof,
  };
}

/** A trial of the fit may leave the range of the pendulum; the fit then steps shorter. */
function turningPointsOrNothing(amplitude: number, damping: Damping, gravityShare: number, last: number): readonly number[] | null {
  const inside = Math.abs(amplitude) < 3 && damping.ratio > -0.4 && damping.ratio < 0.95 && Math.abs(damping.quadratic * amplitude) < 20;
  const turns = Math.abs(damping.friction) < Math.abs(amplitude);
  if (!inside || !turns) return null;
  try {
    const angles = turningPointsOf(amplitude, damping, gravityShare, last);
    return angles.every((angle) => Math.abs(angle) < 3) ? angles : null;
  } catch (failure) {
    if (failure instanceof RangeError) return null;
    throw failure;
  }
}

/** Standard uncertainty of a fit's n-th term. */
export const uOfTerm = (fit: DecayFit, term: number): number => Math.sqrt(fit.covariance[term + 2]![term + 2]!);

export interface DampingChoice {
  /**
   * told: one law fits and the others do not · notToldApart: the scatter hides which of `possible` holds (or that there
   * is any damping) · mixed: no single law fits as well as two together · noneFits: none within the stated u; `best`
   * is nearest · tooFew: fewer than four readings in all, or no fit found.
   */
  readonly status: 'told' | 'notToldApart' | 'mixed' | 'noneFits' | 'tooFew';
  /** The nearest law, and all the laws that the readings do not rule out. */
  readonly best: DampingTerm | null;
  readonly possible: readonly DampingTerm[];
  /** Fits of the single laws, nearest first. */
  readonly fits: readonly DecayFit[];
  /** The two laws together that fit best, where they do better than one alone. */
  readonly mixed: DecayFit | null;
}

/** A law is ruled out, and two laws are needed, where chance gives such an excess of χ² in fewer than 1 % of cases. */
const LEVEL = 0.01;
/** A law does not fit where chance gives such a χ² in fewer than 0.1 % of cases. */
const FIT_LEVEL = 0.001;

/** Probability that chance gives this excess of χ²: χ² of one degree, and F where the readings scatter more than their u. */
function chanceOf(excess: number, of: DecayFit): number {
  const stated = 1 - chiSquareCdf(Math.max(0, excess), 1);
  if (of.dof < 1 || of.chiSquared <= of.dof) return stated;
  return Math.max(stated, 1 - fCdf(Math.max(0, excess) / (of.chiSquared / of.dof), 1, of.dof));
}
const fitsItsReadings = (fit: DecayFit): boolean => fit.dof < 1 || 1 - chiSquareCdf(fit.chiSquared, fit.dof) >= FIT_LEVEL;

const PAIRS: readonly (readonly DampingTerm[])[] = [['ratio', 'quadratic'], ['ratio', 'friction'], ['quadratic', 'friction']];

/**
 * Which damping law the turning points follow, by χ² of each law with equally many unknowns. The excess over the best
 * is judged as of one further parameter, which the laws that are not special cases of each other make approximate.
 *
 * Valid: as fitDecay; telling laws apart needs at least one reading more than unknowns and an amplitude that falls well.
 * Source: likelihood ratio of the fits (any statistics handbook); methods 1.3 "decide by how the amplitude falls".
 */
export function chooseDampingLaw(readings: DecayReadings): DampingChoice {
  const fits = DAMPING_TERMS.flatMap((term) => {
    const fit = fitDecay([term], readings);
    return fit.status === 'found' ? [fit] : [];
  }).toSorted((a, b) => a.chiSquared - b.chiSquared);
  const nearest = fits[0];
  if (nearest === undefined || nearest.dof < 1) return { status: 'tooFew', best: null, possible: fits.map(termOf), fits, mixed: null };
  const possible = fits.filter((fit) => chanceOf(fit.chiSquared - nearest.chiSquared, nearest) >= LEVEL).map(termOf);
  const best = termOf(nearest);
  const mixed = bestPair(readings, nearest);
  const isFitting = fitsItsReadings(nearest);
  if (mixed !== null && (fitsItsReadings(mixed) || !isFitting)) return { status: fitsItsReadings(mixed) ? 'mixed' : 'noneFits', best, possible, fits, mixed };
  if (!isFitting) return { status: 'noneFits', best, possible, fits, mixed };
  return { status: possible.length === 1 ? 'told' : 'notToldApart', best, possible, fits, mixed };
}

const termOf = (fit: DecayFit): DampingTerm => fit.terms[0]!;

/** Two laws together, both taking energy, where that betters the best single law by more than chance would. */
function bestPair(readings: DecayReadings, nearest: DecayFit): DecayFit | null {
  if (nearest.dof < 2) return null;
  const pairs = PAIRS.flatMap((terms) => {
    const fit = fitDecay(terms, readings);
    return fit.status === 'found' && terms.every((term) => fit.damping[term] > 0) ? [fit] : [];
  }).toSorted((a, b) => a.chiSquared - b.chiSquared);
  const pair = pairs[0];
  return pair !== undefined && chanceOf(nearest.chiSquared - pair.chiSquared, pair) < LEVEL ? pair : null;
}
