/** Nonlinear least squares of a few parameters by the Levenberg–Marquardt method. */
import { backSubstitute, inverseOfGram, triangularise } from './linearAlgebra.ts';
import type { Matrix, Triangle } from './linearAlgebra.ts';

/** Steps tried, taken or not. A fit from a fair start takes some ten; NIST's MGH09 from afar some hundred. */
const ITERATION_LIMIT = 1000;
/** Damping, as a part of the squared column norms: at the start, at the least, and where no step is left worth trying. */
const FIRST_DAMPING = 1e-3;
const LEAST_DAMPING = 1e-15;
const LARGEST_DAMPING = 1e16;
/** Converged: the undamped step that is left changes each parameter by less than this part of it … */
const PARAMETER_TOLERANCE = 1e-11;
/** … or less than this part of its standard deviation (a parameter whose true value is zero) … */
const DEVIATION_TOLERANCE = 1e-9;
/** … or this part where no step helps any more, which is as far as the rounding of the residuals lets one see … */
const STALLED_TOLERANCE = 1e-4;
/** … or moves the model by less than this part of what the parameters make of it (residuals that are all rounding) … */
const MODEL_TOLERANCE = 1e-14;
/** … or the cosine between the residuals and every column of the Jacobian is below this. */
const GRADIENT_TOLERANCE = 1e-13;
/** Below this predicted gain, as a part of the sum of squares, the sum is too coarse a judge of a step; the gradient judges. */
const FLAT = 1e-10;
/** A stalled fit with a cosine below this is at a minimum that has no single place. */
const STATIONARY = 1e-7;
/** Central differences lose least with a step of the cube root of the rounding. */
const RELATIVE_STEP = Math.cbrt(Number.EPSILON);
/** What is left of a column of differences below this part of it is their rounding (its two-thirds power, with some room). */
const DIFFERENCES_RANK = 1e-9;
/** A parameter that has shrunk below this part of its start is still stepped as if it had this size. */
const SCALE_OF_START = 1e-3;

/** r(p): residuals, each divided by its standard uncertainty where these differ. Not finite where the model has no value. */
export type Residuals = (parameters: readonly number[]) => readonly number[];

export interface FitOptions {
  /** ∂r_i/∂p_j, one row a residual; absent: central differences. */
  readonly jacobian?: (parameters: readonly number[]) => Matrix;
  /** Smallest sizes at which each parameter matters, for the steps of the differences; absent: a thousandth of the start, or 1 where it is 0. */
  readonly scales?: readonly number[];
  readonly iterationLimit?: number;
}

interface FitEnd {
  readonly parameters: readonly number[];
  readonly residuals: readonly number[];
  readonly jacobian: Matrix;
  readonly sumOfSquares: number;
  /** m − n. */
  readonly dof: number;
  readonly iterations: number;
}
export interface ConvergedFit extends FitEnd {
  readonly status: 'converged';
  /** (JᵀJ)⁻¹: the covariance for residuals of unit variance; times sumOfSquares/dof where only the scatter tells. */
  readonly covariance: Matrix;
}
/** limit: the iterations ran out or no step helped · singular: the data do not determine every parameter. */
export interface UnfinishedFit extends FitEnd {
  readonly status: 'limit' | 'singular';
  readonly covariance: null;
}
export type FitResult = ConvergedFit | UnfinishedFit;

const squares = (values: readonly number[]): number => values.reduce((sum, value) => sum + value * value, 0);

function differences(residuals: Residuals, parameters: readonly number[], scales: readonly number[]): Matrix {
  const columns = parameters.map((p, j) => {
    const h = RELATIVE_STEP * Math.max(Math.abs(p), scales[j]!);
    const above = p + h;
    const below = p - h;
    const at = (value: number): readonly number[] => residuals(parameters.map((q, k) => (k === j ? value : q)));
    const high = at(above);
    const low = at(below);
    return high.map((value, i) => (value - low[i]!) / (above - below));
  });
  return columns[0]!.map((_, i) => columns.map((column) => column[i]!));
}

/** A point on the way, with all that is known there. */
interface Place {
  readonly p: readonly number[];
  readonly r: readonly number[];
  readonly jacobian: Matrix;
  readonly sum: number;
  readonly triangle: Triangle;
}

/** δ that minimises |Rδ + q|² + λ Σ(D_j δ_j)², D the column norms, and the drop of the sum of squares that the linear model predicts. */
function dampedStep(triangle: Triangle, damping: number): { readonly step: readonly number[]; readonly predicted: number } {
  // A column that vanishes here gets a weight of its own, so that its parameter stays put.
  const weights = triangle.columnNorms.map((norm) => norm || 1);
  const root = Math.sqrt(damping);
  const extra = weights.map((weight, j) => weights.map((_, k) => (k === j ? root * weight : 0)));
  const damped = triangularise([...triangle.r, ...extra], [...triangle.qty.map((q) => -q), ...weights.map(() => 0)]);
  const step = backSubstitute(damped.r, damped.qty);
  // |q|² − |Rδ + q|², in the form that does not cancel: |Rδ|² + 2λ|Dδ|².
  const reached = triangle.r.map((row) => row.reduce((sum, value, k) => sum + value * step[k]!, 0));
  return { step, predicted: squares(reached) + 2 * damping * squares(step.map((d, j) => weights[j]! * d)) };
}

