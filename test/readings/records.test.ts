/** Rows to records: kinds, quantities, what is wrong in a cell, rows typed over and typed by hand. */
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { readQuantity } from '../../src/units/quantity.ts';
import type { Dimension } from '../../src/units/units.ts';
import { readCell, secondsOfClock } from '../../src/readings/cellReads.ts';
import { recordsOf } from '../../src/readings/records.ts';
import type { SheetRecord } from '../../src/readings/records.ts';
import { drop, fixture } from './fixture.ts';

const codesOf = ({ problems }: SheetRecord): string[] => problems.map(({ code }) => code);
const only = <Item>(items: readonly Item[], index = 0): Item => {
  const item = items[index];
  if (item === undefined) throw new Error(`record ${index} of ${items.length}`);
  return item;
};

describe('readings', () => {
  test('a shot has its rest, swings and voltage in SI, with the decimals as written', () => {
    const first = only(drop(fixture('hand-table.csv')).records);
    expect(first).toMatchObject({ id: 's1/2', line: '2', kind: 'shot', kindBy: 'filledIn', label: '1', note: '', problems: [] });
    expect(first.rest).toEqual({ value: 0.012, spread: null, decimals: 1, unit: 'mm', text: '12.0' });
    expect(first.firstSwing?.value).toBeCloseTo(0.0155, 15);
    expect(first.nextSwings.map((cell) => cell?.value)).toEqual([expect.closeTo(0.0086, 15)]);
    expect(first.voltage?.value).toBe(1500);
    expect(first.pressure).toMatchObject({ value: 0.95, unit: '%' });
    expect([first.time, first.tapImpulse]).toEqual([null, null]);
  });

  test('a misfire with a rest, a voltage and no swing stays a shot, and says so', () => {
    const third = only(drop(fixture('hand-table.csv')).records, 2);
    expect(third).toMatchObject({ kind: 'shot', note: 'no fire', firstSwing: null });
    expect(third.problems).toMatchObject([{ code: 'cell-empty', place: { sheet: 's1', sheetName: 'bench.csv', line: 4, column: 'First swing (mm)', record: 's1/4' } }]);
  });

  test('decimal commas, kilovolts and kinds in French', () => {
    const { records } = drop(fixture('tabs-from-a-spreadsheet.tsv'));
    expect(records.map(({ kind, kindBy }) => [kind, kindBy])).toEqual([['shot', 'column'], ['tap', 'column'], ['shot', 'column']]);
    expect(only(records).voltage?.value).toBe(1500);
    expect(only(records).time?.value).toBe(9 * 3600 + 31 * 60);
    expect(only(records, 2).note).toBe('double éclair');
  });

  test('kinds of a German bench book', () => {
    const { records } = drop(fixture('semicolons-and-decimal-commas.csv'));
    expect(records.map(({ kind }) => kind)).toEqual(['zero', 'shot', 'shot', 'blank', 'freeSwing']);
    expect(records.flatMap(codesOf)).toEqual([]);
  });

  test('kinds of a Japanese bench book', () => {
    expect(drop(fixture('bench-in-japanese.csv')).records.map(({ kind }) => kind)).toEqual(['shot', 'tap', 'zero']);
  });

  test('a spread written in the cell is kept as written', () => {
    const { records } = drop('Shot,Rest (mm),First swing (mm)\n1,12.0 ± 0.2,15.5(3)\n2,12.0,15.1\n');
    expect(only(records).rest?.spread).toBeCloseTo(0.0002, 15);
    expect(only(records).firstSwing?.spread).toBeCloseTo(0.0003, 15);
  });

  test('angles come in radians', () => {
    expect(only(drop(fixture('angles.csv')).records).firstSwing?.value).toBeCloseTo((2.15 * Math.PI) / 180, 15);
  });

  test('arc seconds are no inches', () => {
    const { sheet, table } = drop('Rest,First\n1.0,2.0\n1.1,2.0\n');
    const columns = sheet.columns.map((column) => ({ ...column, unit: '″', by: 'person' as const }));
    expect(only(recordsOf({ ...sheet, columns }, table).records).rest?.value).toBeCloseTo(Math.PI / 648000, 15);
  });

  test('dashes and n/a are blanks', () => {
    const { records } = drop('Shot,Rest (mm),First swing (mm),Back swing (mm)\n1,12.0,15.5,-\n2,12.0,15.5,n/a\n');
    expect(records.flatMap(codesOf)).toEqual([]);
    expect(records.map(({ nextSwings }) => nextSwings)).toEqual([[null], [null]]);
  });

  test('notes break nothing, and several are joined', () => {
    const { records } = drop('Shot,Rest (mm),First swing (mm),Note,Remark\n1,12.0,15.5,"=1+1; ""loud"", 12,5","±µ\n🙂"\n');
    expect(only(records).note).toBe('=1+1; "loud", 12,5; ±µ\n🙂');
    expect(records.flatMap(codesOf)).toEqual([]);
  });
});

