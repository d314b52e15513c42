/** A measured pulse as pasted from a spreadsheet: lines of a time and a thrust, or what goes with it, to samples in seconds. */
import { problem, type Problem } from '../problems/problems.ts';
import { readNumber } from '../units/quantity.ts';
import { toSi, unitNamed, type Unit } from '../units/units.ts';

/** Name under which the samples stand among the entries. */
export const PULSE_SAMPLES = 'pulseSamples';

export interface PulseSamples {
  /** s, rising. */
  readonly time: readonly number[];
  /** In any one unit. */
  readonly force: readonly number[];
}

export interface PulseSamplesRead {
  /** null where nothing usable is typed. */
  readonly samples: PulseSamples | null;
  readonly problems: readonly Problem[];
}

/** More than this, and it is a whole record and not a pulse. */
const MOST_SAMPLES = 20_000;
/** Times beyond this, s, belong to no pulse. */
const LATEST = 1e6;
const USUAL_UNIT = 'ms';

/** The two cells of a line: parted by a tab or semicolon, else by blanks, else by a comma. */
function cellsOf(line: string): readonly string[] {
  const trimmed = line.trim();
  if (/[\t;]/.test(trimmed)) return trimmed.split(/[\t;]/).map((cell) => cell.trim()).filter((cell) => cell !== '');
  const blanks = trimmed.split(/\s+/);
  const parted = blanks.length > 1 ? blanks : trimmed.split(',');
  return parted.map((cell) => cell.replace(/,$/, '').trim()).filter((cell) => cell !== '');
}

/** A unit of time in a header line: "t (ms)", "Time [µs]", "ms", "Zeit / s". */
function timeUnitIn(line: string): Unit | null {
  for (const word of line.split(/[\s;,\t()[\]/]+/)) {
    const unit = word === '' ? null : unitNamed(word, 'time');
    if (unit) return unit;
  }
  return null;
}

const isNumbers = (cells: readonly string[]): boolean => cells.length > 0 && cells.every((cell) => readNumber(cell) !== null);

/** Reads the text; the first fault stops it, with its line. Lines before the first numbers are a header, whose unit of time is taken. */
export function readPulseSamples(text: string): PulseSamplesRead {
  const place = { entry: PULSE_SAMPLES };
  const stop = (found: Problem): PulseSamplesRead => ({ samples: null, problems: [found] });
  const lines = text.split(/\r\n|\r|\n/).map((line, i) => ({ line, at: i + 1 })).filter(({ line }) => line.trim() !== '');
  const begin = lines.findIndex(({ line }) => isNumbers(cellsOf(line)));
  const data = begin < 0 ? [] : lines.slice(begin);
  if (data.length < 2) return stop(problem('pulse-samples-missing', 'stops', place, { samples: data.length }));
  if (data.length > MOST_SAMPLES) return stop(problem('pulse-samples-too-many', 'stops', place, { samples: data.length, most: MOST_SAMPLES }));
  const unit = lines.slice(0, begin).map(({ line }) => timeUnitIn(line)).find((found) => found !== null) ?? null;
  const taken = unit ?? unitNamed(USUAL_UNIT, 'time')!;
  const time: number[] = [];
  const force: number[] = [];
  for (const { line, at } of data) {
    const [t, f, ...more] = cellsOf(line).map((cell) => readNumber(cell));
    if (t === null || t === undefined || f === null || f === undefined || more.length > 0) return stop(problem('pulse-sample-not-two-numbers', 'stops', place, { at, found: line.trim() }));
    const seconds = toSi(t, taken);
    if (!(Math.abs(seconds) < LATEST && Math.abs(f) < Number.MAX_SAFE_INTEGER)) return stop(problem('pulse-sample-not-two-numbers', 'stops', place, { at, found: line.trim() }));
    if (time.length > 0 && !(seconds > time.at(-1)!)) return stop(problem('pulse-sample-time-not-rising', 'stops', place, { at, found: line.trim() }));
    time.push(seconds);
    force.push(f);
  }
  const size = Math.max(...force.map(Math.abs));
  if (size === 0) return stop(problem('pulse-samples-no-impulse', 'stops', place, {}));
  // Sizes are of no account; a peak of 1 keeps the sums within the range of numbers.
  const samples = { time, force: force.map((f) => f / size) };
  return { samples, problems: unit ? [] : [problem('pulse-samples-unit-assumed', 'note', place, { unit: USUAL_UNIT })] };
}
