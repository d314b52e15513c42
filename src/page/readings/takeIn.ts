/** Decides what a text of readings that came in does to the session: a new sheet, a newer version of one that is there, or nothing. */
import type { Problem } from '../../problems/problems.ts';
import { sentence } from '../../problems/sentences.ts';
import { linesAgain, lostRowProblems, sameFile } from '../../readings/again.ts';
import type { LinesAgain } from '../../readings/again.ts';
import { proposeColumns } from '../../readings/columns.ts';
import type { ColumnMeaning } from '../../readings/meanings.ts';
import { readTable } from '../../readings/table.ts';
import type { TableRead } from '../../readings/table.ts';
import { addSheet, nextSheetId, replaceSheet } from '../../session/edits.ts';
import { recordId } from '../../session/session.ts';
import type { Session, Sheet } from '../../session/session.ts';
import type { Notice } from './notices.ts';
import { meaningsOf } from './sheetEdits.ts';
import { lineWords, tableOf } from './sheetRows.ts';
import { counted } from './tradeWords.ts';

export interface Came {
  readonly name: string;
  readonly origin: 'file' | 'paste';
  readonly text: string;
  readonly sha256: string;
  /** What reading the bytes found. */
  readonly problems: readonly Problem[];
}

export interface TakenIn {
  /** What the undo list calls it. */
  readonly what: string;
  /** The session after; the same object where nothing was taken in. */
  readonly session: Session;
  readonly notice: Omit<Notice, 'id'>;
}

export function takeIn(came: Came, session: Session): TakenIn {
  const table = readTable(came.text, { place: { sheetName: came.name } });
  const whole = came.problems.some(stops) ? came.problems : [...came.problems, ...table.problems.filter(({ place }) => place.line === undefined)];
  if (whole.some(stops) && table.rows.length === 0) {
    return { what: '', session, notice: { tone: 'refused', sentences: whole.filter(stops).map(sentence) } };
  }
  const earlier = session.sheets.find((sheet) => sheet.origin !== 'typed' && isSameFile(sheet, came));
  if (earlier === undefined) return asNewSheet(came, session, table, whole);
  if (earlier.text === came.text) return unchanged(came, session, earlier);
  const fresh = readTable(came.text, { ...(earlier.delimiter && { delimiter: earlier.delimiter }), ...(earlier.decimal && { decimal: earlier.decimal }) });
  const again = linesAgain(tableOf(earlier), fresh);
  if (again.moved.size === 0) return asNewSheet(came, session, table, whole);
  return asNewerVersion(came, session, earlier, fresh, again);
}

const stops = ({ weight }: Problem): boolean => weight === 'stops';

/** Pastes have no name of their own to go by. */
const isSameFile = (sheet: Sheet, came: Came): boolean =>
  sameFile({ name: sheet.origin === 'paste' ? '' : sheet.name, text: sheet.text }, { name: came.origin === 'paste' ? '' : came.name, text: came.text });

/** `run.csv`, or `run.csv (2)` where that name is taken. */
function freeName(name: string, session: Session): string {
  const taken = new Set(session.sheets.map((sheet) => sheet.name));
  for (let n = 1; ; n++) {
    const free = n === 1 ? name : `${name} (${n})`;
    if (!taken.has(free)) return free;
  }
}

function newSheet({ origin, text, sha256 }: Came, name: string): Omit<Sheet, 'id'> {
  return { name, origin, text, sha256, columns: meaningsOf(proposeColumns(readTable(text))), kindOfAll: null, edits: {}, added: [] };
}

