/** One result beside another, or beside what it was calibrated with: differences, ends of an interval, place in the taps' range. */
import type { RecordResult, Result, Stated } from './results.ts';

/** Lower and upper end of the 95 % interval, value ∓ U. */
export function ends({ value, U }: Result): readonly [number, number] {
  return [value - U, value + U];
}

export interface Beside {
  /** (other − one)/one, or null where one is 0. */
  readonly relative: number | null;
  /** (other − one)/u(one), or null where u is 0. */
  readonly inU: number | null;
}

/** How far another value of the same quantity lies from this one, relative and in standard uncertainties of this one. */
export function beside(one: Stated, other: Stated): Beside {
  const away = other.value - one.value;
  return { relative: one.value === 0 ? null : away / one.value, inU: one.u === 0 ? null : away / one.u };
}

/** The counting shot whose two forms part the most, in its standard uncertainties; null without one. */
export function widestFormGap(records: readonly RecordResult[]): { readonly record: RecordResult; readonly inU: number } | null {
  let widest: { record: RecordResult; inU: number } | null = null;
  for (const record of records) {
    const { full, smallAngle, kind, setAside } = record;
    if (kind !== 'shot' || setAside !== null || full === null || smallAngle === null) continue;
    const { inU } = beside(full, smallAngle);
    if (inU !== null && (widest === null || Math.abs(inU) > Math.abs(widest.inU))) widest = { record, inU };
  }
  return widest;
}

/** Where the shots' first swings lie in the range that the taps cover. */
export interface TapRange {
  readonly where: 'inside' | 'edge' | 'beyond';
  /** Smallest shot below the smallest tap, relative to that tap; 0 where it is not. */
  readonly below: number;
  /** Largest shot above the largest tap, relative to that tap; 0 where it is not. */
  readonly above: number;
}

/** A shot this near to an end of the taps' range, as a part of the range, is at its edge. */
const EDGE = 0.05;

/** null where there are no taps or no shots. Ranges are of φ, rad. */
export function placeInTapRange(
  taps: readonly [number, number] | null,
  shots: readonly [number, number] | null,
): TapRange | null {
  if (taps === null || shots === null) return null;
  const [tapLow, tapHigh] = taps;
  const [shotLow, shotHigh] = shots;
  const below = shotLow < tapLow ? (tapLow - shotLow) / tapLow : 0;
  const above = shotHigh > tapHigh ? (shotHigh - tapHigh) / tapHigh : 0;
  if (below > 0 || above > 0) return { where: 'beyond', below, above };
  const edge = EDGE * (tapHigh - tapLow);
  const isNear = shotLow - tapLow < edge || tapHigh - shotHigh < edge;
  return { where: isNear ? 'edge' : 'inside', below, above };
}
