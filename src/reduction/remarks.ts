/** What a colleague would say on looking over the run: facts for "things to look at", none of which changes a number. */
import { propagate, standardUncertainty, type Uncertain } from '../metrology/uncertain.ts';
import { problem, type Place, type Problem } from '../problems/problems.ts';
import type { Choices } from '../session/session.ts';
import type { BenchRead } from './entries.ts';
import { PRESSURE_RATIO } from './pressure.ts';
import type { ReadingSpread } from './readings.ts';
import type { Difference, PeriodCheck, RecordResult, RunResult, SheetResult } from './results.ts';
import { placeOf } from './sheets.ts';
import type { TapCalibration } from './taps.ts';
import type { Damping } from './swings.ts';

/** A difference of more than this many standard uncertainties is worth a sentence. */
const WORTH_A_SENTENCE = 2;
/** Throws beyond the largest tap by more than this part of it lean on the line outside what was calibrated. */
const BEYOND_TAPS = 0.1;
/** Fewer shots than this make a scatter of little weight. */
const FEW_SHOTS = 5;

/**
 * Taps against geometry: both ways reduce the same shots, so the run means differ as their calibration factors do,
 * K_taps/K_geometry − 1; the shots' scatter, their readings and the lever arm of the thrust cancel.
 */
export function differenceOf(geometry: Uncertain | null, taps: Uncertain | null): Difference | null {
  if (!geometry || !taps) return null;
  const gap = propagate(({ t, g }) => t / g - 1, { t: taps, g: geometry });
  const u = standardUncertainty(gap);
  return { relative: { value: gap.value, u }, inU: u === 0 ? 0 : gap.value / u };
}

export interface RunFacts {
  readonly choices: Choices;
  readonly records: readonly RecordResult[];
  readonly run: RunResult | null;
  readonly difference: Difference | null;
  readonly damping: Damping;
  readonly spread: ReadingSpread;
  readonly taps: TapCalibration | null;
  readonly bench: BenchRead;
  readonly period: PeriodCheck | null;
  readonly sheets: readonly SheetResult[];
}

export function remarksOnRun(x: RunFacts): readonly Problem[] {
  const counted = x.records.filter((r) => r.setAside === null);
  const shots = counted.filter((r) => r.kind === 'shot');
  const swung = counted.filter((r) => r.angle !== null && (r.kind === 'shot' || r.kind === 'tap'));
  return [
    ...senseOfThrows(x.records, swung, x.sheets),
    ...shotRemarks(x, shots),
    ...calibrationRemarks(x, counted, shots),
    ...pressureRemarks(shots),
  ];
}

function placeOfResult(record: RecordResult, sheets: readonly SheetResult[]): Place {
  return placeOf({ ...record, sheetName: sheets.find(({ id }) => id === record.sheet)?.name ?? '' });
}

function senseOfThrows(all: readonly RecordResult[], swung: readonly RecordResult[], sheets: readonly SheetResult[]): Problem[] {
  const negative = swung.filter((r) => r.angle!.value < 0);
  if (swung.length > 1 && negative.length === swung.length) return [problem('all-throws-negative', 'doubt', { entry: 'scaleRunsBackward' }, { records: swung.length })];
  return [
    ...negative.map((r) => problem('record-negative-throw', 'doubt', placeOfResult(r, sheets), {})),
    ...all.filter((r) => r.setAside === null && r.angle !== null && r.angle.value === 0 && r.kind !== 'blank' && r.kind !== 'zero').map((r) => problem('record-no-throw', 'doubt', placeOfResult(r, sheets), { kind: r.kind })),
  ];
}

