/** The one sheet, read from top to bottom as the work goes. */
import { Suspense, useEffect, useRef, useState } from 'react';
import { demoSession } from '../session/demo.ts';
import { emptySession } from '../session/session.ts';
import { FollowLater, useActions, useStateNow, useStore, useTraces } from '../store/hooks.tsx';
import styles from './App.module.css';
import { BenchSection } from './bench/BenchSection.tsx';
import { HeadLine } from './head/HeadLine.tsx';
import { Help } from './head/Help.tsx';
import { LookList } from './head/LookList.tsx';
import { Messages } from './head/Messages.tsx';
import { ResultLine } from './head/ResultLine.tsx';
import { looksLikeSession, openSessionFile, saveSessionFile } from './head/sessionFiles.ts';
import type { Message } from './head/sessionFiles.ts';
import { Start } from './head/Start.tsx';
import { useSheetEvents } from './head/useSheetEvents.ts';
import { AtTheBenchSection, BudgetSection, CalibrationSection, fetchSections, PlanSection, RecordSection, RunSection, RunStrip, TableSection, TracesSection } from './later.ts';
import { ReadingsSection } from './readings/ReadingsSection.tsx';
import { useReadingsIntake } from './readings/intake.ts';

/** What is to be said when the page opens: what this device kept and could not be read. */
export function App({ arrival = [] }: { readonly arrival?: readonly Omit<Message, 'id'>[] }) {
  const { change, undo, redo } = useActions();
  const now = useStateNow();
  const intake = useReadingsIntake();
  const traces = useTraces();
  const hasSheets = useStore(({ session }) => session.sheets.length + session.traces.length > 0);
  const hasTraces = useStore(({ session }) => session.traces.length > 0);
  const plans = useStore(({ session: { sheets, traces: taken, entries } }) => sheets.length + taken.length === 0 || entries.guessedImpulse !== undefined || entries.scaleReach !== undefined);
  const chooser = useRef<HTMLInputElement>(null);
  const [help, setHelp] = useState(false);
  const [messages, setMessages] = useState<readonly Message[]>(() => arrival.map((message, index) => ({ ...message, id: index })));

  // Where it fails, each section is fetched again when it is needed.
  useEffect(() => void fetchSections().catch(() => undefined), []);

  const say = (message: Omit<Message, 'id'>): void => {
    if (message.sentences.length === 0) return;
    // Of files opened one after another only the last stands here.
    setMessages((said) => [...said.filter(({ opened }) => opened === undefined || message.opened === undefined), { ...message, id: 1 + Math.max(-1, ...said.map(({ id }) => id)) }]);
  };

  async function takeFiles(files: readonly File[]): Promise<void> {
    const tables: File[] = [];
    for (const file of files) {
      if (await looksLikeSession(file)) say(await openSessionFile(file, change, now, traces?.desk ?? null));
      else tables.push(file);
    }
    if (tables.length > 0) await intake.takeFiles(tables);
  }

  const choose = () => chooser.current?.click();
  const save = () => void saveSessionFile(now().session, traces?.desk ?? null);
  const openDemo = () => change('open the demo', () => demoSession());
  const dragging = useSheetEvents({
    onUndo: undo,
    onRedo: redo,
    onSave: save,
    onOpen: choose,
    onHelp: () => setHelp(true),
    onFiles: (files) => void takeFiles(files),
    onText: (text) => intake.takeText(text),
  });

  return (
    <div className={dragging ? `${styles.sheet} ${styles.dragging}` : styles.sheet}>
      <HeadLine onOpen={choose} onSave={save} onDemo={openDemo} onNew={() => change('begin a new session', () => emptySession())} onHelp={() => setHelp(true)} />
      <input
        ref={chooser}
        hidden
        type="file"
        multiple
        aria-label="Open a session file, tables of readings, or traces"
        onChange={(event) => {
          const files = [...(event.target.files ?? [])];
          event.target.value = '';
          void takeFiles(files);
        }}
      />
      <Messages messages={messages} onTake={(id) => setMessages((said) => said.filter((message) => message.id !== id))} />
      <main>
        <ResultLine />
        {hasSheets && <Suspense><RunStrip /></Suspense>}
        <Start onChoose={choose} onDemo={openDemo} />
        {hasSheets && <Suspense><RecordSection /></Suspense>}
        <BenchSection />
        {plans && <Suspense><PlanSection /></Suspense>}
        <ReadingsSection />
        {hasTraces && <Suspense><TracesSection /></Suspense>}
        {hasSheets && (
          <Suspense>
            <FollowLater>
              <CalibrationSection />
              <RunSection />
              <BudgetSection />
              <AtTheBenchSection />
              <TableSection />
            </FollowLater>
          </Suspense>
        )}
        <LookList />
      </main>
      <Help open={help} onClose={() => setHelp(false)} />
      {dragging && <p className={styles.drop} aria-hidden="true">Drop a table of readings, a sampled trace, or a session file</p>}
    </div>
  );
}
