/** The bench's groups: which entries stand in which group, the choices with their words, and the cautions. */
import type { Role } from '../../readings/meanings.ts';
import type { EntryName } from '../../session/entries.ts';
import type { Choices } from '../../session/session.ts';

type Options<Name extends keyof Choices> = readonly { readonly value: Choices[Name]; readonly words: string; readonly more?: string }[];

export const FORMS: Options<'form'> = [
  { value: 'pointBob', words: 'point bob' },
  { value: 'uniformStrip', words: 'uniform rigid strip' },
  { value: 'stripWithPlate', words: 'rigid strip with a plate or bob' },
  { value: 'bodyOfParts', words: 'body of parts' },
  { value: 'periodAndStiffness', words: 'known by period and static stiffness' },
  { value: 'filmStrip', words: 'hanging film', more: 'neither rigid nor quite limp' },
];

export const READING_WAYS: Options<'readingWay'> = [
  { value: 'rulerAtTip', words: 'flat ruler, read at the tip', more: 'sin θ = x/R' },
  { value: 'rulerUnderLine', words: 'ruler crossed by a line', more: 'tan θ = x/H' },
  { value: 'arcRuler', words: 'ruler on an arc', more: 'θ = s/R' },
  { value: 'chord', words: 'chord, a tape drawn out', more: 'θ = 2 asin(c/2R)' },
  { value: 'rise', words: 'rise of the bob', more: 'θ = acos(1 − h/R)' },
  { value: 'laserSpot', words: 'laser spot on a screen', more: 'tan 2θ = x/D' },
  { value: 'cameraMarker', words: 'camera, marker alone', more: 'sin θ = (u/S)/R' },
  { value: 'cameraPivotMarker', words: 'camera, pivot and marker', more: 'no scale needed' },
  { value: 'sensorOnFace', words: 'displacement sensor on a flat face', more: 'tan θ = x/H' },
  { value: 'sensorOnPoint', words: 'displacement sensor on a point', more: 'sin θ = x/R' },
  { value: 'encoder', words: 'rotary encoder', more: 'counts' },
  { value: 'angle', words: 'angle' },
];

export const DAMPING_WAYS: Options<'dampingWay'> = [
  { value: 'swings', words: 'swings of the readings' },
  { value: 'decrement', words: 'log decrement, typed' },
  { value: 'ratio', words: 'damping ratio, typed' },
  { value: 'maximumTime', words: 'time to the first maximum', more: 'where it does not cross its rest' },
  { value: 'quadratic', words: 'quadratic, typed' },
  { value: 'friction', words: 'pivot friction, typed' },
  { value: 'none', words: 'none' },
];

export const DAMPING_LAWS: Options<'dampingLaw'> = [
  { value: 'viscous', words: 'viscous', more: 'ln A falls evenly' },
  { value: 'quadratic', words: 'quadratic', more: '1/A rises evenly' },
  { value: 'friction', words: 'pivot friction', more: 'A falls evenly' },
  { value: 'byDecay', words: 'as the swings tell' },
];

export const RESTORING: Options<'restoring'> = [
  { value: 'gravity', words: 'gravity, with a flexure if there is one' },
  { value: 'flexureAlone', words: 'a flexure or torsion spring alone', more: 'upright axis' },
];

export const SCREENS: Options<'screenShape'> = [
  { value: 'parallel', words: 'flat, parallel to the pivot axis' },
  { value: 'square', words: 'flat, square to the rest beam' },
  { value: 'curved', words: 'curved about the pivot' },
];

export const SWING_MEASURED: Options<'swingMeasured'> = [
  { value: 'fromRest', words: 'from rest to the first maximum' },
  { value: 'sideToSide', words: 'from side to side', more: 'the whole way' },
];

export const ZERO_TAKEN: Options<'zeroTaken'> = [
  { value: 'before', words: 'the zero before it' },
  { value: 'interpolated', words: 'between the zeros before and after' },
];

export const REST_TAKEN: Options<'restTaken'> = [
  { value: 'before', words: 'the rest before the swing' },
  { value: 'mean', words: 'mean of before and after', more: 'half their difference as limits' },
];

export const PLUME: Options<'plume'> = [
  { value: 'carried', words: 'thruster carried by the pendulum' },
  { value: 'caught', words: 'plume caught on a target' },
];

export const REPORTED: Options<'reported'> = [
  { value: 'thruster', words: 'thruster impulse bit, inferred' },
  { value: 'delivered', words: 'momentum delivered to the target' },
];

