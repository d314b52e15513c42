/** Keeps the bytes of sampled traces on this device between visits, by their SHA-256: they are too many to be kept with every change of the session. */
import { createStore, del, get, keys, set } from 'idb-keyval';
import type { UseStore } from 'idb-keyval';

export interface TraceShelf {
  /** null where they are not here, or the device keeps nothing. */
  readonly bytesOf: (sha256: string) => Promise<Blob | null>;
  /** Whether the device took them. */
  readonly put: (sha256: string, bytes: Blob) => Promise<boolean>;
  /** Throws out what no session at hand names. */
  readonly keepOnly: (sums: ReadonlySet<string>) => Promise<void>;
}

let opened: UseStore | null = null;
const database = (): UseStore => (opened ??= createStore('firstswing-traces', 'bytes'));

export const deviceTraceShelf: TraceShelf = {
  async bytesOf(sha256) {
    try {
      const found = await get<unknown>(sha256, database());
      return found instanceof Blob ? found : null;
    } catch {
      return null;
    }
  },
  async put(sha256, bytes) {
    try {
      await set(sha256, bytes, database());
      return true;
    } catch {
      return false;
    }
  },
  async keepOnly(sums) {
    try {
      for (const key of await keys(database())) if (typeof key !== 'string' || !sums.has(key)) await del(key, database());
    } catch {
      // A device that keeps nothing has nothing to throw out.
    }
  },
};
