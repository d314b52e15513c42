/**
 * The full pendulum with viscous, quadratic and Coulomb damping: the launch of a first swing, and the next turning point.
 *
 *   θ″ + 2ζ θ′ + β |θ′| θ′ + θ_f sgn θ′ + p sin θ + (1 − p) θ = 0   in the time ω_n t
 *
 * p = M g d/κ the gravity share. Between two turning points the speed keeps its sign, so that each leg is a smooth
 * equation: by Taylor series of the solution, or, without the viscous term, in closed form (θ′² is linear in θ).
 */
import { peakTimeOfSmall } from './launch.ts';
import type { Launch } from './launch.ts';

/** What takes the swing's energy; every part may be 0, and a little below it, since half-differences step there. */
export interface Damping {
  /** ζ = c/(2√(J κ)) · 1 · viscous. */
  readonly ratio: number;
  /** β = b/J · 1/rad · torque b|θ′|θ′, air drag at some pressure. */
  readonly quadratic: number;
  /** θ_f = τ_f/κ · rad · torque τ_f against the motion, a rubbing pivot (Coulomb). */
  readonly friction: number;
}

export const UNDAMPED: Damping = { ratio: 0, quadratic: 0, friction: 0 };

const ORDER = 22;
const STEPS = 2000;
/** Largest step in ω_n t. */
const LONGEST = 1.2;
const TOLERANCE = 1e-17;
const LEAST_RATIO = -0.5;

/** y″ = −drag y′ − square y′² − bias − p sin y − (1 − p) y: one leg of the swing, forward or backward in time. */
interface Leg {
  readonly drag: number;
  readonly square: number;
  readonly bias: number;
  readonly p: number;
}

const y = new Float64Array(ORDER + 1);
const sine = new Float64Array(ORDER + 1);
const cosine = new Float64Array(ORDER + 1);

function expand(angle: number, speed: number, { drag, square, bias, p }: Leg): void {
  y[0] = angle;
  y[1] = speed;
  sine[0] = Math.sin(angle);
  cosine[0] = Math.cos(angle);
  for (let k = 0; k + 2 <= ORDER; k++) {
    if (k > 0) {
      let s = 0;
      let c = 0;
      for (let j = 1; j <= k; j++) {
        const jy = j * y[j]!;
        s += jy * cosine[k - j]!;
        c -= jy * sine[k - j]!;
      }
      sine[k] = s / k;
      cosine[k] = c / k;
    }
    let speedSquared = 0;
    if (square !== 0) for (let j = 0; j <= k; j++) speedSquared += (j + 1) * y[j + 1]! * (k - j + 1) * y[k - j + 1]!;
    y[k + 2] = (-drag * (k + 1) * y[k + 1]! - square * speedSquared - (k === 0 ? bias : 0) - p * sine[k]! - (1 - p) * y[k]!) / ((k + 1) * (k + 2));
  }
}

/** The `derivative`-th derivative of the present series at h. */
function seriesAt(h: number, derivative: 0 | 1 | 2): number {
  let sum = 0;
  for (let k = ORDER; k >= derivative; k--) {
    const factor = derivative === 0 ? 1 : derivative === 1 ? k : k * (k - 1);
    sum = sum * h + factor * y[k]!;
  }
  return sum;
}

function stepLength(scale: number): number {
  const last = Math.max(Math.abs(y[ORDER]!), Math.abs(y[ORDER - 1]!) * 0.5);
  return last === 0 ? LONGEST : Math.min(LONGEST, (TOLERANCE * scale / last) ** (1 / ORDER));
}

/** Root of a derivative of the series within (0, h), which it enters and leaves with different signs: Newton kept inside by halving. */
function rootWithin(h: number, derivative: 0 | 1): number {
  let low = 0;
  let high = h;
  const rising = seriesAt(h, derivative) > 0;
  let x = h / 2;
  for (let i = 0; i < 60; i++) {
    const value = seriesAt(x, derivative);
    if (value === 0) return x;
    if (value > 0 === rising) high = x;
    else low = x;
    const newton = x - value / seriesAt(x, derivative === 0 ? 1 : 2);
    const next = newton > low && newton < high ? newton : (low + high) / 2;
    if (Math.abs(next - x) <= 1e-16 * h) return next;
    x = next;
  }
  return x;
}

/** p sin θ + (1 − p) θ: the restoring torque over κ. */
const restoring = (angle: number, p: number): number => p * Math.sin(angle) + (1 - p) * angle;

function checkTurningPoint(angle: number, { ratio, quadratic, friction }: Damping, p: number): void {
  const fits = Math.abs(angle) < Math.PI && ratio > LEAST_RATIO && Number.isFinite(quadratic) && Number.isFinite(friction) && Number.isFinite(p);
  if (!fits) throw new RangeError(`damped swing: ${angle} rad with ζ ${ratio}, β ${quadratic}, θ_f ${friction}, p ${p} is no turning point`);
}

