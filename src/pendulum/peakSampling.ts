/** What a camera or a slow sampler does to a first maximum: the frame that misses it, the parabola through three, the exposure. */

/** Below this ω Δt the closed form of the deviation cancels; its series serves. */
const SMALL_STEP = 0.05;

function checkStep(step: number): void {
  if (!(step > 0 && step <= Math.PI)) throw new RangeError(`frames: ω Δt ${step} is not in 0 … π`);
}

/**
 * What an exposure of t_e leaves of every deflection of a sinusoidal swing: sin(x/2)/(x/2), x = ω t_e. The time is that of mid-exposure.
 *
 * Valid: 0 ≤ x < 2π (beyond, the image turns over). Source: mean of a sine over the exposure; methods 1.17.
 * @throws RangeError outside.
 */
export function exposureFactor(angle: number): number {
  if (!(angle >= 0 && angle < 2 * Math.PI)) throw new RangeError(`exposure: ω t_e ${angle} is not in 0 … 2π`);
  const half = angle / 2;
  return half < 1e-4 ? 1 - (half * half) / 6 : Math.sin(half) / half;
}

/** Length of the blur at mid-swing, A ω t_e, in the unit of the amplitude; nil at the peak. */
export const blurLength = ({ amplitude, naturalFrequency, exposure }: Readonly<Record<'amplitude' | 'naturalFrequency' | 'exposure', number>>): number =>
  Math.abs(amplitude) * naturalFrequency * exposure;

/** Deviations of a peak as read, as shares of the amplitude; negative: too low. */
export interface PeakReadLow {
  readonly worst: number;
  /** Mean over all positions of the frames: a bias, common to the shots of one frame rate. */
  readonly mean: number;
  /** Standard deviation over them, random per shot. */
  readonly deviation: number;
}

/**
 * The highest frame taken as the peak, frames Δt apart, x = ω Δt: worst −(1 − cos(x/2)); mean sinc(x/2) − 1 ≈ −x²/24;
 * deviation √[½ + sin x/(2x) − sinc²(x/2)] ≈ x²/√720.
 *
 * Valid: 0 < x ≤ π; little damping within a frame. Source: methods 1.17, derived (uniform phase).
 */
export function missedPeak(step: number): PeakReadLow {
  checkStep(step);
  const half = step / 2;
  const sinc = Math.sin(half) / half;
  const square = step * step;
  const mean = step < SMALL_STEP ? -(square / 24) * (1 - square / 80) : sinc - 1;
  // Variance x⁴/720 − x⁶/20160 + …
  const variance = step < SMALL_STEP ? (square * square * (1 - square / 28)) / 720 : 0.5 + Math.sin(step) / (2 * step) - sinc * sinc;
  return { worst: -2 * Math.sin(half / 2) ** 2, mean, deviation: Math.sqrt(variance) };
}

export interface ParabolaPeak {
  readonly peak: number;
  /** From the middle frame, in frames: −½ … ½ where the middle one is the highest. */
  readonly offset: number;
  /** ∂peak/∂(each reading); their root sum of squares is 0.85 … 1, the part of one frame's noise that the peak takes. */
  readonly weights: readonly [number, number, number];
}

/**
 * Vertex of the parabola through three equally spaced readings: d = (y₋ − y₊)/[2(y₋ − 2y₀ + y₊)], peak = y₀ − (y₋ − y₊) d/4.
 *
 * Valid: a curved triple. For a maximum or a minimum alike.
 * Source: J. O. Smith, Spectral Audio Signal Processing (from memory); methods 1.17. The weights are the parabola's own at its vertex.
 * @throws RangeError where the three lie on a straight line.
 */
export function parabolaPeak(before: number, middle: number, after: number): ParabolaPeak {
  const bend = before - 2 * middle + after;
  if (!(bend !== 0 && Number.isFinite(bend))) throw new RangeError('parabola: the three readings have no vertex');
  const d = (before - after) / (2 * bend);
  return { peak: middle - ((before - after) * d) / 4, offset: d, weights: [(d * (d - 1)) / 2, 1 - d * d, (d * (d + 1)) / 2] };
}

/** Peak of the parabola on a unit cosine whose top is a share `offset` of a frame from the middle one. */
const parabolaOnCosine = (step: number, offset: number): number =>
  parabolaPeak(Math.cos(step * (1 + offset)), Math.cos(step * offset), Math.cos(step * (1 - offset))).peak;

const POSITIONS = 64;

/**
 * What the parabola leaves of the error, worst (9 cos(x/2) − cos(3x/2))/8 − 1 ≈ −3x⁴/128 at a peak midway between frames,
 * with the mean and the standard deviation over all positions.
 *
 * Valid: 0 < x = ω Δt ≤ 1.5; the middle of the three is the highest. Below x = 0.01 all are below 1e-9 and given as 0.
 * Source: methods 1.17, derived.
 */
export function parabolaResidual(step: number): PeakReadLow {
  checkStep(step);
  if (step > 1.5) throw new RangeError(`parabola: ω Δt ${step} leaves too few frames in a swing`);
  if (step < 0.01) return { worst: 0, mean: 0, deviation: 0 };
  const worst = (9 * Math.cos(step / 2) - Math.cos(1.5 * step)) / 8 - 1;
  const residuals = Array.from({ length: POSITIONS }, (_, i) => parabolaOnCosine(step, (i + 0.5) / POSITIONS - 0.5) - 1);
  const mean = residuals.reduce((sum, x) => sum + x, 0) / POSITIONS;
  const square = residuals.reduce((sum, x) => sum + (x - mean) ** 2, 0) / POSITIONS;
  return { worst, mean, deviation: Math.sqrt(square) };
}

/**
 * Noise at which the choice of the highest frame begins to bias the parabola upward: half the fall A x²/2 from the peak to its
 * neighbour, in the unit of the amplitude. Source: methods 1.17 (a bias up to +0.3 of the noise near it).
 */
export const noiseThatBiases = (amplitude: number, step: number): number => (Math.abs(amplitude) * step * step) / 4;

/** Time of a row of a rolling shutter from the frame's own time, s: row/rows × readout. Valid: 0 ≤ row ≤ rows. */
export function rowDelay({ row, rows, readout }: Readonly<Record<'row' | 'rows' | 'readout', number>>): number {
  if (!(rows > 0 && row >= 0 && row <= rows)) throw new RangeError(`rolling shutter: row ${row} of ${rows}`);
  return (row / rows) * readout;
}
