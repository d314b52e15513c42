/** The budget adds up: shares to a hundred, contributions to the variance, families to their members. */
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { budgetLines, sharesOfHundred } from '../../src/metrology/budget.ts';
import { effectiveDegreesOfFreedom, expanded, finiteSources } from '../../src/metrology/coverage.ts';
import { anchor, combine, exact, ofSource, standardUncertainty, type Uncertain } from '../../src/metrology/uncertain.ts';
import { source } from './sources.ts';

const tenths = (shares: readonly number[]): number => shares.reduce((sum, share) => sum + Math.round(10 * share), 0);
/** Standard uncertainties from a nanonewton second's to a thousand's, with some of zero. */
const uncertainty = fc.oneof(fc.constant(0), fc.double({ min: -9, max: 3, noNaN: true }).map((power) => 10 ** power));
const dof = fc.oneof(fc.constant(Infinity), fc.double({ min: 1, max: 100, noNaN: true }));
const coefficient = fc.tuple(fc.double({ min: -2, max: 0.5, noNaN: true }), fc.constantFrom(-1, 0, 1)).map(([power, sign]) => sign * 10 ** power);
const part = fc.record({ u: uncertainty, c: coefficient, dof, family: fc.option(fc.constantFrom('readings', 'taps'), { nil: undefined }), shared: fc.boolean() });
type Part = typeof part extends fc.Arbitrary<infer P> ? P : never;

function resultOf(parts: readonly Part[]): Uncertain {
  const terms = parts.map(({ u, c, dof: nu, family, shared }, i) => ({ c, shared, y: ofSource(source(`s${i}`, 1, u, nu, family ? { id: family, label: family } : undefined)) }));
  const common = anchor(combine(terms.filter((t) => t.shared).map((t) => [t.c, t.y] as const)));
  return combine([[0.7, common], ...terms.filter((t) => !t.shared).map((t) => [t.c, t.y] as const)]);
}

describe('shares', () => {
  test('of any budget total exactly 100.0', () => {
    fc.assert(fc.property(fc.array(fc.double({ min: 0, max: 1e6, noNaN: true }), { minLength: 1, maxLength: 60 }), (given) => {
      const shares = sharesOfHundred(given);
      const sum = given.reduce((a, b) => a + b, 0);
      expect(tenths(shares)).toBe(sum === 0 ? 0 : 1000);
      for (const [i, share] of shares.entries()) {
        expect(share).toBe(Math.round(10 * share) / 10);
        expect(Math.abs(share * sum - 100 * given[i]!)).toBeLessThanOrEqual((0.1 + 1e-9) * sum);
      }
    }), { numRuns: 500 });
  });

  test('of a third each are 33.4, 33.3 and 33.3', () => {
    expect(sharesOfHundred([100 / 3, 100 / 3, 100 / 3])).toEqual([33.4, 33.3, 33.3]);
  });

  test('of a thousand equal parts and one are all there, some of them 0.0', () => {
    const shares = sharesOfHundred(Array.from({ length: 1001 }, () => 1));
    expect(shares.length).toBe(1001);
    expect(tenths(shares)).toBe(1000);
  });

  test('a larger part never has the smaller share', () => {
    fc.assert(fc.property(fc.array(fc.double({ min: 0, max: 100, noNaN: true }), { minLength: 2, maxLength: 12 }), (given) => {
      const pairs = sharesOfHundred(given).map((share, i) => [given[i]!, share] as const).sort((a, b) => a[0] - b[0] || a[1] - b[1]);
      for (let i = 1; i < pairs.length; i++) expect(pairs[i]![1]).toBeGreaterThanOrEqual(pairs[i - 1]![1]);
    }));
  });
});

describe('the lines of a budget', () => {
  test('square-sum to u², total exactly 100.0 and keep the degrees of freedom, whatever is merged or shared', () => {
    fc.assert(fc.property(fc.array(part, { minLength: 1, maxLength: 12 }), (parts) => {
      const y = resultOf(parts);
      const lines = budgetLines(y);
      const u = standardUncertainty(y);
      expect(Math.abs(Math.hypot(...lines.map((line) => line.contribution)) - u)).toBeLessThanOrEqual(1e-12 * u);
      expect(tenths(lines.map((line) => line.share))).toBe(u === 0 ? 0 : 1000);
      // Welch and Satterthwaite within a line, then over the lines, is the same as over the sources.
      const whole = expanded(y, finiteSources([y])).dof;
      const byLines = u === 0 ? Infinity : effectiveDegreesOfFreedom(lines.map((line) => [line.contribution, line.dof] as const), u);
      expect(Math.abs(1 / byLines - 1 / whole)).toBeLessThanOrEqual(1e-9 / whole);
    }), { numRuns: 300 });
  });

  test('stand in the order of their contributions, the largest first', () => {
    const lines = budgetLines(combine([[1, ofSource(source('small', 1, 0.1))], [-1, ofSource(source('large', 1, 0.4))], [1, ofSource(source('middle', 1, 0.2))]]));
    expect(lines.map((line) => line.id)).toEqual(['large', 'middle', 'small']);
    expect(lines.map((line) => line.share)).toEqual([76.2, 19, 4.8]);
    expect(lines[0]).toMatchObject({ sensitivity: -1, estimate: 1, u: 0.4, sources: 1 });
  });

  test('merge a family: contribution by root of squares, ν by Welch and Satterthwaite', () => {
    const family = { id: 'taps', label: 'Readings of the taps' };
    const taps = [1, 2, 3, 4].map((i) => [0.25, ofSource(source(`tap ${i}`, 10, 0.2, 9, family))] as const);
    const [line] = budgetLines(combine(taps));
    expect(line).toMatchObject({ id: 'taps', label: 'Readings of the taps', sources: 4, estimate: null, u: null, sensitivity: null, share: 100 });
    expect(line!.contribution).toBeCloseTo(0.1, 14);
    expect(line!.dof).toBeCloseTo(36, 9);
  });

  test('list what was typed and acts nowhere, with nothing contributed', () => {
    const idle = source('cable', 0, 0.3);
    const acting = source('ruler', 1, 0.1);
    const lines = budgetLines(combine([[2, ofSource(acting)]]), [idle, acting]);
    expect(lines.map((line) => [line.id, line.contribution, line.share])).toEqual([['ruler', 0.2, 100], ['cable', 0, 0]]);
  });

  test('give one record’s own readings a line each where asked, and leave the shared family merged', () => {
    const family = { id: 'readings', label: 'Readings' };
    const shared = anchor(combine([[1, ofSource(source('tap 1', 0, 0.3, Infinity, family))], [1, ofSource(source('tap 2', 0, 0.4, Infinity, family))]]));
    const shot = combine([[1, shared], [1, ofSource(source('first', 5, 0.2, Infinity, family))], [-1, ofSource(source('rest', 1, 0.1, Infinity, family))]]);
    expect(budgetLines(shot).map((line) => [line.id, line.sources])).toEqual([['readings', 4]]);
    const apart = budgetLines(shot, [], true);
    expect(apart.map((line) => [line.id, line.sources])).toEqual([['readings', 2], ['first', 1], ['rest', 1]]);
    expect(apart.map((line) => line.contribution)).toEqual([0.5, 0.2, -0.1]);
  });

  test('of an exact value are none', () => {
    expect(budgetLines(exact(4))).toEqual([]);
  });
});
