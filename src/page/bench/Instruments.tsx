/** The instruments of the bench: who measured what, until when their calibration holds, and the ± that all they measured shares. */
import { useMemo } from 'react';
import type { Problem } from '../../problems/problems.ts';
import { sentenceInPlace } from '../../problems/sentences.ts';
import { INSTRUMENT_SCALE, instrumentEntry, instrumentName, instrumentWords } from '../../reduction/instruments.ts';
import type { InstrumentTold } from '../../reduction/results.ts';
import { addInstrument, removeInstrument, setInstrument, setInstrumentScale } from '../../session/edits.ts';
import { MEASURED, type Instrument } from '../../session/session.ts';
import { dateWords, type DateOrder, type DateRead } from '../../units/calendarDate.ts';
import { useActions, useStore } from '../../store/hooks.tsx';
import { echoOf } from './echo.ts';
import { SPREAD } from './EntryField.tsx';
import styles from './instruments.module.css';

const MEASURES: Readonly<Record<Instrument['measures'], string>> = {
  length: 'lengths', mass: 'masses', time: 'times', angle: 'angles', pressure: 'pressures', other: 'something else',
};
const ORDERS: Readonly<Record<DateOrder, string>> = { yearFirst: '', named: '', dayFirst: ', day first', monthFirst: ', month first', month: ', the end of that month' };

const FIELDS = [['name', 'Name', 'steel ruler 500 mm'], ['serial', 'Serial', ''], ['certificate', 'Certificate', ''], ['due', 'Due', '2027-03-31']] as const;

/** "read as 3 Apr 2027, day first; write 2027-03-04 if it is the other". */
function dueWords({ iso, order, ambiguous }: DateRead): string {
  const [year = '', month = '', day = ''] = iso.split('-');
  return `read as ${dateWords(iso)}${ORDERS[order]}${ambiguous ? `; else write ${year}-${day}-${month}` : ''}`;
}

export function Instruments() {
  const { change } = useActions();
  const instruments = useStore((state) => state.session.instruments);
  const told = useStore((state) => state.reduction?.instruments);
  const problems = useStore((state) => state.reduction?.problems);
  const byEntry = useMemo(() => {
    const found = (problems ?? []).filter(({ place }) => place.entry?.startsWith('instrument.') === true);
    return (id: string): readonly Problem[] => found.filter(({ place }) => place.entry === instrumentEntry(id, 'due') || place.entry === instrumentEntry(id, 'scale'));
  }, [problems]);
  return (
    <div className={styles.place} role="group" aria-label="Instruments">
      <details className={styles.fold} open={instruments.length > 0}>
        <summary id="instruments-heading">Instruments</summary>
        <p className={`quiet ${styles.how}`}>
          Name what you measured with, and choose it beside each quantity. Its calibration ± is one and the same for all that it measured, and counts once; the ± beside each quantity is for that reading alone. What stands under “Scale of the ruler” already is not typed here again.
        </p>
        {instruments.map((instrument, index) => (
          <Row key={instrument.id} instrument={instrument} index={index} told={told?.find(({ id }) => id === instrument.id)} problems={byEntry(instrument.id)} change={change} />
        ))}
        <button type="button" onClick={() => change('add an instrument', addInstrument())}>Add an instrument</button>
      </details>
      {instruments.length > 0 && (
        <ul className={styles.onPaper} aria-hidden="true">
          {instruments.map((instrument, index) => (
            <li key={instrument.id}>{instrumentWords(instrument, index)}{instrument.scale.text === '' || instrument.measures === 'other' ? '' : `; calibration ± ${instrument.scale.text}, common to the ${MEASURES[instrument.measures]} measured with it`}</li>
          ))}
        </ul>
      )}
    </div>
  );
}

interface RowProps {
  readonly instrument: Instrument;
  readonly index: number;
  readonly told: InstrumentTold | undefined;
  readonly problems: readonly Problem[];
  readonly change: ReturnType<typeof useActions>['change'];
}

