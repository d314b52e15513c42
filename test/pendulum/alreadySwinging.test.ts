/** Shots on a pendulum that is already swinging. */
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { amplitudeOverPhases, jumpFromAmplitude, jumpFromPeak, jumpOfUnknownPhase, largestPeakShift, peakShift, swingLater } from '../../src/pendulum/alreadySwinging.ts';
import { nextTurningPoint, stateAt } from './odexDriven.ts';

const swing = (deflection: number, speed: number) => ({ deflection, speed });

describe('a swing whose phase at the shot is known', () => {
  test('gives the jump back from the amplitude after it, undamped', () => {
    fc.assert(
      fc.property(fc.double({ min: -0.5, max: 0.5, noNaN: true }), fc.double({ min: -0.5, max: 0.5, noNaN: true }), fc.double({ min: 0.6, max: 2, noNaN: true }), (x, v, jump) => {
        expect(Math.abs(jumpFromAmplitude(Math.hypot(x, v + jump), swing(x, v)) - jump)).toBeLessThan(2e-14);
      }),
    );
  });

  test('gives the jump back from a damped peak that another integrator swung', () => {
    for (const zeta of [0, 0.02, 0.1, 0.5]) for (const [x, v] of [[0.1, 0.2], [-0.15, 0.05], [0.1, -0.2]] as const) {
      const top = nextTurningPoint((_, angle, speed) => -2 * zeta * speed - angle, { time: 0, angle: x, speed: v + 1 }, 1);
      expect(Math.abs(jumpFromPeak({ peak: top.angle, peakDelay: top.time, dampingRatio: zeta }, swing(x, v)) - 1)).toBeLessThan(1e-10);
    }
  });

  test('moves the first maximum by the angle of the state after the shot', () => {
    const top = nextTurningPoint((_, angle) => -angle, { time: 0, angle: 0.1, speed: 1.05 }, 1);
    expect(Math.abs(Math.PI / 2 - top.time - peakShift(1, swing(0.1, 0.05)))).toBeLessThan(1e-9);
  });

  test('is carried to the shot as another integrator carries it', () => {
    for (const zeta of [0, 0.1, 0.6]) {
      const later = stateAt((_, angle, speed) => -2 * zeta * speed - angle, { time: 0, angle: 0.1, speed: -0.3 }, 2.2);
      const found = swingLater(swing(0.1, -0.3), zeta, 2.2);
      expect(Math.abs(found.deflection - later.angle)).toBeLessThan(1e-11);
      expect(Math.abs(found.speed - later.speed)).toBeLessThan(1e-11);
      const back = swingLater(found, zeta, -2.2);
      expect(Math.abs(back.deflection - 0.1)).toBeLessThan(1e-14);
    }
  });

  test('is refused where the amplitude after the shot is below the deflection at it', () => {
    expect(() => jumpFromAmplitude(0.1, swing(0.2, 0))).toThrow(RangeError);
    expect(() => jumpFromPeak({ peak: 1, peakDelay: 1, dampingRatio: 1 }, swing(0, 0))).toThrow(RangeError);
  });
});

describe('a swing whose phase is unknown', () => {
  test('scatters the amplitude by A₀/√2 and raises its mean by A₀²/(4ΔA): 1 % at A₀ = ΔA/5', () => {
    const exact = amplitudeOverPhases(1, 0.2);
    expect(exact.mean - 1).toBeCloseTo(0.01, 4);
    expect(exact.deviation).toBeCloseTo(0.2 / Math.SQRT2, 2);
    const small = amplitudeOverPhases(1, 1e-4);
    expect(Math.abs((small.mean - 1) / (1e-8 / 4) - 1)).toBeLessThan(1e-6);
    expect(Math.abs(small.deviation / (1e-4 / Math.SQRT2) - 1)).toBeLessThan(1e-8);
    // The mean square is ΔA² + A₀², whatever the size.
    const large = amplitudeOverPhases(1, 0.8);
    expect(Math.abs(large.mean ** 2 + large.deviation ** 2 - 1.64)).toBeLessThan(1e-12);
  });

  test('gives the jump without the bias, to 0.15 % up to A₀ = ΔA/2', () => {
    for (const [background, within] of [[0.05, 1e-6], [0.2, 5e-5], [0.5, 1.5e-3]] as const) {
      const found = jumpOfUnknownPhase(amplitudeOverPhases(1, background).mean, background);
      expect(Math.abs(found.jump - 1)).toBeLessThan(within);
      expect(found.bias).toBeCloseTo(background ** 2 / 4, 2);
    }
    expect(jumpOfUnknownPhase(1, 0)).toEqual({ jump: 1, u: 0, bias: 0, worst: 0 });
    expect(() => jumpOfUnknownPhase(0.2, 0.3)).toThrow(RangeError);
    expect(() => amplitudeOverPhases(0.2, 0.3)).toThrow(RangeError);
  });

  test('moves the first maximum by no more than asin(A₀/ΔA), 13 % of a quarter period at A₀ = ΔA/5', () => {
    const shifts = Array.from({ length: 3600 }, (_, i) => peakShift(1, swing(0.2 * Math.sin(i / 572.9578), 0.2 * Math.cos(i / 572.9578))));
    expect(Math.abs(Math.max(...shifts) - largestPeakShift(1, 0.2))).toBeLessThan(1e-6);
    expect(largestPeakShift(1, 0.2) / (Math.PI / 2)).toBeCloseTo(0.13, 2);
    expect(() => largestPeakShift(1, 1)).toThrow(RangeError);
  });
});
