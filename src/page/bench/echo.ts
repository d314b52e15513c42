/** How the bench says back what was typed: an entry's value, its standard uncertainty, and what that was taken from. */
import type { EntryRead } from '../../reduction/results.ts';
import { alignedParts } from '../../units/format.ts';
import { unitNamed, type Unit } from '../../units/units.ts';

/** The value of an entry alone, as its field understood it: `118.00 mm`; null where nothing usable is typed. */
export function valueRead({ value, u, unit, dimension }: EntryRead): string | null {
  const found = unitNamed(unit, dimension);
  if (value === null || found === null) return null;
  const parts = alignedParts(value, u, found);
  return withUnit(`${parts.whole}${parts.fraction}`, parts.unit);
}

/** The echo beside a field: `118.00 mm, u = 0.17 mm (rectangular)`; for an entry that is itself an uncertainty, `u = 0.2 mm`. */
export function echoOf(read: EntryRead, isSpread: boolean): string | null {
  const value = valueRead(read);
  const found = unitNamed(read.unit, read.dimension);
  if (value === null || read.value === null || found === null) return null;
  if (isSpread) return `u = ${value}`;
  if (read.u === 0) return `${value}, taken as exact`;
  return `${value}, u = ${spreadOf(read.value, read.u, found)}${read.distribution === 'rectangular' ? ' (rectangular)' : ''}`;
}

/** What the calibration of its instrument adds to an entry's own u: `adds u = 0.22 mm`; null for nothing. */
export function addedByInstrument({ value, measuredWith, unit, dimension }: EntryRead): string | null {
  const found = unitNamed(unit, dimension);
  return value === null || found === null || measuredWith === undefined || measuredWith.u === 0 ? null : `adds u = ${spreadOf(value, measuredWith.u, found)}`;
}

function spreadOf(value: number, u: number, unit: Unit): string {
  const parts = alignedParts(value, u, unit);
  return withUnit(parts.spread, parts.unit);
}

const withUnit = (number: string, unit: string): string => (/^[°′″]?$/.test(unit) ? `${number}${unit}` : `${number}\u00A0${unit}`);
