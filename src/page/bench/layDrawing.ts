/** Where everything on the bench's drawing stands: lengths in metres become places in pixels, to one scale. */
import type { Choices } from '../../session/session.ts';
import { layLaser, layReading, type LaserDrawn, type ReadingDrawn } from './layReading.ts';

export interface BenchLengths {
  readonly form: Choices['form'];
  readonly readingWay: Choices['readingWay'];
  readonly restoring: Choices['restoring'];
  readonly screenShape: Choices['screenShape'];
  readonly plume: Choices['plume'];
  /** Tilt of the screen and the other angles of the beam, rad; the window in it, m. */
  readonly beam: { readonly tilt: number; readonly incidence: number; readonly outOfPlane: number; readonly window: number };
  readonly hasPlate: boolean;
  readonly hung: Choices['calibrationMassHung'];
  /** Length of a bench entry, m; null where none is typed. */
  readonly length: (name: DrawnEntry) => number | null;
  /** Mass of a strip or its plate, kg. */
  readonly mass: (name: 'stripMass' | 'plateMass') => number | null;
  /** Parts of a built-up body: mass in kg, distance below the pivot in m. */
  readonly parts: readonly { readonly name: string; readonly mass: number | null; readonly distance: number | null }[];
  /** Largest throw among the records, rad; null before there is one. */
  readonly throwAngle: number | null;
}

export type DrawnEntry =
  | 'bobDistance' | 'stripLength' | 'plateDistance' | 'filmLength' | 'zoneFrom' | 'zoneTo' | 'leverArm' | 'readingRadius' | 'rulerHeight' | 'sensorHeight' | 'screenDistance' | 'mirrorRadius' | 'tapLeverArm'
  | 'calibrationMassDistance';

/** A measured length, drawn as a dimension line to the right of the pendulum. */
export interface DimensionLine {
  readonly entry: DrawnEntry;
  readonly x: number;
  readonly y: number;
  /** Nothing is typed yet: the place is assumed. */
  readonly assumed: boolean;
}

/** Something named at the left of the pendulum, its word moved where words would overlap. */
export interface SideWord {
  readonly id: 'thrust' | 'tap' | 'centre' | 'calibrationMass';
  readonly y: number;
  readonly wordY: number;
}

export interface Drawing {
  readonly width: number;
  readonly height: number;
  readonly pivot: { readonly x: number; readonly y: number };
  readonly angle: number;
  /** Body from the pivot down (and up, for parts above it), px from the pivot. */
  readonly bodyEnd: number;
  readonly bodyTop: number;
  readonly bodyAssumed: boolean;
  readonly parts: readonly { readonly key: string; readonly y: number; readonly radius: number }[];
  /** Plate or bob on a strip, at the end of a film: px below the pivot. */
  readonly plate: number | null;
  /** The film's struck zone, px below the clamp. */
  readonly zone: { readonly from: number; readonly to: number } | null;
  /** What is not drawn to scale, or not drawn, in words. */
  readonly told: readonly string[];
  readonly calibrationMass: number | null;
  readonly lines: readonly DimensionLine[];
  readonly words: readonly SideWord[];
  /** The ruler: its height, its two ends, and its ticks. */
  readonly ruler: { readonly y: number; readonly from: number; readonly to: number; readonly ticks: readonly number[]; readonly readingX: number; readonly tip: number } | null;
  readonly laser: LaserDrawn | null;
  /** Any other way of reading. */
  readonly reading: ReadingDrawn | null;
  /** A bar of a round length for the scale. */
  readonly scaleBar: { readonly px: number; readonly metres: number };
}

const HEIGHT = 400;
/** Widest swing that is drawn; beyond it everything is drawn smaller, its words are not. */
const WIDEST_SWING = 200;
const TOP = 34;
const BOTTOM = 46;
const LEFT = 168;
/** Between neighbouring dimension lines, and from the swing to the first. */
const LINE_STEP = 30;
const LINE_START = 34;
/** Room to the right of the pendulum at rest that dimension lines leave to the swing. */
const SWING_KEPT_CLEAR = 60;
const WORD_STEP = 17;
const ASSUMED_BODY_M = 0.2;

const isLength = (value: number | null): value is number => value !== null && Number.isFinite(value) && value > 0;

/** The largest of 1, 2, 5 × 10^n that is no more than the value. */
function roundBelow(value: number): number {
  const decade = 10 ** Math.floor(Math.log10(value));
  return decade * (value / decade >= 5 ? 5 : value / decade >= 2 ? 2 : 1);
}

