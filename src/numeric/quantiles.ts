/** Distribution functions and quantiles: normal, Student's t, chi-square, F. */
import { incompleteBeta, incompleteGamma, lnGamma, normalTails } from './specialFunctions.ts';
import type { Tails } from './specialFunctions.ts';

/** Newton steps in logarithms: some five are needed from the starts below; tiny degrees of freedom take some dozens. */
const STEP_LIMIT = 200;
/** Steps shrink quadratically: after one of this size nothing but rounding is left. */
const LAST_STEP = 1e-9;
/** Longest step in ln x, so that a flat start cannot throw the next one out of range. */
const LONGEST_STEP = 40;
/** Range of ln x: x² must stay a double. */
const LOWEST_LN = -700;
const HIGHEST_LN = 350;
/** From here on the four-term series in 1/ν is exact in double precision for every p that a double can hold. */
const T_SERIES_FROM = 1e5;

function checkProbability(p: number): void {
  if (!(p > 0 && p < 1)) throw new RangeError(`quantile: the probability is ${p}`);
}

function checkDof(dof: number, largest: number): void {
  if (!(dof > 0 && dof <= largest)) throw new RangeError(`distribution: the degrees of freedom are ${dof}`);
}

const polynomial = (coefficients: readonly number[], x: number): number => coefficients.reduceRight((sum, c) => sum * x + c, 0);

// M. J. Wichura, Algorithm AS 241 (PPND16), Applied Statistics 37 (1988) 477; coefficients from memory, rounded to doubles, checked in test/numeric/quantiles.test.ts.
const CENTRE = {
  over: [
    3.3871328727963665, 133.14166789178438, 1971.5909503065513, 13731.69376550946,
    45921.95393154987, 67265.7709270087, 33430.57558358813, 2509.0809287301227,
  ],
  under: [
    1, 42.31333070160091, 687.1870074920579, 5394.196021424751,
    21213.794301586597, 39307.89580009271, 28729.085735721943, 5226.495278852854,
  ],
};
const NEAR_TAIL = {
  over: [
    1.4234371107496835, 4.630337846156546, 5.769497221460691, 3.6478483247632045,
    1.2704582524523684, 0.2417807251774506, 0.022723844989269184, 0.0007745450142783414,
  ],
  under: [
    1, 2.053191626637759, 1.6763848301838038, 0.6897673349851,
    0.14810397642748008, 0.015198666563616457, 0.0005475938084995345, 1.0507500716444169e-9,
  ],
};
const FAR_TAIL = {
  over: [
    6.657904643501103, 5.463784911164114, 1.7848265399172913, 0.29656057182850487,
    0.026532189526576124, 0.0012426609473880784, 2.7115555687434876e-5, 2.0103343992922881e-7,
  ],
  under: [
    1, 0.599832206555888, 0.1369298809227358, 0.014875361290850615,
    0.0007868691311456133, 1.8463183175100548e-5, 1.421511758316446e-7, 2.0442631033899397e-15,
  ],
};

/**
 * Quantile of the standard normal distribution: z with Φ(z) = p.
 *
 * Valid: 0 < p < 1. Relative accuracy 1e-15.
 * Source: M. J. Wichura, Algorithm AS 241, Applied Statistics 37 (1988) 477 (from memory).
 * @throws RangeError when p is outside (0, 1)
 */
export function normalQuantile(p: number): number {
  checkProbability(p);
  const q = p - 0.5;
  if (Math.abs(q) <= 0.425) {
    const r = 0.180625 - q * q;
    return (q * polynomial(CENTRE.over, r)) / polynomial(CENTRE.under, r);
  }
  const r = Math.sqrt(-Math.log(q < 0 ? p : 1 - p));
  const tail = r <= 5 ? NEAR_TAIL : FAR_TAIL;
  const offset = r <= 5 ? 1.6 : 5;
  const z = polynomial(tail.over, r - offset) / polynomial(tail.under, r - offset);
  return q < 0 ? -z : z;
}

/** Φ(z), the standard normal distribution function. @throws RangeError when z is not a number */
export function normalCdf(z: number): number {
  return normalTails(z).lower;
}

