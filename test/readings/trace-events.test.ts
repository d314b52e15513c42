import { describe, expect, it } from 'vitest';
import { lineAtTime, readStretches, readTraceEvents } from '../../src/readings/traceEvents.ts';

const lines = (...texts: readonly string[]) => texts.map((text, i) => ({ id: `e${i + 1}`, text }));

describe('the list of a trace', () => {
  it('reads times with and without a unit, kinds in words, and impulses as typed', () => {
    const { events, problems } = readTraceEvents(lines('12.5', '2500 ms', '40,2 blank', '', '30 s tap 1,2 mN·s', '50 Schuss'), 'trace.t1');
    expect(problems).toEqual([]);
    expect(events).toEqual([
      { id: 'e2', time: 2.5, kind: 'shot', impulse: '' },
      { id: 'e1', time: 12.5, kind: 'shot', impulse: '' },
      { id: 'e5', time: 30, kind: 'tap', impulse: '1,2 mN·s' },
      { id: 'e3', time: 40.2, kind: 'blank', impulse: '' },
      { id: 'e6', time: 50, kind: 'shot', impulse: '' },
    ]);
  });

  it.each(['soon', '12.5 weight', '12.5 zero', '3 mm', 'tap 3'])('refuses "%s", says its line, and goes on', (text) => {
    const { events, problems } = readTraceEvents(lines('1', text, '2'), 'trace.t1');
    expect(events.map(({ id }) => id)).toEqual(['e1', 'e3']);
    expect(problems).toMatchObject([{ code: 'trace-event-not-read', place: { entry: 'trace.t1' }, facts: { found: text, at: 2 } }]);
  });

  it('moves a time and keeps what else the line says', () => {
    expect(lineAtTime('12.5 s tap 1.2 mN·s', '13')).toBe('13 s tap 1.2 mN·s');
    expect(lineAtTime('12.5', '13.25')).toBe('13.25 s');
    expect(readTraceEvents(lines(lineAtTime('2500 ms blank', '2.6')), 'x').events).toMatchObject([{ time: 2.6, kind: 'blank' }]);
  });
});

describe('stretches marked as bad', () => {
  it('are two times a line', () => {
    expect(readStretches(lines('12.5 13.1', '100 ms 0.2 s', ''), 'trace.t1')).toEqual({ stretches: [{ id: 'e1', from: 12.5, to: 13.1 }, { id: 'e2', from: 0.1, to: 0.2 }], problems: [] });
  });

  it.each(['12.5', '13 12', '1 2 3', 'a b'])('refuses "%s"', (text) => {
    const { stretches, problems } = readStretches(lines(text), 'trace.t1');
    expect(stretches).toEqual([]);
    expect(problems).toHaveLength(1);
  });
});
