/** A straight line through points that are uncertain in both axes, where weights hold what belongs to each point and what all points share goes through the line afterwards. */
import { lineBothAxes, notExact, type LineBothAxes, type WeighedPoints } from '../numeric/lineBothAxes.ts';
import { bendTest, interceptTest as interceptOfNumbers, scatterOf, type LineTest } from '../numeric/lineTests.ts';
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

/** Part of a variance that stands for the scatter where the stated u explain all of it. */
const LEAST_EXTRA = 1e-12;

const numbersOf = (points: readonly UncertainPoint[]): WeighedPoints =>
  notExact({ x: points.map((p) => p.x.value), y: points.map((p) => p.y.value), ux: ownParts(points.map((p) => p.x)), uy: ownParts(points.map((p) => p.y)) });

const ownOf = ({ value, own }: Uncertain): Uncertain => ({ value, own, through: new Map() });
const sharedOf = ({ value, through }: Uncertain): Uncertain => ({ value, own: new Map(), through });

/**
 * What moves the slope through the origin where each u goes with its coordinate: u_i ∂b/∂u_i over the coordinate, beside ∂b/∂x_i and ∂b/∂y_i.
 * A scale that all points share moves their u too, and then moves the slope by exactly itself: Σ y_i ∂b/∂y_i = b, Σ x_i ∂b/∂x_i = −b.
 *
 * Source: implicit derivative of ∂S/∂b = 0, S = Σ (y − bx)²/(u_y² + b² u_x²); derived.
 */
function slopeByWithWeights({ x, y, ux, uy }: WeighedPoints, b: number, { x: byX, y: byY }: LineBothAxes['slopeBy']): LineBothAxes['slopeBy'] {
  const w = x.map((_, i) => 1 / (uy[i]! ** 2 + b * b * ux[i]! ** 2));
  const r = x.map((value, i) => y[i]! - b * value);
  const bend = x.reduce((sum, value, i) => sum + 2 * w[i]! * value ** 2 + 8 * b * ux[i]! ** 2 * w[i]! ** 2 * r[i]! * value - 2 * w[i]! ** 2 * ux[i]! ** 2 * r[i]! ** 2 + 8 * w[i]! ** 3 * b * b * ux[i]! ** 4 * r[i]! ** 2, 0);
  const byUx = (i: number): number => 4 * b * b * ux[i]! * w[i]! ** 2 * r[i]! * x[i]! + 8 * b ** 3 * ux[i]! ** 3 * w[i]! ** 3 * r[i]! ** 2 - 4 * w[i]! ** 2 * b * ux[i]! * r[i]! ** 2;
  const byUy = (i: number): number => 4 * uy[i]! * w[i]! ** 2 * r[i]! * x[i]! + 8 * uy[i]! * w[i]! ** 3 * b * ux[i]! ** 2 * r[i]! ** 2;
  const moved = (by: number, u: number, at: number, slope: number): number => (at === 0 ? by : by - ((u / at) * slope) / bend);
  return { x: byX.map((by, i) => moved(by, ux[i]!, x[i]!, byUx(i))), y: byY.map((by, i) => moved(by, uy[i]!, y[i]!, byUy(i))) };
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
  if (points.length === 0) return { status: 'tooFewPoints' };
  const numbers = numbersOf(points);
  const line = lineBothAxes(numbers, withIntercept);
  if (line.status !== 'fitted') return line;
  const { chiSquared, dof, residuals, leverages } = line;
  const { probability, widened } = scatterOf(line);
  const coefficient = (value: number, by: typeof line.slopeBy, shared: typeof line.slopeBy, u: number, what: string): Uncertain => {
    // What belongs to a point moves it alone, its u staying; what many share moves them together, their u with them.
    const y0 = withSensitivities(value, points.flatMap(({ x, y }, i) => [[by.x[i]!, ownOf(x)] as const, [by.y[i]!, ownOf(y)] as const, [shared.x[i]!, sharedOf(x)] as const, [shared.y[i]!, sharedOf(y)] as const]));
    const extra = (widened ** 2 - 1) * u * u;
    const used = (widened * u) ** 2;
    if (!(extra > LEAST_EXTRA * used)) return y0;
    const source: Source = { ...words, id: `${words.id}.${what}`, estimate: 0, u: Math.sqrt(extra), distribution: 't', dof: dof * (extra / used) ** 2 };
    return combine([[1, y0], [1, ofSource(source)]]);
  };
  return {
    status: 'fitted', slope: coefficient(line.slope, line.slopeBy, withIntercept ? line.slopeBy : slopeByWithWeights(numbers, line.slope, line.slopeBy), line.uSlope, 'slope'), intercept: withIntercept ? coefficient(line.intercept, line.interceptBy, line.interceptBy, line.uIntercept, 'intercept') : null,
    chiSquared, dof, probability, widened, points: residuals.map((residual, i) => ({ residual, leverage: leverages[i]! })),
  };
}

/** The intercept against zero, by own parts and the scatter seen; what is common to all points cannot make one. null with fewer than three points. */
export const interceptTest = (points: readonly UncertainPoint[]): LineTest | null => interceptOfNumbers(numbersOf(points));

/** A quadratic term against zero, with the weights of the line; null with fewer than four points. */
export const curvatureTest = (points: readonly UncertainPoint[]): LineTest | null => bendTest(numbersOf(points));
