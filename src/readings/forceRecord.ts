/** A hammer's force record as it came: two columns, time and force, to samples in s and N. */
import { problem, type Place, type Problem } from '../problems/problems.ts';
import { readNumber } from '../units/quantity.ts';
import { toSi, unitNamed, type Dimension, type Unit } from '../units/units.ts';
import { columnUnit } from './headerUnits.ts';
import { readTable } from './table.ts';

export interface ForceSamples {
  /** s, rising. */
  readonly time: readonly number[];
  /** N. */
  readonly force: readonly number[];
}

export interface ForceSamplesRead {
  readonly samples: ForceSamples | null;
  readonly problems: readonly Problem[];
}

/** More samples than this are a whole day of one sensor, not a hammer's record. */
const MOST_SAMPLES = 500_000;

/** A record is asked for at every recalculation and never changes; a few are kept. */
const READ = new Map<string, ForceSamplesRead>();
const KEPT = 40;

export function readForceRecord(name: string, text: string): ForceSamplesRead {
  const key = `${name}\n${text}`;
  const kept = READ.get(key);
  if (kept) return kept;
  if (READ.size >= KEPT) READ.clear();
  const read = readAfresh({ sheetName: name }, text);
  READ.set(key, read);
  return read;
}

function readAfresh(place: Place, text: string): ForceSamplesRead {
  const stop = (code: 'force-record-no-samples' | 'force-record-time-not-rising' | 'force-record-too-long', facts: Readonly<Record<string, string | number>>, line?: number): ForceSamplesRead =>
    ({ samples: null, problems: [problem(code, 'doubt', line === undefined ? place : { ...place, line }, facts)] });
  const table = readTable(text, { place });
  const numeric = table.headers.map((_, i) => table.rows.filter(({ cells }) => readNumber(cells[i] ?? '', table.decimal) !== null).length);
  const columns = numeric.flatMap((count, i) => (count > table.rows.length / 2 ? [i] : []));
  if (columns.length < 2 || table.rows.length < 3) return stop('force-record-no-samples', { rows: table.rows.length });
  if (table.rows.length > MOST_SAMPLES) return stop('force-record-too-long', { rows: table.rows.length, most: MOST_SAMPLES });
  const unitOf = (index: number, dimension: Dimension): Unit | null => {
    const found = columnUnit(table.unitTexts[index] ?? '');
    return found && unitNamed(found.symbol, dimension);
  };
  const timeColumn = columns.find((i) => unitOf(i, 'time')) ?? columns[0]!;
  const forceColumn = columns.find((i) => i !== timeColumn && unitOf(i, 'force')) ?? columns.find((i) => i !== timeColumn)!;
  const [timeUnit, forceUnit] = [unitOf(timeColumn, 'time'), unitOf(forceColumn, 'force')];
  const time: number[] = [];
  const force: number[] = [];
  for (const { line, cells } of table.rows) {
    const [t, f] = [readNumber(cells[timeColumn] ?? '', table.decimal), readNumber(cells[forceColumn] ?? '', table.decimal)];
    if (t === null || f === null) continue;
    const seconds = toSi(t, timeUnit ?? unitNamed('s', 'time')!);
    if (time.length > 0 && !(seconds > time.at(-1)!)) return stop('force-record-time-not-rising', {}, line);
    time.push(seconds);
    force.push(toSi(f, forceUnit ?? unitNamed('N', 'force')!));
  }
  const assumed = timeUnit && forceUnit ? [] : [problem('force-record-unit-assumed', 'doubt', place, { time: timeUnit?.symbol ?? 's', force: forceUnit?.symbol ?? 'N' })];
  return { samples: { time, force }, problems: assumed };
}
