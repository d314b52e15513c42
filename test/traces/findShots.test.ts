import { describe, expect, it } from 'vitest';
import { findJumps, risesOf } from '../../src/traces/findShots.ts';
import { draws } from '../metrology/sources.ts';
import { struck } from './struck.ts';

const [W, Z] = [5.7, 0.01];
const EVENTS = [6, 14, 19.5, 33, 34.25];
const JUMPS = [0.02, -0.015, 0.02, 0.018, 0.02];

function record(noise: number, extra: (t: number) => number = () => 0) {
  const { normal } = draws(12);
  const { t, theta } = struck({ frequency: W, ratio: Z, share: 0, events: EVENTS, jumps: JUMPS, seconds: 45, rate: 200, start: [0.004, 0.003] });
  return { t: Float64Array.from(t), x: Float64Array.from(theta, (value, i) => value + noise * normal() + extra(t[i]!)) };
}

describe('shots that nobody listed', () => {
  it.each([
    ['in a quiet record', 0, undefined],
    ['in noise', 5e-4, undefined],
    ['on a drifting rest line, with hum', 2e-4, (t: number) => 0.3 + 1e-4 * t + 1e-3 * Math.sin(2 * Math.PI * 25 * t)],
  ] as const)('are found %s', (_, noise, extra) => {
    const found = findJumps(record(noise, extra), { frequency: W * 1.01, ratio: 0.012 });
    expect(found).toHaveLength(EVENTS.length);
    found.forEach(({ time, jump }, k) => {
      expect(Math.abs(time - EVENTS[k]!)).toBeLessThan(0.03);
      expect(Math.abs(jump / JUMPS[k]! - 1)).toBeLessThan(0.15);
    });
  });

  it('are none in a free swing, nor in noise', () => {
    const { normal } = draws(5);
    const { t, theta } = struck({ frequency: W, ratio: Z, share: 0, events: [], jumps: [], seconds: 200, rate: 100, start: [0.02, 0] });
    const free = { t: Float64Array.from(t), x: Float64Array.from(theta, (value) => value + 3e-4 * normal()) };
    expect(findJumps(free, { frequency: W, ratio: Z })).toEqual([]);
    expect(findJumps({ t: free.t, x: free.t.map(() => normal()) }, { frequency: W, ratio: Z })).toEqual([]);
  });
});

it('a trigger rises between two samples, once a pulse, however it rattles', () => {
  const t = Float64Array.from({ length: 12 }, (_, i) => i);
  expect(risesOf(t, Float64Array.from([0, 0, 5, 4.6, 5, 0, 0, 2, 5, 2.4, 5, 0]))).toEqual([1.5, 7 + 1 / 6]);
  expect(risesOf(t, new Float64Array(12).fill(3))).toEqual([]);
  expect(risesOf(t, Float64Array.from([5, 5, 0, 0, 0, 5, 5, 5, 5, 5, 5, 5]))).toEqual([4.5]);
});
