/** Roots by Brent's method. */
import fc from 'fast-check';
import { expect, test } from 'vitest';
import { rootBetween } from '../../src/numeric/roots.ts';

function rootOf(f: (x: number) => number, a: number, b: number, tolerance?: number): number {
  const result = rootBetween(f, a, b, tolerance);
  if (result.status !== 'found') throw new Error(`no root: ${result.status}`);
  return result.x;
}

test('roots in closed form come back to the last digits', () => {
  expect(rootOf((x) => x * x - 2, 0, 2)).toBeCloseTo(Math.SQRT2, 15);
  expect(rootOf((x) => Math.cos(x), 0, 3)).toBeCloseTo(Math.PI / 2, 15);
  expect(rootOf((x) => Math.exp(x) - 10, 5, -5)).toBeCloseTo(Math.LN10, 14);
});

// The Dottie number, 0.7390851332151607 (from memory).
test('the fixed point of the cosine is found', () => {
  expect(rootOf((x) => Math.cos(x) - x, 0, 1)).toBeCloseTo(0.7390851332151607, 15);
});

test('a triple root and a step are found too', () => {
  expect(Math.abs(rootOf((x) => (x - 0.3) ** 3, -1, 2))).toBeCloseTo(0.3, 5);
  expect(rootOf((x) => (x < 0.7 ? -1 : 1), 0, 1)).toBeCloseTo(0.7, 15);
});

test('a root at an end is found without a search', () => {
  expect(rootBetween((x) => x, 0, 1)).toEqual({ status: 'found', x: 0, iterations: 0 });
  expect(rootBetween((x) => x - 1, 0, 1)).toEqual({ status: 'found', x: 1, iterations: 0 });
});

test('any cubic root is found within the tolerance asked for, in few rounds', () => {
  fc.assert(
    fc.property(fc.double({ min: -10, max: 10, noNaN: true }), fc.constantFrom(1e-3, 1e-9), (root, tolerance) => {
      const result = rootBetween((x) => (x - root) * (1 + (x - root) ** 2), -11, 13, tolerance);
      expect(result.status).toBe('found');
      if (result.status !== 'found') return;
      expect(Math.abs(result.x - root)).toBeLessThanOrEqual(tolerance + 1e-14);
      expect(result.iterations).toBeLessThan(40);
    }),
  );
});

test('ends of one sign, and values that are not finite, have their status', () => {
  expect(rootBetween((x) => x * x + 1, -1, 1).status).toBe('notBracketed');
  expect(rootBetween((x) => Math.log(x), -1, 2).status).toBe('notFinite');
  expect(rootBetween((x) => (Math.abs(x) > 0.9 ? x : NaN), -1, 1).status).toBe('notFinite');
});

test('ends that are not finite and a negative tolerance are refused', () => {
  expect(() => rootBetween((x) => x, -Infinity, 1)).toThrow(RangeError);
  expect(() => rootBetween((x) => x, -1, 1, -1)).toThrow(RangeError);
});
