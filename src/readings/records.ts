/** Rows of a sheet to records: shots, taps, blanks, zeros and free swings, with every cell read or a problem in its place. */
import { problem } from '../problems/problems.ts';
import type { Place, Problem } from '../problems/problems.ts';
import { readCell } from './cellReads.ts';
import type { CellRead } from './cellReads.ts';
import { isNoReading } from './cells.ts';
import { columnName, proposalProblems } from './columns.ts';
import { kindOfWord } from './kinds.ts';
import type { ColumnMeaning, RecordKind, Role } from './meanings.ts';
import type { TableRead } from './table.ts';

/** What is needed of a sheet (session/session.ts Sheet has it). */
export interface SheetShape {
  readonly id: string;
  readonly name: string;
  readonly origin?: 'file' | 'paste' | 'typed';
  readonly columns: readonly ColumnMeaning[];
  readonly kindOfAll: RecordKind | null;
  readonly edits: Readonly<Record<string, Readonly<Record<number, string>>>>;
  readonly added: readonly { readonly id: string; readonly cells: readonly string[] }[];
}

export interface SheetRecord {
  /** `sheet id/line`. */
  readonly id: string;
  /** One-based line of the text, or '+1', '+2', … of a row typed by hand. */
  readonly line: string;
  readonly kind: RecordKind;
  readonly kindBy: 'person' | 'column' | 'sheet' | 'filledIn';
  readonly label: string;
  /** Cells of all note columns, joined with '; '. */
  readonly note: string;
  readonly rest: CellRead | null;
  /** Rest once the swing has died out. */
  readonly restAfter: CellRead | null;
  readonly firstSwing: CellRead | null;
  /** Rows in the picture, counted downward, where pivot and marker are tracked. */
  readonly restDown: CellRead | null;
  readonly firstSwingDown: CellRead | null;
  /** One a next-swing column, in order; null where blank or not readable. */
  readonly nextSwings: readonly (CellRead | null)[];
  /** Their rows in the picture, in the same order. */
  readonly nextSwingsDown: readonly (CellRead | null)[];
  readonly time: CellRead | null;
  readonly voltage: CellRead | null;
  readonly pressure: CellRead | null;
  readonly tapImpulse: CellRead | null;
  readonly hammerIn: CellRead | null;
  readonly hammerRebound: CellRead | null;
  readonly hammerFollow: CellRead | null;
  readonly tapForce: CellRead | null;
  readonly tapDuration: CellRead | null;
  /** kg, or N where it is written as a force: the cell's unit tells. */
  readonly weight: CellRead | null;
  readonly loading: CellRead | null;
  readonly unloading: CellRead | null;
  readonly swingsTime: CellRead | null;
  /** Full cycles in that time, from their column or the header ("Time for 20 swings"); 1 where neither says. */
  readonly cycles: number;
  readonly amplitude: CellRead | null;
  readonly massHung: CellRead | null;
  readonly massHungAt: CellRead | null;
  /** From the shot or tap to its first maximum. */
  readonly maximumTime: CellRead | null;
  readonly swingBefore: CellRead | null;
  readonly timeSinceMaximum: CellRead | null;
  /** What is wrong in this row, each with its place. */
  readonly problems: readonly Problem[];
  /** As shown: edits applied. */
  readonly cells: readonly string[];
  /** Indices of the columns typed over. */
  readonly edited: readonly number[];
}

export interface RecordsRead {
  readonly records: readonly SheetRecord[];
  /** What concerns the sheet as a whole; what concerns a row stands with its record. */
  readonly problems: readonly Problem[];
}

/** Roles beyond the readings of a swing, each of one column. */
const EVIDENCE = ['tapImpulse', 'hammerIn', 'hammerRebound', 'hammerFollow', 'tapForce', 'tapDuration', 'weight', 'loading', 'unloading', 'swingsTime', 'amplitude', 'massHung', 'massHungAt', 'swingBefore', 'timeSinceMaximum', 'maximumTime'] as const;

const SINGLE: readonly Role[] = ['kind', 'label', 'rest', 'restAfter', 'firstSwing', 'restDown', 'firstSwingDown', 'time', 'voltage', 'pressure', ...EVIDENCE, 'cycles'];

interface Row {
  readonly line: string;
  readonly cells: readonly string[];
  readonly edited: readonly number[];
  /** Typed by hand from end to end. */
  readonly typed: boolean;
  readonly problems: readonly Problem[];
}

interface Bench {
  readonly sheet: SheetShape;
  readonly headers: readonly string[];
  readonly decimal: '.' | ',';
  /** Column that has the role: the first, where several do. */
  readonly single: ReadonlyMap<Role, number>;
  readonly nextSwings: readonly number[];
  readonly nextSwingsDown: readonly number[];
  readonly notes: readonly number[];
}

