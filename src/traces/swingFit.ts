/** One sampled record of a pendulum that is struck at known times: its frequency and damping, every jump, and what noise and both leave unknown. */
import { solveStruck, type Oscillation, type Samples, type StruckFit } from '../numeric/dampedJumps.ts';

export interface SwingFit extends Oscillation {
  readonly status: 'fitted';
  readonly linear: StruckFit;
  /** sd of the residuals. */
  readonly noise: number;
  /** Power of the residuals at the swing's frequency over that of white noise as strong: variances of what swings are widened by it. */
  readonly colour: number;
  /** Covariance of (ω_n, ζ). */
  readonly covariance: readonly [number, number, number];
  /** ∂jump/∂ω_n and ∂jump/∂ζ. */
  readonly byFrequency: readonly number[];
  readonly byRatio: readonly number[];
  /** Steps of position at the events over their u; a swing has none. */
  readonly stepsInU: readonly number[];
}

export type SwingFitResult = SwingFit | { readonly status: 'tooFewSamples' | 'noSwing' | 'notTold' };

const ROUNDS = 40;
const SETTLED = 1e-10;
/** Fewer zero crossings are no swing. */
const FEWEST_CROSSINGS = 3;
const START_RATIOS = [0.001, 0.01, 0.05, 0.2] as const;
/** Frequencies tried about the one that the crossings tell, as a part of it. */
const START_SPREAD = [0.8, 0.9, 0.95, 0.98, 1, 1.02, 1.05, 1.1, 1.25] as const;
const STEP = 1e-6;

/** ω from the crossings of the mean, in the longest stretch between events: robust against drift, rough. */
function roughFrequency({ t, x }: Samples, events: readonly number[]): number | null {
  const bounds = [t[0]!, ...events, t[t.length - 1]!];
  let best: readonly [number, number] = [t[0]!, t[t.length - 1]!];
  for (let k = 1; k < bounds.length; k++) if (k === 1 || bounds[k]! - bounds[k - 1]! > best[1] - best[0]) best = [bounds[k - 1]!, bounds[k]!];
  const inside: number[] = [];
  for (let i = 0; i < t.length; i++) if (t[i]! >= best[0] && t[i]! <= best[1]) inside.push(i);
  const mean = inside.reduce((sum, i) => sum + x[i]!, 0) / inside.length;
  const sd = Math.sqrt(inside.reduce((sum, i) => sum + (x[i]! - mean) ** 2, 0) / inside.length);
  const crossings: number[] = [];
  let side = 0;
  for (const i of inside) {
    const away = x[i]! - mean;
    // Noise about the mean crosses it many times: only beyond half an sd does the side count.
    if (Math.abs(away) < sd / 2) continue;
    if (side !== 0 && Math.sign(away) !== side) crossings.push(t[i]!);
    side = Math.sign(away);
  }
  return crossings.length < FEWEST_CROSSINGS ? null : (Math.PI * (crossings.length - 1)) / (crossings.at(-1)! - crossings[0]!);
}

/** Spectral power of the residuals at ω over their variance × spacing, by a Bartlett window of three periods; 1 where it cannot be told from white. */
function colourOf(residuals: Float64Array, t: ArrayLike<number>, frequency: number): number {
  const n = residuals.length;
  const spacing = (t[n - 1]! - t[0]!) / (n - 1);
  const lags = Math.min(Math.floor(n / 5), Math.ceil((3 * 2 * Math.PI) / (frequency * spacing)));
  let variance = 0;
  for (const r of residuals) variance += r * r;
  if (variance === 0 || lags < 2) return 1;
  let sum = 1;
  for (let k = 1; k <= lags; k++) {
    let c = 0;
    for (let i = k; i < n; i++) c += residuals[i]! * residuals[i - k]!;
    sum += 2 * (1 - k / (lags + 1)) * (c / variance) * Math.cos(frequency * k * spacing);
  }
  const sd = Math.sqrt((4 * lags) / (3 * n));
  return Math.abs(sum - 1) < 2 * sd ? 1 : Math.max(sum, 0.1);
}

/**
 * ω_n and ζ by variable projection: at each pair the rest, the start and the jumps are solved exactly, and Gauss–Newton steps lower the sum of squares.
 *
 * Valid: viscous damping, small swings, events given. Jumps are in the unit of x, over ω_n.
 * Source: Golub & Pereyra, SIAM J. Numer. Anal. 10 (1973) 413, from memory; covariance of the jumps with that of ω_n and ζ added through their slopes.
 */
