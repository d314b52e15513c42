/** The rows of a sampled record as they are read: growing columns of numbers, the line of each row, and the rows that held a word. */
import { readSampledCell, type SampledCell } from './sampledCell.ts';
import type { SampledDialect } from './sniff.ts';

export interface PassedOver {
  /** One-based. */
  readonly line: number;
  readonly text: string;
}

/** A column that was never given a number has no array. */
const NONE = new Float64Array(0);

/** Rows passed over that are told by their text. */
export const TOLD = 20;

const LONGEST_TOLD = 200;

/** Numbers that are kept of one record; 1.6 GB. */
export const MOST_NUMBERS = 200_000_000;

/** Rows that there is room for at the least, and growth where the file has more rows than its beginning promised. */
const FEWEST = 1024;
const GROWTH = 1.5;

/** Rows told of by which columns they lack: beyond this many different sets they count for every column. */
const MOST_SETS = 1000;

const EVERY_COLUMN = -1;

/** Columns from this one on share a bit. */
const LAST_BIT = 30;

const bitOf = (column: number): number => 1 << Math.min(column, LAST_BIT);

/** A line that begins with one of these is a comment. */
const COMMENT = /^\s*(?:#|%|\/\/)/;

/** What stands where a file was not written to its end: zeros, and the sign that once ended a text. */
const UNPRINTED = ['\0', '\u001a'];
const isFilled = (cell: string): boolean => UNPRINTED.reduce((text, sign) => text.replaceAll(sign, ''), cell).trim() !== '';
const filledCells = (cells: readonly string[]): number => cells.findLastIndex(isFilled) + 1;

const NO_NUMBER: Readonly<SampledCell> = { kind: 'word', value: Number.NaN };

/** The cells of a line without quotation marks. */
export function cellsOfLine(text: string, delimiter: SampledDialect['delimiter']): string[] {
  return delimiter === ' ' ? text.split(/[ \t\r]+/).filter((cell) => cell !== '') : text.split(delimiter);
}

/** Where the rows of one record gather, from the byte scanner and from cells of text alike. */
export class SampledRows {
  readonly dialect: SampledDialect;
  /** One array a column, `capacity` long; NONE until the column's first number. */
  readonly buffers: Float64Array[];
  readonly missing: Float64Array;
  readonly clocks: Float64Array;
  rows = 0;
  /** Rows at the end so far that hold no number. */
  emptyTail = 0;
  /** One-based line of the text that comes next. */
  line: number;
  capacity: number;
  /** No more is taken: MOST_NUMBERS are there. */
  full = false;
  /** Row and line from which on rows and lines go together again. */
  private readonly breakRows: number[] = [0];
  private readonly breakLines: number[];
  private readonly passed = new Map<number, { count: number; readonly first: PassedOver[] }>();
  private readonly cell: SampledCell = { kind: 'empty', value: Number.NaN };
  private readonly kinds: SampledCell['kind'][] = [];
  private readonly headerText: string;

  constructor(dialect: SampledDialect, rowsExpected: number) {
    this.dialect = dialect;
    this.buffers = Array.from({ length: dialect.columns }, () => NONE);
    this.missing = new Float64Array(dialect.columns);
    this.clocks = new Float64Array(dialect.columns);
    this.capacity = Math.max(FEWEST, Math.ceil(Math.min(rowsExpected, MOST_NUMBERS / dialect.columns)));
    this.line = dialect.firstLine;
    this.breakLines = [dialect.firstLine];
    this.headerText = dialect.headerCells.map((cell) => cell.trim()).join('\n');
  }

  /** Room for one row more; false where the record is full. */
  makeRoom(): boolean {
    if (this.rows < this.capacity) return true;
    const open = Math.max(1, this.buffers.filter((buffer) => buffer !== NONE).length);
    const capacity = Math.min(Math.ceil(this.capacity * GROWTH), Math.floor(MOST_NUMBERS / open));
    if (capacity <= this.rows) {
      this.full = true;
      return false;
    }
    this.capacity = capacity;
    this.buffers.forEach((buffer, i) => {
      if (buffer === NONE) return;
      const larger = new Float64Array(capacity);
      larger.set(buffer);
      this.buffers[i] = larger;
    });
    return true;
  }

  /** The array of a column that gets its first number now. */
  open(column: number): Float64Array {
    const buffer = new Float64Array(this.capacity);
    buffer.fill(Number.NaN, 0, this.rows);
    this.missing[column] = this.rows;
    this.buffers[column] = buffer;
    return buffer;
  }

  /** A cell that is no plain number. */
  read(text: string): SampledCell {
    readSampledCell(text.trim(), this.dialect.decimal, this.cell);
    return this.cell;
  }

  /** The line after this one is the next row's. */
  private skip(lines: number): void {
    this.line += lines;
    const last = this.breakRows.length - 1;
    if (this.breakRows[last] === this.rows) this.breakLines[last] = this.line;
    else {
      this.breakRows.push(this.rows);
      this.breakLines.push(this.line);
    }
  }

  /** A row or a line that lacks the columns of `set`. */
  tell(set: number, line: number, cells: () => readonly string[]): void {
    let seen = this.passed.get(set);
    if (seen === undefined) {
      const key = this.passed.size < MOST_SETS ? set : EVERY_COLUMN;
      seen = this.passed.get(key) ?? { count: 0, first: [] };
      this.passed.set(key, seen);
    }
    seen.count += 1;
    if (seen.first.length < TOLD) seen.first.push({ line, text: cells().join(this.dialect.delimiter).trim().slice(0, LONGEST_TOLD) });
  }

  /**
   * One line as cells. It is a row where it holds a number, or as many cells as the others; else it is passed over.
   *
   * @param lines lines of the text that it takes up
   * @param cutOff its last cell was cut off where the file ends
   */
  take(cells: readonly string[], lines = 1, cutOff = false): void {
    if (!this.makeRoom()) return;
    const { usual, columns, delimiter } = this.dialect;
    const { rows: row, kinds } = this;
    const cut = cutOff ? filledCells(cells) - 1 : -1;
    let numbers = 0;
    let lacks = 0;
    let shifted = delimiter === ' ' && cells.length < usual;
    for (let c = 0; c < cells.length; c += 1) {
      const { kind, value } = c === cut ? NO_NUMBER : this.read(cells[c]!);
      const isNumber = kind === 'number' || kind === 'clock';
      if (isNumber) numbers += 1;
      if (c >= columns) {
        shifted ||= isNumber;
        continue;
      }
      kinds[c] = kind;
      if (kind === 'word') lacks |= bitOf(c);
      const buffer = this.buffers[c]!;
      if (buffer !== NONE) buffer[row] = value;
      else if (isNumber) this.open(c)[row] = value;
    }
    if (numbers === 0 && cells.length < Math.max(2, usual) && filledCells(cells) === 0) {
      this.skip(lines);
      return;
    }
    if (COMMENT.test(cells[0] ?? '') || (numbers === 0 && this.isNoRow(cells))) {
      this.tell(EVERY_COLUMN, this.line, () => cells);
      this.skip(lines);
      return;
    }
    for (let c = cells.length; c < columns; c += 1) {
      kinds[c] = 'word';
      if (c < usual) lacks |= bitOf(c);
    }
    if (shifted) lacks = EVERY_COLUMN;
    if (lacks !== 0) this.tell(lacks, this.line, () => cells);
    for (let c = 0; c < columns; c += 1) {
      const kind = shifted ? 'word' : kinds[c]!;
      if (kind === 'number') continue;
      if (kind === 'clock') this.clocks[c] = this.clocks[c]! + 1;
      else {
        this.missing[c] = this.missing[c]! + 1;
        if (this.buffers[c] !== NONE) this.buffers[c]![row] = Number.NaN;
      }
    }
    this.rows += 1;
    this.emptyTail = numbers === 0 || shifted ? this.emptyTail + 1 : 0;
    if (lines === 1) this.line += 1;
    else this.skip(lines);
  }

  /** Words alone: a message between the rows, or a header that comes again; not a row in which nothing could be measured. */
  private isNoRow(cells: readonly string[]): boolean {
    const { usual } = this.dialect;
    if (cells.length < usual) return true;
    if (usual === 1 && /\S\s+\S/.test(cells[0] ?? '')) return true;
    return this.headerText !== '' && cells.map((cell) => cell.trim()).join('\n') === this.headerText;
  }

  /** Line that is too long to be one. */
  passLong(start: string): void {
    this.tell(EVERY_COLUMN, this.line, () => [start]);
    this.skip(1);
  }

  /** Columns with numbers in more than half of the rows; the arrays are views where little of them is unused, else copies. */
  kept(): { readonly rows: number; readonly columns: readonly { readonly index: number; readonly values: Float64Array; readonly missing: number; readonly clock: boolean }[] } {
    const rows = this.rows - this.emptyTail;
    const columns = this.buffers.flatMap((buffer, index) => {
      const missing = this.missing[index]! - this.emptyTail;
      if (buffer === NONE || (rows - missing) * 2 <= rows) return [];
      const values = this.capacity <= rows * 1.25 ? buffer.subarray(0, rows) : buffer.slice(0, rows);
      this.buffers[index] = NONE;
      return [{ index, values, missing, clock: this.clocks[index]! * 2 > rows }];
    });
    return { rows, columns };
  }

  /** Rows and lines that lacked one of these columns, or were no rows at all. */
  passedOver(columns: readonly number[]): { readonly count: number; readonly first: readonly PassedOver[] } {
    const wanted = columns.reduce((set, c) => set | bitOf(c), 0);
    const sets = [...this.passed].filter(([set]) => set === EVERY_COLUMN || (set & wanted) !== 0).map(([, seen]) => seen);
    return {
      count: sets.reduce((sum, { count }) => sum + count, 0),
      first: sets.flatMap(({ first }) => first).sort((a, b) => a.line - b.line).slice(0, TOLD),
    };
  }

  /** One-based line of a row, counted from 0. */
  lineOfRow(): (row: number) => number {
    const { breakRows, breakLines } = this;
    return (row) => {
      let [low, high] = [0, breakRows.length];
      while (high - low > 1) {
        const middle = (low + high) >> 1;
        if (breakRows[middle]! <= row) low = middle;
        else high = middle;
      }
      return breakLines[low]! + row - breakRows[low]!;
    };
  }
}
