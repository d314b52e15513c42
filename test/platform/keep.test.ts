import { afterEach, beforeEach, describe, expect, test, vi } from 'vitest';
import { createKeeper, flushOnLeaving, loadKept } from '../../src/platform/keep.ts';
import type { Shelf } from '../../src/platform/keep.ts';

function memoryShelf(first?: unknown): Shelf & { readonly kept: Map<string, unknown> } {
  const kept = new Map<string, unknown>(first === undefined ? [] : [['session', first]]);
  return { kept, get: async (key) => kept.get(key), set: async (key, text) => void kept.set(key, text) };
}
const brokenShelf: Shelf = { get: () => Promise.reject(new Error('no storage')), set: () => Promise.reject(new Error('full')) };

beforeEach(() => void vi.useFakeTimers());
afterEach(() => void vi.useRealTimers());

describe('bringing back', () => {
  const read = (text: string) => (text.startsWith('good') ? text : null);

  test('what was kept comes back; a device that kept nothing says so', async () => {
    expect(await loadKept(read, memoryShelf('good one'))).toEqual({ status: 'kept', value: 'good one' });
    expect(await loadKept(read, memoryShelf())).toEqual({ status: 'none' });
  });

  test('a text that cannot be read is put by before anything is written over it', async () => {
    const shelf = memoryShelf('spoiled');
    expect(await loadKept(read, shelf, () => 42)).toEqual({ status: 'unreadable', text: 'spoiled' });
    const keeper = createKeeper({ onKept: () => {}, onNotKept: () => {}, shelf });
    keeper.keep(() => 'good new');
    await keeper.flush();
    expect(Object.fromEntries(shelf.kept)).toEqual({ 'session': 'good new', 'session/unreadable/42': 'spoiled' });
  });

  test('something that is no text at all is put by as text', async () => {
    expect(await loadKept(read, memoryShelf({ a: 1 }))).toEqual({ status: 'unreadable', text: '{"a":1}' });
  });

  test('a device without storage does not stop the page', async () => {
    expect(await loadKept(read, brokenShelf)).toEqual({ status: 'noStorage' });
  });
});

describe('keeping', () => {
  test('many changes in a moment are written once, the last of them', async () => {
    const shelf = memoryShelf();
    const at: number[] = [];
    const keeper = createKeeper({ onKept: (time) => at.push(time), onNotKept: () => {}, shelf, now: () => 7 });
    const set = vi.spyOn(shelf, 'set');
    for (const text of ['a', 'b', 'c']) keeper.keep(() => text);
    expect(set).not.toHaveBeenCalled();
    await vi.runAllTimersAsync();
    expect(set.mock.calls).toEqual([['session', 'c']]);
    expect(at).toEqual([7]);
  });

  test('leaving the page, or hiding it, writes at once', async () => {
    const shelf = memoryShelf();
    const keeper = createKeeper({ onKept: () => {}, onNotKept: () => {}, shelf });
    const stop = flushOnLeaving(keeper);
    keeper.keep(() => 'on leaving');
    window.dispatchEvent(new Event('pagehide'));
    await keeper.flush();
    expect(shelf.kept.get('session')).toBe('on leaving');
    stop();
  });

  test('a device that does not take it is told, and a later write is tried again', async () => {
    let refusals = 0;
    const keeper = createKeeper({ onKept: () => {}, onNotKept: () => (refusals += 1), shelf: brokenShelf });
    keeper.keep(() => 'x');
    await keeper.flush();
    keeper.keep(() => 'y');
    await keeper.flush();
    expect(refusals).toBe(2);
  });
});