describe('plain numbers', () => {
  test('the short way of reading gives what the long way gives, digit for digit', () => {
    const digits = fc.stringMatching(/^-?\d{1,9}(\.\d{1,6})?$/);
    const unit = fc.constantFrom<readonly ['rest' | 'voltage' | 'pressure' | 'time' | 'tapImpulse', string, Dimension]>(
      ['rest', 'mm', 'length'], ['rest', 'in', 'length'], ['rest', '°', 'angle'], ['voltage', 'kV', 'voltage'], ['pressure', 'mTorr', 'pressure'], ['time', 'min', 'time'], ['tapImpulse', 'µN·s', 'impulse'],
    );
    fc.assert(fc.property(digits, unit, fc.constantFrom<'.' | ','>('.', ','), (number, [role, symbol, dimension], mark) => {
      const text = number.replace('.', mark);
      const long = readQuantity(text, dimension, symbol, mark);
      if (!long.ok) throw new Error(`${text} is refused`);
      expect(readCell(text, { role, unit: symbol, by: 'person' }, mark, false)).toEqual({ value: long.value, spread: null, decimals: long.decimals, unit: long.unit.symbol, text });
    }));
  });

  test('a number beyond all measure is a slip', () => {
    for (const text of ['999999999999999', '1e300', '9'.repeat(60)]) {
      expect(readCell(text, { role: 'voltage', unit: 'V', by: 'person' }, '.', false)).toEqual({ code: 'cell-not-a-number', found: text });
    }
  });
});

describe('clock times', () => {
  // ISO 8601 and 12-hour clock: from memory.
  test.each([
    ['14:02', 50520], ['14:02:31', 50551], ['14:02:31,5', 50551.5], ['2:02 pm', 50520], ['12:00 am', 0], ['00:00', 0],
    ['1970-01-02', 86400], ['1970-01-01 00:01', 60], ['1970-01-01T00:01:05Z', 65], ['1970-01-01T01:00:00+01:00', 0],
  ])('%s', (text, seconds) => {
    expect(secondsOfClock(text)).toBe(seconds);
  });

  test.each(['25:00', '14:61', '13:00 pm', '1970-13-01'])('%s is no time', (text) => {
    expect(secondsOfClock(text)).toBeNull();
  });

  test('plain numbers take the column’s unit', () => {
    expect(only(drop('Shot,Time (min),Rest (mm),First (mm)\n1,1.5,12.0,15.5\n').records).time?.value).toBe(90);
  });
});

describe('kinds', () => {
  const tableOf = (rows: string): string => `Kind,Rest (mm),First swing (mm),Hammer impulse (mN.s)\n${rows}`;

  test('told from what is filled in', () => {
    const { records } = drop(tableOf(',12.0,15.5,\n,12.0,15.5,1.2\n,12.0,,\n'));
    expect(records.map(({ kind, kindBy }) => [kind, kindBy])).toEqual([['shot', 'filledIn'], ['tap', 'filledIn'], ['zero', 'filledIn']]);
  });

  test('a head that reads Tap makes taps of rows that have no impulse', () => {
    expect(drop(fixture('taps-by-hammer-angle.csv')).records.map(({ kind }) => kind)).toEqual(['tap', 'tap']);
  });

  test('a mark goes before the column, the column before the sheet, the sheet before what is filled in', () => {
    const { sheet, table } = drop(tableOf('shot,12.0,15.5,\nshot,12.0,15.5,\n,12.0,15.5,\n'));
    const { records } = recordsOf({ ...sheet, kindOfAll: 'tap' }, table, { 's1/2': 'blank' });
    expect(records.map(({ kind, kindBy }) => [kind, kindBy])).toEqual([['blank', 'person'], ['shot', 'column'], ['tap', 'sheet']]);
  });

  test('a word that names no kind is told, and the row still counts', () => {
    const { records } = drop(tableOf('shot,12.0,15.5,\nwhoosh,12.0,15.5,\n'));
    expect(only(records, 1)).toMatchObject({ kind: 'shot', kindBy: 'filledIn', problems: [{ code: 'cell-kind-unknown', facts: { found: 'whoosh' }, place: { line: 3, column: 'Kind' } }] });
  });
});

