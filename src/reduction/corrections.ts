/** Corrections between the first swing and the impulse bit, each a factor with its own uncertainty, a line in the chain and in the budget. */
import { anchor, combine, exact, ofSource, propagate, standardUncertainty, type Anchor, type Uncertain } from '../metrology/uncertain.ts';
import { fromLimits, type Source } from '../metrology/source.ts';
import { alignmentFactor, cosineOfUncertainTilt } from '../pendulum/alignment.ts';
import { jumpOfUnknownPhase } from '../pendulum/alreadySwinging.ts';
import { exposureFactor, missedPeak } from '../pendulum/peakSampling.ts';
import { swingGainOfMassLost } from '../pendulum/propellant.ts';
import { measuredPulseCorrection, momentsOf, pulseCorrection } from '../pendulum/pulse.ts';
import { captureFraction, inverseOfUndeclaredFactor } from '../pendulum/target.ts';
import { problem, type Problem } from '../problems/problems.ts';
import { PULSE_SAMPLES, type PulseSamples } from '../readings/pulseSamples.ts';
import type { Choices } from '../session/session.ts';
import { swingBefore, type Background } from './background.ts';
import type { BenchRead } from './entries.ts';
import { familyOf } from './readings.ts';
import type { SessionRecord } from './sheets.ts';
import { placeOf } from './sheets.ts';
import { valueOf, type Body } from './stand.ts';

/** One factor on the impulse: I_after = factor × I_before. */
export interface Correction {
  readonly id: string;
  readonly label: string;
  readonly symbol: string;
  readonly equation: string;
  readonly factor: Uncertain;
}

/** A thrust nearer to square across the swing than this cosine moves nothing that could be read. */
const LEAST_COSINE = 1e-3;

/** Factors common to all shots; null where the pulse reaches the first maximum and nothing follows. */
export interface Corrections {
  /** On the first swing as read, of shots and taps alike: exposure, missed peak. */
  readonly reading: readonly Correction[];
  /** Relative deviation of a missed peak, of each record alone. */
  readonly missedPeak: number;
  /** The swing before the shot. */
  readonly background: Background;
  /** On the impulse of a shot. */
  readonly impulse: readonly Correction[] | null;
  /** From the momentum delivered to the thruster's impulse bit. */
  readonly target: readonly Correction[];
  /** Relative gain of swing from the first shot to the last. */
  readonly propellant: Uncertain | null;
}

/** What of the stand the corrections lean on, as fired. */
export interface CorrectedStand {
  readonly body: Body | null;
  readonly frequency: Uncertain | null;
  readonly ratio: Anchor;
  readonly gravity: Anchor | null;
}

export function correctionsOf(bench: BenchRead, choices: Choices, shots: CorrectedStand, given: { readonly background: Background; readonly pulse: PulseSamples | null }, problems: Problem[]): Corrections {
  return {
    ...samplingCorrections(bench, choices, shots.frequency, problems),
    background: given.background,
    impulse: impulseCorrections(bench, choices, shots, given.pulse, problems),
    target: targetCorrections(bench, choices, problems),
    propellant: propellantGain(bench, choices, shots.body, shots.gravity, problems),
  };
}

function readingCorrections(bench: BenchRead, choices: Choices, frequency: Uncertain | null): Pick<Corrections, 'reading' | 'missedPeak'> {
  const reading: Correction[] = [];
  let missed = 0;
  if (choices.correctSampling && frequency) {
    const exposure = valueOf(bench, 'exposure');
    if (exposure && exposure.value > 0) {
      reading.push({ id: 'exposure', label: 'Exposure of the frames', symbol: 'C_e', equation: 'C_e = (ω t_e/2)/sin(ω t_e/2)', factor: propagate(({ w, t }) => 1 / exposureFactor(w * t), { w: frequency, t: exposure }) });
    }
    const interval = valueOf(bench, 'frameInterval');
    if (interval && interval.value > 0) {
      reading.push({ id: 'missedPeak', label: 'First maximum between frames', symbol: 'C_m', equation: 'C_m = (ω Δt/2)/sin(ω Δt/2), mean over all positions', factor: propagate(({ w, t }) => 1 / (1 + missedPeak(w * t).mean), { w: frequency, t: interval }) });
      missed = missedPeak(frequency.value * interval.value).deviation;
    }
  }
  return { reading, missedPeak: missed };
}

