/**
 * What a short pulse does to a hanging film: the reading against time as a sum of damped modes, and its first maximum.
 *
 * An impulse I spread evenly over a zone starts mode n with c_n = mean of φ_n over the zone:
 *   x(τ) = (I/m) √(L/g) Σ a_n e^{−ζ_n ω_n τ} sin(ω_n √(1 − ζ_n²) τ)/√(1 − ζ_n²),   a_n = φ_n(reading) c_n/(M_n ω_n),
 * with φ_n, M_n and ω_n of `filmModes`, τ = t √(g/L). Source: modal superposition, any vibration handbook; methods 1.2.
 */
import { rootBetween } from '../numeric/roots.ts';
import { dampingFactor } from './damping.ts';
import type { FilmModes } from './filmModes.ts';
import { modesAt, modesOver } from './filmModes.ts';

export interface FilmPulse {
  /** Struck zone ξ = from … to, as shares of the length from the pivot · 1 · equal ends strike at one point. */
  readonly zoneFrom: number;
  readonly zoneTo: number;
  /** Height of the reading point ξ_r · 1 · 1 is the tip. */
  readonly readAt: number;
  /** ζ of the first mode · 1 · below 1 (down to −0.5 for half-differences about 0). */
  readonly dampingRatio: number;
  /** ζ of every other mode · 1; as a rule the same, since only the first mode's is ever measured. */
  readonly dampingRatioAbove: number;
}

/** One maximum of the reading. */
export interface FilmMaximum {
  /** X · 1 · x = X (I/m) √(L/g). */
  readonly coefficient: number;
  /** τ = t √(g/L) · 1, from the pulse. */
  readonly time: number;
}

export interface FilmFirstMaximum {
  /** The largest reading in the first half period of mode 1, as methods 1.2 has it. */
  readonly largest: FilmMaximum;
  /** The first local maximum that stands out (see STANDS_OUT); mostly the same. */
  readonly earliest: FilmMaximum;
  /** X of mode 1 alone, a₁/D(ζ): what a reader sees who smooths the ripple away. */
  readonly modeOne: number;
  /** ω₁ √(L/g) · 1, undamped. */
  readonly frequency: number;
}

/** A local maximum counts as one where the reading falls off by this share of the largest before it rises above it: less, and no reading shows it. */
const STANDS_OUT = 0.01;
/** A crest lower than this share of the largest is taken for none: the reader sees the swing go on to more than twice as far. Judgement; a plate's first crest was found up to 57 % low (methods 1.18.8). */
const LEAST_CREST = 0.4;
/** Modes above the last whose amplitudes add to more than this share of all are left out of the search, not of the value. */
const SEARCHED = 2e-4;
/** Samples to a period of the highest mode searched, and the fewest and most to the half period of mode 1. */
const SAMPLES_A_PERIOD = 12;
const FEWEST = 240;
const MOST = 30_000;

/** Σ amplitude · e^{−decay τ} sin(turning τ), by ascending frequency. */
interface Vibration {
  readonly amplitude: Float64Array;
  readonly decay: Float64Array;
  readonly turning: Float64Array;
  /** a₁. */
  readonly modeOne: number;
}

/**
 * A ratio below 0 exists only for half-differences about 0, and e^{+|ζ|ωτ} of the highest modes would swamp the sum; the
 * reflection 2 − e^{−|ζ|ωτ} has the same value and slope at 0 and stays bounded.
 */
function vibrationOf(modes: FilmModes, pulse: FilmPulse): Vibration {
  const { frequencies } = modes;
  const read = modesAt(modes, pulse.readAt);
  const struck = modesOver(modes, pulse.zoneFrom, pulse.zoneTo);
  const [amplitude, decay, turning]: [number[], number[], number[]] = [[], [], []];
  const add = (a: number, d: number, w: number): void => {
    amplitude.push(a);
    decay.push(d);
    turning.push(w);
  };
  let modeOne = 0;
  for (let n = 0; n < frequencies.length; n += 1) {
    const frequency = frequencies[n]!;
    const ratio = n === 0 ? pulse.dampingRatio : pulse.dampingRatioAbove;
    const root = Math.sqrt(1 - ratio * ratio);
    // The shapes' modal mass is 1/ω².
    const a = read[n]! * struck[n]! * frequency;
    if (n === 0) modeOne = a;
    if (ratio < 0) add((2 * a) / root, 0, root * frequency);
    add(ratio < 0 ? -a / root : a / root, Math.abs(ratio) * frequency, root * frequency);
  }
  return { amplitude: Float64Array.from(amplitude), decay: Float64Array.from(decay), turning: Float64Array.from(turning), modeOne };
}

