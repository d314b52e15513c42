/** What is timed, by groups; the first case of a group is its yardstick. */
import Papa from 'papaparse';
import { readTable } from '../../src/readings/table.ts';

export interface Case {
  readonly name: string;
  /** Does the work once, and answers with a number that depends on all of it and is the same each time. */
  readonly run: () => number;
}

export interface Group {
  readonly title: string;
  readonly cases: readonly Case[];
}

const ROWS = 10_000;

/** A hand table of shots, far longer than anyone writes: record, kind, rest and first swing in mm, voltage in V. */
function handTable(rows: number): string {
  const lines = ['shot,kind,rest (mm),first swing (mm),voltage (V)'];
  for (let row = 1; row <= rows; row += 1) {
    const rest = 12 + (row % 7) / 10;
    const firstSwing = rest + 18 + (row % 23) / 10;
    lines.push(`${row},shot,${rest.toFixed(1)},${firstSwing.toFixed(1)},${1200 + (row % 5)}`);
  }
  return `${lines.join('\n')}\n`;
}

const table = handTable(ROWS);

const parsing: Group = {
  title: `A table of ${ROWS} rows`,
  cases: [
    {
      name: 'PapaParse alone',
      run: () => Papa.parse<string[]>(table, { delimiter: ',', skipEmptyLines: true }).data.length,
    },
    { name: 'readTable', run: () => readTable(table).rows.length },
  ],
};

export const groups: readonly Group[] = [parsing];
