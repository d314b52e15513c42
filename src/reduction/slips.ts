/** The slips of a pen that a bench is heir to: each one tried by itself, to find which would reconcile what was measured with what is predicted. */
import { exact, propagate, standardUncertainty, type Uncertain } from '../metrology/uncertain.ts';
import type { Role } from '../readings/meanings.ts';
import { ENTRIES, PART_ENTRIES, type EntryKind, type EntryName, type PartEntryName } from '../session/entries.ts';
import type { Entry, Session } from '../session/session.ts';
import { readQuantity } from '../units/quantity.ts';
import { unitNamed, unitsOf, type Dimension, type Unit } from '../units/units.ts';
import { entriesInUse, gaugeDimension, readingDimension } from './entries.ts';
import type { AgreementCheck, Slip, SlipId } from './evidenceResults.ts';
import { editOf } from './slipEdit.ts';

/** Measured and predicted, with what they share kept in their difference. */
export interface Check {
  readonly id: AgreementCheck['id'];
  readonly measured: Uncertain;
  readonly predicted: Uncertain;
}

/** measured/predicted − 1 with its u. */
export const partOf = ({ measured, predicted }: Check): Uncertain => (predicted.value === 0 ? exact(0) : propagate(({ m, p }) => m / p - 1, { m: measured, p: predicted }));

/** A difference counts as off beyond this many of its u and this part: a slip makes at least a tenth or so, an uncertainty left out a few per cent. */
const OFF_U = 3;
const OFF_PART = 0.04;
/** …and as reconciled within these. */
const MET_U = 2;
const MET_PART = 0.02;
/** More are not told: they cannot be told apart. */
const MOST_TOLD = 3;

export function isOff(check: Check): boolean {
  const gap = partOf(check);
  return Math.abs(gap.value) > Math.max(OFF_PART, OFF_U * standardUncertainty(gap));
}

/** Relative u of measured/predicted. */
function relativeU(check: Check): number {
  const gap = partOf(check);
  return standardUncertainty(gap) / Math.max(Math.abs(1 + gap.value), Number.MIN_VALUE);
}

/** By the u that the check had before: a slip that only makes everything less certain reconciles nothing. */
const isMet = (check: Check, before: Check | undefined): boolean =>
  Math.abs(check.measured.value / check.predicted.value - 1) <= Math.max(MET_PART, MET_U * (before ? relativeU(before) : 0));

/** Radii and arms, of which a diameter or a whole length may have been measured. */
const FROM_PIVOT: readonly string[] = ['readingRadius', 'tapLeverArm', 'calibrationMassDistance', 'plateDistance', 'bobDistance', 'mirrorRadius', 'pullArm', 'hammerLength', 'distance'];
/** Lengths that the tip of the pendulum may have been taken for, or that may have been taken for the tip. */
const ARMS: readonly EntryName[] = ['tapLeverArm', 'readingRadius', 'pullArm', 'stripLength', 'leverArm', 'bobDistance'];

interface Typed {
  readonly name: string;
  readonly kind: EntryKind;
  readonly dimension: Dimension;
  readonly entry: Entry;
  readonly value: number;
  readonly spread: number | null;
  readonly unit: Unit;
}

function readEntry(kind: EntryKind, entry: Entry, { choices }: Session): Pick<Typed, 'dimension' | 'value' | 'spread' | 'unit'> | null {
  const dimension: Dimension = kind.dimension === 'reading' ? readingDimension(choices) : kind.dimension === 'gauge' ? gaugeDimension(choices) : kind.dimension;
  const read = readQuantity(entry.text, dimension, unitNamed(kind.unit, dimension) ? kind.unit : unitsOf(dimension)[0]!.symbol);
  return read.ok ? { dimension, value: read.value, spread: read.spread, unit: read.unit } : null;
}

function typedEntries(session: Session): readonly Typed[] {
  const { used } = entriesInUse(session.choices);
  const found: Typed[] = [];
  const take = (name: string, kind: EntryKind, entry: Entry | undefined): void => {
    if (!entry || entry.text.trim() === '' || kind.isSpread || name === 'division') return;
    const read = readEntry(kind, entry, session);
    if (read) found.push({ name, kind, entry, ...read });
  };
  for (const [name, entry] of Object.entries(session.entries) as [EntryName, Entry][]) if (used.has(name)) take(name, ENTRIES[name], entry);
  if (session.choices.form === 'bodyOfParts') for (const part of session.parts) for (const name of Object.keys(PART_ENTRIES) as PartEntryName[]) take(`part.${part.id}.${name}`, PART_ENTRIES[name], part.entries[name]);
  return found;
}

