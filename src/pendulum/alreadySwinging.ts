/**
 * A pendulum that is already swinging when the shot fires. Amplitudes and jumps in rad (or any one unit of reading);
 * speeds as v/ω_n in the same unit, positive along the thrust.
 */
import { speedOnTheWay } from './dampingLaws.ts';
import type { Damping } from './dampingLaws.ts';

/** A swing at the instant of the shot. */
export interface SwingAtShot {
  /** x_f · deflection from the rest, continuous through the shot. */
  readonly deflection: number;
  /** v_f/ω_n · before the shot. */
  readonly speed: number;
}

/**
 * Jump ΔA = Δv/ω_n of the speed from the amplitude after the shot, undamped: ΔA = √(A² − x_f²) − v_f/ω.
 *
 * `amplitudeAfter` is that at the shot (the peak reading itself where nothing damps).
 * Valid: A ≥ |x_f|. Source: methods 1.7; derived from A² = x_f² + (v_f/ω + ΔA)².
 * @throws RangeError where the amplitude is below the deflection.
 */
export const jumpFromAmplitude = (amplitudeAfter: number, swing: SwingAtShot): number => jumpFromPeak({ peak: amplitudeAfter, peakDelay: 0, dampingRatio: 0 }, swing);

/**
 * The same with viscous damping, from a peak read `peakDelay` = ω_n(t_p − t_f) after the shot:
 * A = θ_p e^{ζ ω_n (t_p − t_f)}/√(1 − ζ²), ΔA = √(1 − ζ²) √(A² − x_f²) − (v_f/ω_n + ζ x_f).
 *
 * Valid: 0 ≤ ζ < 1, small swing. Source: methods 1.7; derived.
 * @throws RangeError outside.
 */
export function jumpFromPeak({ peak, peakDelay, dampingRatio }: Readonly<Record<'peak' | 'peakDelay' | 'dampingRatio', number>>, { deflection, speed }: SwingAtShot): number {
  if (!(dampingRatio >= 0 && dampingRatio < 1)) throw new RangeError(`swing at the shot: damping ratio ${dampingRatio} is not in 0 … 1`);
  const nu = Math.sqrt((1 - dampingRatio) * (1 + dampingRatio));
  const amplitude = (peak * Math.exp(dampingRatio * peakDelay)) / nu;
  const square = (amplitude - deflection) * (amplitude + deflection);
  if (!(square >= 0)) throw new RangeError(`swing at the shot: amplitude ${amplitude} after it is below the deflection ${deflection} at it`);
  return nu * Math.sqrt(square) - (speed + dampingRatio * deflection);
}

/** Deflection and speed s = ω_n (t − t_f) after a state, small swing; s < 0 goes back. Valid: ζ < 1, from 0 (down to −0.5 for half-differences about it). */
export function swingLater({ deflection, speed }: SwingAtShot, dampingRatio: number, s: number): SwingAtShot {
  if (!(dampingRatio > -0.5 && dampingRatio < 1)) throw new RangeError(`swing at the shot: damping ratio ${dampingRatio} is not in 0 … 1`);
  const nu = Math.sqrt((1 - dampingRatio) * (1 + dampingRatio));
  const fall = Math.exp(-dampingRatio * s);
  const [sine, cosine] = [Math.sin(nu * s) / nu, Math.cos(nu * s)];
  return {
    deflection: fall * (deflection * (cosine + dampingRatio * sine) + speed * sine),
    speed: fall * (speed * (cosine - dampingRatio * sine) - deflection * sine),
  };
}

/**
 * The swing at the shot from its last maximum A₀ on the side of the thrust, and the phase ω_d (t_f − t_max) since.
 *
 * Valid: 0 ≤ ζ < 1 (as swingLater), small swing: to A₀²/16 of the phase. Source: derived.
 * @throws RangeError where the damping leaves no phase.
 */
export const swingOfPhase = ({ amplitude, phase, ratio }: Readonly<Record<'amplitude' | 'phase' | 'ratio', number>>): SwingAtShot =>
  swingLater({ deflection: amplitude, speed: 0 }, ratio, phase / Math.sqrt((1 - ratio) * (1 + ratio)));

