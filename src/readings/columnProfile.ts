/** What the cells of one column look like: numbers, clock times, kind words, text, and the unit written in them. */
import { isNoReading, looksClock, looksNumeric } from './cells.ts';
import { columnUnit } from './headerUnits.ts';
import { kindOfWord } from './kinds.ts';
import type { TableRead } from './table.ts';

/** Enough rows to tell what a column is. */
const ROWS_LOOKED_AT = 1000;

export interface ColumnProfile {
  readonly index: number;
  /** Cells that hold something. */
  readonly full: number;
  /** Parts of the full cells, 0…1. */
  readonly numeric: number;
  readonly clock: number;
  readonly kind: number;
  readonly different: number;
  /** Number of each row, NaN-free: null where the cell is blank or no number. Unit left aside. */
  readonly numbers: readonly (number | null)[];
  /** Unit written in most of the full cells, '' for none. */
  readonly unit: string;
  readonly longest: number;
}

const LEADING_NUMBER = /^([+\-−–]?)\s?(\d[\d.,'’\u00a0\u202f]*|[.,]\d+)((?:[eE][+-]?\d+)?)\s*(.*)$/u;

function roughNumber(text: string, decimal: '.' | ','): { number: number; rest: string } | null {
  const [, sign = '', digits = '', power = '', rest = ''] = LEADING_NUMBER.exec(text) ?? [];
  if (digits === '') return null;
  const plain = digits.replace(decimal === ',' ? /[.'’\s]/g : /[,'’\s]/g, '').replace(',', '.');
  const number = Number(`${sign === '' || sign === '+' ? '' : '-'}${plain}${power}`);
  return Number.isFinite(number) ? { number, rest } : null;
}

export function profileColumn(table: TableRead, index: number): ColumnProfile {
  const numbers: (number | null)[] = [];
  const texts = new Set<string>();
  const units = new Map<string, number>();
  let full = 0;
  let numeric = 0;
  let clock = 0;
  let kind = 0;
  let longest = 0;
  for (const { cells } of table.rows.slice(0, ROWS_LOOKED_AT)) {
    const text = (cells[index] ?? '').trim();
    if (isNoReading(text)) {
      numbers.push(null);
      continue;
    }
    full += 1;
    texts.add(text);
    longest = Math.max(longest, text.length);
    const isClock = looksClock(text);
    if (isClock) clock += 1;
    const rough = !isClock && looksNumeric(text) ? roughNumber(text, table.decimal) : null;
    numbers.push(rough?.number ?? null);
    if (rough !== null) {
      numeric += 1;
      const unit = rough.rest === '' ? null : columnUnit(rough.rest.replace(/^(?:\(\d+\)|±\s*[\d.,]+)\s*/u, ''));
      if (unit !== null) units.set(unit.symbol, (units.get(unit.symbol) ?? 0) + 1);
    } else if (!isClock && kindOfWord(text) !== null) kind += 1;
  }
  const [unit = '', times = 0] = [...units].sort((a, b) => b[1] - a[1])[0] ?? [];
  const part = (n: number): number => (full === 0 ? 0 : n / full);
  return { index, full, numeric: part(numeric), clock: part(clock), kind: part(kind), different: texts.size, numbers, unit: times * 2 > full ? unit : '', longest };
}

/** Median of the numbers present; null for none. */
export function medianOf(numbers: readonly (number | null)[]): number | null {
  const sorted = numbers.filter((x): x is number => x !== null).sort((a, b) => a - b);
  if (sorted.length === 0) return null;
  const middle = sorted.length >> 1;
  const upper = sorted[middle] ?? 0;
  return sorted.length % 2 === 1 ? upper : (upper + (sorted[middle - 1] ?? upper)) / 2;
}

/** Median distance from the median: how far a column wanders, one odd cell aside. */
export function wanderOf(numbers: readonly (number | null)[]): number {
  const middle = medianOf(numbers);
  if (middle === null) return 0;
  return medianOf(numbers.map((x) => (x === null ? null : Math.abs(x - middle)))) ?? 0;
}

/** Whole numbers that count up, mostly by one. */
export function countsUp({ numbers, full, numeric, clock }: ColumnProfile): boolean {
  if (full < 2 || numeric < 1 || clock > 0) return false;
  const present = numbers.filter((x): x is number => x !== null);
  let ones = 0;
  for (let i = 1; i < present.length; i++) {
    const step = (present[i] ?? 0) - (present[i - 1] ?? 0);
    if (step <= 0) return false;
    if (step === 1) ones += 1;
  }
  return present.every(Number.isInteger) && ones * 2 >= present.length - 1;
}

/** Charge voltages by size: whole tens from 100 to 20,000 that stay near one level. */
export function looksLikeVolts({ numbers, full, numeric }: ColumnProfile): boolean {
  if (full < 2 || numeric < 1) return false;
  const present = numbers.filter((x): x is number => x !== null);
  return present.every((x) => x >= 100 && x <= 20_000 && x % 10 === 0);
}
