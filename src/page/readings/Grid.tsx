/** A sheet of readings to look at and to type in, with the keys of a spreadsheet. */
import { useCallback, useEffect, useEffectEvent, useMemo } from 'react';
import { countAgain, removeAddedRow, setKind } from '../../session/edits.ts';
import type { Session, Sheet } from '../../session/session.ts';
import type { RecordResult } from '../../reduction/results.ts';
import type { Unit } from '../../units/units.ts';
import { useActions, useStore } from '../../store/hooks.tsx';
import { alignedColumn } from '../stated/Aligned.tsx';
import { CellLine } from './CellLine.tsx';
import { GridHead } from './GridHead.tsx';
import { GridRow } from './GridRow.tsx';
import type { RowActs } from './GridRow.tsx';
import { gridColumns } from './gridColumns.ts';
import { useGridCursor } from './gridCursor.ts';
import { typedOver } from './gridEdits.ts';
import { covers } from './gridKeys.ts';
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
  const { change } = useActions();
  const selected = useStore((state) => state.selected);
  const rowWindow = useRowWindow(shown.rows.length);
  const { frame, first, last, windowed, rowHeight, onScroll, bring } = rowWindow;
  // Rows of one height have no room for a line below.
  const columns = useMemo(() => gridColumns(shown, windowed), [shown, windowed]);
  const impulseBits = useMemo(() => alignedColumn(shown.rows.map(({ record }) => {
    const stated = results.get(record)?.impulseBit ?? null;
    return stated === null ? null : { value: stated.value, spread: stated.u, unit: impulseUnit };
  })), [shown, results, impulseUnit]);
  const { cursor, block, typing, typeOver, focusAfterChange, keepBeforeGone, handlers } = useGridCursor({ sheet, shown, columns, rowWindow });
  const row = shown.rows[cursor.row];
  const column = columns[cursor.column];

  const bringRecord = useEffectEvent((record: string | null) => {
    const at = record === null ? -1 : shown.rows.findIndex((one) => one.record === record);
    if (at >= 0) bring(at);
  });
  // A record selected in a picture comes into sight here.
  useEffect(() => bringRecord(selected), [selected]);

  const acts = useMemo((): RowActs => ({
    setKind: (at, kind) => change(kind === null ? `kind of ${lineWords(at.line)} as told` : `${lineWords(at.line)} is a ${KIND_LABELS[kind]}`, setKind(at.record, kind)),
    askReason,
    countAgain: (at) => change(`count ${lineWords(at.line)} again`, countAgain(at.record)),
    remove: (at) => {
      focusAfterChange();
      change(`remove ${lineWords(at.line)}`, removeAddedRow(sheet.id, at.line));
    },
  }), [change, sheet.id, askReason, focusAfterChange]);
  const restore = useCallback((at: ShownRow, cell: number) => {
    const edit = typedOver(sheet.id, at, cell, at.came[cell] ?? '');
    if (edit !== null) change(`restore ${lineWords(at.line)}`, edit);
  }, [change, sheet.id]);

  const tabRow = cursor.row >= first && cursor.row < last ? cursor.row : first;
  const rendered = shown.rows.slice(first, last);
  return (
    <>
      <div ref={frame} className={styles.frame} onScroll={() => {
        keepBeforeGone();
        onScroll();
      }}>
        <div
          role="grid"
          tabIndex={-1}
          aria-label={`Readings of ${sheet.name}`}
          aria-rowcount={shown.rows.length + 1}
          aria-colcount={columns.length}
          aria-multiselectable="true"
          {...handlers}
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
          column={column?.is === 'cell' ? column.cell : null}
          columns={shown.columns}
          result={windowed ? results.get(row.record) : undefined}
          onType={typeOver}
          onRestore={restore}
        />
      )}
    </>
  );
}