/**
 * Launch φ = θ′(0⁺)/ω_n whose first maximum is θ_p, all three dampings acting: backward from the peak to the rest position.
 *
 * Valid: |θ_p| < π, restoring over the whole swing. Odd in θ_p. Equals launchOfFirstSwing where only ζ acts.
 * The rest is θ = 0; with Coulomb friction a pendulum may stand anywhere within ±θ_f of it, which is a part of the rest's uncertainty.
 * Source: the equation above; checked against pendulum-ode-table and against another integrator.
 * @throws RangeError where θ_p is not a turning point of a swing from rest.
 */
export const launchOfDampedSwing = (firstSwing: number, damping: Damping, gravityShare: number): Launch => speedOnTheWay(firstSwing, 0, damping, gravityShare);

/**
 * Speed θ′/ω_n at the angle `at` on the way to the turning point θ_p, and ω_n t from there to it: backward from the peak.
 *
 * Valid: as launchOfDampedSwing; `at` between the turning point before and θ_p, on either side of the rest.
 * @throws RangeError where that swing never was at `at`.
 */
export function speedOnTheWay(turningPoint: number, at: number, damping: Damping, gravityShare: number): Launch {
  checkTurningPoint(turningPoint, damping, gravityShare);
  if (turningPoint === 0 && at === 0) return { launch: 0, peakTime: damping.friction === 0 ? peakTimeOfSmall(damping.ratio) : 0 };
  const sign = Math.sign(turningPoint);
  const peak = Math.abs(turningPoint);
  const to = sign * at;
  if (!(to < peak) || !(restoring(peak, gravityShare) + damping.friction > 0)) throw new RangeError(`damped swing: nothing turns it back at ${turningPoint} rad from ${at} rad`);
  const leg: Leg = { drag: -2 * damping.ratio, square: damping.quadratic, bias: damping.friction, p: gravityShare };
  let angle = peak;
  let speed = 0;
  let time = 0;
  for (let step = 0; step < STEPS; step++) {
    expand(angle, speed, leg);
    const h = stepLength(peak);
    const [next, nextSpeed] = [seriesAt(h, 0), seriesAt(h, 1)];
    // Backward in time the angle falls until the turning point before, which may come within this step.
    const end = nextSpeed < 0 ? h : rootWithin(h, 1);
    if ((end === h ? next : seriesAt(end, 0)) <= to) {
      y[0]! -= to;
      const root = end === h && next === to ? h : rootWithin(end, 0);
      return { launch: -sign * seriesAt(root, 1), peakTime: time + root };
    }
    if (end < h) break;
    speed = nextSpeed;
    angle = next;
    time += h;
  }
  throw new RangeError(`damped swing: no swing from ${at} rad reaches ${turningPoint} rad`);
}

/** The turning point after one; 'stops' where Coulomb friction holds the pendulum where it stands. */
export interface NextTurn {
  readonly status: 'turns' | 'stops';
  readonly angle: number;
}

/**
 * The next turning point after a turning point at θ_k, all three dampings acting. Signed angle from the rest of no friction.
 *
 * Valid: |θ_k| < π, ζ < 1. Friction larger than the restoring torque holds the pendulum: 'stops' with θ_k itself.
 * @throws RangeError where there is no further turning point.
 */
export function nextTurn(angleFrom: number, damping: Damping, gravityShare: number): NextTurn {
  checkTurningPoint(angleFrom, damping, gravityShare);
  if (!(damping.ratio < 1)) throw new RangeError(`turning point: none after the first with damping ratio ${damping.ratio}`);
  const sign = Math.sign(angleFrom);
  let angle = Math.abs(angleFrom);
  if (!(restoring(angle, gravityShare) > damping.friction)) return { status: 'stops', angle: angleFrom };
  const leg: Leg = { drag: 2 * damping.ratio, square: -damping.quadratic, bias: -damping.friction, p: gravityShare };
  const scale = angle;
  let speed = 0;
  for (let step = 0; step < STEPS; step++) {
    expand(angle, speed, leg);
    const h = stepLength(scale);
    const nextSpeed = seriesAt(h, 1);
    if (nextSpeed >= 0 && (step > 0 || nextSpeed > 0)) return { status: 'turns', angle: sign * seriesAt(rootWithin(h, 1), 0) };
    angle = seriesAt(h, 0);
    speed = nextSpeed;
  }
  throw new RangeError(`turning point: none after ${angleFrom} rad`);
}

