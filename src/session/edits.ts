/** What a person can do to a session: each function returns an edit, session → session, to hand to the store's `change`. */
import { RECORD_KINDS } from '../readings/meanings.ts';
import type { ColumnMeaning, RecordKind, Role } from '../readings/meanings.ts';
import type { EntryName, PartEntryName } from './entries.ts';
import { FIRST_TRACE, recordId } from './session.ts';
import type { Choices, Entry, ForceRecord, Instrument, Mark, Part, Session, Sheet, Trace, TraceLine } from './session.ts';

export type Edit = (session: Session) => Session;

/** An entry as it stands before anything is typed. */
export const BLANK_ENTRY: Entry = { text: '', plusMinus: 'standard', k: '' };

const isBlank = (entry: Entry): boolean => entry.text === '' && entry.plusMinus === 'standard' && entry.k === '' && entry.instrument === undefined;

function withEntry<Name extends string>(
  entries: Readonly<Partial<Record<Name, Entry>>>,
  name: Name,
  patch: Partial<Entry>,
): Readonly<Partial<Record<Name, Entry>>> {
  return withWhole(entries, name, { ...(entries[name] ?? BLANK_ENTRY), ...patch });
}

function withWhole<Name extends string>(entries: Readonly<Partial<Record<Name, Entry>>>, name: Name, next: Entry): Readonly<Partial<Record<Name, Entry>>> {
  if (!isBlank(next)) return { ...entries, [name]: next };
  const rest = { ...entries };
  delete rest[name];
  return rest;
}

/** One more than the largest number that follows the prefix in any of the ids. */
function nextNumber(ids: readonly string[], prefix: string): number {
  const numbers = ids.filter((id) => id.startsWith(prefix)).map((id) => Number(id.slice(prefix.length)));
  return 1 + Math.max(0, ...numbers.filter((n) => Number.isInteger(n)));
}

export const setTitle = (patch: Partial<Session['title']>): Edit => (session) =>
  ({ ...session, title: { ...session.title, ...patch } });

export const setEntry = (name: EntryName, patch: Partial<Entry>): Edit => (session) =>
  ({ ...session, entries: withEntry(session.entries, name, patch) });

/** What a quantity was measured with; null: no instrument named. */
export const measuredWith = (entry: Entry = BLANK_ENTRY, instrument: string | null): Entry => {
  const { instrument: _before, ...rest } = entry;
  return instrument === null ? rest : { ...rest, instrument };
};

export const setEntryInstrument = (name: EntryName, instrument: string | null): Edit => (session) =>
  ({ ...session, entries: withWhole(session.entries, name, measuredWith(session.entries[name], instrument)) });

export const setChoice = <Name extends keyof Choices>(name: Name, value: Choices[Name]): Edit => (session) =>
  ({ ...session, choices: { ...session.choices, [name]: value } });

/** Several choices in one step. */
export const setChoices = (choices: Partial<Choices>): Edit => (session) => ({ ...session, choices: { ...session.choices, ...choices } });

export const setFreeSwing = (text: string): Edit => (session) => ({ ...session, freeSwing: text });

/** One more sampled trace, after those that are there. */
export const addTrace = (trace: Pick<Trace, 'name' | 'sha256' | 'bytes'> & Partial<Trace>): Edit => (session) =>
  ({ ...session, traces: [...session.traces, { ...FIRST_TRACE, ...trace, id: `t${nextNumber(session.traces.map(({ id }) => id), 't')}` }] });

export const removeTrace = (id: string): Edit => (session) => ({ ...session, traces: session.traces.filter((trace) => trace.id !== id) });

/** Changes how one trace is read. */
export const setTrace = (id: string, change: Partial<Omit<Trace, 'id' | 'sha256' | 'bytes'>>): Edit => (session) =>
  ({ ...session, traces: session.traces.map((trace) => (trace.id === id ? { ...trace, ...change } : trace)) });

/** The lines of a list typed anew: a line that is there already keeps its id; where as many are left, so does one that changed. */
export function linesAgain(before: readonly TraceLine[], text: string): readonly TraceLine[] {
  const texts = text === '' ? [] : text.split('\n');
  const free = [...before];
  const same = texts.map((line) => {
    const at = free.findIndex((one) => one.text === line);
    return at < 0 ? null : free.splice(at, 1)[0]!;
  });
  const changed = texts.length === before.length ? free : [];
  let next = nextNumber(before.map(({ id }) => id), 'e');
  return texts.map((line, i) => same[i] ?? { id: changed.shift()?.id ?? `e${next++}`, text: line });
}

