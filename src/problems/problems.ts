/**
 * What is wrong with, or worth knowing about, what the user gave: plain facts by code and place.
 * The words are in sentences.ts; nothing else in the project writes a sentence about the user's data.
 */

/** Where a problem is. Lines are one-based and count the header, as the user's editor does. */
export interface Place {
  /** Sheet id (one file, paste or hand-typed sheet). */
  readonly sheet?: string;
  /** Sheet name as the user knows it (file name). */
  readonly sheetName?: string;
  /** One-based line of the sheet's text. */
  readonly line?: number;
  /** Header of the column, or its one-based number where there is no header. */
  readonly column?: string;
  /** Record id `sheet/line`. */
  readonly record?: string;
  /** Name of a bench entry (session/entries.ts), or `part.2.mass` for the second part's mass. */
  readonly entry?: string;
}

/**
 * stops: a number cannot be had until it is settled · doubt: a number is there and may be wrong ·
 * note: something was assumed or left out and the number is right if the assumption is.
 */
export type Weight = 'stops' | 'doubt' | 'note';

/** One problem. `facts` carries what was found; `effect` what it would change, in standard uncertainties of the run mean. */
export interface Problem {
  readonly code: ProblemCode;
  readonly weight: Weight;
  readonly place: Place;
  readonly facts: Readonly<Record<string, string | number>>;
  readonly effect?: number;
}

export const PROBLEM_CODES = [
  // a whole file
  'file-empty', 'file-binary', 'file-too-large', 'file-no-rows', 'file-other-encoding',
  'column-missing', 'column-twice', 'column-proposed-by-values', 'decimal-comma-in-comma-file', 'row-ragged', 'same-file-rows-lost',
  'quote-not-closed', 'decimal-marks-mixed', 'column-unit-assumed',
  // a cell
  'cell-not-a-number', 'cell-unknown-unit', 'cell-wrong-kind-of-unit', 'cell-kind-unknown', 'cell-empty',
  // a record
  'record-no-rest', 'record-rest-from-zero', 'record-zero-moved', 'record-no-throw', 'record-negative-throw', 'record-reading-beyond-radius', 'record-angle-too-large', 'record-tap-without-impulse', 'swings-not-decaying', 'reading-wrong-kind-of-unit',
  'hammer-angle-too-wide', 'hammer-entry-missing', 'tap-force-without-time', 'tap-both-rebound-and-follow',
  'force-record-no-samples', 'force-record-time-not-rising', 'force-record-too-long', 'force-record-unit-assumed', 'force-record-no-pulse', 'force-record-clipped', 'force-record-after-contact', 'force-records-do-not-fit',
  'trace-no-samples', 'trace-too-long', 'trace-time-not-rising', 'trace-constant', 'trace-unit-assumed', 'trace-event-not-read', 'trace-events-outside', 'trace-not-fitted', 'trace-position-step', 'trace-large-swing', 'trace-two-values', 'trace-jumps-unlisted', 'trace-camera-scale-differs', 'trace-camera-leans', 'trace-train-not-read', 'trace-train-not-fitted', 'trace-train-slow',
  'trace-bytes-missing', 'trace-clipped', 'trace-spikes', 'trace-no-trigger', 'trace-unit-unknown', 'trace-wrong-unit', 'trace-rate-missing', 'trace-pivot-missing', 'trace-sensor-slope-missing', 'trace-offset-found', 'trace-offset-open', 'trace-clock-drifts', 'trace-jumps-found', 'trace-swing-from-bench', 'trace-times-moved', 'trace-too-close',
  'trace-rows-passed-over', 'trace-cut-off', 'trace-gzip-broken', 'trace-numbers-missing', 'trace-samples-repeated', 'trace-time-coarse', 'trace-samples-missing', 'trace-spacing-uneven',
  // evidence of the calibration
  'timing-spread-missing', 'timing-without-place', 'timing-not-positive', 'weights-too-few', 'weights-wrong-way', 'taps-one-size', 'taps-drifted', 'taps-intercept', 'taps-curved', 'masses-tell-little', 'mass-heavier-than-pendulum', 'masses-inertia-negative', 'evidence-contradicts', 'bench-disagrees', 'chosen-evidence-missing',
  // the whole run
  'all-throws-negative', 'all-on-one-division', 'division-from-readings', 'few-shots', 'no-shots', 'shots-beyond-taps', 'change-needs-the-body', 'forms-differ', 'scatter-below-reading', 'taps-scatter-more-than-stated', 'calibrations-differ',
  'damping-none', 'damping-laws-not-told-apart', 'damping-law-fits-badly', 'pulse-reaches-the-peak', 'frames-too-slow', 'background-swing-larger', 'momentum-factor-undeclared', 'capture-taken-as-all', 'propellant-too-heavy', 'damping-from-few', 'damping-carried-over', 'period-differs', 'pressures-mixed',
  'not-a-vacuum-figure', 'gauge-meaning-unclear', 'pressure-beyond-dial', 'pressure-below-zero', 'pressure-above-outside', 'outside-pressure-missing', 'barometer-at-sea-level', 'height-beyond-atmosphere',
  'pressure-not-stated',
  'pulse-samples-missing', 'pulse-samples-too-many', 'pulse-sample-not-two-numbers', 'pulse-sample-time-not-rising', 'pulse-samples-no-impulse', 'pulse-samples-unit-assumed',
  'background-swing-off-scale', 'background-phase-not-used', 'background-not-this-shot', 'tilt-leaves-no-leverage',
  'swings-never-cross-rest', 'swings-too-few', 'swings-fit-unsettled', 'swings-grow', 'swing-stopped', 'maximum-time-needs-the-body', 'maximum-time-too-late',
  'air-needs-width', 'air-on-strip', 'air-not-reckoned',
  // a bench entry
  'entry-missing', 'entry-not-a-number', 'entry-unknown-unit', 'entry-wrong-kind-of-unit', 'entry-out-of-range', 'entry-no-uncertainty', 'entry-unit-assumed', 'entry-uncertainty-large', 'entry-decimal-ambiguous',
  'bench-unstable', 'film-model-alone', 'film-regime', 'film-out-of-range', 'film-needs-displacement', 'stiffness-missing', 'bench-inertia-not-positive', 'gravity-assumed',
  // an instrument
  'instrument-overdue', 'instrument-due-unread', 'instrument-calibration-wide',
  // the session file
  'session-not-json', 'session-not-ours', 'session-newer', 'session-damaged',
] as const;
export type ProblemCode = (typeof PROBLEM_CODES)[number];

export function problem(
  code: ProblemCode,
  weight: Weight,
  place: Place,
  facts: Readonly<Record<string, string | number>> = {},
  effect?: number,
): Problem {
  return effect === undefined ? { code, weight, place, facts } : { code, weight, place, facts, effect };
}
