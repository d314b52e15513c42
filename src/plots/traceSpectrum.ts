/** What a fitted swing leaves of a record, by frequency: pump hum, building sway and the noise floor. */
import type uPlot from 'uplot';
import type { TraceTold } from '../reduction/traceResults.ts';
import { chooseUnit, plain } from '../units/format.ts';
import { fromSi, siUnit } from '../units/units.ts';
import { axis, frame } from './axes.ts';
import type { Figure, Inks } from './figure.ts';
import { dottedUpright } from './lines.ts';

const HEIGHT = 220;
const HERTZ = siUnit('number');
/** Room about the outermost values, as a factor. */
const ROOM = 1.3;

/** A power of ten as it is said: "0.01", "100". */
const inPlain = (value: number): string => (value >= 1e5 || value < 1e-4 ? value.toExponential(0).replace('e', ' · 10^').replace('+', '').replace('-', '−') : String(Number(value.toPrecision(3))));

/** 1, 2 … 9 of each decade within the range, the powers of ten with their digits, and 2 and 5 too where there are few. The plotter's own splits may never end where a range begins between powers. */
function logarithmic(base: uPlot.Axis): uPlot.Axis {
  return {
    ...base,
    splits: (_, __, min, max) => {
      const splits: number[] = [];
      for (let decade = Math.floor(Math.log10(min)); decade <= Math.ceil(Math.log10(max)); decade += 1) for (let digit = 1; digit < 10; digit += 1) splits.push(Number((digit * 10 ** decade).toPrecision(1)));
      return splits.filter((split) => split >= min && split <= max);
    },
    filter: (_, splits) => splits,
    values: (_, splits) => {
      const isFew = splits.filter((split) => split.toExponential().startsWith('1')).length < 3;
      return splits.map((split) => ((isFew ? /^[125]/ : /^1/).test(split.toExponential()) ? inPlain(split) : ''));
    },
  };
}

/** Words of the lines that stand out: "49.9 Hz (1.2 µm)". */
export function humWords({ fitted, dimension }: Pick<TraceTold, 'fitted' | 'dimension'>): readonly string[] {
  return (fitted?.hums ?? []).map(({ frequency, amplitude }) => {
    const unit = chooseUnit([amplitude], dimension);
    return `${plain(frequency, HERTZ, 3)} Hz (${plain(amplitude, unit, 2)})`;
  });
}

/** null before a fit, or where the record is too short for one. */
export function traceSpectrum(told: TraceTold, inks: Inks): Figure | null {
  const { fitted, dimension, name } = told;
  const points = (fitted?.spectrum.frequency ?? []).map((frequency, i) => ({ frequency, amplitude: fitted!.spectrum.amplitude[i]! })).filter(({ frequency, amplitude }) => frequency > 0 && amplitude > 0);
  if (fitted === null || points.length < 3) return null;
  const unit = chooseUnit(points.map(({ amplitude }) => amplitude), dimension);
  const natural = fitted.model.frequency / (2 * Math.PI);
  const values = points.map(({ amplitude }) => fromSi(amplitude, unit));
  const [low, high] = [Math.min(...values) / ROOM, Math.max(...values) * ROOM];
  const x = { low: Math.min(points[0]!.frequency, natural / 2), high: points.at(-1)!.frequency };
  const hums = humWords(told);
  const base = frame(x, { low, high }, HEIGHT);
  return {
    title: `What the fit of ${name} leaves, by frequency`,
    summary: `Amplitude of the residuals by frequency; upright and dotted: the pendulum’s own, ${plain(natural, HERTZ, 3)} Hz. ${hums.length === 0 ? 'No line stands out of it.' : `What stands out of it, marked by a wedge: ${hums.join(', ')}.`} What lies near the pendulum’s own frequency goes into the throws; a hum far above it goes out with the fit.`,
    marks: [], nearest: 'x',
    columns: [points.map(({ frequency }) => frequency), values],
    options: {
      ...base,
      scales: { x: { time: false, distr: 3, range: [x.low, x.high] }, y: { distr: 3, range: [low, high] } },
      axes: [logarithmic(axis({ label: 'Frequency  (Hz)', side: 'bottom' }, inks)), logarithmic(axis({ label: `Amplitude  (${unit.symbol})`, side: 'left' }, inks))],
      series: [{}, { label: 'amplitude', stroke: inks.ink, width: 1, points: { show: false } }],
      hooks: { draw: [(u) => dottedUpright(u, natural, inks.shot), (u) => wedges(u, fitted.hums.map(({ frequency, amplitude }) => [frequency, fromSi(amplitude, unit)]), inks)] },
    },
    table: {
      head: ['Frequency (Hz)', 'Amplitude'],
      rows: points.map(({ frequency, amplitude }, i) => ({ id: String(i), cells: [plain(frequency, HERTZ, 4), plain(amplitude, unit, 3)] })),
    },
  };
}

function wedges(u: uPlot, places: readonly (readonly [number, number])[], inks: Inks): void {
  const { ctx: pen, bbox: { top } } = u;
  const px = devicePixelRatio;
  pen.save();
  pen.fillStyle = inks.look;
  for (const [frequency, amplitude] of places) {
    const [x, y] = [u.valToPos(frequency, 'x', true), Math.max(top + 9 * px, u.valToPos(amplitude, 'y', true) - 3 * px)];
    pen.beginPath();
    pen.moveTo(x, y);
    pen.lineTo(x - 4 * px, y - 8 * px);
    pen.lineTo(x + 4 * px, y - 8 * px);
    pen.closePath();
    pen.fill();
  }
  pen.restore();
}