/** Tails of |T|: lower P(|T| ≤ t), upper P(|T| > t), for t ≥ 0. */
function absoluteTTails(t: number, dof: number): Tails {
  if (t === Infinity) return { lower: 1, upper: 0 };
  if (dof >= T_SERIES_FROM) {
    const { lower, upper } = normalTails(normalOfT(t, dof));
    return { lower: lower - upper, upper: 2 * upper };
  }
  const ratio = (t / dof) * t;
  // For a t so large that t²/ν overflows, ν/t² is 0 as it should be.
  const x = 1 / (1 + ratio);
  const y = ratio === Infinity ? 1 : ratio / (1 + ratio);
  const { lower, upper } = incompleteBeta(dof / 2, 0.5, x, y);
  return { lower: upper, upper: lower };
}

/** Each round of the inversion below gains a factor of at least 80 (z ≤ 40, ν ≥ 1e5). */
const SERIES_ROUNDS = 9;

/** z with Φ(z) = F_ν(t) for ν large: the inverse of the series in tOfNormal, by fixed point. */
function normalOfT(t: number, dof: number): number {
  if (dof === Infinity) return t;
  // Beyond this the tail is 0 in double precision, and the series is not needed.
  if (t > 40) return t;
  let z = t;
  for (let k = 0; k < SERIES_ROUNDS; k += 1) z -= tOfNormal(z, dof) - t;
  return z;
}

/** t_ν from z at the same probability, to ν⁻⁴. Source: Abramowitz & Stegun 26.7.5 (from memory). */
function tOfNormal(z: number, dof: number): number {
  const s = z * z;
  const g1 = (s + 1) / 4;
  const g2 = ((5 * s + 16) * s + 3) / 96;
  const g3 = (((3 * s + 19) * s + 17) * s - 15) / 384;
  const g4 = ((((79 * s + 776) * s + 1482) * s - 1920) * s - 945) / 92160;
  return z + (z / dof) * (g1 + (g2 + (g3 + g4 / dof) / dof) / dof);
}

/**
 * Distribution function of Student's t with ν degrees of freedom.
 *
 * Valid: any t, ν > 0 real, Infinity the normal distribution.
 * Source: P(|T| > t) = I_x(ν/2, ½), x = ν/(ν + t²) (Abramowitz & Stegun 26.7.1, from memory).
 * @throws RangeError when t is not a number or ν is not positive
 */
export function tCdf(t: number, dof: number): number {
  checkDof(dof, Infinity);
  if (Number.isNaN(t)) throw new RangeError('tCdf: t is not a number');
  const { lower, upper } = absoluteTTails(Math.abs(t), dof);
  return t < 0 ? 0.5 * upper : 0.5 + 0.5 * lower;
}

/** Density of Student's t times t; no overflow for a large t. */
function tTimesDensity(t: number, dof: number): number {
  const lnConstant = lnGammaRatio(dof / 2) - 0.5 * Math.log(Math.PI * dof);
  return Math.exp(lnConstant + Math.log(t) - ((dof + 1) / 2) * Math.log1p((t / dof) * t));
}

/** ln [Γ(a + ½)/Γ(a)]; only steers Newton steps, so the cancellation for a large a does no harm. */
const lnGammaRatio = (a: number): number => lnGamma(a + 0.5) - lnGamma(a);

/**
 * x > 0 where a tail of a distribution has a given value, by Newton's method on ln(tail) against ln x.
 * The tails are concave in these coordinates, so the steps settle from any start.
 */
function whereTail(wanted: number, tail: (x: number) => number, timesDensity: (x: number) => number, direction: 1 | -1, start: number): number {
  let lnX = Math.log(start);
  for (let k = 0; k < STEP_LIMIT; k += 1) {
    const x = Math.exp(lnX);
    const found = tail(x);
    const slope = timesDensity(x) / found;
    let step: number;
    if (found === 0) step = direction;
    else if (slope > 0) step = (direction * Math.log(wanted / found)) / slope;
    else step = wanted > found ? direction : -direction;
    if (Math.abs(step) < LAST_STEP) return x * Math.exp(step);
    lnX += Math.max(-LONGEST_STEP, Math.min(LONGEST_STEP, step));
    if (lnX < LOWEST_LN || lnX > HIGHEST_LN) {
      throw new RangeError(`quantile: it is beyond what a double holds, tail ${wanted}`);
    }
  }
  throw new Error(`quantile: no convergence, tail ${wanted}, start ${start}`);
}

