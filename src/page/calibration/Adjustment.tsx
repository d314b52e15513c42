/** The least-squares adjustment opened: χ², each item's normalised deviation, the one that pulls most, and the shared inputs that it moves. */
import type { AdjustmentTold } from '../../reduction/evidenceResults.ts';
import type { Reduction } from '../../reduction/results.ts';
import { chooseUnit, plain, withPlusMinus } from '../../units/format.ts';
import { PERCENT, PLAIN, timesU } from '../stated/numberWords.ts';
import { SheetTable } from '../stated/SheetTable.tsx';

export function Adjustment({ reduction }: { readonly reduction: Reduction }) {
  const { adjustment } = reduction;
  if (adjustment === null || (adjustment.status !== 'adjusted' && reduction.chosen !== 'adjustment') || (adjustment.status === 'adjusted' && adjustment.dof === 0)) return null;
  return (
    <details open={reduction.chosen === 'adjustment' || (adjustment.probability ?? 1) < UNLIKELY}>
      <summary>The adjustment of all evidence{adjustment.status === 'adjusted' ? `: χ² = ${adjustment.chiSquared.toFixed(1)} for ${adjustment.dof}` : ''}</summary>
      {adjustment.status === 'adjusted' ? <Opened adjustment={adjustment} /> : <p>{NOT_ADJUSTED[adjustment.status]}</p>}
    </details>
  );
}

const UNLIKELY = 0.05;

const NOT_ADJUSTED: Readonly<Record<Exclude<AdjustmentTold['status'], 'adjusted'>, string>> = {
  underdetermined: 'The evidence does not tell moment of inertia and stiffness both: add a timed period, known weights, a mass hung and timed, or the masses and lengths.',
  notConverged: 'The evidence contradicts itself so far that no adjustment meets it. Look at each way by itself.',
  contradictory: 'The evidence contradicts itself. Look at each way by itself.',
};

/** χ² and its chance in words. */
export function agreementSentence({ chiSquared, dof, probability, pullsMost, items }: AdjustmentTold): string {
  const chance = probability === null ? '' : `, a χ² as large or larger comes by chance in ${plain(probability, PERCENT, 2)} of cases`;
  const farthest = items.find(({ label }) => label === pullsMost);
  const pulls = farthest === undefined || farthest.deviation === null ? '' : ` Farthest from what the others say: ${farthest.label}, by ${timesU(farthest.deviation)} of its uncertainties.`;
  const verdict = probability !== null && probability < UNLIKELY ? 'The evidence does not agree within its uncertainties' : 'The evidence agrees within its uncertainties';
  return `${verdict}: χ² = ${chiSquared.toFixed(1)} for ${dof} degrees of freedom${chance}.${pulls} The uncertainty is as stated; nothing is widened for a large χ².`;
}

function Opened({ adjustment }: { readonly adjustment: AdjustmentTold }) {
  const { inertia, stiffness, ratio, items, moved } = adjustment;
  return (
    <>
      <p>{agreementSentence(adjustment)}</p>
      {inertia !== null && stiffness !== null && (
        <p className="quiet">
          Adjusted, as fired: J = {withPlusMinus(inertia.value, inertia.u, chooseUnit([inertia.value], 'momentOfInertia'))}, κ = {withPlusMinus(stiffness.value, stiffness.u, chooseUnit([stiffness.value], 'rotationalStiffness'))}
          {ratio === null ? '' : `, ζ = ${withPlusMinus(ratio.value, ratio.u, PLAIN)}`} (± u).
        </p>
      )}
      <SheetTable label="Items of the adjustment">
        <thead>
          <tr>
            <th scope="col">Evidence</th>
            <th scope="col">Normalised deviation</th>
            <th scope="col">Change of K without it, in u</th>
          </tr>
        </thead>
        <tbody>
          {items.map(({ id, label, deviation, pull }) => (
            <tr key={id}>
              <th scope="row">{label}</th>
              <td className="num">{deviation === null ? <span className="quiet">not checked by another</span> : timesU(deviation)}</td>
              <td className="num">{pull === null ? '–' : timesU(pull)}</td>
            </tr>
          ))}
        </tbody>
      </SheetTable>
      {moved.length > 0 && <p className="quiet">Inputs that several items share, moved by it (in their u): {moved.map(({ label, shift }) => `${label} ${timesU(shift)}`).join(', ')}.</p>}
    </>
  );
}
