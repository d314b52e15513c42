/** Struck records made by an integrator of the test's own, taken back to their jumps, frequency and damping. */
import { describe, expect, it } from 'vitest';
import { noiseCorrelation, varianceFactor } from '../../src/traces/noiseColour.ts';
import { fitSwing, type SwingFit, type SwingOptions } from '../../src/traces/swingFit.ts';
import { swingOver } from '../../src/traces/swingModel.ts';
import fits from '../reference/fits.json';
import { draws } from '../metrology/sources.ts';
import { struck } from './struck.ts';

const [W, Z] = [2 * Math.PI * 0.9, 0.012];

interface More {
  readonly x?: number;
  readonly v?: number;
  readonly z?: number;
  readonly rest?: (t: number) => number;
}

/** A linear pendulum struck at events on the fine grid, on its rest line. */
function record(jumps: readonly number[], events: readonly number[], seconds: number, rate: number, { x = 0, v = 0, z = Z, rest = () => 0 }: More = {}): { readonly t: Float64Array; readonly x: Float64Array } {
  const { t, theta } = struck({ frequency: W, ratio: z, share: 0, events, jumps, seconds, rate, start: [x, v] });
  return { t: Float64Array.from(t), x: Float64Array.from(theta, (value, i) => value + rest(t[i]!)) };
}

type Samples = Parameters<typeof fitSwing>[0];

function fitted(samples: Samples, events: readonly number[], options: SwingOptions = {}): SwingFit {
  const fit = fitSwing(samples, events, options);
  if (fit.status !== 'fitted') throw new Error(fit.status);
  return fit;
}

const withNoise = ({ t, x }: Samples, noise: () => number): Samples => ({ t, x: x.map((value) => value + noise()) });

