/** Finite pulses against the printed tables, the handbook's zeros and an integrator that the project does not use. */
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { dampingFactor } from '../../src/pendulum/damping.ts';
import { measuredPulseCorrection, momentsOf, PULSE_SHAPES, pulseCorrection, pulseFactor, ringingShare } from '../../src/pendulum/pulse.ts';
import type { PulseCorrection, PulseShape } from '../../src/pendulum/pulse.ts';
import { nextTurningPoint, stateAt } from './odexDriven.ts';

const off = (a: number, b: number): number => Math.abs(a / b - 1);
type Corrected = Extract<PulseCorrection, { status: 'corrected' }>;
function corrected(found: PulseCorrection): Corrected {
  if (found.status !== 'corrected') throw new Error(found.status);
  return found;
}

/** F τ/I at the share x of the duration, written as in a handbook. */
const FORCE: Readonly<Record<PulseShape, (x: number) => number>> = {
  rectangular: () => 1,
  halfSine: (x) => (Math.PI / 2) * Math.sin(Math.PI * x),
  triangle: (x) => (x < 0.5 ? 4 * x : 4 * (1 - x)),
  versedSine: (x) => 1 - Math.cos(2 * Math.PI * x),
  exponential: (x) => Math.exp(-x),
};

/** First maximum after a pulse of unit impulse, θ and ω_n t, small swing. */
function struckBy(shape: PulseShape, angle: number, zeta: number): { readonly peak: number; readonly time: number } {
  const motion = (driven: boolean) => (time: number, theta: number, speed: number): number =>
    -2 * zeta * speed - theta + (driven ? FORCE[shape](time / angle) / angle : 0);
  const start = { time: 0, angle: 0, speed: 0 };
  if (shape === 'exponential') {
    const onTheWay = stateAt(motion(true), start, 0.1);
    const top = nextTurningPoint(motion(true), onTheWay, 1);
    return { peak: top.angle, time: top.time };
  }
  const half = stateAt(motion(true), start, angle / 2);
  const end = stateAt(motion(true), half, angle);
  const top = nextTurningPoint(motion(false), end, 1);
  return { peak: top.angle, time: top.time };
}

describe('the factor of a finite pulse, undamped', () => {
  const TABLE = [[0.01, 1.000165, 1.000093], [0.05, 1.004124, 1.00234], [0.1, 1.016641, 1.009404], [0.2, 1.068959, 1.038297], [0.3, 1.164967, 1.088833], [0.5, 1.570796, 1.27324]] as const;

  test('is that of the printed table for rectangular and half-sine pulses', () => {
    for (const [share, rectangular, halfSine] of TABLE) {
      const angle = 2 * Math.PI * share;
      expect(Math.abs(pulseFactor('rectangular', angle) - rectangular)).toBeLessThan(6e-7);
      expect(Math.abs(pulseFactor('halfSine', angle) - halfSine)).toBeLessThan(6e-7);
    }
    expect(off(pulseFactor('halfSine', Math.PI), 4 / Math.PI)).toBeLessThan(1e-15);
  });

  test('begins as 1 + ω²σ²/2 with the time variance of each shape', () => {
    const variance: Readonly<Record<PulseShape, number>> = { rectangular: 1 / 12, halfSine: 1 / 4 - 2 / Math.PI ** 2, triangle: 1 / 24, versedSine: 1 / 12 - 1 / (2 * Math.PI ** 2), exponential: 1 };
    for (const shape of PULSE_SHAPES) {
      const angle = 0.01;
      expect(off(pulseFactor(shape, angle) - 1, (variance[shape] * angle * angle) / 2)).toBeLessThan(1e-4);
    }
    expect(variance.halfSine / 2).toBeCloseTo(0.02368, 5);
  });

  // Harris & Piersol, Shock and Vibration Handbook, ch. 8 p. 8.34: the residual response first vanishes there.
  test('leaves no ringing first at τ/T = 1.0 rectangular, 1.5 half-sine, 2.0 versed sine, 2.0 triangle', () => {
    for (const [shape, first] of [['rectangular', 1], ['halfSine', 1.5], ['versedSine', 2], ['triangle', 2]] as const) {
      expect(ringingShare(shape, 2 * Math.PI * first)).toBeLessThan(1e-15);
      for (let share = 0; share < first - 0.02; share += 0.02) expect(ringingShare(shape, 2 * Math.PI * share)).toBeGreaterThan(1e-4);
    }
  });

  test('passes smoothly through the places where its formula is nought over nought', () => {
    for (const [shape, at] of [['halfSine', Math.PI], ['versedSine', 2 * Math.PI]] as const) {
      const [before, here, after] = [at - 1e-5, at, at + 1e-5].map((angle) => ringingShare(shape, angle)) as [number, number, number];
      expect(Math.abs((before + after) / 2 - here)).toBeLessThan(1e-10);
    }
    expect(ringingShare('versedSine', 2 * Math.PI)).toBeCloseTo(0.5, 14);
  });

  test('is next to nothing for a discharge of 10 µs, and 0.4 % for a valve of 50 ms, on a period of 1 s', () => {
    expect(pulseFactor('rectangular', 2 * Math.PI * 1e-5) - 1).toBeCloseTo(1.6e-10, 11);
    expect(pulseFactor('rectangular', 2 * Math.PI * 0.05) - 1).toBeCloseTo(0.004, 3);
  });

  test('is refused beyond half a period', () => {
    expect(() => pulseFactor('rectangular', 3.2)).toThrow(RangeError);
    expect(() => ringingShare('rectangular', -1)).toThrow(RangeError);
  });
});

