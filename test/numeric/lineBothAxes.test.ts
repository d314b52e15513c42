/** The line with errors in both axes: published data, its slopes by differences, its least χ² by search. */
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { lineBothAxes, notExact, type LineBothAxes, type WeighedPoints } from '../../src/numeric/lineBothAxes.ts';
import linearFits from '../reference/linear-fits.json' with { type: 'json' };
import lines from '../reference/lines.json' with { type: 'json' };
import thermometer from '../reference/thermometer-line.json' with { type: 'json' };
import { digits } from './digits.ts';

function fitted(points: WeighedPoints, withIntercept: boolean): LineBothAxes {
  const found = lineBothAxes(points, withIntercept);
  if (found.status !== 'fitted') throw new Error(found.status);
  return found;
}
const inY = (x: readonly number[], y: readonly number[], u = 1): WeighedPoints => ({ x, y, ux: x.map(() => 0), uy: x.map(() => u) });
const set = (id: string): (typeof linearFits)[number] => linearFits.find((entry) => entry.id === id)!;
const numbers = (values: readonly (string | number)[]): readonly number[] => values.map(Number);

describe('errors in y alone are ordinary least squares, with u from the scatter by √(χ²/ν)', () => {
  test('NIST StRD Norris, to eleven digits', () => {
    const { inputs, expected } = set('c02-norris');
    const line = fitted(inY(numbers(inputs.x), numbers(inputs.y)), true);
    const { B0, B1, sB0, sB1, rsd } = expected as Readonly<Record<string, string>>;
    expect(digits(line.slope, Number(B1))).toBeGreaterThan(11);
    expect(digits(line.intercept, Number(B0))).toBeGreaterThan(9);
    const s = Math.sqrt(line.chiSquared / line.dof);
    expect(digits(s, Number(rsd))).toBeGreaterThan(10);
    expect(digits(line.uSlope * s, Number(sB1))).toBeGreaterThan(10);
    expect(digits(line.uIntercept * s, Number(sB0))).toBeGreaterThan(10);
  });

  test.each(['c03-noint1', 'c04-noint2'])('NIST StRD %s, through the origin', (id) => {
    const { inputs, expected } = set(id);
    const line = fitted(inY(numbers(inputs.x), numbers(inputs.y)), false);
    const { B1, sB1, rsd } = expected as Readonly<Record<string, string>>;
    const s = Math.sqrt(line.chiSquared / line.dof);
    expect(digits(line.slope, Number(B1))).toBeGreaterThan(13);
    expect(digits(s, Number(rsd))).toBeGreaterThan(12);
    expect(digits(line.uSlope * s, Number(sB1))).toBeGreaterThan(12);
    expect(line.intercept).toBe(0);
    expect(line.uIntercept).toBe(0);
  });

  test('the thermometer of JCGM 100:2008 H.3, with r = −0.930 of its two coefficients', () => {
    const { inputs, expected } = thermometer[0]!;
    const line = fitted(inY(inputs.t.map((t) => t - inputs.t0), inputs.b), true);
    const s = Math.sqrt(line.chiSquared / line.dof);
    expect(digits(line.intercept, expected.exact.y1)).toBeGreaterThan(9);
    expect(digits(line.slope, expected.exact.y2)).toBeGreaterThan(9);
    expect(digits(line.uIntercept * s, expected.exact.s_y1)).toBeGreaterThan(9);
    expect(digits(line.uSlope * s, expected.exact.s_y2)).toBeGreaterThan(9);
    expect(digits(line.covariance / (line.uSlope * line.uIntercept), expected.exact.r)).toBeGreaterThan(9);
  });

  test('ISO/TS 28037:2010 clause 6, both examples', () => {
    for (const id of ['b03-iso28037-1', 'b04-iso28037-2']) {
      const entry = lines.find((one) => one.id === id)!;
      const { x, y, uy } = entry.inputs as { readonly x: readonly number[]; readonly y: readonly number[]; readonly uy: number | readonly number[] };
      const u = typeof uy === 'number' ? x.map(() => uy) : uy;
      const { exact } = entry.expected as { readonly exact: Readonly<Record<'a' | 'b' | 'ua' | 'ub' | 'cov' | 'chi2', number>> };
      const line = fitted({ x, y, ux: x.map(() => 0), uy: u }, true);
      for (const [value, expected] of [[line.intercept, exact.a], [line.slope, exact.b], [line.uIntercept, exact.ua], [line.uSlope, exact.ub], [line.covariance, exact.cov], [line.chiSquared, exact.chi2]] as const) expect(digits(value, expected)).toBeGreaterThan(10);
    }
  });
});

