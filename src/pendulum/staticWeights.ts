/** Static deflection by a known weight: the moment at the angle that the pendulum takes, and the angle that a linear restoring torque would have. */

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
