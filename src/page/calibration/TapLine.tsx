/** The taps as a line: how it is drawn, what the tests say of it, its residuals and leverages, and the taps before and after the firings. */
import { useId, useMemo } from 'react';
import { tapResiduals } from '../../plots/tapResiduals.ts';
import type { TapStudy } from '../../reduction/evidenceResults.ts';
import type { Reduction } from '../../reduction/results.ts';
import { setChoice } from '../../session/edits.ts';
import { useActions, useStore, useStoreAtOnce } from '../../store/hooks.tsx';
import { chooseUnit, plain, withPlusMinus } from '../../units/format.ts';
import { PERCENT, timesU } from '../stated/numberWords.ts';
import { goToElement } from '../head/goTo.ts';
import { FigureView } from '../plot/FigureView.tsx';
import { useInks } from '../plot/useInks.ts';
import styles from './calibration.module.css';

const LINES = [['throughOrigin', 'through the origin'], ['withIntercept', 'with an intercept, taken off every swing']] as const;
const DRIFTS = [['together', 'all together'], ['mean', 'mean of before and after, half their difference as limits'], ['interpolated', 'interpolated to each shot']] as const;

export function TapLine({ reduction }: { readonly reduction: Reduction }) {
  const { tapStudy } = reduction;
  const [line, drift] = [useStoreAtOnce((state) => state.session.choices.tapLine), useStoreAtOnce((state) => state.session.choices.tapDrift)];
  const { change, select } = useActions();
  const group = useId();
  const selected = useStore((state) => state.selected);
  const inks = useInks();
  const { records } = reduction;
  const figure = useMemo(() => tapResiduals({ records, tapStudy }, inks), [records, tapStudy, inks]);
  if (tapStudy === null) return null;
  return (
    <>
      <fieldset className={styles.forms}>
        <legend className={styles.legend}>Taps as a line</legend>
        {LINES.map(([value, words]) => (
          <label key={value} className={styles.choice}>
            <input type="radio" name={`${group}-line`} checked={line === value} onChange={() => change(`taps ${words}`, setChoice('tapLine', value))} />
            {words}
          </label>
        ))}
        <p>{lineSentence(tapStudy)}</p>
      </fieldset>
      {tapStudy.groups.length > 1 && (
        <fieldset className={styles.forms}>
          <legend className={styles.legend}>Taps before and after the firings</legend>
          {DRIFTS.map(([value, words]) => (
            <label key={value} className={styles.choice}>
              <input type="radio" name={`${group}-drift`} checked={drift === value} onChange={() => change(`taps ${words}`, setChoice('tapDrift', value))} />
              {words}
            </label>
          ))}
          <p>{driftSentence(tapStudy)}</p>
        </fieldset>
      )}
      {figure !== null && <FigureView figure={figure} inks={inks} selected={selected} onSelect={select} onOpen={() => goToElement('record')} />}
    </>
  );
}

const UNLIKELY = 0.05;
const chance = (probability: number): string => `chance ${plain(probability, PERCENT, 2)}`;

/** The line, its intercept, its bend and its scatter, each with a verdict. */
export function lineSentence({ taps, sizes, sides, intercept, curvature, chiSquared, dof, probability, widened, repeatability, alongRun, runs }: TapStudy): string {
  const parts = [`${taps} ${taps === 1 ? 'tap' : 'taps'} of ${sizes} ${sizes === 1 ? 'size' : 'sizes'}${sides > 1 ? ', to both sides' : ''}.`];
  if (intercept !== null) parts.push(intercept.probability < UNLIKELY ? `The line misses the origin by ${timesU(Math.abs(intercept.t))} u (${chance(intercept.probability)}).` : `It goes through the origin (off by ${timesU(Math.abs(intercept.t))} u, ${chance(intercept.probability)}).`);
  if (curvature !== null) parts.push(curvature.probability < UNLIKELY ? `It bends by ${timesU(Math.abs(curvature.t))} u (${chance(curvature.probability)}).` : `It is straight (bend ${timesU(Math.abs(curvature.t))} u).`);
  if (dof > 0) {
    const seen = widened > 1 && probability !== null && probability < UNLIKELY
      ? `They scatter ${widened.toFixed(1)} times as much as stated (χ² = ${chiSquared.toFixed(1)} for ${dof}, ${chance(probability)}); the scatter seen is used.`
      : `They scatter as stated (χ² = ${chiSquared.toFixed(1)} for ${dof}).`;
    parts.push(seen);
  }
  if (repeatability !== null) parts.push(`Repeated taps of one size part by ${plain(repeatability.relative, PERCENT, 2)} (standard deviation, ${repeatability.dof} degrees of freedom); their own uncertainties predict ${plain(repeatability.expected, PERCENT, 2)}.`);
  if (alongRun !== null && alongRun.probability < UNLIKELY) parts.push(`Along the run their slope changes by ${plain(alongRun.relative, PERCENT, 2)} (${chance(alongRun.probability)}).`);
  if (runs !== null && runs.probability < UNLIKELY) parts.push(`The residuals change sides ${runs.runs - 1} times where ${(runs.expected - 1).toFixed(1)} are expected (${chance(runs.probability)}): they follow one another.`);
  return parts.join(' ');
}

const WHERE: Readonly<Record<string, string>> = { before: 'before', between: 'between', after: 'after' };
const DRIFTED = 2;

export function driftSentence({ groups, drift }: TapStudy): string {
  const unit = chooseUnit(groups.map(({ factor }) => factor.value), 'calibrationFactor');
  const each = groups.map(({ where, taps, factor }) => `${WHERE[where]} ${withPlusMinus(factor.value, factor.u, unit)} (${taps} ${taps === 1 ? 'tap' : 'taps'})`).join(', ');
  if (drift === null) return `K ${each} (± u).`;
  const moved = `K moved by ${withPlusMinus(drift.relative.value, drift.relative.u, PERCENT)} (± u), ${timesU(Math.abs(drift.inU))} u of that difference; what both share cancels in it.`;
  const taken = `As their mean K is ${withPlusMinus(drift.byMean.value, drift.byMean.u, unit)}; interpolated, ${withPlusMinus(drift.atFirst.value, drift.atFirst.u, unit)} at the first shot and ${withPlusMinus(drift.atLast.value, drift.atLast.u, unit)} at the last.`;
  return `K ${each} (± u). ${moved} ${taken} ${Math.abs(drift.inU) > DRIFTED ? 'That is a drift: take it in, and look for what changed.' : 'That is no drift.'}`;
}
