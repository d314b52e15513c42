/** The bench's groups: which entries stand in which group, the choices with their words, and the cautions. */
import type { EntryName } from '../../session/entries.ts';
import type { Choices } from '../../session/session.ts';

type Options<Name extends keyof Choices> = readonly { readonly value: Choices[Name]; readonly words: string; readonly more?: string }[];

export const FORMS: Options<'form'> = [
  { value: 'pointBob', words: 'point bob' },
  { value: 'uniformStrip', words: 'uniform rigid strip' },
  { value: 'bodyOfParts', words: 'body of parts' },
];

export const READING_WAYS: Options<'readingWay'> = [
  { value: 'rulerAtTip', words: 'flat ruler, read at the tip', more: 'sin θ = x/R' },
  { value: 'rulerUnderLine', words: 'ruler crossed by a line', more: 'tan θ = x/H' },
  { value: 'laserSpot', words: 'laser spot on a flat screen', more: 'tan 2θ = x/D' },
  { value: 'angle', words: 'angle' },
];

export const DAMPING_WAYS: Options<'dampingWay'> = [
  { value: 'swings', words: 'swings of the readings' },
  { value: 'decrement', words: 'log decrement, typed' },
  { value: 'ratio', words: 'damping ratio, typed' },
  { value: 'none', words: 'none' },
];

export const GRAVITY_WAYS: Options<'gravityWay'> = [
  { value: 'typed', words: 'typed' },
  { value: 'place', words: 'from latitude and height' },
];

export const ROUTES: Options<'route'> = [
  { value: 'masses', words: 'masses and lengths alone', more: 'a timed period is a check only' },
  { value: 'massesAndPeriod', words: 'A: masses, centre of mass and timed period', more: 'J follows from κ and T' },
  { value: 'inertiaAndPeriod', words: 'B: moment of inertia and timed period', more: 'κ follows from J and T' },
];

export const PERIOD_TIMED: Options<'periodTimedAs'> = [
  { value: 'shots', words: 'as fired' },
  { value: 'taps', words: 'as tapped' },
];

export const MASS_HUNG: Options<'calibrationMassHung'> = [
  { value: 'never', words: 'never' },
  { value: 'taps', words: 'during taps only' },
  { value: 'shots', words: 'during shots only' },
  { value: 'always', words: 'always' },
];

export type GroupName = 'Pendulum' | 'Thrust' | 'Reading' | 'Damping' | 'Local g' | 'Timed period' | 'Calibration mass' | 'Taps';

/** Every entry of the bench, in the order of the work. */
export const GROUP_ENTRIES: Readonly<Record<GroupName, readonly EntryName[]>> = {
  Pendulum: ['bobMass', 'bobDistance', 'stripMass', 'stripLength', 'flexureStiffness'],
  Thrust: ['leverArm'],
  Reading: ['readingRadius', 'rulerHeight', 'screenDistance', 'scaleMark', 'scaleFactor', 'division', 'readingSpread'],
  Damping: ['logDecrement', 'dampingRatio'],
  'Local g': ['gravity', 'latitude', 'height'],
  'Timed period': ['period', 'periodAmplitude', 'periodCycles'],
  'Calibration mass': ['calibrationMass', 'calibrationMassDistance', 'calibrationMassInertia'],
  Taps: ['tapLeverArm', 'hammerFactor', 'tapSpread'],
};

export const CAUTIONS = {
  charge: 'Stored charge: a bank holds its charge after the supply is off and can recover some after a discharge. Discharge, short and earth it before reaching in; your site’s high-voltage rules and a licensed person decide.',
  vacuum: 'Vacuum: glass and acrylic can implode. Guard them, and keep to the vessel’s rating and local codes.',
  laser: 'Laser: keep the beam off eye level and end it at the screen; class, eyewear and interlocks by local codes and your laser safety officer.',
  hammer: 'Hammer: eyes and fingers out of its path, nothing brittle or under vacuum behind it.',
} as const;
