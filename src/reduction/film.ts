/** A hanging film as what it is: its calibration factor from thickness, width, length, modulus and the zone struck, by its modes. */
import { fromLimits } from '../metrology/source.ts';
import { anchor, combine, exact, ofSource, propagate, standardUncertainty, withSensitivities, type Anchor, type Uncertain } from '../metrology/uncertain.ts';
import { filmModelSpread } from '../pendulum/filmSpread.ts';
import { LARGEST_STIFFNESS_NUMBER, LEAST_STIFFNESS_NUMBER } from '../pendulum/filmModes.ts';
import { clampedCoefficient, filmBehaviour, filmMass, filmRegime, LIMP_BELOW, stiffnessNumber, type FilmInputs, type FilmRegime } from '../pendulum/filmStrip.ts';
import { problem, type Problem } from '../problems/problems.ts';
import type { Choices } from '../session/session.ts';
import type { BenchRead } from './entries.ts';
import { stated } from './run.ts';
import type { Stated } from './results.ts';
import { valueOf, type ByConfiguration, type ConfigurationName } from './stand.ts';

export interface Film {
  /** K that makes K θ/r the impulse: m R r/(X √(L/g)), N·m·s/rad, of each configuration. */
  readonly factors: ByConfiguration<Anchor | null>;
  readonly told: FilmTold;
  /** K_f/K_c by the modes: a tap strikes a shorter stretch than the plume, and perhaps elsewhere; null where none is known. */
  readonly change: Uncertain | null;
  /** Relative change of I by the struck zone moved along the film by this much either way, m. */
  readonly movedBy: (shift: number) => number;
}

/** What the page says of the film. */
export interface FilmTold {
  readonly stiffnessNumber: Stated;
  readonly regime: FilmRegime;
  /** X · 1 · first maximum x = X (I/m) √(L/g). */
  readonly coefficient: Stated;
  /** Relative standard uncertainty of the model, common to all shots; an in-place tap calibration removes it. */
  readonly spread: number;
  readonly overRigid: number;
  /** Time of the first maximum in quarter periods of the first mode. */
  readonly quarters: number;
  /** Undamped period of the first mode, s. */
  readonly period: number;
  /** Length of film that a tap strikes, m, whether it was typed, and K_f/K_c that follows from it; null without taps' lever arm. */
  readonly contact: { readonly length: number; readonly typed: boolean; readonly change: Stated } | null;
}

/** A tap's contact as a share of the film's length where nothing is typed, anywhere from none to twice that. Judgement. */
const CONTACT = 0.02;

export function filmOf(bench: BenchRead, choices: Choices, gravity: Anchor | null, ratio: ByConfiguration<Anchor>, problems: Problem[]): Film | null {
  const need = (name: Parameters<typeof valueOf>[1]): Uncertain | null => valueOf(bench, name);
  const [thickness, width, length, density, modulus, from, to] = [need('filmThickness'), need('filmWidth'), need('filmLength'), need('filmDensity'), need('filmModulus'), need('zoneFrom'), need('zoneTo')];
  if (!gravity || !thickness || !width || !length || !density || !modulus || !from || !to) return null;
  const radius = need('readingRadius') ?? need('rulerHeight') ?? need('sensorHeight');
  if (!radius || choices.readingWay === 'laserSpot' || choices.readingWay === 'angle' || choices.readingWay === 'encoder') {
    problems.push(problem('film-needs-displacement', 'stops', { entry: 'readingRadius' }, {}));
    return null;
  }
  const mass = anchor(need('filmMass') ?? propagate(filmMass, { density, thickness, width, length }));
  const S = anchor(propagate(stiffnessNumber, { modulus, width, thickness, length, density, gravity }));
  const share = (x: Uncertain): Uncertain => propagate(({ a, L }) => a / L, { a: x, L: length });
  const plateMass = need('plateMass');
  const plateRatio = plateMass ? propagate(({ p, m }) => p / m, { p: plateMass, m: mass }) : exact(0);
  const shared = { stiffnessNumber: S, plateRatio, readAt: share(radius) };
  const inputs: ByConfiguration<Record<keyof FilmInputs, Uncertain> | null> = {
    shots: { ...shared, dampingRatio: ratio.shots, zoneFrom: share(from), zoneTo: share(to) },
    taps: tapInputs(bench, shared, ratio.taps, length),
  };
  try {
    if (!(S.value >= LEAST_STIFFNESS_NUMBER && S.value <= LARGEST_STIFFNESS_NUMBER && standardUncertainty(S) < S.value)) throw new RangeError('film: the stiffness number is out of the range of the modes');
    return withModes(bench, inputs, { mass, length, gravity, radius, S }, problems, choices);
  } catch (failure) {
    if (!(failure instanceof RangeError)) throw failure;
    problems.push(problem('film-out-of-range', 'stops', { entry: 'filmThickness' }, {}));
    return null;
  }
}

/** Length of film that a tap strikes. */
function contactOf(bench: BenchRead, length: Uncertain): Uncertain {
  const typed = valueOf(bench, 'tapContact');
  const estimate = CONTACT * length.value;
  return typed ?? ofSource({ id: 'tapContact', label: 'Length of the tap’s contact (2 % of the film taken)', symbol: 'l_t', dimension: 'length', estimate, u: fromLimits(estimate), distribution: 'rectangular', dof: Infinity });
}

