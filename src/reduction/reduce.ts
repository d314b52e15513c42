/** The road: session → readings → angles → swings → calibration → impulse bits → run. It reads like a method section; one file a step. */
import { anchor, exact, propagate, type Anchor, type Uncertain } from '../metrology/uncertain.ts';
import { expanded, finiteSources } from '../metrology/coverage.ts';
import { ownParts } from '../metrology/pooled.ts';
import { dampingFactor, decrementOfRatio } from '../pendulum/damping.ts';
import { naturalFrequency } from '../pendulum/forms.ts';
import { undampedSmallPeriod } from '../pendulum/period.ts';
import { problem, type Problem } from '../problems/problems.ts';
import { ENTRIES } from '../session/entries.ts';
import type { Choices, Session } from '../session/session.ts';
import { differenceOf, remarksOnRun } from './remarks.ts';
import { readBench, type BenchRead } from './entries.ts';
import { chainOf } from './explain.ts';
import { readingSpread, readingsOf } from './readings.ts';
import type { Calibration, Configuration, PeriodCheck, RecordResult, Reduction, RunResult } from './results.ts';
import { budgetOfRecord, runOf, stated, type Run } from './run.ts';
import { readSheets, type SessionRecord } from './sheets.ts';
import { calibrationFromTaps, geometryAnchor, impulseOfLaunch, swingOf, tapsOf, toFiring, type Form, type Swing, type TapCalibration, type TapKnown, type Way } from './shots.ts';
import { missingEntries, periodOfBody, readStand, standByRoute, valueOf, type Body, type ConfigurationName, type Stand } from './stand.ts';
import { scaleOf } from './scale.ts';
import { dampingOf, type Damping, type Scale } from './swings.ts';

type ByConfiguration<T> = Readonly<Record<ConfigurationName, T>>;

