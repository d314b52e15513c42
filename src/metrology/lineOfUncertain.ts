/** A straight line through points that are uncertain in both axes, where weights hold what belongs to each point and what all points share goes through the line afterwards. */
import { lineThroughOrigin, yorkLine } from '../numeric/lines.ts';
import { leastSquares } from '../numeric/linearAlgebra.ts';
import { tCdf } from '../numeric/quantiles.ts';
import { incompleteGamma } from '../numeric/specialFunctions.ts';
import { ownParts } from './pooled.ts';
import type { Family, Source } from './source.ts';
import { combine, ofSource, withSensitivities, type Uncertain } from './uncertain.ts';
import type { Dimension } from '../units/units.ts';

export interface UncertainPoint {
  readonly x: Uncertain;
  readonly y: Uncertain;
}

export interface LinePoint {
  /** Residual over the u of it, own parts of both axes. */
  readonly residual: number;
  /** h_i · 1 · part of the fitted value that is its own; they sum to the number of coefficients. */
  readonly leverage: number;
}

export interface LineTest {
  /** Value over its u, own parts and the scatter seen. */
  readonly t: number;
  /** Two-sided chance of as much or more. */
  readonly probability: number;
}

export interface UncertainLine {
  readonly status: 'fitted';
  readonly slope: Uncertain;
  /** null through the origin. */
  readonly intercept: Uncertain | null;
  readonly chiSquared: number;
  readonly dof: number;
  /** Chance of a χ² as large or larger; null without degrees of freedom. */
  readonly probability: number | null;
  /** √(χ²/ν) where it is above 1: the scatter seen over the scatter stated, by which the line's own u is widened. */
  readonly widened: number;
  readonly points: readonly LinePoint[];
}

export type LineOutcome = UncertainLine | { readonly status: 'tooFewPoints' | 'noSpread' | 'notConverged' };

export interface ScatterWords {
  readonly id: string;
  readonly label: string;
  readonly symbol: string;
  readonly dimension: Dimension;
  readonly family: Family;
}

/** Least own u of a point as a part of the largest coordinate: exact points would have infinite weight. */
const LEAST_OWN = 1e-9;
/** Part of a variance that stands for the scatter where the stated u explain all of it. */
const LEAST_EXTRA = 1e-12;
const ORIGIN_ROUNDS = 200;

interface Numbers {
  readonly x: readonly number[];
  readonly y: readonly number[];
  readonly ux: readonly number[];
  readonly uy: readonly number[];
}

function numbersOf(points: readonly UncertainPoint[]): Numbers {
  const [x, y] = [points.map((p) => p.x.value), points.map((p) => p.y.value)];
  const floor = LEAST_OWN * Math.max(...y.map(Math.abs), Number.MIN_VALUE);
  return { x, y, ux: [...ownParts(points.map((p) => p.x))], uy: ownParts(points.map((p) => p.y)).map((u) => Math.max(u, floor)) };
}

/** b of y = b x with errors in both axes: the weights 1/(u_y² + b² u_x²) taken anew until b stays. */
function slopeThroughOrigin({ x, y, ux, uy }: Numbers): number | null {
  let b = 0;
  for (let round = 0; round < ORIGIN_ROUNDS; round++) {
    // The minimum of S(b): Newton on its slope from the weighted line, whose weights hold b fixed.
    const w = x.map((_, i) => 1 / (uy[i]! ** 2 + b * b * ux[i]! ** 2));
    const line = round === 0 ? lineThroughOrigin(x, y, w) : null;
    if (line) {
      if (line.status !== 'fitted') return null;
      b = line.slope;
      continue;
    }
    const r = x.map((value, i) => y[i]! - b * value);
    const slope = sum(x, (i) => -2 * w[i]! * r[i]! * x[i]! - 2 * w[i]! ** 2 * b * ux[i]! ** 2 * r[i]! ** 2);
    const curvature = sum(x, (i) => 2 * w[i]! * x[i]! ** 2 + 8 * b * ux[i]! ** 2 * w[i]! ** 2 * r[i]! * x[i]! - 2 * w[i]! ** 2 * ux[i]! ** 2 * r[i]! ** 2 + 8 * w[i]! ** 3 * b * b * ux[i]! ** 4 * r[i]! ** 2);
    const next = b - slope / curvature;
    if (!Number.isFinite(next)) return null;
    if (Math.abs(next - b) <= 1e-14 * Math.abs(b)) return next;
    b = next;
  }
  return null;
}

