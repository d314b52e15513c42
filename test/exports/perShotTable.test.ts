/** The per-shot table says what the reduction says, to ten digits, and carries its conditions. */
import Papa from 'papaparse';
import { describe, expect, it } from 'vitest';
import { perShotCsv, perShotTable, perShotTabs } from '../../src/exports/perShotTable.ts';
import { reduce } from '../../src/reduction/reduce.ts';
import type { Reduction } from '../../src/reduction/results.ts';
import { demoSession } from '../../src/session/demo.ts';
import type { Session } from '../../src/session/session.ts';
import { demoLike, DEMO_ROWS, SHOTS } from '../fixtures/demoLike.ts';
import { rowId, sessionOf } from '../fixtures/session.ts';

/** Ten significant digits: half a unit in the tenth at the worst. */
const TEN_DIGITS = 5e-10;

interface Read {
  readonly headers: readonly string[];
  readonly rows: readonly (readonly string[])[];
}

/** As a reader does who knows that # begins a comment. */
function read(csv: string): Read {
  const [headers = [], ...rows] = Papa.parse<string[]>(csv, { comments: '#', skipEmptyLines: true }).data;
  return { headers, rows };
}

const cells = ({ headers, rows }: Read, header: string): readonly string[] => {
  const at = headers.indexOf(header);
  if (at === -1) throw new Error(`no column ${header} among ${headers.join(' | ')}`);
  return rows.map((row) => row[at] ?? '');
};

describe.each([['the invented bench of the tests', demoLike({ calibration: 'taps' })], ['the demo', demoSession()]])('the CSV of %s', (_, session) => {
  const r = reduce(session, null);
  const csv = perShotCsv(session, r);
  const table = read(csv);
  const listed = r.records.filter(({ kind }) => kind === 'shot' || kind === 'tap' || kind === 'blank');

  it('has a row for every shot, tap and blank, in the order of the run, all rows as wide as the header', () => {
    expect(cells(table, 'line')).toEqual(listed.map(({ line }) => line));
    expect(cells(table, 'kind')).toEqual(listed.map(({ kind }) => kind));
    for (const row of table.rows) expect(row.length).toBe(table.headers.length);
  });

  it.each<readonly [header: string, factor: number, of: (x: Reduction['records'][number]) => number | undefined]>([
    ['impulse bit (mN·s)', 1e3, (x) => x.impulseBit?.value],
    ['standard uncertainty u (mN·s)', 1e3, (x) => x.impulseBit?.u],
    ['expanded uncertainty U = k u (mN·s)', 1e3, (x) => x.impulseBit?.U],
    ['coverage factor k (95 %)', 1, (x) => x.impulseBit?.k],
    ['effective degrees of freedom', 1, (x) => x.impulseBit?.dof],
    ['impulse bit, full pendulum (mN·s)', 1e3, (x) => x.full?.value],
    ['impulse bit, small angle (mN·s)', 1e3, (x) => x.smallAngle?.value],
    ['impulse bit by geometry (mN·s)', 1e3, (x) => x.byGeometry?.value],
    ['u by geometry (mN·s)', 1e3, (x) => x.byGeometry?.u],
    ['impulse bit by taps (mN·s)', 1e3, (x) => x.byTaps?.value],
    ['u by taps (mN·s)', 1e3, (x) => x.byTaps?.u],
    ['impulse of the tap as stated (mN·s)', 1e3, (x) => x.knownImpulse?.value],
    ['first-swing angle (mrad)', 1e3, (x) => x.angle?.value],
    ['damping-corrected first swing (mrad)', 1e3, (x) => x.launch?.value],
    ['rest reading (mm)', 1e3, (x) => x.readings.rest ?? undefined],
    ['first swing (mm)', 1e3, (x) => x.readings.firstSwing ?? undefined],
    ['charge voltage (V)', 1, (x) => x.readings.voltage ?? undefined],
    ['absolute pressure (Pa)', 1, (x) => x.pressure?.value],
    ['u of absolute pressure (Pa)', 1, (x) => x.pressure?.u],
  ])('reads back as the reduction’s numbers to ten digits: %s', (header, factor, of) => {
    const found = cells(table, header);
    const isRight = (cell: string, value: number | undefined): boolean => {
      if (value === undefined) return cell === '';
      if (value === Number.POSITIVE_INFINITY) return cell === 'infinite';
      return cell !== '' && Math.abs(Number(cell) - value * factor) <= TEN_DIGITS * Math.abs(value * factor);
    };
    expect(listed.filter((record, i) => !isRight(found[i]!, of(record))).map(({ id }) => id)).toEqual([]);
    expect(found.some((cell) => cell !== '')).toBe(true);
  });

  it('says what was set aside and why, and keeps its numbers', () => {
    const counted = cells(table, 'counted');
    const reasons = cells(table, 'set aside because');
    for (const [i, record] of listed.entries()) expect([counted[i], reasons[i]]).toEqual(record.setAside === null ? ['yes', ''] : ['no', record.setAside]);
  });

  it('carries mean, uncertainty, calibration and every entry typed on top, each in one comment', () => {
    const comments = csv.split('\r\n').filter((line) => line.startsWith('#,'));
    const all = comments.join('\n');
    expect(all).toContain(`mean ${String(Number(r.run!.mean.value.toPrecision(10)))} N·s`);
    expect(all).toContain(`n = ${r.run!.n} of ${r.run!.of}`);
    expect(all).toContain('taps of known impulse');
    for (const used of r.entries.filter((one) => one.used && one.value !== null)) expect(all).toContain(used.label);
    expect(csv.split('\r\n').indexOf(comments.at(-1)!)).toBe(comments.length - 1);
  });

  it('is the same text every time', () => {
    expect(perShotCsv(session, reduce(session, null))).toBe(csv);
  });

  it('ends every line with CRLF and begins every comment with #', () => {
    expect(csv.endsWith('\r\n')).toBe(true);
    expect(csv.replaceAll('\r\n', '')).not.toMatch(/[\r\n]/);
  });

  it('is the same as the tab-separated text, field by field', () => {
    const [headers, ...rows] = perShotTabs(session, r).slice(0, -1).split('\n').map((line) => line.split('\t'));
    expect(headers).toEqual(table.headers);
    expect(rows).toEqual(table.rows);
  });
});

