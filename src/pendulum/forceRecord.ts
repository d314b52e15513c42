/**
 * Impulses from the record of a hammer's force: quiet parts, pulses in order, each integrated above its own quiet level with what the noise,
 * the sampling and the ringing after the contact leave unknown.
 *
 * The integral runs from before the contact until the ringing is over. A linear sensor moves the force about in time but keeps its area, so
 * the whole answer holds the impulse, and a cut at the end of the contact keeps the first overshoot without what takes it back. The ringing's
 * own area is told beside it. Where the record sinks below its level on one side alone (a coupled amplifier letting go) or ends too soon, the contact
 * alone counts.
 */
import { median } from '../numeric/samples.ts';
import { momentsOf, type MeasuredForce } from './pulse.ts';

export interface ForcePulse {
  /** Stretch that is integrated, s. Its length is −∂I/∂(offset of the force): an offset that the quiet level does not show. */
  readonly from: number;
  readonly to: number;
  /** Maximum above the quiet level, N, and where, s. */
  readonly peak: number;
  readonly peakTime: number;
  /** The contact: from the last passage of the quiet level before the maximum to the first return to it, here its end, s. */
  readonly contactEnds: number;
  /** I, N·s, > 0 whatever the sensor's polarity; `byWhole` or `byContact`. */
  readonly impulse: number;
  readonly byWhole: number;
  readonly byContact: number;
  /** u(I) from noise with that of the quiet level, N·s: white noise, or as integrals over quiet stretches of the same length scatter where that is more. */
  readonly uNoise: number;
  /** u(I) from the spacing of the samples, N·s. */
  readonly uSampling: number;
  /** What comes after the contact above the threshold: nothing; ringing; a second contact; sinking below the level for long; the record ends in it. */
  readonly after: 'nothing' | 'ringing' | 'secondContact' | 'undershoot' | 'cutOff';
  /** Samples above half of the maximum, in one run. */
  readonly samples: number;
  /** Samples at the end of the range, where the force was larger than recorded. */
  readonly clipped: number;
  /** Of the contact: centroid, s on the record's clock, and variance of time about it, s², for the correction of a pulse that is not short. */
  readonly centroid: number;
  readonly variance: number;
}

export type ForceRecordFound =
  | {
      readonly status: 'found';
      /** −1: the sensor gives a push a negative sign. */
      readonly polarity: 1 | -1;
      /** sd of the quiet parts, N. */
      readonly noise: number;
      readonly pulses: readonly ForcePulse[];
      /** Times of single samples far off, s: interference, left out. */
      readonly spikes: readonly number[];
    }
  | { readonly status: 'tooFewSamples' | 'noPulse' | 'noQuietPart' };

/** Fewer samples are no record. */
const FEWEST_SAMPLES = 20;
/** Above this many sd of the noise the force is not quiet; a pulse reaches at least the second. */
const THRESHOLD = 5;
const LEAST_PEAK = 10;
/** Parts of the largest force in the record: below the first is quiet however little noise there is; a pulse below the second is none. */
const QUIET_PART = 2e-3;
const LEAST_PART = 1e-2;
/** Quiet samples that a level is taken from: at the least, and at the most as a multiple of the stretch that is integrated, each side. */
const FEWEST_QUIET = 8;
const QUIET_STRETCH = 10;
/** Room left before and after, as a part of the contact, and in samples: quiet samples cost a little noise and no bias. */
const ROOM = 0.25;
const LEAST_ROOM = 3;
/** Runs beyond the threshold that follow each other within this many lengths of the first are one pulse with its ringing. */
const JOINED = 2;
/** The smaller side of a ringing is at least this part of the larger, in area. */
const BOTH_SIDES = 0.2;
/** A side that stays below for this many lengths of the contact is no swing of a sensor, whose own period is short. */
const LASTING = 2;
/** Equal samples at the top that make a clipped one, and steps of the record that its shoulders then have. */
const FLAT_TOP = 3;
const SHOULDER = 3;
/** Windows from which a scatter is taken. */
const FEWEST_WINDOWS = 8;
const QUIET_ROUNDS = 8;
/** sd of a normal distribution over the median of its absolute deviations. */
const SD_OVER_MAD = 1.482602218505602;

const range = (from: number, to: number): readonly number[] => Array.from({ length: Math.max(0, to - from + 1) }, (_, i) => from + i);

interface Level {
  readonly at: (time: number) => number;
  readonly sd: number;
  /** Var of the level's integral over a stretch with ∫dt = T and mean time t, over the variance of one sample. */
  readonly share: (T: number, t: number) => number;
}

