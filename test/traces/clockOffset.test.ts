import { describe, expect, it } from 'vitest';
import { clockOffset } from '../../src/traces/clockOffset.ts';
import { draws } from '../metrology/sources.ts';

const LISTED = [10, 31, 47.5, 78, 90.2, 121];

describe('the offset of a list’s clock', () => {
  it('is found with shots missing and others found that are none', () => {
    const { normal } = draws(4);
    const found = [3.3, ...LISTED.filter((_, k) => k !== 2).map((time) => time + 7.4 + 0.01 * normal()), 200].sort((a, b) => a - b);
    const offset = clockOffset(LISTED, found, 0.2);
    expect(offset).toMatchObject({ status: 'found', matched: 5 });
    if (offset.status !== 'found') return;
    expect(Math.abs(offset.offset - 7.4)).toBeLessThan(4 * offset.u);
    expect(offset.u).toBeLessThan(0.01);
  });

  it('tells a clock that goes at another rate', () => {
    const offset = clockOffset(LISTED, LISTED.map((time) => 2 + time * 1.001), 0.3);
    expect(offset.status === 'found' ? offset.drift?.value : null).toBeCloseTo(0.001, 9);
  });

  it('is open where the shots are evenly spaced and some are missing', () => {
    const even = Array.from({ length: 10 }, (_, k) => 20 * k);
    const offset = clockOffset(even, even.slice(1).map((time) => time + 3), 0.2);
    expect(offset.status).toBe('ambiguous');
    expect(offset.status === 'ambiguous' ? offset.offsets.map((value) => Number(value.toFixed(6))) : []).toEqual(expect.arrayContaining([3, 23]));
  });

  it('is none where nothing fits', () => {
    expect(clockOffset(LISTED, [], 0.2).status).toBe('none');
    expect(clockOffset([], [1, 2], 0.2).status).toBe('none');
  });
});
