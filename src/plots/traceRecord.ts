/** A whole sampled record as a picture: what of it is in sight, its rest line, its shots and taps, and what is left out of it. */
import type uPlot from 'uplot';
import { timeOf, window } from '../numeric/minMaxPyramid.ts';
import type { Envelope, TracePicture } from '../numeric/minMaxPyramid.ts';
import type { RecordKind } from '../readings/meanings.ts';
import type { Stretch, TraceEventTold, TraceTold } from '../reduction/traceResults.ts';
import { restAt } from '../traces/swingModel.ts';
import { plain } from '../units/format.ts';
import { fromSi, siUnit } from '../units/units.ts';
import type { Unit } from '../units/units.ts';
import { axis, roomFor } from './axes.ts';
import type { Range } from './axes.ts';
import type { Inks } from './figure.ts';
import { KIND_WORDS } from './recordWords.ts';
import { boundsOf } from './tracePanZoom.ts';
import type { Bounds, Sight } from './tracePanZoom.ts';
import { countedWhys, eventNames, throwUnit, throwWords, timeWords, WHY_WORDS } from './traceWords.ts';

export const RECORD_HEIGHT = 300;
/** Of it the part within the axes, about. */
const AREA_HEIGHT = 245;
/** Strip along the top in which the signs of shots and taps stand, CSS px. */
export const SIGNS_HEIGHT = 24;
/** Free below the record, where the feet of the bands are, as a part of its height. */
const FREE_BELOW = 0.06;
const FREE_ABOVE = 0.04;

/** A shot, tap or blank along the record. */
export interface RecordEvent {
  readonly id: string;
  readonly kind: RecordKind;
  /** s. */
  readonly time: number;
  /** "Shot 3". */
  readonly name: string;
  /** The record was fitted and this has no throw: drawn as a cross. */
  readonly missing: boolean;
  /** What a reader is told of it. */
  readonly reading: string;
}

/** What is drawn of a stretch of the record. */
export interface InSight {
  /** s; the record and twice the rest line in the unit of the picture. */
  readonly columns: uPlot.AlignedData;
  /** Of the record in sight without what is left out. */
  readonly y: Range;
}

export interface RecordFigure {
  readonly title: string;
  readonly summary: string;
  readonly bounds: Bounds;
  /** Middle spacing of the samples, s. */
  readonly spacing: number;
  readonly unit: Unit;
  /** In order of time. */
  readonly events: readonly RecordEvent[];
  /** In order of time; s. */
  readonly stretches: readonly Stretch[];
  readonly axes: uPlot.Axis[];
  readonly series: uPlot.Series[];
  /** The record in [from, to], to so many columns of pixels. */
  readonly look: (sight: Sight, columns: number) => InSight;
}

/** Lowest and highest finite sample, SI; null where there is none. */
function extent({ pyramid: { levels } }: TracePicture): Range | null {
  const top = levels.at(-1);
  if (top === undefined) return null;
  const [low, high] = [top.low.reduce((a, b) => Math.min(a, b), Infinity), top.high.reduce((a, b) => Math.max(a, b), -Infinity)];
  return low <= high ? { low, high } : null;
}

/** Breaks the line at gaps that no sample stands in. */
function brokenAt({ times, values }: Envelope, gaps: readonly Stretch[]): Envelope {
  if (gaps.length === 0) return { times, values };
  const [cutTimes, cutValues]: [number[], (number | null)[]] = [[], []];
  let gap = 0;
  times.forEach((t, i) => {
    while (gap < gaps.length && gaps[gap]!.to <= (times[i - 1] ?? -Infinity)) gap += 1;
    const next = gaps[gap];
    const middle = next === undefined ? 0 : (next.from + next.to) / 2;
    if (next !== undefined && i > 0 && values[i] !== null && cutValues.at(-1) !== null && times[i - 1]! < middle && t > middle) {
      cutTimes.push(middle);
      cutValues.push(null);
    }
    cutTimes.push(t);
    cutValues.push(values[i]!);
  });
  return { times: cutTimes, values: cutValues };
}

/** Range of the values, without what lies in a stretch that is left out, unless nothing else is there. */
function rangeOf({ times, values }: Envelope, stretches: readonly Stretch[]): Range | null {
  let [low, high, lowAll, highAll] = [Infinity, -Infinity, Infinity, -Infinity];
  let next = 0;
  let leftOutUntil = -Infinity;
  for (let i = 0; i < times.length; i += 1) {
    const value = values[i];
    if (value == null) continue;
    for (; next < stretches.length && stretches[next]!.from <= times[i]!; next += 1) leftOutUntil = Math.max(leftOutUntil, stretches[next]!.to);
    lowAll = Math.min(lowAll, value);
    highAll = Math.max(highAll, value);
    if (times[i]! <= leftOutUntil) continue;
    low = Math.min(low, value);
    high = Math.max(high, value);
  }
  return low <= high ? { low, high } : lowAll <= highAll ? { low: lowAll, high: highAll } : null;
}

