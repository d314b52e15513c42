/** Which delimiter and which decimal mark a text uses, told from the text itself. */
import type { Delimiter } from './cut.ts';

/** Enough to tell the delimiter of a hand table with a long preamble. */
const SAMPLE_LINES = 400;
const SAMPLE_CHARACTERS = 65_536;

const QUOTED = /(^|[,;\t\n])"(?:[^"]|"")*"/g;

/** Comments at the head of a line, which must not vote on the delimiter. */
const COMMENT = /^\s*(?:#|%|\/\/)(?!\s*\d*\s*[,;\t])/;

interface Evidence {
  /** Lines that hold the mark at all, and those that hold it as often as most of these do. */
  readonly lines: number;
  readonly alike: number;
  readonly columns: number;
}

function evidence(lines: readonly string[], mark: Delimiter): Evidence {
  const counts = new Map<number, number>();
  let holding = 0;
  for (const line of lines) {
    const n = line.split(mark).length - 1;
    if (n === 0) continue;
    holding += 1;
    counts.set(n, (counts.get(n) ?? 0) + 1);
  }
  let columns = 0;
  let alike = 0;
  for (const [n, times] of counts) if (times > alike || (times === alike && n + 1 > columns)) [columns, alike] = [n + 1, times];
  return { lines: holding, alike, columns };
}

/**
 * Delimiter of a text: tab where tabs line up, else semicolon where semicolons line up ("12,5;13,1" has decimal commas), else comma.
 * A semicolon in the notes of a comma table does not count, nor does a comma in the preamble of a semicolon table.
 */
export function delimiterOf(text: string): Delimiter {
  const sample = text.slice(0, SAMPLE_CHARACTERS).replace(/\r\n?/g, '\n').replace(QUOTED, '$1""');
  const lines = sample.split('\n', SAMPLE_LINES).filter((line) => line.trim() !== '' && !COMMENT.test(line));
  const tab = evidence(lines, '\t');
  const semicolon = evidence(lines, ';');
  const comma = evidence(lines, ',');
  if (tab.lines > 0 && tab.lines * 2 >= Math.max(semicolon.alike, comma.alike)) return '\t';
  if (semicolon.lines === 0) return ',';
  if (comma.lines === 0) return ';';
  const either = lines.filter((line) => line.includes(';') || line.includes(',')).length;
  // The widest line of a comma table is its header or a full row; a semicolon table's has semicolons too.
  const semicolonsThroughout = semicolon.lines >= 0.6 * either;
  const cutsAsMuch = semicolon.columns >= 3 || lines.every((line) => !line.includes(',') || line.includes(';') || line.split(',').length <= 2);
  return semicolonsThroughout && cutsAsMuch ? ';' : ',';
}

const WITH_COMMA = /^[+\-−–]?\s*\d*,\d+(?:\D|$)/u;
const WITH_POINT = /^[+\-−–]?\s*\d*\.\d+(?:\D|$)/u;

const GROUPED = /^[+\-−–]?\s*[1-9]\d{0,2}[.,]\d{3}(?:\D|$)/u;

export interface DecimalRead {
  readonly decimal: '.' | ',';
  /** Cells that can only be read with a decimal comma, with a decimal point. */
  readonly commas: number;
  readonly points: number;
}

/** Decimal mark of the cells: the one that more of them use; the point where none tells. */
export function decimalOf(rows: readonly { readonly cells: readonly string[] }[]): DecimalRead {
  let commas = 0;
  let points = 0;
  let groupedCommas = 0;
  let groupedPoints = 0;
  for (const { cells } of rows) {
    for (const cell of cells) {
      if (cell === '' || cell.length > 40) continue;
      const trimmed = cell.trim();
      if (WITH_COMMA.test(trimmed)) {
        if (GROUPED.test(trimmed)) groupedCommas += 1;
        else commas += 1;
      } else if (WITH_POINT.test(trimmed) && !/\.\d+\./.test(trimmed)) {
        if (GROUPED.test(trimmed)) groupedPoints += 1;
        else points += 1;
      }
    }
  }
  // "1,500" beside numbers with a decimal point is fifteen hundred; beside none it is one and a half.
  if (commas === 0 && points === 0) return { decimal: groupedCommas > groupedPoints ? ',' : '.', commas: groupedCommas, points: groupedPoints };
  return { decimal: commas > points ? ',' : '.', commas, points };
}
