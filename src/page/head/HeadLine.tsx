/** The sheet's first line: what this run is called, and what can be done with the whole session. */
import type { Session } from '../../session/session.ts';
import { setTitle } from '../../session/edits.ts';
import { useActions, useStore } from '../../store/hooks.tsx';
import styles from './head.module.css';

interface Props {
  readonly onOpen: () => void;
  readonly onSave: () => void;
  readonly onDemo: () => void;
  readonly onNew: () => void;
  readonly onHelp: () => void;
}

const TITLE_FIELDS: readonly (readonly [keyof Session['title'], string, string])[] = [
  ['name', 'Session name', 'Session name'],
  ['place', 'Place', 'place'],
  ['date', 'Date', 'date'],
];

const hoursAndMinutes = new Intl.DateTimeFormat(undefined, { hour: '2-digit', minute: '2-digit', hour12: false });

export function HeadLine({ onOpen, onSave, onDemo, onNew, onHelp }: Props) {
  const { change, undo, redo } = useActions();
  const title = useStore((state) => state.session.title);
  const demo = useStore((state) => state.session.demo);
  const undone = useStore((state) => state.past.at(-1)?.what);
  const redone = useStore((state) => state.future[0]?.what);
  return (
    <header className={styles.head}>
      <h1 className="visually-hidden">Firstswing</h1>
      <div className={styles.title}>
        {TITLE_FIELDS.map(([name, label, placeholder]) => (
          <input
            key={name}
            className={`${styles.titleField} ${styles[name] ?? ''}`}
            type="text"
            autoComplete="off"
            aria-label={label}
            placeholder={placeholder}
            size={Math.max(placeholder.length, title[name].length, 4)}
            value={title[name]}
            onChange={(event) => change(label.toLowerCase(), setTitle({ [name]: event.target.value }), `title.${name}`)}
          />
        ))}
        {demo && <strong className={styles.demo}>Demo: invented, not a measurement</strong>}
      </div>
      <div className={styles.doings} role="group" aria-label="Session">
        <Kept />
        <button type="button" className="plain-button" disabled={undone === undefined} title={undone === undefined ? undefined : `Undo: ${undone}`} onClick={undo}>undo</button>
        <button type="button" className="plain-button" disabled={redone === undefined} title={redone === undefined ? undefined : `Redo: ${redone}`} onClick={redo}>redo</button>
        <button type="button" className="plain-button" title="Open a session file or a table of readings" onClick={onOpen}>open</button>
        <button type="button" className="plain-button" title="Save the session as a file" onClick={onSave}>save session</button>
        <button type="button" className="plain-button" title="Open the demo: an invented bench" onClick={onDemo}>demo</button>
        <button type="button" className="plain-button" title="Begin an empty session; undo brings this one back" onClick={onNew}>new</button>
        <button type="button" className="plain-button" aria-label="Help" title="Help and keys" onClick={onHelp}>?</button>
      </div>
    </header>
  );
}

function Kept() {
  const keptAt = useStore((state) => state.keptAt);
  const notKept = useStore((state) => state.notKept);
  if (notKept) return <span className="look" role="status">not kept on this device: save the session</span>;
  return keptAt === null ? null : <span className="quiet" title="Kept on this device">kept {hoursAndMinutes.format(keptAt)}</span>;
}
