/** How much of the noise at the swing's own frequency a fit takes for swing: the residuals then show too little of it. */
import { laggedProducts } from '../numeric/fourier.ts';
import { solveSymmetric } from '../numeric/linearAlgebra.ts';
import { parzen } from './noiseColour.ts';
import type { SwingFit } from './swingFit.ts';
import { swingOver } from './swingModel.ts';
import { firstAtOrAfter, type SwingSamples } from './swingSums.ts';

/** The fit is looked at on so many samples a period, over so many periods and events at the most. */
const A_PERIOD = 16;
const MOST_PERIODS = 60;
const MOST_EVENTS = 40;
const DIFFERENCE = 1e-5;
/** Never more than this part of the noise is taken as lost. */
const MOST_LOST = 0.8;

/**
 * The factor of noiseColour.ts that residuals of white noise show on the average; 1 where the fit takes nothing away. With H the
 * fit's hat matrix residuals of white noise have E r_i r_j = σ²(δ_ij − H_ij); H̄(l) is its mean along the l-th diagonal.
 *
 * `periods`: lags over which the correlation is taken. Valid: white or nearly white noise about the swing's frequency. Derived.
 */
export function whiteFactor(fit: SwingFit, samples: SwingSamples, periods: number): number {
  const part = middle(fit, samples);
  const { times, used, columns, jumps } = designOf(fit, part);
  const n = used.reduce((sum, one) => sum + one, 0);
  const p = columns.length;
  if (n < 2 * p + 4) return 1;
  const inverse = inverseOf(columns, used);
  if (inverse === null) return 1;
  // Rows of A C, so that H_ij = (A C)_i · A_j.
  const spread = inverse.map((row) => Float64Array.from(times, (_, i) => row.reduce((sum, value, q) => sum + value * columns[q]![i]!, 0)));
  const lags = Math.min(times.length >> 2, Math.round(periods * A_PERIOD));
  const pairs = laggedProducts(used, lags);
  const hat = new Float64Array(lags + 1);
  for (let l = 0; l <= lags; l++) {
    let sum = 0;
    for (let q = 0; q < p; q++) {
      const [one, other] = [spread[q]!, columns[q]!];
      for (let i = 0; i + l < times.length; i++) sum += used[i]! * used[i + l]! * one[i]! * other[i + l]!;
    }
    hat[l] = sum / Math.max(1, pairs[l]!);
  }
  const rows = jumps.length > 0 ? jumps.map((q) => spread[q]!) : [spread[1]!];
  const lost = rows.map((row) => {
    const weights = Float64Array.from(row, (value, i) => value * used[i]!);
    const products = laggedProducts(weights, lags);
    let sum = 0;
    for (let l = 1; l <= lags; l++) sum += 2 * parzen(l / (lags + 1)) * hat[l]! * (products[l]! / products[0]!);
    return sum;
  }).reduce((a, b) => a + b, 0) / rows.length;
  // On the record itself with all its samples the diagonal of H is smaller, and what it holds lies beside it.
  const [thin, whole] = [hat[0]!, (hat[0]! * n) / Math.max(n, part.samplesInUse)];
  return Math.max(1 - MOST_LOST, 1 - (lost + thin - whole) / (1 - whole));
}

interface Part {
  readonly from: number;
  readonly to: number;
  readonly isWhole: boolean;
  readonly events: readonly number[];
  readonly samples: SwingSamples;
  readonly samplesInUse: number;
}

/** The middle of a long record: what is lost is much the same all along. */
function middle({ frequency, times: events }: SwingFit, samples: SwingSamples): Part {
  const { t, use } = samples;
  const [begin, end] = [t[0]!, t[t.length - 1]!];
  const period = (2 * Math.PI) / frequency;
  let [from, to] = [begin, end];
  if (to - from > MOST_PERIODS * period) [from, to] = [(begin + end - MOST_PERIODS * period) / 2, (begin + end + MOST_PERIODS * period) / 2];
  let inside = events.filter((event) => event > from && event < to);
  if (inside.length > MOST_EVENTS) {
    inside = inside.slice(0, MOST_EVENTS);
    to = events[events.indexOf(inside.at(-1)!) + 1] ?? to;
  }
  const [first, last] = [firstAtOrAfter(t, from, 0), Math.min(t.length, firstAtOrAfter(t, to, 0) + 1)];
  let count = 0;
  for (let i = first; i < last; i++) if (!use || use[i] !== 0) count += 1;
  return { from, to, isWhole: from === begin && to === end, events: inside, samples, samplesInUse: count };
}

