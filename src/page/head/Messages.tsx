/** What the page has to say about session files and about itself, until it is taken away. */
import { saveTextAsFile } from '../../platform/download.ts';
import { useActions, useStore, useStateNow, useTraces } from '../../store/hooks.tsx';
import styles from './head.module.css';
import { saveSessionFile, takeBenchOnly } from './sessionFiles.ts';
import type { Message } from './sessionFiles.ts';

interface Props {
  readonly messages: readonly Message[];
  readonly onTake: (id: number) => void;
}

export function Messages({ messages, onTake }: Props) {
  const { change } = useActions();
  return (
    <div aria-live="polite">
      <Failure />
      {messages.map(({ id, sentences, offer, opened }) => (
        <div key={id} className={opened === undefined || sentences.length > 1 ? styles.message : `${styles.message} ${styles.plain}`}>
          <ul>
            {sentences.map((words) => <li key={words}>{words}</li>)}
          </ul>
          {offer !== undefined && (
            <button type="button" onClick={() => saveTextAsFile(offer.name, offer.text, 'text/plain')}>{offer.words}</button>
          )}
          {opened !== undefined && (
            <button
              type="button"
              onClick={() => {
                takeBenchOnly(opened, change);
                onTake(id);
              }}
            >
              Take its bench only
            </button>
          )}
          <button type="button" className="plain-button" onClick={() => onTake(id)}>take away</button>
        </div>
      ))}
    </div>
  );
}

/** Our own mistake: what is shown may belong to an earlier state, and the session is offered for saving. */
function Failure() {
  const failure = useStore((state) => state.failure);
  const now = useStateNow();
  const traces = useTraces();
  if (failure === null) return null;
  return (
    <div className={styles.message} role="alert">
      <p>
        The reduction failed, which is a mistake of this program and not of your readings. The numbers below are those of before your last change; nothing
        typed is lost. <span className="quiet">{failure}</span>
      </p>
      <button type="button" onClick={() => void saveSessionFile(now().session, traces?.desk ?? null)}>Save the session</button>
    </div>
  );
}
