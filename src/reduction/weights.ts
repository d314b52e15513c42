/** Deflections by known weights: the stiffness as the slope of moment against angle, loading and unloading, with what they part by common to all. */
import { lineOfUncertain, type UncertainPoint } from '../metrology/lineOfUncertain.ts';
import { fromLimits, fromResolution, type Source } from '../metrology/source.ts';
import { anchor, combine, exact, ofSource, propagate, standardUncertainty, type Anchor, type Uncertain } from '../metrology/uncertain.ts';
import { hysteresisOf, linearAngle, outriggerMoment, threadMoment } from '../pendulum/staticWeights.ts';
import { problem, type Problem } from '../problems/problems.ts';
import { swingFromMark, swingFromRest } from '../readings/angle.ts';
import type { CellRead } from '../readings/cellReads.ts';
import type { Choices } from '../session/session.ts';
import { unitNamed } from '../units/units.ts';
import type { BenchRead } from './entries.ts';
import { familyOf, type ReadingSpread } from './readings.ts';
import type { WeightsTold } from './evidenceResults.ts';
import { stated } from './run.ts';
import { scaleOfSheet } from './scale.ts';
import { placeOf, type SessionRecord } from './sheets.ts';
import { valueOf } from './stand.ts';
import type { Scale } from './swings.ts';

export interface Weights {
  /** κ of the configuration that they hung on, N·m/rad. */
  readonly stiffness: Anchor;
  readonly told: WeightsTold;
}

interface Point extends UncertainPoint {
  readonly record: SessionRecord;
  readonly unloading: boolean;
}

export interface WeightFacts {
  readonly bench: BenchRead;
  readonly choices: Choices;
  readonly scale: Scale | null;
  readonly spread: ReadingSpread;
  readonly gravity: Anchor | null;
  /** Gravity share of the configuration that they hung on. */
  readonly share: Uncertain;
}

const FEWEST = 3;

/** Force of one weight, N: each value one source, beside what all share. */
function forcesOf({ bench, gravity }: WeightFacts): (cell: CellRead) => Uncertain | null {
  const common = valueOf(bench, 'weightFactor') ?? exact(1);
  const spread = bench.entries.get('weightSpread')?.read.value ?? 0;
  const made = new Map<number, Uncertain>();
  return (cell) => {
    const isForce = unitNamed(cell.unit, 'force') !== null && unitNamed(cell.unit, 'mass') === null;
    if (!gravity) return null;
    let own = made.get(cell.value);
    if (!own) {
      const source: Source = { id: `weight.${cell.value}`, label: 'One known weight', symbol: 'm_w', dimension: isForce ? 'force' : 'mass', estimate: cell.value, u: cell.spread ?? spread * Math.abs(cell.value), distribution: 'normal', dof: Infinity, family: familyOf('weight') };
      own = isForce ? propagate(({ f, s }) => f * s, { f: ofSource(source), s: common }) : propagate(({ m, s, g }) => m * s * g, { m: ofSource(source), s: common, g: gravity });
      made.set(cell.value, own);
    }
    return own;
  };
}

/** Reading at no weight: of the rows without one, else straight through the others; it only places the scale's curvature. */
function unloadedReading(records: readonly SessionRecord[]): number {
  const readings = records.flatMap(({ weight, loading, unloading }) => [loading, unloading].flatMap((cell) => (cell ? [{ w: weight!.value, x: cell.value }] : [])));
  const bare = readings.filter(({ w }) => w === 0);
  if (bare.length > 0) return bare.reduce((sum, { x }) => sum + x, 0) / bare.length;
  const n = readings.length;
  const [w, x] = [readings.reduce((s, r) => s + r.w, 0) / n, readings.reduce((s, r) => s + r.x, 0) / n];
  const slope = readings.reduce((s, r) => s + (r.w - w) * (r.x - x), 0) / readings.reduce((s, r) => s + (r.w - w) ** 2, 0);
  return Number.isFinite(slope) ? x - slope * w : x;
}

