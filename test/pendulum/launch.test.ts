/** First swing and launch, and turning point to turning point, against two independent integrators and the energy. */
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { dampingFactor } from '../../src/pendulum/damping.ts';
import { launchOfFirstSwing, nextTurningPoint, peakTimeOfSmall } from '../../src/pendulum/launch.ts';
import { digits } from '../numeric/digits.ts';
import table from '../reference/pendulum-ode-table.json' with { type: 'json' };
import { atRest, stateAt, turningPointAfter, turningPoints } from './odexSwing.ts';

const degrees = (x: number): number => (x * Math.PI) / 180;
const angle = fc.double({ min: 1e-4, max: 2.6, noNaN: true });
/** Gravity share of a pendulum with a flexure, and a little above 1, where half-differences step. */
const share = fc.oneof(fc.constantFrom(0, 1), fc.double({ min: 0, max: 1.05, noNaN: true }));

// Source: pendulum-ode-table (40-digit Taylor series, cross-checked with DOP853 and, undamped, 2 asin(v/2) and K; recomputed independently).
describe('the table of the full damped pendulum, 25 rows from 1° to 97°', () => {
  test('the first turning point gives the launch and its time back, to 15 digits', () => {
    for (const { zeta, v, theta1, tau1 } of table.rows) {
      const { launch, peakTime } = launchOfFirstSwing(Number(theta1), zeta, 1);
      expect(digits(launch, v)).toBeGreaterThan(15);
      expect(digits(peakTime, Number(tau1))).toBeGreaterThan(15);
    }
  });

  test('each turning point gives the next, to 15 digits', () => {
    for (const { zeta, ...row } of table.rows) {
      const turning = [row.theta1, row.theta2, row.theta3, row.theta4].map(Number);
      for (let k = 0; k < 3; k++) expect(digits(nextTurningPoint(turning[k]!, zeta, 1), turning[k + 1]!)).toBeGreaterThan(15);
    }
  });

  test('ODEX, which the other tests lean on, agrees with the table to 13 digits', () => {
    for (const { zeta, v, ...row } of table.rows) {
      const found = turningPoints({ zeta, p: 1 }, v, 4);
      for (const [k, theta] of [row.theta1, row.theta2, row.theta3, row.theta4].entries()) expect(digits(found[k]!.angle, Number(theta))).toBeGreaterThan(13);
      expect(digits(found[3]!.time, Number(row.tau4))).toBeGreaterThan(13);
    }
  });
});

describe('a swing launched as computed and integrated forward by ODEX', () => {
  // ODEX itself is good for 4e-14; what it is off grows toward the upright.
  test('has its first maximum at the angle and the time asked for, to 1e-12, for any gravity share and damping to 1.5', () => {
    fc.assert(fc.property(angle, fc.double({ min: 0, max: 1.5, noNaN: true }), share, (peak, zeta, p) => {
      const { launch, peakTime } = launchOfFirstSwing(peak, zeta, p);
      const found = turningPointAfter({ zeta, p }, atRest(launch));
      expect(Math.abs(found.angle / peak - 1)).toBeLessThan(1e-12);
      expect(Math.abs(found.time / peakTime - 1)).toBeLessThan(1e-12);
    }));
  });

  test('turns back where the next turning point is computed, to 1e-12', () => {
    fc.assert(fc.property(angle, fc.double({ min: 0, max: 0.7, noNaN: true }), share, (from, zeta, p) => {
      const found = turningPointAfter({ zeta, p }, { time: 0, angle: from, speed: 0 });
      expect(Math.abs(nextTurningPoint(from, zeta, p) / found.angle - 1)).toBeLessThan(1e-12);
    }));
  });

  test('stands still at the computed peak time, for critical damping and around it', () => {
    for (const zeta of [0.98, 0.9999, 1, 1.0001, 1.02]) {
      const { launch, peakTime } = launchOfFirstSwing(0.8, zeta, 0.6);
      const peak = stateAt({ zeta, p: 0.6 }, atRest(launch), peakTime);
      expect(Math.abs(peak.angle / 0.8 - 1)).toBeLessThan(1e-13);
      expect(Math.abs(peak.speed)).toBeLessThan(1e-13);
    }
  });
});

describe('without damping', () => {
  // Source: the first integral of the equation of motion (methods 1.1, energy form).
  test('the launch is that of the energy, (v/ω)² = 2p(1 − cos θ) + (1 − p)θ², to 14 digits for any gravity share', () => {
    fc.assert(fc.property(fc.double({ min: 1e-6, max: 3, noNaN: true }), fc.double({ min: 0, max: 1, noNaN: true }), (peak, p) => {
      const energy = 4 * p * Math.sin(peak / 2) ** 2 + (1 - p) * peak ** 2;
      expect(Math.abs(launchOfFirstSwing(peak, 0, p).launch / Math.sqrt(energy) - 1)).toBeLessThan(1e-14);
    }), { numRuns: 500 });
  });

  test('the next turning point is the same angle on the other side', () => {
    fc.assert(fc.property(angle, fc.double({ min: 0, max: 1, noNaN: true }), (from, p) => {
      expect(Math.abs(nextTurningPoint(from, 0, p) / -from - 1)).toBeLessThan(1e-14);
    }));
  });

  // Source: methods 1.1, derived: (θ/2)/sin(θ/2).
  test('the small-angle formula gives too much by the factors of the table', () => {
    const factors: Readonly<Record<string, number>> = {
      1: 1.0000127, 2: 1.0000508, 5: 1.0003174, 10: 1.0012704, 15: 1.0028615, 20: 1.0050951, 30: 1.0115152, 45: 1.0261722, 60: 1.0471976, 90: 1.1107207,
    };
    for (const [at, factor] of Object.entries(factors)) {
      const theta = degrees(Number(at));
      expect(theta / launchOfFirstSwing(theta, 0, 1).launch).toBeCloseTo(factor, 7);
    }
  });

  // Source: methods 1.1, derived: 1 + pθ²/24; the next term is below θ⁴/500.
  test('with a flexure the excess is that of the gravity share', () => {
    const theta = degrees(10);
    for (const p of [0, 0.3, 0.8]) expect(Math.abs(theta / launchOfFirstSwing(theta, 0, p).launch - 1 - (p * theta ** 2) / 24)).toBeLessThan(theta ** 4 / 500);
  });
});

