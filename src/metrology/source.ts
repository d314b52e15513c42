/** A source of uncertainty: one independent cause, the same object wherever it acts. */
import type { Dimension } from '../units/units.ts';

/** Distribution that stands for what is known of a source (GUM 4.3, 4.4; JCGM 101 6.4). */
export type Distribution = 'normal' | 'rectangular' | 't' | 'exact';

export interface Source {
  /** Stable name: the same ruler is the same source wherever it is used. */
  readonly id: string;
  readonly label: string;
  readonly symbol: string;
  readonly dimension: Dimension;
  /** x · SI · any · best estimate of the quantity. */
  readonly estimate: number;
  /** u(x) · SI · ≥ 0 · standard uncertainty. */
  readonly u: number;
  readonly distribution: Distribution;
  /** ν · 1 · > 0, Infinity where u is known from elsewhere than a sample. */
  readonly dof: number;
  /** Budget line that merges many of a kind ("readings of the taps"); absent: a line of its own. */
  readonly family?: Family;
  /** Instrument that the quantity was measured with, as a report states it. */
  readonly measuredWith?: string;
}

export interface Family {
  readonly id: string;
  readonly label: string;
}

/**
 * Standard uncertainty of limits ±a of a rectangular distribution: u = a/√3.
 *
 * Valid: a ≥ 0. Source: JCGM 100:2008 4.3.7 (clause number from memory).
 */
export const fromLimits = (halfWidth: number): number => halfWidth / Math.sqrt(3);

/**
 * Standard uncertainty of one reading to the nearest a: u = a/√12 = 0.29 a.
 *
 * Valid: a ≥ 0, readings spread over many divisions. Source: JCGM 100:2008 F.2.2.1 (clause number from memory).
 */
export const fromResolution = (division: number): number => division / Math.sqrt(12);

/** Standard uncertainty from an expanded one: u = U/k. Valid: k > 0. Source: JCGM 100:2008 4.3.3 (from memory). */
export const fromExpanded = (expanded: number, k: number): number => expanded / k;
