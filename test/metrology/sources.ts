/** Sources, sums of them and seeded draws for the tests of uncertain numbers. */
import type { Family, Source } from '../../src/metrology/source.ts';
import { standardUncertainty, covariance, type Uncertain } from '../../src/metrology/uncertain.ts';

export function source(id: string, estimate: number, u: number, dof = Infinity, family?: Family): Source {
  const plain: Source = { id, label: id, symbol: id, dimension: 'number', estimate, u, distribution: Number.isFinite(dof) ? 't' : 'normal', dof };
  return family ? { ...plain, family } : plain;
}

/** r(y, z) = u(y, z)/(u(y) u(z)). */
export const correlation = (y: Uncertain, z: Uncertain): number => covariance(y, z) / (standardUncertainty(y) * standardUncertainty(z));

export const meanOf = (x: readonly number[]): number => x.reduce((a, b) => a + b, 0) / x.length;
export const deviationOf = (x: readonly number[]): number => {
  const mean = meanOf(x);
  return Math.sqrt(x.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (x.length - 1));
};

export interface Draws {
  /** Uniform on (0, 1). */
  readonly uniform: () => number;
  /** Standard normal. */
  readonly normal: () => number;
}

/** Seeded draws: Park and Miller's multiplicative generator (Comm. ACM 31 (1988) 1192, from memory), Box and Muller's normals. */
export function draws(seed: number): Draws {
  const MODULUS = 2147483647;
  let state = seed;
  const uniform = (): number => {
    state = (state * 48271) % MODULUS;
    return state / MODULUS;
  };
  return { uniform, normal: () => Math.sqrt(-2 * Math.log(uniform())) * Math.cos(2 * Math.PI * uniform()) };
}
