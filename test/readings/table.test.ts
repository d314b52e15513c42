/** From a text to a table: delimiter, decimal mark, preamble, header, units row, lines. */
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { readTable } from '../../src/readings/table.ts';
import { fixture } from './fixture.ts';

const codes = (text: string): string[] => readTable(text).problems.map(({ code }) => code);

describe('hand tables as people have them', () => {
  test('a comma table with a decimal point, blank cells and notes', () => {
    const table = readTable(fixture('hand-table.csv'));
    expect(table).toMatchObject({ delimiter: ',', decimal: '.', headerLine: 1, preamble: [], problems: [] });
    expect(table.headers).toEqual(['Shot', 'Volts', 'Rest (mm)', 'First swing (mm)', 'Back swing (mm)', 'Vacuum (%)', 'Note']);
    expect(table.unitTexts).toEqual([null, 'Volts', 'mm', 'mm', 'mm', '%', null]);
    expect(table.rows).toEqual([
      { line: 2, cells: ['1', '1500', '12.0', '15.5', '8.6', '95', ''] },
      { line: 3, cells: ['2', '1500', '12.0', '15.0', '', '95', 'double flash'] },
      { line: 4, cells: ['3', '1480', '12.5', '', '', '95', 'no fire'] },
    ]);
  });

  test('semicolons, decimal commas, byte-order mark and CRLF', () => {
    const table = readTable(fixture('semicolons-and-decimal-commas.csv'));
    expect(table).toMatchObject({ delimiter: ';', decimal: ',', headerLine: 1, problems: [] });
    expect(table.headers[0]).toBe('Nr');
    expect(table.rows.at(1)).toEqual({ line: 3, cells: ['2', 'Schuss', '14:05:31', '1500', '12,0', '15,5', '8,6', 'hell, laut'] });
  });

  test('tabs from a spreadsheet', () => {
    const table = readTable(fixture('tabs-from-a-spreadsheet.tsv'));
    expect(table).toMatchObject({ delimiter: '\t', decimal: ',', headerLine: 1, problems: [] });
    expect(table.unitTexts).toEqual([null, null, null, 'kV', 'mm', 'mm', 'mm', 'Pa', null]);
  });

  test('a units row beneath the header is no row of readings', () => {
    const table = readTable(fixture('units-row.csv'));
    expect(table.unitTexts).toEqual([null, 'kV', 'cm', 'cm', 'cm', 'mTorr', null]);
    expect(table.rows.map(({ line }) => line)).toEqual([3, 4]);
  });

  test('preamble, comments and blank lines are kept aside, and lines are those of the editor', () => {
    const table = readTable(fixture('preamble.csv'));
    expect(table).toMatchObject({ delimiter: ';', headerLine: 6, problems: [] });
    expect(table.preamble.map(({ line }) => line)).toEqual([1, 2, 3, 4, 9, 11]);
    expect(table.preamble[3]?.text).toBe('Pressure: 20 Pa, gauge on the lid');
    expect(table.rows.map(({ line, cells }) => [line, cells[0]])).toEqual([[7, '1'], [10, '2']]);
  });

  test('without a header the first line is readings', () => {
    const table = readTable(fixture('no-header.csv'));
    expect(table).toMatchObject({ delimiter: ';', decimal: ',', headerLine: null, headers: ['', '', '', '', ''], problems: [] });
    expect(table.rows).toHaveLength(4);
  });

  test('one column of timings', () => {
    const table = readTable(fixture('period-timings.csv'));
    expect(table).toMatchObject({ headerLine: 1, headers: ['Time for 20 swings (s)'], unitTexts: ['s'] });
    expect(table.rows.map(({ cells }) => cells)).toEqual([['13.82'], ['13.84'], ['13.81']]);
  });

  test('the head of a recorder’s file is preamble', () => {
    const table = readTable(fixture('sensor-trace.csv'));
    expect(table).toMatchObject({ headerLine: 6, headers: ['Time (s)', 'Displacement (um)', 'Trigger (V)'] });
    expect(table.preamble).toHaveLength(5);
  });

  test('a camera’s two header rows: names, then units', () => {
    // px is no unit of ours, so the second row is told apart by its blank first cell only where all others are units.
    const table = readTable('frame,t,x,y\n,s,mm,mm\n0,0.000,412.1,233.0\n1,0.033,412.4,233.1\n');
    expect(table).toMatchObject({ headerLine: 1, unitTexts: [null, 's', 'mm', 'mm'] });
    expect(readTable(fixture('camera.csv')).headers).toEqual(['frame', 't', 'x', 'y']);
  });

  test('the last comment above bare numbers is their header where it is cut alike', () => {
    const table = readTable('# Nr, Rest (mm), First swing (mm)\n1,12.0,15.5\n2,12.0,15.1\n');
    expect(table).toMatchObject({ headerLine: 1, headers: ['Nr', 'Rest (mm)', 'First swing (mm)'], preamble: [] });
  });

  test('a number sign heads a column of shots and starts a shot’s name', () => {
    expect(readTable('#;Rest (mm);Swing (mm)\n1;12,0;15,5').headers[0]).toBe('#');
    expect(readTable('Shot,Rest (mm),Swing (mm)\n#1,12.0,15.5\n#2,12.0,15.1\n# vented\n').rows).toHaveLength(2);
  });

  test('a header that comes again is no row', () => {
    const table = readTable('Shot,Rest (mm),First (mm)\n1,12.0,15.5\nShot,Rest (mm),First (mm)\n2,12.0,15.4\n');
    expect(table.rows.map(({ line }) => line)).toEqual([2, 4]);
    expect(table.preamble).toEqual([{ line: 3, text: 'Shot,Rest (mm),First (mm)' }]);
  });
});

