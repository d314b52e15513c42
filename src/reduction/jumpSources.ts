/** Jumps of a fitted trace as uncertain values: its noise by sources that the jumps near one another share, its frequency and damping common to all. */
import type { Family, Source } from '../metrology/source.ts';
import { anchor, combine, ofSource, type Anchor, type Uncertain } from '../metrology/uncertain.ts';
import type { Dimension } from '../units/units.ts';

/** What a fit tells of its jumps, all in the unit of the reading. */
export interface JumpsKnown {
  readonly jumps: readonly number[];
  /** Covariance of two jumps by noise, correlation of the residuals included. */
  readonly noiseCovariance: (i: number, j: number) => number;
  /** Covariance of (ω_n, ζ), and the jumps' slopes by each. */
  readonly covariance: readonly [ww: number, wz: number, zz: number];
  readonly byFrequency: readonly number[];
  readonly byRatio: readonly number[];
  /** ω_n, rad/s, and ζ. */
  readonly frequency: number;
  readonly ratio: number;
}

export interface UncertainJumps {
  readonly jumps: readonly Uncertain[];
  readonly frequency: Anchor;
  readonly ratio: Anchor;
}

/** Jumps correlated by less than this share no source. */
const LEAST_CORRELATION = 1e-3;
/** Neighbours that a jump may share its noise with. */
const WIDEST = 40;

/**
 * Rows of a lower triangle L with L Lᵀ = the covariance, within a band; null where the band alone is no covariance.
 * Source: Cholesky factorisation, derived.
 */
export function bandedRoot(n: number, covariance: (i: number, j: number) => number, width: number): readonly Float64Array[] | null {
  const rows: Float64Array[] = [];
  for (let i = 0; i < n; i++) {
    const first = Math.max(0, i - width);
    const row = new Float64Array(i - first + 1);
    for (let j = first; j <= i; j++) {
      const other = rows[j];
      const otherFirst = Math.max(0, j - width);
      let sum = covariance(i, j);
      for (let k = Math.max(first, otherFirst); k < j; k++) sum -= row[k - first]! * (j === i ? row[k - first]! : other![k - otherFirst]!);
      if (j === i) {
        if (!(sum > 0)) return null;
        row[i - first] = Math.sqrt(sum);
      } else row[j - first] = sum / other![j - otherFirst]!;
    }
    rows.push(row);
  }
  return rows;
}

/** How far from a jump another one still shares its noise. */
function widthOf(n: number, covariance: (i: number, j: number) => number): number {
  let width = 0;
  for (let i = 0; i < n; i++) for (let j = i - 1; j >= Math.max(0, i - WIDEST); j--) if (covariance(i, j) ** 2 > LEAST_CORRELATION ** 2 * covariance(i, i) * covariance(j, j)) width = Math.max(width, i - j);
  return width;
}

export function uncertainJumps(id: string, dimension: Dimension, { jumps, noiseCovariance, covariance: [ww, wz, zz], byFrequency, byRatio, frequency, ratio }: JumpsKnown): UncertainJumps {
  const n = jumps.length;
  const width = widthOf(n, noiseCovariance);
  const root = bandedRoot(n, noiseCovariance, width) ?? jumps.map((_, i) => Float64Array.of(Math.sqrt(Math.max(0, noiseCovariance(i, i)))));
  const unit = (name: string, of: Dimension, family: Family): Source => ({ id: `${id}.${name}`, label: family.label, symbol: 'x', dimension: of, estimate: 0, u: 1, distribution: 'normal', dof: Infinity, family });
  const noise = jumps.map((_, i) => unit(`noise${i + 1}`, dimension, { id: 'traces.noise', label: 'Noise of the traces' }));
  const oscillation: Family = { id: 'traces.oscillation', label: 'Frequency and damping of the traces' };
  const [first, second] = ['oscillation1', 'oscillation2'].map((name) => ofSource(unit(name, 'number', oscillation)));
  // (ω_n, ζ) by the lower triangle of their covariance.
  const l00 = Math.sqrt(Math.max(0, ww));
  const l10 = l00 === 0 ? 0 : wz / l00;
  const l11 = Math.sqrt(Math.max(0, zz - l10 * l10));
  const w = anchor({ ...combine([[l00, first!]]), value: frequency });
  const z = anchor({ ...combine([[l10, first!], [l11, second!]]), value: ratio });
  return {
    frequency: w, ratio: z,
    jumps: jumps.map((value, i) => {
      const row = root[i]!;
      const own = new Map<Source, number>();
      row.forEach((part, at) => {
        if (part !== 0) own.set(noise[i - row.length + 1 + at]!, part);
      });
      return { ...combine([[1, { value, own, through: new Map() }], [byFrequency[i]!, w], [byRatio[i]!, z]]), value };
    }),
  };
}
