/** What a quantity or a sheet's readings were measured with: one of the bench's instruments that measure such a thing. */
import { instrumentName } from '../../reduction/instruments.ts';
import type { Instrument } from '../../session/session.ts';
import type { Dimension } from '../../units/units.ts';
import styles from './EntryField.module.css';

interface Props {
  readonly label: string;
  readonly words?: string;
  readonly id?: string;
  readonly instruments: readonly Instrument[];
  /** Of the quantity; null where nothing is measured. */
  readonly dimension: Dimension | null;
  readonly chosen: string | undefined;
  /** What the choice does to the uncertainty, in a few words. */
  readonly adds?: string | null;
  readonly onChoose: (instrument: string | null) => void;
}

/** Its name; with the serial where another has the same. */
const nameAmong = (one: Instrument, all: readonly Instrument[]): string =>
  instrumentName(all.some((other) => other !== one && other.name.trim() === one.name.trim()) ? one : { ...one, serial: '' }, all.indexOf(one));

/** Name and serial of the one with this id. */
export function nameOf(all: readonly Instrument[], id: string | undefined): string | undefined {
  const found = all.find((one) => one.id === id);
  return found && instrumentName(found, all.indexOf(found));
}

/** Nothing where no instrument of the bench measures such a thing. */
export function MeasuredWith({ label, words = 'measured with', id, instruments, dimension, chosen, adds = null, onChoose }: Props) {
  const fitting = dimension === null ? [] : instruments.filter((one) => one.measures === dimension || one.measures === 'other' || one.id === chosen);
  if (fitting.length === 0) return null;
  return (
    <label className={styles.measuredWith}>
      {words}{' '}
      <select id={id} aria-label={label} value={chosen ?? ''} onChange={({ target: { value } }) => onChoose(value === '' ? null : value)}>
        <option value="">not said</option>
        {fitting.map((one) => <option key={one.id} value={one.id}>{nameAmong(one, instruments)}</option>)}
      </select>
      {adds !== null && <span className="num">{adds}</span>}
    </label>
  );
}
