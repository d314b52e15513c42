import { describe, expect, test } from 'vitest';
import {
  addPart, addRow, addSheet, countAgain, ensureTypedSheet, nextSheetId, removeAddedRow, removePart, removeSheet, replaceSheet,
  setAside, setCell, setChoice, setColumn, setEntry, setFreeSwing, setKind, setKindOfAll, setPartEntry, setPartName, setSheetCut, setTitle,
} from '../../src/session/edits.ts';
import type { Edit } from '../../src/session/edits.ts';
import { emptySession, recordId } from '../../src/session/session.ts';
import type { Session } from '../../src/session/session.ts';

const after = (...edits: readonly Edit[]): Session => edits.reduce((session, edit) => edit(session), emptySession());

const paste: Parameters<typeof addSheet>[0] = {
  name: 'pasted', origin: 'paste', text: 'rest,first\n1,2\n1,3\n', sha256: 'ab', kindOfAll: null, edits: {}, added: [],
  columns: [{ role: 'rest', unit: 'mm', by: 'proposal' }, { role: 'firstSwing', unit: 'mm', by: 'proposal' }],
};

describe('bench entries', () => {
  test('a typed entry keeps its words, and what its ± means can change alone', () => {
    const session = after(setEntry('leverArm', { text: '118.0 ± 0.3 mm' }), setEntry('leverArm', { plusMinus: 'limits' }));
    expect(session.entries.leverArm).toEqual({ text: '118.0 ± 0.3 mm', plusMinus: 'limits', k: '' });
  });

  test('an entry emptied again leaves the session as if nothing was typed', () => {
    expect(after(setEntry('gravity', { text: '9.81' }), setEntry('gravity', { text: '' }))).toEqual(emptySession());
  });

  test('a choice, the title and the free swing change alone', () => {
    const session = after(setChoice('form', 'pointBob'), setTitle({ place: 'Cellar' }), setFreeSwing('3 -2 1 mm'));
    expect(session.choices).toEqual({ ...emptySession().choices, form: 'pointBob' });
    expect(session.title).toEqual({ ...emptySession().title, place: 'Cellar' });
    expect(session.freeSwing).toBe('3 -2 1 mm');
  });

  test('parts get ids of their own, and a removed part’s entries do not pass to another', () => {
    const session = after(addPart(), addPart(), setPartEntry('p1', 'mass', { text: '2 g' }), setPartName('p2', 'plate'), removePart('p1'), addPart('bob'));
    expect(session.parts).toEqual([{ id: 'p2', name: 'plate', entries: {} }, { id: 'p3', name: 'bob', entries: {} }]);
  });

  test('an edit leaves the session that it was given as it was', () => {
    const session = emptySession();
    setEntry('leverArm', { text: '1 mm' })(session);
    expect(session).toEqual(emptySession());
  });
});

