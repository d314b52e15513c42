/** A straight line through points with uncertainties in both axes, through the origin or not, with its slopes in every coordinate at the solution. */
import { yorkLine } from './lines.ts';

/** Points with the standard uncertainties that weigh them; u(x), u(y) ≥ 0, not both zero at a point. */
export interface WeighedPoints {
  readonly x: readonly number[];
  readonly y: readonly number[];
  readonly ux: readonly number[];
  readonly uy: readonly number[];
}

export interface LineBothAxes {
  readonly status: 'fitted';
  /** a, 0 through the origin, and b of y = a + b x. */
  readonly intercept: number;
  readonly slope: number;
  /** χ² = Σ w (y − a − b x)², w = 1/(u_y² + b² u_x²), and ν = n − 1 or n − 2. */
  readonly chiSquared: number;
  readonly dof: number;
  /** (y − a − b x) √w. */
  readonly residuals: readonly number[];
  /** Part of each fitted value that is its own; they sum to the number of coefficients. */
  readonly leverages: readonly number[];
  /** ∂b/∂x_i, ∂b/∂y_i; ∂a/∂x_i, ∂a/∂y_i (zeros through the origin). */
  readonly slopeBy: { readonly x: readonly number[]; readonly y: readonly number[] };
  readonly interceptBy: { readonly x: readonly number[]; readonly y: readonly number[] };
  /** From u(x), u(y) through those slopes. */
  readonly uSlope: number;
  readonly uIntercept: number;
  readonly covariance: number;
}

export type LineBothAxesResult = LineBothAxes | { readonly status: 'tooFewPoints' | 'noSpread' | 'notConverged' };

/** Least u(y) as a part of the largest y: points exact in both axes would have infinite weight. */
const LEAST_U = 1e-9;

/** The same points, none exact in both axes. */
export function notExact({ x, y, ux, uy }: WeighedPoints): WeighedPoints {
  const least = LEAST_U * (Math.max(0, ...y.map(Math.abs)) || 1);
  return { x, y, ux, uy: uy.map((u) => Math.max(u, least)) };
}

const ROUNDS = 200;
/** Newton has settled: nothing left but rounding; or a step this small that no longer shrinks. */
const SETTLED = 1e-15;
const SMALL = 1e-9;

const sum = (n: number, term: (i: number) => number): number => {
  let total = 0;
  for (let i = 0; i < n; i += 1) total += term(i);
  return total;
};

const weightsAt = ({ ux, uy }: WeighedPoints, b: number): readonly number[] => ux.map((u, i) => 1 / (uy[i]! ** 2 + b * b * u * u));

/** χ² of y = a + b x. */
const chiSquaredOf = (points: WeighedPoints, a: number, b: number): number => {
  const w = weightsAt(points, b);
  return sum(points.x.length, (i) => w[i]! * (points.y[i]! - a - b * points.x[i]!) ** 2);
};

/** Second derivatives of S = χ²(a, b), and of its slopes by each coordinate. */
function derivatives({ x, y, ux, uy }: WeighedPoints, a: number, b: number) {
  const n = x.length;
  const w = weightsAt({ x, y, ux, uy }, b);
  const r = x.map((value, i) => y[i]! - a - b * value);
  // dw/db = −2 b u_x² w² = −2q.
  const q = x.map((_, i) => b * ux[i]! ** 2 * w[i]! ** 2);
  return {
    b: sum(n, (i) => -2 * w[i]! * x[i]! * r[i]! - 2 * q[i]! * r[i]! ** 2),
    aa: 2 * sum(n, (i) => w[i]!),
    ab: sum(n, (i) => 2 * w[i]! * x[i]! + 4 * q[i]! * r[i]!),
    bb: sum(n, (i) => 2 * w[i]! * x[i]! ** 2 + 8 * q[i]! * r[i]! * x[i]! - 2 * (w[i]! * ux[i]! * r[i]!) ** 2 + 8 * w[i]! * b * ux[i]! ** 2 * q[i]! * r[i]! ** 2),
    aBy: (i: number) => ({ x: 2 * w[i]! * b, y: -2 * w[i]! }),
    bBy: (i: number) => ({ x: 2 * w[i]! * (b * x[i]! - r[i]!) + 4 * b * q[i]! * r[i]!, y: -2 * w[i]! * x[i]! - 4 * q[i]! * r[i]! }),
  };
}

/** b of y = b x at the least χ²: Newton, halved where χ² would rise. null where it does not settle. */
function slopeThroughOrigin(points: WeighedPoints, start: number): number | null {
  let b = start;
  let last = Infinity;
  for (let round = 0; round < ROUNDS; round += 1) {
    const { b: first, bb } = derivatives(points, 0, b);
    // Where χ² bends down, the part of the bend that cannot: 2Σwx².
    const bend = bb > 0 ? bb : 2 * sum(points.x.length, (i) => weightsAt(points, b)[i]! * points.x[i]! ** 2);
    let step = -first / bend;
    if (!Number.isFinite(step)) return null;
    const size = Math.abs(step);
    if (size <= SETTLED * Math.abs(b) || step === 0) return b;
    const small = SMALL * Math.max(Math.abs(b), 1 / Math.sqrt(bend));
    if (size <= small && size >= last / 2) return b;
    const now = chiSquaredOf(points, 0, b);
    if (size > small) while (chiSquaredOf(points, 0, b + step) > now && Math.abs(step) > small) step /= 2;
    last = size;
    b += step;
  }
  return null;
}

