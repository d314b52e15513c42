/** What is timed, by groups; the first case of a group is its yardstick. */
import Papa from 'papaparse';
import { readTable } from '../../src/readings/table.ts';
import { reduce } from '../../src/reduction/reduce.ts';
import { demoSession } from '../../src/session/demo.ts';
import type { Session, Sheet } from '../../src/session/session.ts';
import { browserGroup } from './browser.ts';
import { fits } from './fits.ts';
import { manyShots } from './manyShots.ts';
import { pictures } from './pictures.ts';
import { longRecord, sampledFiles } from './sampledFiles.ts';
import { QUICK, timed } from './timing.ts';
import type { Group } from './timing.ts';

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

function demoSheet({ sheets: [sheet] }: Session): Sheet {
  if (sheet === undefined) throw new Error('bench: the demo has no sheet');
  return sheet;
}

/** The demo's bench with a table of its own. */
function benchWith(text: string): Session {
  const demo = demoSession();
  const columns = (['label', 'kind', 'rest', 'firstSwing', 'voltage'] as const).map((role) => ({ role, unit: role === 'voltage' ? 'V' : role === 'rest' || role === 'firstSwing' ? 'mm' : '', by: 'person' as const }));
  return { ...demo, marks: {}, choices: { ...demo.choices, calibration: 'geometry' }, sheets: [{ ...demoSheet(demo), text, columns }] };
}

/** The demo's run, repeated: shots with three turning points each, taps, zeros. */
function demoRepeated(times: number): Session {
  const demo = demoSession();
  const sheet = demoSheet(demo);
  const [head = '', ...rows] = sheet.text.trim().split('\n');
  return { ...demo, marks: {}, sheets: [{ ...sheet, text: [head, ...Array.from({ length: times }, () => rows).flat()].join('\n') }] };
}

const parsing: Group = {
  name: 'table',
  title: `A table of ${ROWS} rows`,
  report: timed(() => {
    const text = handTable(ROWS);
    const whole = benchWith(text);
    return [
      { name: 'PapaParse alone', run: () => Papa.parse<string[]>(text, { delimiter: ',', skipEmptyLines: true }).data.length },
      { name: 'readTable', run: () => readTable(text).rows.length },
      { name: 'parse and reduce to the run mean', run: () => reduce(whole, null).run?.n ?? 0 },
    ];
  }, QUICK),
};

const reducing: Group = {
  name: 'road',
  title: 'The whole road on the demo’s bench, 24 shots and 10 taps a round, three turning points each',
  report: timed(() => {
    const [few, many] = [demoRepeated(9), demoRepeated(42)];
    return [
      { name: '216 shots', run: () => reduce(few, 'demo/20').run?.n ?? 0 },
      { name: '1,008 shots', run: () => reduce(many, 'demo/20').run?.n ?? 0 },
    ];
  }, QUICK),
};

export const groups: readonly Group[] = [parsing, reducing, sampledFiles, longRecord, fits, manyShots, pictures, browserGroup];
