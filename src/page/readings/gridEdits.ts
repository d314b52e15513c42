/** What a person does to blocks of a sheet's cells, each as one edit of the session. */
import { addRow, setCell } from '../../session/edits.ts';
import type { Edit } from '../../session/edits.ts';
import type { Sheet } from '../../session/session.ts';
import { widthOfBlock } from './block.ts';
import type { Block } from './gridKeys.ts';
import type { ShownRow, ShownSheet } from './sheetRows.ts';
import { counted } from './tradeWords.ts';

/** Several edits in order, as one. */
export const inOrder = (edits: readonly Edit[]): Edit => (session) => edits.reduce((after, edit) => edit(after), session);

/** Types over one cell; null where that changes nothing. A text that says what came takes the cell back to it. */
export function typedOver(sheet: string, row: ShownRow, column: number, text: string): Edit | null {
  if (text === (row.cells[column] ?? '')) return null;
  return setCell(sheet, row.line, column, row.came[column] === text ? null : text);
}

/** Empties every cell of a block that holds something; null where none does. Columns are those of the sheet. */
export function emptied(sheet: string, shown: ShownSheet, block: Block): Edit | null {
  const edits: Edit[] = [];
  for (let at = block.top; at <= block.bottom; at++) {
    const row = shown.rows[at];
    if (row === undefined) continue;
    for (let column = block.left; column <= block.right; column++) {
      const edit = typedOver(sheet, row, column, '');
      if (edit !== null) edits.push(edit);
    }
  }
  return edits.length === 0 ? null : inOrder(edits);
}

/** Cells of a block, as they are shown. Columns are those of the sheet. */
export const cellsIn = (shown: ShownSheet, { top, bottom, left, right }: Block): readonly (readonly string[])[] =>
  shown.rows.slice(top, bottom + 1).map(({ cells }) => Array.from({ length: right - left + 1 }, (_, i) => cells[left + i] ?? ''));

export interface Pasted {
  /** null where the cells hold the same already. */
  readonly edit: Edit | null;
  /** What became of the block beyond the sheet's edges. */
  readonly sentences: readonly string[];
  /** Cells of the block found no place. */
  readonly leftOut: boolean;
}

/** Lays a block of cells over the sheet, its first cell on the row and column given. */
export function pasted(sheet: Sheet, shown: ShownSheet, from: { readonly row: number; readonly column: number }, block: readonly (readonly string[])[]): Pasted {
  const room = shown.columns.length - from.column;
  const edits: Edit[] = [];
  let rowsAdded = 0;
  block.forEach((cells, down) => {
    const row = shown.rows[from.row + down];
    if (row === undefined) {
      edits.push(addRow(sheet.id, [...Array<string>(from.column).fill(''), ...cells.slice(0, room)]));
      rowsAdded += 1;
      return;
    }
    cells.slice(0, room).forEach((text, across) => {
      const edit = typedOver(sheet.id, row, from.column + across, text);
      if (edit !== null) edits.push(edit);
    });
  });
  const columnsLeftOut = Math.max(0, widthOfBlock(block) - room);
  return {
    edit: edits.length === 0 ? null : inOrder(edits),
    leftOut: columnsLeftOut > 0,
    sentences: [
      ...(rowsAdded > 0 ? [`${counted(rowsAdded, 'row')} added below to hold the pasted cells.`] : []),
      ...(columnsLeftOut > 0 ? [`${counted(columnsLeftOut, 'pasted column')} beyond the last of ${sheet.name} left out.`] : []),
    ],
  };
}
