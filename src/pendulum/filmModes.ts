/**
 * Natural frequencies and mode shapes of a hanging film with its own weight, bending stiffness and an end plate.
 *
 *   y_ττ = ((1 − ξ + P) y′)′ − S y⁗,   ξ = x/L from the pivot, τ = t √(g/L),   T(ξ) = w′L (1 − ξ + P)
 *
 * clamped or hinged above, free below, P = plate mass/film mass as a point at the tip; Galerkin's method on `filmElements`.
 */
import { symmetricEigen } from '../numeric/symmetricEigen.ts';
import type { Mesh, MeshChoice } from './filmElements.ts';
import { assemble, functionsAt, layMesh, meanFunctions } from './filmElements.ts';

/** How the film is held above: gripped so that it leaves straight down, or free to turn. */
export type FilmHold = 'clamped' | 'hinged';

export interface HangingFilm {
  /** S = EI/(w′L³) · 1 · 0 or 1e-7 … 1e6. With S = 0 nothing holds a slope, and clamped is hinged. */
  readonly stiffnessNumber: number;
  /** P = plate mass/film mass · 1 · 0 … 1e6 · a point at the tip. A plate of some height swings as a second pendulum (methods 1.18, 8): struck and read at its centre of mass it is near this model, at its edge it is not. */
  readonly plateRatio: number;
  readonly hold: FilmHold;
}

/** Modes by ascending frequency, with shapes scaled to a stiffness of 1, so that the modal mass is 1/ω². */
export interface FilmModes {
  /** ω_n √(L/g) · 1. */
  readonly frequencies: Float64Array;
  readonly mesh: Mesh;
  /** Row n: the coefficients of mode n in the elements' functions. */
  readonly shapes: Float64Array;
  /** y(1)/L by a static pull of 1 m g at the tip · 1 · without end as S → 0 without a plate. */
  readonly staticTipCompliance: number;
}

/** S below this and above 0 leaves the tip's bending layer, S^{1/3} long, shorter than the mesh follows. */
export const LEAST_STIFFNESS_NUMBER = 1e-7;
export const LARGEST_STIFFNESS_NUMBER = 1e6;

/** From convergence tests: damped (ζ = 0.02) first maxima to 5e-4, mostly 1e-5; lossless ones, which ripple without end, to 3e-3, mostly 5e-4. */
export const USUAL_MESH: MeshChoice = { elements: 10, degree: 8 };

/** λ⁻¹ of a mode below this share of the first's is lost in rounding; such modes move no reading. */
const LOST = 1e-13;

/**
 * ω_n √(L/g) and shapes of all modes that the mesh holds.
 *
 * K v = λ M v is turned over to C⁻¹ M C⁻ᵀ u = λ⁻¹ u with K = C Cᵀ: rounding then falls on the highest modes, which do
 * not matter, instead of on the first, since the stiffness of the shortest elements is some 1e14 times that of mode 1.
 * On a hinge that rounding still costs ω₁ some 1e-9 S, relative; at a clamp nothing.
 * @throws RangeError when S or P is out of its range
 */
export function filmModes(film: HangingFilm, choice: MeshChoice = USUAL_MESH): FilmModes {
  const { stiffnessNumber: S, plateRatio: P, hold } = film;
  if (!(S === 0 || (S >= LEAST_STIFFNESS_NUMBER && S <= LARGEST_STIFFNESS_NUMBER))) {
    throw new RangeError(`film modes: stiffness number ${S} is neither 0 nor in ${LEAST_STIFFNESS_NUMBER} … ${LARGEST_STIFFNESS_NUMBER}`);
  }
  if (!(P >= 0 && P <= 1e6)) throw new RangeError(`film modes: plate ratio ${P} is not in 0 … 1e6`);
  const clamped = hold === 'clamped' && S > 0;
  const mesh = layMesh(clamped ? Math.sqrt(S / (1 + P)) : 1, choice);
  const { stiffness, mass } = assemble(mesh, S, P);
  // Held unknowns are the first: y(0), and y′(0) at a clamp.
  const held = clamped ? 2 : 1;
  const n = mesh.unknowns - held;
  const band = choice.degree;
  const k = cut(stiffness, mesh.unknowns, held);
  const c = bandedCholesky(n, band, k);
  const flexibility = turnOver(n, band, c, cut(mass, mesh.unknowns, held));
  const eigen = symmetricEigen(n, flexibility);
  if (eigen.status !== 'found') throw new Error(`film modes: no eigenvalues (${eigen.status}) at S = ${S}, P = ${P}`);
  const least = LOST * eigen.values[n - 1]!;
  const count = eigen.values.reduce((kept, value) => (value > least ? kept + 1 : kept), 0);
  const frequencies = new Float64Array(count);
  const shapes = new Float64Array(count * mesh.unknowns);
  for (let mode = 0; mode < count; mode += 1) {
    const from = n - 1 - mode;
    frequencies[mode] = 1 / Math.sqrt(eigen.values[from]!);
    const shape = eigen.vectors.slice(from * n, (from + 1) * n);
    solveUpper(n, band, c, shape);
    shapes.set(shape, mode * mesh.unknowns + held);
  }
  const pull = new Float64Array(n);
  pull[n - 2] = 1;
  solveLower(n, band, c, pull);
  const staticTipCompliance = pull.reduce((sum, x) => sum + x * x, 0);
  return { frequencies, mesh, shapes, staticTipCompliance };
}