function Row({ instrument, index, told, problems, change }: RowProps) {
  const { id, scale } = instrument;
  const name = instrumentName(instrument, index);
  const dueId = `entry-${instrumentEntry(id, 'due')}`;
  const scaleId = `entry-${instrumentEntry(id, 'scale')}`;
  const echo = told === undefined || scale.text.trim() === '' ? null : echoOf(told.scale, true);
  return (
    <fieldset className={styles.instrument}>
      <legend className="visually-hidden">{name}</legend>
      {FIELDS.map(([field, label, placeholder]) => (
        <label key={field} className={styles.field}>
          <span>{label}</span>
          <input
            id={field === 'due' ? dueId : undefined}
            type="text"
            autoComplete="off"
            spellCheck={false}
            aria-label={`${label} of instrument ${index + 1}`}
            aria-describedby={field === 'due' ? `${dueId}-below` : undefined}
            placeholder={placeholder}
            value={instrument[field]}
            onChange={(event) => change(`${label.toLowerCase()} of ${name}`, setInstrument(id, { [field]: event.target.value }), `instrument.${id}.${field}`)}
          />
        </label>
      ))}
      <label className={styles.field}>
        <span>Measures</span>
        <select
          aria-label={`What instrument ${index + 1} measures`}
          value={instrument.measures}
          onChange={({ target: { value } }) => {
            const chosen = MEASURED.find((one) => one === value);
            if (chosen !== undefined) change(`what ${name} measures`, setInstrument(id, { measures: chosen }));
          }}
        >
          {MEASURED.map((one) => <option key={one} value={one}>{MEASURES[one]}</option>)}
        </select>
      </label>
      {instrument.measures !== 'other' && (
        <div className={`${styles.field} ${styles.calibration}`}>
          <label htmlFor={scaleId}>Calibration ±</label>
          <span className={styles.scale}>
            <input
              id={scaleId}
              type="text"
              autoComplete="off"
              spellCheck={false}
              aria-label={`Calibration ± of instrument ${index + 1}`}
              aria-describedby={`${scaleId}-below`}
              title={INSTRUMENT_SCALE.hint}
              placeholder={INSTRUMENT_SCALE.unit}
              value={scale.text}
              onChange={(event) => change(`calibration of ${name}`, setInstrumentScale(id, { text: event.target.value }), `instrument.${id}.scale`)}
            />
            <select
              aria-label={`Calibration of instrument ${index + 1}: what ± means`}
              value={scale.plusMinus}
              onChange={({ target: { value } }) => {
                const chosen = SPREAD.find(([one]) => one === value);
                if (chosen !== undefined) change(`calibration of ${name}`, setInstrumentScale(id, { plusMinus: chosen[0] }));
              }}
            >
              {SPREAD.map(([value, words]) => <option key={value} value={value}>{words}</option>)}
            </select>
            {scale.plusMinus === 'expanded' && (
              <input className={styles.k} type="text" inputMode="decimal" aria-label={`Calibration of instrument ${index + 1}: coverage factor k`} placeholder="2" value={scale.k} onChange={(event) => change(`calibration of ${name}`, setInstrumentScale(id, { k: event.target.value }), `instrument.${id}.k`)} />
            )}
          </span>
        </div>
      )}
      <button type="button" className="plain-button" onClick={() => change(`take out ${name}`, removeInstrument(id))}>take out <span className="visually-hidden">{name}</span></button>
      <div className={styles.below}>
        <span id={`${dueId}-below`}>{told?.due && (told.due.order !== 'yearFirst') ? `due ${dueWords(told.due)}` : ''}</span>
        {echo !== null && <span id={`${scaleId}-below`} className="num">calibration {echo}</span>}
        {problems.map((problem) => <p key={problem.code} className={problem.weight === 'note' && problem.code !== 'instrument-overdue' ? undefined : 'look'}>{sentenceInPlace(problem)}</p>)}
      </div>
    </fieldset>
  );
}
