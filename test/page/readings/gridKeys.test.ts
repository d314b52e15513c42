import { expect, test } from 'vitest';
import { blockBetween, covers, moved, tabbed, typesText } from '../../../src/page/readings/gridKeys.ts';

const extent = { rows: 40, columns: 8, page: 12 };
const stroke = (key: string, held: Partial<{ ctrlKey: boolean; shiftKey: boolean; metaKey: boolean }> = {}) =>
  ({ key, shiftKey: false, ctrlKey: false, metaKey: false, ...held });
const at = (row: number, column: number) => ({ row, column });

test('arrows move the cursor by one cell and stop at the edges', () => {
  expect(moved(at(0, 0), stroke('ArrowDown'), extent)).toEqual(at(1, 0));
  expect(moved(at(0, 0), stroke('ArrowUp'), extent)).toEqual(at(0, 0));
  expect(moved(at(3, 7), stroke('ArrowRight'), extent)).toEqual(at(3, 7));
  expect(moved(at(3, 7), stroke('ArrowLeft'), extent)).toEqual(at(3, 6));
});

test('with Ctrl the cursor goes to the edge, Home and End to the ends of the row, Page Down a screen on', () => {
  expect(moved(at(5, 3), stroke('ArrowDown', { ctrlKey: true }), extent)).toEqual(at(39, 3));
  expect(moved(at(5, 3), stroke('Home'), extent)).toEqual(at(5, 0));
  expect(moved(at(5, 3), stroke('End', { ctrlKey: true }), extent)).toEqual(at(39, 7));
  expect(moved(at(30, 3), stroke('PageDown'), extent)).toEqual(at(39, 3));
  expect(moved(at(5, 3), stroke('a'), extent)).toBeNull();
});

test('Tab passes over columns that take no entry and leaves the sheet at the end of the row', () => {
  const takesEntry = [false, true, true, false, true];
  expect(tabbed(at(2, 2), false, takesEntry)).toEqual(at(2, 4));
  expect(tabbed(at(2, 4), true, takesEntry)).toEqual(at(2, 2));
  expect(tabbed(at(2, 4), false, takesEntry)).toBeNull();
  expect(tabbed(at(2, 1), true, takesEntry)).toBeNull();
});

test('a character begins typing, a command does not', () => {
  expect(typesText(stroke('7'))).toBe(true);
  expect(typesText(stroke('µ'))).toBe(true);
  expect(typesText(stroke('c', { ctrlKey: true }))).toBe(false);
  expect(typesText(stroke('F2'))).toBe(false);
});

test('a block lies between its two corners, whichever comes first', () => {
  const block = blockBetween(at(4, 6), at(2, 3));
  expect(block).toEqual({ top: 2, left: 3, bottom: 4, right: 6 });
  expect(covers(block, 3, 5)).toBe(true);
  expect(covers(block, 5, 5)).toBe(false);
});
