/** Absolute pressure of every record from what the gauge shows, and of the pendulum as fired and as tapped. */
import { fromLimits, fromResolution, type Source } from '../metrology/source.ts';
import { anchor, combine, exact, ofSource, propagate, standardUncertainty, type Anchor, type Model, type Uncertain } from '../metrology/uncertain.ts';
import {
  absolutePressure, COMPARABLE_WITH_VACUUM_BELOW, dialUncertainty, geopotentialHeight, standardPressure, STANDARD_ATMOSPHERE, WEATHER, type GaugeMeaning,
} from '../pendulum/pressure.ts';
import { problem, type Place, type Problem } from '../problems/problems.ts';
import type { CellRead } from '../readings/cellReads.ts';
import type { Choices } from '../session/session.ts';
import { unitNamed } from '../units/units.ts';
import type { BenchRead } from './entries.ts';
import type { PressureResult } from './results.ts';
import { stated } from './run.ts';
import { placeOf, type SessionRecord } from './sheets.ts';
import { valueOf, type ConfigurationName } from './stand.ts';

export interface Pressures {
  /** Absolute, Pa, by record id; a record without a pressure of its own has that of the run. */
  readonly byRecord: ReadonlyMap<string, Uncertain>;
  /** Mean of the records that count, Pa; null where no pressure is known. */
  readonly shots: Anchor | null;
  readonly taps: Anchor | null;
  readonly told: PressureResult | null;
}

/** Shots and taps whose pressures differ by more than this ratio swing in different gas. */
export const PRESSURE_RATIO = 1.5;

/** Means that differ by no more than rounding are one pressure. */
const SAME = 1e-9;

type Gauge = Model<'reading' | 'outside' | 'fullScale' | 'dial'>;
const gauge = (meaning: GaugeMeaning): Gauge => ({ reading, outside, fullScale, dial }) =>
  absolutePressure({ meaning, reading: meaning === 'percentOfScale' || meaning === 'percentOfOutside' ? 100 * reading : reading, outside, fullScale }).pressure + dial;
const GAUGES: Readonly<Record<GaugeMeaning, Gauge>> = {
  absolute: gauge('absolute'), gauge: gauge('gauge'), percentOfScale: gauge('percentOfScale'), percentOfOutside: gauge('percentOfOutside'),
};

const isPercent = (meaning: GaugeMeaning): boolean => meaning === 'percentOfScale' || meaning === 'percentOfOutside';
/** A dial that counts down from the outside pressure: "−95 kPa" or "95 in −kPa" alike. */
const countsDown = (unit: string): boolean => unit.startsWith('−');

interface Outside {
  readonly pressure: Anchor | null;
  readonly from: 'barometer' | 'height' | null;
}

/** A barometer that shows so much more than the height makes, in deviations of the weather, was reduced to sea level. */
const UNLIKELY_WEATHER = 4;

const stationOfHeight = ({ height }: Readonly<Record<'height', number>>): number => standardPressure(geopotentialHeight(height));

function outsideOf(bench: BenchRead, needed: boolean, problems: Problem[]): Outside {
  const barometer = valueOf(bench, 'barometer');
  const height = valueOf(bench, 'height');
  if (!needed) return { pressure: null, from: null };
  let station: Uncertain | null = null;
  try {
    station = height && propagate(stationOfHeight, { height });
  } catch (failure) {
    if (!(failure instanceof RangeError)) throw failure;
    problems.push(problem('height-beyond-atmosphere', 'doubt', { entry: 'height' }, {}));
  }
  if (barometer) {
    const excess = station ? barometer.value - station.value : 0;
    if (excess > UNLIKELY_WEATHER * WEATHER) problems.push(problem('barometer-at-sea-level', 'doubt', { entry: 'barometer' }, { barometer: barometer.value, station: station!.value }));
    return { pressure: anchor(barometer), from: 'barometer' };
  }
  if (!station) {
    problems.push(problem('outside-pressure-missing', 'doubt', { entry: 'barometer' }, {}));
    return { pressure: null, from: null };
  }
  const weather: Source = { id: 'outside.weather', label: 'Weather: outside pressure about the standard atmosphere', symbol: 'p_out', dimension: 'pressure', estimate: 0, u: (WEATHER * station.value) / STANDARD_ATMOSPHERE, distribution: 'normal', dof: Infinity };
  return { pressure: anchor(combine([[1, station], [1, ofSource(weather)]])), from: 'height' };
}

