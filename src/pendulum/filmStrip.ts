/** The film strip as a target: what it is from its sheet and length, and the impulse bit that its first maximum tells. */
import type { FilmHold, FilmModes } from './filmModes.ts';
import { filmModes, modalTipMass } from './filmModes.ts';
import type { FilmFirstMaximum, FilmMaximum, FilmPulse } from './filmResponse.ts';
import { filmFirstMaximum, limpFirstMaximum, rigidCoefficient } from './filmResponse.ts';

type Numbers<Name extends string> = Readonly<Record<Name, number>>;

/** Areal density σ = ρ h · kg/m². Valid: ρ, h > 0. */
export const arealDensity = ({ density, thickness }: Numbers<'density' | 'thickness'>): number => density * thickness;
/** Film mass m = ρ h b L · kg. */
export const filmMass = ({ density, thickness, width, length }: Numbers<'density' | 'thickness' | 'width' | 'length'>): number => density * thickness * width * length;
/** Weight per length w′ = ρ h b g · N/m. */
export const weightPerLength = ({ density, thickness, width, gravity }: Numbers<'density' | 'thickness' | 'width' | 'gravity'>): number => density * thickness * width * gravity;
/** Bending stiffness EI = E b h³/12 · N·m² · flat sheet; a crease or a curl across the width makes it many times larger. */
export const bendingStiffness = ({ modulus, width, thickness }: Numbers<'modulus' | 'width' | 'thickness'>): number => (modulus * width * thickness ** 3) / 12;

/**
 * Stiffness number S = EI/(w′L³) = E h²/(12 ρ g L³) · 1 · the width cancels.
 *
 * A film much wider than it is thick bends as a plate, E/(1 − ν²) in place of E, 13 % more at ν = 0.34: little beside the u(S)
 * of an unknown curl.
 * Valid: all > 0. Source: methods 1.2 (25 µm polyimide, E 2.5 GPa, 1420 kg/m³: 0.0012 at 0.2 m, 0.0094 at 0.1 m).
 */
export const stiffnessNumber = (sheet: Numbers<'modulus' | 'width' | 'thickness' | 'length' | 'density' | 'gravity'>): number =>
  bendingStiffness(sheet) / (weightPerLength(sheet) * sheet.length ** 3);

export type FilmRegime = 'limp' | 'between' | 'springy';

/** At S = 0.01 bending has raised ω₁ by 7 % over the limp film's and lowered its modal mass by 3 %. */
export const LIMP_BELOW = 0.01;
/** At S = 1 the weight still raises ω₁ by 6 % over that of the weightless strip, 3.516 √(EI/(μL⁴)), its modal mass by 0.1 %. */
export const SPRINGY_ABOVE = 1;

/**
 * What carries the first mode: weight (limp), bending stiffness (springy), or both. The ends are set where the other
 * one moves ω₁ by 6 to 7 %, the same on either side.
 *
 * Said of the period and of mode 1 only. The first maximum feels bending far earlier: at S = 1e-5 it is still 18 %
 * below the ideal limp film's (clamped, f = 0.2). Source: derived; methods 1.2.
 */
export function filmRegime(stiffness: number): FilmRegime {
  if (!(stiffness >= 0)) throw new RangeError(`film regime: stiffness number ${stiffness}`);
  return stiffness <= LIMP_BELOW ? 'limp' : stiffness < SPRINGY_ABOVE ? 'between' : 'springy';
}

/** Plate of this many film masses: the rigid formula with the plate holds within 0.7 % (struck and read at the plate; methods 1.2). */
export const PLATE_THAT_STIFFENS = 3;

/** All that X depends on; each a share or a ratio · 1. */
export type FilmInputs = Numbers<'stiffnessNumber' | 'dampingRatio' | 'zoneFrom' | 'zoneTo' | 'plateRatio' | 'readAt'>;

/** Half-differences in damping, zone and reading point ask for the same modes again; a budget has some ten sets of them. */
const KEPT_MODES = 12;
const kept = new Map<string, FilmModes>();