function tapInputs(bench: BenchRead, shared: Pick<Record<keyof FilmInputs, Uncertain>, 'stiffnessNumber' | 'plateRatio' | 'readAt'>, dampingRatio: Anchor, length: Uncertain): Record<keyof FilmInputs, Uncertain> | null {
  const arm = valueOf(bench, 'tapLeverArm');
  if (!arm) return null;
  const contact = contactOf(bench, length);
  const at = (side: 1 | -1): Uncertain => propagate(({ a, L, c }) => (a + (side * c) / 2) / L, { a: arm, L: length, c: contact });
  return { ...shared, dampingRatio, zoneFrom: at(-1), zoneTo: at(1) };
}

/** K_f/K_c of taps in place, what they share cancelling; the model may be wrong in all that it moves. */
function changeByZone(factors: Film['factors']): Uncertain | null {
  const { shots, taps } = factors;
  if (!shots || !taps) return null;
  // By exact slopes: half-differences would leave a trace of what cancels, the model's spread above all.
  const ratio = withSensitivities(shots.value / taps.value, [[1 / taps.value, shots], [-shots.value / taps.value ** 2, taps]]);
  return combine([[1, ratio], [1, ofSource({
    id: 'film.zones', label: 'Tap and plume on different stretches of the film (judgement)', symbol: 'K_f/K_c', dimension: 'number', estimate: 0, u: fromLimits(Math.abs(ratio.value - 1)), distribution: 'rectangular', dof: Infinity,
  })]]);
}

function withModes(
  bench: BenchRead, inputs: ByConfiguration<Record<keyof FilmInputs, Uncertain> | null>, x: Readonly<Record<'mass' | 'length' | 'gravity' | 'radius' | 'S', Uncertain>>, problems: Problem[], choices: Choices,
): Film {
  const shots = inputs.shots!;
  const values = Object.fromEntries(Object.entries(shots).map(([name, y]) => [name, y.value])) as unknown as FilmInputs;
  const plain: FilmInputs = { ...values, dampingRatio: Math.max(0, values.dampingRatio) };
  // S and its uncertainty go through the propagation; the hold is told by the period once bending carries part of it.
  const spread = filmModelSpread({ ...plain, hold: 'clamped', holdKnown: x.S.value > LIMP_BELOW, relativeStiffness: 0 }).standard;
  if (!Number.isFinite(spread)) throw new RangeError('film: the model has no spread here');
  const model = anchor(ofSource({ id: 'film.model', label: 'Model of the film (judgement)', symbol: 'X', dimension: 'number', estimate: 1, u: spread, distribution: 'rectangular', dof: Infinity }));
  const coefficient = anchor(propagate(clampedCoefficient, shots));
  const factorOf = (name: ConfigurationName): Anchor | null => {
    const arm = valueOf(bench, name === 'shots' ? 'leverArm' : 'tapLeverArm');
    const of = inputs[name];
    if (!arm || !of) return null;
    const X = name === 'shots' ? coefficient : propagate(clampedCoefficient, of);
    return anchor(propagate(({ m, R, r, c, L, g, s }) => (s * m * R * r * Math.sqrt(g / L)) / c, { m: x.mass, R: x.radius, r: arm, c: X, L: x.length, g: x.gravity, s: model }));
  };
  const behaviour = filmBehaviour(plain, 'clamped');
  const factors = { shots: factorOf('shots'), taps: factorOf('taps') };
  const change = changeByZone(factors);
  const told: FilmTold = {
    stiffnessNumber: stated(x.S), regime: filmRegime(x.S.value), coefficient: stated(coefficient), spread, overRigid: behaviour.overRigid, quarters: behaviour.timeInQuarters,
    period: (2 * Math.PI) / (behaviour.frequency * Math.sqrt(x.gravity.value / x.length.value)),
    contact: change && { length: contactOf(bench, x.length).value, typed: valueOf(bench, 'tapContact') !== null, change: stated(change) },
  };
  problems.push(problem('film-regime', 'note', { entry: 'filmThickness' }, { regime: told.regime, stiffness: x.S.value, quarters: told.quarters }));
  if (choices.calibration === 'geometry') problems.push(problem('film-model-alone', 'doubt', { entry: 'filmThickness' }, { percent: 100 * spread, overRigid: told.overRigid }));
  const lnOf = (shift: number): number => Math.log(clampedCoefficient({ ...plain, zoneFrom: plain.zoneFrom + shift, zoneTo: plain.zoneTo + shift }));
  const movedBy = (shift: number): number => {
    // A zone that would run past the tip is moved by what is left, and scaled up.
    const share = Math.min(shift / x.length.value, Math.max(0.01, 1.2 - plain.zoneTo), Math.max(0.01, plain.zoneFrom + 0.2));
    return (Math.abs(lnOf(share) - lnOf(-share)) / 2) * (shift / x.length.value / share);
  };
  return { factors, told, change, movedBy };
}
