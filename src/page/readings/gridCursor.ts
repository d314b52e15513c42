/** Cursor, keys, mouse and clipboard of a sheet's grid. */
import { useCallback, useLayoutEffect, useMemo, useRef, useState } from 'react';
import type { ClipboardEvent, FocusEvent, KeyboardEvent, MouseEvent } from 'react';
import { addRow } from '../../session/edits.ts';
import type { Sheet } from '../../session/session.ts';
import { useActions } from '../../store/hooks.tsx';
import { blockOfText, textOfBlock } from './block.ts';
import { FIRST_CELL } from './gridColumns.ts';
import type { GridColumn } from './gridColumns.ts';
import { cellsIn, emptied, pasted, typedOver } from './gridEdits.ts';
import { blockBetween, moved, shiftedLeft, tabbed, typesText } from './gridKeys.ts';
import type { Block, Spot } from './gridKeys.ts';
import { useNotices } from './notices.ts';
import type { RowWindow } from './rowWindow.ts';
import { lineWords } from './sheetRows.ts';
import type { ShownRow, ShownSheet } from './sheetRows.ts';

interface GridParts {
  readonly sheet: Sheet;
  readonly shown: ShownSheet;
  readonly columns: readonly GridColumn[];
  readonly rowWindow: RowWindow;
}

export interface GridCursor {
  readonly cursor: Spot;
  /** Stretched selection, in columns of the grid; null for none. */
  readonly block: Block | null;
  /** Text that the entry field opens with; null while nothing is typed. */
  readonly typing: string | null;
  /** Opens the cursor's cell for typing. */
  readonly typeOver: () => void;
  /** Gives the cursor's cell the focus once the next change is shown. */
  readonly focusAfterChange: () => void;
  /** Keeps what is typed before the row of the entry field is scrolled away. */
  readonly keepBeforeGone: () => void;
  readonly handlers: {
    readonly onKeyDown: (event: KeyboardEvent<HTMLElement>) => void;
    readonly onFocus: (event: FocusEvent<HTMLElement>) => void;
    readonly onBlur: (event: FocusEvent<HTMLElement>) => void;
    readonly onMouseDown: (event: MouseEvent<HTMLElement>) => void;
    readonly onDoubleClick: (event: MouseEvent<HTMLElement>) => void;
    readonly onCopy: (event: ClipboardEvent<HTMLElement>) => void;
    readonly onPaste: (event: ClipboardEvent<HTMLElement>) => void;
  };
}

