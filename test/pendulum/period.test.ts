/** The amplitude-dependent period against its table, and timed cycles of decaying swings brought back to the small undamped period. */
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { completeEllipticK } from '../../src/numeric/ellipticIntegral.ts';
import { launchOfFirstSwing } from '../../src/pendulum/launch.ts';
import { meanSquareAmplitude, periodRatio, undampedSmallPeriod } from '../../src/pendulum/period.ts';
import { digits } from '../numeric/digits.ts';
import reference from '../reference/pendulum.json' with { type: 'json' };
import { crossingAfter, turningPoints, turningPointAfter } from './odexSwing.ts';

const degrees = (x: number): number => (x * Math.PI) / 180;

describe('the period ratio of an undamped swing', () => {
  // Source: standard tables, T/T₀ = 2K(sin²(A/2))/π (from memory, recomputed independently).
  test('has the values of the table from 1° to 170°, to 14.5 digits', () => {
    const table = reference.find((e) => e.id === 'f02-period')!.expected as unknown as Readonly<Record<string, string>>;
    expect(Object.keys(table).length).toBe(14);
    for (const [at, ratio] of Object.entries(table)) expect(digits(periodRatio(degrees(Number(at)), 1), Number(ratio))).toBeGreaterThan(14.5);
  });

  // Source: a George Mason University physics course page (read; methods 5 item 1): L = 1 m, g = 9.81 m/s².
  test('makes the printed periods of a one-metre pendulum', () => {
    const small = 2 * Math.PI * Math.sqrt(1 / 9.81);
    expect(digits(small, 2.00606668071065)).toBeGreaterThan(13);
    for (const [at, period] of [[10, 2.0098926272986], [20, 2.02145125782458], [30, 2.04098988951913]] as const) expect(digits(small * periodRatio(degrees(at), 1), period)).toBeGreaterThan(13);
  });

  // Source: methods 1.5, derived (exact ODE).
  test('with a gravity share of 0.8 at 20° is 1.00612, where 1 + pA²/16 gives 1.00609', () => {
    expect(periodRatio(degrees(20), 0.8)).toBeCloseTo(1.00612, 5);
    expect(1 + (0.8 * degrees(20) ** 2) / 16).toBeCloseTo(1.00609, 5);
  });

  test('is 2K/π without a flexure and 1 with a flexure alone', () => {
    fc.assert(fc.property(fc.double({ min: 0, max: 2.9, noNaN: true }), (A) => {
      expect(Math.abs(periodRatio(A, 1) / ((2 / Math.PI) * completeEllipticK(Math.sin(A / 2) ** 2)) - 1)).toBeLessThan(1e-14);
      expect(Math.abs(periodRatio(A, 0) - 1)).toBeLessThan(1e-14);
    }));
  });

  test('is four times the way from a turning point to rest by ODEX, for any gravity share, to 1e-12', () => {
    fc.assert(fc.property(fc.double({ min: 1e-3, max: 2.6, noNaN: true }), fc.double({ min: 0, max: 1.05, noNaN: true }), (A, p) => {
      const quarter = crossingAfter({ zeta: 0, p }, { time: 0, angle: A, speed: 0 }).time;
      expect(Math.abs(periodRatio(A, p) / (quarter / (Math.PI / 2)) - 1)).toBeLessThan(1e-12);
    }));
  });

  test('takes no step where its series takes over', () => {
    for (const p of [0.3, 1]) expect(Math.abs(periodRatio(1.0000001e-4, p) - periodRatio(0.9999999e-4, p))).toBeLessThan(1e-15);
  });

  test('of an amplitude at or beyond the upright, or where nothing restores, is refused', () => {
    for (const [A, p] of [[Math.PI, 1], [4, 0], [NaN, 1], [2.5, 2]] as const) expect(() => periodRatio(A, p)).toThrow(RangeError);
  });
});

describe('the amplitude that stands for decaying cycles', () => {
  // Source: methods 1.5: ⟨A²⟩ = A₀²(1 − e^{−2nδ})/(2nδ), the mean of A₀² e^{−2δt} over t = 0 … n.
  test('is the root mean square over the cycles', () => {
    const [n, delta] = [10, 0.03];
    const steps = 100_000;
    let sum = 0;
    for (let i = 0; i < steps; i++) sum += Math.exp((-2 * delta * n * (i + 0.5)) / steps);
    expect(meanSquareAmplitude(0.2, n, delta)).toBeCloseTo(0.2 * Math.sqrt(sum / steps), 10);
  });

  test('is the first one where nothing decays, and joins it smoothly', () => {
    expect(meanSquareAmplitude(0.2, 10, 0)).toBe(0.2);
    expect(meanSquareAmplitude(0.2, 0, 0.1)).toBe(0.2);
    expect(meanSquareAmplitude(0.2, 1, 1e-12)).toBeCloseTo(0.2, 12);
  });
});

describe('timed cycles brought back to the small undamped period', () => {
  /** T₀ found over the true one, less 1: `cycles` timed by ODEX from the turning point A₀ on. */
  function gap(amplitude: number, dampingRatio: number, gravityShare: number, cycles: number): number {
    const pendulum = { zeta: dampingRatio, p: gravityShare };
    const { launch } = launchOfFirstSwing(amplitude, dampingRatio, gravityShare);
    const turning = turningPoints(pendulum, launch, 2 * cycles + 1);
    const timed = (turning[2 * cycles]!.time - turning[0]!.time) / cycles;
    return undampedSmallPeriod({ timed, dampingRatio, amplitude, cycles, gravityShare }) / (2 * Math.PI) - 1;
  }

  test('give it exactly where nothing damps or a flexure does all the work, to 1e-13', () => {
    for (const A of [0.05, 0.35, 0.7]) {
      for (const p of [0, 0.8, 1]) expect(Math.abs(gap(A, 0, p, 5))).toBeLessThan(1e-13);
      for (const zeta of [0.002, 0.05, 0.3]) expect(Math.abs(gap(A, zeta, 0, 5))).toBeLessThan(1e-13);
    }
  });

  // ⟨A²⟩ is the leading order in A² and in ζ: what is left over is of the order of A⁴ and ζA².
  test.each([
    { A: 0.05, within: 2e-6 }, { A: 0.175, within: 2.4e-5 }, { A: 0.35, within: 9e-5 },
  ])('give it to $within from $A rad, at any damping to 0.05', ({ A, within }) => {
    for (const zeta of [0.002, 0.005, 0.02, 0.05]) for (const p of [0.5, 0.8, 1]) for (const cycles of [1, 3, 10]) expect(Math.abs(gap(A, zeta, p, cycles))).toBeLessThan(within);
  });

  test('would be off by 50 times that at 10° and light damping if the amplitude were passed over', () => {
    const timed = turningPointAfter({ zeta: 0, p: 1 }, { time: 0, angle: 0.175, speed: 0 }).time * 2;
    expect(timed / (2 * Math.PI) - 1).toBeGreaterThan(50 * Math.abs(gap(0.175, 0.005, 1, 10)));
  });

  test('lose √(1 − ζ²) to the damping', () => {
    expect(undampedSmallPeriod({ timed: 1, dampingRatio: 0.6, amplitude: 0, cycles: 10, gravityShare: 1 })).toBeCloseTo(0.8, 14);
  });
});
