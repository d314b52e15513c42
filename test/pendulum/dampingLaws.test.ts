/** The full pendulum with viscous, quadratic and Coulomb damping, against closed forms and an integrator that the project does not use. */
import fc from 'fast-check';
import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { frictionFactor, launchOfDampedSwing, launchWithoutViscous, nextTurn, quadraticFactor, turningPointsOf, UNDAMPED } from '../../src/pendulum/dampingLaws.ts';
import type { Damping } from '../../src/pendulum/dampingLaws.ts';
import { dampingFactor } from '../../src/pendulum/damping.ts';
import { launchOfFirstSwing, nextTurningPoint } from '../../src/pendulum/launch.ts';
import * as odex from './odexDriven.ts';

/** Largest relative deviation |a/b − 1|. */
const off = (a: number, b: number): number => Math.abs(a / b - 1);

const table = JSON.parse(readFileSync(new URL('../reference/pendulum-ode-table.json', import.meta.url), 'utf8')) as {
  readonly quadraticDragClosedForm: readonly { readonly c: number; readonly v: number; readonly theta1: string }[];
  readonly coulombFrictionClosedForm: readonly { readonly f: number; readonly v: number; readonly theta1: string }[];
  readonly rows: readonly { readonly zeta: number; readonly v: number; readonly tau1: string; readonly theta1: string; readonly theta2: string }[];
};
const damping = (parts: Partial<Damping>): Damping => ({ ...UNDAMPED, ...parts });

describe('the launch of a first swing', () => {
  test('with quadratic drag is that of the tabled closed form, both in closed form and by series', () => {
    for (const { c, v, theta1 } of table.quadraticDragClosedForm) {
      const peak = Number(theta1);
      expect(off(launchWithoutViscous(peak, { quadratic: c, friction: 0 }, 1), v)).toBeLessThan(3e-15);
      expect(off(launchOfDampedSwing(peak, damping({ quadratic: c }), 1).launch, v)).toBeLessThan(3e-15);
    }
  });

  test('with Coulomb friction is that of the tabled closed form, both in closed form and by series', () => {
    for (const { f, v, theta1 } of table.coulombFrictionClosedForm) {
      const peak = Number(theta1);
      expect(off(launchWithoutViscous(peak, { quadratic: 0, friction: f }, 1), v)).toBeLessThan(3e-15);
      expect(off(launchOfDampedSwing(peak, damping({ friction: f }), 1).launch, v)).toBeLessThan(3e-15);
    }
  });

  test('with viscous damping alone is that of the tabled turning points, and of the viscous series', () => {
    for (const { zeta, v, tau1, theta1 } of table.rows) {
      const found = launchOfDampedSwing(Number(theta1), damping({ ratio: zeta }), 1);
      expect(off(found.launch, v)).toBeLessThan(3e-14);
      expect(off(found.peakTime, Number(tau1))).toBeLessThan(1e-13);
      expect(off(found.launch, launchOfFirstSwing(Number(theta1), zeta, 1).launch)).toBeLessThan(1e-14);
    }
  });

  test('with all three dampings is what another integrator swings back from', () => {
    for (const ratio of [0, 0.03, 0.4]) for (const quadratic of [0, 0.3, 5]) for (const friction of [0, 0.002]) for (const p of [1, 0.6, 0]) for (const launch of [0.03, 0.4, 1.2]) {
      const outward: odex.Acceleration = (_, angle, speed) => -2 * ratio * speed - quadratic * speed * speed - friction - p * Math.sin(angle) - (1 - p) * angle;
      const peak = odex.nextTurningPoint(outward, { time: 0, angle: 0, speed: launch }, 1);
      const found = launchOfDampedSwing(peak.angle, { ratio, quadratic, friction }, p);
      expect(off(found.launch, launch)).toBeLessThan(2e-11);
      expect(off(found.peakTime, peak.time)).toBeLessThan(2e-11);
      const back: odex.Acceleration = (_, angle, speed) => -2 * ratio * speed + quadratic * speed * speed + friction - p * Math.sin(angle) - (1 - p) * angle;
      const turned = odex.nextTurningPoint(back, { time: 0, angle: peak.angle, speed: 0 }, -1);
      expect(Math.abs(nextTurn(peak.angle, { ratio, quadratic, friction }, p).angle - turned.angle)).toBeLessThan(2e-11 * launch);
    }
  });

  test('without viscous damping is the same in closed form and by series, whatever the parts', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 1e-6, max: 2.5, noNaN: true }), fc.double({ min: 0, max: 4, noNaN: true }), fc.double({ min: 0, max: 0.1, noNaN: true }), fc.double({ min: 0, max: 1, noNaN: true }),
        (peak, quadratic, friction, p) => {
          expect(off(launchWithoutViscous(peak, { quadratic, friction }, p), launchOfDampedSwing(peak, damping({ quadratic, friction }), p).launch)).toBeLessThan(1e-13);
        },
      ),
    );
  });

  test('is larger the more of any damping there is, and odd in the swing', () => {
    fc.assert(
      fc.property(fc.double({ min: 0.001, max: 2, noNaN: true }), fc.constantFrom('ratio', 'quadratic', 'friction'), fc.double({ min: 0.001, max: 0.3, noNaN: true }), (peak, term, amount) => {
        const less = launchOfDampedSwing(peak, damping({ [term]: amount / 2 }), 1).launch;
        const more = launchOfDampedSwing(peak, damping({ [term]: amount }), 1).launch;
        expect(more).toBeGreaterThan(less);
        expect(launchOfDampedSwing(-peak, damping({ [term]: amount }), 1).launch).toBe(-more);
      }),
    );
  });

  // Printed with the laws, there checked with another integrator.
  test('of a small swing has the printed first-swing factors of quadratic drag and friction', () => {
    expect(quadraticFactor({ quadratic: 0.5, firstSwing: 0.1 })).toBeCloseTo(1.03403808, 8);
    expect(quadraticFactor({ quadratic: 2, firstSwing: 0.2 })).toBeCloseTo(1.31682836, 8);
    expect(frictionFactor({ friction: 0.005, firstSwing: 0.1 })).toBeCloseTo(1.04880885, 8);
  });

  test('tends to the small swing’s factors as the swing shrinks', () => {
    const peak = 1e-4;
    const factorOf = (parts: Partial<Damping>): number => launchOfDampedSwing(peak, damping(parts), 1).launch / peak;
    expect(off(factorOf({ ratio: 0.1 }), dampingFactor(0.1))).toBeLessThan(1e-9);
    expect(off(factorOf({ quadratic: 3000 }), quadraticFactor({ quadratic: 3000, firstSwing: peak }))).toBeLessThan(1e-9);
    expect(off(factorOf({ friction: 1e-5 }), frictionFactor({ friction: 1e-5, firstSwing: peak }))).toBeLessThan(1e-9);
    expect(off(quadraticFactor({ quadratic: 0.5, firstSwing: peak }), 1 + (2 * 0.5 * peak) / 3)).toBeLessThan(1e-8);
  });

  test('is the energy form where only gravity’s friction acts: φ² = 2(1 − cos θ) + 2 θ_f θ', () => {
    expect(off(launchWithoutViscous(1.1, { quadratic: 0, friction: 0.02 }, 1), Math.sqrt(2 * (1 - Math.cos(1.1)) + 0.044))).toBeLessThan(1e-15);
    expect(off(launchWithoutViscous(1.1, { quadratic: 0, friction: 0.02 }, 0), Math.sqrt(1.21 + 0.044))).toBeLessThan(1e-15);
  });

  test('is refused beyond the upright position and where nothing turns the pendulum back', () => {
    expect(() => launchOfDampedSwing(3.2, UNDAMPED, 1)).toThrow(RangeError);
    expect(() => launchOfDampedSwing(0.1, damping({ friction: -0.2 }), 1)).toThrow(RangeError);
    expect(() => launchWithoutViscous(0.1, { quadratic: 0, friction: -0.2 }, 1)).toThrow(RangeError);
    expect(() => frictionFactor({ friction: 0.1, firstSwing: 0 })).toThrow(RangeError);
    expect(() => nextTurn(0.1, damping({ ratio: 1 }), 1)).toThrow(RangeError);
  });
});