describe('spoiled cells', () => {
  test('a word where a number should be costs its row, with its place', () => {
    const { records, problems } = drop('Shot,Rest (mm),First swing (mm)\n1,12.0,15.5\n2,twelve,15.5\n3,12.0,15.1\n');
    expect(problems).toEqual([]);
    expect(records.map(({ rest }) => rest?.value ?? null)).toEqual([0.012, null, 0.012]);
    expect(records.map(codesOf)).toEqual([[], ['cell-not-a-number'], []]);
    expect(only(only(records, 1).problems)).toMatchObject({
      weight: 'stops', place: { sheet: 's1', sheetName: 'bench.csv', line: 3, column: 'Rest (mm)', record: 's1/3' }, facts: { found: 'twelve', role: 'rest', unit: 'mm' },
    });
  });

  test('units in cells are read, foreign and unknown ones are told', () => {
    const { records } = drop(fixture('cells-with-units.csv'));
    expect(records.map(codesOf)).toEqual([[], [], ['cell-wrong-kind-of-unit'], ['cell-unknown-unit']]);
    expect(only(records, 1).firstSwing?.value).toBeCloseTo(0.0155, 15);
  });

  test('a decimal mark other than the table’s is never guessed at', () => {
    const { records } = drop('Shot;Rest (mm);First swing (mm)\n1;12,5;15,5\n2;12,5;15,1\n3;12.5;15,1\n');
    expect(records.map(codesOf)).toEqual([[], [], ['cell-not-a-number']]);
  });

  test('a row torn at its decimal commas gives no number until it is typed over', () => {
    const { records, sheet, table } = drop(fixture('decimal-commas-in-a-comma-table.csv'));
    expect(only(records)).toMatchObject({ rest: null, firstSwing: null, problems: [{ code: 'decimal-comma-in-comma-file', place: { line: 2, record: 's1/2' } }] });
    expect(only(records, 1).rest?.value).toBe(0.012);
    const mended = recordsOf({ ...sheet, edits: { '2': { 0: '1', 1: '12,0', 2: '15,5', 3: 'bright' } } }, table).records;
    expect(only(mended)).toMatchObject({ rest: { value: 0.012 }, problems: [] });
  });

  test('no column for the first swing, and two for the rest', () => {
    const { sheet, table } = drop('Shot,Rest (mm),First swing (mm)\n1,12.0,15.5\n');
    const without = sheet.columns.map((column) => (column.role === 'firstSwing' ? { ...column, role: 'rest' as const, by: 'person' as const } : column));
    expect(recordsOf({ ...sheet, columns: without }, table).problems).toMatchObject([
      { code: 'column-twice', facts: { role: 'rest', used: 'Rest (mm)' }, place: { column: 'First swing (mm)' } },
      { code: 'column-missing', weight: 'doubt', facts: { role: 'firstSwing' } },
    ]);
    expect(recordsOf({ ...sheet, columns: without, kindOfAll: 'shot' }, table).problems.at(-1)).toMatchObject({ code: 'column-missing', weight: 'stops' });
    expect(recordsOf({ ...sheet, columns: without, kindOfAll: 'zero' }, table).problems.map(({ code }) => code)).toEqual(['column-twice']);
  });

  test('no column for the rest', () => {
    expect(drop(fixture('taps-by-impulse.csv')).problems).toMatchObject([{ code: 'column-missing', weight: 'doubt', facts: { role: 'rest' } }]);
  });

  test('a column whose unit does not fit is read in the usual one', () => {
    const { sheet, table } = drop('Rest (mm),First swing (mm)\n12.0,15.5\n');
    const columns = sheet.columns.map((column) => ({ ...column, unit: 'kg', by: 'person' as const }));
    expect(only(recordsOf({ ...sheet, columns }, table).records).rest?.value).toBe(0.012);
  });
});

describe('what a person types', () => {
  test('cells typed over count and are marked; the text stays as it was', () => {
    const { sheet, table } = drop('Shot,Rest (mm),First swing (mm)\n1,12.0,gone\n');
    const { records } = recordsOf({ ...sheet, edits: { '2': { 2: '15,4', 4: 'late' } } }, table);
    expect(only(records)).toMatchObject({ edited: [2, 4], cells: ['1', '12.0', '15,4', '', 'late'], problems: [] });
    expect(only(records).firstSwing?.value).toBeCloseTo(0.0154, 15);
    expect(table.rows[0]?.cells[2]).toBe('gone');
  });

  test('rows typed by hand follow those of the text, as +1, +2', () => {
    const { sheet, table } = drop('Shot,Rest (mm),First swing (mm)\n1,12.0,15.5\n');
    const { records } = recordsOf({ ...sheet, added: [{ id: '1', cells: ['2', '12,5'] }, { id: '+2', cells: ['3', '12.5', 'x'] }] }, table);
    expect(records.map(({ id }) => id)).toEqual(['s1/2', 's1/+1', 's1/+2']);
    expect(only(records, 1)).toMatchObject({ rest: { value: 0.0125 }, cells: ['2', '12,5', ''] });
    expect(only(only(records, 2).problems).place).toEqual({ sheet: 's1', sheetName: 'bench.csv', record: 's1/+2', column: 'First swing (mm)' });
  });

  test('a sheet typed by hand from nothing is not an empty file', () => {
    const columns = (['rest', 'firstSwing'] as const).map((role) => ({ role, unit: 'mm', by: 'person' as const }));
    const { records, problems } = drop('', { origin: 'typed', columns, added: [{ id: '1', cells: ['12.0', '15.5'] }] });
    expect(problems).toEqual([]);
    expect(only(records)).toMatchObject({ kind: 'shot', line: '+1' });
  });
});
