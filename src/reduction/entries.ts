/** First step of the road: what was typed about the bench becomes sources, each an anchor that all results may share. */
import { fromExpanded, fromLimits, type Distribution, type Source } from '../metrology/source.ts';
import { anchor, exact, ofSource, standardUncertainty, type Anchor, type Uncertain } from '../metrology/uncertain.ts';
import { problem, type Problem } from '../problems/problems.ts';
import { WAYS } from '../readings/ways.ts';
import { ENTRIES, ENTRY_NAMES, PART_ENTRIES, type EntryKind, type EntryName, type PartEntryName } from '../session/entries.ts';
import type { Choices, Entry, Session } from '../session/session.ts';
import { readNumber, readQuantity, type QuantityRead } from '../units/quantity.ts';
import type { Dimension } from '../units/units.ts';
import { NO_INSTRUMENTS, readInstruments, scaleOfInstrument, timesScale, type InstrumentsRead } from './instruments.ts';
import type { EntryRead } from './results.ts';

export interface ReadEntry {
  readonly read: EntryRead;
  /** null where nothing usable is typed. */
  readonly value: Uncertain | null;
  readonly source: Source | null;
}

export interface BenchRead {
  readonly entries: ReadonlyMap<EntryName, ReadEntry>;
  readonly parts: readonly { readonly id: string; readonly name: string; readonly entries: ReadonlyMap<PartEntryName, ReadEntry> }[];
  readonly problems: readonly Problem[];
  readonly all: readonly EntryRead[];
  /** Sources of every used entry, for budgets that list what acts nowhere. */
  readonly sources: readonly Source[];
  readonly instruments: InstrumentsRead;
  /** What the readings of a sheet were read with, by sheet id, and that instrument's calibration where it measures what is read. */
  readonly readWith: ReadonlyMap<string, { readonly words: string; readonly factor: Anchor | null }>;
}

function entryNamed(name: string): EntryName {
  const known = ENTRY_NAMES.find((entry) => entry === name);
  if (known === undefined) throw new Error(`entries in use: no entry is named ${name}`);
  return known;
}

/** The reading's scale has a plumb mark where its curvature makes one matter. */
export const hasPlumbMark = ({ readingWay, swingMeasured }: Choices): boolean =>
  WAYS[readingWay].reads === 'length' && swingMeasured === 'fromRest' && readingWay !== 'rise' && readingWay !== 'chord';

/** Dimension in which the readings are written. */
export const readingDimension = ({ readingWay }: Choices): Dimension => WAYS[readingWay].reads;
/** Percent on the dial, or a pressure. */
export const gaugeDimension = ({ gaugeMeaning }: Choices): Dimension => (gaugeMeaning === 'percentOfScale' || gaugeMeaning === 'percentOfOutside' ? 'number' : 'pressure');
export const GAUGE_UNIT: Readonly<Record<Choices['gaugeMeaning'], string>> = { absolute: 'Pa', gauge: 'kPa', percentOfScale: '%', percentOfOutside: '%' };
const USUAL_READING_UNIT: Readonly<Record<string, string>> = { length: 'mm', angle: 'mrad', pixel: 'px', count: 'counts' };
export const usualReadingUnit = (choices: Choices): string => USUAL_READING_UNIT[readingDimension(choices)] ?? 'mm';

/** Entries of the plan alone: they reach no result and stand in no budget. */
const PLANNING: readonly EntryName[] = ['guessedImpulse', 'scaleReach', 'markerRadius'];
const isPlanning = (name: string): boolean => PLANNING.some((one) => one === name);