describe('delimiter and decimal mark', () => {
  test.each([
    ['12,5;13,1\n12,4;13,3\n', ';', ','],
    ['12.5,13.1\n12.4,13.3\n', ',', '.'],
    ['12,5\t13,1\n12,4\t13,3\n', '\t', ','],
    ['Rest;First\n12.5;13.1\n', ';', '.'],
    ['Shot,Rest,First,Note\n1,12.0,15.5,dim; late\n2,12.0,15.4,dim; late\n', ',', '.'],
    ['Rest (mm),First (mm)\n"12,5","15,5"\n"12,5","15,1"\n', ',', ','],
    ['Bench, in the cellar, dry\nRest;First;Note\n12,5;15,5;a, b\n12,5;15,6;\n', ';', ','],
    ['Shot;V;Rest\n1;1,500;12.5\n2;1,480;12.4\n', ';', '.'],
    ['Rest\n12.5\n12.6\n', ',', '.'],
  ] as const)('%j has %j and decimal %j', (text, delimiter, decimal) => {
    expect(readTable(text)).toMatchObject({ delimiter, decimal, problems: [] });
  });

  test('a person’s choice goes before what is found', () => {
    expect(readTable('a;b\n1;2\n', { delimiter: ',', decimal: ',' })).toMatchObject({ delimiter: ',', decimal: ',', headers: ['a;b'] });
  });
});

describe('units in headers', () => {
  test.each([
    ['Rest (mm)', 'mm'], ['zero [mm]', 'mm'], ['Rest / mm', 'mm'], ['Rest, mm', 'mm'], ['Rest in mm', 'mm'], ['rest_mm', 'mm'], ['Rest: mm', 'mm'],
    ['Hammer impulse (mN.s)', 'mN.s'], ['kV', 'kV'], ['Druck in mbar', 'mbar'], ['Vacuum (-kPa)', '-kPa'],
  ])('%s', (header, unit) => {
    expect(readTable(`No\t${header}\n1\t2.0\n`).unitTexts[1]).toBe(unit);
  });

  test.each(['Second', 'Shot no.', 'Note', 'Swing back/forth', 'N'])('%s names none', (header) => {
    expect(readTable(`No\t${header}\n1\t2.0\n`).unitTexts[1]).toBeNull();
  });
});

