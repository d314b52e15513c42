/** Files as they are dropped: encodings, files that are no text, and files that are too large. */
import { describe, expect, test } from 'vitest';
import { LARGEST_HAND_TABLE, readTableFile, sha256Of, textOfBytes } from '../../src/platform/readFile.ts';
import { sentence } from '../../src/problems/sentences.ts';

const bytes = (...all: number[]): Uint8Array<ArrayBuffer> => new Uint8Array(all);
const utf8 = (text: string): Uint8Array<ArrayBuffer> => new Uint8Array(Buffer.from(text, 'utf8'));
const utf16 = (text: string, bigEndian: boolean): Uint8Array => {
  const little = Buffer.from(text, 'utf16le');
  return new Uint8Array(bigEndian ? little.swap16() : little);
};
const TEXT = 'Rest (µm),First (µm)\n12.0 ± 0.1,15.5\n';

describe('encodings', () => {
  test('UTF-8 with and without its mark', () => {
    expect(textOfBytes(utf8(TEXT))).toEqual({ text: TEXT, problems: [] });
    expect(textOfBytes(utf8(`\ufeff${TEXT}`))).toEqual({ text: TEXT, problems: [] });
  });

  test.each([false, true])('UTF-16 with and without its mark (big end first: %s)', (bigEndian) => {
    expect(textOfBytes(utf16(`\ufeff${TEXT}`, bigEndian)).text).toBe(TEXT);
    expect(textOfBytes(utf16(TEXT, bigEndian)).text).toBe(TEXT);
  });

  // Code page 1252: µ is B5, ± is B1, ° is B0 (from memory).
  test('windows-1252 is read and told', () => {
    const { text, problems } = textOfBytes(bytes(0x31, 0x20, 0xb5, 0x6d, 0x20, 0xb1, 0x20, 0x32, 0xb0));
    expect(text).toBe('1 µm ± 2°');
    expect(problems).toMatchObject([{ code: 'file-other-encoding', weight: 'note' }]);
  });

  test('an empty file', () => {
    expect(textOfBytes(bytes()).problems).toMatchObject([{ code: 'file-empty' }]);
  });
});

describe('files that are no text', () => {
  test.each([
    ['workbook', [0x50, 0x4b, 0x03, 0x04, 0x14, 0x00]],
    ['old spreadsheet', [0xd0, 0xcf, 0x11, 0xe0, 0xa1, 0xb1]],
    ['PDF', [0x25, 0x50, 0x44, 0x46, 0x2d]],
    ['gzip', [0x1f, 0x8b, 0x08]],
    ['PNG', [0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a]],
    ['JPEG', [0xff, 0xd8, 0xff, 0xe0]],
    ['GIF', [0x47, 0x49, 0x46, 0x38, 0x39, 0x61]],
    ['binary', [0x31, 0x2c, 0x00, 0x00, 0x00, 0x32, 0x33]],
    ['binary', [0x01, 0x02, 0x03, 0x04, 0x05, 0x41]],
  ])('a %s file is named, with what to do', (kind, start) => {
    const { text, problems } = textOfBytes(bytes(...start), { sheetName: 'a.csv' });
    expect(text).toBe('');
    expect(problems).toMatchObject([{ code: 'file-binary', weight: 'stops', place: { sheetName: 'a.csv' } }]);
    expect(problems.map(sentence).join()).toContain(kind);
  });
});

describe('files', () => {
  // FIPS 180-4, the sum of "abc" (from memory).
  test('the sum of the bytes is the SHA-256 of the standard', async () => {
    expect(await sha256Of(utf8('abc'))).toBe('ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad');
  });

  test('a file comes with its name, text and sum', async () => {
    const read = await readTableFile(new File([TEXT], 'bench.csv'));
    expect(read).toMatchObject({ name: 'bench.csv', text: TEXT, problems: [] });
    expect(read.sha256).toBe(await sha256Of(utf8(TEXT)));
  });

  test('a 50 MB hand table is not read, and the sentence says how large it is', async () => {
    const file = new File([], 'trace.csv');
    Object.defineProperty(file, 'size', { value: 50e6 });
    Object.defineProperty(file, 'arrayBuffer', { value: () => Promise.reject(new Error('read all the same')) });
    const { text, problems } = await readTableFile(file);
    expect(text).toBe('');
    expect(problems.map(sentence).join()).toMatch(/^trace\.csv: the file has 50\.0 MB and a table taken by hand at most 8\.0 MB/);
    expect(LARGEST_HAND_TABLE).toBe(8e6);
  });
});
