/** Records of a struck pendulum with noise, made by the model that is fitted to them. */
import { swingOver } from '../../src/traces/swingModel.ts';
import { motionOver } from '../../src/traces/swingSums.ts';
import type { SwingSamples } from '../../src/traces/swingSums.ts';
import { draws } from '../metrology/sources.ts';

interface Striking {
  /** ω_n, rad/s; ζ. */
  readonly frequency: number;
  readonly ratio: number;
  readonly count: number;
  /** Between samples, s. */
  readonly spacing: number;
  /** s, rising, and jumps of x′/ω_n. */
  readonly events: readonly number[];
  readonly jumps: readonly number[];
  /** x about the rest line and x′/ω_n at the start. */
  readonly start: readonly [number, number];
  /** Of the rest line at the first and the last sample. */
  readonly rest: readonly [number, number];
  /** sd of white noise. */
  readonly noise: number;
  readonly seed: number;
}

export function struckRecord({ frequency, ratio, count, spacing, events, jumps, start, rest, noise, seed }: Striking): SwingSamples {
  const t = Float64Array.from({ length: count }, (_, i) => i * spacing);
  let [position, velocity] = start;
  let begins = 0;
  const stretches = [{ begins, position, velocity }];
  events.forEach((time, k) => {
    const m = motionOver(time - begins, { frequency, ratio });
    [position, velocity] = [m.pp * position + m.pv * velocity, m.vp * position + m.vv * velocity + jumps[k]!];
    begins = time;
    stretches.push({ begins, position, velocity });
  });
  const x = swingOver({ frequency, ratio, stretches, rest: { times: [0, (count - 1) * spacing], values: rest } }, t);
  const { normal } = draws(seed);
  for (let i = 0; i < count; i += 1) x[i]! += noise * normal();
  return { t, x };
}
