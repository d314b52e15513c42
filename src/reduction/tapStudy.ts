/** The taps as a line: through the origin or not, straight or bent, their residuals, how well they repeat, and how the calibration moved between groups. */
import { ownParts } from '../metrology/pooled.ts';
import { tapLineOf } from '../metrology/tapLine.ts';
import { propagate, standardUncertainty } from '../metrology/uncertain.ts';
import type { TapStudy } from './evidenceResults.ts';
import type { Stated } from './results.ts';
import type { Form, Swing } from './shots.ts';
import { stated } from './run.ts';
import { interpolated, meanWithDrift, pointsOfTaps, type TapCalibration, type TapGroup } from './taps.ts';

/** Taps whose stated impulses part by less than this part of themselves are of one size. */
const SAME_SIZE = 0.01;

/** K interpolated at the first and at the last shot. */
function atEnds(groups: readonly TapGroup[], places: ReadonlyMap<Swing, number>): { readonly atFirst: Stated; readonly atLast: Stated } {
  const shots = [...places].filter(([swing]) => swing.record.kind === 'shot').map(([, place]) => place);
  return { atFirst: stated(interpolated(groups, Math.min(...shots))), atLast: stated(interpolated(groups, Math.max(...shots))) };
}

/** The two groups that part most, later less earlier. */
function driftOf(groups: readonly TapGroup[], places: ReadonlyMap<Swing, number>): TapStudy['drift'] {
  let widest: { a: TapGroup; b: TapGroup } | null = null;
  for (const [i, a] of groups.entries()) for (const b of groups.slice(i + 1)) {
    if (widest === null || Math.abs(b.factor.value - a.factor.value) > Math.abs(widest.b.factor.value - widest.a.factor.value)) widest = { a, b };
  }
  if (widest === null) return null;
  const gap = propagate(({ k, l }) => l / k - 1, { k: widest.a.factor, l: widest.b.factor });
  const u = standardUncertainty(gap);
  return { from: widest.a.where, to: widest.b.where, relative: stated(gap), inU: u === 0 ? 0 : gap.value / u, byMean: stated(meanWithDrift(groups)), ...atEnds(groups, places) };
}

export function tapStudyOf({ used, groups }: TapCalibration, form: Form, places: ReadonlyMap<Swing, number>): TapStudy {
  const inOrder = [...used].sort((a, b) => (places.get(a.swing) ?? 0) - (places.get(b.swing) ?? 0));
  const points = pointsOfTaps(inOrder, form);
  const [ux, uy] = [ownParts(points.map(({ x }) => x)), ownParts(points.map(({ y }) => y))];
  const line = tapLineOf(points.map(({ x, y }, i) => ({ x: x.value, y: y.value, ux: ux[i]!, uy: uy[i]!, place: places.get(inOrder[i]!.swing) ?? i })), SAME_SIZE);
  const nothing = { taps: used.length, sizes: 0, sides: 0, chiSquared: 0, dof: 0, probability: null, widened: 1, intercept: null, curvature: null, repeatability: null, alongRun: null, runs: null, points: [] };
  const told = line.status !== 'fitted' ? nothing : {
    taps: used.length, sizes: line.sizes, sides: line.sides, chiSquared: line.origin.chiSquared, dof: line.origin.dof, probability: line.originScatter.probability, widened: line.originScatter.widened,
    intercept: line.intercept, curvature: line.bend, repeatability: line.repeats, alongRun: line.byPlace ?? line.byOrder, runs: line.runs && { runs: line.runs.runs, expected: line.runs.expected, probability: line.runs.probability },
    points: inOrder.map(({ swing }, i) => ({ record: swing.record.id, place: places.get(swing) ?? 0, residual: line.origin.residuals[i]!, leverage: line.origin.leverages[i]! })),
  };
  return { ...told, groups: groups.map(({ where, taps, factor }) => ({ where, taps: taps.length, factor: stated(factor) })), drift: driftOf(groups, places) };
}
