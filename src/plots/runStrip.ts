/** The run strip: every record in the order it happened, at its impulse bit, with the run mean's interval behind. */
import type { RecordResult, Reduction, RunResult } from '../reduction/results.ts';
import { plain, withPlusMinus } from '../units/format.ts';
import { fromSi } from '../units/units.ts';
import type { Unit } from '../units/units.ts';
import { axis, frame, roomFor } from './axes.ts';
import type { Figure, FigureTable, Inks, Mark } from './figure.ts';
import { meanBand, zeroLine } from './lines.ts';
import type { Mean } from './lines.ts';
import { impulseUnit } from './impulseUnit.ts';
import { markSeries } from './marks.ts';
import { KIND_WORDS, readingOf } from './recordWords.ts';

const HEIGHT = 104;

/** A record's mark in the strip or among the shots; a record without an impulse bit stands on the zero line. */
export function impulseMark(record: RecordResult, x: number, unit: Unit): Mark {
  const { id, kind, impulseBit, ownU } = record;
  return {
    id,
    kind,
    setAside: record.setAside !== null,
    x,
    y: fromSi(impulseBit?.value ?? 0, unit),
    whisker: fromSi(impulseBit?.U ?? 0, unit),
    own: impulseBit === null ? 0 : fromSi(impulseBit.k * ownU, unit),
    across: 0,
    missing: impulseBit === null && kind !== 'zero' && kind !== 'freeSwing',
    reading: readingOf(record, unit),
  };
}

/** Impulse bits with U, U's own part and k, one row a record. */
export function impulseTable(records: readonly RecordResult[], unit: Unit): FigureTable {
  return {
    head: ['Record', 'Kind', `Impulse bit ± U`, 'k', 'Own part, k·u', 'Set aside'],
    rows: records.map(({ id, label, order, kind, impulseBit, ownU, setAside }) => ({
      id,
      cells: [
        label === '' ? String(order) : label,
        KIND_WORDS[kind],
        impulseBit === null ? '–' : withPlusMinus(impulseBit.value, impulseBit.U, unit),
        impulseBit === null ? '–' : impulseBit.k.toFixed(2),
        impulseBit === null ? '–' : plain(impulseBit.k * ownU, unit, 2),
        setAside ?? '',
      ],
    })),
  };
}

/** The run mean in the unit of the axis. */
export function meanIn(run: RunResult | null, unit: Unit): Mean | null {
  if (run === null) return null;
  const { mean, uScatter } = run;
  return { value: fromSi(mean.value, unit), half: fromSi(mean.U, unit), scatter: fromSi(mean.k * uScatter, unit) };
}

function countOfKinds(records: readonly RecordResult[]): string {
  const counts = new Map<string, number>();
  for (const { kind } of records) counts.set(kind, (counts.get(kind) ?? 0) + 1);
  return (['shot', 'tap', 'blank', 'zero', 'freeSwing'] as const)
    .flatMap((kind) => {
      const count = counts.get(kind) ?? 0;
      const word = KIND_WORDS[kind].toLowerCase();
      return count === 0 ? [] : [`${count} ${count === 1 ? word : `${word}s`}`];
    })
    .join(', ');
}

/** Every record of the run at its place and impulse bit, N·s in a fitting unit. */
export function runStrip({ records: all, run }: Pick<Reduction, 'records' | 'run'>, inks: Inks): Figure {
  // Weights and timings are evidence of the calibration; the run is of swings.
  const records = all.filter(({ kind }) => kind !== 'weight' && kind !== 'period');
  const unit = impulseUnit({ records, run });
  const marks = records.map((record) => impulseMark(record, record.order, unit));
  const { columns, series } = markSeries(marks, inks);
  const reach = marks.flatMap((mark) => [mark.y - mark.whisker, mark.y + mark.whisker]);
  const first = marks[0]?.x ?? 1;
  const last = marks.at(-1)?.x ?? 1;
  const asideCount = records.filter(({ setAside }) => setAside !== null).length;
  const mean = meanIn(run, unit);
  return {
    title: 'The run in order',
    summary: `${countOfKinds(records) || 'No records'}${asideCount === 0 ? '' : `, ${asideCount} set aside`}.`
      + (run === null ? '' : ` Run mean ${withPlusMinus(run.mean.value, run.mean.U, unit)} (U, 95 %).`),
    marks,
    columns,
    options: {
      ...frame({ low: first - 0.8, high: last + 0.8 }, roomFor([0, ...reach]), HEIGHT),
      axes: [axis({ label: '', side: 'bottom', whole: true, grid: false }, inks), axis({ label: unit.symbol, side: 'left', grid: false }, inks)],
      series,
      hooks: {
        drawAxes: [
          (u) => {
            if (mean !== null) meanBand(u, mean, inks);
            zeroLine(u, inks);
          },
        ],
      },
    },
    table: impulseTable(records, unit),
    nearest: 'x',
  };
}
