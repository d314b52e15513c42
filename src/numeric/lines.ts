/** Straight lines y = a + b x through points, with uncertainties in neither axis, in y, or in both. */
import { mean } from './samples.ts';

/** Rounds of York's fixed point; ordinary data take some ten, steep ones with large u(x) some hundred. */
const YORK_ITERATION_LIMIT = 1000;
/** Change of the slope, as a part of the slope or of its uncertainty, at which York's fixed point has settled. */
const YORK_TOLERANCE = 1e-14;

/** A line y = a + b x with the standard uncertainties of its coefficients. */
export interface Line {
  readonly status: 'fitted';
  readonly intercept: number;
  readonly slope: number;
  readonly uIntercept: number;
  readonly uSlope: number;
  /** Covariance u(a, b). */
  readonly covariance: number;
  /** Sum of the (weighted) squared residuals; with stated uncertainties, χ². */
  readonly sumOfSquares: number;
  /** n − 2. */
  readonly dof: number;
}

/** Ordinary least squares: the uncertainties come from the scatter about the line. */
export interface OrdinaryLine extends Line {
  /** √(sumOfSquares/dof), the standard deviation of a point about the line. */
  readonly s: number;
}

export interface LineThroughOrigin {
  readonly status: 'fitted';
  readonly slope: number;
  /** From the scatter about the line, s/√Σwx²; null for a single point. */
  readonly uSlopeFromScatter: number | null;
  /** 1/√Σwx²: the slope's uncertainty where the weights are 1/u(y)². */
  readonly uSlopeFromWeights: number;
  /** √(Σw(y − bx)²/(n − 1)); null for a single point. */
  readonly s: number | null;
  readonly sumOfSquares: number;
  /** n − 1. */
  readonly dof: number;
}

/** Too few points for the coefficients (and, without stated uncertainties, a scatter) · all x equal (or, through the origin, zero) · iteration limit reached. */
export type LineFailure = { readonly status: 'tooFewPoints' | 'noSpread' | 'notConverged' };

interface Points {
  readonly x: readonly number[];
  readonly y: readonly number[];
}

function checkPoints(what: string, x: readonly number[], y: readonly number[]): void {
  if (x.length !== y.length) throw new RangeError(`${what}: ${x.length} abscissae, ${y.length} ordinates`);
  if (!x.every(Number.isFinite) || !y.every(Number.isFinite)) throw new RangeError(`${what}: a coordinate is not finite`);
}

function checkWeights(what: string, n: number, values: readonly number[], fits: (value: number) => boolean): void {
  if (values.length !== n) throw new RangeError(`${what}: ${n} points, ${values.length} uncertainties or weights`);
  if (!values.every((value) => Number.isFinite(value) && fits(value))) throw new RangeError(`${what}: an uncertainty or weight is out of its range`);
}

const sumOf = (n: number, term: (i: number) => number): number => {
  let sum = 0;
  for (let i = 0; i < n; i += 1) sum += term(i);
  return sum;
};

/** Weighted least squares about the weighted centre; u from the weights alone. */
function throughCentre({ x, y }: Points, weights: readonly number[]): Line | LineFailure {
  const n = x.length;
  const total = sumOf(n, (i) => weights[i]!);
  // The first estimate of the centre carries the size of x; the second pass takes off its rounding.
  const roughX = mean(x);
  const roughY = mean(y);
  const xBar = roughX + sumOf(n, (i) => weights[i]! * (x[i]! - roughX)) / total;
  const yBar = roughY + sumOf(n, (i) => weights[i]! * (y[i]! - roughY)) / total;
  if (x.every((value) => value === x[0])) return { status: 'noSpread' };
  const sxx = sumOf(n, (i) => weights[i]! * (x[i]! - xBar) ** 2);
  const slope = sumOf(n, (i) => weights[i]! * (x[i]! - xBar) * (y[i]! - yBar)) / sxx;
  return {
    status: 'fitted',
    intercept: yBar - slope * xBar,
    slope,
    uIntercept: Math.sqrt(1 / total + xBar ** 2 / sxx),
    uSlope: Math.sqrt(1 / sxx),
    covariance: -xBar / sxx,
    sumOfSquares: sumOf(n, (i) => weights[i]! * (y[i]! - yBar - slope * (x[i]! - xBar)) ** 2),
    dof: n - 2,
  };
}

