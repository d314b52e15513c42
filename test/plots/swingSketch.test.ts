import { describe, expect, test } from 'vitest';
import { swingSketch } from '../../src/plots/swingSketch.ts';

describe('the sketch of a swing', () => {
  test('the pendulum is drawn at its true angle', () => {
    const sketch = swingSketch({ angle: Math.PI / 6, launch: Math.PI / 6, dampingRatio: 0 });
    if (sketch === null) throw new Error('An undamped swing has a sketch');
    const { pivot, swingTip } = sketch;
    expect(Math.atan2(swingTip.x - pivot.x, swingTip.y - pivot.y)).toBeCloseTo(Math.PI / 6, 12);
  });

  test('without damping the first peak reaches the dotted line, with damping it stays below', () => {
    const free = swingSketch({ angle: 0.1, launch: 0.1, dampingRatio: 0 });
    const damped = swingSketch({ angle: 0.1, launch: 0.1072, dampingRatio: 0.0444 });
    expect(free?.firstPeak.y).toBeCloseTo(free?.undampedY ?? NaN, 9);
    expect(damped?.firstPeak.y).toBeGreaterThan(damped?.undampedY ?? NaN);
  });

  test('a swing damped beyond swinging, or none at all, has no sketch', () => {
    expect(swingSketch({ angle: 0.1, launch: 0.2, dampingRatio: 1 })).toBe(null);
    expect(swingSketch({ angle: 0, launch: 0, dampingRatio: 0.01 })).toBe(null);
  });
});
