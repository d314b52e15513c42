/** Bytes to text against the platform's own decoders. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { createDecoder, encodingOf, textOf, utf8Of, type Encoding } from '../../../src/readings/sampled/encodedText.ts';
import { inPieces } from './invented.ts';

const LABELS: readonly Encoding[] = ['utf-8', 'utf-16le', 'utf-16be'];

describe('text', () => {
  it.each(LABELS)('in %s is that of the platform’s decoder, whatever the pieces', (encoding) => {
    fc.assert(fc.property(fc.string({ unit: 'grapheme' }), fc.array(fc.integer({ min: 1, max: 7 }), { minLength: 1 }), (text, lengths) => {
      const bytes = encoding === 'utf-8' ? new Uint8Array(Buffer.from(text)) : new Uint8Array(encoding === 'utf-16le' ? Buffer.from(text, 'utf16le') : Buffer.from(text, 'utf16le').swap16());
      const expected = new TextDecoder(encoding, { ignoreBOM: true }).decode(bytes);
      expect(textOf(bytes, encoding)).toBe(expected);
      const decode = createDecoder(encoding);
      let inParts = '';
      inPieces(bytes, lengths, (piece) => {
        inParts += decode(piece);
      });
      expect(inParts).toBe(expected);
    }));
  });

  // Code page 1252 (from memory). The decoder of Node 20 reads 0x80 to 0x9f as ISO 8859-1 and is no judge here.
  it('in windows-1252 is that of its table', () => {
    expect(textOf(new Uint8Array([0x80, 0x31, 0x20, 0xb5, 0x6d, 0x96, 0x92, 0x9f, 0xb0, 0xb1, 0xff]), 'windows-1252')).toBe('€1 µm–’Ÿ°±ÿ');
  });

  it('in UTF-8 is what the platform’s encoder makes of it', () => {
    fc.assert(fc.property(fc.string({ unit: 'binary' }), (text) => {
      expect(utf8Of(text)).toEqual(new Uint8Array(new TextEncoder().encode(text)));
    }));
    expect(utf8Of('a\ud800b')).toEqual(new Uint8Array(new TextEncoder().encode('a\ud800b')));
  });

  it('long runs of ASCII between other signs keep their place', () => {
    const text = `µ${'1.5,'.repeat(9000)}°${'x'.repeat(33)}€`;
    expect(textOf(utf8Of(text), 'utf-8')).toBe(text);
  });

  it('bytes that are no UTF-8 become U+FFFD and nothing else is lost', () => {
    for (const bytes of [[0x41, 0xff, 0x42], [0x41, 0xc0, 0x80, 0x42], [0xed, 0xa0, 0x80], [0xf5, 0x80, 0x80, 0x80], [0x41, 0xe2, 0x82]]) {
      const text = textOf(new Uint8Array(bytes), 'utf-8');
      expect(text).toContain('\ufffd');
      expect(text.replaceAll('\ufffd', '')).toBe(new TextDecoder().decode(new Uint8Array(bytes)).replaceAll('\ufffd', ''));
    }
  });
});

describe('the encoding', () => {
  it.each([
    [[0xef, 0xbb, 0xbf, 0x31], 'utf-8', 3], [[0xff, 0xfe, 0x31, 0], 'utf-16le', 2], [[0xfe, 0xff, 0, 0x31], 'utf-16be', 2],
    [[0x31, 0, 0x32, 0, 0x33, 0], 'utf-16le', 0], [[0, 0x31, 0, 0x32, 0, 0x33], 'utf-16be', 0],
    [[0x31, 0xc2, 0xb5], 'utf-8', 0], [[0x31, 0xb5, 0x6d], 'windows-1252', 0], [[0x31, 0x2c, 0x32], 'utf-8', 0],
    // Cut within a character: no reason to doubt it.
    [[0x31, 0xe2, 0x82], 'utf-8', 0],
  ] as const)('of %j is %s', (bytes, encoding, mark) => {
    expect(encodingOf(new Uint8Array(bytes))).toEqual({ encoding, mark });
  });
});
