import { describe, expect, test } from 'vitest';
import { emptySession, FIRST_TRACE } from '../../src/session/session.ts';
import type { Session } from '../../src/session/session.ts';
import { createTraceDesk } from '../../src/store/traceDesk.ts';
import type { Taken } from '../../src/workers/messages.ts';

/** SHA-256 of "abc", FIPS 180-4, appendix (from memory). */
const SUM_OF_ABC = 'ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad';
const naming = (sha256: string): Session => ({ ...emptySession(), traces: [{ ...FIRST_TRACE, id: 't1', name: 'sensor.csv', sha256, bytes: 3 }] });

function bench(kept: Readonly<Record<string, Blob>> = {}, read: () => Promise<Taken> = () => Promise.resolve({ rows: 3, problems: [] })) {
  const shelf = new Map(Object.entries(kept));
  const asked: string[] = [];
  const here: number[] = [];
  const desk = createTraceDesk({
    line: {
      takeTrace: ({ sha256 }, onRead) => {
        asked.push(sha256);
        onRead(2);
        return read();
      },
      sumOf: () => Promise.resolve('piecewise'),
    },
    shelf: {
      bytesOf: (sha256) => Promise.resolve(shelf.get(sha256) ?? null),
      put: (sha256, bytes) => {
        shelf.set(sha256, bytes);
        return Promise.resolve(true);
      },
      keepOnly: () => Promise.resolve(),
    },
    onHere: () => here.push(1),
  });
  return { desk, shelf, asked, here };
}

describe('the desk of traces', () => {
  test('a file is summed, read, kept, and told to be here', async () => {
    const { desk, shelf, here } = bench();
    const taken = await desk.takeFile(new Blob(['abc']), 'sensor.csv');
    expect(taken).toMatchObject({ sha256: SUM_OF_ABC, bytes: 3, kept: true });
    expect(shelf.has(SUM_OF_ABC)).toBe(true);
    expect(desk.state.getState()[SUM_OF_ABC]).toEqual({ status: 'here', problems: [] });
    expect(here).toHaveLength(1);
  });

  test('the same bytes are read once', async () => {
    const { desk, asked } = bench();
    await desk.takeFile(new Blob(['abc']), 'a.csv');
    await desk.takeFile(new Blob(['abc']), 'b.csv');
    await desk.bringIn(naming(SUM_OF_ABC));
    expect(asked).toEqual([SUM_OF_ABC]);
  });

  test('a session brings in what this device kept, and says what it did not', async () => {
    const { desk, asked } = bench({ ab: new Blob(['1;2']) });
    await desk.bringIn(naming('ab'));
    await desk.bringIn(naming('cd'));
    expect(asked).toEqual(['ab']);
    expect(desk.state.getState()['cd']).toEqual({ status: 'missing' });
    expect(desk.bytesOf('ab')).not.toBeNull();
  });

  test('a trace that cannot be read is told with its reason, and may come again', async () => {
    let fails = true;
    const { desk } = bench({}, () => (fails ? Promise.reject(new Error('no numbers')) : Promise.resolve({ rows: 3, problems: [] })));
    await expect(desk.takeFile(new Blob(['abc']), 'a.csv')).rejects.toThrow('no numbers');
    expect(desk.state.getState()[SUM_OF_ABC]).toEqual({ status: 'failed', why: 'no numbers' });
    fails = false;
    await desk.takeFile(new Blob(['abc']), 'a.csv');
    expect(desk.state.getState()[SUM_OF_ABC]).toMatchObject({ status: 'here' });
  });
});
