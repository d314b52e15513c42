/** Static deflection by a known weight: the moment at the angle that the pendulum takes, and the angle that a linear restoring torque would have. */
import { weightedLine } from '../numeric/lines.ts';
import { rootBetween } from '../numeric/roots.ts';

type Numbers<Name extends string> = Readonly<Record<Name, number>>;

/**
 * Moment of a horizontal pull F on the pendulum at r_w below the pivot, where it stands at θ: F r_w cos θ · N·m. The thread is long and stays level.
 *
 * Source: methods 1.9 (gravity alone: tan θ = F r_w/(M g d)), derived.
 */
export const threadMoment = ({ force, arm, angle }: Numbers<'force' | 'arm' | 'angle'>): number => force * arm * Math.cos(angle);

/**
 * Moment of a weight W on an outrigger that stands out level by a at rest, at the pivot's height: W a cos θ · N·m.
 *
 * It is the same cosine: the outrigger turns with the pendulum. Source: methods 1.9.
 */
export const outriggerMoment = ({ force, arm, angle }: Numbers<'force' | 'arm' | 'angle'>): number => force * arm * Math.cos(angle);

/**
 * Angle at which a linear spring κ would hold the same moment: p sin θ + (1 − p) θ · rad, so that moment = κ × it.
 *
 * Valid: |θ| < π/2. Source: equilibrium of κ[p sin θ + (1 − p)θ]; derived.
 */
export const linearAngle = ({ angle, share }: Numbers<'angle' | 'share'>): number => share * Math.sin(angle) + (1 - share) * angle;

/**
 * Moment of a thread over a pulley that is not far away or not level: F r_w cos(θ − ψ) · N·m, ψ the thread's rise towards the pulley,
 * tan ψ = [e − r_w(1 − cos θ)]/(L − r_w sin θ).
 *
 * Symbols: F, N; r_w, m, > 0; θ, rad, towards the pulley positive; L `reach`, m, level distance from the plumb arm to where the thread
 * meets the pulley, > r_w sin θ; e `lift`, m, how much higher than the attachment at rest that point is. L → ∞, e = 0: threadMoment.
 * Source: moment of the pull along the thread; derived. The pulley's own radius is left out: its part is ψ times smaller again.
 * @throws RangeError where the arm would reach the pulley
 */
export function pulleyMoment({ force, arm, angle, reach, lift }: Numbers<'force' | 'arm' | 'angle' | 'reach' | 'lift'>): number {
  const away = reach - arm * Math.sin(angle);
  if (!(away > 0)) throw new RangeError(`pulley: ${reach} m away, within reach of the arm at ${angle} rad`);
  return force * arm * Math.cos(angle - Math.atan2(lift - arm * (1 - Math.cos(angle)), away));
}

/**
 * Moment of a weight W on an outrigger that is not at the pivot's height: W(a cos θ − h sin θ) · N·m.
 *
 * h, m: below the pivot positive, of the point that bears it: for a weight on a thread where the thread is tied, however far down the
 * weight hangs. Such a weight stiffens the pendulum by W h. h = 0: outriggerMoment. Source: −∂(W z)/∂θ; derived.
 */
export const outriggerMomentAt = ({ force, arm, height, angle }: Numbers<'force' | 'arm' | 'height' | 'angle'>): number => force * (arm * Math.cos(angle) - height * Math.sin(angle));

/** A load that bends the pendulum out: its moment at an angle. */
export type Load =
  | ({ readonly by: 'thread' } & Numbers<'force' | 'arm'>)
  | ({ readonly by: 'pulley' } & Numbers<'force' | 'arm' | 'reach' | 'lift'>)
  | ({ readonly by: 'outrigger' } & Numbers<'force' | 'arm' | 'height'>);

function momentOf(load: Load, angle: number): number {
  switch (load.by) {
    case 'thread':
      return threadMoment({ ...load, angle });
    case 'pulley':
      return pulleyMoment({ ...load, angle });
    case 'outrigger':
      return outriggerMomentAt({ ...load, angle });
  }
}

