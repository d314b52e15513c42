/** Periods with masses hung, and deflections by known weights: what each gave and how well its readings agree. */
import type { AddedMassesTold, WeightsTold } from '../../reduction/evidenceResults.ts';
import type { Reduction } from '../../reduction/results.ts';
import { chooseUnit, plain, withPlusMinus } from '../../units/format.ts';
import { siUnit } from '../../units/units.ts';
import { PERCENT, timesU } from '../stated/numberWords.ts';
import { SymbolText } from '../words.tsx';
import { SheetTable } from '../stated/SheetTable.tsx';

export function Masses({ reduction: { addedMasses, weights } }: { readonly reduction: Reduction }) {
  return (
    <>
      {addedMasses !== null && <AddedMasses told={addedMasses} />}
      {weights !== null && <p>{weightsSentence(weights)}</p>}
    </>
  );
}

const NOT_FOUND: Readonly<Record<Exclude<AddedMassesTold['status'], 'found'>, string>> = {
  tooFew: 'Timings with and without a mass, or with two, are needed before they tell moment of inertia and stiffness.',
  negative: 'These timings give a moment of inertia that is not above zero: a time or a radius is wrong, or the mass hung where the period does not change.',
  notFound: 'These timings give no moment of inertia.',
};

function AddedMasses({ told: { status, inertia, stiffness, rows, sameRadius, better } }: { readonly told: AddedMassesTold }) {
  const unit = siUnit('time');
  const length = (metres: number): string => plain(metres, chooseUnit([metres], 'length'), 3);
  return (
    <>
      <SheetTable label="Periods with masses hung">
        <caption>Periods, freed of damping and amplitude (± u)</caption>
        <thead>
          <tr><th scope="col">Timed</th><th scope="col">Timings</th><th scope="col">Period <SymbolText symbol="T_0" /></th><th scope="col">Normalised deviation</th></tr>
        </thead>
        <tbody>
          {rows.map(({ label, timings, period, deviation }) => (
            <tr key={label}>
              <th scope="row">{label}</th>
              <td className="num">{timings}</td>
              <td className="num">{withPlusMinus(period.value, period.u, unit)}</td>
              <td className="num">{deviation === null ? '–' : timesU(deviation)}</td>
            </tr>
          ))}
        </tbody>
      </SheetTable>
      <p>
        {status === 'found' && inertia !== null && stiffness !== null
          ? `They give J = ${withPlusMinus(inertia.value, inertia.u, chooseUnit([inertia.value], 'momentOfInertia'))} and κ = ${withPlusMinus(stiffness.value, stiffness.u, chooseUnit([stiffness.value], 'rotationalStiffness'))} (± u), gravity on the masses included.`
          : status === 'found' ? '' : NOT_FOUND[status]}
        {sameRadius === null ? '' : ` A mass at ${length(sameRadius)} leaves the period as it is and tells nothing.`}
        {better === null ? '' : ` At ${length(better.radius)} two timings tell J best, to ${plain(better.uInertia, PERCENT, 2)}.`}
      </p>
    </>
  );
}

/** What the weights gave in a sentence. */
export function weightsSentence({ weights, stiffness, interceptInU, hysteresis, slopesPart, chiSquared, dof }: WeightsTold): string {
  const angle = hysteresis === null ? '' : ` Loading and unloading part by ${plain(2 * hysteresis, chooseUnit([2 * hysteresis], 'angle'), 2)}; half of it counts as limits common to all.${slopesPart !== null && Math.abs(slopesPart) > 0.01 ? ` Their slopes part by ${plain(2 * Math.abs(slopesPart), PERCENT, 2)}: the pulley rubs, more than the pivot.` : ''}`;
  const seen = dof > 0 ? ` Scatter about the line: χ² = ${chiSquared.toFixed(1)} for ${dof}.` : '';
  const zero = Math.abs(interceptInU) > 2 ? ` The line misses the reading at no weight by ${timesU(interceptInU)} u.` : '';
  return `${weights} known weights give κ = ${withPlusMinus(stiffness.value, stiffness.u, chooseUnit([stiffness.value], 'rotationalStiffness'))} (± u).${angle}${seen}${zero}`;
}
