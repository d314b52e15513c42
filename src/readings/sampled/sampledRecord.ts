/** A long plain record of numbers, read piece by piece: columns of numbers, the text above them, and what was passed over. */
import { problem, type Place, type Problem } from '../../problems/problems.ts';
import type { DecimalMark } from '../../units/quantity.ts';
import { scanLines } from './byteScanner.ts';
import { createDecoder, textOf, utf8Of } from './encodedText.ts';
import { createOddRows, type OddRows } from './oddRows.ts';
import { cellsOfLine, MOST_NUMBERS, SampledRows, type PassedOver } from './sampledRows.ts';
import { SNIFFED, sniffSampled, type SampledDelimiter, type SampledDialect } from './sniff.ts';
import { isCutOff, TAIL_KEPT } from './tail.ts';

export interface SampledColumnRead {
  /** '' for none. */
  readonly header: string;
  /** As written in the header or beneath it, '' for none. */
  readonly unitText: string;
  /** One a row; NaN: no number there. */
  readonly values: Float64Array;
  readonly missing: number;
  /** Times of day, s since midnight, or with a date s since 1970-01-01. */
  readonly clock: boolean;
}

export interface SampledRecord {
  readonly rows: number;
  /** Columns with numbers in more than half of the rows, in the order of the file. */
  readonly columns: readonly SampledColumnRead[];
  /** Lines above the header, blank ones left out. */
  readonly preamble: readonly string[];
  /** One-based line of row 0. */
  readonly firstLine: number;
  /** The first of the rows that held a word in a column of numbers or too few cells, and of the lines between that are no rows. */
  readonly passedOver: readonly PassedOver[];
  readonly passedOverCount: number;
  readonly delimiter: SampledDelimiter;
  readonly decimal: DecimalMark;
  /** Read by the byte scanner throughout. */
  readonly plain: boolean;
  readonly problems: readonly Problem[];
  /** One-based line of a row, counted from 0. */
  readonly lineOfRow: (row: number) => number;
}

export interface SampledReader {
  /** The bytes may be used again afterwards. */
  readonly take: (bytes: Uint8Array) => void;
  readonly finish: () => SampledRecord;
  /** No more is taken, the record is as long as it can be. */
  readonly isFull: () => boolean;
}

export interface SampledReading {
  /** Instead of what the first bytes say. */
  readonly dialect?: SampledDialect;
  /** Bytes of the whole file, so that the arrays need not grow. */
  readonly bytes?: number;
  readonly place?: Place;
  /** Characters that PapaParse cuts at once. */
  readonly piece?: number;
}

/** A header may stand this deep in a file of notes. Bytes. */
const DEEPEST_HEADER = 1 << 20;

/** A longer line is none. Bytes. */
const LONGEST_LINE = 1 << 20;

/** Rows expected beyond those that the first ones promise. */
const SPARE = 1.05;

/** Bytes put one after another. */
class Gathered {
  private bytes = new Uint8Array(4096);
  length = 0;

  add(more: Uint8Array): void {
    if (this.length + more.length > this.bytes.length) {
      const larger = new Uint8Array(2 * (this.length + more.length));
      larger.set(this.all());
      this.bytes = larger;
    }
    this.bytes.set(more, this.length);
    this.length += more.length;
  }

  all(): Uint8Array {
    return this.bytes.subarray(0, this.length);
  }

  keepLast(count: number): void {
    if (this.length <= count) return;
    this.bytes.copyWithin(0, this.length - count, this.length);
    this.length = count;
  }
}

