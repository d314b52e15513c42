/** The film's coefficient X as a table over stiffness number and damping, for the draws of a Monte Carlo run; plain data, fit for a message. */
import type { FilmHold } from './filmModes.ts';
import { filmModes } from './filmModes.ts';
import { filmFirstMaximum } from './filmResponse.ts';
import { offPlateCentre } from './filmStrip.ts';

export interface FilmTableChoice {
  readonly hold: FilmHold;
  readonly plateRatio: number;
  readonly zoneFrom: number;
  readonly zoneTo: number;
  readonly readAt: number;
  /** S, from above 0, to; equal ends hold it. */
  readonly stiffness: readonly [number, number];
  /** ζ of every mode, from, to; equal ends hold it. */
  readonly damping: readonly [number, number];
  /** Largest relative difference from X itself that is wanted at the checked points · 1. */
  readonly tolerance: number;
}

export interface FilmTable {
  /** `within` the tolerance, or `limit`: the finest table, with what it reaches in `largestGap`. */
  readonly status: 'within' | 'limit';
  readonly stiffness: readonly [number, number];
  readonly damping: readonly [number, number];
  /** Even steps in ln S and in ζ; 1 where it is held. */
  readonly columns: number;
  readonly rows: number;
  /** ln X, column by column. */
  readonly logs: Float64Array;
  /** Largest |X_table/X − 1| at the middles between columns, between rows and of the cells. */
  readonly largestGap: number;
}

const FIRST_COLUMNS = 9;
const FIRST_ROWS = 5;
/** 65 columns and the middles that check them take one to two seconds; where they do not do, X has kinks (one crest overtaking another) that more would not smooth. */
const MOST_COLUMNS = 65;
const MOST_ROWS = 9;

/**
 * X over (ln S, ζ), refined until what it gives at the middle of every cell and edge agrees with X.
 *
 * Valid: S ≥ 1e-7, ζ as filmFirstMaximum, tolerance > 0.
 * @throws RangeError when a range is out of order or a value out of its range
 */
export function tabulate(choice: FilmTableChoice): FilmTable {
  const { stiffness, damping, tolerance } = choice;
  if (!(stiffness[0] > 0 && stiffness[0] <= stiffness[1] && damping[0] <= damping[1])) throw new RangeError('film table: a range is out of order');
  if (!(tolerance > 0)) throw new RangeError(`film table: tolerance ${tolerance}`);
  const ask = asker(choice);
  let columns = stiffness[0] === stiffness[1] ? 1 : FIRST_COLUMNS;
  let rows = damping[0] === damping[1] ? 1 : FIRST_ROWS;
  for (;;) {
    const logs = new Float64Array(columns * rows);
    for (let i = 0; i < columns; i += 1) for (let j = 0; j < rows; j += 1) logs[i * rows + j] = ask(share(i, columns), share(j, rows));
    const bare = { stiffness, damping, columns, rows, logs };
    const gaps = largestGaps(bare, ask);
    const largestGap = Math.max(gaps.betweenColumns, gaps.betweenRows, gaps.inCells);
    if (largestGap <= tolerance) return { status: 'within', ...bare, largestGap };
    const finerColumns = columns > 1 && columns < MOST_COLUMNS && Math.max(gaps.betweenColumns, gaps.inCells) > tolerance;
    const finerRows = rows > 1 && rows < MOST_ROWS && Math.max(gaps.betweenRows, gaps.inCells) > tolerance;
    if (!finerColumns && !finerRows) return { status: 'limit', ...bare, largestGap };
    if (finerColumns) columns = 2 * columns - 1;
    if (finerRows) rows = 2 * rows - 1;
  }
}

/** X at (S, ζ) from the table, by cubics through the four nearest columns and rows; outside it, at its nearest edge. Valid: S > 0. */
export function coefficientFrom(table: Omit<FilmTable, 'status' | 'largestGap'>, stiffness: number, dampingRatio: number): number {
  const along = (value: number, [from, to]: readonly [number, number]): number => (to === from ? 0 : Math.min(Math.max((value - from) / (to - from), 0), 1));
  const [low, high] = table.stiffness;
  return Math.exp(interpolate(table, along(Math.log(stiffness), [Math.log(low), Math.log(high)]), along(dampingRatio, table.damping)));
}

