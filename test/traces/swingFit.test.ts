/** Struck records made by closed form and by an integrator of the test's own, taken back to their jumps, frequency and damping. */
import { describe, expect, it } from 'vitest';
import { solveStruck } from '../../src/numeric/dampedJumps.ts';
import { fitSwing, type SwingFit } from '../../src/traces/swingFit.ts';
import fits from '../reference/fits.json';
import { draws } from '../metrology/sources.ts';

const [W, Z] = [2 * Math.PI * 0.9, 0.012];

/** x″ + 2ζω x′ + ω²x = 0 by fourth-order Runge–Kutta at tiny steps, x′ raised by ω × jump at each event; rest line z₀ + z₁ t. */
function record(jumps: readonly number[], events: readonly number[], seconds: number, rate: number, more: { readonly x?: number; readonly v?: number; readonly z0?: number; readonly z1?: number } = {}): { readonly t: number[]; readonly x: number[] } {
  const steps = 8;
  const h = 1 / rate / steps;
  let [x, v] = [more.x ?? 0, (more.v ?? 0) * W];
  const f = (a: number, b: number): readonly [number, number] => [b, -2 * Z * W * b - W * W * a];
  const [t, out]: [number[], number[]] = [[], []];
  let next = 0;
  for (let i = 0; i <= seconds * rate; i++) {
    const now = i / rate;
    t.push(now);
    out.push(x + (more.z0 ?? 0) + (more.z1 ?? 0) * now);
    for (let k = 0; k < steps; k++) {
      // Events stand on the fine grid.
      if (next < events.length && Math.abs(now + k * h - events[next]!) < h / 2) v += W * jumps[next++]!;
      const [a1, b1] = f(x, v);
      const [a2, b2] = f(x + (h / 2) * a1, v + (h / 2) * b1);
      const [a3, b3] = f(x + (h / 2) * a2, v + (h / 2) * b2);
      const [a4, b4] = f(x + h * a3, v + h * b3);
      x += (h / 6) * (a1 + 2 * a2 + 2 * a3 + a4);
      v += (h / 6) * (b1 + 2 * b2 + 2 * b3 + b4);
    }
  }
  return { t, x: out };
}

function fitted(samples: { readonly t: readonly number[]; readonly x: readonly number[] }, events: readonly number[]): SwingFit {
  const fit = fitSwing(samples, events);
  if (fit.status !== 'fitted') throw new Error(fit.status);
  return fit;
}

describe('jumps come back', () => {
  it.each([
    ['from rest, far apart', [1.2, 0.9], [5, 65], 120, {}],
    ['of a pendulum never at rest, on a drifting rest line', [1.2, -0.4, 0.9], [5, 25, 40], 60, { x: 0.3, v: -0.2, z0: 12, z1: 0.01 }],
    ['overlapping, a third of a period apart', [1, 1, 1, 1], [5, 5.37, 5.74, 6.11], 40, { x: 0.1 }],
  ] as const)('%s', (_, jumps, events, seconds, more) => {
    const fit = fitted(record(jumps, events, seconds, 100, more), events);
    jumps.forEach((jump, k) => expect(fit.linear.jumps[k]! / jump).toBeCloseTo(1, 5));
    expect(fit.frequency / W).toBeCloseTo(1, 6);
    expect(fit.ratio).toBeCloseTo(Z, 6);
  });

  it('at given frequency and damping exactly, with as many as fifty events', () => {
    const events = Array.from({ length: 50 }, (_, k) => 5 + 1.5 * k);
    const jumps = events.map((_, k) => 1 + 0.1 * Math.sin(k));
    const solved = solveStruck(record(jumps, events, 90, 100), events, { frequency: W, ratio: Z });
    expect(solved.status).toBe('solved');
    jumps.forEach((jump, k) => expect(solved.status === 'solved' ? solved.jumps[k]! / jump : 0).toBeCloseTo(1, 6));
  });
});

it('a wrong time shows as a step of position; the right one has none', () => {
  const { normal } = draws(3);
  const { t, x } = record([1.2], [10], 40, 100);
  const noisy = { t, x: x.map((value) => value + 0.002 * normal()) };
  expect(Math.abs(fitted(noisy, [10]).stepsInU[0]!)).toBeLessThan(4);
  expect(Math.abs(fitted(noisy, [10.05]).stepsInU[0]!)).toBeGreaterThan(4);
});

describe('what is reported of the noise', () => {
  it.each([['white', 0], ['correlated from sample to sample', 0.8]] as const)('%s: u is the spread of the jump over noise realisations', (_, rho) => {
    const { normal } = draws(11);
    const events = [5, 16];
    const bare = record([1, 0.8], events, 30, 40, { x: 0.05 });
    const runs = 200;
    const found: number[] = [];
    let [u2, held] = [0, 0];
    for (let n = 0; n < runs; n++) {
      let e = 0;
      const x = bare.x.map((value) => {
        e = rho * e + Math.sqrt(1 - rho * rho) * 0.01 * normal();
        return value + e;
      });
      const fit = fitted({ t: bare.t, x }, events);
      const [p, q] = [fit.byFrequency[0]!, fit.byRatio[0]!];
      const variance = fit.noise ** 2 * fit.colour * fit.linear.inverse[4]![4]! + p * p * fit.covariance[0] + 2 * p * q * fit.covariance[1] + q * q * fit.covariance[2];
      found.push(fit.linear.jumps[0]!);
      u2 += variance / runs;
      if (Math.abs(fit.linear.jumps[0]! - 1) <= 1.96 * Math.sqrt(variance)) held += 1;
    }
    const mean = found.reduce((a, b) => a + b, 0) / runs;
    const sd = Math.sqrt(found.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (runs - 1));
    // sd of 200 is known to 5 %; three of those, and what the estimated colour adds.
    expect(Math.abs(Math.sqrt(u2) / sd - 1)).toBeLessThan(0.2);
    expect(held / runs).toBeGreaterThan(0.9);
  }, 60_000);
});

it('frequency and decay of the damped-sinusoid reference sets are those of their fits (test/reference/fits.json)', () => {
  for (const id of ['h02-ds1', 'h02-ds2']) {
    const set = fits.find((one) => one.id === id)! as unknown as { readonly inputs: { readonly dt: number; readonly n: number; readonly y: readonly number[] }; readonly expected: { readonly fit: Readonly<Record<'omega' | 'gamma', number>>; readonly sd: Readonly<Record<'omega' | 'gamma', number>> } };
    const { dt, n, y } = set.inputs;
    const fit = fitted({ t: Array.from({ length: n }, (_, i) => i * dt), x: y }, []);
    const { fit: expected, sd } = set.expected;
    // Their model has a constant and no slope of the rest line, which here is free: within two of their standard deviations.
    expect(Math.abs(fit.frequency * Math.sqrt(1 - fit.ratio ** 2) - expected.omega)).toBeLessThan(2 * sd.omega);
    expect(Math.abs(fit.frequency * fit.ratio - expected.gamma)).toBeLessThan(2 * sd.gamma);
  }
});

it('a record without a swing says so', () => {
  expect(fitSwing({ t: [0, 1, 2, 3], x: [1, 1, 1, 1] }, []).status).toBe('noSwing');
});