/** Entries that the present choices use; `needed` ones stop the road where they are missing. */
export function entriesInUse(choices: Choices): { readonly used: ReadonlySet<EntryName>; readonly needed: ReadonlySet<EntryName> } {
  const needed = new Set<EntryName>(['leverArm']);
  const used = new Set<EntryName>(['leverArm', 'flexureStiffness', 'scaleFactor', 'division', 'readingSpread', 'tapLeverArm', 'hammerFactor', 'tapSpread']);
  if (choices.form === 'pointBob') for (const name of ['bobMass', 'bobDistance'] as const) needed.add(name);
  if (choices.form === 'uniformStrip' || choices.form === 'stripWithPlate') for (const name of ['stripMass', 'stripLength'] as const) needed.add(name);
  if (choices.form === 'stripWithPlate') for (const name of ['plateMass', 'plateDistance'] as const) needed.add(name);
  if (choices.form === 'stripWithPlate') used.add('plateInertia');
  if (choices.form === 'periodAndStiffness') {
    needed.add('period');
    for (const name of ['staticStiffness', 'forcePerDeflection', 'pullArm', 'gravityPart'] as const) used.add(name);
    used.delete('flexureStiffness');
  }
  if (choices.form === 'filmStrip') {
    for (const name of ['filmThickness', 'filmWidth', 'filmLength', 'filmDensity', 'filmModulus', 'zoneFrom', 'zoneTo'] as const) needed.add(name);
    for (const name of ['filmMass', 'plateMass', 'tapContact'] as const) used.add(name);
    used.delete('flexureStiffness');
  }
  if (choices.restoring === 'flexureAlone' && choices.form !== 'periodAndStiffness' && choices.form !== 'filmStrip') needed.add('flexureStiffness');
  const way = WAYS[choices.readingWay];
  for (const name of way.needs) needed.add(entryNamed(name));
  for (const name of Object.keys(way.mayHave)) if (name !== 'screenShape') used.add(entryNamed(name));
  if (choices.readingWay === 'cameraPivotMarker') used.add('markerRadius');
  if (choices.readingWay === 'cameraMarker') used.add('lensDistortion');
  if (choices.readingWay === 'cameraPivotMarker') for (const name of ['pivotAcross', 'pivotDown'] as const) needed.add(name);
  if (hasPlumbMark(choices)) used.add('scaleMark');
  if (way.reads === 'length' && choices.readingWay.startsWith('ruler')) for (const name of ['parallaxGap', 'cameraDistance', 'eyeShift'] as const) used.add(name);
  if (choices.dampingWay === 'decrement') needed.add('logDecrement');
  if (choices.dampingWay === 'ratio') needed.add('dampingRatio');
  if (choices.dampingWay === 'maximumTime') needed.add('firstMaximumTime');
  if (choices.dampingWay === 'quadratic') needed.add('quadraticDamping');
  if (choices.dampingWay === 'friction') needed.add('frictionAngle');
  const when = (switched: boolean, ...names: readonly EntryName[]): void => {
    if (switched) for (const name of names) used.add(name);
  };
  when(choices.correctPulse && choices.pulseShape !== 'measured', 'pulseDuration');
  when(choices.correctAlignment, 'tiltInPlane', 'exitAhead', 'tiltOutOfPlane');
  when(choices.correctSampling, 'exposure', 'frameInterval');
  when(choices.correctBackground, 'backgroundSwing', 'backgroundPhase', 'backgroundTime');
  when(choices.correctPropellant, 'propellantUsed', 'propellantDistance');
  when(choices.plume === 'caught', 'momentumFactor', 'captureFraction', 'plumeExponent', 'targetHalfAngle');
  for (const name of ['pressure', 'tapPressure', 'vacuumBelow'] as const) used.add(name);
  when(choices.gaugeMeaning !== 'absolute', 'barometer', 'height', 'dialClass');
  when(choices.gaugeMeaning === 'gauge' || choices.gaugeMeaning === 'percentOfScale', 'dialFullScale');
  const light = choices.form === 'uniformStrip' || choices.form === 'stripWithPlate';
  when(choices.correctAir && (light || choices.form === 'filmStrip'), 'airTemperature');
  when(choices.correctAir && light, 'stripWidth', 'stripThickness');
  when(choices.plume === 'carried', 'capacitance', 'leadResistance');
  for (const name of ['timingSpread', 'hungMassSpread', 'hungAtSpread', 'hungMassInertia', 'weightFactor', 'weightSpread', 'pullArm', 'hammerMass', 'hammerLength', 'hammerAngleSpread', 'hammerZero'] as const) used.add(name);
  when(choices.form !== 'filmStrip', 'staticStiffness', 'forcePerDeflection');
  when(choices.hammerForm === 'compound', 'hammerContact', 'hammerPeriod', 'hammerInertia');
  when(way.reads === 'length', 'sensorSlope', 'sensorOffset', 'sensorCorrelation');
  for (const name of ['guessedImpulse', 'scaleReach'] as const) used.add(name);
  if (choices.gravityWay === 'typed') used.add('gravity');
  else for (const name of ['latitude', 'height'] as const) needed.add(name);
  for (const name of ['period', 'periodAmplitude', 'periodCycles'] as const) used.add(name);
  if (choices.route !== 'masses' && choices.form !== 'filmStrip') needed.add('period');
  if (choices.calibrationMassHung !== 'never') {
    for (const name of ['calibrationMass', 'calibrationMassDistance'] as const) needed.add(name);
    used.add('calibrationMassInertia');
  }
  for (const name of needed) used.add(name);
  return { used, needed };
}

