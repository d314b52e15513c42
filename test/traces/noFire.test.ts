/** Jumps that are none scatter as the noise makes them: as the fit says of white noise, more where the noise is red or hums near the swing. */
import { describe, expect, it } from 'vitest';
import { noFireJumps } from '../../src/traces/noFire.ts';
import { fitSwing } from '../../src/traces/swingFit.ts';
import { draws } from '../metrology/sources.ts';

const [W, Z, RATE] = [2.72, 0.01, 40];
const PERIOD = (2 * Math.PI) / W;

function record(seconds: number, noise: (next: ReturnType<typeof draws>) => () => number, seed = 3) {
  const next = noise(draws(seed));
  const t = Float64Array.from({ length: Math.round(seconds * RATE) }, (_, i) => i / RATE);
  return { t, x: t.map((time) => 5 + 0.3 * Math.exp(-Z * W * time) * Math.cos(W * time) + next()) };
}
const white = ({ normal }: ReturnType<typeof draws>) => () => 0.02 * normal();
const red = ({ normal }: ReturnType<typeof draws>) => {
  let last = 0;
  return () => (last = 0.97 * last + Math.sqrt(1 - 0.97 ** 2) * 0.02 * normal());
};
const found = (seconds: number, noise: typeof white, seed?: number) => noFireJumps(record(seconds, noise, seed), { frequency: W, ratio: Z }, [{ from: 0, to: seconds }])!;

describe('jumps that are none', () => {
  it('scatter by white noise as a fit of one of them says', () => {
    const samples = record(10 * PERIOD, white, 8);
    const fit = fitSwing(samples, [2, 4, 6, 8].map((k) => k * PERIOD), { fixed: { frequency: W, ratio: Z }, stretches: 1 });
    const u = fit.status === 'fitted' ? 0.02 * Math.sqrt((fit.noiseCovariance(1, 1) + fit.noiseCovariance(2, 2)) / 2) : NaN;
    // Outer ones have less beside them and scatter a little more.
    const { sd, jumps } = found(600, white);
    expect(jumps.length).toBeGreaterThan(40);
    expect(sd / u).toBeGreaterThan(0.8);
    expect(sd / u).toBeLessThan(1.4);
  });

  it('scatter far more by noise as strong that is carried from sample to sample', () => {
    expect(found(600, red).sd / found(600, white).sd).toBeGreaterThan(3);
  });

  it('scatter by a sway near the swing’s frequency', () => {
    const swaying = (next: ReturnType<typeof draws>) => {
      let i = 0;
      return () => 0.02 * next.normal() + 0.02 * Math.sin((1.1 * W * i++) / RATE);
    };
    expect(found(300, swaying).sd / found(300, white).sd).toBeGreaterThan(1.5);
  });

  it('are few in a long record: enough for their scatter, not more', () => {
    expect(found(5000, white).jumps.length).toBeLessThan(100);
  });

  it('are not told of a stretch too short for four', () => {
    expect(noFireJumps(record(20, white), { frequency: W, ratio: Z }, [{ from: 0, to: 7 }])).toBeNull();
  });
});