function shotRemarks(x: RunFacts, shots: readonly RecordResult[]): Problem[] {
  const found: Problem[] = [];
  const run = x.run;
  if (shots.length === 0) {
    if (x.records.length > 0) found.push(problem('no-shots', 'stops', {}, { records: x.records.length }));
    return found;
  }
  if (!run) return found;
  if (run.n < FEW_SHOTS) found.push(problem('few-shots', 'note', {}, { n: run.n, k: run.mean.k }));
  if (run.readingsInsteadOfScatter && run.n > 1) found.push(problem('scatter-below-reading', 'note', {}, { scatter: run.scatter ?? 0, reading: run.uScatter * Math.sqrt(run.n) }));
  const throws = shots.filter((r) => r.readings.rest !== null && r.readings.firstSwing !== null).map((r) => r.readings.firstSwing! - r.readings.rest!);
  const range = Math.max(...throws) - Math.min(...throws);
  if (throws.length > 2 && x.spread.division > 0 && range < 0.5 * x.spread.division) {
    // One division for all: the rounding is the same for every shot, and does not average.
    const effect = x.spread.division / Math.sqrt(12) / Math.max(Math.abs(throws[0]!), Number.MIN_VALUE) * Math.abs(run.mean.value) / run.mean.u;
    found.push(problem('all-on-one-division', 'doubt', { entry: 'division' }, { shots: throws.length }, effect));
  }
  for (const shot of shots) {
    if (!shot.full || !shot.smallAngle || !shot.impulseBit) continue;
    const gap = shot.smallAngle.value - shot.full.value;
    if (Math.abs(gap) > shot.impulseBit.u) {
      found.push(problem('forms-differ', 'note', placeOfResult(shot, x.sheets), { percent: (100 * gap) / shot.full.value, inU: gap / shot.impulseBit.u }));
    }
  }
  return found;
}

function calibrationRemarks(x: RunFacts, counted: readonly RecordResult[], shots: readonly RecordResult[]): Problem[] {
  const found: Problem[] = [];
  const tapThrows = counted.filter((r) => r.kind === 'tap' && r.launch && r.knownImpulse).map((r) => Math.abs(r.launch!.value));
  const shotThrows = shots.filter((r) => r.launch).map((r) => Math.abs(r.launch!.value));
  if (x.choices.calibration === 'taps' && tapThrows.length > 0 && shotThrows.length > 0) {
    const [low, high] = [Math.min(...tapThrows), Math.max(...tapThrows)];
    const beyond = shotThrows.filter((t) => t > high * (1 + BEYOND_TAPS) || t < low * (1 - BEYOND_TAPS)).length;
    if (beyond > 0) found.push(problem('shots-beyond-taps', 'doubt', {}, { shots: beyond, of: shotThrows.length, largest: Math.max(...shotThrows) / high, smallest: Math.min(...shotThrows) / low }));
  }
  const hungDiffers = x.choices.calibrationMassHung === 'taps' || x.choices.calibrationMassHung === 'shots';
  if (x.choices.calibration === 'taps' && x.taps && hungDiffers && !x.run && shotThrows.length > 0) found.push(problem('change-needs-the-body', 'stops', { entry: 'calibrationMass' }, {}));
  const pooled = x.taps?.pooled;
  if (pooled && pooled.scatter !== null && pooled.n > 2 && pooled.scatter > 1.5 * pooled.expected) {
    found.push(problem('taps-scatter-more-than-stated', 'note', {}, { seen: (100 * pooled.scatter) / Math.abs(x.taps.asTaken.value), stated: (100 * pooled.expected) / Math.abs(x.taps.asTaken.value), taps: pooled.n }));
  }
  if (x.difference && Math.abs(x.difference.inU) > WORTH_A_SENTENCE) {
    const effect = x.run ? (x.difference.relative.value * x.run.mean.value) / x.run.mean.u : undefined;
    found.push(problem('calibrations-differ', 'doubt', {}, { percent: 100 * x.difference.relative.value, inU: x.difference.inU }, effect));
  }
  if (x.period && Math.abs(x.period.inU) > WORTH_A_SENTENCE) {
    found.push(problem('period-differs', 'doubt', { entry: 'period' }, { measured: x.period.measured.value, predicted: x.period.predicted.value, percent: 100 * (x.period.measured.value / x.period.predicted.value - 1), inU: x.period.inU }));
  }
  return found;
}

function pressureRemarks(shots: readonly RecordResult[]): Problem[] {
  const pressures = shots.map((r) => r.pressure?.value ?? null).filter((p): p is number => p !== null);
  if (pressures.length < 2) return [];
  const [low, high] = [Math.min(...pressures), Math.max(...pressures)];
  return high > PRESSURE_RATIO * low ? [problem('pressures-mixed', 'doubt', {}, { low, high })] : [];
}