/** Reads a record from bytes as they come, in pieces of any length: the same record, whatever the pieces. */
export function createSampledReader({ dialect: given, bytes = 0, place = {}, piece }: SampledReading = {}): SampledReader {
  const head = new Gathered();
  const line = new Gathered();
  const tail = new Gathered();
  let total = 0;
  let sniffAt = SNIFFED;
  let dialect: SampledDialect | null = null;
  let rows: SampledRows | null = null;
  let odd: OddRows | null = null;
  let decode: ((bytes: Uint8Array) => string) | null = null;
  /** Lines above the first row that are still to come. */
  let linesAbove = 0;
  let tooLong = false;

  function begin(found: SampledDialect): void {
    dialect = found;
    rows = new SampledRows(found, (SPARE * bytes) / found.bytesPerRow);
    linesAbove = found.firstLine - 1;
    const beginning = head.all().subarray(found.mark);
    if (!found.plain) beOdd();
    feed(beginning);
  }

  function beOdd(): OddRows {
    odd = createOddRows(rows!, piece);
    decode = createDecoder(dialect!.encoding);
    return odd;
  }

  function feed(chunk: Uint8Array): void {
    if (odd === null) feedPlain(chunk);
    else feedOdd(decode!(chunk));
  }

  function feedOdd(text: string): void {
    let from = 0;
    while (linesAbove > 0) {
      const stop = text.indexOf(dialect!.newline, from);
      if (stop === -1) return;
      linesAbove -= 1;
      from = stop + 1;
    }
    odd!.take(from === 0 ? text : text.slice(from));
  }

  /** Lines that are whole; the last is held until it is. */
  function feedPlain(chunk: Uint8Array): void {
    const newline = dialect!.newline.charCodeAt(0);
    let from = 0;
    while (linesAbove > 0) {
      const stop = chunk.indexOf(newline, from);
      if (stop === -1) return;
      linesAbove -= 1;
      from = stop + 1;
    }
    if (line.length > 0 || tooLong) {
      const stop = chunk.indexOf(newline, from);
      if (!tooLong) line.add(chunk.subarray(from, stop === -1 ? chunk.length : stop + 1));
      if (line.length > LONGEST_LINE) {
        rows!.passLong(textOf(line.all().subarray(0, 100), dialect!.encoding));
        line.keepLast(0);
        tooLong = true;
      }
      if (stop === -1) return;
      from = stop + 1;
      tooLong = false;
      const held = line.all().slice();
      line.keepLast(0);
      if (scanned(held, 0, held.length, chunk.subarray(from))) return;
    }
    const end = chunk.lastIndexOf(newline) + 1;
    if (end > from && scanned(chunk, from, end, chunk.subarray(end))) return;
    line.add(chunk.subarray(Math.max(from, end)));
  }

  /** True where a quotation mark stopped the scanner: that line and `after` were given on. */
  function scanned(lines: Uint8Array, from: number, to: number, after: Uint8Array): boolean {
    const stop = scanLines(rows!, lines, from, to);
    if (stop === to) return false;
    beOdd();
    feed(lines.subarray(stop, to));
    feed(after);
    return true;
  }

  function take(chunk: Uint8Array): void {
    total += chunk.length;
    tail.add(chunk.subarray(Math.max(0, chunk.length - TAIL_KEPT)));
    tail.keepLast(TAIL_KEPT);
    put(chunk);
  }

  function put(chunk: Uint8Array): void {
    if (rows !== null) {
      if (!rows.full) feed(chunk);
      return;
    }
    if (head.length >= DEEPEST_HEADER) return;
    // The first bytes alone are looked at, however many come at once.
    const more = chunk.subarray(0, sniffAt - head.length);
    head.add(more);
    if (head.length < sniffAt) return;
    const found = given ?? sniffSampled(head.all());
    if (found !== null) begin(found);
    else sniffAt = Math.min(DEEPEST_HEADER, sniffAt * 4);
    if (more.length < chunk.length) put(chunk.subarray(more.length));
  }

  function finish(): SampledRecord {
    if (rows === null) {
      const found = given ?? sniffSampled(head.all(), head.length === total);
      if (found !== null) begin(found);
    }
    if (rows === null || dialect === null) return nothing(total, place);
    const cutOff = isCutOff(tail.all(), total, dialect);
    if (odd === null && line.length > 0 && line.all().includes(0x22)) {
      const last = line.all().slice();
      line.keepLast(0);
      beOdd();
      feed(last);
    }
    if (odd !== null) odd.finish(cutOff);
    else if (line.length > 0) rows.take(cellsOfLine(textOf(line.all(), dialect.encoding), dialect.delimiter), 1, cutOff);
    return recordOf(rows, { plain: odd === null, badQuotes: odd?.badQuotes ?? [], cutOff, place });
  }

  return { take, finish, isFull: () => rows?.full ?? false };
}

function nothing(bytes: number, place: Place): SampledRecord {
  return {
    rows: 0, columns: [], preamble: [], firstLine: 1, passedOver: [], passedOverCount: 0, delimiter: ',', decimal: '.', plain: false, lineOfRow: (row) => row + 1,
    problems: [bytes === 0 ? problem('file-empty', 'stops', place) : problem('trace-no-samples', 'stops', place, { rows: 0 })],
  };
}

interface Ending {
  readonly plain: boolean;
  readonly badQuotes: readonly number[];
  readonly cutOff: boolean;
  readonly place: Place;
}

function recordOf(rows: SampledRows, { plain, badQuotes, cutOff, place }: Ending): SampledRecord {
  const { dialect } = rows;
  const kept = rows.kept();
  const passed = rows.passedOver(kept.columns.map(({ index }) => index));
  const problems: Problem[] = [];
  if (dialect.encoding === 'windows-1252') problems.push(problem('file-other-encoding', 'note', place, { taken: dialect.encoding }));
  if (dialect.numbersTorn) problems.push(problem('decimal-comma-in-comma-file', 'doubt', { ...place, line: dialect.firstLine }, { found: tornExample(kept.columns.map(({ values }) => values)), columns: dialect.headers.filter((header) => header !== '').length }));
  if (kept.columns.length === 0 || kept.rows < 2) problems.push(problem('trace-no-samples', 'stops', place, { rows: kept.columns.length === 0 ? 0 : kept.rows }));
  if (rows.full) problems.push(problem('trace-too-long', 'stops', place, { rows: rows.rows, most: Math.floor(MOST_NUMBERS / Math.max(1, kept.columns.length)) }));
  for (const line of badQuotes.slice(0, 1)) problems.push(problem('quote-not-closed', 'doubt', { ...place, line }));
  const [first] = passed.first;
  if (first !== undefined) problems.push(problem('trace-rows-passed-over', 'note', { ...place, line: first.line }, { rows: passed.count, found: first.text.slice(0, 60) }));
  if (cutOff) problems.push(problem('trace-cut-off', 'note', place));
  return {
    rows: kept.rows,
    columns: kept.columns.map(({ index, values, missing, clock }) => ({ header: dialect.headers[index] ?? '', unitText: dialect.unitTexts[index] ?? '', values, missing, clock })),
    preamble: dialect.preamble, firstLine: dialect.firstLine, passedOver: passed.first, passedOverCount: passed.count, delimiter: dialect.delimiter, decimal: dialect.decimal, plain, problems,
    lineOfRow: rows.lineOfRow(),
  };
}

/** "12,5" from the first two columns. */
function tornExample([whole, decimals]: readonly Float64Array[]): string {
  return `${whole?.[0] ?? 0},${decimals?.[0] ?? 0}`;
}

/** A whole text at once. */
export function readSampledText(text: string, reading: SampledReading = {}): SampledRecord {
  const bytes = utf8Of(text);
  const reader = createSampledReader({ bytes: bytes.length, ...reading });
  reader.take(bytes);
  return reader.finish();
}
