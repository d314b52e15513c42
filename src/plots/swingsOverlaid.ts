/** Swings of taps and of shots laid over one another, each without the swing that was there before and over its own throw. */
import type { TracePicture } from '../numeric/minMaxPyramid.ts';
import type { TraceTold } from '../reduction/traceResults.ts';
import { swungOn } from '../traces/pickPeak.ts';
import { swingOver } from '../traces/swingModel.ts';
import { axis, frame, roomFor } from './axes.ts';
import type { Figure, Inks } from './figure.ts';
import { zeroLine } from './lines.ts';
import { samplesBetween } from './oneSwing.ts';
import { eventNames } from './traceWords.ts';

const HEIGHT = 240;
const PERIODS = 2.2;
/** Swings of each kind that are laid over one another. */
const MOST_OF_A_KIND = 4;
const POINTS = 240;
/** A throw of fewer u than this is no swing to compare. */
const CLEAR = 10;

export interface TraceSeen {
  readonly told: TraceTold;
  readonly picture: TracePicture;
}

interface Response {
  readonly name: string;
  readonly kind: 'tap' | 'shot';
  /** Over the throw, at even times after the strike; null where no sample is. */
  readonly values: readonly (number | null)[];
}

function responsesOf({ told, picture }: TraceSeen, kind: 'tap' | 'shot', grid: readonly number[], several: boolean): readonly Response[] {
  const { fitted, events, to, stretches } = told;
  const leftOut = stretches.filter(({ why }) => why !== 'gap');
  if (fitted === null) return [];
  const names = eventNames(events);
  const ordered = events.toSorted((a, b) => a.time - b.time);
  const step = grid[1]! - grid[0]!;
  return ordered.flatMap((event, k): readonly Response[] => {
    if (event.kind !== kind || event.jump === null || Math.abs(event.jump.value) < CLEAR * event.jump.u) return [];
    const before = swungOn(fitted.model, event.time);
    const until = Math.min(to, ordered[k + 1]?.time ?? Infinity, event.time + grid.at(-1)!);
    if (before === null || until - event.time < grid.at(-1)! / 4) return [];
    const { times, values } = samplesBetween(picture, event.time, until, 20_000);
    const fit = swingOver(fitted.model, times);
    const gridTimes = Float64Array.from(grid, (s) => event.time + s);
    const [withIt, went] = [swingOver(fitted.model, gridTimes), swingOver(before, gridTimes)];
    // What the fit leaves is averaged about each grid time, and put upon the fit there: no sample is at another time than its own.
    const near = leftOut.filter(({ from, to: end }) => end >= event.time && from <= until);
    const sums = grid.map(() => ({ sum: 0, count: 0 }));
    times.forEach((t, i) => {
      const place = sums[Math.round((t - event.time) / step)];
      if (!place || t < event.time || t >= until || Number.isNaN(values[i]!) || near.some(({ from, to: end }) => t >= from && t <= end)) return;
      place.sum += values[i]! - fit[i]!;
      place.count += 1;
    });
    return [{ kind, name: `${several ? `${told.name}: ` : ''}${names.get(event.id) ?? event.id}`, values: sums.map(({ sum, count }, i) => (count === 0 ? null : (sum / count + withIt[i]! - went[i]!) / event.jump!.value)) }];
  });
}

/** Evenly some, the first and the last among them. */
function some<One>(all: readonly One[]): readonly One[] {
  if (all.length <= MOST_OF_A_KIND) return all;
  return Array.from({ length: MOST_OF_A_KIND }, (_, i) => all[Math.round((i * (all.length - 1)) / (MOST_OF_A_KIND - 1))]!);
}

/** Largest distance of the mean tap from the mean shot, over the throw. */
function apart(taps: readonly Response[], shots: readonly Response[]): number {
  const mean = (of: readonly Response[], i: number): number | null => {
    const there = of.map(({ values }) => values[i]).filter((value): value is number => value != null);
    return there.length === 0 ? null : there.reduce((a, b) => a + b, 0) / there.length;
  };
  let most = 0;
  for (let i = 0; i < POINTS; i++) {
    const [one, other] = [mean(taps, i), mean(shots, i)];
    if (one !== null && other !== null) most = Math.max(most, Math.abs(one - other));
  }
  return most;
}

/** null without at least one tap and one shot whose swings stand clear of the noise. */
export function swingsOverlaid(seen: readonly TraceSeen[], inks: Inks): Figure | null {
  const periods = seen.flatMap(({ told: { fitted } }) => (fitted === null ? [] : [fitted.period.value]));
  if (periods.length === 0) return null;
  const long = PERIODS * Math.max(...periods);
  const grid = Array.from({ length: POINTS }, (_, i) => (long * i) / (POINTS - 1));
  const of = (kind: 'tap' | 'shot'): readonly Response[] => some(seen.flatMap((one) => responsesOf(one, kind, grid, seen.length > 1)));
  const [taps, shots] = [of('tap'), of('shot')];
  if (taps.length === 0 || shots.length === 0) return null;
  const all = [...shots, ...taps];
  const most = apart(taps, shots);
  return {
    title: 'Swings of taps laid over those of shots',
    summary: `Each swing over its own throw, what was swinging before taken off: ${shots.length} of shots (whole lines), ${taps.length} of taps (dashed). Their means are at most ${(100 * most).toFixed(most < 0.1 ? 1 : 0)} % of the throw apart. They lie on one another where the pendulum answers a tap as it answers a shot; a shifted crossing is another period, a lower second swing another damping, a late first maximum a longer push.`,
    marks: [], nearest: 'x',
    columns: [grid, ...all.map(({ values }) => [...values])],
    options: {
      ...frame({ low: 0, high: long }, roomFor(all.flatMap(({ values }) => values.filter((value): value is number => value !== null))), HEIGHT),
      axes: [axis({ label: 'Time after the strike  (s)', side: 'bottom' }, inks), axis({ label: 'Reading over the throw', side: 'left' }, inks)],
      series: [{}, ...all.map(({ name, kind }) => ({ label: name, stroke: kind === 'tap' ? inks.tap : inks.shot, width: kind === 'tap' ? 1.75 : 1.25, spanGaps: true, points: { show: false }, ...(kind === 'tap' ? { dash: [6, 4] } : {}) }))],
      hooks: { drawAxes: [(u) => zeroLine(u, inks)] },
    },
    table: {
      head: ['Time after the strike (s)', ...all.map(({ name }) => name)],
      rows: grid.map((t, i) => ({ id: String(i), cells: [t.toFixed(4), ...all.map(({ values }) => values[i]?.toFixed(4).replace('-', '−') ?? '—')] })),
    },
  };
}
