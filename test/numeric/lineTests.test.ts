/** Tests of a fitted line: known tables, exact counts, and how often each cries wolf. */
import { describe, expect, test } from 'vitest';
import { bendTest, driftTest, interceptTest, runsTest, scatterOf, type LineTest } from '../../src/numeric/lineTests.ts';
import type { WeighedPoints } from '../../src/numeric/lineBothAxes.ts';
import { median } from '../../src/numeric/samples.ts';
import runs from '../reference/runs.json' with { type: 'json' };
import thermometer from '../reference/thermometer-line.json' with { type: 'json' };
import { draws } from '../metrology/sources.ts';

describe('scatter', () => {
  test('χ² of Pearson’s data, 11.866 with ν = 8, has chance 0.157 (test/reference/lines.json) and widens by 1.218', () => {
    const { probability, widened } = scatterOf({ chiSquared: 11.866353194061446, dof: 8 });
    expect(probability).toBeCloseTo(0.1572672286912585, 12);
    expect(widened).toBeCloseTo(Math.sqrt(1.4832941492576805), 12);
  });

  test('less than stated does not narrow; without ν there is no chance', () => {
    expect(scatterOf({ chiSquared: 2, dof: 8 }).widened).toBe(1);
    expect(scatterOf({ chiSquared: 0, dof: 0 })).toEqual({ chiSquared: 0, dof: 0, probability: null, widened: 1 });
  });
});

describe('the intercept', () => {
  test('of GUM H.3 stands 59.5 of its u from zero, with ν = 9', () => {
    const { inputs, expected } = thermometer[0]!;
    const x = inputs.t.map((t) => t - inputs.t0);
    // A u that is too small: the scatter makes the u.
    const found = interceptTest({ x, y: inputs.b, ux: x.map(() => 0), uy: x.map(() => 1e-4) })!;
    expect(found.dof).toBe(9);
    expect(found.t / (expected.exact.y1 / expected.exact.s_y1)).toBeCloseTo(1, 9);
    expect(found.probability).toBeLessThan(1e-11);
  });

  test('of two points is no test', () => expect(interceptTest({ x: [1, 2], y: [1, 2], ux: [0, 0], uy: [1, 1] })).toBeNull());
});

describe('how often each test finds what is not there', () => {
  const { normal } = draws(5);
  const cloud = (scatter: number): WeighedPoints => {
    const x = [1, 1, 2, 3, 3, 4, 5, 6];
    return { x: x.map((value) => value + 0.03 * scatter * normal()), y: x.map((value) => 2 * value + 0.05 * scatter * normal()), ux: x.map(() => 0.03), uy: x.map(() => 0.05) };
  };
  const order = [3, 0, 6, 1, 7, 4, 2, 5];
  const tests: readonly (readonly [string, (points: WeighedPoints) => LineTest | null])[] = [
    ['intercept', interceptTest], ['bend', (points) => bendTest(points)], ['bend through the origin', (points) => bendTest(points, false)], ['drift', (points) => driftTest(points, order, false)], ['drift beside an intercept', (points) => driftTest(points, order, true)],
  ];
  test.each(tests)('%s: 5 % at 5 %, scatter as stated or twice as much', (_, of) => {
    const runs_ = 3000;
    for (const [scatter, least] of [[1, 0.015], [2, 0.04]] as const) {
      let found = 0;
      for (let i = 0; i < runs_; i++) if (of(cloud(scatter))!.probability < 0.05) found += 1;
      // As stated, the larger of stated and seen makes it cautious; it must not cry wolf more often than it says.
      expect(found / runs_).toBeLessThan(0.05 + 3 * Math.sqrt((0.05 * 0.95) / runs_));
      expect(found / runs_).toBeGreaterThan(least);
    }
  });

  test('each finds what is there', () => {
    const points = cloud(1);
    expect(interceptTest({ ...points, y: points.y.map((y) => y + 0.5) })!.probability).toBeLessThan(1e-3);
    expect(bendTest({ ...points, y: points.y.map((y, i) => y + 0.1 * points.x[i]! ** 2) })!.probability).toBeLessThan(1e-3);
    // From first to last 14 % of a slope of 2.
    const drifting = driftTest({ ...points, y: points.x.map((x, i) => 2 * x * (1 + 0.02 * (order[i]! - 3.5))) }, order, false)!;
    expect(drifting.probability).toBeLessThan(1e-3);
    expect(drifting.relative).toBeCloseTo(0.14, 3);
  });
});

