/** One row of a sheet's grid. */
import { memo } from 'react';
import type { RecordKind } from '../../readings/meanings.ts';
import type { Mark } from '../../session/session.ts';
import type { RecordResult } from '../../reduction/results.ts';
import { Aligned } from '../stated/Aligned.tsx';
import type { AlignedColumn } from '../stated/Aligned.tsx';
import { KindMark } from './KindMark.tsx';
import { KindSelect } from './KindSelect.tsx';
import { besideRow, columnOfProblem } from './gridColumns.ts';
import type { GridColumn } from './gridColumns.ts';
import { lineWords } from './sheetRows.ts';
import type { ShownColumn, ShownRow } from './sheetRows.ts';
import { KIND_LABELS } from './tradeWords.ts';
import styles from './grid.module.css';

export interface RowActs {
  readonly setKind: (row: ShownRow, kind: RecordKind | null) => void;
  readonly askReason: (row: ShownRow) => void;
  readonly countAgain: (row: ShownRow) => void;
  readonly remove: (row: ShownRow) => void;
}

export interface GridRowProps {
  readonly row: ShownRow;
  readonly index: number;
  readonly gridColumns: readonly GridColumn[];
  readonly columns: readonly ShownColumn[];
  readonly result: RecordResult | undefined;
  readonly mark: Mark | undefined;
  /** Impulse bits of all rows, by row, with u. */
  readonly impulseBits: AlignedColumn;
  readonly selected: boolean;
  /** Column that Tab reaches; null where the cursor is in another row. */
  readonly tabColumn: number | null;
  /** First and last column of the stretched selection in this row; null for none. */
  readonly stretchFrom: number | null;
  readonly stretchTo: number | null;
  /** Text that the entry field opens with, in the cursor's cell; null while nothing is typed. */
  readonly typing: string | null;
  readonly acts: RowActs;
}

export const GridRow = memo(function GridRow(props: GridRowProps) {
  const { row, index, gridColumns, columns, result, mark, impulseBits, selected, tabColumn, stretchFrom, stretchTo, typing, acts } = props;
  const setAside = mark?.setAside;
  const problems = result?.problems ?? [];
  const sentences = [...new Set(problems.map((problem) => besideRow(problem, columns)))];
  const looksBelow = sentences.length > 0 && !gridColumns.some(({ is }) => is === 'looks');
  const looksId = `looks-${row.record}`;
  const faulty = new Set(problems.map((problem) => columnOfProblem(problem, columns)));
  const spot = (column: number) => ({ 'data-spot': `${index}:${column}`, tabIndex: column === tabColumn ? 0 : -1 });
  const name = lineWords(row.line);
  const rowName = [name, ...(result === undefined ? [] : [KIND_LABELS[result.kind]]), ...(setAside === undefined ? [] : ['set aside'])].join(', ');

  function cellOf(column: GridColumn, at: number) {
    switch (column.is) {
      case 'row':
        return (
          <th key="row" scope="row" role="rowheader" aria-colindex={at + 1} aria-label={rowName} aria-describedby={sentences.length > 0 ? looksId : undefined} className={styles.line} {...spot(at)}>
            {result !== undefined && <KindMark kind={result.kind} setAside={setAside !== undefined} />}
            <span className={styles.lineNumber}>{row.line}</span>
          </th>
        );
      case 'kind':
        return (
          <td key="kind" role="gridcell" aria-colindex={at + 1} className={styles.kind}>
            <KindSelect name={name} mark={mark?.kind} result={result} spot={spot(at)} onKind={(kind) => acts.setKind(row, kind)} />
          </td>
        );
      case 'cell': {
        const { cell } = column;
        const came = row.came[cell.index];
        const wrong = faulty.has(cell.index);
        const stretched = stretchFrom !== null && stretchTo !== null && at >= stretchFrom && at <= stretchTo;
        const classes = [styles.cell, came === undefined ? '' : styles.typedOver, wrong ? styles.wrong : '', stretched ? styles.stretched : '', styles[cell.meaning.role]];
        return (
          <td
            key={cell.index}
            role="gridcell"
            aria-colindex={at + 1}
            aria-selected={stretched}
            aria-invalid={wrong ? true : undefined}
            aria-describedby={wrong ? looksId : undefined}
            className={classes.join(' ')}
            title={came === undefined ? undefined : `typed over; came as ${came === '' ? 'an empty cell' : `“${came}”`}`}
            {...spot(at)}
          >
            {typing !== null && at === tabColumn ? (
              <input
                className={styles.entry}
                aria-label={`${cell.header}, ${name}`}
                defaultValue={typing}
                autoFocus
                autoComplete="off"
                spellCheck={false}
              />
            ) : (
              (row.cells[cell.index] ?? '')
            )}
          </td>
        );
      }
      case 'impulseBit':
        return (
          <td key="impulseBit" role="gridcell" aria-colindex={at + 1} className={styles.impulseBit} {...spot(at)}>
            {result?.impulseBit != null && <Aligned column={impulseBits} row={index} bare />}
          </td>
        );
      case 'aside':
        return (
          <td key="aside" role="gridcell" aria-colindex={at + 1} className={styles.asideCell}>
            {setAside !== undefined && <span className={styles.reason} title={setAside.reason}>{setAside.reason} </span>}
            <button
              type="button"
              className="plain-button"
              aria-label={setAside === undefined ? `Set aside ${name}` : `Count it again: ${name}`}
              onClick={() => (setAside === undefined ? acts.askReason(row) : acts.countAgain(row))}
              {...spot(at)}
            >
              {setAside === undefined ? 'set aside' : 'count it again'}
            </button>
          </td>
        );
      case 'remove':
        return (
          <td key="remove" role="gridcell" aria-colindex={at + 1} className={styles.removeCell}>
            {row.typed && (
              <button type="button" className="plain-button" aria-label={`Remove ${name}`} {...spot(at)} onClick={() => acts.remove(row)}>
                remove
              </button>
            )}
          </td>
        );
      case 'looks':
        return (
          <td key="looks" role="gridcell" aria-colindex={at + 1} className={styles.looks} id={looksId} {...spot(at)}>
            {sentences.join(' ')}
          </td>
        );
    }
  }

  const classes = [styles.row, setAside === undefined ? '' : styles.aside, looksBelow ? styles.withLooks : ''].join(' ');
  return (
    <>
      <tr role="row" data-row={index} aria-rowindex={index + 2} aria-selected={selected} className={classes}>
        {gridColumns.map(cellOf)}
      </tr>
      {looksBelow && (
        // Read aloud as the description of the row's head and of the cell in question.
        <tr aria-hidden="true" className={styles.looksBelow}>
          <td colSpan={gridColumns.length}>
            <div id={looksId}>{sentences.join(' ')}</div>
          </td>
        </tr>
      )}
    </>
  );
});
