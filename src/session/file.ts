/** The session as a file: its text, and the way back, which keeps everything that can be read and tells what could not. */
import { problem } from '../problems/problems.ts';
import type { Problem } from '../problems/problems.ts';
import { RECORD_KINDS, ROLES } from '../readings/meanings.ts';
import type { ColumnMeaning } from '../readings/meanings.ts';
import { ENTRY_NAMES, PART_ENTRIES } from './entries.ts';
import type { EntryName, PartEntryName } from './entries.ts';
import { CHOICE_VALUES, emptySession, FIRST_CHOICES, MEASURED, TRACE_USES } from './session.ts';
import type { Choices, Entry, ForceRecord, Instrument, Mark, Part, Session, Sheet, Trace, TraceLine, TraceUse } from './session.ts';

export interface SessionRead {
  /** null where the text is no session of ours, or of a later version. */
  readonly session: Session | null;
  readonly problems: readonly Problem[];
}

const VERSION = 1;

/** Keys in the order in which they are written, whatever order edits left them in; others follow as they stand. */
const KEY_ORDER = [
  'format', 'version', 'title', 'name', 'place', 'date', 'remark', 'demo', 'entries', 'parts', 'instruments', 'freeSwing', 'traces', 'forceRecords', 'pulseSamples', 'choices', 'sheets', 'marks',
  'id', 'origin', 'text', 'plusMinus', 'k', 'sha256', 'bytes', 'uses', 'timeUnit', 'readingUnit', 'rate', 'exposure', 'eventsFrom', 'events', 'offset', 'blank', 'refine', 'bad', 'trains', 'delimiter', 'decimal', 'columns', 'role', 'unit', 'by', 'kindOfAll', 'edits', 'added', 'cells',
  'kind', 'setAside', 'reason', 'serial', 'certificate', 'due', 'measures', 'scale', 'instrument',
];

function inOrder(_key: string, value: unknown): unknown {
  if (!isObject(value)) return value;
  const place = (key: string) => (KEY_ORDER.includes(key) ? KEY_ORDER.indexOf(key) : KEY_ORDER.length);
  return Object.fromEntries(Object.entries(value).toSorted(([a], [b]) => place(a) - place(b)));
}

/** The file's text: JSON, indented and in one order, so that two versions of a session can be compared line by line. */
export const sessionToText = (session: Session, traceBytes: TraceBytesPacked = {}): string =>
  `${JSON.stringify(Object.keys(traceBytes).length === 0 ? session : { ...session, traceBytes }, inOrder, 1)}\n`;

/** The bytes of traces in a file of their own right: gzip in base64, by the SHA-256 of what they unpack to. */
export type TraceBytesPacked = Readonly<Record<string, string>>;

/** The bytes of traces that a session file brings along; those that are no text are told as damage by sessionFromText. */
export function traceBytesIn(text: string): TraceBytesPacked {
  try {
    const found: unknown = JSON.parse(text.replace(/^\uFEFF/, ''));
    const bytes = isObject(found) ? found['traceBytes'] : undefined;
    return isObject(bytes) ? Object.fromEntries(Object.entries(bytes).filter((entry): entry is [string, string] => isText(entry[1]))) : {};
  } catch {
    return {};
  }
}

type Json = Readonly<Record<string, unknown>>;

const isObject = (value: unknown): value is Json => typeof value === 'object' && value !== null && !Array.isArray(value);
const isText = (value: unknown): value is string => typeof value === 'string';
const isCount = (value: unknown): value is number => typeof value === 'number' && Number.isSafeInteger(value) && value >= 0;
const isOneOf = <Value extends string>(values: readonly Value[]) => (value: unknown): value is Value =>
  values.some((known) => known === value);

const CHOICE_NAMES = Object.keys(CHOICE_VALUES) as readonly (keyof Choices)[];
const PART_ENTRY_NAMES = Object.keys(PART_ENTRIES) as readonly PartEntryName[];

/** Walks one session; every piece that cannot be read is left out and noted by where it stood. */
class Reading {
  readonly damaged: Problem[] = [];

  miss(where: string, value: unknown): void {
    this.damaged.push(problem('session-damaged', 'doubt', {}, { where, found: shortly(value) }));
  }

  take<Value>(where: string, value: unknown, fits: (value: unknown) => value is Value, otherwise: Value): Value {
    if (value === undefined) return otherwise;
    if (fits(value)) return value;
    this.miss(where, value);
    return otherwise;
  }

