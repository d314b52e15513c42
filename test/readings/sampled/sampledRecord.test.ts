/** Sampled records in the shapes that people have them: all invented, after the habits of loggers, oscilloscopes and camera programs (common practice, no source). */
import { describe, expect, it } from 'vitest';
import { sentence } from '../../../src/problems/sentences.ts';
import { createSampledReader, readSampledText, type SampledRecord } from '../../../src/readings/sampled/sampledRecord.ts';
import { inPieces } from './invented.ts';

const N = 60;
const T = Array.from({ length: N }, (_, i) => i / 100);
const X = T.map((t) => 12.5 + 8 * Math.sin(6 * t) * Math.exp(-0.3 * t));

const rowsOf = (row: (i: number) => string, n = N): string[] => Array.from({ length: n }, (_, i) => row(i));
const values = (record: SampledRecord): number[][] => record.columns.map((column) => [...column.values]);
const codes = (record: SampledRecord): string[] => record.problems.map((p) => p.code);
const how = ({ decimal, plain, passedOverCount, problems }: SampledRecord): Partial<SampledRecord> => ({ decimal, plain, passedOverCount, problems });
const utf8 = (text: string): Uint8Array => new Uint8Array(Buffer.from(text, 'utf8'));
const utf16 = (text: string, bigEndian: boolean): Uint8Array => {
  const little = Buffer.from(text, 'utf16le');
  return new Uint8Array(bigEndian ? little.swap16() : little);
};

function readBytes(bytes: Uint8Array, lengths: readonly number[] = [bytes.length]): SampledRecord {
  const reader = createSampledReader({ bytes: bytes.length, place: { sheetName: 'sensor.csv' } });
  inPieces(bytes, lengths, reader.take);
  return reader.finish();
}

const PREAMBLES: readonly (readonly string[])[] = [
  [],
  ['An invented record of a pendulum, made for a test'],
  ['# made up', '# channel 1, gain 10', '#'],
  ['% made up; not measured', '% rate = 100 Hz'],
  ['// made up', '', ''],
  ['Recorder,Invented 3', 'Sample rate,100', 'Range;10', 'Date: 2026-01-01', 'Samples\t60', '=====', ''],
  Array.from({ length: 50 }, (_, i) => `Setting ${i}: ${i * 3}, of no importance`),
];

const DELIMITERS = [',', ';', '\t', ' ', '   ', ', ', ' ; '] as const;

