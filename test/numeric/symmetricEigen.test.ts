import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { symmetricEigen } from '../../src/numeric/symmetricEigen.ts';

function solved(n: number, a: readonly number[] | Float64Array) {
  const found = symmetricEigen(n, Float64Array.from(a));
  if (found.status !== 'found') throw new Error(`not found: ${found.status}`);
  return found;
}

/** Largest entry of A v − λ v and of V Vᵀ − 1. */
function defects(n: number, a: Float64Array | readonly number[], { values, vectors }: ReturnType<typeof solved>) {
  let equation = 0;
  let orthogonality = 0;
  for (let k = 0; k < n; k += 1) {
    for (let i = 0; i < n; i += 1) {
      let image = 0;
      let product = 0;
      for (let j = 0; j < n; j += 1) {
        image += a[i * n + j]! * vectors[k * n + j]!;
        product += vectors[k * n + j]! * vectors[i * n + j]!;
      }
      equation = Math.max(equation, Math.abs(image - values[k]! * vectors[k * n + i]!));
      orthogonality = Math.max(orthogonality, Math.abs(product - (i === k ? 1 : 0)));
    }
  }
  return { equation, orthogonality };
}

// J. B. Rosser's matrix of 1951, from memory.
const ROSSER = [
  611, 196, -192, 407, -8, -52, -49, 29,
  196, 899, 113, -192, -71, -43, -8, -44,
  -192, 113, 899, 196, 61, 49, 8, 52,
  407, -192, 196, 611, 8, 44, 59, -23,
  -8, -71, 61, 8, 411, -599, 208, 208,
  -52, -43, 49, 44, -599, 411, 208, 208,
  -49, -8, 8, 59, 208, 208, 99, -911,
  29, -44, 52, -23, 208, 208, -911, 99,
];

describe('eigenvalues of a symmetric matrix', () => {
  test('two by two is the quadratic equation', () => {
    const { values, vectors } = solved(2, [2, 1, 1, 2]);
    expect(values[0]).toBeCloseTo(1, 14);
    expect(values[1]).toBeCloseTo(3, 14);
    expect(Math.abs(vectors[2]! - vectors[3]!)).toBeLessThan(1e-15);
  });

  test('a chain of equal masses has the eigenvalues 2 − 2 cos(kπ/(n + 1))', () => {
    const n = 40;
    const a = new Float64Array(n * n);
    for (let i = 0; i < n; i += 1) {
      a[i * n + i] = 2;
      if (i > 0) a[i * n + i - 1] = a[(i - 1) * n + i] = -1;
    }
    solved(n, a).values.forEach((value, k) => expect(value).toBeCloseTo(2 - 2 * Math.cos(((k + 1) * Math.PI) / (n + 1)), 13));
  });

  test('Rosser’s matrix, with a double, a zero and two nearly equal eigenvalues, comes out in full', () => {
    const far = 10 * Math.sqrt(10405);
    const near = 100 * Math.sqrt(26);
    const expected = [-far, 0, 510 - near, 1000, 1000, 510 + near, 1020, far];
    solved(8, ROSSER).values.forEach((value, k) => expect(Math.abs(value - expected[k]!)).toBeLessThan(1e-11));
  });

  test('the vectors are orthonormal and satisfy the equation for any matrix, its zeros included', () => {
    const entry = fc.oneof(fc.constant(0), fc.double({ min: -1, max: 1, noNaN: true }), fc.constantFrom(1, -1, 1e-300, -1e-162, 1e-120, 1e-90, 1e-9));
    const matrix = fc.integer({ min: 1, max: 14 }).chain((n) => fc.array(entry, { minLength: n * n, maxLength: n * n }).map((all) => ({ n, all })));
    fc.assert(fc.property(matrix, ({ n, all }) => {
      const a = Float64Array.from(all, (_, at) => all[Math.max(at, (at % n) * n + Math.floor(at / n))]!);
      const found = solved(n, a);
      const { equation, orthogonality } = defects(n, a, found);
      expect(equation).toBeLessThan(1e-14 * n);
      expect(orthogonality).toBeLessThan(1e-14 * n);
      expect([...found.values]).toEqual([...found.values].sort((x, y) => x - y));
    }));
  });

  test('a matrix of very small or very large numbers is that of ordinary ones, scaled', () => {
    for (const scale of [2 ** -900, 2 ** 900]) {
      const { values } = solved(8, ROSSER.map((entry) => entry * scale));
      solved(8, ROSSER).values.forEach((value, k) => expect(values[k]! / scale).toBe(value));
    }
    expect([...solved(3, new Float64Array(9)).values]).toEqual([0, 0, 0]);
  });

  test('the matrix given is left as it was, and only its lower triangle is read', () => {
    const a = Float64Array.from([2, 99, 1, 2]);
    const found = symmetricEigen(2, a);
    expect([...a]).toEqual([2, 99, 1, 2]);
    expect(found.status === 'found' && Math.abs(found.values[1]! - 3) < 1e-14).toBe(true);
  });

  test('a matrix with an entry that is not finite has a status, and a wrong size throws', () => {
    expect(symmetricEigen(2, Float64Array.from([1, 0, Number.NaN, 1])).status).toBe('notFinite');
    expect(() => symmetricEigen(3, new Float64Array(4))).toThrow(RangeError);
  });
});