/** What a gauge shows at one time: a cell, or an entry for all records. */
interface Shown {
  readonly reading: Uncertain;
  readonly unit: string;
  readonly place: Place;
}

/** Absolute pressure of a reading; the barometer, the dial's class and equal readings' rounding are common to all. */
class Dial {
  private readonly outside: Outside;
  private readonly fullScale: Uncertain;
  private readonly meaning: GaugeMeaning;
  /** What its class leaves open, common to all its readings: a part of full scale, of a ratio dial of the outside pressure. */
  private readonly error: Uncertain;
  private readonly kept = new Map<string, Anchor | null>();
  /** Units whose meaning was asked about. */
  private readonly asked = new Set<string>();
  private readonly problems: Problem[];

  constructor(bench: BenchRead, choices: Choices, needsOutside: boolean, problems: Problem[]) {
    this.problems = problems;
    this.meaning = choices.gaugeMeaning;
    this.outside = outsideOf(bench, needsOutside, problems);
    this.fullScale = valueOf(bench, 'dialFullScale') ?? exact(STANDARD_ATMOSPHERE);
    const scale = this.meaning === 'percentOfOutside' ? this.outside.pressure?.value : this.fullScale.value;
    const accuracyClass = this.meaning === 'absolute' ? 0 : 100 * (valueOf(bench, 'dialClass')?.value ?? 0);
    this.error = accuracyClass === 0 || scale === undefined ? exact(0) : anchor(ofSource({
      id: 'gauge.class', label: 'Class of the dial', symbol: 'c_d', dimension: 'pressure', estimate: 0, u: dialUncertainty({ accuracyClass, fullScale: scale }), distribution: 'rectangular', dof: Infinity,
    }));
  }

  get outsideStated(): Pick<PressureResult, 'outside' | 'outsideFrom'> {
    return { outside: this.outside.pressure && stated(this.outside.pressure), outsideFrom: this.outside.from };
  }

  /** Readings that are alike share their rounding, and are told of once. */
  ofCell(cell: CellRead, place: Place): Anchor | null {
    const key = `${cell.unit}|${cell.value}|${cell.spread}|${cell.decimals}`;
    const known = this.kept.get(key);
    if (known !== undefined) return known;
    const unit = unitNamed(cell.unit);
    const u = cell.spread ?? fromResolution(10 ** -cell.decimals * Math.abs(unit?.factor ?? 1));
    const value = countsDown(cell.unit) ? -Math.abs(cell.value) : cell.value;
    const source: Source = { id: `pressure.${key}`, label: `Gauge at ${cell.text}, its reading`, symbol: 'p', dimension: unit?.dimension ?? 'pressure', estimate: value, u, distribution: cell.spread === null ? 'rectangular' : 'normal', dof: Infinity, family: { id: 'pressure.readings', label: 'Readings of the gauge' } };
    const found = this.absolute({ reading: ofSource(source), unit: cell.unit, place });
    this.kept.set(key, found);
    return found;
  }

  absolute({ reading, unit, place }: Shown): Anchor | null {
    const percent = unit === '%';
    const { meaning } = this;
    if (percent !== isPercent(meaning) || (countsDown(unit) && meaning !== 'gauge')) {
      if (!this.asked.has(unit)) this.problems.push(problem('gauge-meaning-unclear', 'doubt', place, { unit, meaning }));
      this.asked.add(unit);
      return null;
    }
    if (meaning !== 'absolute' && !this.outside.pressure) return null;
    const shown = percent ? 100 * reading.value : reading.value;
    if (percent && !(shown >= 0 && shown <= 100)) {
      this.problems.push(problem('pressure-beyond-dial', 'doubt', place, { percent: shown }));
      return null;
    }
    const outside = this.outside.pressure ?? exact(STANDARD_ATMOSPHERE);
    const p = propagate(GAUGES[meaning], { reading, outside, fullScale: this.fullScale, dial: this.error });
    if (!(p.value > 0)) {
      this.problems.push(problem('pressure-below-zero', 'doubt', place, { pressure: p.value, u: standardUncertainty(p), meaning }));
      return null;
    }
    if (meaning === 'gauge' && reading.value > 0) this.problems.push(problem('pressure-above-outside', 'doubt', place, { pressure: p.value, outside: outside.value }));
    return anchor(p);
  }
}

