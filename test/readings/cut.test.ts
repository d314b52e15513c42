/** Cutting text into cells, against RFC 4180 and the csv-spectrum acid tests. */
import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { cutRows } from '../../src/readings/cut.ts';
import type { Delimiter } from '../../src/readings/cut.ts';

interface Acid {
  readonly csv: string;
  readonly rows: readonly Readonly<Record<string, string>>[];
}

const ACID = JSON.parse(readFileSync(new URL('../reference/csv-spectrum.json', import.meta.url), 'utf8')) as Record<string, Acid>;

const cells = (text: string, delimiter: Delimiter = ','): string[][] => cutRows(text, delimiter).rows.map((row) => row.cells);
const filledRows = (text: string): string[][] => cells(text).filter((row) => row.length > 1);

describe('csv-spectrum 2.0.0', () => {
  test.each(Object.entries(ACID))('%s is cut as published', (_, { csv, rows }) => {
    const [header = [], ...body] = filledRows(csv);
    expect(body.map((row) => Object.fromEntries(row.map((cell, i) => [header[i] ?? '', cell])))).toEqual(rows);
  });
});

// RFC 4180 section 2, rules from memory.
describe('RFC 4180', () => {
  test('lines end in CRLF, and the last may lack its end', () => {
    expect(cells('aaa,bbb\r\nzzz,yyy')).toEqual([['aaa', 'bbb'], ['zzz', 'yyy']]);
  });

  test('spaces belong to the cell', () => {
    expect(cells(' a , b ')).toEqual([[' a ', ' b ']]);
  });

  test('quoted cells hold line ends, commas and doubled quotation marks', () => {
    expect(cells('"aaa","b\r\nbb","c,c"\r\n"z""z",y,x')).toEqual([['aaa', 'b\r\nbb', 'c,c'], ['z"z', 'y', 'x']]);
  });
});

describe('lines', () => {
  test('a row after a quoted line end keeps its physical line', () => {
    const { rows } = cutRows('h,k\n"one\ntwo\nthree",2\n5,6\n', ',');
    expect(rows.slice(0, 3).map(({ line }) => line)).toEqual([1, 2, 5]);
  });

  test.each(['\n', '\r\n', '\r'])('line ends of one kind are counted alike (%j)', (end) => {
    const { rows } = cutRows(['a,b', '1,2', '', '3,4'].join(end), ',');
    expect(rows.map(({ line, cells: row }) => [line, row.length])).toEqual([[1, 2], [2, 2], [3, 1], [4, 2]]);
  });

  test('mixed line ends are counted each once', () => {
    expect(cutRows('a\r\nb\nc\rd', ',').rows.map(({ line, cells: [cell] }) => `${line}${cell ?? ''}`)).toEqual(['1a', '2b', '3c', '4d']);
  });

  test('a quotation mark left open costs its line and no other', () => {
    const { rows, badQuotes } = cutRows('a,b\n1,"open\n2,"fine, yes"\n3,x\n', ',');
    expect(badQuotes).toEqual([2]);
    expect(rows.filter((row) => row.cells.length > 1)).toEqual([
      { line: 1, cells: ['a', 'b'] },
      { line: 2, cells: ['1', '"open'] },
      { line: 3, cells: ['2', 'fine, yes'] },
      { line: 4, cells: ['3', 'x'] },
    ]);
  });
});

const quoted = (cell: string): string => `"${cell.replaceAll('"', '""')}"`;
const anyDelimiter = fc.constantFrom<Delimiter>(',', ';', '\t');

describe('for any table', () => {
  test('cells joined with quotation marks are cut into the same cells', () => {
    // A lone CR beside LF is a line end of another kind and comes back as LF, so that lines can be counted.
    const cell = fc.string({ unit: 'grapheme' }).map((text) => text.replaceAll('\r', ''));
    const table = fc.integer({ min: 1, max: 5 }).chain((width) => fc.array(fc.array(cell, { minLength: width, maxLength: width }), { minLength: 1, maxLength: 8 }));
    fc.assert(
      fc.property(table, anyDelimiter, fc.constantFrom('\n', '\r\n'), (rows, delimiter, end) => {
        const even = rows.map((row) => row.map((one) => one.replaceAll('\n', end)));
        const text = even.map((row) => row.map(quoted).join(delimiter)).join(end);
        expect(cells(text, delimiter)).toEqual(even);
      }),
    );
  });

  test('plain cells cut and joined again are the text', () => {
    const cell = fc.string().map((text) => text.replace(/["\r\n,;\t\ufeff]/g, ''));
    fc.assert(
      fc.property(fc.array(fc.array(cell, { minLength: 1, maxLength: 6 }), { minLength: 1, maxLength: 8 }), anyDelimiter, (rows, delimiter) => {
        const text = rows.map((row) => row.join(delimiter)).join('\n');
        expect(cells(text, delimiter).map((row) => row.join(delimiter)).join('\n')).toBe(text);
      }),
    );
  });

  test('every line that holds something is in some row, whatever its quotation marks', () => {
    fc.assert(
      fc.property(fc.array(fc.stringMatching(/^[a1",; ]{0,12}$/), { minLength: 1, maxLength: 12 }), (lines) => {
        const text = lines.join('\n');
        const letters = (one: string): string => one.replace(/[^a1]/g, '');
        expect(letters(cells(text).flat().join(''))).toBe(letters(text));
      }),
    );
  });
});
