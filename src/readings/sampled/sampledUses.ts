/** What the columns of a sampled record are, told from their headers, units and values: proposals to be checked. */
import { unitNamed, type Unit } from '../../units/units.ts';
import { columnUnit } from '../headerUnits.ts';
import { extentOf } from '../../numeric/samples.ts';
import type { SampledColumnRead, SampledRecord } from './sampledRecord.ts';
import { useOfHeader, type SampledUse } from './sampledWords.ts';
import { timeUnitNamed } from './timeline.ts';

/** down, pivotDown: rows of a camera's picture, counted downward; pivotAcross: the pivot beside the marker. */
export const COLUMN_USES = ['time', 'reading', 'down', 'pivotAcross', 'pivotDown', 'trigger', 'voltage'] as const;
export type ColumnUse = (typeof COLUMN_USES)[number];

export interface ProposedUses {
  /** Index of the column for each use that was found. */
  readonly uses: Readonly<Partial<Record<ColumnUse, number>>>;
  /** count: the time column numbers samples or frames, and a rate is wanted; none: there is no such column. */
  readonly timeBy: 'time' | 'count' | 'none';
  /** Unit of the time column, null where none is named. */
  readonly timeUnit: Unit | null;
  /** Samples or frames a second that the lines above the header name, with that line; null for none. */
  readonly rate: { readonly perSecond: number; readonly text: string } | null;
  /** Told from values, not from a header or a unit. */
  readonly byValues: readonly ColumnUse[];
}

/** Rows out of order that a time may have. */
const OUT_OF_ORDER = 0.01;

/** Levels of a trigger: parts of its range, and the part of the samples that must lie within. */
const LEVEL = 0.1;
const ON_A_LEVEL = 0.97;

function rising({ values, missing }: SampledColumnRead): boolean {
  let [last, wrong, n] = [Number.NaN, 0, 0];
  for (const value of values) {
    if (Number.isNaN(value)) continue;
    if (value <= last) wrong += 1;
    last = value;
    n += 1;
  }
  return n > 1 && wrong <= OUT_OF_ORDER * (values.length - missing);
}

/** Whole numbers, mostly one apart. */
function counts({ values }: SampledColumnRead): boolean {
  let [ones, n] = [0, 0];
  let last = Number.NaN;
  for (const value of values) {
    if (Number.isNaN(value)) continue;
    if (!Number.isInteger(value)) return false;
    if (value - last === 1) ones += 1;
    last = value;
    n += 1;
  }
  return n > 1 && ones * 2 >= n - 1;
}

/**
 * How far the samples lie from two levels, as a part of their range: 0 for a signal of two values; null where it is no such signal.
 * One of more values must stay on each level for two samples or more on the average: a swing with spikes does not.
 */
function offLevels({ values, missing }: SampledColumnRead): number | null {
  const [low, high] = extentOf(values);
  if (!(high > low)) return null;
  let [atLow, atHigh, off, stays] = [0, 0, 0, 0];
  let before = '';
  for (const value of values) {
    const part = (value - low) / (high - low);
    const level = part <= LEVEL ? 'low' : part >= 1 - LEVEL ? 'high' : '';
    if (level === 'low') [atLow, off] = [atLow + 1, off + part];
    else if (level === 'high') [atHigh, off] = [atHigh + 1, off + 1 - part];
    if (level !== before && level !== '') stays += 1;
    before = level;
  }
  const n = values.length - missing;
  const isPulsed = off === 0 || Math.min(atLow, atHigh) >= stays;
  return isPulsed && atLow + atHigh >= ON_A_LEVEL * n ? off / n : null;
}

const RATE_WORDS = /sampl(?:e|es|ing)?[\s_-]*(?:rate|freq|interval|period|time)|samples? ?per ?second|\brate\b|\bfps\b|frames?[\s_-]*(?:rate|per ?second)|abtast(?:rate|frequenz|intervall)|bildrate|echantillonnage|cadence|muestreo|campionamento|amostragem|bemonstering|probkowani|vzorkovani|дискретизаци|частота кадров|サンプリング|フレームレート|采样率|采样频率|帧率/iu;
const RATE_NUMBER = /([+]?\d[\d.,]*(?:e[+-]?\d+)?)\s*(khz|hz|fps|1\/s|s\/s|sps|samples\/s|frames\/s|ms|us|µs|μs|s)?\b/iu;

