/** What to check at the bench, sized for this bench from what was typed; typical values where nothing was, said so. */
import * as effects from '../pendulum/benchEffects.ts';
import type { BenchEffectId } from '../problems/benchEffects.ts';
import type { Choices } from '../session/session.ts';
import type { Uncertain } from '../metrology/uncertain.ts';
import type { Dimension } from '../units/units.ts';
import type { BenchRead } from './entries.ts';
import type { BenchEffect, RecordResult, RunResult } from './results.ts';
import { valueOf, type Body } from './stand.ts';

export interface BenchFacts {
  readonly body: Body | null;
  /** A hanging film: κ of its first mode as the calibration factor and the period make it, N·m/rad, and what moving its struck zone does; null for any other stand. */
  readonly film: { readonly stiffness: number; readonly movedBy: (shift: number) => number } | null;
  readonly gravity: Uncertain | null;
  readonly records: readonly RecordResult[];
  readonly run: RunResult | null;
}

/** An effect that makes more than this part of the run's relative u, or than the second of the impulse bit, could matter. Judgement. */
const PART_OF_U = 0.2;
const PART_OF_IMPULSE = 5e-3;

type Taken = BenchEffect['taken'][number];
const taken = (what: string, value: number, dimension: Dimension): Taken => ({ what, value, dimension });

/** Typical values. Source: methods 1.18; elastic and friction constants from memory. */
const TYPICAL = {
  inductance: 0.5e-6, energy: 11.25, capacitance: 10e-6, resistance: 0.05, voltage: 1500, leadLength: 0.1, field: 50e-6,
  face: 0.01, gap: 0.05, rollingLever: 5e-6, edgeRadius: 0.2e-3,
  copper: 120e9, wireDiameter: 0.25e-3, wireLength: 0.05, tilt: 10e-6, axisTilt: 1e-3, offAxis: 0.01,
  bracketMass: 0.01, bracketLength: 0.05, warming: 10, offLine: 5e-3, readOff: 0.05, gyration: 0.05, halfSpacing: 0.05,
  wander: 0.01, hosePressure: 2e5, hoseBore: 1e-3, hoseDrop: 0.01, hoseTime: 0.05,
} as const;
/** A bracket is taken as no more than this part of what swings. */
const BRACKET_PART = 0.25;
/** A strip lighter than this part of its plate may be a limp tape. */
const LIGHT_STRIP = 0.1;
/** Read within this part of the plate's distance, it is read at its centre of mass. */
const AT_CENTRE = 0.05;

/** Mass and Σ m r of what swings, kg, kg·m; null where the masses are not known. */
function massesOf(bench: BenchRead, choices: Choices): { readonly mass: number; readonly moment: number } | null {
  const value = (name: Parameters<typeof valueOf>[1]): number => valueOf(bench, name)?.value ?? Number.NaN;
  const sum = (parts: readonly (readonly [number, number])[]): { mass: number; moment: number } | null => {
    const mass = parts.reduce((all, [m]) => all + m, 0);
    return mass > 0 ? { mass, moment: parts.reduce((all, [m, r]) => all + m * r, 0) } : null;
  };
  switch (choices.form) {
    case 'pointBob': return sum([[value('bobMass'), value('bobDistance')]]);
    case 'uniformStrip': return sum([[value('stripMass'), value('stripLength') / 2]]);
    case 'stripWithPlate': return sum([[value('stripMass'), value('stripLength') / 2], [value('plateMass'), value('plateDistance')]]);
    case 'bodyOfParts': return sum(bench.parts.map(({ entries }) => [entries.get('mass')?.value?.value ?? Number.NaN, entries.get('distance')?.value?.value ?? Number.NaN]));
    case 'periodAndStiffness':
    case 'filmStrip': return null;
  }
}

/** Part of I that a relative change of κ makes: K = √(J κ), by the route that knows J and κ; taps in place feel it too. */
function stiffnessInImpulse({ calibration, route, form }: Choices): number {
  if (calibration === 'taps') return 0;
  if (form === 'periodAndStiffness') return 0;
  return route === 'masses' ? 0.5 : route === 'massesAndPeriod' ? 1 : 0;
}

const meanOf = (values: readonly number[]): number | null => (values.length === 0 ? null : values.reduce((a, b) => a + b, 0) / values.length);

