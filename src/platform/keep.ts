/** Keeps the session on this device between visits (IndexedDB), and brings it back; what cannot be read is put by, never overwritten. */
import { createStore, get, promisifyRequest } from 'idb-keyval';
import type { UseStore } from 'idb-keyval';

/** Where texts are kept by key; a rejected promise means that the device does not keep anything (private window, disk full). */
export interface Shelf {
  get(key: string): Promise<unknown>;
  set(key: string, text: string): Promise<void>;
}

let opened: UseStore | null = null;
export const database = (): UseStore => (opened ??= createStore('firstswing', 'kept'));

/** Commits at once instead of when the page is next idle: a page that is going away is not idle again. */
const deviceShelf: Shelf = {
  get: (key) => get<unknown>(key, database()),
  set: (key, text) =>
    database()('readwrite', (store) => {
      store.put(text, key);
      const { transaction } = store;
      transaction.commit();
      return promisifyRequest(transaction);
    }),
};

const SESSION_KEY = 'session';
/** How long after a change the session is written, at the latest. */
const WRITE_AFTER_MS = 300;

export type Found<Value> =
  | { readonly status: 'none' }
  | { readonly status: 'kept'; readonly value: Value }
  /** Something is there and cannot be read; its text was put by under another key. */
  | { readonly status: 'unreadable'; readonly text: string }
  | { readonly status: 'noStorage' };

const asText = (found: unknown): string => (typeof found === 'string' ? found : (JSON.stringify(found) ?? String(found)));

/**
 * What this device kept. `read` returns null for a text that it cannot make sense of; such a text is copied to a key of
 * its own before anything else is written.
 */
export async function loadKept<Value>(read: (text: string) => Value | null, shelf: Shelf = deviceShelf, now: () => number = Date.now): Promise<Found<Value>> {
  let found: unknown;
  try {
    found = await shelf.get(SESSION_KEY);
  } catch {
    return { status: 'noStorage' };
  }
  if (found === undefined || found === null) return { status: 'none' };
  const value = typeof found === 'string' ? read(found) : null;
  if (value !== null) return { status: 'kept', value };
  const text = asText(found);
  try {
    await shelf.set(`${SESSION_KEY}/unreadable/${now()}`, text);
  } catch {
    return { status: 'noStorage' };
  }
  return { status: 'unreadable', text };
}

export interface Keeper {
  /** The text to keep from now on, made when it is written; written a little later, the latest only. */
  keep(makeText: () => string): void;
  /** Writes at once what is waiting. */
  flush(): Promise<void>;
}

interface KeeperParts {
  readonly onKept: (at: number) => void;
  /** The device did not take it. */
  readonly onNotKept: () => void;
  readonly shelf?: Shelf;
  readonly now?: () => number;
}

export function createKeeper({ onKept, onNotKept, shelf = deviceShelf, now = Date.now }: KeeperParts): Keeper {
  let waiting: (() => string) | null = null;
  let timer: ReturnType<typeof setTimeout> | undefined;
  let writing: Promise<void> = Promise.resolve();

  async function write(text: string): Promise<void> {
    try {
      await shelf.set(SESSION_KEY, text);
      onKept(now());
    } catch {
      onNotKept();
    }
  }

  function flush(): Promise<void> {
    clearTimeout(timer);
    timer = undefined;
    if (waiting !== null) {
      const text = waiting();
      waiting = null;
      // Not behind an earlier write: those of one database are done in the order in which they are begun.
      writing = Promise.all([writing, write(text)]).then(() => undefined);
    }
    return writing;
  }

  return {
    keep(makeText) {
      waiting = makeText;
      timer ??= setTimeout(() => void flush(), WRITE_AFTER_MS);
    },
    flush,
  };
}

/** Writes what is waiting when the page goes out of sight or away; returns how to stop. */
export function flushOnLeaving(keeper: Keeper): () => void {
  const leave = () => void keeper.flush();
  const hide = () => {
    if (document.visibilityState === 'hidden') leave();
  };
  window.addEventListener('pagehide', leave);
  document.addEventListener('visibilitychange', hide);
  return () => {
    window.removeEventListener('pagehide', leave);
    document.removeEventListener('visibilitychange', hide);
  };
}
