/** Residuals of the taps from their line, in the order of the run or over time, and against the throw. */
import type { Reduction } from '../reduction/results.ts';
import { axis, frame, roomFor } from './axes.ts';
import type { Figure, Inks, Mark } from './figure.ts';
import { zeroLine } from './lines.ts';
import { markSeries } from './marks.ts';
import { recordName } from './recordWords.ts';

const HEIGHT = 180;
const LIMIT = 2;

/** null without taps that have a residual. */
export function tapResiduals({ records, tapStudy }: Pick<Reduction, 'records' | 'tapStudy'>, inks: Inks): Figure | null {
  const points = [...(tapStudy?.points ?? [])].sort((a, b) => a.place - b.place);
  const byId = new Map(records.map((record) => [record.id, record]));
  const timed = points.length > 0 && points.every(({ record }) => byId.get(record)?.readings.time !== null) && new Set(points.map(({ place }) => place)).size > 1;
  const first = points[0]?.place ?? 0;
  const rows = points.flatMap(({ record, place, residual, leverage }, index) => {
    const found = byId.get(record);
    return found === undefined ? [] : [{ record: found, x: timed ? (place - first) / 60 : index + 1, residual, leverage }];
  });
  if (rows.length < 2) return null;
  const marks = rows.map(({ record, x, residual }): Mark => ({
    id: record.id, kind: 'tap', setAside: false, x, y: residual, whisker: 0, own: 0, across: 0, missing: false, reading: `${recordName(record)}, ${residual.toFixed(1).replace('-', '−')} u from the line`,
  }));
  const { columns, series } = markSeries(marks, inks);
  return {
    title: 'Residuals of the taps',
    summary: `Distance of each tap from the line through the origin, in the uncertainty of what belongs to it alone, ${timed ? 'over time' : 'in the order of the run'}. A slope or a step here is a drift; beyond ±${LIMIT} lies one in twenty.`,
    marks,
    columns,
    options: {
      ...frame(roomFor(marks.map(({ x }) => x)), roomFor([...marks.map(({ y }) => y), -LIMIT, LIMIT]), HEIGHT),
      axes: [axis({ label: timed ? 'Time since the first tap (min)' : 'Tap, in the order of the run', side: 'bottom', whole: !timed, grid: false }, inks), axis({ label: 'Residual (u)', side: 'left' }, inks)],
      series,
      hooks: { drawAxes: [(u) => zeroLine(u, inks)] },
    },
    table: { head: ['Tap', 'Residual in u', 'Leverage'], rows: rows.map(({ record, residual, leverage }) => ({ id: record.id, cells: [recordName(record), residual.toFixed(2).replace('-', '−'), leverage.toFixed(3)] })) },
    nearest: 'both',
  };
}
