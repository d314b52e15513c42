/** Before there are readings: what a guessed impulse bit would show on this bench, found by running the road backward. */
import { anchor, contributions, exact, ofSource, standardUncertainty, type Anchor, type Uncertain } from '../metrology/uncertain.ts';
import { fromLimits, fromResolution, type Source } from '../metrology/source.ts';
import { rootBetween } from '../numeric/roots.ts';
import { ratioToHalfDecay } from '../pendulum/damping.ts';
import { WIDEST_FROM_SIDES } from '../readings/angle.ts';
import { WAYS, type StandNumbers } from '../readings/ways.ts';
import type { RecordKind } from '../readings/meanings.ts';
import type { Choices } from '../session/session.ts';
import type { Dimension } from '../units/units.ts';
import type { Correction, Corrections } from './corrections.ts';
import { AT_REST } from './background.ts';
import { readingDimension, type BenchRead } from './entries.ts';
import type { Factors } from './factors.ts';
import { impulses } from './impulse.ts';
import { planMass, type PlannedMass } from './planMass.ts';
import type { ReadingSpread } from './readings.ts';
import type { Stated } from './results.ts';
import type { SessionRecord } from './sheets.ts';
import { swingOf, UPRIGHT, type Form, type Way } from './shots.ts';
import { valueOf, type Body, type ByConfiguration } from './stand.ts';
import type { Damping, Scale } from './swings.ts';

/** What ends the throw: the typed end of the scale, the radius that is read over, a line that runs along its scale, a beam that grazes its screen, a pendulum that stands upright, a swing too wide to be read from side to side, or the small swings of the film’s modes. */
export type ScaleEnd = 'scale' | 'radius' | 'alongScale' | 'grazing' | 'upright' | 'sides' | 'smallSwings';

export interface Plan {
  /** What the run will report, guessed, N·s. */
  readonly guessed: Stated;
  /** Where the calibration factor is from: taps where there are some. */
  readonly calibration: Way;
  /** Dimension of the throws below, and the unit in which they are read. */
  readonly dimension: Dimension;
  readonly unit: string;
  /** The throw as it will be read (from rest, or from side to side), with its u from the guess and the bench; null beyond the geometry. */
  readonly expected: { readonly reading: Stated; readonly angle: number; readonly beyondScale: boolean } | null;
  /** The largest throw; its reading is null where it has no end. `times`: impulse over the guess. */
  readonly fullScale: { readonly impulse: number; readonly times: number; readonly angle: number; readonly reading: number | null; readonly end: ScaleEnd } | null;
  /** Division and eye of one shot; null where neither is known. */
  readonly reading: {
    /** u of one throw, both its readings. */
    readonly u: number;
    readonly ofThrow: number;
    /** u(I)/I that it makes, and its share of one shot's variance. */
    readonly ofImpulse: number;
    readonly share: number;
    /** u(I) of one shot, everything in. */
    readonly shotU: number;
  } | null;
  /** The smallest impulse bits that a shot shows; null where nothing is known of the readings. */
  readonly least: { readonly decision: PlannedThrow; readonly detection: PlannedThrow; readonly guessSeen: 'surely' | 'perhaps' | 'no' } | null;
  /** Taps that span the shots, smallest first, each as its hammer states it; null without the tap's lever arm. */
  readonly taps: readonly PlannedThrow[] | null;
  readonly calibrationMass: PlannedMass | null;
}

/** An impulse, N·s, and the throw that it makes. */
export interface PlannedThrow {
  readonly impulse: number;
  readonly reading: number;
}

/** What the road has gathered without any record. */
export interface PlanFacts {
  readonly scale: Scale | null;
  readonly spread: ReadingSpread;
  readonly damping: Damping;
  readonly shares: ByConfiguration<Anchor>;
  readonly corrections: Corrections;
  readonly factors: Readonly<Record<Form, Factors>>;
  readonly arms: ByConfiguration<Uncertain | null>;
  readonly bodies: ByConfiguration<Body> | null;
  readonly gravity: Uncertain | null;
  /** Pivot to marker in the picture, px. */
  readonly markerRadius: number | null;
  readonly records: readonly SessionRecord[];
}

/** One-sided 5 % of a normal distribution. Source: L. A. Currie, Anal. Chem. 40 (1968) 586, from memory: L_C = 1.645 s₀, L_D = 3.29 s₀ with a well-known blank. */
const DECISION = 1.645;
const DETECTION = 3.29;
/** Taps span the shots from half to one and a half of the throw, five of them; common practice, no source. */
const TAP_SPAN = [0.5, 1.5] as const;
const TAP_SIZES = 5;
/** Taps stay this far inside the end of the scale. */
const INSIDE = 0.95;
/** To here the film's small swings hold to 0.13 % (methods 1.1). */
const FILM_SWING = (10 * Math.PI) / 180;
/** Kept off an end at which the reading is lost or has no end, rad. */
const OFF_END = 1e-6;
const SLOPE_STEP = 1e-4;
/** A root that misses its impulse by more is a jump: the throw is lost in the swing before the shot. */
const MISSED = 1e-6;

