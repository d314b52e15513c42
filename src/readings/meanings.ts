/** What a column of a readings table can mean, and what kinds of record there are. */

export const RECORD_KINDS = ['shot', 'tap', 'blank', 'zero', 'freeSwing'] as const;
/** shot · tap · blank (discharge with the plume blocked, or a dummy load) · zero (rest reading alone) · free swing. */
export type RecordKind = (typeof RECORD_KINDS)[number];

export const ROLES = [
  'kind', 'label', 'rest', 'firstSwing', 'nextSwing', 'restDown', 'firstSwingDown', 'time', 'voltage', 'pressure', 'tapImpulse', 'note', 'ignored',
] as const;
/**
 * restDown, firstSwingDown: the marker's row in a picture, counted downward, beside its column in rest and firstSwing.
 * nextSwing: the turning readings after the first swing, one column each, in order: the first such column is the
 * return swing (the other side), the second the same side again, and so on.
 */
export type Role = (typeof ROLES)[number];

export interface ColumnMeaning {
  readonly role: Role;
  /** Unit symbol of the column's numbers (units/units.ts), '' where the role has none. */
  readonly unit: string;
  /** A proposal that the person has not touched, or the person's own choice. */
  readonly by: 'proposal' | 'person';
}