describe('jumps come back', () => {
  it.each([
    ['from rest, far apart', [1.2, 0.9], [5, 65], 120, {}],
    ['of a pendulum never at rest, on a sloping rest line', [1.2, -0.4, 0.9], [5, 25, 40], 60, { x: 0.3, v: -0.2, rest: (t: number) => 12 + 0.01 * t }],
    ['overlapping, a third of a period apart', [1, 1, 1, 1], [5, 5.37, 5.74, 6.11], 40, { x: 0.1 }],
    ['strongly damped', [1.2, 0.9], [5, 9], 20, { x: 0.1, z: 0.4 }],
  ] as const)('%s', (_, jumps, events, seconds, more: More) => {
    const samples = record(jumps, events, seconds, 100, more);
    const fit = fitted(samples, events);
    jumps.forEach((jump, k) => expect(fit.jumps[k]! / jump).toBeCloseTo(1, 5));
    expect(fit.frequency / W).toBeCloseTo(1, 6);
    expect(fit.ratio).toBeCloseTo(more.z ?? Z, 6);
    const model = swingOver(fit.model, samples.t);
    samples.x.forEach((value, i) => expect(Math.abs(value - model[i]!)).toBeLessThan(1e-5));
  });

  it('two hundred of them, half a period apart, none left out of what the others do', () => {
    const events = Array.from({ length: 200 }, (_, k) => 5 + 0.56 * k);
    const jumps = events.map((_, k) => 1 + 0.1 * Math.sin(k));
    const fit = fitted(record(jumps, events, 125, 100), events);
    jumps.forEach((jump, k) => expect(fit.jumps[k]! / jump).toBeCloseTo(1, 5));
  });

  it('from a rest line that sways slowly', () => {
    const events = [20, 60, 100, 140, 180];
    const fit = fitted(record([1, 1, 1, 1, 1], events, 220, 20, { rest: (t) => 0.5 * Math.sin(t / 25) }), events);
    fit.jumps.forEach((jump) => expect(Math.abs(jump - 1)).toBeLessThan(2e-3));
  });

  it('with samples left out, gaps among them', () => {
    const events = [5, 13.7];
    const { t, x } = record([1, 0.7], events, 30, 100, { x: 0.2 });
    const use = Uint8Array.from(t, (time) => (events.some((event) => time >= event - 0.005 && time < event + 0.05) || (time > 8 && time < 9.3) ? 0 : 1));
    const spoilt = x.map((value, i) => (use[i] === 0 ? 77 : value));
    const fit = fitted({ t, x: spoilt, use }, events);
    expect(fit.jumps.map((jump) => Number(jump.toFixed(5)))).toEqual([1, 0.7]);
    const kept = Array.from(t.keys()).filter((i) => use[i] !== 0);
    const gaps = fitted({ t: Float64Array.from(kept, (i) => t[i]!), x: Float64Array.from(kept, (i) => x[i]!) }, events);
    expect(gaps.jumps[0]! / fit.jumps[0]!).toBeCloseTo(1, 7);
    expect(gaps.noiseCovariance(1, 0) / fit.noiseCovariance(1, 0)).toBeCloseTo(1, 6);
  });

  it('of a camera with four frames a period, unevenly taken', () => {
    const events = [6.0125, 21.4];
    const { t, x } = record([1, 0.8], events, 60, 400);
    const { uniform } = draws(8);
    const at = Array.from({ length: 200 }, (_, k) => Math.round((k * 0.29 + 0.04 * uniform()) * 400)).filter((i) => i < t.length);
    const fit = fitted({ t: Float64Array.from(at, (i) => t[i]!), x: Float64Array.from(at, (i) => x[i]!) }, events);
    expect(fit.frequency / W).toBeCloseTo(1, 5);
    fit.jumps.forEach((jump, k) => expect(jump / [1, 0.8][k]!).toBeCloseTo(1, 4));
  });

  it('seen over an exposure of a fifth of a period, and without it 6 % too small', () => {
    const exposure = 0.222;
    const events = [8.00125, 25];
    const fine = record([1, 0.8], events, 45, 800);
    const half = Math.round((exposure * 800) / 2);
    const at = Array.from({ length: 1500 }, (_, k) => half + 23 * k).filter((i) => i + half < fine.t.length);
    const mean = (i: number): number => {
      let sum = (fine.x[i - half]! + fine.x[i + half]!) / 2;
      for (let j = i - half + 1; j < i + half; j++) sum += fine.x[j]!;
      return sum / (2 * half);
    };
    const samples = { t: Float64Array.from(at, (i) => fine.t[i]!), x: Float64Array.from(at, mean) };
    fitted(samples, events, { exposure: (2 * half) / 800 }).jumps.forEach((jump, k) => expect(jump / [1, 0.8][k]!).toBeCloseTo(1, 4));
    expect(fitted(samples, events).jumps[0]).toBeLessThan(0.95);
  });
});

describe('times', () => {
  const events = [10, 30];
  const { normal } = draws(3);
  const samples = withNoise(record([1.2, 0.8], events, 50, 100), () => 0.002 * normal());

  it('that are wrong show as a step of position; right ones do not', () => {
    expect(Math.max(...fitted(samples, events).stepsInU.map(Math.abs))).toBeLessThan(4);
    expect(Math.abs(fitted(samples, [10.05, 30]).stepsInU[0]!)).toBeGreaterThan(4);
  });

  it('are found within their bounds, with their u', () => {
    const fit = fitted(samples, [10.05, 29.97], { refineWithin: 0.1 });
    fit.times.forEach((time, k) => expect(Math.abs(time - events[k]!)).toBeLessThan(4 * fit.timeU[k]!));
    expect(fit.timeU[0]!).toBeLessThan(0.001);
    fit.jumps.forEach((jump, k) => expect(Math.abs(jump - [1.2, 0.8][k]!)).toBeLessThan(0.003));
    const bound = fitted(samples, [10.05, 29.97], { refineWithin: 0.01 });
    expect(bound.times[0]).toBeCloseTo(10.04, 9);
  });
});

