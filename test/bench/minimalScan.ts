/** The least that reads two columns of decimals: no blanks, no exponents, no empty cells, no words, nothing checked. */

const POWER = Float64Array.from({ length: 23 }, (_, k) => Number(`1e${k}`));

/** Whole lines of `bytes` from an index on into t and x, from a row on; the row after the last. */
export function scanRows(bytes: Uint8Array, from: number, t: Float64Array, x: Float64Array, firstRow: number): number {
  let i = from;
  let row = firstRow;
  while (i < bytes.length) {
    for (let column = 0; column < 2; column += 1) {
      let b = bytes[i]!;
      const negative = b === 45;
      if (negative) b = bytes[++i]!;
      let value = 0;
      let point = -1;
      while (b !== 44 && b !== 10) {
        if (b === 46) point = i;
        else value = value * 10 + (b - 48);
        b = bytes[++i]!;
      }
      if (point >= 0) value /= POWER[i - point - 1]!;
      (column === 0 ? t : x)[row] = negative ? -value : value;
      i += 1;
    }
    row += 1;
  }
  return row;
}

export function totalOf(t: ArrayLike<number>, x: ArrayLike<number>, rows: number): number {
  let sum = 0;
  for (let i = 0; i < rows; i += 1) sum += t[i]! + x[i]!;
  return sum;
}