/** Whether (S, ζ) lies inside the table; a draw outside is to be counted and told. */
export const covers = (table: Pick<FilmTable, 'stiffness' | 'damping'>, stiffness: number, dampingRatio: number): boolean =>
  stiffness >= table.stiffness[0] && stiffness <= table.stiffness[1] && dampingRatio >= table.damping[0] && dampingRatio <= table.damping[1];

type Bare = Omit<FilmTable, 'status' | 'largestGap'>;
/** ln X at shares 0 … 1 of the two ranges. */
type Asker = (s: number, d: number) => number;

const share = (k: number, count: number): number => (count === 1 ? 0 : k / (count - 1));

/** ln X, each point once and each set of modes once: a finer table asks for the coarser one's points again. */
function asker({ hold, plateRatio, zoneFrom, zoneTo, readAt: from, stiffness, damping }: FilmTableChoice): Asker {
  // A point of a plate turns with it about the clamp (filmStrip.ts).
  const [readAt, scale] = offPlateCentre({ plateRatio, readAt: from }) === null ? [from, 1] : [1, from];
  const columns = new Map<number, (d: number) => number>();
  const column = (s: number): ((d: number) => number) => {
    const modes = filmModes({ stiffnessNumber: Math.min(stiffness[0] * (stiffness[1] / stiffness[0]) ** s, stiffness[1]), plateRatio, hold });
    const known = new Map<number, number>();
    return (d) => {
      const seen = known.get(d);
      if (seen !== undefined) return seen;
      const ratio = damping[0] + d * (damping[1] - damping[0]);
      const found = Math.log(scale * filmFirstMaximum(modes, { zoneFrom, zoneTo, readAt, dampingRatio: ratio, dampingRatioAbove: ratio }).largest.coefficient);
      known.set(d, found);
      return found;
    };
  };
  return (s, d) => {
    let found = columns.get(s);
    if (!found) columns.set(s, (found = column(s)));
    return found(d);
  };
}

function largestGaps(table: Bare, ask: Asker): Readonly<Record<'betweenColumns' | 'betweenRows' | 'inCells', number>> {
  const { columns, rows } = table;
  const gap = (s: number, d: number): number => Math.abs(Math.expm1(interpolate(table, s, d) - ask(s, d)));
  const gaps = { betweenColumns: 0, betweenRows: 0, inCells: 0 };
  for (let i = 0; i < columns; i += 1) {
    for (let j = 0; j < rows; j += 1) {
      const [s, d] = [share(i, columns), share(j, rows)];
      const [sMiddle, dMiddle] = [share(i + 0.5, columns), share(j + 0.5, rows)];
      if (i < columns - 1) gaps.betweenColumns = Math.max(gaps.betweenColumns, gap(sMiddle, d));
      if (j < rows - 1) gaps.betweenRows = Math.max(gaps.betweenRows, gap(s, dMiddle));
      if (i < columns - 1 && j < rows - 1) gaps.inCells = Math.max(gaps.inCells, gap(sMiddle, dMiddle));
    }
  }
  return gaps;
}

function interpolate({ columns, rows, logs }: Bare, s: number, d: number): number {
  const across = nearest(columns, s);
  const down = nearest(rows, d);
  let sum = 0;
  for (let i = 0; i < across.weights.length; i += 1) {
    let line = 0;
    for (let j = 0; j < down.weights.length; j += 1) line += down.weights[j]! * logs[(across.first + i) * rows + down.first + j]!;
    sum += across.weights[i]! * line;
  }
  return sum;
}

/** First of the four nearest of evenly spaced points, and Lagrange's weights of a cubic through them. */
function nearest(count: number, along: number): { readonly first: number; readonly weights: readonly number[] } {
  if (count === 1) return { first: 0, weights: [1] };
  const at = along * (count - 1);
  const first = Math.min(Math.max(Math.floor(at) - 1, 0), count - 4);
  const u = at - first;
  const [a, b, c] = [u - 1, u - 2, u - 3];
  return { first, weights: [(a * b * c) / -6, (u * b * c) / 2, (u * a * c) / -2, (u * a * b) / 6] };
}
