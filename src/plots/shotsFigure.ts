/** Impulse bit against shot number, with U, the run mean and its interval. */
import type { Reduction } from '../reduction/results.ts';
import { withPlusMinus } from '../units/format.ts';
import { axis, frame, roomForBoth } from './axes.ts';
import type { Figure, Inks, Mark } from './figure.ts';
import { impulseUnit } from './impulseUnit.ts';
import { meanBand, meanNames } from './lines.ts';
import { markSeries } from './marks.ts';
import { impulseMark, impulseTable, meanIn } from './runStrip.ts';

const HEIGHT = 320;

const span = (mark: Mark): number[] => [mark.y - mark.whisker, mark.y + mark.whisker];

/** The shots, counted from one in the order of the run. What is set aside and lies far off is drawn at the edge, and the summary says so. */
export function shotsFigure({ records, run }: Pick<Reduction, 'records' | 'run'>, inks: Inks): Figure {
  const unit = impulseUnit({ records, run });
  const shots = records.filter(({ kind }) => kind === 'shot');
  const marks = shots.map((shot, index) => impulseMark(shot, index + 1, unit));
  const { columns, series } = markSeries(marks, inks);
  const mean = meanIn(run, unit);
  const withValue = marks.filter((mark) => !mark.missing);
  const y = roomForBoth(
    [...withValue.filter((mark) => !mark.setAside).flatMap(span), ...(mean === null ? [] : [mean.value - mean.half, mean.value + mean.half])],
    withValue.filter((mark) => mark.setAside).flatMap(span),
  );
  const outside = withValue.filter((mark) => mark.y < y.low || mark.y > y.high);
  const without = marks.filter((mark) => mark.missing);
  return {
    title: 'Impulse bit against shot number',
    summary: [
      'Thin whiskers: U of each shot (95 %); thick: its own part, which other shots do not share.',
      run === null ? 'No run mean yet.' : `Line and band: run mean Ī = ${withPlusMinus(run.mean.value, run.mean.U, unit)} (U, k = ${run.mean.k.toFixed(2)}, 95 %), the darker part of the band from scatter alone.`,
      outside.length === 0 ? '' : `At the edge, beyond the axis: ${outside.map((mark) => mark.reading).join('; ')}.`,
      without.length === 0 ? '' : `A cross: ${without.map((mark) => mark.reading).join('; ')}.`,
    ].filter((part) => part !== '').join(' '),
    marks,
    columns,
    options: {
      ...frame({ low: 0.4, high: marks.length + 0.6 }, y, HEIGHT),
      padding: [8, mean === null ? 12 : 48, 0, 0],
      axes: [
        axis({ label: 'Shot number, in the order of the run', side: 'bottom', whole: true, grid: false }, inks),
        axis({ label: `Impulse bit  (${unit.symbol})`, side: 'left' }, inks),
      ],
      series,
      hooks: {
        drawAxes: [
          (u) => {
            if (mean === null) return;
            meanBand(u, mean, inks);
            meanNames(u, mean, inks);
          },
        ],
      },
    },
    table: impulseTable(shots, unit),
    nearest: 'both',
  };
}
