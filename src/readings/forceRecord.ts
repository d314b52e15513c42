/** A hammer's force record as it came: two columns, time and force, to samples in s and N. */
import { problem, type Place, type Problem } from '../problems/problems.ts';
import { toSi, unitNamed } from '../units/units.ts';
import { readSampledColumns, unitOfSampled } from './sampledColumns.ts';

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
  const { columns, lines } = readSampledColumns(text, place);
  if (columns.length < 2 || lines.length < 3) return stop('force-record-no-samples', { rows: lines.length });
  if (lines.length > MOST_SAMPLES) return stop('force-record-too-long', { rows: lines.length, most: MOST_SAMPLES });
  const timeColumn = columns.find((column) => unitOfSampled(column, 'time')) ?? columns[0]!;
  const forceColumn = columns.find((column) => column !== timeColumn && unitOfSampled(column, 'force')) ?? columns.find((column) => column !== timeColumn)!;
  const [timeUnit, forceUnit] = [unitOfSampled(timeColumn, 'time'), unitOfSampled(forceColumn, 'force')];
  const time = timeColumn.values.map((value) => toSi(value, timeUnit ?? unitNamed('s', 'time')!));
  const force = forceColumn.values.map((value) => toSi(value, forceUnit ?? unitNamed('N', 'force')!));
  const back = time.findIndex((t, i) => i > 0 && !(t > time[i - 1]!));
  if (back > 0) return stop('force-record-time-not-rising', {}, lines[back]);
  const assumed = timeUnit && forceUnit ? [] : [problem('force-record-unit-assumed', 'doubt', place, { time: timeUnit?.symbol ?? 's', force: forceUnit?.symbol ?? 'N' })];
  return { samples: { time, force }, problems: assumed };
}
