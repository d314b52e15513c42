/** Renders a section on a store whose reduction is given, and hands back the store to look at what the section changed. */
import { act, render } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import type { ReactNode } from 'react';
import type { Reduction } from '../../src/reduction/results.ts';
import { emptySession } from '../../src/session/session.ts';
import type { Session } from '../../src/session/session.ts';
import { createFirstswingStore } from '../../src/store/createStore.ts';
import { StoreProvider } from '../../src/store/hooks.tsx';
import { REDUCTION } from './reductionFixture.ts';

interface Given {
  readonly reduction?: Reduction;
  readonly selected?: string;
}

/** A session that has the fixture's sheet, so that its records can be selected. */
const SESSION: Session = {
  ...emptySession(),
  sheets: [{ id: 's1', name: 'run.csv', origin: 'file', text: '', sha256: '', columns: [], kindOfAll: null, edits: {}, added: [] }],
};

export async function withReduction(section: ReactNode, { reduction = REDUCTION, selected }: Given = {}) {
  const store = createFirstswingStore({
    first: SESSION,
    ask: async (_, explain) => ({
      ...reduction,
      explained: explain === null || reduction.explained === null ? null : { ...reduction.explained, record: explain },
    }),
  });
  if (selected !== undefined) store.actions.select(selected);
  const user = userEvent.setup();
  await act(async () => {
    render(<StoreProvider store={store}>{section}</StoreProvider>);
  });
  // Figures are drawn one a task, after what put them there.
  await act(async () => {
    await new Promise((done) => setTimeout(done, 30));
  });
  return { store, user };
}
