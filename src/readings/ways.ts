/** Every way of reading a pendulum: what is read, which lengths of the stand it needs, the angle from the reading and the reading from the angle. */
import { angleOfSpot, opticalDistance, spotOfAngle, type LaserPath } from './laser.ts';

export const READING_WAYS = [
  'rulerAtTip', 'rulerUnderLine', 'arcRuler', 'chord', 'rise', 'laserSpot', 'cameraMarker', 'cameraPivotMarker', 'sensorOnFace', 'sensorOnPoint', 'encoder', 'angle',
] as const;
export type ReadingWay = (typeof READING_WAYS)[number];

/** What is written down: a length, an angle, pixels or counts. */
export type ReadingDimension = 'length' | 'angle' | 'pixel' | 'count';

/** Numbers of the stand by entry name; a way reads those that it names. */
export type StandNumbers = Readonly<Record<string, number>>;

export interface Way {
  readonly reads: ReadingDimension;
  /** Entries without which there is no angle. */
  readonly needs: readonly string[];
  /** Entries with a value of their own where nothing is typed. */
  readonly mayHave: Readonly<Record<string, number>>;
  /** θ from the reading less the plumb mark, scaled; rad. @throws RangeError beyond the reach of the geometry. */
  readonly angle: (x: number, stand: StandNumbers) => number;
  /** The reading less the plumb mark, before scaling, from θ. */
  readonly reading: (theta: number, stand: StandNumbers) => number;
  readonly equation: string;
}

const of = (stand: StandNumbers, name: string): number => {
  const value = stand[name];
  if (value === undefined) throw new Error(`reading way: ${name} is not among the numbers of the stand`);
  return value;
};

/** asin with the reach said in words. */
function arcsine(ratio: number, what: string): number {
  if (Math.abs(ratio) > 1) throw new RangeError(`${what}: the reading is beyond the radius`);
  return Math.asin(ratio);
}

const laserPath = (stand: StandNumbers): LaserPath => ({
  distance: opticalDistance({ distance: of(stand, 'screenDistance'), windowThickness: of(stand, 'windowThickness'), windowIndex: of(stand, 'windowIndex') }),
  tilt: of(stand, 'screenTilt'), incidence: of(stand, 'beamIncidence'), mirrorRadius: of(stand, 'mirrorRadius'), outOfPlane: of(stand, 'beamOutOfPlane'),
  screen: of(stand, 'screenShape') === 2 ? 'curved' : of(stand, 'screenShape') === 1 ? 'square' : 'parallel',
});

/** Sensor on a flat face at height H, the face e in front of the line through the pivot: x = H tan θ + e (1/cos θ − 1). */
function faceAngle(x: number, height: number, offset: number): number {
  // x cos θ = H sin θ + e (1 − cos θ), so (x + e) cos θ − H sin θ = e: one rotation.
  const reach = Math.hypot(x + offset, height);
  return Math.atan2(x + offset, height) - arcsine(offset / reach, 'sensor on a face');
}

interface Camera {
  /** γ, rad, and sin γ/Z₀, 1/m: 0 for a camera far away. */
  readonly yaw: number;
  readonly closing: number;
}

function cameraOf(stand: StandNumbers): Camera {
  const [yaw, far] = [of(stand, 'cameraYaw'), of(stand, 'cameraToPlane')];
  return { yaw, closing: far > 0 ? Math.sin(yaw) / far : 0 };
}

/**
 * Length in the picture, at the scale of the rest point, of X across the swing plane, seen by a camera turned by γ about the upright
 * at Z₀ on its axis: X cos γ/(1 + X sin γ/Z₀). Source: pinhole, derived; methods 2 (scale cos γ, non-linearity X sin γ/Z₀).
 */
const pictureOfAcross = (X: number, { yaw, closing }: Camera): number => (X * Math.cos(yaw)) / (1 + X * closing);
/** The inverse of pictureOfAcross. */
const acrossOfPicture = (x: number, { yaw, closing }: Camera): number => x / (Math.cos(yaw) - x * closing);

/**
 * The ways. Lengths m, angles rad, pixels and counts as such.
 *
 * Source: geometry, derived; figures of methods 2 (ray traces) in the tests.
 */
