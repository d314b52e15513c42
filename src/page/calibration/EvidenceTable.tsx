/** Every way of knowing the calibration factor, one a row: K with its interval in one picture, the run mean that it gives, and the choice of the one that counts. */
import { useId } from 'react';
import { impulseUnit } from '../../plots/impulseUnit.ts';
import type { EvidenceId, EvidenceRow } from '../../reduction/evidenceResults.ts';
import type { Reduction } from '../../reduction/results.ts';
import { setChoices } from '../../session/edits.ts';
import type { Choices } from '../../session/session.ts';
import { useActions, useStoreAtOnce } from '../../store/hooks.tsx';
import { chooseUnit, withPlusMinus } from '../../units/format.ts';
import { Aligned, alignedColumn } from '../stated/Aligned.tsx';
import { coverageFactor, degreesOfFreedom, PERCENT, timesU } from '../stated/numberWords.ts';
import { SheetTable } from '../stated/SheetTable.tsx';
import { intervalAxis, IntervalMark } from './IntervalMark.tsx';
import styles from './calibration.module.css';

export const EVIDENCE_WORDS: Readonly<Record<EvidenceId, { readonly label: string; readonly more: string }>> = {
  masses: { label: 'by geometry', more: 'masses and lengths alone' },
  massesAndPeriod: { label: 'by geometry and period', more: 'route A: κ by masses, J by the period' },
  inertiaAndPeriod: { label: 'by inertia and period', more: 'route B: J by masses, κ by the period' },
  stiffnessAndPeriod: { label: 'by static stiffness and period', more: 'route C' },
  film: { label: 'by geometry', more: 'modes of the film' },
  addedMasses: { label: 'by masses hung and timed', more: 'J and κ from the periods' },
  weights: { label: 'by known weights', more: 'static deflection and period' },
  taps: { label: 'by taps', more: 'taps of known impulse' },
  tapsBefore: { label: 'taps before the firings', more: '' },
  tapsBetween: { label: 'taps between the firings', more: '' },
  tapsAfter: { label: 'taps after the firings', more: '' },
  adjustment: { label: 'by adjustment', more: 'least squares over all evidence' },
};

/** What is said where a way of the trade is not there. */
const ALWAYS: readonly EvidenceId[] = ['taps'];

export function EvidenceTable({ reduction }: { readonly reduction: Reduction }) {
  const { evidence } = reduction;
  const [calibration, route] = [useStoreAtOnce((state) => state.session.choices.calibration), useStoreAtOnce((state) => state.session.choices.route)];
  const { change } = useActions();
  const group = useId();
  const unit = impulseUnit(reduction);
  const chosen = reduction.chosenFactor;
  const factorUnit = chooseUnit(evidence.map(({ factor }) => factor.value), 'calibrationFactor');
  const factors = alignedColumn(evidence.map(({ factor }) => ({ value: factor.value, spread: factor.U, unit: factorUnit })));
  const means = alignedColumn(evidence.map(({ mean }) => mean && { value: mean.value, spread: mean.U, unit }));
  const placed = chosen === null ? null : evidence.map(({ factor }) => ({ at: factor.value / chosen.value - 1, u: factor.u / chosen.value, U: factor.U / chosen.value }));
  const axis = placed && intervalAxis(placed);
  // What was pressed shows at once, before the results that belong to it.
  const isPicked = ({ choice }: EvidenceRow): boolean => choice !== null && choice.calibration === calibration && (choice.route === undefined || choice.route === route);
  return (
    <fieldset>
      <legend className={styles.legend}>Calibration factor of the pendulum as fired by each way, and the run mean that it gives</legend>
      <SheetTable label="Calibration factors">
        <thead>
          <tr>
            <th scope="col">Known</th>
            <th scope="col">Calibration factor K ± U</th>
            <th scope="col">k</th>
            <th scope="col">ν</th>
            <th scope="col">{axis === null ? '' : axisWords(axis)}</th>
            <th scope="col">From the chosen one ± u</th>
            <th scope="col">in u</th>
            <th scope="col">Run mean ± U</th>
          </tr>
        </thead>
        <tbody>
          {evidence.map((row, index) => (
            <tr key={row.id}>
              <th scope="row"><Way row={row} group={group} picked={isPicked(row)} onPick={(choice) => change(`impulse bits ${EVIDENCE_WORDS[row.id].label}`, setChoices(choice))} /></th>
              <td><Aligned column={factors} row={index} /></td>
              <td className="num">{coverageFactor(row.factor.k)}</td>
              <td className="num">{degreesOfFreedom(row.factor.dof)}</td>
              <td className={styles.picture}>{axis && placed && chosen && <IntervalMark axis={axis} {...placed[index]!} band={chosen.U / chosen.value} chosen={row.chosen} words={`${EVIDENCE_WORDS[row.id].label}: ${withPlusMinus(row.factor.value, row.factor.U, factorUnit)}`} />}</td>
              <td className="num">{row.apart === null ? '' : withPlusMinus(row.apart.value, row.apart.u, PERCENT)}</td>
              <td className="num">{row.apart === null || row.apart.u === 0 ? '' : timesU(row.apart.value / row.apart.u)}</td>
              <td><Aligned column={means} row={index} /></td>
            </tr>
          ))}
          {ALWAYS.filter((id) => !evidence.some((row) => row.id === id)).map((id) => (
            <tr key={id}>
              <th scope="row">
                <label className={styles.choice}>
                  <input type="radio" name={group} checked={calibration === 'taps'} onChange={() => change(`impulse bits ${EVIDENCE_WORDS[id].label}`, setChoices({ calibration: 'taps' }))} />
                  {EVIDENCE_WORDS[id].label} <span className="quiet">{EVIDENCE_WORDS[id].more}</span>
                </label>
              </th>
              <td colSpan={7} className="quiet">not known</td>
            </tr>
          ))}
        </tbody>
      </SheetTable>
    </fieldset>
  );
}

const axisWords = ({ low, high }: { readonly low: number; readonly high: number }): string => `${Math.round(100 * low)} % … ${Math.round(100 * high)} % of the chosen one`.replaceAll('-', '−');

interface WayProps {
  readonly row: EvidenceRow;
  readonly group: string;
  readonly picked: boolean;
  readonly onPick: (choice: Partial<Choices>) => void;
}

function Way({ row: { id, choice, readings }, group, picked, onPick }: WayProps) {
  const { label, more } = EVIDENCE_WORDS[id];
  const words = <>{label} <span className="quiet">{[more, readings > 0 ? `${readings} readings` : ''].filter((part) => part !== '').join(', ')}</span></>;
  if (choice === null) return <span className={styles.shownOnly}>{words}</span>;
  return (
    <label className={styles.choice}>
      <input type="radio" name={group} checked={picked} onChange={() => onPick(choice)} />
      {words}
    </label>
  );
}
