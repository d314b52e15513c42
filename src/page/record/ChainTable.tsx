/** The chain that made a result: each step with its value, standard uncertainty, factor and equation. */
import type { ChainStep } from '../../reduction/results.ts';
import { chooseUnit } from '../../units/format.ts';
import { Aligned, alignedColumn } from '../stated/Aligned.tsx';
import { EquationText } from './EquationText.tsx';
import { correctingFactor } from '../stated/numberWords.ts';
import { SymbolText } from '../words.tsx';
import { SheetTable } from '../stated/SheetTable.tsx';
import styles from './record.module.css';

export function ChainTable({ chain }: { readonly chain: readonly ChainStep[] }) {
  const steps = [...chain.filter(({ aside }) => aside === undefined), ...chain.filter(({ aside }) => aside === true)];
  const values = alignedColumn(steps.map(({ stated, dimension }) => ({ value: stated.value, spread: stated.u, unit: chooseUnit([stated.value], dimension) })));
  return (
    <SheetTable label="From reading to impulse bit">
      <thead>
        <tr>
          <th scope="col">Step, and its equation</th>
          <th scope="col">Symbol</th>
          <th scope="col">Value ± u</th>
          <th scope="col">Factor</th>
        </tr>
      </thead>
      <tbody>
        {steps.map((step, row) => (
          <tr key={step.id} className={step.aside === true ? styles.aside : undefined}>
            <th scope="row">
              {step.aside === true ? <span className="quiet">beside: </span> : ''}{step.label}
              {step.equation !== '' && <span className={`quiet ${styles.equation}`}><EquationText equation={step.equation} /></span>}
            </th>
            <td><SymbolText symbol={step.symbol} /></td>
            <td><Aligned column={values} row={row} /></td>
            <td className="num">{step.factor === undefined ? '' : `× ${correctingFactor(step.factor)}`}</td>
          </tr>
        ))}
      </tbody>
    </SheetTable>
  );
}
