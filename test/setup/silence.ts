/** Console output fails the test that makes it. */
import { format } from 'node:util';
import { afterAll, afterEach } from 'vitest';

const LEVELS = ['error', 'warn', 'log', 'info', 'debug'] as const;
const said: string[] = [];

for (const level of LEVELS) {
  console[level] = (...words: unknown[]) => {
    said.push(`console.${level}: ${format(...words)}`);
  };
}

function demandSilence(): void {
  const found = said.splice(0);
  if (found.length > 0) throw new Error(`Console output in a test:\n${found.join('\n')}`);
}

// The first hook set is the last one run, so that what other hooks say is heard as well.
afterEach(demandSilence);
afterAll(demandSilence);