describe('what is reported of the noise', () => {
  it('the weights of a jump make it, and their squares its variance', () => {
    const events = [5, 9, 16];
    const samples = record([1, 0.8, 0.5], events, 24, 40, { x: 0.05, rest: () => 3 });
    const fit = fitted(samples, events, { stretches: 1 });
    const { from, weights } = fit.weightsOf(1);
    const total = fit.noiseCovariance(1, 1) + fit.byFrequency[1]! ** 2 * fit.covariance[0] + 2 * fit.byFrequency[1]! * fit.byRatio[1]! * fit.covariance[1] + fit.byRatio[1]! ** 2 * fit.covariance[2];
    // What is further off than its window adds little.
    expect(weights.reduce((sum, w) => sum + w * w, 0) / total).toBeGreaterThan(0.9);
    expect(weights.reduce((sum, w) => sum + w * w, 0) / total).toBeLessThan(1 + 1e-9);
    // A jump answers to a change of one sample by that sample's weight.
    const i = 5 * 40 + 60;
    const moved = fitted({ t: samples.t, x: samples.x.map((value, j) => (j === i ? value + 1e-2 : value)) }, events, { stretches: 1 });
    expect((moved.jumps[1]! - fit.jumps[1]!) / 1e-2 / weights[i - from]!).toBeCloseTo(1, 2);
  });

  it.each([['white', 0], ['correlated from sample to sample', 0.9]] as const)('%s: u is the spread of the jump over noise realisations, and 95 % intervals hold it so often', (_, rho) => {
    const { normal } = draws(11);
    const events = [5, 16];
    const bare = record([1, 0.8], events, 30, 40, { x: 0.05 });
    const runs = 300;
    const found: number[] = [];
    let [u2, held] = [0, 0];
    for (let n = 0; n < runs; n++) {
      let e = 0;
      const samples = withNoise(bare, () => {
        e = rho * e + Math.sqrt(1 - rho * rho) * 0.01 * normal();
        return e;
      });
      const fit = fitted(samples, events, { start: { frequency: W, ratio: Z } });
      const factor = varianceFactor(noiseCorrelation(fit.residuals, undefined, 200), fit.weightsOf(0).weights);
      const [p, q] = [fit.byFrequency[0]!, fit.byRatio[0]!];
      const variance = fit.noise ** 2 * factor * (fit.noiseCovariance(0, 0) + p * p * fit.covariance[0] + 2 * p * q * fit.covariance[1] + q * q * fit.covariance[2]);
      found.push(fit.jumps[0]!);
      u2 += variance / runs;
      if (Math.abs(fit.jumps[0]! - 1) <= 1.96 * Math.sqrt(variance)) held += 1;
    }
    const mean = found.reduce((a, b) => a + b, 0) / runs;
    const sd = Math.sqrt(found.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (runs - 1));
    // sd of 300 is known to 4 %; three of those, and what the estimated correlation adds.
    expect(Math.abs(Math.sqrt(u2) / sd - 1)).toBeLessThan(0.15);
    expect(held / runs).toBeGreaterThan(0.92);
    expect(held / runs).toBeLessThan(0.985);
  }, 60_000);
});

it('frequency, decay and amplitudes of the damped-sinusoid reference sets are those of their fits (test/reference/fits.json)', () => {
  for (const id of ['h02-ds1', 'h02-ds2']) {
    const set = fits.find((one) => one.id === id)! as unknown as { readonly inputs: { readonly dt: number; readonly n: number; readonly y: readonly number[] }; readonly expected: { readonly fit: Readonly<Record<'omega' | 'gamma' | 'c' | 'A', number>>; readonly sd: Readonly<Record<'omega' | 'gamma' | 'c' | 'A', number>> } };
    const { dt, n, y } = set.inputs;
    // Their model has a level rest line.
    const fit = fitted({ t: Float64Array.from({ length: n }, (_, i) => i * dt), x: Float64Array.from(y) }, [], { stretches: 0 });
    const { fit: expected, sd } = set.expected;
    const root = Math.sqrt(1 - fit.ratio ** 2);
    const { position, velocity } = fit.model.stretches[0]!;
    expect(Math.abs(fit.frequency * root - expected.omega)).toBeLessThan(1e-3 * sd.omega);
    expect(Math.abs(fit.frequency * fit.ratio - expected.gamma)).toBeLessThan(1e-3 * sd.gamma);
    expect(Math.abs(Math.hypot(position, (velocity + fit.ratio * position) / root) - Math.abs(expected.A))).toBeLessThan(1e-3 * sd.A);
    expect(Math.abs(fit.model.rest.values[0]! - expected.c)).toBeLessThan(1e-3 * sd.c);
    const uGamma = fit.noise * Math.sqrt(fit.ratio ** 2 * fit.covariance[0] + 2 * fit.ratio * fit.frequency * fit.covariance[1] + fit.frequency ** 2 * fit.covariance[2]);
    expect(uGamma / sd.gamma).toBeCloseTo(1, 2);
  }
});

