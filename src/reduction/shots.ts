/** Fifth and sixth steps: angle, launch and impulse bit of every record, and the calibration factors they rest on. */
import { ownParts, pooledMean, weightsOf, type Pooled } from '../metrology/pooled.ts';
import type { Source } from '../metrology/source.ts';
import { anchor, combine, exact, ofSource, propagate, standardUncertainty, type Anchor, type Uncertain } from '../metrology/uncertain.ts';
import { dampingFactor } from '../pendulum/damping.ts';
import { configurationChange } from '../pendulum/forms.ts';
import { launchOfDampedSwing } from '../pendulum/dampingLaws.ts';
import { launchOfFirstSwing } from '../pendulum/launch.ts';
import { correctedLaunch, restOfFriction, type Corrections } from './corrections.ts';
import { problem, type Problem } from '../problems/problems.ts';
import { swingFromMark, swingFromRest, swingFromSides } from '../readings/angle.ts';
import { ratioToHalfDecay } from '../pendulum/damping.ts';
import { LEAST, type BenchRead } from './entries.ts';
import { valueOf } from './stand.ts';
import { familyOf, type Readings } from './readings.ts';
import { factorOfBody, type Body, type ConfigurationName } from './stand.ts';
import type { Damping, Scale } from './swings.ts';
import { placeOf, type SessionRecord } from './sheets.ts';

export type Form = 'full' | 'smallAngle';
export type Way = 'geometry' | 'taps';

/** A record on its way: each stage null where the one before failed. */
export interface Swing {
  readonly record: SessionRecord;
  readonly configuration: ConfigurationName;
  readonly readings: Readings;
  readonly angle: Uncertain | null;
  readonly launch: Readonly<Record<Form, Uncertain>> | null;
}

type LaunchInputs = Readonly<Record<'angle' | 'ratio' | 'quadratic' | 'friction' | 'share', number>>;
/** Small swing: φ = D(ζ) θ_p; with another damping law the same equation with a restoring torque that stays linear (p = 0). */
const smallLaunch = ({ angle, ratio, quadratic, friction }: LaunchInputs): number =>
  quadratic === 0 && friction === 0 ? dampingFactor(ratio) * angle : launchOfDampedSwing(angle, { ratio, quadratic, friction }, 0).launch;
const fullLaunch = ({ angle, ratio, quadratic, friction, share }: LaunchInputs): number =>
  quadratic === 0 && friction === 0 ? launchOfFirstSwing(angle, ratio, share).launch : launchOfDampedSwing(angle, { ratio, quadratic, friction }, share).launch;
/** I_bit = K φ/r_t. */
export const impulseOfLaunch = ({ factor, launch, arm }: Readonly<Record<'factor' | 'launch' | 'arm', number>>): number => (factor * launch) / arm;
/** K = H/φ: calibration factor from one tap of angular impulse H = s_h I_h r_h. */
const factorOfTap = ({ moment, launch }: Readonly<Record<'moment' | 'launch', number>>): number => moment / launch;
const angularImpulseOfTap = ({ hammer, impulse, arm }: Readonly<Record<'hammer' | 'impulse' | 'arm', number>>): number => hammer * impulse * arm;

/** Wider first swings are refused, rad. */
export const UPRIGHT = 0.95 * Math.PI;

export function swingOf(record: SessionRecord, readings: Readings, scale: Scale | null, damping: Damping, shares: Readonly<Record<ConfigurationName, Anchor>>, corrections: Corrections, problems: Problem[]): Swing {
  const configuration: ConfigurationName = record.kind === 'tap' ? 'taps' : 'shots';
  const none: Swing = { record, configuration, readings, angle: null, launch: null };
  const { rest, first } = readings;
  if (!scale || !rest || !first || record.kind === 'zero' || record.kind === 'freeSwing') return none;
  const place = placeOf(record);
  try {
    const inputs = { ...scale.stand, first, scale: scale.scale };
    const unsigned = scale.sideToSide ? propagate(swingFromSides(scale.way), { ...inputs, halfDecay: propagate(ratioToHalfDecay, { ratio: damping.ratio[configuration] }) })
      : scale.mark ? propagate(swingFromMark(scale.way), { ...inputs, rest, mark: scale.mark }) : propagate(swingFromRest(scale.way), { ...inputs, rest });
    const angle = scale.sense === 1 ? unsigned : combine([[-1, unsigned]]);
    if (Math.abs(angle.value) > UPRIGHT) {
      problems.push(problem('record-angle-too-large', 'stops', place, { degrees: (angle.value * 180) / Math.PI }));
      return none;
    }
    const friction = damping.friction[configuration];
    const settled = friction.value > 0 ? combine([[1, angle], [1, restOfFriction(record, friction.value)]]) : angle;
    const swung = { angle: settled, ratio: damping.ratio[configuration], quadratic: damping.quadratic[configuration], friction, share: shares[configuration] };
    const raw = { full: propagate(fullLaunch, swung), smallAngle: propagate(smallLaunch, swung) };
    const full = correctedLaunch(raw.full, record, corrections, problems);
    const smallAngle = full && correctedLaunch(raw.smallAngle, record, corrections, []);
    return { ...none, angle: settled, launch: full && smallAngle ? { full, smallAngle } : null };
  } catch (failure) {
    if (!(failure instanceof RangeError)) throw failure;
    const out = Math.max(Math.abs(first.value - (scale.mark?.value ?? rest.value)), Math.abs(rest.value - (scale.mark?.value ?? rest.value)));
    problems.push(problem('record-reading-beyond-radius', 'stops', place, { reading: out, radius: (scale.stand['readingRadius'] ?? scale.stand['screenDistance'])?.value ?? 0 }));
    return none;
  }
}

