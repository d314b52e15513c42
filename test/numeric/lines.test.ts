/** Straight lines against published examples. */
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { lineAt, lineThroughOrigin, ordinaryLine, weightedLine, yorkLine } from '../../src/numeric/lines.ts';
import type { LineFailure } from '../../src/numeric/lines.ts';
import linearFits from '../reference/linear-fits.json' with { type: 'json' };
import thermometer from '../reference/thermometer-line.json' with { type: 'json' };
import reference from '../reference/lines.json' with { type: 'json' };
import { digits, fewestDigits } from './digits.ts';

function fitted<T extends { readonly status: 'fitted' }>(fit: T | LineFailure): T {
  if (fit.status !== 'fitted') throw new Error(`no line: ${fit.status}`);
  return fit;
}

const [pearson, rounded, iso1, iso2, correlated, natrella] = reference;
const [norris, noInt1, noInt2] = linearFits;
const repeat = (value: number, n: number): number[] => Array.from({ length: n }, () => value);

describe('ordinary least squares', () => {
  // Source: NIST StRD linear regression, Norris, certified values (the covariance computed from them).
  test('gives NIST’s Norris line to 12 digits, its standard deviations to 13', () => {
    const { B0, B1, sB0, sB1, rsd, RSS } = norris!.expected;
    const line = fitted(ordinaryLine(norris!.inputs.x.map(Number), norris!.inputs.y.map(Number)));
    expect(fewestDigits(line, { intercept: B0, slope: B1 })).toBeGreaterThan(12);
    expect(fewestDigits(line, { uIntercept: sB0, uSlope: sB1, s: rsd, sumOfSquares: RSS })).toBeGreaterThan(13);
    expect(digits(line.covariance, -7.74327536315644e-5)).toBeGreaterThan(13);
  });

  // Source: JCGM 100:2008 H.3, Table H.6 and equations H.12–H.15; published digits, and to 9 digits as recomputed.
  test('gives the thermometer calibration line of the GUM', () => {
    const { inputs, expected } = thermometer[0]!;
    const line = fitted(ordinaryLine(inputs.t.map((t) => t - inputs.t0), inputs.b));
    const { exact, published } = expected;
    expect(fewestDigits(line, { intercept: exact.y1, slope: exact.y2, uIntercept: exact.s_y1, uSlope: exact.s_y2, s: exact.s, sumOfSquares: exact.ssr })).toBeGreaterThan(9);
    expect(line.dof).toBe(published.nu);
    expect(digits(line.covariance / (line.uIntercept * line.uSlope), exact.r)).toBeGreaterThan(9);
    const at30 = lineAt(line, 30 - inputs.t0);
    expect(fewestDigits(at30, { value: exact.b30, u: exact.u_b30 })).toBeGreaterThan(9);
    expect(at30.value).toBeCloseTo(published.b30, 4);
    expect(at30.u).toBeCloseTo(published.u_b30, 4);
  });

  // Source: Natrella, NBS Handbook 91, worksheet 5-4.1, published digits.
  test('gives Young’s modulus against temperature as NBS Handbook 91 works it', () => {
    const { x, y } = natrella!.inputs;
    const line = fitted(ordinaryLine(x, y));
    const published = { intercept: 4654.9846, slope: -0.44985482, s: 9.277617 };
    expect(fewestDigits(line, published)).toBeGreaterThan(7);
    expect(digits(line.uSlope ** 2, 2.5649045e-5)).toBeGreaterThan(7);
    expect(digits(line.uIntercept ** 2, 19.879452)).toBeGreaterThan(7);
  });

  test('keeps its digits when x is far from zero', () => {
    const x = [0, 1, 2, 3, 4];
    const y = [1, 3.25, 4.75, 7, 9];
    const near = fitted(ordinaryLine(x, y));
    const far = fitted(ordinaryLine(x.map((value) => value + 2 ** 26), y));
    expect(fewestDigits(far, { slope: near.slope, uSlope: near.uSlope, s: near.s })).toBeGreaterThan(13);
  });
});