type Found = Omit<BenchEffect, 'matters'>;

/** Every effect that can befall the bench, largest first. Without a run mean nothing can be sized. */
export function benchEffectsOf(bench: BenchRead, choices: Choices, { body, film, gravity, records, run }: BenchFacts): readonly BenchEffect[] {
  const shots = records.filter((r) => r.kind === 'shot' && r.setAside === null);
  const firstSwing = meanOf(shots.flatMap((r) => (r.angle ? [Math.abs(r.angle.value)] : [])));
  const arm = valueOf(bench, 'leverArm')?.value;
  if (!run || !gravity || !arm || !firstSwing || run.mean.value === 0) return [];
  const relative = run.mean.u / Math.abs(run.mean.value);
  const largestFirst = (found: readonly Found[]): readonly BenchEffect[] =>
    found.map((one) => ({ ...one, matters: one.ofImpulse > Math.min(PART_OF_U * relative, PART_OF_IMPULSE) })).sort((a, b) => b.ofImpulse - a.ofImpulse);
  if (film) {
    const voltage = meanOf(shots.flatMap((r) => (r.readings.voltage !== null && r.readings.voltage > 0 ? [r.readings.voltage] : [])));
    return largestFirst(ofFilm(bench, film, { stiffness: film.stiffness, mass: 0, centreOfMass: 0, g: gravity.value, leverArm: arm, impulse: run.mean.value, firstSwing }, voltage));
  }
  if (!body) return [];
  const masses = massesOf(bench, choices);
  // Where masses are not known M g d is the gravity share of κ, and what needs M alone is left out.
  const moment = masses?.moment ?? (body.gravityShare.value * body.stiffness.value) / gravity.value;
  const pendulum: effects.Bench = {
    stiffness: body.stiffness.value, mass: masses?.mass ?? 0, centreOfMass: masses ? moment / masses.mass : 0, g: gravity.value, leverArm: arm, impulse: run.mean.value, firstSwing,
  };
  const voltages = shots.flatMap((r) => (r.readings.voltage !== null && r.readings.voltage > 0 ? [r.readings.voltage] : []));
  const found: Found[] = [
    ...discharge(bench, choices, pendulum, meanOf(voltages)),
    ...pivot(choices, pendulum, masses !== null),
    ...stiffening(choices, pendulum),
    ...resting(choices, pendulum, masses !== null),
    ...modes(bench, choices),
    ...plume(choices, pendulum),
  ];
  return largestFirst(found);
}

/**
 * Of methods 1.18 on a hanging film: it carries no discharge, no wires, no hose and no pivot. What stays is the pull on a charged film, its
 * stand that tilts, the plate below it, and a plume that strikes elsewhere, by the slope of the film's own coefficient. The air is in the
 * calibration factor.
 */
function ofFilm(bench: BenchRead, film: NonNullable<BenchFacts['film']>, pendulum: effects.Bench, voltage: number | null): readonly Found[] {
  const value = (name: Parameters<typeof valueOf>[1]): number => valueOf(bench, name)?.value ?? Number.NaN;
  const struck = value('filmWidth') * (value('zoneTo') - value('zoneFrom'));
  const area = struck > 0 ? struck : TYPICAL.face;
  const V = voltage ?? TYPICAL.voltage;
  const pull = effects.electrostaticPull(pendulum, { area, voltage: V, gap: TYPICAL.gap });
  const moved = film.movedBy(TYPICAL.wander);
  const readAt = (valueOf(bench, 'readingRadius') ?? valueOf(bench, 'rulerHeight') ?? valueOf(bench, 'sensorHeight'))?.value ?? 0;
  const plate = effects.plateOnTape(Math.abs(readAt / value('filmLength') - 1) > AT_CENTRE ? 'bottomEdge' : 'centreOfMass');
  return [
    ofRest('chargedTarget', pull, [...(struck > 0 ? [] : [taken('square face of', Math.sqrt(area), 'length')]), taken('opposite at', TYPICAL.gap, 'length'), ...(voltage === null ? [taken('charge voltage', V, 'voltage')] : [])], effects.chargedRestChange(-pull.share)),
    ofRest('tilt', effects.standTilt(pendulum, TYPICAL.tilt), [taken('tilt of', TYPICAL.tilt, 'angle')]),
    ofImpulse('plumeWander', { impulse: Math.abs(pendulum.impulse) * moved, share: moved }, [taken('shift of', TYPICAL.wander, 'length')]),
    ...(valueOf(bench, 'plateMass') ? [{ id: 'doublePendulum' as const, size: { value: plate.largest, dimension: 'number' as const }, share: { of: 'firstSwing' as const, value: plate.largest }, ofImpulse: plate.largest, taken: [] }] : []),
  ];
}

