/** Finds numbers that a comma table has torn in two at their decimal commas: 12,5 cut into 12 and 5. */
import { problem } from '../problems/problems.ts';
import type { Place, Problem } from '../problems/problems.ts';
import { widthOf } from './cells.ts';
import type { CutRow } from './cut.ts';

const WHOLE = /^\s*[+\-−–]?\d+\s*$/;
const DECIMALS = /^\d{1,4}\s*$/;
const ONE_DECIMAL = /^\d\s*$/;
const POINT = /^\s*[+\-−–]?\d*\.\d/;

/** Fewest rows from which columns of single digits are suspected where the number of cells tells nothing. */
const ROWS_TO_SUSPECT = 3;

export interface TableShape {
  readonly columns: number;
  /** Cells of the header as cut, blank ones at its end included; 0 without a header. */
  readonly headerCells: number;
}

interface Pairs {
  /** Places where a number may have been torn, not overlapping. */
  readonly count: number;
  /** The likeliest: "12,5". */
  readonly example: string;
  readonly withOneDecimal: boolean;
}

function pairsIn(cells: readonly string[]): Pairs {
  let count = 0;
  let example = '';
  let withOneDecimal = false;
  for (let i = 1; i < cells.length; i++) {
    const left = cells[i - 1] ?? '';
    const right = cells[i] ?? '';
    if (!WHOLE.test(left) || !DECIMALS.test(right)) continue;
    const one = ONE_DECIMAL.test(right);
    // "1,12,0": the shot's number and a whole part look like a pair, too; a single decimal after it is likelier.
    if (!one && WHOLE.test(left) && ONE_DECIMAL.test(cells[i + 1] ?? '')) continue;
    count += 1;
    if (example === '' || (one && !withOneDecimal)) example = `${left.trim()},${right.trim()}`;
    withOneDecimal ||= one;
    i += 1;
  }
  return { count, example, withOneDecimal };
}

/**
 * Problems of a comma table's rows. stops: more cells than the header, and tears that account for them, so that no number of the row is to be
 * used. doubt: nothing in the count of cells shows it, but the row or whole columns look torn.
 */
export function commaProblems(rows: readonly CutRow[], { columns, headerCells }: TableShape, place: Place): Problem[] {
  const anyPoint = rows.some(({ cells }) => cells.some((cell) => POINT.test(cell)));
  const told = (row: CutRow, { example }: Pairs, weight: 'stops' | 'doubt'): Problem =>
    problem('decimal-comma-in-comma-file', weight, { ...place, line: row.line }, { found: example, cells: row.cells.length, columns });
  if (headerCells === 0) return anyPoint ? [] : suspectedColumns(rows, 1, columns, place);
  // A delimiter at the end of every row is a habit of the program that wrote them, not a cell.
  const endings = rows.length > 0 && rows.every(({ cells }) => cells.length > headerCells && (cells.at(-1) ?? '').trim() === '') ? 1 : 0;
  const read = rows.map((row) => {
    const pairs = pairsIn(row.cells);
    const over = Math.max(row.cells.length - endings - headerCells, widthOf(row.cells) - columns);
    return { row, pairs, over, torn: over > 0 && pairs.count >= over };
  });
  const anyTorn = read.some(({ torn }) => torn);
  const found = read.flatMap(({ row, pairs, over, torn }): Problem[] => {
    if (torn) return [told(row, pairs, 'stops')];
    if (pairs.count === 0 || row.cells.some((cell) => POINT.test(cell))) return [];
    const short = over < 0 && !anyPoint && pairs.withOneDecimal;
    if (short) return [told(row, pairs, 'stops')];
    return anyTorn && pairs.withOneDecimal ? [told(row, pairs, 'doubt')] : [];
  });
  return found.length === 0 && !anyPoint ? suspectedColumns(rows, 2, columns, place) : found;
}

/** Whole columns of single digits that neither count up nor stay the same, right of whole numbers, in a table without any decimal point. */
function suspectedColumns(rows: readonly CutRow[], fewest: number, columns: number, place: Place): Problem[] {
  const first = rows[0];
  if (rows.length < ROWS_TO_SUSPECT || first === undefined) return [];
  const width = Math.min(...rows.slice(0, 1000).map(({ cells }) => widthOf(cells)));
  let found = 0;
  let example = '';
  for (let column = 1; column < width; column++) {
    const digits = rows.map(({ cells }) => (ONE_DECIMAL.test(cells[column] ?? '') ? Number(cells[column]) : -1));
    if (digits.includes(-1) || !rows.every(({ cells }) => WHOLE.test(cells[column - 1] ?? ''))) continue;
    const countsUp = digits.every((d, i) => i === 0 || d > (digits[i - 1] ?? 0));
    if (new Set(digits).size < 2 || countsUp) continue;
    found += 1;
    if (example === '') example = `${(first.cells[column - 1] ?? '').trim()},${String(digits[0])}`;
    column += 1;
  }
  if (found < fewest) return [];
  return [problem('decimal-comma-in-comma-file', 'doubt', { ...place, line: first.line }, { found: example, cells: first.cells.length, columns })];
}