const sum = (x: readonly unknown[], term: (i: number) => number): number => x.reduce<number>((total, _, i) => total + term(i), 0);

/** Slopes of the fitted coefficients in every coordinate, by the implicit function theorem at the minimum of S = Σ w(y − a − bx)². */
function sensitivities({ x, y, ux, uy }: Numbers, a: number, b: number, withIntercept: boolean): { readonly slope: readonly (readonly [number, number])[]; readonly intercept: readonly (readonly [number, number])[] } {
  const w = x.map((_, i) => 1 / (uy[i]! ** 2 + b * b * ux[i]! ** 2));
  const r = x.map((value, i) => y[i]! - a - b * value);
  const q = x.map((_, i) => b * ux[i]! ** 2 * w[i]! ** 2);
  const aa = 2 * sum(x, (i) => w[i]!);
  const ab = sum(x, (i) => 2 * w[i]! * x[i]! + 4 * q[i]! * r[i]!);
  const bb = sum(x, (i) => 2 * w[i]! * x[i]! ** 2 + 8 * q[i]! * r[i]! * x[i]! - 2 * w[i]! ** 2 * ux[i]! ** 2 * r[i]! ** 2 + 8 * w[i]! * b * ux[i]! ** 2 * q[i]! * r[i]! ** 2);
  const det = withIntercept ? aa * bb - ab * ab : bb;
  const slope: [number, number][] = [];
  const intercept: [number, number][] = [];
  for (let i = 0; i < x.length; i++) {
    const aBy = [2 * w[i]! * b, -2 * w[i]!] as const;
    const bBy = [2 * w[i]! * b * x[i]! - 2 * w[i]! * r[i]! + 4 * b * q[i]! * r[i]!, -2 * w[i]! * x[i]! - 4 * q[i]! * r[i]!] as const;
    const by = (k: 0 | 1): number => (withIntercept ? -(aa * bBy[k] - ab * aBy[k]) / det : -bBy[k] / det);
    slope.push([by(0), by(1)]);
    intercept.push(withIntercept ? [-(bb * aBy[0] - ab * bBy[0]) / det, -(bb * aBy[1] - ab * bBy[1]) / det] : [0, 0]);
  }
  return { slope, intercept };
}

/**
 * y = b x, or y = a + b x, with errors in both axes (York's equations); what belongs to each point alone weighs it, all contributions go
 * through the fitted coefficients afterwards. Where the points scatter more than stated, the coefficients' own u is widened by √(χ²/ν)
 * with ν of that scatter, and `widened` says so.
 *
 * Valid: one point through the origin, two of different x otherwise. Source: York et al., Am. J. Phys. 72 (2004) 367; implicit
 * derivative of the minimum, derived; Birge, Phys. Rev. 40 (1932) 207, from memory.
 */
