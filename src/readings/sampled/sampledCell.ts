/** One cell of a sampled record: a number, a time of day, a mark for no number, or a word. */
import { readNumber, type DecimalMark } from '../../units/quantity.ts';
import { secondsOfClock } from '../cellReads.ts';
import { isNoReading, looksClock } from '../cells.ts';

/** empty: nothing there, or a mark for no number (NaN, inf, n/a) · word: anything else. */
export type CellKind = 'number' | 'clock' | 'empty' | 'word';

export interface SampledCell {
  kind: CellKind;
  /** clock: s since midnight, or since 1970-01-01 with a date. NaN where there is no number. */
  value: number;
}

/** D is the exponent of old Fortran programs. */
const PLAIN: Readonly<Record<DecimalMark, RegExp>> = {
  '.': /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eEdD][+-]?\d+)?$/,
  ',': /^[+-]?(?:\d+,?\d*|,\d+)(?:[eEdD][+-]?\d+)?$/,
};

/** What programs print for a number that is none. */
const NOT_FINITE = /^[+-]?(?:(?:s|q)?nan(?:\s?\(.*\))?|inf(?:inity)?|∞|1?[.,]?#(?:inf|ind|qnan|snan)\d*|#(?:num!|n\/a|value!|div\/0!))$/i;

const LONGEST = 64;

/**
 * Reads a trimmed cell into `into`. A number beyond the range of doubles is taken as none; −0 is 0.
 *
 * Valid: digits with at most one decimal mark and an exponent (E or D); otherwise what readNumber takes (thousands in groups, signs of other scripts).
 */
export function readSampledCell(text: string, decimal: DecimalMark, into: SampledCell): void {
  into.value = Number.NaN;
  if (text === '') {
    into.kind = 'empty';
    return;
  }
  if (PLAIN[decimal].test(text)) {
    const pointed = decimal === ',' ? text.replace(',', '.') : text;
    let value = Number(pointed) + 0;
    if (Number.isNaN(value)) value = Number(pointed.replace(/[dD]/, 'e')) + 0;
    into.kind = Number.isFinite(value) ? 'number' : 'empty';
    if (into.kind === 'number') into.value = value;
    return;
  }
  if (text.length <= LONGEST) {
    if (NOT_FINITE.test(text) || isNoReading(text)) {
      into.kind = 'empty';
      return;
    }
    if (/\d/.test(text)) {
      const clock = looksClock(text);
      const value = clock ? secondsOfClock(text) : readNumber(text, decimal);
      if (value !== null) {
        into.kind = clock ? 'clock' : 'number';
        into.value = value;
        return;
      }
    }
  }
  into.kind = 'word';
}
