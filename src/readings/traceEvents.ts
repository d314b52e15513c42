/** The list of a trace's shots, taps and blanks, and of its bad stretches, from the lines that a person wrote. */
import { problem, type Problem } from '../problems/problems.ts';
import { readQuantity } from '../units/quantity.ts';
import { unitNamed } from '../units/units.ts';
import { kindOfWord } from './kinds.ts';
import type { RecordKind } from './meanings.ts';

/** A shot, tap or blank of a trace. */
export interface TraceEvent {
  /** Of its line, or of the trigger or the find. */
  readonly id: string;
  /** s on the clock of the list. */
  readonly time: number;
  readonly kind: RecordKind;
  /** A tap's impulse as typed, '' for none. */
  readonly impulse: string;
}

interface Line {
  readonly id: string;
  readonly text: string;
}

/** What a jump of the velocity can be. */
const STRUCK: ReadonlySet<RecordKind> = new Set(['shot', 'tap', 'blank']);

const notRead = (entry: string, found: string, at: number): Problem => problem('trace-event-not-read', 'stops', { entry }, { found, at });

/** One event a line: "12.5", "12.5 s tap 1.2 mN·s", "40.2 blank"; times in s where no unit is written. In order of time. */
export function readTraceEvents(lines: readonly Line[], entry: string): { readonly events: readonly TraceEvent[]; readonly problems: readonly Problem[] } {
  const problems: Problem[] = [];
  const events = lines.flatMap(({ id, text }, i): TraceEvent[] => {
    const line = text.trim();
    if (line === '') return [];
    const { time, rest } = leadingTime(line);
    const kind = rest.length === 0 ? 'shot' : kindOfWord(rest[0]!);
    if (time === null || kind === null || !STRUCK.has(kind)) {
      problems.push(notRead(entry, line, i + 1));
      return [];
    }
    return [{ id, time, kind, impulse: rest.slice(1).join(' ') }];
  });
  return { events: events.sort((a, b) => a.time - b.time), problems };
}

/** The time that a line begins with, s, and its other words. */
function leadingTime(line: string): { readonly time: number | null; readonly rest: readonly string[] } {
  const [first = '', second, ...others] = line.split(/\s+/);
  const withUnit = second !== undefined && unitNamed(second, 'time') !== null;
  const time = readQuantity(withUnit ? `${first} ${second}` : first, 'time', 's');
  return { time: time.ok ? time.value : null, rest: withUnit ? others : second === undefined ? [] : [second, ...others] };
}

/** The line with another time, in s to the figures given; the rest of it as it was. */
export function lineAtTime(text: string, time: string): string {
  return [`${time} s`, ...leadingTime(text.trim()).rest].join(' ');
}

export interface MarkedStretch {
  readonly id: string;
  readonly from: number;
  readonly to: number;
}

/** A train of pulses. */
export interface TimedTrain extends MarkedStretch {
  /** Pulses a second, Hz, with its ± as a standard uncertainty (0: none). */
  readonly rate: number;
  readonly spread: number;
}

/** One train a line: "20 60 50 Hz"; times in s and rates in Hz where no unit is written. */
export function readTrains(lines: readonly Line[], entry: string): { readonly trains: readonly TimedTrain[]; readonly problems: readonly Problem[] } {
  const problems: Problem[] = [];
  const trains = lines.flatMap(({ id, text }, i): TimedTrain[] => {
    const line = text.trim();
    if (line === '') return [];
    const start = leadingTime(line);
    const end = leadingTime(start.rest.join(' '));
    const rate = readQuantity(end.rest.join(' '), 'frequency', 'Hz');
    if (start.time === null || end.time === null || !(end.time > start.time) || !rate.ok || !(rate.value > 0)) {
      problems.push(problem('trace-train-not-read', 'stops', { entry }, { found: line, at: i + 1 }));
      return [];
    }
    return [{ id, from: start.time, to: end.time, rate: rate.value, spread: rate.spread ?? 0 }];
  });
  return { trains: trains.sort((a, b) => a.from - b.from), problems };
}

/** One stretch a line: "12.5 13.1", in s. */
export function readStretches(lines: readonly Line[], entry: string): { readonly stretches: readonly MarkedStretch[]; readonly problems: readonly Problem[] } {
  const problems: Problem[] = [];
  const stretches = lines.flatMap(({ id, text }, i): MarkedStretch[] => {
    const line = text.trim();
    if (line === '') return [];
    const start = leadingTime(line);
    const end = leadingTime(start.rest.join(' '));
    if (start.time === null || end.time === null || !(end.time > start.time) || end.rest.length > 0) {
      problems.push(notRead(entry, line, i + 1));
      return [];
    }
    return [{ id, from: start.time, to: end.time }];
  });
  return { stretches, problems };
}
