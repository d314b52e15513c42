/** The chain that made a result: each step with its value, standard uncertainty, factor and equation. */
import type { ChainStep } from '../../reduction/results.ts';
import { chooseUnit } from '../../units/format.ts';
import type { Dimension, Unit } from '../../units/units.ts';
import { Aligned, alignedColumn } from '../stated/Aligned.tsx';
import { EquationText } from './EquationText.tsx';
import { correctingFactor } from '../stated/numberWords.ts';
import { SymbolText } from '../words.tsx';
import { SheetTable } from '../stated/SheetTable.tsx';
import styles from './record.module.css';

interface Props {
  readonly chain: readonly ChainStep[];
  /** Unit of the impulse bits. */
  readonly impulse: Unit;
}

export function ChainTable({ chain, impulse }: Props) {
  const steps = [...chain.filter(({ aside }) => aside === undefined), ...chain.filter(({ aside }) => aside === true)];
  // One unit for all steps of a dimension, so that they can be held against each other.
  const unitOf = (dimension: Dimension): Unit => dimension === 'impulse'
    ? impulse
    : chooseUnit(steps.filter((step) => step.dimension === dimension).map(({ stated }) => stated.value), dimension);
  const values = alignedColumn(steps.map(({ stated, dimension }) => ({ value: stated.value, spread: stated.u, unit: unitOf(dimension) })));
  return (
    <SheetTable label="From reading to impulse bit">
      <thead>
        <tr>
          <th scope="col">Step, and its equation</th>
          <th scope="col">Value ± u</th>
          <th scope="col">Factor</th>
        </tr>
      </thead>
      <tbody>
        {steps.map((step, row) => (
          <tr key={step.id} className={step.aside === true ? styles.aside : undefined}>
            <th scope="row" className={styles.step}>
              {step.aside === true ? <span className="quiet">beside: </span> : ''}{step.label} <SymbolText symbol={step.symbol} />
              {step.equation !== '' && <span className={`quiet ${styles.equation}`}><EquationText equation={step.equation} /></span>}
              {step.measuredWith !== undefined && <span className={`quiet ${styles.equation}`}>with {step.measuredWith}</span>}
            </th>
            <td><Aligned column={values} row={row} /></td>
            <td className="num">{step.factor === undefined ? '' : `× ${correctingFactor(step.factor)}`}</td>
          </tr>
        ))}
      </tbody>
    </SheetTable>
  );
}