  object(where: string, value: unknown): Json {
    return this.take<Json>(where, value, isObject, {});
  }

  list(where: string, value: unknown): readonly unknown[] {
    return this.take<readonly unknown[]>(where, value, Array.isArray, []);
  }

  entries<Name extends string>(where: string, value: unknown, names: readonly Name[]): Partial<Record<Name, Entry>> {
    const read: Partial<Record<Name, Entry>> = {};
    for (const [key, found] of Object.entries(this.object(where, value))) {
      const name = names.find((known) => known === key);
      if (name === undefined || !isObject(found) || !isText(found['text'])) {
        this.miss(`${where}.${key}`, found);
        continue;
      }
      read[name] = { ...this.entry(`${where}.${key}`, found), ...this.instrument(`${where}.${key}.instrument`, found['instrument']) };
    }
    return read;
  }

  entry(where: string, found: Json): Entry {
    return {
      text: this.take(`${where}.text`, found['text'], isText, ''),
      plusMinus: this.take(`${where}.plusMinus`, found['plusMinus'], isOneOf(['standard', 'limits', 'expanded']), 'standard'),
      k: this.take(`${where}.k`, found['k'], isText, ''),
    };
  }

  /** Instruments of the session, once read: what names another names none. */
  private readonly known = new Set<string>();

  instrument(where: string, value: unknown): { readonly instrument?: string } {
    const named = this.take<string | undefined>(where, value, (found): found is string => isText(found) && this.known.has(found), undefined);
    return named === undefined ? {} : { instrument: named };
  }

  instruments(value: unknown): Instrument[] {
    return this.list('instruments', value).flatMap((found, index) => {
      const where = `instruments[${index + 1}]`;
      if (!isObject(found) || !isText(found['id']) || found['id'] === '' || this.known.has(found['id'])) {
        this.miss(where, found);
        return [];
      }
      this.known.add(found['id']);
      const word = (name: 'name' | 'serial' | 'certificate' | 'due'): string => this.take(`${where}.${name}`, found[name], isText, '');
      return [{
        id: found['id'], name: word('name'), serial: word('serial'), certificate: word('certificate'), due: word('due'),
        measures: this.take(`${where}.measures`, found['measures'], isOneOf(MEASURED), 'other'),
        scale: this.entry(`${where}.scale`, this.object(`${where}.scale`, found['scale'])),
      }];
    });
  }

  choices(value: unknown): Choices {
    const found = this.object('choices', value);
    const read: Record<string, unknown> = { ...FIRST_CHOICES };
    for (const name of CHOICE_NAMES) {
      const choice = found[name];
      const known: readonly unknown[] = CHOICE_VALUES[name];
      if (choice === undefined) continue;
      if (known.includes(choice)) read[name] = choice;
      else this.miss(`choices.${name}`, choice);
    }
    return read as unknown as Choices;
  }

  parts(value: unknown): Part[] {
    const seen = new Set<string>();
    return this.list('parts', value).flatMap((part, index) => {
      const where = `parts[${index + 1}]`;
      if (!isObject(part) || !isText(part['id']) || part['id'] === '' || seen.has(part['id'])) {
        this.miss(where, part);
        return [];
      }
      seen.add(part['id']);
      const entries = this.entries<PartEntryName>(`${where}.entries`, part['entries'], PART_ENTRY_NAMES);
      return [{ id: part['id'], name: this.take(`${where}.name`, part['name'], isText, ''), entries }];
    });
  }

  columns(where: string, value: unknown): ColumnMeaning[] {
    return this.list(where, value).map((column, index) => {
      const at = `${where}[${index + 1}]`;
      const found = this.object(at, column);
      return {
        role: this.take(`${at}.role`, found['role'], isOneOf(ROLES), 'ignored'),
        unit: this.take(`${at}.unit`, found['unit'], isText, ''),
        by: this.take(`${at}.by`, found['by'], isOneOf(['proposal', 'person']), 'proposal'),
      };
    });
  }

