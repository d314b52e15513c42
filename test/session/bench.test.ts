import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { benchOf, isBlankBench, putBench, sessionWithBench } from '../../src/session/bench.ts';
import { demoSession } from '../../src/session/demo.ts';
import { addInstrument, addSheet, setEntry, setEntryInstrument, setSheetInstrument, setTitle, type Edit } from '../../src/session/edits.ts';
import { sessionFromText, sessionToText } from '../../src/session/file.ts';
import { emptySession, type Session } from '../../src/session/session.ts';

const after = (...edits: readonly Edit[]): Session => edits.reduce((session, edit) => edit(session), emptySession());
const sheet: Parameters<typeof addSheet>[0] = { name: 'run', origin: 'paste', text: 'a,b\n1,2\n', sha256: '', columns: [], kindOfAll: null, edits: {}, added: [] };

const anyBench: fc.Arbitrary<Session> = fc.array(fc.constantFrom<Edit>(
  setEntry('leverArm', { text: '118 mm' }), setEntry('gravity', { text: '9.81 ± 0.01 m/s²' }), addInstrument({ name: 'ruler' }), addInstrument({ name: 'balance', measures: 'mass' }),
  setEntryInstrument('leverArm', 'i1'), addSheet(sheet), addSheet({ ...sheet, name: 'second' }),
), { maxLength: 12 }).map((edits) => after(...edits));

describe('a kept bench', () => {
  test('holds what describes the stand, and neither readings nor title', () => {
    const kept = sessionWithBench(demoSession());
    expect(benchOf(kept)).toEqual(benchOf(demoSession()));
    expect(kept).toMatchObject({ sheets: [], marks: {}, title: emptySession().title });
    expect(sessionFromText(sessionToText(kept))).toEqual({ session: kept, problems: [] });
  });

  test('used for another session leaves its readings, marks and title to the letter', () => {
    fc.assert(fc.property(anyBench, anyBench, (from, to) => {
      const named = setTitle({ name: 'day 2' })(to);
      const used = putBench(benchOf(from))(named);
      expect(used.title).toBe(named.title);
      expect(used.marks).toBe(named.marks);
      expect(used.sheets.map(({ instrument: _with, ...rest }) => rest)).toEqual(named.sheets.map(({ instrument: _with, ...rest }) => rest));
      expect(used.entries).toBe(from.entries);
      expect(used.choices).toBe(from.choices);
    }));
  });

  test('keeps naming what the readings here were read with, though it has another instrument of that number', () => {
    const here = after(addInstrument({ name: 'my ruler' }), addSheet(sheet), addSheet(sheet), setSheetInstrument('s1', 'i1'));
    const bench = benchOf(after(addInstrument({ name: 'balance', measures: 'mass' }), setEntry('stripMass', { text: '2 g' }), setEntryInstrument('stripMass', 'i1')));
    const used = putBench(bench)(here);
    expect(used.instruments.map(({ id, name }) => [id, name])).toEqual([['i1', 'balance'], ['i2', 'my ruler']]);
    expect(used.sheets.map(({ instrument }) => instrument)).toEqual(['i2', undefined]);
    expect(used.entries.stripMass?.instrument).toBe('i1');
  });

  test('has the ruler of the readings once, where it is the same ruler', () => {
    const ruler = { name: 'steel ruler', serial: '7', scale: { text: '0.1 %', plusMinus: 'limits', k: '' } } as const;
    const here = after(addInstrument(ruler), addSheet(sheet), setSheetInstrument('s1', 'i1'));
    const used = putBench(benchOf(after(addInstrument({ name: 'balance' }), addInstrument(ruler))))(here);
    expect(used.instruments).toHaveLength(2);
    expect(used.sheets[0]?.instrument).toBe('i2');
  });

  test('of the demo stays marked as invented, and so do invented readings on another bench', () => {
    expect(sessionWithBench(demoSession()).demo).toBe(true);
    expect(putBench(benchOf(demoSession()))(emptySession()).demo).toBe(true);
    expect(putBench(benchOf(emptySession()))(demoSession()).demo).toBe(true);
    expect(putBench(benchOf(emptySession()))(sessionWithBench(demoSession())).demo).toBe(false);
  });

  test('is worth keeping once something is typed', () => {
    expect(isBlankBench(emptySession())).toBe(true);
    expect(isBlankBench(after(addSheet(sheet)))).toBe(true);
    expect(isBlankBench(after(setEntry('gravity', { text: '9.81' })))).toBe(false);
  });
});
