/** A sampled record as text: its columns of numbers, with the units that its header names; rows that hold a word are left out. */
import type { Place, Problem } from '../problems/problems.ts';
import { readNumber } from '../units/quantity.ts';
import { unitNamed, type Dimension, type Unit } from '../units/units.ts';
import { columnUnit } from './headerUnits.ts';
import { readTable } from './table.ts';

export interface SampledColumn {
  readonly header: string;
  readonly unitText: string;
  readonly values: readonly number[];
}

export interface SampledColumns {
  /** Columns of numbers alone, in order. */
  readonly columns: readonly SampledColumn[];
  /** One-based line of each row. */
  readonly lines: readonly number[];
  readonly problems: readonly Problem[];
}

/** A column of numbers has numbers in more than half of its rows. */
export function readSampledColumns(text: string, place: Place): SampledColumns {
  const table = readTable(text, { place });
  const read = table.headers.map((_, i) => table.rows.map(({ cells }) => readNumber(cells[i] ?? '', table.decimal)));
  const indices = read.flatMap((values, i) => (values.filter((value) => value !== null).length > values.length / 2 ? [i] : []));
  const whole = table.rows.flatMap((_, row) => (indices.every((i) => read[i]![row] !== null) ? [row] : []));
  return {
    columns: indices.map((i) => ({ header: table.headers[i] ?? '', unitText: table.unitTexts[i] ?? '', values: whole.map((row) => read[i]![row]!) })),
    lines: whole.map((row) => table.rows[row]!.line), problems: table.problems,
  };
}

/** The unit of a column, where it is one of this dimension; null otherwise. */
export function unitOfSampled({ unitText }: SampledColumn, dimension: Dimension): Unit | null {
  const found = columnUnit(unitText);
  return found && unitNamed(found.symbol, dimension);
}
