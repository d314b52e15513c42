/** Quantiles and distribution functions against tables of 17 digits and against each other. */
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { chiSquareCdf, chiSquareQuantile, fCdf, normalCdf, normalQuantile, tCdf, tQuantile } from '../../src/numeric/quantiles.ts';
import reference from '../reference/distributions.json' with { type: 'json' };
import { digits } from './digits.ts';

// Source: quantiles as in any table (Abramowitz & Stegun ch. 26; NIST Handbook 1.3.6.7), recomputed independently to 17 digits.
const table = reference[0]!.expected;
const rows = (of: Readonly<Record<string, string>>): [number, number][] => Object.entries(of).map(([p, value]) => [Number(p), Number(value)]);

describe('quantiles agree with the tables', () => {
  // Near p = 1 the probability itself, as a double, leaves only some eleven digits: 0.999999 is known to 1e-16 of 1e-6.
  test('of the normal distribution, to 11 digits', () => {
    for (const [p, z] of rows(table.normal)) expect(digits(normalQuantile(p), z)).toBeGreaterThan(11);
  });

  test('of t, whole and broken degrees of freedom, to 12 digits', () => {
    for (const [dof, of] of Object.entries(table.t)) for (const [p, t] of rows(of)) expect(digits(tQuantile(p, Number(dof)), t)).toBeGreaterThan(12);
  });

  test('of chi-square, to 14 digits', () => {
    for (const [dof, of] of Object.entries(table.chi2)) for (const [p, x] of rows(of)) expect(digits(chiSquareQuantile(p, Number(dof)), x)).toBeGreaterThan(14);
  });
});

describe('distribution functions agree with the tables', () => {
  test('of the normal distribution, to 14 digits in both tails', () => {
    for (const [z, p] of rows(table.normal_cdf)) expect(digits(normalCdf(z), p)).toBeGreaterThan(14);
  });

  test('of F at its tabulated quantiles, to 14 digits', () => {
    for (const [dofs, of] of Object.entries(table.F)) {
      const [over, under] = dofs.split(',').map(Number);
      for (const [p, f] of rows(of)) expect(digits(fCdf(f, over!, under!), p)).toBeGreaterThan(14);
    }
  });

  // Cauchy distribution and t with two degrees of freedom in closed form (Abramowitz & Stegun 26.7, from memory).
  test('of t in its closed forms', () => {
    for (const t of [-1e6, -3, -0.2, 0, 0.7, 12]) {
      expect(digits(tCdf(t, 1), t < -1 ? Math.atan(-1 / t) / Math.PI : 0.5 + Math.atan(t) / Math.PI)).toBeGreaterThan(13);
    }
    for (const t of [-3, -0.2, 0, 0.7, 12]) {
      expect(digits(tCdf(t, 2), 0.5 + t / (2 * Math.SQRT2 * Math.sqrt(1 + (t * t) / 2)))).toBeGreaterThan(13);
    }
  });
});

describe('quantile and distribution function undo each other', () => {
  const probability = fc.double({ min: 1e-12, max: 1 - 1e-12, noNaN: true });

  test('for the normal distribution', () => {
    fc.assert(fc.property(probability, (p) => { expect(digits(normalCdf(normalQuantile(p)), p)).toBeGreaterThan(12.5); }));
  });

  test('for t with any degrees of freedom from 0.5', () => {
    const dof = fc.double({ min: Math.log(0.5), max: Math.log(1e12), noNaN: true }).map(Math.exp);
    fc.assert(fc.property(probability, dof, (p, nu) => { expect(digits(tCdf(tQuantile(p, nu), nu), p)).toBeGreaterThan(11.5); }));
  });

  test('for chi-square with 0.5 to a million degrees of freedom', () => {
    const dof = fc.double({ min: Math.log(0.5), max: Math.log(1e6), noNaN: true }).map(Math.exp);
    fc.assert(fc.property(probability, dof, (p, nu) => { expect(digits(chiSquareCdf(chiSquareQuantile(p, nu), nu), p)).toBeGreaterThan(10.5); }), { numRuns: 60 });
  });
});

test('t with infinite degrees of freedom is the normal distribution', () => {
  for (const p of [1e-9, 0.025, 0.4, 0.975]) expect(tQuantile(p, Infinity)).toBe(normalQuantile(p));
  expect(tCdf(-1.96, Infinity)).toBe(normalCdf(-1.96));
});

test('the series of t for many degrees of freedom meets the exact inversion', () => {
  for (const p of [1e-10, 0.01, 0.3, 0.975]) {
    const below = tQuantile(p, 99_999.999);
    expect(digits(tQuantile(p, 100_000), below)).toBeGreaterThan(11.5);
  }
});

test('t is symmetric and 0 at one half', () => {
  expect(tQuantile(0.5, 3.3)).toBe(0);
  expect(normalQuantile(0.5)).toBe(0);
  expect(tQuantile(0.25, 3.3)).toBe(-tQuantile(0.75, 3.3));
});

test('the square of t is F with one degree of freedom above', () => {
  for (const [p, dof] of [[0.975, 4], [0.6, 7.5]] as const) expect(digits(fCdf(tQuantile(p, dof) ** 2, 1, dof), 2 * p - 1)).toBeGreaterThan(13);
});

test('a probability outside 0 to 1, or degrees of freedom that are not positive, are refused', () => {
  for (const p of [0, 1, -0.1, 1.1, NaN]) {
    expect(() => normalQuantile(p)).toThrow(RangeError);
    expect(() => tQuantile(p, 5)).toThrow(RangeError);
    expect(() => chiSquareQuantile(p, 5)).toThrow(RangeError);
  }
  for (const dof of [0, -1, NaN]) {
    expect(() => tQuantile(0.9, dof)).toThrow(RangeError);
    expect(() => tCdf(1, dof)).toThrow(RangeError);
    expect(() => chiSquareQuantile(0.9, dof)).toThrow(RangeError);
    expect(() => fCdf(1, dof, 3)).toThrow(RangeError);
  }
  expect(() => chiSquareQuantile(0.9, Infinity)).toThrow(RangeError);
  expect(() => chiSquareCdf(-1, 3)).toThrow(RangeError);
  expect(() => tCdf(NaN, 3)).toThrow(RangeError);
  expect(() => fCdf(-1, 3, 3)).toThrow(RangeError);
});

test('a quantile that no double can hold is refused', () => {
  expect(() => tQuantile(1e-300, 0.3)).toThrow(RangeError);
  expect(() => chiSquareQuantile(1e-300, 0.3)).toThrow(RangeError);
});

test('the ends of the distribution functions are 0 and 1', () => {
  expect([tCdf(-Infinity, 3), tCdf(Infinity, 3), normalCdf(-Infinity), normalCdf(Infinity), fCdf(0, 2, 3), fCdf(Infinity, 2, 3), chiSquareCdf(0, 3), chiSquareCdf(Infinity, 3)]).toEqual([0, 1, 0, 1, 0, 1, 0, 1]);
});
