/** The page's one store: the session, its latest reduction, what is selected, and undo. The reducer is given, so tests and pages may differ in where it runs. */
import type { Session } from '../session/session.ts';
import type { Reduction } from '../reduction/results.ts';

export interface State {
  readonly session: Session;
  /** Latest reduction; while `busy` it may belong to an earlier session. */
  readonly reduction: Reduction | null;
  readonly busy: boolean;
  /** Our own mistake, shown with the session offered for saving. */
  readonly failure: string | null;
  /** Record id whose chain is open. */
  readonly selected: string | null;
  readonly past: readonly Step[];
  readonly future: readonly Step[];
  /** Time of the last save on this device, ms since epoch; null before the first. */
  readonly keptAt: number | null;
  /** This device did not take the latest save (private window, disk full). */
  readonly notKept: boolean;
}

/** One undoable step: the session before it, and what it did, in a few words ("lever arm", "set aside shot 7"). */
export interface Step {
  readonly session: Session;
  readonly what: string;
}

export interface Actions {
  /** One undoable change. Changes with the same `join` key within two seconds are one step (typing in one field). */
  change(what: string, edit: (session: Session) => Session, join?: string): void;
  undo(): void;
  redo(): void;
  select(record: string | null): void;
}

/** Answers may come late or out of order; the store keeps only the one for the present session. */
export type AskForReduction = (session: Session, explain: string | null) => Promise<Reduction>;
