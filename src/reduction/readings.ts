/** Third step: every reading of a record becomes a source of its own, with the division and the eye as its uncertainty. */
import { sampleStandardDeviation } from '../numeric/samples.ts';
import { commonRounding } from '../metrology/rounding.ts';
import { fromLimits, fromResolution, type Family, type Source } from '../metrology/source.ts';
import { anchor, combine, exact, ofSource, propagate, standardUncertainty, type Anchor, type Uncertain } from '../metrology/uncertain.ts';
import { problem, type Problem } from '../problems/problems.ts';
import type { CellRead } from '../readings/cellReads.ts';
import type { RecordKind } from '../readings/meanings.ts';
import { unitNamed, type Dimension } from '../units/units.ts';
import { parallaxOfEye, pictureAngle } from '../readings/ways.ts';
import type { Choices } from '../session/session.ts';
import { readingDimension, type BenchRead } from './entries.ts';
import { valueOf } from './stand.ts';
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

/** u of one reading where the eye moves in front of a pointer that stands off its ruler. */
function movingEye(bench: BenchRead): number {
  const [gap, cameraDistance, shift] = (['parallaxGap', 'cameraDistance', 'eyeShift'] as const).map((name) => bench.entries.get(name));
  if (!gap?.read.used || !gap.value || !cameraDistance?.value || !shift?.value) return 0;
  return fromLimits(parallaxOfEye({ gap: gap.value.value, cameraDistance: cameraDistance.value.value, shift: shift.value.value }));
}

export function readingSpread(records: readonly SessionRecord[], bench: BenchRead, problems: Problem[]): ReadingSpread {
  const eye = Math.hypot(bench.entries.get('readingSpread')?.read.value ?? 0, movingEye(bench));
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
  weight: { id: 'readings.weights', label: 'Readings of the known weights' },
  period: { id: 'readings.timings', label: 'Timed periods: starts and stops, and their scatter' },
};
export const familyOf = (kind: RecordKind): Family => FAMILY[kind];

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

/** Rest of the run at one record, by the zeros around it. */
interface Zero {
  readonly index: number;
  readonly line: string;
  readonly rest: Uncertain;
  readonly time: number | null;
}

/** Half-width of what a rest may do between two zeros beside moving evenly, as a part of its whole move; judgement (methods 1.16). */
const CURVATURE = 0.25;

/** Rest between two zeros, by the time where both zeros and the record have one, else by the order; with what may lie between. */
function between(a: Zero, b: Zero, index: number, time: number | null, record: SessionRecord, dimension: Dimension): Uncertain {
  const timed = a.time !== null && b.time !== null && time !== null && b.time > a.time;
  const f = timed ? (time - a.time) / (b.time - a.time) : (index - a.index) / (b.index - a.index);
  const bend: Source = {
    id: `${record.id}.rest.bend`, label: 'Rest between two zeros, drift not even', symbol: 'x₀', dimension, estimate: 0,
    u: fromLimits(CURVATURE * Math.abs(b.rest.value - a.rest.value)), distribution: 'rectangular', dof: Infinity, family: familyOf(record.kind),
  };
  return combine([[1 - f, a.rest], [f, b.rest], [1, ofSource(bend)]]);
}

/** A rest that moved by more than this many u, and divisions, is told. */
const MOVED = 2;
const MOVED_DIVISIONS = 1.5;

/**
 * Readings of every record in the order of the run. A record without a rest reading takes the last zero before it, or
 * where chosen the rest interpolated between the zeros on both sides; a zero's source is shared by all who take it.
 */
