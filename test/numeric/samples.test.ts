/** Mean and standard deviation against NIST's certified values. */
import { describe, expect, test } from 'vitest';
import { mean, median, sampleStandardDeviation } from '../../src/numeric/samples.ts';
import reference from '../reference/samples.json' with { type: 'json' };
import { digits } from './digits.ts';

/** NumAcc2–4 are given as a first value and 500 times a pair. */
function valuesOf(y: readonly number[] | string): readonly number[] {
  if (typeof y !== 'string') return y;
  const [first, low, high] = y.replace('500 x', '').match(/[\d.]+/g)!.map(Number);
  return [first!, ...Array.from({ length: 500 }, () => [low!, high!]).flat()];
}

/** Digits of s that the data, as doubles, can give (notes of the reference); the others reach 13. */
const DIGITS_OF_DEVIATION: Readonly<Record<string, number>> = { 'c01-NumAcc3': 9, 'c01-NumAcc4': 8 };

// Source: NIST Statistical Reference Datasets, univariate summary statistics, certified values.
describe.each(reference)('$title', ({ id, inputs, expected }) => {
  const values = valuesOf(inputs.y);

  test('has as many values as NIST states', () => {
    expect(values).toHaveLength(inputs.n);
  });

  // Certified to 15 digits.
  test('gives the certified mean to 14 digits', () => {
    expect(digits(mean(values), Number(expected.mean))).toBeGreaterThan(14);
  });

  test(`gives the certified standard deviation to ${DIGITS_OF_DEVIATION[id] ?? 13} digits`, () => {
    expect(digits(sampleStandardDeviation(values), Number(expected.sd))).toBeGreaterThan((DIGITS_OF_DEVIATION[id] ?? 13) - 0.3);
  });
});

test('the median is the middle value, or halfway between the middle two', () => {
  expect(median([3, 1, 2])).toBe(2);
  expect(median([4, 1, 3, 2])).toBe(2.5);
  expect(median([7])).toBe(7);
});

test('a sample is left as it came', () => {
  const values = [3, 1, 2];
  median(values);
  expect(values).toEqual([3, 1, 2]);
});

test('too few values, or one that is not finite, are refused', () => {
  expect(() => mean([])).toThrow(RangeError);
  expect(() => median([])).toThrow(RangeError);
  expect(() => sampleStandardDeviation([1])).toThrow(RangeError);
  expect(() => mean([1, NaN])).toThrow(RangeError);
  expect(() => sampleStandardDeviation([1, Infinity])).toThrow(RangeError);
});

test('equal values do not scatter', () => {
  expect(sampleStandardDeviation([0.1, 0.1, 0.1])).toBe(0);
});