/** x m/(I √(L/g)) at τ. */
export function filmReading(modes: FilmModes, pulse: FilmPulse, time: number): number {
  checkPulse(pulse);
  return readingAt(vibrationOf(modes, pulse), time);
}

function readingAt({ amplitude, decay, turning }: Vibration, time: number): number {
  let sum = 0;
  for (let n = 0; n < amplitude.length; n += 1) sum += amplitude[n]! * Math.exp(-decay[n]! * time) * Math.sin(turning[n]! * time);
  return sum;
}

function speedAt({ amplitude, decay, turning }: Vibration, time: number, count: number): number {
  let sum = 0;
  for (let n = 0; n < count; n += 1) {
    const phase = turning[n]! * time;
    sum += amplitude[n]! * Math.exp(-decay[n]! * time) * (turning[n]! * Math.cos(phase) - decay[n]! * Math.sin(phase));
  }
  return sum;
}

/**
 * The first maximum of the reading in the first half (damped) period of mode 1.
 *
 * Valid: a film of S ≥ 1e-7, or S = 0 with damping or a plate; the limp lossless film without a plate has a cusp there
 * that a mode sum nears only as 1/√n: `limpFirstMaximum` has it in closed form.
 * @throws RangeError when the zone, the reading point or a damping ratio is out of its range
 */
export function filmFirstMaximum(modes: FilmModes, pulse: FilmPulse): FilmFirstMaximum {
  checkPulse(pulse);
  const vibration = vibrationOf(modes, pulse);
  const searched = countSearched(vibration.amplitude);
  const samples = sample(vibration, searched);
  const { readings, step } = samples;
  let top = 1;
  for (let i = 2; i < readings.length; i += 1) if (readings[i]! > readings[top]!) top = i;
  if (!(readings[top]! > 0)) throw new RangeError('film first maximum: the reading point does not move along the pulse in the first half period');
  // Rivals within what the search leaves out are settled with all modes.
  const slack = 4 * SEARCHED * vibration.amplitude.reduce((sum, a) => sum + Math.abs(a), 0);
  let largest: FilmMaximum | null = null;
  for (let i = 1; i < readings.length; i += 1) {
    if (readings[i]! < readings[top]! - slack || !isPeak(readings, i)) continue;
    const maximum = refine(vibration, searched, i, step);
    if (!largest || maximum.coefficient > largest.coefficient) largest = maximum;
  }
  const first = firstStanding(readings, STANDS_OUT * readings[top]!, LEAST_CREST * readings[top]!);
  largest ??= refine(vibration, searched, top, step);
  const earliest = first === top ? largest : refine(vibration, searched, first, step);
  return {
    largest,
    earliest: Math.abs(earliest.time - largest.time) < step ? largest : earliest,
    modeOne: vibration.modeOne / dampingFactor(pulse.dampingRatio),
    frequency: modes.frequencies[0]!,
  };
}

const isPeak = (y: Float64Array, i: number): boolean => y[i]! >= y[i - 1]! && (i === y.length - 1 || y[i]! >= y[i + 1]!);

/** The first sample of at least `least` from which the reading falls by `fall` before it rises above it; the largest where none does. */
function firstStanding(readings: Float64Array, fall: number, least: number): number {
  let high = 0;
  for (let i = 1; i < readings.length; i += 1) {
    if (readings[i]! > readings[high]!) high = i;
    else if (readings[i]! < readings[high]! - fall && readings[high]! >= least) return high;
  }
  return high;
}

