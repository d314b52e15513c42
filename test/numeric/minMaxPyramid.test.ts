import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { buildPyramid, extremesIn, indexAt, timeOf, window, type TracePicture } from '../../src/numeric/minMaxPyramid.ts';
import { draws } from '../metrology/sources.ts';

const values = (n: number, seed: number, gaps = 0): Float32Array => {
  const { normal, uniform } = draws(seed);
  return Float32Array.from({ length: n }, () => (uniform() < gaps ? NaN : Math.round(10 * normal()) + 0));
};
const picture = (n: number, seed: number, even = true): TracePicture => {
  const v = values(n, seed);
  const times = even ? { from: 5, step: 0.01 } : Float64Array.from({ length: n }, (_, i) => 5 + 0.01 * i + 0.004 * Math.sin(i));
  return { times, values: v, pyramid: buildPyramid(v) };
};

describe('least and greatest of a stretch', () => {
  it('are those of all its samples', () => {
    const part = fc.double({ min: 0, max: 1, noNaN: true });
    fc.assert(fc.property(fc.integer({ min: 1, max: 9000 }), fc.integer({ min: 1, max: 1e6 }), part, part, fc.constantFrom(0, 0.3, 1), (n, seed, a, b, gaps) => {
      const v = values(n, seed, gaps);
      const from = Math.min(n - 1, Math.floor(Math.min(a, b) * n));
      const to = Math.max(from + 1, Math.ceil(Math.max(a, b) * n));
      const seen = Array.from(v.subarray(from, to)).filter((value) => !Number.isNaN(value));
      const found = extremesIn(v, buildPyramid(v), from, to);
      expect(found && [v[found[0]], v[found[1]]]).toEqual(seen.length === 0 ? null : [Math.min(...seen), Math.max(...seen)]);
      expect((found ?? []).every((i) => i >= from && i < to)).toBe(true);
    }));
  });
});

describe('a window of the record', () => {
  it.each([true, false])('has every sample where there are few, those just outside too (even times: %s)', (even) => {
    const one = picture(2000, 3, even);
    const { times, values: y } = window(one, 7, 8, 500);
    expect(times[0]).toBeLessThanOrEqual(7);
    expect(times.at(-1)).toBeGreaterThanOrEqual(8);
    times.forEach((time, i) => expect(y[i]).toBe(one.values[indexAt(one.times, 2000, time - 1e-6)]));
  });

  it('has the extremes of each column, in order of time', () => {
    const one = picture(200_000, 9);
    const { times, values: y } = window(one, 100, 1500, 300);
    // Two a column, and one beyond either end.
    expect(times.length).toBeLessThanOrEqual(602);
    times.slice(1).forEach((time, i) => expect(time).toBeGreaterThanOrEqual(times[i]!));
    const inside = Array.from(one.values.subarray(indexAt(one.times, 200_000, 100) - 1, indexAt(one.times, 200_000, 1500) + 1));
    const drawn = y.filter((value) => value !== null);
    expect(Math.max(...drawn)).toBe(inside.reduce((m, v) => Math.max(m, v), -Infinity));
    expect(Math.min(...drawn)).toBe(inside.reduce((m, v) => Math.min(m, v), Infinity));
  });

  it('has the extremes of every column of time, whatever the spacing', () => {
    const part = fc.double({ min: 0, max: 1, noNaN: true });
    fc.assert(fc.property(fc.integer({ min: 500, max: 5000 }), fc.integer({ min: 1, max: 1e6 }), part, fc.integer({ min: 1, max: 60 }), fc.constantFrom(1, 30), (n, seed, begin, columns, burst) => {
      const v = values(n, seed, 0.01);
      const times = new Float64Array(n);
      for (let i = 1; i < n; i++) times[i] = times[i - 1]! + (i % 1000 < 700 ? 1 : burst);
      const [from, to] = [begin * 0.4 * times[n - 1]!, (0.6 + begin * 0.4) * times[n - 1]!];
      const drawn = window({ times, values: v, pyramid: buildPyramid(v) }, from, to, columns);
      const inColumns = (t: ArrayLike<number>, y: ArrayLike<number | null>): readonly (readonly number[])[] => {
        const found: number[][] = Array.from({ length: columns }, () => []);
        for (let i = 0; i < t.length; i++) {
          const [time, value] = [t[i]!, y[i]];
          if (time < from || time >= to || value == null || Number.isNaN(value)) continue;
          let c = Math.min(columns - 1, Math.floor((columns * (time - from)) / (to - from)));
          while (c > 0 && time < from + ((to - from) * c) / columns) c--;
          while (c < columns - 1 && time >= from + ((to - from) * (c + 1)) / columns) c++;
          found[c]!.push(value);
        }
        return found;
      };
      const [seen, all] = [inColumns(drawn.times, drawn.values), inColumns(times, v)];
      seen.forEach((some, c) => {
        expect(some.length === 0 ? null : [Math.min(...some), Math.max(...some)]).toEqual(all[c]!.length === 0 ? null : [Math.min(...all[c]!), Math.max(...all[c]!)]);
        expect(some.length).toBeLessThanOrEqual(all.flat().length > 2 * columns ? 2 : all[c]!.length);
      });
    }), { numRuns: 60 });
  });

  it('is broken where there is no sample', () => {
    const v = values(100_000, 4);
    v.fill(NaN, 40_000, 60_000);
    const { values: y } = window({ times: { from: 0, step: 1 }, values: v, pyramid: buildPyramid(v) }, 0, 100_000, 100);
    expect(y.filter((value) => value === null).length).toBeGreaterThan(15);
  });

  it('of times before or after the record is its end', () => {
    const one = picture(100, 2);
    expect(window(one, -9, -5, 10).times).toEqual([5]);
    expect(window(one, 90, 95, 10).times).toEqual([timeOf(one.times, 99)]);
  });
});
