import { describe, expect, it } from 'vitest';
import { reduce } from '../../src/reduction/reduce.ts';
import { DEMO_TRUTH, demoSession } from '../../src/session/demo.ts';

describe('the demo session', () => {
  const reduction = reduce(demoSession(), 'demo/20');

  it('stops nowhere', () => {
    expect(reduction.problems.filter((p) => p.weight === 'stops')).toEqual([]);
  });

  it('holds the truth that it was made with, by taps and by geometry', () => {
    for (const run of [reduction.runs.taps!, reduction.runs.geometry!]) {
      expect(run.n).toBe(DEMO_TRUTH.ordinaryShots);
      expect(Math.abs(run.mean.value - DEMO_TRUTH.meanImpulseBit)).toBeLessThan(run.mean.U);
    }
  });
});
