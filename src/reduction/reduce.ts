/** The road: session → readings → angles → swings → calibration → impulse bits → run. It reads like a method section; one file a step. */
import { expanded, finiteSources } from '../metrology/coverage.ts';
import { propagate, standardUncertainty, type Anchor, type Uncertain } from '../metrology/uncertain.ts';
import { dampingFactor, decrementOfRatio } from '../pendulum/damping.ts';
import { naturalFrequency } from '../pendulum/forms.ts';
import type { Problem } from '../problems/problems.ts';
import type { Choices, Session } from '../session/session.ts';
import { agreementOf, agreementRemark } from './agreement.ts';
import { benchEffectsOf } from './benchEffects.ts';
import { evidenceFrom } from './evidence.ts';
import { addedMassesTold, adjustmentTold, evidenceRemarks, evidenceRows } from './evidenceTold.ts';
import { explained } from './explain.ts';
import { calibrationResult, factorResult, withEvidence } from './factors.ts';
import { groundOf } from './ground.ts';
import { impulses, toThruster } from './impulse.ts';
import { planOf } from './plan.ts';
import { planMass } from './planMass.ts';
import { blanksOf, rangeOf, recordResults, withProblems } from './recordResults.ts';
import { differenceOf, remarksOnRun } from './remarks.ts';
import type { Configuration, PeriodCheck, Reduction } from './results.ts';
import type { Road } from './road.ts';
import { runOf, stated, type Run } from './run.ts';
import { readSheets, type SessionRecord } from './sheets.ts';
import type { Swing, Way } from './shots.ts';
import { periodOfBody, standByRoute, typedStiffness, valueOf, type Body, type ByConfiguration, type ConfigurationName, type Stand } from './stand.ts';
import type { Damping } from './swings.ts';
import { tapsAgainst } from './tapsAgainst.ts';
import { NO_TRACES, type TraceLibrary } from './traceRead.ts';
import { angleOfThrow, traceTold, type TraceKnown } from './traces.ts';
import type { TrainTold } from './traceResults.ts';
import { trainSwings, trainTold } from './trains.ts';
import { tapStudyOf } from './tapStudy.ts';