/** One line more in the list of a trace's shots, or of its bad stretches. */
export const addTraceLine = (id: string, list: 'events' | 'bad', text: string): Edit => (session) => ({
  ...session,
  traces: session.traces.map((trace) => (trace.id === id ? { ...trace, [list]: [...trace[list], { id: `e${nextNumber(trace[list].map((line) => line.id), 'e')}`, text }] } : trace)),
});

export const setTraceLine = (id: string, list: 'events' | 'bad', line: string, text: string | null): Edit => (session) => ({
  ...session,
  traces: session.traces.map((trace) => (trace.id === id ? { ...trace, [list]: trace[list].flatMap((one) => (one.id !== line ? [one] : text === null ? [] : [{ ...one, text }])) } : trace)),
});

/** One more record of the hammer's force, after those that are there. */
export const addForceRecord = (record: Omit<ForceRecord, 'id'>): Edit => (session) =>
  ({ ...session, forceRecords: [...session.forceRecords, { ...record, id: `f${nextNumber(session.forceRecords.map(({ id }) => id), 'f')}` }] });

export const removeForceRecord = (id: string): Edit => (session) => ({ ...session, forceRecords: session.forceRecords.filter((record) => record.id !== id) });

export const setPulseSamples = (text: string): Edit => (session) => ({ ...session, pulseSamples: text });

export const addPart = (name = ''): Edit => (session) => {
  const id = `p${nextNumber(session.parts.map((part) => part.id), 'p')}`;
  return { ...session, parts: [...session.parts, { id, name, entries: {} }] };
};

export const removePart = (id: string): Edit => (session) =>
  ({ ...session, parts: session.parts.filter((part) => part.id !== id) });

const editPart = (id: string, edit: (part: Part) => Part): Edit => (session) =>
  ({ ...session, parts: session.parts.map((part) => (part.id === id ? edit(part) : part)) });

export const setPartName = (id: string, name: string): Edit => editPart(id, (part) => ({ ...part, name }));

export const setPartEntry = (id: string, name: PartEntryName, patch: Partial<Entry>): Edit =>
  editPart(id, (part) => ({ ...part, entries: withEntry(part.entries, name, patch) }));

export const setPartEntryInstrument = (id: string, name: PartEntryName, instrument: string | null): Edit =>
  editPart(id, (part) => ({ ...part, entries: withWhole(part.entries, name, measuredWith(part.entries[name], instrument)) }));

/** Adds an instrument under the next free id: `i1`, `i2`, … */
export const addInstrument = (given: Partial<Omit<Instrument, 'id'>> = {}): Edit => (session) => {
  const id = nextInstrumentId(session.instruments);
  return { ...session, instruments: [...session.instruments, { id, name: '', serial: '', certificate: '', due: '', measures: 'length', scale: BLANK_ENTRY, ...given }] };
};

export const nextInstrumentId = (instruments: readonly Instrument[]): string => `i${nextNumber(instruments.map(({ id }) => id), 'i')}`;

export const setInstrument = (id: string, patch: Partial<Omit<Instrument, 'id' | 'scale'>>): Edit => (session) =>
  ({ ...session, instruments: session.instruments.map((one) => (one.id === id ? { ...one, ...patch } : one)) });

/** The relative ± of an instrument's calibration. */
export const setInstrumentScale = (id: string, patch: Partial<Entry>): Edit => (session) =>
  ({ ...session, instruments: session.instruments.map((one) => (one.id === id ? { ...one, scale: { ...one.scale, ...patch } } : one)) });

/** Takes an instrument out; what was measured with it stays, and names none. */
export const removeInstrument = (id: string): Edit => (session) => ({
  ...session,
  instruments: session.instruments.filter((one) => one.id !== id),
  entries: withoutInstrument(session.entries, id),
  parts: session.parts.map((part) => ({ ...part, entries: withoutInstrument(part.entries, id) })),
  sheets: session.sheets.map((sheet) => (sheet.instrument === id ? readWith(sheet, null) : sheet)),
});

function withoutInstrument<Name extends string>(entries: Readonly<Partial<Record<Name, Entry>>>, id: string): Readonly<Partial<Record<Name, Entry>>> {
  let kept = entries;
  for (const [name, entry] of Object.entries(entries) as [Name, Entry][]) if (entry.instrument === id) kept = withWhole(kept, name, measuredWith(entry, null));
  return kept;
}

