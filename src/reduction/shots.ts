/** Fifth step: angle and launch of every record. */
import { anchor, combine, propagate, type Anchor, type Uncertain } from '../metrology/uncertain.ts';
import { dampingFactor, ratioToHalfDecay } from '../pendulum/damping.ts';
import { launchOfDampedSwing } from '../pendulum/dampingLaws.ts';
import { launchOfFirstSwing } from '../pendulum/launch.ts';
import { problem, type Problem } from '../problems/problems.ts';
import { swingFromMark, swingFromRest, swingFromSides } from '../readings/angle.ts';
import type { RecordKind } from '../readings/meanings.ts';
import type { Choices } from '../session/session.ts';
import type { Dimension } from '../units/units.ts';
import { launchFromSwing, smallLaunchFromSwing, swingBefore } from './background.ts';
import { correctedLaunch, restOfFriction, throughReading, type Corrections } from './corrections.ts';
import type { Readings } from './readings.ts';
import { scaleOfSheet } from './scale.ts';
import { placeOf, type SessionRecord } from './sheets.ts';
import { factorOfBody, type Body, type ConfigurationName } from './stand.ts';
import type { Damping, Scale } from './swings.ts';

export type Form = 'full' | 'smallAngle';
export type Way = Choices['calibration'];

/** A record on its way: each stage null where the one before failed. */
export interface Swing {
  readonly record: SessionRecord;
  readonly configuration: ConfigurationName;
  readonly readings: Readings;
  readonly angle: Uncertain | null;
  readonly launch: Readonly<Record<Form, Uncertain>> | null;
  /** Of a trace: the jump of x′ over ω_n, in the unit of its column. */
  readonly jump?: { readonly value: Uncertain; readonly dimension: Dimension };
}

type LaunchInputs = Readonly<Record<'angle' | 'ratio' | 'quadratic' | 'friction' | 'share', number>>;
/** Small swing: φ = D(ζ) θ_p; with another damping law the same equation with a restoring torque that stays linear (p = 0). */
const smallLaunch = ({ angle, ratio, quadratic, friction }: LaunchInputs): number =>
  quadratic === 0 && friction === 0 ? dampingFactor(ratio) * angle : launchOfDampedSwing(angle, { ratio, quadratic, friction }, 0).launch;
const fullLaunch = ({ angle, ratio, quadratic, friction, share }: LaunchInputs): number =>
  quadratic === 0 && friction === 0 ? launchOfFirstSwing(angle, ratio, share).launch : launchOfDampedSwing(angle, { ratio, quadratic, friction }, share).launch;
/** I_bit = K φ/r_t. */
export const impulseOfLaunch = ({ factor, launch, arm }: Readonly<Record<'factor' | 'launch' | 'arm', number>>): number => (factor * launch) / arm;

/** Wider first swings are refused, rad. */
export const UPRIGHT = 0.95 * Math.PI;

/** Kinds whose first swing is the start of a swing. */
const SWINGS: ReadonlySet<RecordKind> = new Set<RecordKind>(['shot', 'tap', 'blank']);

export function swingOf(record: SessionRecord, readings: Readings, scale: Scale | null, damping: Damping, shares: Readonly<Record<ConfigurationName, Anchor>>, corrections: Corrections, problems: Problem[]): Swing {
  const configuration: ConfigurationName = record.kind === 'tap' ? 'taps' : 'shots';
  const none: Swing = { record, configuration, readings, angle: null, launch: null };
  const { rest, first } = readings;
  if (!scale || !rest || !first || !SWINGS.has(record.kind)) return none;
  const place = placeOf(record);
  try {
    const inputs = { ...scale.stand, first, scale: scaleOfSheet(scale, record.sheet) };
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
    const before = swingBefore(corrections.background, record).state;
    const raw = before ? launchesFromSwing({ ...swung, angle: throughReading(settled, corrections), ...before }) : { full: propagate(fullLaunch, swung), smallAngle: propagate(smallLaunch, swung) };
    if (!raw) {
      problems.push(problem('background-not-this-shot', 'stops', place, {}));
      return { ...none, angle: settled };
    }
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

/** null where no swing from the state at the shot has this first maximum. */
function launchesFromSwing(swung: Readonly<Record<'angle' | 'ratio' | 'quadratic' | 'friction' | 'share' | 'deflection' | 'speed', Uncertain>>): Readonly<Record<Form, Uncertain>> | null {
  try {
    return { full: propagate(launchFromSwing, swung), smallAngle: propagate(smallLaunchFromSwing, swung) };
  } catch (failure) {
    if (failure instanceof RangeError) return null;
    throw failure;
  }
}

export const geometryAnchor = (body: Body): Anchor => anchor(factorOfBody(body));
