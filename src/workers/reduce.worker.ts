/** The worker: it reads traces and keeps their numbers, reduces sessions with them, and thins them for pictures. */
import type { SampledRecord } from '../readings/sampled/sampledRecord.ts';
import { reduce } from '../reduction/reduce.ts';
import { pictureOfTrace } from '../reduction/tracePicture.ts';
import type { Answer, Asked, AskedTaking } from './messages.ts';
import { readTraceBlob, sumOfBlob } from './traceFile.ts';

const taken = new Map<string, SampledRecord>();
const stopped = new Set<number>();

const failureOf = (reason: unknown): string => (reason instanceof Error ? `${reason.name}: ${reason.message}` : String(reason));
const say = (answer: Answer, transfer: Transferable[] = []): void => self.postMessage(answer, { transfer });

async function take({ id, sha256, name, bytes }: AskedTaking): Promise<void> {
  try {
    const record = taken.get(sha256) ?? (await readTraceBlob(bytes, name, (progress) => say({ id, progress }), () => stopped.has(id)));
    taken.set(sha256, record);
    say({ id, taken: { rows: record.rows, problems: record.problems } });
  } catch (reason) {
    say({ id, failure: failureOf(reason) });
  } finally {
    stopped.delete(id);
  }
}

async function sum(id: number, bytes: Blob): Promise<void> {
  try {
    say({ id, sum: await sumOfBlob(bytes) });
  } catch (reason) {
    say({ id, failure: failureOf(reason) });
  }
}

function answer(asked: Asked): void {
  switch (asked.kind) {
    case 'take':
      void take(asked);
      return;
    case 'sum':
      void sum(asked.id, asked.bytes);
      return;
    case 'stop':
      stopped.add(asked.id);
      return;
    case 'reduce':
      try {
        say({ id: asked.id, reduction: reduce(asked.session, asked.explain, taken) });
      } catch (reason) {
        say({ id: asked.id, failure: failureOf(reason) });
      }
      return;
    case 'picture':
      try {
        const made = pictureOfTrace(asked.session, asked.trace, taken);
        say({ id: asked.id, picture: made?.picture ?? null }, made?.transfer ?? []);
      } catch (reason) {
        say({ id: asked.id, failure: failureOf(reason) });
      }
  }
}

self.addEventListener('message', (message: MessageEvent<Asked>) => answer(message.data));
