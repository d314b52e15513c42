/** The store for components: `useStore(selector)` reads a narrow piece of it, `useActions()` changes it. */
import { createContext, useContext, useDeferredValue, useMemo } from 'react';
import type { ReactNode } from 'react';
import { useStore as useZustand } from 'zustand';
import { createStore } from 'zustand/vanilla';
import type { StoreApi } from 'zustand/vanilla';
import type { FirstswingStore } from './createStore.ts';
import type { WorkerLine } from '../workers/askWorker.ts';
import type { Actions, State } from './store.ts';
import type { TraceDesk, TraceState } from './traceDesk.ts';

interface Seen {
  readonly store: FirstswingStore;
  /** What `useStore` reads: the store itself, or a state that stands still. */
  readonly shown: StoreApi<State>;
}

const StoreContext = createContext<Seen | null>(null);

export interface Traces {
  readonly desk: TraceDesk;
  readonly pictureOf: WorkerLine['pictureOf'];
}

const TracesContext = createContext<Traces | null>(null);

interface ProviderProps extends Partial<Traces> {
  readonly store: FirstswingStore;
  readonly children: ReactNode;
}

/** Without a desk and pictures (in tests of other parts) the page takes no traces in. */
export function StoreProvider({ store, desk, pictureOf, children }: ProviderProps) {
  const seen = useMemo(() => ({ store, shown: store.state }), [store]);
  const traces = useMemo(() => (desk && pictureOf ? { desk, pictureOf } : null), [desk, pictureOf]);
  return <StoreContext value={seen}><TracesContext value={traces}>{children}</TracesContext></StoreContext>;
}

/** What looks after the bytes of traces; null where the page takes none. */
export const useTraces = (): Traces | null => useContext(TracesContext);

const NONE = createStore<Readonly<Record<string, TraceState>>>()(() => ({}));

/** How far each trace has come, by the sum of its bytes. */
export const useTraceStates = (): Readonly<Record<string, TraceState>> => useZustand(useTraces()?.desk.state ?? NONE);

function useSeen(): Seen {
  const seen = useContext(StoreContext);
  if (seen === null) throw new Error('Reading the store: no StoreProvider above this component');
  return seen;
}

const neverChanges = (): (() => void) => () => undefined;

/**
 * Lets what is inside follow the store a little later, in renders that typing interrupts: for sections that show much
 * and take no text.
 */
export function FollowLater({ children }: { readonly children: ReactNode }) {
  const { store } = useSeen();
  const state = useDeferredValue(useZustand(store.state));
  const seen = useMemo(() => ({ store, shown: { ...store.state, getState: () => state, subscribe: neverChanges } }), [store, state]);
  return <StoreContext value={seen}>{children}</StoreContext>;
}

/** Reads a piece of the state. Select what is there (derive in the reduction, not here): a selector that builds a new object each time renders for ever. */
export function useStore<Piece>(selector: (state: State) => Piece): Piece {
  return useZustand(useSeen().shown, selector);
}

/** The same, without waiting in a section that follows later: for what a person has just chosen there. */
export function useStoreAtOnce<Piece>(selector: (state: State) => Piece): Piece {
  return useZustand(useSeen().store.state, selector);
}

/** The actions, the same object for the life of the page. */
export function useActions(): Actions {
  return useSeen().store.actions;
}

/** The state at the moment of a call, for handlers that need it once and must not render with it. */
export function useStateNow(): () => State {
  return useSeen().store.state.getState;
}
