/** Four ways of reading a pendulum, against inverse formulas written here and the optical lever of the books. */
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { angleModel, angleOfReading, swingFromMark, swingFromRest, type ReadingWay } from '../../src/readings/angle.ts';

const WAYS: readonly ReadingWay[] = ['rulerAtTip', 'rulerUnderLine', 'laserSpot', 'angle'];

/** θ to reading, from the drawing of each way. Source: methods 2, derived by geometry. */
const READING: Readonly<Record<ReadingWay, (theta: number, far: number) => number>> = {
  rulerAtTip: (theta, R) => R * Math.sin(theta),
  rulerUnderLine: (theta, H) => (H * Math.sin(theta)) / Math.cos(theta),
  laserSpot: (theta, D) => (D * Math.sin(2 * theta)) / Math.cos(2 * theta),
  angle: (theta) => theta,
};
/** Largest angle that each way can read, less a little. */
const REACH: Readonly<Record<ReadingWay, number>> = { rulerAtTip: 1.5, rulerUnderLine: 1.5, laserSpot: 0.75, angle: 3 };

describe.each(WAYS)('read by %s', (way) => {
  const case_ = fc.record({
    share: fc.double({ min: -1, max: 1, noNaN: true }), mark: fc.double({ min: -0.2, max: 0.2, noNaN: true }), far: fc.double({ min: 0.05, max: 5, noNaN: true }), scale: fc.double({ min: 0.9, max: 1.1, noNaN: true }),
  });

  test('the reading of an angle gives that angle back', () => {
    fc.assert(fc.property(case_, ({ share, mark, far, scale }) => {
      const theta = share * REACH[way];
      const x = mark + READING[way](theta, far) / scale;
      // asin and the far readings lose digits toward the end of their reach.
      expect(angleOfReading(way, { x, mark, far, scale })).toBeCloseTo(theta, 11);
      expect(angleModel(way)({ x, mark, far, scale })).toBe(angleOfReading(way, { x, mark, far, scale }));
    }));
  });

  test('the swing from a known mark is the difference of two angles, whatever the rest', () => {
    fc.assert(fc.property(case_, fc.double({ min: -0.1, max: 0.1, noNaN: true }), ({ share, mark, far, scale }, restAngle) => {
      const theta = share * (REACH[way] - 0.1) + restAngle;
      const [first, rest] = [theta, restAngle].map((a) => mark + READING[way](a, far) / scale) as [number, number];
      expect(swingFromMark[way]({ first, rest, mark, far, scale })).toBeCloseTo(theta - restAngle, 11);
    }));
  });

  test('the swing from its own rest takes the rest for the mark', () => {
    fc.assert(fc.property(case_, ({ share, mark, far, scale }) => {
      const theta = share * REACH[way];
      const first = mark + READING[way](theta, far) / scale;
      expect(swingFromRest[way]({ first, rest: mark, far, scale })).toBeCloseTo(theta, 11);
      expect(swingFromRest[way]({ first, rest: mark, far, scale })).toBe(swingFromMark[way]({ first, rest: mark, mark, far, scale }));
    }));
  });

  test('the angle is odd about the mark and rises with the reading', () => {
    const at = (x: number): number => angleOfReading(way, { x, mark: 0.012, far: 0.3, scale: 1 });
    expect(at(0.012)).toBe(0);
    let before = -Infinity;
    for (let out = -0.29; out < 0.29; out += 0.01) {
      expect(at(0.012 + out)).toBeCloseTo(-at(0.012 - out), 12);
      expect(at(0.012 + out)).toBeGreaterThan(before);
      before = at(0.012 + out);
    }
  });
});

describe('single readings', () => {
  // Source: methods 5 item 8, derived: the optical lever turns the beam by twice the angle.
  test('a laser spot 2 mm out at 5 m is 0.200000 mrad', () => {
    expect(angleOfReading('laserSpot', { x: 0.002, mark: 0, far: 5, scale: 1 }) * 1e3).toBeCloseTo(0.2, 6);
  });

  // Source: methods 2 (mirror row), derived ray trace: 2° at D = 1 m moves the spot of a mirror on the pivot by 69.93 mm.
  test('a laser spot 69.93 mm out at 1 m is 2°, by the small angle 2.0033°', () => {
    expect((angleOfReading('laserSpot', { x: 0.069927, mark: 0, far: 1, scale: 1 }) * 180) / Math.PI).toBeCloseTo(2, 4);
    expect(((0.069927 / 2) * 180) / Math.PI).toBeCloseTo(2.0033, 4);
  });

  // Source: right triangles 3, 4, 5.
  test('a tip 3 out on a radius of 5, and a line 3 out on a ruler 4 below, stand at the same angle', () => {
    const theta = Math.asin(0.6);
    expect(angleOfReading('rulerAtTip', { x: 3, mark: 0, far: 5, scale: 1 })).toBeCloseTo(theta, 15);
    expect(angleOfReading('rulerUnderLine', { x: 3, mark: 0, far: 4, scale: 1 })).toBeCloseTo(theta, 15);
    expect(angleOfReading('laserSpot', { x: 3, mark: 0, far: 4, scale: 1 })).toBeCloseTo(theta / 2, 15);
  });

  test('a ruler that is 1 % long counts 1 % more', () => {
    expect(angleOfReading('angle', { x: 0.02, mark: 0.01, far: 1, scale: 1.01 })).toBeCloseTo(0.0101, 15);
    expect(angleOfReading('rulerUnderLine', { x: 0.002, mark: 0, far: 1, scale: 1.01 })).toBeCloseTo(0.00202, 8);
  });

  test('a ruler reading farther out than the tip reaches is refused, one just at it is not', () => {
    expect(angleOfReading('rulerAtTip', { x: -0.3, mark: 0, far: 0.3, scale: 1 })).toBe(-Math.PI / 2);
    for (const x of [0.301, -0.301]) expect(() => angleOfReading('rulerAtTip', { x, mark: 0, far: 0.3, scale: 1 })).toThrow(RangeError);
    expect(() => angleOfReading('rulerAtTip', { x: 0.299, mark: 0, far: 0.3, scale: 1.01 })).toThrow(RangeError);
    expect(angleOfReading('rulerUnderLine', { x: 30, mark: 0, far: 0.3, scale: 1 })).toBeLessThan(Math.PI / 2);
  });
});