/** A rate that a line of notes names: "Sample rate: 1000 Hz", "sampling interval, 1 ms". */
export function rateInNotes(lines: readonly string[]): ProposedUses['rate'] {
  for (const line of lines) {
    const bare = line.normalize('NFD').replace(/[\u0300-\u036f]/g, '');
    const words = RATE_WORDS.exec(bare);
    const [, digits, unit = ''] = words === null ? [] : (RATE_NUMBER.exec(bare.slice(words.index + words[0].length)) ?? []);
    if (digits === undefined) continue;
    const number = Number(digits.replace(/,(?=\d{3}(?!\d))/g, '').replace(',', '.').replace(/\.$/, ''));
    const time = unitNamed(unit, 'time');
    const isInterval = time !== null && /interval|intervall|period|time/i.test(words![0]);
    const perSecond = isInterval ? time.per / (number * time.times) : /khz/i.test(unit) ? number * 1000 : number;
    if (number > 0 && (time === null || isInterval) && Number.isFinite(perSecond)) return { perSecond, text: line.trim() };
  }
  return null;
}

export function proposeUses(record: SampledRecord): ProposedUses {
  const { columns } = record;
  const said: readonly (SampledUse | null)[] = columns.map(({ header }) => useOfHeader(header));
  const uses: Partial<Record<ColumnUse, number>> = {};
  const byValues: ColumnUse[] = [];
  const taken = (index: number): boolean => Object.values(uses).includes(index);
  const set = (use: ColumnUse, index: number, told = true): void => {
    if (index < 0 || uses[use] !== undefined) return;
    uses[use] = index;
    if (!told) byValues.push(use);
  };
  const timeBy = setTime(columns, said, set);
  const free = (index: number): boolean => !taken(index);
  const unitOf = ({ unitText }: SampledColumnRead): string => columnUnit(unitText)?.dimension ?? '';
  const isLength = (column: SampledColumnRead): boolean => ['length', 'angle', 'pixel'].includes(unitOf(column));
  const moves = ({ values }: SampledColumnRead): boolean => {
    const first = values.find((value) => !Number.isNaN(value));
    return values.some((value) => value < first! || value > first!);
  };
  for (const use of ['trigger', 'pivotAcross', 'pivotDown'] as const) set(use, said.findIndex((one, i) => one === use && free(i)));
  const first = (is: (column: SampledColumnRead, index: number) => boolean): number => columns.findIndex((column, i) => free(i) && is(column, i));
  if (uses.trigger === undefined && columns.filter((_, i) => free(i)).length >= 2) set('trigger', flattest(columns, (i) => free(i) && said[i] === null && !isLength(columns[i]!)), false);
  for (const is of [
    (column: SampledColumnRead, i: number) => said[i] === 'reading' && isLength(column) && moves(column),
    (_: SampledColumnRead, i: number) => said[i] === 'reading',
    (column: SampledColumnRead, i: number) => isLength(column) && said[i] !== 'down' && moves(column),
  ]) set('reading', first(is));
  set('reading', first((_, i) => said[i] === 'down'));
  if (uses.reading !== undefined) set('down', first((_, i) => said[i] === 'down'));
  set('reading', first((column, i) => said[i] === null && moves(column)), false);
  set('reading', first((column) => moves(column)), false);
  if (uses.reading !== undefined) set('voltage', first((column, i) => said[i] === 'voltage' || unitOf(column) === 'voltage'));
  return { uses, timeBy, timeUnit: uses.time === undefined ? null : timeUnitNamed(columns[uses.time]!.unitText), rate: rateInNotes(record.preamble), byValues };
}

/** A column with a unit of time or headed so; of sample or frame numbers; or the first that rises. */
function setTime(columns: readonly SampledColumnRead[], said: readonly (SampledUse | null)[], set: (use: ColumnUse, index: number, told?: boolean) => void): ProposedUses['timeBy'] {
  const isCount = (i: number): boolean => said[i] === 'sample' || said[i] === 'frame';
  const withUnit = columns.findIndex((column, i) => timeUnitNamed(column.unitText) !== null && !isCount(i));
  const named = columns.findIndex((column, i) => said[i] === 'time' && !column.clock);
  const headed = [withUnit, named, columns.findIndex(({ clock }) => clock)].find((index) => index >= 0) ?? -1;
  if (headed >= 0) {
    set('time', headed);
    return 'time';
  }
  const numbered = columns.findIndex((column, i) => isCount(i) && rising(column));
  if (numbered >= 0) {
    set('time', numbered);
    return 'count';
  }
  const up = columns.findIndex((column, i) => (said[i] === null || isCount(i)) && rising(column));
  if (up < 0) return 'none';
  set('time', up, false);
  return counts(columns[up]!) ? 'count' : 'time';
}

/** The column that keeps closest to two levels; −1 for none. */
function flattest(columns: readonly SampledColumnRead[], may: (index: number) => boolean): number {
  let [best, least] = [-1, Infinity];
  columns.forEach((column, i) => {
    const off = may(i) ? offLevels(column) : null;
    if (off !== null && off < least) [best, least] = [i, off];
  });
  // The noise of a level is far below the step; a swing with one spike is not.
  return least <= 0.01 ? best : -1;
}