describe('weighted least squares', () => {
  // Source: ISO/TS 28037:2010, clause 6, examples 1 and 2 (pp. 13–14); to 10 digits as recomputed, χ² included.
  test('gives the two examples of ISO/TS 28037', () => {
    for (const example of [iso1!, iso2!]) {
      const { x, y, uy } = example.inputs;
      const line = fitted(weightedLine(x, y, typeof uy === 'number' ? repeat(uy, x.length) : uy!));
      const { a, b, ua, ub, cov, chi2 } = example.expected.exact!;
      expect(fewestDigits(line, { intercept: a, slope: b, uIntercept: ua, uSlope: ub, covariance: cov, sumOfSquares: chi2 })).toBeGreaterThan(10);
      expect(line.intercept).toBeCloseTo(example.expected.published!.a!, 3);
    }
  });

  test('with equal weights is the ordinary line, its uncertainties scaled', () => {
    const { x, y } = natrella!.inputs;
    const ordinary = fitted(ordinaryLine(x, y));
    const weighted = fitted(weightedLine(x, y, repeat(ordinary.s, x.length)));
    expect(fewestDigits(weighted, { intercept: ordinary.intercept, slope: ordinary.slope, uIntercept: ordinary.uIntercept, uSlope: ordinary.uSlope, covariance: ordinary.covariance, sumOfSquares: ordinary.dof })).toBeGreaterThan(12);
  });
});

describe('a line through the origin', () => {
  // Source: NIST StRD linear regression, NoInt1 and NoInt2, certified values.
  test('gives NIST’s lines without an intercept to 14 digits', () => {
    for (const { inputs, expected } of [noInt1!, noInt2!]) {
      const line = fitted(lineThroughOrigin(inputs.x.map(Number), inputs.y.map(Number)));
      expect(fewestDigits(line, { slope: expected.B1, uSlopeFromScatter: expected.sB1, s: expected.rsd, sumOfSquares: expected.RSS })).toBeGreaterThan(14);
    }
  });

  test('with weights 1/u² has the uncertainty of a weighted mean of the ratios', () => {
    const line = fitted(lineThroughOrigin([1, 2], [3, 5], [1 / 0.1 ** 2, 1 / 0.4 ** 2]));
    // Ratios 3 ± 0.1 and 2.5 ± 0.2, by hand: weights 100 and 25.
    expect(fewestDigits(line, { slope: (3 * 100 + 2.5 * 25) / 125, uSlopeFromWeights: 1 / Math.sqrt(125) })).toBeGreaterThan(14);
  });

  test('of one point has no scatter to tell', () => {
    expect(lineThroughOrigin([2], [3])).toMatchObject({ status: 'fitted', slope: 1.5, s: null, uSlopeFromScatter: null, dof: 0 });
  });
});

