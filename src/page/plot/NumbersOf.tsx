/** The numbers of a figure as a table, made when it is opened. */
import { useState } from 'react';
import type { MouseEvent } from 'react';
import type { FigureTable } from '../../plots/figure.ts';
import { Leaves, useLeaves } from './Leaves.tsx';
import styles from './FigureView.module.css';

export function NumbersOf({ title, table, slim }: { readonly title: string; readonly table: FigureTable; readonly slim: boolean }) {
  const [open, setOpen] = useState(false);
  const leaves = useLeaves(table.rows.length);
  function turn(event: MouseEvent): void {
    event.preventDefault();
    setOpen(!open);
  }
  return (
    <details open={open} className={styles.numbers}>
      <summary onClick={turn} className="quiet">{slim ? 'As a table' : 'These numbers as a table'}</summary>
      {open && (
        <div className={styles.scroll} role="group" aria-label={`${title}, table`} tabIndex={0}>
          <table>
            <caption className="visually-hidden">{title}</caption>
            <thead>
              <tr>{table.head.map((word) => <th key={word} scope="col">{word}</th>)}</tr>
            </thead>
            <tbody>
              {table.rows.slice(leaves.from, leaves.to).map((row) => (
                <tr key={row.id}>
                  {row.cells.map((cell, index) => index === 0
                    ? <th key={table.head[index]} scope="row">{cell}</th>
                    : <td key={table.head[index]} className="num">{cell}</td>)}
                </tr>
              ))}
            </tbody>
          </table>
          <Leaves leaves={leaves} of={title} />
        </div>
      )}
    </details>
  );
}
