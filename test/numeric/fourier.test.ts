import { describe, expect, it } from 'vitest';
import { laggedProducts, powers, powerOfTwo } from '../../src/numeric/fourier.ts';
import { draws } from '../metrology/sources.ts';

const record = (n: number): Float64Array => {
  const { normal } = draws(2);
  return Float64Array.from({ length: n }, () => normal());
};

describe('Fourier transforms of real records', () => {
  it('have the power that the sum itself has', () => {
    const x = record(64);
    powers(x).forEach((value, j) => {
      let [re, im] = [0, 0];
      x.forEach((y, k) => {
        re += y * Math.cos((2 * Math.PI * j * k) / 64);
        im -= y * Math.sin((2 * Math.PI * j * k) / 64);
      });
      expect(value).toBeCloseTo(re * re + im * im, 9);
    });
  });

  it('keep the sum of squares (Parseval)', () => {
    const x = record(256);
    const found = powers(x);
    const whole = found.reduce((sum, value, j) => sum + value * (j === 0 || j === 128 ? 1 : 2), 0) / 256;
    expect(whole).toBeCloseTo(x.reduce((sum, y) => sum + y * y, 0), 9);
  });

  it.each([5, 64, 100])('lagged products of %d values are those of the sums', (n) => {
    const x = record(n);
    laggedProducts(x, 4).forEach((value, l) => {
      let sum = 0;
      for (let k = 0; k + l < n; k++) sum += x[k]! * x[k + l]!;
      expect(value).toBeCloseTo(sum, 10);
    });
  });

  it('need a power of two', () => {
    expect([1, 2, 3, 4, 5, 1000].map(powerOfTwo)).toEqual([2, 2, 4, 4, 8, 1024]);
  });
});
