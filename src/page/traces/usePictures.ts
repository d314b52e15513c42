/** The samples of the traces for their pictures: asked of the worker again when a trace is read otherwise. */
import { useEffect, useMemo, useRef, useState } from 'react';
import type { TracePicture } from '../../numeric/minMaxPyramid.ts';
import type { Trace } from '../../session/session.ts';
import { useStateNow, useStore, useTraces } from '../../store/hooks.tsx';
import type { TraceState } from '../../store/traceDesk.ts';

/** What of a trace and of the bench the samples themselves rest on. */
const keyOf = ({ sha256, uses, timeUnit, readingUnit, rate }: Trace, bench: string): string => JSON.stringify([sha256, uses, timeUnit, readingUnit, rate, bench]);

interface Held {
  readonly key: string;
  readonly picture: TracePicture | null;
}

/** By the id of the trace; none until it is there, or where there is nothing to draw. */
export function usePictures(traces: readonly Trace[], states: Readonly<Record<string, TraceState>>): ReadonlyMap<string, TracePicture> {
  const pictureOf = useTraces()?.pictureOf ?? null;
  const now = useStateNow();
  const bench = useStore(({ session: { entries, choices: { readingWay } } }) => (readingWay === 'cameraPivotMarker' ? `${readingWay} ${entries.pivotAcross?.text ?? ''};${entries.pivotDown?.text ?? ''}` : readingWay));
  const [held, setHeld] = useState<ReadonlyMap<string, Held>>(new Map());
  const asked = useRef(new Map<string, string>());
  useEffect(() => {
    if (pictureOf === null) return;
    for (const trace of traces) {
      const key = keyOf(trace, bench);
      if (states[trace.sha256]?.status !== 'here' || asked.current.get(trace.id) === key) continue;
      asked.current.set(trace.id, key);
      void pictureOf(now().session, trace.id).then((picture) => setHeld((before) => new Map(before).set(trace.id, { key, picture })), () => asked.current.delete(trace.id));
    }
  }, [pictureOf, now, traces, states, bench]);
  return useMemo(() => new Map(traces.flatMap((trace) => {
    const one = held.get(trace.id);
    return one?.picture && one.key === keyOf(trace, bench) ? [[trace.id, one.picture] as const] : [];
  })), [traces, held, bench]);
}
