/** One sheet of readings: its head, its columns' meanings, its grid. */
import { useId, useMemo } from 'react';
import { sentence } from '../../problems/sentences.ts';
import type { Place, Problem } from '../../problems/problems.ts';
import type { RecordResult } from '../../reduction/results.ts';
import { addRow } from '../../session/edits.ts';
import type { Session, Sheet } from '../../session/session.ts';
import type { Unit } from '../../units/units.ts';
import { useActions } from '../../store/hooks.tsx';
import { ColumnMeanings } from './ColumnMeanings.tsx';
import { Grid } from './Grid.tsx';
import { SheetHead } from './SheetHead.tsx';
import { sheetElement, shownSheet, tableOf } from './sheetRows.ts';
import type { ShownRow } from './sheetRows.ts';
import { counted } from './tradeWords.ts';
import styles from './sheet.module.css';

interface SheetViewProps {
  readonly sheet: Sheet;
  readonly isFirst: boolean;
  readonly isLast: boolean;
  readonly results: ReadonlyMap<string, RecordResult>;
  readonly marks: Session['marks'];
  readonly impulseUnit: Unit;
  /** Problems of the sheet as a whole, and of rows that are no records. */
  readonly problems: readonly Problem[];
  readonly askReason: (row: ShownRow) => void;
}

/** The sheet's name stands above its sentences already. */
function withoutSheet({ line, column }: Place): Place {
  return { ...(line === undefined ? {} : { line }), ...(column === undefined ? {} : { column }) };
}

/** Sentences shown at the head of a sheet; the rest are counted. */
const SENTENCES_SHOWN = 6;

export function SheetView({ sheet, isFirst, isLast, results, marks, impulseUnit, problems, askReason }: SheetViewProps) {
  const { change } = useActions();
  const headingId = useId();
  const { text, delimiter, decimal } = sheet;
  const table = useMemo(
    () => tableOf({ text, ...(delimiter === undefined ? {} : { delimiter }), ...(decimal === undefined ? {} : { decimal }) }),
    [text, delimiter, decimal],
  );
  const shown = useMemo(() => shownSheet(sheet, table), [sheet, table]);
  const sentences = [...new Set(problems.map((one) => sentence({ ...one, place: withoutSheet(one.place) })))];
  return (
    <article className={styles.sheet} aria-labelledby={headingId} id={sheetElement(sheet.id)}>
      <SheetHead sheet={sheet} table={table} rows={shown.rows.length} isFirst={isFirst} isLast={isLast} headingId={headingId} />
      {sentences.length > 0 && (
        <ul className={styles.problems}>
          {sentences.slice(0, SENTENCES_SHOWN).map((one) => <li key={one} className="look">{one}</li>)}
          {sentences.length > SENTENCES_SHOWN && <li className="look">And {sentences.length - SENTENCES_SHOWN} more, among the things to look at.</li>}
        </ul>
      )}
      {table.preamble.length > 0 && (
        <details className={styles.preamble}>
          <summary className="quiet">{counted(table.preamble.length, 'line')} of remarks, kept and not read as readings</summary>
          <pre>{table.preamble.map(({ line, text: remark }) => `${line}  ${remark}`).join('\n')}</pre>
        </details>
      )}
      <ColumnMeanings sheet={sheet} table={table} shown={shown} />
      <Grid sheet={sheet} shown={shown} results={results} marks={marks} impulseUnit={impulseUnit} askReason={askReason} />
      <p className={styles.buttons}>
        <button type="button" onClick={() => change('add a row', addRow(sheet.id))}>Add a row</button>
      </p>
    </article>
  );
}
