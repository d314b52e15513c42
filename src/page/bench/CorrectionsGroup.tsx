/** Corrections between the first swing and the impulse bit: each with its switch, its quantities and the factor that it makes. */
import type { ReactNode } from 'react';
import type { Problem } from '../../problems/problems.ts';
import { sentence } from '../../problems/sentences.ts';
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

interface SamplesProps {
  readonly text: string;
  readonly problems: readonly Problem[];
  readonly onChange: (text: string) => void;
}

/** The measured pulse, pasted as it stands in a spreadsheet. */
export function PulseSamples({ text, problems, onChange }: SamplesProps) {
  return (
    <div className={text.trim() === '' ? `${styles.freeSwing} ${styles.empty}` : styles.freeSwing}>
      <label htmlFor="entry-pulseSamples">Samples of the pulse</label>
      <textarea
        id="entry-pulseSamples"
        rows={4}
        spellCheck={false}
        placeholder={'ms; N\n0; 0\n0.5; 0.031\n1.0; 0'}
        aria-describedby="entry-pulseSamples-below"
        value={text}
        onChange={(event) => onChange(event.target.value)}
      />
      <div id="entry-pulseSamples-below" className="quiet">
        <span className="unprinted">
          a time and a thrust a line, pasted from a spreadsheet, the unit of time above them. In place of the thrust anything that goes with it: where it goes with the
          square of the current, paste the square. The reading without thrust is to be taken off before.
        </span>
        {problems.map((problem) => <p key={problem.code} className={problem.weight === 'note' ? undefined : 'look'}>{sentence(problem)}</p>)}
      </div>
    </div>
  );
}

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