function bodyLength({ form, parts, length }: BenchLengths): number | null {
  if (form === 'uniformStrip' || form === 'stripWithPlate') return length('stripLength');
  if (form === 'filmStrip') return length('filmLength');
  if (form === 'periodAndStiffness') return null;
  if (form === 'pointBob') return length('bobDistance');
  const distances = parts.map((part) => part.distance ?? 0);
  const longest = Math.max(0, ...distances);
  return longest > 0 ? longest : null;
}

/** Pivot to centre of mass, m: of a drawing only; the road has its own. */
function centreOfMass(bench: BenchLengths, body: number): number | null {
  if (bench.form === 'pointBob') return body;
  if (bench.form === 'uniformStrip') return body / 2;
  if (bench.form === 'stripWithPlate') {
    const [strip, plate, at] = [bench.mass('stripMass'), bench.mass('plateMass'), bench.length('plateDistance')];
    return isLength(strip) && isLength(plate) && at !== null ? ((strip * body) / 2 + plate * at) / (strip + plate) : null;
  }
  if (bench.form === 'filmStrip' || bench.form === 'periodAndStiffness') return null;
  const weighed = bench.parts.filter((part) => isLength(part.mass) && part.distance !== null);
  const mass = weighed.reduce((sum, part) => sum + (part.mass ?? 0), 0);
  return mass > 0 ? weighed.reduce((sum, part) => sum + (part.mass ?? 0) * (part.distance ?? 0), 0) / mass : null;
}

/** Which lengths are drawn under the present choices, in the order of the form. */
const READ_AT_RADIUS: readonly Choices['readingWay'][] = ['rulerAtTip', 'arcRuler', 'chord', 'rise', 'cameraMarker', 'sensorOnPoint'];

function drawnEntries({ form, readingWay, hung, length }: BenchLengths): readonly DrawnEntry[] {
  const names: DrawnEntry[] = [];
  if (form === 'pointBob') names.push('bobDistance');
  if (form === 'uniformStrip' || form === 'stripWithPlate') names.push('stripLength');
  if (form === 'stripWithPlate') names.push('plateDistance');
  if (form === 'filmStrip') names.push('filmLength', 'zoneFrom', 'zoneTo');
  names.push('leverArm');
  if (READ_AT_RADIUS.includes(readingWay)) names.push('readingRadius');
  if (readingWay === 'rulerUnderLine') names.push('rulerHeight');
  if (readingWay === 'sensorOnFace') names.push('sensorHeight');
  if (readingWay === 'laserSpot' && length('mirrorRadius') !== null) names.push('mirrorRadius');
  if (hung !== 'never') names.push('calibrationMassDistance');
  names.push('tapLeverArm');
  return names;
}

/** Pushes words apart so that none stands on another, keeping their order. */
function spread(words: readonly { readonly id: SideWord['id']; readonly y: number }[], least: number): readonly SideWord[] {
  let free = least;
  return words.toSorted((a, b) => a.y - b.y).map((word) => {
    const wordY = Math.max(word.y, free);
    free = wordY + WORD_STEP;
    return { ...word, wordY };
  });
}

function partMarks(bench: BenchLengths, scale: number): Drawing['parts'] {
  if (bench.form !== 'bodyOfParts') return [];
  const largest = Math.max(...bench.parts.map((part) => part.mass ?? 0), 0);
  return bench.parts.flatMap((part, index) => {
    if (part.distance === null) return [];
    // Equal density: the radius goes with the cube root of the mass.
    const radius = largest > 0 && isLength(part.mass) ? Math.max(3, 13 * Math.cbrt(part.mass / largest)) : 4;
    return [{ key: `${index}`, y: part.distance * scale, radius }];
  });
}