/** Turning points 0 … last of a swing whose turning point 0 is `first`; once it stops it stays. */
export function turningPointsOf(first: number, damping: Damping, gravityShare: number, last: number): readonly number[] {
  const angles = [first];
  for (let k = 0; k < last; k++) angles.push(nextTurn(angles[k]!, damping, gravityShare).angle);
  return angles;
}

/** Below this |a + i| P the power series serves, above it the closed form: neither cancels there. */
const SERIES_BELOW = 1;
const SERIES_TERMS = 24;

/** ∫₀^P e^{a s} sin s ds = Im[(e^{(a+i)P} − 1)/(a + i)]. */
function dragIntegralOfSine(a: number, P: number): number {
  if (P * Math.hypot(a, 1) >= SERIES_BELOW) return (Math.exp(a * P) * (a * Math.sin(P) - Math.cos(P)) + 1) / (1 + a * a);
  // P Im Σ u^k/(k+1)!, u = (a + i)P; the first term is real and falls out.
  let [re, im] = [1, 0];
  let sum = 0;
  for (let k = 1; k <= SERIES_TERMS; k++) {
    [re, im] = [((re * a - im) * P) / (k + 1), ((re + im * a) * P) / (k + 1)];
    sum += im;
  }
  return P * sum;
}

/** ∫₀^P e^{a s} s ds/P² = [1 + e^x(x − 1)]/x², x = a P. */
function dragIntegralOfAngle(x: number): number {
  if (Math.abs(x) >= SERIES_BELOW) return (1 + Math.exp(x) * (x - 1)) / (x * x);
  let power = 1;
  let sum = 0.5;
  for (let k = 1; k <= SERIES_TERMS; k++) {
    power *= x / k;
    sum += power / (k + 2);
  }
  return sum;
}

/**
 * Launch φ = θ′(0⁺)/ω_n of a first swing θ_p with quadratic damping and Coulomb friction, in closed form:
 *
 *   φ² = 2 ∫₀^{θ_p} e^{2βs} [p sin s + (1 − p) s + θ_f] ds
 *
 * Valid: |θ_p| < π, θ_p ≥ 0 restoring over the swing; odd in θ_p. Quadratic alone: θ_f = 0; Coulomb alone: β = 0, where
 * φ² = 2p(1 − cos θ_p) + (1 − p)θ_p² + 2 θ_f θ_p.
 * Source: derived, d(θ′²)/dθ + 2β θ′² = −2[…]; pendulum-ode-table has both as closed forms.
 * @throws RangeError where θ_p is no turning point.
 */
export function launchWithoutViscous(firstSwing: number, { quadratic, friction }: Readonly<Record<'quadratic' | 'friction', number>>, gravityShare: number): number {
  checkTurningPoint(firstSwing, { ratio: 0, quadratic, friction }, gravityShare);
  const P = Math.abs(firstSwing);
  const x = 2 * quadratic * P;
  const gravity = gravityShare === 0 ? 0 : gravityShare * dragIntegralOfSine(2 * quadratic, P);
  const flexure = (1 - gravityShare) * P * P * dragIntegralOfAngle(x);
  const rub = friction * P * (x === 0 ? 1 : Math.expm1(x) / x);
  const half = gravity + flexure + rub;
  if (!(half >= 0 && half < Infinity)) throw new RangeError(`damped swing: no swing from rest turns at ${firstSwing} rad`);
  return Math.sign(firstSwing) * Math.sqrt(2 * half);
}

/**
 * θ′(0⁺)/(ω_n θ_p) of the small swing with quadratic damping: √{2[1 + eˣ(x − 1)]/x²}, x = 2 β θ_p; 1 + 2βθ_p/3 + … .
 *
 * Valid: β θ_p ≥ 0 (a little below for half-differences). Source: methods 1.3, derived.
 */
export const quadraticFactor = ({ quadratic, firstSwing }: Readonly<Record<'quadratic' | 'firstSwing', number>>): number =>
  Math.sqrt(2 * dragIntegralOfAngle(2 * quadratic * Math.abs(firstSwing)));

/**
 * θ′(0⁺)/(ω_n θ_p) of the small swing with Coulomb friction: √(1 + 2 θ_f/θ_p).
 *
 * Valid: θ_p ≠ 0, θ_f > −θ_p/2. Source: methods 1.3, derived.
 * @throws RangeError outside.
 */
export function frictionFactor({ friction, firstSwing }: Readonly<Record<'friction' | 'firstSwing', number>>): number {
  const square = 1 + (2 * friction) / Math.abs(firstSwing);
  if (!(square > 0 && square < Infinity)) throw new RangeError(`friction factor: first swing ${firstSwing} rad, friction ${friction} rad`);
  return Math.sqrt(square);
}