/** Straight or level line through quiet samples. */
function levelThrough({ time, force }: MeasuredForce, quiet: readonly number[], sloping: boolean): Level {
  const n = quiet.length;
  const t0 = quiet.reduce((sum, i) => sum + time[i]!, 0) / n;
  const f0 = quiet.reduce((sum, i) => sum + force[i]!, 0) / n;
  const spread = quiet.reduce((sum, i) => sum + (time[i]! - t0) ** 2, 0);
  const slope = sloping && spread > 0 ? quiet.reduce((sum, i) => sum + (time[i]! - t0) * (force[i]! - f0), 0) / spread : 0;
  const at = (t: number): number => f0 + slope * (t - t0);
  const dof = Math.max(1, n - (sloping ? 2 : 1));
  return {
    at, sd: Math.sqrt(quiet.reduce((sum, i) => sum + (force[i]! - at(time[i]!)) ** 2, 0) / dof),
    share: (T, t) => T * T * (1 / n + (sloping && spread > 0 ? (t - t0) ** 2 / spread : 0)),
  };
}

interface Quiet {
  readonly level: Level;
  readonly polarity: 1 | -1;
  readonly noise: number;
  readonly threshold: number;
  readonly largest: number;
  /** Least step of the record, N. */
  readonly step: number;
}

/** Level and noise of the whole record, from the samples that stay near a line that is found with them. null where less than a third is quiet. */
function quietOf(record: MeasuredForce): Quiet | null {
  const { time, force } = record;
  const all = range(0, force.length - 1);
  const middle = median(force);
  let noise = SD_OVER_MAD * median(force.map((f) => Math.abs(f - middle)));
  let away = force.map((f) => f - middle);
  let level: Level | null = null;
  const step = stepOf(force);
  let kept = -1;
  for (let round = 0; round < QUIET_ROUNDS; round++) {
    const threshold = Math.max(THRESHOLD * noise, QUIET_PART * Math.max(...extremes(away)));
    const quiet = all.filter((i) => Math.abs(away[i]!) <= threshold);
    if (quiet.length < Math.max(FEWEST_QUIET, all.length / 3)) return null;
    if (quiet.length === kept) break;
    kept = quiet.length;
    const line = levelThrough(record, quiet, true);
    level = line;
    away = force.map((f, i) => f - line.at(time[i]!));
    noise = SD_OVER_MAD * median(quiet.map((i) => Math.abs(away[i]!)));
    // Readings that nearly all fall on one step have no median deviation.
    noise = Math.max(noise, Math.min(line.sd, step / Math.sqrt(12)));
  }
  const [up, down] = extremes(away);
  const largest = Math.max(up, down);
  return level && { level, polarity: up >= down ? 1 : -1, noise, threshold: Math.max(THRESHOLD * noise, QUIET_PART * largest), largest, step };
}

function extremes(values: readonly number[]): readonly [up: number, down: number] {
  let [up, down] = [0, 0];
  for (const value of values) [up, down] = [Math.max(up, value), Math.max(down, -value)];
  return [up, down];
}

/** Least difference of neighbouring samples that is not zero. */
function stepOf(force: readonly number[]): number {
  let step = Infinity;
  for (let i = 1; i < force.length; i++) {
    const gap = Math.abs(force[i]! - force[i - 1]!);
    if (gap > 0 && gap < step) step = gap;
  }
  return step;
}

/** A stretch of one pulse with its ringing, in samples: first and last above the threshold; the run that holds the maximum. */
interface Cluster {
  readonly first: number;
  readonly last: number;
  readonly top: number;
  readonly lobe: readonly [number, number];
}

/** Runs of samples beyond the threshold of one sign, joined while they follow each other closely. */
function clustersOf(away: readonly number[], time: readonly number[], threshold: number): readonly Cluster[] {
  const runs: { from: number; to: number; sign: number }[] = [];
  for (const [i, value] of away.entries()) {
    const sign = value > threshold ? 1 : value < -threshold ? -1 : 0;
    const last = runs.at(-1);
    if (sign !== 0 && last && last.to === i - 1 && last.sign === sign) last.to = i;
    else if (sign !== 0) runs.push({ from: i, to: i, sign });
  }
  const found: Cluster[] = [];
  for (const run of runs) {
    const last = found.at(-1);
    const spacing = (time.at(-1)! - time[0]!) / (time.length - 1);
    const length = last ? JOINED * (time[last.lobe[1]]! - time[last.lobe[0]]!) + LEAST_ROOM * spacing : 0;
    const top = range(run.from, run.to).reduce((best, i) => (away[i]! > away[best]! ? i : best), run.from);
    if (last && time[run.from]! - time[last.last]! <= length) {
      const higher = run.sign > 0 && away[top]! > away[last.top]!;
      found[found.length - 1] = { first: last.first, last: run.to, top: higher ? top : last.top, lobe: higher ? [run.from, run.to] : last.lobe };
    } else found.push({ first: run.from, last: run.to, top, lobe: [run.from, run.to] });
  }
  return found;
}

