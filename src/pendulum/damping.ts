/** Viscous damping: the first swing's correction, log decrement and ratio, and the ratio from successive turning points. */
import { rootBetween } from '../numeric/roots.ts';
import { nextTurningPoint, peakTimeOfSmall } from './launch.ts';

/**
 * First-peak damping correction of the small swing: D = θ′(0⁺)/(ω_n θ_p) = exp[ζ arccos ζ/√(1 − ζ²)], with arccosh above critical.
 *
 * Valid: ζ ≥ 0 (down to −0.5 for half-differences about 0). D = 1 at ζ = 0, e at ζ = 1. Source: derived; methods 1.3 (ODE-checked).
 */
export function dampingFactor(dampingRatio: number): number {
  if (!(dampingRatio > -0.5)) throw new RangeError(`damping factor: damping ratio ${dampingRatio} is far below 0`);
  return Math.exp(dampingRatio * peakTimeOfSmall(dampingRatio));
}

/**
 * Log decrement per full cycle: δ = 2πζ/√(1 − ζ²).
 *
 * Valid: 0 ≤ ζ < 1. Source: any vibration handbook (Harris, from memory).
 */
export function decrementOfRatio(dampingRatio: number): number {
  if (!(dampingRatio >= 0 && dampingRatio < 1)) throw new RangeError(`log decrement: damping ratio ${dampingRatio} is not in 0 … 1`);
  return (2 * Math.PI * dampingRatio) / Math.sqrt(1 - dampingRatio * dampingRatio);
}

/** Damping ratio: ζ = δ/√(4π² + δ²). Valid: δ ≥ 0. Source: as decrementOfRatio. */
export function ratioOfDecrement(logDecrement: number): number {
  if (!(logDecrement >= 0)) throw new RangeError(`damping ratio: log decrement ${logDecrement} is negative`);
  return logDecrement / Math.hypot(2 * Math.PI, logDecrement);
}

/** The least ω_n t_p that is looked for: ζ some 10⁷. */
const LEAST_PEAK_TIME = 1e-6;

/**
 * Damping ratio from the time of the first maximum, ω_n t_p: t_p = arccos ζ/(ω_n √(1 − ζ²)), arccosh ζ/(ω_n √(ζ² − 1)) above critical.
 *
 * It falls all the way, so that it tells every damping; weak damping least well, ∂ζ/∂(ω_n t_p) = −1 at ζ = 0.
 * Valid: 1e-6 < ω_n t_p ≤ π/2 (ζ from 0; a little longer, to ζ = −0.5, for half-differences). Source: inverse of peakTimeOfSmall, methods 1.3.
 * @throws RangeError outside.
 */
export function ratioOfPeakTime(peakTime: number): number {
  if (!(peakTime > LEAST_PEAK_TIME)) throw new RangeError(`damping ratio: ω_n t_p ${peakTime} is not above ${LEAST_PEAK_TIME}`);
  let above = 1;
  while (peakTimeOfSmall(above) > peakTime) above *= 2;
  const found = rootBetween((ratio) => peakTimeOfSmall(ratio) - peakTime, above === 1 ? -0.5 : above / 2, above);
  if (found.status !== 'found') throw new RangeError(`damping ratio: ω_n t_p ${peakTime} is that of no damped swing`);
  return found.x;
}

/** q = e^{−δ/2}: half a cycle's decay of the amplitude, viscous; 0 where it is damped critically or more and has no other side. Valid: ζ > −1 (below 0 for half-differences). */
export const ratioToHalfDecay = ({ ratio }: Readonly<Record<'ratio', number>>): number => (ratio >= 1 ? 0 : Math.exp((-Math.PI * ratio) / Math.sqrt(1 - ratio * ratio)));

