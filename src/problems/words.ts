/** What sentences call the columns and the kinds of record. */

/** By role of a column (readings/meanings.ts). */
export const ROLE_NAMES = {
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
} as const;
export const ROLE_WORDS: Readonly<Record<string, string>> = ROLE_NAMES;

/** By kind of record. */
export const KIND_NAMES = {
  shot: 'shot',
  tap: 'tap',
  blank: 'blank',
  zero: 'zero',
  freeSwing: 'free swing',
} as const;
export const KIND_WORDS: Readonly<Record<string, string>> = KIND_NAMES;
