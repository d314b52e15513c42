/** The per-shot impulse table: columns with their units, one row a record, and the whole as a CSV with its conditions on top. */
import { EVIDENCE_NAMES, WAY_RESTS_ON } from '../reduction/wayWords.ts';
import { instrumentWords } from '../reduction/instruments.ts';
import type { EntryRead, RecordResult, Reduction, Result, RunResult, Stated } from '../reduction/results.ts';
import { sentence } from '../problems/sentences.ts';
import type { Problem } from '../problems/problems.ts';
import type { Session } from '../session/session.ts';
import { chooseUnit, sixDigits, tenDigits, withPlusMinus } from '../units/format.ts';
import { fromSi, siUnit, unitNamed, type Unit } from '../units/units.ts';
import { commentRow, csvText, harmless, textField } from './csv.ts';

export interface TableColumn {
  readonly id: string;
  /** With the unit in brackets: "impulse bit (mN·s)". */
  readonly header: string;
  readonly unit: Unit | null;
}

export type TableCell = string | number | null;

export interface PerShotTable {
  readonly columns: readonly TableColumn[];
  /** Numbers in the column's unit. */
  readonly rows: readonly (readonly TableCell[])[];
}

interface Column extends TableColumn {
  readonly cell: (record: RecordResult) => TableCell;
}

const named = (symbol: string): Unit => {
  const unit = unitNamed(symbol);
  if (!unit) throw new Error(`per-shot table: unit ${symbol} is not in the table`);
  return unit;
};

/** The kinds that a per-shot table lists; zeros and free swings have no impulse. */
const LISTED: ReadonlySet<RecordResult['kind']> = new Set(['shot', 'tap', 'blank']);

export function perShotTable(session: Session, reduction: Reduction): PerShotTable {
  const columns = columnsOf(session, reduction);
  const rows = reduction.records.filter((record) => LISTED.has(record.kind)).map((record) => columns.map((column) => column.cell(record)));
  return { columns: columns.map(({ id, header, unit }) => ({ id, header, unit })), rows };
}

function columnsOf(session: Session, reduction: Reduction): readonly Column[] {
  const impulse = chooseUnit(reduction.records.flatMap((r) => (r.impulseBit && r.kind !== 'blank' ? [r.impulseBit.value] : [])), 'impulse');
  const angle = named('mrad');
  const reading = session.choices.readingWay === 'angle' ? angle : named('mm');
  const text = (id: string, header: string, cell: (r: RecordResult) => string): Column => ({ id, header, unit: null, cell });
  const number = (id: string, label: string, unit: Unit | null, cell: (r: RecordResult) => number | null): Column => ({
    id, header: unit && unit.symbol !== '1' ? `${label} (${unit.symbol})` : label, unit,
    cell: (r) => {
      const value = cell(r);
      return value === null || unit === null ? value : fromSi(value, unit);
    },
  });
  const value = (of: (r: RecordResult) => Stated | null) => (r: RecordResult): number | null => of(r)?.value ?? null;
  const u = (of: (r: RecordResult) => Stated | null) => (r: RecordResult): number | null => of(r)?.u ?? null;
  const result = (of: (r: RecordResult) => Result | null, pick: (x: Result) => number) => (r: RecordResult): number | null => {
    const x = of(r);
    return x ? pick(x) : null;
  };
  const seconds = siUnit('time');
  return [
    number('order', 'place in the run', null, (r) => r.order),
    text('label', 'record', (r) => r.label),
    text('sheet', 'sheet', (r) => reduction.sheets.find((s) => s.id === r.sheet)?.name ?? r.sheet),
    text('line', 'line', (r) => r.line),
    text('kind', 'kind', (r) => r.kind),
    text('counted', 'counted', (r) => (r.setAside === null ? 'yes' : 'no')),
    text('setAside', 'set aside because', (r) => r.setAside ?? ''),
    number('time', 'time', seconds, (r) => r.readings.time),
    number('voltage', 'charge voltage', siUnit('voltage'), (r) => r.readings.voltage),
    number('pressure', 'absolute pressure', siUnit('pressure'), value((r) => r.pressure)),
    number('uPressure', 'u of absolute pressure', siUnit('pressure'), u((r) => r.pressure)),
    number('rest', 'rest reading', reading, (r) => r.readings.rest),
    number('firstSwing', 'first swing', reading, (r) => r.readings.firstSwing),
    number('angle', 'first-swing angle', angle, value((r) => r.angle)),
    number('uAngle', 'u of first-swing angle', angle, u((r) => r.angle)),
    number('launch', 'damping-corrected first swing', angle, value((r) => r.launch)),
    number('impulseBit', 'impulse bit', impulse, value((r) => r.impulseBit)),
    number('u', 'standard uncertainty u', impulse, u((r) => r.impulseBit)),
    number('k', 'coverage factor k (95 %)', null, result((r) => r.impulseBit, (x) => x.k)),
    number('U', 'expanded uncertainty U = k u', impulse, result((r) => r.impulseBit, (x) => x.U)),
    number('dof', 'effective degrees of freedom', null, result((r) => r.impulseBit, (x) => x.dof)),
    number('uOwn', 'part of u that is this record’s own', impulse, (r) => (r.impulseBit ? r.ownU : null)),
    number('full', 'impulse bit, full pendulum', impulse, value((r) => r.full)),
    number('smallAngle', 'impulse bit, small angle', impulse, value((r) => r.smallAngle)),
    number('byGeometry', 'impulse bit by geometry', impulse, value((r) => r.byGeometry)),
    number('uByGeometry', 'u by geometry', impulse, u((r) => r.byGeometry)),
    number('byTaps', 'impulse bit by taps', impulse, value((r) => r.byTaps)),
    number('uByTaps', 'u by taps', impulse, u((r) => r.byTaps)),
    number('tapImpulse', 'impulse of the tap as stated', impulse, value((r) => r.knownImpulse)),
    text('note', 'note', (r) => r.note),
    text('problems', 'things to look at', (r) => r.problems.map((p) => p.code).join(' ')),
  ];
}

