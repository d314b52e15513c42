/** What an empty sheet offers: the ways to bring readings in. */
import { addRow, ensureTypedSheet, typedSheet } from '../../session/edits.ts';
import { useActions, useStore } from '../../store/hooks.tsx';
import { goToElement } from './goTo.ts';
import styles from './head.module.css';

interface Props {
  readonly onChoose: () => void;
  readonly onDemo: () => void;
}

/** Rows to begin typing in. */
const FIRST_ROWS = 4;

export function Start({ onChoose, onDemo }: Props) {
  const { change } = useActions();
  const empty = useStore((state) => state.session.sheets.length === 0);
  if (!empty) return null;
  function typeByHand(): void {
    change('rows typed by hand', (session) => {
      const made = ensureTypedSheet(session);
      const sheet = typedSheet(made);
      if (sheet === undefined) return made;
      return Array.from({ length: FIRST_ROWS - sheet.added.length }).reduce<typeof made>((grown) => addRow(sheet.id)(grown), made);
    });
    requestAnimationFrame(() => goToElement('readings-heading'));
  }
  return (
    <section className={styles.start} aria-labelledby="start-title">
      <h2 id="start-title">Readings of a ballistic pendulum in, impulse bits with their uncertainty out</h2>
      <p>
        Drop a table of readings anywhere on this sheet, or paste it from a spreadsheet. One row a record: shots, hammer taps, blanks and zeros,
        each with its rest reading and first swing.
      </p>
      <div className={styles.ways}>
        <button type="button" onClick={onChoose}>Choose a file</button>
        <button type="button" onClick={typeByHand}>Type by hand</button>
        <button type="button" onClick={onDemo}>Open the demo, an invented bench</button>
      </div>
      <p className="quiet">Nothing leaves this device. What you type is kept here, and saved as a file when you say so.</p>
    </section>
  );
}
