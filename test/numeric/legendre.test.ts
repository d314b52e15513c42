import { expect, test } from 'vitest';
import { gaussRule, legendre } from '../../src/numeric/legendre.ts';

test('the polynomials are those of the tables', () => {
  // P₄ = (35x⁴ − 30x² + 3)/8, Abramowitz & Stegun Table 22.9, from memory.
  const x = 0.3;
  const p = legendre(4, x);
  expect(p[2]).toBeCloseTo((3 * x * x - 1) / 2, 15);
  expect(p[4]).toBeCloseTo((35 * x ** 4 - 30 * x * x + 3) / 8, 15);
});

test('two points of Gauss stand at ±1/√3, five have the middle weight 128/225', () => {
  // Abramowitz & Stegun Table 25.4, from memory.
  expect(gaussRule(2).points[0]).toBeCloseTo(1 / Math.sqrt(3), 15);
  expect(gaussRule(5).weights[2]).toBeCloseTo(128 / 225, 14);
  expect(gaussRule(1)).toEqual({ points: [expect.closeTo(0, 15)], weights: [2] });
});

test('a rule of n points integrates x^(2n − 2) exactly and two points x⁴ not', () => {
  for (const count of [1, 3, 9, 20]) {
    const { points, weights } = gaussRule(count);
    const integral = (power: number) => points.reduce((sum, x, i) => sum + weights[i]! * x ** power, 0);
    expect(integral(2 * count - 2)).toBeCloseTo(2 / (2 * count - 1), 13);
  }
  const [two] = gaussRule(2).points as [number];
  expect(2 * two ** 4).toBeLessThan(2 / 5 - 0.1);
});

test('a rule without points throws', () => {
  expect(() => gaussRule(0)).toThrow(RangeError);
});