function cellText(cell: TableCell): string {
  if (cell === null) return '';
  if (typeof cell === 'string') return textField(cell);
  return Number.isFinite(cell) ? tenDigits(cell) : 'infinite';
}

/**
 * The table as CSV: comment lines (each starts with `#,`) with conditions and methods, a header row with units, a row a
 * record. Numbers have 10 significant digits, so that engines that differ in a last bit write the same bytes.
 *
 * RFC 4180 knows no comments; a reader that does not either finds the header in the first row with more than two fields.
 */
export function perShotCsv(session: Session, reduction: Reduction): string {
  const table = perShotTable(session, reduction);
  const preamble = conditions(session, reduction).map(commentRow);
  return csvText([...preamble, table.columns.map((c) => textField(c.header)), ...table.rows.map((row) => row.map(cellText))]);
}

/** Tab-separated, for a spreadsheet: header and rows, no preamble. */
export function perShotTabs(session: Session, reduction: Reduction): string {
  const table = perShotTable(session, reduction);
  const plain = (cell: TableCell): string => (typeof cell === 'string' ? harmless(cell.replace(/[\t\r\n]+/g, ' ')) : cellText(cell));
  return [table.columns.map((c) => c.header), ...table.rows.map((row) => row.map(plain))].map((row) => `${row.join('\t')}\n`).join('');
}

const ROUTE = {
  masses: 'masses and lengths alone', massesAndPeriod: 'route A: masses, centre of mass and timed period', inertiaAndPeriod: 'route B: moment of inertia and timed period',
} as const;

function conditions(session: Session, reduction: Reduction): readonly string[] {
  const { title, choices } = session;
  const lines: string[] = ['Per-shot impulse table, written by Firstswing'];
  if (session.demo) lines.push('DEMO: an invented bench and invented readings, not a measurement');
  for (const [what, text] of [['session', title.name], ['place', title.place], ['date', title.date], ['remark', title.remark]] as const) if (text.trim() !== '') lines.push(`${what}: ${oneLine(text)}`);
  lines.push(`calibration: ${WAY_RESTS_ON[reduction.chosen]}; stiffness and inertia by ${ROUTE[choices.route]}`);
  lines.push(`form of the swing: ${choices.swingForm === 'full' ? 'full pendulum, solved back from the first maximum' : 'small angle'}; damping from ${reduction.damping?.way ?? 'none'}`);
  if (reduction.run) lines.push(...runLines(reduction.run, reduction));
  if (reduction.runWithSetAside) lines.push(`with the shots set aside counted too: ${meanText(reduction.runWithSetAside)}`);
  if (reduction.pressure) lines.push(pressureLine(reduction.pressure));
  for (const read of reduction.entries) {
    if (read.used && read.value !== null) lines.push(`${read.label} ${read.symbol}: typed ${quote(typedText(session, read.name))}, u ${tenDigits(read.u)} ${siUnit(read.dimension).symbol}, ${read.distribution}${measuredWith(read)}`);
  }
  lines.push(...instrumentLines(session, reduction));
  for (const sheet of session.sheets) lines.push(`readings: ${oneLine(sheet.name)}${sheet.sha256 === '' ? '' : `, SHA-256 ${sheet.sha256}`}${readWith(session, sheet.instrument)}`);
  lines.push(...reduction.problems.filter(isOpen).map((p) => `to look at: ${oneLine(sentence(p))}`));
  lines.push('u: standard uncertainty; U: expanded uncertainty for 95 % coverage; the common part of u does not shrink with the number of shots');
  return lines;
}

