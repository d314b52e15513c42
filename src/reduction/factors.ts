/** The calibration factor by each way, of each configuration, for each form of the swing. */
import { expanded, finiteSources } from '../metrology/coverage.ts';
import { anchor, propagate, type Anchor, type Uncertain } from '../metrology/uncertain.ts';
import type { Choices } from '../session/session.ts';
import type { Calibration } from './results.ts';
import { stated } from './run.ts';
import { calibrationFromTaps, geometryAnchor, toFiring, type Form, type TapCalibration, type TapKnown, type Way } from './shots.ts';
import type { Body, ByConfiguration, Stand } from './stand.ts';

/** Calibration factors by form and way, of each configuration. */
export interface Factors {
  readonly geometry: ByConfiguration<Anchor | null>;
  readonly taps: ByConfiguration<Anchor | null>;
  readonly tapCalibration: TapCalibration | null;
  readonly change: Uncertain | null;
}

/** A film's K of each configuration, and K_f/K_c where its air differs. */
export interface FilmFactors {
  readonly geometry: ByConfiguration<Anchor | null>;
  readonly change: Uncertain | null;
}

export function factorsOf(bodies: ByConfiguration<Body> | null, film: FilmFactors | null, stand: Stand, taps: readonly TapKnown[], choices: Choices): Readonly<Record<Form, Factors>> {
  const shots = bodies ? geometryAnchor(bodies.shots) : null;
  const geometry = film?.geometry ?? { shots, taps: bodies ? (bodies.taps === bodies.shots ? shots : geometryAnchor(bodies.taps)) : null };
  const known = bodies ?? (choices.route === 'masses' ? stand.masses : null);
  const differs = choices.calibrationMassHung === 'taps' || choices.calibrationMassHung === 'shots' || (known !== null && known.shots !== known.taps);
  const of = (form: Form): Factors => {
    const tapCalibration = calibrationFromTaps(taps, form);
    const firing = tapCalibration && (film?.change ? { factor: anchor(propagate(({ k, c }) => k * c, { k: tapCalibration.asTaken, c: film.change })), change: film.change } : toFiring(tapCalibration.asTaken, known, differs));
    return { geometry, taps: { taps: tapCalibration?.asTaken ?? null, shots: firing?.factor ?? null }, tapCalibration, change: firing?.change ?? null };
  };
  return { full: of('full'), smallAngle: of('smallAngle') };
}

export function calibrationResult(way: Way, factors: Readonly<Record<Form, Factors>>, form: Form): Calibration | null {
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
