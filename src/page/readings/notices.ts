/** What the readings section has to say about files that came in: a short list that lives as long as the page's store. */
import { useSyncExternalStore } from 'react';
import type { Session } from '../../session/session.ts';
import type { Actions } from '../../store/store.ts';
import { useActions } from '../../store/hooks.tsx';

export interface Offer {
  readonly label: string;
  /** What the undo list calls it. */
  readonly what: string;
  readonly edit: (session: Session) => Session;
  /** The offer stands as long as this holds of the session. */
  readonly stands: (session: Session) => boolean;
}

export interface Notice {
  readonly id: number;
  /** refused: nothing was taken in. */
  readonly tone: 'told' | 'look' | 'refused';
  readonly sentences: readonly string[];
  /** The sheet that it is about, which the page brings into view. */
  readonly sheet?: string;
  readonly offer?: Offer;
}

/** Older notices make room. */
const NOTICES_KEPT = 4;

export class Notices {
  #list: readonly Notice[] = [];
  #last = 0;
  readonly #listeners = new Set<() => void>();

  readonly list = (): readonly Notice[] => this.#list;

  readonly subscribe = (listener: () => void): (() => void) => {
    this.#listeners.add(listener);
    return () => this.#listeners.delete(listener);
  };

  say(notice: Omit<Notice, 'id'>): void {
    this.#last += 1;
    this.#set([...this.#list, { ...notice, id: this.#last }].slice(-NOTICES_KEPT));
  }

  take(id: number): void {
    this.#set(this.#list.filter((notice) => notice.id !== id));
  }

  #set(list: readonly Notice[]): void {
    this.#list = list;
    for (const listener of this.#listeners) listener();
  }
}

const noticesOf = new WeakMap<Actions, Notices>();

/** The notices of this page's store: the same list wherever a file is dropped. */
export function useNotices(): Notices {
  const actions = useActions();
  const found = noticesOf.get(actions);
  if (found !== undefined) return found;
  const made = new Notices();
  noticesOf.set(actions, made);
  return made;
}

export function useNoticeList(): readonly Notice[] {
  const notices = useNotices();
  return useSyncExternalStore(notices.subscribe, notices.list);
}
