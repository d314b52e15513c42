/** Where the arrow keys and their kin take the cursor in a sheet, and which cells a stretched selection covers. */

/** Zero-based row and column of the grid, counted as shown. */
export interface Spot {
  readonly row: number;
  readonly column: number;
}

export interface Extent {
  readonly rows: number;
  readonly columns: number;
  /** Rows that Page Up and Page Down jump. */
  readonly page: number;
}

export interface Stroke {
  readonly key: string;
  readonly shiftKey: boolean;
  readonly ctrlKey: boolean;
  readonly metaKey: boolean;
}

const within = (value: number, count: number): number => Math.max(0, Math.min(count - 1, value));

/** The spot that a key leads to; null for a key that does not move the cursor. */
export function moved(from: Spot, stroke: Stroke, extent: Extent): Spot | null {
  const far = stroke.ctrlKey || stroke.metaKey;
  const to = (row: number, column: number): Spot => ({ row: within(row, extent.rows), column: within(column, extent.columns) });
  switch (stroke.key) {
    case 'ArrowUp':
      return to(far ? 0 : from.row - 1, from.column);
    case 'ArrowDown':
      return to(far ? extent.rows - 1 : from.row + 1, from.column);
    case 'ArrowLeft':
      return to(from.row, far ? 0 : from.column - 1);
    case 'ArrowRight':
      return to(from.row, far ? extent.columns - 1 : from.column + 1);
    case 'Home':
      return to(far ? 0 : from.row, 0);
    case 'End':
      return to(far ? extent.rows - 1 : from.row, extent.columns - 1);
    case 'PageUp':
      return to(from.row - extent.page, from.column);
    case 'PageDown':
      return to(from.row + extent.page, from.column);
    default:
      return null;
  }
}

/** Tab's next spot in the same row among the columns that take entries; null past the row's end, where the focus leaves the sheet. */
export function tabbed(from: Spot, back: boolean, takesEntry: readonly boolean[]): Spot | null {
  const step = back ? -1 : 1;
  for (let column = from.column + step; column >= 0 && column < takesEntry.length; column += step) {
    if (takesEntry[column] === true) return { row: from.row, column };
  }
  return null;
}

/** A key that begins typing into a cell. */
export const typesText = (stroke: Stroke): boolean =>
  [...stroke.key].length === 1 && stroke.key !== ' ' && !stroke.ctrlKey && !stroke.metaKey;

export interface Block {
  readonly top: number;
  readonly left: number;
  readonly bottom: number;
  readonly right: number;
}

/** The block between two corners, both included. */
export const blockBetween = (a: Spot, b: Spot): Block => ({
  top: Math.min(a.row, b.row),
  bottom: Math.max(a.row, b.row),
  left: Math.min(a.column, b.column),
  right: Math.max(a.column, b.column),
});

export const covers = (block: Block, row: number, column: number): boolean =>
  row >= block.top && row <= block.bottom && column >= block.left && column <= block.right;

/** The same block so many columns further left. */
export const shiftedLeft = (block: Block, columns: number): Block => ({ ...block, left: block.left - columns, right: block.right - columns });
