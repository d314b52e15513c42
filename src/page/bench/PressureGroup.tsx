/** The pressure on the bench: what the gauge shows and means, what is outside, and the air on a light strip. */
import type { ReactNode } from 'react';
import type { AirResult, PressureResult } from '../../reduction/results.ts';
import type { Choices } from '../../session/session.ts';
import { plain } from '../../units/format.ts';
import { FiredAt } from '../stated/FiredAt.tsx';
import { PERCENT } from '../stated/numberWords.ts';
import styles from './bench.module.css';
import { ChoiceField } from './ChoiceField.tsx';
import { GAUGE_MEANINGS } from './groups.ts';

interface Props {
  readonly choices: Choices;
  readonly pressure: PressureResult | null;
  readonly air: AirResult | null;
  /** Unit of the readings whose meaning is not settled, '' where it is. */
  readonly unclear?: string;
  /** The fields of the group's entries. */
  readonly children: ReactNode;
  readonly onGauge: (meaning: Choices['gaugeMeaning']) => void;
  readonly onAir: (correct: boolean) => void;
}

const USE: Readonly<Record<AirResult['use'], string>> = {
  correction: 'it is added to J, with what its viscosity leaves open',
  uncertainty: 'the air is too viscous to correct for, so it stands in the budget as an uncertainty',
  magnitude: 'only its order is known, so it stands in the budget as an uncertainty',
  none: 'too thin to flow',
};

/** Forms in which the air on a strip is reckoned. */
const LIGHT: ReadonlySet<Choices['form']> = new Set(['uniformStrip', 'stripWithPlate', 'filmStrip']);

const countsFromOutside = (unit: string): boolean => unit.startsWith('−');

export function PressureGroup({ choices, pressure, air, unclear = '', children, onGauge, onAir }: Props) {
  return (
    <>
      <ChoiceField name="gaugeMeaning" legend="The gauge shows" value={choices.gaugeMeaning} options={GAUGE_MEANINGS} onChoose={onGauge} />
      {unclear !== '' && (
        <p className="look">
          The readings are in {unclear}, and what the gauge shows is not settled, so there is no pressure yet.{' '}
          {countsFromOutside(unclear)
            ? <button type="button" className="plain-button" onClick={() => onGauge('gauge')}>{unclear} counts from the outside pressure</button>
            : 'Choose it above.'}
        </p>
      )}
      {children}
      {LIGHT.has(choices.form) && (
        <label className={styles.check} id="choice-correctAir" tabIndex={-1}>
          <input type="checkbox" checked={choices.correctAir} onChange={(event) => onAir(event.target.checked)} />
          Reckon with the air that the strip carries along
        </label>
      )}
      {pressure !== null && <p className="quiet"><FiredAt pressure={pressure} /></p>}
      {air !== null && <p className="quiet">The air carried along is {plain(air.ofInertia, PERCENT, 2)} of the strip’s inertia; {USE[air.use]}.</p>}
    </>
  );
}
