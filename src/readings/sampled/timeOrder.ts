/** Rows of a record in the order of their times: those without a number, repeated ones and ones out of order left out. */

export interface Ordered {
  /** Rows that are kept; null: all. */
  readonly rows: Int32Array | null;
  readonly withoutNumber: number;
  readonly repeated: number;
  readonly backward: number;
  /** Times that the clock began again, not by a few rows. */
  readonly restarts: number;
  /** First row of each kind, −1 for none. */
  readonly firstWithout: number;
  readonly firstRepeated: number;
  readonly firstBackward: number;
}

/** So many stamps may be wrong at one place; more is a clock that began again. */
const FEW = 3;

/** @param wanted columns that must have a number */
export function inOrder(times: Float64Array, wanted: readonly Float64Array[]): Ordered {
  const none = { withoutNumber: 0, repeated: 0, backward: 0, restarts: 0, firstWithout: -1, firstRepeated: -1, firstBackward: -1 };
  if (wanted.length === 0 && rises(times)) return { rows: null, ...none };
  const kept = new Int32Array(times.length);
  let [count, begins, longest, longestCount] = [0, 0, 0, 0];
  const found = { ...none };
  const usable = (row: number): boolean => !Number.isNaN(times[row]!) && wanted.every((values) => !Number.isNaN(values[row]!));

  /** One of the next few rows goes on after the last one: this one is out of order. */
  function goesOn(row: number, last: number): boolean {
    let seen = 0;
    for (let next = row + 1; next < times.length && seen < FEW; next += 1) {
      if (!usable(next)) continue;
      if (times[next]! > last) return true;
      seen += 1;
    }
    return false;
  }

  /** Rows kept last that are later than this one, where they are few. */
  function wrongBefore(time: number): number {
    for (let back = 1; back <= FEW && count - back > begins; back += 1) if (times[kept[count - 1 - back]!]! < time) return back;
    return 0;
  }

  for (let row = 0; row < times.length; row += 1) {
    if (!usable(row)) {
      found.withoutNumber += 1;
      if (found.firstWithout < 0) found.firstWithout = row;
      continue;
    }
    const time = times[row]!;
    const last = count > begins ? times[kept[count - 1]!]! : -Infinity;
    if (time === last) {
      found.repeated += 1;
      if (found.firstRepeated < 0) found.firstRepeated = row;
      continue;
    }
    if (time < last) {
      if (found.firstBackward < 0) found.firstBackward = row;
      if (goesOn(row, last)) {
        found.backward += 1;
        continue;
      }
      const wrong = wrongBefore(time);
      if (wrong > 0) {
        count -= wrong;
        found.backward += wrong;
      } else {
        if (count - begins > longestCount) [longest, longestCount] = [begins, count - begins];
        begins = count;
        found.restarts += 1;
      }
    }
    kept[count] = row;
    count += 1;
  }
  if (count - begins > longestCount) [longest, longestCount] = [begins, count - begins];
  found.backward += count - longestCount;
  const all = longestCount === times.length;
  return { rows: all ? null : kept.slice(longest, longest + longestCount), ...found };
}

function rises(times: Float64Array): boolean {
  let last = -Infinity;
  for (let row = 0; row < times.length; row += 1) {
    // False for NaN, too.
    if (!(times[row]! > last)) return false;
    last = times[row]!;
  }
  return true;
}
