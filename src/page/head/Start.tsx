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
        Drop a table of readings anywhere on this sheet, paste it from a spreadsheet,{' '}
        <button type="button" className="plain-button" onClick={onChoose}>choose a file</button>,{' '}
        <button type="button" className="plain-button" onClick={typeByHand}>type by hand</button>, or{' '}
        <button type="button" className="plain-button" onClick={onDemo}>open the demo</button>, an invented bench.
      </p>
      <p className="quiet">
        One row a record: shots, hammer taps, blanks and zeros, each with its rest reading and first swing. Nothing leaves this device.
      </p>
    </section>
  );
}
