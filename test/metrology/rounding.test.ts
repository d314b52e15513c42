import { expect, it } from 'vitest';
import { commonRounding } from '../../src/metrology/rounding.ts';

/** Repeatable draws in (0, 1): the multiplicative congruential generator of Park and Miller (CACM 31 (1988) 1192, from memory). */
function draws(seed: number): () => number {
  let state = seed;
  return () => (state = (state * 48271) % 2147483647) / 2147483647;
}

it('readings that all fall on one division share its whole u, a/√12; well spread ones share none', () => {
  expect(commonRounding(0.5, 0)).toBeCloseTo(0.5 / Math.sqrt(12), 12);
  expect(commonRounding(0.5, 0.5)).toBeLessThan(1e-3 * 0.5);
});

it.each([0.1, 0.2, 0.3])('is the scatter of the mean’s rounding over positions within the division, spread %d a', (spread) => {
  const next = draws(20261201);
  const normal = (): number => Math.sqrt(-2 * Math.log(next())) * Math.cos(2 * Math.PI * next());
  const [positions, readings] = [400, 800];
  let sum = 0;
  for (let i = 0; i < positions; i++) {
    const truth = (i + 0.5) / positions;
    let mean = 0;
    for (let k = 0; k < readings; k++) {
      const value = truth + spread * normal();
      mean += (Math.round(value) - value) / readings;
    }
    sum += mean ** 2;
  }
  // What the finite number of readings adds: at most a²/12 over their number.
  const found = Math.sqrt(Math.max(0, sum / positions - 1 / 12 / readings));
  expect(Math.abs(found / commonRounding(1, spread) - 1)).toBeLessThan(spread > 0.25 ? 0.08 : 0.03);
});
