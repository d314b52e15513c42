/** How far the model of a film may be from the film on the bench: a judgement, common to all shots, that taps in place take away. */
import type { FilmHold } from './filmModes.ts';
import type { FilmInputs } from './filmStrip.ts';
import { clampedCoefficient, coefficientWithHigherModes, filmBehaviour, hingedCoefficient, offPlateCentre } from './filmStrip.ts';

export interface FilmSpreadInputs extends FilmInputs {
  readonly hold: FilmHold;
  /** True where the hold was looked at and is known; then it adds nothing. */
  readonly holdKnown: boolean;
  /** u(S)/S · 1 · below 1 · 0 where S and its uncertainty go through the propagation themselves, lest they count twice. */
  readonly relativeStiffness: number;
}

export interface FilmSpread {
  /** Relative standard uncertainty of X from the model · 1. */
  readonly standard: number;
  /** Its parts, relative standard uncertainties · 1 · squares add to that of `standard`. */
  readonly parts: Readonly<Record<'hold' | 'higherModes' | 'stiffness' | 'ripple' | 'plateTurn', number>>;
}

/** Largest reading off a plate's centre over that at it, less 1, per share of the length. */
const PLATE_TURN = 2;
const fromHalfWidth = (half: number): number => half / Math.sqrt(3);

/**
 * Relative standard uncertainty of the first maximum's coefficient X, by judgement (GUM type B, from no repeated reading).
 *
 * The value used stands at one end of each range, so the whole difference |ln X′/X| counts as the half-width of a rectangle, u = |ln X′/X|/√3:
 *  - hold: the other of clamped and hinged. Above S = 0.01 their periods differ by more than 6 %, so a timed period
 *    tells which it is: set `holdKnown` then; for a springy film it would swamp all else, and rightly so.
 *  - higher modes: only the first mode's damping is ever measured, and u(ζ) is propagated apart; the modes above it may
 *    be damped less, down to not at all.
 *  - stiffness: half-difference over S (1 ± u(S)/S), already a standard uncertainty.
 *  - ripple: what the reader took for the first maximum may be the smooth swing (mode 1 alone) or the first crest,
 *    where it is not the largest; the farther of the two.
 *  - plate turn: read off the centre of mass of its plate by a share d of the length, limits of 2d: at the bottom edge of
 *    plates of 0.1 … 0.6 of the tape's length the largest reading was found 10 … 26 % high (methods 1.18.8).
 * What it leaves out: curl and creases (they raise S), air, large swings, a plume that is not even over its zone.
 * Valid: as filmBehaviour, and S (1 ± u(S)/S) within its range. Source: judgement.
 * @throws RangeError when an input is out of its range
 */
export function filmModelSpread(inputs: FilmSpreadInputs): FilmSpread {
  const { hold, holdKnown, relativeStiffness, ...film } = inputs;
  if (!(relativeStiffness >= 0 && relativeStiffness < 1)) throw new RangeError(`film model spread: relative uncertainty ${relativeStiffness} of the stiffness number`);
  const behaviour = filmBehaviour(film, hold);
  const X = behaviour.largest.coefficient;
  const coefficient = hold === 'clamped' ? clampedCoefficient : hingedCoefficient;
  const other = hold === 'clamped' ? hingedCoefficient : clampedCoefficient;
  const asEnd = (value: number): number => fromHalfWidth(Math.abs(Math.log(value / X)));
  const ofStiffness = (factor: number): number => Math.log(coefficient({ ...film, stiffnessNumber: film.stiffnessNumber * factor }));
  const parts = {
    hold: holdKnown || film.stiffnessNumber === 0 ? 0 : asEnd(other(film)),
    higherModes: film.dampingRatio === 0 ? 0 : asEnd(coefficientWithHigherModes(film, hold, 0)),
    stiffness: relativeStiffness === 0 || film.stiffnessNumber === 0 ? 0 : Math.abs(ofStiffness(1 + relativeStiffness) - ofStiffness(1 - relativeStiffness)) / 2,
    ripple: Math.max(asEnd(behaviour.modeOne), asEnd(behaviour.earliest.coefficient)),
    plateTurn: fromHalfWidth(PLATE_TURN * (offPlateCentre(film) ?? 0)),
  };
  return { standard: Math.hypot(...Object.values(parts)), parts };
}
