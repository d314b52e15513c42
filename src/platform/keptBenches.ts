/** Benches kept on this device under a name (IndexedDB), each in a place of its own, so that two pages do not write over each other's. */
import { del, entries, promisifyRequest } from 'idb-keyval';
import { database } from './keep.ts';

export interface KeptBench {
  readonly id: string;
  readonly name: string;
  /** ms since epoch. */
  readonly keptAt: number;
  /** As it was kept, to be read by whoever uses it. */
  readonly text: string;
}

/** A rejected promise means that the device does not keep anything (private window, disk full). */
export interface BenchShelf {
  entries(): Promise<readonly (readonly [key: unknown, found: unknown])[]>;
  set(key: string, text: string): Promise<void>;
  remove(key: string): Promise<void>;
}

export const deviceBenches: BenchShelf = {
  entries: () => entries<IDBValidKey, unknown>(database()),
  set: (key, text) =>
    database()('readwrite', (store) => {
      store.put(text, key);
      return promisifyRequest(store.transaction);
    }),
  remove: (key) => del(key, database()),
};

const PREFIX = 'bench/';

const isObject = (value: unknown): value is Readonly<Record<string, unknown>> => typeof value === 'object' && value !== null;

/** What stands under one key; a text that is none of ours is handed on whole, under the name of its key, and never written over. */
function keptBench(key: string, found: unknown): KeptBench {
  const id = key.slice(PREFIX.length);
  const plain = typeof found === 'string' ? found : (JSON.stringify(found) ?? '');
  try {
    const read: unknown = JSON.parse(plain);
    if (isObject(read) && typeof read['name'] === 'string' && typeof read['text'] === 'string') {
      return { id, name: read['name'], keptAt: typeof read['keptAt'] === 'number' ? read['keptAt'] : 0, text: read['text'] };
    }
  } catch {
    // Not a text of ours: handed on as it is, below.
  }
  return { id, name: key, keptAt: 0, text: plain };
}

/** All that are kept, by name; null where this device keeps nothing. */
export async function listBenches(shelf: BenchShelf = deviceBenches): Promise<readonly KeptBench[] | null> {
  try {
    const found = await shelf.entries();
    const kept = found.flatMap(([key, value]) => (typeof key === 'string' && key.startsWith(PREFIX) ? [keptBench(key, value)] : []));
    return kept.sort((a, b) => a.name.localeCompare(b.name) || a.keptAt - b.keptAt);
  } catch {
    return null;
  }
}

/** Keeps one, new or in place of the one with its id; false where the device did not take it. */
export async function keepBench({ id, ...bench }: KeptBench, shelf: BenchShelf = deviceBenches): Promise<boolean> {
  try {
    await shelf.set(PREFIX + id, JSON.stringify(bench));
    return true;
  } catch {
    return false;
  }
}

export async function takeOutBench(id: string, shelf: BenchShelf = deviceBenches): Promise<boolean> {
  try {
    await shelf.remove(PREFIX + id);
    return true;
  } catch {
    return false;
  }
}

/** An id that no other bench has, on this page or another. */
export const newBenchId = (now: number = Date.now()): string => `${now.toString(36)}-${crypto.getRandomValues(new Uint32Array(1))[0]!.toString(36)}`;