export function useGridCursor({ sheet, shown, columns, rowWindow }: GridParts): GridCursor {
  const { change, select } = useActions();
  const notices = useNotices();
  const [spotLast, setCursor] = useState<Spot>({ row: 0, column: FIRST_CELL });
  const [corner, setCorner] = useState<Spot | null>(null);
  const [typing, setTyping] = useState<string | null>(null);
  /** The entry field was opened by a keystroke: arrows leave it, as nothing is there yet to move through. */
  const begunByKey = useRef(false);
  const toFocus = useRef(false);
  const lineStart = useRef(FIRST_CELL);
  const takesEntry = useMemo(() => columns.map(({ is }) => is === 'cell' || is === 'kind' || is === 'aside'), [columns]);
  const extent = { rows: shown.rows.length, columns: columns.length, page: rowWindow.page };
  // Rows and columns go away by an undo or with a newer version of the file.
  const cursor: Spot = { row: Math.min(spotLast.row, Math.max(0, extent.rows - 1)), column: Math.min(spotLast.column, extent.columns - 1) };
  const row = shown.rows[cursor.row];
  const block = corner === null ? null : blockBetween(cursor, corner);
  /** Cells of the sheet that a command is for. */
  const underCursor = shiftedLeft(block ?? blockBetween(cursor, cursor), FIRST_CELL);
  const cellAt = (column: number): number | null => {
    const found = columns[column];
    return found?.is === 'cell' ? found.cell.index : null;
  };

  useLayoutEffect(() => {
    if (!toFocus.current || typing !== null) return;
    toFocus.current = false;
    rowWindow.frame.current?.querySelector<HTMLElement>(`[data-spot="${cursor.row}:${cursor.column}"]`)?.focus();
  });

  function goTo(spot: Spot) {
    setTyping(null);
    setCorner(null);
    setCursor(spot);
    toFocus.current = true;
    rowWindow.bring(spot.row);
  }

  function begin(text: string, byKey: boolean) {
    if (cellAt(cursor.column) === null) return;
    begunByKey.current = byKey;
    setCorner(null);
    setTyping(text);
  }

  /** Keeps what was typed into the cursor's cell. */
  function keep(text: string) {
    const cell = cellAt(cursor.column);
    setTyping(null);
    if (row === undefined || cell === null) return;
    const edit = text.trim() === (row.cells[cell] ?? '').trim() ? null : typedOver(sheet.id, row, cell, text.trim());
    if (edit !== null) change(`${shown.columns[cell]?.header ?? 'cell'}, ${lineWords(row.line)}`, edit);
  }

  /** Down one row; below the last row typed by hand, a new one. */
  function nextLine(column: number) {
    if (cursor.row + 1 >= extent.rows && (sheet.origin === 'typed' || row?.typed === true)) {
      change('add a row', addRow(sheet.id));
      goTo({ row: cursor.row + 1, column: lineStart.current });
    } else {
      goTo({ row: Math.min(cursor.row + 1, extent.rows - 1), column });
    }
  }

  function keyWhileTyping(event: KeyboardEvent<HTMLElement>, field: HTMLInputElement) {
    if (event.nativeEvent.isComposing) return;
    const arrow = begunByKey.current && event.key.startsWith('Arrow') ? moved(cursor, event, extent) : null;
    const tab = event.key === 'Tab' ? tabbed(cursor, event.shiftKey, takesEntry) : null;
    if (event.key === 'Escape') {
      event.preventDefault();
      event.stopPropagation();
      goTo(cursor);
    } else if (event.key === 'Enter') {
      event.preventDefault();
      keep(field.value);
      nextLine(Math.max(FIRST_CELL, lineStart.current));
    } else if (arrow !== null || tab !== null) {
      event.preventDefault();
      keep(field.value);
      goTo(arrow ?? tab ?? cursor);
    } else if (event.key === 'F2') {
      begunByKey.current = false;
    }
  }

  function onKeyDown(event: KeyboardEvent<HTMLElement>) {
    if (event.defaultPrevented) return;
    if (event.target instanceof HTMLInputElement) return keyWhileTyping(event, event.target);
    // Alt with an arrow opens a list.
    if (event.altKey) return;
    const spot = moved(cursor, event, extent);
    const cell = cellAt(cursor.column);
    if (spot !== null) {
      event.preventDefault();
      const from = corner ?? cursor;
      goTo(spot);
      if (event.shiftKey && cellAt(from.column) !== null && cellAt(spot.column) !== null) setCorner(from);
      else lineStart.current = Math.max(FIRST_CELL, spot.column);
    } else if (event.key === 'Tab') {
      const next = tabbed(cursor, event.shiftKey, takesEntry);
      if (next === null) return;
      event.preventDefault();
      goTo(next);
    } else if (event.key === 'Escape') {
      setCorner(null);
    } else if (cell !== null && row !== undefined) {
      keyOnCell(event, row, cell);
    }
  }

  function keyOnCell(event: KeyboardEvent<HTMLElement>, at: ShownRow, cell: number) {
    if (event.key === 'Enter' || event.key === 'F2') {
      event.preventDefault();
      begin(at.cells[cell] ?? '', false);
    } else if (event.key === 'Delete' || event.key === 'Backspace') {
      event.preventDefault();
      const edit = emptied(sheet.id, shown, underCursor);
      if (edit !== null) change(corner === null ? `empty ${lineWords(at.line)}` : 'empty cells', edit);
    } else if (typesText(event)) {
      event.preventDefault();
      begin(event.key, true);
    }
  }

  function onFocus(event: FocusEvent<HTMLElement>) {
    const spot = spotOf(event.target);
    if (spot === null) return;
    if (spot.row !== cursor.row || spot.column !== cursor.column) setCursor(spot);
    select(shown.rows[spot.row]?.record ?? null);
  }

  function onMouseDown(event: MouseEvent<HTMLElement>) {
    const spot = spotOf(event.target);
    if (spot === null || event.target instanceof HTMLInputElement) return;
    if (event.shiftKey && cellAt(spot.column) !== null && cellAt(cursor.column) !== null) {
      event.preventDefault();
      setCorner(corner ?? cursor);
      setCursor(spot);
      toFocus.current = true;
    } else {
      setCorner(null);
      lineStart.current = Math.max(FIRST_CELL, spot.column);
    }
  }

  function onDoubleClick(event: MouseEvent<HTMLElement>) {
    const spot = spotOf(event.target);
    const cell = spot === null ? null : cellAt(spot.column);
    if (spot === null || cell === null || event.target instanceof HTMLInputElement) return;
    setCursor(spot);
    begunByKey.current = false;
    setTyping(shown.rows[spot.row]?.cells[cell] ?? '');
  }

  function onCopy(event: ClipboardEvent<HTMLElement>) {
    if (event.target instanceof HTMLInputElement || cellAt(cursor.column) === null) return;
    event.preventDefault();
    event.clipboardData.setData('text/plain', textOfBlock(cellsIn(shown, underCursor)));
  }

  function onPaste(event: ClipboardEvent<HTMLElement>) {
    // A paste into the sheet is no new sheet, so it goes no further up the page.
    event.stopPropagation();
    const text = event.clipboardData.getData('text/plain');
    if (text === '' || (event.target instanceof HTMLInputElement && !/[\t\n\r]/.test(text.trimEnd()))) return;
    event.preventDefault();
    setTyping(null);
    const from = { row: underCursor.top, column: Math.max(0, Math.min(underCursor.left, shown.columns.length - 1)) };
    const laid = pasted(sheet, shown, from, blockOfText(text));
    if (laid.edit !== null) change('paste cells', laid.edit);
    if (laid.sentences.length > 0) notices.say({ tone: laid.leftOut ? 'look' : 'told', sentences: laid.sentences, sheet: sheet.id });
    goTo({ row: from.row, column: from.column + FIRST_CELL });
  }

  function onBlur(event: FocusEvent<HTMLElement>) {
    if (typing !== null && event.target instanceof HTMLInputElement) keep(event.target.value);
  }

  const focusAfterChange = useCallback(() => {
    toFocus.current = true;
  }, []);

  function keepBeforeGone() {
    const field = rowWindow.frame.current?.querySelector('input');
    if (typing !== null && field != null && rowWindow.isFarOff(cursor.row)) keep(field.value);
  }

  return {
    cursor,
    block,
    typing,
    typeOver: () => begin(row?.cells[cellAt(cursor.column) ?? -1] ?? '', false),
    focusAfterChange,
    keepBeforeGone,
    handlers: { onKeyDown, onFocus, onBlur, onMouseDown, onDoubleClick, onCopy, onPaste },
  };
}

/** The spot of the grid that an element belongs to. */
function spotOf(target: EventTarget): Spot | null {
  const spot = target instanceof Element ? target.closest<HTMLElement>('[data-spot]')?.dataset.spot?.split(':').map(Number) : undefined;
  return spot?.[0] === undefined || spot[1] === undefined ? null : { row: spot[0], column: spot[1] };
}
