import { fireEvent, screen, waitFor, within } from '@testing-library/react';
import { afterEach, beforeAll, beforeEach, describe, expect, test, vi } from 'vitest';
import { App } from '../../../src/page/App.tsx';
import { fetchSections } from '../../../src/page/later.ts';
import { arrivalMessages } from '../../../src/page/head/arrival.ts';
import { demoSession } from '../../../src/session/demo.ts';
import { setTitle } from '../../../src/session/edits.ts';
import { sessionFromText, sessionToText } from '../../../src/session/file.ts';
import { emptySession } from '../../../src/session/session.ts';
import { onSheet, settled } from './on-sheet.tsx';

const saved: string[] = [];
let blobs: Blob[] = [];

beforeAll(fetchSections);
beforeEach(() => {
  saved.length = 0;
  blobs = [];
  Object.assign(URL, { createObjectURL: (blob: Blob) => `blob:${blobs.push(blob)}`, revokeObjectURL: () => undefined });
  vi.spyOn(HTMLAnchorElement.prototype, 'click').mockImplementation(function click(this: HTMLAnchorElement) {
    saved.push(this.download);
  });
});
afterEach(() => void vi.restoreAllMocks());

const press = (key: string, more: Partial<KeyboardEventInit> = {}) => settled(() => void fireEvent.keyDown(document.body, { key, ...more }));
const dropFiles = (files: readonly File[]) => settled(() => void fireEvent.drop(document.body, { dataTransfer: { files, types: ['Files'], getData: () => '' } }));

describe('an empty sheet', () => {
  test('says how readings come in, and opens the demo in one click', async () => {
    const { user, session } = await onSheet(<App />);
    await user.click(screen.getByText('Open the demo, an invented bench'));
    expect(session()).toEqual(demoSession());
    expect(screen.getByText('Demo: invented, not a measurement')).toBeVisible();
    await settled();
    expect(screen.getByText(/mN·s/, { selector: 'strong *' })).toBeVisible();
    expect(screen.getByText('The run', { selector: 'h2' })).toBeVisible();
  });

  test('rows can be typed by hand at once', async () => {
    const { user, session } = await onSheet(<App />);
    await user.click(screen.getByRole('button', { name: 'Type by hand' }));
    expect(session().sheets).toMatchObject([{ origin: 'typed' }]);
    expect(session().sheets[0]?.added).toHaveLength(4);
  });
});

describe('the result line', () => {
  test('gives the run mean with U, and says that it is U', async () => {
    await onSheet(<App />, demoSession());
    const line = screen.getByText(/± is U, 95 %, k = \d\.\d\d/);
    expect(line.parentElement).toHaveTextContent(/n = 22 of 24/);
    expect(line.parentElement).toHaveTextContent(/scatter s = [\d.]+.mN·s/);
  });

  test('leads to the things to look at, and each of them to the field that settles it', async () => {
    const { user } = await onSheet(<App />, { ...demoSession(), entries: { ...demoSession().entries, leverArm: { text: 'an arm', plusMinus: 'standard', k: '' } } });
    await user.click(screen.getByText(/things? to look at/, { selector: 'button' }));
    const heading = screen.getByText('Things to look at', { selector: 'h2' });
    expect(heading).toHaveFocus();
    const list = within(heading.closest('section') ?? document.body);
    const told = list.getByText(/an arm/).closest('li');
    await user.click(within(told ?? document.body).getByRole('button', { name: 'to the field' }));
    expect(screen.getByLabelText(/^Lever arm of the thrust r/)).toHaveFocus();
  });
});

describe('things to look at', () => {
  const table = 'kind,rest (mm),first swing (mm)\nshot,10,12\nshot,ten,13\n';

  test('a word where a reading belongs leads to its cell', async () => {
    const { user } = await onSheet(<App />);
    await dropFiles([new File([table], 'run.csv')]);
    const told = await screen.findByText(/ten/, { selector: '#look li > span' });
    await user.click(within(told.closest('li') ?? document.body).getByText(/^to the/));
    await waitFor(() => expect(document.activeElement).toHaveTextContent(/^ten$/));
    expect(document.activeElement).toBeInvalid();
  });
});