function modesOf(stiffness: number, plateRatio: number, hold: FilmHold): FilmModes {
  const key = `${stiffness} ${plateRatio} ${hold}`;
  let modes = kept.get(key);
  kept.delete(key);
  modes ??= filmModes({ stiffnessNumber: stiffness, plateRatio, hold });
  kept.set(key, modes);
  const oldest = kept.keys().next();
  if (kept.size > KEPT_MODES && oldest.done !== true) kept.delete(oldest.value);
  return modes;
}

/** With a plate, a point no further than this share of the length above the tip, or below it, is on the plate, as one reads there. */
const ON_PLATE = 0.05;

/**
 * How far from the plate's centre of mass it is read, as a share of the length; null where no plate is read.
 *
 * The plate is a point mass at the tip; what a real one turns by is not in the modes, and the slope of the film's end would let a
 * point beside the tip whip as no plate does.
 */
export const offPlateCentre = ({ plateRatio, readAt }: Pick<FilmInputs, 'plateRatio' | 'readAt'>): number | null =>
  plateRatio > 0 && readAt >= 1 - ON_PLATE ? Math.abs(readAt - 1) : null;

const isIdeal = (film: FilmInputs): boolean => film.stiffnessNumber === 0 && film.plateRatio === 0 && film.dampingRatio === 0;

/** What a point of the plate shows where the plate turns with the line from the clamp. */
function aboutClamp(first: FilmFirstMaximum, readAt: number): FilmFirstMaximum {
  const scaled = ({ coefficient, time }: FilmMaximum): FilmMaximum => ({ coefficient: coefficient * readAt, time });
  return { ...first, largest: scaled(first.largest), earliest: scaled(first.earliest), modeOne: first.modeOne * readAt };
}

/** The first maximum from the modes; for the ideal limp film, whose mode sum does not end, from the closed form. */
function firstMaximum(film: FilmInputs, hold: FilmHold, above = film.dampingRatio): FilmFirstMaximum {
  if (offPlateCentre(film) !== null && film.readAt !== 1) return aboutClamp(firstMaximum({ ...film, readAt: 1 }, hold, above), film.readAt);
  const modes = modesOf(film.stiffnessNumber, film.plateRatio, hold);
  const pulse: FilmPulse = { ...film, dampingRatioAbove: above };
  if (!isIdeal(film)) return filmFirstMaximum(modes, pulse);
  if (film.readAt !== 1 || film.zoneTo !== 1) throw new RangeError('ideal limp film: only the tip, and a zone that ends there, have a closed form; give S or ζ a value');
  const largest = limpFirstMaximum(1 - film.zoneFrom);
  return { ...filmFirstMaximum(modes, pulse), largest, earliest: largest };
}

export interface FilmBehaviour extends FilmFirstMaximum {
  /** Time of the largest reading in quarter periods of mode 1 (undamped) · 1. */
  readonly timeInQuarters: number;
  /** X over that of the undamped rigid hinged strip with its plate, struck at the zone's middle: reading the film as rigid overstates I by this factor. */
  readonly overRigid: number;
  readonly modeOneOverRigid: number;
  /** M₁/m with the shape 1 at the tip: I = M₁ ω₁ x for mode 1 struck and read at the tip. 1/3 rigid, 0.2695 limp, 0.2500 springy. */
  readonly modalTipMass: number;
  /** 1/(X ω₁ √(L/g)) · mass over m that in I = m_eff ω₁ x gives the impulse from this first maximum. */
  readonly effectiveMass: number;
  /** Static pull at the tip per deflection, k_tip L/(m g) · 1 · towards 0 as S → 0: no weights on a limp film. */
  readonly staticTipStiffness: number;
  /** k_tip/(ω₁² M₁) · 1 · what route C at the tip gives over the modal mass: 0.971 springy. */
  readonly staticOverModal: number;
  /** Period of mode 1, T √(g/L) · 1. */
  readonly period: number;
}

