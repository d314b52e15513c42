/** A trace as the road takes it: its samples in SI with their times, what is left out of them, and its shots and taps. */
import { problem, type Place, type Problem } from '../problems/problems.ts';
import { columnUnit } from '../readings/headerUnits.ts';
import type { SampledRecord } from '../readings/sampled/sampledRecord.ts';
import { proposeUses, type ProposedUses } from '../readings/sampled/sampledUses.ts';
import { atSamples, timelineOf, timeUnitNamed, type SampleClock, type Timeline } from '../readings/sampled/timeline.ts';
import { readStretches, readTraceEvents, type TraceEvent, readTrains, type TimedTrain } from '../readings/traceEvents.ts';
import { WAYS } from '../readings/ways.ts';
import { TRACE_USES, type Choices, type Trace, type TraceUse } from '../session/session.ts';
import { extentOf } from '../numeric/samples.ts';
import { clippedSpans, leastStep, maskOf, spikeSpans } from '../traces/faults.ts';
import { risesOf } from '../traces/findShots.ts';
import { readNumber, readQuantity } from '../units/quantity.ts';
import { toSi, unitNamed, type Dimension, type Unit } from '../units/units.ts';
import { anglesOf, trackOf, type CameraTrack } from './camera.ts';
import type { BenchRead } from './entries.ts';
import { valueOf } from './stand.ts';
import type { Stretch, TraceColumn } from './traceResults.ts';

/** The records of traces that are at hand, by the SHA-256 of their bytes. */
export type TraceLibrary = ReadonlyMap<string, SampledRecord>;
export const NO_TRACES: TraceLibrary = new Map();

export interface TraceRead {
  readonly record: SampledRecord | null;
  readonly columns: readonly TraceColumn[];
  readonly uses: Readonly<Partial<Record<TraceUse, number>>>;
  /** The reading is in volts and the sensor's line turns it into a length. */
  readonly inVolts: boolean;
  readonly camera: CameraTrack | null;
  /** null where there is nothing to be fitted. */
  readonly samples: { readonly t: Float64Array; readonly x: Float64Array } | null;
  readonly timeline: Timeline | null;
  /** Left out of the fit; those about shots are added once the shots are known. */
  readonly stretches: readonly Stretch[];
  /** As listed, or at the rises of the trigger; empty where they are to be found. */
  readonly events: readonly TraceEvent[];
  readonly trains: readonly TimedTrain[];
  readonly exposure: number;
  readonly blank: number;
  readonly refine: number;
  /** Added to the listed times, s; null: from the shots themselves. */
  readonly offset: number | null;
  readonly problems: readonly Problem[];
}

/** The least of a record that is fitted. */
const FEWEST = 20;
const USUAL: Readonly<Record<string, string>> = { length: 'mm', angle: 'mrad', pixel: 'px', count: 'counts' };

const READ = new WeakMap<SampledRecord, { readonly key: string; readonly read: TraceRead }>();
const PROPOSED = new WeakMap<SampledRecord, ProposedUses>();

function proposedUses(record: SampledRecord): ProposedUses {
  const kept = PROPOSED.get(record);
  if (kept) return kept;
  const made = proposeUses(record);
  PROPOSED.set(record, made);
  return made;
}

/** Uses that a way of reading has columns for. */
export const usesOfWay = (way: Choices['readingWay']): readonly TraceUse[] => TRACE_USES.filter((use) => way === 'cameraPivotMarker' || (way === 'cameraMarker' && use === 'down') || (use !== 'down' && use !== 'pivotAcross' && use !== 'pivotDown'));

/** Asked for at every recalculation; the samples are read again only where the trace itself is read otherwise. */
export function readTrace(trace: Trace, library: TraceLibrary, choices: Choices, bench: BenchRead): TraceRead {
  const record = library.get(trace.sha256) ?? null;
  const place: Place = { sheetName: trace.name };
  if (!record) return { ...NOTHING, problems: [problem('trace-bytes-missing', 'stops', place, {})] };
  const pivot = choices.readingWay === 'cameraPivotMarker' ? [valueOf(bench, 'pivotAcross')?.value ?? null, valueOf(bench, 'pivotDown')?.value ?? null] : [];
  const { id: _, name: __, sha256: ___, bytes: ____, ...reading } = trace;
  const key = JSON.stringify([reading, choices.readingWay, pivot]);
  const kept = READ.get(record);
  if (kept?.key === key) return kept.read;
  const read = readAfresh(trace, record, choices.readingWay, pivot, place);
  READ.set(record, { key, read });
  return read;
}

const NOTHING: TraceRead = { record: null, columns: [], uses: {}, inVolts: false, camera: null, samples: null, timeline: null, stretches: [], events: [], trains: [], exposure: 0, blank: 0, refine: 0, offset: 0, problems: [] };