const digits = (value: number): string => String(Number(value.toPrecision(12)));

/** The entry's text with its value and ± times a factor, in its unit. */
function scaledText({ value, spread, unit }: Typed, factor: number): string {
  const number = (si: number): string => digits((si * factor) / unit.factor);
  return `${number(value)}${spread === null ? '' : ` ± ${number(spread)}`} ${unit.symbol}`;
}

/** The same digits in the unit that is `factor` times as large; scaled where there is no such unit. */
function inUnitOf(typed: Typed, factor: number): string {
  const unit = unitsOf(typed.dimension).find((one) => Math.abs(one.factor / (typed.unit.factor * factor) - 1) < 1e-9);
  return unit ? scaledText({ ...typed, value: typed.value * factor, spread: typed.spread === null ? null : typed.spread * factor, unit }, 1) : scaledText(typed, factor);
}

const UNIT_FACTORS: Readonly<Partial<Record<Dimension, readonly [SlipId, readonly number[]]>>> = {
  length: ['lengthUnit', [10, 0.1, 1000, 0.001, 25.4, 1 / 25.4]],
  mass: ['massUnit', [1000, 0.001]],
  momentOfInertia: ['inertiaUnit', [1000, 0.001, 100, 0.01, 1e6, 1e-6]],
  rotationalStiffness: ['stiffnessUnit', [1000, 0.001]],
  stiffness: ['stiffnessUnit', [1000, 0.001]],
};

/** Cycles that are often timed in one go. */
const OFTEN_TIMED = [10, 20, 5, 50, 100, 30];

function ofEntry(typed: Typed, all: readonly Typed[], session: Session): readonly Slip[] {
  const { name, kind, dimension, value, entry } = typed;
  const last = name.split('.').at(-1)!;
  const slip = (id: SlipId, text: string): Slip => ({ id, what: kind.label, from: entry.text, to: text, edit: { is: 'entry', name, text } });
  const found: Slip[] = [];
  const units = UNIT_FACTORS[dimension];
  if (units) for (const factor of units[1]) found.push(slip(units[0], inUnitOf(typed, factor)));
  if (dimension === 'length' && FROM_PIVOT.includes(last)) found.push(slip('diameterForRadius', scaledText(typed, 0.5)), slip('radiusForDiameter', scaledText(typed, 2)));
  if (ARMS.some((one) => one === name)) {
    for (const other of all) if (other.name !== name && ARMS.some((one) => one === other.name) && Math.abs(other.value / value - 1) > MET_PART) found.push(slip('tipForArm', other.entry.text));
  }
  if (dimension === 'angle') found.push(slip('radiansForDegrees', scaledText(typed, Math.PI / 180)), slip('degreesForRadians', scaledText(typed, 180 / Math.PI)));
  if (name === 'period') {
    found.push(slip('halfPeriod', scaledText(typed, 2)));
    const cycles = Number(session.entries.periodCycles?.text ?? Number.NaN);
    for (const n of cycles > 1 ? [cycles] : OFTEN_TIMED) found.push(slip('manySwings', scaledText(typed, 1 / n)));
  }
  if (name === 'logDecrement') found.push(slip('halfCycles', scaledText(typed, 2)), slip('halfCycles', scaledText(typed, 0.5)));
  if (name === 'screenDistance') found.push(slip('beamAngle', scaledText(typed, 2)), slip('halfBeamAngle', scaledText(typed, 0.5)));
  return found;
}

const READING_ROLES: readonly Role[] = ['rest', 'firstSwing', 'nextSwing'];

