import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { clampedCoefficient } from '../../src/pendulum/filmStrip.ts';
import type { FilmTableChoice } from '../../src/pendulum/filmTable.ts';
import { coefficientFrom, covers, tabulate } from '../../src/pendulum/filmTable.ts';

const CHOICE: FilmTableChoice = { hold: 'clamped', plateRatio: 0, zoneFrom: 0.8, zoneTo: 1, readAt: 1, stiffness: [6e-4, 2.4e-3], damping: [0.01, 0.04], tolerance: 1e-3 };
const X = (stiffnessNumber: number, dampingRatio: number): number => clampedCoefficient({ ...CHOICE, stiffnessNumber, dampingRatio });

describe('the table of a film’s coefficient', () => {
  const table = tabulate(CHOICE);

  test('keeps its tolerance between its points', () => {
    expect(table.status).toBe('within');
    expect(table.largestGap).toBeLessThanOrEqual(CHOICE.tolerance);
    fc.assert(fc.property(fc.double({ min: 0, max: 1, noNaN: true }), fc.double({ min: 0.01, max: 0.04, noNaN: true }), (share, ratio) => {
      const S = 6e-4 * 4 ** share;
      expect(Math.abs(coefficientFrom(table, S, ratio) / X(S, ratio) - 1)).toBeLessThan(1.5 * CHOICE.tolerance);
    }), { numRuns: 30 });
  });

  test('has at its points what the modes have there', () => {
    for (const [S, ratio] of [[6e-4, 0.01], [2.4e-3, 0.04], [6e-4, 0.04]] as const) expect(coefficientFrom(table, S, ratio) / X(S, ratio)).toBeCloseTo(1, 10);
  });

  test('stays at its edge outside, where it says that it does not cover', () => {
    expect(coefficientFrom(table, 1e-5, 0.5)).toBe(coefficientFrom(table, 6e-4, 0.04));
    expect(covers(table, 1e-3, 0.02)).toBe(true);
    expect([covers(table, 1e-5, 0.02), covers(table, 1e-3, 0.005)]).toEqual([false, false]);
  });

  test('is plain data that a message carries', () => {
    expect(coefficientFrom(structuredClone(table), 1e-3, 0.02)).toBe(coefficientFrom(table, 1e-3, 0.02));
  });
});

test('a damping or a stiffness that is held takes one row or one column', () => {
  const row = tabulate({ ...CHOICE, damping: [0.02, 0.02] });
  expect([row.rows, row.status]).toEqual([1, 'within']);
  expect(coefficientFrom(row, 2.4e-3, 0.02) / X(2.4e-3, 0.02)).toBeCloseTo(1, 12);
  const column = tabulate({ ...CHOICE, stiffness: [1e-3, 1e-3] });
  expect(column.columns).toBe(1);
  expect(Math.abs(coefficientFrom(column, 1e-3, 0.025) / X(1e-3, 0.025) - 1)).toBeLessThan(1e-3);
});

test('a tolerance that kinks do not allow ends at the limit, and says what it reaches', () => {
  const coarse = tabulate({ ...CHOICE, stiffness: [1.2e-3, 1.25e-3], damping: [0, 0.01], tolerance: 1e-12 });
  expect(coarse.status).toBe('limit');
  expect(coarse.largestGap).toBeGreaterThan(1e-12);
  expect(coarse.largestGap).toBeLessThan(2e-3);
});

test('a range out of order or without a tolerance throws', () => {
  for (const wrong of [{ stiffness: [0, 1] }, { stiffness: [2, 1] }, { damping: [0.1, 0] }, { tolerance: 0 }] as const) expect(() => tabulate({ ...CHOICE, ...wrong })).toThrow(RangeError);
});
