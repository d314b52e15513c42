/** Third step: every reading of a record becomes a source of its own, with the division and the eye as its uncertainty. */
import { sampleStandardDeviation } from '../numeric/samples.ts';
import { fromResolution, type Family, type Source } from '../metrology/source.ts';
import { anchor, combine, ofSource, standardUncertainty, type Anchor, type Uncertain } from '../metrology/uncertain.ts';
import { problem, type Problem } from '../problems/problems.ts';
import type { CellRead } from '../readings/cellReads.ts';
import type { RecordKind } from '../readings/meanings.ts';
import { unitNamed, type Dimension } from '../units/units.ts';
import type { BenchRead } from './entries.ts';
import { placeOf, type SessionRecord } from './sheets.ts';

export interface Readings {
  /** Where a record took its rest from: its own cell, or the zero record before it. */
  readonly restFrom: string | null;
  readonly rest: Uncertain | null;
  readonly first: Uncertain | null;
  /** Turning points after the first swing, by their number (1 the return swing). */
  readonly next: readonly { readonly number: number; readonly reading: Uncertain }[];
}

/** What one reading is uncertain by, beside what its own cell says. */
export interface ReadingSpread {
  /** a, in the reading's SI unit. */
  readonly division: number;
  readonly divisionTyped: boolean;
  readonly eye: number;
}

/** Readings needed before a step coarser than the last decimal is believed. */
const ENOUGH_FOR_COARSER = 10;
const COARSER = [5, 2.5, 2] as const;

/**
 * Division of the scale found from the readings: the last decimal written, or 2, 2.5 or 5 of it where at least ten
 * readings are all its multiples.
 */
export function divisionOfReadings(cells: readonly CellRead[]): number | null {
  if (cells.length === 0) return null;
  const decimals = Math.max(...cells.map((cell) => cell.decimals));
  const finest = cells.find((cell) => cell.decimals === decimals)!;
  const unit = unitNamed(finest.unit);
  if (!unit) return null;
  const step = 10 ** -decimals;
  if (cells.length >= ENOUGH_FOR_COARSER && cells.every((cell) => cell.unit === finest.unit)) {
    const values = cells.map((cell) => Math.round(cell.value / unit.factor / step));
    // A step of 2.5 shows one decimal more than 2.5 would need; in counts of the last decimal the candidates are 50, 25, 20, 10, 5, 2.
    for (const coarse of [50, 25, 20, 10, ...COARSER.filter(Number.isInteger)]) if (values.every((v) => v % coarse === 0)) return coarse * step * unit.factor;
  }
  return step * unit.factor;
}

export function readingSpread(records: readonly SessionRecord[], bench: BenchRead, problems: Problem[]): ReadingSpread {
  const eye = bench.entries.get('readingSpread')?.read.value ?? 0;
  const typed = bench.entries.get('division')?.value?.value ?? null;
  if (typed !== null) return { division: typed, divisionTyped: true, eye };
  const cells = records.flatMap((r) => [r.rest, r.firstSwing, ...r.nextSwings]).filter((cell): cell is CellRead => cell !== null && cell.spread === null);
  const found = divisionOfReadings(cells);
  if (found !== null) {
    const unit = unitNamed(cells[0]!.unit);
    problems.push(problem('division-from-readings', 'note', { entry: 'division' }, { division: unit ? found / unit.factor : found, unit: cells[0]!.unit, readings: cells.length }));
  }
  return { division: found ?? 0, divisionTyped: false, eye };
}

const FAMILY: Readonly<Record<RecordKind, Family>> = {
  shot: { id: 'readings.shots', label: 'Scatter of the shots and their readings' },
  tap: { id: 'readings.taps', label: 'Scatter of the taps and their readings' },
  blank: { id: 'readings.blanks', label: 'Readings of the blanks' },
  zero: { id: 'readings.zeros', label: 'Zeros taken as rest' },
  freeSwing: { id: 'readings.freeSwings', label: 'Readings of the free swings' },
};
export const familyOf = (kind: RecordKind): Family => FAMILY[kind];

/** Harmonics of the rounding error that are summed; the tenth is below 1e-3 of the first even without any spread. */
const HARMONICS = 40;

/**
 * u of the part of the rounding error that is common to many readings of one division a, where the readings would
 * spread by σ before rounding: u² = Σ_k a²/(2π²k²) e^{−4π²k²σ²/a²}; a²/12 at σ = 0 (all on one division: it does not
 * average), nothing from σ ≈ a/2 on (the rounding errors are independent).
 *
 * Valid: a > 0, σ ≥ 0, Gaussian spread, position within the division unknown. Unit of a.
 * Source: derived from the characteristic function of the spread (quantisation theory, B. Widrow; from memory).
 */
export function commonRounding(division: number, spread: number): number {
  let sum = 0;
  const x = 2 * Math.PI * (spread / division);
  for (let k = 1; k <= HARMONICS; k++) sum += Math.exp(-((k * x) ** 2)) / (2 * Math.PI ** 2 * k * k);
  // What the harmonics left out hold at σ = 0: the sum to infinity is 1/12.
  if (x === 0) return division / Math.sqrt(12);
  return division * Math.sqrt(Math.min(sum, 1 / 12));
}