/** Half a turn of the pendulum on either side is all that a static deflection can be. */
const WIDEST = Math.PI / 2;

/**
 * θ at which κ[p sin θ + (1 − p)θ] = M(θ) · rad: where the pendulum comes to rest under the load.
 *
 * Valid: κ > 0. 'none': no rest within ±90°. Gravity alone and a level thread: tan θ = F r_w/κ (methods 1.9).
 * Source: equilibrium of moments; derived.
 * @throws RangeError where κ is not positive, or a pulley stands within reach of the arm
 */
export function restUnderLoad({ stiffness, share }: Numbers<'stiffness' | 'share'>, load: Load): { readonly status: 'found'; readonly angle: number } | { readonly status: 'none' } {
  if (!(stiffness > 0)) throw new RangeError(`rest under a load: κ ${stiffness} N·m/rad`);
  const left = (angle: number): number => stiffness * linearAngle({ angle, share }) - momentOf(load, angle);
  const start = left(0);
  if (start === 0) return { status: 'found', angle: 0 };
  const found = rootBetween(left, 0, start < 0 ? WIDEST : -WIDEST);
  return found.status === 'found' ? { status: 'found', angle: found.x } : { status: 'none' };
}

/** One reading of the series: moment at the angle it stands at, N·m; linearAngle, rad. */
export interface LoadedReading {
  readonly moment: number;
  readonly angle: number;
  readonly unloading: boolean;
}

export interface Hysteresis {
  /** Mean of half of what unloading stands out farther than loading under the same weight · rad · signed. */
  readonly halfWidth: number;
  /** The largest of them, rad, ≥ 0. */
  readonly widest: number;
  /** (b_unloading − b_loading)/(b_unloading + b_loading), b = dθ/dM of each branch · 1; null with fewer than two weights in one. */
  readonly slopesPart: number | null;
  readonly pairs: number;
}

/** Of one weight the moment changes a little with the angle; weights differ by more than this. */
const SAME_MOMENT = 0.02;

/**
 * How loading and unloading part. Friction in the pivot shifts both branches (halfWidth τ_f/κ, slopesPart 0); friction μ in the pulley
 * pulls with F(1 ∓ μ), so that their slopes part by μ. The slope through both branches is free of either to first order where every weight
 * was read in both; slopesPart and halfWidth over the farthest angle are limits, common to all readings, of what it still owes to them.
 *
 * Pairs: nearest moments of the two branches that agree to 2 % of the largest. 'noPairs' where there is none.
 * Source: methods 1.9; derived.
 */
export function hysteresisOf(readings: readonly LoadedReading[]): ({ readonly status: 'found' } & Hysteresis) | { readonly status: 'noPairs' } {
  const branch = (unloading: boolean): readonly LoadedReading[] => readings.filter((reading) => reading.unloading === unloading);
  const [up, down] = [branch(false), branch(true)];
  const apart = SAME_MOMENT * Math.max(0, ...readings.map(({ moment }) => Math.abs(moment)));
  const halves = down.flatMap((out) => {
    const near = up.reduce<LoadedReading | null>((best, reading) => (best === null || Math.abs(reading.moment - out.moment) < Math.abs(best.moment - out.moment) ? reading : best), null);
    return near !== null && Math.abs(near.moment - out.moment) <= apart ? [(out.angle - near.angle) / 2] : [];
  });
  if (halves.length === 0) return { status: 'noPairs' };
  const slopeOf = (of: readonly LoadedReading[]): number | null => {
    const line = weightedLine(of.map(({ moment }) => moment), of.map(({ angle }) => angle), of.map(() => 1));
    return line.status === 'fitted' ? line.slope : null;
  };
  const [a, b] = [slopeOf(up), slopeOf(down)];
  return {
    status: 'found', pairs: halves.length, halfWidth: halves.reduce((sum, half) => sum + half, 0) / halves.length, widest: Math.max(...halves.map(Math.abs)),
    slopesPart: a === null || b === null || a + b === 0 ? null : (b - a) / (b + a),
  };
}