export const WAYS: Readonly<Record<ReadingWay, Way>> = {
  rulerAtTip: {
    reads: 'length', needs: ['readingRadius'], mayHave: {}, equation: 'θ = asin(x/R)',
    angle: (x, s) => arcsine(x / of(s, 'readingRadius'), 'ruler at the tip'), reading: (t, s) => of(s, 'readingRadius') * Math.sin(t),
  },
  rulerUnderLine: {
    reads: 'length', needs: ['rulerHeight'], mayHave: {}, equation: 'θ = atan(x/H)',
    angle: (x, s) => Math.atan(x / of(s, 'rulerHeight')), reading: (t, s) => of(s, 'rulerHeight') * Math.tan(t),
  },
  arcRuler: {
    reads: 'length', needs: ['readingRadius'], mayHave: {}, equation: 'θ = s/R',
    angle: (x, s) => x / of(s, 'readingRadius'), reading: (t, s) => of(s, 'readingRadius') * t,
  },
  chord: {
    reads: 'length', needs: ['readingRadius'], mayHave: {}, equation: 'θ = 2 asin(c/2R)',
    angle: (x, s) => 2 * arcsine(x / (2 * of(s, 'readingRadius')), 'chord'), reading: (t, s) => 2 * of(s, 'readingRadius') * Math.sin(t / 2),
  },
  rise: {
    reads: 'length', needs: ['readingRadius'], mayHave: {}, equation: 'θ = acos(1 − h/R)',
    // 1 − cos θ = 2 sin²(θ/2) keeps the digits at small swings; a rise has no sign, a reading below rest is given one so that half-differences exist.
    angle: (x, s) => Math.sign(x) * 2 * arcsine(Math.sqrt(Math.abs(x) / (2 * of(s, 'readingRadius'))), 'rise'),
    reading: (t, s) => 2 * of(s, 'readingRadius') * Math.sin(t / 2) ** 2,
  },
  laserSpot: {
    reads: 'length', needs: ['screenDistance'], equation: 'tan 2θ = x/D',
    mayHave: { screenTilt: 0, beamIncidence: 0, mirrorRadius: 0, beamOutOfPlane: 0, windowThickness: 0, windowIndex: 1, screenShape: 0 },
    angle: (x, s) => angleOfSpot(x, laserPath(s)), reading: (t, s) => spotOfAngle(t, laserPath(s)),
  },
  cameraMarker: {
    reads: 'pixel', needs: ['pixelScale', 'readingRadius'], mayHave: { cameraYaw: 0, cameraToPlane: 0 }, equation: 'θ = asin(X/R), X = (u/S)/(cos γ − (u/S) sin γ/Z₀)',
    angle: (x, s) => arcsine(acrossOfPicture(x / of(s, 'pixelScale'), cameraOf(s)) / of(s, 'readingRadius'), 'camera marker'),
    reading: (t, s) => of(s, 'pixelScale') * pictureOfAcross(of(s, 'readingRadius') * Math.sin(t), cameraOf(s)),
  },
  cameraPivotMarker: {
    // The angle is in the record (two coordinates from the pivot); what comes here is that angle.
    reads: 'pixel', needs: [], mayHave: { pivotAcross: 0, pivotDown: 0 }, equation: 'θ = atan2(u_m − u_p, v_m − v_p)',
    angle: (x) => x, reading: (t) => t,
  },
  sensorOnFace: {
    reads: 'length', needs: ['sensorHeight'], mayHave: { faceOffset: 0 }, equation: 'x = H tan θ + e (1/cos θ − 1)',
    angle: (x, s) => faceAngle(x, of(s, 'sensorHeight'), of(s, 'faceOffset')),
    reading: (t, s) => of(s, 'sensorHeight') * Math.tan(t) + of(s, 'faceOffset') * (1 / Math.cos(t) - 1),
  },
  sensorOnPoint: {
    reads: 'length', needs: ['readingRadius'], mayHave: {}, equation: 'θ = asin(x/R)',
    angle: (x, s) => arcsine(x / of(s, 'readingRadius'), 'sensor on a point'), reading: (t, s) => of(s, 'readingRadius') * Math.sin(t),
  },
  encoder: {
    reads: 'count', needs: ['countsPerTurn'], mayHave: {}, equation: 'θ = 2π x/N',
    angle: (x, s) => (2 * Math.PI * x) / of(s, 'countsPerTurn'), reading: (t, s) => (t * of(s, 'countsPerTurn')) / (2 * Math.PI),
  },
  angle: { reads: 'angle', needs: [], mayHave: {}, equation: 'θ = x', angle: (x) => x, reading: (t) => t },
};

/**
 * Camera with pivot and marker in the picture, y downward: θ = atan2(u_m − u_p, v_m − v_p), free of scale and level.
 * Source: methods 2.
 */
export const pictureAngle = ({ across, down, pivotAcross, pivotDown }: Readonly<Record<'across' | 'down' | 'pivotAcross' | 'pivotDown', number>>): number =>
  Math.atan2(across - pivotAcross, down - pivotDown);

/**
 * Scale of a ruler seen by a fixed camera at D_c, the pointer a gap g in front of it: differences shrink by 1 − g/D_c.
 * Common to all readings. Source: similar triangles, methods 2.
 */
export const parallaxScale = ({ gap, cameraDistance }: Readonly<Record<'gap' | 'cameraDistance', number>>): number => 1 - gap / cameraDistance;

/** Half-width of one reading where the eye moves by ± shift: shift g/D_c. Of each record alone. Source: methods 2. */
export const parallaxOfEye = ({ gap, cameraDistance, shift }: Readonly<Record<'gap' | 'cameraDistance' | 'shift', number>>): number => (shift * gap) / cameraDistance;