/**
 * Logarithmic decrement per cycle from two swings on one side: δ = ln(x₀/x_n)/n.
 *
 * Valid: viscous damping, both amplitudes from the same rest, n full cycles, x₀ and x_n of one sign.
 * @throws RangeError where an amplitude or the cycle count is out of its range.
 */
export function logDecrement(firstAmplitude: number, laterAmplitude: number, cycles: number): number {
  if (!(firstAmplitude * laterAmplitude > 0 && cycles > 0)) throw new RangeError('log decrement: amplitudes of one sign and a positive cycle count are needed');
  return Math.log(firstAmplitude / laterAmplitude) / cycles;
}

/** Rest position and half-cycle decay from three successive turning points, exact for viscous decay (methods 1.4). */
export function restFromThree(x0: number, x1: number, x2: number): { readonly rest: number; readonly halfDecrement: number } {
  const spread = x0 + x2 - 2 * x1;
  const ratio = (x0 - x1) / (x2 - x1);
  if (!(ratio > 0 && ratio < Infinity)) throw new RangeError('rest from three turning points: they do not alternate');
  return { rest: (x0 * x2 - x1 * x1) / spread, halfDecrement: Math.log(ratio) };
}

/** One turning point of a free swing: its number (0 the first swing, 1 the return swing, …) and its angle from the scale's mark, rad. */
export interface TurningPoint {
  readonly number: number;
  readonly angle: number;
}

export interface RatioFromSwings {
  readonly status: 'found' | 'tooFew' | 'notDecaying' | 'noLimit';
  readonly dampingRatio: number;
  /** Rest angle and first amplitude as fitted, rad. */
  readonly rest: number;
  readonly amplitude: number;
  /** ∂ζ/∂(reading) in the order: rest (where given), then the turning points. 1/rad. */
  readonly sensitivities: readonly number[];
}

const ROUNDS = 60;
/** Change of δ/2 and of the amplitude (as a share) between two rounds; above the rounding of n_k, and each round takes off a factor ζ θ². */
const SETTLED = 1e-11;

/**
 * Damping ratio from successive turning points of one swing, least squares in rest, amplitude and decay, with the
 * full pendulum: each turning point follows from the one before by the equation of motion.
 *
 * The small swing's law |A_k| = A e^{−kδ/2} is fitted with the count k of half cycles replaced by the full pendulum's
 * n_k = Σ ln|θ_j/θ_{j+1}|/(δ/2), which is k(1 + O(θ²)) and hardly depends on δ; n_k is computed from the present fit
 * until nothing changes. Sensitivities hold n_k fixed, which leaves out a part O(ζ θ²) of them.
 *
 * Valid: at least two turning points in the order of their numbers and a rest reading, or three turning points not all of
 * one side; ζ < 1. Where turning points are missing and no rest was read, two ratios may fit (numbers 0, 1, 3: e^{−δ/2} and
 * 1 − e^{−δ/2}); the one found is that of the lighter damping.
 */
export function ratioFromSwings(rest: number | null, points: readonly TurningPoint[], gravityShare: number): RatioFromSwings {
  const failed = (status: RatioFromSwings['status']): RatioFromSwings => ({ status, dampingRatio: 0, rest: 0, amplitude: 0, sensitivities: [] });
  if (points.length < 2 || (rest === null && (points.length < 3 || !closestOpposite(points)))) return failed('tooFew');
  const last = points[points.length - 1]!.number;
  let counts: readonly number[] = Array.from({ length: last + 1 }, (_, k) => k);
  let fit = startOfFit(rest, points);
  if (!fit) return failed('notDecaying');
  for (let round = 0; round < ROUNDS; round++) {
    const next = fitGeometric(rest, points, counts, fit);
    if (!next) return failed('notDecaying');
    const change = Math.abs(next.decay - fit.decay) + Math.abs(next.amplitude - fit.amplitude) / Math.abs(next.amplitude);
    fit = next;
    if (!(Math.abs(fit.amplitude) < Math.PI)) return failed('notDecaying');
    counts = halfCyclesOfFullPendulum(fit.amplitude, ratioOfSignedDecrement(2 * fit.decay), gravityShare, last);
    if (round > 0 && change < SETTLED) {
      const slope = slopeOfRatio(2 * fit.decay) * 2;
      return {
        status: 'found',
        dampingRatio: ratioOfSignedDecrement(2 * fit.decay),
        rest: fit.rest,
        amplitude: fit.amplitude,
        sensitivities: fit.decaySensitivities.map((c) => c * slope),
      };
    }
  }
  return failed('noLimit');
}