/** null without a guess, or where the bench does not yet tell an impulse from a reading. */
export function planOf(bench: BenchRead, choices: Choices, facts: PlanFacts): Plan | null {
  const guess = valueOf(bench, 'guessedImpulse');
  const { scale, factors } = facts;
  const way: Way = factors.full[choices.calibration].shots ? choices.calibration : 'geometry';
  if (!guess || !scale || !factors.full[way].shots || !facts.arms.shots || facts.corrections.impulse === null) return null;
  const bare = bareFacts({ ...facts, scale: { ...scale, mark: null } });
  const shot = road('shot', bare, choices, way);
  const geometryEnd = endOfGeometry(choices, shot.stand, scale.sideToSide);
  const scaleEnd = endOfScale(bench, choices, shot, geometryEnd);
  const theta = angleFor(guess.value, shot, geometryEnd.angle);
  const full = shot.impulse(shot.reading(scaleEnd.angle));
  const x = theta === null ? null : shot.reading(theta);
  const one = x === null ? null : oneShot(x, { ...facts, scale: { ...scale, mark: null } }, choices, way);
  return {
    guessed: { value: guess.value, u: standardUncertainty(guess) }, calibration: way,
    dimension: scale.way === 'cameraPivotMarker' ? 'angle' : readingDimension(choices), unit: readUnit(bench, choices, facts.records),
    expected: theta === null || x === null || !one ? null : {
      reading: { value: x, u: Math.hypot(standardUncertainty(guess), one.uBench) / shot.slope(x) }, angle: theta, beyondScale: theta > scaleEnd.angle,
    },
    fullScale: full === null ? null : {
      impulse: full, times: full / guess.value, angle: scaleEnd.angle, end: scaleEnd.end, reading: scaleEnd.end === 'alongScale' || scaleEnd.end === 'grazing' ? null : shot.reading(scaleEnd.angle),
    },
    reading: x === null || !one || one.uRead === 0 ? null : {
      u: throwU(facts), ofThrow: throwU(facts) / x, ofImpulse: one.uRead / guess.value, share: one.uRead ** 2 / (one.uRead ** 2 + one.uBench ** 2), shotU: Math.hypot(one.uRead, one.uBench),
    },
    least: leastOf(bench, choices, facts, bare, way, guess.value, geometryEnd.angle),
    taps: theta === null || !facts.arms.taps ? null : tapsFor(bench, theta, scaleEnd.angle, road('tap', bare, choices, factors.full[way].taps ? way : 'geometry')),
    calibrationMass: planMass(bench, choices, facts.bodies, facts.gravity),
  };
}

type Ready = PlanFacts & { readonly scale: Scale };

const planned = (kind: RecordKind): SessionRecord => ({
  id: `plan.${kind}`, line: '', kind, kindBy: 'person', label: '', note: '', rest: null, firstSwing: null, restDown: null, firstSwingDown: null, restAfter: null, nextSwingsDown: [], nextSwings: [], time: null, voltage: null, pressure: null,
  tapImpulse: null, maximumTime: null, hammerIn: null, hammerRebound: null, hammerFollow: null, tapForce: null, tapDuration: null,
  weight: null, loading: null, unloading: null, swingsTime: null, cycles: 1, amplitude: null, massHung: null, massHungAt: null, swingBefore: null, timeSinceMaximum: null, problems: [], cells: [], edited: [], sheet: 'plan', sheetName: '',
});

/** The road of one record that was never read: readings x from a rest of 0 to an impulse. */
function alongRoad(kind: RecordKind, rest: Uncertain, first: Uncertain, facts: Ready, choices: Choices, way: Way): Uncertain | null {
  const swing = swingOf(planned(kind), { restFrom: null, rest, first, next: [] }, facts.scale, facts.damping, facts.shares, facts.corrections, []);
  return impulses([swing], facts.factors, facts.arms, facts.corrections, choices).impulse(swing, 'full', way);
}

interface PlainRoad {
  readonly stand: StandNumbers;
  /** The reading away from rest, from θ, and the throw as it is read. */
  readonly fromRest: (theta: number) => number;
  readonly reading: (theta: number) => number;
  /** I from the throw, of a tap at its lever arm; null where the road gives none. */
  readonly impulse: (x: number) => number | null;
  /** dI/dx. */
  readonly slope: (x: number) => number;
}

