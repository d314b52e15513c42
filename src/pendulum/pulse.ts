/**
 * Pulses that are not short against the period: how much less they throw the pendulum than a blow of the same impulse.
 *
 * I = C I_apparent, I_apparent = J ω_n D θ_p/r_t. After the pulse the pendulum rings as if struck by the pulse's Laplace
 * transform at its own frequency, so that C is exact for every damping while the first maximum comes after the pulse.
 */
import { peakTimeOfSmall } from './launch.ts';
import { rootBetween } from '../numeric/roots.ts';

/** exponential: sudden onset, F ∝ e^{−t/τ_e}; its duration is τ_e. The others: from first to last force. */
export type PulseShape = 'rectangular' | 'halfSine' | 'triangle' | 'versedSine' | 'exponential';
export const PULSE_SHAPES: readonly PulseShape[] = ['rectangular', 'halfSine', 'triangle', 'versedSine', 'exponential'];

interface Complex {
  readonly re: number;
  readonly im: number;
}
const real = (re: number): Complex => ({ re, im: 0 });
const plus = (a: Complex, b: Complex): Complex => ({ re: a.re + b.re, im: a.im + b.im });
const times = (a: Complex, b: Complex): Complex => ({ re: a.re * b.re - a.im * b.im, im: a.re * b.im + a.im * b.re });
const over = (a: Complex, b: Complex): Complex => {
  const square = b.re * b.re + b.im * b.im;
  return { re: (a.re * b.re + a.im * b.im) / square, im: (a.im * b.re - a.re * b.im) / square };
};

/** Below this |z| the series of sinh z/z and cosh z serve; eight terms leave 1e-17. */
const SERIES_BELOW = 0.5;

/** sinh z/z, without cancellation near 0. */
function sinhc(z: Complex): Complex {
  const square = times(z, z);
  if (Math.hypot(z.re, z.im) < SERIES_BELOW) {
    let sum = real(1);
    let term = real(1);
    for (let k = 1; k <= 8; k++) {
      term = times(term, { re: square.re / (2 * k * (2 * k + 1)), im: square.im / (2 * k * (2 * k + 1)) });
      sum = plus(sum, term);
    }
    return sum;
  }
  return over({ re: Math.sinh(z.re) * Math.cos(z.im), im: Math.cosh(z.re) * Math.sin(z.im) }, z);
}
const cosh = (z: Complex): Complex => ({ re: Math.cosh(z.re) * Math.cos(z.im), im: Math.sinh(z.re) * Math.sin(z.im) });

/** (1/I)∫ F e^{Λ(t − t_c)} dt about the pulse's middle t_c, Λ = z/(τ/2); the exponential about its onset, Λ = z/τ_e. */
function transform(shape: PulseShape, z: Complex): Complex {
  switch (shape) {
    case 'rectangular':
      return sinhc(z);
    case 'triangle': {
      const half = sinhc({ re: z.re / 2, im: z.im / 2 });
      return times(half, half);
    }
    case 'halfSine': {
      // cosh z/(1 + (2z/π)²): 0/0 at z = ±iπ/2, where cosh z = (iπ/2 ∓ …) sinhc about that point.
      const pole: Complex = { re: 0, im: (Math.sign(z.im) || 1) * (Math.PI / 2) };
      const away: Complex = { re: z.re - pole.re, im: z.im - pole.im };
      // cosh z = sinh(away)·sinh(pole), sinh(iπ/2) = i; 1 + (2z/π)² = (4/π²)(z − pole)(z + pole).
      const rotated = times(sinhc(away), { re: 0, im: Math.sign(pole.im) });
      return Math.hypot(away.re, away.im) < SERIES_BELOW
        ? over(rotated, times(real(4 / Math.PI ** 2), plus(z, pole)))
        : over(cosh(z), plus(real(1), times(real(4 / Math.PI ** 2), times(z, z))));
    }
    case 'versedSine': {
      // sinhc z/(1 + (z/π)²): 0/0 at z = ±iπ, sinh z = −sinh(z ∓ iπ).
      const pole: Complex = { re: 0, im: (Math.sign(z.im) || 1) * Math.PI };
      const away: Complex = { re: z.re - pole.re, im: z.im - pole.im };
      return Math.hypot(away.re, away.im) < SERIES_BELOW
        ? over(times(real(-(Math.PI ** 2)), sinhc(away)), times(z, plus(z, pole)))
        : over(sinhc(z), plus(real(1), times(real(1 / Math.PI ** 2), times(z, z))));
    }
    case 'exponential':
      return over(real(1), plus(real(1), { re: -z.re, im: -z.im }));
  }
}