describe('of a small swing', () => {
  // Source: methods 1.3, derived (ODE-checked): D = exp[ζ arccos ζ/√(1 − ζ²)].
  test('launch over first swing is D, to 12 digits at 0.1 µrad, for any gravity share', () => {
    for (const zeta of [0, 0.001, 0.05, 0.3, 0.7, 0.999, 1, 1.001, 1.5]) for (const p of [0, 0.5, 1]) {
      expect(digits(launchOfFirstSwing(1e-7, zeta, p).launch, 1e-7 * dampingFactor(zeta))).toBeGreaterThan(12);
    }
  });

  test('with a flexure alone it is D at any angle', () => {
    for (const zeta of [0.01, 0.3, 1.2]) expect(digits(launchOfFirstSwing(1.4, zeta, 0).launch, 1.4 * dampingFactor(zeta))).toBeGreaterThan(14);
  });

  test('the peak comes at arccos ζ/√(1 − ζ²), at 1 for critical damping, without a step there', () => {
    expect(peakTimeOfSmall(0)).toBe(Math.PI / 2);
    expect(peakTimeOfSmall(1)).toBe(1);
    expect(digits(peakTimeOfSmall(0.5), Math.PI / 3 / Math.sqrt(0.75))).toBeGreaterThan(15);
    expect(digits(peakTimeOfSmall(1.25), Math.log(2) / 0.75)).toBeGreaterThan(14);
    // Inside the series, against arcsin s/s with s itself given.
    for (const s of [0.001, 0.0095]) expect(digits(peakTimeOfSmall(Math.sqrt((1 - s) * (1 + s))), Math.asin(s) / s)).toBeGreaterThan(14);
    // Either side of where the series takes over, s² = 1 − ζ² = ±1e-4: the slope is −1/3, so 1e-9 in ζ moves it by 3e-10.
    for (const edge of [Math.sqrt(1 - 1e-4), Math.sqrt(1 + 1e-4)]) {
      const step = peakTimeOfSmall(edge + 1e-9) - peakTimeOfSmall(edge - 1e-9);
      expect(step / 2e-9).toBeGreaterThan(-0.3335);
      expect(step / 2e-9).toBeLessThan(-0.332);
    }
  });
});

describe('what holds for every swing', () => {
  test('the launch is odd in the angle', () => {
    fc.assert(fc.property(angle, fc.double({ min: 0, max: 1.5, noNaN: true }), share, (peak, zeta, p) => {
      expect(launchOfFirstSwing(-peak, zeta, p)).toEqual({ launch: -launchOfFirstSwing(peak, zeta, p).launch, peakTime: launchOfFirstSwing(peak, zeta, p).peakTime });
    }));
  });

  test('more damping or a larger angle takes a larger launch', () => {
    fc.assert(fc.property(angle, fc.double({ min: 0, max: 1.5, noNaN: true }), fc.double({ min: 0, max: 1, noNaN: true }), fc.double({ min: 1e-3, max: 0.2, noNaN: true }), (peak, zeta, p, more) => {
      const { launch } = launchOfFirstSwing(peak, zeta, p);
      expect(launchOfFirstSwing(peak, zeta + more, p).launch).toBeGreaterThan(launch);
      expect(launchOfFirstSwing(peak * (1 + more), zeta, p).launch).toBeGreaterThan(launch);
    }));
  });

  test('a damping ratio a little below zero is carried on smoothly', () => {
    const at = (zeta: number): number => launchOfFirstSwing(0.5, zeta, 0.7).launch;
    expect((at(1e-4) - at(-1e-4)) / 2e-4).toBeCloseTo((at(2e-4) - at(0)) / 2e-4, 3);
    expect(turningPointAfter({ zeta: -0.1, p: 0.7 }, atRest(at(-0.1))).angle).toBeCloseTo(0.5, 12);
  });

  test('no swing means no launch, with the peak time of a small one', () => {
    expect(launchOfFirstSwing(0, 0.1, 1)).toEqual({ launch: 0, peakTime: peakTimeOfSmall(0.1) });
  });

  test('an angle at or beyond the upright, or one that nothing restores, is refused', () => {
    for (const [peak, zeta, p] of [[Math.PI, 0, 1], [4, 0.1, 0.2], [NaN, 0, 1], [0.5, -0.6, 1], [2, 0, 2]] as const) {
      expect(() => launchOfFirstSwing(peak, zeta, p)).toThrow(RangeError);
    }
    for (const [from, zeta, p] of [[Math.PI, 0, 1], [0, 0.1, 1], [0.5, 1, 1], [0.5, -0.1, 1], [NaN, 0, 1]] as const) {
      expect(() => nextTurningPoint(from, zeta, p)).toThrow(RangeError);
    }
  });

  test('near the upright the undamped launch is still 2 sin(θ/2)', () => {
    for (const peak of [3, 3.1, 3.1415]) expect(digits(launchOfFirstSwing(peak, 0, 1).launch, 2 * Math.sin(peak / 2))).toBeGreaterThan(14);
  });
});
