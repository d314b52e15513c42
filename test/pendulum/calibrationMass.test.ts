import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { inertiaOfTwoPeriods, periodWithMass, twoPeriodSensitivity, unchangedDistance, type HungMass } from '../../src/pendulum/calibrationMass.ts';
import { smallPeriod } from '../../src/pendulum/forms.ts';

/** Methods 1.8: J 2.5e-3 kg·m², κ 0.054 N·m/rad, 20 g. */
const RIG = { inertia: 2.5e-3, stiffness: 0.054, g: 9.80665, mass: 0.02, ownInertia: 0 } as const;
const at = (distance: number): HungMass => ({ ...RIG, distance });
/** Relative: the printed values have nine digits. */
const PRINTED = 5e-9;

describe('the calibration mass of methods 1.8', () => {
  it('leaves the period as it is at 0.45401 m', () => {
    expect(unchangedDistance(RIG)).toBeCloseTo(0.45401, 5);
    expect(periodWithMass(at(unchangedDistance(RIG)!))).toBeCloseTo(smallPeriod(RIG), 14);
  });

  it.each([[0.35, 1.26227738], [0.15, 1.18156036], [0.46, 1.35749238]])('at %f m makes the period %f s', (distance, period) => {
    expect(Math.abs(periodWithMass(at(distance)) / period - 1)).toBeLessThan(PRINTED);
  });

  it('makes 1.35192623 s without it', () => expect(Math.abs(smallPeriod(RIG) / 1.35192623 - 1)).toBeLessThan(PRINTED));

  it.each([[0.35, 31, -14], [0.15, 10, -6.5]])('at %f m J follows T₁ by %f and T₀ by %f', (distance, toWith, toWithout) => {
    const found = twoPeriodSensitivity(at(distance));
    expect(Math.abs(found.toWith - toWith)).toBeLessThan(0.5);
    expect(Math.abs(found.toWithout - toWithout)).toBeLessThan(0.5);
  });

  it('gives J back from the printed periods', () => {
    const J = inertiaOfTwoPeriods({ mass: 0.02, distance: 0.35, ownInertia: 0, g: 9.80665, without: 1.35192623, with: 1.26227738 });
    expect(Math.abs(J / 2.5e-3 - 1)).toBeLessThan(1e-6);
  });
});

const between = (min: number, max: number): fc.Arbitrary<number> => fc.double({ min, max, noNaN: true });
const hung = fc.record({ inertia: between(1e-6, 1), l: between(0.05, 2), g: between(9.78, 9.84), mass: between(1e-4, 1), distance: between(0.02, 2), own: between(0, 0.2), flexureOnly: fc.boolean() })
  .map(({ inertia, l, g, mass, distance, own, flexureOnly }): HungMass => ({ inertia, stiffness: (inertia * 9.8) / l, g: flexureOnly ? 0 : g, mass, distance, ownInertia: own * mass * l * l }));

describe('any calibration mass', () => {
  it('gives J back from the two periods, and its sensitivities are the slopes of that', () => {
    fc.assert(fc.property(hung, (x) => {
      const [without, loaded] = [smallPeriod(x), periodWithMass(x)];
      fc.pre(Math.abs(loaded / without - 1) > 1e-3);
      const J = (a: number, b: number): number => inertiaOfTwoPeriods({ ...x, without: a, with: b });
      const h = 1e-6;
      const slope = twoPeriodSensitivity(x);
      // Near the place of no change the last digit of a period is magnified by its sensitivity.
      expect(Math.abs(J(without, loaded) / x.inertia - 1)).toBeLessThan(1e-14 * (1 + Math.hypot(slope.toWith, slope.toWithout)));
      const byDifference = [(J(without, loaded * (1 + h)) - J(without, loaded * (1 - h))) / (2 * h * x.inertia), (J(without * (1 + h), loaded) - J(without * (1 - h), loaded)) / (2 * h * x.inertia)] as const;
      const scale = 1 + Math.hypot(...byDifference);
      expect(Math.abs(slope.toWith - byDifference[0])).toBeLessThan(1e-3 * scale);
      expect(Math.abs(slope.toWithout - byDifference[1])).toBeLessThan(1e-3 * scale);
    }));
  });

  it('has no place of no change about an upright axis; elsewhere the period there is that without it', () => {
    fc.assert(fc.property(hung, (x) => {
      const distance = unchangedDistance(x);
      expect(x.g !== 0 || distance === null).toBe(true);
      const holds = distance === null ? periodWithMass(x) > smallPeriod(x) : Math.abs(periodWithMass({ ...x, distance }) / smallPeriod(x) - 1) < 1e-12;
      expect(holds).toBe(true);
    }));
  });

  it('is refused where it stands so high that nothing restores', () => expect(() => periodWithMass(at(-1))).toThrow(RangeError));
});
