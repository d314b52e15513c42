/** Finds what the columns without a telling header are, from their values and their place among the others. */
import { countsUp, looksLikeVolts, medianOf, wanderOf } from './columnProfile.ts';
import type { ColumnProfile } from './columnProfile.ts';
import type { Claim } from './columns.ts';
import type { Role } from './meanings.ts';

const MOSTLY = 0.8;

/** Columns of numbers compared with each other as rest and swing; a hand table has far fewer. */
const MOST_READINGS = 40;

/** A swing back is never wider than the swing before it, one reading step aside. */
const DECAY_ALLOWANCE = 1.05;

export function placeByValues(profiles: readonly ColumnProfile[], claims: readonly Claim[]): void {
  const has = (role: Role): boolean => claims.some((claim) => claim.role === role);
  const set = (index: number, role: Role, code: Claim['code'], seen: string, facts: Claim['facts'] = {}): void => {
    const claim = claims[index];
    if (claim === undefined) throw new RangeError(`propose columns: no column ${index}`);
    Object.assign(claim, { role, code, sure: false, facts: { ...claim.facts, ...facts, seen } });
  };
  const readings: ColumnProfile[] = [];
  for (const profile of profiles) {
    const { index, full, numeric, clock, kind, different, longest } = profile;
    const claim = claims[index];
    if (claim === undefined || claim.role !== null) continue;
    if (full === 0) set(index, 'ignored', 'nothing', 'blank');
    else if (kind >= MOSTLY && !has('kind')) set(index, 'kind', 'values', 'kindWords');
    else if (clock >= MOSTLY && !has('time')) set(index, 'time', 'values', 'clock');
    else if (numeric < 1 - MOSTLY && clock < MOSTLY) {
      const namesEachRow = index === 0 && different === full && longest <= 12 && full > 1;
      if (namesEachRow && !has('label')) set(index, 'label', 'values', 'differentWords');
      else set(index, 'note', 'values', 'text');
    } else if (countsUp(profile) && !has('label')) set(index, 'label', 'values', 'countsUp');
    else if (looksLikeVolts(profile) && !has('voltage') && isAsideFromReadings(profile, profiles, claims)) set(index, 'voltage', 'values', 'voltsBySize');
    else readings.push(profile);
  }
  placeReadings(profiles, claims, readings.slice(0, MOST_READINGS), set);
  for (const [index, claim] of claims.entries()) if (claim.role === null) set(index, 'ignored', 'nothing', 'noSign');
}

/** Volts stand apart from the readings in size: no other number column without a role is as large. */
function isAsideFromReadings(profile: ColumnProfile, profiles: readonly ColumnProfile[], claims: readonly Claim[]): boolean {
  const own = medianOf(profile.numbers) ?? 0;
  return !profiles.some((other) => {
    if (other === profile || claims[other.index]?.role !== null || other.numeric < MOSTLY) return false;
    return Math.abs(medianOf(other.numbers) ?? 0) > own / 3;
  });
}

type SetRole = (index: number, role: Role, code: Claim['code'], seen: string, facts?: Claim['facts']) => void;

/** Weights of place against wander, the latter as a part of the throw: the rest is nearly always written just before the swing. */
const COLUMN_BETWEEN = 0.3;
const RIGHT_OF_SWING = 0.25;

/** How badly one column serves as the rest of another: wanders, lies far, stands right of it. Infinity where it cannot. */
function misfit(rest: ColumnProfile, swing: ColumnProfile): number {
  const throws = rest.numbers.map((x, i) => {
    const y = swing.numbers[i] ?? null;
    return x === null || y === null ? null : y - x;
  });
  const present = throws.filter((x): x is number => x !== null && x !== 0);
  const middle = medianOf(present);
  if (middle === null || middle === 0) return Infinity;
  const sameSide = present.filter((x) => x > 0 === middle > 0).length / present.length;
  if (sameSide < MOSTLY) return Infinity;
  const wander = wanderOf(rest.numbers) / Math.abs(middle);
  if (wander > 1) return Infinity;
  const size = Math.abs(medianOf(rest.numbers) ?? 0) + Math.abs(medianOf(swing.numbers) ?? 0);
  const apart = rest.index < swing.index ? COLUMN_BETWEEN * (swing.index - rest.index - 1) : RIGHT_OF_SWING;
  return wander + Math.abs(middle) / size + apart;
}

function placeReadings(profiles: readonly ColumnProfile[], claims: readonly Claim[], free: readonly ColumnProfile[], set: SetRole): void {
  const holder = (role: Role): ColumnProfile | undefined => profiles.find((p) => claims[p.index]?.role === role);
  let rest = holder('rest');
  let first = holder('firstSwing');
  let left = [...free];
  const wantsRest = rest === undefined;
  const wantsFirst = first === undefined;
  if (wantsRest || wantsFirst) {
    let least = Infinity;
    let pair: readonly [ColumnProfile, ColumnProfile] | null = null;
    for (const a of rest === undefined ? left : [rest]) {
      for (const b of first === undefined ? left : [first]) {
        if (a === b) continue;
        const cost = misfit(a, b);
        if (cost < least) [least, pair] = [cost, [a, b]];
      }
    }
    if (pair !== null) {
      if (wantsRest) set(pair[0].index, 'rest', 'values', 'staysPut');
      if (wantsFirst) set(pair[1].index, 'firstSwing', 'values', 'apartFromRest');
      [rest, first] = pair;
    } else if (wantsFirst) {
      // Too little to compare: the usual order is rest, then first swing.
      const numbers = left.filter((p) => rest === undefined || p.index > rest.index);
      if (wantsRest && numbers.length >= 2 && numbers[0] !== undefined && numbers[1] !== undefined) {
        [rest, first] = numbers;
        set(numbers[0].index, 'rest', 'position', 'usualOrder');
        set(numbers[1].index, 'firstSwing', 'position', 'usualOrder');
      } else if (numbers[0] !== undefined) {
        first = numbers[0];
        set(first.index, 'firstSwing', 'position', rest === undefined ? 'onlyNumbers' : 'usualOrder');
      }
    }
    left = left.filter((p) => p !== rest && p !== first);
  }
  if (rest !== undefined && first !== undefined) placeNextSwings(rest, first, left, set);
}

/** Columns right of the first swing that lie on the other side of the rest, then on the same side, and so on, ever closer to it. */
function placeNextSwings(rest: ColumnProfile, first: ColumnProfile, left: readonly ColumnProfile[], set: SetRole): void {
  const throwOf = (p: ColumnProfile): number =>
    medianOf(p.numbers.map((y, i) => {
      const x = rest.numbers[i] ?? null;
      return x === null || y === null ? null : y - x;
    })) ?? 0;
  let last = throwOf(first);
  for (const profile of left) {
    if (profile.index < first.index) continue;
    const here = throwOf(profile);
    if (here === 0 || here > 0 === last > 0 || Math.abs(here) > DECAY_ALLOWANCE * Math.abs(last)) continue;
    set(profile.index, 'nextSwing', 'values', 'otherSide');
    last = here;
  }
}
