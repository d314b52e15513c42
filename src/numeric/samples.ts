/** Mean, standard deviation and median of a sample. */

function check(what: string, values: readonly number[], least: number): void {
  if (values.length < least) throw new RangeError(`${what}: ${values.length} values, at least ${least} are needed`);
  if (!values.every(Number.isFinite)) throw new RangeError(`${what}: a value is not finite`);
}

/**
 * Arithmetic mean; a second pass takes off the rounding of the first.
 *
 * Valid: at least one value.
 * @throws RangeError when there is none or one is not finite
 */
export function mean(values: readonly number[]): number {
  check('mean', values, 1);
  const n = values.length;
  const first = values.reduce((sum, value) => sum + value, 0) / n;
  return first + values.reduce((sum, value) => sum + (value - first), 0) / n;
}

/**
 * Sample standard deviation: s = √[Σ(x − x̄)²/(n − 1)], two passes with the mean's rounding corrected.
 *
 * Valid: at least two values.
 * Source: Chan, Golub & LeVeque, The American Statistician 37 (1983) 242, corrected two-pass algorithm (from memory).
 * @throws RangeError when there are fewer or one is not finite
 */
export function sampleStandardDeviation(values: readonly number[]): number {
  check('sampleStandardDeviation', values, 2);
  const n = values.length;
  const centre = mean(values);
  let squares = 0;
  let drift = 0;
  for (const value of values) {
    squares += (value - centre) ** 2;
    drift += value - centre;
  }
  return Math.sqrt(Math.max(0, squares - (drift * drift) / n) / (n - 1));
}

/**
 * Median: the middle value, or the mean of the two middle ones.
 *
 * Valid: at least one value.
 * @throws RangeError when there is none or one is not finite
 */
export function median(values: readonly number[]): number {
  check('median', values, 1);
  const sorted = [...values].sort((a, b) => a - b);
  const upper = Math.floor(sorted.length / 2);
  return sorted.length % 2 === 1 ? sorted[upper]! : sorted[upper - 1]! + (sorted[upper]! - sorted[upper - 1]!) / 2;
}

/** Least and greatest; NaN are passed over; (∞, −∞) of none. */
export function extentOf(x: Float64Array): readonly [number, number] {
  let low = Infinity;
  let high = -Infinity;
  // An iterator over millions takes several times as long.
  for (let i = 0; i < x.length; i++) {
    const value = x[i]!;
    if (value < low) low = value;
    if (value > high) high = value;
  }
  return [low, high];
}