/**
 * Ordinary least squares line; standard deviations from the scatter about it.
 *
 * Valid: at least three points, x not all equal.
 * Source: JCGM 100:2008 H.3, equations H.13a–g.
 * @throws RangeError when the lists differ in length or a number is not finite
 */
export function ordinaryLine(x: readonly number[], y: readonly number[]): OrdinaryLine | LineFailure {
  checkPoints('ordinaryLine', x, y);
  if (x.length < 3) return { status: 'tooFewPoints' };
  const line = throughCentre({ x, y }, x.map(() => 1));
  if (line.status !== 'fitted') return line;
  const s = Math.sqrt(line.sumOfSquares / line.dof);
  return { ...line, uIntercept: line.uIntercept * s, uSlope: line.uSlope * s, covariance: line.covariance * s * s, s };
}

/**
 * Weighted least squares line; uncertainties from the stated u(y) alone.
 *
 * Valid: at least two points, x not all equal, every u(y) > 0.
 * Source: ISO/TS 28037:2010 clause 6.
 * @throws RangeError when the lists differ in length or a number is out of its range
 */
export function weightedLine(x: readonly number[], y: readonly number[], uy: readonly number[]): Line | LineFailure {
  checkPoints('weightedLine', x, y);
  checkWeights('weightedLine', x.length, uy, (u) => u > 0);
  if (x.length < 2) return { status: 'tooFewPoints' };
  return throughCentre({ x, y }, uy.map((u) => 1 / u ** 2));
}

/**
 * Line through the origin y = b x: b = Σwxy/Σwx².
 *
 * Valid: at least one point, x not all zero, every weight > 0 (absent: 1).
 * Source: least squares with one coefficient (NIST StRD NoInt1 and NoInt2 are its checks).
 * @throws RangeError when the lists differ in length or a number is out of its range
 */
export function lineThroughOrigin(x: readonly number[], y: readonly number[], weights?: readonly number[]): LineThroughOrigin | LineFailure {
  checkPoints('lineThroughOrigin', x, y);
  const n = x.length;
  const w = weights ?? x.map(() => 1);
  checkWeights('lineThroughOrigin', n, w, (weight) => weight > 0);
  if (n < 1) return { status: 'tooFewPoints' };
  const sxx = sumOf(n, (i) => w[i]! * x[i]! ** 2);
  if (!(sxx > 0)) return { status: 'noSpread' };
  const slope = sumOf(n, (i) => w[i]! * x[i]! * y[i]!) / sxx;
  const sumOfSquares = sumOf(n, (i) => w[i]! * (y[i]! - slope * x[i]!) ** 2);
  const dof = n - 1;
  const s = dof > 0 ? Math.sqrt(sumOfSquares / dof) : null;
  const uSlopeFromWeights = 1 / Math.sqrt(sxx);
  return { status: 'fitted', slope, uSlopeFromScatter: s === null ? null : s * uSlopeFromWeights, uSlopeFromWeights, s, sumOfSquares, dof };
}

