import { describe, expect, test } from 'vitest';
import { decayFigure } from '../../src/plots/decayFigure.ts';
import type { DecayTold } from '../../src/reduction/decayLaws.ts';
import { INKS } from './inksForTests.ts';

const TOLD: DecayTold = {
  record: 's1/2', law: 'viscous',
  readings: [[0, 0.05], [1, 0.04], [3, 0.0256]].map(([number, value]) => ({ number: number!, amplitude: { value: value!, u: 1e-4 } })),
  fits: [
    { law: 'viscous', parameter: { value: 0.071, u: 0.001 }, chiSquared: 0.4, dof: 1, amplitudes: [0.05, 0.04, 0.032, 0.0256] },
    { law: 'quadratic', parameter: { value: 1.6, u: 0.02 }, chiSquared: 120, dof: 0, amplitudes: [0.05, 0.041, 0.034, 0.029] },
  ],
};

describe('the figure of a swing that dies away', () => {
  const figure = decayFigure(TOLD, 'Free swing 1', INKS);

  test('has a mark and a row for each turning point, counted from the first swing, at its amplitude', () => {
    expect(figure.marks.map(({ x, y }) => [x, Number(y.toFixed(9))])).toEqual([[1, 50], [2, 40], [4, 25.6]]);
    expect(figure.marks[0]!.whisker).toBeCloseTo(0.2, 12);
    expect(figure.table.rows.map(({ id }) => id)).toEqual(figure.marks.map(({ id }) => id));
    for (const { cells } of figure.table.rows) expect(cells).toHaveLength(figure.table.head.length);
    expect(figure.table.rows[2]!.cells[3]).toContain('29');
  });

  test('says each law with its figure and how well it fits, and which one is used', () => {
    expect(figure.summary).toContain('Free swing 1');
    expect(figure.summary).toMatch(/viscous \(whole line\), ζ = [^;]*χ² = 0\.4 for 1, used/);
    expect(figure.summary).toMatch(/quadratic \(dashed\), β = [^;]*through every reading/);
    expect(figure.table.head[2]).toContain('used');
  });

  test('begins at nought and leaves no gap as NaN', () => {
    for (const column of figure.columns) expect([...column].every((value) => value === null || Number.isFinite(value))).toBe(true);
    expect(figure.options.series).toHaveLength(figure.columns.length);
  });
});
