/** The sampled traces: each with how it is read, its shots and taps, and its swing. */
import { useDeferredValue, useMemo } from 'react';
import type { Problem } from '../../problems/problems.ts';
import { usesOfWay } from '../../reduction/traceRead.ts';
import type { TraceTold } from '../../reduction/traceResults.ts';
import { useActions, useStateNow, useStore, useTraces, useTraceStates } from '../../store/hooks.tsx';
import { swingsOverlaid } from '../../plots/swingsOverlaid.ts';
import { FigureView } from '../plot/FigureView.tsx';
import { useInks } from '../plot/useInks.ts';
import { useNotices } from '../readings/notices.ts';
import { takeTrace } from './takeTrace.ts';
import { TraceCard } from './TraceCard.tsx';
import { usePictures } from './usePictures.ts';
import styles from './traceCard.module.css';

const NO_TOLD: readonly TraceTold[] = [];
const NO_PROBLEMS: readonly Problem[] = [];

export function TracesSection() {
  const { change } = useActions();
  const now = useStateNow();
  const notices = useNotices();
  const traces = useStore((state) => state.session.traces);
  const way = useStore((state) => state.session.choices.readingWay);
  // Typing goes first: the tables and pictures follow in renders that it interrupts.
  const told = useDeferredValue(useStore((state) => state.reduction?.traces ?? NO_TOLD));
  const problems = useStore((state) => state.reduction?.problems ?? NO_PROBLEMS);
  const looked = useTraces();
  const states = useTraceStates();
  const uses = useMemo(() => usesOfWay(way), [way]);
  const pictures = usePictures(traces, states);
  const inks = useInks();
  const overlaid = useMemo(() => swingsOverlaid(told.flatMap((one) => {
    const picture = pictures.get(one.id);
    return picture === undefined ? [] : [{ told: one, picture }];
  }), inks), [told, pictures, inks]);
  return (
    <section id="traces" className={styles.section} aria-labelledby="traces-heading">
      <h2 id="traces-heading">Traces</h2>
      {traces.map((trace) => (
        <TraceCard
          key={trace.id}
          trace={trace}
          told={told.find(({ id }) => id === trace.id)}
          state={states[trace.sha256]}
          picture={pictures.get(trace.id) ?? null}
          uses={uses}
          problems={problems.filter(({ place }) => place.record === undefined && (place.entry === `trace.${trace.id}` || (place.sheetName === trace.name && place.sheet === undefined)))}
          change={change}
          onStop={() => looked?.desk.stop(trace.sha256)}
          onBytes={(file) => {
            if (looked) void takeTrace(file, looked.desk, change, now).then((notice) => notices.say(notice));
          }}
        />
      ))}
      {overlaid !== null && <FigureView figure={overlaid} inks={inks} />}
    </section>
  );
}