/** Time of the pulse's centroid from its onset, as a share of the duration. */
export const centroidOf = (shape: PulseShape): number => (shape === 'exponential' ? 1 : 0.5);

/**
 * |∫ F e^{−iωt} dt|/I: the undamped ringing after the pulse as a share of that after a blow of the same impulse; 0 where a pulse leaves none.
 *
 * Valid: ωτ ≥ 0 (ωτ_e for the exponential).
 * Source: Fourier integrals of the shapes (methods 1.6); first zeros as in Harris & Piersol, Shock and Vibration Handbook, ch. 8.
 */
export function ringingShare(shape: PulseShape, angle: number): number {
  if (!(angle >= 0)) throw new RangeError(`pulse: ωτ ${angle} is negative`);
  const share = transform(shape, { re: 0, im: shape === 'exponential' ? angle : angle / 2 });
  return Math.hypot(share.re, share.im);
}

/**
 * C = I/|∫ F e^{−iωt} dt|, undamped; ≈ 1 + ω²σ_t²/2.
 *
 * Valid: 0 ≤ ωτ ≤ π (τ ≤ T/2). For the exponential C is that of the ringing; of the first maximum only while τ_e < T/25.
 * @throws RangeError outside.
 */
export function pulseFactor(shape: PulseShape, angle: number): number {
  if (!(angle >= 0 && angle <= Math.PI)) throw new RangeError(`pulse factor: ωτ ${angle} is outside 0 … π`);
  return 1 / ringingShare(shape, angle);
}

/** A pulse's correction, or why there is none. */
export type PulseCorrection =
  | {
      readonly status: 'corrected';
      /** C · 1 · I = C I_apparent. */
      readonly factor: number;
      /** From the pulse's onset, s: the first maximum, and the centroid, from which the time to the maximum counts. */
      readonly peakTime: number;
      readonly centroid: number;
      /** Share of the impulse that comes after the first maximum; of the exponential and of measured pulses with a tail. */
      readonly leftAfterPeak: number;
    }
  /** The first maximum falls inside the pulse: neither an impulse bit nor a thrust follows from it. */
  | { readonly status: 'peakInsidePulse' }
  /** A measured force whose integral is not positive. */
  | { readonly status: 'noImpulse' };

/** Nearer to critical damping than this the two forms of the ringing lose their digits; one at this distance serves, to 1e-6 (ωτ)². */
const NEAR_CRITICAL = 1e-6;
const awayFromCritical = (zeta: number): number => (Math.abs(zeta - 1) < NEAR_CRITICAL ? 1 + NEAR_CRITICAL : zeta);

/**
 * C and the time of the first maximum, for any damping.
 *
 * Valid: duration ≥ 0 s, ω_n > 0 rad/s, ζ ≥ 0. 'peakInsidePulse' where the maximum would not come
 * after the end of the pulse: τ > T_d/2 for the rectangular one; the exponential, which has no end: τ_e > T/2.
 * Source: derived; methods 1.6 (the rule "C at ω_n times D, time from the centroid" is its first order in ζ).
 * @throws RangeError outside.
 */