/** Noise can make a swing seem to grow; the estimate stays signed, so that a mean of many is not biased. */
const ratioOfSignedDecrement = (delta: number): number => delta / Math.hypot(2 * Math.PI, delta);
const slopeOfRatio = (delta: number): number => (4 * Math.PI ** 2) / (4 * Math.PI ** 2 + delta * delta) ** 1.5;

interface Fit {
  readonly rest: number;
  readonly amplitude: number;
  /** −ln q = δ/2. */
  readonly decay: number;
  readonly decaySensitivities: readonly number[];
}

/** Rounds that bring the rest of a swing with missing turning points from halfway to where the decay puts it. */
const ROUNDS_OF_START = 20;

function startOfFit(rest: number | null, points: readonly TurningPoint[]): Fit | null {
  if (rest !== null) return startAbout(rest, points);
  const [a, b, c] = [points[0]!, points[1]!, points[2]!];
  if (b.number === a.number + 1 && c.number === a.number + 2) {
    const ratio = (a.angle - b.angle) / (c.angle - b.angle);
    return ratio > 0 && ratio < Infinity ? startAbout(restFromThree(a.angle, b.angle, c.angle).rest, points) : null;
  }
  const [near, far] = closestOpposite(points)!;
  let left = 1;
  let start: Fit | null = null;
  for (let i = 0; i < ROUNDS_OF_START; i++) {
    start = startAbout((far.angle + left * near.angle) / (1 + left), points);
    if (!start) return null;
    left = Math.exp(-start.decay * (far.number - near.number));
  }
  return start;
}

/** The two turning points of opposite sides that lie the fewest half cycles apart; null where all are of one side. */
function closestOpposite(points: readonly TurningPoint[]): readonly [TurningPoint, TurningPoint] | null {
  let best: readonly [TurningPoint, TurningPoint] | null = null;
  for (const [i, a] of points.entries()) {
    const b = points.find((point, j) => j > i && (point.number - a.number) % 2 !== 0);
    if (b && (!best || b.number - a.number < best[1].number - best[0].number)) best = [a, b];
  }
  return best;
}

function startAbout(rest: number, points: readonly TurningPoint[]): Fit | null {
  const a = points[0]!;
  const first = a.angle - rest;
  const fallen = (point: TurningPoint): number => ((point.angle - rest) / first) * ((point.number - a.number) % 2 === 0 ? 1 : -1);
  // The last point not yet fallen below a third tells the decay best (methods 1.4); later ones may be lost in the readings' scatter.
  const far = points.findLast((point, i) => i > 0 && fallen(point) > 1 / 3) ?? points[1]!;
  if (!(fallen(far) > 0)) return null;
  const decay = -Math.log(fallen(far)) / (far.number - a.number);
  return { rest, amplitude: first * Math.exp(decay * a.number), decay, decaySensitivities: [] };
}

