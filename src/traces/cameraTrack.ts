/** The arc that a marker draws in the picture: its centre, its radius in pixels, and how the plumb line leans there. */
import { solveSymmetric } from '../numeric/linearAlgebra.ts';

export interface Arc {
  readonly status: 'fitted';
  /** px, y downward. */
  readonly centre: readonly [across: number, down: number];
  readonly radius: number;
  /** Standard uncertainty of the radius by the scatter of the points about the arc, px. */
  readonly uRadius: number;
  /** sd of the points off the arc, px. */
  readonly noise: number;
  /** Angle that the points span about the centre, rad. */
  readonly span: number;
  /** Covariance of the centre, px². */
  readonly covariance: readonly [acrossAcross: number, acrossDown: number, downDown: number];
}

export type ArcResult = Arc | { readonly status: 'tooFew' | 'tooShort' };

/** Points that are fitted; of more, evenly some. */
const MOST = 4000;
const FEWEST = 20;
const ROUNDS = 60;
const SETTLED = 1e-10;
/** A radius known to no better than this part of itself is none. */
const NOT_TOLD = 0.2;
/** The height of the arc over the scatter: below, the nearest circle is one through the scatter, and too small. */
const LEAST_HEIGHT = 2;

/** Distances from a circle and their slopes, summed for a Gauss–Newton step. */
function step(u: readonly number[], v: readonly number[], a: number, b: number, r: number): { readonly squares: number; readonly normal: number[][]; readonly right: number[] } {
  const normal = [[0, 0, 0], [0, 0, 0], [0, 0, 0]];
  const right = [0, 0, 0];
  let squares = 0;
  for (let i = 0; i < u.length; i++) {
    const [du, dv] = [u[i]! - a, v[i]! - b];
    const d = Math.hypot(du, dv) || 1e-12;
    const off = d - r;
    const row = [-du / d, -dv / d, -1];
    squares += off * off;
    for (let j = 0; j < 3; j++) {
      right[j]! -= row[j]! * off;
      for (let k = 0; k < 3; k++) normal[j]![k]! += row[j]! * row[k]!;
    }
  }
  return { squares, normal, right };
}

/** The circle by the linear least squares of u² + v² on u, v and 1. Source: I. Kåsa, IEEE Trans. Instrum. Meas. 25 (1976) 8, from memory. */
function start(u: readonly number[], v: readonly number[]): readonly [number, number, number] | null {
  const normal = [[0, 0, 0], [0, 0, 0], [0, 0, 0]];
  const right = [0, 0, 0];
  for (let i = 0; i < u.length; i++) {
    const row = [u[i]!, v[i]!, 1];
    const y = u[i]! ** 2 + v[i]! ** 2;
    for (let j = 0; j < 3; j++) {
      right[j]! += row[j]! * y;
      for (let k = 0; k < 3; k++) normal[j]![k]! += row[j]! * row[k]!;
    }
  }
  const solved = solveSymmetric(normal, right);
  if (solved.status !== 'solved') return null;
  const [a, b] = [solved.x[0]! / 2, solved.x[1]! / 2];
  const r2 = solved.x[2]! + a * a + b * b;
  return r2 > 0 ? [a, b, Math.sqrt(r2)] : null;
}

/**
 * The circle nearest to the points, by the sum of their squared distances.
 *
 * Valid: an arc whose height stands clear of the scatter; points of one circle, as the picture of a plane parallel to the camera's is.
 * Source: geometric least squares by Gauss–Newton steps, derived.
 */