function samplingCorrections(bench: BenchRead, choices: Choices, frequency: Uncertain | null, problems: Problem[]): Pick<Corrections, 'reading' | 'missedPeak'> {
  try {
    return readingCorrections(bench, choices, frequency);
  } catch (failure) {
    if (!(failure instanceof RangeError)) throw failure;
    problems.push(problem('frames-too-slow', 'stops', { entry: 'frameInterval' }, {}));
    return { reading: [], missedPeak: 0 };
  }
}

function impulseCorrections(bench: BenchRead, choices: Choices, { frequency, ratio }: CorrectedStand, samples: PulseSamples | null, problems: Problem[]): readonly Correction[] | null {
  const pulse = choices.correctPulse ? pulseOf(bench, choices, frequency, ratio, samples, problems) : [];
  const alignment = choices.correctAlignment ? alignmentCorrections(bench, problems) : [];
  return pulse && alignment && [...pulse, ...alignment];
}

type PulseInputs = Readonly<Record<'t' | 'w' | 'z', number>>;

/** null where no impulse follows from a first swing. */
function pulseOf(bench: BenchRead, choices: Choices, frequency: Uncertain | null, ratio: Anchor, samples: PulseSamples | null, problems: Problem[]): readonly Correction[] | null {
  const measured = choices.pulseShape === 'measured';
  if (measured && !samples) return null;
  const duration = measured ? exact(0) : valueOf(bench, 'pulseDuration');
  if (!duration || !frequency || !(measured || duration.value > 0)) return [];
  const entry = measured ? PULSE_SAMPLES : 'pulseDuration';
  const of = (force: PulseSamples | null) => ({ t, w, z }: PulseInputs): number => {
    const dampingRatio = Math.max(0, z);
    const found = choices.pulseShape === 'measured' ? measuredPulseCorrection(force!, w, dampingRatio) : pulseCorrection({ shape: choices.pulseShape, duration: Math.max(0, t), naturalFrequency: w, dampingRatio });
    if (found.status !== 'corrected' || !(found.factor < Infinity)) throw new RangeError('pulse: no impulse follows from the first maximum');
    return found.factor;
  };
  if (measured && !(momentsOf(samples!).impulse > 0)) {
    problems.push(problem('pulse-samples-no-impulse', 'stops', { entry }, {}));
    return null;
  }
  try {
    const drawn = propagate(of(samples), { t: duration, w: frequency, z: ratio });
    const factor = measured ? combine([[1, drawn], [1, betweenSamples(drawn, samples!, of, { t: 0, w: frequency.value, z: ratio.value })]]) : drawn;
    return [{
      id: 'pulse', label: measured ? 'Length of the pulse, as measured' : 'Length of the pulse', symbol: 'C_τ', factor: anchor(factor),
      equation: measured ? 'C_τ = I/|∫F e^{−iωt} dt|, damped, F straight between the samples' : 'C_τ = I/|∫F e^{−iωt} dt|, damped',
    }];
  } catch (failure) {
    if (!(failure instanceof RangeError)) throw failure;
    problems.push(problem('pulse-reaches-the-peak', 'stops', { entry }, {}));
    return null;
  }
}

/** What lies between the samples: as much as every second of them leaves out, as limits; of few samples all that the length does. */
function betweenSamples(drawn: Uncertain, { time, force }: PulseSamples, of: (force: PulseSamples) => (x: PulseInputs) => number, at: PulseInputs): Uncertain {
  const keep = (_: number, i: number): boolean => i % 2 === 0 || i === time.length - 1;
  let half = Math.abs(drawn.value - 1);
  try {
    if (time.length > 3) half = Math.min(half, Math.abs(of({ time: time.filter(keep), force: force.filter(keep) })(at) - drawn.value));
  } catch (failure) {
    if (!(failure instanceof RangeError)) throw failure;
  }
  return ofSource({ id: PULSE_SAMPLES, label: 'Pulse between its samples', symbol: 'C_τ', dimension: 'number', estimate: 0, u: fromLimits(half), distribution: 'rectangular', dof: Infinity });
}