function check({ x, y, ux, uy }: WeighedPoints): void {
  if ([y, ux, uy].some((list) => list.length !== x.length)) throw new RangeError(`line with both axes: ${x.length} abscissae, ${y.length} ordinates, ${ux.length} and ${uy.length} uncertainties`);
  if (![x, y, ux, uy].every((list) => list.every(Number.isFinite)) || [...ux, ...uy].some((u) => u < 0)) throw new RangeError('line with both axes: a number is out of its range');
  if (ux.some((u, i) => u === 0 && uy[i] === 0)) throw new RangeError('line with both axes: a point is exact in both axes');
}

/**
 * y = b x or y = a + b x of least χ², with errors in both axes.
 *
 * The implicit derivatives carry what is common to several points (a hammer's factor, a ruler) through the coefficients, though it weighs nothing.
 * Valid: one point with x ≠ 0 through the origin; two of different x otherwise.
 * Source: York et al., Am. J. Phys. 72 (2004) 367; derivatives by the implicit function theorem at the minimum, derived.
 * @throws RangeError when the lists differ in length, a number is out of its range, or a point is exact in both axes
 */
export function lineBothAxes(points: WeighedPoints, withIntercept: boolean): LineBothAxesResult {
  check(points);
  const { x, y, ux, uy } = points;
  const n = x.length;
  const coefficients = withIntercept ? 2 : 1;
  if (n < coefficients) return { status: 'tooFewPoints' };
  // About the middle of the points the two coefficients do not lean on each other.
  const [x0, y0] = withIntercept ? [sum(n, (i) => x[i]!) / n, sum(n, (i) => y[i]!) / n] : [0, 0];
  const about = { ...points, x: x.map((value) => value - x0), y: y.map((value) => value - y0) };
  let [a, b] = [0, 0];
  if (withIntercept) {
    const york = yorkLine(about.x, about.y, ux, uy);
    if (york.status !== 'fitted') return york;
    [a, b] = [york.intercept, york.slope];
  } else {
    if (x.every((value) => value === 0)) return { status: 'noSpread' };
    const found = slopeThroughOrigin(about, sum(n, (i) => x[i]! * y[i]!) / sum(n, (i) => x[i]! ** 2));
    if (found === null) return { status: 'notConverged' };
    b = found;
  }
  const w = weightsAt(points, b);
  const residuals = about.x.map((value, i) => (about.y[i]! - a - b * value) * Math.sqrt(w[i]!));
  const slopes = coefficientSlopes(about, a, b, withIntercept);
  const interceptBy = { x: slopes.map(({ a: by, b: bBy }) => by.x - x0 * bBy.x), y: slopes.map(({ a: by, b: bBy }) => by.y - x0 * bBy.y) };
  const slopeBy = { x: slopes.map(({ b: by }) => by.x), y: slopes.map(({ b: by }) => by.y) };
  if (![...slopeBy.x, ...slopeBy.y].every(Number.isFinite)) return { status: 'notConverged' };
  const variance = (p: LineBothAxes['slopeBy'], q: LineBothAxes['slopeBy']): number => sum(n, (i) => p.x[i]! * q.x[i]! * ux[i]! ** 2 + p.y[i]! * q.y[i]! * uy[i]! ** 2);
  const total = sum(n, (i) => w[i]!);
  const centre = withIntercept ? sum(n, (i) => w[i]! * about.x[i]!) / total : 0;
  const spread = sum(n, (i) => w[i]! * (about.x[i]! - centre) ** 2);
  return {
    status: 'fitted', slope: b, intercept: withIntercept ? a + y0 - b * x0 : 0,
    chiSquared: residuals.reduce((all, value) => all + value * value, 0), dof: n - coefficients, residuals,
    leverages: about.x.map((value, i) => w[i]! * ((withIntercept ? 1 / total : 0) + (value - centre) ** 2 / spread)),
    slopeBy, interceptBy: withIntercept ? interceptBy : { x: x.map(() => 0), y: x.map(() => 0) },
    uSlope: Math.sqrt(variance(slopeBy, slopeBy)), uIntercept: withIntercept ? Math.sqrt(variance(interceptBy, interceptBy)) : 0, covariance: withIntercept ? variance(slopeBy, interceptBy) : 0,
  };
}

type By = Readonly<Record<'x' | 'y', number>>;

function coefficientSlopes(points: WeighedPoints, a: number, b: number, withIntercept: boolean): readonly { readonly a: By; readonly b: By }[] {
  const d = derivatives(points, a, b);
  const det = d.aa * d.bb - d.ab * d.ab;
  return points.x.map((_, i) => {
    const [aBy, bBy] = [d.aBy(i), d.bBy(i)];
    const of = (axis: 'x' | 'y'): readonly [number, number] =>
      withIntercept ? [-(d.bb * aBy[axis] - d.ab * bBy[axis]) / det, -(d.aa * bBy[axis] - d.ab * aBy[axis]) / det] : [0, -bBy[axis] / d.bb];
    const [byX, byY] = [of('x'), of('y')];
    return { a: { x: byX[0], y: byY[0] }, b: { x: byX[1], y: byY[1] } };
  });
}
