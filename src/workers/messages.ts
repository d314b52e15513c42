/** What goes to the worker and what comes back. */
import type { Reduction } from '../reduction/results.ts';
import type { TracePicture } from '../numeric/minMaxPyramid.ts';
import type { Problem } from '../problems/problems.ts';
import type { Session } from '../session/session.ts';

/** Reduce a session as it stands, with the traces that were taken in. */
export interface AskedReduction {
  readonly kind: 'reduce';
  readonly id: number;
  readonly session: Session;
  readonly explain: string | null;
}

/** Read the bytes of a trace and keep its numbers under their sum. */
export interface AskedTaking {
  readonly kind: 'take';
  readonly id: number;
  readonly sha256: string;
  readonly name: string;
  readonly bytes: Blob;
}

/** Stop reading: that one's answer is a failure. */
export interface AskedStop {
  readonly kind: 'stop';
  readonly id: number;
}

/** One trace of a session as the road reads it, for its picture. */
export interface AskedPicture {
  readonly kind: 'picture';
  readonly id: number;
  readonly session: Session;
  readonly trace: string;
}

/** The sum of bytes too large to be summed whole. */
export interface AskedSum {
  readonly kind: 'sum';
  readonly id: number;
  readonly bytes: Blob;
}

export type Asked = AskedReduction | AskedTaking | AskedStop | AskedPicture | AskedSum;

/** What reading a trace found. */
export interface Taken {
  readonly rows: number;
  readonly problems: readonly Problem[];
}

export type Answer =
  | { readonly id: number; readonly reduction: Reduction }
  | { readonly id: number; readonly taken: Taken }
  | { readonly id: number; readonly picture: TracePicture | null }
  | { readonly id: number; readonly sum: string }
  /** Bytes read so far; more answers follow. */
  | { readonly id: number; readonly progress: number }
  | { readonly id: number; readonly failure: string };
