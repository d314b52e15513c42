/** What sentences call the columns and the kinds of record. */

/** By role of a column (readings/meanings.ts). */
export const ROLE_NAMES = {
  kind: 'kind of record',
  label: 'shot number',
  rest: 'rest reading',
  restAfter: 'rest reading after',
  firstSwing: 'first swing',
  nextSwing: 'next swing',
  nextSwingDown: 'next swing, row in the picture',
  restDown: 'rest, row in the picture',
  firstSwingDown: 'first swing, row in the picture',
  time: 'time',
  voltage: 'charge voltage',
  pressure: 'pressure',
  tapImpulse: 'tap impulse',
  hammerIn: 'hammer, drawn back to',
  hammerRebound: 'hammer, rebounds back to',
  hammerFollow: 'hammer, goes on through to',
  tapForce: 'force of a tap',
  tapDuration: 'length of that force',
  weight: 'known weight',
  loading: 'reading while loading',
  unloading: 'reading while unloading',
  swingsTime: 'time of the cycles',
  cycles: 'cycles timed',
  amplitude: 'amplitude at the start',
  massHung: 'mass hung for timing',
  massHungAt: 'radius of the mass hung',
  maximumTime: 'time to the first maximum',
  swingBefore: 'swing before the shot',
  timeSinceMaximum: 'time since the maximum of that swing',
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
  weight: 'known weight',
  period: 'timed period',
} as const;
export const KIND_WORDS: Readonly<Record<string, string>> = KIND_NAMES;
