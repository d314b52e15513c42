/** When each sample of a record was taken, in s: by its time column, its sample or frame numbers, or a rate; and what is wrong with that. */
import { problem, type Place, type Problem } from '../../problems/problems.ts';
import { toSi, unitNamed, type Unit } from '../../units/units.ts';
import type { SampledRecord } from './sampledRecord.ts';
import { inOrder } from './timeOrder.ts';

export type SampleClock =
  /** Times; of day where the column's cells are clock times, the unit is then not heeded. */
  | { readonly by: 'time'; readonly column: number; readonly unit: Unit }
  /** Numbers of samples or frames, at so many a second. */
  | { readonly by: 'count'; readonly column: number; readonly rate: number }
  /** Every row is a sample, at so many a second; the first at 0. */
  | { readonly by: 'rate'; readonly rate: number };

/** Samples or frames that are missing: from the sample before to the one after. */
export interface Gap {
  readonly before: number;
  readonly after: number;
  /** s from one to the other. */
  readonly seconds: number;
  /** By the usual spacing. */
  readonly missing: number;
}

export interface Timeline {
  /** s, strictly rising; may be the record's own array. */
  readonly t: Float64Array;
  /** Row of each sample; null: sample i is row i. */
  readonly rows: Int32Array | null;
  /** Spacing of neighbouring samples, s: median, and least and most apart from the gaps; 0 for fewer than two samples. */
  readonly spacing: { readonly usual: number; readonly least: number; readonly most: number };
  /** The spacing varies by more than the last digit of the times explains. */
  readonly uneven: boolean;
  /** The first of them, in order. */
  readonly gaps: readonly Gap[];
  readonly gapCount: number;
  /** Samples missing in all the gaps. */
  readonly samplesMissing: number;
  /** Rows with the same time or number as the one before, left out. */
  readonly repeated: number;
  /** Rows whose time runs backward, left out. */
  readonly backward: number;
  /** Rows without a number where one is needed, left out. */
  readonly withoutNumber: number;
  readonly problems: readonly Problem[];
}

/** Spacing beyond so many usual ones is a gap. */
const GAP = 1.5;
const MOST_GAPS = 10_000;

/** Spacings looked at for the usual one. */
const SPACINGS = 100_000;

/** So many rows at one time tell of a clock that is written too coarsely, not of repeated samples. */
const COARSE = 0.1;

/** Parts of the usual spacing that count as even. */
const EVEN = 0.02;

const HOUR: Unit = { symbol: 'h', dimension: 'time', times: 3600, per: 1, factor: 3600 };

/** A unit of time as a header names it, hours included; null where it is none. */
export function timeUnitNamed(text: string): Unit | null {
  return /^(?:h|hr|hrs|hours?)$/i.test(text.trim()) ? (unitNamed('h', 'time') ?? HOUR) : unitNamed(text, 'time');
}

const DAY = 86_400;

/** Times of every row, s; NaN where there is none. The record's own array where nothing is to be done. */
function timesOf({ columns, rows }: SampledRecord, clock: SampleClock): Float64Array {
  if (clock.by === 'rate') return Float64Array.from({ length: rows }, (_, row) => row / clock.rate);
  const column = columns[clock.column];
  if (column === undefined) throw new RangeError(`times of a record: no column ${clock.column} of ${columns.length}`);
  if (clock.by === 'count') return column.values.map((count) => count / clock.rate);
  if (column.clock) return pastMidnight(column.values);
  const { unit } = clock;
  return unit.factor === 1 ? column.values : column.values.map((value) => toSi(value, unit));
}

/** Times of day that go on after midnight. */
function pastMidnight(ofDay: Float64Array): Float64Array {
  let [days, last] = [0, -Infinity];
  return ofDay.map((time) => {
    if (time < last - DAY / 2) days += DAY;
    if (!Number.isNaN(time)) last = time;
    return time + days;
  });
}

/**
 * The times of a record's samples.
 *
 * Rows without a number in a column of `needs` or without a time are left out, so is a time that repeats the last one or runs backward:
 * single wrong stamps where up to three rows are out of order, else all but the longest stretch in which time rises.
 *
 * @param needs indices of columns
 * @throws RangeError when the clock's column is none of the record's, or its rate is not above zero
 */
