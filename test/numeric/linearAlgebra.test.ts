/** Cholesky and Householder QR. */
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { cholesky, columnBasis, forwardSubstitute, leastSquares, solveSymmetric, transposeSubstitute, uprightTo } from '../../src/numeric/linearAlgebra.ts';
import type { LeastSquaresSolution, Matrix } from '../../src/numeric/linearAlgebra.ts';
import reference from '../reference/linear-fits.json' with { type: 'json' };
import { digits } from './digits.ts';

function solved(j: Matrix, y: readonly number[]): LeastSquaresSolution {
  const result = leastSquares(j, y);
  if (result.status !== 'solved') throw new Error(result.status);
  return result;
}

describe('Cholesky', () => {
  test('factors a matrix made from its factor', () => {
    const result = cholesky([[4, 12, -16], [12, 37, -43], [-16, -43, 98]]);
    expect(result).toEqual({ status: 'factored', lower: [[2, 0, 0], [6, 1, 0], [-8, 5, 3]] });
  });

  test('solves what it factored', () => {
    const a = [[4, 1, 0.5], [1, 3, -1], [0.5, -1, 2]];
    const x = [1.5, -2, 0.25];
    const result = solveSymmetric(a, a.map((row) => row.reduce((sum, value, k) => sum + value * x[k]!, 0)));
    if (result.status !== 'solved') throw new Error(result.status);
    result.x.forEach((value, i) => expect(digits(value, x[i]!)).toBeGreaterThan(14));
  });

  test('its triangle is solved forward and transposed', () => {
    const lower = [[2, 0, 0], [6, 1, 0], [-8, 5, 3]];
    expect(forwardSubstitute(lower, [2, 5, 1])).toEqual([1, -1, 14 / 3]);
    // Lᵀx for x = (1, 2, 3): 2 + 12 − 24, 2 + 15, 9.
    expect(transposeSubstitute(lower, [-10, 17, 9])).toEqual([1, 2, 3]);
  });

  test('a matrix that is indefinite, singular or zero has its status', () => {
    for (const a of [[[1, 2], [2, 1]], [[1, 1], [1, 1]], [[0]], [[-1]]]) {
      expect(cholesky(a).status).toBe('notPositiveDefinite');
      expect(solveSymmetric(a, a.map(() => 1)).status).toBe('notPositiveDefinite');
    }
  });

  test('sizes that do not fit are refused', () => {
    expect(() => cholesky([[1, 2]])).toThrow(RangeError);
    expect(() => cholesky([])).toThrow(RangeError);
    expect(() => solveSymmetric([[1]], [1, 2])).toThrow(RangeError);
  });
});

