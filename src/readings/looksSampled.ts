/** Tells a sampled record from a table of readings by the first of its text: many rows of numbers whose first rising column goes evenly. */
import { readNumber } from '../units/quantity.ts';
import { columnUnit } from './headerUnits.ts';
import { readTable } from './table.ts';
import { roleOfHeader } from './words.ts';

/** Nobody writes so many rows by hand. */
const FEWEST_ROWS = 200;
/** Rows that are looked at; the preamble before them may be long. */
const LOOKED_AT = 160;
/** Steps of an even column lie within this factor of their middle one; a frame may be missing. */
const EVEN = 3.5;

/** Columns of readings that no sampled record has. */
const BY_HAND = new Set<string>(['rest', 'restAfter', 'label', 'kind', 'note', 'tapImpulse', 'weight', 'swingsTime', 'hammerIn']);

/** Valid: the text whole or its first 64 kB, with the number of bytes of the whole. */
export function looksSampled(head: string, bytes: number): boolean {
  const lines = head.split(/\r\n|\n|\r/);
  const perLine = head.length / Math.max(1, lines.length);
  if (bytes / perLine < FEWEST_ROWS) return false;
  const table = readTable(lines.slice(0, LOOKED_AT).join('\n'));
  if (table.headers.some((header) => BY_HAND.has(roleOfHeader(header)?.role ?? ''))) return false;
  const columns = table.headers.map((_, i) => table.rows.map(({ cells }) => readNumber(cells[i] ?? '', table.decimal)).filter((value) => value !== null));
  const numeric = columns.map((values, i) => ({ values, i })).filter(({ values }) => values.length > 0.8 * table.rows.length && values.length > 10);
  if (numeric.length === 0) return false;
  // A single column of readings at a rate that is stated elsewhere.
  if (numeric.length === 1) return table.headers.length === 1;
  return numeric.some(({ values, i }) => goesEvenly(values) && (i === 0 || columnUnit(table.unitTexts[i] ?? '')?.dimension === 'time'));
}

function goesEvenly(values: readonly number[]): boolean {
  const steps = values.slice(1).map((value, i) => value - values[i]!);
  const middle = steps.toSorted((a, b) => a - b)[Math.floor(steps.length / 2)]!;
  return middle > 0 && steps.filter((step) => step > 0 && step < EVEN * middle).length > 0.9 * steps.length;
}
