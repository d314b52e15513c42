/** Where the bytes of traces are looked after: summed, kept on the device, read by the worker, and asked for again when a session that names them is opened. */
import { createStore } from 'zustand/vanilla';
import type { StoreApi } from 'zustand/vanilla';
import { sha256Of } from '../platform/readFile.ts';
import type { TraceShelf } from '../platform/traceShelf.ts';
import type { Problem } from '../problems/problems.ts';
import type { Session } from '../session/session.ts';
import type { WorkerLine } from '../workers/askWorker.ts';

export type TraceState =
  | { readonly status: 'reading'; readonly name: string; readonly read: number; readonly bytes: number }
  | { readonly status: 'here'; readonly problems: readonly Problem[] }
  /** Neither here nor on this device: the file itself is wanted again. */
  | { readonly status: 'missing' }
  | { readonly status: 'failed'; readonly why: string };

export interface TraceDesk {
  readonly state: StoreApi<Readonly<Record<string, TraceState>>>;
  /** Takes a file in; its sum once the worker has read it. Rejects where it was stopped or could not be read. */
  readonly takeFile: (file: Blob, name: string) => Promise<{ readonly sha256: string; readonly bytes: number; readonly kept: boolean; readonly problems: readonly Problem[] }>;
  readonly stop: (sha256: string) => void;
  /** Brings in what a session names and is not here yet. */
  readonly bringIn: (session: Session) => Promise<void>;
  readonly bytesOf: (sha256: string) => Blob | null;
  /** Bytes that a session file brought along, to be read when it is opened; false where their sum is another. */
  readonly putBytes: (sha256: string, whole: Blob) => Promise<boolean>;
}

interface DeskParts {
  readonly line: Pick<WorkerLine, 'takeTrace' | 'sumOf'>;
  readonly shelf: TraceShelf;
  /** A trace that a session may name has been read. */
  readonly onHere: () => void;
}

/** Larger files are summed piece by piece: whole in memory they would stand beside their own numbers. Bytes. */
const SUMMED_WHOLE = 64_000_000;

export function createTraceDesk({ line, shelf, onHere }: DeskParts): TraceDesk {
  const state = createStore<Readonly<Record<string, TraceState>>>()(() => ({}));
  const bytes = new Map<string, Blob>();
  const stops = new Map<string, AbortController>();
  const say = (sha256: string, now: TraceState): void => state.setState((before) => ({ ...before, [sha256]: now }));

  async function sumOf(file: Blob): Promise<string> {
    const whole = file.size <= SUMMED_WHOLE ? await sha256Of(new Uint8Array(await file.arrayBuffer())) : '';
    return whole === '' ? line.sumOf(file) : whole;
  }

  async function read(sha256: string, name: string, blob: Blob): Promise<readonly Problem[]> {
    const stop = new AbortController();
    stops.set(sha256, stop);
    bytes.set(sha256, blob);
    say(sha256, { status: 'reading', name, read: 0, bytes: blob.size });
    try {
      const { problems } = await line.takeTrace({ sha256, name, bytes: blob }, (done) => say(sha256, { status: 'reading', name, read: done, bytes: blob.size }), stop.signal);
      say(sha256, { status: 'here', problems });
      onHere();
      return problems;
    } catch (reason) {
      bytes.delete(sha256);
      say(sha256, { status: 'failed', why: reason instanceof Error ? reason.message : String(reason) });
      throw reason;
    } finally {
      stops.delete(sha256);
    }
  }

  return {
    state,
    async takeFile(file, name) {
      const sha256 = await sumOf(file);
      const now = state.getState()[sha256];
      const problems = now?.status === 'here' ? now.problems : await read(sha256, name, file);
      const kept = await shelf.put(sha256, file);
      return { sha256, bytes: file.size, kept, problems };
    },
    stop: (sha256) => stops.get(sha256)?.abort(),
    async bringIn({ traces }) {
      for (const { sha256, name } of traces) {
        const now = state.getState()[sha256];
        if (now?.status === 'here' || now?.status === 'reading') continue;
        const blob = bytes.get(sha256) ?? (await shelf.bytesOf(sha256));
        if (blob === null) say(sha256, { status: 'missing' });
        else await read(sha256, name, blob).catch(() => undefined);
      }
    },
    bytesOf: (sha256) => bytes.get(sha256) ?? null,
    async putBytes(sha256, whole) {
      if ((await sumOf(whole)) !== sha256) return false;
      bytes.set(sha256, whole);
      await shelf.put(sha256, whole);
      return true;
    },
  };
}