export function reduce(session: Session, explain: string | null): Reduction {
  const choices = session.choices;
  const problems: Problem[] = [];

  const sheets = readSheets(session);
  problems.push(...sheets.problems);
  const records = sheets.records;
  const setAside = (record: SessionRecord): string | null => session.marks[record.id]?.setAside?.reason ?? null;
  const counts = (record: SessionRecord): boolean => setAside(record) === null;

  const bench = readBench(session);
  problems.push(...bench.problems);
  if (records.length > 0) {
    for (const name of missingEntries(bench, choices)) problems.push(problem('entry-missing', 'stops', { entry: name }, { label: ENTRIES[name].label }));
  }
  const stand = readStand(bench, choices);
  problems.push(...stand.problems);
  const scale = scaleOf(bench, choices);

  const spread = readingSpread(records, bench, problems);
  const read = readingsOf(records, spread, choices, bench);
  problems.push(...read.problems);

  const damping = dampingOf(session, bench, stand, scale, records, read.byRecord, spread, counts, problems);
  const period = timedPeriod(session, bench, stand, damping, problems);
  const bodies = standByRoute(stand, choices, period, problems);
  const unknown = anchor(exact(stand.shareUnknown));
  const shares: ByConfiguration<Anchor> = bodies
    ? { shots: bodies.shots.gravityShare, taps: bodies.taps.gravityShare }
    : stand.masses ? { shots: stand.masses.shots.gravityShare, taps: stand.masses.taps.gravityShare } : { shots: unknown, taps: unknown };

  const swings = records.map((record) => swingOf(record, read.byRecord.get(record.id)!, scale, damping, shares, problems));
  const taps = tapsOf(swings, bench, problems);
  const factors = factorsOf(bodies, stand, taps.filter((tap) => counts(tap.swing.record)), choices);

  const arms: ByConfiguration<Uncertain | null> = { shots: valueOf(bench, 'leverArm'), taps: valueOf(bench, 'tapLeverArm') };
  const impulse = (swing: Swing, form: Form, way: Way): Uncertain | null => {
    const factor = factors[form][way][swing.configuration];
    const arm = arms[swing.configuration];
    return swing.launch && factor && arm ? propagate(impulseOfLaunch, { factor, launch: swing.launch[form], arm }) : null;
  };
  const form = choices.swingForm;
  const way = choices.calibration;
  const shots = swings.filter((s) => s.record.kind === 'shot');
  const run = (which: Way, all: boolean): Run | null => {
    const items = shots.filter((s) => all || counts(s.record)).map((s) => impulse(s, form, which)).filter((y): y is Uncertain => y !== null);
    return runOf(items, shots.length, bench.sources);
  };
  const runs = { geometry: run('geometry', false), taps: run('taps', false) };
  const chosenRun = runs[way];
  const anyAside = shots.some((s) => !counts(s.record));

  const results = recordResults(swings, damping, taps, impulse, factors, form, way, setAside);
  problems.push(...sheets.recordProblems);
  const difference = chosenRun ? differenceOf(factors[form].geometry.shots, factors[form].taps.shots) : null;
  problems.push(...remarksOnRun({ choices, records: results, run: chosenRun?.result ?? null, difference, damping, spread, taps: factors[form].tapCalibration, bench, period: periodCheck(stand, period, choices), sheets: sheets.sheets }));

  const opened = explain === null ? undefined : swings.find((s) => s.record.id === explain);
  return {
    problems,
    entries: bench.all,
    sheets: sheets.sheets,
    records: withProblems(results, problems),
    gravity: stand.gravity ? stated(stand.gravity) : null,
    configurations: { shots: configuration('shots', bodies, damping), taps: configuration('taps', bodies, damping) },
    damping: { way: damping.way, ratio: stated(damping.ratio.shots), logDecrement: stated(propagate(({ z }) => Math.sign(z) * decrementOfRatio(Math.min(Math.abs(z), 0.999)), { z: damping.ratio.shots })), records: damping.records },
    periodCheck: periodCheck(stand, period, choices),
    calibrations: {
      geometry: calibrationResult('geometry', factors, form),
      taps: calibrationResult('taps', factors, form),
    },
    chosen: way,
    difference,
    runs: { geometry: runs.geometry?.result ?? null, taps: runs.taps?.result ?? null },
    run: chosenRun?.result ?? null,
    runWithSetAside: anyAside ? run(way, true)?.result ?? null : null,
    blanks: blanksOf(swings.filter((s) => s.record.kind === 'blank' && counts(s.record)).map((s) => impulse(s, form, way)), bench),
    ranges: { taps: rangeOf(swings, 'tap', counts, form), shots: rangeOf(swings, 'shot', counts, form) },
    explained: opened && scale ? explainOf(opened, scale, damping, shares, arms, factors, impulse, form, way, taps, bench) : opened ? { record: opened.record.id, chain: [], budget: null } : null,
  };
}

/** T₀ of the configuration in which the period was timed; null where none is typed, or the amplitude is none of a swing. */
function timedPeriod(session: Session, bench: BenchRead, stand: Stand, damping: Damping, problems: Problem[]): Anchor | null {
  const timed = valueOf(bench, 'period');
  if (!timed) return null;
  const { periodTimedAs } = session.choices;
  const amplitude = valueOf(bench, 'periodAmplitude') ?? exact(0);
  if (!(amplitude.value < Math.PI)) {
    problems.push(problem('entry-out-of-range', 'stops', { entry: 'periodAmplitude' }, { label: ENTRIES.periodAmplitude.label, found: session.entries.periodAmplitude?.text ?? '', range: 'any' }));
    return null;
  }
  return anchor(propagate(undampedSmallPeriod, {
    timed, dampingRatio: damping.ratio[periodTimedAs], amplitude, cycles: valueOf(bench, 'periodCycles') ?? exact(0),
    gravityShare: stand.masses?.[periodTimedAs].gravityShare ?? exact(stand.shareUnknown),
  }));
}

function periodCheck(stand: Stand, period: Anchor | null, choices: Choices): PeriodCheck | null {
  if (!period || !stand.masses) return null;
  const predicted = periodOfBody(stand.masses[choices.periodTimedAs]);
  const gap = stated(propagate(({ m, p }) => m - p, { m: period, p: predicted }));
  return { measured: stated(period), predicted: stated(predicted), inU: gap.u === 0 ? 0 : gap.value / gap.u };
}