export function layDrawing(bench: BenchLengths): Drawing {
  const typedBody = bodyLength(bench);
  const names = drawnEntries(bench);
  const typed = new Map(names.map((name) => [name, bench.length(name)]));
  const lengths = [...typed.values()].filter(isLength);
  const body = isLength(typedBody) ? typedBody : Math.max(0, ...lengths) || ASSUMED_BODY_M;
  const above = Math.max(0, ...bench.parts.map((part) => -(part.distance ?? 0)), -(typed.get('calibrationMassDistance') ?? 0));
  const down = Math.max(body, ...lengths);
  const angle = Math.min(Math.abs(bench.throwAngle ?? 0), Math.PI / 2);
  const wide = Math.sin(angle) * down;
  const high = down + above;
  const scale = Math.min((HEIGHT - TOP - BOTTOM) / high, wide > 0 ? WIDEST_SWING / wide : Infinity);
  const pivot = { x: LEFT, y: TOP + above * scale };
  const swing = wide * scale;

  const assumed: Partial<Record<DrawnEntry, number>> = { leverArm: body * 0.85, tapLeverArm: body * 0.7, rulerHeight: body * 1.04, sensorHeight: body * 0.9, plateDistance: body * 0.95, zoneFrom: body * 0.7, zoneTo: body, calibrationMassDistance: body * 0.55 };
  const placed = names.map((entry) => {
    const metres = typed.get(entry) ?? null;
    return { entry, metres: metres ?? assumed[entry] ?? body, assumed: metres === null };
  });
  // A wide swing passes behind the dimension lines, or the drawing would grow too wide to read.
  const firstLine = pivot.x + Math.min(swing, SWING_KEPT_CLEAR) + LINE_START;
  const lines = placed
    .toSorted((a, b) => a.metres - b.metres)
    .map(({ entry, metres, assumed: isAssumed }, index): DimensionLine => ({ entry, x: firstLine + index * LINE_STEP, y: metres * scale, assumed: isAssumed }));
  const yOf = (entry: DrawnEntry): number | null => lines.find((line) => line.entry === entry)?.y ?? null;

  const centre = centreOfMass(bench, body);
  const massY = yOf('calibrationMassDistance');
  const marks: { readonly id: SideWord['id']; readonly y: number }[] = [{ id: 'thrust', y: yOf('leverArm') ?? 0 }];
  marks.push({ id: 'tap', y: yOf('tapLeverArm') ?? 0 });
  if (centre !== null) marks.push({ id: 'centre', y: centre * scale });
  if (massY !== null) marks.push({ id: 'calibrationMass', y: massY });

  const words = spread(marks, bench.readingWay === 'laserSpot' ? 30 : -above * scale);
  const lowest = Math.max(high * scale - above * scale, ...words.map(({ wordY }) => wordY));

  return {
    width: Math.max(firstLine + (lines.length - 1) * LINE_STEP, pivot.x + swing) + 22,
    height: pivot.y + lowest + BOTTOM,
    pivot,
    angle,
    bodyEnd: body * scale,
    bodyTop: -above * scale,
    bodyAssumed: !isLength(typedBody),
    parts: partMarks(bench, scale),
    plate: bench.form === 'stripWithPlate' ? yOf('plateDistance') : bench.form === 'filmStrip' && bench.hasPlate ? body * scale : null,
    zone: bench.form === 'filmStrip' ? { from: yOf('zoneFrom') ?? 0, to: yOf('zoneTo') ?? 0 } : null,
    told: toldOf(bench),
    calibrationMass: massY,
    lines,
    words,
    ruler: layRuler(bench, lines, scale, angle),
    laser: bench.readingWay === 'laserSpot' ? layLaser(bench, angle, yOf('mirrorRadius') ?? 0) : null,
    reading: layReading(bench.readingWay, { angle, radius: yOf('readingRadius') ?? yOf('sensorHeight') ?? body * scale, body: body * scale }),
    scaleBar: { metres: roundBelow(90 / scale), px: roundBelow(90 / scale) * scale },
  };
}

/** What a reader of the drawing has to be told. */
export function toldOf({ form, restoring, readingWay, beam }: BenchLengths): readonly string[] {
  return [
    ...(form === 'periodAndStiffness' ? ['known by its period and stiffness: its shape is not drawn'] : []),
    ...(form === 'filmStrip' ? ['a hanging film bends; drawn straight at the throw'] : []),
    ...(restoring === 'flexureAlone' ? ['upright axis: seen from above'] : []),
    ...(readingWay === 'laserSpot' ? ['screen distance not to scale'] : []),
    ...(readingWay === 'laserSpot' && beam.outOfPlane !== 0 ? ['beam inclined along the pivot axis'] : []),
    ...(readingWay === 'angle' ? ['the angle itself is read'] : []),
  ];
}

function layRuler(bench: BenchLengths, lines: readonly DimensionLine[], scale: number, angle: number): Drawing['ruler'] {
  const atTip = lines.find((line) => line.entry === 'readingRadius');
  const underLine = lines.find((line) => line.entry === 'rulerHeight');
  const radius = atTip ?? underLine;
  if (radius === undefined || (bench.readingWay !== 'rulerAtTip' && bench.readingWay !== 'rulerUnderLine')) return null;
  const readingX = underLine === undefined ? radius.y * Math.sin(angle) : radius.y * Math.tan(Math.min(angle, Math.PI / 3));
  const y = underLine === undefined ? radius.y + 8 : radius.y;
  const step = roundBelow(12 / scale) * scale;
  const from = -4 * step;
  const ticksWanted = Math.ceil((readingX + 3 * step - from) / step);
  const ticks = Array.from({ length: ticksWanted + 1 }, (_, index) => from + index * step);
  return { y, from, to: from + ticksWanted * step, ticks, readingX, tip: underLine === undefined ? radius.y * Math.cos(angle) : y };
}
