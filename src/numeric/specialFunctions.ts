/** Gamma, beta and normal distribution functions in double precision. */

const EPSILON = Number.EPSILON;
/** Smallest divisor of the continued fractions (modified Lentz method). */
const TINY = 1e-300;
/** Terms of a series or continued fraction: they need some √a of them, and a = 1e9 is far beyond any sample. */
const TERM_LIMIT = 1_000_000;
/** From here on eight terms of Stirling's series are exact in double precision. */
const STIRLING_FROM = 10;
const HALF_LN_TWO_PI = 0.9189385332046728;

/** Both tails of a distribution; each keeps its relative accuracy where it is the small one. */
export interface Tails {
  readonly lower: number;
  readonly upper: number;
}

/** Δ(x) = ln Γ(x) − [(x − ½) ln x − x + ½ ln 2π], the remainder of Stirling's formula (DLMF 5.11.1, from memory). */
function stirlingRemainder(x: number): number {
  let shifted = x;
  let sum = 0;
  while (shifted < STIRLING_FROM) {
    sum += (shifted + 0.5) * Math.log1p(1 / shifted) - 1;
    shifted += 1;
  }
  const s = 1 / (shifted * shifted);
  const series =
    1 / 12 - s * (1 / 360 - s * (1 / 1260 - s * (1 / 1680 - s * (1 / 1188 - s * (691 / 360360 - s * (1 / 156 - (s * 3617) / 122400))))));
  return sum + series / shifted;
}

/** Deviance a ln(a/m) + m − a of two positive numbers, without cancellation where they are close. */
function deviance(a: number, m: number): number {
  const r = (m - a) / a;
  if (Math.abs(r) > 0.1) return a * (r - Math.log(m / a));
  // With ln(m/a) = ln(1 + r):
  // ln(1 + r) = 2 artanh(v) with v = r/(2 + r), and r − 2v = r·v.
  const v = r / (2 + r);
  const square = v * v;
  let power = v * square;
  let sum = 0;
  for (let k = 3; k < 40; k += 2) {
    const term = (2 * power) / k;
    sum += term;
    if (Math.abs(term) < EPSILON * Math.abs(sum)) break;
    power *= square;
  }
  return a * (r * v - sum);
}

/**
 * ln Γ(x).
 *
 * Valid: x > 0. Absolute accuracy near 1e-15·max(1, |ln Γ|).
 * Source: Stirling's series, DLMF 5.11.1, and the recurrence Γ(x + 1) = x Γ(x) (from memory).
 * @throws RangeError when x is not positive and finite
 */
export function lnGamma(x: number): number {
  if (!(x > 0 && x < Infinity)) throw new RangeError(`lnGamma: x is ${x}`);
  return (x - 0.5) * Math.log(x) - x + HALF_LN_TWO_PI + stirlingRemainder(x);
}

/** x^a e^(−x) / Γ(a), in the form that does not lose digits for a large a (C. Loader 2000, deviance form, from memory). */
function gammaTerm(a: number, x: number): number {
  return Math.sqrt(a / (2 * Math.PI)) * Math.exp(-deviance(a, x) - stirlingRemainder(a));
}

/**
 * Regularised incomplete gamma functions: lower P(a, x) = γ(a, x)/Γ(a), upper Q = 1 − P.
 *
 * Valid: a > 0, x ≥ 0.
 * Source: DLMF 8.7.1 (series) and 8.9.2 (continued fraction), from memory.
 * @throws RangeError when an argument is out of its range
 */
export function incompleteGamma(a: number, x: number): Tails {
  if (!(a > 0 && a < Infinity)) throw new RangeError(`incompleteGamma: a is ${a}`);
  if (!(x >= 0)) throw new RangeError(`incompleteGamma: x is ${x}`);
  if (x === 0) return { lower: 0, upper: 1 };
  if (x === Infinity) return { lower: 1, upper: 0 };
  if (x < a + 1) {
    let term = 1 / a;
    let sum = term;
    for (let n = 1; ; n += 1) {
      term *= x / (a + n);
      sum += term;
      if (term < EPSILON * sum) break;
      if (n > TERM_LIMIT) throw new Error(`incompleteGamma: no convergence, a ${a}, x ${x}`);
    }
    const lower = Math.min(1, gammaTerm(a, x) * sum);
    return { lower, upper: 1 - lower };
  }
  let b = x + 1 - a;
  let c = 1 / TINY;
  let d = 1 / b;
  let h = d;
  for (let n = 1; ; n += 1) {
    const an = n * (a - n);
    b += 2;
    d = 1 / awayFromZero(an * d + b);
    c = awayFromZero(b + an / c);
    h *= d * c;
    if (Math.abs(d * c - 1) <= EPSILON) break;
    if (n > TERM_LIMIT) throw new Error(`incompleteGamma: no convergence, a ${a}, x ${x}`);
  }
  const upper = Math.min(1, gammaTerm(a, x) * h);
  return { lower: 1 - upper, upper };
}

