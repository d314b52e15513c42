/** One line under a sheet about the cell that the cursor is in: what it came as, and what there is to look at in its row. */
import { sentence } from '../../problems/sentences.ts';
import type { RecordResult } from '../../reduction/results.ts';
import { lineWords } from './sheetRows.ts';
import type { ShownColumn, ShownRow } from './sheetRows.ts';
import styles from './grid.module.css';

interface CellLineProps {
  readonly row: ShownRow;
  /** null where the cursor is in none of the sheet's own columns. */
  readonly column: ShownColumn | null;
  readonly result: RecordResult | undefined;
  readonly onRestore: (row: ShownRow, cell: number) => void;
}

export function CellLine({ row, column, result, onRestore }: CellLineProps) {
  const came = column === null ? undefined : row.came[column.index];
  const problems = result?.problems ?? [];
  return (
    <div className={`${styles.cellLine} quiet`}>
      <span>
        {lineWords(row.line)}
        {column !== null && `, ${column.header}`}
      </span>
      {came !== undefined && column !== null && (
        <span>
          typed over; came as {came === '' ? 'an empty cell' : `“${came}”`}{' '}
          <button type="button" className="plain-button" onClick={() => onRestore(row, column.index)}>
            restore what came
          </button>
        </span>
      )}
      {problems.map((problem, i) => (
        <span key={`${problem.code}-${i}`} className="look">{sentence(problem)}</span>
      ))}
    </div>
  );
}