export function pulseCorrection({ shape, duration, naturalFrequency, dampingRatio }: {
  readonly shape: PulseShape;
  readonly duration: number;
  readonly naturalFrequency: number;
  readonly dampingRatio: number;
}): PulseCorrection {
  if (!(duration >= 0 && naturalFrequency > 0 && dampingRatio >= 0)) throw new RangeError(`pulse: duration ${duration} s, ω_n ${naturalFrequency} rad/s, ζ ${dampingRatio}`);
  const centroid = centroidOf(shape) * duration;
  const angle = naturalFrequency * duration;
  if (angle === 0) return { status: 'corrected', factor: 1, peakTime: peakTimeOfSmall(dampingRatio) / naturalFrequency, centroid, leftAfterPeak: 0 };
  if (shape === 'exponential') return exponentialPulse(angle, naturalFrequency, dampingRatio);
  const { factor, peak } = ringing((re, im) => transform(shape, { re: (re * angle) / 2, im: (im * angle) / 2 }), awayFromCritical(dampingRatio));
  const peakTime = (peak + angle / 2) / naturalFrequency;
  // A hair beyond, so that τ = T/2 itself is still corrected.
  if (!(peakTime >= duration * (1 - 1e-9) && factor < Infinity)) return { status: 'peakInsidePulse' };
  return { status: 'corrected', factor, peakTime, centroid, leftAfterPeak: 0 };
}

/** C and ω_n t_p (from the time to which the transform refers) of the ringing after a pulse, from ∫ F e^{Λt} dt/I at Λ in units of ω_n. */
function ringing(at: (re: number, im: number) => Complex, zeta: number): { readonly factor: number; readonly peak: number } {
  const unstruck = peakTimeOfSmall(zeta);
  if (zeta < 1) {
    const nu = Math.sqrt((1 - zeta) * (1 + zeta));
    const M = at(zeta, -nu);
    const psi = -Math.atan2(M.im, M.re);
    return { factor: Math.exp((zeta * psi) / nu) / Math.hypot(M.re, M.im), peak: psi / nu + unstruck };
  }
  const mu = Math.sqrt((zeta - 1) * (zeta + 1));
  const slowRate = 1 / (zeta + mu);
  const slow = at(slowRate, 0).re;
  const fast = at(zeta + mu, 0).re;
  const later = Math.log(fast / slow) / (2 * mu);
  return { factor: Math.exp(slowRate * later) / slow, peak: later + unstruck };
}

/** A pulse as long as the pendulum's own slow or fast decay: the forms of the motion are 0/0 there, and one at this distance serves, to 1e-7. */
const NEAR_OWN_DECAY = 1e-7;

/** The exponential never ends: its first maximum is found from the whole motion. s = ω_n t, a = ω_n τ_e. */
function exponentialPulse(angle: number, naturalFrequency: number, zeta: number): PulseCorrection {
  if (angle > Math.PI) return { status: 'peakInsidePulse' };
  const own = (a: number): number => (1 - a) * (1 - a) + 2 * (1 - zeta) * a;
  const a = Math.abs(own(angle)) < NEAR_OWN_DECAY ? angle * (1 + Math.sqrt(NEAR_OWN_DECAY)) : angle;
  const free = freeMotion(zeta);
  const K = a / own(a);
  // K e^{−s/a} + e^{−ζs}[K(1/a − ζ) S − K C] in the motion after a blow, h₀ = e^{−ζs}S, h₁ = h₀′ = e^{−ζs}(C − ζS).
  const angleAt = (s: number): number => {
    const [h0, h1] = free(s);
    return K * (Math.exp(-s / a) + h0 * (1 / a - 2 * zeta) - h1);
  };
  const speedAt = (s: number): number => {
    const [h0, h1] = free(s);
    return K * (-Math.exp(-s / a) / a + h1 / a + h0);
  };
  // Up to the maximum of a blow at the onset every part of the pulse still drives; a half cycle later all of it is past.
  const from = peakTimeOfSmall(zeta);
  const found = rootBetween(speedAt, from * (1 - 1e-9), zeta < 1 ? from + Math.PI / Math.sqrt((1 - zeta) * (1 + zeta)) : firstFalling(speedAt, from));
  if (found.status !== 'found') return { status: 'peakInsidePulse' };
  const D = Math.exp(zeta * from);
  return { status: 'corrected', factor: 1 / (D * angleAt(found.x)), peakTime: found.x / naturalFrequency, centroid: a / naturalFrequency, leftAfterPeak: Math.exp(-found.x / a) };
}

