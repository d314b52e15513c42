/** The run in the order it happened, always in sight. */
import { useMemo } from 'react';
import type { Reduction } from '../../reduction/results.ts';
import { runStrip } from '../../plots/runStrip.ts';
import { useActions, useStore } from '../../store/hooks.tsx';
import { goToElement } from '../head/goTo.ts';
import { FigureView } from '../plot/FigureView.tsx';
import { useInks } from '../plot/useInks.ts';
import styles from './strip.module.css';

export function RunStrip() {
  const records = useStore((state) => state.reduction?.records);
  const run = useStore((state) => state.reduction?.run ?? null);
  if (records === undefined || records.length === 0) return null;
  return <Strip records={records} run={run} />;
}

function Strip({ records, run }: Pick<Reduction, 'records' | 'run'>) {
  const selected = useStore((state) => state.selected);
  const { select } = useActions();
  const inks = useInks();
  const figure = useMemo(() => runStrip({ records, run }, inks), [records, run, inks]);
  return (
    <div className={styles.strip}>
      <FigureView figure={figure} inks={inks} selected={selected} onSelect={select} onOpen={() => goToElement('record')} slim />
    </div>
  );
}
