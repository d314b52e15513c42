/** A trace's file in the worker: its bytes as a stream, unpacked where they are packed, read as they come; and their sum. */
import { sha256 } from '@noble/hashes/sha2.js';
import { problem, type Place, type Problem } from '../problems/problems.ts';
import { textOfBytes } from '../platform/readFile.ts';
import { createSampledReader, type SampledReader, type SampledRecord } from '../readings/sampled/sampledRecord.ts';

/** What is used of a Blob. */
export type TraceBlob = Pick<Blob, 'size' | 'slice' | 'stream'>;

/** Rejects a reading that was stopped. */
export class TraceStopped extends Error {
  override readonly name = 'TraceStopped';
}

/** Bytes that tell what a file is. */
const HEAD = 65_536;

/** No longer without letting messages in, ms. */
const AT_A_STRETCH = 30;

/** A packed record of numbers is mostly a third of its size or less. */
const PACKED = 3;

/** A file is named for what is in it by what cannot be in a text. */
function notText(head: Uint8Array, place: Place): Problem | null {
  return textOfBytes(head, place).problems.find(({ weight }) => weight === 'stops') ?? null;
}

/** One turn of the event loop. A timer would wait four milliseconds. */
function nextTurn(): Promise<void> {
  return new Promise((resolve) => {
    const { port1, port2 } = new MessageChannel();
    port1.onmessage = () => {
      port1.close();
      resolve();
    };
    port2.postMessage(null);
  });
}

interface Streaming {
  readonly onBytes: (bytes: Uint8Array) => void;
  readonly cancelled: () => boolean;
}

/** Every chunk in turn, messages let in between. */
async function stream(source: ReadableStream<Uint8Array>, { onBytes, cancelled }: Streaming): Promise<void> {
  const reader = source.getReader();
  let since = performance.now();
  for (;;) {
    if (cancelled()) {
      await reader.cancel();
      throw new TraceStopped('Reading a trace: it was stopped');
    }
    const { done, value } = await reader.read();
    if (done) return;
    onBytes(value);
    if (performance.now() - since > AT_A_STRETCH) {
      await nextTurn();
      since = performance.now();
    }
  }
}

const GZIP = [0x1f, 0x8b];

/** Bytes of the file that went by, whatever is made of them. */
function counted(source: ReadableStream<Uint8Array<ArrayBuffer>>, onProgress: (readBytes: number) => void): ReadableStream<Uint8Array<ArrayBuffer>> {
  let read = 0;
  return source.pipeThrough(new TransformStream<Uint8Array<ArrayBuffer>, Uint8Array<ArrayBuffer>>({
    transform(chunk, controller) {
      read += chunk.length;
      onProgress(read);
      controller.enqueue(chunk);
    },
  }));
}

/**
 * A record from a file, plain or packed by gzip. Whatever is wrong with the file comes back as a problem, with the rows that could be read.
 *
 * @param onProgress told of the bytes of the file read so far
 * @throws TraceStopped as a rejection, soon after `cancelled` says so
 */
export async function readTraceBlob(blob: TraceBlob, name: string, onProgress: (readBytes: number) => void, cancelled: () => boolean): Promise<SampledRecord> {
  const place: Place = { sheetName: name };
  const head = new Uint8Array(await blob.slice(0, HEAD).arrayBuffer());
  const packed = GZIP.every((byte, i) => head[i] === byte);
  const foreign = packed ? null : notText(head, place);
  if (foreign !== null) return unread(foreign, place);
  const reader = createSampledReader({ bytes: packed ? blob.size * PACKED : blob.size, place });
  if (packed) return readPacked(counted(blob.stream(), onProgress).pipeThrough(new DecompressionStream('gzip')), reader, place, cancelled);
  let read = 0;
  await stream(blob.stream(), {
    cancelled,
    onBytes: (bytes) => {
      reader.take(bytes);
      read += bytes.length;
      onProgress(read);
    },
  });
  return reader.finish();
}

async function readPacked(source: ReadableStream<Uint8Array>, reader: SampledReader, place: Place, cancelled: () => boolean): Promise<SampledRecord> {
  let unpacked = 0;
  let foreign: Problem | null = null;
  const onBytes = (bytes: Uint8Array): void => {
    if (unpacked === 0) foreign = notText(bytes.subarray(0, Math.min(HEAD, bytes.length & ~1)), place);
    unpacked += bytes.length;
    if (foreign === null) reader.take(bytes);
  };
  let broken: Problem | null = null;
  try {
    await stream(source, { cancelled: () => foreign !== null || cancelled(), onBytes });
  } catch (reason) {
    if (!(reason instanceof TraceStopped)) broken = problem('trace-gzip-broken', unpacked === 0 ? 'stops' : 'doubt', place, { unpacked });
    else if (foreign === null) throw reason;
  }
  if (foreign !== null) return unread(foreign, place);
  if (broken !== null && unpacked === 0) return unread(broken, place);
  const record = reader.finish();
  return broken === null ? record : { ...record, problems: [broken, ...record.problems] };
}

function unread(found: Problem, place: Place): SampledRecord {
  return { ...createSampledReader({ place }).finish(), problems: [found] };
}

/** The platform's own sum is faster and wants all the bytes at once. */
const SUMMED_WHOLE = 64_000_000;

/**
 * SHA-256 of a Blob's bytes, lower-case hex, without holding them all.
 *
 * Source: FIPS 180-4.
 * @throws TraceStopped as a rejection, soon after `cancelled` says so
 */
export async function sumOfBlob(blob: TraceBlob, cancelled: () => boolean = () => false): Promise<string> {
  const subtle: SubtleCrypto | undefined = globalThis.crypto?.subtle;
  let sum: Uint8Array;
  if (subtle !== undefined && blob.size <= SUMMED_WHOLE) sum = new Uint8Array(await subtle.digest('SHA-256', await blob.slice(0, blob.size).arrayBuffer()));
  else {
    const hash = sha256.create();
    await stream(blob.stream(), { cancelled, onBytes: (bytes) => hash.update(bytes) });
    sum = hash.digest();
  }
  return [...sum].map((byte) => byte.toString(16).padStart(2, '0')).join('');
}
