import { act, render, screen } from '@testing-library/react';
import { expect, test } from 'vitest';
import { setTitle } from '../../src/session/edits.ts';
import { emptySession } from '../../src/session/session.ts';
import { createFirstswingStore } from '../../src/store/createStore.ts';
import { FollowLater, StoreProvider, useActions, useStateNow, useStore } from '../../src/store/hooks.tsx';
import { bareReduction } from './bare-reduction.ts';

function Name({ of }: { readonly of: string }) {
  const name = useStore((state) => state.session.title.name);
  const now = useStateNow();
  const { undo } = useActions();
  return <button type="button" aria-label={of} onClick={() => (now().past.length > 0 ? undo() : undefined)}>{name}</button>;
}

test('what follows later comes to the same state, and acts on the present one', async () => {
  const store = createFirstswingStore({ ask: () => Promise.resolve(bareReduction()), first: emptySession() });
  await act(async () => {
    render(<StoreProvider store={store}><Name of="at once" /><FollowLater><Name of="later" /></FollowLater></StoreProvider>);
    await Promise.resolve();
  });
  await act(async () => {
    store.actions.change('name', setTitle({ name: 'Run 7' }));
    await Promise.resolve();
  });
  expect(screen.getByRole('button', { name: 'at once' })).toHaveTextContent('Run 7');
  expect(screen.getByRole('button', { name: 'later' })).toHaveTextContent('Run 7');
  await act(async () => {
    screen.getByRole('button', { name: 'later' }).click();
    await Promise.resolve();
  });
  expect(screen.getByRole('button', { name: 'later' })).toHaveTextContent(/^$/);
});
