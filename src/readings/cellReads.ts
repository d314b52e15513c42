/** One cell to a quantity in SI, by what its column means. */
import { readQuantity } from '../units/quantity.ts';
import type { DecimalMark, QuantityRead } from '../units/quantity.ts';
import { toSi, unitNamed } from '../units/units.ts';
import type { Dimension, Unit } from '../units/units.ts';
import type { ProblemCode } from '../problems/problems.ts';
import { isNoReading, looksClock } from './cells.ts';
import { ROLE_DIMENSIONS, USUAL_UNIT } from './columns.ts';
import type { ColumnMeaning } from './meanings.ts';

export interface CellRead {
  /** SI. Readings: m or rad. Clock times: seconds since midnight; dates with a time: seconds since 1970-01-01. */
  readonly value: number;
  /** SI, as typed after ± or in brackets, not interpreted; null where there is none. */
  readonly spread: number | null;
  /** Decimals as typed, in `unit`. */
  readonly decimals: number;
  /** Unit symbol of the number as written: the cell's own unit, else the column's. */
  readonly unit: string;
  /** The cell's text, spaces around it left out. */
  readonly text: string;
}

export type CellResult = CellRead | { readonly code: ProblemCode; readonly found: string };

export interface ColumnUnit {
  readonly dimension: Dimension;
  readonly unit: Unit;
}

/** A meaning is asked for its unit at every cell of its column, and never changes. */
const UNITS = new WeakMap<ColumnMeaning, ColumnUnit>();

/** Unit and dimension in which a column's numbers are read; the role's usual unit where the meaning names none that fits, null where the role has none. */
export function unitOfColumn(meaning: ColumnMeaning): ColumnUnit | null {
  const before = UNITS.get(meaning);
  if (before !== undefined) return before;
  const dimensions = ROLE_DIMENSIONS[meaning.role];
  const [usual] = dimensions;
  if (usual === undefined) return null;
  const fitting = (text: string): ColumnUnit[] =>
    dimensions.flatMap((dimension) => {
      const unit = text === '' ? null : unitNamed(text, dimension);
      return unit === null ? [] : [{ dimension, unit }];
    });
  const named = fitting(meaning.unit);
  // ″ is also an inch, so the dimension that shows the very symbol goes first.
  const found = named.find(({ unit }) => unit.symbol === meaning.unit) ?? named[0] ?? fitting(USUAL_UNIT[meaning.role])[0];
  if (found === undefined) throw new RangeError(`unit of a column: ${meaning.role} has no usual unit`);
  UNITS.set(meaning, found);
  return found;
}

const CODE_OF_FAULT: Readonly<Record<Exclude<QuantityRead, { ok: true }>['fault'], ProblemCode>> = {
  empty: 'cell-empty',
  notANumber: 'cell-not-a-number',
  unknownUnit: 'cell-unknown-unit',
  wrongDimension: 'cell-wrong-kind-of-unit',
  badSpread: 'cell-not-a-number',
};

/** SI. A number beyond this is a slip of the keyboard, and its square would leave the range of numbers. */
const GREATEST = 1e12;

/** A number with nothing beside it, as nearly all cells are: the same as readQuantity gives, and far faster. */
const PLAIN: Readonly<Record<DecimalMark, RegExp>> = { '.': /^-?\d{1,15}(?:\.(\d{1,15}))?$/, ',': /^-?\d{1,15}(?:,(\d{1,15}))?$/ };

/**
 * A cell as a quantity; null where it holds no reading.
 *
 * @param decimal decimal mark of the table; for a cell typed by hand in the tool, which may have either mark, `typed` is true
 */
export function readCell(raw: string, meaning: ColumnMeaning, decimal: DecimalMark, typed: boolean): CellResult | null {
  const text = raw.trim();
  const column = unitOfColumn(meaning);
  if (column === null || isNoReading(text)) return null;
  if (meaning.role === 'time' && looksClock(text)) {
    const value = secondsOfClock(text);
    return value === null ? { code: 'cell-not-a-number', found: text } : { value, spread: null, decimals: 0, unit: 's', text };
  }
  const { unit, dimension } = column;
  const plain = typed ? null : PLAIN[decimal].exec(text);
  if (plain !== null) {
    const value = toSi(Number(decimal === ',' ? text.replace(',', '.') : text), unit);
    if (Math.abs(value) > GREATEST) return { code: 'cell-not-a-number', found: text };
    return { value: value === 0 ? 0 : value, spread: null, decimals: (plain[1] ?? '').length, unit: unit.symbol, text };
  }
  let read = readQuantity(text, dimension, unit.symbol, typed ? undefined : decimal);
  if (read.ok && read.ambiguousComma) read = readQuantity(text, dimension, unit.symbol, decimal);
  if (!read.ok) return { code: CODE_OF_FAULT[read.fault], found: read.found === '' ? text : read.found };
  if (Math.abs(read.value) > GREATEST || (read.spread ?? 0) > GREATEST) return { code: 'cell-not-a-number', found: text };
  return { value: read.value, spread: read.spread, decimals: read.decimals, unit: read.unit.symbol, text };
}

const CLOCK = /^(\d{1,2}):(\d{2})(?::(\d{2}(?:[.,]\d+)?))?(?:\s?([aApP])\.?[mM]\.?)?$/;

/** Seconds since midnight of a clock time, or since 1970-01-01T00:00:00Z of an ISO 8601 date (without a zone: as if UTC); null where there is no such time. */
export function secondsOfClock(text: string): number | null {
  const [whole, h = '', m = '', s = '0', half = ''] = CLOCK.exec(text) ?? [];
  if (whole !== undefined) {
    const seconds = Number(s.replace(',', '.'));
    const hours = half === '' ? Number(h) : (Number(h) % 12) + (half.toLowerCase() === 'p' ? 12 : 0);
    const fits = hours < 24 && Number(m) < 60 && seconds < 61 && (half === '' || (Number(h) >= 1 && Number(h) <= 12));
    return fits ? hours * 3600 + Number(m) * 60 + seconds : null;
  }
  const iso = text.replace(' ', 'T').replace(/\s/g, '').replace(',', '.');
  const milliseconds = Date.parse(/T/.test(iso) && !/(?:Z|[+-]\d{2}:?\d{2})$/.test(iso) ? `${iso}Z` : iso);
  return Number.isNaN(milliseconds) ? null : milliseconds / 1000;
}
