/** Traces from files: plain and packed, stopped, broken, and of the wrong kind. */
import { Blob as NodeBlob } from 'node:buffer';
import { createHash } from 'node:crypto';
import { gzipSync } from 'node:zlib';
import { describe, expect, it } from 'vitest';
import { sentence } from '../../src/problems/sentences.ts';
import { readSampledText, type SampledRecord } from '../../src/readings/sampled/sampledRecord.ts';
import { readTraceBlob, sumOfBlob, TraceStopped, type TraceBlob } from '../../src/workers/traceFile.ts';

/** jsdom's Blob has no stream. */
const blobOf = (...parts: readonly (string | Uint8Array)[]): TraceBlob => new NodeBlob(parts.map((part) => part.slice())) as unknown as TraceBlob;
const read = (blob: TraceBlob, onProgress: (bytes: number) => void = () => undefined, cancelled = () => false): Promise<SampledRecord> => readTraceBlob(blob, 'sensor.csv', onProgress, cancelled);
const codes = (record: SampledRecord): readonly string[] => record.problems.map(({ code }) => code);

const TEXT = ['An invented record', 'time (s);displacement (µm)', ...Array.from({ length: 30_000 }, (_, i) => `${(i / 1000).toFixed(3)};${(20 * Math.sin(i / 100)).toFixed(4)}`.replaceAll('.', ','))].join('\r\n');
const WHOLE = readSampledText(TEXT);
const numbersOf = ({ columns }: SampledRecord): readonly Float64Array[] => columns.map(({ values }) => values);

/** A blob whose stream comes in small pieces, each in a turn of its own. */
function slowly(bytes: Uint8Array, piece: number): { readonly blob: TraceBlob; readonly given: () => number } {
  let at = 0;
  const stream = () => new ReadableStream<Uint8Array<ArrayBuffer>>({
    async pull(controller) {
      await new Promise((resolve) => { setTimeout(resolve, 0); });
      if (at >= bytes.length) controller.close();
      else controller.enqueue(bytes.slice(at, at + piece));
      at += piece;
    },
  });
  return { blob: { size: bytes.length, slice: (from, to) => blobOf(bytes.subarray(from, to)) as unknown as Blob, stream }, given: () => at };
}

describe('a trace from a file', () => {
  it('has the numbers of its text, and its progress is the bytes of the file', async () => {
    const progress: number[] = [];
    const blob = blobOf(TEXT);
    const record = await read(blob, (bytes) => progress.push(bytes));
    expect(numbersOf(record)).toEqual(numbersOf(WHOLE));
    expect(record).toMatchObject({ rows: 30_000, plain: true, problems: [], preamble: ['An invented record'] });
    expect(progress.at(-1)).toBe(blob.size);
    expect(progress).toEqual(progress.toSorted((a, b) => a - b));
  });

  it('packed by gzip has the same numbers, whatever its name, and its progress is that of the packed bytes', async () => {
    const packed = gzipSync(TEXT);
    let last = 0;
    const record = await read(blobOf(packed), (bytes) => {
      last = bytes;
    });
    expect(numbersOf(record)).toEqual(numbersOf(WHOLE));
    expect([last, record.problems]).toEqual([packed.length, []]);
  });

  it('in UTF-16 goes by PapaParse', async () => {
    const record = await read(blobOf(new Uint8Array(Buffer.from(`\ufeff${TEXT}`, 'utf16le'))));
    expect(numbersOf(record)).toEqual(numbersOf(WHOLE));
    expect(record.plain).toBe(false);
  });

  it.each([false, true])('can be stopped while it is read, and reads no further (packed: %s)', async (isPacked) => {
    const bytes = new Uint8Array(isPacked ? gzipSync(TEXT, { level: 0 }) : Buffer.from(TEXT));
    const { blob, given } = slowly(bytes, 10_000);
    let readSoFar = 0;
    const stopped = read(blob, (n) => {
      readSoFar = n;
    }, () => readSoFar > 100_000);
    await expect(stopped).rejects.toBeInstanceOf(TraceStopped);
    expect(given()).toBeLessThan(bytes.length / 2);
  });

  it('a message that comes meanwhile is let in', async () => {
    let said = false;
    setTimeout(() => {
      said = true;
    }, 0);
    await expect(read(slowly(new Uint8Array(Buffer.from(TEXT)), 1000).blob, () => undefined, () => said)).rejects.toBeInstanceOf(TraceStopped);
  });
});

describe('what is wrong with a file is said', () => {
  const packed = new Uint8Array(gzipSync(TEXT));
  const damaged = packed.slice();
  damaged.fill(0xff, packed.length / 2, packed.length / 2 + 200);

  it.each([
    ['cut off', packed.subarray(0, packed.length / 2)],
    ['damaged', damaged],
  ])('of a gzip file %s what comes before is used', async (_, bytes) => {
    const record = await read(blobOf(bytes));
    expect(record.problems[0]).toMatchObject({ code: 'trace-gzip-broken', weight: 'doubt' });
    expect(record.rows).toBeGreaterThan(1000);
    // The last row may be cut, and is told then.
    const sound = record.rows - 1;
    expect(numbersOf(record).map((values) => values.slice(0, sound))).toEqual(numbersOf(WHOLE).map((values) => values.slice(0, sound)));
    expect(sentence(record.problems[0]!)).toMatch(/^sensor\.csv: the gzip file is damaged or cut off/);
  });

  it.each([
    ['trace-gzip-broken', new Uint8Array([0x1f, 0x8b, 0x08, 0, 1, 2, 3, 4])],
    ['trace-gzip-broken', new Uint8Array([0x1f, 0x8b])],
    ['file-binary', new Uint8Array([0x50, 0x4b, 3, 4, 20, 0])],
    ['file-binary', gzipSync(new Uint8Array(2000))],
    ['file-binary', gzipSync(new Uint8Array([0x50, 0x4b, 3, 4, 20, 0]))],
    ['file-empty', new Uint8Array(0)],
    ['file-empty', gzipSync('')],
    ['trace-no-samples', Buffer.from('t,x\n1,2\n')],
    ['trace-no-samples', Buffer.from('a letter\n')],
  ])('%s', async (code, bytes) => {
    const record = await read(blobOf(new Uint8Array(bytes)));
    expect(record.problems).toMatchObject([{ code, weight: 'stops', place: { sheetName: 'sensor.csv' } }]);
    expect(record.rows).toBeLessThan(2);
    expect(codes(record)).toHaveLength(1);
  });
});

describe('the sum of a file', () => {
  // FIPS 180-4, the sum of "abc" (from memory); the others against another implementation, that of Node.
  it('is the SHA-256 of the standard', async () => {
    expect(await sumOfBlob(blobOf('abc'))).toBe('ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad');
  });

  it('of a file too large to be summed whole comes from its stream', async () => {
    const bytes = new Uint8Array(Buffer.from(TEXT));
    const { blob } = slowly(bytes, 100_000);
    const large: TraceBlob = { ...blob, size: 640_000_000, slice: () => { throw new Error('held whole'); } };
    expect(await sumOfBlob(large)).toBe(createHash('sha256').update(bytes).digest('hex'));
    expect(await sumOfBlob(blobOf(bytes))).toBe(createHash('sha256').update(bytes).digest('hex'));
  });

  it('can be stopped', async () => {
    const large: TraceBlob = { ...slowly(new Uint8Array(Buffer.from(TEXT)), 1000).blob, size: 640_000_000 };
    await expect(sumOfBlob(large, () => true)).rejects.toBeInstanceOf(TraceStopped);
  });
});
