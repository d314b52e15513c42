/** Finds the header of a table among its first rows, the units row beneath it, and what stands before. */
import { filled, looksNumeric, numericCells, widthOf } from './cells.ts';
import type { CutRow } from './cut.ts';
import { isUnitsRow, unitTextOf } from './headerUnits.ts';
import { roleOfHeader } from './words.ts';

export interface HeaderFound {
  readonly headerRow: CutRow | null;
  readonly headerCells: readonly string[];
  readonly unitCells: readonly string[] | null;
  readonly preamble: readonly CutRow[];
  readonly rows: readonly CutRow[];
}

/** A header stands within this many rows that are not blank, or there is none. */
const HEADER_WITHIN = 60;

/** A header is known by its first cells, however many follow. */
const CELLS_LOOKED_AT = 100;

export function findHeader(content: readonly CutRow[], comments: readonly CutRow[]): HeaderFound {
  const usual = usualWidth(content);
  const firstReadings = content.findIndex(({ cells }) => holdsReadings(cells, usual));
  const before = content.slice(0, Math.min(firstReadings === -1 ? content.length : firstReadings, HEADER_WITHIN));
  const at = bestHeading(before, usual, firstReadings !== -1);
  if (at !== null) {
    const headerRow = content[at];
    if (headerRow === undefined) throw new RangeError(`find header: row ${at} of ${content.length}`);
    const below = content[at + 1];
    const unitCells = below !== undefined && isUnitsRow(below.cells) ? below.cells : null;
    const preamble = content.slice(0, at);
    const rows: CutRow[] = [];
    for (const row of content.slice(unitCells === null ? at + 1 : at + 2)) {
      // A header that comes again (two files put together) is no row.
      if (row.cells.length === headerRow.cells.length && row.cells.every((cell, i) => cell === headerRow.cells[i])) preamble.push(row);
      else rows.push(row);
    }
    return { headerRow, headerCells: headerRow.cells, unitCells, preamble, rows };
  }
  const bare = usual >= 2 && firstReadings > 0 ? content.slice(0, firstReadings).filter(({ cells }) => filled(cells) < 2 && numericCells(cells) === 0) : [];
  const rows = bare.length === 0 ? content : content.filter((row) => !bare.includes(row));
  const commented = headingInComment(comments, rows);
  if (commented !== null) return { ...commented, unitCells: null, preamble: bare, rows };
  return { headerRow: null, headerCells: [], unitCells: null, preamble: bare, rows };
}

/** Width that most rows have; narrow rows (free text) count only where all are narrow. */
function usualWidth(content: readonly CutRow[]): number {
  const counts = new Map<number, number>();
  for (const { cells } of content) {
    const width = widthOf(cells);
    if (width >= 2) counts.set(width, (counts.get(width) ?? 0) + 1);
  }
  let usual = 1;
  let most = 0;
  for (const [width, times] of counts) if (times > most || (times === most && width > usual)) [usual, most] = [width, times];
  return usual;
}

function holdsReadings(cells: readonly string[], usual: number): boolean {
  const numbers = numericCells(cells);
  return numbers >= 2 || (numbers === 1 && usual <= 2 && (filled(cells) === 1 || usual === 2) && !/:\s*$/.test(cells[0] ?? ''));
}

function bestHeading(before: readonly CutRow[], usual: number, readingsFollow: boolean): number | null {
  const least = usual >= 2 ? Math.max(2, Math.ceil(usual / 3)) : 1;
  let best: number | null = null;
  let bestScore = -1;
  for (const [i, { cells }] of before.entries()) {
    const full = filled(cells);
    if (full < least || (isUnitsRow(cells) && best !== null)) continue;
    const known = cells.slice(0, CELLS_LOOKED_AT).filter((cell) => !looksNumeric(cell) && isHeading(cell)).length;
    if (numericCells(cells) * 3 > full && known * 2 < full) continue;
    const score = known * 1000 + full;
    if (score > bestScore || (score === bestScore && usual === 1 && readingsFollow)) [best, bestScore] = [i, score];
  }
  return best;
}

function isHeading(cell: string): boolean {
  if (cell.trim() === '') return false;
  const role = roleOfHeader(cell);
  return (role !== null && role.covers >= 0.4) || unitTextOf(cell.trim()) !== null;
}

/** "# shot,rest,first" straight above rows that have no other header, cut alike. */
function headingInComment(comments: readonly CutRow[], rows: readonly CutRow[]): { headerRow: CutRow; headerCells: readonly string[] } | null {
  const first = rows[0];
  if (first === undefined || widthOf(first.cells) < 2) return null;
  const above = comments.filter((row) => row.line < first.line).at(-1);
  if (above === undefined || widthOf(above.cells) !== widthOf(first.cells) || numericCells(above.cells) > 0) return null;
  const headerCells = above.cells.map((cell, i) => (i === 0 ? cell.replace(/^\s*(?:#|%|\/\/)\s*/, '') : cell));
  return headerCells.some(isHeading) ? { headerRow: above, headerCells } : null;
}
