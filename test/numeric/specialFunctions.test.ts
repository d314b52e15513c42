/** Gamma and beta functions against identities and closed forms. */
import { describe, expect, test } from 'vitest';
import { incompleteBeta, incompleteGamma, lnGamma, normalTails } from '../../src/numeric/specialFunctions.ts';
import { digits } from './digits.ts';

describe('ln Γ', () => {
  // Γ(n) = (n − 1)!, exact in a double to 22!.
  test('is the logarithm of a factorial at whole numbers', () => {
    let factorial = 1;
    for (let n = 2; n <= 22; n += 1) {
      factorial *= n;
      expect(digits(lnGamma(n + 1), Math.log(factorial))).toBeGreaterThan(14);
    }
  });

  // Γ(½) = √π (DLMF 5.4.6, from memory).
  test('is ½ ln π at one half', () => {
    expect(digits(lnGamma(0.5), 0.5 * Math.log(Math.PI))).toBeGreaterThan(14);
  });

  // Γ(z)Γ(1 − z) = π/sin(πz) (DLMF 5.5.3, from memory).
  test('obeys the reflection formula', () => {
    for (const z of [0.01, 0.2, 0.37, 0.49]) expect(digits(lnGamma(z) + lnGamma(1 - z), Math.log(Math.PI / Math.sin(Math.PI * z)))).toBeGreaterThan(13.5);
  });

  test('refuses what is not positive and finite', () => {
    for (const x of [0, -1, Infinity, NaN]) expect(() => lnGamma(x)).toThrow(RangeError);
  });
});

describe('the incomplete gamma functions', () => {
  // Q(n, x) = e^(−x) Σ x^k/k! for whole n (DLMF 8.4.10, from memory).
  test('are sums of Poisson probabilities at whole a', () => {
    for (const [a, x] of [[1, 0.3], [1, 40], [3, 2], [5, 30], [12, 7]] as const) {
      let term = Math.exp(-x);
      let sum = term;
      for (let k = 1; k < a; k += 1) {
        term *= x / k;
        sum += term;
      }
      expect(digits(incompleteGamma(a, x).upper, sum)).toBeGreaterThan(13);
    }
  });

  test('add up to one and keep to their ends', () => {
    expect(incompleteGamma(2.5, 0)).toEqual({ lower: 0, upper: 1 });
    expect(incompleteGamma(2.5, Infinity)).toEqual({ lower: 1, upper: 0 });
    for (const x of [0.1, 2, 3.4, 3.6, 20]) {
      const { lower, upper } = incompleteGamma(2.5, x);
      expect(lower + upper).toBeCloseTo(1, 14);
    }
  });

  test('refuse arguments out of their range', () => {
    expect(() => incompleteGamma(0, 1)).toThrow(RangeError);
    expect(() => incompleteGamma(1, -1)).toThrow(RangeError);
    expect(() => incompleteGamma(1, NaN)).toThrow(RangeError);
  });
});

describe('the incomplete beta function', () => {
  // I_x(a, 1) = x^a; I_x(½, ½) = (2/π) asin √x (DLMF 8.17, from memory).
  test('has its closed forms', () => {
    for (const x of [1e-12, 0.05, 0.3, 0.5, 0.8, 0.999]) {
      expect(digits(incompleteBeta(3.5, 1, x).lower, x ** 3.5)).toBeGreaterThan(13);
      expect(digits(incompleteBeta(0.5, 0.5, x).lower, (2 / Math.PI) * Math.asin(Math.sqrt(x)))).toBeGreaterThan(13);
    }
  });

  test('is the same from either end', () => {
    for (const [a, b, x] of [[0.5, 40, 0.01], [200, 0.5, 0.98], [7.3, 2.2, 0.6]] as const) {
      expect(digits(incompleteBeta(a, b, x).lower, incompleteBeta(b, a, 1 - x, x).upper)).toBeGreaterThan(13);
    }
  });

  test('refuses arguments out of their range', () => {
    expect(() => incompleteBeta(0, 1, 0.5)).toThrow(RangeError);
    expect(() => incompleteBeta(1, 1, 1.5)).toThrow(RangeError);
    expect(() => incompleteBeta(1, 1, NaN)).toThrow(RangeError);
  });
});

test('both tails of the normal distribution keep their digits', () => {
  // Φ(−8) as in distributions.json; by symmetry it is the upper tail at 8.
  expect(digits(normalTails(8).upper, 6.220960574271784e-16)).toBeGreaterThan(13);
  expect(normalTails(8).upper).toBe(normalTails(-8).lower);
  expect(() => normalTails(NaN)).toThrow(RangeError);
});