/** Calibration factors by form and way, of each configuration. */
export interface Factors {
  readonly geometry: ByConfiguration<Anchor | null>;
  readonly taps: ByConfiguration<Anchor | null>;
  readonly tapCalibration: TapCalibration | null;
  readonly change: Uncertain | null;
}

function factorsOf(bodies: ByConfiguration<Body> | null, stand: Stand, taps: readonly TapKnown[], choices: Choices): Readonly<Record<Form, Factors>> {
  const shots = bodies ? geometryAnchor(bodies.shots) : null;
  const geometry = { shots, taps: bodies ? (bodies.taps === bodies.shots ? shots : geometryAnchor(bodies.taps)) : null };
  const hungDiffers = choices.calibrationMassHung === 'taps' || choices.calibrationMassHung === 'shots';
  const known = bodies ?? (choices.route === 'masses' ? stand.masses : null);
  const of = (form: Form): Factors => {
    const tapCalibration = calibrationFromTaps(taps, form);
    const firing = tapCalibration && toFiring(tapCalibration.asTaken, known, hungDiffers);
    return { geometry, taps: { taps: tapCalibration?.asTaken ?? null, shots: firing?.factor ?? null }, tapCalibration, change: firing?.change ?? null };
  };
  return { full: of('full'), smallAngle: of('smallAngle') };
}

function calibrationResult(way: Way, factors: Readonly<Record<Form, Factors>>, form: Form): Calibration | null {
  const f = factors[form];
  const factor = f[way].shots;
  if (!factor) return null;
  const result = expanded(factor, finiteSources([factor]));
  if (way === 'geometry') return { way, factor: result, asTaken: stated(factor), change: { value: 1, u: 0 }, taps: 0, scatter: null, expectedScatter: null };
  const { pooled, asTaken } = f.tapCalibration!;
  return {
    way, factor: result, asTaken: stated(asTaken), change: stated(f.change!), taps: pooled.n,
    scatter: pooled.scatter === null ? null : pooled.scatter / Math.abs(asTaken.value), expectedScatter: pooled.expected / Math.abs(asTaken.value),
  };
}

function configuration(name: ConfigurationName, bodies: ByConfiguration<Body> | null, damping: Damping): Configuration | null {
  if (!bodies) return null;
  const body = bodies[name];
  const ratio = damping.ratio[name];
  return {
    name, momentOfInertia: stated(body.inertia), stiffness: stated(body.stiffness),
    naturalFrequency: stated(propagate(naturalFrequency, { inertia: body.inertia, stiffness: body.stiffness })), period: stated(periodOfBody(body)),
    dampingRatio: stated(ratio), gravityShare: stated(body.gravityShare), dampingFactor: stated(propagate(({ z }) => dampingFactor(z), { z: ratio })),
  };
}