/** The common part of the rounding of a group of readings: one source that each of them has, or none. */
function commonDivision(id: string, label: string, symbol: string, cells: readonly CellRead[], spread: ReadingSpread, dimension: Dimension): Anchor | null {
  const rounded = cells.filter((cell) => cell.spread === null).map((cell) => cell.value);
  if (rounded.length < 2 || !(spread.division > 0)) return null;
  const s = sampleStandardDeviation(rounded);
  const before = Math.sqrt(Math.max(0, s * s - spread.division ** 2 / 12));
  const u = commonRounding(spread.division, before);
  return u < 1e-3 * spread.division ? null : anchor(ofSource({ id, label, symbol, dimension, estimate: 0, u, distribution: 'rectangular', dof: Infinity }));
}

/** Common rounding by what the readings are of: rests together, first swings by kind. */
function commonDivisions(records: readonly SessionRecord[], spread: ReadingSpread, dimension: Dimension): (part: string, kind: RecordKind) => Anchor | null {
  const filled = (cells: readonly (CellRead | null)[]): readonly CellRead[] => cells.filter((cell): cell is CellRead => cell !== null);
  const rests = commonDivision('division.rest', 'Rest readings: division, common part', 'x₀', filled(records.map((r) => (r.kind === 'zero' ? r.rest ?? r.firstSwing : r.rest))), spread, dimension);
  const first = (kind: RecordKind, label: string): Anchor | null =>
    commonDivision(`division.first.${kind}`, label, 'x₁', filled(records.filter((r) => r.kind === kind).map((r) => r.firstSwing)), spread, dimension);
  const shots = first('shot', 'First swings of the shots: division, common part');
  const taps = first('tap', 'First swings of the taps: division, common part');
  return (part, kind) => (part === 'rest' ? rests : part !== 'first' ? null : kind === 'shot' ? shots : kind === 'tap' ? taps : null);
}

function reading(record: SessionRecord, cell: CellRead, part: string, label: string, symbol: string, spread: ReadingSpread, dimension: Dimension, common: Anchor | null = null): Uncertain {
  const of = (id: string, what: string, u: number, distribution: Source['distribution']): Source => ({
    id: `${record.id}.${part}${id}`, label: `${label}${what}`, symbol, dimension, estimate: cell.value, u, distribution, dof: Infinity, family: FAMILY[record.kind],
  });
  if (cell.spread !== null) return ofSource(of('', '', cell.spread, 'normal'));
  const alone = Math.sqrt(Math.max(0, fromResolution(spread.division) ** 2 - (common ? standardUncertainty(common) : 0) ** 2));
  const parts: Uncertain[] = [ofSource(of('', ', division', alone, 'rectangular'))];
  if (spread.eye !== 0) parts.push(ofSource({ ...of('.eye', ', eye', spread.eye, 'normal'), estimate: 0 }));
  if (common) parts.push(common);
  return parts.length === 1 ? parts[0]! : combine(parts.map((part) => [1, part]));
}

/**
 * Readings of every record in the order of the run. A record without a rest reading takes the last zero
 * before it; that reading's source is then shared by all who take it.
 */
export function readingsOf(records: readonly SessionRecord[], spread: ReadingSpread, dimension: Dimension): { readonly byRecord: ReadonlyMap<string, Readings>; readonly problems: readonly Problem[] } {
  const byRecord = new Map<string, Readings>();
  const problems: Problem[] = [];
  const common = commonDivisions(records, spread, dimension);
  let lastZero: { readonly label: string; readonly line: string; readonly rest: Uncertain } | null = null;
  for (const record of records) {
    const place = placeOf(record);
    const zeroCell = record.kind === 'zero' ? record.rest ?? record.firstSwing : record.rest;
    let rest = zeroCell ? reading(record, zeroCell, 'rest', 'Rest reading', 'x₀', spread, dimension, common('rest', record.kind)) : null;
    let restFrom: string | null = rest ? record.id : null;
    if (record.kind === 'zero') {
      if (rest) lastZero = { label: record.label, line: record.line, rest };
      byRecord.set(record.id, { restFrom, rest, first: null, next: [] });
      continue;
    }
    // A rest that was written and cannot be read is not the zero's: the rest may have moved since.
    const spoiled = record.problems.some((p) => p.weight === 'stops' && p.facts['role'] === 'rest');
    if (!rest && !spoiled && lastZero && record.firstSwing) {
      rest = lastZero.rest;
      restFrom = lastZero.line;
      problems.push(problem('record-rest-from-zero', 'note', place, { zeroLine: lastZero.line }));
    } else if (!rest && !spoiled && record.firstSwing && record.kind !== 'freeSwing') {
      problems.push(problem('record-no-rest', 'stops', place, {}));
    }
    const first = record.firstSwing ? reading(record, record.firstSwing, 'first', 'First swing', 'x₁', spread, dimension, common('first', record.kind)) : null;
    const next = record.nextSwings.flatMap((cell, i) => (cell ? [{ number: i + 1, reading: reading(record, cell, `next${i + 1}`, `Turning point ${i + 2}`, `x${i + 2}`, spread, dimension) }] : []));
    byRecord.set(record.id, { restFrom, rest, first, next });
  }
  return { byRecord, problems };
}
