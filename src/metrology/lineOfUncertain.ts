/** A straight line through points that are uncertain in both axes, where weights hold what belongs to each point and what all points share goes through the line afterwards. */
import { lineBothAxes, notExact, type WeighedPoints } from '../numeric/lineBothAxes.ts';
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
  const line = lineBothAxes(numbersOf(points), withIntercept);
  if (line.status !== 'fitted') return line;
  const { chiSquared, dof, residuals, leverages } = line;
  const { probability, widened } = scatterOf(line);
  const coefficient = (value: number, by: typeof line.slopeBy, u: number, what: string): Uncertain => {
    const y0 = withSensitivities(value, points.flatMap((point, i) => [[by.x[i]!, point.x] as const, [by.y[i]!, point.y] as const]));
    const extra = (widened ** 2 - 1) * u * u;
    const used = (widened * u) ** 2;
    if (!(extra > LEAST_EXTRA * used)) return y0;
    const source: Source = { ...words, id: `${words.id}.${what}`, estimate: 0, u: Math.sqrt(extra), distribution: 't', dof: dof * (extra / used) ** 2 };
    return combine([[1, y0], [1, ofSource(source)]]);
  };
  return {
    status: 'fitted', slope: coefficient(line.slope, line.slopeBy, line.uSlope, 'slope'), intercept: withIntercept ? coefficient(line.intercept, line.interceptBy, line.uIntercept, 'intercept') : null,
    chiSquared, dof, probability, widened, points: residuals.map((residual, i) => ({ residual, leverage: leverages[i]! })),
  };
}

/** The intercept against zero, by own parts and the scatter seen; what is common to all points cannot make one. null with fewer than three points. */
export const interceptTest = (points: readonly UncertainPoint[]): LineTest | null => interceptOfNumbers(numbersOf(points));

/** A quadratic term against zero, with the weights of the line; null with fewer than four points. */
export const curvatureTest = (points: readonly UncertainPoint[]): LineTest | null => bendTest(numbersOf(points));
