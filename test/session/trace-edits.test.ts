import { describe, expect, it } from 'vitest';
import { addTrace, addTraceLine, linesAgain, removeTrace, setTrace, setTraceLine } from '../../src/session/edits.ts';
import { sessionFromText, sessionToText, traceBytesIn } from '../../src/session/file.ts';
import { emptySession } from '../../src/session/session.ts';

const lines = (...texts: readonly string[]) => texts.map((text, i) => ({ id: `e${i + 1}`, text }));

describe('a list typed anew', () => {
  it('keeps the id of every line that is still there', () => {
    expect(linesAgain(lines('1', '2', '3'), '1\n3')).toEqual([{ id: 'e1', text: '1' }, { id: 'e3', text: '3' }]);
  });

  it('gives a changed line its id again where as many lines are left', () => {
    expect(linesAgain(lines('1', '2', '3'), '1\n2.5\n3')).toEqual([{ id: 'e1', text: '1' }, { id: 'e2', text: '2.5' }, { id: 'e3', text: '3' }]);
  });

  it('gives a new line an id that none had', () => {
    expect(linesAgain(lines('1', '2'), '1\n1.5\n2')).toEqual([{ id: 'e1', text: '1' }, { id: 'e3', text: '1.5' }, { id: 'e2', text: '2' }]);
  });

  it('lets an empty line be typed, and an empty list be none', () => {
    expect(linesAgain(lines('1'), '1\n')).toHaveLength(2);
    expect(linesAgain(lines('1'), '')).toEqual([]);
  });
});

describe('traces of a session', () => {
  const added = addTrace({ name: 'a.csv', sha256: 'ab', bytes: 7 })(addTrace({ name: 'b.csv', sha256: 'cd', bytes: 9 })(emptySession()));

  it('are added, changed and taken out by id', () => {
    expect(added.traces.map(({ id, name }) => [id, name])).toEqual([['t1', 'b.csv'], ['t2', 'a.csv']]);
    expect(setTrace('t2', { blank: '20 ms' })(added).traces[1]).toMatchObject({ blank: '20 ms', name: 'a.csv' });
    expect(removeTrace('t1')(added).traces.map(({ id }) => id)).toEqual(['t2']);
  });

  it('have lines that are added, changed and taken out', () => {
    const two = addTraceLine('t1', 'bad', '3 4')(addTraceLine('t1', 'bad', '1 2')(added));
    expect(two.traces[0]!.bad).toEqual([{ id: 'e1', text: '1 2' }, { id: 'e2', text: '3 4' }]);
    expect(setTraceLine('t1', 'bad', 'e1', '1 3')(two).traces[0]!.bad[0]).toEqual({ id: 'e1', text: '1 3' });
    expect(setTraceLine('t1', 'bad', 'e1', null)(two).traces[0]!.bad).toEqual([{ id: 'e2', text: '3 4' }]);
  });

  it('come back from the file, with the bytes beside the session', () => {
    const session = setTrace('t1', { uses: { time: 0, reading: 2, trigger: -1 }, eventsFrom: 'found', events: [{ id: 'e4', text: '12 tap' }], rate: '500', offset: 'find' })(added);
    const text = sessionToText(session, { ab: 'H4sI' });
    const read = sessionFromText(text);
    expect(read.problems).toEqual([]);
    expect(read.session!.traces).toEqual(session.traces);
    expect(traceBytesIn(text)).toEqual({ ab: 'H4sI' });
    expect(traceBytesIn(sessionToText(session))).toEqual({});
    expect(traceBytesIn('{')).toEqual({});
  });

  it('cost their damaged pieces and no more', () => {
    const [trace] = added.traces;
    const damaged = { ...added, traces: [{ id: 't9' }, 3, { ...trace, uses: { time: -2, colour: 1, reading: 1 }, eventsFrom: 'moon', events: [{ id: 'e1' }, { id: 'e2', text: '5' }], bytes: -1 }] };
    const { session, problems } = sessionFromText(JSON.stringify(damaged));
    expect(session!.traces).toEqual([{ ...trace, uses: { reading: 1 }, eventsFrom: 'list', events: [{ id: 'e2', text: '5' }], bytes: 0 }]);
    expect(problems.map((found) => found.facts['where'])).toEqual(['traces[1]', 'traces[2]', 'traces[3].bytes', 'traces[3].uses.time', 'traces[3].uses.colour', 'traces[3].eventsFrom', 'traces[3].events[1]']);
  });
});
