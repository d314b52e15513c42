/** What a person does to a whole sheet: its place in the run, and how its text is cut. */
import { proposeColumns } from '../../readings/columns.ts';
import type { ColumnMeaning } from '../../readings/meanings.ts';
import { setColumns, setSheetCut } from '../../session/edits.ts';
import type { Edit } from '../../session/edits.ts';
import type { Sheet } from '../../session/session.ts';
import { tableOf } from './sheetRows.ts';

/** Meanings alone, without the reasons for them. */
export const meaningsOf = (columns: readonly ColumnMeaning[]): readonly ColumnMeaning[] =>
  columns.map(({ role, unit, by }) => ({ role, unit, by }));

/** One place earlier (−1) or later (+1) in the run. */
export const moveSheet = (id: string, by: -1 | 1): Edit => (session) => {
  const from = session.sheets.findIndex((sheet) => sheet.id === id);
  const sheet = session.sheets[from];
  const other = session.sheets[from + by];
  if (sheet === undefined || other === undefined) return session;
  const sheets = [...session.sheets];
  sheets[from] = other;
  sheets[from + by] = sheet;
  return { ...session, sheets };
};

/** Cuts a sheet's text in another way; columns are proposed anew where their number changes, else what the person chose is kept. */
export const cutAnew = (id: string, cut: Parameters<typeof setSheetCut>[1]): Edit => (session) => {
  const after = setSheetCut(id, cut)(session);
  const sheet = after.sheets.find((one) => one.id === id);
  if (sheet === undefined) return session;
  return setColumns(id, columnsAfterCut(sheet))(after);
};

function columnsAfterCut(sheet: Sheet): readonly ColumnMeaning[] {
  const chosen = sheet.columns.some(({ by }) => by === 'person');
  return meaningsOf(proposeColumns(tableOf(sheet), chosen ? sheet.columns : undefined));
}