function pointsOf(records: readonly SessionRecord[], arm: Uncertain, facts: WeightFacts & { readonly scale: Scale }, problems: Problem[]): readonly Point[] {
  const { scale, spread, choices, share } = facts;
  const forceOf = forcesOf(facts);
  const rest = exact(unloadedReading(records));
  const momentOf = choices.weightsPull === 'thread' ? threadMoment : outriggerMoment;
  const found: Point[] = [];
  for (const record of records) {
    const force = forceOf(record.weight!);
    for (const [cell, unloading] of [[record.loading, false], [record.unloading, true]] as const) {
      if (!cell || !force) continue;
      const u = cell.spread ?? Math.hypot(fromResolution(spread.division), spread.eye);
      const reading = ofSource({ id: `${record.id}.${unloading ? 'unloading' : 'loading'}`, label: unloading ? 'Reading while unloading' : 'Reading while loading', symbol: 'x', dimension: 'length', estimate: cell.value, u, distribution: 'rectangular', dof: Infinity, family: familyOf('weight') });
      try {
        const inputs = { ...scale.stand, first: reading, rest, scale: scaleOfSheet(scale, record.sheet) };
        const turned = scale.mark ? propagate(swingFromMark(scale.way), { ...inputs, mark: scale.mark }) : propagate(swingFromRest(scale.way), inputs);
        const angle = scale.sense === 1 ? turned : combine([[-1, turned]]);
        found.push({ record, unloading, x: propagate(momentOf, { force, arm, angle }), y: propagate(linearAngle, { angle, share }) });
      } catch (failure) {
        if (!(failure instanceof RangeError)) throw failure;
        problems.push(problem('record-reading-beyond-radius', 'stops', placeOf(record), { reading: Math.abs(cell.value - rest.value), radius: (scale.stand['readingRadius'] ?? scale.stand['screenDistance'])?.value ?? 0 }));
      }
    }
  }
  return found;
}

/** null without weights, or where they tell no stiffness; the problems say why. */
export function weightsOf(records: readonly SessionRecord[], facts: WeightFacts, problems: Problem[]): Weights | null {
  const hung = records.filter((record) => record.kind === 'weight' && record.weight !== null && (record.loading !== null || record.unloading !== null));
  if (hung.length === 0 || !facts.scale) return null;
  const arm = valueOf(facts.bench, 'pullArm');
  if (!arm) {
    problems.push(problem('entry-missing', 'stops', { entry: 'pullArm' }, { label: 'Lever arm of the pull' }));
    return null;
  }
  const points = pointsOf(hung, arm, { ...facts, scale: facts.scale }, problems);
  const sizes = new Set(points.map(({ record }) => record.weight!.value));
  if (sizes.size < 2 || points.length < FEWEST) {
    problems.push(problem('weights-too-few', 'doubt', {}, { sizes: sizes.size }));
    return null;
  }
  const line = lineOfUncertain(points, true, { id: 'weights.scatter', label: 'Scatter of the known weights', symbol: 'θ', dimension: 'angle', family: familyOf('weight') });
  if (line.status !== 'fitted' || !(line.slope.value > 0)) {
    problems.push(problem('weights-wrong-way', 'doubt', {}, {}));
    return null;
  }
  const parted = hysteresisOf(points.map(({ x, y, unloading }) => ({ moment: x.value, angle: y.value, unloading })));
  const hysteresis = parted.status === 'found' ? Math.abs(parted.halfWidth) : null;
  const slopesPart = parted.status === 'found' ? parted.slopesPart : null;
  const reach = Math.max(...points.map(({ y }) => Math.abs(y.value))) || 1;
  const source: Source = { id: 'weights.hysteresis', label: 'Hysteresis of the static deflection', symbol: 'κ', dimension: 'number', estimate: 1, u: fromLimits(Math.max((hysteresis ?? 0) / reach, Math.abs(slopesPart ?? 0))), distribution: 'rectangular', dof: Infinity };
  const stiffness = anchor(propagate(({ b, h }) => h / b, { b: line.slope, h: hysteresis !== null ? ofSource(source) : exact(1) }));
  const intercept = line.intercept!;
  const u = standardUncertainty(intercept);
  return {
    stiffness,
    told: {
      weights: hung.length, stiffness: stated(stiffness), interceptInU: u === 0 ? 0 : intercept.value / u, hysteresis, slopesPart, chiSquared: line.chiSquared, dof: line.dof,
      points: points.map((point, i) => ({ record: point.record.id, moment: point.x.value, angle: point.y.value, unloading: point.unloading, residual: line.points[i]!.residual })),
    },
  };
}
