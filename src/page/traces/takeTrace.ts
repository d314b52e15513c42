/** A sampled record comes in: told from a table of readings, read by the worker, and named in the session. */
import { LARGEST_HAND_TABLE, textOfBytes } from '../../platform/readFile.ts';
import { sentence } from '../../problems/sentences.ts';
import { looksSampled } from '../../readings/looksSampled.ts';
import { addTrace } from '../../session/edits.ts';
import type { Actions, State } from '../../store/store.ts';
import type { TraceDesk } from '../../store/traceDesk.ts';
import type { Notice } from '../readings/notices.ts';

/** Enough to see what a file holds. */
const HEAD_BYTES = 65_536;

/** A packed file, one too large for a table taken by hand, or one whose rows go evenly in time. */
export async function isTraceFile(file: File): Promise<boolean> {
  if (/\.gz$/i.test(file.name) || file.size > LARGEST_HAND_TABLE) return true;
  const head = new Uint8Array(await file.slice(0, HEAD_BYTES).arrayBuffer());
  return looksSampled(textOfBytes(head).text, file.size);
}

/** Takes one file in as a trace; what there is to say about it. */
export async function takeTrace(file: File, desk: TraceDesk, change: Actions['change'], now: () => Pick<State, 'session'>): Promise<Omit<Notice, 'id'>> {
  try {
    const { sha256, bytes, kept, problems } = await desk.takeFile(file, file.name);
    const told = problems.map(sentence);
    const stops = problems.some(({ weight }) => weight === 'stops');
    if (stops) return { tone: 'refused', sentences: told };
    const known = now().session.traces.find((trace) => trace.sha256 === sha256);
    const notKept = kept ? [] : [`This device does not keep it: save the session before you close the page, which puts ${file.name} into the file.`];
    if (known) return { tone: 'told', sentences: [`${known.name} is here, byte for byte.`, ...told] };
    change(`take in ${file.name}`, addTrace({ name: file.name, sha256, bytes }));
    return { tone: told.length + notKept.length > 0 ? 'look' : 'told', sentences: [`${file.name}: taken in as a sampled trace. List its shots and taps, or let them be found, under Traces.`, ...told, ...notKept] };
  } catch (reason) {
    return { tone: 'refused', sentences: [`${file.name}: ${reason instanceof Error ? reason.message : String(reason)}`] };
  }
}
