/** The session: what the user gave, word for word, with choices and reasons. Nothing computed is in it. */
import type { ColumnMeaning, RecordKind } from '../readings/meanings.ts';
import type { GaugeMeaning } from '../pendulum/pressure.ts';
import { READING_WAYS, type ReadingWay } from '../readings/ways.ts';
import type { EntryName, PartEntryName } from './entries.ts';

/** What the number after ± means (GUM 4.3): a standard uncertainty, limits ±a of a rectangular distribution, or U = k·u. */
export type PlusMinus = 'standard' | 'limits' | 'expanded';

/** One typed quantity: the text as typed, and what its ± means. */
export interface Entry {
  readonly text: string;
  readonly plusMinus: PlusMinus;
  /** Coverage factor as typed, used where plusMinus is 'expanded'; '' is 2. */
  readonly k: string;
  /** Id of the instrument it was measured with; absent: none named. */
  readonly instrument?: string;
}

/** What an instrument measures: its relative ± acts on quantities of this kind alone; 'other' names it and no more. */
export const MEASURED = ['length', 'mass', 'time', 'angle', 'pressure', 'other'] as const;

/** One instrument of the bench, all as typed. */
export interface Instrument {
  readonly id: string;
  readonly name: string;
  readonly serial: string;
  readonly certificate: string;
  /** Date to which its calibration holds. */
  readonly due: string;
  readonly measures: (typeof MEASURED)[number];
  /** Relative ± of its calibration, one and the same for everything that is measured with it; '' for none. */
  readonly scale: Entry;
}

export interface Part {
  readonly id: string;
  readonly name: string;
  readonly entries: Readonly<Partial<Record<PartEntryName, Entry>>>;
}

export interface Choices {
  readonly form: 'pointBob' | 'uniformStrip' | 'stripWithPlate' | 'bodyOfParts' | 'periodAndStiffness' | 'filmStrip';
  /** What brings the pendulum back: gravity (with a flexure if there is one), or a flexure or torsion spring alone about an upright axis. */
  readonly restoring: 'gravity' | 'flexureAlone';
  readonly readingWay: ReadingWay;
  /** Laser: flat screen parallel to the pivot axis, flat screen square to the rest beam, or curved about the pivot. */
  readonly screenShape: 'parallel' | 'square' | 'curved';
  /** What the first-swing column holds: the first maximum, or the whole way from side to side (rest then plays no part). */
  readonly swingMeasured: 'fromRest' | 'sideToSide';
  /** Rest of a record that has one before and one after: the one before, or their mean with half their difference as limits. */
  readonly restTaken: 'before' | 'mean';
  /** Rest of a record without one of its own: the zero before it, or interpolated between the zeros before and after. */
  readonly zeroTaken: 'before' | 'interpolated';
  /** The scale's numbers fall as the pendulum swings away from the thrust. */
  readonly scaleRunsBackward: boolean;
  readonly dampingWay: 'swings' | 'decrement' | 'ratio' | 'maximumTime' | 'quadratic' | 'friction' | 'none';
  /** Law that the swings are fitted with; byDecay: the one that the way the amplitude falls tells. */
  readonly dampingLaw: 'viscous' | 'quadratic' | 'friction' | 'byDecay';
  readonly pulseShape: 'rectangular' | 'halfSine' | 'triangle' | 'versedSine' | 'exponential' | 'measured';
  /** Thruster carried by the pendulum, or its plume caught on a target that hangs there. */
  readonly plume: 'carried' | 'caught';
  /** What the run mean is of: the momentum delivered to the target, or the thruster's impulse bit inferred from it. */
  readonly reported: 'thruster' | 'delivered';
  readonly correctPulse: boolean;
  readonly correctAlignment: boolean;
  readonly correctSampling: boolean;
  readonly correctBackground: boolean;
  readonly correctPropellant: boolean;
  /** Air that a light strip moves and that bears it. */
  readonly correctAir: boolean;
  /** What the pressure gauge shows; percent on a dial says nothing until a person has said of what. */
  readonly gaugeMeaning: GaugeMeaning;
  readonly gravityWay: 'typed' | 'place';
  /** How stiffness and inertia are known (methods: routes A and B; 'masses' leaves a period as a check only). */
  readonly route: 'masses' | 'massesAndPeriod' | 'inertiaAndPeriod';
  readonly periodTimedAs: 'shots' | 'taps';
  readonly calibrationMassHung: 'never' | 'taps' | 'shots' | 'always';
  /** By what the calibration factor is known: masses, lengths and period by the route; taps; masses hung and timed; known weights; the least-squares adjustment of all. */
  readonly calibration: 'geometry' | 'taps' | 'addedMasses' | 'weights' | 'adjustment';
  /** Taps as a line through the origin, or with an intercept that is taken off every launch. */
  readonly tapLine: 'throughOrigin' | 'withIntercept';
  /** Taps before and after the firings: all together, the mean with half their difference as limits, or interpolated to each shot. */
  readonly tapDrift: 'together' | 'mean' | 'interpolated';
  /** Known weights: by a thread over a pulley, or hung from a horizontal outrigger. */
  readonly weightsPull: 'thread' | 'outrigger';
  readonly weightsHungAs: 'shots' | 'taps';
  /** Swinging hammer: all its mass at one point, or a body with its own inertia. */
  readonly hammerForm: 'compact' | 'compound';
  /** The hammer leaves the pendulum again, or stays on it: borne by the pendulum, or by its own pivot. */
  readonly hammerAfter: 'leaves' | 'stays' | 'staysOnItsPivot';
  readonly swingForm: 'full' | 'smallAngle';
}

