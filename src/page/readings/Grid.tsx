/** A sheet of readings to look at and to type in, with the keys of a spreadsheet. */
import { useCallback, useEffect, useEffectEvent, useLayoutEffect, useMemo, useRef, useState } from 'react';
import type { ClipboardEvent, FocusEvent, KeyboardEvent, MouseEvent } from 'react';
import { addRow, countAgain, removeAddedRow, setKind } from '../../session/edits.ts';
import type { Session, Sheet } from '../../session/session.ts';
import type { RecordResult } from '../../reduction/results.ts';
import type { Unit } from '../../units/units.ts';
import { useActions, useStore } from '../../store/hooks.tsx';
import { alignedColumn } from '../stated/Aligned.tsx';
import { blockOfText, textOfBlock } from './block.ts';
import { CellLine } from './CellLine.tsx';
import { GridHead } from './GridHead.tsx';
import { GridRow } from './GridRow.tsx';
import type { RowActs } from './GridRow.tsx';
import { FIRST_CELL, gridColumns } from './gridColumns.ts';
import { cellsIn, emptied, pasted, typedOver } from './gridEdits.ts';
import { blockBetween, covers, moved, shiftedLeft, tabbed, typesText } from './gridKeys.ts';
import type { Spot } from './gridKeys.ts';
import { useNotices } from './notices.ts';
import { useRowWindow } from './rowWindow.ts';
import { lineWords } from './sheetRows.ts';
import type { ShownRow, ShownSheet } from './sheetRows.ts';
import { KIND_LABELS } from './tradeWords.ts';
import styles from './grid.module.css';

interface GridProps {
  readonly sheet: Sheet;
  readonly shown: ShownSheet;
  readonly results: ReadonlyMap<string, RecordResult>;
  readonly marks: Session['marks'];
  readonly impulseUnit: Unit;
  /** Opens the question why a record is set aside. */
  readonly askReason: (row: ShownRow) => void;
}

export function Grid({ sheet, shown, results, marks, impulseUnit, askReason }: GridProps) {
  const { change, select } = useActions();
  const notices = useNotices();
  const selected = useStore((state) => state.selected);
  const [spotLast, setCursor] = useState<Spot>({ row: 0, column: FIRST_CELL });
  const [corner, setCorner] = useState<Spot | null>(null);
  const [typing, setTyping] = useState<string | null>(null);
  /** The entry field was opened by a keystroke: arrows leave it, as nothing is there yet to move through. */
  const begunByKey = useRef(false);
  const toFocus = useRef(false);
  const lineStart = useRef(FIRST_CELL);
  const { frame, first, last, windowed, rowHeight, page, onScroll, bring } = useRowWindow(shown.rows.length);
  // Rows of one height have no room for a line below.
  const columns = useMemo(() => gridColumns(shown, windowed), [shown, windowed]);
  const impulseBits = useMemo(() => alignedColumn(shown.rows.map(({ record }) => {
    const stated = results.get(record)?.impulseBit ?? null;
    return stated === null ? null : { value: stated.value, spread: stated.u, unit: impulseUnit };
  })), [shown, results, impulseUnit]);
  const takesEntry = useMemo(() => columns.map(({ is }) => is === 'cell' || is === 'kind' || is === 'aside'), [columns]);
  const extent = { rows: shown.rows.length, columns: columns.length, page };
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
    frame.current?.querySelector<HTMLElement>(`[data-spot="${cursor.row}:${cursor.column}"]`)?.focus();
  });

  const bringRecord = useEffectEvent((record: string | null) => {
    const at = record === null ? -1 : shown.rows.findIndex((one) => one.record === record);
    if (at >= 0) bring(at);
  });
  // A record selected in a picture comes into sight here.
  useEffect(() => bringRecord(selected), [selected]);

  function goTo(spot: Spot) {
    setTyping(null);
    setCorner(null);
    setCursor(spot);
    toFocus.current = true;
    bring(spot.row);
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

  function spotOf(target: EventTarget): Spot | null {
    const spot = target instanceof Element ? target.closest<HTMLElement>('[data-spot]')?.dataset.spot?.split(':').map(Number) : undefined;
    return spot?.[0] === undefined || spot[1] === undefined ? null : { row: spot[0], column: spot[1] };
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

  const acts = useMemo((): RowActs => ({
    setKind: (at, kind) => change(kind === null ? `kind of ${lineWords(at.line)} as told` : `${lineWords(at.line)} is a ${KIND_LABELS[kind]}`, setKind(at.record, kind)),
    askReason,
    countAgain: (at) => change(`count ${lineWords(at.line)} again`, countAgain(at.record)),
    remove: (at) => {
      toFocus.current = true;
      change(`remove ${lineWords(at.line)}`, removeAddedRow(sheet.id, at.line));
    },
  }), [change, sheet.id, askReason]);
  const restore = useCallback((at: ShownRow, cell: number) => {
    const edit = typedOver(sheet.id, at, cell, at.came[cell] ?? '');
    if (edit !== null) change(`restore ${lineWords(at.line)}`, edit);
  }, [change, sheet.id]);

  const tabRow = cursor.row >= first && cursor.row < last ? cursor.row : first;
  const rendered = shown.rows.slice(first, last);
  const cell = cellAt(cursor.column);
  return (
    <>
      <div ref={frame} className={styles.frame} onScroll={onScroll}>
        <div
          role="grid"
          tabIndex={-1}
          aria-label={`Readings of ${sheet.name}`}
          aria-rowcount={shown.rows.length + 1}
          aria-colcount={columns.length}
          aria-multiselectable="true"
          onKeyDown={onKeyDown}
          onFocus={onFocus}
          onBlur={onBlur}
          onMouseDown={onMouseDown}
          onDoubleClick={onDoubleClick}
          onCopy={onCopy}
          onPaste={onPaste}
        >
          <table role="presentation" className={styles.grid}>
            <GridHead columns={columns} impulseUnit={impulseUnit} />
            <tbody role="rowgroup">
              {first > 0 && <tr aria-hidden="true" className={styles.unseen} style={{ height: first * rowHeight }} />}
              {rendered.map((one, i) => {
                const index = first + i;
                const inBlock = block !== null && covers(block, index, block.left);
                return (
                  <GridRow
                    key={one.line}
                    row={one}
                    index={index}
                    gridColumns={columns}
                    columns={shown.columns}
                    result={results.get(one.record)}
                    mark={marks[one.record]}
                    impulseBits={impulseBits}
                    selected={selected === one.record}
                    tabColumn={index === tabRow ? cursor.column : null}
                    stretchFrom={inBlock ? block.left : null}
                    stretchTo={inBlock ? block.right : null}
                    typing={index === cursor.row ? typing : null}
                    acts={acts}
                  />
                );
              })}
              {last < shown.rows.length && (
                <tr aria-hidden="true" className={styles.unseen} style={{ height: (shown.rows.length - last) * rowHeight }} />
              )}
            </tbody>
          </table>
        </div>
      </div>
      {row !== undefined && (
        <CellLine
          row={row}
          column={cell === null ? null : (shown.columns[cell] ?? null)}
          columns={shown.columns}
          result={windowed ? results.get(row.record) : undefined}
          onType={() => cell !== null && begin(row.cells[cell] ?? '', false)}
          onRestore={restore}
        />
      )}
    </>
  );
}
