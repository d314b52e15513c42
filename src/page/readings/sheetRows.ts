/** A sheet as it is shown: its text cut into rows as the road cuts it, with what was typed over and what was added by hand. */
import type { ColumnMeaning } from '../../readings/meanings.ts';
import { readTable } from '../../readings/table.ts';
import type { TableRead } from '../../readings/table.ts';
import { recordId } from '../../session/session.ts';
import type { Sheet } from '../../session/session.ts';
import { ROLE_LABELS } from './tradeWords.ts';

export interface ShownColumn {
  readonly index: number;
  /** Header as it came; for a typed sheet and a file without a header, the role's name. */
  readonly header: string;
  readonly meaning: ColumnMeaning;
  /** Width that its longest cell asks for, in characters. */
  readonly characters: number;
}

export interface ShownRow {
  /** One-based line of the text, or `+1`, `+2`, … for a row typed by hand. */
  readonly line: string;
  readonly record: string;
  readonly typed: boolean;
  readonly cells: readonly string[];
  /** Text as it came, by column, of the cells that were typed over. */
  readonly came: Readonly<Record<number, string>>;
}

export interface ShownSheet {
  readonly columns: readonly ShownColumn[];
  readonly rows: readonly ShownRow[];
}

const UNUSED: ColumnMeaning = { role: 'ignored', unit: '', by: 'proposal' };
const NARROWEST = 6;
const WIDEST = 18;

/** The text of a sheet as a table, cut as the person chose or as found. */
export const tableOf = (sheet: Pick<Sheet, 'text' | 'delimiter' | 'decimal'>): TableRead =>
  readTable(sheet.text, {
    ...(sheet.delimiter === undefined ? {} : { delimiter: sheet.delimiter }),
    ...(sheet.decimal === undefined ? {} : { decimal: sheet.decimal }),
  });

export function shownSheet(sheet: Sheet, table: TableRead): ShownSheet {
  const fromText = table.rows.map((row): ShownRow => {
    const line = String(row.line);
    const edits = sheet.edits[line];
    if (edits === undefined) return { line, record: recordId(sheet.id, line), typed: false, cells: row.cells, came: {} };
    const cells = [...row.cells];
    const came: Record<number, string> = {};
    for (const [key, text] of Object.entries(edits)) {
      const index = Number(key);
      while (cells.length <= index) cells.push('');
      came[index] = row.cells[index] ?? '';
      cells[index] = text;
    }
    return { line, record: recordId(sheet.id, line), typed: false, cells, came };
  });
  const added = sheet.added.map(({ id, cells }): ShownRow => ({ line: id, record: recordId(sheet.id, id), typed: true, cells, came: {} }));
  const rows = [...fromText, ...added];
  return { columns: shownColumns(sheet, table, rows), rows };
}

function shownColumns(sheet: Sheet, table: TableRead, rows: readonly ShownRow[]): readonly ShownColumn[] {
  const width = rows.reduce((widest, row) => Math.max(widest, row.cells.length), Math.max(table.headers.length, sheet.columns.length));
  return Array.from({ length: width }, (_, index): ShownColumn => {
    const meaning = sheet.columns[index] ?? UNUSED;
    const written = table.headers[index] ?? '';
    const header = written !== '' ? written : sheet.origin === 'typed' ? ROLE_LABELS[meaning.role] : `column ${index + 1}`;
    const longest = rows.reduce((most, row) => Math.max(most, row.cells[index]?.length ?? 0), 0);
    const characters = Math.min(WIDEST, Math.max(NARROWEST, longest));
    return { index, header, meaning, characters };
  });
}

/** Rows as `line` names them in sentences and labels: "line 9", "row +2". */
export const lineWords = (line: string): string => (line.startsWith('+') ? `row ${line}` : `line ${line}`);

/** Id of the element that shows a sheet. */
export const sheetElement = (sheet: string): string => `sheet-${sheet}`;
