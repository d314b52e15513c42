import { beforeEach, describe, expect, test } from 'vitest';
import type { Reduction } from '../../src/reduction/results.ts';
import { addSheet, removeSheet, setEntry, setTitle } from '../../src/session/edits.ts';
import { emptySession } from '../../src/session/session.ts';
import type { Session } from '../../src/session/session.ts';
import { createFirstswingStore } from '../../src/store/createStore.ts';
import { bareReduction } from './bare-reduction.ts';

interface Question {
  readonly session: Session;
  readonly explain: string | null;
  readonly answer: (reduction: Reduction) => Promise<void>;
  readonly fail: (why: string) => Promise<void>;
}

/** A reducer that answers when it is told to. */
function slowReducer() {
  const questions: Question[] = [];
  const ask = (session: Session, explain: string | null) =>
    new Promise<Reduction>((resolve, reject) => {
      const settled = () => new Promise<void>((done) => setTimeout(done, 0));
      questions.push({
        session,
        explain,
        answer: (reduction) => (resolve(reduction), settled()),
        fail: (why) => (reject(new Error(why)), settled()),
      });
    });
  const question = (index: number): Question => {
    const found = questions[index];
    if (found === undefined) throw new Error(`No question ${index} was asked`);
    return found;
  };
  return { ask, questions, question };
}

let clock = 0;
let reducer: ReturnType<typeof slowReducer>;
let store: ReturnType<typeof createFirstswingStore>;
const now = () => store.state.getState();
const name = (text: string, join?: string) => store.actions.change('name', setTitle({ name: text }), join);

beforeEach(() => {
  clock = 0;
  reducer = slowReducer();
  store = createFirstswingStore({ ask: reducer.ask, first: emptySession(), now: () => clock });
});

describe('undo and redo', () => {
  test('a change undone and redone gives back the very sessions', () => {
    const first = now().session;
    name('A');
    const second = now().session;
    store.actions.undo();
    expect(now().session).toBe(first);
    expect(now().future.map((step) => step.what)).toEqual(['name']);
    store.actions.redo();
    expect(now().session).toBe(second);
    expect(now().past.map((step) => step.what)).toEqual(['name']);
  });

  test('typing in one field within two seconds is one step, a pause begins another', () => {
    name('1', 'title');
    clock = 1900;
    name('12', 'title');
    clock = 3800;
    name('125', 'title');
    clock = 5900;
    name('1250', 'title');
    expect(now().past).toHaveLength(2);
    store.actions.undo();
    expect(now().session.title.name).toBe('125');
    store.actions.undo();
    expect(now().session.title.name).toBe('');
  });

  test('typing in another field between, or an undo, ends the joined step', () => {
    name('1', 'title');
    store.actions.change('lever arm', setEntry('leverArm', { text: '9' }), 'leverArm');
    name('12', 'title');
    expect(now().past).toHaveLength(3);
    store.actions.undo();
    name('13', 'title');
    expect(now().past).toHaveLength(3);
  });

  test('a new change drops what could be redone, and a change that changes nothing is no step', () => {
    name('A');
    store.actions.undo();
    store.actions.change('nothing', (session) => session);
    expect(now().future).toHaveLength(1);
    name('B');
    expect(now().future).toEqual([]);
    expect(now().past).toHaveLength(1);
  });

  test('with nothing to undo or redo the session stays', () => {
    const { session } = now();
    store.actions.undo();
    store.actions.redo();
    expect(now().session).toBe(session);
    expect(reducer.questions).toHaveLength(1);
  });
});

describe('reductions', () => {
  test('a late answer to an earlier session does not replace the present one', async () => {
    name('later');
    await reducer.question(0).answer(bareReduction());
    expect(now().reduction).toBeNull();
    expect(now().busy).toBe(true);
    const present = bareReduction();
    await reducer.question(1).answer(present);
    expect(now().reduction).toBe(present);
    expect(now().busy).toBe(false);
  });

  test('while one reduction runs, of all sessions that follow only the latest is asked', async () => {
    for (const letter of 'abcdefgh') name(letter);
    expect(reducer.questions).toHaveLength(1);
    await reducer.question(0).answer(bareReduction());
    expect(reducer.questions).toHaveLength(2);
    expect(reducer.question(1).session.title.name).toBe('h');
    await reducer.question(1).answer(bareReduction());
    expect(reducer.questions).toHaveLength(2);
  });

  test('the answer to a session left and come back to by undo is taken', async () => {
    name('A');
    store.actions.undo();
    const answer = bareReduction();
    await reducer.question(0).answer(answer);
    expect(now().reduction).toBe(answer);
  });

  test('a failure is kept with the session and the last reduction, until the next answer', async () => {
    const good = bareReduction();
    await reducer.question(0).answer(good);
    name('A');
    await reducer.question(1).fail('Reducing: no');
    expect(now()).toMatchObject({ failure: 'Reducing: no', busy: false, reduction: good });
    name('B');
    expect(now().failure).toBe('Reducing: no');
    await reducer.question(2).answer(good);
    expect(now().failure).toBeNull();
  });

  test('the failure of an overtaken session is not shown', async () => {
    name('A');
    await reducer.question(0).fail('old');
    expect(now().failure).toBeNull();
  });
});

describe('selection', () => {
  const sheet: Parameters<typeof addSheet>[0] = { name: '', origin: 'paste', text: '', sha256: '', columns: [], kindOfAll: null, edits: {}, added: [] };

  test('choosing a record asks for its chain', async () => {
    await reducer.question(0).answer(bareReduction());
    store.actions.select('s1/4');
    expect(reducer.question(1)).toMatchObject({ explain: 's1/4' });
    store.actions.select('s1/4');
    expect(reducer.questions).toHaveLength(2);
  });

  test('a record whose sheet is taken out is no longer selected, one whose sheet stays is', () => {
    store.actions.change('paste', addSheet(sheet));
    store.actions.change('paste', addSheet(sheet));
    store.actions.select('s2/2');
    store.actions.change('remove', removeSheet('s1'));
    expect(now().selected).toBe('s2/2');
    store.actions.change('remove', removeSheet('s2'));
    expect(now().selected).toBeNull();
  });
});