const DOUBLINGS = 60;
/** A time after `from` by which the speed is negative. */
function firstFalling(speedAt: (s: number) => number, from: number): number {
  let after = 2 * from;
  for (let i = 0; i < DOUBLINGS && !(speedAt(after) < 0); i++) after *= 2;
  return after;
}

/** A measured force: time in s from any origin, rising; force in any unit, straight between the samples. */
export interface MeasuredForce {
  readonly time: readonly number[];
  readonly force: readonly number[];
}

/** ∫F dt, centroid from the first sample, variance of time about it, by exact integration of the straight pieces. */
export function momentsOf({ time, force }: MeasuredForce): { readonly impulse: number; readonly centroid: number; readonly variance: number } {
  checkForce({ time, force });
  let [impulse, first, second] = [0, 0, 0];
  for (let i = 1; i < time.length; i++) {
    const h = time[i]! - time[i - 1]!;
    const [s, f, g] = [time[i - 1]! - time[0]!, force[i - 1]!, force[i]!];
    impulse += (h * (f + g)) / 2;
    first += h * ((s * (f + g)) / 2 + (h * (f + 2 * g)) / 6);
    second += h * ((s * s * (f + g)) / 2 + (s * h * (f + 2 * g)) / 3 + (h * h * (f + 3 * g)) / 12);
  }
  const centroid = first / impulse;
  return impulse > 0 ? { impulse, centroid, variance: second / impulse - centroid * centroid } : { impulse, centroid: 0, variance: 0 };
}

function checkForce({ time, force }: MeasuredForce): void {
  const rises = time.every((t, i) => Number.isFinite(t) && (i === 0 || t > time[i - 1]!));
  if (time.length < 2 || force.length !== time.length || !rises || !force.every(Number.isFinite)) throw new RangeError('measured force: two or more samples at rising times are needed');
}

/** More of the impulse than this after the first maximum, and the maximum is inside the pulse. */
export const LARGEST_LEFT_AFTER_PEAK = 1e-3;
/** Gauss points and weights on (0, 1), five of them: exact to (ω h)¹⁰ on each straight piece. */
const GAUSS: readonly (readonly [number, number])[] = [-0.906179845938664, -0.5384693101056831, 0, 0.5384693101056831, 0.906179845938664].map((x, i) => [
  (1 + x) / 2,
  [0.1184634425280945, 0.2393143352496833, 0.2844444444444444, 0.2393143352496833, 0.1184634425280945][i]!,
]);

/**
 * C of a measured force, from the whole motion that it gives the small swing up to the first maximum.
 *
 * Valid: ω_n > 0, ζ ≥ 0, sample spacing below T/6. The offset of the force's zero must be taken off before: it counts.
 * 'peakInsidePulse' where more than 0.1 % of the impulse comes after the maximum.
 * Source: superposition of the blows F dt; derived.
 */
