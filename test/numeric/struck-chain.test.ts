/** The chain, whose links hold to 1e-3 of what a segment leaves unknown, against the same least-squares problem written out in full and solved by Householder reflections. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { solveChain, type JointValue, type Link } from '../../src/numeric/struckChain.ts';
import { draws } from '../metrology/sources.ts';

interface Row {
  readonly segment: number;
  readonly p: number;
  readonly v: number;
  readonly shared: readonly number[];
  readonly y: number;
}

interface Chain {
  readonly segments: number;
  readonly shared: number;
  readonly links: readonly (Link | null)[];
  readonly rows: readonly Row[];
}

function randomChain(seed: number, segments: number, shared: number): Chain {
  const { normal, uniform } = draws(seed);
  const links = Array.from({ length: segments - 1 }, (_, k): Link | null => (k % 4 === 3 ? null : { a: normal(), b: k % 5 === 2 ? 0 : normal(), drive: shared > 0 && uniform() > 0.4 ? [[Math.floor(uniform() * shared), normal()]] : [] }));
  const rows = Array.from({ length: segments }, (_, k) => Array.from({ length: 7 + (k % 4) }, (): Row => ({ segment: k, p: normal(), v: normal(), shared: Array.from({ length: shared }, () => normal()), y: normal() }))).flat();
  return { segments, shared, links, rows };
}

function addRow(form: Float64Array, n: number, x: readonly number[]): void {
  for (let i = 0; i < n; i++) for (let j = i; j < n; j++) form[i * n + j]! += x[i]! * x[j]!;
}

const solveByChain = ({ segments, shared, links, rows }: Chain) =>
  solveChain(segments, shared, links, (k, form) => {
    for (const row of rows) if (row.segment === k) addRow(form, shared + 3, [row.p, row.v, ...row.shared, row.y]);
  });

/** State of segment k as a row over the free unknowns: p₀, v₀, then v (and p where no link) of each next segment, then γ. */
function dense({ shared, links, rows }: Chain) {
  const free = 2 + links.reduce((sum, link) => sum + (link ? 1 : 2), 0);
  const m = free + shared;
  const unit = (at: number): number[] => Array.from({ length: m }, (_, i) => (i === at ? 1 : 0));
  const states: (readonly [number[], number[]])[] = [[unit(0), unit(1)]];
  let next = 2;
  links.forEach((link, k) => {
    const [p, v] = states[k]!;
    if (link) {
      const moved = p.map((value, i) => link.a * value + link.b * v[i]! + link.drive.reduce((sum, [j, g]) => sum + (i === free + j ? g : 0), 0));
      states.push([moved, unit(next++)]);
    } else states.push([unit(next++), unit(next++)]);
  });
  const normal = Array.from({ length: m }, () => new Array<number>(m + 1).fill(0));
  for (const row of rows) {
    const [p, v] = states[row.segment]!;
    const x = p.map((value, i) => row.p * value + row.v * v[i]! + (i >= free ? row.shared[i - free]! : 0));
    for (let i = 0; i < m; i++) {
      for (let j = 0; j < m; j++) normal[i]![j]! += x[i]! * x[j]!;
      normal[i]![m]! += x[i]! * row.y;
    }
  }
  const inverse = invert(normal.map((row) => row.slice(0, m)));
  const solution = inverse.map((row) => row.reduce((sum, value, j) => sum + value * normal[j]![m]!, 0));
  const asRow = (k: number, value: JointValue): number[] => {
    const [[p, v], [q, w]] = [states[k]!, states[k + 1]!];
    return p.map((x, i) => value.position * x + value.velocity * v[i]! + value.nextPosition * q[i]! + value.nextVelocity * w[i]! + value.shared.reduce((sum, [j, s]) => sum + (i === free + j ? s : 0), 0));
  };
  const cov = (x: readonly number[], y: readonly number[]): number => x.reduce((sum, value, i) => sum + value * inverse[i]!.reduce((inner, c, j) => inner + c * y[j]!, 0), 0);
  return { states, solution, free, cov, asRow, valueOf: (x: readonly number[]): number => x.reduce((sum, value, i) => sum + value * solution[i]!, 0), unit };
}

