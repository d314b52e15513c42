/** Second step: gravity, inertia and stiffness of the pendulum as fired and as tapped, by the chosen route. */
import { anchor, combine, exact, ofSource, propagate, standardUncertainty, type Anchor, type Uncertain } from '../metrology/uncertain.ts';
import { fromLimits, type Source } from '../metrology/source.ts';
import {
  bobInertia, bobMoment, geometryFactor, gravityShare, inertiaOfPeriod, partInertia, partMoment, smallPeriod, stiffness, stiffnessOfPeriod, stripInertia, stripMoment,
} from '../pendulum/forms.ts';
import { carriedByOwnPivot, hammerInertia } from '../pendulum/hammer.ts';
import { GRAVITY_ANOMALY, normalGravity } from '../pendulum/gravity.ts';
import { problem, type Problem } from '../problems/problems.ts';
import type { EntryName, PartEntryName } from '../session/entries.ts';
import type { Choices } from '../session/session.ts';
import type { AirEffect } from './air.ts';
import { entriesInUse, type BenchRead } from './entries.ts';

export type ConfigurationName = 'shots' | 'taps';
export type ByConfiguration<T> = Readonly<Record<ConfigurationName, T>>;

/** J, κ and p of the pendulum in one configuration, each an anchor. */
export interface Body {
  readonly inertia: Anchor;
  readonly stiffness: Anchor;
  readonly gravityShare: Anchor;
}

export interface Stand {
  readonly gravity: Anchor | null;
  /** From masses and lengths alone; null where they are not typed. */
  readonly masses: Readonly<Record<ConfigurationName, Body>> | null;
  /** By the chosen route; equal to `masses` on that route. Known once the damping is. */
  readonly problems: readonly Problem[];
  /** Gravity share to use where masses are unknown: 1 without a flexure. */
  readonly shareUnknown: number;
  /** Shots and taps swing in gas of different pressure, which damps them differently. */
  readonly gasDiffers: boolean;
}

/** Standard gravity, CGPM 1901, taken where nothing is typed, with limits that hold everywhere at sea level to 3 km. */
const STANDARD_GRAVITY = 9.80665;
const GRAVITY_LIMITS = 0.035;

/** value of an entry, or null; blank optional entries give `otherwise`. */
export const valueOf = (bench: BenchRead, name: EntryName): Uncertain | null => bench.entries.get(name)?.value ?? null;

export function missingEntries(bench: BenchRead, choices: Choices): readonly EntryName[] {
  return [...entriesInUse(choices).needed].filter((name) => bench.entries.get(name)?.value === null);
}

export function readStand(bench: BenchRead, choices: Choices, air: ByConfiguration<AirEffect | null>, gasDiffers: boolean): Stand {
  const problems: Problem[] = [];
  const gravity = readGravity(bench, choices, problems);
  const flexure = valueOf(bench, 'flexureStiffness') ?? exact(0);
  const shareUnknown = choices.form === 'periodAndStiffness' ? valueOf(bench, 'gravityPart')?.value ?? 1 : choices.form === 'filmStrip' || choices.restoring === 'flexureAlone' ? 0 : 1;
  const body = gravity && bareBody(bench, choices, problems);
  if (!gravity || !body) return { gravity, masses: null, problems, shareUnknown, gasDiffers };
  const extra = calibrationMass(bench, choices, gravity);
  const of = (name: ConfigurationName): Body | null => {
    const [hung, gas] = [extra[name], air[name]];
    const inertia = anchor(combine([[1, body.inertia], ...(hung ? [[1, hung.inertia] as const] : []), ...(gas ? [[1, gas.inertia] as const] : [])]));
    const moment = combine(choices.restoring === 'flexureAlone' ? [] : [[1, body.moment], ...(hung ? [[1, hung.moment] as const] : []), ...(gas ? [[-1, momentBorne(bench, gas)] as const] : [])]);
    const kappa = anchor(propagate(stiffness, { moment, g: gravity, flexure }));
    if (!(inertia.value > 0)) {
      problems.push(problem('bench-inertia-not-positive', 'stops', {}, { configuration: name, value: inertia.value }));
      return null;
    }
    if (!(kappa.value > 0)) {
      problems.push(problem('bench-unstable', 'stops', {}, { configuration: name, value: kappa.value }));
      return null;
    }
    // Without a flexure gravity does all the work; p = 1 then, exactly.
    const share = choices.restoring === 'flexureAlone' ? exact(0) : flexure.value === 0 ? exact(1) : propagate(gravityShare, { moment, g: gravity, stiffness: kappa });
    return { inertia, stiffness: kappa, gravityShare: anchor(share) };
  };
  const shots = of('shots');
  const taps = extra.same && air.shots === air.taps ? shots : of('taps');
  return { gravity, masses: shots && taps ? { shots, taps } : null, problems, shareUnknown, gasDiffers };
}

