/** An uncertainty budget in the GUM's columns, with shares of the variance that total 100.0 %. */
import type { Budget, BudgetLine } from '../../reduction/results.ts';
import { chooseUnit, plain } from '../../units/format.ts';
import type { Unit } from '../../units/units.ts';
import { Aligned, alignedTo } from '../stated/Aligned.tsx';
import { coverageFactor, degreesOfFreedom, roundedAs } from '../stated/numberWords.ts';
import { SymbolText } from '../words.tsx';
import { SheetTable } from '../stated/SheetTable.tsx';
import stated from '../stated/stated.module.css';
import styles from './budget.module.css';

interface Props {
  readonly budget: Budget;
  /** What it is the budget of: "run mean", "shot 4". */
  readonly of: string;
  /** Unit of the impulse bits. */
  readonly unit: Unit;
  /** Only quantity, u, contribution and share, where the sheet is narrow. */
  readonly brief?: boolean;
}

const SCOPE_WORDS: Readonly<Record<BudgetLine['scope'], string>> = {
  common: 'common', own: 'own', scatter: 'scatter',
};

/** Sum of shares that are whole tenths of a percent. */
export function totalShare(lines: readonly BudgetLine[]): string {
  const tenths = lines.reduce((sum, { share }) => sum + Math.round(10 * share), 0);
  return (tenths / 10).toFixed(1);
}

const unitOf = (line: BudgetLine): Unit => chooseUnit(line.estimate === null || line.estimate === 0 ? [line.u ?? 0] : [line.estimate], line.dimension);

/** ∂I/∂x per unit of x, "12.5 mN·s/mm". */
function sensitivityText(line: BudgetLine, x: Unit, impulse: Unit): string {
  if (line.sensitivity === null) return '–';
  const perUnit = plain(line.sensitivity * x.factor, impulse, 3);
  return x.symbol === '1' ? perUnit : `${perUnit}/${/[·/]/.test(x.symbol) ? `(${x.symbol})` : x.symbol}`;
}

const inItsUnit = (line: BudgetLine, value: number | null, digits: number): string =>
  value === null ? '–' : plain(value, unitOf(line), digits);

/** Length for the eye, beside the number that says the same. */
function ShareBar({ share }: { readonly share: number }) {
  return <span className={styles.bar} aria-hidden="true"><span style={{ inlineSize: `${share}%` }} /></span>;
}

export function BudgetTable({ budget, of, unit, brief = false }: Props) {
  const { lines } = budget;
  const small = chooseUnit([budget.of.u], 'impulse');
  const contributions = alignedTo([...lines.map(({ contribution }) => contribution), budget.of.u], budget.of.u / 10, small);
  return (
    <SheetTable label={`Budget of the ${of}`}>
      <thead>
        <tr>
          <th scope="col">Quantity</th>
          {!brief && <th scope="col">Estimate</th>}
          <th scope="col">{brief ? 'u' : 'Standard uncertainty u'}</th>
          {!brief && (
            <>
              <th scope="col">Distribution</th>
              <th scope="col" className={stated.right}>ν</th>
              <th scope="col">Sensitivity coefficient c</th>
            </>
          )}
          <th scope="col">Contribution c·u ({small.symbol})</th>
          <th scope="col" className={stated.right}>Share of u²</th>
          <th scope="col"><span className="visually-hidden">Share, drawn</span></th>
          <th scope="col">Reaches</th>
        </tr>
      </thead>
      <tbody>
        {lines.map((line, index) => (
          <tr key={line.id} className={styles[line.scope]}>
            <th scope="row">{line.label} <SymbolText symbol={line.symbol} /></th>
            {!brief && <td className="num">{inItsUnit(line, line.estimate, 6)}</td>}
            <td className="num">{inItsUnit(line, line.u, 2)}</td>
            {!brief && (
              <>
                <td className={stated.words}>{line.distribution}</td>
                <td className={`num ${stated.right}`}>{degreesOfFreedom(line.dof)}</td>
                <td className="num">{sensitivityText(line, unitOf(line), unit)}</td>
              </>
            )}
            <td><Aligned column={contributions} row={index} bare /></td>
            <td className={`num ${stated.right}`}>{line.share.toFixed(1)} %</td>
            <td><ShareBar share={line.share} /></td>
            <td>{SCOPE_WORDS[line.scope]}</td>
          </tr>
        ))}
      </tbody>
      <tfoot>
        <tr>
          <th scope="row">{of.charAt(0).toUpperCase() + of.slice(1)}</th>
          {!brief && <td className="num">{roundedAs(budget.of.value, budget.of.u, unit)}</td>}
          <td className="num">{plain(budget.of.u, small, 2)}</td>
          {!brief && (
            <>
              <td>combined</td>
              <td className={`num ${stated.right}`}>{degreesOfFreedom(budget.of.dof)}</td>
              <td />
            </>
          )}
          <td><Aligned column={contributions} row={lines.length} bare /></td>
          <td className={`num ${stated.right}`}>{totalShare(lines)} %</td>
          <td />
          <td className="num">U = {plain(budget.of.U, small, 2)} (k = {coverageFactor(budget.of.k)})</td>
        </tr>
      </tfoot>
    </SheetTable>
  );
}
