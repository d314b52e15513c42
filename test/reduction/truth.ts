/** A pendulum whose inertia, stiffness and damping are known, and what a ruler, a screen or a protractor would show of its swings. */
import { turningPoints } from '../pendulum/odexSwing.ts';

/** J, kg·m²; κ, N·m/rad; gravity part of κ, N·m/rad; ζ. */
export interface Body {
  readonly inertia: number;
  readonly stiffness: number;
  readonly weight: number;
  readonly ratio: number;
}

export const factorOf = (body: Body): number => Math.sqrt(body.inertia * body.stiffness);
export const shareOf = (body: Body): number => body.weight / body.stiffness;

/** Point masses with their own inertia hung at distances, and a flexure; damped with ζ. */
export interface Piece {
  readonly m: number;
  readonly r: number;
  readonly own: number;
}

export function bodyOf(pieces: readonly Piece[], g: number, flexure: number, ratio: number): Body {
  const inertia = pieces.reduce((sum, { m, r, own }) => sum + m * r * r + own, 0);
  const weight = pieces.reduce((sum, { m, r }) => sum + m * g * r, 0);
  return { inertia, stiffness: weight + flexure, weight, ratio };
}

/** The same damping torque c = 2ζ√(Jκ) on another body. */
export const carriedTo = (to: Body, from: Body): Body => ({ ...to, ratio: (from.ratio * factorOf(from)) / factorOf(to) });

/** Angles at the turning points after an angular impulse H = I r at rest. θ′(0⁺) = H/J, φ = θ′(0⁺)/ω_n = H/√(Jκ). */
export function swingsAfter(body: Body, angularImpulse: number, count: number): readonly number[] {
  return turningPoints({ zeta: body.ratio, p: shareOf(body) }, angularImpulse / factorOf(body), count).map(({ angle }) => angle);
}

/** How the pendulum is read: distances in m, the number on the scale at the plumb point, m (rad for an angle). */
export interface Scale {
  readonly way: 'rulerAtTip' | 'rulerUnderLine' | 'laserSpot' | 'angle';
  readonly far: number;
  /** True length per length read. */
  readonly factor: number;
  readonly mark: number;
  readonly backward: boolean;
}

/** What stands on the scale at an angle from plumb: by the geometry of methods 2, solved for the reading. */
export function readingAt(scale: Scale, angle: number): number {
  const out = { rulerAtTip: () => scale.far * Math.sin(angle), rulerUnderLine: () => scale.far * Math.tan(angle), laserSpot: () => scale.far * Math.tan(2 * angle), angle: () => angle }[scale.way]();
  return scale.mark + ((scale.backward ? -1 : 1) * out) / scale.factor;
}
