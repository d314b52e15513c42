/** Trains of pulses, each pulse integrated, read as a steady deflection. */
import { describe, expect, it } from 'vitest';
import { betterFrom, ripple, steadyDeflection } from '../../src/traces/steadyTrain.ts';
import { draws } from '../metrology/sources.ts';
import { struck } from './struck.ts';

const [W, Z, RATE] = [5.7, 0.02, 100];
const O = { frequency: W, ratio: Z };

/** Pulses of jump J from `on` to `off`, on the fine grid. */
function train(pulses: number, jump: number, { on = 10, off = 30, seconds = 45, noise = 0, seed = 1, start = [0, 0] as readonly [number, number] } = {}) {
  const many = Math.round((off - on) * pulses);
  const events = Array.from({ length: many }, (_, k) => Math.round((on + (k + 0.5) / pulses) * RATE * 8) / (RATE * 8));
  const { t, theta } = struck({ frequency: W, ratio: Z, share: 0, events, jumps: events.map(() => jump), seconds, rate: RATE, start });
  const { normal } = draws(seed);
  return { t: Float64Array.from(t), x: Float64Array.from(theta, (value) => 3 + 1e-3 * value + noise * normal()) };
}

describe('the steady deflection', () => {
  it.each([[20, 0], [50, 0], [50, 0.4]])('of %d pulses a second is r J/ω, at rest or swinging before (%d)', (pulses, before) => {
    const found = steadyDeflection(train(pulses, 0.1, { start: [before, 0] }), O, { on: 10, off: 30 }, [0, 45])!;
    expect(found.deflection / ((1e-3 * pulses * 0.1) / W)).toBeCloseTo(1, 2);
    expect(found.from).toBe(0);
  });

  it('scatters over noise realisations as its u says', () => {
    const truth = (1e-3 * 50 * 0.1) / W;
    const zs = Array.from({ length: 120 }, (_, run) => {
      const { deflection, u } = steadyDeflection(train(50, 0.1, { noise: 2e-5, seed: 100 + run }), O, { on: 10, off: 30 }, [0, 45])!;
      return (deflection - truth) / u;
    });
    // A spread of 120 is known to 6.5 %; the ripple of the pulses adds its own.
    const rms = Math.sqrt(zs.reduce((sum, z) => sum + z * z, 0) / zs.length);
    expect(rms).toBeGreaterThan(0.75);
    expect(rms).toBeLessThan(1.3);
  });

  it('leans on the frequency and damping as told', () => {
    const samples = train(50, 0.1);
    const at = (o: typeof O): number => steadyDeflection(samples, o, { on: 10, off: 30 }, [0, 45])!.deflection;
    const { byFrequency, byRatio } = steadyDeflection(samples, O, { on: 10, off: 30 }, [0, 45])!;
    expect((at({ ...O, frequency: W * 1.00001 }) - at(O)) / (0.00001 * W) / byFrequency).toBeCloseTo(1, 1);
    expect((at({ ...O, ratio: Z + 1e-5 }) - at(O)) / 1e-5 / byRatio).toBeCloseTo(1, 1);
  });

  it('is none where the record holds no rest beside it, or nothing of it', () => {
    const samples = train(50, 0.1);
    expect(steadyDeflection(samples, O, { on: 10, off: 30 }, [12, 28])).toBeNull();
    expect(steadyDeflection(samples, O, { on: 60, off: 90 }, [0, 45])).toBeNull();
  });
});

it('the ripple is that of the integrated train when it has settled', () => {
  const { t, x } = train(5, 0.1, { on: 1, off: 200, seconds: 200 });
  const late = [...x].filter((_, i) => t[i]! > 190 && t[i]! < 199);
  const seen = (Math.max(...late) - Math.min(...late)) / ((1e-3 * 5 * 0.1) / W);
  expect(ripple(5, O) / seen).toBeCloseTo(1, 1);
  expect(ripple(50, O)).toBeLessThan(0.02);
});

it('the rate from which the train is better balances the two uncertainties', () => {
  const [uDeflection, uJump, shots] = [2e-5, 3e-5, 9];
  const r = betterFrom(W, uDeflection, uJump, shots);
  // κ u_θ/r against κ u_J/(ω √n).
  expect(uDeflection / r).toBeCloseTo(uJump / (W * Math.sqrt(shots)), 12);
});
