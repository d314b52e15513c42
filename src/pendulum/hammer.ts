/** Taps of known impulse: a swinging hammer by its angles, a hammer that stays, a force held for a while. */

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
