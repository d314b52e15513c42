/** Taps of known impulse: a swinging hammer by its angles, a hammer that stays, a force held for a while. */
import { pulseCorrection, type PulseShape } from './pulse.ts';

type Numbers<Name extends string> = Readonly<Record<Name, number>>;

/** A hammer let go from further than this no longer swings as it was drawn. */
export const WIDEST_HAMMER = Math.PI / 2;

function checkAngle(angle: number): void {
  if (!(Math.abs(angle) <= WIDEST_HAMMER)) throw new RangeError(`hammer: an angle of ${angle} rad is over 90°`);
}

/**
 * Speed at the lowest point of a compact hammer let go from φ: v = 2√(g l) sin(φ/2) · m/s. The same speed carries it up to φ.
 *
 * Symbols: g, m/s²; l, m, pivot to its mass; φ, rad, from plumb, |φ| ≤ π/2; signed as φ. Friction and air left out.
 * Source: energy; methods 1.10.
 * @throws RangeError beyond 90°
 */
export function compactSpeed({ g, length, angle }: Numbers<'g' | 'length' | 'angle'>): number {
  checkAngle(angle);
  return 2 * Math.sqrt(g * length) * Math.sin(angle / 2);
}

/**
 * Angular speed at the lowest point of a compound hammer: ω = 2√(m g d/J_h) sin(φ/2) · rad/s.
 *
 * Symbols: m, kg; d, m, pivot to centre of mass; J_h, kg·m², about its pivot. Source: energy; methods 1.10.
 * @throws RangeError beyond 90°
 */
export function compoundSpeed({ g, mass, centre, inertia, angle }: Numbers<'g' | 'mass' | 'centre' | 'inertia' | 'angle'>): number {
  checkAngle(angle);
  return 2 * Math.sqrt((mass * g * centre) / inertia) * Math.sin(angle / 2);
}

/** J_h = m g d T_h²/4π² · kg·m² · of a hammer from its own small free period. Source: methods 1.8 (a). */
export const hammerInertia = ({ mass, centre, period, g }: Numbers<'mass' | 'centre' | 'period' | 'g'>): number => (mass * g * centre * period * period) / (4 * Math.PI ** 2);

/** Angles of one blow: drawn back to; back up on the side that it came from; on through beyond the contact. Of the last two one is 0. rad. */
export type Blow = Numbers<'drawn' | 'rebound' | 'follow'>;

/**
 * I_h = m (v_in + v_rebound − v_follow) · N·s: a hammer that comes back gave more than it brought, one that goes on gave less.
 *
 * Source: momentum of the hammer before and after; methods 1.10 (12 g, 0.25 m, 8° in, 3° back: 3.60505 mN·s).
 * @throws RangeError beyond 90°
 */
export const compactImpulse = ({ g, mass, length, drawn, rebound, follow }: Numbers<'g' | 'mass' | 'length'> & Blow): number =>
  mass * (compactSpeed({ g, length, angle: drawn }) + compactSpeed({ g, length, angle: rebound }) - compactSpeed({ g, length, angle: follow }));

/**
 * I_h = J_h (ω_in + ω_rebound − ω_follow)/l_c · N·s, l_c, m, from the hammer's pivot to the contact: angular momentum about its own pivot.
 *
 * Source: methods 1.10.
 * @throws RangeError beyond 90°
 */
export const compoundImpulse = ({ contact, drawn, rebound, follow, ...hammer }: Numbers<'g' | 'mass' | 'centre' | 'inertia' | 'contact'> & Blow): number =>
  (hammer.inertia * (compoundSpeed({ ...hammer, angle: drawn }) + compoundSpeed({ ...hammer, angle: rebound }) - compoundSpeed({ ...hammer, angle: follow }))) / contact;

/** What stays on the pendulum adds to it while the tap's swing lasts: ΔJ, kg·m², and Δκ, N·m/rad. */
export type Carried = Numbers<'inertia' | 'stiffness'>;

/**
 * Angular impulse of a hammer that sticks and leaves its own suspension (thread slack, or thrown): H = m v r_h · N·m·s about the
 * pendulum's pivot, all of which pendulum and hammer then have together.
 *
 * Symbols: v, m/s, level, at the blow; r_h, m, pivot of the pendulum to where it sticks. Valid: |finite|.
 * Source: angular momentum; methods 1.10, derived.
 */
export const stuckAngularImpulse = ({ mass, speed, radius }: Numbers<'mass' | 'speed' | 'radius'>): number => mass * speed * radius;

/** ΔJ = m r_h², Δκ = m g r_h of that hammer, borne by the pendulum. Source: methods 1.11, derived. */
export const carriedByPendulum = ({ mass, radius, g }: Numbers<'mass' | 'radius' | 'g'>): Carried => ({ inertia: mass * radius * radius, stiffness: mass * g * radius });

/**
 * Angular impulse of a hammer that keeps to the pendulum and stays on its own pivot: H = J_h ω r_h/l_c · N·m·s.
 *
 * The two turn together, l_c ω_h = r_h ω: the hammer adds ΔJ = J_h (r_h/l_c)² (sharedInertia) and not m r_h².
 * Compact: J_h = m l², l_c = l, which is m v r_h again. Valid: small angles, both arms plumb at the blow.
 * Source: impulse at the contact, J_h(ω − ω_h) = I l_c and J ω_p = I r_h; derived.
 */
export const sharedAngularImpulse = ({ inertia, speed, radius, contact }: Numbers<'inertia' | 'speed' | 'radius' | 'contact'>): number => (inertia * speed * radius) / contact;

/** ΔJ = J_h (r_h/l_c)², Δκ = m g d (r_h/l_c)² of that hammer, borne by its own pivot. Compact on a thread of l: m r_h², m g r_h²/l. Source: derived. */
export function carriedByOwnPivot({ mass, centre, inertia, contact, radius, g }: Numbers<'mass' | 'centre' | 'inertia' | 'contact' | 'radius' | 'g'>): Carried {
  const square = (radius / contact) ** 2;
  return { inertia: inertia * square, stiffness: mass * g * centre * square };
}

/** ∫F dt over F_peak τ · 1: rectangular 1, half-sine 2/π, triangle and versed sine ½; exponential, τ its time constant, 1. */
export function pulseFullness(shape: PulseShape): number {
  switch (shape) {
    case 'rectangular':
    case 'exponential':
      return 1;
    case 'halfSine':
      return 2 / Math.PI;
    case 'triangle':
    case 'versedSine':
      return 0.5;
  }
}

/** Electrostatic or coil pulse: impulse, and what the first swing feels of it. */
export type Push = { readonly status: 'found'; readonly impulse: number; readonly felt: number } | { readonly status: 'peakInsidePulse' };

/**
 * I = F_peak τ × fullness · N·s, and I/C, the blow that would throw the pendulum as far.
 *
 * Symbols: F, N, signed; τ, s, ≥ 0; ω_n, rad/s, > 0; ζ ≥ 0. 'peakInsidePulse': too long for an impulse.
 * Source: methods 1.6, 1.10.
 * @throws RangeError outside
 */
export function pushOf({ shape, force, duration, naturalFrequency, dampingRatio }: { readonly shape: PulseShape } & Numbers<'force' | 'duration' | 'naturalFrequency' | 'dampingRatio'>): Push {
  const found = pulseCorrection({ shape, duration, naturalFrequency, dampingRatio });
  if (found.status !== 'corrected') return { status: 'peakInsidePulse' };
  const impulse = force * duration * pulseFullness(shape);
  return { status: 'found', impulse, felt: impulse / found.factor };
}
