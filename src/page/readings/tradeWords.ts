/** What the readings section calls the roles of columns, the kinds of record, and the usual reasons for setting one aside. */
import type { RecordKind, Role } from '../../readings/meanings.ts';
import type { RecordResult } from '../../reduction/results.ts';

export const ROLE_LABELS: Readonly<Record<Role, string>> = {
  kind: 'kind of record',
  label: 'shot number',
  rest: 'rest reading',
  firstSwing: 'first swing',
  nextSwing: 'next swing',
  restDown: 'rest, row in the picture',
  firstSwingDown: 'first swing, row in the picture',
  time: 'time',
  voltage: 'charge voltage',
  pressure: 'pressure',
  tapImpulse: 'tap impulse',
  note: 'note',
  ignored: 'not used',
};

export const KIND_LABELS: Readonly<Record<RecordKind, string>> = {
  shot: 'shot',
  tap: 'tap',
  blank: 'blank',
  zero: 'zero',
  freeSwing: 'free swing',
};

export const KINDS_LABELS: Readonly<Record<RecordKind, string>> = {
  shot: 'shots',
  tap: 'taps',
  blank: 'blanks',
  zero: 'zeros',
  freeSwing: 'free swings',
};

/** How the kind of a record is known, shown after it: "shot · column". */
export const KIND_BY_LABELS: Readonly<Record<RecordResult['kindBy'], string>> = {
  person: 'by hand',
  column: 'column',
  sheet: 'all of sheet',
  filledIn: 'filled in',
};

/** Common practice of impulse bit measurement, no source. */
export const ASIDE_REASONS: readonly string[] = [
  'misfire: no discharge',
  'double discharge',
  'charge voltage low',
  'arc elsewhere',
  'pendulum still swinging before',
  'knocked or disturbed',
  'reading missed or off the scale',
  'conditioning shot',
];

/** "3 rows", "1 row". */
export const counted = (n: number, one: string, many = `${one}s`): string => `${n} ${n === 1 ? one : many}`;
