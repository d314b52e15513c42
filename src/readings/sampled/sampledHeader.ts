/** The header above the rows of a sampled record, the units beneath it, and what stands before. */
import { columnUnit, unitInBrackets, unitTextOf } from '../headerUnits.ts';
import { useOfHeader } from './sampledWords.ts';
import type { HeadRow, SampledDelimiter } from './sniff.ts';

export interface SampledHeader {
  readonly headerCells: readonly string[];
  readonly headers: readonly string[];
  readonly unitTexts: readonly string[];
  readonly preamble: readonly string[];
}

/** Rows of words above the first of numbers in which a header is looked for. */
const ABOVE = 5;

/** Rows that tell how many cells are filled. */
const ROWS = 20;

const LONGEST_HEADER = 60;
const LONGEST_UNKNOWN = 24;

/** Nothing but signs that draw a line. */
const RULE = /^[\s\-=_*#~+|.;,%/]*$/;

const COMMENT = /^\s*(?:#+|%+|\/\/+|;+|!+)\s*/;

/** Units of a record that no quantity here is typed in. */
const OTHER_UNITS = /^(?:h|hr|hrs|hours?|samples?|frames?|a\.?\s?u\.?|arb\.?.*|-|–|1)$/i;

/** Hours at the end of a header; the other units are those of the table. */
const HOURS = /(?:[\s,_/]|\bin\s)(h|hrs?|hours?)$/i;

function unitIn(header: string): string {
  const found = unitTextOf(header) ?? HOURS.exec(header)?.[1];
  if (found !== undefined) return found;
  return /^(?:s|ms|us|µs|μs|sec|seconds)$/.test(header) ? header : '';
}

/** Of a quoted cell that PapaParse does not undo: after a blank, or between blanks. */
const unquoted = (cell: string): string => cell.trim().replace(/^"|"$/g, '').replace(/\s+/g, ' ').trim();

const names = (bare: string): boolean => columnUnit(bare) !== null || OTHER_UNITS.test(bare);

function isUnits(row: HeadRow): boolean {
  const cells = row.cells.map(unquoted);
  const bare = cells.map(unitInBrackets);
  return row.numbers === 0 && bare.some(names) && bare.every((unit, i) => unit === '' || names(unit) || (unit !== cells[i] && unit.length <= 8));
}

/** Cells of a heading without the mark of a comment; a heading parted by single spaces comes in words, which are put together. */
function headingCells(row: HeadRow, delimiter: SampledDelimiter, usual: number, line: string): readonly string[] {
  const bare = row.cells.map((cell, i) => unquoted(i === 0 ? cell.replace(COMMENT, '') : cell));
  if (delimiter !== ' ') return bare;
  const words = bare.filter((cell) => cell !== '');
  if (words.length === usual) return words;
  const text = line.replace(COMMENT, '').trim();
  for (const apart of [/\s*[\t]+\s*/, /\s{2,}/, /\s*[,;]\s*/]) {
    const cells = text.split(apart).filter((cell) => cell !== '');
    if (cells.length === usual) return cells.map(unquoted);
  }
  const joined: string[] = [];
  for (const word of words) {
    if (joined.length > 0 && /^[([{/]/.test(word)) joined[joined.length - 1] += ` ${word}`;
    else joined.push(word);
  }
  return joined.length === usual ? joined.map(unquoted) : words;
}

/** How much a row above the rows looks like their heading; 0: not at all. */
function headingScore(row: HeadRow, cells: readonly string[], usual: number, delimiter: SampledDelimiter, adjacent: boolean): number {
  const filled = cells.filter((cell) => cell !== '').length;
  if (row.words === 0 || row.numbers * 3 > row.filled || RULE.test(cells.join(''))) return 0;
  const known = cells.filter((cell) => unitIn(cell) !== '' || useOfHeader(cell) !== null).length;
  // One heading above two cells may be that of one number with a decimal comma.
  const fits = filled === 1 ? !/[:=]|\s\d+$/.test(cells[0] ?? '') && (usual === 1 || (usual === 2 && delimiter === ',' && adjacent && known > 0)) : filled >= Math.ceil(usual / 2);
  if (!fits || cells.some((cell) => cell.length > LONGEST_HEADER)) return 0;
  // Free text with a comma in it is no heading.
  if (known === 0 && (!adjacent || filled < usual || (delimiter === ' ' && filled > usual) || cells.some((cell) => cell.length > LONGEST_UNKNOWN || /[:=]/.test(cell)) || COMMENT.test(row.cells[0] ?? ''))) return 0;
  return known * 10 + (adjacent ? 5 : 0) + (filled === usual ? 2 : 0);
}

/** A group's name before each of the headers that come more than once: "Pivot,," above "x,y,x,y". */
function grouped(headers: readonly string[], above: HeadRow | undefined): readonly string[] {
  if (above === undefined || above.numbers > 0 || above.filled < 2 || above.filled > headers.length || new Set(headers.filter((cell) => cell !== '')).size === headers.filter((cell) => cell !== '').length) return headers;
  let group = '';
  return headers.map((header, i) => {
    const name = (above.cells[i] ?? '').trim();
    if (name !== '') group = name;
    return headers.indexOf(header) === headers.lastIndexOf(header) ? header : `${group} ${header}`.trim();
  });
}

/**
 * Header, units and preamble above the row `begins`.
 *
 * @param lines lines of the text, for the preamble
 */
export function findSampledHeader(all: readonly HeadRow[], begins: number, { delimiter, usual: cut }: { readonly delimiter: SampledDelimiter; readonly usual: number }, lines: readonly string[]): SampledHeader {
  const usual = Math.min(cut, Math.max(...all.slice(begins, begins + ROWS).map(({ filled }) => filled)));
  let above = begins - 1;
  while (above >= 0 && RULE.test(all[above]!.cells.join(''))) above -= 1;
  const units = above >= 0 && isUnits(all[above]!) ? above : -1;
  const nearest = units === -1 ? above : units - 1;
  let [header, best] = [-1, 0];
  let cells: readonly string[] = [];
  for (let at = nearest; at >= 0 && at > nearest - ABOVE && all[at]!.numbers * 3 <= all[at]!.filled; at -= 1) {
    const row = all[at]!;
    const heading = headingCells(row, delimiter, usual, lines[row.line - 1] ?? '');
    const score = headingScore(row, heading, usual, delimiter, at === nearest);
    if (score > best) [header, best, cells] = [at, score, heading];
  }
  const unitRow = units === -1 ? null : all[units]!;
  const named = header === -1 ? [] : grouped(cells, all[header - 1]);
  const below = unitRow === null ? [] : headingCells(unitRow, delimiter, usual, lines[unitRow.line - 1] ?? '').map(unitInBrackets);
  const width = Math.max(named.length, below.length);
  const used = new Set([header === -1 ? 0 : all[header]!.line, unitRow?.line ?? 0]);
  return {
    headerCells: header === -1 ? [] : all[header]!.cells,
    headers: Array.from({ length: width }, (_, i) => named[i] ?? ''),
    unitTexts: Array.from({ length: width }, (_, i) => {
      const under = (below[i] ?? '').trim();
      return unitIn(named[i] ?? '') || (under === '-' || under === '–' ? '' : under);
    }),
    preamble: lines.slice(0, all[begins]!.line - 1).map((line) => line.replace(/\r$/, '')).filter((line, i) => line.trim() !== '' && !used.has(i + 1)),
  };
}
