import { describe, expect, test } from 'vitest';
import { beside, ends, placeInTapRange, widestFormGap } from '../../src/reduction/beside.ts';

const result = (value: number, u: number) => ({ value, u, dof: Infinity, k: 2, U: 2 * u });

describe('one result beside another', () => {
  test('the interval ends lie U to either side', () => {
    expect(ends(result(10, 0.5))).toEqual([9, 11]);
  });

  test('the distance is told relative and in standard uncertainties of the first', () => {
    expect(beside(result(10, 0.5), result(11, 9))).toEqual({ relative: 0.1, inU: 2 });
  });

  test('a first value of nothing, or without uncertainty, has no such ratio', () => {
    expect(beside({ value: 0, u: 0 }, { value: 1, u: 1 })).toEqual({ relative: null, inU: null });
  });

  test('no shots have no widest gap of forms', () => {
    expect(widestFormGap([])).toBe(null);
  });
});

describe('shots in the range of the taps', () => {
  test('well inside is inside', () => {
    expect(placeInTapRange([10, 20], [14, 16])?.where).toBe('inside');
  });

  test('within a twentieth of the range from its end is at the edge', () => {
    expect(placeInTapRange([10, 20], [14, 19.6])?.where).toBe('edge');
    expect(placeInTapRange([10, 20], [10, 16])?.where).toBe('edge');
  });

  test('beyond is told relative to the outermost tap', () => {
    expect(placeInTapRange([10, 20], [9, 22])).toEqual({ where: 'beyond', below: 0.1, above: 0.1 });
  });

  test('without taps or shots there is nothing to place', () => {
    expect(placeInTapRange(null, [1, 2])).toBe(null);
    expect(placeInTapRange([1, 2], null)).toBe(null);
  });
});