/** null where the tilt leaves the thrust no leverage. */
function alignmentCorrections(bench: BenchRead, problems: Problem[]): readonly Correction[] | null {
  const list: Correction[] = [];
  const lost = (entry: 'tiltInPlane' | 'tiltOutOfPlane'): null => {
    problems.push(problem('tilt-leaves-no-leverage', 'stops', { entry }, {}));
    return null;
  };
  const out = valueOf(bench, 'tiltOutOfPlane');
  if (out) {
    // The cosine is flat at 0, where a half-difference sees nothing; its mean and spread over the tilt's uncertainty are used.
    const { mean, deviation } = cosineOfUncertainTilt({ tilt: out.value, u: standardUncertainty(out) });
    if (!(mean > LEAST_COSINE)) return lost('tiltOutOfPlane');
    const cosine: Source = { id: 'tiltOutOfPlane.cosine', label: 'Thrust tilted out of the swing plane (its cosine)', symbol: 'cos α', dimension: 'number', estimate: mean, u: deviation, distribution: 'normal', dof: Infinity };
    list.push({ id: 'tiltOutOfPlane', label: 'Thrust tilted out of the swing plane', symbol: '1/cos α', equation: 'mean of cos α over its uncertainty', factor: anchor(propagate(({ c }) => 1 / c, { c: ofSource(cosine) })) });
  }
  const inPlane = valueOf(bench, 'tiltInPlane');
  const arm = valueOf(bench, 'leverArm');
  if (!inPlane || !arm) return list;
  const factor = ({ tilt, ahead, leverArm }: Readonly<Record<'tilt' | 'ahead' | 'leverArm', number>>): number => {
    const a = alignmentFactor({ inPlane: tilt, outOfPlane: 0, exitAhead: ahead, leverArm });
    if (!(a > LEAST_COSINE)) throw new RangeError('alignment: the tilted thrust has no leverage');
    return 1 / a;
  };
  try {
    list.push({ id: 'tiltInPlane', label: 'Thrust tilted in the swing plane', symbol: '1/a', equation: 'a = cos α_i + (e/r_t) sin α_i', factor: anchor(propagate(factor, { tilt: inPlane, ahead: valueOf(bench, 'exitAhead') ?? exact(0), leverArm: arm })) });
  } catch (failure) {
    if (!(failure instanceof RangeError)) throw failure;
    return lost('tiltInPlane');
  }
  return list;
}

function targetCorrections(bench: BenchRead, choices: Choices, problems: Problem[]): readonly Correction[] {
  if (choices.plume === 'carried') return [];
  const weight = choices.reported === 'thruster' ? 'doubt' : 'note';
  const typed = valueOf(bench, 'momentumFactor');
  let inverse: Uncertain;
  if (typed) inverse = anchor(propagate(({ b }) => 1 / b, { b: typed }));
  else {
    const { mean, deviation } = inverseOfUndeclaredFactor();
    inverse = anchor(ofSource({ id: 'momentumFactor', label: 'Momentum factor of the target, anywhere from 1 to 2 (as 1/β_m)', symbol: '1/β_m', dimension: 'number', estimate: mean, u: deviation, distribution: 'rectangular', dof: Infinity }));
    problems.push(problem('momentum-factor-undeclared', weight, { entry: 'momentumFactor' }, {}));
  }
  const list: Correction[] = [{ id: 'momentumFactor', label: 'Momentum factor of the target', symbol: '1/β_m', equation: 'I_thruster = I_target/(f_cap β_m)', factor: inverse }];
  const share = valueOf(bench, 'captureFraction') ?? captured(bench);
  if (share) list.push({ id: 'captureFraction', label: 'Part of the plume caught', symbol: '1/f_cap', equation: 'f_cap = 1 − cosⁿ⁺² a_t', factor: anchor(propagate(({ f }) => 1 / f, { f: share })) });
  else problems.push(problem('capture-taken-as-all', weight, { entry: 'captureFraction' }, {}));
  return list;
}

