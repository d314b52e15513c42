/** One line under a sheet about the cell that the cursor is in: what it came as, and what there is to look at in its row. */
import type { RecordResult } from '../../reduction/results.ts';
import { besideRow } from './gridColumns.ts';
import { lineWords } from './sheetRows.ts';
import type { ShownColumn, ShownRow } from './sheetRows.ts';
import styles from './grid.module.css';

interface CellLineProps {
  readonly row: ShownRow;
  /** null where the cursor is in none of the sheet's own columns. */
  readonly column: ShownColumn | null;
  readonly columns: readonly ShownColumn[];
  /** undefined where its sentences stand below its row already. */
  readonly result: RecordResult | undefined;
  /** Opens the cell for typing, where a tap is all one has. */
  readonly onType: () => void;
  readonly onRestore: (row: ShownRow, cell: number) => void;
}

export function CellLine({ row, column, columns, result, onType, onRestore }: CellLineProps) {
  const came = column === null ? undefined : row.came[column.index];
  const sentences = [...new Set((result?.problems ?? []).map((problem) => besideRow(problem, columns)))];
  return (
    <div className={`${styles.cellLine} quiet`}>
      <span>
        {lineWords(row.line)}
        {column !== null && `, ${column.header} `}
        {column !== null && <button type="button" className="plain-button" onClick={onType}>type over</button>}
      </span>
      {came !== undefined && column !== null && (
        <span>
          came as {came === '' ? 'an empty cell' : `“${came}”`}{' '}
          <button type="button" className="plain-button" onClick={() => onRestore(row, column.index)}>
            restore what came
          </button>
        </span>
      )}
      {sentences.map((one) => <span key={one} className="look">{one}</span>)}
    </div>
  );
}