describe('a record is read whatever its shape', () => {
  const cases = DELIMITERS.flatMap((delimiter) => (['.', ','] as const).flatMap((decimal) => (decimal === ',' && delimiter.includes(',') ? [] : [[delimiter, decimal] as const])));

  it.each(cases)('parted by “%s”, decimal mark %s, with and without notes, header, units, and ends of lines', (delimiter, decimal) => {
    const number = (value: number, digits: number): string => value.toFixed(digits).replace('.', decimal);
    const spaced = delimiter.trim() === '' && delimiter !== '\t';
    for (const preamble of PREAMBLES) {
      for (const newline of ['\n', '\r\n', '\r']) {
        for (const [header, names] of [
          [[], ['', '']],
          [[`time (s)${delimiter}displacement (mm)`], ['time (s)', 'displacement (mm)']],
          [[`"time"${delimiter}"displacement"`, `"s"${delimiter}"mm"`], ['time', 'displacement']],
          [[`t${delimiter}x`, `[s]${delimiter}[mm]`, ...(spaced ? [] : [''])], ['t', 'x']],
          [[`# time${delimiter}displacement`], ['time', 'displacement']],
        ] as const) {
          const text = [...preamble, ...header, ...rowsOf((i) => `${number(T[i]!, 3)}${delimiter}${number(X[i]!, 5)}`)].join(newline) + newline;
          const record = readSampledText(text);
          const units = header.length === 0 || header[0]!.startsWith('#') ? ['', ''] : ['s', 'mm'];
          expect({ shape: [preamble[0], newline, header], values: values(record), firstLine: record.firstLine, preamble: record.preamble, columns: record.columns.map((column) => [column.header, column.unitText]), ...how(record) }).toEqual({
            shape: [preamble[0], newline, header], values: [T.map((t) => Number(t.toFixed(3))), X.map((x) => Number(x.toFixed(5)))], firstLine: preamble.length + header.length + 1,
            preamble: preamble.filter((line) => line !== ''), columns: names.map((name, i) => [name, units[i]]), decimal, plain: true, passedOverCount: 0, problems: [],
          });
        }
      }
    }
  });

  it.each(['UTF-8 with a mark', 'UTF-16, little end first', 'UTF-16, big end first', 'windows-1252'])('in %s', (name) => {
    const text = ['Time (s);Weg (µm)', ...rowsOf((i) => `${T[i]!.toFixed(3)};${X[i]!.toFixed(5)}`.replaceAll('.', ','))].join('\r\n');
    const big = name.includes('big');
    const inBytes = name.startsWith('UTF-16') ? [utf16(`\ufeff${text}`, big), utf16(text.length % 2 === 0 ? text : `${text} `, big)] : name.startsWith('UTF-8') ? [utf8(`\ufeff${text}`)] : [new Uint8Array(Buffer.from(text, 'latin1'))];
    for (const bytes of inBytes) {
      const record = readBytes(bytes, [7, 1, 30]);
      expect(values(record)).toEqual([T.map((t) => Number(t.toFixed(3))), X.map((x) => Number(x.toFixed(5)))]);
      expect(record.columns.map(({ unitText }) => unitText)).toEqual(['s', 'µm']);
      expect(record.plain).toBe(!name.startsWith('UTF-16'));
      expect(codes(record)).toEqual(name === 'windows-1252' ? ['file-other-encoding'] : []);
    }
  });

  it.each([
    ['scientific notation', rowsOf((i) => `${T[i]!.toExponential(3)},${X[i]!.toExponential(7).replace('e', 'E').replace(/E([+-])(\d)$/, 'E$10$2')}`), 3, 7],
    ['delimiters at the ends of lines', rowsOf((i) => `${T[i]!.toFixed(3)},${X[i]!.toFixed(5)},`), 3, 5],
    ['signs', rowsOf((i) => `+${T[i]!.toFixed(3)},+${X[i]!.toFixed(5)}`), 3, 5],
    ['columns filled up with blanks', rowsOf((i) => `${T[i]!.toFixed(3).padStart(12)},${X[i]!.toFixed(5).padStart(14)}  `), 3, 5],
    ['quotation marks about every cell', rowsOf((i) => `"${T[i]!.toFixed(3)}","${X[i]!.toFixed(5)}"`), 3, 5],
    ['a blank line after each', rowsOf((i) => `${T[i]!.toFixed(3)},${X[i]!.toFixed(5)}\n`), 3, 5],
    ['exponents of old programs', rowsOf((i) => `${T[i]!.toFixed(3)},${X[i]!.toExponential(5).replace('e', 'D')}`), 3, -5],
  ] as const)('with %s', (_, rows, digits, figures) => {
    const record = readSampledText(['time (s),displacement (mm)', ...rows].join('\n') + '\n');
    const round = (value: number): number => Number(figures > 5 || figures < 0 ? value.toExponential(Math.abs(figures)) : value.toFixed(figures));
    expect(values(record)[0]!.map((t) => t.toFixed(digits))).toEqual(T.map((t) => t.toFixed(digits)));
    expect(values(record)[1]).toEqual(X.map(round));
    expect(record.passedOverCount).toBe(0);
  });
});

