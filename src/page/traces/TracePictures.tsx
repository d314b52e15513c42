/** The pictures of one trace: the whole record, the swing after the chosen shot, and what the fit leaves, by frequency. */
import { useMemo, useState } from 'react';
import type { TracePicture } from '../../numeric/minMaxPyramid.ts';
import { oneSwing } from '../../plots/oneSwing.ts';
import { recordFigure } from '../../plots/traceRecord.ts';
import { traceSpectrum } from '../../plots/traceSpectrum.ts';
import { eventNames } from '../../plots/traceWords.ts';
import type { TraceTold } from '../../reduction/traceResults.ts';
import { addTraceLine, setTrace, type Edit } from '../../session/edits.ts';
import type { Trace } from '../../session/session.ts';
import { useActions, useStore } from '../../store/hooks.tsx';
import { FigureView } from '../plot/FigureView.tsx';
import { useInks } from '../plot/useInks.ts';
import { addedEvent, freeId, movedEvent, removedEvent, stretchText } from './eventEdits.ts';
import { TraceRecord } from './TraceRecord.tsx';
import styles from './traceRecord.module.css';

interface Props {
  readonly trace: Trace;
  readonly told: TraceTold;
  readonly picture: TracePicture;
  readonly change: (what: string, edit: Edit) => void;
}

export function TracePictures({ trace, told, picture, change }: Props) {
  const inks = useInks();
  const { select } = useActions();
  const record = useStore((state) => state.selected);
  // An event without a record of its own, while there is no calibration yet, is chosen here alone.
  const [alone, setAlone] = useState<string | null>(null);
  const chosen = told.events.find((event) => event.record !== null && event.record === record) ?? told.events.find(({ id }) => id === alone) ?? null;
  const shown = chosen ?? told.events.find(({ jump }) => jump !== null) ?? null;
  const names = useMemo(() => eventNames(told.events), [told]);
  const whole = useMemo(() => recordFigure(told, picture, inks, names), [told, picture, inks, names]);
  const swing = useMemo(() => (shown === null ? null : oneSwing(told, picture, shown, names.get(shown.id) ?? shown.id, inks)), [told, picture, shown, names, inks]);
  const spectrum = useMemo(() => traceSpectrum(told, inks), [told, inks]);
  const named = (what: string): string => `${trace.name}: ${what}`;

  function choose(id: string | null): void {
    setAlone(id);
    select(told.events.find((event) => event.id === id)?.record ?? null);
  }

  return (
    <div className={styles.pictures}>
      <TraceRecord
        figure={whole}
        inks={inks}
        selected={chosen?.id ?? null}
        onSelect={choose}
        onMove={(id, time) => change(named(`move ${names.get(id) ?? 'a shot'}`), setTrace(trace.id, movedEvent(trace, told, id, time)))}
        onAdd={(time, kind) => {
          const id = freeId([...trace.events, ...told.events.map((event) => ({ id: event.id, text: '' }))]);
          change(named(`add a ${kind}`), setTrace(trace.id, addedEvent(trace, told, time, kind, id)));
          setAlone(id);
          select(null);
        }}
        onRemove={(id) => change(named(`take out ${names.get(id) ?? 'a shot'}`), setTrace(trace.id, removedEvent(trace, told, id)))}
        onBad={(from, to) => change(named('mark a stretch as bad'), addTraceLine(trace.id, 'bad', stretchText(from, to)))}
      />
      {swing !== null && (
        <div>
          <FigureView figure={swing.swing} inks={inks} />
          <FigureView figure={swing.residuals} inks={inks} />
        </div>
      )}
      {spectrum !== null && <FigureView figure={spectrum} inks={inks} />}
    </div>
  );
}