export function measuredPulseCorrection(measured: MeasuredForce, naturalFrequency: number, dampingRatio: number): PulseCorrection {
  const { impulse, centroid } = momentsOf(measured);
  if (!(naturalFrequency > 0 && dampingRatio >= 0)) throw new RangeError(`pulse: ω_n ${naturalFrequency} rad/s, ζ ${dampingRatio}`);
  if (!(impulse > 0)) return { status: 'noImpulse' };
  const zeta = awayFromCritical(dampingRatio);
  const free = freeMotion(zeta);
  const { time, force } = measured;
  let [angle, speed, given] = [0, 0, 0];
  /** State and impulse given at the share x of the piece from i − 1 to i. */
  const within = (i: number, x: number): readonly [number, number, number] => {
    const h = time[i]! - time[i - 1]!;
    const [f, slope] = [force[i - 1]!, force[i]! - force[i - 1]!];
    const [h0, h1] = free(naturalFrequency * h * x);
    let newAngle = angle * (h1 + 2 * zeta * h0) + speed * h0;
    let newSpeed = -angle * h0 + speed * h1;
    for (const [share, weight] of GAUSS) {
      const blow = (weight * x * h * (f + slope * share * x)) / impulse;
      const [g0, g1] = free(naturalFrequency * h * x * (1 - share));
      newAngle += blow * g0;
      newSpeed += blow * g1;
    }
    return [newAngle, newSpeed, given + (x * h * (f + (slope * x) / 2)) / impulse];
  };
  const D = Math.exp(zeta * peakTimeOfSmall(zeta));
  for (let i = 1; i < time.length; i++) {
    const next = within(i, 1);
    if (speed > 0 && next[1] <= 0 && given > 0.5) {
      const found = rootBetween((x) => within(i, x)[1], 0, 1);
      if (found.status !== 'found') throw new Error('measured pulse: the maximum was lost within a piece');
      const [peak, , upTo] = within(i, found.x);
      const left = Math.abs(1 - upTo);
      if (left > LARGEST_LEFT_AFTER_PEAK) return { status: 'peakInsidePulse' };
      return { status: 'corrected', factor: 1 / (D * peak), peakTime: time[i - 1]! - time[0]! + found.x * (time[i]! - time[i - 1]!), centroid, leftAfterPeak: left };
    }
    [angle, speed, given] = next;
  }
  if (!(speed > 0)) return { status: 'peakInsidePulse' };
  const after = peakAfter(angle, speed, zeta);
  return { status: 'corrected', factor: 1 / (D * after.peak), peakTime: time[time.length - 1]! - time[0]! + after.time / naturalFrequency, centroid, leftAfterPeak: 0 };
}

/** Response to a unit blow and its rate at s = ω_n t: e^{−ζs} sin νs/ν and its derivative. */
function freeMotion(zeta: number): (s: number) => readonly [number, number] {
  const root = Math.sqrt(Math.abs((1 - zeta) * (1 + zeta)));
  if (zeta < 1) {
    return (s) => {
      const fall = Math.exp(-zeta * s);
      const sinus = Math.sin(root * s) / root;
      return [fall * sinus, fall * (Math.cos(root * s) - zeta * sinus)];
    };
  }
  // Two decays, ζ ± √(ζ² − 1), written so that neither overflows nor cancels.
  const fast = zeta + root;
  const slow = 1 / fast;
  return (s) => {
    const h0 = root === 0 ? s * Math.exp(-s) : (Math.exp(-slow * s) * -Math.expm1(-2 * root * s)) / (2 * root);
    return [h0, Math.exp(-fast * s) - slow * h0];
  };
}

/** First maximum of the free motion from an angle with a speed upward; time in ω_n t. */
function peakAfter(angle: number, speed: number, zeta: number): { readonly peak: number; readonly time: number } {
  const root = Math.sqrt(Math.abs((1 - zeta) * (1 + zeta)));
  // θ′ = e^{−ζs}[v cos νs − (ζ v + x) sin νs/ν] = 0.
  const through = zeta * speed + angle;
  const time = zeta < 1 ? Math.atan2(root * speed, through) / root : Math.atanh((root * speed) / through) / root;
  const [h0, h1] = freeMotion(zeta)(time);
  return { peak: angle * (h1 + 2 * zeta * h0) + speed * h0, time };
}
