/** The taps as a line: through the origin or not, straight or bent, their residuals, how well they repeat, and how the calibration moved between groups. */
import { curvatureTest, interceptTest, lineOfUncertain } from '../metrology/lineOfUncertain.ts';
import { propagate, standardUncertainty } from '../metrology/uncertain.ts';
import type { TapStudy } from './evidenceResults.ts';
import type { Form, Swing } from './shots.ts';
import { stated } from './run.ts';
import { pointsOfTaps, TAP_SCATTER, type TapCalibration, type TapGroup } from './taps.ts';
import type { TapKnown } from './tapImpulse.ts';

/** Taps whose stated impulses part by less than this part of themselves are of one size. */
const SAME_SIZE = 0.01;

/** Sizes of the taps, each with its taps, smallest first. */
function sizesOf(taps: readonly TapKnown[]): readonly (readonly TapKnown[])[] {
  const groups: TapKnown[][] = [];
  for (const tap of [...taps].sort((a, b) => Math.abs(a.impulse.value) - Math.abs(b.impulse.value))) {
    const last = groups.at(-1);
    if (last && Math.abs(tap.impulse.value) <= Math.abs(last[0]!.impulse.value) * (1 + SAME_SIZE)) last.push(tap);
    else groups.push([tap]);
  }
  return groups;
}

/** Relative sd of repeated taps of one size, pooled over the sizes: Σ(φ/φ̄ − 1)²/Σ(n − 1). */
function repeatabilityOf(taps: readonly TapKnown[], form: Form): TapStudy['repeatability'] {
  let [squares, dof] = [0, 0];
  for (const size of sizesOf(taps)) {
    if (size.length < 2) continue;
    // Small differences of impulse within one size are divided out.
    const ratios = size.map(({ swing, angularImpulse }) => swing.launch![form].value / angularImpulse.value);
    const mean = ratios.reduce((a, b) => a + b, 0) / ratios.length;
    squares += ratios.reduce((sum, ratio) => sum + (ratio / mean - 1) ** 2, 0);
    dof += ratios.length - 1;
  }
  return dof === 0 ? null : { relative: Math.sqrt(squares / dof), dof };
}

/** The two groups that part most, later less earlier. */
function driftOf(groups: readonly TapGroup[]): TapStudy['drift'] {
  let widest: { a: TapGroup; b: TapGroup } | null = null;
  for (const [i, a] of groups.entries()) for (const b of groups.slice(i + 1)) {
    if (widest === null || Math.abs(b.factor.value - a.factor.value) > Math.abs(widest.b.factor.value - widest.a.factor.value)) widest = { a, b };
  }
  if (widest === null) return null;
  const gap = propagate(({ k, l }) => l / k - 1, { k: widest.a.factor, l: widest.b.factor });
  const u = standardUncertainty(gap);
  return { from: widest.a.where, to: widest.b.where, relative: stated(gap), inU: u === 0 ? 0 : gap.value / u };
}

export function tapStudyOf({ used, groups }: TapCalibration, form: Form, places: ReadonlyMap<Swing, number>): TapStudy {
  const points = pointsOfTaps(used, form);
  const origin = lineOfUncertain(points, false, TAP_SCATTER);
  const fitted = origin.status === 'fitted' ? origin : null;
  const sizes = sizesOf(used);
  return {
    taps: used.length, sizes: sizes.length, sides: new Set(used.map(({ swing }) => Math.sign(swing.launch![form].value))).size,
    chiSquared: fitted?.chiSquared ?? 0, dof: fitted?.dof ?? 0, probability: fitted?.probability ?? null, widened: fitted?.widened ?? 1,
    intercept: sizes.length < 2 ? null : interceptTest(points), curvature: sizes.length < 3 ? null : curvatureTest(points),
    repeatability: repeatabilityOf(used, form),
    points: fitted === null ? [] : used.map(({ swing }, i) => ({ record: swing.record.id, place: places.get(swing) ?? 0, residual: fitted.points[i]!.residual, leverage: fitted.points[i]!.leverage })),
    groups: groups.map(({ where, taps, factor }) => ({ where, taps: taps.length, factor: stated(factor) })), drift: driftOf(groups),
  };
}
