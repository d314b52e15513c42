/** What a sampled record looks like, told from its first bytes: encoding, delimiter, decimal mark, where the rows begin, and whether they are plain. */
import Papa from 'papaparse';
import type { DecimalMark } from '../../units/quantity.ts';
import { encodingOf, textOf, type Encoding } from './encodedText.ts';
import { findSampledHeader } from './sampledHeader.ts';
import { readSampledCell, type SampledCell } from './sampledCell.ts';
import { useOfHeader } from './sampledWords.ts';

/** ' ' stands for any run of spaces and tabs. */
export type SampledDelimiter = '\t' | ';' | ',' | ' ';

export interface SampledDialect {
  readonly encoding: Encoding;
  /** Bytes of the byte-order mark. */
  readonly mark: number;
  /** '\n' where lines end with '\r\n', too. */
  readonly newline: '\n' | '\r';
  readonly delimiter: SampledDelimiter;
  readonly decimal: DecimalMark;
  /** Cells of nearly every row, blank ones at its end included. */
  readonly usual: number;
  /** Cells that belong to a column; a row with numbers beyond has slipped. */
  readonly columns: number;
  /** As cut from the header line, none where there is no header; it may come again where files were put together. */
  readonly headerCells: readonly string[];
  /** One a column, '' for none. */
  readonly headers: readonly string[];
  readonly unitTexts: readonly string[];
  /** Lines above the first row that are neither header nor units, without blank ones. */
  readonly preamble: readonly string[];
  /** One-based line of the first row. */
  readonly firstLine: number;
  /** Of the rows that were seen. */
  readonly bytesPerRow: number;
  /** No quotation marks among the rows and one byte a sign: the byte scanner may read it. */
  readonly plain: boolean;
  /** Commas part the cells and cut the numbers as well: each column of the header comes as two. */
  readonly numbersTorn: boolean;
}

/** A line as cells, with what they are. */
export interface HeadRow {
  readonly line: number;
  readonly cells: readonly string[];
  readonly filled: number;
  readonly numbers: number;
  readonly words: number;
  /** Index of its first number, −1 for none. */
  readonly firstNumber: number;
}

export const SNIFFED = 65_536;

const DELIMITERS: readonly SampledDelimiter[] = ['\t', ';', ',', ' '];

/** Rows at the end of what was seen that tell delimiter and shape: past any preamble. */
const TELLING = 300;

/** A word costs nearly what a number gains, so that a cut through numbers never wins. */
const WORD = 0.9;

/** A heading this soon after what looked like rows says that they were none: "2 5000" above it tells columns and rows. */
const SOON = 3;

