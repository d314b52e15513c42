/** The store for components: `useStore(selector)` reads a narrow piece of it, `useActions()` changes it. */
import { createContext, useContext, useDeferredValue, useMemo } from 'react';
import type { ReactNode } from 'react';
import { useStore as useZustand } from 'zustand';
import type { StoreApi } from 'zustand';
import type { FirstswingStore } from './createStore.ts';
import type { Actions, State } from './store.ts';

interface Seen {
  readonly store: FirstswingStore;
  /** What `useStore` reads: the store itself, or a state that stands still. */
  readonly shown: StoreApi<State>;
}

const StoreContext = createContext<Seen | null>(null);

export function StoreProvider({ store, children }: { readonly store: FirstswingStore; readonly children: ReactNode }) {
  const seen = useMemo(() => ({ store, shown: store.state }), [store]);
  return <StoreContext value={seen}>{children}</StoreContext>;
}

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
