/** The bench's quantities: what each is called, its symbol, dimension, usual unit and range. The form, the road and the report all read this one table. */
import type { Dimension } from '../units/units.ts';

export interface EntryKind {
  readonly label: string;
  readonly symbol: string;
  /**
   * 'reading' takes the dimension of the ruler readings: a length, or an angle where the reading is an angle.
   * 'gauge' is a pressure, or percent where the vacuum dial shows percent.
   */
  readonly dimension: Dimension | 'reading' | 'gauge';
  /** Unit taken where none is typed. */
  readonly unit: string;
  readonly range: 'positive' | 'notNegative' | 'any';
  /** One line of help: what to measure, from where to where. */
  readonly hint: string;
  /** The entry is itself a half-width or a standard uncertainty: "0.2 mm" with the choice of what ± means. */
  readonly isSpread?: true;
}

export const ENTRIES = {
  bobMass: { label: 'Bob mass', symbol: 'm', dimension: 'mass', unit: 'g', range: 'positive', hint: 'everything that swings, taken at one point' },
  bobDistance: { label: 'Pivot to bob', symbol: 'L', dimension: 'length', unit: 'mm', range: 'positive', hint: 'pivot axis to the centre of the bob' },
  stripMass: { label: 'Strip mass', symbol: 'm', dimension: 'mass', unit: 'g', range: 'positive', hint: 'the rigid strip alone' },
  stripLength: { label: 'Strip length', symbol: 'L', dimension: 'length', unit: 'mm', range: 'positive', hint: 'pivot axis to the free end' },
  plateMass: { label: 'Plate or bob', symbol: 'm_p', dimension: 'mass', unit: 'g', range: 'positive', hint: 'fixed to the strip or film' },
  plateDistance: { label: 'Pivot to its centre', symbol: 'r_p', dimension: 'length', unit: 'mm', range: 'positive', hint: 'pivot axis to the centre of mass of the plate or bob' },
  plateInertia: { label: 'Its own inertia', symbol: 'J_p', dimension: 'momentOfInertia', unit: 'g·mm²', range: 'notNegative', hint: 'about its own centre of mass; empty: 0' },
  staticStiffness: { label: 'Static stiffness', symbol: 'κ', dimension: 'rotationalStiffness', unit: 'mN·m/rad', range: 'positive', hint: 'torque per angle, all of it, gravity included; or from a pull, below' },
  forcePerDeflection: { label: 'Pull per deflection read', symbol: 'dF/dx', dimension: 'stiffness', unit: 'mN/mm', range: 'positive', hint: 'slope of known weights against the reading, on the scale of the shots' },
  pullArm: { label: 'Lever arm of the pull', symbol: 'r_w', dimension: 'length', unit: 'mm', range: 'positive', hint: 'pivot axis square to the thread' },
  gravityPart: { label: 'Gravity share of the stiffness', symbol: 'p', dimension: 'number', unit: '1', range: 'notNegative', hint: '1 where gravity alone restores, 0 for a torsion stand; matters at large swings only; empty: 1' },
  filmThickness: { label: 'Film thickness', symbol: 'h', dimension: 'length', unit: 'µm', range: 'positive', hint: 'of the bare film' },
  filmWidth: { label: 'Film width', symbol: 'b', dimension: 'length', unit: 'mm', range: 'positive', hint: 'across' },
  filmLength: { label: 'Free length', symbol: 'L', dimension: 'length', unit: 'mm', range: 'positive', hint: 'clamp to free end' },
  filmDensity: { label: 'Film density', symbol: 'ρ', dimension: 'density', unit: 'kg/m³', range: 'positive', hint: 'polyimide about 1420' },
  filmModulus: { label: 'Film modulus', symbol: 'E', dimension: 'modulus', unit: 'GPa', range: 'positive', hint: 'polyimide about 2.5; a curl or a crease stiffens it many times' },
  filmMass: { label: 'Film mass', symbol: 'm', dimension: 'mass', unit: 'mg', range: 'positive', hint: 'as weighed, without plate; empty: from its measures' },
  zoneFrom: { label: 'Struck from', symbol: 'x_1', dimension: 'length', unit: 'mm', range: 'notNegative', hint: 'clamp to the upper end of the zone that the plume strikes' },
  zoneTo: { label: 'Struck to', symbol: 'x_2', dimension: 'length', unit: 'mm', range: 'positive', hint: 'clamp to the lower end of that zone' },
  flexureStiffness: { label: 'Flexure stiffness', symbol: 'k_f', dimension: 'rotationalStiffness', unit: 'mN·m/rad', range: 'notNegative', hint: 'flexure, wires and hoses together; leave empty for none' },
  leverArm: { label: 'Lever arm of the thrust', symbol: 'r_t', dimension: 'length', unit: 'mm', range: 'positive', hint: 'pivot axis square to the line of thrust, or to the centre of the plume on the target' },
  readingRadius: { label: 'Pivot to reading point', symbol: 'R', dimension: 'length', unit: 'mm', range: 'positive', hint: 'pivot axis to the tip that moves over the ruler' },
  rulerHeight: { label: 'Pivot to ruler', symbol: 'H', dimension: 'length', unit: 'mm', range: 'positive', hint: 'pivot axis straight down to the ruler’s edge' },
  screenDistance: { label: 'Mirror to screen', symbol: 'D', dimension: 'length', unit: 'mm', range: 'positive', hint: 'mirror to the flat screen, along the beam at rest' },
  screenTilt: { label: 'Tilt of the screen', symbol: 'ψ', dimension: 'angle', unit: '°', range: 'any', hint: 'in the swing plane, its far side on the side of positive spots; empty: square to the rest beam' },
  beamIncidence: { label: 'Incidence of the beam in the swing plane', symbol: 'i', dimension: 'angle', unit: '°', range: 'any', hint: 'positive where the beam comes from the pivot’s side; matters where the mirror is off the pivot' },
  mirrorRadius: { label: 'Pivot to mirror', symbol: 'r_m', dimension: 'length', unit: 'mm', range: 'notNegative', hint: 'mirror on the arm, its face through the pivot line; empty: at the pivot' },
  beamOutOfPlane: { label: 'Incidence out of the swing plane', symbol: 'i_o', dimension: 'angle', unit: '°', range: 'any', hint: 'beam inclined along the pivot axis, D measured along it' },
  windowThickness: { label: 'Windows in the beam, thickness', symbol: 't_w', dimension: 'length', unit: 'mm', range: 'notNegative', hint: 'all between mirror and screen together; empty: none' },
  windowIndex: { label: 'Their refractive index', symbol: 'n_w', dimension: 'number', unit: '1', range: 'positive', hint: 'glass about 1.52, acrylic about 1.49' },
  pixelScale: { label: 'Scale of the picture', symbol: 'S', dimension: 'pixelScale', unit: 'px/mm', range: 'positive', hint: 'pixels per millimetre in the plane in which the marker swings' },
  cameraYaw: { label: 'Camera turned from square', symbol: 'γ', dimension: 'angle', unit: '°', range: 'any', hint: 'about the upright, positive where it stands off on the side that the swing goes to; empty: square to the swing' },
  cameraToPlane: { label: 'Camera to the plane of the swing', symbol: 'Z_0', dimension: 'length', unit: 'mm', range: 'positive', hint: 'along its axis; matters with a turn; empty: far' },
  lensDistortion: { label: 'Distortion of the lens', symbol: 'u_k', dimension: 'number', unit: '%', range: 'notNegative', hint: 'uncertainty of the scale over the picture, common to all readings', isSpread: true },
  markerRadius: { label: 'Pivot to marker in the picture', symbol: 'r_px', dimension: 'pixel', unit: 'px', range: 'positive', hint: 'for what to expect before there are readings' },
  pivotAcross: { label: 'Pivot in the picture, across', symbol: 'u_p', dimension: 'pixel', unit: 'px', range: 'any', hint: 'column of the pivot' },
  pivotDown: { label: 'Pivot in the picture, down', symbol: 'v_p', dimension: 'pixel', unit: 'px', range: 'any', hint: 'row of the pivot, counted downward' },
  sensorHeight: { label: 'Pivot to sensor’s line', symbol: 'H', dimension: 'length', unit: 'mm', range: 'positive', hint: 'pivot axis straight down to the line that the sensor looks along' },
  faceOffset: { label: 'Face in front of the pivot line', symbol: 'e', dimension: 'length', unit: 'mm', range: 'any', hint: 'offset of the flat face, towards the sensor positive; empty: 0' },
  sensorSlope: { label: 'Slope of the sensor', symbol: 'b_s', dimension: 'sensorSlope', unit: 'mm/V', range: 'any', hint: 'traces in volts: length per volt, from its calibration line' },
  sensorOffset: { label: 'Length at 0 V', symbol: 'a_s', dimension: 'length', unit: 'mm', range: 'any', hint: 'of the same line; matters with a plumb mark alone; empty: 0' },
  sensorCorrelation: { label: 'Correlation of the two', symbol: 'r_s', dimension: 'number', unit: '1', range: 'any', hint: 'of slope and length at 0 V, as the certificate gives it; empty: 0' },
  countsPerTurn: { label: 'Counts per turn', symbol: 'N_c', dimension: 'count', unit: 'counts', range: 'positive', hint: 'after quadrature' },
  parallaxGap: { label: 'Pointer in front of the ruler', symbol: 'g_p', dimension: 'length', unit: 'mm', range: 'notNegative', hint: 'gap between pointer and ruler; empty: none, or the scale was taken in the pointer’s plane' },
  cameraDistance: { label: 'Eye or camera to ruler', symbol: 'D_c', dimension: 'length', unit: 'mm', range: 'positive', hint: 'needed with a gap' },
  eyeShift: { label: 'Eye moves by', symbol: 'Δ_e', dimension: 'length', unit: 'mm', range: 'notNegative', hint: 'half-width between readings; a fixed camera: 0 or empty' },
  scaleMark: { label: 'Mark at the plumb point', symbol: 'x_0', dimension: 'length', unit: 'mm', range: 'any', hint: 'ruler reading straight under the pivot (laser: where the beam meets the screen square); empty: each record’s own rest' },
  scaleFactor: { label: 'Scale of the ruler', symbol: 's', dimension: 'number', unit: '1', range: 'positive', hint: 'true length per length read; empty: 1, exact' },
  division: { label: 'Read to the nearest', symbol: 'a', dimension: 'reading', unit: 'mm', range: 'positive', hint: 'smallest step in the readings; empty: found from the readings' },
  readingSpread: { label: 'Eye and judgement', symbol: 'u_eye', dimension: 'reading', unit: 'mm', range: 'notNegative', hint: 'further uncertainty of one reading, beside the division', isSpread: true },
  logDecrement: { label: 'Log decrement', symbol: 'δ', dimension: 'number', unit: '1', range: 'notNegative', hint: 'natural logarithm of the ratio of two swings on the same side, one full cycle apart' },
  dampingRatio: { label: 'Damping ratio', symbol: 'ζ', dimension: 'number', unit: '1', range: 'notNegative', hint: 'fraction of critical damping' },
  quadraticDamping: { label: 'Quadratic damping', symbol: 'β', dimension: 'number', unit: '1', range: 'notNegative', hint: 'b/J of J θ″ = −b|θ′|θ′ − …, per radian' },
  frictionAngle: { label: 'Friction of the pivot', symbol: 'θ_f', dimension: 'angle', unit: 'mrad', range: 'notNegative', hint: 'friction torque over stiffness: the pendulum may rest anywhere within ± this' },
  firstMaximumTime: { label: 'Time to the first maximum', symbol: 't_p', dimension: 'time', unit: 's', range: 'positive', hint: 'from the shot, the middle of its pulse, to the first maximum of a small swing' },
  pulseDuration: { label: 'Length of the pulse', symbol: 'τ', dimension: 'time', unit: 'ms', range: 'notNegative', hint: 'whole length; of an exponential decay its time constant; empty: short' },
  tiltInPlane: { label: 'Thrust tilted in the swing plane', symbol: 'α_i', dimension: 'angle', unit: '°', range: 'any', hint: 'only where the lever arm was measured along the arm; empty: 0' },
  exitAhead: { label: 'Exit ahead of the arm’s line', symbol: 'e', dimension: 'length', unit: 'mm', range: 'any', hint: 'stands with a tilt in the swing plane; empty: 0' },
  tiltOutOfPlane: { label: 'Thrust tilted out of the swing plane', symbol: 'α', dimension: 'angle', unit: '°', range: 'any', hint: '0 ± 3° is the usual knowledge; only its cosine acts' },
  exposure: { label: 'Exposure of one frame', symbol: 't_e', dimension: 'time', unit: 'ms', range: 'notNegative', hint: 'a swing blurred by exposure reads low; empty: short' },
  frameInterval: { label: 'Time between frames', symbol: 'Δt', dimension: 'time', unit: 'ms', range: 'notNegative', hint: 'where the highest frame was taken as the first maximum; empty: the maximum itself was read' },
  backgroundSwing: { label: 'Swing before the shot', symbol: 'A_0', dimension: 'reading', unit: 'mm', range: 'notNegative', hint: 'amplitude on the scale with which the pendulum still swings at the shot; empty: at rest' },
  backgroundPhase: { label: 'Phase of that swing at the shot', symbol: 'φ_0', dimension: 'angle', unit: '°', range: 'any', hint: 'from its maximum on the side of the thrust: 90° crosses the rest going back, 180° is the other maximum; empty: not known' },
  backgroundTime: { label: 'Time since its maximum', symbol: 't_0', dimension: 'time', unit: 's', range: 'notNegative', hint: 'from the last maximum on the side of the thrust to the shot, in place of the phase; the amplitude is of that maximum' },
  propellantUsed: { label: 'Propellant used over the run', symbol: 'Δm', dimension: 'mass', unit: 'mg', range: 'notNegative', hint: 'lost by the pendulum from the first shot to the last; empty: none' },
  propellantDistance: { label: 'Pivot to propellant', symbol: 'r_p', dimension: 'length', unit: 'mm', range: 'any', hint: 'below the pivot; above it negative' },
  momentumFactor: { label: 'Momentum factor of the target', symbol: 'β_m', dimension: 'number', unit: '1', range: 'positive', hint: '1 where the plume sticks or leaves sideways, 2 where it comes straight back; empty: anywhere from 1 to 2' },
  captureFraction: { label: 'Part of the plume caught', symbol: 'f_cap', dimension: 'number', unit: '1', range: 'positive', hint: 'share of the axial momentum that meets the target; empty: from the exponent and half-angle, or all of it' },
  plumeExponent: { label: 'Plume exponent', symbol: 'n_p', dimension: 'number', unit: '1', range: 'notNegative', hint: 'flux falls as cosⁿ of the angle from the axis' },
  targetHalfAngle: { label: 'Half-angle of the target', symbol: 'a_t', dimension: 'angle', unit: '°', range: 'positive', hint: 'as the thruster sees it' },
  gravity: { label: 'Local g', symbol: 'g', dimension: 'acceleration', unit: 'm/s²', range: 'positive', hint: 'acceleration of free fall at the bench' },
  latitude: { label: 'Latitude', symbol: 'φ', dimension: 'latitude', unit: '°', range: 'any', hint: 'south negative' },
  height: { label: 'Height', symbol: 'h', dimension: 'length', unit: 'm', range: 'any', hint: 'above sea level' },
  period: { label: 'Timed period', symbol: 'T', dimension: 'time', unit: 's', range: 'positive', hint: 'one full cycle, there and back' },
  periodAmplitude: { label: 'Amplitude while timing', symbol: 'A', dimension: 'angle', unit: '°', range: 'notNegative', hint: 'at the start of the timing; empty: small' },
  periodCycles: { label: 'Cycles timed', symbol: 'N', dimension: 'number', unit: '1', range: 'positive', hint: 'full cycles in one timing; empty: few' },
  pressure: { label: 'Pressure while firing', symbol: 'p', dimension: 'gauge', unit: 'Pa', range: 'any', hint: 'as the gauge shows it, of every record without one of its own' },
  tapPressure: { label: 'Pressure while tapping', symbol: 'p_c', dimension: 'gauge', unit: 'Pa', range: 'any', hint: 'as the gauge shows it; empty: the same as while firing' },
  barometer: { label: 'Barometer', symbol: 'p_out', dimension: 'pressure', unit: 'kPa', range: 'positive', hint: 'station pressure, not the forecast’s sea-level one; empty: from the height' },
  dialFullScale: { label: 'Full scale of the dial', symbol: 'p_FS', dimension: 'pressure', unit: 'kPa', range: 'positive', hint: 'empty: 101.325 kPa (29.92 inHg)' },
  dialClass: { label: 'Class of the dial', symbol: 'c_d', dimension: 'number', unit: '%', range: 'notNegative', hint: 'limits as a part of full scale, 1.6 or 2.5 % say; common to all readings' },
  vacuumBelow: { label: 'Counts as vacuum below', symbol: 'p_v', dimension: 'pressure', unit: 'Pa', range: 'positive', hint: 'a judgement; empty: 0.1 Pa' },
  stripWidth: { label: 'Width of the strip', symbol: 'b', dimension: 'length', unit: 'mm', range: 'positive', hint: 'across, for the air that it moves; empty: air left out' },
  stripThickness: { label: 'Thickness of the strip', symbol: 'h', dimension: 'length', unit: 'µm', range: 'positive', hint: 'for its buoyancy alone' },
  airTemperature: { label: 'Temperature of the gas', symbol: 't_g', dimension: 'celsius', unit: '°C', range: 'any', hint: 'empty: 20 ± 5 °C' },
  capacitance: { label: 'Capacitance of the bank', symbol: 'C', dimension: 'capacitance', unit: 'µF', range: 'positive', hint: 'for what to check at the bench alone' },
  leadResistance: { label: 'Resistance of the discharge circuit', symbol: 'R_d', dimension: 'resistance', unit: 'mΩ', range: 'positive', hint: 'all of it; for what to check at the bench alone' },
  calibrationMass: { label: 'Calibration mass', symbol: 'm_x', dimension: 'mass', unit: 'g', range: 'positive', hint: 'hung on the pendulum for a part of the run only' },
  calibrationMassDistance: { label: 'Pivot to calibration mass', symbol: 'r_x', dimension: 'length', unit: 'mm', range: 'any', hint: 'below the pivot; above it negative' },
  calibrationMassInertia: { label: 'Its own inertia', symbol: 'J_x', dimension: 'momentOfInertia', unit: 'g·mm²', range: 'notNegative', hint: 'about its own centre of mass; empty: 0' },
  tapLeverArm: { label: 'Lever arm of the tap', symbol: 'r_h', dimension: 'length', unit: 'mm', range: 'positive', hint: 'pivot axis to the point that the hammer strikes' },
  tapContact: { label: 'Length of the tap’s contact', symbol: 'l_t', dimension: 'length', unit: 'mm', range: 'positive', hint: 'on a film: how much of its length the tap strikes at once; empty: 2 % of the free length, somewhere up to twice that' },
  hammerFactor: { label: 'Hammer calibration', symbol: 's_h', dimension: 'number', unit: '1', range: 'positive', hint: 'true impulse per impulse stated, common to all taps: 1 ± 2 %' },
  tapSpread: { label: 'Each tap by itself', symbol: 'u_tap', dimension: 'number', unit: '%', range: 'notNegative', hint: 'uncertainty of one tap’s impulse that the next tap does not share, as a part of it', isSpread: true },
  timingSpread: { label: 'One start or stop of the watch', symbol: 'u_t', dimension: 'time', unit: 's', range: 'notNegative', hint: 'by hand about 0.1 s; empty: the last digit of the times alone', isSpread: true },
  hungMassSpread: { label: 'Each mass hung for timing', symbol: 'u_m', dimension: 'mass', unit: 'mg', range: 'notNegative', hint: 'uncertainty of each mass in the table of timings', isSpread: true },
  hungAtSpread: { label: 'Each place that it hung at', symbol: 'u_r', dimension: 'length', unit: 'mm', range: 'notNegative', hint: 'uncertainty of each radius in the table of timings', isSpread: true },
  hungMassInertia: { label: 'Own inertia of a mass hung', symbol: 'J_c', dimension: 'momentOfInertia', unit: 'g·mm²', range: 'notNegative', hint: 'about its own centre of mass; empty: 0' },
  weightFactor: { label: 'Calibration of the weights', symbol: 's_w', dimension: 'number', unit: '1', range: 'positive', hint: 'true weight per weight stated, pulley included, common to all: 1 ± 1 %' },
  weightSpread: { label: 'Each weight by itself', symbol: 'u_w', dimension: 'number', unit: '%', range: 'notNegative', hint: 'uncertainty of one weight that the others do not share, as a part of it', isSpread: true },
  hammerMass: { label: 'Mass of the hammer', symbol: 'm_h', dimension: 'mass', unit: 'g', range: 'positive', hint: 'swinging hammer: what swings' },
  hammerLength: { label: 'Hammer’s pivot to its centre of mass', symbol: 'l_h', dimension: 'length', unit: 'mm', range: 'positive', hint: 'compact hammer: the point that strikes, too' },
  hammerContact: { label: 'Hammer’s pivot to where it strikes', symbol: 'l_c', dimension: 'length', unit: 'mm', range: 'positive', hint: 'compound hammer alone' },
  hammerPeriod: { label: 'Period of the hammer', symbol: 'T_h', dimension: 'time', unit: 's', range: 'positive', hint: 'compound hammer: small swings, free; gives its inertia' },
  hammerInertia: { label: 'Moment of inertia of the hammer', symbol: 'J_h', dimension: 'momentOfInertia', unit: 'kg·mm²', range: 'positive', hint: 'compound hammer, about its own pivot; empty: from its period' },
  hammerAngleSpread: { label: 'Each angle of the hammer', symbol: 'u_φ', dimension: 'angle', unit: '°', range: 'notNegative', hint: 'uncertainty of one reading of its angle', isSpread: true },
  hammerZero: { label: 'Hammer’s protractor at plumb', symbol: 'φ_0', dimension: 'angle', unit: '°', range: 'any', hint: 'what it shows where the hammer hangs still at the contact, counted outward; common to all taps: 0 ± 0.5°' },
  guessedImpulse: { label: 'Guessed impulse bit', symbol: 'I_g', dimension: 'impulse', unit: 'µN·s', range: 'positive', hint: 'of one shot, as well as you know it; for what to expect before there are readings' },
  scaleReach: { label: 'Scale ends at', symbol: 'x_e', dimension: 'reading', unit: 'mm', range: 'positive', hint: 'from rest to the end of the ruler, screen, picture or sensor’s range; empty: as far as the geometry goes' },
} as const satisfies Record<string, EntryKind>;

export type EntryName = keyof typeof ENTRIES;
export const ENTRY_NAMES = Object.keys(ENTRIES) as readonly EntryName[];

/** The three quantities of one part of a built-up body; addressed as `part.1.mass`. */
export const PART_ENTRIES = {
  mass: { label: 'Mass', symbol: 'm_i', dimension: 'mass', unit: 'g', range: 'positive', hint: 'of this part' },
  distance: { label: 'Pivot to its centre of mass', symbol: 'r_i', dimension: 'length', unit: 'mm', range: 'any', hint: 'below the pivot; above it negative' },
  ownInertia: { label: 'Its own inertia', symbol: 'J_i', dimension: 'momentOfInertia', unit: 'g·mm²', range: 'notNegative', hint: 'about its own centre of mass; a rod or strip hung lengthwise: mL²/12' },
} as const satisfies Record<string, EntryKind>;
export type PartEntryName = keyof typeof PART_ENTRIES;