const isOpen = (p: Problem): boolean => p.weight !== 'note';
const oneLine = (text: string): string => text.replace(/\s+/g, ' ').trim();
const quote = (text: string): string => `“${oneLine(text)}”`;

/** What an entry was measured with, and what that instrument's calibration adds to its own u. */
function measuredWith({ measuredWith: by, dimension }: EntryRead): string {
  if (by === undefined) return '';
  return `, measured with ${oneLine(by.words)}${by.u > 0 ? `, whose calibration adds u ${tenDigits(by.u)} ${siUnit(dimension).symbol}` : ''}`;
}

function readWith({ instruments }: Session, id: string | undefined): string {
  const index = instruments.findIndex((one) => one.id === id);
  return index < 0 ? '' : `, read with ${oneLine(instrumentWords(instruments[index]!, index))}`;
}

function instrumentLines({ instruments }: Session, { instruments: told }: Reduction): readonly string[] {
  return instruments.map((instrument, index) => {
    const read = told.find(({ id }) => id === instrument.id);
    const due = read?.due && read.due.iso !== instrument.due.trim() ? ` (read as ${read.due.iso})` : '';
    const u = read?.scale.value ?? 0;
    const scale = u > 0 && instrument.measures !== 'other' ? `; calibration, common to each ${instrument.measures} measured with it: typed ${quote(instrument.scale.text)}, relative u ${tenDigits(u)}, ${read?.scale.distribution ?? ''}` : '';
    return `instrument: ${oneLine(instrumentWords(instrument, index))}${due}${scale}`;
  });
}

const GAUGE = { absolute: 'an absolute gauge', gauge: 'a gauge against the outside pressure', percentOfScale: 'a dial in percent of a fixed full scale', percentOfOutside: 'a dial in percent of the outside pressure' } as const;

function pressureLine({ meaning, absolute, least, largest, outside, outsideFrom, likeVacuum }: NonNullable<Reduction['pressure']>): string {
  const range = largest > least ? `, ${tenDigits(least)} to ${tenDigits(largest)} Pa` : '';
  const against = outside ? `, outside ${tenDigits(outside.value)} Pa, u ${tenDigits(outside.u)} Pa, by ${outsideFrom === 'height' ? 'the height and the standard atmosphere' : 'barometer'}` : '';
  return `absolute pressure of the shots ${tenDigits(absolute.value)} Pa, u ${tenDigits(absolute.u)} Pa${range}, by ${GAUGE[meaning]}${against}${likeVacuum ? '' : '; not a vacuum figure'}`;
}

function typedText(session: Session, name: string): string {
  const [, part, field] = /^part\.([^.]+)\.(.+)$/.exec(name) ?? [];
  if (part === undefined) return (session.entries as Readonly<Record<string, { readonly text: string } | undefined>>)[name]?.text ?? '';
  return (session.parts.find((p) => p.id === part)?.entries as Readonly<Record<string, { readonly text: string } | undefined>> | undefined)?.[field ?? '']?.text ?? '';
}

function meanText(run: RunResult): string {
  const unit = chooseUnit([run.mean.value], 'impulse');
  return `mean impulse bit ${withPlusMinus(run.mean.value, run.mean.U, unit)} (U, 95 %, k = ${run.mean.k.toFixed(2)}), n = ${run.n} of ${run.of}`;
}

function runLines(run: RunResult, reduction: Reduction): readonly string[] {
  const SI = 'N·s';
  const lines = [
    meanText(run),
    `mean ${tenDigits(run.mean.value)} ${SI}, u ${tenDigits(run.mean.u)} ${SI}, of which scatter of the shots ${tenDigits(run.uScatter)} ${SI} and common ${tenDigits(run.uCommon)} ${SI}`,
  ];
  if (run.scatter !== null) lines.push(`standard deviation of the shots ${tenDigits(run.scatter)} ${SI}`);
  for (const calibration of [reduction.calibrations.geometry, reduction.calibrations.taps]) {
    if (calibration) lines.push(`calibration factor by ${WAY_RESTS_ON[calibration.way]}: ${tenDigits(calibration.factor.value)} N·m·s/rad, u ${tenDigits(calibration.factor.u)} N·m·s/rad`);
  }
  for (const row of reduction.evidence) {
    if (row.chosen || row.id === 'masses' || row.id === 'taps') continue;
    lines.push(`beside it, ${EVIDENCE_NAMES[row.id]}: K ${sixDigits(row.factor.value)} N·m·s/rad, u ${sixDigits(row.factor.u)} N·m·s/rad${row.mean ? `, run mean ${sixDigits(row.mean.value)} ${SI}` : ''}`);
  }
  return lines;
}