/** Part of the strip's static moment that the air bears: (1 − b) m L/2. */
function momentBorne(bench: BenchRead, air: AirEffect): Uncertain {
  const [m, L] = [valueOf(bench, 'stripMass'), valueOf(bench, 'stripLength')];
  return m && L ? propagate(({ m: mass, L: length, b }) => stripMoment({ m: mass, L: length }) * (1 - b), { m, L, b: air.buoyancy }) : exact(0);
}

function readGravity(bench: BenchRead, choices: Choices, problems: Problem[]): Anchor | null {
  if (choices.gravityWay === 'place') {
    const latitude = valueOf(bench, 'latitude');
    const height = valueOf(bench, 'height');
    if (!latitude || !height) return null;
    const anomaly: Source = { id: 'gravity.anomaly', label: 'Gravity anomaly (local field against the formula)', symbol: 'Δg', dimension: 'acceleration', estimate: 0, u: GRAVITY_ANOMALY, distribution: 'normal', dof: Infinity };
    return anchor(combine([[1, propagate(normalGravity, { latitude, height })], [1, ofSource(anomaly)]]));
  }
  const typed = valueOf(bench, 'gravity');
  if (typed) return anchor(typed);
  problems.push(problem('gravity-assumed', 'note', { entry: 'gravity' }, { value: STANDARD_GRAVITY, limits: GRAVITY_LIMITS }));
  const assumed: Source = { id: 'gravity', label: 'Local g (standard value assumed)', symbol: 'g', dimension: 'acceleration', estimate: STANDARD_GRAVITY, u: fromLimits(GRAVITY_LIMITS), distribution: 'rectangular', dof: Infinity };
  return anchor(ofSource(assumed));
}

interface Bare {
  readonly inertia: Uncertain;
  readonly moment: Uncertain;
}

function bareBody(bench: BenchRead, choices: Choices, problems: Problem[]): Bare | null {
  switch (choices.form) {
    case 'pointBob': {
      const m = valueOf(bench, 'bobMass');
      const L = valueOf(bench, 'bobDistance');
      return m && L ? { inertia: propagate(bobInertia, { m, L }), moment: propagate(bobMoment, { m, L }) } : null;
    }
    case 'uniformStrip': {
      const m = valueOf(bench, 'stripMass');
      const L = valueOf(bench, 'stripLength');
      return m && L ? { inertia: propagate(stripInertia, { m, L }), moment: propagate(stripMoment, { m, L }) } : null;
    }
    case 'stripWithPlate': {
      const [m, L, plate, r] = [valueOf(bench, 'stripMass'), valueOf(bench, 'stripLength'), valueOf(bench, 'plateMass'), valueOf(bench, 'plateDistance')];
      if (!m || !L || !plate || !r) return null;
      const J = valueOf(bench, 'plateInertia') ?? exact(0);
      return {
        inertia: combine([[1, propagate(stripInertia, { m, L })], [1, propagate(partInertia, { m: plate, r, J })]]),
        moment: combine([[1, propagate(stripMoment, { m, L })], [1, propagate(partMoment, { m: plate, r })]]),
      };
    }
    case 'bodyOfParts':
      return sumOfParts(bench, problems);
    case 'periodAndStiffness':
    case 'filmStrip':
      return null;
  }
}