/**
 * Jump ΔA = [θ′(0⁺) − θ′(0⁻)]/ω_n from the first maximum θ_p after the shot and the swing at it, for the full pendulum with all three dampings:
 * the speed with which a swing to θ_p passes the deflection, less the speed before the shot.
 *
 * Valid: as speedOnTheWay. Equals jumpFromPeak for a small viscous swing, without a time of the peak. Source: methods 1.7, derived.
 * @throws RangeError where no swing from the deflection turns at θ_p.
 */
export const jumpToMaximum = (firstSwing: number, { deflection, speed }: SwingAtShot, damping: Damping, gravityShare: number): number =>
  speedOnTheWay(firstSwing, deflection, damping, gravityShare).launch - speed;

/** Points of the mean over the phase; the integrand is periodic, and so many leave rounding up to A₀ = 0.9 ΔA. */
const PHASES = 512;

/** What a background swing of unknown phase does to a shot's amplitude. */
export interface UnknownPhase {
  /** ΔA with the bias taken off. */
  readonly jump: number;
  /** Standard uncertainty, per shot, random: A₀/√2. */
  readonly u: number;
  /** The bias taken off: amplitude after − jump = A₀²/(4 ΔA). */
  readonly bias: number;
  /** At worst ± this. */
  readonly worst: number;
}

/**
 * Jump from the amplitude after the shot where a swing of amplitude A₀ went on before it, phase unknown.
 *
 * The mean over the phase of √(A₀² sin²φ + (ΔA + A₀ cos φ)²) is ΔA + A₀²/(4ΔA) to the third order in A₀/ΔA; undone:
 * ΔA = (A + √(A² − A₀²))/2.
 *
 * Valid: 0 ≤ A₀ < A; to 0.15 % of ΔA up to A₀ = ΔA/2.
 * Source: methods 1.7; derived.
 * @throws RangeError outside.
 */
export function jumpOfUnknownPhase(amplitudeAfter: number, background: number): UnknownPhase {
  if (!(background >= 0 && background < amplitudeAfter)) {
    throw new RangeError(`unknown phase: background ${background} is not below the amplitude ${amplitudeAfter} after the shot`);
  }
  const jump = (amplitudeAfter + Math.sqrt((amplitudeAfter - background) * (amplitudeAfter + background))) / 2;
  return { jump, u: background / Math.SQRT2, bias: amplitudeAfter - jump, worst: background };
}

/**
 * Exact mean and standard deviation over the phase of the amplitude after a jump ΔA from a swing A₀.
 * Valid: 0 ≤ A₀ < ΔA. Source: derived; mean square is ΔA² + A₀².
 */
export function amplitudeOverPhases(jump: number, background: number): { readonly mean: number; readonly deviation: number } {
  if (!(background >= 0 && background < jump)) throw new RangeError(`unknown phase: background ${background} is not below the jump ${jump}`);
  const ratio = background / jump;
  let mean = 0;
  let square = 0;
  for (let i = 0; i < PHASES; i++) {
    const phase = (2 * Math.PI * (i + 0.5)) / PHASES;
    // √(1 + 2ε cos φ + ε²) − 1, without cancellation for a small ε.
    const q = ratio * (2 * Math.cos(phase) + ratio);
    const excess = q / (Math.sqrt(1 + q) + 1);
    mean += excess / PHASES;
    square += (excess * excess) / PHASES;
  }
  return { mean: jump * (1 + mean), deviation: jump * Math.sqrt(Math.max(0, square - mean * mean)) };
}
/**
 * Largest shift ω_n Δt of the first maximum by a background swing of unknown phase, undamped: asin(A₀/ΔA), rad.
 *
 * The shift at a phase φ is atan[ε sin φ/(1 + ε cos φ)], ε = A₀/ΔA: largest at cos φ = −ε. At φ = 90° it is atan ε,
 * which methods 1.7 names; the two differ by ε³/2 (0.4 % of a radian at ε = 0.2).
 *
 * Valid: 0 ≤ A₀ < ΔA. Source: derived.
 */
export function largestPeakShift(jump: number, background: number): number {
  if (!(background >= 0 && background < jump)) throw new RangeError(`peak shift: background ${background} is not below the jump ${jump}`);
  return Math.asin(background / jump);
}

/**
 * Shift ω_n Δt of the first maximum for a known swing at the shot, undamped: atan2(x_f, v_f/ω + ΔA), earlier positive. rad.
 */
export const peakShift = (jump: number, { deflection, speed }: SwingAtShot): number => Math.atan2(deflection, speed + jump);
