/** Jumps that are none scatter as the noise makes them: as the fit says of white noise, more where the noise is red or hums near the swing. */
import { describe, expect, it } from 'vitest';
import { noFireJumps } from '../../src/traces/noFire.ts';
import { draws } from '../metrology/sources.ts';

const [W, Z, RATE] = [2.72, 0.01, 40];

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
    const { sd, jumps, units } = found(900, white);
    expect(jumps.length).toBeGreaterThan(40);
    const u = 0.02 * Math.sqrt(units.reduce((sum, unit) => sum + unit * unit, 0) / units.length);
    // Forty jumps know their scatter to 11 %.
    expect(Math.abs(sd / u - 1)).toBeLessThan(0.33);
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