describe('the per-shot table', () => {
  it('has the unit of every number in its header, and numbers in that unit', () => {
    const session = demoLike();
    const { columns } = perShotTable(session, reduce(session, null));
    const measured = columns.filter(({ unit }) => unit !== null && unit.symbol !== '1');
    expect(measured.length).toBeGreaterThan(15);
    for (const { header, unit } of measured) expect(header).toContain(`(${unit!.symbol})`);
  });

  it('shows the readings as angles where they are angles', () => {
    const session = sessionOf({
      choices: { form: 'pointBob', readingWay: 'angle', dampingWay: 'none' },
      entries: { bobMass: '10 g', bobDistance: '300 mm', leverArm: '300 mm', gravity: '9.81 m/s²' }, rows: [{ rest: 0, first: 1.5 }], readingUnit: '°',
    });
    const table = read(perShotCsv(session, reduce(session, null)));
    expect(Number(cells(table, 'first swing (mrad)')[0])).toBeCloseTo((1500 * Math.PI) / 180, 7);
  });

  it('keeps a negative impulse bit a number', () => {
    const session = demoLike({}, DEMO_ROWS.map((row, i) => (i === SHOTS[0] - 1 ? { ...row, first: 101 } : row)));
    const table = read(perShotCsv(session, reduce(session, null)));
    const cell = cells(table, 'impulse bit (mN·s)')[cells(table, 'line').indexOf(String(SHOTS[0] + 1))]!;
    expect(cell).toMatch(/^-\d/);
    expect(Number(cell)).toBeLessThan(0);
  });

  it('names on the record what there is to look at', () => {
    const session = demoLike({}, DEMO_ROWS.map((row, i) => (i === SHOTS[0] - 1 ? { ...row, first: 101 } : row)));
    const table = read(perShotCsv(session, reduce(session, null)));
    expect(cells(table, 'things to look at')[cells(table, 'line').indexOf(String(SHOTS[0] + 1))]).toContain('record-negative-throw');
  });

  it('marks the demo as invented, and nothing else', () => {
    const comments = (session: Session): string => perShotCsv(session, reduce(session, null)).split('\r\n').filter((line) => line.startsWith('#')).join('\n');
    expect(comments(demoSession())).toMatch(/DEMO: an invented bench/);
    expect(comments({ ...demoLike(), title: { name: 'Run 3', place: '', date: '', remark: '' } })).not.toMatch(/DEMO/);
  });

  it('holds texts with commas, quotation marks, tabs and formulas through CSV, and makes formulas harmless in both forms', () => {
    const hostile = ['=HYPERLINK(1)', '+cmd', '@x', '-2+3', 'a, "b"', 'tab\there', '# no comment', '-0.5'];
    const base = demoLike();
    const session: Session = { ...base, sheets: [{ ...base.sheets[0]!, edits: Object.fromEntries(hostile.map((text, i) => [String(i + 2), { 1: text, 9: text }])) }], marks: { [rowId(SHOTS[0])]: { setAside: { reason: '=1+1, "two"\nlines' } } } };
    const r = reduce(session, null);
    const listed = r.records.filter(({ kind }) => kind === 'shot' || kind === 'tap' || kind === 'blank');
    const plain = (text: string): string => (/^[=+@]|^-2/.test(text) ? `'${text}` : text);
    const table = read(perShotCsv(session, r));
    expect(cells(table, 'note')).toEqual(listed.map(({ note }) => plain(note)));
    expect(cells(table, 'record')).toEqual(listed.map(({ label }) => plain(label)));
    expect(cells(table, 'set aside because').find((text) => text !== '')).toBe('\'=1+1, "two"\nlines');
    const tabs = perShotTabs(session, r).slice(0, -1).split('\n').map((line) => line.split('\t'));
    for (const row of tabs) expect(row.length).toBe(table.headers.length);
    for (const field of tabs.flat()) expect(field).not.toMatch(/^[=+@]|^-\D/);
  });

  it('is a header alone where there are no records', () => {
    const session = demoLike({}, []);
    const table = read(perShotCsv(session, reduce(session, null)));
    expect(table.rows).toEqual([]);
    expect(table.headers.length).toBeGreaterThan(20);
  });
});
