/** What a column of a readings table can mean, and what kinds of record there are. */

export const RECORD_KINDS = ['shot', 'tap', 'blank', 'zero', 'freeSwing', 'weight', 'period'] as const;
/** shot · tap · blank (discharge with the plume blocked, or a dummy load) · zero (rest reading alone) · free swing · weight (deflection by a known weight) · period (timed swings). */
export type RecordKind = (typeof RECORD_KINDS)[number];

export const ROLES = [
  'kind', 'label', 'rest', 'restAfter', 'firstSwing', 'nextSwing', 'nextSwingDown', 'restDown', 'firstSwingDown', 'time', 'voltage', 'pressure', 'tapImpulse',
  'hammerIn', 'hammerRebound', 'hammerFollow', 'tapForce', 'tapDuration', 'weight', 'loading', 'unloading', 'swingsTime', 'cycles', 'amplitude', 'massHung', 'massHungAt', 'swingBefore', 'timeSinceMaximum', 'maximumTime', 'note', 'ignored',
] as const;
/**
 * restDown, firstSwingDown: the marker's row in a picture, counted downward, beside its column in rest and firstSwing.
 * restAfter: the rest reading once the swing has died out. nextSwingDown: the rows of the turning points in the picture, in their order.
 * nextSwing: the turning readings after the first swing, one column each, in order: the first such column is the
 * return swing (the other side), the second the same side again, and so on.
 * hammerIn, hammerRebound, hammerFollow: a swinging hammer’s angle before the blow, back up on the side that it came from, and on
 * through beyond the contact. loading, unloading: the reading with a known weight on, while weights are put on and while they are taken off.
 * swingsTime: time of `cycles` full cycles, `amplitude` at their start, with `massHung` at the radius `massHungAt`.
 * swingBefore: amplitude with which the pendulum still swings at the shot; timeSinceMaximum: from its last maximum on the side of the thrust to the shot.
 * maximumTime: from the shot or tap to its first maximum.
 */
export type Role = (typeof ROLES)[number];

export interface ColumnMeaning {
  readonly role: Role;
  /** Unit symbol of the column's numbers (units/units.ts), '' where the role has none. */
  readonly unit: string;
  /** A proposal that the person has not touched, or the person's own choice. */
  readonly by: 'proposal' | 'person';
}
