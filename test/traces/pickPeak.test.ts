import { describe, expect, it } from 'vitest';
import { pickedThrow } from '../../src/traces/pickPeak.ts';
import { fitSwing } from '../../src/traces/swingFit.ts';
import { struck } from './struck.ts';

const [W, Z] = [5.7, 0.03];
const record = (events: readonly number[], start: readonly [number, number] = [0, 0]) => {
  const { t, theta } = struck({ frequency: W, ratio: Z, share: 0, events, jumps: events.map(() => 0.02), seconds: 30, rate: 100, start });
  const samples = { t: Float64Array.from(t), x: Float64Array.from(theta, (value) => value + 1) };
  const fit = fitSwing(samples, events);
  if (fit.status !== 'fitted') throw new Error(fit.status);
  return { samples, model: fit.model };
};

describe('a peak picked by hand', () => {
  it('is the jump of a shot from rest', () => {
    const { samples, model } = record([5, 20]);
    expect(pickedThrow(samples, model, 5, 20)! / 0.02).toBeCloseTo(1, 4);
  });

  it('is the jump of one that was swinging, by what the shot added', () => {
    const { samples, model } = record([5], [0.004, 0]);
    expect(pickedThrow(samples, model, 5, Infinity)! / 0.02).toBeCloseTo(1, 4);
  });

  it('is none where the next shot, the end, or a gap comes first', () => {
    const { samples, model } = record([5, 29.9]);
    expect(pickedThrow(samples, model, 5, 5.2)).toBeNull();
    expect(pickedThrow(samples, model, 29.9, Infinity)).toBeNull();
    expect(pickedThrow({ ...samples, use: samples.t.map((time) => (time > 5.2 && time < 5.35 ? 0 : 1)) as unknown as Uint8Array }, model, 5, 20)).toBeNull();
  });
});