/**
 * The records of one sheet, in the order of its rows, hand-typed rows last.
 *
 * The kind of a record is what a person marked, else what the kind column says, else that of the whole sheet, else told from what is filled in:
 * a tap impulse, a hammer’s angle or a force pulse makes a tap; a known weight with a deflection a weight; a time of swings without a swing a
 * period; a rest without any swing and without a voltage makes a zero; else the header of the numbers ("Tap") tells;
 * anything else is a shot.
 *
 * @param kinds a person's marks by record id
 */
export function recordsOf(sheet: SheetShape, table: TableRead, kinds: Readonly<Record<string, RecordKind | undefined>> = {}): RecordsRead {
  const place: Place = { sheet: sheet.id, sheetName: sheet.name };
  const bench: Bench = {
    sheet,
    headers: table.headers,
    decimal: table.decimal,
    single: new Map(SINGLE.flatMap((role) => {
      const index = sheet.columns.findIndex((column) => column.role === role);
      return index === -1 ? [] : [[role, index] as const];
    })),
    nextSwings: sheet.columns.flatMap(({ role }, i) => (role === 'nextSwing' ? [i] : [])),
    nextSwingsDown: sheet.columns.flatMap(({ role }, i) => (role === 'nextSwingDown' ? [i] : [])),
    notes: sheet.columns.flatMap(({ role }, i) => (role === 'note' ? [i] : [])),
  };
  const byLine = new Map<number, Problem[]>();
  const problems: Problem[] = [];
  const rowLines = new Set(table.rows.map(({ line }) => line));
  for (const found of table.problems) {
    const placed = { ...found, place: { ...found.place, ...place } };
    const { line } = found.place;
    if (line !== undefined && rowLines.has(line)) byLine.set(line, [...(byLine.get(line) ?? []), placed]);
    else if (sheet.origin !== 'typed') problems.push(placed);
  }
  problems.push(...columnProblems(bench, place), ...proposalProblems(table, sheet.columns, place));
  const rows = [...table.rows.map((row): Row => editedRow(sheet, String(row.line), row.cells, byLine.get(row.line) ?? [])), ...addedRows(sheet)];
  const records = rows.map((row) => recordOf(bench, row, kinds[`${sheet.id}/${row.line}`], place));
  problems.push(...missingColumns(bench, records, place));
  return { records, problems };
}

function columnProblems({ sheet, headers, single }: Bench, place: Place): Problem[] {
  return sheet.columns.flatMap(({ role }, i) => {
    const first = single.get(role);
    if (first === undefined || first === i) return [];
    return [problem('column-twice', 'doubt', { ...place, column: columnName(headers, i) }, { role, used: columnName(headers, first) })];
  });
}

/** Without a first-swing column rows look like zeros; they count as such without a word only where someone has said so. */
function missingColumns({ single }: Bench, records: readonly SheetRecord[], place: Place): Problem[] {
  const found: Problem[] = [];
  const swings = records.filter(({ kind }) => kind !== 'weight' && kind !== 'period');
  if (swings.length === 0) return found;
  const swung = swings.some(({ kind }) => kind !== 'zero' && kind !== 'freeSwing');
  const guessed = records.some(({ kind, kindBy }) => kind === 'zero' && kindBy === 'filledIn');
  if (!single.has('firstSwing') && (swung || guessed)) found.push(problem('column-missing', swung ? 'stops' : 'doubt', place, { role: 'firstSwing' }));
  if (!single.has('rest')) found.push(problem('column-missing', 'doubt', place, { role: 'rest' }));
  return found;
}

function editedRow(sheet: SheetShape, line: string, cells: readonly string[], problems: readonly Problem[]): Row {
  const edits = sheet.edits[line];
  if (edits === undefined) return { line, cells, edited: [], typed: false, problems };
  const edited = Object.keys(edits).map(Number).filter((i) => Number.isInteger(i) && i >= 0).sort((a, b) => a - b);
  const shown = [...cells];
  for (const i of edited) {
    while (shown.length < i) shown.push('');
    shown[i] = edits[i] ?? '';
  }
  return { line, cells: shown, edited, typed: false, problems };
}

function addedRows(sheet: SheetShape): Row[] {
  return sheet.added.map(({ id, cells }): Row => {
    const line = id.startsWith('+') ? id : `+${id}`;
    const row = editedRow(sheet, line, cells, []);
    const padded = row.cells.length < sheet.columns.length ? [...row.cells, ...Array<string>(sheet.columns.length - row.cells.length).fill('')] : row.cells;
    return { ...row, cells: padded, typed: true };
  });
}

/** A torn row gives no numbers until a person has typed over every cell that holds one. */
function isTorn({ sheet }: Bench, row: Row): boolean {
  if (!row.problems.some(({ code, weight }) => code === 'decimal-comma-in-comma-file' && weight === 'stops')) return false;
  return sheet.columns.some(({ role }, i) => role !== 'ignored' && role !== 'note' && !row.edited.includes(i) && !isNoReading(row.cells[i] ?? ''));
}

