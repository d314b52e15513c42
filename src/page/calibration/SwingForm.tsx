/** The choice between the full pendulum and the small-angle form, with how far they part in this run. */
import { useId } from 'react';
import { widestFormGap } from '../../reduction/beside.ts';
import type { Reduction } from '../../reduction/results.ts';
import { setChoice } from '../../session/edits.ts';
import type { Choices } from '../../session/session.ts';
import { recordName } from '../../plots/recordWords.ts';
import { useActions, useStoreAtOnce } from '../../store/hooks.tsx';
import { timesU } from '../stated/numberWords.ts';
import styles from './calibration.module.css';

const FORMS: readonly { readonly form: Choices['swingForm']; readonly label: string; readonly hint: string }[] = [
  { form: 'full', label: 'full pendulum', hint: 'equation of motion, integrated back from the peak' },
  { form: 'smallAngle', label: 'small-angle form', hint: 'sin θ taken as θ, damping by the factor D' },
];

/** Below this many standard uncertainties a gap is told as "less than". */
const TOLD_FROM = 0.05;

function gapSentence(name: string, inU: number): string {
  const size = Math.abs(inU) < TOLD_FROM ? 'less than 0.1' : timesU(Math.abs(inU));
  return `The two part most at ${name}: the small-angle form lies ${size} standard uncertainties u ${inU < 0 ? 'below' : 'above'} the full pendulum.`;
}

export function SwingForm({ reduction }: { readonly reduction: Reduction }) {
  const choice = useStoreAtOnce((state) => state.session.choices.swingForm);
  const { change } = useActions();
  const group = useId();
  const gap = widestFormGap(reduction.records);
  return (
    <fieldset className={styles.forms}>
      <legend className={styles.legend}>Swing to impulse by</legend>
      {FORMS.map(({ form, label, hint }) => (
        <label key={form} className={styles.choice}>
          <input type="radio" name={group} checked={choice === form} onChange={() => change(label, setChoice('swingForm', form))} />
          {label} <span className="quiet">{hint}</span>
        </label>
      ))}
      {gap !== null && (
        <p className="quiet">
          {gapSentence(recordName(gap.record), gap.inU)}
        </p>
      )}
    </fieldset>
  );
}
