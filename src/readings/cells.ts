/** What a cell looks like before it is read: blank, a number, a clock time, a comment. */

/** A number as people write one, with or without ±, an exponent and a short unit; a clock time or an ISO date also counts. */
const NUMERIC =
  /^[+\-−–]?\s?(?:\d[\d.,'’\u00a0\u202f ]*|[.,]\d+)(?:[eE][+-]?\d+)?\s*(?:\(\d+\))?\s*(?:(?:±|\+\/?-)\s*\d[\d.,]*)?\s*(?:%|°|[\p{L}µ²³/·%°^\d-]{1,8})?$/u;
const CLOCK = /^\d{1,2}:\d{2}(?::\d{2}(?:[.,]\d+)?)?(?:\s?[aApP]\.?[mM]\.?)?$/;
const DATE = /^\d{4}-\d{2}-\d{2}(?:[T ]\d{2}:\d{2}(?::\d{2}(?:[.,]\d+)?)?\s?(?:Z|[+-]\d{2}:?\d{2})?)?$/;

const LONGEST_NUMBER = 40;

export function looksNumeric(cell: string): boolean {
  const text = cell.trim();
  if (text === '' || text.length > LONGEST_NUMBER) return false;
  return NUMERIC.test(text) || looksClock(text);
}

/** A clock time 14:02 or 14:02:31, or an ISO 8601 date with or without a time. */
export function looksClock(cell: string): boolean {
  const text = cell.trim();
  return CLOCK.test(text) || DATE.test(text);
}

export function isBlank(cells: readonly string[]): boolean {
  for (const cell of cells) if (cell !== '' && cell.trim() !== '') return false;
  return true;
}

/** Number of cells up to the last that holds something. */
export function widthOf(cells: readonly string[]): number {
  let width = cells.length;
  while (width > 0 && (cells[width - 1] ?? '').trim() === '') width -= 1;
  return width;
}

/** Number of cells that hold something. */
export function filled(cells: readonly string[]): number {
  let n = 0;
  for (const cell of cells) if (cell !== '' && cell.trim() !== '') n += 1;
  return n;
}

export function numericCells(cells: readonly string[]): number {
  let n = 0;
  for (const cell of cells) if (looksNumeric(cell)) n += 1;
  return n;
}

/**
 * A line that starts with '#', '%' or '//' is a comment, save where the mark alone heads a column of shot numbers ("#;Rest;…")
 * or is part of a shot's number ("#12;12.0;15.5").
 */
export function isComment(cells: readonly string[]): boolean {
  const first = (cells[0] ?? '').trimStart();
  if (first.startsWith('//')) return true;
  if (!first.startsWith('#') && !first.startsWith('%')) return false;
  if (/^[#%]\s*$/.test(first)) return filled(cells) < 2;
  return !(/^#\s?\d+\s*$/.test(first) && numericCells(cells.slice(1)) > 0);
}

/** Marks that people put where there is no reading. */
const NO_READING = /^(?:[-–—.]+|n\.?\/?a\.?|nan|none|null)$/i;

export function isNoReading(text: string): boolean {
  const trimmed = text.trim();
  return trimmed === '' || NO_READING.test(trimmed);
}
