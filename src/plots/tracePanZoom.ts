/** Which stretch of a record is in sight, and how a wheel, a finger, two fingers or a key move it. */

/** s, from < to. */
export interface Sight {
  readonly from: number;
  readonly to: number;
}

/** The whole record, and the shortest stretch of it that can be looked at; s. */
export interface Bounds extends Sight {
  readonly least: number;
}

/** Of the whole record, how little can be looked at where the samples do not tell. */
const LEAST_PART = 1e-9;
/** Samples in the shortest stretch. */
const LEAST_SAMPLES = 8;

/** Bounds of a record; one without length is given one about its time. */
export function boundsOf(from: number, to: number, spacing: number): Bounds {
  const long = to - from;
  if (!(long > 0)) {
    const half = spacing > 0 ? (LEAST_SAMPLES / 2) * spacing : 0.5;
    return { from: from - half, to: from + half, least: 2 * half };
  }
  return { from, to, least: Math.min(long, Math.max(LEAST_SAMPLES * (spacing > 0 ? spacing : 0), LEAST_PART * Math.max(long, Math.abs(from), Math.abs(to)))) };
}

/** The stretch of that length nearest to the one from `from` on that lies in the record. */
function placed(from: number, long: number, bounds: Bounds): Sight {
  const whole = bounds.to - bounds.from;
  if (!(long < whole)) return { from: bounds.from, to: bounds.to };
  const begin = Math.max(bounds.from, Math.min(bounds.to - long, from));
  // The sum may be rounded past the end.
  return { from: begin, to: Math.min(bounds.to, begin + long) };
}

/**
 * The sight with its length times `factor` and `point` at the same place in it; less where the record ends.
 * Valid: factor > 0, finite; else the sight as it is.
 */
export function zoomedAbout({ from, to }: Sight, point: number, factor: number, bounds: Bounds): Sight {
  if (!(factor > 0) || !Number.isFinite(factor) || !Number.isFinite(point)) return { from, to };
  const long = Math.max(bounds.least, (to - from) * factor);
  return placed(point - ((point - from) / (to - from)) * long, long, bounds);
}

/** The sight moved by so many seconds, as far as the record goes. */
export function panned({ from, to }: Sight, by: number, bounds: Bounds): Sight {
  return Number.isFinite(by) ? placed(from + by, to - from, bounds) : { from, to };
}

/** The sight of the same length with a time in its middle. */
export const centredOn = ({ from, to }: Sight, time: number, bounds: Bounds): Sight => panned({ from, to }, time - (from + to) / 2, bounds);

/** The sight, moved no further than it takes to have the time in it with some room. */
export function broughtIn(sight: Sight, time: number, bounds: Bounds): Sight {
  const room = 0.05 * (sight.to - sight.from);
  return time >= sight.from + room && time <= sight.to - room ? sight : centredOn(sight, time, bounds);
}

/** Places of two fingers across the picture, as parts of its width. */
export type Fingers = readonly [number, number];

/** Fingers nearer than this part of the width do not tell a length. */
const NEAREST_FINGERS = 0.01;

/** The sight in which what was under each finger is under it again; fingers that meet only pan. */
export function pinched(sight: Sight, before: Fingers, after: Fingers, bounds: Bounds): Sight {
  const long = sight.to - sight.from;
  const [wasApart, isApart] = [Math.abs(before[1] - before[0]), Math.abs(after[1] - after[0])];
  const [was, is] = [(before[0] + before[1]) / 2, (after[0] + after[1]) / 2];
  const zoomed = wasApart < NEAREST_FINGERS || isApart < NEAREST_FINGERS ? long : Math.max(bounds.least, Math.min(bounds.to - bounds.from, (long * wasApart) / isApart));
  return placed(sight.from + was * long - is * zoomed, zoomed, bounds);
}

/** Lines and pages of a wheel, px. */
const LINE = 16;
const PAGE = 400;
/** Px of a wheel for twice the length. */
const PER_DOUBLE = 250;
/** A single turn counts no more than this, px. */
const MOST_TURN = 400;

/** By how much a turn of the wheel makes the sight longer; `mode` as browsers tell it: 0 pixels, 1 lines, 2 pages. */
export function wheelFactor(turn: number, mode: number): number {
  const pixels = turn * (mode === 1 ? LINE : mode === 2 ? PAGE : 1);
  return 2 ** (Math.max(-MOST_TURN, Math.min(MOST_TURN, pixels)) / PER_DOUBLE);
}

const PAN_PART = 0.2;

/** Where a key leads to, or null where it is not one of them. `about`: what + and − hold in place. */
export function afterKey(key: string, sight: Sight, about: number, bounds: Bounds): Sight | null {
  const long = sight.to - sight.from;
  switch (key) {
    case 'ArrowRight': return panned(sight, PAN_PART * long, bounds);
    case 'ArrowLeft': return panned(sight, -PAN_PART * long, bounds);
    case 'ArrowUp':
    case '+':
    case '=': return zoomedAbout(sight, about, 0.5, bounds);
    case 'ArrowDown':
    case '-':
    case '−': return zoomedAbout(sight, about, 2, bounds);
    case 'Home': return panned(sight, bounds.from - sight.from, bounds);
    case 'End': return panned(sight, bounds.to - sight.to, bounds);
    case '0': return { from: bounds.from, to: bounds.to };
    default: return null;
  }
}

/** The same stretch of time. */
export const sameSight = (one: Sight, other: Sight): boolean => one.from === other.from && one.to === other.to;

/** The next event after a time (step +1) or before it (−1); null where there is none. Events in order of time. */
export function eventBeside<Event extends { readonly time: number }>(events: readonly Event[], time: number, step: 1 | -1): Event | null {
  return (step > 0 ? events.find((event) => event.time > time) : events.findLast((event) => event.time < time)) ?? null;
}