/** Gauss–Newton in (rest, amplitude, decay) with the counts of half cycles held. */
function fitGeometric(rest: number | null, points: readonly TurningPoint[], counts: readonly number[], start: Fit): Fit | null {
  let z = start.rest;
  let amplitude = start.amplitude;
  let decay = start.decay;
  for (let i = 0; i < ROUNDS; i++) {
    const normal = new Normal();
    const rows: (readonly [number, number, number])[] = [];
    if (rest !== null) {
      rows.push([1, 0, 0]);
      normal.add(1, 0, 0, rest - z);
    }
    for (const point of points) {
      const shape = (point.number % 2 === 0 ? 1 : -1) * Math.exp(-decay * counts[point.number]!);
      const row = [1, shape, -counts[point.number]! * amplitude * shape] as const;
      rows.push(row);
      normal.add(...row, point.angle - z - amplitude * shape);
    }
    const inverse = normal.inverse();
    if (!inverse) return null;
    const step = inverse.times(normal.right);
    z += step[0];
    amplitude += step[1];
    decay += step[2];
    if (!Number.isFinite(decay) || Math.abs(decay) > 20) return null;
    if (Math.abs(step[2]) < 1e-15 + 1e-14 * Math.abs(decay) || i === ROUNDS - 1) {
      return { rest: z, amplitude, decay, decaySensitivities: rows.map((row) => inverse.times(row)[2]) };
    }
  }
  return null;
}

/** Normal equations of three unknowns; well enough conditioned here, since the columns are scaled before solving. */
class Normal {
  private readonly m = [0, 0, 0, 0, 0, 0];
  readonly right: [number, number, number] = [0, 0, 0];

  add(a: number, b: number, c: number, residual: number): void {
    const m = this.m;
    m[0]! += a * a; m[1]! += a * b; m[2]! += a * c; m[3]! += b * b; m[4]! += b * c; m[5]! += c * c;
    this.right[0] += a * residual;
    this.right[1] += b * residual;
    this.right[2] += c * residual;
  }

  inverse(): { times(v: readonly [number, number, number]): [number, number, number] } | null {
    const [a, b, c, d, e, f] = this.m as [number, number, number, number, number, number];
    const s = [1 / Math.sqrt(a), 1 / Math.sqrt(d), 1 / Math.sqrt(f)] as const;
    const [rb, rc, re] = [b * s[0] * s[1], c * s[0] * s[2], e * s[1] * s[2]];
    const det = 1 + 2 * rb * rc * re - rb * rb - rc * rc - re * re;
    if (!(det > 1e-13)) return null;
    const i = [1 - re * re, rc * re - rb, rb * re - rc, 1 - rc * rc, rb * rc - re, 1 - rb * rb].map((x) => x / det) as [number, number, number, number, number, number];
    return {
      times: (v) => {
        const w = [v[0] * s[0], v[1] * s[1], v[2] * s[2]] as const;
        return [
          s[0] * (i[0] * w[0] + i[1] * w[1] + i[2] * w[2]),
          s[1] * (i[1] * w[0] + i[3] * w[1] + i[4] * w[2]),
          s[2] * (i[2] * w[0] + i[4] * w[1] + i[5] * w[2]),
        ];
      },
    };
  }
}

/** Below this ratio n_k is that of this ratio: what it changes stays below 1e-10 of ζ, while its rounding would grow as 1/ζ. */
const LEAST_RATIO_FOLLOWED = 1e-5;
const LARGEST_RATIO_FOLLOWED = 0.999;

/** n_k = Σ ln|θ_j/θ_{j+1}|/(δ/2), k = 0 … last: the half cycles of a small swing that decay as much as k of the full pendulum. */
function halfCyclesOfFullPendulum(amplitude: number, dampingRatio: number, gravityShare: number, last: number): readonly number[] {
  const ratio = Math.min(Math.max(dampingRatio, LEAST_RATIO_FOLLOWED), LARGEST_RATIO_FOLLOWED);
  const perHalfCycle = decrementOfRatio(ratio) / 2;
  const counts = [0];
  let angle = amplitude;
  for (let k = 0; k < last; k++) {
    const next = nextTurningPoint(angle, ratio, gravityShare);
    counts.push(counts[k]! + Math.log(-angle / next) / perHalfCycle);
    angle = next;
  }
  return counts;
}