/** Trapezoid weights of the samples from … to, s: on quiet ends it converges as fast as any rule, and takes samples as they fall. */
function weightsOf(time: readonly number[], from: number, to: number): readonly number[] {
  return range(from, to).map((i) => ((i < to ? time[i + 1]! : time[i]!) - (i > from ? time[i - 1]! : time[i]!)) / 2);
}

function clippedSamples(force: readonly number[], cluster: Cluster, fullScale: number | null, step: number): number {
  const within = range(cluster.first, cluster.last);
  if (fullScale !== null) return within.filter((i) => Math.abs(force[i]!) >= fullScale).length;
  const top = force[cluster.top]!;
  let [a, b] = [cluster.top, cluster.top];
  while (a > 0 && force[a - 1] === top) a -= 1;
  while (b < force.length - 1 && force[b + 1] === top) b += 1;
  const shoulders = [force[a - 1], force[b + 1]].every((f) => f === undefined || Math.abs(f - top) > SHOULDER * step);
  return b - a + 1 >= FLAT_TOP && shoulders ? b - a + 1 : 0;
}

/** sd of the integrals over quiet stretches of `length` samples; 0 where there are too few. */
function scatterOfWindows(away: readonly number[], time: readonly number[], isQuiet: readonly boolean[], length: number): number {
  const integrals: number[] = [];
  for (let from = 0; from + length <= away.length; ) {
    const bad = range(from, from + length - 1).findLast((i) => !isQuiet[i]);
    if (bad !== undefined) from = bad + 1;
    else {
      const weights = weightsOf(time, from, from + length - 1);
      integrals.push(weights.reduce((sum, w, i) => sum + w * away[from + i]!, 0));
      from += length;
    }
  }
  return integrals.length < FEWEST_WINDOWS ? 0 : Math.sqrt(integrals.reduce((sum, x) => sum + x * x, 0) / (integrals.length - 1));
}

/** What follows the contact at `from`, by the area of its samples beyond the threshold to either side; one side alone is sinking only where it lasts. */
function afterContact({ time, force }: MeasuredForce, weights: readonly number[], from: number, to: number, threshold: number, contact: number): ForcePulse['after'] {
  let [above, below] = [0, 0];
  for (const k of range(from, to)) {
    const area = weights[k]! * force[k]!;
    if (force[k]! > threshold) above += area;
    if (force[k]! < -threshold) below -= area;
  }
  if (above === 0 && below === 0) return 'nothing';
  if (Math.min(above, below) >= BOTH_SIDES * Math.max(above, below)) return 'ringing';
  if (above > below) return 'secondContact';
  return time[to]! - time[from]! > LASTING * contact ? 'undershoot' : 'ringing';
}

interface Bounds {
  /** Samples that belong to no other pulse, from … to. */
  readonly from: number;
  readonly to: number;
}

