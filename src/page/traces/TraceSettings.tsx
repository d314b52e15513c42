/** How a trace is read: which column is what, its units and rate, where its shots come from, and what is left out after each. */
import { useId } from 'react';
import type { TraceTold } from '../../reduction/traceResults.ts';
import type { Trace, TraceUse } from '../../session/session.ts';
import styles from './traceCard.module.css';

interface Props {
  readonly trace: Trace;
  readonly told: TraceTold | undefined;
  /** Uses that this way of reading has. */
  readonly uses: readonly TraceUse[];
  readonly onChange: (what: string, change: Partial<Trace>, join?: string) => void;
}

const USE_WORDS: Readonly<Record<TraceUse, string>> = {
  time: 'time', reading: 'reading', down: 'down in the picture', pivotAcross: 'pivot, across', pivotDown: 'pivot, down', trigger: 'trigger',
};
const FROM_WORDS: Readonly<Record<Trace['eventsFrom'], string>> = { list: 'the list below', trigger: 'each rise of the trigger', found: 'jumps found in the swing' };

type Typed = 'timeUnit' | 'readingUnit' | 'rate' | 'exposure' | 'offset' | 'blank' | 'refine';
const FIELDS: readonly (readonly [key: Typed, label: string, placeholder: string, hint: string])[] = [
  ['timeUnit', 'Unit of the time', 'as headed', 's, ms, µs, or empty'],
  ['readingUnit', 'Unit of the reading', 'as headed', 'mm, µm, px, V, or empty'],
  ['rate', 'Samples or frames a second', '', 'where the time column counts them, or there is none'],
  ['exposure', 'One sample averages over', 'ms', 'exposure of a frame, or the sensor’s averaging; its time at the middle'],
  ['offset', 'The list’s clock, put forward by', 's', 'added to each listed time; “find” takes it from the shots themselves'],
  ['blank', 'Left out after each shot', 'ms', 'while the discharge disturbs the sensor; empty: nothing'],
  ['refine', 'A shot’s time may be moved by', 'ms', 'the fit then finds it within this; empty: not at all'],
];

export function TraceSettings({ trace, told, uses, onChange }: Props) {
  const id = useId();
  const columns = told?.columns ?? [];
  const used = (use: TraceUse): number | null | undefined => (use === 'time' || use === 'reading' || use === 'trigger' ? told?.uses[use] : trace.uses[use]);
  return (
    <div className={styles.settings}>
      {uses.map((use) => (
        <p key={use} className={styles.field}>
          <label htmlFor={`${id}-${use}`}>Column of the {USE_WORDS[use]}</label>
          <select
            id={`${id}-${use}`}
            value={trace.uses[use] === undefined ? '' : String(trace.uses[use])}
            onChange={({ target: { value } }) => {
              const { [use]: _, ...others } = trace.uses;
              onChange(`column of the ${USE_WORDS[use]}`, { uses: value === '' ? others : { ...others, [use]: Number(value) } });
            }}
          >
            <option value="">{trace.uses[use] === undefined && typeof used(use) === 'number' ? `${columns[used(use)!]?.header ?? ''}, as found` : 'as found'}</option>
            <option value="-1">none</option>
            {columns.map(({ header, unit }, i) => <option key={`${String(i + 1)}: ${header}`} value={i}>{`${i + 1}: ${header}${unit === '' ? '' : ` (${unit})`}`}</option>)}
          </select>
        </p>
      ))}
      {FIELDS.map(([key, label, placeholder, hint]) => (
        <p key={key} className={styles.field}>
          <label htmlFor={`${id}-${key}`}>{label}</label>
          <input id={`${id}-${key}`} type="text" autoComplete="off" spellCheck={false} value={trace[key]} placeholder={placeholder} aria-describedby={`${id}-${key}-hint`} onChange={({ target: { value } }) => onChange(label, { [key]: value }, `${trace.id}.${key}`)} />
          <span id={`${id}-${key}-hint`} className="quiet">{hint}</span>
        </p>
      ))}
      <p className={styles.field}>
        <label htmlFor={`${id}-from`}>Shots and taps are</label>
        <select id={`${id}-from`} value={trace.eventsFrom} onChange={({ target: { value } }) => onChange('where its shots come from', { eventsFrom: value === 'trigger' || value === 'found' ? value : 'list' })}>
          {Object.entries(FROM_WORDS).map(([value, words]) => <option key={value} value={value}>{words}</option>)}
        </select>
      </p>
    </div>
  );
}