function sumOfParts(bench: BenchRead, problems: Problem[]): Bare | null {
  const inertias: Uncertain[] = [];
  const moments: Uncertain[] = [];
  let complete = bench.parts.length > 0;
  if (!complete) problems.push(problem('entry-missing', 'stops', { entry: 'parts' }, { label: 'Parts of the pendulum' }));
  for (const part of bench.parts) {
    const value = (name: PartEntryName): Uncertain | null => part.entries.get(name)?.value ?? null;
    const m = value('mass');
    const r = value('distance');
    for (const name of ['mass', 'distance'] as const) {
      if (!value(name)) problems.push(problem('entry-missing', 'stops', { entry: `part.${part.id}.${name}` }, { label: part.entries.get(name)!.read.label }));
    }
    if (!m || !r) complete = false;
    else {
      inertias.push(propagate(partInertia, { m, r, J: value('ownInertia') ?? exact(0) }));
      moments.push(propagate(partMoment, { m, r }));
    }
  }
  return complete ? { inertia: combine(inertias.map((x) => [1, x])), moment: combine(moments.map((x) => [1, x])) } : null;
}

interface Extra {
  readonly shots: Bare | null;
  readonly taps: Bare | null;
  /** One configuration for both. */
  readonly same: boolean;
}

/** What hangs on the pendulum beside itself: the calibration mass, and a hammer that stays where it struck. */
function calibrationMass(bench: BenchRead, choices: Choices, gravity: Anchor): Extra {
  const hung = choices.calibrationMassHung;
  const m = valueOf(bench, 'calibrationMass');
  const r = valueOf(bench, 'calibrationMassDistance');
  const part = hung === 'never' || !m || !r || !gravity ? null : partOf(m, r, valueOf(bench, 'calibrationMassInertia') ?? exact(0));
  const hammer = stuckHammer(bench, choices, gravity);
  return { shots: hung === 'taps' ? null : part, taps: both(hung === 'shots' ? null : part, hammer), same: hammer === null && (hung === 'always' || part === null) };
}

const partOf = (m: Uncertain, r: Uncertain, J: Uncertain): Bare => ({ inertia: propagate(partInertia, { m, r, J }), moment: propagate(partMoment, { m, r }) });
const both = (a: Bare | null, b: Bare | null): Bare | null =>
  a && b ? { inertia: combine([[1, a.inertia], [1, b.inertia]]), moment: combine([[1, a.moment], [1, b.moment]]) } : a ?? b;

/** A hammer that stays: its mass at r_h where the pendulum bears it, or what it adds through the contact where its own pivot does. */
function stuckHammer(bench: BenchRead, choices: Choices, g: Anchor): Bare | null {
  const [mass, radius] = [valueOf(bench, 'hammerMass'), valueOf(bench, 'tapLeverArm')];
  if (choices.hammerAfter === 'leaves' || !mass || !radius) return null;
  if (choices.hammerAfter === 'stays') return partOf(mass, radius, exact(0));
  const hammer = hammerBody(bench, choices, g);
  if (!hammer) return null;
  const inputs = { ...hammer, mass, radius, g };
  // The moment stands for what gravity makes of it: Δκ = g × moment.
  return { inertia: propagate((x) => carriedByOwnPivot(x).inertia, inputs), moment: propagate((x) => carriedByOwnPivot(x).stiffness / x.g, inputs) };
}

