/** The ways in for readings: a file, a paste, rows typed by hand. */
import { useId, useRef, useState } from 'react';
import { ensureTypedSheet, typedSheet } from '../../session/edits.ts';
import { useActions, useStore } from '../../store/hooks.tsx';
import { useReadingsIntake } from './intake.ts';
import styles from './readings.module.css';

export function IntakeRow({ hasSheets }: { readonly hasSheets: boolean }) {
  const { change } = useActions();
  const { takeFiles, takeText } = useReadingsIntake();
  const hasTyped = useStore((state) => typedSheet(state.session) !== undefined);
  const [pasting, setPasting] = useState(false);
  const [text, setText] = useState('');
  const chooser = useRef<HTMLInputElement>(null);
  const id = useId();

  return (
    <div className={styles.intake}>
      {!hasSheets && (
        <p>
          Drop a file of readings anywhere on this page, or paste cells from a spreadsheet. One row a record: shots, taps, blanks and zeros,
          with the rest reading, the first swing and, if taken, the swings after it. A sampled trace of a sensor or camera, packed (.gz) or not,
          is told by its even rows and goes to Traces.
        </p>
      )}
      <p className={styles.ways}>
        <button type="button" onClick={() => chooser.current?.click()}>Choose a file…</button>
        <input
          ref={chooser}
          id={`${id}-file`}
          type="file"
          multiple
          hidden
          accept=".csv,.txt,.tsv,.dat,.gz,text/csv,text/plain,text/tab-separated-values"
          aria-label="File of readings"
          onChange={({ currentTarget }) => {
            const files = [...(currentTarget.files ?? [])];
            // So that the same file can be chosen again after more shots.
            currentTarget.value = '';
            void takeFiles(files);
          }}
        />
        <button type="button" aria-expanded={pasting} aria-controls={`${id}-paste`} onClick={() => setPasting(!pasting)}>Paste readings…</button>
        <button type="button" disabled={hasTyped} onClick={() => change('type readings by hand', ensureTypedSheet)}>Type readings by hand</button>
      </p>
      <div id={`${id}-paste`} hidden={!pasting} className={styles.paste}>
        <label htmlFor={`${id}-text`}>Cells from a spreadsheet, or lines of a file</label>
        <textarea id={`${id}-text`} rows={6} spellCheck={false} value={text} onChange={(typed) => setText(typed.target.value)} />
        <p className={styles.ways}>
          <button
            type="button"
            disabled={text.trim() === ''}
            onClick={() => {
              takeText(text);
              setText('');
              setPasting(false);
            }}
          >
            Take these readings
          </button>
          <button type="button" onClick={() => setPasting(false)}>Cancel</button>
        </p>
      </div>
    </div>
  );
}