const ofImpulse = (id: BenchEffectId, { impulse, share }: effects.ImpulseEffect, values: readonly Taken[]): Found =>
  ({ id, size: { value: impulse, dimension: 'impulse' }, share: { of: 'impulse', value: share }, ofImpulse: share, taken: values });
const ofRest = (id: BenchEffectId, { rest, share }: effects.RestEffect, values: readonly Taken[], change = share): Found =>
  ({ id, size: { value: rest, dimension: 'angle' }, share: { of: 'firstSwing', value: share }, ofImpulse: Math.abs(change), taken: values });
const ofStiffness = (id: BenchEffectId, { stiffness, share }: effects.StiffnessEffect, values: readonly Taken[], choices: Choices): Found =>
  ({ id, size: { value: stiffness, dimension: 'rotationalStiffness' }, share: { of: 'stiffness', value: share }, ofImpulse: Math.abs(share) * stiffnessInImpulse(choices), taken: values });

function discharge(bench: BenchRead, choices: Choices, pendulum: effects.Bench, voltage: number | null): readonly Found[] {
  const typed = { capacitance: valueOf(bench, 'capacitance')?.value, resistance: valueOf(bench, 'leadResistance')?.value };
  const V = voltage ?? TYPICAL.voltage;
  const C = typed.capacitance ?? TYPICAL.capacitance;
  const R = typed.resistance ?? TYPICAL.resistance;
  const atVoltage = voltage === null ? [taken('charge voltage', V, 'voltage')] : [];
  const charged = [...(typed.capacitance ? [] : [taken('capacitance', C, 'capacitance')]), ...atVoltage];
  const near = [taken('square face of', Math.sqrt(TYPICAL.face), 'length'), taken('opposite at', TYPICAL.gap, 'length'), ...atVoltage];
  const pull = effects.electrostaticPull(pendulum, { area: TYPICAL.face, voltage: V, gap: TYPICAL.gap });
  // The worse of the two ways in which it may be drawn.
  const lost = effects.chargedRestChange(-pull.share);
  if (choices.plume === 'caught') return [ofRest('chargedTarget', pull, near, lost)];
  return [
    ofImpulse('leads', effects.leadsImpulse(pendulum, { inductancePerLength: TYPICAL.inductance, energy: effects.storedEnergy({ capacitance: C, voltage: V }), resistance: R }),
      [...charged, ...(typed.resistance ? [] : [taken('circuit of', R, 'resistance')])]),
    ofImpulse('earthField', effects.earthFieldImpulse(pendulum, { charge: C * V, length: TYPICAL.leadLength, field: TYPICAL.field }),
      [...charged, taken('lead of', TYPICAL.leadLength, 'length'), taken('field of', TYPICAL.field, 'magneticFluxDensity')]),
    ofRest('chargedArm', pull, near, lost),
  ];
}

function pivot(choices: Choices, pendulum: effects.Bench, massKnown: boolean): readonly Found[] {
  if (!massKnown || choices.restoring === 'flexureAlone') return [];
  const friction = effects.pivotFriction(pendulum, TYPICAL.rollingLever);
  return [
    // Friction typed or fitted is reckoned with already.
    ...(choices.dampingWay === 'friction' || choices.dampingLaw === 'friction' ? [] : [ofRest('pivotFriction', friction, [taken('rolling lever of', TYPICAL.rollingLever, 'length')], friction.launchGain)]),
    ofStiffness('edgeRolling', effects.edgeRolling(pendulum, TYPICAL.edgeRadius), [taken('edge radius of', TYPICAL.edgeRadius, 'length')], choices),
  ];
}