function recordResults(
  swings: readonly Swing[], damping: Damping, taps: readonly TapKnown[], impulse: (swing: Swing, form: Form, way: Way) => Uncertain | null,
  factors: Readonly<Record<Form, Factors>>, form: Form, way: Way, setAside: (record: SessionRecord) => string | null,
): readonly RecordResult[] {
  const knownOf = new Map(taps.map((tap) => [tap.swing.record.id, tap]));
  const anchors = [factors.full, factors.smallAngle].flatMap((f) => [f.geometry.shots, f.geometry.taps, f.taps.shots, f.taps.taps]).filter((a): a is Anchor => a !== null);
  const finite = finiteSources([...anchors, damping.ratio.shots, damping.ratio.taps]);
  const result = (y: Uncertain | null): ReturnType<typeof expanded> | null => (y ? expanded(y, finite) : null);
  const impulses = swings.map((swing) => impulse(swing, form, way));
  const own = ownParts(impulses.map((y) => y ?? exact(0)));
  return swings.map((swing, i): RecordResult => {
    const { record } = swing;
    const chosen = impulses[i]!;
    const other: Way = way === 'geometry' ? 'taps' : 'geometry';
    const otherForm: Form = form === 'full' ? 'smallAngle' : 'full';
    const chosenResult = result(chosen);
    const otherResult = result(impulse(swing, form, other));
    const otherFormResult = result(impulse(swing, otherForm, way));
    const known = knownOf.get(record.id);
    const factor = factors[form][way][swing.configuration];
    const moment = known ? known.angularImpulse : swing.launch && factor ? propagate(({ k, f }) => k * f, { k: factor, f: swing.launch[form] }) : null;
    return {
      id: record.id, sheet: record.sheet, line: record.line, order: i + 1, kind: record.kind, kindBy: record.kindBy, label: record.label, note: record.note,
      setAside: setAside(record), problems: [],
      readings: {
        rest: swing.readings.rest?.value ?? null, firstSwing: swing.readings.first?.value ?? null, nextSwings: record.nextSwings.map((cell) => cell?.value ?? null),
        time: record.time?.value ?? null, voltage: record.voltage?.value ?? null, pressure: record.pressure?.value ?? null, tapImpulse: record.tapImpulse?.value ?? null,
      },
      angle: swing.angle ? stated(swing.angle) : null,
      launch: swing.launch ? stated(swing.launch[form]) : null,
      full: form === 'full' ? chosenResult : otherFormResult,
      smallAngle: form === 'full' ? otherFormResult : chosenResult,
      byGeometry: way === 'geometry' ? chosenResult : otherResult,
      byTaps: way === 'taps' ? chosenResult : otherResult,
      impulseBit: chosenResult,
      ownU: own[i]!,
      knownImpulse: known ? stated(known.impulse) : null,
      angularImpulse: moment ? stated(moment) : null,
    };
  });
}

/** Each record with the problems that are its own, those of the run's remarks among them. */
function withProblems(records: readonly RecordResult[], problems: readonly Problem[]): readonly RecordResult[] {
  const byRecord = new Map<string, Problem[]>();
  for (const p of problems) {
    if (p.place.record === undefined) continue;
    const found = byRecord.get(p.place.record);
    if (found) found.push(p);
    else byRecord.set(p.place.record, [p]);
  }
  return records.map((record) => {
    const own = byRecord.get(record.id);
    return own ? { ...record, problems: own } : record;
  });
}

function blanksOf(found: readonly (Uncertain | null)[], bench: BenchRead): Reduction['blanks'] {
  const items = found.filter((y): y is Uncertain => y !== null);
  const run: RunResult | undefined = runOf(items, items.length, bench.sources)?.result;
  return run ? { n: run.n, mean: { value: run.mean.value, u: run.mean.u }, scatter: run.scatter } : null;
}

function rangeOf(swings: readonly Swing[], kind: 'shot' | 'tap', counts: (record: SessionRecord) => boolean, form: Form): readonly [number, number] | null {
  const values = swings.filter((s) => s.record.kind === kind && counts(s.record) && s.launch).map((s) => Math.abs(s.launch![form].value));
  return values.length === 0 ? null : [Math.min(...values), Math.max(...values)];
}

function explainOf(
  swing: Swing, scale: Scale, damping: Damping, shares: ByConfiguration<Anchor>, arms: ByConfiguration<Uncertain | null>, factors: Readonly<Record<Form, Factors>>,
  impulse: (swing: Swing, form: Form, way: Way) => Uncertain | null, form: Form, way: Way, taps: readonly TapKnown[], bench: BenchRead,
): NonNullable<Reduction['explained']> {
  const c = swing.configuration;
  const y = impulse(swing, form, way);
  const chain = chainOf({
    swing, scale, damping, share: shares[c], arm: arms[c], factor: { geometry: factors[form].geometry[c], taps: factors[form].taps[c] },
    impulse: (f, w) => impulse(swing, f, w), chosen: { form, way }, known: taps.find((t) => t.swing === swing)?.impulse ?? null,
  });
  return { record: swing.record.id, chain, budget: y ? budgetOfRecord(y, expanded(y, finiteSources([y])), bench.sources) : null };
}