  edits(where: string, value: unknown): Sheet['edits'] {
    const lines = Object.entries(this.object(where, value)).map(([line, cells]): [string, Record<number, string>] => {
      const kept = Object.entries(this.object(`${where}.${line}`, cells)).filter((cell): cell is [string, string] => {
        const fits = /^\d+$/.test(cell[0]) && isText(cell[1]);
        if (!fits) this.miss(`${where}.${line}.${cell[0]}`, cell[1]);
        return fits;
      });
      return [line, Object.fromEntries(kept)];
    });
    return Object.fromEntries(lines);
  }

  added(where: string, value: unknown): Sheet['added'] {
    const seen = new Set<string>();
    return this.list(where, value).flatMap((row, index) => {
      const at = `${where}[${index + 1}]`;
      if (!isObject(row) || !isText(row['id']) || !/^\+\d+$/.test(row['id']) || seen.has(row['id'])) {
        this.miss(at, row);
        return [];
      }
      seen.add(row['id']);
      const cells = this.list(`${at}.cells`, row['cells']).map((cell, column) => this.take(`${at}.cells[${column + 1}]`, cell, isText, ''));
      return [{ id: row['id'], cells }];
    });
  }

  sheets(value: unknown): Sheet[] {
    const seen = new Set<string>();
    return this.list('sheets', value).flatMap((sheet, index) => {
      const where = `sheets[${index + 1}]`;
      if (!isObject(sheet) || !isText(sheet['id']) || !/^[^/]+$/.test(sheet['id']) || seen.has(sheet['id'])) {
        this.miss(where, sheet);
        return [];
      }
      seen.add(sheet['id']);
      const delimiter = this.take<Sheet['delimiter']>(`${where}.delimiter`, sheet['delimiter'], isOneOf([',', ';', '\t'] as const), undefined);
      const decimal = this.take<Sheet['decimal']>(`${where}.decimal`, sheet['decimal'], isOneOf(['.', ','] as const), undefined);
      const taken = this.take<Sheet['taken']>(`${where}.taken`, sheet['taken'], isOneOf(['before', 'after'] as const), undefined);
      const kindOfAll = sheet['kindOfAll'] === null ? null : this.take(`${where}.kindOfAll`, sheet['kindOfAll'], isOneOf(RECORD_KINDS), null);
      return [{
        id: sheet['id'],
        name: this.take(`${where}.name`, sheet['name'], isText, ''),
        origin: this.take(`${where}.origin`, sheet['origin'], isOneOf(['file', 'paste', 'typed']), 'paste'),
        text: this.take(`${where}.text`, sheet['text'], isText, ''),
        sha256: this.take(`${where}.sha256`, sheet['sha256'], isText, ''),
        ...(delimiter === undefined ? {} : { delimiter }),
        ...(decimal === undefined ? {} : { decimal }),
        columns: this.columns(`${where}.columns`, sheet['columns']),
        kindOfAll,
        ...(taken === undefined ? {} : { taken }),
        ...this.instrument(`${where}.instrument`, sheet['instrument']),
        edits: this.edits(`${where}.edits`, sheet['edits']),
        added: this.added(`${where}.added`, sheet['added']),
      }];
    });
  }

  forceRecords(value: unknown): ForceRecord[] {
    const seen = new Set<string>();
    return this.list('forceRecords', value).flatMap((record, index) => {
      const where = `forceRecords[${index + 1}]`;
      if (!isObject(record) || !isText(record['id']) || record['id'] === '' || seen.has(record['id']) || !isText(record['text'])) {
        this.miss(where, record);
        return [];
      }
      seen.add(record['id']);
      return [{ id: record['id'], name: this.take(`${where}.name`, record['name'], isText, ''), text: record['text'], sha256: this.take(`${where}.sha256`, record['sha256'], isText, '') }];
    });
  }

  traces(value: unknown): Trace[] {
    const seen = new Set<string>();
    return this.list('traces', value).flatMap((found, index) => {
      const where = `traces[${index + 1}]`;
      if (!isObject(found) || !isText(found['id']) || found['id'] === '' || seen.has(found['id']) || !isText(found['sha256'])) {
        this.miss(where, found);
        return [];
      }
      seen.add(found['id']);
      const text = (key: string): string => this.take(`${where}.${key}`, found[key], isText, '');
      return [{
        id: found['id'], name: text('name'), sha256: found['sha256'], bytes: this.take(`${where}.bytes`, found['bytes'], isCount, 0), uses: this.uses(`${where}.uses`, found['uses']),
        timeUnit: text('timeUnit'), readingUnit: text('readingUnit'), rate: text('rate'), exposure: text('exposure'), eventsFrom: this.take(`${where}.eventsFrom`, found['eventsFrom'], isOneOf(['list', 'trigger', 'found']), 'list'), events: this.lines(`${where}.events`, found['events']),
        offset: text('offset'), blank: text('blank'), refine: text('refine'), bad: this.lines(`${where}.bad`, found['bad']), trains: this.lines(`${where}.trains`, found['trains']),
      }];
    });
  }

