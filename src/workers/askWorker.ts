/** Asks a worker for reductions: a promise by id, one at a time, the latest waiting session next; a worker that dies is replaced. */
import type { Reduction } from '../reduction/results.ts';
import type { Session } from '../session/session.ts';
import type { Answer, Asked } from './messages.ts';

/** The part of a Worker that is used here. */
export interface WorkerLike {
  postMessage(message: Asked): void;
  terminate(): void;
  onmessage: ((message: MessageEvent<Answer>) => void) | null;
  onerror: ((event: ErrorEvent) => void) | null;
  onmessageerror: ((event: MessageEvent) => void) | null;
}

interface Waiting {
  readonly asked: Asked;
  readonly resolve: (reduction: Reduction) => void;
  readonly reject: (reason: Error) => void;
}

/** Rejects a question that a later one overtook before the worker got to it. */
export class Overtaken extends Error {
  override readonly name = 'Overtaken';
}

export function createAskWorker(makeWorker: () => WorkerLike): (session: Session, explain: string | null) => Promise<Reduction> {
  let worker: WorkerLike | null = null;
  let asking: Waiting | null = null;
  let next: Waiting | null = null;
  let lastId = 0;

  function begin(waiting: Waiting): void {
    asking = waiting;
    try {
      worker ??= open();
      worker.postMessage(waiting.asked);
    } catch (reason) {
      fall(reason instanceof Error ? reason.message : String(reason));
    }
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
    goOn();
    failed?.reject(new Error(`Reducing in the worker: ${why}`));
  }

  function open(): WorkerLike {
    const opened = makeWorker();
    opened.onmessage = ({ data }) => {
      if (asking === null || data.id !== asking.asked.id) return;
      const answered = asking;
      goOn();
      if ('failure' in data) answered.reject(new Error(data.failure));
      else answered.resolve(data.reduction);
    };
    opened.onerror = (event) => fall(event.message === undefined || event.message === '' ? 'it stopped' : event.message);
    opened.onmessageerror = () => fall('its answer could not be read');
    return opened;
  }

  return (session, explain) =>
    new Promise((resolve, reject) => {
      lastId += 1;
      const waiting: Waiting = { asked: { id: lastId, session, explain }, resolve, reject };
      if (asking === null) {
        begin(waiting);
        return;
      }
      next?.reject(new Overtaken('Reducing: a later session came first'));
      next = waiting;
    });
}

/** The page's own worker. */
export const openReduceWorker = (): WorkerLike =>
  new Worker(new URL('./reduce.worker.ts', import.meta.url), { type: 'module', name: 'reduce' });
