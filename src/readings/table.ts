/** A text of readings to a table: delimiter, decimal mark, preamble, header, units row and rows, each row with its line. */
import { problem } from '../problems/problems.ts';
import type { Place, Problem } from '../problems/problems.ts';
import { cutRows } from './cut.ts';
import type { CutRow, Delimiter } from './cut.ts';
import { decimalOf, delimiterOf } from './dialect.ts';
import { filled, isBlank, isComment, looksNumeric, widthOf } from './cells.ts';
import { findHeader } from './header.ts';
import { unitTextOf, unitInBrackets } from './headerUnits.ts';
import { commaProblems } from './splitNumbers.ts';

export interface TableRow {
  /** One-based physical line of the text on which the row starts, header and quoted line ends counted. */
  readonly line: number;
  /** Cells as they came, spaces kept, as many as there are columns (more in a row that is too long). */
  readonly cells: readonly string[];
}

export interface TableRead {
  readonly delimiter: Delimiter;
  readonly decimal: '.' | ',';
  /** Lines that are no rows: free text before the header, and comment lines wherever they stand. */
  readonly preamble: readonly { readonly line: number; readonly text: string }[];
  /** null: the first row is all readings. */
  readonly headerLine: number | null;
  /** One a column; '' where there is none. */
  readonly headers: readonly string[];
  /** Unit of each column as written in the header or in a units row beneath; null where none is. */
  readonly unitTexts: readonly (string | null)[];
  readonly rows: readonly TableRow[];
  readonly problems: readonly Problem[];
}

export interface TableOptions {
  readonly delimiter?: Delimiter;
  readonly decimal?: '.' | ',';
  /** Put into the place of every problem. */
  readonly place?: Place;
}

/** Cuts a text into a table. Whatever the text, a table comes back; what is wrong with it stands in `problems`. */
export function readTable(text: string, options: TableOptions = {}): TableRead {
  const place = options.place ?? {};
  const delimiter = options.delimiter ?? delimiterOf(text);
  const cut = cutRows(text, delimiter);
  const content: CutRow[] = [];
  const comments: CutRow[] = [];
  for (const row of cut.rows) {
    if (isBlank(row.cells)) continue;
    (isComment(row.cells) ? comments : content).push(row);
  }
  const nothing = content.length === 0 && comments.length === 0;
  const found = findHeader(content, comments);
  const unread = new Set(found.preamble.map((row) => row.line));
  for (const comment of comments) if (comment !== found.headerRow) unread.add(comment.line);

  const ownWidth = found.headerRow === null ? 0 : widthOf(found.headerCells);
  const width = columnsOf(found.rows, ownWidth);
  const headers = Array.from({ length: width }, (_, i) => (found.headerCells[i] ?? '').replace(/\s+/g, ' ').trim());
  const unitTexts = headers.map((header, i) => {
    const below = found.unitCells === null ? '' : (found.unitCells[i] ?? '').trim();
    return unitTextOf(header) ?? (below === '' || below === '-' || below === '–' ? null : unitInBrackets(below));
  });
  const told = decimalOf(found.rows);
  const decimal = options.decimal ?? told.decimal;

  const problems: Problem[] = [];
  if (nothing) problems.push(problem('file-empty', 'stops', place));
  else if (found.rows.length === 0) problems.push(problem('file-no-rows', 'stops', place, { lines: content.length + comments.length }));
  for (const line of cut.badQuotes) if (!unread.has(line)) problems.push(problem('quote-not-closed', 'doubt', { ...place, line }));
  if (told.commas > 0 && told.points > 0) {
    problems.push(problem('decimal-marks-mixed', 'doubt', place, { commas: told.commas, points: told.points, taken: decimal }));
  }
  const split = delimiter === ',' ? commaProblems(found.rows, { columns: width, headerCells: found.headerCells.length }, place) : [];
  problems.push(...split);
  const spoiled = new Set(split.map((p) => p.place.line));
  const rows = found.rows.map(({ line, cells }): TableRow => {
    const own = widthOf(cells);
    if (!spoiled.has(line) && (own > width || (cells.length < width && found.headerRow !== null))) {
      problems.push(problem('row-ragged', own > width ? 'doubt' : 'note', { ...place, line }, { found: own > width ? own : cells.length, expected: width }));
    }
    if (cells.length === width) return { line, cells };
    return { line, cells: cells.length > width ? cells.slice(0, Math.max(own, width)) : [...cells, ...Array<string>(width - cells.length).fill('')] };
  });

  const lines = unread.size === 0 ? [] : cut.text.split(cut.newline);
  return {
    delimiter,
    decimal,
    preamble: [...unread].sort((a, b) => a - b).map((line) => ({ line, text: lines[line - 1] ?? '' })),
    headerLine: found.headerRow?.line ?? null,
    headers,
    unitTexts,
    rows,
    problems,
  };
}

/** Columns of the table: those of the header, and further ones that at least half the rows fill. */
function columnsOf(rows: readonly CutRow[], headerWidth: number): number {
  const reach: number[] = [];
  for (const { cells } of rows) {
    const own = widthOf(cells);
    reach[own] = (reach[own] ?? 0) + 1;
  }
  let reaching = 0;
  for (let width = reach.length - 1; width > headerWidth; width--) {
    reaching += reach[width] ?? 0;
    // Without a header every filled cell is a column; a header's own width gives way only to what most rows do.
    if (headerWidth === 0 ? reaching > 0 : reaching * 2 >= rows.length && filledThere(rows, width)) return width;
  }
  return headerWidth;
}

/** Extra columns are columns, not numbers split at a decimal comma, where a good part of them holds text. */
function filledThere(rows: readonly CutRow[], width: number): boolean {
  let text = 0;
  let all = 0;
  for (const { cells } of rows) {
    const cell = cells[width - 1] ?? '';
    if (cell.trim() === '') continue;
    all += 1;
    if (!looksNumeric(cell) || /[.,]/.test(cell) || filled(cells) < width - 1) text += 1;
  }
  return text * 2 >= all;
}
