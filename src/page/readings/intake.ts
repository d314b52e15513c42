/** The way in for readings from anywhere on the page: files dropped or chosen, and text pasted. */
import { useMemo } from 'react';
import { readTableFile, sha256Of } from '../../platform/readFile.ts';
import { useActions, useStateNow, useTraces } from '../../store/hooks.tsx';
import { isTraceFile, takeTrace } from '../traces/takeTrace.ts';
import { useNotices } from './notices.ts';
import { takeIn } from './takeIn.ts';
import type { Came } from './takeIn.ts';

export interface ReadingsIntake {
  /** Takes tables of readings in, one after the other; resolves when all have been read. */
  readonly takeFiles: (files: Iterable<File>) => Promise<void>;
  /** Takes pasted cells or lines in. */
  readonly takeText: (text: string) => void;
}

const PASTE_NAME = 'pasted readings';

export function useReadingsIntake(): ReadingsIntake {
  const { change } = useActions();
  const now = useStateNow();
  const notices = useNotices();
  const traces = useTraces();
  return useMemo(() => {
    function take(came: Came): void {
      const { session } = now();
      const taken = takeIn(came, session);
      if (taken.session !== session) change(taken.what, () => taken.session);
      notices.say(taken.notice);
    }
    async function takeFiles(files: Iterable<File>): Promise<void> {
      for (const file of files) {
        try {
          if (traces && (await isTraceFile(file))) notices.say(await takeTrace(file, traces.desk, change, now));
          else take({ ...(await readTableFile(file)), origin: 'file' });
        } catch (reason) {
          // Reading fails for a folder, and for a file that has moved since it was dropped.
          if (!(reason instanceof DOMException)) throw reason;
          notices.say({ tone: 'refused', sentences: [`${file.name}: could not be read. It may be a folder, or no longer in its place. Drop the file itself.`] });
        }
      }
    }
    async function takePaste(text: string): Promise<void> {
      const sha256 = await sha256Of(new TextEncoder().encode(text));
      take({ name: PASTE_NAME, origin: 'paste', text, sha256, problems: [] });
    }
    return { takeFiles, takeText: (text: string) => void takePaste(text) };
  }, [change, now, notices, traces]);
}