describe('least squares by QR', () => {
  // Source: NIST StRD linear regression, Norris, certified values.
  test('gives NIST’s Norris line to 12 digits, its standard deviations to 13', () => {
    const { inputs, expected } = reference.find((entry) => entry.id === 'c02-norris')!;
    const fit = solved(inputs.x.map((x) => [1, Number(x)]), inputs.y.map(Number));
    const s = Math.sqrt(fit.sumOfSquares / fit.dof);
    expect(digits(fit.x[0]!, Number(expected.B0))).toBeGreaterThan(12);
    expect(digits(fit.x[1]!, Number(expected.B1))).toBeGreaterThan(13);
    expect(digits(s * Math.sqrt(fit.covariance[0]![0]!), Number(expected.sB0))).toBeGreaterThan(13);
    expect(digits(s * Math.sqrt(fit.covariance[1]![1]!), Number(expected.sB1))).toBeGreaterThan(13);
  });

  test('leaves residuals at right angles to every column', () => {
    const numbers = fc.double({ min: -1e3, max: 1e3, noNaN: true });
    fc.assert(
      fc.property(fc.array(fc.tuple(numbers, numbers, numbers, numbers), { minLength: 5, maxLength: 12 }), (rows) => {
        const j = rows.map((row) => row.slice(0, 3));
        const y = rows.map((row) => row[3]);
        const fit = leastSquares(j, y);
        if (fit.status !== 'solved') return;
        const size = Math.hypot(...y) + Math.hypot(...j.flat()) * Math.hypot(...fit.x);
        for (const k of [0, 1, 2]) {
          const dot = j.reduce((sum, row, i) => sum + row[k]! * fit.residuals[i]!, 0);
          expect(Math.abs(dot)).toBeLessThanOrEqual(1e-12 * size * (Math.hypot(...j.map((row) => row[k]!)) + Number.MIN_VALUE));
        }
      }),
    );
  });

  test('as many observations as unknowns are met exactly', () => {
    const fit = solved([[2, 1], [1, 3]], [5, 10]);
    expect(fit.dof).toBe(0);
    expect(fit.x[0]).toBeCloseTo(1, 14);
    expect(fit.x[1]).toBeCloseTo(3, 14);
  });

  test('columns that depend on each other, a column of zeros, and too few rows are rank deficient', () => {
    expect(leastSquares([[1, 2], [2, 4], [3, 6]], [1, 2, 3]).status).toBe('rankDeficient');
    expect(leastSquares([[1, 0.1, 1.1], [1, 0.2, 1.2], [1, 0.7, 1.7], [1, 0.9, 1.9]], [1, 2, 3, 4]).status).toBe('rankDeficient');
    expect(leastSquares([[1, 0], [2, 0], [3, 0]], [1, 2, 3]).status).toBe('rankDeficient');
    expect(leastSquares([[1, 2]], [1]).status).toBe('rankDeficient');
  });

  test('columns of very different size are not mistaken for rank deficiency', () => {
    expect(leastSquares([[1e-12, 1], [2e-12, -1], [3e-12, 2]], [1, 2, 3]).status).toBe('solved');
  });

  test('sizes that do not fit and numbers that are not finite are refused', () => {
    expect(() => leastSquares([[1], [2]], [1])).toThrow(RangeError);
    expect(() => leastSquares([[1], [2, 3]], [1, 2])).toThrow(RangeError);
    expect(() => leastSquares([[1], [NaN]], [1, 2])).toThrow(RangeError);
    expect(() => leastSquares([], [])).toThrow(RangeError);
  });
});

describe('orthonormal basis of columns', () => {
  test('gives the columns back from Q R, and its triangle that of the hand case (3, 4), (1, 2)', () => {
    const { q, r, fullRank } = columnBasis([[3, 4], [1, 2]]);
    expect(fullRank).toBe(true);
    // Q = (3, 4)/5 and (−4, 3)/5 by hand: R = 5, 11/5, 2/5.
    [[0, 0, 5], [0, 1, 2.2], [1, 1, 0.4]].forEach(([i, k, value]) => expect(r[i!]![k!]).toBeCloseTo(value!, 14));
    [[0.6, 0.8], [-0.8, 0.6]].forEach((column, k) => column.forEach((value, i) => expect(q[k]![i]).toBeCloseTo(value, 14)));
  });

  test('stays orthonormal where columns are nearly one (Läuchli’s columns, 1961, from memory)', () => {
    const small = 1e-8;
    const { q, fullRank } = columnBasis([[1, small, 0, 0], [1, 0, small, 0], [1, 0, 0, small]]);
    expect(fullRank).toBe(true);
    for (const [j, a] of q.entries()) for (const [k, b] of q.entries()) expect(a.reduce((sum, value, i) => sum + value * b[i]!, 0)).toBeCloseTo(j === k ? 1 : 0, 14);
  });

  test('a column that adds nothing loses full rank, and what is upright on all is parted', () => {
    expect(columnBasis([[1, 2, 3], [2, 4, 6]]).fullRank).toBe(false);
    expect(columnBasis([[0, 0]]).fullRank).toBe(false);
    const { q } = columnBasis([[1, 0, 0], [1, 1, 0]]);
    const { upright, coefficients } = uprightTo(q, [3, 4, 5]);
    expect(upright).toEqual([0, 0, 5]);
    expect(coefficients).toEqual([3, 4]);
  });
});