describe('spoiled tables', () => {
  test('an empty text, blank lines alone', () => {
    expect(codes('')).toEqual(['file-empty']);
    expect(codes('\ufeff\r\n \n')).toEqual(['file-empty']);
  });

  test('a header without rows, comments without rows', () => {
    expect(codes('Shot,Rest (mm),First swing (mm)\n')).toEqual(['file-no-rows']);
    expect(codes('# nothing yet\n')).toEqual(['file-no-rows']);
  });

  test('a row that is too long or too short is kept and told', () => {
    const table = readTable('Shot,Rest (mm),First (mm)\n1,12.0,15.5\n2,12.0,15.5,slipped\n3,12.0\n');
    expect(table.problems).toMatchObject([
      { code: 'row-ragged', weight: 'doubt', place: { line: 3 }, facts: { found: 4, expected: 3 } },
      { code: 'row-ragged', weight: 'note', place: { line: 4 }, facts: { found: 2, expected: 3 } },
    ]);
    expect(table.rows.map(({ cells }) => cells)).toEqual([['1', '12.0', '15.5'], ['2', '12.0', '15.5', 'slipped'], ['3', '12.0', '']]);
  });

  test('delimiters past the last column are no cells', () => {
    expect(readTable('Rest (mm),First (mm),,\n12.0,15.5,,\n').problems).toEqual([]);
  });

  test('notes beneath no header are a column of their own', () => {
    expect(readTable('Rest (mm),First (mm)\n12.0,15.5,dim\n12.0,15.4,dim\n')).toMatchObject({ headers: ['Rest (mm)', 'First (mm)', ''], problems: [] });
  });

  test('a decimal comma in a comma table is told with its line, and only there', () => {
    const { problems } = readTable(fixture('decimal-commas-in-a-comma-table.csv'));
    expect(problems).toMatchObject([
      { code: 'decimal-comma-in-comma-file', weight: 'stops', place: { line: 2 }, facts: { found: '12,0' } },
      { code: 'decimal-comma-in-comma-file', weight: 'stops', place: { line: 4 }, facts: { found: '12,5' } },
    ]);
  });

  test.each([
    'Rest,First\n12,5,15,0\n12,0,15,5\n',
    'Shot,Rest,First,Back,Note\n1,12,5,15,5\n2,12,0,15,1\n3,12,0,15,4\n',
    'Rest,First,Back,Vacuum,Note\n12,5,15,5\n12,0,15,1\n',
    '12,5,15,1\n12,3,15,7\n13,1,16,2\n',
  ])('torn numbers do not pass unseen: %j', (text) => {
    expect(codes(text)).toContain('decimal-comma-in-comma-file');
  });

  test.each([
    'Shot,Rest,First\n1,12,15\n2,12,16\n3,12,15\n',
    '1,12.5,15\n2,12.5,16\n3,12.5,16\n',
    'Shot,Volts,Rest (mm),First swing (mm)\n1,1500,12,15\n2,1500,12\n',
  ])('whole numbers in a comma table are not taken for torn ones where columns agree: %j', (text) => {
    const torn = readTable(text).problems.filter(({ code, place }) => code === 'decimal-comma-in-comma-file' && place.line !== 3);
    expect(torn).toEqual([]);
  });

  test('both decimal marks in one table are told', () => {
    expect(readTable('Rest;First\n12,5;15,5\n12.5;15,5\n').problems).toMatchObject([{ code: 'decimal-marks-mixed', facts: { commas: 3, points: 1, taken: ',' } }]);
  });

  test('a quotation mark left open costs no further row', () => {
    const table = readTable(fixture('quotation-marks.csv'));
    expect(table.problems).toMatchObject([{ code: 'quote-not-closed', place: { line: 5 } }]);
    expect(table.rows.map(({ line }) => line)).toEqual([2, 4, 5, 6]);
    expect(table.rows[1]?.cells[3]).toBe('3.5" ruler');
  });
});

describe('for any text', () => {
  const pieces = fc.array(fc.constantFrom('12,5', '12.5', 'Rest (mm)', '"', ';', ',', '\t', '\n', '\r', '#', '//', '%', ' ', '14:02', '±', '\u0000', 'ß', '静止', '-', '1e5', '\ufeff'), { maxLength: 60 });

  test('a table comes back, and nothing is thrown', () => {
    fc.assert(fc.property(fc.oneof(fc.string({ unit: 'binary', maxLength: 200 }), pieces.map((all) => all.join(''))), (text) => {
      const table = readTable(text);
      expect(table.unitTexts).toHaveLength(table.headers.length);
      expect(table.rows.every(({ cells }) => cells.length >= table.headers.length)).toBe(true);
    }), { numRuns: 500 });
  });

  test('lines count up, and every line stands once at most', () => {
    fc.assert(fc.property(pieces, (all) => {
      const { rows, preamble, headerLine } = readTable(all.join(''));
      const lines = [...rows, ...preamble].map(({ line }) => line);
      expect(new Set(lines).size).toBe(lines.length);
      expect(lines).not.toContain(headerLine);
      expect(rows.every(({ line }, i) => i === 0 || line > (rows[i - 1]?.line ?? 0))).toBe(true);
    }), { numRuns: 300 });
  });

  test('readings written in any of the three dialects are read as the same table', () => {
    const number = fc.integer({ min: -999, max: 999 }).map((n) => n / 10);
    fc.assert(fc.property(fc.array(fc.tuple(number, number), { minLength: 2, maxLength: 10 }), fc.constantFrom(',.', ';.', ';,', '\t,', '\t.'), (readings, dialect) => {
      const [delimiter = ',', mark = '.'] = dialect;
      const text = [`Rest (mm)${delimiter}First swing (mm)`, ...readings.map((row) => row.map((n) => n.toFixed(1).replace('.', mark)).join(delimiter))].join('\n');
      const table = readTable(text);
      expect(table).toMatchObject({ delimiter, decimal: mark, problems: [] });
      expect(table.rows.map(({ cells }) => cells.map((cell) => Number(cell.replace(',', '.'))))).toEqual(readings.map((row) => row.map((n) => Number(n.toFixed(1)))));
    }));
  });
});
