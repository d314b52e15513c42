/** The way of reading on the bench's drawing: beams and screens, arcs, chords, sensors, pictures; places in px from the pivot, y down. */
import type { Choices } from '../../session/session.ts';

export interface Place {
  readonly x: number;
  readonly y: number;
}

export interface LaserDrawn {
  readonly mirror: Place;
  /** Where the beam comes from. */
  readonly source: Place;
  readonly rest: Place;
  readonly spot: Place;
  /** SVG path of the screen. */
  readonly screen: string;
  readonly screenX: number;
  /** A window across the beam, or none. */
  readonly window: string | null;
}

export type ReadingDrawn =
  | { readonly is: 'arc'; readonly radius: number; readonly angle: number; readonly path: string }
  | { readonly is: 'chord'; readonly from: Place; readonly to: Place }
  | { readonly is: 'rise'; readonly from: Place; readonly to: Place }
  | { readonly is: 'sensor'; readonly at: Place; readonly target: Place }
  | { readonly is: 'picture'; readonly corner: Place; readonly width: number; readonly height: number; readonly marker: Place; readonly withPivot: boolean }
  | { readonly is: 'encoder'; readonly radius: number; readonly angle: number };

/** Longest drawn laser path: the screen is usually metres away and is drawn broken. */
const LASER_PATH = 118;
/** Steeper beams would leave the drawing. */
const STEEPEST = Math.PI / 3;
const SCREEN_HALF = 22;
const SCREEN_BELOW = 14;

interface LaserBench {
  readonly screenShape: Choices['screenShape'];
  readonly beam: { readonly tilt: number; readonly incidence: number; readonly outOfPlane: number; readonly window: number };
}

/** Beam to the mirror, on to the screen at rest and at the throw; the spot moves by twice the throw. */
export function layLaser({ screenShape, beam }: LaserBench, angle: number, mirrorY: number): LaserDrawn {
  const turn = Math.min(2 * angle, STEEPEST);
  const mirror = { x: 0, y: mirrorY };
  const down = screenShape === 'curved' ? LASER_PATH * Math.sin(turn) : LASER_PATH * Math.tan(turn);
  const left = screenShape === 'curved' ? LASER_PATH * Math.cos(turn) : LASER_PATH;
  const lean = Math.max(-0.6, Math.min(0.6, beam.tilt));
  const to = Math.max(SCREEN_BELOW + 20, down + SCREEN_BELOW);
  const at = (y: number): string => `${-LASER_PATH - y * Math.tan(lean)} ${mirrorY + y}`;
  const screen = screenShape === 'curved'
    ? `M${-LASER_PATH * Math.cos(0.2)} ${mirrorY - LASER_PATH * Math.sin(0.2)}A${LASER_PATH} ${LASER_PATH} 0 0 0 ${-LASER_PATH * Math.cos(turn + 0.15)} ${mirrorY + LASER_PATH * Math.sin(turn + 0.15)}`
    : `M${at(-SCREEN_HALF)}L${at(to)}`;
  const incidence = Math.max(-STEEPEST, Math.min(STEEPEST, beam.incidence));
  return {
    mirror, screen, screenX: -LASER_PATH,
    source: { x: -LASER_PATH * 0.7 * Math.cos(incidence), y: mirrorY - LASER_PATH * 0.7 * Math.sin(incidence) },
    rest: { x: -LASER_PATH, y: mirrorY },
    spot: { x: screenShape === 'curved' ? -left : -LASER_PATH - down * Math.tan(lean), y: mirrorY + down },
    window: beam.window > 0 ? `M${-LASER_PATH * 0.62} ${mirrorY - 16}h5v32h-5z` : null,
  };
}

/** null for rulers and lasers, which have drawings of their own, and for a bare angle. */
export function layReading(way: Choices['readingWay'], { angle, radius, body }: Readonly<Record<'angle' | 'radius' | 'body', number>>): ReadingDrawn | null {
  const rest = { x: 0, y: radius };
  const thrown = { x: radius * Math.sin(angle), y: radius * Math.cos(angle) };
  switch (way) {
    case 'arcRuler': {
      const [from, to] = [-0.12, Math.max(angle, 0.15) + 0.08];
      const end = (a: number): string => `${(radius + 8) * Math.sin(a)} ${(radius + 8) * Math.cos(a)}`;
      return { is: 'arc', radius: radius + 8, angle, path: `M${end(from)}A${radius + 8} ${radius + 8} 0 0 0 ${end(to)}` };
    }
    case 'chord': return { is: 'chord', from: rest, to: thrown };
    case 'rise': return { is: 'rise', from: { x: thrown.x + 12, y: rest.y }, to: { x: thrown.x + 12, y: thrown.y } };
    case 'sensorOnFace':
    case 'sensorOnPoint': return { is: 'sensor', at: { x: -46, y: radius }, target: { x: -4, y: radius } };
    case 'cameraMarker':
    case 'cameraPivotMarker': {
      const withPivot = way === 'cameraPivotMarker';
      const marker = withPivot ? { x: body * Math.sin(angle), y: body * Math.cos(angle) } : thrown;
      const top = withPivot ? -14 : Math.min(marker.y, radius) - 24;
      const bottom = (withPivot ? body : radius) + 16;
      return { is: 'picture', corner: { x: -26, y: top }, width: Math.max(marker.x, 0) + 52, height: bottom - top, marker, withPivot };
    }
    case 'encoder': return { is: 'encoder', radius: 16, angle };
    case 'rulerAtTip':
    case 'rulerUnderLine':
    case 'laserSpot':
    case 'angle': return null;
  }
}
