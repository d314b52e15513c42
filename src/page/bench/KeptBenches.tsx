/** Benches kept on this device: kept under a name, used again, renamed, taken out; and the bench of a saved session file. */
import { useEffect, useRef, useState } from 'react';
import { deviceBenches, keepBench, listBenches, newBenchId, takeOutBench } from '../../platform/keptBenches.ts';
import type { BenchShelf, KeptBench } from '../../platform/keptBenches.ts';
import { sentence } from '../../problems/sentences.ts';
import { benchOf, isBlankBench, sessionWithBench, putBench } from '../../session/bench.ts';
import { sessionFromText, sessionToText } from '../../session/file.ts';
import type { Session } from '../../session/session.ts';
import { useActions, useStateNow, useStore } from '../../store/hooks.tsx';
import styles from './keptBenches.module.css';

const NOT_KEPT = 'This device did not take it (a private window, or no room left). Nothing here is lost: save the session as a file, and take the bench from it.';
const day = new Intl.DateTimeFormat(undefined, { year: 'numeric', month: 'short', day: 'numeric' });

/** Sentences shown of one damaged bench. */
const SENTENCES_SHOWN = 4;

export function KeptBenches({ shelf = deviceBenches, now = Date.now }: { readonly shelf?: BenchShelf; readonly now?: () => number }) {
  const { change } = useActions();
  const stateNow = useStateNow();
  const blank = useStore(({ session }) => isBlankBench(session));
  const title = useStore((state) => state.session.title.name);
  const [kept, setKept] = useState<readonly KeptBench[] | null | undefined>(undefined);
  const [name, setName] = useState<string | null>(null);
  const [said, setSaid] = useState<readonly string[]>([]);
  const [takenOut, setTakenOut] = useState<KeptBench | null>(null);
  const chooser = useRef<HTMLInputElement>(null);

  useEffect(() => {
    let here = true;
    void listBenches(shelf).then((found) => here && setKept(found));
    return () => {
      here = false;
    };
  }, [shelf]);

  const refresh = async (): Promise<void> => setKept(await listBenches(shelf));
  const named = (name ?? title).trim();
  const standing = kept?.find((bench) => bench.name === named);

  async function keep(): Promise<void> {
    const bench = { id: standing?.id ?? newBenchId(now()), name: named, keptAt: now(), text: sessionToText(sessionWithBench(stateNow().session)) };
    const taken = await keepBench(bench, shelf);
    setSaid([taken ? `“${named}” is kept on this device.` : NOT_KEPT]);
    if (taken) {
      setTakenOut(standing ?? null);
      setName('');
      await refresh();
    }
  }

  async function rename(bench: KeptBench, to: string): Promise<void> {
    if (to === '' || to === bench.name) return;
    setSaid(await keepBench({ ...bench, name: to }, shelf) ? [] : [NOT_KEPT]);
    await refresh();
  }

  async function takeOut(bench: KeptBench): Promise<void> {
    const gone = await takeOutBench(bench.id, shelf);
    setSaid([gone ? `“${bench.name}” is taken out.` : NOT_KEPT]);
    if (gone) setTakenOut(bench);
    await refresh();
  }

  async function putBack(bench: KeptBench): Promise<void> {
    const taken = await keepBench(bench, shelf);
    setSaid([taken ? `“${bench.name}” is kept as it was.` : NOT_KEPT]);
    if (taken) setTakenOut(null);
    await refresh();
  }

  /** The bench of a text, for one undoable step; what could not be read is said. */
  function take(text: string, from: string, what: string, edit: (found: Session) => (session: Session) => Session): void {
    const { session, problems } = sessionFromText(text);
    if (session !== null) change(what, edit(session));
    setSaid([
      ...(session === null ? [] : [`The bench of “${from}” stands here; undo brings the one before it back.`]),
      ...problems.slice(0, SENTENCES_SHOWN).map((found) => `“${from}”: ${sentence(found)}`),
    ]);
  }

  const takeHere = (text: string, from: string): void => take(text, from, `use the bench “${from}”`, (found) => putBench(benchOf(found)));
  const beginWith = (text: string, from: string): void => take(text, from, `new session with the bench “${from}”`, (found) => () => sessionWithBench(found));

  return (
    <div className={styles.place} role="group" aria-label="Kept benches">
      <details className={styles.fold}>
        <summary>Keep this bench, or use one again{kept != null && kept.length > 0 ? <span className="quiet"> · {kept.length} kept</span> : null}</summary>
        <p className={`quiet ${styles.how}`}>A bench is all that is typed above, with its choices and instruments. Using one again leaves readings and title as they are.</p>
        {kept === null && <p className="look">This device keeps nothing (a private window, perhaps). Save the session as a file, and take the bench from it another day.</p>}
        <div className={styles.keep}>
          <label>
            <span className="quiet">Name</span>{' '}
            <input type="text" autoComplete="off" aria-label="Name to keep this bench under" placeholder="long strip, vacuum tank" value={name ?? title} onChange={(event) => setName(event.target.value)} />
          </label>
          <button type="button" disabled={blank || named === '' || kept == null} onClick={() => void keep()}>{standing === undefined ? 'Keep this bench' : `Keep in place of “${named}”`}</button>
          <button type="button" disabled={blank} onClick={() => change('new session with this bench', (session) => sessionWithBench(session))}>New session with this bench</button>
          <button type="button" onClick={() => chooser.current?.click()}>Take the bench of a saved session…</button>
          <input
            ref={chooser}
            hidden
            type="file"
            accept=".json"
            aria-label="Take the bench of a session file"
            onChange={(event) => {
              const [file] = event.target.files ?? [];
              if (file !== undefined) void file.text().then((text) => takeHere(text, file.name));
              event.target.value = '';
            }}
          />
        </div>
        {kept != null && kept.length > 0 && (
          <ul className={styles.list} aria-label="Benches kept on this device">
            {kept.map((bench) => (
              <li key={bench.id}>
                <input
                  key={bench.name}
                  className={styles.name}
                  type="text"
                  autoComplete="off"
                  aria-label={`Name of the kept bench ${bench.name}`}
                  defaultValue={bench.name}
                  onBlur={(event) => void rename(bench, event.target.value.trim())}
                  onKeyDown={(event) => {
                    if (event.key === 'Enter') event.currentTarget.blur();
                  }}
                />
                <span className="quiet">{bench.keptAt === 0 ? '' : `kept ${day.format(bench.keptAt)}`}</span>
                <button type="button" className="plain-button" aria-label={`Use ${bench.name} here`} onClick={() => takeHere(bench.text, bench.name)}>use here</button>
                <button type="button" className="plain-button" aria-label={`New session with ${bench.name}`} onClick={() => beginWith(bench.text, bench.name)}>new session with it</button>
                <button type="button" className="plain-button" aria-label={`Take out ${bench.name}`} onClick={() => void takeOut(bench)}>take out</button>
              </li>
            ))}
          </ul>
        )}
        <div role="status" className={styles.said}>
          {said.map((words) => <p key={words} className="quiet">{words}</p>)}
          {takenOut !== null && <button type="button" className="plain-button" onClick={() => void putBack(takenOut)}>put “{takenOut.name}” back as it was</button>}
        </div>
      </details>
    </div>
  );
}