export function readingsOf(records: readonly SessionRecord[], spread: ReadingSpread, choices: Choices, bench: BenchRead): { readonly byRecord: ReadonlyMap<string, Readings>; readonly problems: readonly Problem[] } {
  const dimension = readingDimension(choices);
  const byRecord = new Map<string, Readings>();
  const problems: Problem[] = [];
  const fitting = (record: SessionRecord, cell: CellRead | null, role: string): CellRead | null => {
    if (!cell || unitNamed(cell.unit, dimension)) return cell;
    problems.push(problem('reading-wrong-kind-of-unit', 'stops', placeOf(record), { found: cell.text, unit: cell.unit, role, dimension }));
    return null;
  };
  const common = commonDivisions(records, spread, dimension);
  const one = (record: SessionRecord, cell: CellRead | null, part: string, label: string, symbol: string): Uncertain | null =>
    cell ? reading(record, cell, part, label, symbol, spread, dimension, part === 'rest' || part === 'first' ? common(part, record.kind) : null) : null;
  const pictured = (record: SessionRecord, across: Uncertain | null, down: CellRead | null, part: string): Uncertain | null => {
    if (choices.readingWay !== 'cameraPivotMarker' || !across) return across;
    const rows = one(record, down, `${part}.down`, 'Row in the picture', 'v');
    const pivotAcross = valueOf(bench, 'pivotAcross');
    const pivotDown = valueOf(bench, 'pivotDown');
    return rows && pivotAcross && pivotDown ? propagate(pictureAngle, { across, down: rows, pivotAcross, pivotDown }) : null;
  };
  /** A rest that has moved over the swing: told, and where chosen the mean with half the move as limits. */
  const withAfter = (record: SessionRecord, before: Uncertain, after: Uncertain | null): Uncertain => {
    if (!after || choices.readingWay === 'cameraPivotMarker') return before;
    const move = combine([[1, after], [-1, before]]);
    const u = standardUncertainty(move);
    if (Math.abs(move.value) > Math.max(MOVED * u, MOVED_DIVISIONS * spread.division)) problems.push(problem('record-zero-moved', choices.restTaken === 'mean' ? 'note' : 'doubt', placeOf(record), { move: Math.abs(move.value) / (unitNamed(record.restAfter!.unit)?.factor ?? 1), unit: record.restAfter!.unit, inU: u === 0 ? 0 : move.value / u }));
    if (choices.restTaken === 'before') return before;
    const drift: Source = { id: `${record.id}.rest.drift`, label: 'Rest moved over the swing', symbol: 'x₀', dimension, estimate: 0, u: fromLimits(Math.abs(move.value) / 2), distribution: 'rectangular', dof: Infinity, family: familyOf(record.kind) };
    return combine([[0.5, before], [0.5, after], [1, ofSource(drift)]]);
  };
  const zeros: Zero[] = [];
  const own = new Map<string, Uncertain | null>();
  records.forEach((record, index) => {
    const isZero = record.kind === 'zero';
    const cell = fitting(record, isZero ? record.rest ?? record.firstSwing : record.rest, 'rest');
    const rest = pictured(record, one(record, cell, 'rest', 'Rest reading', 'x₀'), isZero ? record.restDown ?? record.firstSwingDown : record.restDown, 'rest');
    own.set(record.id, rest);
    if (isZero && rest) zeros.push({ index, line: record.line, rest, time: record.time?.value ?? null });
  });
  records.forEach((record, index) => {
    const ownRest = own.get(record.id) ?? null;
    if (record.kind === 'zero') {
      byRecord.set(record.id, { restFrom: ownRest ? record.id : null, rest: ownRest, first: null, next: [] });
      return;
    }
    const firstCell = fitting(record, record.firstSwing, 'firstSwing');
    let rest = ownRest;
    let restFrom: string | null = rest ? record.id : null;
    if (rest && choices.swingMeasured === 'fromRest') rest = withAfter(record, rest, one(record, fitting(record, record.restAfter, 'restAfter'), 'restAfter', 'Rest reading after', 'x₀′'));
    // A rest that was written and cannot be read is not the zero's: the rest may have moved since.
    const spoiled = record.problems.some((p) => p.weight === 'stops' && p.facts['role'] === 'rest') || (record.rest !== null && rest === null);
    if (choices.swingMeasured === 'sideToSide') {
      rest = exact(0);
    } else if (!rest && !spoiled && firstCell) {
      const before = zeros.findLast((zero) => zero.index < index);
      const after = choices.zeroTaken === 'interpolated' ? zeros.find((zero) => zero.index > index) : undefined;
      if (before) {
        rest = after ? between(before, after, index, record.time?.value ?? null, record, dimension) : before.rest;
        restFrom = before.line;
        problems.push(problem('record-rest-from-zero', 'note', placeOf(record), { zeroLine: after ? `${before.line} and ${after.line}` : before.line }));
      } else if (record.kind !== 'freeSwing') problems.push(problem('record-no-rest', 'stops', placeOf(record), {}));
    }
    const first = pictured(record, one(record, firstCell, 'first', 'First swing', 'x₁'), record.firstSwingDown, 'first');
    const next = record.nextSwings.flatMap((cell, i) => {
      const turning = one(record, fitting(record, cell, 'nextSwing'), `next${i + 1}`, `Turning point ${i + 2}`, `x${i + 2}`);
      const placed = pictured(record, turning, record.nextSwingsDown[i] ?? null, `next${i + 1}`);
      return placed ? [{ number: i + 1, reading: placed }] : [];
    });
    byRecord.set(record.id, { restFrom, rest, first, next });
  });
  return { byRecord, problems };
}
