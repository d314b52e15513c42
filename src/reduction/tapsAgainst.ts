/** Is the calibration valid for these shots? What the pendulum did after taps and after shots, side by side, each as a difference in its u. */
import { ownParts, pooledMean } from '../metrology/pooled.ts';
import { fromResolution } from '../metrology/source.ts';
import { ofSource, propagate, standardUncertainty, type Uncertain } from '../metrology/uncertain.ts';
import { dampingCarried } from '../pendulum/forms.ts';
import type { Damping } from './swings.ts';
import type { Comparison } from './evidenceResults.ts';
import { stated } from './run.ts';
import type { SessionRecord } from './sheets.ts';
import { unitNamed } from '../units/units.ts';
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
  /** That count. */
  readonly records: readonly SessionRecord[];
}

const FAMILY = { id: 'readings.maximumTimes', label: 'Times to the first maximum' };

/** Mean time to the first maximum of one kind; each reading with the last digit of its time, their scatter where it is larger. */
function maximumTimeOf(records: readonly SessionRecord[], kind: 'tap' | 'shot'): Uncertain | null {
  const timed = records.filter((record) => record.kind === kind && record.maximumTime !== null);
  if (timed.length === 0) return null;
  const items = timed.map((record) => {
    const cell = record.maximumTime!;
    const u = cell.spread ?? fromResolution(10 ** -cell.decimals * (unitNamed(cell.unit, 'time')?.factor ?? 1));
    return ofSource({ id: `${record.id}.maximumTime`, label: 'Time to the first maximum', symbol: 't_p', dimension: 'time', estimate: cell.value, u, distribution: 'rectangular', dof: Infinity, family: FAMILY });
  });
  return pooledMean(items, ownParts(items), { id: `maximumTime.${kind}`, label: 'Scatter of the times to the first maximum', symbol: 't_p', dimension: 'time', family: FAMILY }).mean;
}

export function tapsAgainst({ damping, timings, bodies, records }: AgainstFacts): readonly Comparison[] {
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
  const [shotTime, tapTime] = [maximumTimeOf(records, 'shot'), maximumTimeOf(records, 'tap')];
  if (shotTime && tapTime && tapTime.value > 0) {
    const asFired = same ? tapTime : propagate(({ t, p, q }) => (t * p) / q, { t: tapTime, p: periodOfBody(bodies.shots), q: periodOfBody(bodies.taps) });
    found.push(compared('maximumTime', asFired, shotTime));
  }
  return found;
}
