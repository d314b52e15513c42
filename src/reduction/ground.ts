/** What the shots stand on: bench, pressure, stand, scale, damping, period and bodies, and the swings and taps of the records; the road up to the calibration factors. */
import { anchor, exact, propagate, type Anchor } from '../metrology/uncertain.ts';
import { naturalFrequency } from '../pendulum/forms.ts';
import { undampedSmallPeriod } from '../pendulum/period.ts';
import { problem, type Problem } from '../problems/problems.ts';
import { readPulseSamples, type PulseSamples } from '../readings/pulseSamples.ts';
import { ENTRIES } from '../session/entries.ts';
import type { Session } from '../session/session.ts';
import { airOf, filmInAir, stripInAir } from './air.ts';
import { backgroundOf } from './background.ts';
import { correctionsOf } from './corrections.ts';
import { forceRecordsOf } from './forceRecords.ts';
import { readBench, type BenchRead } from './entries.ts';
import { stiffnessAs } from './evidence.ts';
import { factorsOf } from './factors.ts';
import { filmOf } from './film.ts';
import { gasDiffers, pressuresOf } from './pressure.ts';
import { readingSpread, readingsOf, type ReadingSpread } from './readings.ts';
import { scaleOf } from './scale.ts';
import type { SessionRecord } from './sheets.ts';
import { swingOf } from './shots.ts';
import { changeOfConfiguration, missingEntries, readStand, standByRoute, valueOf, type ByConfiguration, type ConfigurationName, type Stand } from './stand.ts';
import { dampingOf, type Damping } from './swings.ts';
import { tapsOf } from './tapImpulse.ts';
import { placesInRun } from './taps.ts';
import { barePeriod, timingsOf } from './timings.ts';
import type { Expected } from './traceFit.ts';
import { NO_TRACES, type TraceLibrary } from './traceRead.ts';
import { knownTraces, swingsOfTraces, timingsOfTraces } from './traces.ts';
import { wideSwings, type WideSwing } from './wideSwings.ts';
import { weightsOf } from './weights.ts';

export interface GroundRecords {
  readonly records: readonly SessionRecord[];
  readonly counts: (record: SessionRecord) => boolean;
  readonly counted: readonly SessionRecord[];
  /** Readings without uncertainty: values alone are asked for. */
  readonly exactly?: true;
  /** Records of the session's traces; absent: none are at hand. */
  readonly library?: TraceLibrary;
}

const EXACT: ReadingSpread = { division: 0, divisionTyped: true, eye: 0 };

export type Ground = ReturnType<typeof groundOf>;

