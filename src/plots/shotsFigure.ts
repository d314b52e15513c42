/** Impulse bit against shot number, with U, the run mean and its interval. */
import type { Reduction } from '../reduction/results.ts';
import { withPlusMinus } from '../units/format.ts';
import { fromSi } from '../units/units.ts';
import { axis, frame, roomForBoth } from './axes.ts';
import type { Figure, Inks, Mark } from './figure.ts';
import { impulseUnit } from './impulseUnit.ts';
import { meanBand } from './lines.ts';
import { markSeries } from './marks.ts';
import { impulseMark, impulseTable } from './runStrip.ts';

const HEIGHT = 320;

const span = (mark: Mark): number[] => [mark.y - mark.whisker, mark.y + mark.whisker];

/** The shots, counted from one in the order of the run. What is set aside and lies far off is drawn at the edge, and the summary says so. */
export function shotsFigure(reduction: Reduction, inks: Inks): Figure {
  const { run } = reduction;
  const unit = impulseUnit(reduction);
  const shots = reduction.records.filter(({ kind }) => kind === 'shot');
  const marks = shots.map((shot, index) => impulseMark(shot, index + 1, unit));
  const { columns, series } = markSeries(marks, inks);
  const mean = run === null ? null : { value: fromSi(run.mean.value, unit), half: fromSi(run.mean.U, unit) };
  const withValue = marks.filter((mark) => !mark.missing);
  const y = roomForBoth(
    [...withValue.filter((mark) => !mark.setAside).flatMap(span), ...(mean === null ? [] : [mean.value - mean.half, mean.value + mean.half])],
    withValue.filter((mark) => mark.setAside).flatMap(span),
  );
  const outside = marks.filter((mark) => mark.y < y.low || mark.y > y.high);
  return {
    title: 'Impulse bit against shot number',
    summary: [
      'Thin whiskers: U of each shot (95 %); thick: its own part, which other shots do not share.',
      run === null ? 'No run mean yet.' : `Line and band: run mean ${withPlusMinus(run.mean.value, run.mean.U, unit)} (U, k = ${run.mean.k.toFixed(2)}, 95 %).`,
      outside.length === 0 ? '' : `At the edge, beyond the axis: ${outside.map((mark) => mark.reading).join('; ')}.`,
    ].filter((part) => part !== '').join(' '),
    marks,
    columns,
    options: {
      ...frame({ low: 0.4, high: marks.length + 0.6 }, y, HEIGHT),
      axes: [
        axis({ label: 'Shot number, in the order of the run', side: 'bottom', whole: true, grid: false }, inks),
        axis({ label: `Impulse bit  (${unit.symbol})`, side: 'left' }, inks),
      ],
      series,
      hooks: {
        drawAxes: [
          (u) => {
            if (mean !== null) meanBand(u, mean.value, mean.half, inks, 'run mean ± U (95 %)');
          },
        ],
      },
    },
    table: impulseTable(shots, unit),
    nearest: 'both',
  };
}
