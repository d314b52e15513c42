import { describe, expect, test } from 'vitest';
import { emptySession } from '../../src/session/session.ts';
import { createAskWorker, Overtaken } from '../../src/workers/askWorker.ts';
import type { WorkerLike } from '../../src/workers/askWorker.ts';
import type { Asked } from '../../src/workers/messages.ts';
import { bareReduction } from '../store/bare-reduction.ts';

class HeldWorker implements WorkerLike {
  readonly asked: Asked[] = [];
  ended = false;
  onmessage: WorkerLike['onmessage'] = null;
  onerror: WorkerLike['onerror'] = null;
  onmessageerror: WorkerLike['onmessageerror'] = null;
  postMessage(message: Asked): void {
    this.asked.push(message);
  }
  terminate(): void {
    this.ended = true;
  }
  answer(data: { readonly id: number; readonly reduction: ReturnType<typeof bareReduction> } | { readonly id: number; readonly failure: string }): void {
    this.onmessage?.(new MessageEvent('message', { data }));
  }
}

function bench() {
  const workers: HeldWorker[] = [];
  const ask = createAskWorker(() => {
    const worker = new HeldWorker();
    workers.push(worker);
    return worker;
  });
  const worker = (index = 0): HeldWorker => {
    const found = workers[index];
    if (found === undefined) throw new Error(`No worker ${index} was made`);
    return found;
  };
  return { ask, worker, workers };
}

const idOf = (worker: HeldWorker, index: number): number => worker.asked[index]?.id ?? -1;

describe('asking the worker', () => {
  test('each question gets the answer of its own number', async () => {
    const { ask, worker } = bench();
    const answer = bareReduction();
    const asked = ask(emptySession(), 's1/2');
    expect(worker().asked).toMatchObject([{ explain: 's1/2' }]);
    worker().answer({ id: 999, reduction: bareReduction({ chosen: 'taps' }) });
    worker().answer({ id: idOf(worker(), 0), reduction: answer });
    expect(await asked).toBe(answer);
  });

  test('of the questions that come while one is open, only the latest goes to the worker', async () => {
    const { ask, worker } = bench();
    const first = ask(emptySession(), null);
    const second = ask(emptySession(), 'b');
    const third = ask(emptySession(), 'c');
    await expect(second).rejects.toBeInstanceOf(Overtaken);
    worker().answer({ id: idOf(worker(), 0), reduction: bareReduction() });
    expect(worker().asked.map((message) => message.explain)).toEqual([null, 'c']);
    worker().answer({ id: idOf(worker(), 1), reduction: bareReduction() });
    expect(await first).toEqual(bareReduction());
    expect(await third).toEqual(bareReduction());
  });

  test('a failure in the reduction is told and the worker lives on', async () => {
    const { ask, worker, workers } = bench();
    const asked = ask(emptySession(), null);
    worker().answer({ id: idOf(worker(), 0), failure: 'RangeError: reducing' });
    await expect(asked).rejects.toThrow('RangeError: reducing');
    void ask(emptySession(), null);
    expect(workers).toHaveLength(1);
  });

  test('a worker that dies fails its question and is replaced, and the waiting question goes to the new one', async () => {
    const { ask, worker, workers } = bench();
    const first = ask(emptySession(), 'a');
    const second = ask(emptySession(), 'b');
    worker().onerror?.(new ErrorEvent('error', { message: 'out of memory' }));
    await expect(first).rejects.toThrow('out of memory');
    expect(worker().ended).toBe(true);
    expect(workers).toHaveLength(2);
    worker(1).answer({ id: idOf(worker(1), 0), reduction: bareReduction() });
    expect(await second).toEqual(bareReduction());
  });
});