function readAfresh(trace: Trace, record: SampledRecord, way: Choices['readingWay'], pivot: readonly (number | null)[], place: Place): TraceRead {
  const problems: Problem[] = [...record.problems];
  const proposed = proposedUses(record);
  const uses: Partial<Record<TraceUse, number>> = {};
  for (const use of usesOfWay(way)) {
    const chosen = trace.uses[use] ?? proposed.uses[use] ?? -1;
    if (chosen >= 0 && chosen < record.columns.length) uses[use] = chosen;
  }
  const columns = record.columns.map(({ header, unitText }) => ({ header, unit: unitText }));
  const typed = typedTimes(trace, problems);
  const bare: TraceRead = { ...NOTHING, record, columns, uses, ...typed, problems };
  const listed = readTraceEvents(trace.events, `trace.${trace.id}`);
  const marked = readStretches(trace.bad, `trace.${trace.id}`);
  const trains = readTrains(trace.trains, `trace.${trace.id}`);
  problems.push(...(trace.eventsFrom === 'list' ? listed.problems : []), ...marked.problems, ...trains.problems);
  const reading = uses.reading;
  const stop = (found: Problem): TraceRead => ({ ...bare, problems: [...problems, found] });
  if (reading === undefined || record.columns.length === 0) return problems.some(({ weight }) => weight === 'stops') ? bare : stop(problem('trace-no-samples', 'stops', place, { rows: record.rows }));
  const clock = clockOf(trace, record, uses.time, proposed, place, problems);
  if (!clock) return { ...bare, problems };
  const needs = [reading, ...(['down', 'pivotAcross', 'pivotDown'] as const).flatMap((use) => uses[use] ?? [])];
  const timeline = timelineOf(record, clock, needs, place);
  problems.push(...timeline.problems);
  const { t } = timeline;
  if (t.length < FEWEST) return problems.some(({ weight }) => weight === 'stops') ? { ...bare, problems } : stop(problem('trace-no-samples', 'stops', place, { rows: t.length }));
  const values = valuesOf(trace, record, { uses, timeline, way, pivot, place }, problems);
  if (!values) return { ...bare, problems };
  const { x, inVolts, camera } = values;
  const [low, high] = extentOf(x);
  if (low === high) return stop(problem('trace-constant', 'stops', place, {}));
  if (x.every((value) => value === low || value === high)) return stop(problem('trace-two-values', 'stops', place, {}));
  const stretches = leftOut(t, x, timeline, marked.stretches);
  const clipped = stretches.filter(({ why }) => why === 'clipped').length;
  if (clipped > 0) problems.push(problem('trace-clipped', 'doubt', place, { stretches: clipped, time: stretches.find(({ why }) => why === 'clipped')!.from }));
  const spikes = stretches.filter(({ why }) => why === 'spike').length;
  if (spikes > 0) problems.push(problem('trace-spikes', 'note', place, { spikes, time: stretches.find(({ why }) => why === 'spike')!.from }));
  const triggered = uses.trigger === undefined ? [] : risesOf(t, atSamples(timeline, record.columns[uses.trigger]!.values));
  const events: readonly TraceEvent[] = trace.eventsFrom === 'list' ? listed.events : trace.eventsFrom === 'trigger' ? triggered.map((time, i) => ({ id: `trigger${i + 1}`, time, kind: 'shot', impulse: '' })) : [];
  if (trace.eventsFrom === 'trigger' && triggered.length === 0) problems.push(problem('trace-no-trigger', 'doubt', place, {}));
  return { ...bare, samples: { t, x }, inVolts, camera, timeline, stretches, events, trains: trains.trains, problems };
}

/** Times typed for the whole trace; one that cannot be read is told and counts as none. */
function typedTimes(trace: Trace, problems: Problem[]): Pick<TraceRead, 'exposure' | 'blank' | 'refine' | 'offset'> {
  const time = (key: 'exposure' | 'blank' | 'refine' | 'offset', label: string, unit: string): number => {
    const text = trace[key].trim();
    if (text === '') return 0;
    const got = readQuantity(text, 'time', unit);
    if (got.ok && (key === 'offset' || got.value >= 0)) return got.value;
    problems.push(problem('entry-not-a-number', 'doubt', { entry: `trace.${trace.id}` }, { label, found: text, unit }));
    return 0;
  };
  return {
    exposure: time('exposure', 'One sample averages over', 'ms'), blank: time('blank', 'Left out after each shot', 'ms'), refine: time('refine', 'A shot’s time may be moved by', 'ms'),
    offset: /^find$/i.test(trace.offset.trim()) ? null : time('offset', 'The list’s clock, put forward by', 's'),
  };
}

/** Samples or frames a second as typed: "500", "500 Hz", "30 fps", "2 ms". */
function rateTyped(text: string): number | null {
  const bare = text.trim();
  if (bare === '') return null;
  const interval = readQuantity(bare, 'time', 's');
  if (interval.ok && !interval.unitAssumed && interval.value > 0) return 1 / interval.value;
  const [, digits, kilo] = /^([\d.,eE+-]+)\s*(k)?(?:hz|fps|\/s|1\/s|per s(?:econd)?|s\^?-1|frames\/s|samples\/s)?$/iu.exec(bare) ?? [];
  const value = digits === undefined ? null : readNumber(digits);
  return value !== null && value > 0 ? value * (kilo ? 1000 : 1) : null;
}

