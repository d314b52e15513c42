/** The result line, always in sight: the run mean with U, its coverage, the scatter, and how much there is to look at. */
import { useLayoutEffect, useRef } from 'react';
import { impulseUnit } from '../../plots/impulseUnit.ts';
import type { Reduction } from '../../reduction/results.ts';
import { WAY_WORDS } from '../../reduction/wayWords.ts';
import { useStore } from '../../store/hooks.tsx';
import { plain } from '../../units/format.ts';
import { coverageFactor } from '../stated/numberWords.ts';
import { Quantity } from '../stated/Quantity.tsx';
import { goToElement } from './goTo.ts';
import styles from './head.module.css';
import { problemsDue } from './problemsDue.ts';

export function ResultLine() {
  const reduction = useStore((state) => state.reduction);
  const busy = useStore((state) => state.busy);
  const line = useRef<HTMLDivElement>(null);
  useLayoutEffect(() => {
    const measured = line.current;
    if (measured === null) return undefined;
    // The strip sticks beneath this line, however many rows of words a narrow window makes of it.
    const tell = () => document.documentElement.style.setProperty('--result-line-height', `${measured.offsetHeight}px`);
    const observer = new ResizeObserver(tell);
    observer.observe(measured);
    return () => observer.disconnect();
  }, []);
  return (
    <div ref={line} className={styles.result} aria-busy={busy}>
      <p className={styles.answer} role="status">
        <span className={styles.answerName}>Mean impulse bit</span> <Mean reduction={reduction} />
      </p>
      <LookCount />
    </div>
  );
}

function Mean({ reduction }: { readonly reduction: Reduction | null }) {
  if (reduction === null) return <span className="quiet">…</span>;
  const { run, chosen } = reduction;
  if (run === null) return <span className={styles.none}>— <span className="quiet">{whyNone(reduction)}</span></span>;
  const unit = impulseUnit(reduction);
  return (
    <>
      <strong className={styles.figure}><Quantity value={run.mean.value} spread={run.mean.U} unit={unit} /></strong>{' '}
      <span className={styles.evidence}>
        <span className="num">± is U, 95 %, k = {coverageFactor(run.mean.k)}</span>
        <span className="num">n = {run.n} of {run.of}</span>
        {run.scatter !== null && <span className="num">scatter s = {plain(run.scatter, unit, 2)}</span>}
        <span>calibrated by {WAY_WORDS[chosen]}</span>
      </span>
    </>
  );
}

function whyNone({ records, problems }: Reduction): string {
  if (records.length === 0) return 'no readings yet';
  if (problems.some((problem) => problem.code === 'entry-missing')) return 'the bench wants more quantities';
  return 'no shot gives one yet';
}

function LookCount() {
  const count = useStore(problemsDue).length;
  if (count === 0) return null;
  return (
    <button type="button" className={`plain-button ${styles.lookCount}`} onClick={() => goToElement('look')}>
      {count} {count === 1 ? 'thing' : 'things'} to look at
    </button>
  );
}
