/** The swing after one shot as it was sampled and as it was fitted, and what is left between the two. */
import type uPlot from 'uplot';
import { indexAt, timeOf } from '../numeric/minMaxPyramid.ts';
import type { TracePicture } from '../numeric/minMaxPyramid.ts';
import type { TraceEventTold, TraceTold } from '../reduction/traceResults.ts';
import { restAt, swingOver, type SwingModel } from '../traces/swingModel.ts';
import { plain } from '../units/format.ts';
import { fromSi, siUnit } from '../units/units.ts';
import { axis, frame, roomFor } from './axes.ts';
import type { Range } from './axes.ts';
import type { Figure, FigureTable, Inks } from './figure.ts';
import { dottedUpright, zeroLine } from './lines.ts';
import { bandsIn } from './traceHatch.ts';
import { throwUnit, throwWords } from './traceWords.ts';

const HEIGHT = 260;
const RESIDUAL_HEIGHT = 150;
/** Natural periods shown before and after the shot, unless the record or the next shots end them. */
const BEFORE = 0.6;
const AFTER = 3;
/** Samples drawn; of more, evenly some. */
const MOST = 4000;
/** Fewer than this are drawn as points. */
const AS_POINTS = 400;
const MODEL_POINTS = 500;
const TABLE_ROWS = 2000;
const LIMIT = 2;
const ONE = siUnit('number');

interface InView {
  /** s. */
  readonly times: Float64Array;
  /** SI; NaN where no number is. */
  readonly values: Float64Array;
  readonly every: number;
  readonly of: number;
}

/** The samples between two times, evenly thinned. */
export function samplesBetween({ times, values }: TracePicture, from: number, to: number, most = MOST): InView {
  const [first, last] = [indexAt(times, values.length, from), Math.min(values.length, indexAt(times, values.length, to) + 1)];
  const every = Math.max(1, Math.ceil((last - first) / most));
  const count = Math.max(0, Math.ceil((last - first) / every));
  return {
    times: Float64Array.from({ length: count }, (_, i) => timeOf(times, first + i * every)), values: Float64Array.from({ length: count }, (_, i) => values[first + i * every]!), every, of: Math.max(0, last - first),
  };
}

/** From half a period before the shot to some after it. */
function rangeAbout({ time }: TraceEventTold, { from, to }: TraceTold, { frequency }: SwingModel): Range {
  const period = (2 * Math.PI) / frequency;
  return { low: Math.max(from, time - BEFORE * period), high: Math.min(to, time + AFTER * period) };
}

const cell = (value: number, unit: ReturnType<typeof throwUnit>): string => (Number.isNaN(value) ? '—' : plain(value, unit, 5));

function tableOf(view: InView, model: Float64Array, noise: number, zero: number, unit: ReturnType<typeof throwUnit>): FigureTable {
  const every = Math.max(1, Math.ceil(view.times.length / TABLE_ROWS));
  const rows = Array.from(view.times, (t, i) => ({ t, i })).filter(({ i }) => i % every === 0);
  return {
    head: ['Time after the shot (s)', 'Reading', 'Fitted', 'Difference over the noise'],
    rows: rows.map(({ t, i }) => ({ id: String(i), cells: [(t - zero).toFixed(5).replace('-', '−'), cell(view.values[i]!, unit), cell(model[i]!, unit), Number.isNaN(view.values[i]!) || noise === 0 ? '—' : plain((view.values[i]! - model[i]!) / noise, ONE, 3)] })),
  };
}