function clockOf(trace: Trace, record: SampledRecord, time: number | undefined, proposed: ProposedUses, place: Place, problems: Problem[]): SampleClock | null {
  const typed = rateTyped(trace.rate);
  if (typed === null && trace.rate.trim() !== '') problems.push(problem('entry-not-a-number', 'doubt', { entry: `trace.${trace.id}` }, { label: 'Samples or frames a second', found: trace.rate, unit: 'Hz' }));
  const perSecond = typed ?? proposed.rate?.perSecond ?? null;
  const unitTyped = trace.timeUnit.trim() === '' ? null : timeUnitNamed(trace.timeUnit);
  if (unitTyped === null && trace.timeUnit.trim() !== '') problems.push(problem('trace-unit-unknown', 'doubt', place, { found: trace.timeUnit }));
  const isCount = time !== undefined && time === proposed.uses.time && proposed.timeBy === 'count' && unitTyped === null;
  if (time === undefined || isCount) {
    if (perSecond === null) {
      problems.push(problem('trace-rate-missing', 'stops', place, {}));
      return null;
    }
    return time === undefined ? { by: 'rate', rate: perSecond } : { by: 'count', column: time, rate: perSecond };
  }
  const named = unitTyped ?? timeUnitNamed(record.columns[time]!.unitText);
  if (!named && !record.columns[time]!.clock) problems.push(problem('trace-unit-assumed', 'doubt', place, { column: record.columns[time]!.header, unit: 's' }));
  return { by: 'time', column: time, unit: named ?? unitNamed('s', 'time')! };
}

interface ValuesFacts {
  readonly uses: TraceRead['uses'];
  readonly timeline: Timeline;
  readonly way: Choices['readingWay'];
  readonly pivot: readonly (number | null)[];
  readonly place: Place;
}

/** The reading of each sample, in SI; volts where the sensor's line is to turn them into lengths. */
function valuesOf(trace: Trace, record: SampledRecord, { uses, timeline, way, pivot, place }: ValuesFacts, problems: Problem[]): { readonly x: Float64Array; readonly inVolts: boolean; readonly camera: CameraTrack | null } | null {
  const column = record.columns[uses.reading!]!;
  const at = (use: TraceUse): Float64Array | null => (uses[use] === undefined ? null : atSamples(timeline, record.columns[uses[use]]!.values));
  if (way === 'cameraPivotMarker') {
    const [across, down, pivotAcross, pivotDown] = [at('reading')!, at('down'), at('pivotAcross'), at('pivotDown')];
    const [fixedAcross, fixedDown] = pivot;
    const angles = down && anglesOf(timeline.t, { across, down, pivotAcross: pivotAcross ?? fixedAcross ?? null, pivotDown: pivotDown ?? fixedDown ?? null });
    if (!angles) {
      problems.push(problem('trace-pivot-missing', 'stops', place, {}));
      return null;
    }
    return { ...angles, inVolts: false };
  }
  const dimension: Dimension = WAYS[way].reads;
  const words = trace.readingUnit.trim() === '' ? column.unitText : trace.readingUnit;
  const usual = unitNamed(USUAL[dimension] ?? 'mm', dimension)!;
  const volts = dimension === 'length' ? unitNamed(words, 'voltage') : null;
  const found: Unit | null = unitNamed(words, dimension) ?? volts;
  if (!found) {
    const other = columnUnit(words);
    problems.push(other ? problem('trace-wrong-unit', 'doubt', place, { found: other.symbol, unit: usual.symbol }) : problem('trace-unit-assumed', 'doubt', place, { column: column.header, unit: usual.symbol }));
  }
  const unit = found ?? usual;
  const values = at('reading')!;
  const row = way === 'cameraMarker' ? at('down') : null;
  const camera = row && trackOf(timeline.t, { across: values, down: row, pivotAcross: null, pivotDown: null });
  return { x: unit.factor === 1 ? values : values.map((value) => toSi(value, unit)), inVolts: found !== null && found === volts, camera };
}

/** Clipped samples, spikes, gaps and what a person marked. */
function leftOut(t: Float64Array, x: Float64Array, timeline: Timeline, marked: readonly { readonly from: number; readonly to: number }[]): readonly Stretch[] {
  const clipped = clippedSpans(t, x);
  // Where most of a record stands at its ends it is a coarse one.
  const real = clipped.length > 0 && maskOf(t, clipped).reduce((sum, one) => sum + one, 0) > FEWEST && leastStep(x) > 0 ? clipped : [];
  return [
    ...timeline.gaps.map(({ before, after }): Stretch => ({ from: t[before]!, to: t[after]!, why: 'gap' })),
    ...real.map((span): Stretch => ({ ...span, why: 'clipped' })), ...spikeSpans(t, x).map((span): Stretch => ({ ...span, why: 'spike' })), ...marked.map(({ from, to }): Stretch => ({ from, to, why: 'marked' })),
  ].sort((a, b) => a.from - b.from);
}
