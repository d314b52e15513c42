/** The columns of a sheet's grid: the row's mark and line, its kind, the sheet's own columns, and what the road says at the right. */
import type { Problem } from '../../problems/problems.ts';
import { sentence } from '../../problems/sentences.ts';
import { ROLE_LABELS } from './tradeWords.ts';
import type { ShownColumn, ShownSheet } from './sheetRows.ts';

export type GridColumn =
  | { readonly is: 'row' | 'kind' | 'impulseBit' | 'aside' | 'remove' | 'looks' }
  | { readonly is: 'cell'; readonly cell: ShownColumn; readonly meaning: string };

/** @param looks what there is to look at has a column of its own, instead of a line below its row */
export function gridColumns(shown: ShownSheet, looks: boolean): readonly GridColumn[] {
  let nextSwings = 0;
  const cells = shown.columns.map((cell): GridColumn => {
    const { role, unit } = cell.meaning;
    const name = role === 'nextSwing' ? `${ROLE_LABELS.nextSwing} ${(nextSwings += 1)}` : ROLE_LABELS[role];
    return { is: 'cell', cell, meaning: unit === '' ? name : `${name}, ${unit}` };
  });
  const remove: readonly GridColumn[] = shown.rows.some((row) => row.typed) ? [{ is: 'remove' }] : [];
  return [{ is: 'row' }, { is: 'kind' }, ...cells, { is: 'impulseBit' }, { is: 'aside' }, ...remove, ...(looks ? [{ is: 'looks' } as const] : [])];
}

/** Grid position of the sheet's first own column. */
export const FIRST_CELL = 2;

/** The sheet's column that a problem names by its header, or by its number where it has none; null for none. */
export function columnOfProblem(problem: Problem, columns: readonly ShownColumn[]): number | null {
  const named = problem.place.column;
  if (named === undefined) return null;
  const found = columns.find((column) => column.header === named) ?? columns.find((column) => String(column.index + 1) === named);
  return found?.index ?? null;
}

/** A row's problem as it stands beside its row, where the sheet and the line are named already. */
export function besideRow(problem: Problem, columns: readonly ShownColumn[]): string {
  const index = columnOfProblem(problem, columns);
  const header = index === null ? undefined : columns.find((column) => column.index === index)?.header;
  return sentence({ ...problem, place: header === undefined ? {} : { column: header } });
}