function asNewSheet(came: Came, session: Session, table: TableRead, whole: readonly Problem[]): TakenIn {
  const name = freeName(came.name, session);
  const unsure = proposeColumns(table).filter(({ sure }) => !sure).length;
  const ofOneName = name !== came.name && came.origin === 'file';
  return {
    what: `take in ${name}`,
    session: addSheet(newSheet(came, name))(session),
    notice: {
      tone: unsure > 0 || whole.length > 0 ? 'look' : 'told',
      sheet: nextSheetId(session),
      sentences: [
        `${name}: ${counted(table.rows.length, 'row')} taken in${ofOneName ? `, as a sheet of its own, as none of its rows is in the other ${came.name}` : ''}.`,
        `Column meanings are proposed below: check them${unsure === 0 ? '' : `; ${unsure === 1 ? 'one is' : `${unsure} are`} unsure`}.`,
        ...whole.map(sentence),
      ],
    },
  };
}

function unchanged(came: Came, session: Session, earlier: Sheet): TakenIn {
  return {
    what: '',
    session,
    notice: {
      tone: 'told',
      sheet: earlier.id,
      sentences: [`${earlier.name} is here already, word for word; nothing has changed.`],
      offer: {
        label: 'add it as another sheet',
        what: `take in ${came.name} again`,
        edit: (now) => addSheet(newSheet(came, freeName(came.name, now)))(now),
        stands: (now) => now.sheets.some((sheet) => sheet.id === earlier.id),
      },
    },
  };
}

/** Meanings of the newer version's columns: those of the columns with the same header (or place, without a header), others proposed. */
function columnsAgain(earlier: Sheet, before: TableRead, after: TableRead): readonly ColumnMeaning[] {
  const alike = before.headers.length === after.headers.length;
  return meaningsOf(proposeColumns(after)).map((proposed, i) => {
    const header = after.headers[i] ?? '';
    const at = header === '' || (alike && before.headers[i] === header) ? i : before.headers.indexOf(header);
    return (header === '' && !alike ? undefined : earlier.columns[at]) ?? proposed;
  });
}

function asNewerVersion(came: Came, session: Session, earlier: Sheet, fresh: TableRead, again: LinesAgain): TakenIn {
  const columns = columnsAgain(earlier, tableOf(earlier), fresh);
  const name = came.origin === 'file' ? came.name : earlier.name;
  const after = replaceSheet(earlier.id, { name, text: came.text, sha256: came.sha256, columns }, Object.fromEntries(again.moved))(session);
  const replaced = after.sheets.find(({ id }) => id === earlier.id);
  const asideOf = (line: string): string | undefined => session.marks[recordId(earlier.id, line)]?.setAside?.reason;
  const kept = [...again.moved.keys()].filter((line) => asideOf(line) !== undefined).length;
  const asideLost = again.lost.filter((line) => asideOf(line) !== undefined);
  const marked = again.lost.filter((line) => session.marks[recordId(earlier.id, line)] !== undefined || earlier.edits[line] !== undefined).length;
  const parts = [
    again.added === 0 ? 'no row more' : `${counted(again.added, 'row')} more`,
    ...(kept > 0 ? [`${kept} set aside kept`] : []),
    ...(asideLost.length > 0
      ? [`${counted(asideLost.length, 'set-aside row')} no longer in the file: ${asideLost.map((line) => `${lineWords(line)} before (${asideOf(line) ?? ''})`).join(', ')}`]
      : []),
  ];
  return {
    what: `${name} again`,
    session: after,
    notice: {
      tone: again.lost.length > 0 ? 'look' : 'told',
      sheet: earlier.id,
      sentences: [
        `${name} again: ${parts.join('; ')}. Column meanings are kept.`,
        ...lostRowProblems(again.lost.length, marked, { sheet: earlier.id, sheetName: name }).map(sentence),
      ],
      offer: {
        label: 'add it as another sheet instead',
        what: `${name} as another sheet`,
        edit: (now) => {
          const sheets = now.sheets.map((sheet) => (sheet.id === earlier.id ? earlier : sheet));
          const back: Session = { ...now, sheets, marks: session.marks };
          return addSheet(newSheet(came, freeName(came.name, back)))(back);
        },
        // Once the person has worked on the newer version, going back is what undo is for.
        stands: (now) => now.marks === after.marks && now.sheets.includes(replaced ?? earlier),
      },
    },
  };
}
