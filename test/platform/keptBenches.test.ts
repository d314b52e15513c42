import { describe, expect, test } from 'vitest';
import { keepBench, listBenches, newBenchId, takeOutBench, type BenchShelf, type KeptBench } from '../../src/platform/keptBenches.ts';

function memoryShelf(first: readonly (readonly [string, unknown])[] = []): BenchShelf & { readonly kept: Map<string, unknown> } {
  const kept = new Map<string, unknown>(first);
  return { kept, entries: async () => [...kept], set: async (key, text) => void kept.set(key, text), remove: async (key) => void kept.delete(key) };
}
const brokenShelf: BenchShelf = { entries: () => Promise.reject(new Error('no storage')), set: () => Promise.reject(new Error('full')), remove: () => Promise.reject(new Error('no storage')) };
const bench = (id: string, name: string): KeptBench => ({ id, name, keptAt: 5, text: `{"${id}":1}` });

describe('benches kept on this device', () => {
  test('come back as they were kept, by name, and the session kept beside them is none of them', async () => {
    const shelf = memoryShelf([['session', '{}'], ['session/unreadable/4', 'x']]);
    expect(await keepBench(bench('b', 'tank'), shelf)).toBe(true);
    expect(await keepBench(bench('a', 'air'), shelf)).toBe(true);
    expect(await listBenches(shelf)).toEqual([bench('a', 'air'), bench('b', 'tank')]);
    expect(shelf.kept.get('session')).toBe('{}');
  });

  test('are renamed and taken out one by one', async () => {
    const shelf = memoryShelf();
    await keepBench(bench('a', 'air'), shelf);
    await keepBench(bench('b', 'tank'), shelf);
    await keepBench(bench('a', 'in air'), shelf);
    expect(await takeOutBench('b', shelf)).toBe(true);
    expect((await listBenches(shelf))?.map(({ name }) => name)).toEqual(['in air']);
  });

  test('one that cannot be read is listed with its text whole, and stays where it is', async () => {
    const shelf = memoryShelf([['bench/x', 'spoiled'], ['bench/y', { an: 'object' }]]);
    expect(await listBenches(shelf)).toEqual([{ id: 'x', name: 'bench/x', keptAt: 0, text: 'spoiled' }, { id: 'y', name: 'bench/y', keptAt: 0, text: '{"an":"object"}' }]);
    expect(shelf.kept.get('bench/x')).toBe('spoiled');
  });

  test('a device that keeps nothing says so each time', async () => {
    expect(await listBenches(brokenShelf)).toBeNull();
    expect(await keepBench(bench('a', 'air'), brokenShelf)).toBe(false);
    expect(await takeOutBench('a', brokenShelf)).toBe(false);
  });

  test('two kept in one moment have places of their own', () => {
    expect(newBenchId(7)).not.toBe(newBenchId(7));
  });
});
