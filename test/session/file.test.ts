import { describe, expect, test } from 'vitest';
import { addPart, addRow, addSheet, setAside, setCell, setEntry, setKind, setPartEntry, setSheetCut } from '../../src/session/edits.ts';
import type { Edit } from '../../src/session/edits.ts';
import { sessionFromText, sessionToText } from '../../src/session/file.ts';
import { emptySession } from '../../src/session/session.ts';
import type { Session } from '../../src/session/session.ts';

const EDITS: readonly Edit[] = [
  setEntry('leverArm', { text: '118.0(3) mm', plusMinus: 'expanded', k: '2,5' }),
  addPart('plate'),
  setPartEntry('p1', 'mass', { text: '12,5 g' }),
  addSheet({
    name: 'Läufe.csv', origin: 'file', text: '\uFEFFa;b\r\n1,5;2\r\n', sha256: '00ff', kindOfAll: 'shot', edits: {}, added: [],
    columns: [{ role: 'rest', unit: 'mm', by: 'person' }, { role: 'firstSwing', unit: 'mm', by: 'proposal' }],
  }),
  setSheetCut('s1', { delimiter: ';', decimal: ',' }),
  setCell('s1', '2', 1, '2.5'),
  addRow('s1', ['1', '2']),
  setAside('s1/2', 'misfire'),
  setKind('s1/+1', 'zero'),
];
const session: Session = EDITS.reduce((made, edit) => edit(made), emptySession());

const spoiled = (spoil: (plain: Record<string, unknown>) => void): string => {
  const plain = JSON.parse(sessionToText(session)) as Record<string, unknown>;
  spoil(plain);
  return JSON.stringify(plain);
};
const codes = (text: string): readonly string[] => sessionFromText(text).problems.map((found) => found.code);

describe('the session file', () => {
  test('a session written and read is the same session, to the letter', () => {
    const back = sessionFromText(sessionToText(session));
    expect(back).toEqual({ session, problems: [] });
    expect(sessionToText(back.session ?? emptySession())).toBe(sessionToText(session));
  });

  test('a byte-order mark before the session does no harm', () => {
    expect(sessionFromText(`\uFEFF${sessionToText(session)}`).session).toEqual(session);
  });

  test('a text that is no JSON, JSON that is no session, and a later version are told apart', () => {
    expect(codes('rest,first\n1,2')).toEqual(['session-not-json']);
    expect(codes('[1,2]')).toEqual(['session-not-ours']);
    expect(codes('{"format":"something"}')).toEqual(['session-not-ours']);
    expect(codes(spoiled((plain) => (plain['version'] = 7)))).toEqual(['session-newer']);
  });

  test('a damaged piece is left out and told, and the rest is kept', () => {
    const { session: read, problems } = sessionFromText(spoiled((plain) => {
      plain['entries'] = { leverArm: { text: 'kept' }, gravity: 9.81, unheardOf: { text: '1' } };
      plain['choices'] = { form: 'flyingCarpet', route: 'massesAndPeriod' };
      plain['marks'] = { 's1/2': { kind: 'ufo', setAside: { reason: 'misfire' } } };
    }));
    expect(problems.map((found) => found.facts['where'])).toEqual(['entries.gravity', 'entries.unheardOf', 'choices.form', 'marks.s1/2.kind']);
    expect(read?.entries).toEqual({ leverArm: { text: 'kept', plusMinus: 'standard', k: '' } });
    expect(read?.choices).toEqual({ ...emptySession().choices, route: 'massesAndPeriod' });
    expect(read?.marks).toEqual({ 's1/2': { setAside: { reason: 'misfire' } } });
    expect(read?.sheets).toEqual(session.sheets);
  });

  test('of two sheets or parts with one id the first is kept', () => {
    const { session: read, problems } = sessionFromText(spoiled((plain) => {
      plain['sheets'] = [...session.sheets, ...session.sheets];
      plain['parts'] = [...session.parts, { name: 'without an id' }];
    }));
    expect(read?.sheets).toEqual(session.sheets);
    expect(read?.parts).toEqual(session.parts);
    expect(problems).toHaveLength(2);
  });

  test('a list where an object belongs, and a cell that is no text, cost themselves and no more', () => {
    const { session: read, problems } = sessionFromText(spoiled((plain) => {
      plain['title'] = ['x'];
      plain['sheets'] = [{ ...session.sheets[0], edits: { 2: { 1: 5, 0: 'kept' } }, added: [{ id: 'no plus', cells: [] }] }];
    }));
    expect(read?.title).toEqual(emptySession().title);
    expect(read?.sheets[0]).toMatchObject({ edits: { 2: { 0: 'kept' } }, added: [] });
    expect(problems).toHaveLength(3);
  });

  test('a key named as an object’s own machinery is read as a plain key', () => {
    const { session: read } = sessionFromText(sessionToText(session).replace('"s1/2"', '"__proto__"'));
    expect(Object.keys(read?.marks ?? {})).toContain('__proto__');
  });
});