describe('columns', () => {
  it('of text and of time of day stand among those of numbers', () => {
    const rows = rowsOf((i) => `14:02:${String(Math.floor(i / 2)).padStart(2, '0')}.${i % 2 === 0 ? '000' : '500'},ok,${i},${-i / 2},`);
    const record = readSampledText(['Clock,State,Frame,x (px),', ...rows].join('\n'));
    expect(record.columns.map(({ header, clock, missing }) => [header, clock, missing])).toEqual([['Clock', true, 0], ['Frame', false, 0], ['x (px)', false, 0]]);
    expect(record.columns[0]!.values.slice(0, 4)).toEqual(Float64Array.of(50_520, 50_520.5, 50_521, 50_521.5));
    expect(record.plain).toBe(true);
  });

  it('with numbers in half of the rows or fewer are left out, later ones are not', () => {
    const text = ['a,b,c,d', ...rowsOf((i) => `${i},${i < N / 2 ? i : ''},${i < N / 2 - 1 ? '' : i},note ${i}`)].join('\n');
    const record = readSampledText(text);
    expect(record.columns.map(({ header, missing }) => [header, missing])).toEqual([['a', 0], ['c', N / 2 - 1]]);
    expect(record.columns[1]!.values.slice(N / 2 - 2, N / 2)).toEqual(Float64Array.of(Number.NaN, N / 2 - 1));
  });

  it('that begin with words for a long time become columns of numbers all the same, and the words are told', () => {
    const text = ['t,x', ...rowsOf((i) => `${i},${i < 4000 ? 'OVR' : i}`, 10_000)].join('\n');
    const record = readSampledText(text);
    expect(record.columns[1]).toMatchObject({ header: 'x', missing: 4000 });
    expect(record.columns[1]!.values[4000]).toBe(4000);
    expect([record.passedOverCount, record.passedOver.length, record.passedOver[0]]).toEqual([4000, 20, { line: 2, text: '0,OVR' }]);
  });

  it('of NaN, inf and empty cells hold no number, and no word either', () => {
    const odd = ['NaN', 'inf', '-Inf', '', '1.#QNAN', 'n/a', '1e999'];
    const record = readSampledText(['t,x,y', ...rowsOf((i) => `${i},${i},${i % 10 === 3 ? odd[(i - 3) / 10 % odd.length] : i}`, 70)].join('\n'));
    expect(record.columns[2]!.missing).toBe(7);
    expect([record.passedOverCount, codes(record)]).toEqual([0, []]);
  });

  it('are named by group where their headers come twice', () => {
    const { columns } = readSampledText(['Pivot,,Marker,,', 'x,y,x,y,frame', 'px,px,px,px,', ...rowsOf((i) => `${i},${i},${i},${i},${i}`)].join('\n'));
    expect(columns.map(({ header, unitText }) => [header, unitText])).toEqual([['Pivot x', 'px'], ['Pivot y', 'px'], ['Marker x', 'px'], ['Marker y', 'px'], ['frame', '']]);
  });

  it('two numbers above the header are no row, and one heading above two cells is a decimal comma', () => {
    expect(readSampledText(['2 60', 't x', ...rowsOf((i) => `${i}.5 ${i}`)].join('\n'))).toMatchObject({ rows: N, firstLine: 3, preamble: ['2 60'] });
    const single = readSampledText(['Weg (mm)', ...rowsOf((i) => `12,${100 + i}`)].join('\n'));
    expect([single.decimal, single.columns.length, single.columns[0]!.values[3]]).toEqual([',', 1, 12.103]);
  });
});

