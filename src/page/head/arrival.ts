/** What the page says on opening, where what this device kept could not be read whole. */
import type { Found } from '../../platform/keep.ts';
import { sentence } from '../../problems/sentences.ts';
import type { SessionRead } from '../../session/file.ts';
import { shortened } from './sessionFiles.ts';
import type { Message } from './sessionFiles.ts';

export function arrivalMessages(found: Found<SessionRead>, rest: SessionRead | null): readonly Omit<Message, 'id'>[] {
  if (found.status !== 'unreadable') return [];
  const opening = rest?.session == null
    ? 'The session kept on this device cannot be read, so the sheet begins empty. What was kept is put by and is not written over.'
    : 'A part of the session kept on this device cannot be read; the rest is here. What was kept is put by whole and is not written over.';
  const more = (rest?.problems ?? []).filter(({ code }) => code === 'session-damaged' || code === 'session-newer');
  return [{
    sentences: [opening, ...shortened(more.map(sentence))],
    offer: { words: 'Save what was kept as a file', name: 'kept-session.txt', text: found.text },
  }];
}
