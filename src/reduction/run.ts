/** Seventh step: the run mean, its scatter and what is common to all shots. */
import { budgetLines } from '../metrology/budget.ts';
import { expanded, finiteSources } from '../metrology/coverage.ts';
import { pooledMean } from '../metrology/pooled.ts';
import type { Source } from '../metrology/source.ts';
import { contributions, standardUncertainty, type Uncertain } from '../metrology/uncertain.ts';
import { familyOf } from './readings.ts';
import type { Budget, BudgetLine, Result, RunResult } from './results.ts';

/** Reading sources that more than one of these results took directly (a zero that served several shots). */
function sharedReadings(items: readonly Uncertain[]): ReadonlySet<Source> {
  const seen = new Set<Source>();
  const shared = new Set<Source>();
  for (const item of items) for (const source of item.own.keys()) (seen.has(source) ? shared : seen).add(source);
  return shared;
}

/** u of what belongs to each result alone. */
export function ownParts(items: readonly Uncertain[]): readonly number[] {
  const shared = sharedReadings(items);
  return items.map((item) => {
    let sum = 0;
    for (const [source, part] of item.own) if (!shared.has(source)) sum += part * part;
    return Math.sqrt(sum);
  });
}

export interface Run {
  readonly mean: Uncertain;
  readonly result: RunResult;
}

/**
 * Run mean with u² = s²/n + (common part)²; the common part is not divided by √n. `of` counts the shots with those set aside.
 *
 * Source: JCGM 100:2008 4.2.3, 5.2 (clause numbers from memory); methods 3.
 */
export function runOf(items: readonly Uncertain[], of: number, typed: readonly Source[]): Run | null {
  if (items.length === 0) return null;
  const own = ownParts(items);
  const pooled = pooledMean(items, own, { id: 'shots.scatter', label: 'Scatter of the shots', symbol: 's/√n', dimension: 'impulse', family: familyOf('shot') });
  const mean = pooled.mean;
  const result = expanded(mean, finiteSources([mean]));
  const alone = new Set<Source>();
  const shared = sharedReadings(items);
  for (const item of items) for (const source of item.own.keys()) if (!shared.has(source)) alone.add(source);
  let common = 0;
  for (const [source, part] of contributions(mean)) if (!alone.has(source) && source.id !== 'shots.scatter') common += part * part;
  return {
    mean,
    result: {
      n: pooled.n, of, mean: result, scatter: pooled.scatter, uScatter: pooled.uScatter, uCommon: Math.sqrt(common),
      readingsInsteadOfScatter: pooled.readingsInsteadOfScatter, budget: budgetOf(mean, result, typed, familyOf('shot').id),
    },
  };
}

/** Budget of a result; `scatterFamily` names the line that holds what is not common. */
export function budgetOf(y: Uncertain, of: Result, typed: readonly Source[], scatterFamily: string | null): Budget {
  const lines = budgetLines(y, typed).map((line): BudgetLine => {
    const { sources: _merged, ...rest } = line;
    return { ...rest, scope: line.id === scatterFamily ? 'scatter' : y.own.size > 0 && [...y.own.keys()].some((s) => s.id === line.id || s.family?.id === line.id) ? 'own' : 'common' };
  });
  return { of, lines };
}

export const stated = (y: Uncertain): { value: number; u: number } => ({ value: y.value, u: standardUncertainty(y) });