/** Hammer about its own pivot: centre of mass, contact and inertia; of a compact one all at its length. */
export function hammerBody(bench: BenchRead, choices: Choices, g: Uncertain): Readonly<Record<'centre' | 'contact' | 'inertia', Uncertain>> | null {
  const [mass, centre] = [valueOf(bench, 'hammerMass'), valueOf(bench, 'hammerLength')];
  if (!mass || !centre) return null;
  if (choices.hammerForm === 'compact') return { centre, contact: centre, inertia: propagate(({ m, l }) => m * l * l, { m: mass, l: centre }) };
  const [contact, period] = [valueOf(bench, 'hammerContact'), valueOf(bench, 'hammerPeriod')];
  const inertia = valueOf(bench, 'hammerInertia') ?? (period && propagate(hammerInertia, { mass, centre, period, g }));
  return contact && inertia ? { centre, contact, inertia } : null;
}

/** J and κ of the pendulum as tapped less those as fired; exact zeros where the two are one. */
export interface Change {
  readonly inertia: Uncertain;
  readonly stiffness: Uncertain;
}

export function changeOfConfiguration(bench: BenchRead, choices: Choices, stand: Stand): Change | null {
  const { masses, gravity } = stand;
  if (masses) {
    if (masses.shots === masses.taps) return { inertia: exact(0), stiffness: exact(0) };
    return { inertia: combine([[1, masses.taps.inertia], [-1, masses.shots.inertia]]), stiffness: combine([[1, masses.taps.stiffness], [-1, masses.shots.stiffness]]) };
  }
  if (!gravity) return null;
  const extra = calibrationMass(bench, choices, gravity);
  if (extra.same) return { inertia: exact(0), stiffness: exact(0) };
  const less = (a: Uncertain | undefined, b: Uncertain | undefined): Uncertain => combine([...(a ? [[1, a] as const] : []), ...(b ? [[-1, b] as const] : [])]);
  const moment = less(extra.taps?.moment, extra.shots?.moment);
  return { inertia: less(extra.taps?.inertia, extra.shots?.inertia), stiffness: choices.restoring === 'flexureAlone' ? exact(0) : propagate(({ m, g }) => m * g, { m: moment, g: gravity }) };
}

/**
 * The two configurations by the chosen route, once the undamped small period T₀ of one of them is known.
 * Route A keeps κ of the masses and takes J from the period, route B keeps J and takes κ; the other configuration
 * follows by the calibration mass, whose own J and κ are known.
 */
export function standByRoute(bench: BenchRead, stand: Stand, choices: Choices, period: Uncertain | null, problems: Problem[], weighed: Uncertain | null = null): Readonly<Record<ConfigurationName, Body>> | null {
  if (choices.form === 'periodAndStiffness') return bodiesOfPeriod(bench, stand, choices, period, problems, weighed);
  const masses = stand.masses;
  if (!masses) return null;
  if (choices.route === 'masses' || !period) return choices.route === 'masses' ? masses : null;
  const timed = masses[choices.periodTimedAs];
  const timedInertia = choices.route === 'massesAndPeriod' ? propagate(inertiaOfPeriod, { stiffness: timed.stiffness, period }) : timed.inertia;
  const timedStiffness = choices.route === 'inertiaAndPeriod' ? propagate(stiffnessOfPeriod, { inertia: timed.inertia, period }) : timed.stiffness;
  const of = (name: ConfigurationName): Body | null => {
    const here = masses[name];
    // What differs between the two configurations is the calibration mass alone; it differs by the same J and κ on every route.
    const inertia = here === timed ? timedInertia : combine([[1, timedInertia], [1, here.inertia], [-1, timed.inertia]]);
    const kappa = here === timed ? timedStiffness : combine([[1, timedStiffness], [1, here.stiffness], [-1, timed.stiffness]]);
    if (!(inertia.value > 0)) {
      problems.push(problem('bench-inertia-not-positive', 'stops', { entry: 'period' }, { configuration: name, value: inertia.value }));
      return null;
    }
    if (!(kappa.value > 0)) {
      problems.push(problem('bench-unstable', 'stops', { entry: 'period' }, { configuration: name, value: kappa.value }));
      return null;
    }
    const kappaAnchor = anchor(kappa);
    const weight = propagate(({ share, kappaMasses }) => share * kappaMasses, { share: here.gravityShare, kappaMasses: here.stiffness });
    return { inertia: anchor(inertia), stiffness: kappaAnchor, gravityShare: anchor(propagate(({ weight: w, kappa: k }) => w / k, { weight, kappa: kappaAnchor })) };
  };
  const shots = of('shots');
  const taps = masses.taps === masses.shots ? shots : of('taps');
  return shots && taps ? { shots, taps } : null;
}