describe('Pearson’s data with York’s weights', () => {
  const entry = lines.find(({ id }) => id === 'b01-pearson-york')!;
  const { x, y, wx, wy } = entry.inputs as Readonly<Record<'x' | 'y' | 'wx' | 'wy', readonly number[]>>;
  const expected = entry.expected as Readonly<Record<'intercept' | 'slope' | 'sigma_intercept' | 'sigma_slope' | 'S', number>>;
  const points = { x, y, ux: wx.map((w) => 1 / Math.sqrt(w)), uy: wy.map((w) => 1 / Math.sqrt(w)) };
  const line = fitted(points, true);

  test('slope −0.480533, intercept 5.479910, S 11.866353 (York et al. 2004)', () => {
    expect(digits(line.slope, expected.slope)).toBeGreaterThan(10);
    expect(digits(line.intercept, expected.intercept)).toBeGreaterThan(10);
    expect(digits(line.chiSquared, expected.S)).toBeGreaterThan(10);
    expect(line.dof).toBe(8);
  });

  test('u at the data is within a quarter of u at the adjusted points, which York prints', () => {
    expect(Math.abs(line.uSlope / expected.sigma_slope - 1)).toBeLessThan(0.25);
    expect(Math.abs(line.uIntercept / expected.sigma_intercept - 1)).toBeLessThan(0.25);
  });
});

const between = (min: number, max: number): fc.Arbitrary<number> => fc.double({ min, max, noNaN: true });
const clouds = fc.record({ a: between(-2, 2), b: between(-5, 5), points: fc.array(fc.record({ x: between(-5, 5), ux: between(0.01, 0.3), uy: between(0.01, 0.3), strayX: between(-1, 1), strayY: between(-1, 1) }), { minLength: 4, maxLength: 12 }), size: between(-6, 3) })
  .map(({ a, b, points, size }): WeighedPoints => {
    const s = 10 ** size;
    return { x: points.map(({ x, ux, strayX }) => s * (x + ux * strayX)), y: points.map(({ x, uy, strayY }) => a + b * x + uy * strayY), ux: points.map(({ ux }) => s * ux), uy: points.map(({ uy }) => uy) };
  });
const isSpread = ({ x, ux }: WeighedPoints): boolean => Math.max(...x) - Math.min(...x) > 10 * Math.max(...ux);

