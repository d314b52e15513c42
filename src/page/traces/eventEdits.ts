/** What a person does to the shots of a trace on its picture: an event moved, added, taken out, a stretch marked as bad. */
import { lineAtTime } from '../../readings/traceEvents.ts';
import type { TraceEventTold, TraceTold } from '../../reduction/traceResults.ts';
import type { Trace, TraceLine } from '../../session/session.ts';

type Change = Pick<Trace, 'events'> & Partial<Trace>;

/** Times with so many decimals are to the microsecond, finer than any clock of a record. */
const digits = (time: number): string => String(Number(time.toFixed(6)));

/** The list's own clock: times on the record's clock less the offset. */
const onList = (told: TraceTold, time: number): number => time - (told.offset?.value ?? 0);

/** Lines for every event as it stands, from a trigger or found: the first edit by hand makes a list of them. */
function listed(trace: Trace, told: TraceTold): Change {
  if (trace.eventsFrom === 'list') return { events: trace.events };
  return { eventsFrom: 'list', offset: '', events: told.events.map((event): TraceLine => ({ id: event.id, text: `${digits(event.time)} s${event.kind === 'shot' ? '' : ` ${event.kind}`}` })) };
}

const clockOf = (trace: Trace, told: TraceTold): TraceTold => (trace.eventsFrom === 'list' ? told : { ...told, offset: null });

export function movedEvent(trace: Trace, told: TraceTold, id: string, time: number): Change {
  const made = listed(trace, told);
  return { ...made, events: made.events.map((line) => (line.id === id ? { ...line, text: lineAtTime(line.text, digits(onList(clockOf(trace, told), time))) } : line)) };
}

export function addedEvent(trace: Trace, told: TraceTold, time: number, kind: TraceEventTold['kind'], id: string): Change {
  const made = listed(trace, told);
  return { ...made, events: [...made.events, { id, text: `${digits(onList(clockOf(trace, told), time))} s${kind === 'shot' ? '' : ` ${kind}`}` }] };
}

export function removedEvent(trace: Trace, told: TraceTold, id: string): Change {
  const made = listed(trace, told);
  return { ...made, events: made.events.filter((line) => line.id !== id) };
}

/** An id that no line of the trace has. */
export function freeId(lines: readonly TraceLine[]): string {
  const taken = new Set(lines.map(({ id }) => id));
  let number = lines.length + 1;
  while (taken.has(`e${number}`)) number += 1;
  return `e${number}`;
}

export const stretchText = (from: number, to: number): string => `${digits(from)} ${digits(to)} s`;
