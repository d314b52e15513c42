/** What the same fit makes of stretches in which nothing was fired: the scatter of jumps that are none. */
import { fitSwing } from './swingFit.ts';
import { firstAtOrAfter, type Oscillation, type SwingSamples } from './swingSums.ts';

export interface NoFire {
  /** Jumps at times at which nothing happened, unit of x, and the u of each with white noise of 1. */
  readonly jumps: readonly number[];
  readonly units: readonly number[];
  /** √(Σ J²/n): the mean of no jump is known to be 0, so that n are its degrees of freedom. */
  readonly sd: number;
}

/** Periods between the times that are looked at, and from the ends of a stretch: so many where it is long enough, and no fewer than the least. */
const APART = 5;
const LEAST_APART = 1.5;
const MOST_JUMPS = 60;
const MOST_SAMPLES = 200_000;
/** Fewer jumps say too little of their scatter. */
const FEWEST = 4;
/** Parts of a stretch with so many times each are fitted by themselves, on a rest line that is straight over it. */
const TIMES_A_PART = 4;

interface Span {
  readonly from: number;
  readonly to: number;
}

interface Part extends Span {
  /** s. */
  readonly apart: number;
}

/** Parts long enough for a time with its surroundings, in order. */
function partsOf(quiet: readonly Span[], period: number): readonly Part[] {
  return quiet.flatMap(({ from, to }): readonly Part[] => {
    const apart = Math.min(APART * period, (to - from) / 2);
    if (apart < LEAST_APART * period) return [];
    const many = Math.max(1, Math.floor((to - from) / ((TIMES_A_PART + 1) * apart)));
    return Array.from({ length: many }, (_, k) => ({ from: from + ((to - from) * k) / many, to: from + ((to - from) * (k + 1)) / many, apart }));
  });
}

/** Evenly some of the parts, so that there are neither too many jumps nor too many samples. */
function some(parts: readonly Part[], perSecond: number): readonly Part[] {
  const bySamples = Math.floor(MOST_SAMPLES / Math.max(1, ...parts.map(({ from, to }) => (to - from) * perSecond)));
  const most = Math.max(1, Math.min(Math.ceil(MOST_JUMPS / TIMES_A_PART), bySamples));
  return parts.length <= most ? parts : Array.from({ length: most }, (_, k) => parts[Math.floor(((k + 0.5) * parts.length) / most)]!);
}

/**
 * Jumps fitted at times at which nothing was fired, some natural periods apart, at the given ω_n and ζ; null where there are fewer than four.
 *
 * Valid: `quiet` without a strike in it. Source: blank measurements of ISO 11843-1 and Currie, Anal. Chem. 40 (1968) 586, from memory.
 */
export function noFireJumps({ t, x, use }: SwingSamples, oscillation: Oscillation, quiet: readonly Span[], exposure = 0): NoFire | null {
  const period = (2 * Math.PI) / oscillation.frequency;
  const span = t[t.length - 1]! - t[0]!;
  const jumps: number[] = [];
  const units: number[] = [];
  for (const { from, to, apart } of some(partsOf(quiet, period), t.length / span)) {
    const [first, last] = [firstAtOrAfter(t, from, 0), firstAtOrAfter(t, to, 0)];
    const times: number[] = [];
    for (let time = from + apart; time <= to - 0.999 * apart; time += apart) times.push(time);
    const fit = fitSwing({ t: t.subarray(first, last), x: x.subarray(first, last), ...(use ? { use: use.subarray(first, last) } : {}) }, times, { fixed: oscillation, exposure, stretches: 1 });
    if (fit.status !== 'fitted') continue;
    jumps.push(...fit.jumps);
    units.push(...fit.jumps.map((_, k) => Math.sqrt(fit.noiseCovariance(k, k))));
  }
  return jumps.length < FEWEST ? null : { jumps, units, sd: Math.sqrt(jumps.reduce((sum, jump) => sum + jump * jump, 0) / jumps.length) };
}
