import { describe, expect, test } from 'vitest';
import { emptySession } from '../../src/session/session.ts';
import { createWorkerLine, Overtaken } from '../../src/workers/askWorker.ts';
import type { WorkerLike } from '../../src/workers/askWorker.ts';
import type { Answer, Asked } from '../../src/workers/messages.ts';
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
  answer(data: Answer): void {
    this.onmessage?.(new MessageEvent('message', { data }));
  }
}

function bench() {
  const workers: HeldWorker[] = [];
  const line = createWorkerLine(() => {
    const worker = new HeldWorker();
    workers.push(worker);
    return worker;
  });
  const worker = (index = 0): HeldWorker => {
    const found = workers[index];
    if (found === undefined) throw new Error(`No worker ${index} was made`);
    return found;
  };
  return { line, ask: line.ask, worker, workers };
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
    expect(worker().asked).toMatchObject([{ explain: null }, { explain: 'c' }]);
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

describe('traces in the worker', () => {
  const trace = { sha256: 'ab', name: 'sensor.csv', bytes: new Blob(['1;2']) };

  test('progress is told, and the answer ends it', async () => {
    const { line, worker } = bench();
    const read: number[] = [];
    const taken = line.takeTrace(trace, (bytes) => read.push(bytes));
    const id = idOf(worker(), 0);
    worker().answer({ id, progress: 1 });
    worker().answer({ id, progress: 3 });
    worker().answer({ id, taken: { rows: 1, problems: [] } });
    worker().answer({ id, progress: 9 });
    expect(await taken).toEqual({ rows: 1, problems: [] });
    expect(read).toEqual([1, 3]);
  });

  test('a reduction is answered while a trace is still being read', async () => {
    const { line, worker } = bench();
    const taken = line.takeTrace(trace, () => undefined);
    const asked = line.ask(emptySession(), null);
    worker().answer({ id: idOf(worker(), 1), reduction: bareReduction() });
    expect(await asked).toEqual(bareReduction());
    worker().answer({ id: idOf(worker(), 0), taken: { rows: 1, problems: [] } });
    expect((await taken).rows).toBe(1);
  });

  test('stopping is passed on, and the failure that comes back ends it', async () => {
    const { line, worker } = bench();
    const stop = new AbortController();
    const taken = line.takeTrace(trace, () => undefined, stop.signal);
    stop.abort();
    expect(worker().asked.at(-1)).toMatchObject({ kind: 'stop', id: idOf(worker(), 0) });
    worker().answer({ id: idOf(worker(), 0), failure: 'stopped' });
    await expect(taken).rejects.toThrow('stopped');
  });

  test('a worker that takes the place of a dead one is given the traces before anything else', async () => {
    const { line, worker } = bench();
    const taken = line.takeTrace(trace, () => undefined);
    worker().answer({ id: idOf(worker(), 0), taken: { rows: 1, problems: [] } });
    await taken;
    const waiting = line.sumOf(new Blob(['x']));
    const first = line.ask(emptySession(), null);
    const second = line.ask(emptySession(), 'b');
    worker().onerror?.(new ErrorEvent('error', { message: 'out of memory' }));
    await expect(first).rejects.toThrow('out of memory');
    await expect(waiting).rejects.toThrow('out of memory');
    expect(worker(1).asked).toMatchObject([{ kind: 'take', sha256: 'ab' }, { kind: 'reduce', explain: 'b' }]);
    worker(1).answer({ id: idOf(worker(1), 1), reduction: bareReduction() });
    await second;
  });

  test('a picture and a sum come back to who asked', async () => {
    const { line, worker } = bench();
    const picture = line.pictureOf(emptySession(), 't1');
    const sum = line.sumOf(new Blob(['x']));
    worker().answer({ id: idOf(worker(), 1), sum: 'cd' });
    worker().answer({ id: idOf(worker(), 0), picture: null });
    expect([await picture, await sum]).toEqual([null, 'cd']);
  });
});