function road(kind: 'shot' | 'tap', facts: Ready, choices: Choices, way: Way): PlainRoad {
  const { scale } = facts;
  const stand = Object.fromEntries(Object.entries(scale.stand).map(([name, y]) => [name, y.value]));
  const q = ratioToHalfDecay({ ratio: facts.damping.ratio[kind === 'tap' ? 'taps' : 'shots'].value });
  const fromRest = (theta: number): number => WAYS[scale.way].reading(theta, stand) / scale.scale.value;
  const reading = (theta: number): number => fromRest(theta) - (scale.sideToSide ? fromRest(-q * theta) : 0);
  const impulse = (x: number): number | null => alongRoad(kind, exact(0), exact(scale.sense * x), facts, choices, way)?.value ?? null;
  const slope = (x: number): number => Math.abs(((impulse(x) ?? 0) - (impulse(x * (1 - SLOPE_STEP)) ?? 0)) / (x * SLOPE_STEP));
  return { stand, fromRest, reading, impulse, slope };
}

/** The same facts without uncertainties: the search asks some twenty times. */
function bareFacts(facts: Ready): Ready {
  const bare = (y: Uncertain): Anchor => anchor(exact(y.value));
  const both = (y: ByConfiguration<Anchor>): ByConfiguration<Anchor> => ({ shots: bare(y.shots), taps: bare(y.taps) });
  const known = (y: ByConfiguration<Uncertain | null>): ByConfiguration<Anchor | null> => ({ shots: y.shots && bare(y.shots), taps: y.taps && bare(y.taps) });
  const list = (corrections: readonly Correction[]): readonly Correction[] => corrections.map((one) => ({ ...one, factor: bare(one.factor) }));
  const of = (f: Factors): Factors => ({ ...f, geometry: known(f.geometry), taps: known(f.taps), addedMasses: known(f.addedMasses), weights: known(f.weights), adjustment: known(f.adjustment), tapCalibration: null });
  const { scale, damping, corrections, factors } = facts;
  return {
    ...facts,
    scale: { ...scale, scale: bare(scale.scale), stand: Object.fromEntries(Object.entries(scale.stand).map(([name, y]) => [name, bare(y)])) },
    damping: { ...damping, ratio: both(damping.ratio), quadratic: both(damping.quadratic), friction: both(damping.friction) },
    shares: both(facts.shares), arms: known(facts.arms),
    corrections: { ...corrections, reading: list(corrections.reading), impulse: corrections.impulse && list(corrections.impulse), target: list(corrections.target) },
    factors: { full: of(factors.full), smallAngle: of(factors.smallAngle) },
  };
}

/** θ_p whose throw the road takes for this impulse; null beyond `most`. */
function angleFor(impulse: number, on: PlainRoad, most: number): number | null {
  const found = rootBetween((theta) => (on.impulse(on.reading(theta)) ?? 0) - impulse, 0, most);
  if (found.status !== 'found') return null;
  const back = on.impulse(on.reading(found.x));
  return back !== null && Math.abs(back / impulse - 1) < MISSED ? found.x : null;
}

interface End {
  readonly angle: number;
  readonly end: ScaleEnd;
}

function endOfGeometry({ readingWay, screenShape }: Choices, stand: StandNumbers, sideToSide: boolean): End {
  const quarter = Math.PI / 2 - OFF_END;
  const of = (): End => {
    switch (readingWay) {
      case 'rulerAtTip':
      case 'cameraMarker':
      case 'sensorOnPoint': return { angle: quarter, end: 'radius' };
      case 'rulerUnderLine':
      case 'sensorOnFace': return { angle: quarter, end: 'alongScale' };
      // Curved about the pivot, a screen is taken to end square to the rest beam.
      case 'laserSpot': return { angle: (Math.PI / 2 - (screenShape === 'curved' ? 0 : Math.abs(stand['screenTilt'] ?? 0))) / 2 - OFF_END, end: 'grazing' };
      case 'arcRuler':
      case 'chord':
      case 'rise':
      case 'cameraPivotMarker':
      case 'encoder':
      case 'angle': return { angle: UPRIGHT - OFF_END, end: 'upright' };
    }
  };
  const end = of();
  return sideToSide && end.angle > WIDEST_FROM_SIDES ? { angle: WIDEST_FROM_SIDES - OFF_END, end: 'sides' } : end;
}

