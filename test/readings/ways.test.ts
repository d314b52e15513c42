/** The ways of reading, against the printed figures of methods 2 and a ray trace of the test's own. */
import fc from 'fast-check';
import { describe, expect, it, test } from 'vitest';
import { angleOfReading, swingFromMark, swingFromRest, swingFromSides } from '../../src/readings/angle.ts';
import { angleOfSpot, opticalDistance, spotOfAngle, type LaserPath } from '../../src/readings/laser.ts';
import { parallaxOfEye, parallaxScale, pictureAngle, READING_WAYS, WAYS } from '../../src/readings/ways.ts';

const DEGREE = Math.PI / 180;
const SQUARE: LaserPath = { distance: 1, tilt: 0, incidence: 0, mirrorRadius: 0, outOfPlane: 0, screen: 'parallel' };
const STAND = {
  readingRadius: 0.4, rulerHeight: 0.38, screenDistance: 1.2, screenTilt: 0.1, beamIncidence: 0.2, mirrorRadius: 0.05, beamOutOfPlane: 0, windowThickness: 0.01, windowIndex: 1.52,
  screenShape: 0, pixelScale: 4000, cameraYaw: 0.1, cameraToPlane: 0.8, pivotAcross: 0, pivotDown: 0, sensorHeight: 0.3, faceOffset: 0.02, countsPerTurn: 20000,
};

describe('the laser spot', () => {
  // Methods 2, "DERIVED ray trace": D = 1 m, θ = 2°; spots in mm.
  it.each([
    ['square, at normal incidence', {}, 2, 69.927],
    ['tilted by 15°', { tilt: 15 * DEGREE }, 2, 73.776],
    ['mirror 0.3 m off the pivot, i = 20°', { mirrorRadius: 0.3, incidence: 20 * DEGREE }, 2, 76.41],
    ['mirror 0.3 m off the pivot, i = −20°', { mirrorRadius: 0.3, incidence: -20 * DEGREE }, 2, 62.06],
    ['mirror 0.3 m off the pivot, normal incidence', { mirrorRadius: 0.3 }, 2, 69.19],
    ['mirror 0.3 m off the pivot, i = 20°, swung the other way', { mirrorRadius: 0.3, incidence: 20 * DEGREE }, -2, -77.79],
  ] as const)('stands where the methods say: %s', (_what, path, degrees, millimetres) => {
    expect(Math.abs(1e3 * spotOfAngle(degrees * DEGREE, { ...SQUARE, ...path }) - millimetres)).toBeLessThan(millimetres === 69.927 || millimetres === 73.776 ? 5e-4 : 5e-3);
  });

  it('of 2 mm at 5 m is 0.2 mrad (methods 5, item 8)', () => {
    expect(1e3 * angleOfSpot(2e-3, { ...SQUARE, distance: 5 })).toBeCloseTo(0.2, 7);
  });

  /** Beam out of the swing plane: mirror plane through the pivot axis (y), turned by θ about it; screen at D along the rest beam. */
  function traced(theta: number, out: number, screen: 'parallel' | 'square'): number {
    const normal = [Math.sin(theta), 0, Math.cos(theta)] as const;
    const incoming = [0, -Math.sin(out), -Math.cos(out)] as const;
    const along = 2 * (incoming[0] * normal[0] + incoming[1] * normal[1] + incoming[2] * normal[2]);
    const beam = incoming.map((d, i) => d - along * normal[i]!) as [number, number, number];
    const face = screen === 'square' ? ([0, -Math.sin(out), Math.cos(out)] as const) : ([0, 0, 1] as const);
    const height = screen === 'square' ? 1 : Math.cos(out);
    return (beam[0] * height) / (beam[0] * face[0] + beam[1] * face[1] + beam[2] * face[2]);
  }

  it('out of the swing plane agrees with a trace of the ray, on a screen parallel to the pivot axis and on one square to the beam', () => {
    fc.assert(fc.property(fc.double({ min: -0.3, max: 0.3, noNaN: true }), fc.double({ min: -1, max: 1, noNaN: true }), fc.constantFrom('parallel' as const, 'square' as const), (theta, out, screen) => {
      expect(Math.abs(spotOfAngle(theta, { ...SQUARE, outOfPlane: out, screen }) - traced(theta, out, screen))).toBeLessThan(1e-12);
    }));
  });

  it('shortens its path by the windows: a plate of 10 mm, n = 1.52, at small angles by Snell', () => {
    const D = opticalDistance({ distance: 1, windowThickness: 0.01, windowIndex: 1.52 });
    const small = 1e-4;
    const inPlate = Math.asin(Math.sin(small) / 1.52);
    expect(D * Math.tan(small)).toBeCloseTo(0.99 * Math.tan(small) + 0.01 * Math.tan(inPlate), 12);
  });

  it('on a screen curved about the pivot is 2 D θ, and the small-angle slip on a flat one (2θ)²/3', () => {
    expect(spotOfAngle(0.1, { ...SQUARE, screen: 'curved' })).toBeCloseTo(0.2, 15);
    const theta = 0.01;
    expect(spotOfAngle(theta, SQUARE) / (2 * theta) - 1).toBeCloseTo((2 * theta) ** 2 / 3, 7);
  });
});

