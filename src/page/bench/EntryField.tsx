/** One quantity as a person types it: value, unit and ± in one field, what the ± means, and beneath how it was read. */
import type { Problem } from '../../problems/problems.ts';
import type { EntryRead } from '../../reduction/results.ts';
import type { EntryKind } from '../../session/entries.ts';
import { BLANK_ENTRY } from '../../session/edits.ts';
import type { Entry, Instrument, PlusMinus } from '../../session/session.ts';
import type { Dimension } from '../../units/units.ts';
import { sentence } from '../../problems/sentences.ts';
import { SymbolText } from '../words.tsx';
import { addedByInstrument, echoOf } from './echo.ts';
import styles from './EntryField.module.css';
import { MeasuredWith, nameOf } from './MeasuredWith.tsx';

interface Props {
  /** Name of the entry, `leverArm` or `part.p1.mass`. */
  readonly name: string;
  readonly kind: EntryKind;
  readonly entry: Entry | undefined;
  readonly read: EntryRead | undefined;
  readonly problems: readonly Problem[];
  /** Kept, and without effect under the present choices. */
  readonly unused?: boolean;
  readonly onChange: (patch: Partial<Entry>) => void;
  /** The entry whose field has the focus, null when it leaves: the drawing marks it. */
  readonly onFocus?: (name: string | null) => void;
  /** Instruments to choose from; absent where none is to be named. */
  readonly measured?: Measured;
}

export interface Measured {
  readonly instruments: readonly Instrument[];
  /** What an instrument measures for this entry; null for nothing. */
  readonly dimension: Dimension | null;
  readonly onChoose: (instrument: string | null) => void;
}

/** What ± can mean; the short words stand in the field, the long ones explain them. */
const PLUS_MINUS: readonly (readonly [PlusMinus, string])[] = [
  ['standard', '± is u'],
  ['limits', '± limits'],
  ['expanded', '± is U, k ='],
];
/** The same of an entry that is itself an uncertainty. */
export const SPREAD: readonly (readonly [PlusMinus, string])[] = [
  ['standard', 'as u'],
  ['limits', 'as ± limits'],
  ['expanded', 'as U, k ='],
];

/** What the ± means, for paper: "± is u", "± is U, k = 2". */
function meaningWords({ plusMinus, k }: Entry, isSpread: boolean): string {
  const words = (isSpread ? SPREAD : PLUS_MINUS).find(([value]) => value === plusMinus)?.[1] ?? '';
  return plusMinus === 'expanded' ? `${words} ${k === '' ? '2' : k}` : words;
}

/** The echo says "exact" already, and what cannot be read need not be called missing too. */
const isSaid = ({ code }: Problem, all: readonly Problem[]): boolean =>
  code !== 'entry-no-uncertainty' && (code !== 'entry-missing' || all.every((other) => other.code === code || other.weight !== 'stops'));

export function EntryField({ name, kind, entry = BLANK_ENTRY, read, problems, unused = false, onChange, onFocus, measured }: Props) {
  const id = `entry-${name}`;
  const below = `${id}-below`;
  const isSpread = kind.isSpread === true;
  const isEmpty = entry.text.trim() === '';
  const echo = read === undefined || isEmpty ? null : echoOf(read, isSpread);
  const added = read === undefined || isEmpty ? null : addedByInstrument(read);
  const named = measured && nameOf(measured.instruments, entry.instrument);
  const said = problems.filter((problem) => isSaid(problem, problems));
  const stopped = !isEmpty && problems.some((problem) => problem.weight === 'stops');
  return (
    <div className={[styles.row, unused ? styles.unused : '', isEmpty ? styles.empty : ''].join(' ')}>
      <label className={styles.label} htmlFor={id}>
        {kind.label} <span className={styles.symbol}><SymbolText symbol={kind.symbol} /></span>
      </label>
      <input
        id={id}
        className={styles.input}
        type="text"
        autoComplete="off"
        spellCheck={false}
        value={entry.text}
        placeholder={kind.unit === '1' ? '' : kind.unit}
        aria-describedby={below}
        aria-invalid={stopped}
        onFocus={() => onFocus?.(name)}
        onBlur={() => onFocus?.(null)}
        onChange={(event) => onChange({ text: event.target.value })}
      />
      <span className={styles.meaning}>
        <select
          aria-label={`${kind.label}: what ± means`}
          title="u: standard uncertainty · limits: nothing lies outside, rectangular · U: expanded, with its coverage factor k"
          value={entry.plusMinus}
          onChange={(event) => {
            const chosen = PLUS_MINUS.find(([value]) => value === event.target.value);
            if (chosen !== undefined) onChange({ plusMinus: chosen[0] });
          }}
        >
          {(isSpread ? SPREAD : PLUS_MINUS).map(([value, words]) => <option key={value} value={value}>{words}</option>)}
        </select>
        {entry.plusMinus === 'expanded' && (
          <input
            className={styles.k}
            type="text"
            inputMode="decimal"
            autoComplete="off"
            aria-label={`${kind.label}: coverage factor k`}
            placeholder="2"
            value={entry.k}
            onChange={(event) => onChange({ k: event.target.value })}
          />
        )}
      </span>
      {measured !== undefined && (!isEmpty || entry.instrument !== undefined) && (
        <MeasuredWith label={`${kind.label}: measured with`} instruments={measured.instruments} dimension={measured.dimension} chosen={entry.instrument} adds={added} onChoose={measured.onChoose} />
      )}
      <div id={below} className={styles.below}>
        <span className="printed">{entry.text}{isEmpty ? '' : `, ${meaningWords(entry, isSpread)}`}{named === undefined ? '' : `, measured with ${named}${added === null ? '' : `, which ${added}`}`}{echo === null ? '' : '; '}</span>
        {echo !== null && <span className="num">{echo}</span>}
        {kind.hint !== '' && <span className={styles.hint}>{echo === null ? '' : ' · '}{kind.hint}</span>}
        {unused && <span> · not used by the present choices</span>}
        {said.map((problem) => (
          <p key={problem.code} className={problem.weight === 'note' ? styles.note : 'look'}>{sentence(problem)}</p>
        ))}
      </div>
    </div>
  );
}