/** The id that the next sheet of this session gets: `s1`, `s2`, … */
export const nextSheetId = (session: Session): string => `s${nextNumber(session.sheets.map((sheet) => sheet.id), 's')}`;

/** Adds a sheet under the next free id. */
export const addSheet = (sheet: Omit<Sheet, 'id'>): Edit => (session) =>
  ({ ...session, sheets: [...session.sheets, { ...sheet, id: nextSheetId(session) }] });

/** Takes a sheet out, with the marks of its records. */
export const removeSheet = (id: string): Edit => (session) => ({
  ...session,
  sheets: session.sheets.filter((sheet) => sheet.id !== id),
  marks: renameMarks(session.marks, (record) => (record.startsWith(`${id}/`) ? null : record)),
});

const editSheet = (id: string, edit: (sheet: Sheet) => Sheet): Edit => (session) =>
  ({ ...session, sheets: session.sheets.map((sheet) => (sheet.id === id ? edit(sheet) : sheet)) });

function renameMarks(marks: Session['marks'], rename: (record: string) => string | null): Session['marks'] {
  const renamed: Record<string, Mark> = {};
  for (const [record, mark] of Object.entries(marks)) {
    const to = rename(record);
    if (to !== null) renamed[to] = mark;
  }
  return renamed;
}

/**
 * The same file come again: new text, and where each earlier line went (old line → new line). Marks and typed-over
 * cells go with their lines; those of a line that is not in the map go out with it. Rows typed by hand stay.
 */
export const replaceSheet = (
  id: string,
  fresh: Pick<Sheet, 'text' | 'sha256'> & Partial<Pick<Sheet, 'name' | 'columns'>>,
  movedLines: Readonly<Record<string, string>>,
): Edit => (session) => {
  const moved = (line: string): string | null => (line.startsWith('+') ? line : (movedLines[line] ?? null));
  const replaced = editSheet(id, (sheet) => {
    const edits: Record<string, Readonly<Record<number, string>>> = {};
    for (const [line, cells] of Object.entries(sheet.edits)) {
      const to = moved(line);
      if (to !== null) edits[to] = cells;
    }
    return { ...sheet, ...fresh, edits };
  })(session);
  const marks = renameMarks(session.marks, (record) => {
    if (!record.startsWith(`${id}/`)) return record;
    const to = moved(record.slice(id.length + 1));
    return to === null ? null : recordId(id, to);
  });
  return { ...replaced, marks };
};

/** A column's meaning as the person wants it; from now on it is no proposal any more. */
export const setColumn = (sheet: string, index: number, patch: Partial<Omit<ColumnMeaning, 'by'>>): Edit =>
  editSheet(sheet, (found) => {
    const columns = [...found.columns];
    while (columns.length <= index) columns.push({ role: 'ignored', unit: '', by: 'proposal' });
    columns[index] = { ...(columns[index] ?? { role: 'ignored', unit: '' }), ...patch, by: 'person' };
    return { ...found, columns };
  });

/** All columns' meanings at once: a fresh proposal, or one that keeps what the person chose. */
export const setColumns = (sheet: string, columns: readonly ColumnMeaning[]): Edit =>
  editSheet(sheet, (found) => ({ ...found, columns }));

/** How the text is cut; a key given as undefined goes back to "as found", a key left out stays. */
export const setSheetCut = (
  sheet: string,
  cut: { readonly delimiter?: Sheet['delimiter'] | undefined; readonly decimal?: Sheet['decimal'] | undefined },
): Edit =>
  editSheet(sheet, (found) => {
    const { delimiter, decimal, ...rest } = found;
    const nextDelimiter = 'delimiter' in cut ? cut.delimiter : delimiter;
    const nextDecimal = 'decimal' in cut ? cut.decimal : decimal;
    return {
      ...rest,
      ...(nextDelimiter === undefined ? {} : { delimiter: nextDelimiter }),
      ...(nextDecimal === undefined ? {} : { decimal: nextDecimal }),
    };
  });

export const setKindOfAll = (sheet: string, kind: RecordKind | null): Edit =>
  editSheet(sheet, (found) => ({ ...found, kindOfAll: kind }));

/** When the taps of a sheet were struck against the firings; null: in the order of the run. */
export const setTaken = (sheet: string, taken: 'before' | 'after' | null): Edit =>
  editSheet(sheet, ({ taken: _before, ...found }) => (taken === null ? found : { ...found, taken }));

