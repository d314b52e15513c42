/** What a fitted line leaves: scatter, an intercept, a bend, a trend along the order, runs of one sign; each with the chance of as much by accident. */
import { leastSquares, type LeastSquaresSolution } from './linearAlgebra.ts';
import { lineBothAxes, type LineBothAxes, type WeighedPoints } from './lineBothAxes.ts';
import { incompleteGamma, lnGamma, normalTails } from './specialFunctions.ts';
import { tCdf } from './quantiles.ts';

/** Scatter seen against the scatter stated. */
export interface Scatter {
  readonly chiSquared: number;
  readonly dof: number;
  /** Chance of a χ² as large or larger; null without degrees of freedom. */
  readonly probability: number | null;
  /** Birge's ratio √(χ²/ν) where above 1, else 1: every u of the line from own parts is multiplied by it, and then has that ν. */
  readonly widened: number;
}

/** χ² against its ν. Source: Birge, Phys. Rev. 40 (1932) 207, from memory. */
export function scatterOf({ chiSquared, dof }: Pick<LineBothAxes, 'chiSquared' | 'dof'>): Scatter {
  return { chiSquared, dof, probability: dof > 0 ? incompleteGamma(dof / 2, chiSquared / 2).upper : null, widened: dof > 0 ? Math.max(1, Math.sqrt(chiSquared / dof)) : 1 };
}

export interface LineTest {
  /** Value over its u: the stated one, widened by √(χ²/ν) where the points scatter more. */
  readonly t: number;
  /** ν of t: that of the scatter where it widened, else Infinity. */
  readonly dof: number;
  /** Two-sided chance of as much or more. */
  readonly probability: number;
}

const twoSided = (t: number, dof: number): number => Math.min(1, 2 * (dof === Infinity ? normalTails(-Math.abs(t)).lower : tCdf(-Math.abs(t), dof)));

/** t and its chance from a value, its stated u and the fit's χ². */
function testOf(value: number, u: number, chiSquared: number, dof: number): LineTest | null {
  const { widened } = scatterOf({ chiSquared, dof });
  const t = value / (u * widened);
  if (!Number.isFinite(t)) return null;
  const nu = widened > 1 ? dof : Infinity;
  return { t, dof: nu, probability: twoSided(t, nu) };
}

/**
 * Intercept of the line with errors in both axes against zero.
 *
 * null with fewer than three points or where there is no line. Source: York et al. 2004; Student's t.
 * @throws RangeError as lineBothAxes
 */
export function interceptTest(points: WeighedPoints): LineTest | null {
  if (points.x.length < 3) return null;
  const line = lineBothAxes(points, true);
  return line.status === 'fitted' ? testOf(line.intercept, line.uIntercept, line.chiSquared, line.dof) : null;
}

/** Weighted linear fit with the effective variances u_y² + b² u_x² at the slope of the straight line; null where there is none. */
function withColumns(points: WeighedPoints, slope: number, columns: readonly (readonly number[])[]): LeastSquaresSolution | null {
  const root = points.x.map((_, i) => 1 / Math.hypot(points.uy[i]!, slope * points.ux[i]!));
  const solved = leastSquares(points.x.map((_, i) => columns.map((column) => root[i]! * column[i]!)), points.y.map((value, i) => value * root[i]!));
  return solved.status === 'solved' ? solved : null;
}

/** The last column of a fit against zero. */
function lastOf(solved: LeastSquaresSolution | null): LineTest | null {
  if (solved === null) return null;
  const k = solved.x.length - 1;
  return testOf(solved.x[k]!, Math.sqrt(solved.covariance[k]![k]!), solved.sumOfSquares, solved.dof);
}

/**
 * A quadratic term against zero, y = a + b x + c x², or y = b x + c x² through the origin.
 *
 * Weights of the straight line (effective variance). null with fewer than four points (three through the origin), or with too few different x.
 * Source: least squares; Orear, Am. J. Phys. 50 (1982) 912, effective variance, from memory.
 * @throws RangeError as lineBothAxes
 */
