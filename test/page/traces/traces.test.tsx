/** The traces on a page of their own: told, drawn, their shots moved, added and taken out, with the road answering in the same thread. */
import { act, fireEvent, render, screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { beforeAll, describe, expect, test, vi } from 'vitest';
import { createStore } from 'zustand/vanilla';
import { TracesSection } from '../../../src/page/traces/TracesSection.tsx';
import { readSampledText } from '../../../src/readings/sampled/sampledRecord.ts';
import { reduce } from '../../../src/reduction/reduce.ts';
import { pictureOfTrace } from '../../../src/reduction/tracePicture.ts';
import { FIRST_TRACE, type Session, type Trace } from '../../../src/session/session.ts';
import { createFirstswingStore } from '../../../src/store/createStore.ts';
import { StoreProvider } from '../../../src/store/hooks.tsx';
import type { TraceDesk, TraceState } from '../../../src/store/traceDesk.ts';
import { exactly, sessionOf } from '../../fixtures/session.ts';
import { draws } from '../../metrology/sources.ts';
import { struck } from '../../traces/struck.ts';

/** 50 g at 0.3 m, read on a point at 0.3 m; two shots and a tap. */
const W = Math.sqrt(9.80665 / 0.3);
const EVENTS = [5, 12, 19];

function text(): string {
  const { normal } = draws(3);
  const { t, theta } = struck({ frequency: W, ratio: 0.01, share: 1, events: EVENTS, jumps: [0.004, 0.005, 0.0045], seconds: 26, rate: 50 });
  return ['Time (s);Displacement (µm)', ...t.map((time, i) => `${exactly(time)};${(300_000 * theta[i]! + 3 * normal()).toFixed(3)}`)].join('\n');
}
const RECORD = readSampledText(text(), { place: { sheetName: 'sensor.csv' } });

function sessionWith(trace: Partial<Trace>): Session {
  return {
    ...sessionOf({
      choices: { form: 'pointBob', readingWay: 'sensorOnPoint', dampingWay: 'none' },
      entries: { bobMass: '50 g', bobDistance: '300 mm', leverArm: '280 mm', readingRadius: '300 mm', tapLeverArm: '280 mm', gravity: '9.80665 m/s²' },
    }),
    traces: [{ ...FIRST_TRACE, id: 't1', name: 'sensor.csv', sha256: 'ab', bytes: 1, events: [{ id: 'e1', text: '5' }, { id: 'e2', text: '12 s' }, { id: 'e3', text: '19 tap 0.2 mN·s' }], ...trace }],
  };
}

async function open({ trace = {}, state = { status: 'here', problems: [] }, has = true }: { readonly trace?: Partial<Trace>; readonly state?: TraceState; readonly has?: boolean } = {}) {
  const library = new Map(has ? [['ab', RECORD] as const] : []);
  const stop = vi.fn();
  const never = () => Promise.reject(new Error('not asked for here'));
  const desk: TraceDesk = { state: createStore(() => ({ ab: state })), stop, takeFile: never, bringIn: () => Promise.resolve(), bytesOf: () => null, putBytes: never };
  const store = createFirstswingStore({ first: sessionWith(trace), ask: (session, explain) => Promise.resolve(reduce(session, explain, library)) });
  const user = userEvent.setup();
  await act(async () => {
    render(<StoreProvider store={store} desk={desk} pictureOf={(session, id) => Promise.resolve(pictureOfTrace(session, id, library)?.picture ?? null)}><TracesSection /></StoreProvider>);
    await new Promise((done) => setTimeout(done, 30));
  });
  const settle = () => act(async () => {
    await new Promise((done) => setTimeout(done, 30));
  });
  await settle();
  return { store, user, stop, settle, lines: () => store.state.getState().session.traces[0]!.events.map(({ text: line }) => line), told: () => store.state.getState().reduction!.traces[0]! };
}

const picture = (): HTMLElement => screen.getByRole('slider', { name: /^The record sensor\.csv/ });
const inSight = (): string => picture().getAttribute('aria-valuetext') ?? '';

/** A click at a part of the width: the sheet of jsdom has no size of its own. */
function pointAt(clientX: number, clientY = 100): void {
  const over = picture().querySelector('.u-over')!;
  over.getBoundingClientRect = () => ({ left: 0, top: 0, width: 260, height: 245, right: 260, bottom: 245, x: 0, y: 0, toJSON: () => '' });
  fireEvent.pointerDown(over, { clientX, clientY, pointerId: 1, button: 0 });
  fireEvent.pointerUp(over, { clientX, clientY, pointerId: 1, button: 0 });
}

beforeAll(() => {
  // jsdom has no pointer capture.
  Element.prototype.setPointerCapture = () => undefined;
});

describe('a trace that is read', () => {
  test('tells its samples, its swing, its noise and the least impulse bit that it shows', async () => {
    await open();
    const card = screen.getByRole('article', { name: 'sensor.csv' });
    expect(card).toHaveTextContent('1301 samples, 26 s, one each 20 ms');
    expect(card).toHaveTextContent(/It swings with T₀ = 1\.09\d+ ± 0\.000\d+ s and ζ = 0\.0\d+/);
    expect(card).toHaveTextContent(/noise 3(\.\d)? µm a sample/);
    expect(card).toHaveTextContent(/noise-equivalent impulse bit of \d+(\.\d+)? nN·s/);
  });

  test('its shots stand beside what the peak alone gives', async () => {
    const { user } = await open();
    await user.click(screen.getByText('Its shots and taps as fitted, and by the peak alone'));
    const [, first] = within(screen.getByRole('group', { name: 'Shots and taps of sensor.csv' })).getAllByRole('row');
    expect(first).toHaveTextContent(/Shot 1\s*5\.000 s\s*1\.(19|20)\d+ ± 0\.000\d+ mm/);
    expect(first!.lastElementChild).toHaveTextContent(/^−?0\.\d+ %$/);
  });

  test('swings of taps lie over those of shots', async () => {
    await open();
    expect(await screen.findByRole('figure', { name: 'Swings of taps laid over those of shots' })).toHaveAccessibleDescription(/2 of shots \(whole lines\), 1 of taps \(dashed\)\. Their means are at most \d(\.\d)? % of the throw apart/);
  });

  test('a stretch marked as bad is left out, and every change can be undone', async () => {
    const { store, told, settle } = await open();
    fireEvent.change(screen.getByLabelText(/^One a line, from and to/), { target: { value: '8 9.5' } });
    await settle();
    expect(told().stretches).toEqual([{ from: 8, to: 9.5, why: 'marked' }]);
    await act(async () => store.actions.undo());
    expect(store.state.getState().session.traces[0]!.bad).toEqual([]);
  });

  test('the list stays open while its first line is typed', async () => {
    const { user, lines } = await open({ trace: { events: [] } });
    const list = screen.getByLabelText(/^One a line: 12\.5/);
    expect(list.closest('details')).toHaveAttribute('open');
    await user.type(list, '5');
    expect(list.closest('details')).toHaveAttribute('open');
    expect(lines()).toEqual(['5']);
    await user.click(screen.getByText(/^List of its shots and taps \(1\)/));
    expect(list.closest('details')).not.toHaveAttribute('open');
  });
});

describe('along the record', () => {
  test('keys come nearer, go along, and back to the whole', async () => {
    const { user } = await open();
    expect(inSight()).toBe('0.000 s to 26.000 s');
    picture().focus();
    await user.keyboard('+');
    expect(inSight()).toBe('6.500 s to 19.500 s');
    await user.keyboard('{ArrowRight}');
    expect(inSight()).toBe('9.100 s to 22.100 s');
    await user.keyboard('0');
    expect(inSight()).toBe('0.000 s to 26.000 s');
  });

  test('Page Down goes from shot to shot and chooses its record; Delete takes it out', async () => {
    const { store, user, lines, settle } = await open();
    picture().focus();
    await user.keyboard('{PageDown}{PageDown}');
    expect(store.state.getState().selected).toBe('t1/e2');
    expect(inSight()).toMatch(/; Shot 2, 12\.000 s, throw 1\.50\d+ ± 0\.000\d+ mm \(2u\)/);
    expect(screen.getByRole('figure', { name: 'The swing after shot 2' })).toBeInTheDocument();
    await user.keyboard('{Delete}');
    await settle();
    expect(lines()).toEqual(['5', '19 tap 0.2 mN·s']);
  });

  test('the chosen one is moved by its time, the rest of its line kept', async () => {
    const { user, lines, told, settle } = await open();
    picture().focus();
    await user.keyboard('{End}{PageUp}');
    const time = screen.getByLabelText('Tap 1 at');
    await user.clear(time);
    await user.type(time, '19.02{Enter}');
    await settle();
    expect(lines()[2]).toBe('19.02 s tap 0.2 mN·s');
    expect(told().events[2]!.time).toBe(19.02);
  });

  test('a shot is added where the record is pointed to', async () => {
    const { user, lines, settle } = await open();
    pointAt(80);
    await user.click(screen.getByRole('button', { name: /^Add a shot at 8\.000 s/ }));
    await settle();
    expect(lines()).toEqual(['5', '12 s', '19 tap 0.2 mN·s', '8 s']);
  });

  test('what is in sight is marked as bad', async () => {
    const { store, user } = await open();
    expect(screen.getByRole('button', { name: 'Mark it as bad' })).toBeDisabled();
    picture().focus();
    await user.keyboard('++');
    await user.click(screen.getByRole('button', { name: 'Mark what is in sight as bad' }));
    expect(store.state.getState().session.traces[0]!.bad.map(({ text: line }) => line)).toEqual(['9.75 16.25 s']);
  });
});

describe('shots that were found', () => {
  test('become a list with the first change by hand, times on the record’s clock', async () => {
    const { user, store, lines, settle } = await open({ trace: { eventsFrom: 'found', events: [] } });
    picture().focus();
    await user.keyboard('{PageDown}{Delete}');
    await settle();
    expect(store.state.getState().session.traces[0]!.eventsFrom).toBe('list');
    expect(lines().map((line) => Math.round(Number.parseFloat(line)))).toEqual([12, 19]);
  });
});

describe('a trace that is not here', () => {
  test('asks for its file again', async () => {
    await open({ state: { status: 'missing' }, has: false });
    expect(screen.getByLabelText(/Choose the file itself again/)).toBeInTheDocument();
    expect(screen.queryByRole('slider')).toBe(null);
  });

  test('shows how far it has been read, and can be stopped', async () => {
    const { user, stop } = await open({ state: { status: 'reading', name: 'sensor.csv', read: 30, bytes: 120 }, has: false });
    expect(screen.getByLabelText('Reading sensor.csv')).toHaveAttribute('value', '30');
    await user.click(screen.getByRole('button', { name: 'Stop' }));
    expect(stop).toHaveBeenCalledWith('ab');
  });

  test('is taken out, and comes back by undo', async () => {
    const { user, store } = await open();
    await user.click(screen.getByRole('button', { name: 'Take out trace sensor.csv' }));
    expect(store.state.getState().session.traces).toEqual([]);
    await act(async () => store.actions.undo());
    expect(store.state.getState().session.traces).toHaveLength(1);
  });
});

describe('how it is read', () => {
  test('a rate, a column and where the shots come from are said, one change each', async () => {
    const { user, store, settle } = await open();
    await user.click(screen.getByText('How it is read'));
    await user.selectOptions(screen.getByLabelText('Shots and taps are'), 'found');
    fireEvent.change(screen.getByLabelText('Left out after each shot'), { target: { value: '40 ms' } });
    await user.selectOptions(screen.getByLabelText('Column of the trigger'), '-1');
    await settle();
    expect(store.state.getState().session.traces[0]).toMatchObject({ eventsFrom: 'found', blank: '40 ms', uses: { trigger: -1 } });
    expect(store.state.getState().reduction!.traces[0]!.events).toHaveLength(3);
  });
});
