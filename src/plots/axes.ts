/** Axes and ranges that all figures share: quantity with its unit, round steps, plain digits. */
import type uPlot from 'uplot';
import type { Inks } from './figure.ts';

export interface Range {
  readonly low: number;
  readonly high: number;
}

/** Free space beyond the outermost value, as a part of the span. */
const MARGIN = 0.08;
/** What is set aside widens a range up to this many times its span; beyond, it is drawn at the edge. */
const WIDENS_UP_TO = 1.5;

/** Range that holds every value with some space around; a single value gets a span of its own size. */
export function roomFor(values: readonly number[], margin = MARGIN): Range {
  if (values.length === 0) return { low: 0, high: 1 };
  const low = values.reduce((a, b) => Math.min(a, b));
  const high = values.reduce((a, b) => Math.max(a, b));
  const span = high - low || Math.abs(high) || 1;
  return { low: low - margin * span, high: high + margin * span };
}

/** The range of what counts, widened for what does not count unless that would crush the picture. */
export function roomForBoth(counting: readonly number[], others: readonly number[], margin = MARGIN): Range {
  const first = roomFor(counting.length > 0 ? counting : others, margin);
  const both = roomFor([...counting, ...others], margin);
  return both.high - both.low <= WIDENS_UP_TO * (first.high - first.low) ? both : first;
}

/** Tick labels with as many decimals as their step needs; a true minus sign. */
export function tickLabels(splits: readonly number[], step: number): string[] {
  const decimals = Math.max(0, Math.min(12, -Math.floor(Math.log10(step) + 1e-9)));
  const needed = Number.isInteger(Number((step * 10 ** decimals).toPrecision(6))) ? decimals : decimals + 1;
  return splits.map((split) => {
    const text = Math.abs(split) < step / 1e6 ? (0).toFixed(needed) : split.toFixed(needed);
    return text.replace('-', '−');
  });
}

const FONT_SIZE = 12;

interface AxisAs {
  readonly label: string;
  readonly side: 'bottom' | 'left';
  readonly whole?: boolean;
  readonly grid?: boolean;
}

const WHOLE_STEPS = [1, 2, 5, 10, 20, 50, 100, 200, 500, 1000, 2000, 5000, 10_000];

/** One axis; `label` is the quantity and its unit, '' for none; `whole` where only whole numbers are places. */
export function axis({ label, side, whole = false, grid = true }: AxisAs, inks: Inks): uPlot.Axis {
  const base: uPlot.Axis = {
    scale: side === 'bottom' ? 'x' : 'y',
    side: side === 'bottom' ? 2 : 3,
    stroke: inks.ink,
    font: `${FONT_SIZE}px ${inks.font}`,
    labelFont: `${FONT_SIZE}px ${inks.font}`,
    size: side === 'bottom' ? 26 : 54,
    labelSize: 20,
    gap: 4,
    space: side === 'bottom' ? 55 : 34,
    grid: grid ? { stroke: inks.rule, width: 0.5 } : { show: false },
    ticks: { stroke: inks.quiet, width: 1, size: 4 },
    border: { show: true, stroke: inks.quiet, width: 1 },
    values: (_, splits, __, ___, step) => tickLabels(splits, step),
  };
  return { ...base, ...(label === '' ? {} : { label }), ...(whole ? { incrs: WHOLE_STEPS } : {}) };
}

/** What all figures have in common: no legend, no built-in cursor, fixed ranges. */
export function frame(x: Range, y: Range, height: number): Pick<uPlot.Options, 'height' | 'legend' | 'cursor' | 'scales' | 'padding'> {
  return {
    height,
    legend: { show: false },
    cursor: { show: false },
    padding: [8, 12, 0, 0],
    scales: { x: { time: false, range: [x.low, x.high] }, y: { range: [y.low, y.high] } },
  };
}