/** One file, one paste, or the rows typed by hand. */
export interface Sheet {
  readonly id: string;
  readonly name: string;
  readonly origin: 'file' | 'paste' | 'typed';
  /** The text as it came, word for word; '' for a typed sheet. */
  readonly text: string;
  /** SHA-256 of the bytes as they came, lower-case hex; '' for a typed sheet. */
  readonly sha256: string;
  /** Person's overrides of how the text is cut; absent: as found. */
  readonly delimiter?: ',' | ';' | '\t';
  readonly decimal?: '.' | ',';
  /** Meaning of each column, in order. */
  readonly columns: readonly ColumnMeaning[];
  /** Kind of every record that has no kind of its own; null: told from what is filled in. */
  readonly kindOfAll: RecordKind | null;
  /** When its taps were struck, against the firings; absent: in the order of the sheets, or by their times. */
  readonly taken?: 'before' | 'after';
  /** Id of the instrument its readings were read with; absent: none named. */
  readonly instrument?: string;
  /** Cells typed over, by line of the text and column index. */
  readonly edits: Readonly<Record<string, Readonly<Record<number, string>>>>;
  /** Rows typed by hand, after those of the text; addressed as line `+1`, `+2`, … by their id. */
  readonly added: readonly { readonly id: string; readonly cells: readonly string[] }[];
}

/** What a person decided about one record. */
export interface Mark {
  readonly setAside?: { readonly reason: string };
  readonly kind?: RecordKind;
}

/** A record of the hammer's force, as it came. */
export interface ForceRecord {
  readonly id: string;
  readonly name: string;
  readonly text: string;
  readonly sha256: string;
}

/** One line of the list of a trace's shots and taps: "12.5", "12.5 s tap 1.2 mN·s", "40.2 blank". Its id stays when the text changes. */
export interface TraceLine {
  readonly id: string;
  readonly text: string;
}

/** What a column of a trace is used as. */
export const TRACE_USES = ['time', 'reading', 'down', 'pivotAcross', 'pivotDown', 'trigger'] as const;
export type TraceUse = (typeof TRACE_USES)[number];

/** A sampled record of the swing: which bytes they are, how they are read, and its shots and taps. The bytes are kept apart, by their sum. */
export interface Trace {
  readonly id: string;
  readonly name: string;
  /** SHA-256 of the bytes as they came, lower-case hex. */
  readonly sha256: string;
  /** Their number. */
  readonly bytes: number;
  /** Index of the column for each use; -1: none; absent: as found. */
  readonly uses: Readonly<Partial<Record<TraceUse, number>>>;
  /** Units as typed; '': as the header says. */
  readonly timeUnit: string;
  readonly readingUnit: string;
  /** Samples or frames a second as typed: where the time column counts them, or there is none. */
  readonly rate: string;
  /** Time that one sample averages over, its stamp at the middle; '': none. */
  readonly exposure: string;
  /** Shots and taps: as listed, at each rise of the trigger, or found in the swing. */
  readonly eventsFrom: 'list' | 'trigger' | 'found';
  readonly events: readonly TraceLine[];
  /** Added to the listed times: a time as typed, '' for none, or 'find': from the shots themselves. */
  readonly offset: string;
  /** Left out after each shot, for its discharge; '': nothing. */
  readonly blank: string;
  /** A shot's time may be moved by the fit this far; '': not at all. */
  readonly refine: string;
  /** Stretches marked as bad, "12.5 13.1" in s on the record's clock. */
  readonly bad: readonly TraceLine[];
  /** Trains of pulses read as a steady deflection, "20 60 50 Hz": from, to, pulses a second. */
  readonly trains: readonly TraceLine[];
}

/** How a trace is read before anyone has said anything. */
export const FIRST_TRACE: Omit<Trace, 'id' | 'name' | 'sha256' | 'bytes'> = {
  uses: {}, timeUnit: '', readingUnit: '', rate: '', exposure: '', eventsFrom: 'list', events: [], offset: '', blank: '', refine: '', bad: [], trains: [],
};

