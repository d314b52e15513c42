/** Head of a sheet: where it came from, how its text is cut, what its records are, and its place in the run. */
import { useId } from 'react';
import { RECORD_KINDS } from '../../readings/meanings.ts';
import type { TableRead } from '../../readings/table.ts';
import { readingDimension } from '../../reduction/entries.ts';
import { isRecordKind, removeSheet, setKindOfAll, setSheetInstrument, setTaken } from '../../session/edits.ts';
import type { Sheet } from '../../session/session.ts';
import { useActions, useStore } from '../../store/hooks.tsx';
import { MeasuredWith } from '../bench/MeasuredWith.tsx';
import { cutAnew, moveSheet } from './sheetEdits.ts';
import { KINDS_LABELS, counted } from './tradeWords.ts';
import styles from './sheet.module.css';

const ORIGINS: Readonly<Record<Sheet['origin'], string>> = { file: 'file', paste: 'pasted', typed: 'typed by hand' };
const DELIMITERS = { ',': 'comma', ';': 'semicolon', '\t': 'tab' } as const;
const DECIMALS = { '.': 'point', ',': 'comma' } as const;
/** Hex digits of a SHA-256 that are shown; the whole is in the title. */
const DIGEST_SHOWN = 12;

const isKey = <Key extends string>(text: string, of: Readonly<Record<Key, string>>): text is Key => Object.hasOwn(of, text);

interface SheetHeadProps {
  readonly sheet: Sheet;
  readonly table: TableRead;
  readonly rows: number;
  readonly isFirst: boolean;
  readonly isLast: boolean;
  readonly headingId: string;
}

export function SheetHead({ sheet, table, rows, isFirst, isLast, headingId }: SheetHeadProps) {
  const { change } = useActions();
  const id = useId();
  const instruments = useStore((state) => state.session.instruments);
  const choices = useStore((state) => state.session.choices);
  const hasTaps = sheet.kindOfAll === 'tap' || sheet.columns.some(({ role }) => role === 'tapImpulse' || role === 'hammerIn' || role === 'tapForce');
  return (
    <header className={styles.head}>
      <h3 id={headingId}>{sheet.name}</h3>
      <p className="quiet">
        {[
          ...(sheet.origin === 'typed' && sheet.name === ORIGINS.typed ? [] : [ORIGINS[sheet.origin]]),
          counted(rows, 'row'),
        ].join(' · ')}
        {sheet.sha256 !== '' && (
          <>
            {' · '}
            <span title={`SHA-256 of the bytes as they came: ${sheet.sha256}`}>SHA-256 {sheet.sha256.slice(0, DIGEST_SHOWN)}…</span>
          </>
        )}
      </p>
      <div className={styles.choices}>
        {sheet.origin !== 'typed' && (
          <>
            <label htmlFor={`${id}-delimiter`}>cells end at</label>
            <select
              id={`${id}-delimiter`}
              value={sheet.delimiter ?? ''}
              onChange={({ target: { value } }) =>
                change(`${sheet.name}: cells end at`, cutAnew(sheet.id, { delimiter: isKey(value, DELIMITERS) ? value : undefined }))}
            >
              <option value="">{sheet.delimiter === undefined ? `${DELIMITERS[table.delimiter]}, as found` : 'as found'}</option>
              {Object.entries(DELIMITERS).map(([mark, label]) => <option key={mark} value={mark}>{label}</option>)}
            </select>
            <label htmlFor={`${id}-decimal`}>decimal</label>
            <select
              id={`${id}-decimal`}
              value={sheet.decimal ?? ''}
              onChange={({ target: { value } }) =>
                change(`${sheet.name}: decimal mark`, cutAnew(sheet.id, { decimal: isKey(value, DECIMALS) ? value : undefined }))}
            >
              <option value="">{sheet.decimal === undefined ? `${DECIMALS[table.decimal]}, as found` : 'as found'}</option>
              {Object.entries(DECIMALS).map(([mark, label]) => <option key={mark} value={mark}>{label}</option>)}
            </select>
          </>
        )}
        <label htmlFor={`${id}-kind`}>records</label>
        <select
          id={`${id}-kind`}
          value={sheet.kindOfAll ?? ''}
          onChange={({ target: { value } }) =>
            change(`${sheet.name}: kind of record`, setKindOfAll(sheet.id, isRecordKind(value) ? value : null))}
        >
          <option value="">told row by row</option>
          {RECORD_KINDS.map((kind) => <option key={kind} value={kind}>{`all ${KINDS_LABELS[kind]}`}</option>)}
        </select>
        <MeasuredWith
          label={`${sheet.name}: readings read with`}
          words="readings read with"
          instruments={instruments}
          dimension={readingDimension(choices)}
          chosen={sheet.instrument}
          onChoose={(instrument) => change(`${sheet.name}: read with`, setSheetInstrument(sheet.id, instrument))}
        />
        {hasTaps && (
          <>
            <label htmlFor={`${id}-taken`}>its taps were struck</label>
            <select id={`${id}-taken`} value={sheet.taken ?? ''} onChange={({ target: { value } }) => change(`${sheet.name}: when its taps were struck`, setTaken(sheet.id, value === 'before' || value === 'after' ? value : null))}>
              <option value="">in the order of the run</option>
              <option value="before">before the firings</option>
              <option value="after">after the firings</option>
            </select>
          </>
        )}
      </div>
      <div className={styles.buttons}>
        <button type="button" className="plain-button" disabled={isFirst} aria-label={`Move ${sheet.name} earlier in the run`} onClick={() => change(`move ${sheet.name} earlier`, moveSheet(sheet.id, -1))}>
          earlier
        </button>
        <button type="button" className="plain-button" disabled={isLast} aria-label={`Move ${sheet.name} later in the run`} onClick={() => change(`move ${sheet.name} later`, moveSheet(sheet.id, 1))}>
          later
        </button>
        <button type="button" className="plain-button" aria-label={`Remove sheet ${sheet.name}`} onClick={() => change(`remove ${sheet.name}`, removeSheet(sheet.id))}>
          remove sheet
        </button>
      </div>
    </header>
  );
}
