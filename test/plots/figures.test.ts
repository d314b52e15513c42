import { describe, expect, test } from 'vitest';
import type { Reduction } from '../../src/reduction/results.ts';
import type { Figure } from '../../src/plots/figure.ts';
import { runStrip } from '../../src/plots/runStrip.ts';
import { shotsFigure } from '../../src/plots/shotsFigure.ts';
import { tapsAndShots, tapRangeSentence } from '../../src/plots/tapsAndShots.ts';
import { record, RECORDS, REDUCTION, stated } from '../page/reductionFixture.ts';
import { INKS } from './inksForTests.ts';

const FIGURES: readonly (readonly [string, (reduction: Reduction) => Figure])[] = [
  ['the run strip', (reduction) => runStrip(reduction, INKS)],
  ['the shots', (reduction) => shotsFigure(reduction, INKS)],
  ['taps and shots', (reduction) => tapsAndShots(reduction, INKS)],
];

describe.each(FIGURES)('%s', (_, draw) => {
  const figure = draw(REDUCTION);

  test('x rises from mark to mark, as the plotter needs it', () => {
    const xs = [...figure.columns[0]];
    expect(xs).toEqual([...xs].sort((a, b) => a - b));
    expect(xs).toHaveLength(figure.marks.length);
  });

  test('each column has a place for every mark, and each mark stands in one series', () => {
    const [, ...columns] = figure.columns;
    for (const column of columns) expect(column).toHaveLength(figure.marks.length);
    figure.marks.forEach((_mark, place) => {
      // A series of whiskers' own parts and one of signs for each kind.
      expect(columns.filter((column) => column[place] !== null)).toHaveLength(2);
    });
    expect(figure.options.series).toHaveLength(figure.columns.length);
  });

  test('no gap is written as NaN', () => {
    const [, ...columns] = figure.columns;
    for (const column of columns) expect([...column].every((value) => value === null || Number.isFinite(value))).toBe(true);
  });

  test('the table has a row for each mark, in the same order', () => {
    expect(figure.table.rows.map(({ id }) => id)).toEqual(figure.marks.map(({ id }) => id));
    for (const row of figure.table.rows) expect(row.cells).toHaveLength(figure.table.head.length);
  });

  test('an empty run gives an empty figure', () => {
    expect(draw({ ...REDUCTION, records: [], run: null }).marks).toEqual([]);
  });
});

describe('the run strip', () => {
  const { marks, summary } = runStrip(REDUCTION, INKS);

  test('every record stands at its place in the run and at its impulse bit', () => {
    expect(marks).toHaveLength(RECORDS.length);
    expect(marks[3]).toMatchObject({ x: 4, kind: 'shot' });
    expect(marks[3]?.y).toBeCloseTo(1.25, 12);
  });

  test('a zero stands on the zero line and is not missing; a shot without an impulse bit is', () => {
    expect(marks[0]).toMatchObject({ kind: 'zero', y: 0, missing: false });
    expect(marks[8]).toMatchObject({ kind: 'shot', y: 0, missing: true, reading: 'Shot 5, no impulse bit' });
  });

  test('the thick part of a whisker is the record’s own uncertainty times the k of the whole', () => {
    expect(marks[3]?.own).toBeCloseTo(1.98 * 4e-3, 12);
    expect(marks[3]?.whisker).toBeCloseTo(1.98 * Math.hypot(4e-3, 0.0125), 12);
    for (const mark of marks) expect(mark.own).toBeLessThanOrEqual(mark.whisker);
  });

  test('a record set aside says why', () => {
    expect(marks[5]?.reading).toBe('Shot 3, 0.0143 ± 0.0079 mN·s (U), set aside: misfire');
  });

  test('the summary counts the kinds and gives the mean with U', () => {
    expect(summary).toBe('6 shots, 3 taps, 1 blank, 1 zero, 1 set aside. Run mean 1.252 ± 0.031 mN·s (U, 95 %).');
  });
});

describe('the shots', () => {
  const figure = shotsFigure(REDUCTION, INKS);

  test('shots are numbered from one, set aside ones too, and nothing else is in the figure', () => {
    expect(figure.marks.map(({ x }) => x)).toEqual([1, 2, 3, 4, 5, 6]);
    expect(figure.marks.every(({ kind }) => kind === 'shot')).toBe(true);
  });

  test('the figure says that its whiskers and band are U', () => {
    expect(figure.summary).toContain('Thin whiskers: U of each shot (95 %)');
    expect(figure.summary).toContain('Ī = 1.252 ± 0.031 mN·s (U, k = 1.97, 95 %)');
  });

  test('a misfire off the axis is told in words', () => {
    expect(figure.summary).toContain('At the edge, beyond the axis: Shot 3');
    expect(figure.summary).toContain('A cross: Shot 5, no impulse bit.');
  });

  test('the axis names the quantity and its unit', () => {
    expect(figure.options.axes?.map(({ label }) => label)).toEqual(['Shot number, in the order of the run', 'Impulse bit  (mN·s)']);
  });
});

describe('taps and shots', () => {
  const { marks, summary } = tapsAndShots(REDUCTION, INKS);
  const mark = (id: string) => marks.find((one) => one.id === id);

  test('a tap stands at its stated angular impulse with bars in both directions', () => {
    // 1.2 mN·s at 0.25 m.
    expect(mark('s1/3')?.y).toBeCloseTo(300, 9);
    expect(mark('s1/3')?.x).toBeCloseTo(30, 9);
    expect(mark('s1/3')?.across).toBeGreaterThan(0);
    expect(mark('s1/3')?.whisker).toBeCloseTo(2 * 0.021 * 300, 9);
  });

  test('a shot stands on the line of the chosen factor', () => {
    expect(mark('s1/5')?.y).toBeCloseTo(350, 9);
  });

  test('the summary tells that the shots lie inside the taps’ range', () => {
    expect(summary).toContain('All shots lie inside the range that the taps cover');
  });

  test('shots beyond the taps are told with how far', () => {
    expect(tapRangeSentence({ where: 'beyond', above: 0.12, below: 0 })).toBe(
      'Not all shots lie inside the range that the taps cover: the largest shot lies 12 % above the largest tap.',
    );
    expect(tapRangeSentence({ where: 'beyond', above: 0, below: 0.034 })).toContain('the smallest shot lies 3.4 % below the smallest tap');
  });

  test('a record without a swing is left out', () => {
    expect(mark('s1/10')).toBe(undefined);
  });

  test('a tap whose impulse is not stated is left out', () => {
    const bare = { ...record({ order: 1, kind: 'tap', label: 'T', swing: 0.03 }), angularImpulse: null };
    expect(tapsAndShots({ ...REDUCTION, records: [bare] }, INKS).marks).toEqual([]);
  });

  test('the dashed line of the taps is drawn only where the configuration changed', () => {
    const { taps } = REDUCTION.calibrations;
    if (taps === null) throw new Error('The fixture has taps');
    const unchanged = { ...REDUCTION, calibrations: { ...REDUCTION.calibrations, taps: { ...taps, change: stated(1, 0) } } };
    expect(summary).toContain('Dashed');
    expect(tapsAndShots(unchanged, INKS).summary).not.toContain('Dashed');
  });
});