function captured(bench: BenchRead): Uncertain | null {
  const exponent = valueOf(bench, 'plumeExponent');
  const halfAngle = valueOf(bench, 'targetHalfAngle');
  if (!exponent || !halfAngle) return null;
  try {
    return propagate(({ n, a }) => captureFraction({ exponent: n, halfAngle: a }), { n: exponent, a: halfAngle });
  } catch (failure) {
    if (failure instanceof RangeError) return null;
    throw failure;
  }
}

function propellantGain(bench: BenchRead, choices: Choices, body: Body | null, gravity: Anchor | null, problems: Problem[]): Uncertain | null {
  const lost = choices.correctPropellant ? valueOf(bench, 'propellantUsed') : null;
  const distance = valueOf(bench, 'propellantDistance');
  if (!lost || !distance || !body || !gravity || lost.value === 0) return null;
  try {
    return anchor(propagate(({ massLost, radius, inertia, stiffness, g }) => swingGainOfMassLost({ massLost, radius, inertia, stiffness, g }), { massLost: lost, radius: distance, inertia: body.inertia, stiffness: body.stiffness, g: gravity }));
  } catch (failure) {
    if (!(failure instanceof RangeError)) throw failure;
    problems.push(problem('propellant-too-heavy', 'stops', { entry: 'propellantUsed' }, {}));
    return null;
  }
}

/** A first swing, or a launch, with the corrections of its reading. */
export const throughReading = (y: Uncertain, { reading }: Pick<Corrections, 'reading'>): Uncertain => reading.reduce((so, { factor }) => propagate(({ a, f }) => a * f, { a: so, f: factor }), y);

/** Launch with the reading's corrections and what the background swing and a missed peak add, of this record alone. null: the background swing is the larger. */
export function correctedLaunch(launch: Uncertain, record: SessionRecord, c: Corrections, problems: Problem[]): Uncertain | null {
  let y = launch;
  // With a swing of known phase the corrections of the reading have gone into the first swing itself.
  const { amplitude: background, state } = swingBefore(c.background, record);
  if (!state) y = throughReading(y, c);
  const own = (id: string, label: string, u: number, distribution: Source['distribution']): Uncertain =>
    ofSource({ id: `${record.id}.${id}`, label, symbol: 'φ', dimension: 'angle', estimate: 0, u, distribution, dof: Infinity, family: familyOf(record.kind) });
  if (c.missedPeak > 0) y = combine([[1, y], [1, own('missedPeak', 'First maximum between frames', c.missedPeak * Math.abs(y.value), 'rectangular')]]);
  if (background > 0) {
    if (!(Math.abs(y.value) > background)) {
      problems.push(problem('background-swing-larger', 'stops', placeOf(record), {}));
      return null;
    }
    const jump = propagate(({ a }) => Math.sign(a) * jumpOfUnknownPhase(Math.abs(a), Math.min(background, Math.abs(a) * (1 - 1e-9))).jump, { a: y });
    y = combine([[1, jump], [1, own('background', 'Swing before the shot, phase unknown', background / Math.SQRT2, 'normal')]]);
  }
  return y;
}

/** Factor of the n-th of N shots for the propellant that has left by then: the lighter pendulum swings further for the same impulse. */
export const propellantFactor = (gain: Uncertain, done: number): Uncertain => propagate(({ s }) => 1 / (1 + s * done), { s: gain });

/** Rest known only within ± θ_f where a pivot rubs: half-width to standard uncertainty. */
export const restOfFriction = (record: SessionRecord, friction: number): Uncertain =>
  ofSource({ id: `${record.id}.friction`, label: 'Rest within the friction of the pivot', symbol: 'θ_f', dimension: 'angle', estimate: 0, u: fromLimits(friction), distribution: 'rectangular', dof: Infinity, family: familyOf(record.kind) });