  uses(where: string, value: unknown): Trace['uses'] {
    const uses: Partial<Record<TraceUse, number>> = {};
    for (const [use, column] of Object.entries(this.object(where, value))) {
      const known = TRACE_USES.find((one) => one === use);
      if (known && (column === -1 || isCount(column))) uses[known] = column;
      else this.miss(`${where}.${use}`, column);
    }
    return uses;
  }

  lines(where: string, value: unknown): TraceLine[] {
    const seen = new Set<string>();
    return this.list(where, value).flatMap((line, index) => {
      if (!isObject(line) || !isText(line['id']) || line['id'] === '' || seen.has(line['id']) || !isText(line['text'])) {
        this.miss(`${where}[${index + 1}]`, line);
        return [];
      }
      seen.add(line['id']);
      return [{ id: line['id'], text: line['text'] }];
    });
  }

  marks(value: unknown): Session['marks'] {
    const marks = Object.entries(this.object('marks', value)).flatMap(([record, found]): [string, Mark][] => {
      const where = `marks.${record}`;
      const mark = this.object(where, found);
      const kind = mark['kind'] === undefined ? undefined : this.take(`${where}.kind`, mark['kind'], isOneOf([...RECORD_KINDS, ''] as const), '');
      const aside = mark['setAside'] === undefined ? undefined : this.object(`${where}.setAside`, mark['setAside']);
      const kept: Mark = {
        ...(aside === undefined ? {} : { setAside: { reason: this.take(`${where}.setAside.reason`, aside['reason'], isText, '') } }),
        ...(kind === undefined || kind === '' ? {} : { kind }),
      };
      return Object.keys(kept).length === 0 ? [] : [[record, kept]];
    });
    return Object.fromEntries(marks);
  }

  session(found: Json): Session {
    const title = this.object('title', found['title']);
    // First of all, since entries and sheets name them.
    const instruments = this.instruments(found['instruments']);
    const word = (name: keyof Session['title']) => this.take(`title.${name}`, title[name], isText, '');
    return {
      ...emptySession(),
      title: { name: word('name'), place: word('place'), date: word('date'), remark: word('remark') },
      demo: this.take('demo', found['demo'], (value): value is boolean => typeof value === 'boolean', false),
      entries: this.entries<EntryName>('entries', found['entries'], ENTRY_NAMES),
      parts: this.parts(found['parts']),
      instruments,
      freeSwing: this.take('freeSwing', found['freeSwing'], isText, ''),
      traces: this.traces(found['traces'] ?? []),
      forceRecords: this.forceRecords(found['forceRecords'] ?? []),
      pulseSamples: this.take('pulseSamples', found['pulseSamples'], isText, ''),
      choices: this.choices(found['choices']),
      sheets: this.sheets(found['sheets']),
      marks: this.marks(found['marks']),
    };
  }
}

/** What was found, short enough for a sentence. */
function shortly(value: unknown): string {
  const text = JSON.stringify(value) ?? 'nothing';
  return text.length > 40 ? `${text.slice(0, 39)}…` : text;
}

/** Reads a session file. Problems: session-not-json, -not-ours and -newer stop it; -damaged says what was left out, piece by piece. */
export function sessionFromText(text: string): SessionRead {
  let found: unknown;
  try {
    found = JSON.parse(text.replace(/^\uFEFF/, ''));
  } catch {
    return { session: null, problems: [problem('session-not-json', 'stops', {})] };
  }
  if (!isObject(found) || found['format'] !== 'firstswing-session') {
    return { session: null, problems: [problem('session-not-ours', 'stops', {})] };
  }
  const version = found['version'];
  if (typeof version === 'number' && version > VERSION) {
    return { session: null, problems: [problem('session-newer', 'stops', {}, { version, known: VERSION })] };
  }
  const reading = new Reading();
  if (version !== VERSION) reading.miss('version', version);
  const session = reading.session(found);
  return { session, problems: reading.damaged };
}