const COMMENT = /^\s*(?:#|%|\/\/)/;

const MOST_COLUMNS = 512;

const weigh = ({ numbers, words }: HeadRow): number => Math.max(0, numbers - WORD * words);

function cellsOf(text: string, delimiter: SampledDelimiter, newline: string): readonly string[][] {
  if (delimiter === ' ') return text.split(newline).map((line) => line.split(/[ \t\r]+/).filter((cell) => cell !== ''));
  const cut = (fastMode: boolean): Papa.ParseResult<string[]> => Papa.parse<string[]>(text, { delimiter, newline: newline === '\r' ? '\r' : '\n', ...(fastMode ? { fastMode } : {}) });
  const heeded = cut(false);
  return heeded.errors.some(({ type }) => type === 'Quotes') ? cut(true).data : heeded.data;
}

/** The rows of a text cut in one way; blank ones left out. */
function headRows(text: string, delimiter: SampledDelimiter, decimal: DecimalMark, newline: string): readonly HeadRow[] {
  const read: SampledCell = { kind: 'empty', value: Number.NaN };
  const rows: HeadRow[] = [];
  let line = 1;
  for (const cells of cellsOf(text, delimiter, newline)) {
    let [filled, numbers, words, firstNumber] = [0, 0, 0, -1];
    for (const [c, cell] of cells.entries()) {
      const trimmed = cell.trim();
      if (trimmed === '' || trimmed === '\u001a') continue;
      filled = c + 1;
      readSampledCell(trimmed, decimal, read);
      if (read.kind === 'word') words += 1;
      else if (read.kind !== 'empty') numbers += 1;
      if (numbers === 1 && firstNumber === -1) firstNumber = c;
    }
    if (filled > 0) rows.push({ line, cells, filled, numbers, words, firstNumber });
    line += 1;
    for (const cell of cells) if (cell.includes(newline)) line += cell.split(newline).length - 1;
  }
  return rows;
}

interface Shape {
  readonly delimiter: SampledDelimiter;
  readonly decimal: DecimalMark;
  /** Of the rows alike that weigh most together; their cells, words, and place of the first number. */
  readonly score: number;
  readonly usual: number;
  readonly words: number;
  readonly firstNumber: number;
}

function shapeOf(lines: string, delimiter: SampledDelimiter, decimal: DecimalMark, newline: string): Shape {
  const byShape = new Map<string, Shape & { score: number }>();
  for (const row of headRows(lines, delimiter, decimal, newline)) {
    const weight = weigh(row);
    if (weight === 0) continue;
    const { words, firstNumber } = row;
    const key = `${row.cells.length} ${words} ${firstNumber}`;
    const seen = byShape.get(key) ?? { delimiter, decimal, score: 0, usual: row.cells.length, words, firstNumber };
    seen.score += weight;
    byShape.set(key, seen);
  }
  const [most] = [...byShape.values()].sort((a, b) => b.score - a.score);
  return most ?? { delimiter, decimal, score: 0, usual: 0, words: 0, firstNumber: -1 };
}

function bestShape(text: string, newline: string): Shape {
  const lines = text.split(newline).filter((line) => /\d/.test(line)).slice(-TELLING).join(newline);
  const shapes = DELIMITERS.flatMap((delimiter) => {
    const point = shapeOf(lines, delimiter, '.', newline);
    const comma = delimiter === ',' ? null : shapeOf(lines, delimiter, ',', newline);
    return comma === null || point.score >= comma.score ? [point] : [comma];
  });
  return shapes.reduce((best, shape) => (shape.score > best.score * 1.001 ? shape : best));
}

/** Index of the first row of the record. */
function beginning(rows: readonly HeadRow[], { usual, words, firstNumber }: Shape): number {
  const isWide = (row: HeadRow): boolean => row.filled <= usual && (row.cells.length === usual || row.filled * 2 > usual);
  const isRow = (row: HeadRow): boolean => row.numbers > 0 && isWide(row) && (row.words <= words || row.firstNumber === firstNumber) && !COMMENT.test(row.cells[0] ?? '');
  let from = rows.findIndex(isRow);
  for (let at = from + 1; from !== -1 && at <= from + SOON && at < rows.length; at += 1) {
    const { numbers, filled, cells } = rows[at]!;
    const known = cells.filter((cell) => useOfHeader(cell) !== null).length;
    if (numbers > 0 || filled < usual || known * 2 < filled || COMMENT.test(cells[0] ?? '')) continue;
    const next = rows.findIndex((row, i) => i > at && isRow(row));
    if (next !== -1) from = next;
    break;
  }
  return from;
}

/**
 * The dialect of a record from its beginning, some tens of kilobytes; null where there is no row of numbers in it.
 *
 * @param whole the file ends with `head`: its last line is whole
 */
export function sniffSampled(head: Uint8Array, whole = false): SampledDialect | null {
  const { encoding, mark } = encodingOf(head);
  const wide = encoding.startsWith('utf-16');
  const body = head.subarray(mark, head.length - (wide ? (head.length - mark) & 1 : 0));
  const decoded = textOf(body, encoding);
  const newline = decoded.includes('\n') || !decoded.includes('\r') ? '\n' : '\r';
  const end = decoded.lastIndexOf(newline);
  const text = whole || end === -1 ? decoded : decoded.slice(0, end + 1);
  const shape = bestShape(text, newline);
  if (shape.score === 0) return null;
  const all = headRows(text, shape.delimiter, shape.decimal, newline);
  const begins = beginning(all, shape);
  if (begins === -1) return null;
  const found = findSampledHeader(all, begins, shape, text.split(newline));
  const first = all[begins]!;
  let start = 0;
  for (let line = 1; line < first.line; line += 1) start = text.indexOf(newline, start) + 1;
  const rows = text.slice(start);
  const pointed = /\d\.\d/.test(rows);
  // "12,5" beneath one heading is one number with a decimal comma.
  const single = shape.delimiter === ',' && shape.usual === 2 && found.headers.length === 1 && !pointed;
  const usual = single ? 1 : shape.usual;
  const columns = Math.min(MOST_COLUMNS, single ? 1 : Math.max(shape.usual, found.headers.length));
  const filledColumns = Math.max(...all.slice(begins, begins + TELLING).map(({ filled }) => filled));
  const padded = (texts: readonly string[]): readonly string[] => Array.from({ length: columns }, (_, i) => texts[i] ?? '');
  return {
    encoding, mark, newline, columns, usual,
    delimiter: single ? ';' : shape.delimiter,
    decimal: single ? ',' : shape.decimal,
    headerCells: found.headerCells, headers: padded(found.headers), unitTexts: padded(found.unitTexts), preamble: found.preamble,
    firstLine: first.line,
    bytesPerRow: Math.max(1, (rows.length * (wide ? 2 : 1)) / Math.max(1, all.length - begins)),
    plain: !wide && !rows.includes('"'),
    numbersTorn: !single && shape.delimiter === ',' && found.headers.length >= 2 && filledColumns === 2 * found.headers.length && !pointed,
  };
}
