/** The same file dropped again: rows are found again, whatever was put between, before or after them. */
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { linesAgain, lostRowProblems, sameFile } from '../../src/readings/again.ts';
import { readTable } from '../../src/readings/table.ts';
import { fixture } from './fixture.ts';

const HEAD = 'Shot,Rest (mm),First swing (mm)\n';
const again = (before: string, after: string): { moved: string[]; lost: readonly string[]; added: number } => {
  const { moved, lost, added } = linesAgain(readTable(HEAD + before), readTable(HEAD + after));
  return { moved: [...moved].map(([a, b]) => `${a}→${b}`).sort(), lost, added };
};

describe('rows found again', () => {
  test('more shots at the end', () => {
    expect(again('1,12.0,15.5\n2,12.0,15.1\n', '1,12.0,15.5\n2,12.0,15.1\n3,12.0,15.2\n')).toEqual({ moved: ['2→2', '3→3'], lost: [], added: 1 });
  });

  test('a row put in between, a comment and a blank line above', () => {
    const { moved } = linesAgain(readTable(`${HEAD}1,12.0,15.5\n2,12.0,15.1\n`), readTable(`# again\n\n${HEAD}1,12.0,15.5\n9,12.0,15.0\n2,12.0,15.1\n`));
    expect([...moved]).toEqual([['2', '4'], ['3', '6']]);
  });

  test('a row taken out is lost, those after it are not', () => {
    expect(again('1,12.0,15.5\n2,12.0,15.1\n3,12.0,15.2\n', '1,12.0,15.5\n3,12.0,15.2\n')).toEqual({ moved: ['2→2', '4→3'], lost: ['3'], added: 0 });
  });

  test('a corrected row is known by its shot number', () => {
    expect(again('1,12.0,15.5\n2,12.0,15.1\n3,12.0,15.2\n', '1,12.0,15.5\n2,12.0,14.1\n3,12.0,15.2\n').moved).toEqual(['2→2', '3→3', '4→4']);
  });

  test('a number that occurs twice names no row', () => {
    expect(again('1,12.0,15.5\n1,12.0,15.1\n', '1,12.0,15.5\n1,12.0,14.1\n1,12.0,14.9\n')).toEqual({ moved: ['2→2'], lost: ['3'], added: 2 });
  });

  test('equal rows keep their order', () => {
    expect(again(',12.0,15.5\n,12.0,15.5\n,12.0,15.1\n', ',12.0,15.5\n,12.0,15.5\n,12.0,15.1\n,12.0,15.5\n').moved).toEqual(['2→2', '3→3', '4→4']);
  });

  test('rows in another order are found all the same', () => {
    expect(again('1,12.0,15.5\n2,12.0,15.1\n3,12.0,15.2\n', '3,12.0,15.2\n2,12.0,15.1\n1,12.0,15.5\n').moved).toEqual(['2→4', '3→3', '4→2']);
  });

  test('zeros that a spreadsheet dropped make no difference', () => {
    expect(again('1,12.0,15.50\n', '1,12,15.5\n').moved).toEqual(['2→2']);
  });

  test('any rows put into any table lose none of the rows before', () => {
    const row = fc.tuple(fc.integer({ min: 0, max: 3 }), fc.integer({ min: 10, max: 13 })).map(([a, b]) => `,${a}.0,${b}.5`);
    fc.assert(fc.property(fc.array(row, { minLength: 1, maxLength: 12 }), fc.array(fc.tuple(fc.nat({ max: 12 }), row), { maxLength: 6 }), (rows, more) => {
      const after = [...rows];
      for (const [at, one] of more) after.splice(at, 0, one);
      const found = linesAgain(readTable(HEAD + rows.join('\n')), readTable(HEAD + after.join('\n')));
      expect(found.lost).toEqual([]);
      expect(found.added).toBe(more.length);
      for (const [a, b] of found.moved) expect(after[Number(b) - 2]).toBe(rows[Number(a) - 2]);
      expect(new Set(found.moved.values()).size).toBe(rows.length);
    }));
  });
});

describe('one file', () => {
  const text = fixture('hand-table.csv');

  test('by its name, or by its header and half of its rows', () => {
    expect(sameFile({ name: 'a.csv', text }, { name: 'a.csv', text: 'x' })).toBe(true);
    expect(sameFile({ name: 'a.csv', text }, { name: 'a (1).csv', text: `${text}4,1500,12.0,15.1,,95,\n` })).toBe(true);
  });

  test('not by its header alone, nor by its rows alone', () => {
    expect(sameFile({ name: 'a.csv', text: `${HEAD}1,12.0,15.5\n2,12.0,15.1\n3,12.0,15.2\n` }, { name: 'b.csv', text: `${HEAD}1,12.0,15.5\n2,13.0,15.1\n3,13.0,15.2\n` })).toBe(false);
    expect(sameFile({ name: 'a.csv', text }, { name: 'b.csv', text: text.replace('Shot,', 'Tap,') })).toBe(false);
    expect(sameFile({ name: '', text: '' }, { name: '', text: '' })).toBe(false);
  });

  test('rows that are gone are told, and weigh more where a decision hung on them', () => {
    expect(lostRowProblems(0, 0, {})).toEqual([]);
    expect(lostRowProblems(2, 0, { sheet: 's1' })).toMatchObject([{ code: 'same-file-rows-lost', weight: 'note' }]);
    expect(lostRowProblems(2, 1, {})).toMatchObject([{ weight: 'doubt', facts: { lost: 2, marked: 1 } }]);
  });
});
