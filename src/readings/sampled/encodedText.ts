/** Bytes of a text file to text, in pieces: UTF-8, UTF-16 or windows-1252, told from the first bytes. */

export type Encoding = 'utf-8' | 'utf-16le' | 'utf-16be' | 'windows-1252';

export interface EncodingRead {
  readonly encoding: Encoding;
  /** Bytes of the byte-order mark, 0 for none. */
  readonly mark: number;
}

/** Bytes 0x80 to 0x9f; the others are those of ISO 8859-1. Source: the WHATWG Encoding Standard, index windows-1252 (from memory). */
const WINDOWS_80 = '€\u0081‚ƒ„…†‡ˆ‰Š‹Œ\u008dŽ\u008f\u0090‘’“”•–—˜™š›œ\u009džŸ';

/** A call takes no more arguments than this safely. */
const PIECE = 8192;

/** A cell is put together faster sign by sign. */
const SHORT = 32;

/** Zeros in nearly every other byte, and none between: mostly Latin text in UTF-16 without a mark. */
function zerosAlternate(head: Uint8Array): 'utf-16le' | 'utf-16be' | null {
  const length = head.length & ~1;
  let even = 0;
  let odd = 0;
  for (let i = 0; i < length; i += 2) {
    if (head[i] === 0) even += 1;
    if (head[i + 1] === 0) odd += 1;
  }
  if (length < 4) return null;
  if (odd * 10 > length * 4 && even === 0) return 'utf-16le';
  return even * 10 > length * 4 && odd === 0 ? 'utf-16be' : null;
}

/** Encoding by byte-order mark, by zeros, by whether the bytes are UTF-8; the last character may be cut. */
export function encodingOf(head: Uint8Array): EncodingRead {
  if (head[0] === 0xef && head[1] === 0xbb && head[2] === 0xbf) return { encoding: 'utf-8', mark: 3 };
  if (head[0] === 0xff && head[1] === 0xfe) return { encoding: 'utf-16le', mark: 2 };
  if (head[0] === 0xfe && head[1] === 0xff) return { encoding: 'utf-16be', mark: 2 };
  const wide = zerosAlternate(head);
  if (wide !== null) return { encoding: wide, mark: 0 };
  const whole = head.subarray(0, head.length - cutAtEnd(head));
  return { encoding: utf8Text(whole).includes('\ufffd') ? 'windows-1252' : 'utf-8', mark: 0 };
}

/** Bytes at the end that begin a character of UTF-8 and do not end it. */
function cutAtEnd(bytes: Uint8Array): number {
  for (let back = 1; back <= 3 && back <= bytes.length; back += 1) {
    const byte = bytes[bytes.length - back]!;
    if (byte < 0x80) return 0;
    if (byte >= 0xc0) return back < bytesOfCharacter(byte) ? back : 0;
  }
  return 0;
}

const bytesOfCharacter = (first: number): number => (first >= 0xf0 ? 4 : first >= 0xe0 ? 3 : 2);

/** Text of bytes that are their own code points. */
export function asciiText(bytes: Uint8Array, from: number, to: number): string {
  let text = '';
  if (to - from <= SHORT) {
    for (let i = from; i < to; i += 1) text += String.fromCharCode(bytes[i]!);
    return text;
  }
  for (let i = from; i < to; i += PIECE) text += Reflect.apply(String.fromCharCode, null, bytes.subarray(i, Math.min(to, i + PIECE)));
  return text;
}

/** U+FFFD stands for what is no UTF-8. */
function utf8Text(bytes: Uint8Array): string {
  let text = '';
  let from = 0;
  for (let i = 0; i < bytes.length;) {
    const first = bytes[i]!;
    if (first < 0x80) {
      i += 1;
      continue;
    }
    text += asciiText(bytes, from, i);
    const length = bytesOfCharacter(first);
    let point = first & (0xff >> (length + 1));
    let taken = 1;
    while (taken < length && (bytes[i + taken]! & 0xc0) === 0x80) {
      point = (point << 6) | (bytes[i + taken]! & 0x3f);
      taken += 1;
    }
    const sound = first >= 0xc2 && first < 0xf5 && taken === length && point >= [0, 0, 0x80, 0x800, 0x10000][length]! && point <= 0x10ffff && (point < 0xd800 || point > 0xdfff);
    text += sound ? String.fromCodePoint(point) : '\ufffd';
    i += taken;
    from = i;
  }
  return text + asciiText(bytes, from, bytes.length);
}

function windowsText(bytes: Uint8Array): string {
  let text = '';
  let from = 0;
  bytes.forEach((byte, i) => {
    if (byte < 0x80 || byte > 0x9f) return;
    text += asciiText(bytes, from, i) + WINDOWS_80.charAt(byte - 0x80);
    from = i + 1;
  });
  return text + asciiText(bytes, from, bytes.length);
}

function wideText(bytes: Uint8Array, bigEndian: boolean): string {
  const codes = new Uint16Array(bytes.length >> 1);
  const [high, low] = bigEndian ? [0, 1] : [1, 0];
  for (let i = 0; i < codes.length; i += 1) codes[i] = (bytes[2 * i + high]! << 8) | bytes[2 * i + low]!;
  let text = '';
  for (let i = 0; i < codes.length; i += PIECE) text += String.fromCharCode(...codes.subarray(i, i + PIECE));
  return text;
}

/** Text of bytes that neither begin nor end within a character. */
export function textOf(bytes: Uint8Array, encoding: Encoding): string {
  if (encoding === 'utf-8') return utf8Text(bytes);
  if (encoding === 'windows-1252') return windowsText(bytes);
  return wideText(bytes, encoding === 'utf-16be');
}

/** Decodes a stream of bytes piece by piece; a character cut at the end of a piece comes with the next one. */
export function createDecoder(encoding: Encoding): (bytes: Uint8Array) => string {
  let held = new Uint8Array(0);
  return (bytes) => {
    let all = bytes;
    if (held.length > 0) {
      all = new Uint8Array(held.length + bytes.length);
      all.set(held);
      all.set(bytes, held.length);
    }
    const cut = encoding === 'utf-8' ? cutAtEnd(all) : encoding === 'windows-1252' ? 0 : all.length & 1;
    held = all.slice(all.length - cut);
    return textOf(all.subarray(0, all.length - cut), encoding);
  };
}

/** UTF-8 of a text; a lone surrogate becomes U+FFFD. */
export function utf8Of(text: string): Uint8Array {
  const bytes = new Uint8Array(text.length * 3);
  let n = 0;
  for (let i = 0; i < text.length; i += 1) {
    let point = text.charCodeAt(i);
    if (point < 0x80) {
      bytes[n++] = point;
      continue;
    }
    if (point >= 0xd800 && point <= 0xdfff) {
      point = text.codePointAt(i)!;
      if (point > 0xffff) i += 1;
      else point = 0xfffd;
    }
    if (point > 0xffff) bytes[n++] = 0xf0 | (point >> 18);
    if (point > 0x7ff) bytes[n++] = point > 0xffff ? 0x80 | ((point >> 12) & 0x3f) : 0xe0 | (point >> 12);
    bytes[n++] = point > 0x7ff ? 0x80 | ((point >> 6) & 0x3f) : 0xc0 | (point >> 6);
    bytes[n++] = 0x80 | (point & 0x3f);
  }
  return bytes.subarray(0, n);
}
