/** Wide swings, integrated apart from the fit, taken back to their jumps. */
import { describe, expect, it } from 'vitest';
import { fitLargeSwing } from '../../src/traces/largeSwing.ts';
import { fitSwing } from '../../src/traces/swingFit.ts';
import { draws } from '../metrology/sources.ts';
import { struck } from './struck.ts';

const W = 5.7;

function record(jumps: readonly number[], events: readonly number[], { share = 1, ratio = 0.012, noise = 0, seconds = 40 } = {}) {
  const { normal } = draws(14);
  const { t, theta } = struck({ frequency: W, ratio, share, events, jumps, seconds, rate: 60, start: [0.05, -0.02] });
  return { t: Float64Array.from(t), x: Float64Array.from(theta, (value, i) => value + 0.01 + 1e-4 * t[i]! + noise * normal()) };
}

function both(samples: ReturnType<typeof record>, events: readonly number[], share: number, withQuadratic = false) {
  const linear = fitSwing(samples, events, { stretches: 1 });
  if (linear.status !== 'fitted') throw new Error(linear.status);
  const full = fitLargeSwing(samples, linear, share, withQuadratic);
  if (full.status !== 'fitted') throw new Error(full.status);
  return { linear, full };
}

describe('jumps of wide swings', () => {
  it.each([[0.3, 1], [0.7, 1], [1.1, 1], [0.7, 0.4]] as const)('of %d rad at gravity share %d come back, where the linear fit is off', (size, share) => {
    const [events, jumps] = [[5, 14, 22], [size, 0.6 * size, -0.8 * size]];
    const { linear, full } = both(record(jumps, events, { share }), events, share);
    jumps.forEach((jump, k) => expect(full.jumps[k]! / jump).toBeCloseTo(1, 5));
    expect(full.frequency / W).toBeCloseTo(1, 6);
    expect(full.ratio).toBeCloseTo(0.012, 6);
    expect(Math.max(...jumps.map((jump, k) => Math.abs(linear.jumps[k]! / jump - 1)))).toBeGreaterThan(0.003);
  });

  it('are within their noise', () => {
    const [events, jumps] = [[5, 14, 22], [0.5, 0.3, 0.4]];
    const { linear, full } = both(record(jumps, events, { noise: 0.002 }), events, 1);
    const sd = Math.sqrt(full.sumOfSquares / full.dof);
    expect(sd).toBeCloseTo(0.002, 4);
    jumps.forEach((jump, k) => expect(Math.abs(full.jumps[k]! - jump)).toBeLessThan(4 * sd * Math.sqrt(linear.noiseCovariance(k, k))));
  });

  it('of small ones are those of the linear fit', () => {
    const [events, jumps] = [[5, 14], [0.002, 0.003]];
    const { linear, full } = both({ ...record(jumps, events) }, events, 0);
    full.jumps.forEach((jump, k) => expect(jump / linear.jumps[k]!).toBeCloseTo(1, 6));
  });
});

it('quadratic drag shows where it is, and is nothing where it is not', () => {
  const events = [5, 20];
  const none = both(record([0.5, 0.4], events, { noise: 5e-4 }), events, 1, true).full.quadratic!;
  expect(Math.abs(none.value)).toBeLessThan(4 * none.u);
  // θ″ = −ω² sin θ − 2ζω θ′ − β|θ′|θ′ by a plain integration of its own.
  const beta = 0.05;
  const [t, x]: [number[], number[]] = [[], []];
  let [a, v] = [0, 0];
  const f = (p: number, q: number): number => -W * W * Math.sin(p) - 2 * 0.01 * W * q - beta * Math.abs(q) * q;
  const h = 1 / 960;
  for (let i = 0; i <= 40 * 960; i++) {
    if (events.some((event) => Math.abs(i * h - event) < h / 2)) v += W * 0.5;
    if (i % 16 === 0) {
      t.push(i * h);
      x.push(a);
    }
    const [k1, l1] = [v, f(a, v)];
    const [k2, l2] = [v + (h / 2) * l1, f(a + (h / 2) * k1, v + (h / 2) * l1)];
    const [k3, l3] = [v + (h / 2) * l2, f(a + (h / 2) * k2, v + (h / 2) * l2)];
    const [k4, l4] = [v + h * l3, f(a + h * k3, v + h * l3)];
    a += (h / 6) * (k1 + 2 * k2 + 2 * k3 + k4);
    v += (h / 6) * (l1 + 2 * l2 + 2 * l3 + l4);
  }
  const found = both({ t: Float64Array.from(t), x: Float64Array.from(x) }, events, 1, true).full;
  expect(found.quadratic!.value).toBeCloseTo(beta, 4);
  found.jumps.forEach((jump) => expect(jump / 0.5).toBeCloseTo(1, 4));
});
