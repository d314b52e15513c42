/** Whether a record that stops in the middle of a line was cut within its last number. */
import { textOf } from './encodedText.ts';
import { cellsOfLine } from './sampledRows.ts';
import type { SampledDialect } from './sniff.ts';

/** Bytes at the end of a file that are kept for this. */
export const TAIL_KEPT = 4096;

/** Lines before the last that it is compared with. */
const COMPARED = 20;
const FEWEST = 5;

interface Digits {
  readonly decimals: number;
  readonly exponent: string;
}

function digitsOf(cell: string, decimal: string): Digits | null {
  const bare = cell.replace(/"/g, '').trim();
  const [, fraction = '', exponent = ''] = (decimal === ',' ? /^[+-]?\d*(?:,(\d*))?(?:[eEdD][+-]?(\d*))?$/ : /^[+-]?\d*(?:\.(\d*))?(?:[eEdD][+-]?(\d*))?$/).exec(bare) ?? [];
  return /\d/.test(bare) ? { decimals: fraction.length, exponent } : null;
}

/**
 * True where the last line has no end and its last cell fewer decimals than all those above it, which have alike many, or fewer digits of
 * an exponent that is filled up with zeros. A number cut before its decimal mark counts too; one of a column of whole numbers cannot be told.
 *
 * @param total bytes of the whole file, of which `tail` is the end
 */
export function isCutOff(tail: Uint8Array, total: number, { encoding, mark, newline, delimiter, decimal }: SampledDialect): boolean {
  const wide = encoding.startsWith('utf-16');
  const from = wide && (total - mark - tail.length) % 2 !== 0 ? 1 : 0;
  const text = textOf(tail.subarray(from), encoding);
  if (text.endsWith(newline)) return false;
  const lines = text.split(newline).slice(total > tail.length ? 1 : 0);
  const last = cellsOfLine(lines.pop() ?? '', delimiter);
  const cell = last[last.length - 1]?.trim() ?? '';
  if (cell === '') return false;
  const others = lines.slice(-COMPARED).flatMap((line) => digitsOf(cellsOfLine(line, delimiter)[last.length - 1] ?? '', decimal) ?? []);
  const [usual] = others;
  if (usual === undefined || others.length < FEWEST) return false;
  const alike = others.every(({ decimals, exponent }) => decimals === usual.decimals && exponent.length === usual.exponent.length);
  if (!alike) return false;
  const own = digitsOf(cell, decimal);
  if (own === null) return /^[+-]$/.test(cell);
  const filledUp = others.some(({ exponent }) => exponent.length > 1 && exponent.startsWith('0'));
  return own.decimals < usual.decimals || (filledUp && own.exponent.length < usual.exponent.length);
}