export const PULSE_SHAPES: Options<'pulseShape'> = [
  { value: 'rectangular', words: 'rectangular' },
  { value: 'halfSine', words: 'half sine' },
  { value: 'triangle', words: 'triangle' },
  { value: 'versedSine', words: 'versed sine' },
  { value: 'exponential', words: 'exponential decay' },
  { value: 'measured', words: 'as measured', more: 'samples pasted' },
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

export const WEIGHTS_PULL: Options<'weightsPull'> = [
  { value: 'thread', words: 'a level thread over a pulley' },
  { value: 'outrigger', words: 'hung from a level outrigger', more: 'at the pivot’s height' },
];

export const HUNG_AS: Options<'weightsHungAs'> = [
  { value: 'shots', words: 'as fired' },
  { value: 'taps', words: 'as tapped' },
];

export const HAMMER_FORMS: Options<'hammerForm'> = [
  { value: 'compact', words: 'compact', more: 'its mass at the point that strikes' },
  { value: 'compound', words: 'compound', more: 'a body with its own inertia' },
];

export const HAMMER_AFTER: Options<'hammerAfter'> = [
  { value: 'leaves', words: 'comes back or goes on through', more: 'its columns say which' },
  { value: 'stays', words: 'stays, borne by the pendulum', more: 'stuck to it, its thread slack' },
  { value: 'staysOnItsPivot', words: 'stays, borne by its own pivot', more: 'and swings with the pendulum' },
];

export const GAUGE_MEANINGS: Options<'gaugeMeaning'> = [
  { value: 'absolute', words: 'absolute pressure' },
  { value: 'gauge', words: 'pressure against the outside', more: 'negative below it' },
  { value: 'percentOfScale', words: 'percent of a fixed full scale', more: 'most vacuum dials, 100 % at 101.325 kPa (29.92 inHg) below the outside' },
  { value: 'percentOfOutside', words: 'percent of the outside pressure', more: '100 % is no pressure at all' },
];

export type GroupName = 'Pendulum' | 'Thrust' | 'Pressure' | 'Corrections' | 'Reading' | 'Damping' | 'Local g' | 'Timed period' | 'Calibration mass' | 'Static deflection' | 'Taps';

/** Every entry of the bench, in the order of the work. */
export const GROUP_ENTRIES: Readonly<Record<GroupName, readonly EntryName[]>> = {
  Pendulum: [
    'bobMass', 'bobDistance', 'stripMass', 'stripLength', 'stripWidth', 'stripThickness', 'filmThickness', 'filmWidth', 'filmLength', 'filmDensity', 'filmModulus', 'filmMass', 'zoneFrom', 'zoneTo',
    'plateMass', 'plateDistance', 'plateInertia', 'gravityPart', 'flexureStiffness',
  ],
  Thrust: ['leverArm', 'momentumFactor', 'captureFraction', 'plumeExponent', 'targetHalfAngle', 'capacitance', 'leadResistance'],
  Pressure: ['pressure', 'tapPressure', 'barometer', 'dialFullScale', 'dialClass', 'vacuumBelow', 'airTemperature'],
  Corrections: ['pulseDuration', 'tiltOutOfPlane', 'tiltInPlane', 'exitAhead', 'exposure', 'frameInterval', 'backgroundSwing', 'backgroundPhase', 'backgroundTime', 'propellantUsed', 'propellantDistance'],
  Reading: [
    'readingRadius', 'rulerHeight', 'sensorHeight', 'faceOffset', 'screenDistance', 'screenTilt', 'mirrorRadius', 'beamIncidence', 'beamOutOfPlane', 'windowThickness', 'windowIndex',
    'pixelScale', 'cameraYaw', 'cameraToPlane', 'lensDistortion', 'pivotAcross', 'pivotDown', 'markerRadius', 'countsPerTurn', 'sensorSlope', 'sensorOffset', 'sensorCorrelation', 'scaleMark', 'scaleFactor', 'parallaxGap', 'cameraDistance', 'eyeShift', 'division', 'readingSpread',
  ],
  Damping: ['logDecrement', 'dampingRatio', 'firstMaximumTime', 'quadraticDamping', 'frictionAngle'],
  'Local g': ['gravity', 'latitude', 'height'],
  'Timed period': ['period', 'periodAmplitude', 'periodCycles', 'timingSpread'],
  'Calibration mass': ['calibrationMass', 'calibrationMassDistance', 'calibrationMassInertia', 'hungMassSpread', 'hungAtSpread', 'hungMassInertia'],
  'Static deflection': ['staticStiffness', 'forcePerDeflection', 'pullArm', 'weightFactor', 'weightSpread'],
  Taps: ['tapLeverArm', 'tapContact', 'hammerFactor', 'tapSpread', 'hammerMass', 'hammerLength', 'hammerContact', 'hammerPeriod', 'hammerInertia', 'hammerAngleSpread', 'hammerZero'],
};

/** Entries that say something of a table alone: shown once a column of it is there, or where they are typed. */
export const SHOWN_WITH: Readonly<Partial<Record<EntryName, Role>>> = {
  timingSpread: 'swingsTime', hungMassSpread: 'massHung', hungAtSpread: 'massHung', hungMassInertia: 'massHung',
  weightFactor: 'weight', weightSpread: 'weight',
  hammerMass: 'hammerIn', hammerLength: 'hammerIn', hammerContact: 'hammerIn', hammerPeriod: 'hammerIn', hammerInertia: 'hammerIn', hammerAngleSpread: 'hammerIn', hammerZero: 'hammerIn',
};

/** Entries that say something of sampled traces alone. */
export const OF_TRACES: ReadonlySet<EntryName> = new Set(['sensorSlope', 'sensorOffset', 'sensorCorrelation']);

export const CAUTIONS = {
  charge: 'Stored charge: a bank holds its charge after the supply is off and can recover some after a discharge. Discharge, short and earth it before reaching in; your site’s high-voltage rules and a licensed person decide.',
  vacuum: 'Vacuum: glass and acrylic can implode. Shield them, use no flat panes that were not made for it, and keep to the vessel’s rating and local codes.',
  laser: 'Laser: keep the beam off eye level and end it at the screen; class, eyewear and interlocks by local codes and your laser safety officer.',
  hammer: 'Hammer: eyes and fingers out of its path, nothing brittle or under vacuum behind it.',
} as const;
