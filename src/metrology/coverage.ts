/** From contributions to degrees of freedom, coverage factor and expanded uncertainty (JCGM 100:2008 clause 6, Annex G; clause numbers from memory). */
import { tQuantile } from '../numeric/quantiles.ts';
import type { Source } from './source.ts';
import { standardUncertainty, type Uncertain } from './uncertain.ts';

/** p · 1 · coverage probability of every interval that the page prints. */
export const COVERAGE_PROBABILITY = 0.95;

/**
 * Effective degrees of freedom, Welch–Satterthwaite: ν_eff = u_c⁴ / Σ u_i⁴/ν_i.
 *
 * Valid: independent sources; Infinity where no source has finite ν. Not truncated to an integer: the t quantile takes real ν.
 * Source: JCGM 100:2008 G.4.1 eq. (G.2b), from memory.
 */
export function effectiveDegreesOfFreedom(parts: Iterable<readonly [contribution: number, dof: number]>, u: number): number {
  let sum = 0;
  let least = Infinity;
  for (const [part, dof] of parts) {
    if (!Number.isFinite(dof)) continue;
    sum += part ** 4 / dof;
    least = Math.min(least, dof);
  }
  // No less than the least ν_i, whatever the rounding where large contributions cancel.
  return sum === 0 ? Infinity : Math.max(least, u ** 4 / sum);
}

/** Coverage factor k = t_p(ν) for 95 %. Valid: ν > 0. Source: JCGM 100:2008 G.3, Table G.2. */
export function coverageFactor(dof: number): number {
  const kept = factors.get(dof);
  if (kept !== undefined) return kept;
  if (factors.size > FACTORS_KEPT) factors.clear();
  const k = tQuantile(0.5 + COVERAGE_PROBABILITY / 2, dof);
  factors.set(dof, k);
  return k;
}
const factors = new Map<number, number>();
/** Enough for every shot of a long run; the quantile costs microseconds, the memory of it must not grow without end. */
const FACTORS_KEPT = 5000;

export interface Expanded {
  readonly value: number;
  readonly u: number;
  readonly dof: number;
  readonly k: number;
  readonly U: number;
}

/** Value, u, ν_eff, k and U of an uncertain value. Only sources of finite ν are looked at one by one. */
export function expanded(y: Uncertain, finite: FiniteSources): Expanded {
  const u = standardUncertainty(y);
  const dof = u === 0 ? Infinity : effectiveDegreesOfFreedom(finiteParts(y, finite), u);
  const k = coverageFactor(dof);
  return { value: y.value, u, dof, k, U: k * u };
}

/** The sources of finite ν in the anchors; found once, since most sources have none. */
export type FiniteSources = readonly Source[];

export function finiteSources(of: Iterable<Uncertain>): FiniteSources {
  const found = new Set<Source>();
  for (const y of of) {
    for (const a of y.through.keys()) for (const source of a.flat.keys()) if (Number.isFinite(source.dof)) found.add(source);
    for (const source of y.own.keys()) if (Number.isFinite(source.dof)) found.add(source);
  }
  return [...found];
}

function* finiteParts(y: Uncertain, finite: FiniteSources): Generator<readonly [number, number]> {
  for (const source of finite) {
    let part = y.own.get(source) ?? 0;
    for (const [a, c] of y.through) part += c * (a.flat.get(source) ?? 0);
    if (part !== 0) yield [part, source.dof];
  }
}
