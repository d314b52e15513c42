/** The budget of the run mean. */
import { impulseUnit } from '../../plots/impulseUnit.ts';
import { useStore } from '../../store/hooks.tsx';
import { BudgetTable } from './BudgetTable.tsx';
import styles from './budget.module.css';

export function BudgetSection() {
  const reduction = useStore((state) => state.reduction);
  const run = reduction?.run ?? null;
  return (
    <section id="budget" className={styles.section} aria-labelledby="budget-heading">
      <h2 id="budget-heading">Budget of the run mean</h2>
      {reduction === null || run === null
        ? <p className="quiet">No run mean yet; its budget comes with it.</p>
        : (
          <>
            <p className="quiet">
              All uncertainties in this table are standard uncertainties u; the expanded U = k·u stands in its last row only.
              Common: reaches every shot, so it stays whole in the mean. Scatter: s/√n of the shots. Shares are of the variance u².
            </p>
            <BudgetTable budget={run.budget} of="run mean" unit={impulseUnit(reduction)} />
          </>
        )}
    </section>
  );
}
