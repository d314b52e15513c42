/** How fast a long sampled record is read, against a minimal scan of its bytes. */
import Papa from 'papaparse';
import { createSampledReader } from '../../src/readings/sampled/sampledRecord.ts';
import { sniffSampled } from '../../src/readings/sampled/sniff.ts';
import type { Group } from './cases.ts';

const ROWS = 2_000_000;
const CHUNK = 1 << 20;

/** Time in s and displacement in mm, 20 bytes a row: a damped swing, quantised as a sensor's program prints it. */
function recordText(rows: number): string {
  const parts = ['time (s),displacement (mm)\n'];
  for (let i = 0; i < rows; i += 1) parts.push(`${(i / 1000).toFixed(4)},${(12.5 + 8 * Math.exp(-i / 5e5) * Math.sin(i / 170)).toFixed(6)}\n`);
  return parts.join('');
}

function bytesOf(text: string): Uint8Array {
  const bytes = new Uint8Array(text.length);
  for (let i = 0; i < text.length; i += 1) bytes[i] = text.charCodeAt(i);
  return bytes;
}

const text = recordText(ROWS);
const bytes = bytesOf(text);

const total = (t: ArrayLike<number>, x: ArrayLike<number>, rows: number): number => {
  let sum = 0;
  for (let i = 0; i < rows; i += 1) sum += t[i]! + x[i]!;
  return sum;
};

/** The least that reads two columns of decimals: no blanks, no exponents, no empty cells, no words, nothing checked. */
function minimalScan(): number {
  const [t, x] = [new Float64Array(ROWS), new Float64Array(ROWS)];
  const power = Float64Array.from({ length: 23 }, (_, k) => Number(`1e${k}`));
  let i = bytes.indexOf(10) + 1;
  let row = 0;
  while (i < bytes.length) {
    for (let column = 0; column < 2; column += 1) {
      let b = bytes[i]!;
      const negative = b === 45;
      if (negative) b = bytes[++i]!;
      let value = 0;
      let point = -1;
      while (b !== 44 && b !== 10) {
        if (b === 46) point = i;
        else value = value * 10 + (b - 48);
        b = bytes[++i]!;
      }
      if (point >= 0) value /= power[i - point - 1]!;
      (column === 0 ? t : x)[row] = negative ? -value : value;
      i += 1;
    }
    row += 1;
  }
  return total(t, x, row);
}

function touchEveryByte(): number {
  let sum = 0;
  for (let i = 0; i < bytes.length; i += 1) sum += bytes[i]!;
  return sum;
}

function readInChunks(plain: boolean): number {
  const dialect = sniffSampled(bytes.subarray(0, 65_536))!;
  const reader = createSampledReader({ bytes: bytes.length, dialect: { ...dialect, plain } });
  for (let from = 0; from < bytes.length; from += CHUNK) reader.take(bytes.subarray(from, from + CHUNK));
  const { columns, rows } = reader.finish();
  return total(columns[0]!.values, columns[1]!.values, rows);
}

/** PapaParse as its manual has it, and the numbers of its cells. */
function papaString(): number {
  const { data } = Papa.parse<string[]>(text, { delimiter: ',', skipEmptyLines: true });
  const [t, x] = [new Float64Array(data.length - 1), new Float64Array(data.length - 1)];
  for (let i = 1; i < data.length; i += 1) {
    t[i - 1] = Number(data[i]![0]);
    x[i - 1] = Number(data[i]![1]);
  }
  return total(t, x, t.length);
}

export const sampledFiles: Group = {
  title: `A sampled record of ${ROWS} rows, ${Math.round(bytes.length / 1e6)} MB`,
  cases: [
    { name: 'minimal scan of the bytes to two arrays', run: minimalScan },
    { name: 'every byte touched', run: touchEveryByte },
    { name: 'read in chunks of 1 MB by the byte scanner', run: () => readInChunks(true) },
    { name: 'read in chunks of 1 MB by PapaParse', run: () => readInChunks(false) },
    { name: 'PapaParse alone on the string', run: papaString },
  ],
};
