/** What the readings section calls the roles of columns, the kinds of record, and the usual reasons for setting one aside. */
import { KIND_NAMES, ROLE_NAMES } from '../../problems/words.ts';
import type { RecordKind, Role } from '../../readings/meanings.ts';
import type { RecordResult } from '../../reduction/results.ts';

export const ROLE_LABELS: Readonly<Record<Role, string>> = ROLE_NAMES;

export const KIND_LABELS: Readonly<Record<RecordKind, string>> = KIND_NAMES;

export const KINDS_LABELS: Readonly<Record<RecordKind, string>> = {
  shot: 'shots',
  tap: 'taps',
  blank: 'blanks',
  zero: 'zeros',
  freeSwing: 'free swings',
  weight: 'known weights',
  period: 'timed periods',
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
