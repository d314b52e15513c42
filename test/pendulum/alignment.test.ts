/** Thrust lines out of true. */
import { expect, test } from 'vitest';
import { alignmentFactor, cosineOfUncertainTilt } from '../../src/pendulum/alignment.ts';

const DEGREE = Math.PI / 180;
const factor = (inPlane: number, outOfPlane = 0, exitAhead = 0): number => alignmentFactor({ inPlane, outOfPlane, exitAhead, leverArm: 0.3 });

test('a thrust out of the swing plane turns the pendulum by its cosine', () => {
  expect(factor(0, 3 * DEGREE)).toBeCloseTo(1 - (3 * DEGREE) ** 2 / 2, 5);
  expect(factor(0)).toBe(1);
});

// Printed with the formula: e = 50 mm, r_t = 300 mm, 3° gives +0.7 %.
test('an exit ahead of the arm raises the torque of a tilted thrust by (e/r) sin α', () => {
  expect(factor(3 * DEGREE, 0, 0.05) - 1).toBeCloseTo(0.007, 3);
  expect(factor(-3 * DEGREE, 0, 0.05) - 1).toBeCloseTo(-0.0101, 4);
});

test('the factor is the moment of the thrust about the pivot, by cross product', () => {
  const [alpha, e, r] = [0.2, 0.05, 0.3];
  // Exit at (e, −r), thrust along (cos α, sin α): x F_z − z F_x.
  const moment = e * Math.sin(alpha) + r * Math.cos(alpha);
  expect(alignmentFactor({ inPlane: alpha, outOfPlane: 0, exitAhead: e, leverArm: r })).toBeCloseTo(moment / r, 15);
});

test('an uncertain tilt about true lowers the mean by u²/2 with a deviation of u²/√2', () => {
  const { mean, deviation } = cosineOfUncertainTilt({ tilt: 0, u: 0.02 });
  expect(mean - 1).toBeCloseTo(-0.0002, 7);
  expect(Math.abs(deviation / (0.0004 / Math.SQRT2) - 1)).toBeLessThan(1e-3);
  const tilted = cosineOfUncertainTilt({ tilt: 0.3, u: 0.01 });
  expect(Math.abs(tilted.deviation / (0.01 * Math.sin(0.3)) - 1)).toBeLessThan(1e-3);
  // Mean and deviation over the normal distribution by quadrature.
  let [sum, square, weight] = [0, 0, 0];
  for (let z = -8; z <= 8; z += 0.01) {
    const w = Math.exp((-z * z) / 2);
    const c = Math.cos(0.3 + 0.2 * z);
    [sum, square, weight] = [sum + w * c, square + w * c * c, weight + w];
  }
  const wide = cosineOfUncertainTilt({ tilt: 0.3, u: 0.2 });
  expect(wide.mean).toBeCloseTo(sum / weight, 12);
  expect(wide.deviation).toBeCloseTo(Math.sqrt(square / weight - (sum / weight) ** 2), 12);
});

test('a thrust at right angles, and no lever arm, are refused', () => {
  expect(() => factor(Math.PI / 2)).toThrow(RangeError);
  expect(() => alignmentFactor({ inPlane: 0, outOfPlane: 0, exitAhead: 0, leverArm: 0 })).toThrow(RangeError);
  expect(() => cosineOfUncertainTilt({ tilt: 0, u: -1 })).toThrow(RangeError);
});