/**
 * How a film answers a short pulse. Takes some 5 ms.
 *
 * Valid: S = 0 or 1e-7 … 1e6, P ≥ 0, small swings (sin θ ≈ θ; the gravity form's excess of methods 1.1 is below 0.13 % to 10°).
 * With S = P = ζ = 0 the closed limit, tip only.
 * @throws RangeError when an input is out of its range
 */
export function filmBehaviour(film: FilmInputs, hold: FilmHold): FilmBehaviour {
  const first = firstMaximum(film, hold);
  const modes = modesOf(film.stiffnessNumber, film.plateRatio, hold);
  const rigid = rigidCoefficient(film);
  const tipMass = modalTipMass(modes, 0);
  // A bare limp film yields without end to a pull at its tip; what the mesh says there is not a number of the film.
  const tipStiffness = film.stiffnessNumber === 0 && film.plateRatio === 0 ? 0 : 1 / modes.staticTipCompliance;
  return {
    ...first,
    timeInQuarters: (first.largest.time * first.frequency) / (Math.PI / 2),
    overRigid: first.largest.coefficient / rigid,
    modeOneOverRigid: first.modeOne / rigid,
    modalTipMass: tipMass,
    effectiveMass: 1 / (first.largest.coefficient * first.frequency),
    staticTipStiffness: tipStiffness,
    staticOverModal: tipStiffness / (first.frequency ** 2 * tipMass),
    period: (2 * Math.PI) / first.frequency,
  };
}

/** X of the clamped film's largest first reading: x = X (I/m) √(L/g). @throws RangeError as filmBehaviour */
export const clampedCoefficient = (film: FilmInputs): number => firstMaximum(film, 'clamped').largest.coefficient;
/** X of the hinged film. @throws RangeError as filmBehaviour */
export const hingedCoefficient = (film: FilmInputs): number => firstMaximum(film, 'hinged').largest.coefficient;
/** X with the modes above the first damped by a ratio of their own. @throws RangeError as filmBehaviour */
export const coefficientWithHigherModes = (film: FilmInputs, hold: FilmHold, dampingRatioAbove: number): number => firstMaximum(film, hold, dampingRatioAbove).largest.coefficient;

/** x/X and what makes an impulse of it; the coefficient may come from a table. */
export type FilmReadingInputs = Numbers<'reading' | 'mass' | 'length' | 'gravity'>;

/**
 * I = m x/(X √(L/g)) = (m x/X) √(g/L) · N·s · x from rest, m, at the reading point; m the film's mass without its plate, kg.
 *
 * Gas that moves with a bare film adds inertia and no weight: an even added mass of α times the film's makes it √(1 + α) I
 * and every time √(1 + α) longer (derived; α in methods 1.13, an order of magnitude only at rough vacuum).
 * Valid: X, L, g > 0.
 */
export const impulseOfCoefficient = ({ reading, mass, length, gravity, coefficient }: FilmReadingInputs & Numbers<'coefficient'>): number =>
  ((mass * reading) / coefficient) * Math.sqrt(gravity / length);

/** I of a clamped film from its first maximum; a function of plain numbers for half-differences. @throws RangeError as filmBehaviour */
export const impulseOfClampedFilm = (x: FilmInputs & FilmReadingInputs): number => impulseOfCoefficient({ ...x, coefficient: clampedCoefficient(x) });
/** I of a hinged film from its first maximum. @throws RangeError as filmBehaviour */
export const impulseOfHingedFilm = (x: FilmInputs & FilmReadingInputs): number => impulseOfCoefficient({ ...x, coefficient: hingedCoefficient(x) });
/** First maximum x = X (I/m) √(L/g) · m · of a clamped film. @throws RangeError as filmBehaviour */
export const readingOfClampedFilm = (x: FilmInputs & Numbers<'impulse' | 'mass' | 'length' | 'gravity'>): number =>
  ((clampedCoefficient(x) * x.impulse) / x.mass) * Math.sqrt(x.length / x.gravity);