export function timelineOf(record: SampledRecord, clock: SampleClock, needs: readonly number[], place: Place = {}): Timeline {
  if (clock.by !== 'time' && !(clock.rate > 0 && clock.rate < Infinity)) throw new RangeError(`times of a record: rate ${clock.rate}`);
  const all = timesOf(record, clock);
  const wanted = needs.flatMap((index) => {
    const column = record.columns[index];
    if (column === undefined) throw new RangeError(`times of a record: no column ${index} of ${record.columns.length}`);
    return column.missing > 0 ? [column.values] : [];
  });
  const ordered = inOrder(all, wanted);
  const { rows } = ordered;
  const t = rows === null ? all : Float64Array.from(rows, (row) => all[row]!);
  const spacings = spacingsOf(t);
  const problems: Problem[] = [];
  const columnPlace: Place = clock.by === 'rate' ? place : { ...place, column: record.columns[clock.column]!.header || String(clock.column + 1) };
  const at = (from: Place, row: number): Place => (row < 0 ? from : { ...from, line: record.lineOfRow(row) });
  if (ordered.withoutNumber > 0) problems.push(problem('trace-numbers-missing', 'note', at(place, ordered.firstWithout), { rows: ordered.withoutNumber }));
  if (ordered.backward > 0) problems.push(problem('trace-time-not-rising', t.length < 2 ? 'stops' : 'doubt', at(columnPlace, ordered.firstBackward), { left: ordered.backward, restarts: ordered.restarts }));
  const coarse = clock.by === 'time' && ordered.repeated > COARSE * all.length;
  if (coarse) {
    problems.push(problem('trace-time-coarse', t.length < 2 ? 'stops' : 'doubt', at(columnPlace, ordered.firstRepeated), { repeated: ordered.repeated, rate: t.length < 2 ? 0 : (all.length - 1) / (t[t.length - 1]! - t[0]!) }));
  } else if (ordered.repeated > 0) problems.push(problem('trace-samples-repeated', t.length < 2 ? 'stops' : 'note', at(columnPlace, ordered.firstRepeated), { repeated: ordered.repeated }));
  const [gap] = spacings.gaps;
  if (gap !== undefined) problems.push(problem('trace-samples-missing', 'note', at(place, rows === null ? gap.after : rows[gap.after]!), { missing: spacings.samplesMissing, gaps: spacings.gapCount, time: t[gap.before]! }));
  if (spacings.uneven && !coarse) problems.push(problem('trace-spacing-uneven', 'note', place, { least: spacings.spacing.least, most: spacings.spacing.most }));
  return { t, rows, ...spacings, repeated: ordered.repeated, backward: ordered.backward, withoutNumber: ordered.withoutNumber, problems };
}

/** Numbers of a column at the samples of a timeline. */
export function atSamples({ rows }: Timeline, values: Float64Array): Float64Array {
  return rows === null ? values : Float64Array.from(rows, (row) => values[row]!);
}

type Spacings = Pick<Timeline, 'spacing' | 'uneven' | 'gaps' | 'gapCount' | 'samplesMissing'>;

function spacingsOf(t: Float64Array): Spacings {
  if (t.length < 2) return { spacing: { usual: 0, least: 0, most: 0 }, uneven: false, gaps: [], gapCount: 0, samplesMissing: 0 };
  const usual = usualSpacing(t);
  const gaps: Gap[] = [];
  let [least, most, gapCount, samplesMissing] = [Infinity, 0, 0, 0];
  for (let i = 1; i < t.length; i += 1) {
    const seconds = t[i]! - t[i - 1]!;
    if (seconds > GAP * usual) {
      const missing = Math.max(1, Math.round(seconds / usual) - 1);
      gapCount += 1;
      samplesMissing += missing;
      if (gaps.length < MOST_GAPS) gaps.push({ before: i - 1, after: i, seconds, missing });
      continue;
    }
    if (seconds < least) least = seconds;
    if (seconds > most) most = seconds;
  }
  if (most === 0) [least, most] = [usual, usual];
  return { spacing: { usual, least, most }, uneven: most - least > EVEN * usual + 2 * lastDigit(t), gaps, gapCount, samplesMissing };
}

/** Median spacing; of a part of them where there are very many. */
function usualSpacing(t: Float64Array): number {
  const n = t.length - 1;
  const count = Math.min(n, SPACINGS);
  const spacings = Float64Array.from({ length: count }, (_, k) => {
    const i = Math.floor((k * n) / count);
    return t[i + 1]! - t[i]!;
  }).sort();
  return (spacings[(count - 1) >> 1]! + spacings[count >> 1]!) / 2;
}

/** Rows looked at for the digits of the times. */
const STAMPS = 1000;
const MOST_DIGITS = 9;

/** The last decimal digit that the times are written with, s; 0 where they use all the digits of a double. */
function lastDigit(t: Float64Array): number {
  const stamps = t.subarray(0, STAMPS);
  for (let digits = 0; digits <= MOST_DIGITS; digits += 1) {
    const times = 10 ** digits;
    if (stamps.every((time) => Math.abs(time * times - Math.round(time * times)) <= 1e-6 + 1e-12 * Math.abs(time * times))) return 1 / times;
  }
  return 0;
}
