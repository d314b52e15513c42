/** The clock of a list against the clock of a record: the shift that brings the listed times on to those found in the swing. */

export type ClockOffset =
  | {
    readonly status: 'found';
    /** s, to be added to the listed times. */
    readonly offset: number;
    /** Standard uncertainty of it, from the scatter of the pairs. */
    readonly u: number;
    /** Listed times that have a found one beside them. */
    readonly matched: number;
    /** Rate of the record's clock against the list's, less 1, and its u; null for fewer than three pairs. */
    readonly drift: { readonly value: number; readonly u: number } | null;
  }
  /** Another shift fits about as well: evenly spaced shots, or too few. */
  | { readonly status: 'ambiguous'; readonly offsets: readonly number[]; readonly matched: number }
  | { readonly status: 'none' };

/** A second shift with at least this part of the best one's pairs leaves the choice open. */
const AS_GOOD = 0.85;

/**
 * Offset by counting, for every difference between a found and a listed time, how many pairs it brings within `tolerance`.
 *
 * Valid: times in order; tolerance > 0, s: more than the scatter of the found times, less than half of their spacing.
 * Source: cross-matching of two point patterns by their differences, derived.
 */
export function clockOffset(listed: readonly number[], found: readonly number[], tolerance: number): ClockOffset {
  const differences = listed.flatMap((a) => found.map((b) => b - a)).sort((a, b) => a - b);
  if (differences.length === 0) return { status: 'none' };
  const candidates = new Map<number, { readonly offset: number; readonly pairs: readonly (readonly [number, number])[] }>();
  for (const difference of thinned(differences, tolerance)) {
    const pairs = pairsAt(listed, found, difference, tolerance);
    if (pairs.length === 0) continue;
    const offset = middleOf(pairs.map(([a, b]) => b - a));
    const key = Math.round(offset / tolerance);
    const known = candidates.get(key);
    if (!known || known.pairs.length < pairs.length) candidates.set(key, { offset, pairs });
  }
  const ranked = [...candidates.values()].sort((a, b) => b.pairs.length - a.pairs.length);
  const [best] = ranked;
  if (!best || best.pairs.length < Math.min(2, listed.length)) return { status: 'none' };
  const rivals = ranked.filter((one) => one !== best && Math.abs(one.offset - best.offset) > 2 * tolerance && one.pairs.length >= AS_GOOD * best.pairs.length);
  if (rivals.length > 0) return { status: 'ambiguous', offsets: [best, ...rivals].map(({ offset }) => offset), matched: best.pairs.length };
  const n = best.pairs.length;
  const mean = best.pairs.reduce((sum, [a, b]) => sum + b - a, 0) / n;
  const scatter = n > 1 ? Math.sqrt(best.pairs.reduce((sum, [a, b]) => sum + (b - a - mean) ** 2, 0) / (n - 1)) : tolerance;
  return { status: 'found', offset: mean, u: scatter / Math.sqrt(n), matched: n, drift: driftOf(best.pairs) };
}

/** Differences no closer than half a tolerance: one stands for those about it. */
function thinned(sorted: readonly number[], tolerance: number): readonly number[] {
  const kept: number[] = [];
  for (const value of sorted) if (kept.length === 0 || value - kept.at(-1)! > tolerance / 2) kept.push(value);
  return kept;
}

/** Each listed time with the nearest found one within the tolerance, none used twice. */
function pairsAt(listed: readonly number[], found: readonly number[], offset: number, tolerance: number): readonly (readonly [number, number])[] {
  const pairs: (readonly [number, number])[] = [];
  let from = 0;
  for (const time of listed) {
    while (from < found.length && found[from]! < time + offset - tolerance) from += 1;
    let best = -1;
    for (let i = from; i < found.length && found[i]! <= time + offset + tolerance; i++) if (best < 0 || Math.abs(found[i]! - time - offset) < Math.abs(found[best]! - time - offset)) best = i;
    if (best < 0) continue;
    pairs.push([time, found[best]!]);
    from = best + 1;
  }
  return pairs;
}

const middleOf = (values: readonly number[]): number => values.toSorted((a, b) => a - b)[values.length >> 1]!;

/** Slope of found against listed times, less 1. */
function driftOf(pairs: readonly (readonly [number, number])[]): { readonly value: number; readonly u: number } | null {
  const n = pairs.length;
  if (n < 3) return null;
  const [ma, md] = [pairs.reduce((sum, [a]) => sum + a, 0) / n, pairs.reduce((sum, [a, b]) => sum + b - a, 0) / n];
  const sxx = pairs.reduce((sum, [a]) => sum + (a - ma) ** 2, 0);
  if (!(sxx > 0)) return null;
  const slope = pairs.reduce((sum, [a, b]) => sum + (a - ma) * (b - a - md), 0) / sxx;
  const left = pairs.reduce((sum, [a, b]) => sum + (b - a - md - slope * (a - ma)) ** 2, 0);
  return { value: slope, u: Math.sqrt(left / (n - 2) / sxx) };
}
