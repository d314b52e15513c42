/** Reads one file by one way and says how long it took and what memory it took at most: a process by itself. */
import { closeSync, fstatSync, openSync, readSync } from 'node:fs';
import { argv, memoryUsage, resourceUsage, stdout } from 'node:process';
import { createSampledReader } from '../../src/readings/sampled/sampledRecord.ts';
import { scanRows, totalOf } from './minimalScan.ts';

const CHUNK = 1 << 20;
/** Longer than any line of the file. */
const LINE = 64;

interface Columns {
  readonly t: ArrayLike<number>;
  readonly x: ArrayLike<number>;
  readonly rows: number;
}

function byReader(file: number): Columns {
  const reader = createSampledReader({ bytes: fstatSync(file).size });
  for (;;) {
    const chunk = new Uint8Array(CHUNK);
    const length = readSync(file, chunk);
    if (length === 0) break;
    reader.take(chunk.subarray(0, length));
  }
  const { columns, rows } = reader.finish();
  return { t: columns[0]!.values, x: columns[1]!.values, rows };
}

function byScan(file: number, most: number): Columns {
  const [t, x] = [new Float64Array(most), new Float64Array(most)];
  const held = new Uint8Array(CHUNK + LINE);
  let [row, kept, isFirst] = [0, 0, true];
  for (;;) {
    const length = readSync(file, held, kept, CHUNK, null);
    if (length === 0) return { t, x, rows: row };
    const whole = held.lastIndexOf(10, kept + length - 1) + 1;
    row = scanRows(held.subarray(0, whole), isFirst ? held.indexOf(10) + 1 : 0, t, x, row);
    held.copyWithin(0, whole, kept + length);
    [kept, isFirst] = [kept + length - whole, false];
  }
}

const [way, path, rows] = argv.slice(2);
if (path === undefined) throw new Error('Reading a long record: no file is named.');
const before = memoryUsage.rss();
const begun = performance.now();
const file = openSync(path, 'r');
const read = way === 'scan' ? byScan(file, Number(rows)) : byReader(file);
const ms = performance.now() - begun;
closeSync(file);
const peak = 1024 * resourceUsage().maxRSS - before;
stdout.write(JSON.stringify({ ms, rows: read.rows, total: totalOf(read.t, read.x, read.rows), peak }));