describe('the correction of a finite pulse with damping', () => {
  test('gives the impulse of a pulse back that another integrator swung, with its peak time', () => {
    for (const shape of PULSE_SHAPES) for (const zeta of [0, 0.02, 0.2, 0.7]) for (const share of [0.02, 0.1, 0.25]) {
      const angle = 2 * Math.PI * share;
      const { peak, time } = struckBy(shape, angle, zeta);
      const found = corrected(pulseCorrection({ shape, duration: angle / 4, naturalFrequency: 4, dampingRatio: zeta }));
      expect(Math.abs(found.factor * dampingFactor(zeta) * peak - 1)).toBeLessThan(3e-10);
      expect(off(found.peakTime * 4, time)).toBeLessThan(1e-8);
    }
  });

  test('holds above and at critical damping', () => {
    for (const shape of PULSE_SHAPES) for (const zeta of [1, 1.5, 3]) {
      const { peak, time } = struckBy(shape, 0.4, zeta);
      const found = corrected(pulseCorrection({ shape, duration: 0.4, naturalFrequency: 1, dampingRatio: zeta }));
      expect(Math.abs(found.factor * dampingFactor(zeta) * peak - 1)).toBeLessThan(1e-8);
      expect(off(found.peakTime, time)).toBeLessThan(1e-6);
    }
  });

  // Printed with the rule "multiply D and C, time from the centroid, ω = ω_n in C": errors of the rectangular pulse.
  test('differs from the rule of C at ω_n times D by no more than the rule’s printed errors', () => {
    for (const [zeta, share, error] of [[0.05, 0.2, 1e-5], [0.2, 0.2, 1.5e-4], [0.3, 0.3, 2e-3]] as const) {
      const angle = 2 * Math.PI * share;
      const found = corrected(pulseCorrection({ shape: 'rectangular', duration: angle, naturalFrequency: 1, dampingRatio: zeta }));
      expect(off(pulseFactor('rectangular', angle), found.factor)).toBeLessThan(error);
    }
  });

  test('of an exponential pulse departs from that of its ringing as printed: 2e-7 at T/50, 8e-4 at T/20, 1.8 % at T/10', () => {
    const departure = (share: number): number => {
      const duration = 2 * Math.PI * share;
      return Math.abs(corrected(pulseCorrection({ shape: 'exponential', duration, naturalFrequency: 1, dampingRatio: 0 })).factor / pulseFactor('exponential', duration) - 1);
    };
    expect(departure(1 / 50)).toBeLessThan(2.5e-7);
    expect(departure(1 / 50)).toBeGreaterThan(1.5e-7);
    expect(departure(1 / 20)).toBeCloseTo(8e-4, 4);
    expect(departure(1 / 10)).toBeCloseTo(0.018, 3);
  });

  test('is refused where the first maximum falls inside the pulse', () => {
    const at = (shape: PulseShape, share: number, dampingRatio: number): string => pulseCorrection({ shape, duration: share, naturalFrequency: 2 * Math.PI, dampingRatio }).status;
    for (const shape of PULSE_SHAPES) {
      expect(at(shape, 0.5, 0)).toBe('corrected');
      expect(at(shape, 0.51, 0)).toBe('peakInsidePulse');
    }
    // A rectangular pulse drives to the maximum of a step, half a damped period.
    const halfDamped = 0.5 / Math.sqrt(1 - 0.3 ** 2);
    expect(at('rectangular', halfDamped * 0.999, 0.3)).toBe('corrected');
    expect(at('rectangular', halfDamped * 1.001, 0.3)).toBe('peakInsidePulse');
  });

  test('is 1 for a blow, and grows with the duration', () => {
    for (const shape of PULSE_SHAPES) expect(pulseCorrection({ shape, duration: 0, naturalFrequency: 5, dampingRatio: 0.1 })).toMatchObject({ status: 'corrected', factor: 1 });
    fc.assert(
      fc.property(fc.constantFrom(...PULSE_SHAPES), fc.double({ min: 1e-4, max: 1.2, noNaN: true }), fc.double({ min: 0, max: 0.2, noNaN: true }), (shape, duration, dampingRatio) => {
        const at = (tau: number): number => corrected(pulseCorrection({ shape, duration: tau, naturalFrequency: 1, dampingRatio })).factor;
        return at(duration) > at(duration / 2) && at(duration / 2) > 1;
      }),
    );
    expect(() => pulseCorrection({ shape: 'rectangular', duration: -1, naturalFrequency: 1, dampingRatio: 0 })).toThrow(RangeError);
  });
});

