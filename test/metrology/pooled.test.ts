/** The mean of repeated shots: its common part does not shrink, its scatter is counted once. */
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { expanded, finiteSources } from '../../src/metrology/coverage.ts';
import { ownParts, pooledMean, sharedDirectly, weightsOf, type PooledOptions } from '../../src/metrology/pooled.ts';
import { anchor, combine, contributions, exact, ofSource, propagate, standardUncertainty } from '../../src/metrology/uncertain.ts';
import { deviationOf, draws, meanOf, source } from './sources.ts';

const options: PooledOptions = { id: 'scatter', label: 'Scatter of the shots', symbol: 's', dimension: 'number', family: { id: 'scatter', label: 'Scatter of the shots' } };
// Source: methods 3, derived: eight shots in µN·s, calibration factor known to 6 %.
const shots = [41.2, 39.8, 42.5, 40.7, 40.1, 41.9, 38.9, 40.9];
const factorSource = source('K', 1, 0.06);
const factor = anchor(ofSource(factorSource));
const onCalibration = (ownU: number) => shots.map((shot, i) => propagate((x) => x.K * x.y, { K: factor, y: ofSource(source(`shot ${i + 1}`, shot, ownU)) }));

describe('eight shots on one calibration', () => {
  test('have mean 40.750, s 1.15635, s/√8 0.40883, common 2.4450, u 2.47894 and ν_eff 9462', () => {
    const pooled = pooledMean(onCalibration(0), shots.map(() => 0), options);
    expect(pooled.mean.value).toBeCloseTo(40.75, 12);
    expect(pooled.scatter).toBeCloseTo(1.15635, 5);
    expect(pooled.uScatter).toBeCloseTo(0.40883, 5);
    expect(pooled.readingsInsteadOfScatter).toBe(false);
    expect(contributions(pooled.mean).get(factorSource)).toBeCloseTo(2.445, 12);
    const found = expanded(pooled.mean, finiteSources([pooled.mean]));
    expect(found.u).toBeCloseTo(2.47894, 5);
    expect(Math.round(found.dof)).toBe(9462);
    expect(found.u / found.value).toBeCloseTo(0.061, 3);
  });

  test('are not given less by dividing everything by √8', () => {
    const all = Math.hypot(1.15635, 0.06 * 40.75) / Math.sqrt(8);
    expect(all).toBeCloseTo(0.956, 3);
    expect(standardUncertainty(pooledMean(onCalibration(0), shots.map(() => 0), options).mean)).toBeGreaterThan(2.5 * all);
  });

  test('have the same u and ν_eff where the readings explain a part of the scatter: nothing is counted twice', () => {
    for (const own of [0.1, 0.5, 1, 1.156]) {
      const pooled = pooledMean(onCalibration(own), shots.map(() => own), options);
      const found = expanded(pooled.mean, finiteSources([pooled.mean]));
      expect(pooled.readingsInsteadOfScatter).toBe(false);
      expect(found.u).toBeCloseTo(2.47894, 5);
      expect(Math.round(found.dof)).toBe(9462);
      expect(pooled.expected).toBeCloseTo(own, 12);
    }
  });

  test('have the readings’ u where that exceeds the scatter seen', () => {
    const pooled = pooledMean(onCalibration(2), shots.map(() => 2), options);
    expect(pooled.readingsInsteadOfScatter).toBe(true);
    expect(pooled.uScatter).toBeCloseTo(2 / Math.sqrt(8), 12);
    const found = expanded(pooled.mean, finiteSources([pooled.mean]));
    expect(found.u).toBeCloseTo(Math.hypot(2 / Math.sqrt(8), 2.445), 9);
    expect(found.dof).toBe(Infinity);
  });
});

