/** The taps as a line: throw against impulse, straight or bent, through the origin or not; how they scatter, repeat and drift. */
import { lineBothAxes, notExact, type LineBothAxes, type LineBothAxesResult } from '../numeric/lineBothAxes.ts';
import { bendTest, driftTest, interceptTest, runsTest, scatterOf, type DriftTest, type LineTest, type RunsTest, type Scatter } from '../numeric/lineTests.ts';
import { incompleteGamma } from '../numeric/specialFunctions.ts';

/** One tap: angular impulse H, N·m·s, and launch φ, rad, each with what belongs to this tap alone; its place in the run, order or s. */
export interface TapPoint {
  readonly x: number;
  readonly y: number;
  readonly ux: number;
  readonly uy: number;
  readonly place: number;
}

export interface Repeats {
  /** Standard deviation of repeated taps of one size over their mean, pooled over the sizes · 1 · with ν. */
  readonly relative: number;
  readonly dof: number;
  /** What their own u predict for it. */
  readonly expected: number;
  /** Chance of as large a scatter by those u; null where they are zero. */
  readonly probability: number | null;
  /** Sizes that were repeated. */
  readonly sizes: number;
}

export interface TapLine {
  readonly status: 'fitted';
  readonly origin: LineBothAxes;
  readonly originScatter: Scatter;
  /** y = a + b x; null with one size of tap. */
  readonly free: LineBothAxes | null;
  readonly freeScatter: Scatter | null;
  readonly intercept: LineTest | null;
  readonly bend: LineTest | null;
  /** Slope of the line through the origin that drifts along the order, and along `place`. */
  readonly byOrder: DriftTest | null;
  readonly byPlace: DriftTest | null;
  /** Runs of one sign of what that line leaves, in order. */
  readonly runs: RunsTest | null;
  readonly repeats: Repeats | null;
  /** Different sizes, with their own u; and sides of rest, 1 or 2. */
  readonly sizes: number;
  readonly sides: number;
}

export type TapLineOutcome = TapLine | { readonly status: 'noTaps' | Exclude<LineBothAxesResult['status'], 'fitted'> };

/** Two taps whose x part by less than this many u of the difference are not different sizes. */
const SAME_IN_U = 2;

/**
 * Taps by size, smallest first; the two sides of rest are different sizes. One size: within `sameSize` of its smallest, or within 2 u of the difference.
 *
 * Valid: sameSize ≥ 0, relative.
 */
export function sizesOfTaps<T extends Pick<TapPoint, 'x' | 'ux'>>(taps: readonly T[], sameSize: number): readonly (readonly T[])[] {
  const groups: T[][] = [];
  for (const side of [-1, 1]) {
    let group: T[] = [];
    for (const tap of taps.filter(({ x }) => (x < 0 ? -1 : 1) === side).sort((a, b) => Math.abs(a.x) - Math.abs(b.x))) {
      const least = group[0];
      const apart = least ? Math.abs(tap.x - least.x) : Infinity;
      if (least && apart <= Math.max(sameSize * Math.abs(least.x), SAME_IN_U * Math.hypot(tap.ux, least.ux))) group.push(tap);
      else groups.push((group = [tap]));
    }
  }
  return groups.sort((a, b) => Math.abs(a[0]!.x) - Math.abs(b[0]!.x));
}

/**
 * How well taps of one size repeat: y/x of each over the mean of its size, so that small differences of impulse are divided out;
 * s² = Σ(ratio/mean − 1)²/Σ(n − 1).
 *
 * null without a repeated size. Source: pooled standard deviation, NIST TN 1297 / any handbook of statistics, from memory.
 */
export function repeatsOf(sizes: readonly (readonly TapPoint[])[]): Repeats | null {
  let [squares, dof, predicted, chiSquared, repeated] = [0, 0, 0, 0, 0];
  for (const size of sizes) {
    const taps = size.filter(({ x, y }) => x !== 0 && y !== 0);
    if (taps.length < 2) continue;
    const mean = taps.reduce((sum, { x, y }) => sum + y / x, 0) / taps.length;
    const own = taps.map(({ x, y, ux, uy }) => Math.hypot(ux / x, uy / y) ** 2);
    const away = taps.map(({ x, y }) => y / x / mean - 1);
    const variance = own.reduce((a, b) => a + b, 0) / taps.length;
    squares += away.reduce((sum, value) => sum + value * value, 0);
    predicted += variance * (taps.length - 1);
    chiSquared += away.reduce((sum, value) => sum + (value * value) / variance, 0);
    dof += taps.length - 1;
    repeated += 1;
  }
  if (dof === 0) return null;
  return { relative: Math.sqrt(squares / dof), dof, expected: Math.sqrt(predicted / dof), probability: Number.isFinite(chiSquared) ? incompleteGamma(dof / 2, chiSquared / 2).upper : null, sizes: repeated };
}

/**
 * The line of the taps, in the order they were taken. What taps share (hammer's factor, ruler) must not be in ux, uy: it goes through
 * slopeBy and interceptBy of the lines afterwards.
 *
 * Symbols: sameSize, relative. 'noSpread': no tap has an impulse.
 * Source: methods 1.10; York et al., Am. J. Phys. 72 (2004) 367.
 * @throws RangeError when a number is out of its range
 */
export function tapLineOf(taps: readonly TapPoint[], sameSize: number): TapLineOutcome {
  if (taps.length === 0) return { status: 'noTaps' };
  const column = (name: keyof TapPoint): readonly number[] => taps.map((tap) => tap[name]);
  const points = notExact({ x: column('x'), y: column('y'), ux: column('ux'), uy: column('uy') });
  const origin = lineBothAxes(points, false);
  if (origin.status !== 'fitted') return origin;
  const sizes = sizesOfTaps(taps, sameSize);
  const found = sizes.length < 2 ? null : lineBothAxes(points, true);
  const free = found?.status === 'fitted' ? found : null;
  const order = taps.map((_, i) => i);
  return {
    status: 'fitted', origin, originScatter: scatterOf(origin), free, freeScatter: free && scatterOf(free),
    intercept: free && interceptTest(points), bend: sizes.length < 3 ? null : bendTest(points),
    byOrder: driftTest(points, order, false), byPlace: driftTest(points, column('place'), false), runs: runsTest(origin.residuals),
    repeats: repeatsOf(sizes), sizes: sizes.length, sides: new Set(taps.filter(({ y }) => y !== 0).map(({ y }) => Math.sign(y))).size,
  };
}