describe('the correction of a measured force', () => {
  const sampled = (shape: PulseShape, duration: number, count: number) => ({
    time: Array.from({ length: count }, (_, i) => 3 + (duration * i) / (count - 1)),
    force: Array.from({ length: count }, (_, i) => 0.2 * FORCE[shape](i / (count - 1))),
  });

  test('is that of the shape which the samples draw', () => {
    for (const zeta of [0, 0.1, 1, 2]) {
      // Two samples draw a rectangle, three a triangle, exactly.
      const rectangle = corrected(measuredPulseCorrection(sampled('rectangular', 0.1, 2), 4, zeta));
      expect(off(rectangle.factor, corrected(pulseCorrection({ shape: 'rectangular', duration: 0.1, naturalFrequency: 4, dampingRatio: zeta })).factor)).toBeLessThan(1e-9);
      const triangle = corrected(measuredPulseCorrection(sampled('triangle', 0.1, 3), 4, zeta));
      const drawn = corrected(pulseCorrection({ shape: 'triangle', duration: 0.1, naturalFrequency: 4, dampingRatio: zeta }));
      expect(off(triangle.factor, drawn.factor)).toBeLessThan(1e-9);
      expect(off(triangle.peakTime, drawn.peakTime)).toBeLessThan(1e-6);
      const sine = corrected(measuredPulseCorrection(sampled('halfSine', 0.3, 401), 4, zeta));
      expect(off(sine.factor, corrected(pulseCorrection({ shape: 'halfSine', duration: 0.3, naturalFrequency: 4, dampingRatio: zeta })).factor)).toBeLessThan(1e-5);
    }
  });

  test('follows a long exponential tail through the first maximum, and refuses too much of it', () => {
    const tail = (share: number) => {
      const time = Array.from({ length: 4001 }, (_, i) => i * share * 0.005);
      return { time, force: time.map((t) => Math.exp(-t / share)) };
    };
    const found = corrected(measuredPulseCorrection(tail(1 / 27), 2 * Math.PI, 0));
    expect(found.leftAfterPeak).toBeLessThan(1e-3);
    expect(off(found.factor, corrected(pulseCorrection({ shape: 'exponential', duration: 1 / 27, naturalFrequency: 2 * Math.PI, dampingRatio: 0 })).factor)).toBeLessThan(1e-5);
    expect(measuredPulseCorrection(tail(1 / 10), 2 * Math.PI, 0).status).toBe('peakInsidePulse');
  });

  test('stays that of the shape where the pendulum is damped a hundredfold, and refuses a pulse that outlasts its first maximum', () => {
    for (const zeta of [30, 100]) {
      const found = corrected(measuredPulseCorrection(sampled('rectangular', 0.002, 2), 4, zeta));
      const drawn = corrected(pulseCorrection({ shape: 'rectangular', duration: 0.002, naturalFrequency: 4, dampingRatio: zeta }));
      expect(off(found.factor, drawn.factor)).toBeLessThan(1e-9);
    }
    expect(measuredPulseCorrection(sampled('rectangular', 0.1, 2), 4, 1e4).status).toBe('peakInsidePulse');
    expect(pulseCorrection({ shape: 'rectangular', duration: 0.1, naturalFrequency: 4, dampingRatio: 1e4 }).status).toBe('peakInsidePulse');
  });

  test('refuses a force whose integral is not positive, and a pulse longer than half a period', () => {
    expect(measuredPulseCorrection({ time: [0, 1], force: [1, -1] }, 1, 0).status).toBe('noImpulse');
    expect(measuredPulseCorrection(sampled('rectangular', 0.6, 50), 2 * Math.PI, 0).status).toBe('peakInsidePulse');
    expect(() => measuredPulseCorrection({ time: [0, 0], force: [1, 1] }, 1, 0)).toThrow(RangeError);
  });

  test('comes with the impulse, centroid and time variance of the samples', () => {
    const { impulse, centroid, variance } = momentsOf(sampled('triangle', 0.1, 3));
    expect(impulse).toBeCloseTo(0.2 * 0.1, 14);
    expect(centroid).toBeCloseTo(0.05, 14);
    expect(variance).toBeCloseTo(0.01 / 24, 14);
  });
});