describe('where there is no test', () => {
  const points = { x: [1, 2, 3, 4], y: [1, 2, 3, 4], ux: [0, 0, 0, 0], uy: [1, 1, 1, 1] };
  test('too few points or too few different x for a bend', () => {
    expect(bendTest({ x: [1, 2, 3], y: [1, 2, 3], ux: [0, 0, 0], uy: [1, 1, 1] })).toBeNull();
    expect(bendTest({ ...points, x: [1, 1, 2, 2] })).toBeNull();
  });

  test('places that do not differ, or are not as many', () => {
    expect(driftTest(points, [1, 1, 1, 1], false)).toBeNull();
    expect(() => driftTest(points, [1, 2], false)).toThrow(RangeError);
  });
});

describe('runs of signs', () => {
  test('Brownlee’s 23 densities of the earth: 8 runs of 11 and 11 about the median, 12 expected, variance 5.238', () => {
    const { inputs, expected } = runs[0]!;
    const middle = median(inputs.y);
    expect(middle).toBeCloseTo(expected.median, 12);
    const found = runsTest(inputs.y.map((y) => Math.round((y - middle) * 1e6)))!;
    expect([found.runs, found.above, found.below, found.expected]).toEqual([expected.runs, expected.n1, expected.n2, expected.mu]);
    expect(found.sd ** 2).toBeCloseTo(expected.var, 12);
    // The printed chance is the normal one without half a step of continuity; the exact one lies above it, near that with it: 2Φ(−3.5/2.289) = 0.126.
    expect(found.probability).toBeGreaterThan(expected.p_two);
    expect(found.probability).toBeCloseTo(0.126, 2);
  });

  test('exact by counting every order of 4 and 5 signs', () => {
    const count = new Map<number, number>();
    let total = 0;
    for (let bits = 0; bits < 512; bits++) {
      const signs = Array.from({ length: 9 }, (_, i) => ((bits >> i) & 1 ? 1 : -1));
      if (signs.filter((sign) => sign > 0).length !== 4) continue;
      const r = signs.reduce<number>((n, sign, i) => n + (i === 0 || sign !== signs[i - 1] ? 1 : 0), 0);
      count.set(r, (count.get(r) ?? 0) + 1);
      total += 1;
    }
    const tail = (keep: (r: number) => boolean): number => [...count].reduce((sum, [r, n]) => sum + (keep(r) ? n : 0), 0) / total;
    const grouped = runsTest([1, 1, 1, 1, -1, -1, -1, -1, -1])!;
    expect(grouped.probability).toBeCloseTo(2 * tail((r) => r <= 2), 12);
    const mixed = runsTest([-1, 1, -1, 1, -1, 1, -1, 1, -1])!;
    expect(mixed.probability).toBeCloseTo(2 * tail((r) => r >= 9), 12);
    expect(runsTest([1, -1, -1, 1, 1, -1, -1, 1, -1])!.probability).toBeCloseTo(1, 12);
  });

  test('7 runs of 11 and 11 are few at 2.5 % one-sided, 8 are not (Swed & Eisenhart’s table, from memory)', () => {
    const of = (lengths: readonly number[]): number => runsTest(lengths.flatMap((n, i) => Array.from({ length: n }, () => (i % 2 === 0 ? 1 : -1))))!.probability;
    expect(of([3, 4, 3, 4, 3, 3, 2])).toBeLessThan(0.05);
    expect(of([3, 4, 3, 3, 3, 2, 2, 2])).toBeGreaterThan(0.05);
  });

  test('one sign alone has none; zeros are left out', () => {
    expect(runsTest([1, 2, 3])).toBeNull();
    expect(runsTest([])).toBeNull();
    expect(runsTest([1, 0, 1, -1])!.runs).toBe(2);
  });
});