interface Design {
  readonly times: Float64Array;
  /** 1 where a sample is in use. */
  readonly used: Float64Array;
  /** Of the unknowns: start, jumps, knots, and where the record is whole frequency and damping. */
  readonly columns: readonly Float64Array[];
  readonly jumps: readonly number[];
}

function designOf(fit: SwingFit, { from, to, isWhole, events, samples: { t, use } }: Part): Design {
  const { frequency: w, ratio: z, model } = fit;
  const step = Math.max((2 * Math.PI) / (w * A_PERIOD), (t[t.length - 1]! - t[0]!) / (t.length - 1));
  const times = Float64Array.from({ length: Math.max(1, Math.floor((to - from) / step) + 1) }, (_, i) => from + i * step);
  // A sample stands for the grid place about it.
  const used = Float64Array.from(times, (time) => {
    const i = Math.min(t.length - 1, firstAtOrAfter(t, time, 0));
    return Math.abs(t[i]! - time) <= 1.5 * step && (!use || use[i] !== 0) ? 1 : 0;
  });
  const root = Math.sqrt(1 - z * z);
  const response = (s: number): number => (s < 0 ? 0 : (Math.exp(-z * w * s) * Math.sin(w * root * s)) / root);
  const start = (s: number): number => Math.exp(-z * w * s) * Math.cos(w * root * s) + z * response(s);
  const columns: Float64Array[] = [times.map((time) => start(time - from)), times.map((time) => response(time - from)), ...events.map((event) => times.map((time) => response(time - event)))];
  const knots = model.rest.times.filter((time, i, all) => (all[i + 1] ?? time) >= from && (all[i - 1] ?? time) <= to);
  for (const [j, knot] of knots.entries()) {
    const [before, after] = [knots[j - 1] ?? knot, knots[j + 1] ?? knot];
    columns.push(times.map((time) => (knots.length === 1 ? 1 : time <= knot ? (before === knot ? 1 : Math.max(0, (time - before) / (knot - before))) : after === knot ? 1 : Math.max(0, (after - time) / (after - knot)))));
  }
  if (isWhole) {
    const by = (up: { frequency: number; ratio: number }, down: typeof up, long: number): Float64Array => {
      const [a, b] = [bent(fit, up, times), bent(fit, down, times)];
      return a.map((value, i) => (value - b[i]!) / long);
    };
    columns.push(by({ frequency: w * (1 + DIFFERENCE), ratio: z }, { frequency: w * (1 - DIFFERENCE), ratio: z }, 2 * DIFFERENCE * w));
    columns.push(by({ frequency: w, ratio: z + DIFFERENCE }, { frequency: w, ratio: z - DIFFERENCE }, 2 * DIFFERENCE));
  }
  return { times, used, columns: columns.filter((column) => column.some((value, i) => value !== 0 && used[i] === 1)), jumps: events.map((_, k) => 2 + k) };
}

/** The swing of the same start and jumps at another frequency and damping. */
function bent({ model, jumps, times: events }: SwingFit, { frequency: w, ratio: z }: { readonly frequency: number; readonly ratio: number }, times: Float64Array): Float64Array {
  const root = Math.sqrt(1 - z * z);
  const first = { ...model, frequency: w, ratio: z, stretches: model.stretches.slice(0, 1) };
  const x = swingOver(first, times);
  events.forEach((event, k) => {
    for (let i = firstAtOrAfter(times, event, 0); i < times.length; i++) {
      const s = times[i]! - event;
      x[i]! += (jumps[k]! * Math.exp(-z * w * s) * Math.sin(w * root * s)) / root;
    }
  });
  return x;
}

/** (AᵀA)⁻¹ over the rows in use; null where it has none. */
function inverseOf(columns: readonly Float64Array[], used: Float64Array): readonly (readonly number[])[] | null {
  const scale = columns.map((column) => Math.sqrt(column.reduce((sum, value, i) => sum + used[i]! * value * value, 0)) || 1);
  const normal = columns.map((one, p) => columns.map((other, q) => one.reduce((sum, value, i) => sum + used[i]! * value * other[i]!, 0) / (scale[p]! * scale[q]!)));
  const rows: number[][] = [];
  for (let p = 0; p < columns.length; p++) {
    const solved = solveSymmetric(normal, columns.map((_, q) => (q === p ? 1 : 0)));
    if (solved.status !== 'solved') return null;
    rows.push(solved.x.map((value, q) => value / (scale[p]! * scale[q]!)));
  }
  return rows;
}
