import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { covariance, standardUncertainty } from '../../src/metrology/uncertain.ts';
import { bandedRoot, uncertainJumps } from '../../src/reduction/jumpSources.ts';

/** Covariance of an AR(1) chain with unequal variances: positive definite for any |ρ| < 1. */
const chain = (rho: number, u: (i: number) => number) => (i: number, j: number): number => u(i) * u(j) * rho ** Math.abs(i - j);

describe('jumps as uncertain values', () => {
  it('have the covariance that the fit tells, noise and oscillation together', () => {
    fc.assert(fc.property(fc.double({ min: -0.7, max: 0.7, noNaN: true }), fc.integer({ min: 1, max: 30 }), fc.double({ min: -0.9, max: 0.9, noNaN: true }), (rho, n, r) => {
      const noise = chain(rho, (i) => 1 + (i % 3));
      const [uw, uz] = [0.3, 0.2];
      const byFrequency = Array.from({ length: n }, (_, i) => Math.sin(i));
      const byRatio = Array.from({ length: n }, (_, i) => Math.cos(i));
      const jumps = uncertainJumps('t1', 'length', { jumps: Array.from({ length: n }, (_, i) => i + 1), noiseCovariance: noise, covariance: [uw * uw, r * uw * uz, uz * uz], byFrequency, byRatio, frequency: 6, ratio: 0.01 }).jumps;
      const expected = (i: number, j: number): number => noise(i, j) + byFrequency[i]! * byFrequency[j]! * uw * uw + byRatio[i]! * byRatio[j]! * uz * uz + (byFrequency[i]! * byRatio[j]! + byRatio[i]! * byFrequency[j]!) * r * uw * uz;
      for (let i = 0; i < n; i++) for (let j = 0; j < n; j++) expect(Math.abs(covariance(jumps[i]!, jumps[j]!) - expected(i, j))).toBeLessThan(0.02);
      expect(standardUncertainty(jumps[0]!)).toBeCloseTo(Math.sqrt(expected(0, 0)), 6);
    }));
  });

  it('far apart share no source of noise', () => {
    const jumps = uncertainJumps('t1', 'length', { jumps: Array.from({ length: 200 }, () => 1), noiseCovariance: chain(0.1, () => 1), covariance: [0, 0, 0], byFrequency: new Array(200).fill(0), byRatio: new Array(200).fill(0), frequency: 6, ratio: 0.01 }).jumps;
    expect(jumps[100]!.own.size).toBeLessThan(5);
  });

  it('a band that is no covariance is told', () => {
    expect(bandedRoot(2, (i, j) => (i === j ? 1 : 2), 1)).toBeNull();
    expect(bandedRoot(3, chain(0.5, () => 2), 2)).not.toBeNull();
  });
});
