import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { buildPyramid, extremesIn, indexAt, timeAt, windowOf, type TracePicture } from '../../src/numeric/minMaxPyramid.ts';
import { draws } from '../metrology/sources.ts';

const values = (n: number, seed: number): Float32Array => {
  const { normal } = draws(seed);
  return Float32Array.from({ length: n }, () => Math.round(10 * normal()));
};
const picture = (n: number, seed: number, even = true): TracePicture => {
  const v = values(n, seed);
  const times = even ? { from: 5, step: 0.01, count: n } : Float64Array.from({ length: n }, (_, i) => 5 + 0.01 * i + 0.004 * Math.sin(i));
  return { times, values: v, base: 3, pyramid: buildPyramid(v) };
};

describe('least and greatest of a stretch', () => {
  it('are those of all its samples', () => {
    fc.assert(fc.property(fc.integer({ min: 1, max: 9000 }), fc.integer({ min: 1, max: 1e6 }), fc.double({ min: 0, max: 1, noNaN: true }), fc.double({ min: 0, max: 1, noNaN: true }), (n, seed, a, b) => {
      const v = values(n, seed);
      const [from, to] = [Math.floor(Math.min(a, b) * n), Math.max(Math.floor(Math.min(a, b) * n) + 1, Math.ceil(Math.max(a, b) * n))];
      const [low, high] = extremesIn(v, buildPyramid(v), from, to);
      const part = v.subarray(from, to);
      expect([v[low], v[high]]).toEqual([Math.min(...part), Math.max(...part)]);
      expect(low >= from && low < to && high >= from && high < to).toBe(true);
    }));
  });
});

describe('a window of the record', () => {
  it.each([true, false])('has every sample where there are few, those just outside too (even times: %s)', (even) => {
    const one = picture(2000, 3, even);
    const { t, y } = windowOf(one, 7, 8, 500);
    expect(t[0]).toBeLessThanOrEqual(7);
    expect(t.at(-1)).toBeGreaterThanOrEqual(8);
    t.forEach((time, i) => expect(y[i]).toBe(one.values[indexAt(one.times, time - 1e-6)]! + 3));
  });

  it('has the extremes of each column, in order of time', () => {
    const one = picture(200_000, 9);
    const { t, y } = windowOf(one, 100, 1500, 300);
    expect(t.length).toBeLessThanOrEqual(600);
    t.slice(1).forEach((time, i) => expect(time).toBeGreaterThanOrEqual(t[i]!));
    const [a, b] = [indexAt(one.times, 100), indexAt(one.times, 1500)];
    expect(Math.max(...y)).toBe(one.values.subarray(a - 1, b + 1).reduce((m, v) => Math.max(m, v), -Infinity) + 3);
    expect(Math.min(...y)).toBe(one.values.subarray(a - 1, b + 1).reduce((m, v) => Math.min(m, v), Infinity) + 3);
  });

  it('of times before or after the record is its end', () => {
    const one = picture(100, 2);
    expect(windowOf(one, -9, -5, 10).t).toEqual([5]);
    expect(windowOf(one, 90, 95, 10).t).toEqual([timeAt(one.times, 99)]);
  });
});
