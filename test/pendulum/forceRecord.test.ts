/** Impulse from a record of force: pulses of known area with noise, offset, drift, ringing of the sensor and an amplifier that lets go. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { pulsesOfRecord, type ForcePulse, type ForceRecordFound } from '../../src/pendulum/forceRecord.ts';
import type { MeasuredForce } from '../../src/pendulum/pulse.ts';
import { deviationOf, draws, meanOf } from '../metrology/sources.ts';

type Shape = 'halfSine' | 'haversine';
interface Blow {
  readonly shape: Shape;
  readonly at: number;
  readonly length: number;
  readonly peak: number;
}
const forceOf = ({ shape, at, length, peak }: Blow, t: number): number => {
  const x = (t - at) / length;
  return x <= 0 || x >= 1 ? 0 : peak * (shape === 'halfSine' ? Math.sin(Math.PI * x) : Math.sin(Math.PI * x) ** 2);
};
const areaOf = ({ shape, length, peak }: Blow): number => peak * length * (shape === 'halfSine' ? 2 / Math.PI : 0.5);

interface Chain {
  /** Samples a second, and s of record. */
  readonly rate: number;
  readonly duration: number;
  readonly offset?: number;
  readonly drift?: number;
  readonly noise?: () => number;
  /** Sensor of second order. */
  readonly sensor?: { readonly frequency: number; readonly ratio: number };
  /** Time constant of a coupled amplifier, s. */
  readonly coupling?: number;
  readonly step?: number;
  readonly fullScale?: number;
  readonly sign?: 1 | -1;
}
/** Fine steps a sample of the filters. */
const FINE = 40;

function recordOf(blows: readonly Blow[], { rate, duration, offset = 0, drift = 0, noise = () => 0, sensor, coupling, step, fullScale = Infinity, sign = 1 }: Chain): MeasuredForce {
  const time: number[] = [];
  const force: number[] = [];
  const h = 1 / (rate * FINE);
  let [y, v, held] = [0, 0, 0];
  for (let i = 0; i < Math.round(duration * rate); i++) {
    const t = i / rate;
    const true_ = blows.reduce((sum, blow) => sum + forceOf(blow, t), 0);
    const felt = (sensor ? y : true_) - held;
    const shown = sign * felt + offset + drift * t + noise();
    const clipped = Math.max(-fullScale, Math.min(fullScale, shown));
    time.push(t);
    force.push(step ? step * Math.round(clipped / step) : clipped);
    for (let k = 0; (sensor || coupling) && k < FINE; k++) {
      const at = t + (k + 0.5) * h;
      const F = blows.reduce((sum, blow) => sum + forceOf(blow, at), 0);
      if (sensor) {
        // Leapfrog: area is kept.
        const w = 2 * Math.PI * sensor.frequency;
        v += h * (w * w * (F - y) - 2 * sensor.ratio * w * v);
        y += h * v;
      }
      if (coupling) held += (h * ((sensor ? y : F) - held)) / coupling;
    }
  }
  return { time, force };
}

function found(record: MeasuredForce, fullScale: number | null = null): Extract<ForceRecordFound, { status: 'found' }> {
  const result = pulsesOfRecord(record, fullScale);
  if (result.status !== 'found') throw new Error(result.status);
  return result;
}
function only(record: MeasuredForce, fullScale: number | null = null): ForcePulse {
  const { pulses } = found(record, fullScale);
  expect(pulses.length).toBe(1);
  return pulses[0]!;
}

const TAP: Blow = { shape: 'haversine', at: 0.0103, length: 2e-3, peak: 40 };
const CHAIN: Chain = { rate: 50_000, duration: 0.05 };
const between = (min: number, max: number): fc.Arbitrary<number> => fc.double({ min, max, noNaN: true });

