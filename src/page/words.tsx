/** Wording that several sections share: symbols with their subscripts, and a value read off the reduction with what it owes its uncertainty to. */
import type { EntryRead } from '../reduction/results.ts';
import { alignedParts } from '../units/format.ts';
import { unitNamed } from '../units/units.ts';

/** A symbol as it is set: `k_f` with a subscript, in italics. */
export function SymbolText({ symbol }: { readonly symbol: string }) {
  const [letter = '', below] = symbol.split('_');
  return (
    <i translate="no">
      {letter}
      {below !== undefined && <sub>{below}</sub>}
    </i>
  );
}

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
  if (read.u === 0) return `${value}, exact`;
  const parts = alignedParts(read.value, read.u, found);
  return `${value}, u = ${withUnit(parts.spread, parts.unit)}${read.distribution === 'rectangular' ? ' (rectangular)' : ''}`;
}

const withUnit = (number: string, unit: string): string => (/^[°′″]?$/.test(unit) ? `${number}${unit}` : `${number}\u00A0${unit}`);
