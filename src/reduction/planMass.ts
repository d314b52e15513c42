/** Where to hang a calibration mass: the two distances from which two periods tell J best, and the one where they tell nothing. */
import { combine, exact, propagate, standardUncertainty, type Uncertain } from '../metrology/uncertain.ts';
import { periodWithMass, twoPeriodSensitivity, unchangedDistance, type HungMass } from '../pendulum/calibrationMass.ts';
import { partInertia, smallPeriod } from '../pendulum/forms.ts';
import type { EntryName } from '../session/entries.ts';
import type { Choices } from '../session/session.ts';
import type { BenchRead } from './entries.ts';
import type { Stated } from './results.ts';
import { stated } from './run.ts';
import { valueOf, type Body, type ByConfiguration } from './stand.ts';

export interface PlannedPlace {
  /** Below the pivot, m. */
  readonly distance: number;
  /** T₁ with the mass there, s. */
  readonly period: Stated;
  /** ∂ln J/∂ln T₁ and ∂ln J/∂ln T₀. */
  readonly toWith: number;
  readonly toWithout: number;
  /** u(J)/J that the two timings leave. */
  readonly inertiaTo: number;
}

export interface PlannedMass {
  readonly mass: number;
  /** Taken for want of a typed one: what doubles J at the end of the pendulum, rounded down to 1, 2 or 5. */
  readonly massTaken: boolean;
  /** T₀ without it, s. */
  readonly period: Stated;
  /** Farthest point known of the pendulum itself, m. */
  readonly length: number;
  /** Where the mass leaves the period as it is, m; null where there is no such place. */
  readonly unchangedAt: number | null;
  /** u(T)/T that each timing was taken to have, from the typed period or TIMING. */
  readonly timing: number;
  readonly timingTaken: boolean;
  /** Nearest the pivot first: the best above and the best below the place of no change; what tells nothing of J is left out. */
  readonly places: readonly PlannedPlace[];
}

/** u(T)/T of a period without ±: ten cycles by a stopwatch, common practice, no source. */
const TIMING = 1e-3;
/** Places tried along the pendulum: nobody hangs a mass finer than this. */
const STEPS = 100;
/** A place that leaves J less known than this is none. */
const HOPELESS = 0.5;

export function planMass(bench: BenchRead, choices: Choices, bodies: ByConfiguration<Body> | null, gravity: Uncertain | null): PlannedMass | null {
  const length = lengthOf(bench);
  if (!bodies || !gravity || choices.form === 'filmStrip' || !(length > 0)) return null;
  const g = choices.restoring === 'flexureAlone' ? exact(0) : gravity;
  const bare = bareOf(bench, choices, bodies, g);
  if (!(bare.inertia.value > 0 && bare.stiffness.value > 0)) return null;
  const typed = valueOf(bench, 'calibrationMass');
  const mass = typed ?? exact(roundedDown(bare.inertia.value / length ** 2));
  const ownInertia = valueOf(bench, 'calibrationMassInertia') ?? exact(0);
  const inputs = { ...bare, g, mass, ownInertia };
  const at = (distance: number): HungMass => ({ inertia: bare.inertia.value, stiffness: bare.stiffness.value, g: g.value, mass: mass.value, ownInertia: ownInertia.value, distance });
  const timed = valueOf(bench, 'period');
  const timedTo = timed ? standardUncertainty(timed) / timed.value : 0;
  const timing = timedTo > 0 ? timedTo : TIMING;
  const unchangedAt = unchangedDistance(at(0));
  const costOf = (distance: number): number => {
    const { toWith, toWithout } = twoPeriodSensitivity(at(distance));
    const cost = timing * Math.hypot(toWith, toWithout);
    return Number.isFinite(cost) ? cost : Infinity;
  };
  const tried = Array.from({ length: STEPS }, (_, i) => ((i + 1) * length) / STEPS).map((distance) => ({ distance, cost: costOf(distance) }));
  const bestOf = (within: (distance: number) => boolean): readonly PlannedPlace[] => {
    const best = tried.filter(({ distance, cost }) => within(distance) && cost < HOPELESS).reduce<(typeof tried)[number] | null>((a, b) => (a === null || b.cost < a.cost ? b : a), null);
    return best === null ? [] : [{ distance: best.distance, period: stated(propagate(periodWithMass, { ...inputs, distance: exact(best.distance) })), ...twoPeriodSensitivity(at(best.distance)), inertiaTo: best.cost }];
  };
  return {
    mass: mass.value, massTaken: !typed, period: stated(propagate(smallPeriod, bare)), length, unchangedAt, timing, timingTaken: timedTo === 0,
    places: unchangedAt === null ? bestOf(() => true) : [...bestOf((r) => r < unchangedAt), ...bestOf((r) => r > unchangedAt)],
  };
}

/** J and κ of the pendulum without the calibration mass. */
function bareOf(bench: BenchRead, choices: Choices, bodies: ByConfiguration<Body>, g: Uncertain): Readonly<Record<'inertia' | 'stiffness', Uncertain>> {
  const hung = choices.calibrationMassHung;
  const [m, r] = [valueOf(bench, 'calibrationMass'), valueOf(bench, 'calibrationMassDistance')];
  if (hung !== 'always' || !m || !r) return hung === 'shots' ? bodies.taps : bodies.shots;
  const hanging = propagate(partInertia, { m, r, J: valueOf(bench, 'calibrationMassInertia') ?? exact(0) });
  const weight = propagate(({ m: mass, r: distance, g: local }) => mass * distance * local, { m, r, g });
  return { inertia: combine([[1, bodies.shots.inertia], [-1, hanging]]), stiffness: combine([[1, bodies.shots.stiffness], [-1, weight]]) };
}

/** Entries that measure from the pivot to a point of the pendulum itself. */
const ON_PENDULUM: readonly EntryName[] = ['bobDistance', 'stripLength', 'plateDistance', 'leverArm', 'tapLeverArm', 'readingRadius'];

function lengthOf(bench: BenchRead): number {
  const typed = ON_PENDULUM.map((name) => bench.entries.get(name)).flatMap((found) => (found?.read.used === true && found.value ? [found.value.value] : []));
  const parts = bench.parts.flatMap(({ entries }) => { const found = entries.get('distance'); return found?.read.used === true && found.value ? [Math.abs(found.value.value)] : []; });
  return Math.max(0, ...typed, ...parts);
}

/** Largest 1, 2 or 5 times a power of ten that is not above it. */
function roundedDown(value: number): number {
  const power = 10 ** Math.floor(Math.log10(value));
  return power * ([5, 2].find((step) => step * power <= value) ?? 1);
}