describe('one clean pulse', () => {
  it('a versed sine of 40 N and 2 ms is 40 mN·s, to 1e-9', () => {
    const pulse = only(recordOf([TAP], CHAIN));
    expect(Math.abs(pulse.impulse / 0.04 - 1)).toBeLessThan(1e-9);
    expect(pulse.after).toBe('nothing');
    expect(pulse.clipped).toBe(0);
    expect(pulse.peak).toBeCloseTo(40, 1);
    expect(pulse.peakTime).toBeCloseTo(0.0113, 4);
    expect(pulse.contactEnds).toBeCloseTo(0.0123, 3);
    expect(pulse.centroid).toBeCloseTo(0.0113, 7);
    // Variance of a versed sine about its middle: τ²(1/12 − 1/(2π²)).
    expect(pulse.variance / (4e-6 * (1 / 12 - 1 / (2 * Math.PI ** 2)))).toBeCloseTo(1, 2);
  });

  it('whatever its size, place, length, sampling, offset, drift and polarity', () => {
    const cases = fc.record({
      shape: fc.constantFrom<Shape>('halfSine', 'haversine'), at: between(0.01, 0.03), length: between(5e-4, 4e-3), size: between(-3, 3),
      perPulse: between(12, 150), offset: between(-1, 1), drift: between(-1, 1), sign: fc.constantFrom<1 | -1>(1, -1),
    });
    fc.assert(fc.property(cases, ({ shape, at, length, size, perPulse, offset, drift, sign }) => {
      const peak = 10 ** size;
      const blow: Blow = { shape, at, length, peak };
      const record = recordOf([blow], { rate: perPulse / length, duration: 0.05, offset: 10 * offset * peak, drift: drift * peak, sign });
      const { pulses: [pulse], polarity } = found(record);
      expect(polarity).toBe(sign);
      // Euler–Maclaurin: of n samples the bends at both ends cost up to π²/6n² of a half-sine, 0.64/n³ of a versed sine.
      const allowed = shape === 'halfSine' ? Math.PI ** 2 / 6 / perPulse ** 2 : 0.64 / perPulse ** 3;
      expect(Math.abs(pulse!.impulse / areaOf(blow) - 1)).toBeLessThan(allowed + 1e-6);
      expect(pulse!.after).toBe('nothing');
    }));
  });

  it('of few samples says what the sampling leaves: z of the right size over all places of the samples', () => {
    const z = Array.from({ length: 200 }, (_, i) => {
      const blow: Blow = { shape: 'halfSine', at: 0.01 + i * 7.3e-7, length: 2.03e-3, peak: 30 };
      const pulse = only(recordOf([blow], { rate: 5000, duration: 0.05 }));
      expect(pulse.samples).toBeLessThan(9);
      return { miss: pulse.impulse / areaOf(blow) - 1, told: pulse.uSampling / areaOf(blow) };
    });
    const rms = (of: readonly number[]): number => Math.sqrt(meanOf(of.map((x) => x * x)));
    const ratio = rms(z.map(({ miss }) => miss)) / rms(z.map(({ told }) => told));
    expect(ratio).toBeGreaterThan(0.5);
    expect(ratio).toBeLessThan(1.5);
  });
});

describe('noise', () => {
  it('white noise of 0.1 N scatters the impulse by the u that is told, about the truth, with offset and drift in the record', () => {
    const { normal } = draws(9);
    const pulses = Array.from({ length: 300 }, () => only(recordOf([TAP], { ...CHAIN, offset: 3, drift: 20, noise: () => 0.1 * normal() })));
    const impulses = pulses.map(({ impulse }) => impulse);
    const told = meanOf(pulses.map(({ uNoise }) => uNoise));
    // The told u takes the larger of two estimates, so it is rather too large than too small.
    expect(deviationOf(impulses) / told).toBeGreaterThan(0.75);
    expect(deviationOf(impulses) / told).toBeLessThan(1.12);
    expect(Math.abs(meanOf(impulses) - 0.04)).toBeLessThan((3 * told) / Math.sqrt(300));
    expect(told / 0.04).toBeLessThan(1e-2);
  });

  it('noise that wanders is told by integrals over quiet stretches, where white noise would tell a third of it', () => {
    const { normal } = draws(10);
    const ratios = Array.from({ length: 60 }, () => {
      let slow = 0;
      // First order, correlated over 20 samples.
      const noise = (): number => (slow = 0.95 * slow + 0.1 * Math.sqrt(1 - 0.95 ** 2) * normal());
      const pulse = only(recordOf([TAP], { ...CHAIN, duration: 0.15, noise }));
      return { miss: pulse.impulse - 0.04, told: pulse.uNoise };
    });
    const ratio = deviationOf(ratios.map(({ miss }) => miss)) / meanOf(ratios.map(({ told }) => told));
    expect(ratio).toBeGreaterThan(0.7);
    expect(ratio).toBeLessThan(1.5);
  });

  it('an offset of the force that the quiet parts do not show would act over the stretch that is integrated', () => {
    const pulse = only(recordOf([TAP], CHAIN));
    expect(pulse.to - pulse.from).toBeGreaterThan(TAP.length);
    expect(pulse.to - pulse.from).toBeLessThan(2 * TAP.length);
  });

  it('readings on coarse steps: noise of a tenth of a step is no reason to lose the pulse', () => {
    const { normal } = draws(11);
    const pulse = only(recordOf([TAP], { ...CHAIN, noise: () => 0.02 * normal(), step: 0.2 }));
    expect(Math.abs(pulse.impulse / 0.04 - 1)).toBeLessThan(0.01);
  });
});

