/** Does the bench agree with itself? What was measured beside what masses and lengths predict, and the slip that would reconcile them, to be taken in one press. */
import type { Agreement, AgreementCheck, Slip } from '../../reduction/evidenceResults.ts';
import { slipWords } from '../../problems/slips.ts';
import { chooseUnit, withPlusMinus } from '../../units/format.ts';
import type { Dimension } from '../../units/units.ts';
import { PERCENT, timesU } from '../stated/numberWords.ts';
import { SheetTable } from '../stated/SheetTable.tsx';

const ROWS: Readonly<Record<AgreementCheck['id'], { readonly label: string; readonly dimension: Dimension }>> = {
  period: { label: 'Period, freed of damping and amplitude', dimension: 'time' },
  stiffness: { label: 'Static stiffness', dimension: 'rotationalStiffness' },
  maximumTime: { label: 'Time to the first maximum', dimension: 'time' },
  taps: { label: 'Calibration factor, by taps against geometry', dimension: 'calibrationFactor' },
};

interface Props {
  readonly agreement: Agreement | null;
  readonly onTake: (slip: Slip) => void;
}

export function AgreementTable({ agreement, onTake }: Props) {
  if (agreement === null) return null;
  const { checks, off, slips } = agreement;
  return (
    <div role="group" aria-labelledby="agreement-heading">
      <h3 id="agreement-heading">Does the bench agree with itself?</h3>
      <SheetTable label="Measured and predicted">
        <thead>
          <tr><th scope="col">Measured against masses and lengths</th><th scope="col">Measured ± u</th><th scope="col">Predicted ± u</th><th scope="col">Apart ± u</th><th scope="col">in u</th></tr>
        </thead>
        <tbody>
          {checks.map(({ id, measured, predicted, relative, inU }) => {
            const { label, dimension } = ROWS[id];
            const unit = chooseUnit([predicted.value], dimension);
            return (
              <tr key={id}>
                <th scope="row">{label}</th>
                <td className="num">{withPlusMinus(measured.value, measured.u, unit)}</td>
                <td className="num">{withPlusMinus(predicted.value, predicted.u, unit)}</td>
                <td className="num">{withPlusMinus(relative.value, relative.u, PERCENT)}</td>
                <td className={off.includes(id) || Math.abs(inU) > AGREES ? 'num look' : 'num'}>{timesU(inU)}</td>
              </tr>
            );
          })}
        </tbody>
      </SheetTable>
      <p>{verdict(agreement)}</p>
      {slips.length > 0 && (
        <ul>
          {slips.map((slip) => (
            <li key={`${slip.id} ${slip.what} ${slip.to}`}>
              “{slip.what}” {slipWords(slip.id)}{slip.to === '' ? '' : `: ${slip.from} → ${slip.to}`}.{' '}
              <button type="button" className="plain-button unprinted" onClick={() => onTake(slip)} aria-label={`Take it so: ${slip.what}${slip.to === '' ? '' : `, ${slip.to}`}`}>take it so</button>
            </li>
          ))}
        </ul>
      )}
    </div>
  );
}

const AGREES = 2;

function verdict({ checks, off, slips }: Agreement): string {
  const parted = checks.some(({ inU }) => Math.abs(inU) > AGREES);
  if (off.length === 0 && !parted) return 'It does, as far as this was measured.';
  if (off.length === 0) return 'Not within its uncertainties, and by too little for a slip of the pen: look at the uncertainties, at the model of the pendulum, and at what hung on it.';
  if (slips.length === 0) return 'It does not, and no single slip of the pen reconciles the numbers: look at the masses, the lengths, what hung on the pendulum, and whether a limp strip is taken for a rigid one.';
  return slips.length === 1 ? 'It does not. One single slip would reconcile the numbers:' : 'It does not. Each of these slips by itself would reconcile the numbers, which do not tell them apart:';
}