describe('any cloud of points', () => {
  const chiSquared = ({ x, y, ux, uy }: WeighedPoints, a: number, b: number): number => x.reduce((sum, value, i) => sum + (y[i]! - a - b * value) ** 2 / (uy[i]! ** 2 + (b * ux[i]!) ** 2), 0);

  test('no line near the fitted one has a smaller χ²', () => {
    fc.assert(fc.property(clouds, fc.boolean(), (points, withIntercept) => {
      fc.pre(isSpread(points));
      const line = fitted(points, withIntercept);
      expect(Math.abs(chiSquared(points, line.intercept, line.slope) - line.chiSquared)).toBeLessThan(1e-9 * (1 + line.chiSquared));
      for (const [da, db] of [[1, 0], [-1, 0], [0, 1], [0, -1], [1, 1], [-1, 1]] as const) {
        for (const step of [1e-3, 0.1]) {
          const [a, b] = [line.intercept + (withIntercept ? da * step * line.uIntercept : 0), line.slope + db * step * line.uSlope];
          expect(chiSquared(points, a, b)).toBeGreaterThan(line.chiSquared * (1 - 1e-12) - 1e-12);
        }
      }
    }));
  });

  test('the coefficients follow every coordinate as their slopes say', () => {
    fc.assert(fc.property(clouds, fc.boolean(), fc.nat(11), fc.constantFrom<'x' | 'y'>('x', 'y'), (points, withIntercept, k, axis) => {
      fc.pre(isSpread(points));
      const i = k % points.x.length;
      const line = fitted(points, withIntercept);
      const h = 1e-4 * (axis === 'x' ? points.ux[i]! : points.uy[i]!);
      const moved = (sign: number): LineBothAxes => fitted({ ...points, [axis]: points[axis].map((value, j) => (j === i ? value + sign * h : value)) }, withIntercept);
      const [up, down] = [moved(1), moved(-1)];
      for (const [by, name, u] of [[line.slopeBy, 'slope', line.uSlope], [line.interceptBy, 'intercept', line.uIntercept]] as const) {
        const seen = (up[name] - down[name]) / (2 * h);
        const unit = axis === 'x' ? points.ux[i]! : points.uy[i]!;
        // In units of the coefficient's own u by one u of the coordinate.
        expect(Math.abs((by[axis][i]! - seen) * unit)).toBeLessThanOrEqual(1e-4 * u + 1e-300);
      }
    }));
  });

  test('leverages lie between 0 and 1 and sum to the number of coefficients; turned about, the line is the same', () => {
    fc.assert(fc.property(clouds, fc.boolean(), (points, withIntercept) => {
      fc.pre(isSpread(points));
      const line = fitted(points, withIntercept);
      expect(line.leverages.reduce((a, b) => a + b, 0)).toBeCloseTo(withIntercept ? 2 : 1, 9);
      expect(line.leverages.every((h) => h >= 0 && h <= 1 + 1e-12)).toBe(true);
      const back = fitted({ x: points.x.toReversed(), y: points.y.toReversed(), ux: points.ux.toReversed(), uy: points.uy.toReversed() }, withIntercept);
      expect(Math.abs(back.slope - line.slope)).toBeLessThan(1e-9 * line.uSlope + 1e-12 * Math.abs(line.slope));
    }));
  });

  test('a factor common to all x goes through the slope as itself: Σ x ∂b/∂x = −b', () => {
    fc.assert(fc.property(clouds, (points) => {
      fc.pre(isSpread(points));
      // Exact where the weights do not hold the scale; with errors in x they do, u(x) stays as it is.
      const inYAlone = { ...points, ux: points.x.map(() => 0) };
      for (const withIntercept of [true, false]) {
        const line = fitted(inYAlone, withIntercept);
        const sum = line.slopeBy.x.reduce((all, by, i) => all + by * points.x[i]!, 0);
        expect(Math.abs(sum + line.slope)).toBeLessThan(1e-9 * (Math.abs(line.slope) + line.uSlope));
      }
    }));
  });
});

describe('what has no line', () => {
  test('too few points, no spread, exact points', () => {
    expect(lineBothAxes({ x: [], y: [], ux: [], uy: [] }, false).status).toBe('tooFewPoints');
    expect(lineBothAxes(inY([1], [1]), true).status).toBe('tooFewPoints');
    expect(lineBothAxes(inY([0, 0], [1, 2]), false).status).toBe('noSpread');
    expect(lineBothAxes(inY([2, 2], [1, 2]), true).status).toBe('noSpread');
    expect(() => lineBothAxes(inY([1, 2], [1, 2], 0), true)).toThrow(RangeError);
    expect(() => lineBothAxes({ ...inY([1, 2], [1, 2]), ux: [-1, 0] }, true)).toThrow(RangeError);
    expect(() => lineBothAxes({ ...inY([1, 2], [1, NaN]) }, true)).toThrow(RangeError);
    expect(() => lineBothAxes({ ...inY([1, 2], [1, 2]), uy: [1] }, true)).toThrow(RangeError);
  });

  test('one point through the origin has its slope; all launches zero have slope zero', () => {
    expect(fitted(inY([2], [3]), false).slope).toBeCloseTo(1.5, 15);
    expect(fitted({ x: [1, 2], y: [0, 0], ux: [0.1, 0.1], uy: [0.1, 0.1] }, false).slope).toBe(0);
  });

  test('points exact in both axes are given a u that is nothing beside them', () => {
    const points = notExact({ x: [1, 2, 3], y: [2, 4, 6], ux: [0, 0, 0], uy: [0, 0, 0] });
    expect(fitted(points, false).slope).toBeCloseTo(2, 15);
    expect(fitted(points, false).uSlope).toBeLessThan(1e-8);
    expect(fitted(notExact({ x: [1, 2], y: [0, 0], ux: [0, 0], uy: [0, 0] }), false).slope).toBe(0);
  });
});
