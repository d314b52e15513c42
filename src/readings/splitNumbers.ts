/** Finds numbers that a comma table has torn in two at their decimal commas: 12,5 cut into 12 and 5. */
import { problem } from '../problems/problems.ts';
import type { Place, Problem } from '../problems/problems.ts';
import { widthOf } from './cells.ts';
import type { CutRow } from './cut.ts';

const WHOLE = /^\s*[+\-−–]?\d+\s*$/;
const DECIMALS = /^\d{1,4}\s*$/;
const POINT = /^\s*[+\-−–]?\d*\.\d/;

/** Fewest rows from which a column of single digits is suspected where there is no header to count columns by. */
const ROWS_TO_SUSPECT = 3;

/** Number of places where a number may have been torn, the pairs not overlapping. */
function pairs(cells: readonly string[]): { count: number; first: string } {
  let count = 0;
  let first = '';
  for (let i = 1; i < cells.length; i++) {
    const left = cells[i - 1] ?? '';
    const right = cells[i] ?? '';
    if (!WHOLE.test(left) || !DECIMALS.test(right)) continue;
    count += 1;
    if (first === '') first = `${left.trim()},${right.trim()}`;
    i += 1;
  }
  return { count, first };
}

/**
 * One problem a row whose cells can be brought back to the header's columns only by closing such tears; the row's numbers are not to be used.
 * In a table without any decimal point, rows that fall short of the header and have such pairs are not trusted either.
 */
export function commaProblems(rows: readonly CutRow[], shape: { width: number; hasHeader: boolean }, place: Place): Problem[] {
  const anyPoint = rows.some(({ cells }) => cells.some((cell) => POINT.test(cell)));
  if (!shape.hasHeader) return anyPoint ? [] : suspectedColumns(rows, place);
  const found: Problem[] = [];
  const torn = rows.some(({ cells }) => widthOf(cells) > shape.width && pairs(cells).count >= widthOf(cells) - shape.width);
  for (const { line, cells } of rows) {
    const over = widthOf(cells) - shape.width;
    const { count, first } = pairs(cells);
    if (count === 0) continue;
    const tooLong = over > 0 && count >= over;
    const tooShort = cells.length < shape.width && !anyPoint;
    const madeToFit = torn && !anyPoint && count > 1 && cells.length !== shape.width;
    if (tooLong || tooShort || madeToFit) {
      found.push(problem('decimal-comma-in-comma-file', 'stops', { ...place, line }, { found: first, cells: cells.length, columns: shape.width }));
    }
  }
  return found;
}

/** Without a header: a whole column of single digits that neither counts up nor stays the same, right of whole numbers, with no decimal point anywhere. */
function suspectedColumns(rows: readonly CutRow[], place: Place): Problem[] {
  if (rows.length < ROWS_TO_SUSPECT) return [];
  const width = Math.min(...rows.map(({ cells }) => widthOf(cells)));
  for (let column = 1; column < width; column++) {
    const right = rows.map(({ cells }) => (cells[column] ?? '').trim());
    if (!right.every((cell) => /^\d$/.test(cell))) continue;
    if (!rows.every(({ cells }) => /^\s*[+\-−–]?\d{1,3}\s*$/.test(cells[column - 1] ?? ''))) continue;
    const digits = right.map(Number);
    const different = new Set(digits).size;
    const countsUp = digits.every((d, i) => i === 0 || d > (digits[i - 1] ?? 0));
    if (different < 2 || countsUp) continue;
    const first = rows[0];
    if (first === undefined) return [];
    const text = `${(first.cells[column - 1] ?? '').trim()},${right[0] ?? ''}`;
    return [problem('decimal-comma-in-comma-file', 'doubt', { ...place, line: first.line }, { found: text, cells: first.cells.length, columns: 0 })];
  }
  return [];
}