/** Largest cosine of the angle between the residuals and a column of J. */
function largestCosine(triangle: Triangle): number {
  const norm = Math.sqrt(squares(triangle.qty) + triangle.rest);
  if (norm === 0) return 0;
  const cosines = triangle.columnNorms.map((length, j) => {
    const dot = triangle.qty.reduce((sum, q, i) => sum + triangle.r[i]![j]! * q, 0);
    return length === 0 ? 0 : Math.abs(dot) / (length * norm);
  });
  return Math.max(...cosines);
}

/** The step that an undamped round would still take is too small to matter. */
function isSettled({ p, triangle }: Place, covariance: Matrix, dof: number, ofDeviation: number): boolean {
  if (largestCosine(triangle) <= GRADIENT_TOLERANCE) return true;
  const left = backSubstitute(triangle.r, triangle.qty);
  const variance = dof > 0 ? triangle.rest / dof : 0;
  const reach = MODEL_TOLERANCE * Math.max(...triangle.columnNorms.map((norm, j) => norm * Math.abs(p[j]!)));
  return left.every((step, j) => {
    const size = Math.abs(step);
    return size <= PARAMETER_TOLERANCE * Math.abs(p[j]!) || size <= ofDeviation * Math.sqrt(variance * covariance[j]![j]!) || size * triangle.columnNorms[j]! <= reach;
  });
}

/**
 * Parameters that minimise Σ r_i(p)².
 *
 * Valid: at least as many residuals as parameters; meant for six parameters or fewer. A trial where r is not finite is
 * taken as a step too far.
 * Source: D. W. Marquardt, J. Soc. Indust. Appl. Math. 11 (1963) 431 (damping in proportion to the squared column norms);
 * H. B. Nielsen, IMM-REP-1999-05 (control of the damping). Both from memory.
 * @throws RangeError when the sizes do not fit, or the residuals or the Jacobian are not finite at the start
 */
export function fitLeastSquares(residuals: Residuals, start: readonly number[], options: FitOptions = {}): FitResult {
  const n = start.length;
  const scales = options.scales ?? start.map((p) => Math.abs(p) * SCALE_OF_START || 1);
  const jacobianAt = options.jacobian ?? ((p: readonly number[]): Matrix => differences(residuals, p, scales));
  const rankTolerance = options.jacobian === undefined ? DIFFERENCES_RANK : undefined;
  const limit = options.iterationLimit ?? ITERATION_LIMIT;
  if (scales.length !== n || !scales.every((scale) => scale > 0)) throw new RangeError('fitLeastSquares: the scales do not fit the parameters');
  /** null where the model has no value, or its sum of squares is not below the ceiling. */
  const placeAt = (p: readonly number[], ceiling: number): Place | null => {
    const r = residuals(p);
    if (n < 1 || r.length < n) throw new RangeError(`fitLeastSquares: ${n} parameters, ${r.length} residuals`);
    const sum = squares(r);
    if (!(sum < ceiling)) return null;
    const jacobian = jacobianAt(p);
    if (!jacobian.every((row) => row.every(Number.isFinite))) return null;
    return { p, r, jacobian, sum, triangle: triangularise(jacobian, r, rankTolerance) };
  };
  const first = placeAt([...start], Infinity);
  if (first === null) throw new RangeError('fitLeastSquares: the start has no finite residuals and Jacobian');
  let place: Place = first;
  let damping = FIRST_DAMPING;
  let growth = 2;
  let tried = false;
  for (let iterations = 0; ; iterations += 1) {
    const { p, triangle } = place;
    const dof = place.r.length - n;
    const end: FitEnd = { parameters: p, residuals: place.r, jacobian: place.jacobian, sumOfSquares: place.sum, dof, iterations };
    const stalled = damping > LARGEST_DAMPING;
    if (triangle.fullRank && (!tried || stalled)) {
      const covariance = inverseOfGram(triangle.r);
      if (isSettled(place, covariance, dof, stalled ? STALLED_TOLERANCE : DEVIATION_TOLERANCE)) return { status: 'converged', ...end, covariance };
    }
    if (!triangle.fullRank && (stalled || largestCosine(triangle) <= STATIONARY)) return { status: 'singular', ...end, covariance: null };
    if (stalled || iterations >= limit) return { status: 'limit', ...end, covariance: null };
    const { step, predicted } = dampedStep(triangle, damping);
    const isFlat = predicted <= FLAT * place.sum;
    const next = placeAt(p.map((value, j) => value + step[j]!), isFlat ? Infinity : place.sum);
    const isBetter = next !== null && (!isFlat || squares(next.triangle.qty) < squares(triangle.qty));
    tried = !isBetter;
    if (isBetter) {
      const gain = (place.sum - next.sum) / predicted;
      place = next;
      damping = Math.max(LEAST_DAMPING, damping * Math.max(1 / 3, 1 - (2 * Math.max(gain, 0.5) - 1) ** 3));
      growth = 2;
    } else {
      damping *= growth;
      growth *= 2;
    }
  }
}