export function bendTest(points: WeighedPoints, withIntercept = true): LineTest | null {
  if (points.x.length < (withIntercept ? 4 : 3)) return null;
  const line = lineBothAxes(points, withIntercept);
  if (line.status !== 'fitted') return null;
  const size = Math.max(...points.x.map(Math.abs));
  const x = points.x.map((value) => value / size);
  return lastOf(withColumns(points, line.slope, [...(withIntercept ? [x.map(() => 1)] : []), x, x.map((value) => value * value)]));
}

export interface DriftTest extends LineTest {
  /** Change of the slope from the first place to the last over the slope · 1. */
  readonly relative: number;
}

/**
 * A slope that drifts along `places` (order or time) against one that stays: y = b x [1 + c (place − mean)], with or without an intercept.
 *
 * The line is fitted with it, so that taps that grew with time are not taken for a drift. null with too few points, or where places do not differ.
 * Source: least squares with the effective variances of the straight line, derived.
 * @throws RangeError as lineBothAxes, or when the places are not as many
 */
export function driftTest(points: WeighedPoints, places: readonly number[], withIntercept: boolean): DriftTest | null {
  if (places.length !== points.x.length || !places.every(Number.isFinite)) throw new RangeError(`drift: ${places.length} places of ${points.x.length} points`);
  if (points.x.length < (withIntercept ? 4 : 3)) return null;
  const line = lineBothAxes(points, withIntercept);
  if (line.status !== 'fitted') return null;
  const [first, last] = [Math.min(...places), Math.max(...places)];
  if (first === last) return null;
  const middle = places.reduce((a, b) => a + b, 0) / places.length;
  const column = points.x.map((x, i) => (x * (places[i]! - middle)) / (last - first));
  const solved = withColumns(points, line.slope, [...(withIntercept ? [points.x.map(() => 1)] : []), points.x, column]);
  const test = lastOf(solved);
  return test && solved && { ...test, relative: solved.x.at(-1)! / solved.x.at(-2)! };
}

export interface RunsTest {
  /** Runs of one sign, and how many of each sign. */
  readonly runs: number;
  readonly above: number;
  readonly below: number;
  /** Expected number and its sd. */
  readonly expected: number;
  readonly sd: number;
  /** Twice the smaller tail, exact. */
  readonly probability: number;
}

const lnChoose = (n: number, k: number): number => lnGamma(n + 1) - lnGamma(k + 1) - lnGamma(n - k + 1);

/** P(R = r) of m and n signs in any order. */
function chanceOfRuns(r: number, m: number, n: number): number {
  const ways = (a: number, b: number): number => (a < 0 || b < 0 || a > m - 1 || b > n - 1 ? 0 : Math.exp(lnChoose(m - 1, a) + lnChoose(n - 1, b) - lnChoose(m + n, m)));
  const k = Math.floor(r / 2);
  return r % 2 === 0 ? 2 * ways(k - 1, k - 1) : ways(k, k - 1) + ways(k - 1, k);
}

/**
 * Wald and Wolfowitz's runs of signs in the given order; zeros are left out.
 *
 * null where all have one sign or there are fewer than two. Residuals of a fit are not quite independent: with few points it is a hint.
 * Source: Wald & Wolfowitz, Ann. Math. Statist. 11 (1940) 147; exact distribution as in Swed & Eisenhart 1943, from memory.
 */
export function runsTest(values: readonly number[]): RunsTest | null {
  const signs = values.filter((value) => value !== 0).map(Math.sign);
  const above = signs.filter((sign) => sign > 0).length;
  const below = signs.length - above;
  if (above === 0 || below === 0) return null;
  const runs = signs.reduce((count, sign, i) => count + (i === 0 || sign !== signs[i - 1] ? 1 : 0), 0);
  const N = above + below;
  let [lower, upper] = [0, 0];
  for (let r = 2; r <= N; r += 1) {
    const p = chanceOfRuns(r, above, below);
    if (r <= runs) lower += p;
    if (r >= runs) upper += p;
  }
  const product = 2 * above * below;
  return { runs, above, below, expected: product / N + 1, sd: N < 2 ? 0 : Math.sqrt((product * (product - N)) / (N * N * (N - 1))), probability: Math.min(1, 2 * Math.min(lower, upper)) };
}
