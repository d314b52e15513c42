/** Rows of a sampled record whose text has quotation marks or needs decoding, cut by PapaParse piece by piece. */
import Papa from 'papaparse';
import type { SampledRows } from './sampledRows.ts';

/** Characters that are cut at once. */
const PIECE = 1 << 20;

/** No quoted cell is longer; a quotation mark that opens one is a plain sign. */
const LONGEST_ROW = 1 << 16;

/** A record has few stray quotation marks; past this many the rest of the text is cut without heeding any. */
const MOST_QUOTE_REPAIRS = 20;

export interface OddRows {
  take(text: string): void;
  finish(cutOff: boolean): void;
  /** Lines with a quotation mark that does not close. */
  readonly badQuotes: readonly number[];
}

interface Cut {
  readonly data: readonly string[][];
  readonly errors: readonly { readonly type: string; readonly row?: number }[];
  readonly meta: { readonly cursor: number };
}

/** `piece` is smaller in tests alone. */
export function createOddRows(rows: SampledRows, piece = PIECE): OddRows {
  const { delimiter, newline } = rows.dialect;
  const badQuotes: number[] = [];
  let held = '';
  let due = piece;

  function cut(text: string, heed: boolean, last: boolean): Cut {
    const parsed: Cut = new Papa.Parser({ delimiter, newline, ...(heed ? {} : { fastMode: true }) }).parse(text, 0, !last);
    return parsed;
  }

  function put(cells: readonly string[], quoted: boolean, cutOff = false): void {
    let lines = 1;
    if (quoted) for (const cell of cells) if (cell.includes(newline)) lines += cell.split(newline).length - 1;
    rows.take(delimiter === ' ' ? cells.flatMap((cell) => cell.split(/[\t\r]+/)).filter((cell) => cell !== '') : cells, lines, cutOff);
  }

  /** Takes the next line without heeding its quotation marks. */
  function putPlainly(end: number, cutOff: boolean): void {
    badQuotes.push(rows.line);
    put(held.slice(0, end).split(delimiter), false, cutOff);
  }

  function work(last: boolean, cutOff: boolean): void {
    for (;;) {
      const heed = badQuotes.length < MOST_QUOTE_REPAIRS;
      const quoted = held.includes('"');
      const { data, errors, meta } = cut(held, heed, last);
      const bad = errors.find(({ type }) => type === 'Quotes');
      const sound = bad === undefined ? data : data.slice(0, bad.row ?? 0);
      // A text that ends with its last line has no row after it.
      const ended = last && held.endsWith(newline) && bad === undefined;
      sound.forEach((cells, i) => {
        const isLast = last && bad === undefined && i === sound.length - 1;
        if (!(isLast && ended && cells.length === 1 && cells[0] === '')) put(cells, quoted, isLast && cutOff);
      });
      if (bad === undefined) {
        held = last ? '' : held.slice(meta.cursor);
        if (held.length <= LONGEST_ROW || !heed || !held.includes('"')) return;
      } else {
        let start = 0;
        for (const cells of sound) for (let n = cells.reduce((sum, cell) => sum + cell.split(newline).length - 1, 1); n > 0; n -= 1) start = held.indexOf(newline, start) + 1;
        held = held.slice(start);
      }
      const stop = held.indexOf(newline);
      if (stop === -1 && !last) return;
      putPlainly(stop === -1 ? held.length : stop, stop === -1 && cutOff);
      held = stop === -1 ? '' : held.slice(stop + 1);
      if (held === '') return;
    }
  }

  return {
    badQuotes,
    take(text) {
      held += text;
      if (held.length < due) return;
      work(false, false);
      due = held.length + piece;
    },
    finish(cutOff) {
      if (held !== '') work(true, cutOff);
    },
  };
}
