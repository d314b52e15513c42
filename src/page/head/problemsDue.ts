/** What there is to look at by now: on a sheet where nothing is typed and nothing was brought in, nothing is due. */
import type { Problem } from '../../problems/problems.ts';
import type { State } from '../../store/store.ts';

const NONE: readonly Problem[] = [];

export function problemsDue({ session, reduction }: Pick<State, 'session' | 'reduction'>): readonly Problem[] {
  const begun = session.sheets.length > 0 || session.parts.length > 0 || session.freeSwing.trim() !== ''
    || Object.values(session.entries).some(({ text }) => text.trim() !== '');
  return begun ? (reduction?.problems ?? NONE) : NONE;
}
