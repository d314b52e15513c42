/** The sheets as cut and read: the records of the session in the order of the run. */
import type { Place, Problem } from '../problems/problems.ts';
import { recordsOf, type SheetRecord } from '../readings/records.ts';
import { readTable } from '../readings/table.ts';
import type { RecordKind } from '../readings/meanings.ts';
import type { Session, Sheet } from '../session/session.ts';
import type { SheetResult } from './results.ts';

/** A record that knows its sheet. */
export interface SessionRecord extends SheetRecord {
  readonly sheet: string;
  readonly sheetName: string;
}

export interface SheetsRead {
  readonly sheets: readonly SheetResult[];
  readonly records: readonly SessionRecord[];
  /** Of whole sheets. */
  readonly problems: readonly Problem[];
  /** Of single records. */
  readonly recordProblems: readonly Problem[];
}

export function placeOf(record: Pick<SessionRecord, 'id' | 'line' | 'sheet' | 'sheetName'>): Place {
  const line = Number(record.line);
  const place = { sheet: record.sheet, sheetName: record.sheetName, record: record.id };
  return record.line.startsWith('+') || !Number.isFinite(line) ? place : { ...place, line };
}

export function readSheets(session: Session): SheetsRead {
  const sheets: SheetResult[] = [];
  const records: SessionRecord[] = [];
  const problems: Problem[] = [];
  for (const sheet of session.sheets) {
    const { result, found, ofSheet } = readSheet(sheet, session);
    sheets.push(result);
    records.push(...found);
    problems.push(...ofSheet);
  }
  return { sheets, records, problems, recordProblems: records.flatMap((record) => record.problems) };
}

function readSheet(sheet: Sheet, session: Session): { result: SheetResult; found: readonly SessionRecord[]; ofSheet: readonly Problem[] } {
  const table = readTable(sheet.text, {
    ...(sheet.delimiter === undefined ? {} : { delimiter: sheet.delimiter }), ...(sheet.decimal === undefined ? {} : { decimal: sheet.decimal }),
    place: { sheet: sheet.id, sheetName: sheet.name },
  });
  const kinds: Record<string, RecordKind | undefined> = {};
  for (const [id, mark] of Object.entries(session.marks)) if (mark.kind) kinds[id] = mark.kind;
  const read = recordsOf(sheet, table, kinds);
  const found = read.records.map((record) => ({ ...record, sheet: sheet.id, sheetName: sheet.name }));
  const columns = sheet.columns.map((column, i) => ({ header: table.headers[i] ?? '', role: column.role, unit: column.unit, by: column.by }));
  const rows = found.map((record) => ({ line: record.line, cells: record.cells, record: record.id, edited: record.edited }));
  return { result: { id: sheet.id, name: sheet.name, columns, rows }, found, ofSheet: read.problems };
}
