/** Is the calibration valid for these shots? What the pendulum did after taps and after shots, side by side, each as a difference in its u. */
import { propagate, standardUncertainty, type Uncertain } from '../metrology/uncertain.ts';
import { dampingCarried } from '../pendulum/forms.ts';
import type { Damping } from './swings.ts';
import type { Comparison } from './evidenceResults.ts';
import { stated } from './run.ts';
import { factorOfBody, periodOfBody, type Body, type ByConfiguration } from './stand.ts';
import { barePeriod, type Timing } from './timings.ts';

/** Taps brought to the pendulum as fired, against the shots: relative difference (shots − taps)/taps. */
function compared(id: Comparison['id'], taps: Uncertain, shots: Uncertain): Comparison {
  const gap = propagate(({ t, s }) => s / t - 1, { t: taps, s: shots });
  const u = standardUncertainty(gap);
  return { id, taps: stated(taps), shots: stated(shots), relative: stated(gap), inU: u === 0 ? 0 : gap.value / u };
}

export interface AgainstFacts {
  readonly damping: Damping;
  readonly timings: readonly Timing[];
  readonly bodies: ByConfiguration<Body> | null;
}

export function tapsAgainst({ damping, timings, bodies }: AgainstFacts): readonly Comparison[] {
  const found: Comparison[] = [];
  const { seen } = damping;
  const same = bodies === null || bodies.shots === bodies.taps;
  if (seen.shots && seen.taps && seen.taps.value !== 0) {
    const asFired = same ? seen.taps : propagate(dampingCarried, { ratio: seen.taps, factorFrom: factorOfBody(bodies.taps), factorTo: factorOfBody(bodies.shots) });
    found.push(compared('damping', asFired, seen.shots));
  }
  const [shots, taps] = [barePeriod(timings, 'shots'), barePeriod(timings, 'taps')];
  if (shots && taps) {
    const asFired = same ? taps : propagate(({ t, p, q }) => (t * p) / q, { t: taps, p: periodOfBody(bodies.shots), q: periodOfBody(bodies.taps) });
    found.push(compared('period', asFired, shots));
  }
  return found;
}