export interface Session {
  readonly format: 'firstswing-session';
  readonly version: 1;
  readonly title: { readonly name: string; readonly place: string; readonly date: string; readonly remark: string };
  /** An invented scenario, shown as such everywhere. */
  readonly demo: boolean;
  readonly entries: Readonly<Partial<Record<EntryName, Entry>>>;
  readonly parts: readonly Part[];
  readonly instruments: readonly Instrument[];
  /** Turning readings of one free swing, in order, typed as a list with its unit: "31.6 -29.1 26.9 mm"; '' for none. */
  readonly freeSwing: string;
  /** Sampled records of the swing. */
  readonly traces: readonly Trace[];
  /** Records of the hammer's force, one or more taps in each, in the order of the taps. */
  readonly forceRecords: readonly ForceRecord[];
  /** Samples of a measured pulse, a time and a thrust (or what goes with it) a line, a header line before them if there is one; '' for none. */
  readonly pulseSamples: string;
  readonly choices: Choices;
  readonly sheets: readonly Sheet[];
  /** By record id `sheet id/line`. */
  readonly marks: Readonly<Record<string, Mark>>;
}

export const FIRST_CHOICES: Choices = {
  form: 'uniformStrip',
  restoring: 'gravity',
  readingWay: 'rulerAtTip',
  screenShape: 'parallel',
  swingMeasured: 'fromRest',
  restTaken: 'before',
  zeroTaken: 'before',
  scaleRunsBackward: false,
  dampingWay: 'swings',
  dampingLaw: 'viscous',
  pulseShape: 'rectangular',
  plume: 'carried',
  reported: 'thruster',
  correctPulse: true,
  correctAlignment: true,
  correctSampling: true,
  correctBackground: true,
  correctPropellant: true,
  correctAir: true,
  gaugeMeaning: 'absolute',
  gravityWay: 'typed',
  route: 'masses',
  periodTimedAs: 'shots',
  calibrationMassHung: 'never',
  calibration: 'geometry',
  tapLine: 'throughOrigin',
  tapDrift: 'together',
  weightsPull: 'thread',
  weightsHungAs: 'shots',
  hammerForm: 'compact',
  hammerAfter: 'leaves',
  swingForm: 'full',
};

/** Every value that a choice can take. */
export const CHOICE_VALUES: { readonly [Name in keyof Choices]: readonly Choices[Name][] } = {
  form: ['pointBob', 'uniformStrip', 'stripWithPlate', 'bodyOfParts', 'periodAndStiffness', 'filmStrip'],
  restoring: ['gravity', 'flexureAlone'],
  readingWay: READING_WAYS,
  screenShape: ['parallel', 'square', 'curved'],
  swingMeasured: ['fromRest', 'sideToSide'],
  restTaken: ['before', 'mean'],
  zeroTaken: ['before', 'interpolated'],
  scaleRunsBackward: [true, false],
  dampingWay: ['swings', 'decrement', 'ratio', 'maximumTime', 'quadratic', 'friction', 'none'],
  dampingLaw: ['viscous', 'quadratic', 'friction', 'byDecay'],
  pulseShape: ['rectangular', 'halfSine', 'triangle', 'versedSine', 'exponential', 'measured'],
  plume: ['carried', 'caught'],
  reported: ['thruster', 'delivered'],
  correctPulse: [true, false],
  correctAlignment: [true, false],
  correctSampling: [true, false],
  correctBackground: [true, false],
  correctPropellant: [true, false],
  correctAir: [true, false],
  gaugeMeaning: ['absolute', 'gauge', 'percentOfScale', 'percentOfOutside'],
  gravityWay: ['typed', 'place'],
  route: ['masses', 'massesAndPeriod', 'inertiaAndPeriod'],
  periodTimedAs: ['shots', 'taps'],
  calibrationMassHung: ['never', 'taps', 'shots', 'always'],
  calibration: ['geometry', 'taps', 'addedMasses', 'weights', 'adjustment'],
  tapLine: ['throughOrigin', 'withIntercept'],
  tapDrift: ['together', 'mean', 'interpolated'],
  weightsPull: ['thread', 'outrigger'],
  weightsHungAs: ['shots', 'taps'],
  hammerForm: ['compact', 'compound'],
  hammerAfter: ['leaves', 'stays', 'staysOnItsPivot'],
  swingForm: ['full', 'smallAngle'],
};
export function emptySession(): Session {
  return {
    format: 'firstswing-session',
    version: 1,
    title: { name: '', place: '', date: '', remark: '' },
    demo: false,
    entries: {},
    parts: [],
    instruments: [],
    freeSwing: '',
    traces: [],
    forceRecords: [],
    pulseSamples: '',
    choices: FIRST_CHOICES,
    sheets: [],
    marks: {},
  };
}

export const entry = (text: string, plusMinus: PlusMinus = 'standard', k = ''): Entry => ({ text, plusMinus, k });

export const recordId = (sheet: string, line: string | number): string => `${sheet}/${line}`;