const readWith = ({ instrument: _before, ...sheet }: Sheet, instrument: string | null): Sheet => (instrument === null ? sheet : { ...sheet, instrument });

/** What the readings of a sheet were read with; null: no instrument named. */
export const setSheetInstrument = (sheet: string, instrument: string | null): Edit => editSheet(sheet, (found) => readWith(found, instrument));

/**
 * Types over one cell. Lines that begin with `+` are rows typed by hand (their id is their line). For a line of the
 * text the original stays in the text; null takes the typed-over cell back to it.
 */
export const setCell = (sheet: string, line: string, column: number, text: string | null): Edit =>
  editSheet(sheet, (found) => {
    if (line.startsWith('+')) {
      const added = found.added.map((row) => {
        if (row.id !== line) return row;
        const cells = [...row.cells];
        while (cells.length <= column) cells.push('');
        cells[column] = text ?? '';
        return { ...row, cells };
      });
      return { ...found, added };
    }
    const cells: Record<number, string> = { ...found.edits[line] };
    if (text === null) delete cells[column];
    else cells[column] = text;
    const edits: Record<string, Readonly<Record<number, string>>> = { ...found.edits, [line]: cells };
    if (Object.keys(cells).length === 0) delete edits[line];
    return { ...found, edits };
  });

/** Adds a row typed by hand at the end; its id, and its line, is `+1`, `+2`, … */
export const addRow = (sheet: string, cells: readonly string[] = []): Edit =>
  editSheet(sheet, (found) => {
    const id = `+${nextNumber(found.added.map((row) => row.id), '+')}`;
    return { ...found, added: [...found.added, { id, cells }] };
  });

export const removeAddedRow = (sheet: string, id: string): Edit => (session) => {
  const without = editSheet(sheet, (found) => ({ ...found, added: found.added.filter((row) => row.id !== id) }))(session);
  const gone = recordId(sheet, id);
  return { ...without, marks: renameMarks(session.marks, (record) => (record === gone ? null : record)) };
};

/** Columns of the sheet for rows typed by hand, with the unit each starts with ('reading' is filled in by the reading). */
const TYPED_COLUMNS: readonly (readonly [Role, string])[] = [
  ['kind', ''], ['label', ''], ['rest', 'reading'], ['firstSwing', 'reading'], ['nextSwing', 'reading'],
  ['tapImpulse', 'mN·s'], ['voltage', 'V'], ['pressure', 'Pa'], ['note', ''],
];

export const typedSheet = (session: Session): Sheet | undefined => session.sheets.find((sheet) => sheet.origin === 'typed');

/** The session with a sheet for rows typed by hand (as it is, where there is one), holding one empty row to begin with. */
export const ensureTypedSheet: Edit = (session) => {
  if (typedSheet(session) !== undefined) return session;
  const readingUnit = session.choices.readingWay === 'angle' ? 'mrad' : 'mm';
  const columns = TYPED_COLUMNS.map(([role, unit]): ColumnMeaning =>
    ({ role, unit: unit === 'reading' ? readingUnit : unit, by: 'person' }));
  return addSheet({
    name: 'typed by hand', origin: 'typed', text: '', sha256: '', columns, kindOfAll: null, edits: {}, added: [{ id: '+1', cells: [] }],
  })(session);
};

const editMark = (record: string, edit: (mark: Mark) => Mark): Edit => (session) => {
  const marks: Record<string, Mark> = { ...session.marks };
  const mark = edit(marks[record] ?? {});
  if (mark.setAside === undefined && mark.kind === undefined) delete marks[record];
  else marks[record] = mark;
  return { ...session, marks };
};

/** Sets a record aside with its reason; it stays in the table, struck through. */
export const setAside = (record: string, reason: string): Edit => editMark(record, (mark) => ({ ...mark, setAside: { reason } }));

export const countAgain = (record: string): Edit =>
  editMark(record, ({ kind }) => (kind === undefined ? {} : { kind }));

/** Says by hand what a record is; null leaves it to the column, the sheet, or what is filled in. */
export const setKind = (record: string, kind: RecordKind | null): Edit =>
  editMark(record, ({ setAside: aside }) => ({
    ...(aside === undefined ? {} : { setAside: aside }),
    ...(kind === null ? {} : { kind }),
  }));

export const isRecordKind = (text: unknown): text is RecordKind => RECORD_KINDS.some((kind) => kind === text);