/**
 * A body known only by its period and its static stiffness (route C): J = κ T₀²/4π². κ as typed, or from the pull per
 * deflection: κ = (dF/dx) r_w R, small deflections. The other configuration differs by the calibration mass.
 */
function bodiesOfPeriod(bench: BenchRead, stand: Stand, choices: Choices, period: Uncertain | null, problems: Problem[], weighed: Uncertain | null): ByConfiguration<Body> | null {
  const typed = typedStiffness(bench) ?? weighed;
  if (!typed) problems.push(problem('stiffness-missing', 'stops', { entry: 'staticStiffness' }, {}));
  if (!typed || !period || !stand.gravity) return null;
  const inertia = propagate(inertiaOfPeriod, { stiffness: typed, period });
  const extra = calibrationMass(bench, choices, stand.gravity);
  const share = anchor(valueOf(bench, 'gravityPart') ?? exact(1));
  const timed = choices.periodTimedAs;
  const of = (name: ConfigurationName): Body => {
    const change = (sign: 1 | -1, part: Bare | null): readonly (readonly [number, Bare])[] => (part ? [[sign, part]] : []);
    const moved = name === timed ? [] : [...change(1, extra[name]), ...change(-1, extra[timed])];
    const weight = (part: Bare): Uncertain => (choices.restoring === 'flexureAlone' ? exact(0) : propagate(({ m, g }) => m * g, { m: part.moment, g: stand.gravity! }));
    return {
      inertia: anchor(combine([[1, inertia], ...moved.map(([sign, part]) => [sign, part.inertia] as const)])),
      stiffness: anchor(combine([[1, typed], ...moved.map(([sign, part]) => [sign, weight(part)] as const)])),
      gravityShare: share,
    };
  };
  const shots = of('shots');
  const bodies = { shots, taps: extra.same ? shots : of('taps') };
  const bad = [bodies.shots, bodies.taps].find((body) => !(body.inertia.value > 0 && body.stiffness.value > 0));
  if (!bad) return bodies;
  problems.push(problem('bench-inertia-not-positive', 'stops', { entry: 'period' }, { configuration: bad === shots ? 'shots' : 'taps', value: bad.inertia.value }));
  return null;
}

/** κ as typed, or from the pull per deflection. */
export const typedStiffness = (bench: BenchRead): Uncertain | null => valueOf(bench, 'staticStiffness') ?? stiffnessOfPull(bench);

function stiffnessOfPull(bench: BenchRead): Uncertain | null {
  const [slope, arm, radius] = [valueOf(bench, 'forcePerDeflection'), valueOf(bench, 'pullArm'), valueOf(bench, 'readingRadius') ?? valueOf(bench, 'rulerHeight') ?? valueOf(bench, 'sensorHeight')];
  return slope && arm && radius ? propagate(({ k, a, r }) => k * a * r, { k: slope, a: arm, r: radius }) : null;
}

export const factorOfBody = (body: Body): Uncertain => propagate(geometryFactor, { inertia: body.inertia, stiffness: body.stiffness });
export const periodOfBody = (body: Body): Uncertain => propagate(smallPeriod, { inertia: body.inertia, stiffness: body.stiffness });
export const uOf = standardUncertainty;
