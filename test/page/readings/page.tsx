/** The readings section on a page of its own, with the road answering at once in the same thread. */
import { act, render, screen, waitFor } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { ReadingsSection } from '../../../src/page/readings/ReadingsSection.tsx';
import { reduce } from '../../../src/reduction/reduce.ts';
import { emptySession } from '../../../src/session/session.ts';
import type { Session } from '../../../src/session/session.ts';
import { createFirstswingStore } from '../../../src/store/createStore.ts';
import { StoreProvider } from '../../../src/store/hooks.tsx';

export async function openReadings(first: Session = emptySession()) {
  const store = createFirstswingStore({ ask: (session, explain) => Promise.resolve(reduce(session, explain)), first });
  const user = userEvent.setup();
  const { container } = render(<StoreProvider store={store}><ReadingsSection /></StoreProvider>);
  await settled();
  const session = () => store.state.getState().session;
  return {
    store, user, container, session,
    async drop(...files: File[]) {
      const before = lastNotice(container);
      await user.upload(screen.getByLabelText('File of readings'), files);
      await told(before + files.length);
    },
    /** The cell of a line under a header, as shown. */
    cell(line: string, header: string, sheet = 0): HTMLElement {
      // Selectors, as looking roles up in a whole sheet takes its time.
      const grid = container.querySelectorAll('[role=grid]')[sheet];
      const at = [...(grid?.querySelectorAll('[role=columnheader]') ?? [])].findIndex((head) => head.textContent.startsWith(header));
      const name = line.startsWith('+') ? `row ${line}` : `line ${line}`;
      const head = [...(grid?.querySelectorAll('[role=rowheader]') ?? [])].find((one) => one.getAttribute('aria-label')?.split(',')[0] === name);
      const row = head?.closest('[role=row]');
      const cells = row?.children;
      const found = cells?.[at];
      if (!(found instanceof HTMLElement)) throw new Error(`no cell under ${header} on line ${line}`);
      return found;
    },
    /** Until the notice of this number is there. */
    told,
    settled,
  };

  async function told(upTo: number) {
    await waitFor(() => {
      if (lastNotice(container) < upTo) throw new Error(`notice ${upTo} has not come`);
    });
    await settled();
  }
}

const lastNotice = (container: HTMLElement): number =>
  Math.max(0, ...[...container.querySelectorAll<HTMLElement>('[data-notice]')].map(({ dataset }) => Number(dataset['notice'])));

/** Until the reduction of the last change has come. */
async function settled(): Promise<void> {
  await act(async () => {
    await new Promise((done) => setTimeout(done, 0));
    await new Promise((done) => setTimeout(done, 0));
  });
}

export const csv = (text: string, name = 'run.csv'): File => new File([text], name, { type: 'text/csv' });

export const RUN = [
  'Shot,Kind,Rest (mm),First swing (mm),Note',
  'T1,tap,12.40,31.65,',
  '1,shot,12.40,32.10,',
  '2,shot,12.41,32.62,',
  '3,shot,12.41,off,no light',
  'Z,zero,12.40,,',
  '',
].join('\n');
