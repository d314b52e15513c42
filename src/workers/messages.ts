/** What goes to the reducing worker and what comes back. */
import type { Reduction } from '../reduction/results.ts';
import type { Session } from '../session/session.ts';

export interface Asked {
  readonly id: number;
  readonly session: Session;
  readonly explain: string | null;
}

export type Answer =
  | { readonly id: number; readonly reduction: Reduction }
  | { readonly id: number; readonly failure: string };
