/** The mean of repeated results whose common part does not shrink and whose scatter is at least what was seen. */
import { tQuantile } from '../numeric/quantiles.ts';
import { COVERAGE_PROBABILITY, coverageFactor } from './coverage.ts';
import type { Source, Family } from './source.ts';
import { combine, exact, ofSource, type Uncertain } from './uncertain.ts';
import type { Dimension } from '../units/units.ts';

export interface Pooled {
  readonly mean: Uncertain;
  readonly n: number;
  /** Observed standard deviation of one item of average weight, s; null for one item. */
  readonly scatter: number | null;
  /** Standard deviation that the items' own sources predict. */
  readonly expected: number;
  /** Standard uncertainty of the mean from scatter: s/√n, or the items' own part where that is larger. */
  readonly uScatter: number;
  readonly readingsInsteadOfScatter: boolean;
}

export interface PooledOptions {
  readonly id: string;
  readonly label: string;
  readonly symbol: string;
  readonly dimension: Dimension;
  readonly family: Family;
  /** Weights; equal where absent. Normalised here. */
  readonly weights?: readonly number[];
}

/**
 * Mean of n items. Each item keeps its own sources (divided by n in the mean) and what it shares; scatter beyond
 * what the own sources explain becomes one more source, so that the parts that belong to single items make up
 *
 *   u² = max(s², u_own²)/n     (equal weights)
 *
 * and are not counted twice. The extra source has ν = (n − 1)(u_extra/u_scatter)⁴, which gives the whole scatter
 * the ν = n − 1 of s in Welch–Satterthwaite's sum. With weights 1/u_own², s is the Birge-scaled scatter.
 *
 * Where s is the smaller, few items may have come out alike by chance; the interval is then not let below the one that
 * s alone would make, t(n − 1) s/√n: ν is where t(ν) u_own reaches it, and infinite where 1.96 u_own does.
 *
 * `ownU[i]`: what belongs to item i alone, in the unit of the items, ≥ 0.
 * Source: JCGM 100:2008 4.2.3, 5.2, G.4; methods: "s already contains reading and background randomness".
 */
export function pooledMean(items: readonly Uncertain[], ownU: readonly number[], options: PooledOptions): Pooled {
  const n = items.length;
  if (n === 0) throw new RangeError('pooled mean: no items');
  const given = options.weights ?? items.map(() => 1);
  const total = given.reduce((a, b) => a + b, 0);
  const w = given.map((x) => x / total);
  const mean = combine(items.map((item, i) => [w[i]!, item] as const));
  const ownVariance = ownU.reduce((sum, u, i) => sum + (w[i]! * u) ** 2, 0);
  if (n === 1) return { mean, n, scatter: null, expected: ownU[0]!, uScatter: Math.sqrt(ownVariance), readingsInsteadOfScatter: true };

  // Weighted scatter about the mean as the variance of the mean: Σ w (y − ȳ)² / (n − 1), which is s²/n for equal weights.
  const seen = items.reduce((sum, item, i) => sum + w[i]! * (item.value - mean.value) ** 2, 0) / (n - 1);
  const dof = dofOfScatter(seen, ownVariance, n);
  const used = Math.max(seen, ownVariance);
  // Never quite nothing, so that there is a source to carry ν.
  const extra = Number.isFinite(dof) ? Math.max(LEAST_EXTRA * used, seen - ownVariance) : 0;
  const scatterSource: Source = {
    id: options.id, label: options.label, symbol: options.symbol, dimension: options.dimension,
    estimate: 0, u: Math.sqrt(extra), distribution: 't', dof: extra === 0 ? Infinity : dof * (extra / used) ** 2, family: options.family,
  };
  return {
    mean: combine([[1, mean], [1, extra === 0 ? exact(0) : ofSource(scatterSource)]]),
    n,
    scatter: Math.sqrt(seen * n),
    expected: Math.sqrt(ownVariance * n),
    uScatter: Math.sqrt(Math.max(seen, ownVariance)),
    readingsInsteadOfScatter: seen < ownVariance,
  };
}

/** Part of the variance of the scatter that stands for it where the items' own sources explain all of it. */
const LEAST_EXTRA = 1e-12;

/** ν of the scatter part: n − 1 where s is the larger, from there to infinity as s falls below the items' own part. */
function dofOfScatter(seen: number, ownVariance: number, n: number): number {
  if (seen >= ownVariance) return seen === 0 ? Infinity : n - 1;
  const wanted = coverageFactor(n - 1) * Math.sqrt(seen / ownVariance);
  if (wanted <= coverageFactor(Infinity)) return Infinity;
  let [low, high] = [Math.log(n - 1), Math.log(1e6)];
  // Thirty halvings place ν to eight digits; a k to five would do.
  for (let i = 0; i < 30; i++) {
    const middle = (low + high) / 2;
    if (tQuantile(0.5 + COVERAGE_PROBABILITY / 2, Math.exp(middle)) > wanted) low = middle;
    else high = middle;
  }
  return Math.exp(high);
}

/** Sources that more than one of these results have directly (a zero reading that served several shots as rest). */
export function sharedDirectly(items: readonly Uncertain[]): ReadonlySet<Source> {
  const seen = new Set<Source>();
  const shared = new Set<Source>();
  for (const item of items) for (const source of item.own.keys()) (seen.has(source) ? shared : seen).add(source);
  return shared;
}

/** u of what belongs to each result alone: its direct sources that no other result has. */
export function ownParts(items: readonly Uncertain[]): readonly number[] {
  const shared = sharedDirectly(items);
  return items.map((item) => {
    let sum = 0;
    for (const [source, part] of item.own) if (!shared.has(source)) sum += part * part;
    return Math.sqrt(sum);
  });
}

/** Weights (u_min/u)², or equal ones where some u is zero. */
export function weightsOf(u: readonly number[]): readonly number[] {
  const least = Math.min(...u);
  return u.map((x) => (least > 0 ? (least / x) ** 2 : 1));
}