/** The range with room for the signs above and the feet below. */
function roomAround({ low, high }: Range): Range {
  const whole = ((high - low || Math.abs(high) || 1) * (1 + FREE_ABOVE)) / (1 - SIGNS_HEIGHT / AREA_HEIGHT - FREE_BELOW);
  return { low: low - FREE_BELOW * whole, high: low + (1 - FREE_BELOW) * whole };
}

function eventOf(event: TraceEventTold, name: string, unit: Unit, { fitted, spacing }: TraceTold): RecordEvent {
  const { id, kind, time, timeU } = event;
  const at = timeU === null ? timeWords(time, spacing) : `${timeWords(time, spacing)} (found by the fit, u = ${plain(timeU, siUnit('time'), 2)})`;
  return { id, kind, time, name, missing: fitted !== null && event.jump === null, reading: [name, at, ...(fitted === null ? [] : [throwWords(event, unit)])].join(', ') };
}

const counted = (count: number, word: string): string => `${count} ${word}${count === 1 ? '' : 's'}`;

function summaryOf({ from, to, spacing, rows, stretches, fitted }: TraceTold, events: readonly RecordEvent[]): string {
  const kinds = (['shot', 'tap', 'blank'] as const).flatMap((kind) => {
    const count = events.filter((event) => event.kind === kind).length;
    return count === 0 ? [] : [counted(count, KIND_WORDS[kind].toLowerCase())];
  });
  const out = countedWhys(stretches).map(({ why, count }) => `${count} × ${WHY_WORDS[why]}`);
  return [
    `The record from ${timeWords(from, spacing)} to ${timeWords(to, spacing)}${rows === null ? '' : `, ${rows.toLocaleString('en-GB').replaceAll(',', ' ')} samples`}.`,
    kinds.length === 0 ? 'No shot or tap is known in it.' : `In it ${kinds.join(', ')}, each by its sign along the top.`,
    ...(fitted === null ? [] : ['Dashed: the rest line.']),
    ...(out.length === 0 ? [] : [`Hatched, and left out of the fit: ${out.join(', ')}.`]),
  ].join(' ');
}

/** `names`: what the run calls its records, by event id; without, each kind is counted along the record. */
export function recordFigure(told: TraceTold, picture: TracePicture, inks: Inks, names: ReadonlyMap<string, string> = eventNames(told.events)): RecordFigure {
  const { values, times } = picture;
  const whole = extent(picture);
  const unit = throwUnit(told, whole === null ? 0 : whole.high - whole.low);
  const ordered = told.events.toSorted((a, b) => a.time - b.time);
  const events = ordered.map((event) => eventOf(event, names.get(event.id) ?? event.id, unit, told));
  const stretches = told.stretches.toSorted((a, b) => a.from - b.from);
  const gaps = stretches.filter(({ why }) => why === 'gap');
  const model = told.fitted?.model ?? null;
  const ends = values.length === 0 ? [told.from, told.to] as const : [timeOf(times, 0), timeOf(times, values.length - 1)] as const;

  const look = (sight: Sight, columns: number): InSight => {
    const line = brokenAt(window(picture, sight.from, sight.to, columns), gaps);
    const range = rangeOf(line, stretches);
    const shown = line.values.map((value) => (value === null ? null : fromSi(value, unit)));
    const rest = model === null ? line.times.map(() => null) : line.times.map((t) => fromSi(restAt(model, t), unit));
    return {
      // The rest line twice: on a broad line of the paper's colour it is seen over a dense record too.
      columns: [[...line.times], shown, rest, rest],
      y: range === null ? roomFor([]) : roomAround({ low: fromSi(range.low, unit), high: fromSi(range.high, unit) }),
    };
  };

  return {
    title: `The record ${told.name}`,
    summary: summaryOf(told, events),
    bounds: boundsOf(ends[0], ends[1], told.spacing),
    spacing: told.spacing,
    unit,
    events,
    stretches,
    axes: [axis({ label: 'Time on the record’s clock  (s)', side: 'bottom' }, inks), axis({ label: `Reading  (${unit.symbol})`, side: 'left' }, inks)],
    series: [
      {},
      { label: 'reading', stroke: inks.ink, width: 1, points: { show: false } },
      { label: 'ground of the rest line', stroke: inks.paper, width: 4, points: { show: false } },
      { label: 'rest', stroke: inks.ink, width: 1.5, dash: [6, 4], points: { show: false } },
    ],
    look,
  };
}
