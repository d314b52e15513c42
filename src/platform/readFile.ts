/** A dropped or chosen file to text: its bytes, their SHA-256, the encoding, and a problem where it is no text. */
import { problem } from '../problems/problems.ts';
import type { Place, Problem } from '../problems/problems.ts';

/** A table taken by hand is far smaller; more is a trace, or the wrong file. Bytes. */
export const LARGEST_HAND_TABLE = 8_000_000;

export interface TextOfBytes {
  /** '' where the bytes are no text. */
  readonly text: string;
  readonly problems: readonly Problem[];
}

export interface FileRead extends TextOfBytes {
  readonly name: string;
  /** SHA-256 of the bytes, lower-case hex; '' where the file was too large to be read, or the browser gives no such sum. */
  readonly sha256: string;
}

interface Signature {
  readonly starts: readonly number[];
  readonly kind: string;
  readonly remedy: string;
}

const SHEET_REMEDY = 'Open it in the spreadsheet program and save the sheet as CSV, or copy the cells and paste them here.';
const PICTURE_REMEDY = 'Type the readings into the table.';

/** First bytes of what is dropped by mistake. Source: the formats' public signatures, from memory. */
const SIGNATURES: readonly Signature[] = [
  { starts: [0x50, 0x4b, 0x03, 0x04], kind: 'a spreadsheet workbook or another zip archive', remedy: SHEET_REMEDY },
  { starts: [0xd0, 0xcf, 0x11, 0xe0], kind: 'an old spreadsheet or word-processor file', remedy: SHEET_REMEDY },
  { starts: [0x25, 0x50, 0x44, 0x46], kind: 'a PDF', remedy: 'Copy the table out of it and paste it here.' },
  { starts: [0x1f, 0x8b], kind: 'a gzip archive', remedy: 'Unpack it and drop the table that is in it.' },
  { starts: [0x89, 0x50, 0x4e, 0x47], kind: 'a picture (PNG)', remedy: PICTURE_REMEDY },
  { starts: [0xff, 0xd8, 0xff], kind: 'a picture (JPEG)', remedy: PICTURE_REMEDY },
  { starts: [0x47, 0x49, 0x46, 0x38], kind: 'a picture (GIF)', remedy: PICTURE_REMEDY },
];

/** Bytes searched for what no text has. */
const LOOKED_AT = 65_536;

const startsWith = (bytes: Uint8Array, starts: readonly number[]): boolean => starts.every((byte, i) => bytes[i] === byte);

function binary(place: Place, kind: string, remedy: string): TextOfBytes {
  return { text: '', problems: [problem('file-binary', 'stops', place, { kind, remedy })] };
}

/** UTF-16 without a byte-order mark: every other byte of a mostly Latin text is 0. */
function utf16Without(bytes: Uint8Array): 'utf-16le' | 'utf-16be' | null {
  const length = Math.min(bytes.length, LOOKED_AT) & ~1;
  if (length < 4 || bytes.length % 2 === 1) return null;
  let even = 0;
  let odd = 0;
  for (let i = 0; i < length; i += 2) {
    if (bytes[i] === 0) even += 1;
    if (bytes[i + 1] === 0) odd += 1;
  }
  if (odd * 10 > length * 4 && even === 0) return 'utf-16le';
  return even * 10 > length * 4 && odd === 0 ? 'utf-16be' : null;
}

/**
 * Text of a file's bytes: UTF-8 or UTF-16 by byte-order mark, else UTF-8 where the bytes are valid UTF-8, else windows-1252 (told).
 * Archives, workbooks, PDFs, pictures and bytes that no text has come back as a problem.
 */
export function textOfBytes(bytes: Uint8Array, place: Place = {}): TextOfBytes {
  if (bytes.length === 0) return { text: '', problems: [problem('file-empty', 'stops', place)] };
  const signature = SIGNATURES.find(({ starts }) => startsWith(bytes, starts));
  if (signature !== undefined) return binary(place, signature.kind, signature.remedy);
  if (startsWith(bytes, [0xff, 0xfe])) return { text: new TextDecoder('utf-16le').decode(bytes), problems: [] };
  if (startsWith(bytes, [0xfe, 0xff])) return { text: new TextDecoder('utf-16be').decode(bytes), problems: [] };
  const wide = utf16Without(bytes);
  if (wide !== null) return { text: new TextDecoder(wide).decode(bytes), problems: [] };
  let controls = 0;
  for (const byte of bytes.subarray(0, LOOKED_AT)) {
    if (byte === 0) return binary(place, 'a binary file', 'Save the readings as CSV or text, or copy the cells and paste them here.');
    if (byte < 0x20 && byte !== 0x09 && byte !== 0x0a && byte !== 0x0d && byte !== 0x0c && byte !== 0x1a) controls += 1;
  }
  if (controls * 50 > Math.min(bytes.length, LOOKED_AT)) return binary(place, 'a binary file', 'Save the readings as CSV or text, or copy the cells and paste them here.');
  try {
    return { text: new TextDecoder('utf-8', { fatal: true }).decode(bytes), problems: [] };
  } catch {
    const text = new TextDecoder('windows-1252').decode(bytes);
    return { text, problems: [problem('file-other-encoding', 'note', place, { taken: 'windows-1252' })] };
  }
}

/** SHA-256 of bytes, lower-case hex; '' where the page has no secure context to compute it in. */
export async function sha256Of(bytes: Uint8Array<ArrayBuffer>): Promise<string> {
  const subtle: SubtleCrypto | undefined = globalThis.crypto?.subtle;
  if (subtle === undefined) return '';
  const sum = await subtle.digest('SHA-256', bytes);
  return [...new Uint8Array(sum)].map((byte) => byte.toString(16).padStart(2, '0')).join('');
}

/** Size in words: 52.4 MB. */
function sizeInWords(bytes: number): string {
  return bytes >= 1e6 ? `${(bytes / 1e6).toFixed(1)} MB` : `${Math.ceil(bytes / 1000)} kB`;
}

/** Reads a table file. One that is too large is not read at all; whatever is wrong comes back as a problem. */
export async function readTableFile(file: File): Promise<FileRead> {
  const place: Place = { sheetName: file.name };
  if (file.size > LARGEST_HAND_TABLE) {
    const facts = { size: sizeInWords(file.size), limit: sizeInWords(LARGEST_HAND_TABLE) };
    return { name: file.name, text: '', sha256: '', problems: [problem('file-too-large', 'stops', place, facts)] };
  }
  const bytes = new Uint8Array(await file.arrayBuffer());
  return { name: file.name, sha256: await sha256Of(bytes), ...textOfBytes(bytes, place) };
}