/** The nearest of the geometry's end, the film's small swings and the typed end of the scale. */
function endOfScale(bench: BenchRead, choices: Choices, on: PlainRoad, geometry: End): End {
  const film: End = choices.form === 'filmStrip' && FILM_SWING < geometry.angle ? { angle: FILM_SWING, end: 'smallSwings' } : geometry;
  const reach = valueOf(bench, 'scaleReach')?.value;
  if (reach === undefined || choices.readingWay === 'cameraPivotMarker') return film;
  const found = rootBetween((theta) => on.fromRest(theta) - reach, 0, film.angle);
  return found.status === 'found' ? { angle: found.x, end: 'scale' } : film;
}

/** Readings of one throw: rest and first swing, or the one from side to side. */
const readingsOfThrow = ({ scale }: PlanFacts): number => (scale?.sideToSide === true ? 1 : 2);
/** u of one reading; of a picture with pivot and marker as the angle that it is at the marker's radius, or nothing where that is not typed. */
function oneReadingU({ spread, scale, markerRadius }: PlanFacts): number {
  const u = Math.hypot(fromResolution(spread.division), spread.eye);
  if (scale?.way !== 'cameraPivotMarker') return u;
  return markerRadius === null ? 0 : u / markerRadius;
}
const throwU = (facts: PlanFacts): number => Math.sqrt(readingsOfThrow(facts)) * oneReadingU(facts);

/** u(I) of one shot at the throw x: what its readings make, and all else. */
function oneShot(x: number, facts: Ready, choices: Choices, way: Way): { readonly uRead: number; readonly uBench: number } | null {
  const read = (id: string, estimate: number): Source => ({ id: `plan.${id}`, label: 'Reading', symbol: 'x', dimension: readingDimension(choices), estimate, u: oneReadingU(facts), distribution: 'normal', dof: Infinity });
  const sources = [read('rest', 0), read('first', facts.scale.sense * x)] as const;
  const rest = facts.scale.sideToSide ? exact(0) : ofSource(sources[0]);
  const y = alongRoad('shot', rest, ofSource(sources[1]), facts, choices, way);
  if (!y) return null;
  const parts = contributions(y);
  const [uRest, uFirst] = sources.map((source) => parts.get(source) ?? 0) as [number, number];
  const uRead = Math.hypot(uRest, uFirst);
  return { uRead, uBench: Math.sqrt(Math.max(0, standardUncertainty(y) ** 2 - uRead ** 2)) };
}

/** Decision and detection limit: the scatter of the throw of no impulse, as throws, and through the road as impulses. */
function leastOf(bench: BenchRead, choices: Choices, facts: PlanFacts, bare: Ready, way: Way, guess: number, most: number): Plan['least'] {
  const still = road('shot', { ...bare, corrections: { ...bare.corrections, background: AT_REST } }, choices, way);
  const before = bare.corrections.background.shots.amplitude > 0 ? (valueOf(bench, 'backgroundSwing')?.value ?? 0) / Math.SQRT2 : 0;
  const rubbed = still.reading(fromLimits(bare.damping.friction.shots.value));
  const read = throwU(facts);
  if (read === 0) return null;
  const s0 = Math.hypot(read, before, rubbed);
  const at = (reading: number): PlannedThrow | null => {
    const impulse = reading < still.reading(most) ? still.impulse(reading) : null;
    return impulse === null ? null : { impulse, reading };
  };
  const [decision, detection] = [at(DECISION * s0), at(DETECTION * s0)];
  return decision && detection && { decision, detection, guessSeen: guess >= detection.impulse ? 'surely' : guess >= decision.impulse ? 'perhaps' : 'no' };
}

function tapsFor(bench: BenchRead, theta: number, most: number, on: PlainRoad): readonly PlannedThrow[] | null {
  const [from, to] = [TAP_SPAN[0] * theta, Math.min(TAP_SPAN[1] * theta, INSIDE * most)];
  if (!(to > from)) return null;
  const hammer = valueOf(bench, 'hammerFactor')?.value ?? 1;
  const taps = Array.from({ length: TAP_SIZES }, (_, i): PlannedThrow | null => {
    const reading = on.reading(from + ((to - from) * i) / (TAP_SIZES - 1));
    const struck = on.impulse(reading);
    return struck === null ? null : { impulse: struck / hammer, reading };
  });
  return taps.every((tap) => tap !== null) ? taps : null;
}

/** The unit of the first swings where there are some, else that of the division. */
function readUnit(bench: BenchRead, choices: Choices, records: readonly SessionRecord[]): string {
  if (choices.readingWay === 'cameraPivotMarker') return 'mrad';
  return records.find(({ firstSwing }) => firstSwing !== null)?.firstSwing?.unit ?? bench.entries.get('division')?.read.unit ?? '';
}