export function fitSwing(samples: Samples, events: readonly number[]): SwingFitResult {
  const rough = roughFrequency(samples, events);
  if (rough === null) return { status: 'noSwing' };
  const at = (o: Oscillation): StruckFit | null => {
    if (!(o.frequency > 0 && o.ratio >= 0 && o.ratio < 1)) return null;
    const fit = solveStruck(samples, events, o);
    return fit.status === 'solved' ? fit : null;
  };
  let best: { readonly o: Oscillation; readonly fit: StruckFit } | null = null;
  for (const spread of START_SPREAD) for (const ratio of START_RATIOS) {
    const o = { frequency: rough * spread, ratio };
    const fit = at(o);
    if (fit && (best === null || fit.sumOfSquares < best.fit.sumOfSquares)) best = { o, fit };
  }
  if (best === null) return { status: samples.t.length < 10 + events.length ? 'tooFewSamples' : 'notTold' };
  for (let round = 0; round < ROUNDS; round++) {
    const slopes = slopesAt(best, at);
    if (!slopes) return { status: 'notTold' };
    const { gram, gradient } = slopes;
    const det = gram[0] * gram[2] - gram[1] ** 2;
    const [dw, dz] = [-(gram[2] * gradient[0] - gram[1] * gradient[1]) / det, -(gram[0] * gradient[1] - gram[1] * gradient[0]) / det];
    let taken = false;
    for (let factor = 1; factor > 1e-4 && !taken; factor /= 2) {
      const o: Oscillation = { frequency: best.o.frequency + factor * dw, ratio: Math.max(0, best.o.ratio + factor * dz) };
      const fit = at(o);
      if (fit && fit.sumOfSquares <= best.fit.sumOfSquares) {
        best = { o, fit };
        taken = true;
      }
    }
    if (!taken || Math.abs(dw) < SETTLED * best.o.frequency) break;
  }
  return described(samples, events, best, at);
}

interface Place {
  readonly o: Oscillation;
  readonly fit: StruckFit;
}

/** JᵀJ and Jᵀr of the reduced residuals in (ω, ζ), by central differences, and the slopes of the jumps. */
function slopesAt({ o, fit }: Place, at: (o: Oscillation) => StruckFit | null) {
  const [hw, hz] = [STEP * o.frequency, STEP];
  const pairs = [[at({ ...o, frequency: o.frequency + hw }), at({ ...o, frequency: o.frequency - hw }), 2 * hw], [at({ ...o, ratio: o.ratio + hz }), at({ ...o, ratio: Math.max(0, o.ratio - hz) }), hz + Math.min(hz, o.ratio)]] as const;
  const columns = pairs.map(([above, below, span]) => {
    if (!above || !below) return null;
    return { r: above.residuals.map((value, i) => (value - below.residuals[i]!) / span), jumps: above.jumps.map((value, k) => (value - below.jumps[k]!) / span) };
  });
  const [w, z] = columns;
  if (!w || !z) return null;
  const gram: [number, number, number] = [0, 0, 0];
  const gradient: [number, number] = [0, 0];
  for (let i = 0; i < fit.residuals.length; i++) {
    gram[0] += w.r[i]! ** 2;
    gram[1] += w.r[i]! * z.r[i]!;
    gram[2] += z.r[i]! ** 2;
    gradient[0] += w.r[i]! * fit.residuals[i]!;
    gradient[1] += z.r[i]! * fit.residuals[i]!;
  }
  return { gram, gradient, byFrequency: w.jumps, byRatio: z.jumps };
}

function described(samples: Samples, events: readonly number[], best: Place, at: (o: Oscillation) => StruckFit | null): SwingFitResult {
  const slopes = slopesAt(best, at);
  if (!slopes) return { status: 'notTold' };
  const { gram } = slopes;
  const det = gram[0] * gram[2] - gram[1] ** 2;
  const noise = Math.sqrt(best.fit.sumOfSquares / Math.max(1, best.fit.dof - 2));
  const colour = colourOf(best.fit.residuals, samples.t, best.o.frequency);
  const variance = noise * noise * colour;
  const stepped = solveStruck(samples, events, best.o, true);
  return {
    ...best.o, status: 'fitted', linear: best.fit, noise, colour, covariance: [(variance * gram[2]) / det, (-variance * gram[1]) / det, (variance * gram[0]) / det],
    byFrequency: slopes.byFrequency, byRatio: slopes.byRatio,
    stepsInU: stepped.status !== 'solved' ? events.map(() => 0) : stepped.steps.map((step, k) => {
      // By what is left with the steps free: a step that is there would else widen its own u.
      const left = (stepped.sumOfSquares / Math.max(1, stepped.dof - 2)) * colourOf(stepped.residuals, samples.t, best.o.frequency);
      const u = Math.sqrt(left * stepped.inverse[stepped.columnOfStep(k)]![stepped.columnOfStep(k)]!);
      return u === 0 ? 0 : step / u;
    }),
  };
}
