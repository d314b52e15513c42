import { describe, expect, it } from 'vitest';
import { clippedSpans, leastStep, maskOf, spikeSpans } from '../../src/traces/faults.ts';
import { draws } from '../metrology/sources.ts';

const times = (n: number, step = 0.01): Float64Array => Float64Array.from({ length: n }, (_, i) => i * step);
const swing = (t: number): number => 10 * Math.exp(-0.02 * t) * Math.sin(5 * t);

describe('clipped samples', () => {
  it('are those at the end of the range, where the swing went on', () => {
    const t = times(3000);
    const x = t.map((time) => Math.min(8, Math.round(swing(time) * 100) / 100));
    const spans = clippedSpans(t, x);
    expect(spans.length).toBeGreaterThan(5);
    const use = maskOf(t, spans);
    t.forEach((time, i) => expect(use[i] === 0).toBe(swing(time) >= 7.995));
  });

  it.each([
    ['of a coarsely read swing are none', (time: number) => Math.round(swing(time))],
    ['of a pendulum at rest are none', () => Math.round(3 + 0)],
    ['of a fine swing are none', swing],
  ] as const)('%s', (_, of) => {
    const t = times(3000);
    expect(clippedSpans(t, t.map(of))).toEqual([]);
  });
});

describe('spikes', () => {
  it('are found where they stand, with their neighbours, and nothing else is', () => {
    const { normal } = draws(6);
    const t = times(20_000);
    const at = [1234, 1235, 7000, 15_000];
    const x = t.map((time, i) => swing(time) + 0.02 * normal() + (at.includes(i) ? 1.5 : 0));
    const use = maskOf(t, spikeSpans(t, x));
    at.forEach((i) => expect(use[i]).toBe(0));
    expect(use.reduce((sum, one) => sum + 1 - one, 0)).toBeLessThan(20);
  });

  it('are none in noise, white, correlated or coarsely read, nor at the kink of a shot', () => {
    const { normal } = draws(16);
    const t = times(200_000);
    let e = 0;
    const coloured = t.map((time) => swing(time) + 0.05 * (e = 0.95 * e + 0.3 * normal()));
    const white = t.map((time) => swing(time) + 0.05 * normal() + (time > 500 ? 10 * Math.max(0, Math.sin(5 * (time - 500))) : 0));
    for (const x of [coloured, white, white.map((value) => Math.round(value * 5) / 5)]) expect(spikeSpans(t, x)).toEqual([]);
  });

  it.each([50, 200, 1000])('are not the bends that a strike makes, at %d samples a second', (rate) => {
    const { normal } = draws(2);
    const t = times(12 * rate, 1 / rate);
    const x = t.map((time) => (time < 5 ? 0 : swing(time - 5)) + 0.01 * normal());
    expect(spikeSpans(t, x)).toEqual([]);
    const i = 8 * rate;
    x[i]! += 2;
    expect(maskOf(t, spikeSpans(t, x))[i]).toBe(0);
  });
});

it('the least step of a record is that of its divisions', () => {
  expect(leastStep(Float64Array.from([1, 1, 1.5, 3, 2.5]))).toBe(0.5);
  expect(leastStep(Float64Array.from([2, 2]))).toBe(0);
});
