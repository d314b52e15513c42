import { expect, test } from 'vitest';
import fc from 'fast-check';
import { blockOfText, textOfBlock, widthOfBlock } from '../../../src/page/readings/block.ts';

test('cells of a spreadsheet come apart at tabs and line breaks', () => {
  expect(blockOfText('12.40\t31.65\r\n12.38\t31.70\r\n')).toEqual([['12.40', '31.65'], ['12.38', '31.70']]);
});

test('a quoted cell keeps its tab, its quotes and no line break', () => {
  expect(blockOfText('"a\tb"\t"he said ""off"""\n"two\nlines"')).toEqual([['a\tb', 'he said "off"'], ['two lines']]);
});

test('an inch mark within a cell is no quotation mark', () => {
  expect(blockOfText('12"\t0.5"')).toEqual([['12"', '0.5"']]);
});

test('empty cells keep their place', () => {
  expect(blockOfText('\t12.4\t\n\t\t3')).toEqual([['', '12.4', ''], ['', '', '3']]);
  expect(widthOfBlock([['1'], ['1', '2', '3']])).toBe(3);
});

test('a block copied and pasted comes back as it was', () => {
  const cell = fc.string({ maxLength: 8 }).map((text) => text.replace(/[\r\n]/g, '').trim());
  const block = fc.tuple(fc.integer({ min: 1, max: 4 }), fc.integer({ min: 1, max: 4 }))
    .chain(([rows, columns]) => fc.array(fc.array(cell, { minLength: columns, maxLength: columns }), { minLength: rows, maxLength: rows }))
    // A single empty last row and no row are the same text.
    .filter((rows) => rows.at(-1)?.join('') !== '' || rows.at(-1)?.length !== 1);
  fc.assert(fc.property(block, (rows) => {
    expect(blockOfText(textOfBlock(rows))).toEqual(rows);
  }));
});