describe('sheets', () => {
  test('sheets are numbered, and a number in use is not given again', () => {
    const session = after(addSheet(paste), addSheet(paste), removeSheet('s1'));
    expect(session.sheets.map((sheet) => sheet.id)).toEqual(['s2']);
    expect(nextSheetId(session)).toBe('s3');
  });

  test('a sheet taken out takes the marks of its records with it, and no others', () => {
    const session = after(addSheet(paste), addSheet(paste), setAside('s1/2', 'misfire'), setAside('s2/2', 'bumped'), removeSheet('s1'));
    expect(Object.keys(session.marks)).toEqual(['s2/2']);
  });

  test('the same file come again keeps columns, and marks and typed-over cells move with their lines', () => {
    const session = after(
      addSheet(paste), setColumn('s1', 1, { unit: 'cm' }), setCell('s1', '2', 0, '1.1'), setCell('s1', '3', 0, '1.2'),
      setAside('s1/2', 'misfire'), setAside('s1/3', 'bumped'), addRow('s1', ['4']), setKind('s1/+1', 'zero'),
      replaceSheet('s1', { text: 'longer', sha256: 'cd' }, { 2: '5' }),
    );
    const sheet = session.sheets[0];
    expect(sheet).toMatchObject({ text: 'longer', sha256: 'cd', name: 'pasted', edits: { 5: { 0: '1.1' } }, added: [{ id: '+1', cells: ['4'] }] });
    expect(sheet?.columns[1]).toEqual({ role: 'firstSwing', unit: 'cm', by: 'person' });
    expect(session.marks).toEqual({ 's1/5': { setAside: { reason: 'misfire' } }, 's1/+1': { kind: 'zero' } });
  });

  test('two lines that change places keep their own marks', () => {
    const session = after(addSheet(paste), setAside('s1/2', 'a'), setAside('s1/3', 'b'), replaceSheet('s1', { text: '', sha256: '' }, { 2: '3', 3: '2' }));
    expect(session.marks).toEqual({ 's1/3': { setAside: { reason: 'a' } }, 's1/2': { setAside: { reason: 'b' } } });
  });

  test('a column beyond those known gets its meaning from the person, those between are left out of the reduction', () => {
    const columns = after(addSheet(paste), setColumn('s1', 3, { role: 'note' })).sheets[0]?.columns;
    expect(columns?.slice(2)).toEqual([{ role: 'ignored', unit: '', by: 'proposal' }, { role: 'note', unit: '', by: 'person' }]);
  });

  test('how the text is cut can be said and taken back', () => {
    const said = after(addSheet(paste), setSheetCut('s1', { delimiter: ';', decimal: ',' }));
    expect(said.sheets[0]).toMatchObject({ delimiter: ';', decimal: ',' });
    const back = setSheetCut('s1', { delimiter: undefined })(said).sheets[0];
    expect(back).not.toHaveProperty('delimiter');
    expect(back).toHaveProperty('decimal', ',');
  });

  test('a cell typed over keeps the text as it came, and can be taken back', () => {
    const typed = after(addSheet(paste), setCell('s1', '2', 1, '2.5'), setKindOfAll('s1', 'shot'));
    expect(typed.sheets[0]).toMatchObject({ text: paste.text, edits: { 2: { 1: '2.5' } }, kindOfAll: 'shot' });
    expect(setCell('s1', '2', 1, null)(typed).sheets[0]?.edits).toEqual({});
  });

  test('rows typed by hand are filled cell by cell and go with their marks', () => {
    const typed = after(addSheet(paste), addRow('s1'), addRow('s1'), setCell('s1', '+2', 1, '7'), setAside(recordId('s1', '+1'), 'slip'));
    expect(typed.sheets[0]?.added).toEqual([{ id: '+1', cells: [] }, { id: '+2', cells: ['', '7'] }]);
    const without = removeAddedRow('s1', '+1')(typed);
    expect(without.sheets[0]?.added.map((row) => row.id)).toEqual(['+2']);
    expect(without.marks).toEqual({});
  });

  test('the sheet for typed rows is made once, with an angle unit where angles are read', () => {
    const session = after(setChoice('readingWay', 'angle'), ensureTypedSheet, ensureTypedSheet);
    expect(session.sheets).toHaveLength(1);
    expect(session.sheets[0]?.columns.map((column) => `${column.role} ${column.unit}`.trim())).toEqual([
      'kind', 'label', 'rest mrad', 'firstSwing mrad', 'nextSwing mrad', 'tapImpulse mN·s', 'voltage V', 'pressure Pa', 'note',
    ]);
  });
});

describe('records', () => {
  test('a record set aside and counted again keeps the kind that the person gave it', () => {
    const aside = after(setKind('s1/4', 'blank'), setAside('s1/4', 'misfire'));
    expect(aside.marks['s1/4']).toEqual({ kind: 'blank', setAside: { reason: 'misfire' } });
    expect(countAgain('s1/4')(aside).marks['s1/4']).toEqual({ kind: 'blank' });
  });

  test('a record with no decision left has no mark', () => {
    expect(after(setKind('s1/4', 'tap'), setAside('s1/4', 'x'), setKind('s1/4', null), countAgain('s1/4')).marks).toEqual({});
  });
});
