/** The laser spot on a screen, ray by ray: mirror on or off the pivot, screen square, tilted or curved, beam in or out of the swing plane, windows. */
import { rootBetween } from '../numeric/roots.ts';

/** Geometry of the optical lever. Lengths m, angles rad. */
export interface LaserPath {
  /** D · distance from the pivot's mirror to the screen along the rest beam, windows taken off (opticalDistance). */
  readonly distance: number;
  /** ψ · tilt of the screen in the swing plane, its far side on the side of positive spots. */
  readonly tilt: number;
  /** i · incidence in the swing plane; > 0 for a beam that arrives from the pivot's side. */
  readonly incidence: number;
  /** r_m · mirror's distance from the pivot, its face through the pivot line. */
  readonly mirrorRadius: number;
  /** i_o · incidence out of the swing plane. */
  readonly outOfPlane: number;
  readonly screen: 'parallel' | 'square' | 'curved';
}

/**
 * Distance that the beam sees through windows: D − Σ t (1 − 1/n), near square incidence.
 *
 * Valid: thickness t ≥ 0 (all windows together), index n ≥ 1. m. Source: methods 2, refraction at a plane plate.
 */
export const opticalDistance = ({ distance, windowThickness, windowIndex }: Readonly<Record<'distance' | 'windowThickness' | 'windowIndex', number>>): number =>
  distance - windowThickness * (1 - 1 / windowIndex);

/**
 * Spot on the screen from the pendulum's angle, x − x_rest, m.
 *
 * In the swing plane the reflected beam turns by 2θ whatever its incidence i. A mirror at r_m from the pivot also
 * moves: a = r_m sin θ/cos(θ − i), and the spot is a sin 2i + (D − a cos 2i) tan 2θ on a screen square to the rest
 * beam; a screen tilted by ψ divides by cos ψ − sin ψ tan 2θ. A beam i_o out of the plane turns by less: on a screen
 * parallel to the pivot axis D cos i_o tan 2θ, on one square to the rest beam D cos i_o sin 2θ/(cos² i_o cos 2θ + sin² i_o).
 * On a screen curved about the pivot s = 2 D θ.
 *
 * Valid: |2θ| < π/2, |ψ| < π/2, |i|, |i_o| < π/2, beam meets the screen.
 * Source: ray trace, derived; figures of methods 2.
 */
export function spotOfAngle(theta: number, path: LaserPath): number {
  const { distance: D, tilt, incidence: i, mirrorRadius, outOfPlane } = path;
  if (path.screen === 'curved') return 2 * D * theta;
  if (path.screen === 'square' && outOfPlane !== 0) {
    const c = Math.cos(outOfPlane);
    return (D * c * Math.sin(2 * theta)) / (c * c * Math.cos(2 * theta) + Math.sin(outOfPlane) ** 2);
  }
  const reach = D * Math.cos(outOfPlane);
  const t = Math.tan(2 * theta);
  const a = mirrorRadius === 0 ? 0 : (mirrorRadius * Math.sin(theta)) / Math.cos(theta - i);
  return (a * Math.sin(2 * i) + (reach - a * Math.cos(2 * i)) * t) / (Math.cos(tilt) - Math.sin(tilt) * t);
}

/** Largest |θ| that the inverse looks at: the beam runs along the screen at 2θ = π/2 − ψ. */
const GRAZING = 1e-6;

/**
 * Pendulum's angle from the spot, rad: the inverse of spotOfAngle, closed where it is, by a bracketed root where the
 * mirror is off the pivot or the beam out of the plane on a square screen.
 *
 * @throws RangeError where no angle puts the spot there.
 */
export function angleOfSpot(x: number, path: LaserPath): number {
  const { distance: D, tilt } = path;
  if (path.screen === 'curved') return x / (2 * D);
  const plain = path.mirrorRadius === 0 && !(path.screen === 'square' && path.outOfPlane !== 0);
  if (plain) return Math.atan2(x * Math.cos(tilt), D * Math.cos(path.outOfPlane) + x * Math.sin(tilt)) / 2;
  const most = (Math.PI / 2 - Math.abs(tilt)) / 2 - GRAZING;
  const root = rootBetween((theta) => spotOfAngle(theta, path) - x, -most, most);
  if (root.status !== 'found') throw new RangeError(`laser spot: no angle puts the spot at ${x} m`);
  return root.x;
}