function countSearched(amplitude: Float64Array): number {
  const all = amplitude.reduce((sum, a) => sum + Math.abs(a), 0);
  let rest = 0;
  let n = amplitude.length;
  while (n > 1 && rest + Math.abs(amplitude[n - 1]!) < SEARCHED * all) {
    rest += Math.abs(amplitude[n - 1]!);
    n -= 1;
  }
  return n;
}

/** Readings from 0 to the half period in even steps, each mode turned on by one complex factor a step. */
function sample({ amplitude, decay, turning }: Vibration, count: number): { readonly readings: Float64Array; readonly step: number } {
  const halfPeriod = Math.PI / turning[0]!;
  const wanted = (halfPeriod * turning[count - 1]! * SAMPLES_A_PERIOD) / (2 * Math.PI);
  const steps = Math.ceil(Math.min(Math.max(wanted, FEWEST), MOST));
  const step = halfPeriod / steps;
  const readings = new Float64Array(steps + 1);
  for (let n = 0; n < count; n += 1) {
    const shrink = Math.exp(-decay[n]! * step);
    const c = shrink * Math.cos(turning[n]! * step);
    const s = shrink * Math.sin(turning[n]! * step);
    let re = amplitude[n]!;
    let im = 0;
    for (let i = 1; i <= steps; i += 1) {
      const next = re * c - im * s;
      im = re * s + im * c;
      re = next;
      readings[i]! += im;
    }
  }
  return { readings, step };
}

/** The maximum about sample i: where the searched modes' speed is nil, read with all modes. */
function refine(vibration: Vibration, count: number, i: number, step: number): FilmMaximum {
  const root = rootBetween((t) => speedAt(vibration, t, count), (i - 1) * step, (i + 1) * step, 1e-10 * step);
  const time = root.status === 'found' ? root.x : i * step;
  return { coefficient: readingAt(vibration, time), time };
}

function checkPulse({ zoneFrom, zoneTo, readAt, dampingRatio, dampingRatioAbove }: FilmPulse): void {
  if (!(zoneFrom >= -0.2 && zoneFrom <= zoneTo && zoneTo > 0 && zoneTo <= 1.2)) throw new RangeError(`film pulse: zone ${zoneFrom} … ${zoneTo}`);
  if (!(readAt > 0 && readAt <= 1.2)) throw new RangeError(`film pulse: reading point ${readAt}`);
  for (const ratio of [dampingRatio, dampingRatioAbove]) if (!(ratio > -0.5 && ratio < 1)) throw new RangeError(`film pulse: damping ratio ${ratio}`);
}

/**
 * First maximum at the tip of the ideal limp film, no bending stiffness, no damping, no plate, pulse over the lowest
 * fraction f: X = 2/√f at τ = 2√f, exact.
 *
 * With s = √(x/L) from the tip the film is a round drum struck over its middle, and the tip its centre. A cusp: a film
 * with any stiffness stays well below it (S = 1e-5, f = 0.2: 18 % below).
 * Valid: 0 < f ≤ 1. Source: derived; methods 1.2.
 */
export function limpFirstMaximum(lowestFraction: number): FilmMaximum {
  if (!(lowestFraction > 0 && lowestFraction <= 1)) throw new RangeError(`limp film: lowest fraction ${lowestFraction} is not in 0 … 1`);
  return { coefficient: 2 / Math.sqrt(lowestFraction), time: 2 * Math.sqrt(lowestFraction) };
}

/**
 * X of the same film read as a rigid hinged strip with its plate, undamped: X = ξ_r ξ_c/[(1/3 + P) ω_r],
 * ω_r² = (1/2 + P)/(1/3 + P), ξ_c the middle of the zone. Source: methods 1.1 (strip with a plate), derived.
 */
export function rigidCoefficient({ plateRatio, zoneFrom, zoneTo, readAt }: Readonly<Record<'plateRatio' | 'zoneFrom' | 'zoneTo' | 'readAt', number>>): number {
  const inertia = 1 / 3 + plateRatio;
  return (readAt * (zoneFrom + zoneTo)) / (2 * inertia * Math.sqrt((1 / 2 + plateRatio) / inertia));
}