export function lineOfUncertain(points: readonly UncertainPoint[], withIntercept: boolean, words: ScatterWords): LineOutcome {
  const n = points.length;
  const coefficients = withIntercept ? 2 : 1;
  if (n < coefficients) return { status: 'tooFewPoints' };
  const numbers = numbersOf(points);
  let [a, b] = [0, 0];
  if (withIntercept) {
    const york = yorkLine(numbers.x, numbers.y, numbers.ux, numbers.uy);
    if (york.status !== 'fitted') return york;
    [a, b] = [york.intercept, york.slope];
  } else {
    const found = slopeThroughOrigin(numbers);
    if (found === null) return { status: numbers.x.every((x) => x === 0) ? 'noSpread' : 'notConverged' };
    b = found;
  }
  const { x, y, ux, uy } = numbers;
  const w = x.map((_, i) => 1 / (uy[i]! ** 2 + b * b * ux[i]! ** 2));
  const residual = x.map((value, i) => (y[i]! - a - b * value) * Math.sqrt(w[i]!));
  const chiSquared = sum(x, (i) => residual[i]! ** 2);
  const dof = n - coefficients;
  const widened = dof > 0 ? Math.max(1, Math.sqrt(chiSquared / dof)) : 1;
  const by = sensitivities(numbers, a, b, withIntercept);
  const coefficient = (value: number, slopes: readonly (readonly [number, number])[], what: string): Uncertain => {
    const y0 = withSensitivities(value, points.flatMap((point, i) => [[slopes[i]![0], point.x] as const, [slopes[i]![1], point.y] as const]));
    const own = sum(x, (i) => (slopes[i]![0] * ux[i]!) ** 2 + (slopes[i]![1] * uy[i]!) ** 2);
    const extra = (widened ** 2 - 1) * own;
    const used = widened ** 2 * own;
    if (!(extra > LEAST_EXTRA * used)) return y0;
    const source: Source = { ...words, id: `${words.id}.${what}`, estimate: 0, u: Math.sqrt(extra), distribution: 't', dof: dof * (extra / used) ** 2 };
    return combine([[1, y0], [1, ofSource(source)]]);
  };
  const total = sum(x, (i) => w[i]!);
  const centre = withIntercept ? sum(x, (i) => w[i]! * x[i]!) / total : 0;
  const spread = sum(x, (i) => w[i]! * (x[i]! - centre) ** 2);
  return {
    status: 'fitted', slope: coefficient(b, by.slope, 'slope'), intercept: withIntercept ? coefficient(a, by.intercept, 'intercept') : null, chiSquared, dof,
    probability: dof > 0 ? incompleteGamma(dof / 2, chiSquared / 2).upper : null, widened,
    points: x.map((value, i) => ({ residual: residual[i]!, leverage: w[i]! * ((withIntercept ? 1 / total : 0) + (value - centre) ** 2 / spread) })),
  };
}

/** Two-sided chance of |t| or more with ν degrees of freedom. */
const twoSided = (t: number, dof: number): number => 2 * (1 - tCdf(Math.abs(t), dof));
/** With many degrees of freedom t is normal. */
const MANY = 1e6;

/** The intercept against zero, by own parts and the scatter seen; what is common to all points cannot make one. null with fewer than three points. */
export function interceptTest(points: readonly UncertainPoint[]): LineTest | null {
  if (points.length < 3) return null;
  const n = numbersOf(points);
  const york = yorkLine(n.x, n.y, n.ux, n.uy);
  if (york.status !== 'fitted') return null;
  const widened = Math.max(1, Math.sqrt(york.sumOfSquares / york.dof));
  const t = york.intercept / (york.uIntercept * widened);
  return { t, probability: twoSided(t, widened > 1 ? york.dof : MANY) };
}

/** A quadratic term against zero, with the weights of the line; null with fewer than four points. */
export function curvatureTest(points: readonly UncertainPoint[]): LineTest | null {
  if (points.length < 4) return null;
  const { x, y, ux, uy } = numbersOf(points);
  const york = yorkLine(x, y, ux, uy);
  if (york.status !== 'fitted') return null;
  const size = Math.max(...x.map(Math.abs));
  const root = x.map((_, i) => 1 / Math.sqrt(uy[i]! ** 2 + (york.slope * ux[i]!) ** 2));
  const solved = leastSquares(x.map((value, i) => [root[i]!, (root[i]! * value) / size, root[i]! * (value / size) ** 2]), y.map((value, i) => value * root[i]!));
  if (solved.status !== 'solved') return null;
  const widened = Math.max(1, Math.sqrt(solved.sumOfSquares / solved.dof));
  const t = solved.x[2]! / (Math.sqrt(solved.covariance[2]![2]!) * widened);
  return { t, probability: twoSided(t, widened > 1 ? solved.dof : MANY) };
}

