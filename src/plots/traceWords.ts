/** How pictures of a sampled trace name its shots, its times and what is left out of it. */
import type { RecordKind } from '../readings/meanings.ts';
import type { Stretch, TraceEventTold, TraceTold } from '../reduction/traceResults.ts';
import { chooseUnit, withPlusMinus } from '../units/format.ts';
import type { Unit } from '../units/units.ts';
import { KIND_WORDS } from './recordWords.ts';

/** Half-width shown for an expanded uncertainty, in u. */
export const K_OF_BARS = 2;
const MOST_DECIMALS = 9;

/** Decimals of a time in s that show a tenth of the spacing of the samples. */
function decimalsOf(spacing: number): number {
  return spacing > 0 && Number.isFinite(spacing) ? Math.max(1, Math.min(MOST_DECIMALS, Math.ceil(-Math.log10(spacing)) + 1)) : 3;
}

/** A time rounded to a tenth of the spacing or finer, s. */
export const roundedTime = (t: number, spacing: number): number => Number(t.toFixed(decimalsOf(spacing)));

/** "12.345"; as it stands in a field. */
export const timeDigits = (t: number, spacing: number): string => t.toFixed(decimalsOf(spacing));

/** "12.345 s". */
export const timeWords = (t: number, spacing: number): string => `${timeDigits(t, spacing).replace('-', '−')} s`;

/** "Shot 3": each kind counted in order of time. */
export function eventNames(events: readonly Pick<TraceEventTold, 'id' | 'kind' | 'time'>[]): ReadonlyMap<string, string> {
  const counts = new Map<RecordKind, number>();
  return new Map(events.toSorted((a, b) => a.time - b.time).map(({ id, kind }) => {
    const count = (counts.get(kind) ?? 0) + 1;
    counts.set(kind, count);
    return [id, `${KIND_WORDS[kind]} ${count}`];
  }));
}

export const WHY_WORDS: Readonly<Record<Stretch['why'], string>> = {
  gap: 'no samples', clipped: 'at the end of the sensor’s range', spike: 'spikes', blanked: 'left out after a shot', marked: 'marked as bad', train: 'a train of pulses',
};

export const WHYS: readonly Stretch['why'][] = ['gap', 'clipped', 'spike', 'blanked', 'marked', 'train'];

/** Reasons that occur, each with how often. */
export function countedWhys(stretches: readonly Stretch[]): readonly { readonly why: Stretch['why']; readonly count: number }[] {
  return WHYS.map((why) => ({ why, count: stretches.filter((stretch) => stretch.why === why).length })).filter(({ count }) => count > 0);
}

/** "throw 12.31 ± 0.20 mm (2u)", or why there is none. */
export function throwWords({ jump }: Pick<TraceEventTold, 'jump'>, unit: Unit): string {
  return jump === null ? 'no throw could be had' : `throw ${withPlusMinus(jump.value, K_OF_BARS * jump.u, unit)} (2u)`;
}

/** The unit that the throws of a trace are shown in; before there are any, that of its readings from end to end. */
export function throwUnit({ events, dimension }: Pick<TraceTold, 'events' | 'dimension'>, span: number): Unit {
  const throws = events.flatMap(({ jump, kind }) => (jump === null || kind === 'blank' ? [] : [jump.value]));
  return chooseUnit(throws.length > 0 ? throws : [span], dimension);
}
