/** The road: session → readings → angles → swings → calibration → impulse bits → run. It reads like a method section; one file a step. */
import { anchor, exact, propagate, type Anchor, type Uncertain } from '../metrology/uncertain.ts';
import { dampingFactor, decrementOfRatio } from '../pendulum/damping.ts';
import { naturalFrequency } from '../pendulum/forms.ts';
import { undampedSmallPeriod } from '../pendulum/period.ts';
import { problem, type Problem } from '../problems/problems.ts';
import { ENTRIES } from '../session/entries.ts';
import type { Choices, Session } from '../session/session.ts';
import { airOf, filmInAir, stripInAir } from './air.ts';
import { benchEffectsOf } from './benchEffects.ts';
import { correctionsOf } from './corrections.ts';
import { readBench, type BenchRead } from './entries.ts';
import { evidenceFrom, stiffnessAs } from './evidence.ts';
import { addedMassesTold, adjustmentTold, evidenceRemarks, evidenceRows } from './evidenceTold.ts';
import { explained } from './explain.ts';
import { filmOf } from './film.ts';
import { calibrationResult, factorResult, factorsOf, withEvidence } from './factors.ts';
import { backgroundAngle, impulses, toThruster } from './impulse.ts';
import { gasDiffers, pressuresOf } from './pressure.ts';
import { readingSpread, readingsOf } from './readings.ts';
import { planOf } from './plan.ts';
import { planMass } from './planMass.ts';
import { blanksOf, rangeOf, recordResults, withProblems } from './recordResults.ts';
import { differenceOf, remarksOnRun } from './remarks.ts';
import type { Configuration, PeriodCheck, Reduction } from './results.ts';
import type { Road } from './road.ts';
import { runOf, stated, type Run } from './run.ts';
import { scaleOf } from './scale.ts';
import { readSheets, type SessionRecord } from './sheets.ts';
import { swingOf, type Swing, type Way } from './shots.ts';
import { changeOfConfiguration, missingEntries, periodOfBody, typedStiffness, readStand, standByRoute, valueOf, type Body, type ByConfiguration, type ConfigurationName, type Stand } from './stand.ts';
import { dampingOf, type Damping } from './swings.ts';
import { tapsOf } from './tapImpulse.ts';
import { placesInRun } from './taps.ts';
import { tapStudyOf } from './tapStudy.ts';
import { barePeriod, timingsOf } from './timings.ts';
import { weightsOf } from './weights.ts';

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
  const asked = records.length > 0 || valueOf(bench, 'guessedImpulse') !== null;
  if (asked) {
    const timedInTable = records.some((record) => counts(record) && record.swingsTime !== null && record.massHung === null && record.massHungAt === null);
    for (const name of missingEntries(bench, choices)) if (name !== 'period' || !timedInTable) problems.push(problem('entry-missing', 'stops', { entry: name }, { label: ENTRIES[name].label }));
  }
  const pressures = pressuresOf(bench, choices, records, counts, problems);
  const strip = stripInAir(bench, choices);
  const air = airOf(bench, choices, strip, pressures, problems);
  const stand = readStand(bench, choices, air, gasDiffers(pressures));
  problems.push(...stand.problems);
  const scale = scaleOf(bench, choices);

  const spread = readingSpread(records, bench, problems);
  const read = readingsOf(records, spread, choices, bench);
  problems.push(...read.problems);

  const damping = dampingOf(session, bench, stand, scale, records, read.byRecord, spread, counts, problems);
  const counted = records.filter(counts);
  const unknown = anchor(exact(stand.shareUnknown));
  const shareOf = (name: ConfigurationName): Anchor => stand.masses?.[name].gravityShare ?? unknown;
  const timings = timingsOf(counted, { bench, choices, ratio: damping.ratio, shares: { shots: shareOf('shots'), taps: shareOf('taps') } }, problems);
  const typedPeriod = timedPeriod(session, bench, stand, damping, problems);
  const period = typedPeriod ?? barePeriod(timings, choices.periodTimedAs);
  const weights = weightsOf(counted, { bench, choices, scale, spread, gravity: stand.gravity, share: shareOf(choices.weightsHungAs) }, problems);
  const change = choices.form === 'filmStrip' ? null : changeOfConfiguration(bench, choices, stand);
  const film = choices.form === 'filmStrip' && asked ? filmOf(bench, choices, stand.gravity, damping.ratio, problems) : null;
  const filmFactors = film && strip && filmInAir(film.factors, air, strip, valueOf(bench, 'plateMass'));
  const weighed = weights && change && stiffnessAs(weights.stiffness, choices.weightsHungAs, choices.periodTimedAs, change);
  const bodies = standByRoute(bench, stand, choices, period, problems, weighed);
  const shares: ByConfiguration<Anchor> = bodies
    ? { shots: bodies.shots.gravityShare, taps: bodies.taps.gravityShare }
    : { shots: shareOf('shots'), taps: shareOf('taps') };

  const frequency = film ? exact((2 * Math.PI) / (film.told.period * (filmFactors?.stretch ?? 1))) : bodies ? propagate(naturalFrequency, { inertia: bodies.shots.inertia, stiffness: bodies.shots.stiffness }) : period && propagate(({ T }) => (2 * Math.PI) / T, { T: period });
  const corrections = correctionsOf(bench, choices, { body: bodies?.shots ?? null, frequency, ratio: damping.ratio.shots, gravity: stand.gravity }, backgroundAngle(bench, scale), problems);
  const swung = film ? undampedOf(damping) : damping;
  const swings = records.map((record) => swingOf(record, read.byRecord.get(record.id)!, scale, swung, shares, corrections, problems));
  const tapped = bodies && propagate(naturalFrequency, { inertia: bodies.taps.inertia, stiffness: bodies.taps.stiffness });
  const taps = tapsOf(swings, { bench, choices, gravity: stand.gravity, frequency: tapped ?? frequency, ratio: damping.ratio.taps }, problems);
  const taken = new Map(session.sheets.map((sheet) => [sheet.id, sheet.taken ?? ('asOrdered' as const)]));
  const places = placesInRun(swings, ({ record }) => taken.get(record.sheet) ?? 'asOrdered');
  const known = factorsOf({ bodies, film: filmFactors, stand, taps: taps.filter((tap) => counts(tap.swing.record)), places, choices });
  const tapCalibration = known[choices.swingForm].tapCalibration;
  const evidence = evidenceFrom({ choices, stand, change, period: typedPeriod, timings, stiffness: typedStiffness(bench), weights: weights?.stiffness ?? null, taps: tapCalibration, ratio: { shots: damping.way === 'none' || damping.law !== 'viscous' ? null : damping.ratio.shots, taps: null } }, bodies);
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

  const plan = planOf(bench, choices, { scale, spread, damping: swung, shares, corrections, factors, arms, bodies, gravity: stand.gravity, records });
  const study = tapCalibration && tapStudyOf(tapCalibration, form, places);
  const adjustment = adjustmentTold(evidence.all);
  const masses = addedMassesTold(evidence, timings, choices.restoring === 'flexureAlone' ? 0 : stand.gravity?.value ?? 0, timings.length > 0 ? planMass(bench, choices, bodies, stand.gravity) : null);
  const routes = { masses: stand.masses, massesAndPeriod: null, inertiaAndPeriod: null, ...(period && stand.masses ? { massesAndPeriod: standByRoute(bench, stand, { ...choices, route: 'massesAndPeriod' }, period, []), inertiaAndPeriod: standByRoute(bench, stand, { ...choices, route: 'inertiaAndPeriod' }, period, []) } : {}) };
  const rows = evidenceRows({ choices, factors: factors[form], run: chosenRun, routes, found: evidence, timings, weights: weights?.told.weights ?? 0 });
  problems.push(...evidenceRemarks({
    choices, chosenKnown: factors[form][way].shots !== null, anyShots: shots.length > 0, study, adjustment, masses, runRelativeU: chosenRun ? chosenRun.result.mean.u / Math.abs(chosenRun.result.mean.value) : null,
  }));

  const opened = explain === null ? undefined : swings.find((s) => s.record.id === explain);
  return {
    problems,
    entries: bench.all,
    sheets: sheets.sheets,
    records: withProblems(results, problems),
    film: film?.told ?? null,
    pressure: pressures.told,
    air: { shots: air.shots?.told ?? null, taps: air.taps?.told ?? null },
    benchEffects: benchEffectsOf(bench, choices, { body: bodies?.shots ?? null, gravity: stand.gravity, records: results, run: chosenRun?.result ?? null }),
    plan,
    gravity: stand.gravity ? stated(stand.gravity) : null,
    configurations: { shots: configuration('shots', bodies, damping), taps: configuration('taps', bodies, damping) },
    damping: { way: damping.way, law: damping.law, quadratic: stated(damping.quadratic.shots), friction: stated(damping.friction.shots), ratio: stated(damping.ratio.shots), logDecrement: stated(propagate(({ z }) => Math.sign(z) * decrementOfRatio(Math.min(Math.abs(z), 0.999)), { z: damping.ratio.shots })), records: damping.records },
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

/** The film's modes carry the damping of its first maximum themselves. */
function undampedOf(damping: Damping): Damping {
  const zero = anchor(exact(0));
  const both = { shots: zero, taps: zero };
  return { ...damping, ratio: both, quadratic: both, friction: both };
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
