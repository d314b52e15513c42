/** A long record by means of some samples tells what it tells by all. */
import { describe, expect, it } from 'vitest';
import { binned, everyFor } from '../../src/traces/binned.ts';
import { fitSwing } from '../../src/traces/swingFit.ts';
import { draws } from '../metrology/sources.ts';
import { struck } from './struck.ts';

const [W, Z] = [5.7, 0.01];

describe('means of samples', () => {
  it('give the same jumps within a small part of their u, with the same u', () => {
    const { normal } = draws(4);
    const events = [5, 12.5, 20];
    const { t, theta } = struck({ frequency: W, ratio: Z, share: 0, events, jumps: [1, 0.8, 0.9], seconds: 28, rate: 1000 });
    const samples = { t: Float64Array.from(t), x: Float64Array.from(theta, (value) => value + 0.05 * normal()) };
    const all = fitSwing(samples, events, { stretches: 1 });
    const { samples: few, blur } = binned(samples, 16);
    const some = fitSwing(few, events, { stretches: 1, exposure: blur });
    if (all.status !== 'fitted' || some.status !== 'fitted') throw new Error(all.status);
    const uOf = (fit: typeof all, k: number): number => fit.noise * Math.sqrt(fit.noiseCovariance(k, k));
    events.forEach((_, k) => {
      expect(Math.abs(some.jumps[k]! - all.jumps[k]!)).toBeLessThan(0.25 * uOf(all, k));
      expect(uOf(some, k) / uOf(all, k)).toBeCloseTo(1, 1);
    });
    expect(some.noise * 4 / all.noise).toBeCloseTo(1, 1);
  });

  it('blur as an exposure does, which the fit takes back', () => {
    const { t, theta } = struck({ frequency: W, ratio: Z, share: 0, events: [5], jumps: [1], seconds: 20, rate: 200 });
    const { samples, blur } = binned({ t: Float64Array.from(t), x: Float64Array.from(theta) }, 20);
    const fit = fitSwing(samples, [5], { stretches: 1, exposure: blur });
    const without = fitSwing(samples, [5], { stretches: 1 });
    if (fit.status !== 'fitted' || without.status !== 'fitted') throw new Error(fit.status);
    expect(fit.jumps[0]!).toBeCloseTo(1, 4);
    expect(without.jumps[0]!).toBeLessThan(0.99);
  });

  it('leave out what is left out, and what a gap tears apart', () => {
    const t = Float64Array.from({ length: 40 }, (_, i) => (i < 20 ? i : i + 100));
    const x = Float64Array.from(t, (time) => 2 * time);
    const use = new Uint8Array(40).fill(1);
    use.fill(0, 0, 3);
    const { samples } = binned({ t, x, use }, 8);
    expect([...samples.use!]).toEqual([1, 1, 0, 1, 1]);
    samples.t.forEach((time, i) => expect(samples.use![i] === 0 || samples.x[i] === 2 * time).toBe(true));
  });

  it('are of no more samples than the swing allows, and of one where the record is short', () => {
    const even = (n: number, step: number) => ({ t: Float64Array.from({ length: n }, (_, i) => i * step), x: new Float64Array(n) });
    expect(everyFor(even(50_000, 1e-3), 6)).toBe(1);
    expect(everyFor(even(1_000_000, 1e-4), 6)).toBe(10);
    expect(everyFor(even(1_000_000, 0.02), 6)).toBe(1);
  });
});