/** "Tap" or "Blank no." at the head of the numbers says what the rows are, where nothing else does. */
function kindOfHeader(header: string): RecordKind | null {
  return kindOfWord(header.replace(/(?:\s|^)(?:no|nr|number|n°|№)\.?\s*$/iu, ''));
}

/** "Time for 20 swings": the number of cycles that a header tells; 1 where it tells none. */
function cyclesOfHeader(header: string): number {
  const found = /(\d+)\s*(?:x\s*)?\p{L}{2,}/u.exec(header.replace(/[([{][^)\]}]*[)\]}]/gu, ' '));
  const n = Number(found?.[1] ?? 1);
  return n >= 1 && n <= 10_000 ? n : 1;
}

function recordOf(bench: Bench, row: Row, marked: RecordKind | undefined, sheetPlace: Place): SheetRecord {
  const { sheet, headers, single } = bench;
  const id = `${sheet.id}/${row.line}`;
  const line = Number(row.line);
  const place: Place = row.line.startsWith('+') ? { ...sheetPlace, record: id } : { ...sheetPlace, line, record: id };
  const torn = isTorn(bench, row);
  const problems: Problem[] = row.problems.filter(({ code }) => torn || code !== 'decimal-comma-in-comma-file').map((found) => ({ ...found, place: { ...found.place, record: id } }));
  const textAt = (index: number | undefined): string => (index === undefined ? '' : (row.cells[index] ?? '').trim());
  const readAt = (index: number | undefined): CellRead | null => {
    const meaning = index === undefined ? undefined : sheet.columns[index];
    if (torn || index === undefined || meaning === undefined) return null;
    const read = readCell(row.cells[index] ?? '', meaning, bench.decimal, row.typed || row.edited.includes(index));
    if (read === null || 'value' in read) return read;
    problems.push(problem(read.code, 'stops', { ...place, column: columnName(headers, index) }, { found: read.found, cell: textAt(index), role: meaning.role, unit: meaning.unit }));
    return null;
  };
  const readings = {
    rest: readAt(single.get('rest')),
    restAfter: readAt(single.get('restAfter')),
    firstSwing: readAt(single.get('firstSwing')),
    restDown: readAt(single.get('restDown')),
    firstSwingDown: readAt(single.get('firstSwingDown')),
    nextSwings: bench.nextSwings.map(readAt),
    nextSwingsDown: bench.nextSwingsDown.map(readAt),
    time: readAt(single.get('time')),
    voltage: readAt(single.get('voltage')),
    pressure: readAt(single.get('pressure')),
    ...(Object.fromEntries(EVIDENCE.map((role) => [role, readAt(single.get(role))])) as Record<(typeof EVIDENCE)[number], CellRead | null>),
    cycles: readAt(single.get('cycles'))?.value ?? cyclesOfHeader(headers[single.get('swingsTime') ?? -1] ?? ''),
  };
  const kindText = textAt(single.get('kind'));
  const kindInColumn = kindOfWord(kindText);
  if (kindInColumn === null && !isNoReading(kindText)) {
    problems.push(problem('cell-kind-unknown', 'doubt', { ...place, column: columnName(headers, single.get('kind') ?? 0) }, { found: kindText }));
  }
  const hasText = (role: Role): boolean => !isNoReading(textAt(single.get(role)));
  const anySwing = hasText('firstSwing') || bench.nextSwings.some((i) => !isNoReading(textAt(i)));
  // A row of nothing, just added by hand, is not yet a shot.
  const isBare = row.cells.every(isNoReading);
  const isTap = hasText('tapImpulse') || hasText('hammerIn') || (hasText('tapForce') && hasText('tapDuration'));
  const filledIn: RecordKind = isBare ? 'zero' : isTap ? 'tap'
    : hasText('weight') && (hasText('loading') || hasText('unloading')) ? 'weight'
    : hasText('swingsTime') && !anySwing ? 'period' : hasText('rest') && !anySwing && !hasText('voltage') ? 'zero' : 'shot';
  const headed = filledIn === 'shot' ? kindOfHeader(headers[single.get('label') ?? -1] ?? '') : null;
  const [kind, kindBy] =
    marked !== undefined ? ([marked, 'person'] as const)
    : kindInColumn !== null ? ([kindInColumn, 'column'] as const)
    : sheet.kindOfAll !== null ? ([sheet.kindOfAll, 'sheet'] as const)
    : ([headed ?? filledIn, 'filledIn'] as const);
  const firstSwing = single.get('firstSwing');
  if (firstSwing !== undefined && !torn && !hasText('firstSwing') && (kind === 'shot' || kind === 'tap' || kind === 'blank')) {
    problems.push(problem('cell-empty', 'stops', { ...place, column: columnName(headers, firstSwing) }, { role: 'firstSwing', kind }));
  }
  return {
    id,
    line: row.line,
    kind,
    kindBy,
    label: textAt(single.get('label')),
    note: bench.notes.map(textAt).filter((text) => text !== '').join('; '),
    ...readings,
    problems,
    cells: row.cells,
    edited: row.edited,
  };
}
