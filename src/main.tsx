/** Wires platform, workers, store and page. */
import { StrictMode } from 'react';
import { createRoot } from 'react-dom/client';
import { App } from './page/App.tsx';
import { arrivalMessages } from './page/head/arrival.ts';
import './page/tokens.css';
import { createKeeper, flushOnLeaving, loadKept } from './platform/keep.ts';
import { deviceTraceShelf } from './platform/traceShelf.ts';
import { sessionFromText, sessionToText } from './session/file.ts';
import type { SessionRead } from './session/file.ts';
import { emptySession } from './session/session.ts';
import { createFirstswingStore } from './store/createStore.ts';
import { StoreProvider } from './store/hooks.tsx';
import { createTraceDesk } from './store/traceDesk.ts';
import { createWorkerLine, openReduceWorker } from './workers/askWorker.ts';

/** What this device kept, where all of it can be read; a damaged text is put by like an unreadable one before the rest is used. */
function readWhole(text: string): SessionRead | null {
  const read = sessionFromText(text);
  return read.session === null || read.problems.length > 0 ? null : read;
}

async function open(root: HTMLElement): Promise<void> {
  const found = await loadKept(readWhole);
  const rest = found.status === 'unreadable' ? sessionFromText(found.text) : null;
  const first = (found.status === 'kept' ? found.value.session : rest?.session) ?? emptySession();
  const line = createWorkerLine(openReduceWorker);
  const store = createFirstswingStore({ ask: line.ask, first });
  const desk = createTraceDesk({ line, shelf: deviceTraceShelf, onHere: store.askAgain });
  const keeper = createKeeper({ onKept: store.noteKept, onNotKept: () => store.noteKept(null) });
  if (found.status === 'noStorage') store.noteKept(null);
  store.state.subscribe((state, before) => {
    if (state.session === before.session) return;
    keeper.keep(() => sessionToText(state.session));
    if (state.session.traces !== before.session.traces) void desk.bringIn(state.session);
  });
  flushOnLeaving(keeper);
  // What no session names any more is thrown out on opening: undo cannot bring it back across visits.
  void deviceTraceShelf.keepOnly(new Set(first.traces.map(({ sha256 }) => sha256))).then(() => desk.bringIn(first));
  createRoot(root).render(
    <StrictMode>
      <StoreProvider store={store} desk={desk} pictureOf={line.pictureOf}>
        <App arrival={arrivalMessages(found, rest)} />
      </StoreProvider>
    </StrictMode>,
  );
}

const root = document.getElementById('root');
if (root === null) throw new Error('Opening the page: index.html has no element with the id root');
void open(root);