describe('every way of reading', () => {
  it('undoes itself: the angle of the reading of an angle is that angle', () => {
    fc.assert(fc.property(fc.constantFrom(...READING_WAYS), fc.double({ min: -0.3, max: 0.3, noNaN: true }), fc.constantFrom(0, 1, 2), (name, theta, screenShape) => {
      const way = WAYS[name];
      const stand = { ...STAND, screenShape };
      const back = way.angle(way.reading(theta, stand), stand);
      // A rise has no side; near rest it tells little of the angle.
      expect(Math.abs((name === 'rise' ? Math.abs(theta) : theta) - back)).toBeLessThan(name === 'rise' ? 1e-9 : 1e-12);
    }), { numRuns: 400 });
  });

  it.each(['rulerAtTip', 'chord', 'rise', 'cameraMarker', 'sensorOnPoint'] as const)('ends where its geometry ends: %s', (name) => {
    expect(() => WAYS[name].angle(1e5, STAND)).toThrow(RangeError);
  });

  it('takes the record’s own rest as the plumb point, or a mark where one is known', () => {
    const n = { ...STAND, first: 0.13, rest: 0.05, mark: 0.02, scale: 1.01 };
    expect(swingFromRest('rulerAtTip')(n)).toBeCloseTo(Math.asin((1.01 * 0.08) / 0.4), 14);
    expect(swingFromMark('rulerAtTip')(n)).toBeCloseTo(Math.asin((1.01 * 0.11) / 0.4) - Math.asin((1.01 * 0.03) / 0.4), 14);
    expect(angleOfReading('rulerUnderLine', 0.13, 0.05, 1, STAND)).toBeCloseTo(Math.atan(0.08 / 0.38), 14);
  });

  it('from side to side shares the way as 1 : q', () => {
    const [theta, q] = [0.2, 0.95];
    const first = 0.4 * (Math.sin(theta) + Math.sin(q * theta));
    expect(swingFromSides('rulerAtTip')({ ...STAND, first, scale: 1, halfDecay: q })).toBeCloseTo(theta, 13);
  });

  it('a sensor on a face that stands in front of the pivot line sees where its line cuts the face', () => {
    fc.assert(fc.property(fc.double({ min: -0.4, max: 0.4, noNaN: true }), (theta) => {
      // Face: points p with p · (cos θ, sin θ) = e, x along the sensor, y up from the pivot; the sensor looks along y = −H. At rest it reads e.
      const x = (0.02 + 0.3 * Math.sin(theta)) / Math.cos(theta) - 0.02;
      expect(Math.abs(WAYS.sensorOnFace.reading(theta, STAND) - x)).toBeLessThan(1e-13);
    }));
  });

  it('an encoder of 20,000 counts turns 18° in 1,000', () => {
    expect(WAYS.encoder.angle(1000, STAND) / DEGREE).toBeCloseTo(18, 12);
  });
});

test('a picture with pivot and marker needs no scale, its rows counted downward', () => {
  const at = (theta: number): Readonly<Record<'across' | 'down' | 'pivotAcross' | 'pivotDown', number>> => ({ across: 300 + 700 * Math.sin(theta), down: 50 + 700 * Math.cos(theta), pivotAcross: 300, pivotDown: 50 });
  for (const theta of [-0.4, 0, 0.25]) expect(pictureAngle(at(theta))).toBeCloseTo(theta, 14);
});

test('a fixed camera half a metre before a pointer 5 mm off its ruler reads 1 % long, a moving eye scatters (methods 2)', () => {
  expect(parallaxScale({ gap: 5e-3, cameraDistance: 0.5 })).toBeCloseTo(0.99, 15);
  expect(parallaxOfEye({ gap: 5e-3, cameraDistance: 0.5, shift: 0.02 })).toBeCloseTo(2e-4, 15);
});

describe('a camera that stands askew', () => {
  /** Pinhole at Z₀ from the rest point on the camera’s axis, the swing plane turned by γ about the upright; picture scaled by its size at the rest point. */
  function traced(theta: number, yaw: number, far: number): number {
    const X = STAND.readingRadius * Math.sin(theta);
    const [side, depth] = [X * Math.cos(yaw), far + X * Math.sin(yaw)];
    return (side / depth) * far;
  }

  it.each([[0.1, 0.8], [-0.2, 0.5], [0.3, 2]])('sees what a pinhole sees, turned by %d rad at %d m', (yaw, far) => {
    for (const theta of [-0.4, -0.05, 0.02, 0.3]) {
      const stand = { ...STAND, cameraYaw: yaw, cameraToPlane: far };
      expect(WAYS.cameraMarker.reading(theta, stand) / STAND.pixelScale).toBeCloseTo(traced(theta, yaw, far), 12);
      expect(WAYS.cameraMarker.angle(WAYS.cameraMarker.reading(theta, stand), stand)).toBeCloseTo(theta, 12);
    }
  });

  it('far away shortens by cos γ alone, and near bends by X sin γ/Z₀ (methods 2)', () => {
    const small = 1e-4;
    const at = (theta: number, yaw: number, far: number): number => WAYS.cameraMarker.reading(theta, { ...STAND, cameraYaw: yaw, cameraToPlane: far });
    expect(at(small, 0.2, 0) / at(small, 0, 0)).toBeCloseTo(Math.cos(0.2), 9);
    const X = STAND.readingRadius * Math.sin(0.1);
    expect(at(0.1, 0.2, 0.8) / at(0.1, 0.2, 0) - 1).toBeCloseTo((-X * Math.sin(0.2)) / 0.8, 3);
  });
});
