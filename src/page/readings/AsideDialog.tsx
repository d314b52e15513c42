/** Asks why a record is set aside: the usual physical reasons, or one typed. */
import { useEffect, useId, useRef, useState } from 'react';
import type { SubmitEvent } from 'react';
import { ASIDE_REASONS } from './tradeWords.ts';
import styles from './asideDialog.module.css';

interface AsideDialogProps {
  /** How the person knows the record: "shot 7, line 9 of run.csv". */
  readonly record: string;
  /** Reason it has now, to change it; '' for none. */
  readonly reason: string;
  readonly onReason: (reason: string) => void;
  readonly onClose: () => void;
}

const TYPED = 'typed';

export function AsideDialog({ record, reason, onReason, onClose }: AsideDialogProps) {
  const dialog = useRef<HTMLDialogElement>(null);
  const heading = useId();
  const group = useId();
  const usual = ASIDE_REASONS.includes(reason);
  const [choice, setChoice] = useState(usual ? reason : reason === '' ? '' : TYPED);
  const [typed, setTyped] = useState(usual ? '' : reason);
  const chosen = choice === TYPED ? typed.trim() : choice;

  useEffect(() => dialog.current?.showModal(), []);

  function submit(submitted: SubmitEvent<HTMLFormElement>) {
    submitted.preventDefault();
    if (chosen === '') return;
    onReason(chosen);
    // Closing gives the focus back to where it was.
    dialog.current?.close();
  }

  return (
    <dialog ref={dialog} className={styles.dialog} aria-labelledby={heading} onClose={onClose}>
      <form onSubmit={submit}>
        <h3 id={heading}>Set aside {record}</h3>
        <p className="quiet">It stays in the table, struck through; the run mean is shown with and without it.</p>
        <fieldset className={styles.reasons}>
          <legend className="visually-hidden">Reason</legend>
          {ASIDE_REASONS.map((usualReason) => (
            <label key={usualReason}>
              <input type="radio" name={group} value={usualReason} checked={choice === usualReason} onChange={() => setChoice(usualReason)} />
              {usualReason}
            </label>
          ))}
          <label>
            <input type="radio" name={group} value={TYPED} checked={choice === TYPED} onChange={() => setChoice(TYPED)} />
            other:{' '}
            <input
              className={styles.typed}
              aria-label="Other reason, typed"
              value={typed}
              onFocus={() => setChoice(TYPED)}
              onChange={(changed) => {
                setTyped(changed.target.value);
                setChoice(TYPED);
              }}
            />
          </label>
        </fieldset>
        <p className={styles.buttons}>
          <button type="submit" disabled={chosen === ''}>Set aside</button>
          <button type="button" onClick={() => dialog.current?.close()}>Cancel</button>
        </p>
      </form>
    </dialog>
  );
}