/** Entries for which a value without ± is usual and no remark is due. */
const QUIET: ReadonlySet<string> = new Set<string>(['division', 'readingSpread', 'tapSpread', 'periodCycles', 'periodAmplitude', 'calibrationMassInertia', 'ownInertia', 'scaleMark', 'height', 'latitude', 'windowThickness', 'windowIndex', 'parallaxGap', 'cameraDistance', 'eyeShift', 'faceOffset', 'screenTilt', 'beamIncidence', 'beamOutOfPlane', 'mirrorRadius', 'countsPerTurn', 'sensorOffset', 'sensorCorrelation', 'pivotAcross', 'pivotDown', 'cameraYaw', 'cameraToPlane', 'lensDistortion', 'markerRadius', 'plateInertia', 'gravityPart', 'filmMass', 'pulseDuration', 'tiltInPlane', 'exitAhead', 'exposure', 'frameInterval', 'backgroundSwing', 'backgroundPhase', 'backgroundTime', 'tapContact', 'propellantUsed', 'propellantDistance', 'plumeExponent', 'pressure', 'tapPressure', 'barometer', 'dialFullScale', 'dialClass', 'vacuumBelow', 'stripWidth', 'stripThickness', 'airTemperature', 'capacitance', 'leadResistance', 'targetHalfAngle', 'timingSpread', 'hungMassSpread', 'hungAtSpread', 'hungMassInertia', 'weightSpread', 'hammerAngleSpread', 'hammerZero', 'guessedImpulse', 'scaleReach']);

const LARGE_RELATIVE = 0.3;

/** SI. Beyond these nothing of a bench is measured, and squares of squares would leave the range of numbers. */
export const GREATEST = 1e12;
export const LEAST = 1e-18;
/** A coverage factor below this is a slip of the keyboard. */
const LEAST_COVERAGE = 1e-3;

/** The quantity that an instrument measures for this entry; null for a spread, a guess, or what stands on the scale of the readings. */
export function measuredDimension(name: string, kind: EntryKind, choices: Choices): Dimension | null {
  if (kind.isSpread || kind.dimension === 'reading' || name === 'scaleMark' || isPlanning(name)) return null;
  return kind.dimension === 'gauge' ? gaugeDimension(choices) : kind.dimension;
}

export function readBench(session: Session): BenchRead {
  const { used } = entriesInUse(session.choices);
  const problems: Problem[] = [];
  const instruments = readInstruments(session, (name, kind, typed, found) => readEntry(name, kind, typed, session.choices, true, found, NO_INSTRUMENTS).read, problems);
  const all: EntryRead[] = [];
  const sources: Source[] = [];
  const note = (entry: ReadEntry, inUse: boolean): void => {
    all.push(entry.read);
    if (inUse && entry.source && entry.source.u > 0 && !isPlanning(entry.read.name)) sources.push(entry.source);
  };
  const entries = new Map<EntryName, ReadEntry>();
  for (const name of Object.keys(ENTRIES) as EntryName[]) {
    const typed = session.entries[name];
    const inUse = used.has(name);
    const found = readEntry(name, ENTRIES[name], typed, session.choices, inUse, inUse ? problems : [], instruments);
    entries.set(name, found);
    note(found, inUse);
  }
  const bodyInUse = session.choices.form === 'bodyOfParts';
  const parts = session.parts.map((part, index) => {
    const read = new Map<PartEntryName, ReadEntry>();
    for (const name of Object.keys(PART_ENTRIES) as PartEntryName[]) {
      const path = `part.${part.id}.${name}`;
      const label = `${part.name || `part ${index + 1}`}: ${PART_ENTRIES[name].label.toLowerCase()}`;
      const found = readEntry(path, { ...PART_ENTRIES[name], label }, part.entries[name], session.choices, bodyInUse, bodyInUse ? problems : [], instruments);
      read.set(name, found);
      note(found, bodyInUse);
    }
    return { id: part.id, name: part.name, entries: read };
  });
  const readWith = new Map(session.sheets.flatMap(({ id, instrument }) => {
    const words = instrument === undefined ? undefined : instruments.words.get(instrument);
    return words === undefined ? [] : [[id, { words, factor: scaleOfInstrument(instruments, instrument, readingDimension(session.choices)) }] as const];
  }));
  sources.push(...[...instruments.scales.values()].map(({ source }) => source));
  return { entries, parts, problems, all, sources, instruments, readWith };
}

/** An entry is read again for every slip that is tried beside it, and never changes. */
const READ = new WeakMap<Entry, { readonly dimension: Dimension; readonly unit: string; readonly got: QuantityRead }>();

function quantityOf(typed: Entry, text: string, dimension: Dimension, unit: string): QuantityRead {
  const kept = READ.get(typed);
  if (kept?.dimension === dimension && kept.unit === unit) return kept.got;
  const got = readQuantity(text, dimension, unit);
  READ.set(typed, { dimension, unit, got });
  return got;
}