describe('York’s line, uncertainties in both axes', () => {
  // Source: Pearson 1901 with York's weights 1966; York et al., Am. J. Phys. 72 (2004) 367; to 9 digits as recomputed.
  test('gives Pearson’s data with York’s weights', () => {
    const { x, y, wx, wy } = pearson!.inputs;
    const { expected } = pearson!;
    const line = fitted(yorkLine(x, y, wx!.map((w) => 1 / Math.sqrt(w)), wy!.map((w) => 1 / Math.sqrt(w))));
    expect(fewestDigits(line, { intercept: expected.intercept, slope: expected.slope, uIntercept: expected.sigma_intercept, uSlope: expected.sigma_slope, covariance: expected.cov, sumOfSquares: expected.S })).toBeGreaterThan(9);
    expect(line.intercept).toBeCloseTo(expected.published!.a!, 8);
    expect(line.slope).toBeCloseTo(expected.published!.b!, 8);
  });

  // Source: the data of scipy/odr/tests/test_odr.py::test_pearson; York's equations recomputed; scipy's own estimates stop at some 3e-6.
  test('gives the same data with rounded uncertainties, and near what scipy’s test states', () => {
    const { x, y, sx, sy } = rounded!.inputs;
    if (!Array.isArray(sx) || !Array.isArray(sy)) throw new Error('the reference has no lists of uncertainties');
    const line = fitted(yorkLine(x, y, sx, sy));
    const { a, b, sa, sb, cov, S } = rounded!.expected.york!;
    expect(fewestDigits(line, { intercept: a, slope: b, uIntercept: sa, uSlope: sb, covariance: cov, sumOfSquares: S })).toBeGreaterThan(9);
    const [intercept, slope] = rounded!.expected.scipy_test!.beta;
    expect(fewestDigits(line, { intercept, slope })).toBeGreaterThan(5.5);
  });

  // Source: York et al. 2004, general formula with r ≠ 0 (no published data; recomputed independently).
  test('takes a correlation of x and y at each point', () => {
    const { x, y, sx, sy, r } = correlated!.inputs;
    if (typeof sx !== 'number' || !Array.isArray(sy) || !Array.isArray(r)) throw new Error('the reference is of another shape');
    const { a, b, sa, sb, cov, S } = correlated!.expected;
    expect(fewestDigits(fitted(yorkLine(x, y, repeat(sx, x.length), sy, r)), { intercept: a, slope: b, uIntercept: sa, uSlope: sb, covariance: cov, sumOfSquares: S })).toBeGreaterThan(9);
  });

  test('with exact x is the weighted line', () => {
    const { x, y } = iso2!.inputs;
    const uy = [0.5, 0.5, 0.5, 1, 1, 1];
    const weighted = fitted(weightedLine(x, y, uy));
    const { intercept, slope, uIntercept, uSlope, covariance, sumOfSquares } = weighted;
    expect(fewestDigits(fitted(yorkLine(x, y, repeat(0, x.length), uy)), { intercept, slope, uIntercept, uSlope, covariance, sumOfSquares })).toBeGreaterThan(12);
  });

  test('is the same line when the axes change places', () => {
    const noise = fc.array(fc.double({ min: -0.5, max: 0.5, noNaN: true }), { minLength: 8, maxLength: 8 });
    fc.assert(
      fc.property(noise, noise, fc.double({ min: 0.3, max: 3, noNaN: true }), (dx, dy, trueSlope) => {
        const x = dx.map((d, i) => 2 * i + d);
        const y = dy.map((d, i) => 1 + trueSlope * 2 * i + d);
        const ux = x.map((_, i) => 0.2 + 0.05 * i);
        const uy = x.map((_, i) => 0.6 - 0.05 * i);
        const one = fitted(yorkLine(x, y, ux, uy));
        const other = fitted(yorkLine(y, x, uy, ux));
        expect(digits(other.slope, 1 / one.slope)).toBeGreaterThan(9);
        expect(Math.abs(other.sumOfSquares - one.sumOfSquares)).toBeLessThan(1e-9 * (1 + one.sumOfSquares));
      }),
    );
  });
});

describe('a line that cannot be had', () => {
  test('for want of points has its status', () => {
    expect(ordinaryLine([1, 2], [1, 2])).toEqual({ status: 'tooFewPoints' });
    expect(weightedLine([1], [1], [1])).toEqual({ status: 'tooFewPoints' });
    expect(lineThroughOrigin([], [])).toEqual({ status: 'tooFewPoints' });
    expect(yorkLine([1], [1], [1], [1])).toEqual({ status: 'tooFewPoints' });
  });

  test('because all x are one has its status', () => {
    const x = [0.1, 0.1, 0.1];
    expect(ordinaryLine(x, [1, 2, 3])).toEqual({ status: 'noSpread' });
    expect(weightedLine(x, [1, 2, 3], [1, 1, 1])).toEqual({ status: 'noSpread' });
    expect(yorkLine(x, [1, 2, 3], [1, 1, 1], [1, 1, 1])).toEqual({ status: 'noSpread' });
    expect(lineThroughOrigin([0, 0], [1, 2])).toEqual({ status: 'noSpread' });
  });

  // An exact y and a level line leave that point with no uncertainty at all across the line.
  test('because a point fixes a level line has its status', () => {
    expect(yorkLine([0, 1, 2], [1, 1, 1], [0.1, 0.1, 0.1], [0, 0, 0])).toEqual({ status: 'notConverged' });
  });

  test('lists that do not fit and numbers out of range are refused', () => {
    expect(() => ordinaryLine([1, 2, 3], [1, 2])).toThrow(RangeError);
    expect(() => ordinaryLine([1, 2, NaN], [1, 2, 3])).toThrow(RangeError);
    expect(() => weightedLine([1, 2], [1, 2], [1, 0])).toThrow(RangeError);
    expect(() => weightedLine([1, 2], [1, 2], [1])).toThrow(RangeError);
    expect(() => lineThroughOrigin([1, 2], [1, 2], [1, -1])).toThrow(RangeError);
    expect(() => yorkLine([1, 2], [1, 2], [0, 1], [0, 1])).toThrow(RangeError);
    expect(() => yorkLine([1, 2], [1, 2], [1, 1], [1, 1], [0, 1])).toThrow(RangeError);
  });
});
