import { screen, waitFor, within } from '@testing-library/react';
import { describe, expect, test } from 'vitest';
import { App } from '../../../src/page/App.tsx';
import { KeptBenches } from '../../../src/page/bench/KeptBenches.tsx';
import type { BenchShelf } from '../../../src/platform/keptBenches.ts';
import { benchOf, sessionWithBench } from '../../../src/session/bench.ts';
import { setEntry, setTitle } from '../../../src/session/edits.ts';
import { sessionToText } from '../../../src/session/file.ts';
import { emptySession } from '../../../src/session/session.ts';
import type { Session } from '../../../src/session/session.ts';
import { demoLike } from '../../fixtures/demoLike.ts';
import { onSheet, settled } from '../head/on-sheet.tsx';

function memoryShelf(first: readonly (readonly [string, string])[] = []): BenchShelf & { readonly kept: Map<string, unknown> } {
  const kept = new Map<string, unknown>(first);
  return { kept, entries: async () => [...kept], set: async (key, text) => void kept.set(key, text), remove: async (key) => void kept.delete(key) };
}
const fullShelf: BenchShelf = { entries: async () => [], set: () => Promise.reject(new Error('full')), remove: async () => undefined };
const closedShelf: BenchShelf = { entries: () => Promise.reject(new Error('no storage')), set: () => Promise.reject(new Error('no storage')), remove: () => Promise.reject(new Error('no storage')) };

const HERE: Session = setTitle({ name: 'day 2' })(demoLike());
const OTHER = setEntry('leverArm', { text: '99 mm' })(emptySession());
const onDevice = (name: string, session: Session) => memoryShelf([['bench/1', JSON.stringify({ name, keptAt: Date.UTC(2026, 0, 5), text: sessionToText(sessionWithBench(session)) })]]);

async function opened(shelf: BenchShelf, session: Session) {
  const there = await onSheet(<KeptBenches shelf={shelf} now={() => 7} />, session);
  await there.user.click(screen.getByText(/^Keep this bench, or use one again/));
  return there;
}
const button = (name: string) => screen.getByRole('button', { name });
const names = () => within(screen.getByRole('list', { name: 'Benches kept on this device' })).getAllByRole('textbox').map((box) => (box as HTMLInputElement).value);

describe('kept benches', () => {
  test('a bench is kept under a name and comes back for another session, whose readings and title stay', async () => {
    const shelf = memoryShelf();
    const { user, session, store } = await opened(shelf, HERE);
    const name = screen.getByRole('textbox', { name: 'Name to keep this bench under' });
    expect(name).toHaveValue('day 2');
    await user.clear(name);
    await user.type(name, 'tank');
    await user.click(button('Keep this bench'));
    await waitFor(() => expect(names()).toEqual(['tank']));
    await settled(() => store.actions.change('another bench', (now) => ({ ...now, ...benchOf(OTHER) })));
    const before = session();
    await user.click(button('Use tank here'));
    expect(session()).toEqual(HERE);
    await settled(() => store.actions.undo());
    expect(session()).toBe(before);
  });

  test('a new session begins with a kept bench, and with the one that stands here', async () => {
    const { user, session, store } = await opened(onDevice('other', OTHER), HERE);
    await user.click(button('New session with other'));
    expect(session()).toEqual(OTHER);
    await settled(() => store.actions.undo());
    await user.click(button('New session with this bench'));
    expect(session()).toEqual(sessionWithBench(HERE));
  });

  test('one is renamed in place, and one taken out can be put back', async () => {
    const shelf = onDevice('other', OTHER);
    const { user } = await opened(shelf, HERE);
    const name = screen.getByRole('textbox', { name: 'Name of the kept bench other' });
    await user.clear(name);
    await user.type(name, 'short strip{Enter}');
    await waitFor(() => expect(names()).toEqual(['short strip']));
    await user.click(button('Take out short strip'));
    expect(await screen.findByText('“short strip” is taken out.')).toBeVisible();
    expect(shelf.kept.size).toBe(0);
    await user.click(button('put “short strip” back as it was'));
    await waitFor(() => expect(names()).toEqual(['short strip']));
  });

  test('a name that is taken is written over only where that is said, and the one before can be put back', async () => {
    const shelf = onDevice('day 2', OTHER);
    const { user } = await opened(shelf, HERE);
    const before = shelf.kept.get('bench/1');
    await user.click(button('Keep in place of “day 2”'));
    await waitFor(() => expect(shelf.kept.get('bench/1')).not.toBe(before));
    expect(shelf.kept.size).toBe(1);
    await user.click(button('put “day 2” back as it was'));
    await waitFor(() => expect(shelf.kept.get('bench/1')).toBe(before));
  });

  test('an empty bench is not worth keeping', async () => {
    await opened(memoryShelf(), setTitle({ name: 'x' })(emptySession()));
    expect(button('Keep this bench')).toBeDisabled();
  });

  test('a device that does not take it says so, and nothing is lost', async () => {
    const { user, session } = await opened(fullShelf, HERE);
    await user.click(button('Keep this bench'));
    expect(await screen.findByText(/This device did not take it/)).toBeVisible();
    expect(screen.getByRole('textbox', { name: 'Name to keep this bench under' })).toHaveValue('day 2');
    expect(session()).toBe(HERE);
  });

  test('a device that keeps nothing says so, and how it is done by a file', async () => {
    await opened(closedShelf, HERE);
    expect(await screen.findByText(/This device keeps nothing/)).toBeVisible();
    expect(button('Keep this bench')).toBeDisabled();
    expect(button('Take the bench of a saved session…')).toBeEnabled();
  });

  test('a kept bench that cannot be read changes nothing and stays kept', async () => {
    const shelf = memoryShelf([['bench/1', JSON.stringify({ name: 'spoiled', keptAt: 1, text: '{' })]]);
    const { user, session } = await opened(shelf, HERE);
    await user.click(button('Use spoiled here'));
    expect(await screen.findByText(/“spoiled”: This file cannot be read as a session/)).toBeVisible();
    expect(session()).toBe(HERE);
    expect(shelf.kept.size).toBe(1);
  });
});

describe('the bench of a session file', () => {
  const file = new File([sessionToText(setTitle({ name: 'friday' })(demoLike()))], 'friday.json');

  test('taken alone leaves the readings and the title here', async () => {
    const here: Session = { ...OTHER, title: HERE.title, sheets: demoLike().sheets };
    const { user, session } = await opened(memoryShelf(), here);
    await user.upload(screen.getByLabelText('Take the bench of a session file'), file);
    await waitFor(() => expect(session()).toEqual({ ...here, ...benchOf(demoLike()) }));
  });

  test('a session file opened whole offers its bench alone, and undo goes back to all of it', async () => {
    const here = setTitle({ name: 'monday' })(emptySession());
    const { user, session, store } = await onSheet(<App />, here);
    await user.upload(screen.getByLabelText('Open a session file, tables of readings, or traces'), file);
    await waitFor(() => expect(session().title.name).toBe('friday'));
    await user.click(button('Take its bench only'));
    expect(session()).toEqual({ ...here, ...benchOf(demoLike()) });
    expect(screen.queryByText(/^friday\.json is open/)).not.toBeInTheDocument();
    await settled(() => store.actions.undo());
    expect(session().sheets).toHaveLength(1);
  });
});
