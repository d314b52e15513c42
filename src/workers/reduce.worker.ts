/** The worker that reduces: a session in, its reduction out. */
import { reduce } from '../reduction/reduce.ts';
import type { Answer, Asked } from './messages.ts';

function answer({ id, session, explain }: Asked): Answer {
  try {
    return { id, reduction: reduce(session, explain) };
  } catch (reason) {
    return { id, failure: reason instanceof Error ? `${reason.name}: ${reason.message}` : String(reason) };
  }
}

self.addEventListener('message', (message: MessageEvent<Asked>) => {
  self.postMessage(answer(message.data));
});