describe('what cannot be fitted says so', () => {
  it.each([
    ['too few samples', [0, 1, 2, 3], [1, 1, 1, 1], 'tooFewSamples'],
    ['nothing that swings', Array.from({ length: 40 }, (_, i) => i), Array.from({ length: 40 }, (_, i) => i), 'noSwing'],
  ] as const)('%s', (_, t, x, status) => {
    expect(fitSwing({ t: Float64Array.from(t), x: Float64Array.from(x) }, []).status).toBe(status);
  });

  it('two events at one time are named', () => {
    const { t, x } = record([1, 1], [5, 5.5], 20, 40);
    expect(fitSwing({ t, x }, [5, 5, 12])).toEqual({ status: 'notTold', segment: 1 });
  });

  it('two events that few samples part are known together, not each', () => {
    const { t, x } = record([1, 1], [5, 5.5], 20, 40);
    const fit = fitted({ t, x }, [5.001, 5.002, 5.5]);
    const [a, b] = [fit.noiseCovariance(0, 0), fit.noiseCovariance(1, 1)];
    expect(a + b + 2 * fit.noiseCovariance(0, 1)).toBeLessThan(0.01 * a);
  });
});

it('noise without a swing is no swing; with frequency and damping as given its jumps are nothing but noise', () => {
  const { normal } = draws(21);
  const samples = { t: Float64Array.from({ length: 3000 }, (_, i) => i / 50), x: Float64Array.from({ length: 3000 }, () => 7 + 0.01 * normal()) };
  expect(fitSwing(samples, []).status).toBe('noSwing');
  const fit = fitted(samples, [10, 20, 30], { fixed: { frequency: W, ratio: Z } });
  fit.jumps.forEach((jump, k) => expect(Math.abs(jump)).toBeLessThan(4 * fit.noise * Math.sqrt(fit.noiseCovariance(k, k))));
  expect(fit.covariance).toEqual([0, 0, 0]);
  const { from, weights } = fit.weightsOf(1);
  expect(weights.reduce((sum, w, i) => sum + w * (samples.x[from + i]! - 7), 0) - fit.jumps[1]!).toBeCloseTo(0, 3);
});

it('after a stretch in which it was pushed a swing begins anew, and the jumps about it come back', () => {
  const samples = record([1, 0.8, 0.9], [5, 12, 40], 60, 40, { x: 0.05 });
  // Somebody holds it between 20 s and 30 s and lets it go off its rest.
  const held = { ...samples, x: samples.x.map((value, i) => (samples.t[i]! >= 30 && samples.t[i]! < 40 ? 0.3 * Math.exp(-Z * W * (samples.t[i]! - 30)) * Math.cos(W * Math.sqrt(1 - Z * Z) * (samples.t[i]! - 30)) : samples.t[i]! >= 40 ? NaN : value)) };
  const use = Uint8Array.from(samples.t, (time) => (time >= 20 && time < 30 ? 0 : time >= 40 ? 0 : 1));
  const fit = fitted({ t: held.t, x: held.x.map((value) => (Number.isNaN(value) ? 0 : value)), use }, [5, 12], { anew: [30] });
  expect(fit.jumps).toHaveLength(2);
  expect(fit.jumps[0]! / 1).toBeCloseTo(1, 4);
  expect(fit.jumps[1]! / 0.8).toBeCloseTo(1, 4);
  expect(fit.frequency / W).toBeCloseTo(1, 5);
});
