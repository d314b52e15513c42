/** A shot's fit in 2,000 samples, against the same model fitted by scipy.optimize.curve_fit where that is installed. */
import { spawnSync } from 'node:child_process';
import { join } from 'node:path';
import { fitSwing, type SwingFit, type SwingOptions } from '../../src/traces/swingFit.ts';
import type { SwingSamples } from '../../src/traces/swingSums.ts';
import { struckRecord } from './struckRecord.ts';
import { median, table } from './timing.ts';
import type { Group, Here } from './timing.ts';

const SHOT = 3.0013;
const FREQUENCY = 5.7;
const RATIO = 0.01;
const SAMPLES = 2000;
const oneShot = (): SwingSamples => struckRecord({ frequency: FREQUENCY, ratio: RATIO, count: SAMPLES, spacing: 5e-3, events: [SHOT], jumps: [1], start: [0.2, -0.1], rest: [12.5, 12.7], noise: 0.01, seed: 20_261_201 });
/** Two per cent off in frequency, twice the damping. */
const START = { frequency: 1.02 * FREQUENCY, ratio: 2 * RATIO };
const RUNS = 200;
const WARM_UP = 50;

/** Of the other program: ω_n, ζ, a, b, p₀, v₀, J and their covariance. */
interface CurveFit {
  readonly scipy: string;
  readonly seconds: readonly number[];
  readonly estimates: readonly number[];
  readonly covariance: readonly (readonly number[])[];
  /** With the slopes given as formulas. */
  readonly secondsBySlopes: readonly number[];
}

/** null where python3 or scipy is not installed. */
function curveFit({ t, x }: SwingSamples, { root }: Here): CurveFit | null {
  const input = JSON.stringify({ t: [...t], x: [...x], shot: SHOT, start: [START.frequency, START.ratio], runs: RUNS });
  const ended = spawnSync('python3', [join(root, 'test', 'bench', 'curve_fit.py')], { input, encoding: 'utf8', maxBuffer: 1 << 24 });
  if (ended.error !== undefined || ended.stderr.includes('ModuleNotFoundError')) return null;
  if (ended.status !== 0) throw new Error(`Timing scipy: ${ended.stderr}`);
  const answer: CurveFit = JSON.parse(ended.stdout);
  return answer;
}

function fitted(record: SwingSamples, options: SwingOptions): SwingFit {
  // Arrays of its own, as peaks found once are kept with them.
  const fit = fitSwing({ ...record, x: record.x.slice() }, [SHOT], options);
  if (fit.status !== 'fitted') throw new Error(`Timing a fit: ${fit.status}`);
  return fit;
}

/** Seconds of `RUNS` fits. */
function secondsOf(record: SwingSamples, options: SwingOptions): number[] {
  const seconds: number[] = [];
  for (let run = -WARM_UP; run < RUNS; run += 1) {
    const begun = performance.now();
    fitted(record, options);
    if (run >= 0) seconds.push((performance.now() - begun) / 1000);
  }
  return seconds;
}

/** ω_n, ζ and the jump, with their variances. */
function tellingOf(fit: SwingFit): { readonly estimates: readonly number[]; readonly variances: readonly number[] } {
  const [ww, wz, zz] = fit.covariance;
  const [byW, byZ] = [fit.byFrequency[0]!, fit.byRatio[0]!];
  const jump = fit.noiseCovariance(0, 0) + byW * byW * ww + 2 * byW * byZ * wz + byZ * byZ * zz;
  return { estimates: [fit.frequency, fit.ratio, fit.jumps[0]!], variances: [ww, zz, jump].map((value) => value * fit.noise ** 2) };
}

/** Where ω_n, ζ and the jump stand among the unknowns of the other program. */
const THESE = [0, 1, 6];

function agreement(record: SwingSamples, other: CurveFit): string {
  const { estimates, variances } = tellingOf(fitted(record, { stretches: 1, start: START }));
  const theirs = THESE.map((i) => ({ estimate: other.estimates[i]!, variance: other.covariance[i]![i]! }));
  const inU = Math.max(...theirs.map(({ estimate, variance }, k) => Math.abs(estimates[k]! - estimate) / Math.sqrt(variance)));
  const apart = Math.max(...theirs.map(({ variance }, k) => Math.abs(variances[k]! / variance - 1)));
  return `Of ω_n, ζ and the jump the two differ by ${inU.toExponential(1)} standard uncertainties at most, of their variances by ${apart.toExponential(1)} of themselves at most.`;
}

async function report(here: Here): Promise<readonly string[]> {
  const record = oneShot();
  const ways: readonly (readonly [string, SwingOptions])[] = [['fitSwing from the same start', { stretches: 1, start: START }], ['fitSwing, start found by itself', { stretches: 1 }], ['fitSwing, start and rest line found by itself', {}]];
  // Before the other program and after it: a machine that warms up or is shared tells on both.
  const before = ways.map(([, options]) => secondsOf(record, options));
  const other = curveFit(record, here);
  const ours = ways.map(([name, options], k): readonly [string, number] => [name, median([...before[k]!, ...secondsOf(record, options)])]);
  const theirs: readonly (readonly [string, number])[] = other === null ? [] : [[`scipy ${other.scipy} curve_fit`, median(other.seconds)], ['the same with its slopes as formulas', median(other.secondsBySlopes)]];
  const all = [...theirs, ...ours];
  const rows = all.map(([name, seconds]) => [name, (seconds / all[0]![1]).toFixed(4), (1e6 * seconds).toFixed(0)]);
  return [
    ...table(['case', 'ratio', 'median µs'], other === null ? [['no scipy here', '—', '—'], ...rows] : rows), '',
    ...(other === null ? [] : [agreement(record, other)]), `Medians of ${other === null ? '' : `${RUNS} fits of scipy, of `}${2 * RUNS} fits of ours.`,
  ];
}

export const fits: Group = { name: 'fits', title: `A fit of ${SAMPLES} samples with one shot: ω_n, ζ, a straight rest line, the start, the jump`, report };
