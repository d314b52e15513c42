/** How figures and their tables name a record and state its impulse bit. */
import type { RecordKind } from '../readings/meanings.ts';
import type { RecordResult } from '../reduction/results.ts';
import { withPlusMinus } from '../units/format.ts';
import type { Unit } from '../units/units.ts';

export const KIND_WORDS: Readonly<Record<RecordKind, string>> = {
  shot: 'Shot', tap: 'Tap', blank: 'Blank', zero: 'Zero', freeSwing: 'Free swing', weight: 'Weight', period: 'Period',
};

/** "Shot 4", "Tap T2"; a record without a label is named by its place in the run. */
export function recordName({ kind, label, order }: Pick<RecordResult, 'kind' | 'label' | 'order'>): string {
  return `${KIND_WORDS[kind]} ${label === '' ? `(record ${order})` : label}`;
}

/** One line for the reader: name, impulse bit with U, what is the matter with it. */
export function readingOf(record: RecordResult, unit: Unit): string {
  const { impulseBit, setAside } = record;
  const value = impulseBit !== null
    ? `${withPlusMinus(impulseBit.value, impulseBit.U, unit)} (U)`
    : record.kind !== 'shot' && record.kind !== 'tap' && record.kind !== 'blank' ? '' : 'no impulse bit';
  return [recordName(record), value, setAside === null ? '' : `set aside: ${setAside}`].filter((part) => part !== '').join(', ');
}