export function fitArc(across: Float64Array, down: Float64Array, use?: Uint8Array): ArcResult {
  const places: number[] = [];
  for (let i = 0; i < across.length; i++) if (use?.[i] !== 0 && Number.isFinite(across[i]!) && Number.isFinite(down[i]!)) places.push(i);
  if (places.length < FEWEST) return { status: 'tooFew' };
  const every = Math.ceil(places.length / MOST);
  const some = places.filter((_, k) => k % every === 0);
  const mean = (of: Float64Array): number => some.reduce((sum, i) => sum + of[i]!, 0) / some.length;
  const [mu, mv] = [mean(across), mean(down)];
  // About their mean and in units of their reach, so that nothing is lost in large numbers.
  const reach = Math.sqrt(some.reduce((sum, i) => sum + (across[i]! - mu) ** 2 + (down[i]! - mv) ** 2, 0) / some.length);
  if (!(reach > 0)) return { status: 'tooShort' };
  const [u, v] = [some.map((i) => (across[i]! - mu) / reach), some.map((i) => (down[i]! - mv) / reach)];
  const begun = start(u, v);
  if (!begun) return { status: 'tooShort' };
  let [a, b, r] = begun;
  let here = step(u, v, a, b, r);
  for (let round = 0; round < ROUNDS; round++) {
    const solved = solveSymmetric(here.normal, here.right);
    if (solved.status !== 'solved') return { status: 'tooShort' };
    let part = 1;
    let next = step(u, v, a + solved.x[0]!, b + solved.x[1]!, r + solved.x[2]!);
    while (next.squares > here.squares * (1 + 1e-12) && part > 1e-4) {
      part /= 2;
      next = step(u, v, a + part * solved.x[0]!, b + part * solved.x[1]!, r + part * solved.x[2]!);
    }
    [a, b, r, here] = [a + part * solved.x[0]!, b + part * solved.x[1]!, r + part * solved.x[2]!, next];
    if (Math.abs(part * solved.x[2]!) < SETTLED * r) break;
  }
  const [ea, eb, er] = [0, 1, 2].map((j) => solveSymmetric(here.normal, [0, 1, 2].map((k) => (k === j ? 1 : 0))));
  if (ea!.status !== 'solved' || eb!.status !== 'solved' || er!.status !== 'solved') return { status: 'tooShort' };
  const variance = (here.squares / (u.length - 3)) * reach * reach;
  const uRadius = Math.sqrt(variance * er!.x[2]!);
  if (!(uRadius < NOT_TOLD * r * reach)) return { status: 'tooShort' };
  const middle = Math.atan2(-b, -a);
  const turns = u.map((value, i) => Math.atan2(Math.sin(Math.atan2(v[i]! - b, value - a) - middle), Math.cos(Math.atan2(v[i]! - b, value - a) - middle)));
  const span = turns.reduce((m, x) => Math.max(m, x), -Infinity) - turns.reduce((m, x) => Math.min(m, x), Infinity);
  if (!(r * reach * (1 - Math.cos(Math.min(Math.PI, span / 2))) > LEAST_HEIGHT * Math.sqrt(variance) && r * reach > 5 * LEAST_HEIGHT * Math.sqrt(variance))) return { status: 'tooShort' };
  return {
    status: 'fitted', centre: [mu + a * reach, mv + b * reach], radius: r * reach, uRadius, noise: Math.sqrt(variance), span,
    covariance: [variance * ea!.x[0]!, variance * ea!.x[1]!, variance * eb!.x[1]!],
  };
}

/**
 * How the plumb line leans in the picture: the angle of (rest − centre) from straight down, positive towards larger `across`, rad, and its u.
 * A lean makes x = R sin θ short by cos of it, and no difference to angles about a tracked pivot.
 */
export function leanOf({ centre: [a, b], covariance: [aa, ab, bb] }: Pick<Arc, 'centre' | 'covariance'>, rest: readonly [across: number, down: number]): { readonly value: number; readonly u: number } {
  const [du, dv] = [rest[0] - a, rest[1] - b];
  const d2 = du * du + dv * dv;
  // ∂/∂a = −dv/d², ∂/∂b = du/d².
  return { value: Math.atan2(du, dv), u: Math.sqrt(Math.max(0, (dv * dv * aa - 2 * du * dv * ab + du * du * bb) / (d2 * d2))) };
}