function readEntry(name: string, kind: EntryKind, typed: Entry | undefined, choices: Choices, used: boolean, problems: Problem[], instruments: InstrumentsRead): ReadEntry {
  const dimension: Dimension = kind.dimension === 'reading' ? readingDimension(choices) : kind.dimension === 'gauge' ? gaugeDimension(choices) : kind.dimension;
  const unitIfNone = kind.dimension === 'reading' ? (USUAL_READING_UNIT[dimension] ?? kind.unit) : kind.dimension === 'gauge' ? GAUGE_UNIT[choices.gaugeMeaning] : kind.unit;
  const text = typed?.text.trim() ?? '';
  const blank = (distribution: EntryRead['distribution'] = 'exact'): ReadEntry => ({
    read: { name, label: kind.label, symbol: kind.symbol, dimension, value: null, u: 0, unit: unitIfNone, distribution, used },
    value: null, source: null,
  });
  if (text === '' || !typed) return blank();
  const place = { entry: name };
  const got = quantityOf(typed, text, dimension, unitIfNone);
  if (!got.ok) {
    const code = got.fault === 'unknownUnit' ? 'entry-unknown-unit' : got.fault === 'wrongDimension' ? 'entry-wrong-kind-of-unit' : 'entry-not-a-number';
    problems.push(problem(code, 'stops', place, { label: kind.label, found: text, unit: unitIfNone }));
    return blank();
  }
  const isAbsurd = Math.abs(got.value) > GREATEST || (got.spread ?? 0) > GREATEST || (kind.range === 'positive' && got.value < LEAST);
  const bad = isAbsurd || (kind.range === 'positive' ? !(got.value > 0) : kind.range === 'notNegative' ? !(got.value >= 0) : !Number.isFinite(got.value));
  if (bad) {
    problems.push(problem('entry-out-of-range', 'stops', place, { label: kind.label, found: text, range: isAbsurd && got.value > 0 ? 'any' : kind.range }));
    return blank();
  }
  const k = typed.k.trim() === '' ? 2 : readNumber(typed.k);
  if (typed.plusMinus === 'expanded' && !(k !== null && k > LEAST_COVERAGE)) {
    problems.push(problem('entry-not-a-number', 'stops', place, { label: `${kind.label}, coverage factor k`, found: typed.k, unit: '1' }));
    return blank();
  }
  const spread = kind.isSpread ? got.value : got.spread;
  const u = spread === null ? 0 : typed.plusMinus === 'limits' ? fromLimits(spread) : typed.plusMinus === 'expanded' ? fromExpanded(spread, k ?? 2) : spread;
  const distribution: Distribution = u === 0 ? 'exact' : typed.plusMinus === 'limits' ? 'rectangular' : 'normal';
  if (got.ambiguousComma) problems.push(problem('entry-decimal-ambiguous', 'note', place, { label: kind.label, found: text }));
  if (got.unitAssumed && dimension !== 'number') problems.push(problem('entry-unit-assumed', 'note', place, { label: kind.label, found: text, unit: unitIfNone }));
  if (spread === null && !QUIET.has(name.split('.').at(-1)!)) problems.push(problem('entry-no-uncertainty', 'note', place, { label: kind.label, found: text }));
  if (!kind.isSpread && got.value !== 0 && kind.range !== 'any' && !isPlanning(name) && u / Math.abs(got.value) > LARGE_RELATIVE) {
    problems.push(problem('entry-uncertainty-large', 'doubt', place, { label: kind.label, found: text, percent: (100 * u) / Math.abs(got.value) }));
  }
  const read: EntryRead = { name, label: kind.label, symbol: kind.symbol, dimension, value: kind.isSpread ? u : got.value, u: kind.isSpread ? 0 : u, unit: got.unit.symbol, distribution, used };
  if (kind.isSpread) return { read, value: exact(u), source: null };
  const measured = measuredDimension(name, kind, choices);
  const words = measured === null || typed.instrument === undefined ? undefined : instruments.words.get(typed.instrument);
  const factor = measured === null ? null : scaleOfInstrument(instruments, typed.instrument, measured);
  const source: Source = { id: name, label: kind.label, symbol: kind.symbol, dimension, estimate: got.value, u, distribution, dof: Infinity, ...(words === undefined ? {} : { measuredWith: words }) };
  const own = u === 0 ? exact(got.value) : anchor(ofSource(source));
  return {
    read: words === undefined ? read : { ...read, measuredWith: { words, u: factor ? Math.abs(got.value) * standardUncertainty(factor) : 0 } },
    value: factor ? timesScale(own, factor) : own, source,
  };
}
