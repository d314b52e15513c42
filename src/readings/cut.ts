/** Text to rows of cells with the line each row starts on. */
import Papa from 'papaparse';

export type Delimiter = ',' | ';' | '\t';

export interface CutRow {
  /** One-based physical line of the text on which the row starts. */
  readonly line: number;
  readonly cells: string[];
}

export interface Cut {
  readonly rows: CutRow[];
  /** Lines with a quotation mark that does not close as RFC 4180 asks; cut with quotation marks as plain characters. */
  readonly badQuotes: readonly number[];
  /** The text as it was cut: without byte-order mark, with one kind of line end. */
  readonly text: string;
  readonly newline: string;
}

/** A hand table has few stray quotation marks; past this many the rest of the text is cut without heeding any. */
const MOST_QUOTE_REPAIRS = 20;

/** One kind of line end, so that lines can be counted: as it is where the text has one kind, else '\n'. */
function withOneNewline(text: string): { text: string; newline: string } {
  if (!text.includes('\r')) return { text, newline: '\n' };
  const pairs = text.match(/\r\n/g)?.length ?? 0;
  const returns = text.match(/\r/g)?.length ?? 0;
  const feeds = text.match(/\n/g)?.length ?? 0;
  if (pairs === returns && pairs === feeds) return { text, newline: '\r\n' };
  if (feeds === 0) return { text, newline: '\r' };
  return { text: text.replace(/\r\n?/g, '\n'), newline: '\n' };
}

function count(text: string, mark: string): number {
  let n = 0;
  for (let at = text.indexOf(mark); at !== -1; at = text.indexOf(mark, at + mark.length)) n += 1;
  return n;
}

function parse(text: string, delimiter: Delimiter, newline: '\n' | '\r\n' | '\r', heedQuotes: boolean): Papa.ParseResult<string[]> {
  return Papa.parse<string[]>(text, { delimiter, newline, header: false, skipEmptyLines: false, ...(heedQuotes ? {} : { fastMode: true }) });
}

/**
 * Rows of the text in order, blank ones included (one empty cell), cells as they are (spaces kept, quotation marks undone).
 *
 * Source: RFC 4180 section 2 (rules from memory).
 */
export function cutRows(raw: string, delimiter: Delimiter): Cut {
  const { text, newline } = withOneNewline(raw.startsWith('\ufeff') ? raw.slice(1) : raw);
  const end = newline as '\n' | '\r\n' | '\r';
  const rows: CutRow[] = [];
  const badQuotes: number[] = [];
  let rest = text;
  let line = 1;
  const take = (parsed: readonly string[][], upTo: number): void => {
    for (let i = 0; i < upTo; i++) {
      const cells = parsed[i] ?? [];
      rows.push({ line, cells });
      line += 1;
      for (const cell of cells) if (cell.length > 0 && cell.includes(end)) line += count(cell, end);
    }
  };
  for (;;) {
    const heed = badQuotes.length < MOST_QUOTE_REPAIRS;
    const { data, errors } = parse(rest, delimiter, end, heed);
    const bad = heed ? errors.find((e) => e.type === 'Quotes') : undefined;
    if (bad === undefined) {
      take(data, data.length);
      return { rows, badQuotes, text, newline };
    }
    const before = line;
    take(data, bad.row ?? 0);
    let start = 0;
    for (let n = before; n < line; n++) start = rest.indexOf(end, start) + end.length;
    const stop = rest.indexOf(end, start);
    badQuotes.push(line);
    take(parse(stop === -1 ? rest.slice(start) : rest.slice(start, stop), delimiter, end, false).data, 1);
    if (stop === -1) return { rows, badQuotes, text, newline };
    rest = rest.slice(stop + end.length);
  }
}
