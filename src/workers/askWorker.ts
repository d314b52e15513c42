/** The line to the worker: reductions one at a time, the latest waiting session next; traces taken in beside them; a worker that dies is replaced and told its traces again. */
import type { TracePicture } from '../numeric/minMaxPyramid.ts';
import type { Reduction } from '../reduction/results.ts';
import type { Session } from '../session/session.ts';
import type { Answer, Asked, AskedReduction, Taken } from './messages.ts';

/** The part of a Worker that is used here. */
export interface WorkerLike {
  postMessage(message: Asked): void;
  terminate(): void;
  onmessage: ((message: MessageEvent<Answer>) => void) | null;
  onerror: ((event: ErrorEvent) => void) | null;
  onmessageerror: ((event: MessageEvent) => void) | null;
}

/** The bytes of a trace, by their sum. */
export interface TraceBytes {
  readonly sha256: string;
  readonly name: string;
  readonly bytes: Blob;
}

export interface WorkerLine {
  readonly ask: (session: Session, explain: string | null) => Promise<Reduction>;
  /** Reads a trace in the worker; `onRead` is told of the bytes read. Rejects where it was stopped. */
  readonly takeTrace: (trace: TraceBytes, onRead: (bytes: number) => void, stop?: AbortSignal) => Promise<Taken>;
  /** The samples of one trace, thinned in blocks for its picture; null where there are none. */
  readonly pictureOf: (session: Session, trace: string) => Promise<TracePicture | null>;
  readonly sumOf: (bytes: Blob) => Promise<string>;
}

interface Waiting {
  readonly asked: AskedReduction;
  readonly resolve: (reduction: Reduction) => void;
  readonly reject: (reason: Error) => void;
}

interface Open {
  readonly answer: (answer: Answer) => void;
  readonly reject: (reason: Error) => void;
}

/** Rejects a question that a later one overtook before the worker got to it. */
export class Overtaken extends Error {
  override readonly name = 'Overtaken';
}

export function createWorkerLine(makeWorker: () => WorkerLike): WorkerLine {
  let worker: WorkerLike | null = null;
  let asking: Waiting | null = null;
  let next: Waiting | null = null;
  let lastId = 0;
  const open = new Map<number, Open>();
  const taken = new Map<string, TraceBytes>();

  function begin(waiting: Waiting): void {
    asking = waiting;
    try {
      post(waiting.asked);
    } catch (reason) {
      fall(reason instanceof Error ? reason.message : String(reason));
    }
  }

  function post(asked: Asked): void {
    worker ??= opened();
    worker.postMessage(asked);
  }

  function goOn(): void {
    asking = null;
    if (next === null) return;
    const waiting = next;
    next = null;
    begin(waiting);
  }

  function fall(why: string): void {
    worker?.terminate();
    worker = null;
    const failed = asking;
    const others = [...open.values()];
    open.clear();
    goOn();
    failed?.reject(new Error(`Reducing in the worker: ${why}`));
    for (const other of others) other.reject(new Error(`Reading in the worker: ${why}`));
  }

  function take(data: Answer): void {
    if (asking !== null && data.id === asking.asked.id) {
      const answered = asking;
      goOn();
      if ('reduction' in data) answered.resolve(data.reduction);
      else answered.reject(new Error('failure' in data ? data.failure : 'Reducing in the worker: another answer came'));
      return;
    }
    const one = open.get(data.id);
    if (one === undefined) return;
    if ('failure' in data) {
      open.delete(data.id);
      one.reject(new Error(data.failure));
      return;
    }
    if (!('progress' in data)) open.delete(data.id);
    one.answer(data);
  }

  function opened(): WorkerLike {
    const made = makeWorker();
    made.onmessage = ({ data }) => take(data);
    made.onerror = (event) => fall(event.message === undefined || event.message === '' ? 'it stopped' : event.message);
    made.onmessageerror = () => fall('its answer could not be read');
    // A new worker knows nothing: it reads again what the one before it had read.
    for (const trace of taken.values()) made.postMessage({ kind: 'take', id: ++lastId, ...trace });
    return made;
  }

  function put<Result>(make: (id: number) => Asked, of: (answer: Answer) => Result | undefined, stop?: AbortSignal): Promise<Result> {
    return new Promise((resolve, reject) => {
      lastId += 1;
      const id = lastId;
      open.set(id, {
        answer: (answer) => {
          const result = of(answer);
          if (result !== undefined) resolve(result);
        },
        reject,
      });
      stop?.addEventListener('abort', () => {
        if (open.has(id)) post({ kind: 'stop', id });
      });
      try {
        post(make(id));
      } catch (reason) {
        open.delete(id);
        reject(reason instanceof Error ? reason : new Error(String(reason)));
      }
    });
  }

  return {
    ask: (session, explain) =>
      new Promise((resolve, reject) => {
        lastId += 1;
        const waiting: Waiting = { asked: { kind: 'reduce', id: lastId, session, explain }, resolve, reject };
        if (asking === null) {
          begin(waiting);
          return;
        }
        next?.reject(new Overtaken('Reducing: a later session came first'));
        next = waiting;
      }),
    takeTrace: async (trace, onRead, stop) => {
      const found = await put<Taken>((id) => ({ kind: 'take', id, ...trace }), (answer) => {
        if ('progress' in answer) onRead(answer.progress);
        return 'taken' in answer ? answer.taken : undefined;
      }, stop);
      taken.set(trace.sha256, trace);
      return found;
    },
    pictureOf: (session, trace) => put<TracePicture | null>((id) => ({ kind: 'picture', id, session, trace }), (answer) => ('picture' in answer ? answer.picture : undefined)),
    sumOf: (bytes) => put<string>((id) => ({ kind: 'sum', id, bytes }), (answer) => ('sum' in answer ? answer.sum : undefined)),
  };
}

/** The page's own worker. */
export const openReduceWorker = (): WorkerLike =>
  new Worker(new URL('./reduce.worker.ts', import.meta.url), { type: 'module', name: 'reduce' });