describe('ringing after the contact', () => {
  const SENSOR = { frequency: 2500, ratio: 0.04 } as const;

  it('keeps the impulse in the whole answer, where a cut at the end of the contact takes the overshoot without what follows', () => {
    for (const length of [2e-4, 3e-4, 4e-4]) {
      const blow: Blow = { ...TAP, length };
      const pulse = only(recordOf([blow], { rate: 100_000, duration: 0.05, sensor: SENSOR }));
      expect(pulse.after).toBe('ringing');
      // Ringing below 0.2 % of the largest force counts as quiet.
      expect(Math.abs(pulse.impulse / areaOf(blow) - 1)).toBeLessThan(3e-3);
      expect(Math.abs(pulse.byContact / areaOf(blow) - 1)).toBeGreaterThan(0.01);
      expect(pulse.impulse).toBe(pulse.byWhole);
    }
  });

  it('with noise as well, over a hundred records', () => {
    const { normal } = draws(12);
    const blow: Blow = { ...TAP, length: 4e-4 };
    const z = Array.from({ length: 100 }, () => {
      const { impulse, uNoise } = only(recordOf([blow], { rate: 100_000, duration: 0.05, sensor: SENSOR, offset: -2, noise: () => 0.1 * normal() }));
      return (impulse - areaOf(blow)) / uNoise;
    });
    expect(Math.abs(meanOf(z))).toBeLessThan(0.4);
    expect(deviationOf(z)).toBeLessThan(1.3);
  });

  it('a record that ends in the ringing counts the contact alone and says so', () => {
    const pulse = only(recordOf([{ ...TAP, length: 4e-4 }], { rate: 100_000, duration: 0.0112, sensor: SENSOR }));
    expect(pulse.after).toBe('cutOff');
    expect(pulse.impulse).toBe(pulse.byContact);
  });
});

describe('a coupled amplifier lets go', () => {
  it('with 0.5 s it costs nothing: the level before and after takes it off', () => {
    const pulse = only(recordOf([TAP], { ...CHAIN, coupling: 0.5 }));
    expect(Math.abs(pulse.impulse / 0.04 - 1)).toBeLessThan(1e-3);
  });

  it('with 20 ms the record sinks below its level, which is said, and the contact counts', () => {
    const pulse = only(recordOf([TAP], { ...CHAIN, duration: 0.2, coupling: 0.02 }));
    expect(pulse.after).toBe('undershoot');
    expect(pulse.impulse).toBe(pulse.byContact);
    expect(Math.abs(pulse.impulse / 0.04 - 1)).toBeLessThan(0.06);
  });
});

