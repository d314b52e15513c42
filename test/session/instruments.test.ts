import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import {
  addInstrument, addPart, addSheet, removeInstrument, setEntry, setEntryInstrument, setInstrument, setInstrumentScale, setPartEntry, setPartEntryInstrument, setSheetInstrument, type Edit,
} from '../../src/session/edits.ts';
import { sessionFromText, sessionToText } from '../../src/session/file.ts';
import { emptySession, type Session } from '../../src/session/session.ts';

const after = (...edits: readonly Edit[]): Session => edits.reduce((session, edit) => edit(session), emptySession());
const sheet: Parameters<typeof addSheet>[0] = { name: 'run', origin: 'paste', text: '', sha256: '', columns: [], kindOfAll: null, edits: {}, added: [] };

const MEASURED_WITH: readonly Edit[] = [
  addInstrument({ name: 'steel ruler', serial: '4711', certificate: 'C-12', due: '31.3.2027' }), setInstrumentScale('i1', { text: '0.05 %', plusMinus: 'limits' }),
  addInstrument({ name: 'balance', measures: 'mass' }),
  setEntry('leverArm', { text: '118.0 ± 0.3 mm' }), setEntryInstrument('leverArm', 'i1'), addPart('plate'), setPartEntry('p1', 'mass', { text: '6 g' }), setPartEntryInstrument('p1', 'mass', 'i2'),
  addSheet(sheet), setSheetInstrument('s1', 'i1'),
];
const session = after(...MEASURED_WITH);
const named = ({ entries, parts, sheets }: Session): readonly string[] =>
  [...Object.values(entries), ...parts.flatMap((part) => Object.values(part.entries)), ...sheets].flatMap(({ instrument }) => (instrument === undefined ? [] : [instrument]));

const anyEdit: fc.Arbitrary<Edit> = fc.oneof(
  fc.constantFrom(...MEASURED_WITH, addInstrument(), addSheet(sheet), addPart()),
  fc.record({ id: fc.constantFrom('i1', 'i2', 'i3'), text: fc.string({ maxLength: 8 }) }).chain(({ id, text }) => fc.constantFrom<Edit>(
    removeInstrument(id), setInstrument(id, { name: text, due: text }), setInstrumentScale(id, { text }),
  )),
);

describe('instruments', () => {
  test('are written to the session’s file and read back as typed', () => {
    expect(sessionFromText(sessionToText(session))).toEqual({ session, problems: [] });
  });

  test('whatever is added, named and taken out, nothing names one that is not there, and the file reads back whole', () => {
    fc.assert(fc.property(fc.array(anyEdit, { maxLength: 20 }), (edits) => {
      // A name is given on the page to an instrument that is there; the edits here may come in any order.
      const made = edits.reduce((so, edit) => {
        const next = edit(so);
        return named(next).every((id) => next.instruments.some((one) => one.id === id)) ? next : so;
      }, emptySession());
      expect(sessionFromText(sessionToText(made))).toEqual({ session: made, problems: [] });
    }));
  });

  test('one taken out leaves what it measured as typed, and the others where they are', () => {
    const without = removeInstrument('i1')(session);
    expect(without.entries.leverArm).toEqual({ text: '118.0 ± 0.3 mm', plusMinus: 'standard', k: '' });
    expect(without.sheets).toEqual([{ ...sheet, id: 's1' }]);
    expect(without.instruments.map(({ id }) => id)).toEqual(['i2']);
    expect(named(without)).toEqual(['i2']);
    expect(addInstrument()(without).instruments.map(({ id }) => id)).toEqual(['i2', 'i3']);
  });

  test('an entry emptied still names what it is measured with, until that is taken back too', () => {
    const emptied = setEntry('leverArm', { text: '' })(session);
    expect(emptied.entries.leverArm).toEqual({ text: '', plusMinus: 'standard', k: '', instrument: 'i1' });
    expect(setEntryInstrument('leverArm', null)(emptied).entries.leverArm).toBeUndefined();
  });

  test('a file from before there were instruments opens without a word', () => {
    const plain = JSON.parse(sessionToText(setEntry('gravity', { text: '9.81' })(emptySession()))) as Record<string, unknown>;
    delete plain['instruments'];
    expect(sessionFromText(JSON.stringify(plain))).toEqual({ session: setEntry('gravity', { text: '9.81' })(emptySession()), problems: [] });
  });

  test('a name of an instrument that is not there is left out and told, and the quantity stays', () => {
    const plain = JSON.parse(sessionToText(session)) as Record<string, unknown>;
    plain['instruments'] = [session.instruments[1], session.instruments[1], { name: 'without an id' }];
    const { session: read, problems } = sessionFromText(JSON.stringify(plain));
    expect(problems.map(({ code, facts }) => [code, facts['where']])).toEqual([
      ['session-damaged', 'instruments[2]'], ['session-damaged', 'instruments[3]'], ['session-damaged', 'entries.leverArm.instrument'], ['session-damaged', 'sheets[1].instrument'],
    ]);
    expect(read?.entries.leverArm).toEqual({ text: '118.0 ± 0.3 mm', plusMinus: 'standard', k: '' });
    expect(read?.parts).toEqual(session.parts);
  });
});
