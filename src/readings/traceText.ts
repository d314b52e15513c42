/** A sampled trace as text: time and displacement (and a trigger) to samples in SI, and the list of its shots and taps. */
import { problem, type Place, type Problem } from '../problems/problems.ts';
import { readQuantity } from '../units/quantity.ts';
import { toSi, unitNamed, type Dimension } from '../units/units.ts';
import { kindOfWord } from './kinds.ts';
import type { RecordKind } from './meanings.ts';
import { readSampledColumns, unitOfSampled, type SampledColumn } from './sampledColumns.ts';

export interface TraceRead {
  readonly samples: { readonly t: readonly number[]; readonly x: readonly number[] } | null;
  /** Times at which a trigger rises, s; empty without one. */
  readonly triggered: readonly number[];
  readonly problems: readonly Problem[];
}

/** A shot, tap or blank of a trace. */
export interface TraceEvent {
  /** s on the record's clock. */
  readonly time: number;
  readonly kind: RecordKind;
  /** A tap's impulse as typed, '' for none. */
  readonly impulse: string;
  /** One-based line of the list; 0 for a trigger. */
  readonly line: number;
}

const FEWEST = 20;
const MOST = 500_000;
const USUAL: Readonly<Record<string, string>> = { length: 'mm', angle: 'mrad', pixel: 'px', count: 'counts' };
const TRIGGER = /trig|sync|fire|gate/iu;

const READ = new Map<string, TraceRead>();
const KEPT = 8;

/** Asked for at every recalculation, of a text that never changes. */
export function readTrace(name: string, text: string, dimension: Dimension): TraceRead {
  const key = `${dimension}\n${name}\n${text}`;
  const kept = READ.get(key);
  if (kept) return kept;
  if (READ.size >= KEPT) READ.clear();
  const read = readAfresh({ sheetName: name }, text, dimension);
  READ.set(key, read);
  return read;
}

function readAfresh(place: Place, text: string, dimension: Dimension): TraceRead {
  const stop = (found: Problem): TraceRead => ({ samples: null, triggered: [], problems: [found] });
  const { columns, lines } = readSampledColumns(text, place);
  if (columns.length < 2 || lines.length < FEWEST) return stop(problem('trace-no-samples', 'stops', place, { rows: lines.length }));
  if (lines.length > MOST) return stop(problem('trace-too-long', 'stops', place, { rows: lines.length, most: MOST }));
  const time = columns.find((column) => unitOfSampled(column, 'time')) ?? columns[0]!;
  const trigger = columns.find((column) => column !== time && TRIGGER.test(column.header));
  const reading = columns.find((column) => column !== time && column !== trigger && unitOfSampled(column, dimension)) ?? columns.find((column) => column !== time && column !== trigger);
  if (!reading) return stop(problem('trace-no-samples', 'stops', place, { rows: lines.length }));
  const [timeUnit, readingUnit] = [unitOfSampled(time, 'time'), unitOfSampled(reading, dimension)];
  const t = time.values.map((value) => toSi(value, timeUnit ?? unitNamed('s', 'time')!));
  const back = t.findIndex((value, i) => i > 0 && !(value > t[i - 1]!));
  if (back > 0) return stop(problem('trace-time-not-rising', 'stops', { ...place, line: lines[back]! }, {}));
  const usual = USUAL[dimension] ?? 'mm';
  const x = reading.values.map((value) => toSi(value, readingUnit ?? unitNamed(usual, dimension)!));
  if (x.every((value) => value === x[0])) return stop(problem('trace-constant', 'stops', place, {}));
  const problems = timeUnit && readingUnit ? [] : [problem('trace-unit-assumed', 'doubt', place, { time: timeUnit?.symbol ?? 's', reading: readingUnit?.symbol ?? usual })];
  return { samples: { t, x }, triggered: trigger ? risesOf(trigger, t) : [], problems };
}

/** Times at which the trigger passes half of its range upward, between the two samples. */
function risesOf({ values }: SampledColumn, t: readonly number[]): readonly number[] {
  const [low, high] = values.reduce(([a, b], v) => [Math.min(a, v), Math.max(b, v)], [Infinity, -Infinity]);
  const half = (low + high) / 2;
  if (!(high > low)) return [];
  return values.flatMap((v, i) => (i > 0 && values[i - 1]! < half && v >= half ? [t[i - 1]! + ((t[i]! - t[i - 1]!) * (half - values[i - 1]!)) / (v - values[i - 1]!)] : []));
}

/** Shots, taps and blanks, one a line: "12.5", "12.5 tap 1.2 mN·s", "40.2 blank". Times in s where no unit is written. */
export function readTraceEvents(text: string, entry: string): { readonly events: readonly TraceEvent[]; readonly problems: readonly Problem[] } {
  const events: TraceEvent[] = [];
  const problems: Problem[] = [];
  for (const [i, raw] of text.split(/[\n;]+/).entries()) {
    const line = raw.trim();
    if (line === '') continue;
    const [first, ...words] = line.split(/\s+/);
    const [second, ...others] = words;
    const withUnit = second !== undefined && unitNamed(second, 'time') ? `${first} ${second}` : first!;
    const rest = withUnit === first ? words : others;
    const time = readQuantity(withUnit, 'time', 's');
    const kind = rest.length === 0 ? 'shot' : kindOfWord(rest[0]!);
    if (!time.ok || kind === null || kind === 'zero' || kind === 'weight' || kind === 'period' || kind === 'freeSwing') {
      problems.push(problem('trace-event-not-read', 'stops', { entry }, { found: line, at: i + 1 }));
      continue;
    }
    events.push({ time: time.value, kind, impulse: rest.slice(1).join(' '), line: i + 1 });
  }
  return { events: events.sort((a, b) => a.time - b.time), problems };
}