/** Value of every mode at a height ξ (beyond the tip along the tip's tangent), on the scale of `shapes`. */
export const modesAt = (modes: FilmModes, height: number): Float64Array => weigh(modes, functionsAt(modes.mesh, height));

/**
 * Mean of every mode over a zone ξ = from … to; its value where the zone is a point.
 *
 * A zone may reach past the tip, along the tip's tangent, so that half-differences about 1 exist.
 */
export const modesOver = (modes: FilmModes, from: number, to: number): Float64Array =>
  weigh(modes, from === to ? functionsAt(modes.mesh, from) : meanFunctions(modes.mesh, from, to));

/** Modal mass of mode n with its shape 1 at the tip, as a share of the film's mass (plate included). Source: definition, M_n/φ_n(1)². */
export function modalTipMass(modes: FilmModes, mode: number): number {
  const tip = modesAt(modes, 1)[mode]!;
  return 1 / (modes.frequencies[mode]! * tip) ** 2;
}

function weigh(modes: FilmModes, weights: Float64Array): Float64Array {
  const { shapes, frequencies } = modes;
  const size = weights.length;
  const sums = new Float64Array(frequencies.length);
  for (let mode = 0; mode < sums.length; mode += 1) {
    let sum = 0;
    for (let i = 0, at = mode * size; i < size; i += 1, at += 1) sum += shapes[at]! * weights[i]!;
    sums[mode] = sum;
  }
  return sums;
}

/** Without the first `held` rows and columns. */
function cut(a: Float64Array, size: number, held: number): Float64Array {
  const n = size - held;
  const out = new Float64Array(n * n);
  for (let i = 0; i < n; i += 1) out.set(a.subarray((i + held) * size + held, (i + held + 1) * size), i * n);
  return out;
}

/** C with K = C Cᵀ, in place of K's lower triangle. */
function bandedCholesky(n: number, band: number, k: Float64Array): Float64Array {
  for (let i = 0; i < n; i += 1) {
    const start = Math.max(0, i - band);
    for (let j = start; j <= i; j += 1) {
      let sum = k[i * n + j]!;
      for (let m = start; m < j; m += 1) sum -= k[i * n + m]! * k[j * n + m]!;
      if (j < i) k[i * n + j] = sum / k[j * n + j]!;
      else if (sum > 0) k[i * n + i] = Math.sqrt(sum);
      else throw new Error(`film modes: the stiffness is not positive at unknown ${i} of ${n}`);
    }
  }
  return k;
}

function solveLower(n: number, band: number, c: Float64Array, b: Float64Array): void {
  for (let i = 0; i < n; i += 1) {
    let sum = b[i]!;
    for (let m = Math.max(0, i - band); m < i; m += 1) sum -= c[i * n + m]! * b[m]!;
    b[i] = sum / c[i * n + i]!;
  }
}

function solveUpper(n: number, band: number, c: Float64Array, b: Float64Array): void {
  for (let i = n - 1; i >= 0; i -= 1) {
    const x = b[i]! / c[i * n + i]!;
    b[i] = x;
    for (let m = Math.max(0, i - band); m < i; m += 1) b[m]! -= c[i * n + m]! * x;
  }
}

/** C⁻¹ M C⁻ᵀ. Rows of M are solved first, which gives M C⁻ᵀ; then its columns, which are rows of the transpose. */
function turnOver(n: number, band: number, c: Float64Array, m: Float64Array): Float64Array {
  for (let row = 0; row < n; row += 1) solveLower(n, band, c, m.subarray(row * n, (row + 1) * n));
  const t = new Float64Array(n * n);
  for (let i = 0; i < n; i += 1) for (let j = 0; j < n; j += 1) t[j * n + i] = m[i * n + j]!;
  for (let row = 0; row < n; row += 1) solveLower(n, band, c, t.subarray(row * n, (row + 1) * n));
  return t;
}
