/** The calibration factor by each way, of each configuration, for each form of the swing. */
import { expanded, finiteSources } from '../metrology/coverage.ts';
import { anchor, combine, propagate, type Anchor, type Uncertain } from '../metrology/uncertain.ts';
import type { Choices } from '../session/session.ts';
import type { Calibration, Result } from './results.ts';
import { stated } from './run.ts';
import { geometryAnchor, type Form, type Swing, type Way } from './shots.ts';
import type { Body, ByConfiguration, Stand } from './stand.ts';
import { calibrationFromTaps, changeToFiring, type TapCalibration } from './taps.ts';
import type { TapKnown } from './tapImpulse.ts';

export type FactorByConfiguration = ByConfiguration<Anchor | null>;

/** Calibration factors by way, of each configuration. */
export interface Factors extends Readonly<Record<Way, FactorByConfiguration>> {
  readonly tapCalibration: TapCalibration | null;
  /** K_f/K_c of the taps. */
  readonly change: Uncertain | null;
}

/** A film's K of each configuration, and K_f/K_c where its air or the stretch that is struck differs. */
export interface FilmFactors {
  readonly geometry: FactorByConfiguration;
  readonly change: Uncertain | null;
}

/** Bodies known by evidence beside geometry. */
export type BodiesByWay = Readonly<Partial<Record<Exclude<Way, 'geometry' | 'taps'>, ByConfiguration<Body> | null>>>;

const NONE: FactorByConfiguration = { shots: null, taps: null };

const factorsOfBodies = (bodies: ByConfiguration<Body> | null | undefined): FactorByConfiguration => {
  if (!bodies) return NONE;
  const shots = geometryAnchor(bodies.shots);
  return { shots, taps: bodies.taps === bodies.shots ? shots : geometryAnchor(bodies.taps) };
};

export interface FactorFacts {
  readonly bodies: ByConfiguration<Body> | null;
  readonly film: FilmFactors | null;
  readonly stand: Stand;
  /** Taps that count. */
  readonly taps: readonly TapKnown[];
  readonly places: ReadonlyMap<Swing, number>;
  readonly choices: Choices;
}

/** Factors of geometry and taps; those of the other evidence come in by `withEvidence`. */
export function factorsOf({ bodies, film, stand, taps, places, choices }: FactorFacts): Readonly<Record<Form, Factors>> {
  const geometry = film?.geometry ?? factorsOfBodies(bodies);
  const known = bodies ?? (choices.route === 'masses' ? stand.masses : null);
  const hung = choices.calibrationMassHung === 'taps' || choices.calibrationMassHung === 'shots' || choices.hammerAfter !== 'leaves';
  const differs = hung || (known !== null && known.shots !== known.taps);
  // What hangs on a film for the taps alone is in no model of it.
  const change = (hung ? null : film?.change) ?? changeToFiring(known, differs);
  const of = (form: Form): Factors => {
    const tapCalibration = calibrationFromTaps(taps, form, places, choices);
    const firing = tapCalibration && change && fired(tapCalibration.asTaken, change);
    return { geometry, taps: { taps: tapCalibration?.asTaken ?? null, shots: firing }, addedMasses: NONE, weights: NONE, adjustment: NONE, tapCalibration, change: tapCalibration && change };
  };
  return { full: of('full'), smallAngle: of('smallAngle') };
}

/** K of the firing configuration; the same anchor where nothing changes. */
export const fired = (asTaken: Anchor, change: Uncertain): Anchor =>
  change.value === 1 && change.own.size === 0 && change.through.size === 0 ? asTaken : anchor(propagate(({ k, c }) => k * c, { k: asTaken, c: change }));

export function withEvidence(factors: Readonly<Record<Form, Factors>>, bodies: Readonly<Record<Form, BodiesByWay>>): Readonly<Record<Form, Factors>> {
  const of = (form: Form): Factors => {
    const { addedMasses, weights, adjustment } = bodies[form];
    return { ...factors[form], addedMasses: factorsOfBodies(addedMasses), weights: factorsOfBodies(weights), adjustment: factorsOfBodies(adjustment) };
  };
  return { full: of('full'), smallAngle: of('smallAngle') };
}

/** K that one record is reduced with: of its configuration, and by taps at its place between them. */
export function factorAt(factors: Factors, way: Way, swing: Swing): Uncertain | null {
  const { tapCalibration, change } = factors;
  if (way !== 'taps' || !tapCalibration?.at) return factors[way][swing.configuration];
  const here = tapCalibration.at(swing);
  if (swing.configuration === 'taps') return here;
  return change && propagate(({ k, c }) => k * c, { k: here, c: change });
}

export const factorResult = (factor: Anchor | null): Result | null => factor && expanded(factor, finiteSources([factor]));

/** Launch less the intercept of the taps' line, where that line counts. */
export function launchAt(factors: Factors, way: Way, launch: Uncertain): Uncertain {
  const intercept = way === 'taps' ? factors.tapCalibration?.intercept ?? null : null;
  return intercept ? combine([[1, launch], [-1, intercept]]) : launch;
}

export function calibrationResult(way: 'geometry' | 'taps', factors: Readonly<Record<Form, Factors>>, form: Form): Calibration | null {
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