function invert(matrix: readonly (readonly number[])[]): number[][] {
  const n = matrix.length;
  const rows = matrix.map((row, i) => [...row, ...Array.from({ length: n }, (_, j) => (i === j ? 1 : 0))]);
  for (let i = 0; i < n; i++) {
    const pivot = rows.slice(i).reduce((best, row, at) => (Math.abs(row[i]!) > Math.abs(rows[best]![i]!) ? at + i : best), i);
    [rows[i], rows[pivot]] = [rows[pivot]!, rows[i]!];
    const by = rows[i]![i]!;
    rows[i] = rows[i]!.map((value) => value / by);
    for (let k = 0; k < n; k++) if (k !== i) {
      const part = rows[k]![i]!;
      rows[k] = rows[k]!.map((value, j) => value - part * rows[i]![j]!);
    }
  }
  return rows.map((row) => row.slice(n));
}

const jointValue = (seed: number, shared: number): JointValue => {
  const { normal } = draws(seed);
  return { nextPosition: normal(), nextVelocity: normal(), position: normal(), velocity: normal(), shared: shared > 0 ? [[shared - 1, normal()]] : [] };
};
const close = (found: number, expected: number, scale: number): void => expect(Math.abs(found - expected)).toBeLessThan(3e-5 * (1 + scale));

describe('a chain of segments', () => {
  it('has the solution and the covariances of the problem written out', () => {
    fc.assert(fc.property(fc.integer({ min: 1, max: 1e6 }), fc.integer({ min: 1, max: 9 }), fc.integer({ min: 0, max: 4 }), (seed, segments, shared) => {
      const chain = randomChain(seed, segments, shared);
      const found = solveByChain(chain);
      expect(found.status).toBe('solved');
      if (found.status !== 'solved') return;
      const full = dense(chain);
      full.states.forEach(([p, v], k) => {
        close(found.positions[k]!, full.valueOf(p), Math.abs(full.valueOf(p)));
        close(found.velocities[k]!, full.valueOf(v), Math.abs(full.valueOf(v)));
      });
      for (let j = 0; j < shared; j++) close(found.shared[j]!, full.solution[full.free + j]!, 10);
      const covariances = found.covariances();
      const valueAt = (k: number): JointValue => jointValue(seed + k, shared);
      for (let k = 0; k < segments - 1; k++) {
        const row = full.asRow(k, valueAt(k));
        const variance = full.cov(row, row);
        close(covariances.ofJoint(k, valueAt(k)), variance, variance);
        const gamma = covariances.withShared(k, valueAt(k));
        for (let j = 0; j < shared; j++) close(gamma[j]!, full.cov(row, full.unit(full.free + j)), variance);
        const earlier = covariances.withEarlier(k, valueAt(k), valueAt, 99);
        expect(earlier).toHaveLength(k);
        earlier.forEach((value, i) => close(value, full.cov(row, full.asRow(k - 1 - i, valueAt(k - 1 - i))), variance));
        const states = covariances.withStates(k, valueAt(k), 0, segments - 1);
        full.states.forEach(([p, v], s) => {
          close(states.positions[s]!, full.cov(row, p), variance + Math.abs(full.cov(p, p)));
          close(states.velocities[s]!, full.cov(row, v), variance + Math.abs(full.cov(v, v)));
        });
      }
      for (let i = 0; i < shared; i++) for (let j = 0; j < shared; j++) close(covariances.shared[i]![j]!, full.cov(full.unit(full.free + i), full.unit(full.free + j)), 10);
    }), { numRuns: 200 });
  });

  it('has the sum of squares of its residuals', () => {
    const chain = randomChain(7, 6, 2);
    const found = solveByChain(chain);
    if (found.status !== 'solved') throw new Error(found.status);
    const sum = chain.rows.reduce((total, { segment, p, v, shared, y }) => total + (y - p * found.positions[segment]! - v * found.velocities[segment]! - shared.reduce((inner, x, j) => inner + x * found.shared[j]!, 0)) ** 2, 0);
    expect(found.sumOfSquares).toBeCloseTo(sum, 5);
  });

  it('says which segment tells too little', () => {
    const chain = randomChain(3, 5, 1);
    expect(solveByChain({ ...chain, rows: chain.rows.filter(({ segment }) => segment !== 4) })).toEqual({ status: 'notTold', segment: 4 });
  });
});
