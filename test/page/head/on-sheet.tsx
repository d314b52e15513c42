/** Puts a component on a sheet of its own: a store with the real road behind it, run at once. */
import { act, render } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import type { ReactNode } from 'react';
import { reduce } from '../../../src/reduction/reduce.ts';
import { emptySession } from '../../../src/session/session.ts';
import type { Session } from '../../../src/session/session.ts';
import { createFirstswingStore } from '../../../src/store/createStore.ts';
import { StoreProvider } from '../../../src/store/hooks.tsx';
import type { AskForReduction } from '../../../src/store/store.ts';

const reduceHere: AskForReduction = (session, explain) => Promise.resolve(reduce(session, explain));

/** Does something to the page outside the user's keyboard and mouse, and lets the reduction answer. */
export async function settled(doing: () => void = () => undefined): Promise<void> {
  await act(async () => {
    doing();
    for (let turns = 0; turns < 3; turns += 1) await new Promise((done) => setTimeout(done, 0));
  });
}

export async function onSheet(what: ReactNode, first: Session = emptySession(), ask: AskForReduction = reduceHere) {
  const store = createFirstswingStore({ ask, first });
  await settled(() => void render(<StoreProvider store={store}>{what}</StoreProvider>));
  const session = (): Session => store.state.getState().session;
  return { store, session, user: userEvent.setup() };
}