describe('any set of results', () => {
  const measured = fc.array(fc.tuple(fc.double({ min: 10, max: 100, noNaN: true }), fc.double({ min: 0.01, max: 30, noNaN: true })), { minLength: 2, maxLength: 20 });

  test('of equal weight has u² = max(s², mean own u²)/n', () => {
    fc.assert(fc.property(measured, (given) => {
      const values = given.map(([x]) => x);
      const own = given.map(([, u]) => u);
      const { mean, scatter, uScatter } = pooledMean(given.map(([x, u], i) => ofSource(source(`y${i}`, x, u))), own, options);
      const s2 = deviationOf(values) ** 2;
      const own2 = meanOf(own.map((u) => u * u));
      expect(mean.value / meanOf(values)).toBeCloseTo(1, 12);
      expect(scatter! - Math.sqrt(s2)).toBeCloseTo(0, 9);
      expect(uScatter / Math.sqrt(Math.max(s2, own2) / values.length)).toBeCloseTo(1, 9);
      expect(standardUncertainty(mean) / uScatter).toBeCloseTo(1, 9);
    }));
  });

  // Source: weighted mean and Birge's ratio (R. T. Birge, Phys. Rev. 40 (1932) 207, from memory).
  test('weighted by 1/u² has the weighted mean’s u, widened by Birge’s ratio where that exceeds one', () => {
    fc.assert(fc.property(measured, (given) => {
      const w = given.map(([, u]) => 1 / u ** 2);
      const total = w.reduce((a, b) => a + b, 0);
      const mean = given.reduce((sum, [x], i) => sum + w[i]! * x, 0) / total;
      const birge2 = given.reduce((sum, [x], i) => sum + w[i]! * (x - mean) ** 2, 0) / (given.length - 1);
      const own = given.map(([, u]) => u);
      const pooled = pooledMean(given.map(([x, u], i) => ofSource(source(`y${i}`, x, u))), own, { ...options, weights: weightsOf(own) });
      expect(pooled.mean.value / mean).toBeCloseTo(1, 11);
      expect(standardUncertainty(pooled.mean) / Math.sqrt(Math.max(1, birge2) / total)).toBeCloseTo(1, 8);
      expect(pooled.readingsInsteadOfScatter).toBe(birge2 < 1);
    }));
  });

  test('of one alone keeps its own u and has no scatter', () => {
    const pooled = pooledMean([ofSource(source('only', 40, 2))], [2], options);
    expect(pooled).toMatchObject({ n: 1, scatter: null, expected: 2, uScatter: 2, readingsInsteadOfScatter: true });
    expect(standardUncertainty(pooled.mean)).toBe(2);
  });

  test('of none is refused', () => {
    expect(() => pooledMean([], [], options)).toThrow(RangeError);
  });

  test('of shots that are all alike and exact has no scatter at all', () => {
    const pooled = pooledMean([exact(3), exact(3), exact(3)], [0, 0, 0], options);
    expect(pooled).toMatchObject({ scatter: 0, uScatter: 0 });
    expect(standardUncertainty(pooled.mean)).toBe(0);
  });

  // 4000 runs know a share to 0.35 %.
  test('of eight normal shots is caught by its 95 % interval 95 times of a hundred', () => {
    const { normal } = draws(11);
    let caught = 0;
    for (let run = 0; run < 4000; run++) {
      const given = Array.from({ length: 8 }, () => 40 + 1.2 * normal());
      const { mean } = pooledMean(given.map(exact), given.map(() => 0), options);
      if (Math.abs(mean.value - 40) <= expanded(mean, finiteSources([mean])).U) caught++;
    }
    expect(caught / 4000).toBeGreaterThan(0.938);
    expect(caught / 4000).toBeLessThan(0.962);
  });
});

describe('what belongs to one result alone', () => {
  const zero = ofSource(source('zero', 1, 0.3));
  const first = (i: number) => ofSource(source(`first ${i}`, 5, 0.4));
  const items = [combine([[1, first(1)], [-1, zero]]), combine([[1, first(2)], [-1, zero]]), combine([[1, first(3)], [-1, ofSource(source('own zero', 1, 0.3))]])];

  test('leaves out a zero reading that served two of them', () => {
    expect([...sharedDirectly(items)].map((s) => s.id)).toEqual(['zero']);
    expect(ownParts(items).map((u) => Math.round(1e9 * u) / 1e9)).toEqual([0.4, 0.4, 0.5]);
  });

  test('weighs as 1/u², or equally where one is exact', () => {
    const [one, other] = weightsOf([0.5, 0.25]);
    expect(other! / one!).toBe(4);
    expect(new Set(weightsOf([0.5, 0, 2])).size).toBe(1);
  });
});