/**
 * Quantile of Student's t: t with F_ν(t) = p.
 *
 * Valid: 0 < p < 1, ν > 0 real (effective degrees of freedom need not be whole), Infinity the normal distribution.
 * Source: inversion of tCdf; for ν ≥ 1e5 Abramowitz & Stegun 26.7.5 (from memory).
 * @throws RangeError when p is outside (0, 1), ν is not positive, or |t| would exceed 1e150 (ν far below 1)
 */
export function tQuantile(p: number, dof: number): number {
  checkProbability(p);
  checkDof(dof, Infinity);
  if (p === 0.5) return 0;
  const z = Math.abs(normalQuantile(p));
  const sign = p < 0.5 ? -1 : 1;
  if (dof === Infinity) return sign * z;
  if (dof >= T_SERIES_FROM) return sign * tOfNormal(z, dof);
  const outside = 2 * Math.min(p, 1 - p);
  const inside = 2 * Math.abs(p - 0.5);
  const start = dof < 2 ? z + 1e-3 : tOfNormal(z, dof);
  const density = (t: number): number => 2 * tTimesDensity(t, dof);
  const t =
    inside < 0.5
      ? whereTail(inside, (x) => absoluteTTails(x, dof).lower, density, 1, z)
      : whereTail(outside, (x) => absoluteTTails(x, dof).upper, density, -1, start);
  return sign * t;
}

/** Largest ν of the chi-square functions: their series take some √ν terms. */
const CHI_SQUARE_DOF_LIMIT = 1e9;

/**
 * Distribution function of chi-square with ν degrees of freedom: P(ν/2, x/2).
 *
 * Valid: x ≥ 0, 0 < ν ≤ 1e9.
 * Source: Abramowitz & Stegun 26.4.19 (from memory).
 * @throws RangeError when an argument is out of its range
 */
export function chiSquareCdf(x: number, dof: number): number {
  checkDof(dof, CHI_SQUARE_DOF_LIMIT);
  return incompleteGamma(dof / 2, x / 2).lower;
}

/**
 * Quantile of chi-square: x with P(ν/2, x/2) = p.
 *
 * Valid: 0 < p < 1, 0 < ν ≤ 1e9.
 * Source: inversion of chiSquareCdf from the Wilson–Hilferty start (Abramowitz & Stegun 26.4.17, from memory).
 * @throws RangeError when an argument is out of its range, or x would be below 1e-300
 */
export function chiSquareQuantile(p: number, dof: number): number {
  checkProbability(p);
  checkDof(dof, CHI_SQUARE_DOF_LIMIT);
  const a = dof / 2;
  const lnGammaA = lnGamma(a);
  const c = 2 / (9 * dof);
  const cubeRoot = 1 - c + normalQuantile(p) * Math.sqrt(c);
  // Near 0 the distribution function is (x/2)^a/Γ(a + 1).
  const start = cubeRoot > 0.2 ? dof * cubeRoot ** 3 : Math.max(1e-300, 2 * Math.exp((Math.log(p * a) + lnGammaA) / a));
  const timesDensity = (x: number): number => Math.exp(a * Math.log(x / 2) - x / 2 - lnGammaA);
  return p <= 0.5
    ? whereTail(p, (x) => incompleteGamma(a, x / 2).lower, timesDensity, 1, start)
    : whereTail(1 - p, (x) => incompleteGamma(a, x / 2).upper, timesDensity, -1, start);
}

/**
 * Distribution function of F with ν₁ and ν₂ degrees of freedom.
 *
 * Valid: f ≥ 0, both ν > 0 and finite.
 * Source: I_x(ν₁/2, ν₂/2), x = ν₁f/(ν₁f + ν₂) (Abramowitz & Stegun 26.6.2, from memory).
 * @throws RangeError when an argument is out of its range
 */
export function fCdf(f: number, numeratorDof: number, denominatorDof: number): number {
  checkDof(numeratorDof, Number.MAX_VALUE);
  checkDof(denominatorDof, Number.MAX_VALUE);
  if (!(f >= 0)) throw new RangeError(`fCdf: f is ${f}`);
  if (f === Infinity) return 1;
  const ratio = (numeratorDof / denominatorDof) * f;
  return incompleteBeta(numeratorDof / 2, denominatorDof / 2, ratio / (1 + ratio), 1 / (1 + ratio)).lower;
}
