/** What is timed, by groups; the first case of a group is its yardstick. */
import Papa from 'papaparse';
import { readTable } from '../../src/readings/table.ts';
import { reduce } from '../../src/reduction/reduce.ts';
import { demoSession } from '../../src/session/demo.ts';
import type { Session } from '../../src/session/session.ts';

export interface Case {
  readonly name: string;
  /** Does the work once, and answers with a number that depends on all of it and is the same each time. */
  readonly run: () => number;
}

export interface Group {
  readonly title: string;
  readonly cases: Case[];
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

/** The demo's bench with a table of its own. */
function benchWith(text: string): Session {
  const demo = demoSession();
  const sheet = demo.sheets[0];
  if (sheet === undefined) throw new Error('bench: the demo has no sheet');
  const columns = (['label', 'kind', 'rest', 'firstSwing', 'voltage'] as const).map((role) => ({ role, unit: role === 'voltage' ? 'V' : role === 'rest' || role === 'firstSwing' ? 'mm' : '', by: 'person' as const }));
  return { ...demo, marks: {}, choices: { ...demo.choices, calibration: 'geometry' }, sheets: [{ ...sheet, text, columns }] };
}

const whole = benchWith(table);
parsing.cases.push({ name: 'parse and reduce to the run mean', run: () => reduce(whole, null).run?.n ?? 0 });

/** The demo's run, repeated: shots with three turning points each, taps, zeros. */
function demoRepeated(times: number): Session {
  const demo = demoSession();
  const sheet = demo.sheets[0];
  if (sheet === undefined) throw new Error('bench: the demo has no sheet');
  const [head = '', ...rows] = sheet.text.trim().split('\n');
  return { ...demo, marks: {}, sheets: [{ ...sheet, text: [head, ...Array.from({ length: times }, () => rows).flat()].join('\n') }] };
}

const few = demoRepeated(9);
const many = demoRepeated(42);
const reducing: Group = {
  title: 'The whole road on the demo’s bench, 24 shots and 10 taps a round, three turning points each',
  cases: [
    { name: '216 shots', run: () => reduce(few, 'demo/20').run?.n ?? 0 },
    { name: '1,008 shots', run: () => reduce(many, 'demo/20').run?.n ?? 0 },
  ],
};

export const groups: readonly Group[] = [parsing, reducing];
