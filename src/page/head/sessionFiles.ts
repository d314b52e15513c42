/** Session files: told from tables of readings, opened as one undoable step, and saved. */
import { packed, unpacked } from '../../platform/packed.ts';
import { fileName, saveTextAsFile } from '../../platform/download.ts';
import { sentence } from '../../problems/sentences.ts';
import { benchOf, isBlankBench, putBench } from '../../session/bench.ts';
import { sessionFromText, sessionToText, traceBytesIn } from '../../session/file.ts';
import type { Session } from '../../session/session.ts';
import type { Actions, State } from '../../store/store.ts';
import type { TraceDesk } from '../../store/traceDesk.ts';

/** Enough of a file to see whether it begins as JSON. */
const FIRST_BYTES = 64;

export async function looksLikeSession(file: File): Promise<boolean> {
  if (/\.json$/i.test(file.name)) return true;
  const beginning = await file.slice(0, FIRST_BYTES).text();
  return beginning.replace(/^\uFEFF/, '').trimStart().startsWith('{');
}

export interface Message {
  readonly id: number;
  readonly sentences: readonly string[];
  /** A text that the person may want to have as a file, and its name. */
  readonly offer?: { readonly words: string; readonly name: string; readonly text: string };
  /** A file just opened whole, and the session before it: only its bench may be wanted. */
  readonly opened?: { readonly name: string; readonly session: Session; readonly before: Session };
}

/** Sentences shown of one file; a badly damaged file would fill the page. */
const SENTENCES_SHOWN = 6;

export function shortened(sentences: readonly string[]): readonly string[] {
  const more = sentences.length - SENTENCES_SHOWN;
  return more <= 0 ? sentences : [...sentences.slice(0, SENTENCES_SHOWN), `… and ${more} more of the kind.`];
}

type Desk = Pick<TraceDesk, 'putBytes' | 'bytesOf'> | null;

/** Puts the traces that a file brings along where the session will look for them; returns what is wrong with them. */
async function takeTraces(name: string, text: string, session: Session, desk: Desk): Promise<readonly string[]> {
  const bytes = traceBytesIn(text);
  const wrong: string[] = [];
  for (const trace of session.traces) {
    const packedBytes = bytes[trace.sha256];
    if (desk === null || packedBytes === undefined) continue;
    const whole = await unpacked(packedBytes);
    if (whole === null || !(await desk.putBytes(trace.sha256, whole))) wrong.push(`${name}: the bytes of ${trace.name} in it are damaged. Its readings are missing until ${trace.name} itself is chosen again.`);
  }
  return wrong;
}

/** Opens a session file in place of the present session; returns what there is to say about it, and the offer to take its bench alone. */
export async function openSessionFile(file: File, change: Actions['change'], now: () => Pick<State, 'session'>, desk: Desk = null): Promise<Omit<Message, 'id'>> {
  const text = await file.text();
  const { session, problems } = sessionFromText(text);
  const wrong = session === null ? [] : await takeTraces(file.name, text, session, desk);
  const before = now().session;
  if (session !== null) change(`open ${file.name}`, () => session);
  const sentences = shortened([...wrong, ...problems.map((found) => `${file.name}: ${sentence(found)}`)]);
  if (session === null || isBlankBench(session)) return { sentences };
  return { sentences: [`${file.name} is open, with its bench and its readings.`, ...sentences], opened: { name: file.name, session, before } };
}

/** Everything as it was before the file was opened, but for the bench. */
export const takeBenchOnly = ({ name, session, before }: NonNullable<Message['opened']>, change: Actions['change']): void =>
  change(`take only the bench of ${name}`, () => putBench(benchOf(session))(before));

/** The session with the bytes of its traces, so that the file is whole. */
export async function saveSessionFile(session: Session, desk: Desk = null): Promise<void> {
  const bytes: Record<string, string> = {};
  for (const { sha256 } of session.traces) {
    const here = desk?.bytesOf(sha256);
    if (here && bytes[sha256] === undefined) bytes[sha256] = await packed(here);
  }
  saveTextAsFile(fileName(session.title.name, 'session', 'firstswing.json'), sessionToText(session, bytes), 'application/json');
}