function stiffening(choices: Choices, pendulum: effects.Bench): readonly Found[] {
  const wire = effects.wireStiffness(pendulum, { modulus: TYPICAL.copper, diameter: TYPICAL.wireDiameter, bore: 0, length: TYPICAL.wireLength });
  const flexed = effects.warmedFlexure(pendulum, { warming: TYPICAL.warming, perKelvin: effects.MODULUS_CHANGE });
  return [
    ofStiffness('wires', wire.largest, [taken('copper wire of', TYPICAL.wireDiameter, 'length'), taken('and a length of', TYPICAL.wireLength, 'length')], choices),
    ...(flexed.stiffness !== 0 && pendulum.mass > 0 ? [{ ...ofStiffness('warmedFlexure', flexed, [taken('warmer by', TYPICAL.warming, 'celsius')], choices), ofImpulse: Math.abs(flexed.share) / 2 }] : []),
  ];
}

function resting(choices: Choices, pendulum: effects.Bench, massKnown: boolean): readonly Found[] {
  if (choices.restoring === 'flexureAlone') {
    if (!massKnown) return [];
    return [ofStiffness('axisTilt', effects.torsionAxisTilt(pendulum, { tilt: TYPICAL.axisTilt, offAxis: TYPICAL.offAxis }), [taken('axis tilted by', TYPICAL.axisTilt, 'angle'), taken('centre of mass off the axis by', TYPICAL.offAxis, 'length')], choices)];
  }
  const mass = Math.min(TYPICAL.bracketMass, BRACKET_PART * pendulum.mass);
  const bracketed = massKnown && (choices.form === 'bodyOfParts' || choices.form === 'pointBob');
  return [
    ofRest('tilt', effects.standTilt(pendulum, TYPICAL.tilt), [taken('tilt of', TYPICAL.tilt, 'angle')]),
    ...(bracketed ? [ofRest('heatedBracket', effects.heatedBracket(pendulum, { mass, length: TYPICAL.bracketLength, expansion: effects.ALUMINIUM_EXPANSION, warming: TYPICAL.warming }),
      [taken('mass of', mass, 'mass'), taken('on aluminium of', TYPICAL.bracketLength, 'length'), taken('warmer by', TYPICAL.warming, 'celsius')])] : []),
  ];
}

function modes(bench: BenchRead, choices: Choices): readonly Found[] {
  const read = (id: BenchEffectId, value: number, values: readonly Taken[]): Found => ({ id, size: { value, dimension: 'number' }, share: { of: 'firstSwing', value }, ofImpulse: value, taken: values });
  if (choices.form === 'pointBob') {
    const { offLine, readOff, gyration, halfSpacing } = TYPICAL;
    return [read('yaw', effects.yawOnWires({ offLine, readOff, gyration, halfSpacing }).share, [taken('struck off the centre by', offLine, 'length'), taken('read off it by', readOff, 'length'), taken('wires apart by', 2 * halfSpacing, 'length')])];
  }
  const [strip, plate, distance] = [valueOf(bench, 'stripMass')?.value, valueOf(bench, 'plateMass')?.value, valueOf(bench, 'plateDistance')?.value];
  if (choices.form !== 'stripWithPlate' || !strip || !plate || !distance || strip > LIGHT_STRIP * plate) return [];
  const radius = (valueOf(bench, 'readingRadius') ?? valueOf(bench, 'rulerHeight') ?? valueOf(bench, 'sensorHeight'))?.value;
  const at = radius !== undefined && Math.abs(radius / distance - 1) > AT_CENTRE ? 'bottomEdge' : 'centreOfMass';
  return [read('doublePendulum', effects.plateOnTape(at).largest, [])];
}

function plume(choices: Choices, pendulum: effects.Bench): readonly Found[] {
  const hose = effects.hosePush(pendulum, { pressure: TYPICAL.hosePressure, bore: TYPICAL.hoseBore, drop: TYPICAL.hoseDrop, duration: TYPICAL.hoseTime });
  return [
    ofImpulse('plumeWander', effects.plumeWander(pendulum, TYPICAL.wander), [taken('shift of', TYPICAL.wander, 'length')]),
    ...(choices.plume === 'carried' ? [ofImpulse('feedHose', hose, [
      taken('bore of', TYPICAL.hoseBore, 'length'), taken('feed at', TYPICAL.hosePressure, 'pressure'), taken('a drop of', TYPICAL.hoseDrop, 'number'), taken('for', TYPICAL.hoseTime, 'time'),
    ])] : []),
  ];
}