describe('a record of several taps', () => {
  const blows: readonly Blow[] = [0.02, 0.1, 0.17, 0.26].map((at, i) => ({ shape: 'halfSine', at, length: 1.5e-3 + 3e-4 * i, peak: [30, 4, 55, 12][i]! }));

  it('gives them in order, each its own impulse', () => {
    const { normal } = draws(13);
    const { pulses, noise, spikes } = found(recordOf(blows, { rate: 40_000, duration: 0.3, offset: 1, drift: -2, noise: () => 0.05 * normal() }));
    expect(pulses.length).toBe(4);
    expect(spikes).toEqual([]);
    expect(noise).toBeCloseTo(0.05, 2);
    for (const [i, pulse] of pulses.entries()) {
      expect(Math.abs(pulse.impulse - areaOf(blows[i]!))).toBeLessThan(4 * Math.hypot(pulse.uNoise, pulse.uSampling));
      expect(pulse.peakTime > blows[i]!.at && pulse.peakTime < blows[i]!.at + blows[i]!.length).toBe(true);
    }
  });

  it('a single sample far off is interference and no tap', () => {
    const record = recordOf(blows, { rate: 40_000, duration: 0.3 });
    const force = [...record.force];
    force[2000] = 25;
    const { pulses, spikes } = found({ ...record, force });
    expect(pulses.length).toBe(4);
    expect(spikes).toEqual([0.05]);
  });

  it('a second contact right behind the first is told, and both count', () => {
    const pair: readonly Blow[] = [TAP, { ...TAP, at: TAP.at + 4e-3, peak: 12 }];
    const pulse = only(recordOf(pair, CHAIN));
    expect(pulse.after).toBe('secondContact');
    expect(pulse.impulse).toBeCloseTo(pair.reduce((sum, blow) => sum + areaOf(blow), 0), 8);
    expect(pulse.byContact).toBeCloseTo(areaOf(TAP), 5);
  });
});

describe('what cannot be integrated', () => {
  it('a top that is cut off is flagged, by the full scale or by its flat top', () => {
    const record = recordOf([TAP], { ...CHAIN, fullScale: 30 });
    expect(only(record, 30).clipped).toBeGreaterThan(10);
    expect(only(record).clipped).toBeGreaterThan(10);
    expect(only(recordOf([TAP], CHAIN), 41).clipped).toBe(0);
  });

  it('a smooth top on coarse steps is no clipped one', () => {
    expect(only(recordOf([{ ...TAP, length: 8e-3 }], { ...CHAIN, step: 0.05 })).clipped).toBe(0);
  });

  it('noise alone holds no pulse; an all-level record none; too few samples are no record', () => {
    const { normal } = draws(14);
    expect(pulsesOfRecord(recordOf([], { ...CHAIN, noise: () => normal() })).status).toBe('noPulse');
    expect(pulsesOfRecord(recordOf([], { ...CHAIN, offset: 2 })).status).toBe('noPulse');
    expect(pulsesOfRecord({ time: [0, 1, 2], force: [0, 1, 0] }).status).toBe('tooFewSamples');
  });

  it('a record that is pulse from end to end has no quiet part', () => {
    const time = Array.from({ length: 200 }, (_, i) => i * 1e-5);
    const outcome = pulsesOfRecord({ time, force: time.map((t) => Math.sin((Math.PI * t) / 2e-3)) });
    expect(['noQuietPart', 'noPulse']).toContain(outcome.status);
  });

  it('whatever numbers a record holds, it answers, and with numbers', () => {
    const anything = fc.array(fc.oneof(fc.constant(0), fc.integer({ min: -3, max: 3 }), between(-100, 100), between(-1e-3, 1e-3)), { minLength: 20, maxLength: 120 });
    const numbersOf = (pulse: ForcePulse): readonly number[] => Object.values(pulse).filter((value) => typeof value === 'number');
    fc.assert(fc.property(anything, fc.boolean(), (force, quiet) => {
      const padded = quiet ? [...Array.from({ length: 100 }, () => 0), ...force, ...Array.from({ length: 100 }, () => 0)] : force;
      const outcome = pulsesOfRecord({ time: padded.map((_, i) => i * 1e-4), force: padded });
      for (const pulse of outcome.status === 'found' ? outcome.pulses : []) {
        expect(numbersOf(pulse).every(Number.isFinite)).toBe(true);
        expect(pulse.peak).toBeGreaterThan(0);
        expect(pulse.contactEnds >= pulse.peakTime && pulse.from <= pulse.peakTime && pulse.to >= pulse.contactEnds).toBe(true);
      }
    }), { numRuns: 1000 });
  });

  it('times that go back and numbers that are none are our mistake', () => {
    const record = recordOf([TAP], CHAIN);
    expect(() => pulsesOfRecord({ ...record, time: record.time.map((t, i) => (i === 5 ? 0 : t)) })).toThrow(RangeError);
    expect(() => pulsesOfRecord({ ...record, force: record.force.map((f, i) => (i === 5 ? NaN : f)) })).toThrow(RangeError);
    expect(() => pulsesOfRecord({ ...record, force: record.force.slice(1) })).toThrow(RangeError);
  });
});
