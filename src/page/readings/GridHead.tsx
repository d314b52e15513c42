/** Head of a sheet's grid: each column's header as it came, and what it means. */
import type { Unit } from '../../units/units.ts';
import type { GridColumn } from './gridColumns.ts';
import styles from './grid.module.css';

export function GridHead({ columns, impulseUnit }: { readonly columns: readonly GridColumn[]; readonly impulseUnit: Unit }) {
  return (
    <thead role="rowgroup">
      <tr role="row" aria-rowindex={1}>
        {columns.map((column, at) => (
          <th
            key={column.is === 'cell' ? column.cell.index : column.is}
            role="columnheader"
            scope="col"
            aria-colindex={at + 1}
            className={column.is === 'cell' ? `${styles.cellHead} ${styles[column.cell.meaning.role]}` : styles[`${column.is}Head`]}
            style={column.is === 'cell' ? { minWidth: `${column.cell.characters + 2}ch` } : undefined}
          >
            <HeadText column={column} impulseUnit={impulseUnit} />
          </th>
        ))}
      </tr>
    </thead>
  );
}

function HeadText({ column, impulseUnit }: { readonly column: GridColumn; readonly impulseUnit: Unit }) {
  switch (column.is) {
    case 'row':
      return <>line</>;
    case 'kind':
      return <TwoLines above="record" below="kind · told by" />;
    case 'cell':
      return column.meaning.startsWith(column.cell.header) ? <>{column.meaning}</> : <TwoLines above={column.cell.header} below={column.meaning} />;
    case 'impulseBit':
      return <TwoLines above={`impulse bit, ${impulseUnit.symbol}`} below="± standard uncertainty u" />;
    case 'aside':
      return <>setting aside</>;
    case 'remove':
      return <span className="visually-hidden">remove</span>;
    case 'looks':
      return <>to look at</>;
  }
}

function TwoLines({ above, below }: { readonly above: string; readonly below: string }) {
  return (
    <>
      <span className={styles.above} title={above}>{above}</span>
      <span className={styles.below}>{below}</span>
    </>
  );
}