export function pressuresOf(bench: BenchRead, choices: Choices, records: readonly SessionRecord[], counts: (record: SessionRecord) => boolean, problems: Problem[]): Pressures {
  const typed = (name: 'pressure' | 'tapPressure'): Shown | null => {
    const entry = bench.entries.get(name)!;
    const { value, unit } = entry.read;
    if (entry.value === null || value === null) return null;
    return { reading: countsDown(unit) ? propagate(({ x }) => -Math.abs(x), { x: entry.value }) : entry.value, unit, place: { entry: name } };
  };
  const [entry, entryOfTaps] = [typed('pressure'), typed('tapPressure')];
  const shown = entry !== null || entryOfTaps !== null || records.some((record) => record.pressure !== null);
  const dial = new Dial(bench, choices, shown && choices.gaugeMeaning !== 'absolute', problems);
  const ofEntry = entry && dial.absolute(entry);
  const ofTapEntry = entryOfTaps && dial.absolute(entryOfTaps);
  const byRecord = new Map<string, Uncertain>();
  const own = new Set<string>();
  for (const record of records) {
    const p = record.pressure ? dial.ofCell(record.pressure, placeOf(record)) : record.kind === 'tap' ? ofTapEntry ?? ofEntry : ofEntry;
    if (p) byRecord.set(record.id, p);
    if (p && (record.pressure || (record.kind === 'tap' && ofTapEntry))) own.add(record.id);
  }
  const of = (name: ConfigurationName): readonly Uncertain[] =>
    records.filter((r) => counts(r) && (name === 'taps' ? r.kind === 'tap' && own.has(r.id) : r.kind === 'shot')).flatMap((r) => byRecord.get(r.id) ?? []);
  const [fired, tapped] = [of('shots'), of('taps')];
  const shots = meanOf(fired, 'shots') ?? ofEntry;
  const apart = meanOf(tapped, 'taps') ?? ofTapEntry;
  const taps = apart && !(shots && Math.abs(apart.value - shots.value) <= SAME * shots.value) ? apart : shots;
  if (!shots) {
    if (!shown && records.some((record) => record.kind === 'shot' && counts(record))) problems.push(problem('pressure-not-stated', 'note', { entry: 'pressure' }, {}));
    return { byRecord, shots: null, taps, told: null };
  }
  const values = fired.length > 0 ? fired.map((p) => p.value) : [shots.value];
  const [least, largest] = [Math.min(...values), Math.max(...values)];
  const below = valueOf(bench, 'vacuumBelow')?.value ?? COMPARABLE_WITH_VACUUM_BELOW;
  const likeVacuum = largest <= below;
  if (!likeVacuum && records.length > 0) problems.push(problem('not-a-vacuum-figure', 'doubt', {}, { pressure: largest, below, plume: choices.plume }));
  return {
    byRecord, shots, taps,
    told: {
      meaning: choices.gaugeMeaning, absolute: stated(shots), least, largest, mixed: largest > PRESSURE_RATIO * least, taps: taps === shots || !taps ? null : stated(taps),
      ...dial.outsideStated, likeVacuum,
    },
  };
}

/** Mean of the records' pressures, with what they differ by among themselves. */
function meanOf(pressures: readonly Uncertain[], name: ConfigurationName): Anchor | null {
  const [first] = pressures;
  if (!first) return null;
  const values = pressures.map((p) => p.value);
  const range = Math.max(...values) - Math.min(...values);
  const mean = combine(pressures.map((p) => [1 / pressures.length, p]));
  if (range === 0) return anchor({ ...mean, value: first.value });
  return anchor(combine([[1, mean], [1, ofSource({
    id: `pressure.range.${name}`, label: `Pressure of the ${name}, their range`, symbol: 'p', dimension: 'pressure', estimate: 0, u: fromLimits(range / 2), distribution: 'rectangular', dof: Infinity,
  })]]));
}

/** True where shots and taps swing in gas of different pressure. */
export const gasDiffers = ({ shots, taps }: Pick<Pressures, 'shots' | 'taps'>): boolean =>
  shots !== null && taps !== null && shots !== taps && Math.max(shots.value, taps.value) > PRESSURE_RATIO * Math.min(shots.value, taps.value);