/** One round of York's equations at a slope b: the next slope, and what the uncertainties need. */
function yorkRound({ x, y }: Points, u: { x: readonly number[]; y: readonly number[]; xy: readonly number[] }, b: number) {
  const n = x.length;
  const w = x.map((_, i) => 1 / (u.y[i]! ** 2 + b * b * u.x[i]! ** 2 - 2 * b * u.xy[i]!));
  const total = sumOf(n, (i) => w[i]!);
  const roughX = mean(x);
  const roughY = mean(y);
  const xBar = roughX + sumOf(n, (i) => w[i]! * (x[i]! - roughX)) / total;
  const yBar = roughY + sumOf(n, (i) => w[i]! * (y[i]! - roughY)) / total;
  const beta = x.map((_, i) => {
    const U = x[i]! - xBar;
    const V = y[i]! - yBar;
    return w[i]! * (U * u.y[i]! ** 2 + b * V * u.x[i]! ** 2 - (b * U + V) * u.xy[i]!);
  });
  const slope = sumOf(n, (i) => w[i]! * beta[i]! * (y[i]! - yBar)) / sumOf(n, (i) => w[i]! * beta[i]! * (x[i]! - xBar));
  // Adjusted points x_i = x̄ + β_i; their weighted mean is x̄ + mean of β.
  const betaBar = sumOf(n, (i) => w[i]! * beta[i]!) / total;
  const adjustedMean = xBar + betaBar;
  const uSlope = Math.sqrt(1 / sumOf(n, (i) => w[i]! * (beta[i]! - betaBar) ** 2));
  const sumOfSquares = sumOf(n, (i) => w[i]! * (y[i]! - yBar - b * (x[i]! - xBar)) ** 2);
  return { slope, intercept: yBar - slope * xBar, uSlope, uIntercept: Math.sqrt(1 / total + (adjustedMean * uSlope) ** 2), adjustedMean, sumOfSquares };
}

/**
 * Line through points with uncertainties in both axes, correlated point by point or not (York's unified equations);
 * uncertainties at the adjusted points, from the stated u alone.
 *
 * Valid: at least two points, x not all equal; u ≥ 0, not both zero at a point; |r| < 1 (absent: 0).
 * An exact x (u(x) = 0) or an exact y may stand among others; with every u(x) = 0 this is weightedLine.
 * Source: York, Evensen, López Martínez & De Basabe Delgado, Am. J. Phys. 72 (2004) 367, equations 13.
 * @throws RangeError when the lists differ in length or a number is out of its range
 */
export function yorkLine(x: readonly number[], y: readonly number[], ux: readonly number[], uy: readonly number[], r?: readonly number[]): Line | LineFailure {
  checkPoints('yorkLine', x, y);
  const n = x.length;
  checkWeights('yorkLine', n, ux, (u) => u >= 0);
  checkWeights('yorkLine', n, uy, (u) => u >= 0);
  if (ux.some((u, i) => u === 0 && uy[i] === 0)) throw new RangeError('yorkLine: a point is exact in both axes');
  if (r !== undefined) checkWeights('yorkLine', n, r, (value) => Math.abs(value) < 1);
  if (n < 2) return { status: 'tooFewPoints' };
  const start = throughCentre({ x, y }, x.map(() => 1));
  if (start.status !== 'fitted') return start;
  const u = { x: ux, y: uy, xy: x.map((_, i) => (r?.[i] ?? 0) * ux[i]! * uy[i]!) };
  let b = start.slope;
  for (let k = 0; k < YORK_ITERATION_LIMIT; k += 1) {
    const round = yorkRound({ x, y }, u, b);
    const { slope, intercept, uSlope, uIntercept, adjustedMean, sumOfSquares } = round;
    if (![slope, intercept, uSlope, uIntercept, sumOfSquares].every(Number.isFinite)) return { status: 'notConverged' };
    if (Math.abs(slope - b) <= YORK_TOLERANCE * Math.max(Math.abs(slope), uSlope)) {
      return { status: 'fitted', intercept, slope, uIntercept, uSlope, covariance: -adjustedMean * uSlope ** 2, sumOfSquares, dof: n - 2 };
    }
    b = slope;
  }
  return { status: 'notConverged' };
}

/** Value of a line at x with its standard uncertainty: u²(y) = u²(a) + x²u²(b) + 2x u(a, b). Source: JCGM 100:2008 H.3, equation H.15. */
export function lineAt(line: Line, x: number): { readonly value: number; readonly u: number } {
  const variance = line.uIntercept ** 2 + (x * line.uSlope) ** 2 + 2 * x * line.covariance;
  return { value: line.intercept + line.slope * x, u: Math.sqrt(Math.max(0, variance)) };
}
