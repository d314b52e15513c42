/** CSV fields and rows by RFC 4180, safe in a spreadsheet, true to what they hold. */
import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import Papa from 'papaparse';
import { describe, expect, it } from 'vitest';
import { commentRow, csvText, harmless, textField } from '../../src/exports/csv.ts';

interface Reference {
  readonly id: string;
  readonly inputs: { readonly lead_chars?: readonly string[] };
}
const REFERENCE = JSON.parse(readFileSync(new URL('../reference/csv.json', import.meta.url), 'utf8')) as readonly Reference[];
/** '\t', '\r' and '\0' stand there as two characters. */
const LEADS = REFERENCE.find(({ id }) => id === 'j03-formula-injection')!.inputs.lead_chars!.map((c) => ({ '\\t': '\t', '\\r': '\r', '\\0': '\0' })[c] ?? c);

const back = (text: string): string[][] => Papa.parse<string[]>(text, { delimiter: ',', newline: '\r\n' }).data;
const rowsBack = (rows: readonly (readonly string[])[]): string[][] => back(csvText(rows.map((row) => row.map(textField)))).slice(0, rows.length);

describe('a text field', () => {
  // RFC 4180 section 2, rules 5 to 7 (from memory).
  it.each([
    ['plain', 'plain'],
    ['', ''],
    ['a,b', '"a,b"'],
    ['say "no"', '"say ""no"""'],
    ['two\nlines', '"two\nlines"'],
    ['two\r\nlines', '"two\r\nlines"'],
    [' kept ', '" kept "'],
    ['µN·s ± 3 °', 'µN·s ± 3 °'],
  ])('%j is written as %j', (text, field) => {
    expect(textField(text)).toBe(field);
  });

  // OWASP ASVS 5.0 1.2.10, OWASP CSV Injection, CWE-1236; read in a copy, part from memory.
  it.each(LEADS.map((lead) => [JSON.stringify(lead), lead]))('that begins with %s is not run as a formula', (_, lead) => {
    const field = textField(`${lead}cmd|' /C calc'!A0`);
    expect(field.replace(/^"/, '').startsWith("'")).toBe(true);
    expect(rowsBack([[`${lead}1+1`, 'x']])).toEqual([[`'${lead}1+1`, 'x']]);
  });

  it('in full-width signs is not run as a formula either', () => {
    for (const lead of ['＝', '＋', '－', '＠']) expect(harmless(`${lead}1`)).toBe(`'${lead}1`);
  });

  it.each(['-0.0123', '-1', '+5', '-1.5e-7', '-.5', '0', '12.50'])('that is the number %s is left alone', (text) => {
    expect(textField(text)).toBe(text);
  });

  it.each(['-12 mm', '+cmd', '-Infinity', '=1', '@SUM(A1)', '-1-1', '--1'])('that is no number but begins as a formula is made harmless: %s', (text) => {
    expect(textField(text)).toBe(`'${text}`);
  });

  it('comes back as it was, but for the apostrophe before a formula', () => {
    fc.assert(
      fc.property(fc.array(fc.array(fc.oneof(fc.string({ unit: 'grapheme' }), fc.constantFrom('a,b', '"', '""', '\n', 'a\r\nb', '=1', '-0.5', ' ', '#', ';')), { minLength: 2, maxLength: 5 }), { minLength: 1, maxLength: 4 }), (rows) => {
        expect(rowsBack(rows)).toEqual(rows.map((row) => row.map(harmless)));
      }),
    );
  });
});

describe('rows', () => {
  it('end with CRLF, the last one too', () => {
    expect(csvText([['a', 'b'], ['1', '2']])).toBe('a,b\r\n1,2\r\n');
  });

  it('of comment stay comments whatever they hold: a reader that skips # skips them whole', () => {
    const texts = ['plain', 'with, commas', 'with "quotes"', 'two\nlines', '=1+1', '5 % of 3, "so"'];
    const text = csvText([...texts.map(commentRow), ['a', 'b']]);
    expect(text.split('\r\n').slice(0, texts.length).every((line) => line.startsWith('#,'))).toBe(true);
    expect(Papa.parse<string[]>(text, { comments: '#', skipEmptyLines: true }).data).toEqual([['a', 'b']]);
    expect(back(text)[4]).toEqual(['#', "'=1+1"]);
  });
});
