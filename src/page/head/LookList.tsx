/** Things to look at: every problem as a sentence, with what it would change and the way to the place that settles it. */
import { useMemo, useState } from 'react';
import type { Problem, Weight } from '../../problems/problems.ts';
import { sentence } from '../../problems/sentences.ts';
import { useActions, useStore } from '../../store/hooks.tsx';
import { goToProblem, placeWords } from './goTo.ts';
import { problemsDue } from './problemsDue.ts';
import styles from './head.module.css';

const WEIGHTS: readonly Weight[] = ['stops', 'doubt', 'note'];
const WEIGHT_WORDS: Readonly<Record<Weight, string>> = {
  stops: 'in the way of a number', doubt: 'may make a number wrong', note: 'assumed or left out',
};
/** Of each weight; a table with one unit misread has as many problems as rows. */
const SHOWN_FIRST = 12;

/** Heaviest first: by what it would change in the run mean, then as it came. */
const byEffect = (a: Problem, b: Problem): number => Math.abs(b.effect ?? 0) - Math.abs(a.effect ?? 0);

const keyOf = ({ code, place }: Problem, index: number): string =>
  [code, place.sheet, place.line, place.column, place.record, place.entry, index].join('|');

export function LookList() {
  const problems = useStore(problemsDue);
  const groups = useMemo(
    () => WEIGHTS.map((weight) => ({ weight, found: problems.filter((problem) => problem.weight === weight).toSorted(byEffect) })),
    [problems],
  );
  const count = problems.length;
  return (
    <section id="look" aria-labelledby="look-heading">
      <h2 id="look-heading" tabIndex={-1}>Things to look at</h2>
      {count === 0 && <p className="quiet">Nothing now.</p>}
      {groups.map(({ weight, found }) => found.length > 0 && <Group key={weight} weight={weight} problems={found} />)}
    </section>
  );
}

function Group({ weight, problems }: { readonly weight: Weight; readonly problems: readonly Problem[] }) {
  const { select } = useActions();
  const [all, setAll] = useState(false);
  const shown = all ? problems : problems.slice(0, SHOWN_FIRST);
  return (
    <div className={styles.lookGroup}>
      <h3>{WEIGHT_WORDS[weight]}</h3>
      <ul>
        {shown.map((problem, index) => (
          <li key={keyOf(problem, index)} className={styles[weight]}>
            <span>{sentence(problem)}</span>{' '}
            {problem.effect !== undefined && <span className="num unit">{problem.effect.toFixed(1)} u of the run mean</span>}{' '}
            <button type="button" className="plain-button" onClick={() => goToProblem(problem, select)}>{placeWords(problem)}</button>
          </li>
        ))}
      </ul>
      {shown.length < problems.length && (
        <button type="button" className="plain-button" onClick={() => setAll(true)}>all {problems.length}</button>
      )}
    </div>
  );
}
