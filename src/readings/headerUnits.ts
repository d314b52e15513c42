/** The unit that a column's header, or the units row beneath it, names. */
import { unitNamed } from '../units/units.ts';
import type { Dimension, Unit } from '../units/units.ts';
import { LONGEST_HEADER } from './words.ts';

const BRACKETED = /[([{]\s*([^()[\]{}]+?)\s*[)\]}]\s*$/u;
const AFTER_MARK = /(?:\s*\/\s+|\s+\/\s*|,\s*|\sin\s+|\sen\s+|:\s*|_|\s[–-]\s+)([^\s,]+(?:\s?Hg)?)\s*$/u;

/** Dimensions that a column of readings can have. */
const COLUMN_DIMENSIONS: readonly Dimension[] = ['length', 'angle', 'voltage', 'pressure', 'impulse', 'time', 'mass', 'angularImpulse', 'force', 'pixel', 'count', 'number'];

/** No unit of the table is spelled with more characters. */
const LONGEST_UNIT = 40;

/** The unit that a text in a table names; null for texts that are units only elsewhere (N and S of a latitude). */
export function columnUnit(text: string): Unit | null {
  const bare = text.trim();
  if (bare === '' || bare === '1' || bare.length > LONGEST_UNIT) return null;
  for (const dimension of COLUMN_DIMENSIONS) {
    const unit = unitNamed(bare, dimension);
    if (unit !== null) return unit;
  }
  return null;
}

/**
 * Unit written at the end of a header: "Rest (mm)", "zero [mm]", "Rest / mm", "Rest, mm", "Rest in mm", "rest_mm", or the header itself: "kV", "Volts".
 * What stands in brackets is given back whether it is a known unit or not; null: none.
 */
export function unitTextOf(header: string): string | null {
  if (header.length > LONGEST_HEADER) return null;
  const bracketed = BRACKETED.exec(header)?.[1];
  if (bracketed !== undefined) return bracketed;
  const after = AFTER_MARK.exec(header)?.[1];
  if (after !== undefined && columnUnit(after) !== null) return after;
  const whole = header.length > 1 ? columnUnit(header) : null;
  // "Second" heads a second swing, "min" a smallest reading.
  return whole !== null && whole.dimension !== 'time' ? header : null;
}

/** Text of a units-row cell without the brackets around it. */
export function unitInBrackets(cell: string): string {
  const bare = cell.trim();
  return /^[([{]\s*(.*?)\s*[)\]}]$/u.exec(bare)?.[1] ?? bare;
}

/** A row beneath the header that holds nothing but units, dashes and blanks. */
export function isUnitsRow(cells: readonly string[]): boolean {
  let units = 0;
  for (const raw of cells) {
    const cell = raw.trim();
    if (cell === '' || /^[-–—]$/.test(cell)) continue;
    if (columnUnit(unitInBrackets(cell)) === null) return false;
    units += 1;
  }
  return units > 0;
}
