/** The store for components: `useStore(selector)` reads a narrow piece of it, `useActions()` changes it. */
import { createContext, useContext } from 'react';
import type { ReactNode } from 'react';
import { useStore as useZustand } from 'zustand';
import type { FirstswingStore } from './createStore.ts';
import type { Actions, State } from './store.ts';

const StoreContext = createContext<FirstswingStore | null>(null);

export function StoreProvider({ store, children }: { readonly store: FirstswingStore; readonly children: ReactNode }) {
  return <StoreContext value={store}>{children}</StoreContext>;
}

function useFirstswingStore(): FirstswingStore {
  const store = useContext(StoreContext);
  if (store === null) throw new Error('Reading the store: no StoreProvider above this component');
  return store;
}

/** Reads a piece of the state. Select what is there (derive in the reduction, not here): a selector that builds a new object each time renders for ever. */
export function useStore<Piece>(selector: (state: State) => Piece): Piece {
  return useZustand(useFirstswingStore().state, selector);
}

/** The actions, the same object for the life of the page. */
export function useActions(): Actions {
  return useFirstswingStore().actions;
}

/** The state at the moment of a call, for handlers that need it once and must not render with it. */
export function useStateNow(): () => State {
  return useFirstswingStore().state.getState;
}
