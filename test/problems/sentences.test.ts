/** Sentences: where, what was found, what to do. */
import { describe, expect, test } from 'vitest';
import { PROBLEM_CODES, problem } from '../../src/problems/problems.ts';
import type { Weight } from '../../src/problems/problems.ts';
import { placeInWords, sentence, sentenceInPlace } from '../../src/problems/sentences.ts';

describe('every problem', () => {
  const cases = PROBLEM_CODES.flatMap((code) => (['stops', 'doubt', 'note'] as const).map((weight): [string, Weight] => [code, weight]));

  test.each(cases)('%s (%s) is whole sentences, even where a fact is wanting', (code, weight) => {
    const known = PROBLEM_CODES.find((one) => one === code);
    if (known === undefined) throw new Error(`no code ${code}`);
    for (const place of [{}, { sheetName: 'a.csv', line: 3, column: 'Rest (mm)', record: 's/3' }, { entry: 'period' }]) {
      const said = sentence(problem(known, weight, place));
      expect(said).toMatch(/^(?:a\.csv, line 3, column “Rest \(mm\)”: .|[A-Z“…]).*\.$/u);
      expect(said).not.toMatch(/undefined|NaN|null|\[object|!| {2}|“”| [.,;]/);
    }
  });
});

describe('places', () => {
  test.each([
    [{ sheetName: 'bench.csv', line: 9, column: 'Rest (mm)', record: 's1/9' }, 'bench.csv, line 9, column “Rest (mm)”'],
    [{ sheetName: 'bench.csv', line: 9, column: '3' }, 'bench.csv, line 9, column 3'],
    [{ sheetName: 'typed', line: 0, record: 's1/+2' }, 'typed, row +2'],
    [{ entry: 'gravity' }, ''],
  ])('%j', (place, words) => {
    expect(placeInWords(place)).toBe(words);
  });
});

describe('what was found and what to do', () => {
  test('a word where a number should be', () => {
    const found = problem('cell-not-a-number', 'stops', { sheetName: 'bench.csv', line: 3, column: 'Rest (mm)', record: 's1/3' }, { found: 'twelve', role: 'rest', unit: 'mm' });
    expect(sentence(found)).toBe('bench.csv, line 3, column “Rest (mm)”: “twelve” is not a number. Correct it, or leave the cell empty; the row gives no rest reading until then.');
    expect(sentenceInPlace(found)).toBe('“twelve” is not a number. Correct it, or leave the cell empty; the row gives no rest reading until then.');
  });

  test('a decimal comma in a comma table', () => {
    const said = sentence(problem('decimal-comma-in-comma-file', 'stops', { sheetName: 'a.csv', line: 2 }, { found: '12,5', cells: 4, columns: 2 }));
    expect(said).toContain('“12,5”');
    expect(said).toContain('semicolons or tabs');
  });

  test('a reading beyond its radius, in units of its size', () => {
    expect(sentence(problem('record-reading-beyond-radius', 'stops', { line: 4 }, { reading: 0.13, radius: 0.118 }))).toMatch(/^Line 4: the reading lies 130 mm .* radius of 118 mm/);
  });

  test('a ruler that runs backward', () => {
    expect(sentence(problem('all-throws-negative', 'doubt', { entry: 'scaleRunsBackward' }, { records: 7 }))).toContain('mark it as running backward');
  });

  test('negative figures have a minus sign', () => {
    expect(sentence(problem('calibrations-differ', 'doubt', {}, { percent: -3.14159, inU: -2.5 }))).toContain('−3.1 %, −2.5 times');
  });

  test('one is not many', () => {
    expect(sentence(problem('few-shots', 'note', {}, { n: 1, k: 12.706 }))).toMatch(/^1 shot only/);
    expect(sentence(problem('same-file-rows-lost', 'note', {}, { lost: 1, marked: 0 }))).toMatch(/^1 row of the earlier version is /);
    expect(sentence(problem('same-file-rows-lost', 'doubt', {}, { lost: 3, marked: 2 }))).toMatch(/^3 rows of the earlier version are .*2 of them/);
  });
});
