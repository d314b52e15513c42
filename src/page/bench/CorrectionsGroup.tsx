/** Corrections between the first swing and the impulse bit: each with its switch, its quantities and the factor that it makes. */
import type { ReactNode } from 'react';
import type { Reduction } from '../../reduction/results.ts';
import type { Choices } from '../../session/session.ts';
import { correctingFactor } from '../stated/numberWords.ts';
import styles from './bench.module.css';

type Switch = 'correctPulse' | 'correctAlignment' | 'correctSampling' | 'correctBackground' | 'correctPropellant';
const SWITCHES: readonly (readonly [Switch, string])[] = [
  ['correctPulse', 'length of the pulse'],
  ['correctAlignment', 'tilt of the thrust'],
  ['correctSampling', 'exposure and frames'],
  ['correctBackground', 'swing before the shot'],
  ['correctPropellant', 'propellant used'],
];

interface Props {
  readonly choices: Choices;
  readonly corrections: Reduction['corrections'];
  readonly onSwitch: (name: Switch, what: string, on: boolean) => void;
  readonly children: ReactNode;
}

export function CorrectionsGroup({ choices, corrections, onSwitch, children }: Props) {
  return (
    <>
      <fieldset className={styles.switches}>
        <legend className="quiet">Corrected for, where typed below</legend>
        {SWITCHES.map(([name, words]) => (
          <label key={name} className={styles.check}>
            <input type="checkbox" checked={choices[name]} onChange={(event) => onSwitch(name, words, event.target.checked)} />
            {words}
          </label>
        ))}
      </fieldset>
      {children}
      {corrections.length > 0 && (
        <ul className="quiet">
          {corrections.map(({ id, label, factor }) => <li key={id}>{label}: × {correctingFactor(factor.value)}</li>)}
        </ul>
      )}
    </>
  );
}
