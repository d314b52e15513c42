/** The short help: how the sheet is used, how quantities are typed, and the keys. */
import { useEffect, useRef } from 'react';
import styles from './head.module.css';

const KEYS: readonly (readonly [string, string])[] = [
  ['Ctrl/⌘ + Z', 'undo'],
  ['Shift + Ctrl/⌘ + Z', 'redo'],
  ['Ctrl/⌘ + S', 'save the session as a file'],
  ['Ctrl/⌘ + O', 'open a session file or a table of readings'],
  ['Ctrl/⌘ + V outside a field', 'take in a table from the clipboard'],
  ['← →, Home, End in a picture', 'go from record to record'],
  ['Enter in a picture', 'to the selected record'],
  ['?', 'this help'],
];

export function Help({ open, onClose }: { readonly open: boolean; readonly onClose: () => void }) {
  const dialog = useRef<HTMLDialogElement>(null);
  useEffect(() => {
    const shown = dialog.current;
    if (shown === null) return;
    if (open && !shown.open) shown.showModal();
    if (!open && shown.open) shown.close();
  }, [open]);
  return (
    <dialog ref={dialog} className={styles.help} aria-labelledby="help-title" onClose={onClose}>
      <h2 id="help-title">Firstswing, in short</h2>
      <ol className={styles.steps}>
        <li>Bring the readings in: drop, choose, paste or type. Check what each column was taken for.</li>
        <li>Describe the pendulum on the bench. Quantities are typed as people write them: 118.0 ± 0.3 mm, 118.0(3) mm, 12,5 g. Say what the ± means: u (standard), limits of a rectangular distribution, or U with its k.</li>
        <li>Choose a point in the run to open its record: reading, angle, corrections, impulse bit, each with its uncertainty.</li>
        <li>Set a record aside with a reason; nothing is rejected for you.</li>
        <li>Save the table of impulse bits, and the session itself.</li>
      </ol>
      <p className="quiet">
        u is a standard uncertainty, U = k·u an expanded one for 95 %. A whisker is U; its thick part is the record’s own, the rest is common to all.
        The session is kept on this device; nothing is sent anywhere.
      </p>
      <h3>Keys</h3>
      <dl className={styles.keys}>
        {KEYS.map(([key, does]) => (
          <div key={key}>
            <dt>{key}</dt>
            <dd>{does}</dd>
          </div>
        ))}
      </dl>
      <button type="button" onClick={onClose}>Close</button>
    </dialog>
  );
}