function ofColumns(session: Session): readonly Slip[] {
  const found: Slip[] = [];
  for (const sheet of session.sheets) for (const [index, column] of sheet.columns.entries()) {
    const header = sheet.text.split('\n', 1)[0]?.split(/[;,\t]/)[index]?.trim();
    // Readings of one sheet stand in one unit: what befell one column befell all.
    const alike = column.role === 'firstSwing' ? sheet.columns.flatMap((other, i) => (other.unit === column.unit && READING_ROLES.includes(other.role) ? [i] : [])) : [index];
    const slip = (id: SlipId, to: string, role: Role | null = null): Slip => ({ id, what: header ?? `column ${index + 1}`, from: column.unit, to, edit: { is: 'column', sheet: sheet.id, indices: alike, role, unit: to } });
    const otherUnits = (id: SlipId, dimension: Dimension, among: readonly string[]): void => {
      for (const unit of among) if (unit !== column.unit && unitNamed(unit, dimension)) found.push(slip(id, unit));
    };
    if (column.role === 'tapImpulse') otherUnits('impulseUnit', 'impulse', ['N·s', 'mN·s', 'µN·s']);
    if (column.role === 'weight') otherUnits('weightUnit', unitNamed(column.unit, 'mass') ? 'mass' : 'force', ['mg', 'g', 'kg', 'µN', 'mN', 'N']);
    if (column.role === 'massHung') otherUnits('massUnit', 'mass', ['mg', 'g', 'kg']);
    if (column.role === 'massHungAt') otherUnits('lengthUnit', 'length', ['mm', 'cm', 'm']);
    if (column.role === 'firstSwing' && unitNamed(column.unit, 'angle')) otherUnits(column.unit === '°' ? 'degreesForRadians' : 'radiansForDegrees', 'angle', column.unit === '°' ? ['rad'] : ['°']);
    if (column.role === 'firstSwing' && unitNamed(column.unit, 'length')) otherUnits('lengthUnit', 'length', ['mm', 'cm', 'm']);
    if (column.role === 'hammerRebound' && !sheet.columns.some(({ role }) => role === 'hammerFollow')) found.push(slip('reboundForFollow', column.unit, 'hammerFollow'));
    if (column.role === 'hammerFollow' && !sheet.columns.some(({ role }) => role === 'hammerRebound')) found.push(slip('followForRebound', column.unit, 'hammerRebound'));
    if (column.role === 'hammerIn') otherUnits('degreesForRadians', 'angle', ['°', 'rad']);
  }
  return found;
}

/** The session without any ±: a slip is tried with numbers alone, which is fast. */
export function withoutSpreads(session: Session): Session {
  const bare = <Name extends string>(entries: Readonly<Partial<Record<Name, Entry>>>, kinds: Readonly<Record<Name, EntryKind>>): Partial<Record<Name, Entry>> =>
    Object.fromEntries((Object.entries(entries) as [Name, Entry][]).flatMap(([name, entry]) => {
      const read = readEntry(kinds[name], entry, session);
      return kinds[name].isSpread ? [] : [[name, read ? { ...entry, text: `${digits(read.value / read.unit.factor)} ${read.unit.symbol}` } : entry]];
    })) as Partial<Record<Name, Entry>>;
  return { ...session, instruments: [], entries: bare(session.entries, ENTRIES), parts: session.parts.map((part) => ({ ...part, entries: bare(part.entries, PART_ENTRIES) })) };
}

/** Every single slip that this session can have befallen. */
export function possibleSlips(session: Session): readonly Slip[] {
  const typed = typedEntries(session);
  const sides: Slip = session.choices.swingMeasured === 'fromRest'
    ? { id: 'sideToSide', what: 'First swing', from: '', to: '', edit: { is: 'choice', name: 'swingMeasured', value: 'sideToSide' } }
    : { id: 'fromRest', what: 'First swing', from: '', to: '', edit: { is: 'choice', name: 'swingMeasured', value: 'fromRest' } };
  return [...typed.flatMap((one) => ofEntry(one, typed, session)), ...ofColumns(session), sides];
}

/** Slips that mend every check that is off and spoil none, the closest first; as many as cannot be told apart. Tried on the session without any ±. */
export function slipsThatReconcile({ asTyped, bare }: Readonly<Record<'asTyped' | 'bare', Session>>, checks: readonly Check[], off: readonly AgreementCheck['id'][], checksOf: (session: Session) => readonly Check[]): readonly Slip[] {
  const before = new Map(checks.map((check) => [check.id, check]));
  const found = possibleSlips(asTyped).flatMap((slip) => {
    const after = checksOf(editOf(slip.edit)(bare));
    if (!off.every((id) => after.some((check) => check.id === id))) return [];
    const mends = after.every((check) => isMet(check, before.get(check.id)));
    return mends ? [{ slip, left: after.reduce((sum, check) => sum + Math.abs(check.measured.value / check.predicted.value - 1), 0) }] : [];
  });
  return found.sort((a, b) => a.left - b.left).slice(0, MOST_TOLD).map(({ slip }) => slip);
}
