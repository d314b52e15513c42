/** An uncertainty budget in the GUM's columns, with shares of the variance that total 100.0 %. */
import type { Budget, BudgetLine } from '../../reduction/results.ts';
import { chooseUnit, plain } from '../../units/format.ts';
import type { Unit } from '../../units/units.ts';
import { Aligned, alignedTo, alignedWords } from '../stated/Aligned.tsx';
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
function sensitivityText(line: BudgetLine, x: Unit, impulse: Unit): string | null {
  if (line.sensitivity === null) return null;
  const perUnit = plain(line.sensitivity * x.factor, impulse, 3);
  return x.symbol === '1' ? perUnit : `${perUnit}/${/[·/]/.test(x.symbol) ? `(${x.symbol})` : x.symbol}`;
}

const inItsUnit = (line: BudgetLine, value: number | null, digits: number): string | null =>
  value === null ? null : plain(value, unitOf(line), digits);

/** A scatter and the common part of a rounding are deviations: nothing is estimated, though their best value is 0. */
const isDeviation = ({ id, estimate }: BudgetLine): boolean => estimate === 0 && /^division\.|scatter/.test(id);

/** Length for the eye, beside the number that says the same. */
function ShareBar({ share }: { readonly share: number }) {
  return <span className={styles.bar} aria-hidden="true"><span style={{ inlineSize: `${share}%` }} /></span>;
}

export function BudgetTable({ budget, of, unit, brief = false }: Props) {
  const { lines } = budget;
  const small = chooseUnit([budget.of.u], 'impulse');
  const estimates = alignedWords([...lines.map((line) => (isDeviation(line) ? null : inItsUnit(line, line.estimate, 6))), roundedAs(budget.of.value, budget.of.u, unit)]);
  const uncertainties = alignedWords([...lines.map((line) => inItsUnit(line, line.u, 2)), plain(budget.of.u, small, 2)]);
  const coefficients = alignedWords(lines.map((line) => sensitivityText(line, unitOf(line), unit)));
  const contributions = alignedTo([...lines.map(({ contribution }) => contribution), budget.of.u], budget.of.u / 10, small);
  return (
    <SheetTable label={`Budget of the ${of}`}>
      <thead>
        <tr>
          <th scope="col">Quantity</th>
          {!brief && <th scope="col">Estimate</th>}
          <th scope="col">{brief ? 'u' : <>Standard<br />uncertainty u</>}</th>
          {!brief && (
            <>
              <th scope="col">Distribution</th>
              <th scope="col" className={stated.right}>ν</th>
              <th scope="col">Sensitivity<br />coefficient c</th>
            </>
          )}
          <th scope="col">Contribution<br />c·u ({small.symbol})</th>
          <th scope="col" className={stated.right}>Share<br />of u²</th>
          <th scope="col"><span className="visually-hidden">Share, drawn</span></th>
          <th scope="col">Reaches</th>
        </tr>
      </thead>
      <tbody>
        {lines.map((line, index) => (
          <tr key={line.id} className={styles[line.scope]}>
            <th scope="row" className={styles.quantity}>{line.label} <SymbolText symbol={line.symbol} />{line.measuredWith !== undefined && <span className={`quiet ${styles.with}`}>with {line.measuredWith}</span>}</th>
            {!brief && <td><Aligned column={estimates} row={index} /></td>}
            <td><Aligned column={uncertainties} row={index} /></td>
            {!brief && (
              <>
                <td className={stated.words}>{line.distribution}</td>
                <td className={`num ${stated.right}`}>{degreesOfFreedom(line.dof)}</td>
                <td><Aligned column={coefficients} row={index} /></td>
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
          {!brief && <td><Aligned column={estimates} row={lines.length} /></td>}
          <td><Aligned column={uncertainties} row={lines.length} /></td>
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
          <td />
        </tr>
        <tr>
          <th scope="row">Expanded, 95 %</th>
          <td colSpan={brief ? 5 : 9} className="num">U = {plain(budget.of.U, small, 2)} (k = {coverageFactor(budget.of.k)})</td>
        </tr>
      </tfoot>
    </SheetTable>
  );
}