function pulseOf(record: MeasuredForce, cluster: Cluster, bounds: Bounds, isQuiet: readonly boolean[], { polarity, threshold, level: whole, step }: Quiet, allAway: readonly number[], fullScale: number | null): ForcePulse {
  const { time, force } = record;
  const room = Math.max(LEAST_ROOM, Math.ceil(ROOM * (cluster.lobe[1] - cluster.lobe[0] + 1)));
  const first = Math.max(bounds.from, cluster.first - room);
  const last = Math.min(bounds.to, cluster.last + room);
  const reach = QUIET_STRETCH * (last - first + 1);
  const before = range(Math.max(bounds.from, first - reach), first - 1).filter((i) => isQuiet[i]);
  const after = range(last + 1, Math.min(bounds.to, last + reach)).filter((i) => isQuiet[i]);
  const near = [...before, ...after];
  // One side alone cannot tell a slope across the pulse.
  const bothSides = Math.min(before.length, after.length) >= FEWEST_QUIET;
  const level = near.length >= FEWEST_QUIET ? levelThrough(record, near, bothSides) : whole;
  // From here on the stretch alone, above its level, a push positive.
  const stretch: MeasuredForce = { time: time.slice(first, last + 1), force: range(first, last).map((i) => polarity * (force[i]! - level.at(time[i]!))) };
  const { time: t, force: f } = stretch;
  const weights = weightsOf(t, 0, t.length - 1);
  const sum = (keep: (k: number) => boolean): number => weights.reduce((total, w, k) => (keep(k) ? total + w * f[k]! : total), 0);
  const byWhole = sum(() => true);

  const top = cluster.top - first;
  const below = f.findIndex((value, k) => k > top && value <= 0);
  const isBack = below > top;
  const contactEnds = isBack ? t[below - 1]! + ((t[below]! - t[below - 1]!) * f[below - 1]!) / (f[below - 1]! - f[below]!) : t.at(-1)!;
  const begin = Math.max(0, f.findLastIndex((value, k) => k < top && value <= 0));
  const upTo = isBack ? below : t.length;
  // Nothing but push, so that its moments are those of a pulse.
  const push: MeasuredForce = { time: t.slice(begin, upTo), force: f.slice(begin, upTo).map((value) => Math.max(0, value)) };
  const { impulse: byContact, centroid, variance } = momentsOf(isBack && contactEnds > t[below - 1]! ? { time: [...push.time, contactEnds], force: [...push.force, 0] } : push);

  const isCut = cluster.last >= force.length - 2 || cluster.first <= 1;
  const kind = isCut ? 'cutOff' : afterContact(stretch, weights, isBack ? below : t.length - 1, cluster.last - first, threshold, contactEnds - time[cluster.lobe[0]]!);
  const [T, mid] = [t.at(-1)! - t[0]!, (t.at(-1)! + t[0]!) / 2];
  const white = level.sd * Math.sqrt(weights.reduce((total, w) => total + w * w, 0) + level.share(T, mid));
  let [a, b] = [top, top];
  while (a > 0 && f[a - 1]! > f[top]! / 2) a -= 1;
  while (b < f.length - 1 && f[b + 1]! > f[top]! / 2) b += 1;
  return {
    from: t[0]!, to: t.at(-1)!, peak: f[top]!, peakTime: t[top]!, contactEnds,
    impulse: kind === 'undershoot' || kind === 'cutOff' ? byContact : byWhole, byWhole, byContact,
    uNoise: Math.max(white, scatterOfWindows(allAway, time, isQuiet, t.length)), uSampling: Math.abs(sum((k) => k % 2 === 0) - sum((k) => k % 2 === 1)) / 4,
    after: kind, samples: b - a + 1, clipped: clippedSamples(force, cluster, fullScale, step), centroid: t[begin]! + centroid, variance,
  };
}

/**
 * The pulses of a record in order of time, each with its impulse.
 *
 * Quiet: within 5 sd of the noise about a straight line through what is quiet. The level under a pulse is a straight line through the quiet
 * samples on both of its sides, which also takes off what a coupled amplifier loses within the pulse, to first order. I by the trapezoid rule:
 * for smooth pulses it is exact to all orders between quiet ends, which Simpson's is not. u of sampling: half the difference of the rule on even and on odd
 * samples, over four; the rms over where the samples fall, for a pulse that sets in and ends with a bend (derived for the half-sine).
 *
 * Symbols: time in s, rising; force in N. fullScale, N: the largest force that can be recorded; null: clipping is told by a flat top.
 * 'noQuietPart': less than a third of the record is quiet. Source: derived; methods 1.10.
 * @throws RangeError where times do not rise or a number is not finite
 */
export function pulsesOfRecord(record: MeasuredForce, fullScale: number | null = null): ForceRecordFound {
  const { time, force } = record;
  if (time.length < FEWEST_SAMPLES) return { status: 'tooFewSamples' };
  if (force.length !== time.length || !force.every(Number.isFinite) || !time.every((t, i) => Number.isFinite(t) && (i === 0 || t > time[i - 1]!))) throw new RangeError('force record: finite samples at rising times are needed');
  const quiet = quietOf(record);
  if (quiet === null) return { status: 'noQuietPart' };
  const { level, polarity, noise, threshold, largest } = quiet;
  const away = force.map((f, i) => polarity * (f - level.at(time[i]!)));
  const clusters = clustersOf(away, time, threshold);
  const isQuiet = away.map((value) => Math.abs(value) <= threshold);
  for (const { first, last, lobe } of clusters) {
    const room = Math.max(LEAST_ROOM, Math.ceil(ROOM * (lobe[1] - lobe[0] + 1)));
    for (const i of range(Math.max(0, first - room), Math.min(force.length - 1, last + room))) isQuiet[i] = false;
  }
  const high = clusters.filter(({ top }) => away[top]! > Math.max(LEAST_PEAK * noise, LEAST_PART * largest));
  const isSpike = ({ first, last }: Cluster): boolean => first === last;
  const pulses = high.filter((cluster) => !isSpike(cluster));
  if (pulses.length === 0) return { status: 'noPulse' };
  return {
    status: 'found', polarity, noise,
    spikes: high.filter(isSpike).map(({ top }) => time[top]!),
    pulses: pulses.map((cluster, k) => {
      const bounds = { from: k === 0 ? 0 : pulses[k - 1]!.last + 1, to: k === pulses.length - 1 ? force.length - 1 : pulses[k + 1]!.first - 1 };
      return pulseOf(record, cluster, bounds, isQuiet, quiet, away, fullScale);
    }),
  };
}
