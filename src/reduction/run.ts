/** Seventh step: the run mean, its scatter and what is common to all shots. */
import { budgetLines, type Line } from '../metrology/budget.ts';
import { expanded, finiteSources } from '../metrology/coverage.ts';
import { ownParts, pooledMean } from '../metrology/pooled.ts';
import type { Source } from '../metrology/source.ts';
import { standardUncertainty, type Uncertain } from '../metrology/uncertain.ts';
import { familyOf } from './readings.ts';
import type { Budget, BudgetLine, Result, RunResult } from './results.ts';

export interface Run {
  readonly mean: Uncertain;
  readonly result: RunResult;
}

/**
 * Run mean with u² = s²/n + (common part)²; the common part is not divided by √n. `of` counts the shots with those set aside.
 * The common part takes in what a shot's readings do to all shots through the damping ratio, with its correlation to what
 * they do to that shot, so that the two parts make up u.
 *
 * Source: JCGM 100:2008 4.2.3, 5.2 (clause numbers from memory); methods 3.
 */
export function runOf(items: readonly Uncertain[], of: number, typed: readonly Source[]): Run | null {
  if (items.length === 0) return null;
  const own = ownParts(items);
  const pooled = pooledMean(items, own, { id: 'shots.scatter', label: 'Scatter of the shots', symbol: 's/√n', dimension: 'impulse', family: familyOf('shot') });
  const mean = pooled.mean;
  const result = expanded(mean, finiteSources([mean]));
  return {
    mean,
    result: {
      n: pooled.n, of, mean: result, scatter: pooled.scatter, uScatter: pooled.uScatter, uCommon: Math.sqrt(Math.max(0, result.u ** 2 - pooled.uScatter ** 2)),
      readingsInsteadOfScatter: pooled.readingsInsteadOfScatter, budget: budgetOfRun(mean, result, typed, familyOf('shot').id),
    },
  };
}

/** Budget of a run mean; the line of the family `scatter` holds what is not common. */
export function budgetOfRun(y: Uncertain, of: Result, typed: readonly Source[], scatter: string): Budget {
  return { of, lines: budgetLines(y, typed).map((line) => asBudgetLine(line, line.id === scatter ? 'scatter' : 'common')) };
}

/** Budget of one record: its own readings a line each, what it shares with others a line a source or family. */
export function budgetOfRecord(y: Uncertain, of: Result, typed: readonly Source[]): Budget {
  const own = new Set([...y.own.keys()].map((source) => source.id));
  return { of, lines: budgetLines(y, typed, true).map((line) => asBudgetLine(line, own.has(line.id) ? 'own' : 'common')) };
}

function asBudgetLine({ sources: _merged, ...line }: Line, scope: BudgetLine['scope']): BudgetLine {
  return { ...line, scope };
}

export const stated = (y: Uncertain): { value: number; u: number } => ({ value: y.value, u: standardUncertainty(y) });
