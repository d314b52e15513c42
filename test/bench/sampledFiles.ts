/** How fast a long sampled record is read, against a minimal scan of its bytes, and what memory the longest takes. */
import { execFileSync } from 'node:child_process';
import { closeSync, openSync, writeSync } from 'node:fs';
import { join } from 'node:path';
import { execPath } from 'node:process';
import Papa from 'papaparse';
import { createSampledReader } from '../../src/readings/sampled/sampledRecord.ts';
import { sniffSampled } from '../../src/readings/sampled/sniff.ts';
import { scanRows, totalOf } from './minimalScan.ts';
import { median, SLOW, table, timed } from './timing.ts';
import type { Case, Group } from './timing.ts';

const ROWS = 2_000_000;
const LONG_ROWS = 10_000_000;
const LONG_ROUNDS = 3;
const CHUNK = 1 << 20;

const HEADER = 'time (s),displacement (mm)\n';

/** Time in s and displacement in mm, 20 bytes a row: a damped swing, quantised as a sensor's program prints it. */
function rowsText(from: number, to: number): string {
  const parts: string[] = [];
  for (let i = from; i < to; i += 1) parts.push(`${(i / 1000).toFixed(4)},${(12.5 + 8 * Math.exp(-i / 5e5) * Math.sin(i / 170)).toFixed(6)}\n`);
  return parts.join('');
}

function readInChunks(bytes: Uint8Array, plain: boolean): number {
  const dialect = sniffSampled(bytes.subarray(0, 65_536))!;
  const reader = createSampledReader({ bytes: bytes.length, dialect: { ...dialect, plain } });
  for (let from = 0; from < bytes.length; from += CHUNK) reader.take(bytes.subarray(from, from + CHUNK));
  const { columns, rows } = reader.finish();
  return totalOf(columns[0]!.values, columns[1]!.values, rows);
}

function scanned(bytes: Uint8Array): number {
  const [t, x] = [new Float64Array(ROWS), new Float64Array(ROWS)];
  return totalOf(t, x, scanRows(bytes, bytes.indexOf(10) + 1, t, x, 0));
}

function everyByte(bytes: Uint8Array): number {
  let sum = 0;
  for (let i = 0; i < bytes.length; i += 1) sum += bytes[i]!;
  return sum;
}

/** PapaParse as its manual has it, and the numbers of its cells. */
function papaString(text: string): number {
  const { data } = Papa.parse<string[]>(text, { delimiter: ',', skipEmptyLines: true });
  const [t, x] = [new Float64Array(data.length - 1), new Float64Array(data.length - 1)];
  for (let i = 1; i < data.length; i += 1) {
    t[i - 1] = Number(data[i]![0]);
    x[i - 1] = Number(data[i]![1]);
  }
  return totalOf(t, x, t.length);
}

function readingCases(): readonly Case[] {
  const text = HEADER + rowsText(0, ROWS);
  const bytes = new TextEncoder().encode(text);
  return [
    { name: 'minimal scan of the bytes to two arrays', run: () => scanned(bytes) },
    { name: 'every byte touched', run: () => everyByte(bytes) },
    { name: 'read in chunks of 1 MB by the byte scanner', run: () => readInChunks(bytes, true) },
    { name: 'read in chunks of 1 MB by PapaParse', run: () => readInChunks(bytes, false) },
    { name: 'PapaParse alone on the string', run: () => papaString(text) },
  ];
}

export const sampledFiles: Group = { name: 'reading', title: `A sampled record of ${ROWS} rows, 40 MB`, report: timed(readingCases, SLOW) };

/** Of one reading in a process of its own, from the opening of the file to the last row. */
interface Run {
  readonly ms: number;
  readonly rows: number;
  readonly total: number;
  /** Most memory that the process held, beyond what it held before, bytes. */
  readonly peak: number;
}

const WAYS = ['scan', 'reader'] as const;

function written(file: string): void {
  const to = openSync(file, 'w');
  writeSync(to, HEADER);
  for (let row = 0; row < LONG_ROWS; row += ROWS / 20) writeSync(to, rowsText(row, Math.min(LONG_ROWS, row + ROWS / 20)));
  closeSync(to);
}

export const longRecord: Group = {
  name: 'reading-long',
  title: `A sampled record of ${LONG_ROWS} rows, read from its file in chunks of 1 MB by a process of its own`,
  report: async ({ folder }) => {
    const file = join(folder, 'long.csv');
    written(file);
    const runs: Readonly<Record<(typeof WAYS)[number], Run[]>> = { scan: [], reader: [] };
    for (let round = 0; round < LONG_ROUNDS; round += 1) {
      for (const way of WAYS) {
        const run: Run = JSON.parse(execFileSync(execPath, [join(folder, 'longRecord.mjs'), way, file, String(LONG_ROWS)], { encoding: 'utf8' }));
        runs[way].push(run);
      }
    }
    const first = runs.scan[0]!;
    for (const run of [...runs.scan, ...runs.reader]) if (run.rows !== LONG_ROWS || run.total !== first.total) throw new Error(`Timing ${LONG_ROWS} rows: ${run.rows} rows of total ${run.total}, ${first.total} before.`);
    const arrays = 2 * 8 * LONG_ROWS;
    const yardstick = median(runs.scan.map(({ ms }) => ms));
    const row = (name: string, taken: readonly Run[]): readonly string[] => {
      const [ms, peak] = [median(taken.map((run) => run.ms)), median(taken.map((run) => run.peak))];
      return [name, (ms / yardstick).toFixed(2), ms.toFixed(0), (peak / 1e6).toFixed(0), (peak / arrays).toFixed(2)];
    };
    return [
      ...table(['case', 'ratio', 'median ms', 'peak MB', 'over the two arrays'], [row('minimal scan to two arrays', runs.scan), row('read by the byte scanner', runs.reader)]), '',
      `Medians of ${LONG_ROUNDS} processes. The peak is the most that the process held in memory less what it held before the file was opened; the two arrays are ${arrays / 1e6} MB.`,
    ];
  },
};
