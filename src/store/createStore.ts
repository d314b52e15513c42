/** Makes the page's store: undoable changes, and one reduction at a time with the latest session next. */
import { createStore } from 'zustand/vanilla';
import type { StoreApi } from 'zustand/vanilla';
import type { Session } from '../session/session.ts';
import { share } from './share.ts';
import type { Actions, AskForReduction, State } from './store.ts';

export interface FirstswingStore {
  readonly state: StoreApi<State>;
  readonly actions: Actions;
  /** The session as it stands was kept on this device at this time (ms since epoch); null: it was not taken. */
  readonly noteKept: (at: number | null) => void;
  /** Asks for the reduction of the session as it stands once more: the worker has come to know more. */
  readonly askAgain: () => void;
}

interface StoreParts {
  readonly ask: AskForReduction;
  readonly first: Session;
  readonly now?: () => number;
}

/** Changes with one join key no further apart than this are one step. */
const JOIN_WITHIN_MS = 2000;
/** Steps kept; sessions share what did not change, so a step is small. */
const STEPS_KEPT = 500;

const messageOf = (reason: unknown): string => (reason instanceof Error ? reason.message : String(reason));

/** A selected record stays selected as long as its sheet or trace is there. */
function stillSelected(selected: string | null, session: Session): string | null {
  if (selected === null) return null;
  return [...session.sheets, ...session.traces].some(({ id }) => selected.startsWith(`${id}/`)) ? selected : null;
}

/** Asks for the first reduction at once. */
export function createFirstswingStore({ ask, first, now = Date.now }: StoreParts): FirstswingStore {
  const state = createStore<State>()(() => ({
    session: first, reduction: null, busy: false, failure: null, selected: null, past: [], future: [], keptAt: null, notKept: false,
  }));
  let running = false;
  let askAgain = false;
  let lastJoin: { readonly key: string; readonly at: number } | null = null;

  async function run(): Promise<void> {
    running = true;
    try {
      do {
        askAgain = false;
        const { session, selected } = state.getState();
        try {
          const answer = await ask(session, selected);
          if (state.getState().session === session) {
            state.setState(({ reduction }) => ({ reduction: share(reduction, answer), failure: null }));
          }
        } catch (reason) {
          if (state.getState().session === session) state.setState({ failure: messageOf(reason) });
        }
      } while (askAgain);
    } finally {
      running = false;
      state.setState({ busy: false });
    }
  }

  function request(): void {
    askAgain = true;
    if (running) return;
    state.setState({ busy: true });
    void run();
  }

  const actions: Actions = {
    change(what, edit, join) {
      const { session, past, selected } = state.getState();
      const next = edit(session);
      if (next === session) return;
      const at = now();
      const joins = join !== undefined && lastJoin?.key === join && at - lastJoin.at <= JOIN_WITHIN_MS && past.length > 0;
      lastJoin = join === undefined ? null : { key: join, at };
      state.setState({
        session: next,
        selected: stillSelected(selected, next),
        past: joins ? past : [...past, { session, what }].slice(-STEPS_KEPT),
        future: [],
      });
      request();
    },
    undo() {
      const { session, past, future, selected } = state.getState();
      const step = past.at(-1);
      if (step === undefined) return;
      lastJoin = null;
      state.setState({
        session: step.session,
        selected: stillSelected(selected, step.session),
        past: past.slice(0, -1),
        future: [{ session, what: step.what }, ...future],
      });
      request();
    },
    redo() {
      const { session, past, future, selected } = state.getState();
      const step = future[0];
      if (step === undefined) return;
      lastJoin = null;
      state.setState({
        session: step.session,
        selected: stillSelected(selected, step.session),
        past: [...past, { session, what: step.what }],
        future: future.slice(1),
      });
      request();
    },
    select(record) {
      if (state.getState().selected === record) return;
      state.setState({ selected: record });
      request();
    },
  };

  request();
  return { state, actions, askAgain: request, noteKept: (at) => state.setState(at === null ? { notKept: true } : { keptAt: at, notKept: false }) };
}
