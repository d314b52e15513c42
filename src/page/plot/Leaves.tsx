/** Turns the leaves of a long table, so that ten thousand rows do not stand in the page at once. */
import { useState } from 'react';
import styles from './FigureView.module.css';

const ROWS_ON_A_LEAF = 200;

export interface LeavesState {
  readonly from: number;
  readonly to: number;
  readonly rows: number;
  turnTo(from: number): void;
}

/** The rows [from, to) that are shown. */
export function useLeaves(rows: number): LeavesState {
  const [wanted, turnTo] = useState(0);
  const from = wanted < rows ? wanted : 0;
  return { from, to: Math.min(rows, from + ROWS_ON_A_LEAF), rows, turnTo };
}

/** Nothing where one leaf holds all rows. */
export function Leaves({ leaves, of }: { readonly leaves: LeavesState; readonly of: string }) {
  const { from, to, rows, turnTo } = leaves;
  if (rows <= ROWS_ON_A_LEAF) return null;
  return (
    <nav className={styles.leaves} aria-label={`Rows of: ${of}`}>
      <button type="button" disabled={from === 0} onClick={() => turnTo(from - ROWS_ON_A_LEAF)}>Rows before</button>
      <span className="num">rows {from + 1} to {to} of {rows}</span>
      <button type="button" disabled={to === rows} onClick={() => turnTo(from + ROWS_ON_A_LEAF)}>Rows after</button>
    </nav>
  );
}
