/**
 * The full damped pendulum with flexure, solved backward from a turning point to rest, and forward to the next turning point.
 *
 *   θ″ + 2ζ ω_n θ′ + ω_n² [p sin θ + (1 − p) θ] = 0,   p = M g d/κ the gravity share
 *
 * in the time ω_n t, by Taylor series of the solution (sine and cosine by their own recurrences), which a few steps
 * carry to the last digits; the turning point or the crossing is a root of the last step's polynomial.
 */

/** Order of the series: with the step chosen from its last terms, the truncation stays below one unit in the last place. */
const ORDER = 22;
/** Step limit: a swing takes two to ten; a start within 1e-12 of standing upright takes more than this and is refused. */
const STEPS = 400;
/** Largest step in ω_n t. */
const LONGEST = 1.2;
const TOLERANCE = 1e-17;
/** Half-differences about ζ = 0 step below it; far below, a swing that grows is no longer a pendulum's. */
const LEAST_RATIO = -0.5;

const y = new Float64Array(ORDER + 1);
const sine = new Float64Array(ORDER + 1);
const cosine = new Float64Array(ORDER + 1);

/** Series of y″ = −2ζσ y′ − p sin y − (1 − p) y about the present state; σ = +1 forward in time, −1 backward. */
function expand(angle: number, speed: number, drag: number, p: number): void {
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
    y[k + 2] = (-drag * (k + 1) * y[k + 1]! - p * sine[k]! - (1 - p) * y[k]!) / ((k + 1) * (k + 2));
  }
}

function at(h: number): number {
  let sum = y[ORDER]!;
  for (let k = ORDER - 1; k >= 0; k--) sum = sum * h + y[k]!;
  return sum;
}

function slopeAt(h: number): number {
  let sum = ORDER * y[ORDER]!;
  for (let k = ORDER - 1; k >= 1; k--) sum = sum * h + k * y[k]!;
  return sum;
}

function bendAt(h: number): number {
  let sum = ORDER * (ORDER - 1) * y[ORDER]!;
  for (let k = ORDER - 1; k >= 2; k--) sum = sum * h + k * (k - 1) * y[k]!;
  return sum;
}

function stepLength(scale: number): number {
  const last = Math.max(Math.abs(y[ORDER]!), Math.abs(y[ORDER - 1]!) * 0.5);
  return last === 0 ? LONGEST : Math.min(LONGEST, (TOLERANCE * scale / last) ** (1 / ORDER));
}

/** Root of f in (0, h) where f(0) and f(h) differ in sign: Newton kept inside by halving. */
function rootWithin(h: number, f: (h: number) => number, slope: (h: number) => number): number {
  let low = 0;
  let high = h;
  const rising = f(h) > 0;
  let x = h / 2;
  // Sixty halvings reach the last digit from any bracket; Newton needs five.
  for (let i = 0; i < 60; i++) {
    const value = f(x);
    if (value === 0) return x;
    if (value > 0 === rising) high = x;
    else low = x;
    const newton = x - value / slope(x);
    const next = newton > low && newton < high ? newton : (low + high) / 2;
    if (Math.abs(next - x) <= 1e-16 * h) return next;
    x = next;
  }
  return x;
}

export interface Launch {
  /** φ = θ′(0⁺)/ω_n · rad · the damping-corrected, small-angle-equivalent first swing. */
  readonly launch: number;
  /** ω_n t_p · rad · from the shot to the first maximum. */
  readonly peakTime: number;
}

/**
 * Launch φ = θ′(0⁺)/ω_n whose first maximum is θ_p, exact for any damping ratio: backward from the peak, where the
 * speed is zero, to the rest position.
 *
 * Valid: |θ_p| < π (where gravity restores), ζ ≥ 0 (a little below 0 is carried, since half-differences step there),
 * restoring torque over the whole swing. Odd in θ_p.
 * Source: the equation above; checked against pendulum-ode-table (two independent integrators, 20 digits).
 * @throws RangeError where θ_p is not a turning point of a swing from rest.
 */
export function launchOfFirstSwing(firstSwing: number, dampingRatio: number, gravityShare: number): Launch {
  if (firstSwing === 0) return { launch: 0, peakTime: peakTimeOfSmall(dampingRatio) };
  const sign = Math.sign(firstSwing);
  const peak = Math.abs(firstSwing);
  if (!(peak < Math.PI && dampingRatio > LEAST_RATIO && gravityShare * Math.sin(peak) + (1 - gravityShare) * peak > 0)) {
    throw new RangeError(`launch: first swing ${firstSwing} rad with damping ratio ${dampingRatio} is no turning point`);
  }
  let angle = peak;
  let speed = 0;
  let time = 0;
  for (let step = 0; step < STEPS; step++) {
    expand(angle, speed, -2 * dampingRatio, gravityShare);
    const h = stepLength(peak);
    const next = at(h);
    if (next <= 0) {
      const root = next === 0 ? h : rootWithin(h, at, slopeAt);
      return { launch: -sign * slopeAt(root), peakTime: time + root };
    }
    const nextSpeed = slopeAt(h);
    angle = next;
    speed = nextSpeed;
    time += h;
  }
  throw new RangeError(`launch: no swing from rest reaches ${firstSwing} rad with damping ratio ${dampingRatio}`);
}

/**
 * The next turning point after a turning point at θ_k: the other side, smaller by the damping of half a cycle.
 *
 * Valid: 0 < |θ_k| < π, 0 ≤ ζ < 1. Returns the signed angle.
 * @throws RangeError where there is no further turning point.
 */
export function nextTurningPoint(angleFrom: number, dampingRatio: number, gravityShare: number): number {
  const sign = Math.sign(angleFrom);
  let angle = Math.abs(angleFrom);
  if (!(angle > 0 && angle < Math.PI && dampingRatio >= 0 && dampingRatio < 1)) {
    throw new RangeError(`turning point: none after ${angleFrom} rad with damping ratio ${dampingRatio}`);
  }
  const scale = angle;
  let speed = 0;
  for (let step = 0; step < STEPS; step++) {
    expand(angle, speed, 2 * dampingRatio, gravityShare);
    const h = stepLength(scale);
    const nextSpeed = slopeAt(h);
    if (nextSpeed >= 0) return sign * at(rootWithin(h, slopeAt, bendAt));
    angle = at(h);
    speed = nextSpeed;
  }
  throw new RangeError(`turning point: none after ${angleFrom} rad with damping ratio ${dampingRatio}`);
}

/**
 * ω_n t_p of the small swing: arccos ζ/√(1 − ζ²) for ζ < 1, 1 at ζ = 1, arccosh ζ/√(ζ² − 1) above.
 *
 * Valid: ζ ≥ 0. Near critical damping both forms lose their digits; the series of arcsin s/s in s² = 1 − ζ² serves
 * both sides (s² < 0 above) and is exact to 1e-16 within |s²| < 1e-4.
 */
export function peakTimeOfSmall(dampingRatio: number): number {
  const s2 = (1 - dampingRatio) * (1 + dampingRatio);
  if (Math.abs(s2) < 1e-4) return 1 + s2 * (1 / 6 + s2 * (3 / 40 + (s2 * 15) / 336));
  return s2 > 0 ? Math.acos(dampingRatio) / Math.sqrt(s2) : Math.acosh(dampingRatio) / Math.sqrt(-s2);
}