/** Both pictures of the swing after one shot; null before a fit. `name` calls it: "Shot 3". */
export function oneSwing(told: TraceTold, picture: TracePicture, event: TraceEventTold, name: string, inks: Inks): { readonly swing: Figure; readonly residuals: Figure } | null {
  const { fitted } = told;
  if (fitted === null) return null;
  const { model, noise } = fitted;
  const range = rangeAbout(event, told, model);
  const view = samplesBetween(picture, range.low, range.high);
  const zero = event.time;
  const unit = throwUnit(told, 0);
  const atSamples = swingOver(model, view.times);
  const fine = Float64Array.from({ length: MODEL_POINTS }, (_, i) => range.low + ((range.high - range.low) * i) / (MODEL_POINTS - 1));
  const atFine = swingOver(model, fine);
  const merged = merge(view, fine);
  const shown = (value: number | null): number | null => (value === null || Number.isNaN(value) ? null : fromSi(value, unit));
  const readings = merged.map(({ sample }) => (sample === null ? null : shown(view.values[sample]!)));
  const fit = merged.map(({ sample, grid }) => shown(sample !== null ? atSamples[sample]! : atFine[grid]!));
  const rest = merged.map(({ t }) => shown(restAt(model, t)));
  const isSparse = view.times.length <= AS_POINTS;
  const thinned = view.every > 1 ? `; every ${view.every}th of ${view.of} samples is drawn` : '';
  const table = tableOf(view, atSamples, noise, zero, unit);
  const x: Range = { low: range.low - zero, high: range.high - zero };
  const bands = bandsIn(inks);
  const leftOut = told.stretches.filter(({ from, to }) => to > range.low && from < range.high).map((stretch) => ({ ...stretch, from: stretch.from - zero, to: stretch.to - zero }));
  const residual = Array.from(view.values, (value, i) => (Number.isNaN(value) || noise === 0 ? null : (value - atSamples[i]!) / noise));
  const isOut = (i: number): boolean => leftOut.some(({ from, to, why }) => why !== 'gap' && view.times[i]! - zero >= from && view.times[i]! - zero <= to);
  const counting = residual.filter((value, i): value is number => value !== null && !isOut(i));
  const beyond = counting.filter((value) => Math.abs(value) > LIMIT).length;
  const bottom = axis({ label: `Time after ${name.toLowerCase()}  (s)`, side: 'bottom' }, inks);
  const upright = (u: uPlot): void => dottedUpright(u, 0, inks.shot);
  return {
    swing: {
      title: `The swing after ${name.toLowerCase()}`,
      summary: `${name}: the swing as sampled (${isSparse ? 'dots' : 'line'}) and as fitted (whole line, on a lighter ground), the rest line dashed, the shot upright at 0${thinned}. ${capital(throwWords(event, unit))}; the swing that was there before goes on under it.`,
      marks: [], nearest: 'x', table,
      columns: [merged.map(({ t }) => t - zero), readings, fit, fit, rest],
      options: {
        ...frame(x, roomFor([...readings.filter((_, i) => merged[i]!.sample === null || !isOut(merged[i]!.sample)), ...fit].filter((value): value is number => value !== null)), HEIGHT),
        axes: [bottom, axis({ label: `Reading  (${unit.symbol})`, side: 'left' }, inks)],
        series: [
          {},
          isSparse ? { label: 'sampled', stroke: inks.blank, paths: () => null, points: { show: true, size: 5, stroke: inks.blank, fill: inks.blank } } : { label: 'sampled', stroke: inks.blank, width: 1, spanGaps: true, points: { show: false } },
          { label: 'ground of the fit', stroke: inks.paper, width: 4, points: { show: false } },
          { label: 'fitted', stroke: inks.ink, width: 1.5, points: { show: false } },
          { label: 'rest', stroke: inks.quiet, width: 1, dash: [6, 4], points: { show: false } },
        ],
        hooks: { drawAxes: [(u) => bands(u, leftOut), upright] },
      },
    },
    residuals: {
      title: `What the fit leaves after ${name.toLowerCase()}`,
      summary: `Reading less fitted swing, over the noise of the record. ${beyond} of ${counting.length} samples here lie beyond ±${LIMIT}; noise alone puts one in twenty there. A wave or a step here is something that the fit does not hold.`,
      marks: [], nearest: 'x', table,
      columns: [Array.from(view.times, (t) => t - zero), residual],
      options: {
        ...frame(x, roomFor([...counting, -LIMIT, LIMIT]), RESIDUAL_HEIGHT),
        axes: [bottom, axis({ label: 'Residual (noise)', side: 'left' }, inks)],
        series: [{}, { label: 'residual', stroke: inks.ink, paths: () => null, points: { show: true, size: isSparse ? 4 : 2.5, stroke: inks.ink, fill: inks.ink } }],
        hooks: { drawAxes: [(u) => bands(u, leftOut), (u) => zeroLine(u, inks), upright] },
      },
    },
  };
}

interface Place {
  readonly t: number;
  readonly sample: number | null;
  readonly grid: number;
}

/** Times of the samples and of the fitted line, in order. */
function merge(view: InView, fine: Float64Array): readonly Place[] {
  const all: Place[] = [...Array.from(view.times, (t, i): Place => ({ t, sample: i, grid: 0 })), ...Array.from(fine, (t, i): Place => ({ t, sample: null, grid: i }))];
  return all.sort((a, b) => a.t - b.t);
}

const capital = (words: string): string => words.charAt(0).toUpperCase() + words.slice(1);
