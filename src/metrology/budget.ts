/** The uncertainty budget: one line a source or family of sources, shares of the variance that total exactly 100.0 %. */
import type { Source } from './source.ts';
import { contributions, type Uncertain } from './uncertain.ts';
import type { Dimension } from '../units/units.ts';

export interface Line {
  readonly id: string;
  readonly label: string;
  readonly symbol: string;
  readonly dimension: Dimension;
  /** null for a line that merges many readings. */
  readonly estimate: number | null;
  /** Standard uncertainty of the quantity, SI; null for a merged line. */
  readonly u: number | null;
  readonly distribution: string;
  readonly dof: number;
  /** Sensitivity coefficient ∂y/∂x, SI; null for a merged line. */
  readonly sensitivity: number | null;
  /** Signed c·u in the result's unit; a merged line has the root of the sum of squares. */
  readonly contribution: number;
  /** Share of the variance, in percent with one decimal, rounded so that a budget's shares total exactly 100.0. */
  readonly share: number;
  /** Number of sources merged in this line. */
  readonly sources: number;
  /** Instrument that the quantity was measured with; absent: none named, or a merged line. */
  readonly measuredWith?: string;
}

/**
 * Budget of y. Sources of one family are merged: contribution √Σ(c_i u_i)², ν by Welch–Satterthwaite within the line.
 * Nothing is dropped: a line of zero contribution is a line.
 *
 * `also`: sources that were typed and act nowhere on y, listed with zero contribution.
 * `ownApart`: sources that y has directly (one record's readings) get a line each, outside their family.
 */
export function budgetLines(y: Uncertain, also: readonly Source[] = [], ownApart = false): readonly Line[] {
  const parts = new Map(contributions(y));
  for (const source of also) if (!parts.has(source)) parts.set(source, 0);
  const groups = new Map<string, [Source, number][]>();
  for (const [source, part] of parts) {
    const key = ownApart && y.own.has(source) ? source.id : (source.family?.id ?? source.id);
    const group = groups.get(key);
    if (group) group.push([source, part]);
    else groups.set(key, [[source, part]]);
  }
  const total = [...parts.values()].reduce((sum, part) => sum + part * part, 0);
  const lines = [...groups.entries()].map(([id, group]) => lineOf(id, group, total));
  const shares = sharesOfHundred(lines.map((line) => line.share));
  return lines.map((line, i) => ({ ...line, share: shares[i]! })).sort((a, b) => b.contribution ** 2 - a.contribution ** 2);
}

function lineOf(id: string, group: readonly [Source, number][], total: number): Line {
  const variance = group.reduce((sum, [, part]) => sum + part * part, 0);
  const share = total === 0 ? 0 : (100 * variance) / total;
  const [first, part] = group[0]!;
  if (group.length === 1 && id === first.id) {
    return {
      id, label: first.label, symbol: first.symbol, dimension: first.dimension, estimate: first.estimate, u: first.u,
      distribution: first.distribution, dof: first.dof, sensitivity: first.u === 0 ? null : part / first.u, contribution: part, share, sources: 1,
      ...(first.measuredWith === undefined ? {} : { measuredWith: first.measuredWith }),
    };
  }
  let finite = 0;
  for (const [source, c] of group) if (Number.isFinite(source.dof)) finite += c ** 4 / source.dof;
  return {
    id, label: first.family?.label ?? first.label, symbol: first.symbol, dimension: first.dimension, estimate: null, u: null,
    distribution: [...new Set(group.map(([source]) => source.distribution))].join(', '), dof: finite === 0 ? Infinity : variance ** 2 / finite,
    sensitivity: null, contribution: Math.sqrt(variance), share, sources: group.length,
  };
}

/**
 * Percentages rounded to one decimal so that they total exactly 100.0 (largest remainders get the tenths left over).
 *
 * Valid: non-negative shares that sum to 100 within rounding; all zero stays all zero.
 */
export function sharesOfHundred(shares: readonly number[]): readonly number[] {
  const sum = shares.reduce((a, b) => a + b, 0);
  if (sum === 0) return shares.map(() => 0);
  const tenths = shares.map((share) => (1000 * share) / sum);
  const floor = tenths.map(Math.floor);
  let left = 1000 - floor.reduce((a, b) => a + b, 0);
  const order = tenths.map((t, i) => [t - floor[i]!, i] as const).sort((a, b) => b[0] - a[0] || shares[b[1]]! - shares[a[1]]! || a[1] - b[1]);
  for (const [, i] of order) {
    if (left <= 0) break;
    floor[i]! += 1;
    left -= 1;
  }
  return floor.map((t) => t / 10);
}