export function groundOf(session: Session, { records, counts, counted, exactly, library = NO_TRACES }: GroundRecords, problems: Problem[]) {
  const { choices } = session;
  const bench = readBench(session);
  problems.push(...bench.problems);
  const asked = records.length > 0 || session.traces.length > 0 || valueOf(bench, 'guessedImpulse') !== null;
  if (asked) {
    const timedInTable = session.traces.length > 0 || records.some((record) => counts(record) && record.swingsTime !== null && record.massHung === null && record.massHungAt === null);
    for (const name of missingEntries(bench, choices)) if (name !== 'period' || !timedInTable) problems.push(problem('entry-missing', 'stops', { entry: name }, { label: ENTRIES[name].label }));
  }
  const pressures = pressuresOf(bench, choices, records, counts, problems);
  const strip = stripInAir(bench, choices);
  const air = airOf(bench, choices, strip, pressures, problems);
  const stand = readStand(bench, choices, air, gasDiffers(pressures));
  problems.push(...stand.problems);
  const scale = scaleOf(bench, choices);

  const spread = exactly ? EXACT : readingSpread(records, bench, problems);
  const read = readingsOf(records, spread, choices, bench);
  problems.push(...read.problems);

  const damping = dampingOf(session, bench, stand, scale, records, read.byRecord, spread, counts, problems);
  const unknown = anchor(exact(stand.shareUnknown));
  const shareOf = (name: ConfigurationName): Anchor => stand.masses?.[name].gravityShare ?? unknown;
  const known = knownTraces(session, library, bench, expectedSwing(stand, damping), problems);
  const wide = choices.form === 'filmStrip' ? new Map<string, WideSwing>() : wideSwings(known, bench, scale, (name) => shareOf(name).value, problems);
  const timings = [...timingsOf(counted, { bench, choices, ratio: damping.ratio, shares: { shots: shareOf('shots'), taps: shareOf('taps') } }, problems), ...timingsOfTraces(known, wide)];
  const typedPeriod = timedPeriod(session, bench, stand, damping, problems);
  const period = typedPeriod ?? barePeriod(timings, choices.periodTimedAs);
  const weights = weightsOf(counted, { bench, choices, scale, spread, gravity: stand.gravity, share: shareOf(choices.weightsHungAs) }, problems);
  const change = choices.form === 'filmStrip' ? null : changeOfConfiguration(bench, choices, stand);
  const film = choices.form === 'filmStrip' && asked ? filmOf(bench, choices, stand.gravity, damping.ratio, problems) : null;
  const filmFactors = film && strip && filmInAir(film, air, strip, valueOf(bench, 'plateMass'));
  const weighed = weights && change && stiffnessAs(weights.stiffness, choices.weightsHungAs, choices.periodTimedAs, change);
  const bodies = standByRoute(bench, stand, choices, period, problems, weighed);
  const shares: ByConfiguration<Anchor> = bodies
    ? { shots: bodies.shots.gravityShare, taps: bodies.taps.gravityShare }
    : { shots: shareOf('shots'), taps: shareOf('taps') };

  const frequency = film ? exact((2 * Math.PI) / (film.told.period * (filmFactors?.stretch ?? 1))) : bodies ? propagate(naturalFrequency, { inertia: bodies.shots.inertia, stiffness: bodies.shots.stiffness }) : period && propagate(({ T }) => (2 * Math.PI) / T, { T: period });
  const corrections = correctionsOf(bench, choices, { body: bodies?.shots ?? null, frequency, ratio: damping.ratio.shots, gravity: stand.gravity }, { background: backgroundOf(records, { bench, choices, scale, frequency, ratio: damping.ratio.shots, spread }, problems), pulse: measuredPulse(session, problems) }, problems);
  const swung = film ? undampedOf(damping) : damping;
  const handRead = records.map((record) => swingOf(record, read.byRecord.get(record.id)!, scale, swung, shares, corrections, problems));
  const swings = [...handRead, ...swingsOfTraces(known, bench, scale, wide, problems)];
  const tapped = bodies && propagate(naturalFrequency, { inertia: bodies.taps.inertia, stiffness: bodies.taps.stiffness });
  const forceRecords = forceRecordsOf(session.forceRecords, problems);
  const taps = tapsOf(swings, { bench, choices, forceRecords, gravity: stand.gravity, frequency: tapped ?? frequency, ratio: damping.ratio.taps }, problems);
  const taken = new Map(session.sheets.map((sheet) => [sheet.id, sheet.taken ?? ('asOrdered' as const)]));
  const places = placesInRun(swings, ({ record }) => taken.get(record.sheet) ?? 'asOrdered');
  const factors = factorsOf({ bodies, film: filmFactors, stand, taps: taps.filter((tap) => counts(tap.swing.record)), places, choices });
  return { bench, pressures, air, stand, scale, spread, damping, swung, timings, typedPeriod, period, weights, change, film, filmStiffness: frequency && filmFactors?.geometry.shots ? filmFactors.geometry.shots.value * frequency.value : null, bodies, shares, corrections, swings, traces: known, wide, forceRecords: forceRecords.told, taps, places, known: factors };
}

/** Frequency and damping that the bench makes, for traces that show none. */
function expectedSwing(stand: Stand, damping: Damping): Expected {
  const body = stand.masses?.shots;
  return body ? { frequency: naturalFrequency({ inertia: body.inertia.value, stiffness: body.stiffness.value }), ratio: Math.min(0.9, Math.max(0, damping.ratio.shots.value)) } : null;
}

/** The measured pulse, where it is the one chosen. */
function measuredPulse({ choices, pulseSamples }: Session, problems: Problem[]): PulseSamples | null {
  if (!choices.correctPulse || choices.pulseShape !== 'measured') return null;
  const { samples, problems: found } = readPulseSamples(pulseSamples);
  problems.push(...found);
  return samples;
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