describe('the session’s first line', () => {
  test('name, place and date are typed in place, and undone and redone by keys', async () => {
    const { user, session } = await onSheet(<App />);
    await user.type(screen.getByRole('textbox', { name: 'Session name' }), 'Run 7');
    await user.type(screen.getByRole('textbox', { name: 'Place' }), 'Cellar');
    expect(session().title).toMatchObject({ name: 'Run 7', place: 'Cellar' });
    await press('z', { ctrlKey: true });
    expect(session().title).toMatchObject({ name: 'Run 7', place: '' });
    await press('Z', { ctrlKey: true, shiftKey: true });
    expect(session().title.place).toBe('Cellar');
  });

  test('a saved session opened again is the same session', async () => {
    const { session } = await onSheet(<App />, setTitle({ name: 'Run 7' })(demoSession()));
    await press('s', { metaKey: true });
    expect(saved).toEqual(['Run-7.firstswing.json']);
    const text = await blobs[0]?.text();
    const before = session();
    await dropFiles([new File([sessionToText(emptySession())], 'other.firstswing.json')]);
    await waitFor(() => expect(session()).toEqual(emptySession()));
    await dropFiles([new File([text ?? ''], 'Run-7.firstswing.json')]);
    await waitFor(() => expect(session()).toEqual(before));
  });

  test('a file that is no session is refused with a sentence, and nothing typed is lost', async () => {
    const { session, user } = await onSheet(<App />, setTitle({ name: 'kept' })(emptySession()));
    await dropFiles([new File(['{"a":'], 'broken.json')]);
    expect(await screen.findByText(/^broken\.json: /)).toBeVisible();
    expect(session().title.name).toBe('kept');
    await user.click(screen.getByRole('button', { name: 'take away' }));
    expect(screen.queryByText(/^broken\.json: /)).not.toBeInTheDocument();
  });

  test('a new session can be undone', async () => {
    const { user, session } = await onSheet(<App />, setTitle({ name: 'old' })(emptySession()));
    await user.click(screen.getByRole('button', { name: 'new' }));
    expect(session()).toEqual(emptySession());
    await user.click(screen.getByRole('button', { name: 'undo' }));
    expect(session().title.name).toBe('old');
  });

  test('what this device keeps is said, and so is when it does not', async () => {
    const { store } = await onSheet(<App />);
    await settled(() => store.noteKept(Date.UTC(2026, 0, 5, 14, 2)));
    expect(screen.getByText(/^kept \d\d:\d\d$/)).toBeVisible();
    await settled(() => store.noteKept(null));
    expect(screen.getByText(/^not kept on this device/)).toBeVisible();
  });
});

describe('readings that reach the sheet', () => {
  const table = 'kind,rest (mm),first swing (mm)\nshot,10,12\nshot,10,13\n';

  test('a table dropped anywhere comes in as a sheet', async () => {
    const { session } = await onSheet(<App />);
    await dropFiles([new File([table], 'run.csv')]);
    await waitFor(() => expect(session().sheets).toMatchObject([{ name: 'run.csv', origin: 'file', text: table }]));
  });

  test('a table pasted outside a field comes in, one pasted into a field stays there', async () => {
    const { session } = await onSheet(<App />);
    await settled(() => void fireEvent.paste(screen.getByRole('textbox', { name: 'Place' }), { clipboardData: { files: [], getData: () => table } }));
    expect(session().sheets).toEqual([]);
    await settled(() => void fireEvent.paste(document.body, { clipboardData: { files: [], getData: () => table } }));
    await waitFor(() => expect(session().sheets).toMatchObject([{ origin: 'paste' }]));
  });
});

describe('when something goes wrong', () => {
  test('a failure of the reduction is told with the session offered for saving', async () => {
    const { user } = await onSheet(<App />, setTitle({ name: 'Run 7' })(emptySession()), () => Promise.reject(new Error('Reducing: no')));
    const told = screen.getByText('Reducing: no').closest<HTMLElement>('[role=alert]');
    await user.click(within(told ?? document.body).getByRole('button', { name: 'Save the session' }));
    expect(saved).toEqual(['Run-7.firstswing.json']);
  });

  test('a kept session that cannot be read is told, and offered as a file just as it was', async () => {
    const { user } = await onSheet(<App arrival={arrivalMessages({ status: 'unreadable', text: 'spoiled' }, sessionFromText('spoiled'))} />);
    expect(screen.getByText(/cannot be read, so the sheet begins empty/)).toBeVisible();
    await user.click(screen.getByRole('button', { name: 'Save what was kept as a file' }));
    expect(saved).toEqual(['kept-session.txt']);
    expect(await blobs[0]?.text()).toBe('spoiled');
  });
});

describe('the help', () => {
  test('opens with ? outside a field, and closes', async () => {
    const { user } = await onSheet(<App />);
    await press('?');
    const help = screen.getByRole('dialog', { name: 'Firstswing, in short' });
    expect(within(help).getByText('undo')).toBeVisible();
    await user.click(within(help).getByRole('button', { name: 'Close' }));
    await settled(() => void fireEvent.keyDown(screen.getByRole('textbox', { name: 'Place' }), { key: '?' }));
    expect(screen.queryByRole('dialog', { name: 'Firstswing, in short' })).not.toBeInTheDocument();
  });
});