export function reduce(session: Session, explain: string | null, library: TraceLibrary = NO_TRACES): Reduction {
  const choices = session.choices;
  const problems: Problem[] = [];

  const sheets = readSheets(session);
  problems.push(...sheets.problems);
  const records = sheets.records;
  const setAside = (record: SessionRecord): string | null => session.marks[record.id]?.setAside?.reason ?? null;
  const counts = (record: SessionRecord): boolean => setAside(record) === null;

  const ground = groundOf(session, { records, counts, counted: records.filter(counts), library }, problems);
  const { bench, pressures, air, stand, scale, spread, damping, swung, timings, typedPeriod, period, weights, change, film, bodies, shares, corrections, swings, taps, places, known } = ground;
  const tapCalibration = known[choices.swingForm].tapCalibration;
  const evidence = evidenceFrom({ choices, stand, change, period: typedPeriod, timings, stiffness: typedStiffness(bench), weights: weights?.stiffness ?? null, taps: tapCalibration, ratio: seenRatios(damping) }, bodies);
  const factors = withEvidence(known, { full: evidence.bodies, smallAngle: evidence.bodies });

  const arms: ByConfiguration<Uncertain | null> = { shots: valueOf(bench, 'leverArm'), taps: valueOf(bench, 'tapLeverArm') };
  const form = choices.swingForm;
  const way = choices.calibration;
  const { delivered, impulse } = impulses(swings, factors, arms, corrections, choices);
  const thruster = (s: Swing): Uncertain | null => toThruster(delivered(s, form, way), s, corrections);
  const reported = choices.plume === 'carried' ? 'thruster' : choices.reported;
  const road: Road = { bench, scale, damping, pressures: pressures.byRecord, shares, arms, factors, swings, taps, corrections, delivered, impulse, thruster, form, way, reported, setAside };

  const shots = swings.filter((s) => s.record.kind === 'shot');
  const run = (which: Way, all: boolean): Run | null => {
    const items = shots.filter((s) => all || counts(s.record)).map((s) => impulse(s, form, which)).filter((y): y is Uncertain => y !== null);
    return runOf(items, shots.length, bench.sources);
  };
  const runs = { geometry: run('geometry', false), taps: run('taps', false) };
  const chosenRun = way === 'geometry' || way === 'taps' ? runs[way] : run(way, false);
  const hasTarget = corrections.target.length > 0;
  const countedShots = shots.filter((s) => counts(s.record));
  const runBy = (of: (s: Swing) => Uncertain | null): Run | null => runOf(countedShots.map(of).filter((y): y is Uncertain => y !== null), shots.length, bench.sources);
  const runOfDelivered = hasTarget ? runBy((s) => delivered(s, form, way)) : chosenRun;
  const runOfThruster = hasTarget ? runBy(thruster) : chosenRun;
  const anyAside = shots.some((s) => !counts(s.record));

  const results = recordResults(road);
  problems.push(...sheets.recordProblems);
  const difference = chosenRun ? differenceOf(factors[form].geometry.shots, factors[form].taps.shots) : null;
  problems.push(...remarksOnRun({ choices, records: results, run: chosenRun?.result ?? null, difference, damping, spread, taps: factors[form].tapCalibration, bench, period: periodCheck(stand, period, choices), sheets: sheets.sheets }));

  const plan = planOf(bench, choices, { scale, spread, damping: swung, shares, corrections: { ...corrections, background: { ...corrections.background, shots: corrections.background.taps } }, factors, arms, bodies, gravity: stand.gravity, markerRadius: valueOf(bench, 'markerRadius')?.value ?? null, records });
  const study = tapCalibration && tapStudyOf(tapCalibration, form, places);
  const adjustment = adjustmentTold(evidence.all);
  const masses = addedMassesTold(evidence, timings, choices.restoring === 'flexureAlone' ? 0 : stand.gravity?.value ?? 0, timings.length > 0 ? planMass(bench, choices, bodies, stand.gravity) : null);
  const routes = { masses: stand.masses, massesAndPeriod: null, inertiaAndPeriod: null, ...(period && stand.masses ? { massesAndPeriod: standByRoute(bench, stand, { ...choices, route: 'massesAndPeriod' }, period, []), inertiaAndPeriod: standByRoute(bench, stand, { ...choices, route: 'inertiaAndPeriod' }, period, []) } : {}) };
  const rows = evidenceRows({ choices, factors: factors[form], run: chosenRun, routes, found: evidence, timings, weights: weights?.told.weights ?? 0 });
  problems.push(...evidenceRemarks({
    choices, chosenKnown: factors[form][way].shots !== null, anyShots: shots.length > 0, study, adjustment, masses, runRelativeU: chosenRun ? chosenRun.result.mean.u / Math.abs(chosenRun.result.mean.value) : null,
  }));

  const agreement = agreementOf(session, ground, { records, counts, library });
  problems.push(...agreementRemark(agreement));
  // A slip that is named says the same and more.
  const told: ReadonlySet<string> = new Set(agreement && agreement.slips.length > 0 ? agreement.off.flatMap((id) => (id === 'period' ? ['period-differs'] : id === 'taps' ? ['calibrations-differ'] : [])) : []);
  const said = problems.filter(({ code }) => !told.has(code));

  const [K, arm] = [factors[form][way].shots, arms.shots];
  const impulseOfThrow = (jump: number, inVolts: boolean): number | null => {
    const angle = scale && angleOfThrow(jump, inVolts, scale, bench);
    return K && arm && angle !== null ? (K.value * angle) / arm.value : null;
  };

  const finite = finiteSources([factors[form].geometry, factors[form].taps, factors[form][way]].flatMap((f) => (f.shots ? [f.shots] : [])));
  const trains = trainSwings(ground.traces, bench, scale, shares.shots);
  const trainsOf = ({ trace, frequency, ratio }: TraceKnown): readonly TrainTold[] => trains.filter((one) => one.trace === trace.id).map((one) => {
    const y = impulse(one.swing, form, way);
    return trainTold(one, frequency!.value, ratio!.value, standardUncertainty(one.deflection), y && expanded(y, finite));
  });

  const opened = explain === null ? undefined : swings.find((s) => s.record.id === explain);
  return {
    problems: said,
    entries: bench.all,
    instruments: bench.instruments.told,
    sheets: sheets.sheets,
    records: withProblems(results, said),
    film: film?.told ?? null,
    pressure: pressures.told,
    air: { shots: air.shots?.told ?? null, taps: air.taps?.told ?? null },
    benchEffects: benchEffectsOf(bench, choices, { body: bodies?.shots ?? null, film: film && ground.filmStiffness !== null ? { stiffness: ground.filmStiffness, movedBy: film.movedBy } : null, gravity: stand.gravity, records: results, run: chosenRun?.result ?? null }),
    plan,
    gravity: stand.gravity ? stated(stand.gravity) : null,
    configurations: { shots: configuration('shots', bodies, damping), taps: configuration('taps', bodies, damping) },
    damping: { way: damping.way, law: damping.law, quadratic: stated(damping.quadratic.shots), friction: stated(damping.friction.shots), ratio: stated(damping.ratio.shots), logDecrement: stated(propagate(({ z }) => Math.sign(z) * decrementOfRatio(Math.min(Math.abs(z), 0.999)), { z: damping.ratio.shots })), records: damping.records },
    decay: damping.decay?.() ?? null,
    periodCheck: periodCheck(stand, period, choices),
    calibrations: {
      geometry: calibrationResult('geometry', factors, form),
      taps: calibrationResult('taps', factors, form),
    },
    chosen: way,
    chosenFactor: factorResult(factors[form][way].shots),
    evidence: rows,
    adjustment,
    weights: weights?.told ?? null,
    addedMasses: masses,
    tapStudy: study,
    traces: ground.traces.map((known) => traceTold(known, choices, bench, ground.wide.get(known.trace.id) ?? null, impulseOfThrow, trainsOf(known))),
    forceRecords: ground.forceRecords,
    comparisons: tapsAgainst({ damping, timings, bodies, records: records.filter(counts) }),
    agreement,
    difference,
    runs: { geometry: runs.geometry?.result ?? null, taps: runs.taps?.result ?? null },
    run: chosenRun?.result ?? null,
    delivered: runOfDelivered?.result ?? null,
    thruster: runOfThruster?.result ?? null,
    reported,
    plume: choices.plume,
    corrections: [...corrections.reading, ...(corrections.impulse ?? []), ...corrections.target].map(({ factor, ...words }) => ({ ...words, factor: stated(factor) })),
    runWithSetAside: anyAside ? run(way, true)?.result ?? null : null,
    blanks: blanksOf(road),
    ranges: { taps: rangeOf(road, 'tap'), shots: rangeOf(road, 'shot') },
    explained: opened ? explained(opened, road) : null,
  };
}

/** ζ as evidence: of each configuration from its own swings, or as typed. */
const seenRatios = ({ way, law, ratio, seen }: Damping): Damping['seen'] => (way === 'none' || law !== 'viscous' ? { shots: null, taps: null } : way === 'swings' ? seen : { shots: ratio.shots, taps: null });

function periodCheck(stand: Stand, period: Anchor | null, choices: Choices): PeriodCheck | null {
  if (!period || !stand.masses) return null;
  const predicted = periodOfBody(stand.masses[choices.periodTimedAs]);
  const gap = stated(propagate(({ m, p }) => m - p, { m: period, p: predicted }));
  return { measured: stated(period), predicted: stated(predicted), inU: gap.u === 0 ? 0 : gap.value / gap.u };
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
