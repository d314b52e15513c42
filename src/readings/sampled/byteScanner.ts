/** Plain lines of numbers straight from bytes to arrays; whatever is no plain number goes through the same reader of cells as quoted files do. */
import { asciiText, textOf } from './encodedText.ts';
import { cellsOfLine, type SampledRows } from './sampledRows.ts';

/** Powers of ten that are exact in a double. */
const POWER = Float64Array.from({ length: 23 }, (_, k) => Number(`1e${k}`));
const GREATEST_POWER = 22;

/** Whole numbers below are exact, and so was every step to them. */
const EXACT = 2 ** 53;

const [TAB, LINE_FEED, RETURN, SPACE, QUOTE, PLUS, MINUS, ZERO, EXPONENT] = [9, 10, 13, 32, 34, 43, 45, 48, 101];

/** Lower case of an ASCII letter. */
const LOWER = 32;

/** Most characters of an exponent that are gone through; more is left to Number(). */
const LONGEST_EXPONENT = 4;

/**
 * Reads the lines of `bytes` in [from, to), which must begin a line and end one.
 *
 * A number is digits × or ÷ a power of ten up to 10²², both exact, so that the quotient is correctly rounded; other cells go to Number().
 * Source: W. D. Clinger, How to read floating point numbers accurately, PLDI 1990, the case of short numbers (from memory).
 *
 * @returns `to`, or where the line begins that holds a quotation mark: it and what follows are to be cut by their quotes
 */
export function scanLines(rows: SampledRows, bytes: Uint8Array, from: number, to: number): number {
  const { usual, columns, encoding, delimiter: delimiterText, newline: newlineText, decimal: decimalText } = rows.dialect;
  const [delimiter, newline, decimal] = [delimiterText.charCodeAt(0), newlineText.charCodeAt(0), decimalText.charCodeAt(0)];
  const spaced = delimiter === SPACE;
  // A tab is white where it parts no cells; a return is white where lines end with line feeds.
  const tab = delimiter === TAB ? SPACE : TAB;
  const back = newline === LINE_FEED ? RETURN : SPACE;
  const { buffers, missing, clocks } = rows;
  const oddColumns = new Int32Array(usual);
  const oddKinds: ('clock' | 'empty' | 'word')[] = [];
  let i = from;

  while (i < to) {
    const begin = i;
    if (!rows.makeRoom()) return to;
    const row = rows.rows;
    let column = 0;
    let odd = 0;
    let numbers = 0;
    let whole = true;
    for (;;) {
      let b = bytes[i]!;
      while (b === SPACE || b === tab || b === back) b = bytes[++i]!;
      // Blanks at the end of a line parted by blanks begin no cell.
      if (spaced && b === newline && column > 0) break;
      if (column === usual) {
        whole = false;
        break;
      }
      const cell = i;
      const negative = b === MINUS;
      if (negative || b === PLUS) b = bytes[++i]!;
      const digits = i;
      let value = 0;
      let digit = b - ZERO;
      while (digit >= 0 && digit <= 9) {
        value = value * 10 + digit;
        b = bytes[++i]!;
        digit = b - ZERO;
      }
      let count = i - digits;
      let power = 0;
      if (b === decimal) {
        b = bytes[++i]!;
        const fraction = i;
        digit = b - ZERO;
        while (digit >= 0 && digit <= 9) {
          value = value * 10 + digit;
          b = bytes[++i]!;
          digit = b - ZERO;
        }
        power = fraction - i;
        count += i - fraction;
      }
      if ((b | LOWER) === EXPONENT && count > 0) {
        b = bytes[++i]!;
        const down = b === MINUS;
        if (down || b === PLUS) b = bytes[++i]!;
        const start = i;
        let exponent = 0;
        digit = b - ZERO;
        while (digit >= 0 && digit <= 9 && i - start < LONGEST_EXPONENT) {
          exponent = exponent * 10 + digit;
          b = bytes[++i]!;
          digit = b - ZERO;
        }
        if (i === start) count = 0;
        power += down ? -exponent : exponent;
      }
      const end = i;
      while (b === SPACE || b === tab || b === back) b = bytes[++i]!;
      if (count > 0 && value < EXACT && power <= GREATEST_POWER && power >= -GREATEST_POWER && (b === delimiter || b === newline || (spaced && i > end))) {
        if (power < 0) value /= POWER[-power]!;
        else if (power > 0) value *= POWER[power]!;
        let buffer = buffers[column]!;
        if (buffer.length === 0) buffer = rows.open(column);
        // From 0, so that −0 is 0.
        buffer[row] = negative ? 0 - value : value;
        numbers += 1;
      } else {
        i = cell;
        b = bytes[i]!;
        let highest = 0;
        while (b !== newline && b !== delimiter && !(spaced && (b === tab || b === back))) {
          if (b === QUOTE) return begin;
          if (b > highest) highest = b;
          b = bytes[++i]!;
        }
        // A comment may be told by its first cell alone.
        if (column === 0 && i > cell && (bytes[cell]! === 35 || bytes[cell]! === 37 || bytes[cell]! === 47)) {
          whole = false;
          break;
        }
        const { kind, value: found } = rows.read(highest < 0x80 ? asciiText(bytes, cell, i) : textOf(bytes.subarray(cell, i), encoding));
        let buffer = buffers[column]!;
        if (kind === 'number' || kind === 'clock') {
          if (buffer.length === 0) buffer = rows.open(column);
          numbers += 1;
        }
        if (buffer.length > 0) buffer[row] = found;
        if (kind !== 'number') {
          oddColumns[odd] = column;
          oddKinds[odd] = kind;
          odd += 1;
        }
        if (spaced) while (b === SPACE || b === tab || b === back) b = bytes[++i]!;
      }
      column += 1;
      if (b === newline) break;
      if (!spaced) i += 1;
    }
    if (whole && column === usual && numbers > 0) {
      i += 1;
      if (odd > 0) {
        let lacks = 0;
        for (let k = 0; k < odd; k += 1) {
          const c = oddColumns[k]!;
          if (oddKinds[k] === 'clock') clocks[c] = clocks[c]! + 1;
          else missing[c] = missing[c]! + 1;
          if (oddKinds[k] === 'word') lacks |= 1 << Math.min(c, 30);
        }
        const stop = i - 1;
        if (lacks !== 0) rows.tell(lacks, rows.line, () => cellsOfLine(textOf(bytes.subarray(begin, stop), encoding), delimiterText));
      }
      // A column that few rows have was opened by one of them.
      for (let c = usual; c < columns; c += 1) {
        missing[c] = missing[c]! + 1;
        if (buffers[c]!.length > 0) buffers[c]![row] = Number.NaN;
      }
      rows.rows += 1;
      rows.line += 1;
      rows.emptyTail = 0;
    } else {
      const stop = bytes.indexOf(newline, i);
      const line = bytes.subarray(begin, stop);
      if (line.includes(QUOTE)) return begin;
      rows.take(cellsOfLine(textOf(line, encoding), delimiterText));
      i = stop + 1;
    }
  }
  return to;
}
