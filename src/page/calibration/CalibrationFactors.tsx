/** The calibration factor by geometry and by taps, side by side, each with the run mean that it gives, and the choice between them. */
import { useId } from 'react';
import type { Calibration, Difference, Reduction } from '../../reduction/results.ts';
import { setChoice } from '../../session/edits.ts';
import { impulseUnit } from '../../plots/impulseUnit.ts';
import { useActions, useStoreAtOnce } from '../../store/hooks.tsx';
import { chooseUnit, plain, withPlusMinus } from '../../units/format.ts';
import type { Unit } from '../../units/units.ts';
import { Aligned, alignedColumn } from '../stated/Aligned.tsx';
import type { AlignedColumn } from '../stated/Aligned.tsx';
import { coverageFactor, degreesOfFreedom, PERCENT, PLAIN, timesU } from '../stated/numberWords.ts';
import { SheetTable } from '../stated/SheetTable.tsx';
import styles from './calibration.module.css';

type Way = Calibration['way'];

const WAYS: readonly { readonly way: Way; readonly label: string }[] = [
  { way: 'geometry', label: 'by geometry' },
  { way: 'taps', label: 'by taps' },
];

const WHAT: Readonly<Record<Way, string>> = {
  geometry: 'masses, lengths and period',
  taps: 'taps of known impulse',
};

export function CalibrationFactors({ reduction }: { readonly reduction: Reduction }) {
  const { calibrations, runs, difference } = reduction;
  const choice = useStoreAtOnce((state) => state.session.choices.calibration);
  const { change } = useActions();
  const group = useId();
  const unit = impulseUnit(reduction);
  const both = WAYS.map(({ way }) => calibrations[way]);
  const factorUnit = chooseUnit(both.map((calibration) => calibration?.factor.value ?? 0), 'calibrationFactor');
  const factors = alignedColumn(both.map((calibration) => calibration && { value: calibration.factor.value, spread: calibration.factor.U, unit: factorUnit }));
  const means = alignedColumn(WAYS.map(({ way }) => {
    const run = runs[way];
    return run && { value: run.mean.value, spread: run.mean.U, unit };
  }));
  return (
    <>
      <fieldset>
        <legend className={styles.legend}>Calibration factor of the pendulum as fired, and the run mean that it gives</legend>
        <SheetTable label="Calibration factors">
          <thead>
            <tr>
              <th scope="col">Taken</th>
              <th scope="col">Calibration factor K ± U</th>
              <th scope="col">k</th>
              <th scope="col">ν</th>
              <th scope="col">Change of configuration ± u</th>
              <th scope="col">Run mean ± U</th>
            </tr>
          </thead>
          <tbody>
            {WAYS.map(({ way, label }, row) => (
              <tr key={way}>
                <th scope="row">
                  <label className={styles.choice}>
                    <input
                      type="radio"
                      name={group}
                      checked={choice === way}
                      onChange={() => change(`impulse bits ${label}`, setChoice('calibration', way))}
                    />
                    {label} <span className="quiet">{WHAT[way]}</span>
                  </label>
                </th>
                <FactorCells calibration={calibrations[way]} factors={factors} row={row} />
                <td><Aligned column={means} row={row} /></td>
              </tr>
            ))}
          </tbody>
        </SheetTable>
      </fieldset>
      {calibrations.taps !== null && <p>{scatterSentence(calibrations.taps)}</p>}
      <p>{difference === null ? 'With a bench and taps of known impulse both factors stand here side by side.' : differenceSentence(difference)}</p>
      {difference !== null && <Consequence reduction={reduction} unit={unit} />}
    </>
  );
}

interface FactorCellsProps {
  readonly calibration: Calibration | null;
  readonly factors: AlignedColumn;
  readonly row: number;
}

function FactorCells({ calibration, factors, row }: FactorCellsProps) {
  if (calibration === null) return <td colSpan={4} className="quiet">not known</td>;
  const { factor, change } = calibration;
  return (
    <>
      <td><Aligned column={factors} row={row} /></td>
      <td className="num">{coverageFactor(factor.k)}</td>
      <td className="num">{degreesOfFreedom(factor.dof)}</td>
      <td className="num">{calibration.way === 'taps' ? withPlusMinus(change.value, change.u, PLAIN) : '–'}</td>
    </>
  );
}

function scatterSentence({ taps, scatter, expectedScatter }: Calibration): string {
  const count = `${taps} ${taps === 1 ? 'tap' : 'taps'} of known impulse`;
  if (scatter === null) return `${count}; their scatter is not known.`;
  const expected = expectedScatter === null ? '' : `; their own uncertainties predict ${plain(expectedScatter, PERCENT, 2)}`;
  return `${count}, scattering by ${plain(scatter, PERCENT, 2)} (standard deviation)${expected}.`;
}

/** Up to this many standard uncertainties two results agree; beyond the second, chance no longer explains it. */
const AGREES = 2;
const DIFFERS = 3;

/** What the taps' factor is beside the one of geometry, and where to look if they part. */
export function differenceSentence({ relative, inU }: Difference): string {
  const away = `The factor by taps lies ${withPlusMinus(relative.value, relative.u, PERCENT)} (± u) from the one by geometry, ${timesU(Math.abs(inU))} standard uncertainties of that difference`;
  if (Math.abs(inU) <= AGREES) return `The two agree. ${away}.`;
  const look = 'Look at the two lever arms, the hammer’s calibration, the mass hung during taps or shots, the reading radius, and whether a limp strip is reduced as a rigid one.';
  return Math.abs(inU) <= DIFFERS
    ? `The two part a little. ${away}; chance alone does that in fewer than 1 of 20 calibrations. ${look}`
    : `The two differ. ${away}; chance does not explain it. ${look}`;
}

function Consequence({ reduction, unit }: { readonly reduction: Reduction; readonly unit: Unit }) {
  const { geometry, taps } = reduction.runs;
  if (geometry === null || taps === null) return null;
  return (
    <p className="quiet">
      Run mean by geometry {withPlusMinus(geometry.mean.value, geometry.mean.U, unit)}, by taps {withPlusMinus(taps.mean.value, taps.mean.U, unit)} (± U, 95 %);
      {' '}the one {reduction.chosen === 'taps' ? 'by taps' : 'by geometry'} counts.
    </p>
  );
}
