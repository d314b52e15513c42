/** Residuals of white noise show less of it at the swing's frequency than there was: as much less as is told. */
import { describe, expect, it } from 'vitest';
import { laggedProducts } from '../../src/numeric/fourier.ts';
import { whiteFactor } from '../../src/traces/fittedAway.ts';
import { noiseCorrelation, parzen } from '../../src/traces/noiseColour.ts';
import { fitSwing } from '../../src/traces/swingFit.ts';
import { draws } from '../metrology/sources.ts';
import { struck } from './struck.ts';

const [W, Z] = [2.72, 0.02];
const PERIODS = 4;

/** Mean over runs of 1 + 2 Σ ρ(l) Σ w w/Σ w², as the residuals of white noise have it, and what is told. */
function meanAndTold(events: readonly number[], rate: number, seconds: number, runs: number) {
  const jumps = events.map((_, k) => 1 + 0.1 * (k % 3));
  const { t, theta } = struck({ frequency: W, ratio: Z, share: 0, events, jumps, seconds, rate, start: [0.1, 0] });
  const times = Float64Array.from(t);
  const { normal } = draws(31);
  let [sum, count, told] = [0, 0, 0];
  for (let run = 0; run < runs; run++) {
    const samples = { t: times, x: Float64Array.from(theta, (value) => value + 0.02 * normal()) };
    const fit = fitSwing(samples, events, { start: { frequency: W, ratio: Z }, stretches: 1 });
    if (fit.status !== 'fitted') throw new Error(fit.status);
    const lags = Math.ceil((PERIODS * 2 * Math.PI * rate) / W);
    const { correlation } = noiseCorrelation(fit.residuals, undefined, lags);
    events.forEach((_, k) => {
      const products = laggedProducts(fit.weightsOf(k).weights, lags);
      let factor = 1;
      for (let l = 1; l <= lags; l++) factor += 2 * correlation[l]! * (products[l]! / products[0]!);
      sum += factor;
      count += 1;
    });
    told += whiteFactor(fit, samples, PERIODS) / runs;
  }
  return { mean: sum / count, told };
}

describe('what a fit takes for swing', () => {
  it.each([
    ['few shots in a long record', [20, 60], 20, 120], ['a shot every few periods', [6, 15, 24, 33, 42, 51], 20, 60], ['a shot a period', Array.from({ length: 20 }, (_, k) => Math.round((5 + 2.3 * k) * 20) / 20), 20, 55], ['few samples a period', [6, 15, 24, 33, 42, 51].map((time) => time + 0.25), 8, 60],
  ] as const)('%s', (_, events, rate, seconds) => {
    const { mean, told } = meanAndTold(events, rate, seconds, 120);
    expect(told).toBeLessThan(1);
    expect(Math.abs(mean - told)).toBeLessThan(0.08);
  });

  it('is much where shots crowd, and little in a long quiet record', () => {
    expect(meanAndTold([40], 10, 250, 3).told).toBeGreaterThan(0.85);
    expect(meanAndTold(Array.from({ length: 30 }, (_, k) => 5 + 1.2 * k), 20, 45, 3).told).toBeLessThan(0.6);
  });

  it('weighs by Parzen’s taper, 1 at no lag and 0 at the last', () => {
    expect(parzen(0)).toBe(1);
    expect(parzen(1)).toBe(0);
    expect(parzen(0.5)).toBeCloseTo(0.25, 12);
  });
});