function awayFromZero(value: number): number {
  return Math.abs(value) < TINY ? TINY : value;
}

/** x^a y^b / B(a, b) with y = 1 − x, deviance form. */
function betaTerm(a: number, b: number, x: number, y: number): number {
  const n = a + b;
  const remainder = stirlingRemainder(n) - stirlingRemainder(a) - stirlingRemainder(b);
  return Math.sqrt((a / n) * (b / (2 * Math.PI))) * Math.exp(remainder - deviance(a, n * x) - deviance(b, n * y));
}

/** Continued fraction of the incomplete beta function, DLMF 8.17.22 (from memory), modified Lentz method. */
function betaFraction(a: number, b: number, x: number): number {
  let c = 1;
  let d = 1 / awayFromZero(1 - ((a + b) * x) / (a + 1));
  let h = d;
  for (let m = 1; ; m += 1) {
    const even = (m * (b - m) * x) / ((a + 2 * m - 1) * (a + 2 * m));
    d = 1 / awayFromZero(1 + even * d);
    c = awayFromZero(1 + even / c);
    h *= d * c;
    const odd = (-(a + m) * (a + b + m) * x) / ((a + 2 * m) * (a + 2 * m + 1));
    d = 1 / awayFromZero(1 + odd * d);
    c = awayFromZero(1 + odd / c);
    h *= d * c;
    if (Math.abs(d * c - 1) <= EPSILON) return h;
    if (m > TERM_LIMIT) throw new Error(`incompleteBeta: no convergence, a ${a}, b ${b}, x ${x}`);
  }
}

/**
 * Regularised incomplete beta function: lower I_x(a, b), upper 1 − I_x(a, b) = I_y(b, a).
 *
 * `y` is 1 − x, given beside x by a caller who knows it without cancellation.
 * Valid: a, b > 0, 0 ≤ x ≤ 1.
 * Source: DLMF 8.17.22 (from memory).
 * @throws RangeError when an argument is out of its range
 */
export function incompleteBeta(a: number, b: number, x: number, y = 1 - x): Tails {
  if (!(a > 0 && a < Infinity && b > 0 && b < Infinity)) throw new RangeError(`incompleteBeta: a is ${a}, b is ${b}`);
  if (!(x >= 0 && x <= 1 && y >= 0 && y <= 1)) throw new RangeError(`incompleteBeta: x is ${x}, 1 − x is ${y}`);
  if (x === 0) return { lower: 0, upper: 1 };
  if (y === 0) return { lower: 1, upper: 0 };
  const term = betaTerm(a, b, x, y);
  if (x < (a + 1) / (a + b + 2)) {
    const lower = Math.min(1, (term * betaFraction(a, b, x)) / a);
    return { lower, upper: 1 - lower };
  }
  const upper = Math.min(1, (term * betaFraction(b, a, y)) / b);
  return { lower: 1 - upper, upper };
}

/**
 * Standard normal distribution function: Φ(z) = ½ Q(½, z²/2) for z < 0, and its complement.
 *
 * Valid: any z; relative accuracy holds in both tails.
 * Source: DLMF 7.11.2 (from memory).
 * @throws RangeError when z is not a number
 */
export function normalTails(z: number): Tails {
  if (Number.isNaN(z)) throw new RangeError('normalTails: z is not a number');
  const { lower, upper } = incompleteGamma(0.5, (z * z) / 2);
  const small = 0.5 * upper;
  const large = 0.5 + 0.5 * lower;
  return z < 0 ? { lower: small, upper: large } : { lower: large, upper: small };
}