/** One tap with a known impulse. */
export interface TapKnown {
  readonly swing: Swing;
  /** I_h as stated, times the hammer's calibration, N·s. */
  readonly impulse: Uncertain;
  readonly angularImpulse: Uncertain;
}

export function tapsOf(swings: readonly Swing[], bench: BenchRead, problems: Problem[]): readonly TapKnown[] {
  const taps = swings.filter((s) => s.record.kind === 'tap');
  if (taps.length === 0) return [];
  const arm = valueOf(bench, 'tapLeverArm');
  if (!arm && taps.some((t) => t.record.tapImpulse)) problems.push(problem('entry-missing', 'stops', { entry: 'tapLeverArm' }, { label: 'Lever arm of the tap' }));
  const hammer = valueOf(bench, 'hammerFactor') ?? exact(1);
  const spread = bench.entries.get('tapSpread')?.read.value ?? 0;
  const known: TapKnown[] = [];
  for (const swing of taps) {
    const cell = swing.record.tapImpulse;
    if (!cell) {
      problems.push(problem('record-tap-without-impulse', 'note', placeOf(swing.record), {}));
      continue;
    }
    if (!arm) continue;
    const source: Source = {
      id: `${swing.record.id}.impulse`, label: 'Impulse of one tap', symbol: 'I_h', dimension: 'impulse', estimate: cell.value,
      u: cell.spread ?? spread * Math.abs(cell.value), distribution: 'normal', dof: Infinity, family: familyOf('tap'),
    };
    const stated = ofSource(source);
    known.push({ swing, impulse: propagate(({ h, i }) => h * i, { h: hammer, i: stated }), angularImpulse: propagate(angularImpulseOfTap, { hammer, impulse: stated, arm }) });
  }
  return known;
}

export interface TapCalibration {
  /** K of the configuration of the taps, N·m·s/rad. */
  readonly asTaken: Anchor;
  readonly pooled: Pooled;
}

/** A tap whose throw is within this many of its own u has no ratio worth a weight. */
const LEAST_THROW = 3;

export function calibrationFromTaps(taps: readonly TapKnown[], form: Form): TapCalibration | null {
  const factors: Uncertain[] = [];
  for (const { swing, angularImpulse } of taps) {
    const launch = swing.launch?.[form];
    if (!launch || Math.abs(launch.value) < LEAST || Math.abs(launch.value) <= LEAST_THROW * standardUncertainty(launch) || Math.abs(angularImpulse.value) < LEAST) continue;
    factors.push(propagate(factorOfTap, { moment: angularImpulse, launch }));
  }
  if (factors.length === 0) return null;
  const own = ownParts(factors);
  const pooled = pooledMean(factors, own, {
    id: 'taps.scatter', label: 'Scatter of the taps', symbol: 'K', dimension: 'calibrationFactor', family: familyOf('tap'),
    weights: weightsOf(own),
  });
  return { asTaken: anchor(pooled.mean), pooled };
}

/** K of the firing configuration from K of the taps' configuration. */
export function toFiring(factor: Anchor, bodies: Readonly<Record<ConfigurationName, Body>> | null, hungDiffers: boolean): { readonly factor: Anchor; readonly change: Uncertain } | null {
  if (!hungDiffers) return { factor, change: exact(1) };
  if (!bodies) return null;
  const change = propagate(configurationChange, {
    inertiaShots: bodies.shots.inertia, stiffnessShots: bodies.shots.stiffness, inertiaTaps: bodies.taps.inertia, stiffnessTaps: bodies.taps.stiffness,
  });
  return { factor: anchor(propagate(({ k, c }) => k * c, { k: factor, c: change })), change };
}

export const geometryAnchor = (body: Body): Anchor => anchor(factorOfBody(body));