describe('the turning points of a free swing', () => {
  test('with viscous damping are those of the viscous series and of the table', () => {
    for (const { zeta, theta1, theta2 } of table.rows) {
      const turned = nextTurn(Number(theta1), damping({ ratio: zeta }), 1);
      expect(off(turned.angle, Number(theta2))).toBeLessThan(1e-13);
      expect(off(turned.angle, nextTurningPoint(Number(theta1), zeta, 1))).toBeLessThan(1e-14);
    }
  });

  test('fall by 2 θ_f a half swing with friction in a small swing, until the pivot holds the pendulum', () => {
    const angles = turningPointsOf(0.0105, damping({ friction: 0.001 }), 0, 8);
    expect(angles.map((angle) => Math.round(Math.abs(angle) * 1e7) / 1e7)).toEqual([0.0105, 0.0085, 0.0065, 0.0045, 0.0025, 0.0005, 0.0005, 0.0005, 0.0005]);
    expect(nextTurn(angles[5]!, damping({ friction: 0.001 }), 0)).toEqual({ status: 'stops', angle: angles[5] });
  });

  test('fall as 1/A by 8β/3 a cycle with weak quadratic drag', () => {
    const angles = turningPointsOf(0.01, damping({ quadratic: 0.2 }), 1, 20);
    const perCycle = (1 / Math.abs(angles[20]!) - 1 / angles[0]!) / 10;
    expect(off(perCycle, (8 * 0.2) / 3)).toBeLessThan(1e-3);
  });
});