describe('rows that are not whole', () => {
  const text = (rows: readonly string[]): SampledRecord => readSampledText(['t (s),x (mm)', ...rows].join('\n') + '\n');

  it('a message in the middle is no row, and lines go on to be counted', () => {
    const record = text(rowsOf((i) => (i === 20 ? 'trigger lost' : i === 30 ? '# marker 3,5' : i === 40 ? '' : `${i},${i}`)));
    expect(record.rows).toBe(N - 3);
    expect(record.passedOver).toEqual([{ line: 22, text: 'trigger lost' }, { line: 32, text: '# marker 3,5' }]);
    expect([19, 20, 28, 29, 38].map(record.lineOfRow)).toEqual([21, 23, 31, 33, 43]);
    expect(record.problems.map(sentence)).toEqual(['Line 22: 2 lines with a word or too few cells are passed over; the first reads “trigger lost”.']);
  });

  it('comments and messages from the first rows on cost no row', () => {
    const record = text(rowsOf((i) => `${i},${i}.5\n# marker\n${i % 2 === 0 ? 'stirred by hand' : ''}`));
    expect([record.rows, record.firstLine, record.passedOverCount, record.lineOfRow(1)]).toEqual([N, 2, 1.5 * N, 5]);
  });

  it('a word in place of a number costs that number alone', () => {
    const record = text(rowsOf((i) => (i === 20 ? '20,OVR' : `${i},${i}`)));
    expect([record.rows, record.columns[0]!.values[20], record.columns[1]!.values[20], record.columns[1]!.missing]).toEqual([N, 20, Number.NaN, 1]);
    expect(record.passedOver).toEqual([{ line: 22, text: '20,OVR' }]);
  });

  it('too few cells cost those that are missing; too many numbers cost the row, for it has slipped', () => {
    const record = text(rowsOf((i) => (i === 10 ? '10' : i === 20 ? '0,020,4' : i === 30 ? '30,30,a note' : `${i},${i}`)));
    expect([10, 20, 30].map((row) => record.columns.map(({ values: all }) => all[row]))).toEqual([[10, Number.NaN], [Number.NaN, Number.NaN], [30, 30]]);
    expect(record.passedOver.map(({ line }) => line)).toEqual([12, 22]);
  });

  it('a number in a note here and there makes no column', () => {
    const record = readSampledText(['t,x,note', ...rowsOf((i) => (i % 20 === 3 ? `${i},${i},${i}` : `${i},${i}`))].join('\n'));
    expect([record.columns.map(({ header }) => header), record.passedOverCount]).toEqual([['t', 'x'], 0]);
  });

  it('a header that comes again where files were put together is passed over', () => {
    const rows = rowsOf((i) => `${i},${i}`);
    const record = text([...rows, 't (s),x (mm)', ...rows]);
    expect([record.rows, record.passedOverCount]).toEqual([2 * N, 1]);
  });

  it.each([
    ['within the last number', '0.59,12.8', [0.59, Number.NaN], true],
    ['within the exponent', '0.59,1.234567E-', [0.59, Number.NaN], false],
    ['before the last cell', '0.590', [0.59, Number.NaN], false],
    ['within the first cell', '0.5', [Number.NaN, Number.NaN], true],
    ['after its last digit', '0.590,12.84567', [0.59, 12.84567], false],
  ] as const)('a last line that stops %s', (_, last, [t, x], told) => {
    const record = readSampledText(['t (s),x (mm)', ...rowsOf((i) => `${T[i]!.toFixed(last.startsWith('0.59,') ? 2 : 3)},${X[i]!.toFixed(5)}`, N - 1), last].join('\n'));
    // A row without any number at the end is none.
    expect(record.rows).toBe(Number.isNaN(t) ? N - 1 : N);
    expect(record.columns.map(({ values: all }) => all[N - 1] ?? Number.NaN)).toEqual([t, x]);
    expect(codes(record).includes('trace-cut-off')).toBe(told);
  });

  it('rows of nothing at the end, as spreadsheets and full disks leave them, are no rows', () => {
    expect(readSampledText(`t,x\n${rowsOf((i) => `${i},${i}`).join('\n')}${'\n,'.repeat(500)}`)).toMatchObject({ rows: N, passedOverCount: 0 });
    expect(readSampledText(`t,x\n${rowsOf((i) => `${i},${i}`).join('\n')}\n${'\0'.repeat(3000)}`)).toMatchObject({ rows: N, passedOverCount: 0 });
    const long = readSampledText(`t,x\n${rowsOf((i) => `${i},${i}`).join('\n')}\n${'\0'.repeat(3_000_000)}\n7,7\n`);
    expect([long.rows, long.passedOverCount, long.lineOfRow(N)]).toEqual([N + 1, 1, N + 3]);
  });

  it('a quotation mark that does not close spoils its own line', () => {
    const record = readSampledText(['t,x,"note"', ...rowsOf((i) => (i === 20 ? '20,20,"open' : `${i},${i},"n"`))].join('\n'));
    expect(record).toMatchObject({ rows: N, plain: false });
    expect(values(record)[1]).toEqual(rowsOf(String).map(Number));
    expect(record.problems).toMatchObject([{ code: 'quote-not-closed', place: { line: 22 } }]);
  });
});

describe('files without a record', () => {
  it.each([
    ['nothing', '', 'file-empty'],
    ['blank lines', '\n\n \n', 'trace-no-samples'],
    ['words alone', 'a letter\nof some length, with commas\n', 'trace-no-samples'],
    ['one row', 't,x\n1.5,2.5\n', 'trace-no-samples'],
    ['one number', '12', 'trace-no-samples'],
  ])('%s', (_, text, code) => {
    const record = readSampledText(text, { place: { sheetName: 'a.csv' } });
    expect(record.problems).toMatchObject([{ code, weight: 'stops', place: { sheetName: 'a.csv' } }]);
    expect(sentence(record.problems[0]!)).toMatch(/^a\.csv: .*\.$/);
  });

  it('numbers cut at their decimal commas are told', () => {
    const record = readSampledText(['t (s),x (mm)', ...rowsOf((i) => `0,${100 + i},1,${200 + i}`)].join('\n'));
    expect(record.problems).toMatchObject([{ code: 'decimal-comma-in-comma-file', facts: { found: '0,100', columns: 2 } }]);
  });

  it('a header deep in notes is found, and what is read does not hang on the pieces', () => {
    const notes = Array.from({ length: 4000 }, (_, i) => `note ${i}: nothing of importance, ${'.'.repeat(60)}`);
    const text = [...notes, 't (s);x (mm)', ...rowsOf((i) => `${i};${i}`)].join('\r\n');
    for (const lengths of [[1 << 20], [1000], [65_536, 3]]) expect(readBytes(utf8(text), lengths)).toMatchObject({ rows: N, firstLine: 4002, columns: [{ header: 't (s)' }, { header: 'x (mm)' }] });
  });
});
