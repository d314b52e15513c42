/** The adjustment against other ways to the same numbers: York's line, plain least squares with every source a parameter, minimisation by search, Monte Carlo. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { adjust, type Adjustment, type AdjustmentItem } from '../../src/metrology/adjustment.ts';
import { expanded, finiteSources } from '../../src/metrology/coverage.ts';
import type { Source } from '../../src/metrology/source.ts';
import { combine, covariance, exact, ofSource, standardUncertainty, type Uncertain } from '../../src/metrology/uncertain.ts';
import { leastSquares } from '../../src/numeric/linearAlgebra.ts';
import { yorkLine } from '../../src/numeric/lines.ts';
import { normalQuantile } from '../../src/numeric/quantiles.ts';
import lines from '../reference/lines.json';
import { draws, meanOf, source } from './sources.ts';

type Problem = Parameters<typeof adjust>[0];
type X = Readonly<Record<string, number>>;

function found(x: Problem): Adjustment {
  const result = adjust(x);
  if (result.status !== 'adjusted') throw new Error(result.status);
  return result;
}

const onLine = (u: X, x: X): number => u['a']! + u['b']! * x['x']! - x['y']!;

interface Points {
  readonly x: readonly number[];
  readonly y: readonly number[];
  readonly ux: readonly number[];
  readonly uy: readonly number[];
  readonly r: readonly number[];
}

/** x and y of a point of correlation r: y = r u_y of x's source and √(1 − r²) u_y of its own. */
function lineAsAdjustment({ x, y, ux, uy, r }: Points, start: readonly [a: number, b: number]): Adjustment {
  return found({
    unknowns: [{ name: 'a', start: start[0], positive: false }, { name: 'b', start: start[1], positive: false }],
    items: x.map((value, i) => {
      const [first, second] = [ofSource(source(`first${i}`, 0, 1)), ofSource(source(`second${i}`, 0, 1))];
      const inputs = { x: { y: { ...combine([[ux[i]!, first]]), value }, positive: false }, y: { y: { ...combine([[r[i]! * uy[i]!, first], [Math.sqrt(1 - r[i]! ** 2) * uy[i]!, second]]), value: y[i]! }, positive: false } };
      return { id: String(i), label: '', residual: onLine, inputs };
    }),
  });
}

describe('a line with uncertainties in both axes is York’s line', () => {
  const reference = (id: string): { readonly inputs: Readonly<Record<string, unknown>>; readonly expected: Readonly<Record<string, number>> } => lines.find((set) => set.id === id)! as never;
  const listOf = (value: unknown, n: number): readonly number[] => (Array.isArray(value) ? (value as number[]) : Array.from({ length: n }, () => Number(value)));

  it('on Pearson’s data with York’s weights (York et al., Am. J. Phys. 72 (2004) 367; b01 in test/reference)', () => {
    const { inputs, expected } = reference('b01-pearson-york');
    const [x, y, wx, wy] = ['x', 'y', 'wx', 'wy'].map((name) => listOf(inputs[name], 0)) as [readonly number[], readonly number[], readonly number[], readonly number[]];
    const ofWeight = (w: number): number => 1 / Math.sqrt(w);
    const line = lineAsAdjustment({ x, y, ux: wx.map(ofWeight), uy: wy.map(ofWeight), r: x.map(() => 0) }, [5, -0.5]);
    const [a, b] = [line.unknowns['a']!, line.unknowns['b']!];
    expect(a.value).toBeCloseTo(expected['intercept']!, 7);
    expect(b.value).toBeCloseTo(expected['slope']!, 8);
    expect(standardUncertainty(a)).toBeCloseTo(expected['sigma_intercept']!, 7);
    expect(standardUncertainty(b)).toBeCloseTo(expected['sigma_slope']!, 8);
    expect(covariance(a, b)).toBeCloseTo(expected['cov']!, 8);
    expect(line.chiSquared).toBeCloseTo(expected['S']!, 7);
    expect(line.dof).toBe(8);
    const york = yorkLine(x, y, wx.map(ofWeight), wy.map(ofWeight));
    if (york.status !== 'fitted') throw new Error(york.status);
    expect(b.value / york.slope).toBeCloseTo(1, 9);
    expect(standardUncertainty(a) / york.uIntercept).toBeCloseTo(1, 8);
  });

  it('with x and y correlated point by point (York’s unified equations, recomputed independently; b06)', () => {
    const { inputs, expected } = reference('b06-york-corr');
    const x = listOf(inputs['x'], 0);
    const line = lineAsAdjustment({ x, y: listOf(inputs['y'], 0), ux: listOf(inputs['sx'], x.length), uy: listOf(inputs['sy'], x.length), r: listOf(inputs['r'], 0) }, [1, 2]);
    expect(line.unknowns['a']!.value).toBeCloseTo(expected['a']!, 8);
    expect(line.unknowns['b']!.value).toBeCloseTo(expected['b']!, 8);
    expect(standardUncertainty(line.unknowns['a']!)).toBeCloseTo(expected['sa']!, 7);
    expect(standardUncertainty(line.unknowns['b']!)).toBeCloseTo(expected['sb']!, 7);
    expect(line.chiSquared).toBeCloseTo(expected['S']!, 7);
  });
});

/** Least of a function with one valley, by golden section. */
function least(f: (x: number) => number, low: number, high: number): number {
  const SECTION = (Math.sqrt(5) - 1) / 2;
  let [a, b] = [low, high];
  for (let i = 0; i < 90; i++) {
    const [c, d] = [b - SECTION * (b - a), a + SECTION * (b - a)];
    if (f(c) < f(d)) b = d;
    else a = c;
  }
  return (a + b) / 2;
}

/** x₁ = 1.0 and x₂ = 1.2, each 3 % by itself, times a scale of 1 ± 20 % that both share. */
const PEELLE = { x: [1, 1.2], own: 0.03, scale: 0.2 } as const;
const byDifference = (u: X, x: X): number => u['m']! - x['s']! * x['x']!;
const byRatio = (u: X, x: X): number => (x['s']! * x['x']!) / u['m']! - 1;
const byLogarithm = (u: X, x: X): number => Math.log(u['m']! / (x['s']! * x['x']!));

function peelle(residual: AdjustmentItem['residual'], positive: boolean): Adjustment {
  const s = ofSource(source('scale', 1, PEELLE.scale));
  const items = PEELLE.x.map((x, i) => ({ id: String(i), label: '', residual, inputs: { x: { y: ofSource(source(`x${i}`, x, PEELLE.own * x)), positive }, s: { y: s, positive } } }));
  return found({ unknowns: [{ name: 'm', start: 1.1, positive: true }], items });
}

describe('1.0 and 1.2 with 3 % own and 20 % shared (R. W. Peelle’s puzzle, 1987, from memory)', () => {
  it('are 0.63 by the covariance written down at the data, which is what must not happen', () => {
    const [a, b] = PEELLE.x;
    const V = (x: number, y: number): number => PEELLE.scale ** 2 * x * y + (x === y ? (PEELLE.own * x) ** 2 : 0);
    const [wa, wb] = [V(b, b) - V(a, b), V(a, a) - V(a, b)];
    expect((wa * a + wb * b) / (wa + wb)).toBeCloseTo(0.63, 2);
  });

  it.each([['difference', byDifference], ['ratio', byRatio], ['logarithm', byLogarithm]] as const)('are √1.2 where all are positive, however the item is written: by %s', (_, residual) => {
    // Least of Σ (ln m/s − ln x_i)²/own² + (ln s)²/scale², the scale found anew for every m.
    const misfit = (m: number, s: number): number => PEELLE.x.reduce((sum, x) => sum + (Math.log(m / (s * x)) / PEELLE.own) ** 2, (Math.log(s) / PEELLE.scale) ** 2);
    const bestScale = (m: number): number => least((s) => misfit(m, s), 0.3, 3);
    const best = least((m) => misfit(m, bestScale(m)), 0.4, 3);
    expect(best).toBeCloseTo(Math.sqrt(1.2), 6);
    const r = peelle(residual, true);
    expect(r.unknowns['m']!.value).toBeCloseTo(best, 5);
    expect(r.chiSquared).toBeCloseTo(misfit(best, 1), 5);
    expect(standardUncertainty(r.unknowns['m']!) / r.unknowns['m']!.value).toBeCloseTo(Math.hypot(PEELLE.scale, PEELLE.own / Math.SQRT2), 6);
    // Nothing in the data speaks against the scale, so it stays.
    expect(r.moved.find(({ source: { id } }) => id === 'scale')!.shift).toBeCloseTo(0, 5);
  });

  it.each([['difference', byDifference], ['ratio', byRatio], ['logarithm', byLogarithm]] as const)('are 1.082 where all move linearly, however the item is written: by %s', (_, residual) => {
    const misfit = (m: number, s: number): number => PEELLE.x.reduce((sum, x) => sum + ((m / s - x) / (PEELLE.own * x)) ** 2, ((s - 1) / PEELLE.scale) ** 2);
    const best = least((m) => misfit(m, least((s) => misfit(m, s), 0.3, 3)), 0.4, 3);
    const r = peelle(residual, false);
    expect(r.unknowns['m']!.value).toBeCloseTo(best, 5);
    expect(r.unknowns['m']!.value).toBeGreaterThan(1);
    expect(r.unknowns['m']!.value).toBeLessThan(1.2);
  });
});

/** A linear problem: items i with own uncertainty and sources that several share; x_i = Σ a_ik p_k. */
interface Linear {
  readonly a: readonly (readonly number[])[];
  readonly shared: readonly (readonly number[])[];
  readonly own: readonly number[];
  readonly x: readonly number[];
}
const NAMES = ['p', 'q', 'r'] as const;
const twoOf = (u: X, x: X): number => x['a']! * u['p']! + x['b']! * u['q']! - x['x']!;
const twoAndBias = (u: X, x: X): number => x['a']! * u['p']! + x['b']! * u['q']! + u['r']! - x['x']!;

const size = fc.double({ min: 0.3, max: 3, noNaN: true });
const signed = fc.double({ min: -2, max: 2, noNaN: true });
/** p and q are told apart whichever item is left out. */
function tellsTwo(rows: readonly (readonly [number, number])[]): boolean {
  const ratios = rows.map(([a, b]) => b / a).sort((x, y) => x - y);
  return ratios.at(-2)! - ratios[1]! > 0.3;
}
const linear: fc.Arbitrary<Linear> = fc.integer({ min: 4, max: 8 }).chain((n) => fc.record({
  a: fc.array(fc.tuple(size, signed), { minLength: n, maxLength: n }).filter(tellsTwo),
  shared: fc.array(fc.tuple(signed, signed), { minLength: n, maxLength: n }), own: fc.array(size, { minLength: n, maxLength: n }), x: fc.array(fc.double({ min: -5, max: 5, noNaN: true }), { minLength: n, maxLength: n }),
}));

const sharedSources = (): readonly Source[] => [source('shared0', 0, 1), source('shared1', 0, 1)];
function itemsOf({ a, shared, own, x }: Linear, residualOf: (i: number) => AdjustmentItem['residual'] = () => twoOf): readonly AdjustmentItem[] {
  const common = sharedSources().map(ofSource);
  return x.map((value, i) => {
    const y: Uncertain = { ...combine([[own[i]!, ofSource(source(`own${i}`, 0, 1))], ...common.map((of, k) => [shared[i]![k]!, of] as const)]), value };
    return { id: String(i), label: '', residual: residualOf(i), inputs: { x: { y, positive: false }, a: { y: exact(a[i]![0]!), positive: false }, b: { y: exact(a[i]![1]!), positive: false } } };
  });
}
const twoUnknowns = NAMES.slice(0, 2).map((name) => ({ name, start: 1, positive: false }));

const foretelling = ({ a, shared }: Pick<Linear, 'a' | 'shared'>, i: number): readonly number[] => [...a[i]!, ...shared[i]!.map((c) => -c)];

/** The same by plain least squares of p, q and the shared sources δ as parameters, each δ one more observation, 0 ± 1: stated x_i = a p + b q − c δ. */
function plainly({ a, shared, own, x }: Linear, left: (i: number) => boolean = () => false) {
  const kept = x.map((_, i) => i).filter((i) => !left(i));
  const rows = [...kept.map((i) => foretelling({ a, shared }, i).map((c) => c / own[i]!)), [0, 0, 1, 0], [0, 0, 0, 1]];
  const solved = leastSquares(rows, [...kept.map((i) => x[i]! / own[i]!), 0, 0]);
  if (solved.status !== 'solved') throw new Error(solved.status);
  return solved;
}

describe('items that share inputs', () => {
  it('give what plain least squares gives with every shared input a parameter whose stated value is observed', () => {
    fc.assert(fc.property(linear, (problem) => {
      const [r, plain] = [found({ unknowns: twoUnknowns, items: itemsOf(problem) }), plainly(problem)];
      for (const [k, name] of (['p', 'q'] as const).entries()) {
        const u = Math.sqrt(plain.covariance[k]![k]!);
        expect((r.unknowns[name]!.value - plain.x[k]!) / u).toBeCloseTo(0, 6);
        expect(standardUncertainty(r.unknowns[name]!) / u).toBeCloseTo(1, 6);
      }
      expect(covariance(r.unknowns['p']!, r.unknowns['q']!) / Math.sqrt(plain.covariance[0]![0]! * plain.covariance[1]![1]!)).toBeCloseTo(plain.covariance[0]![1]! / Math.sqrt(plain.covariance[0]![0]! * plain.covariance[1]![1]!), 6);
      expect(r.chiSquared).toBeCloseTo(plain.sumOfSquares, 5);
      for (const [k, id] of ['shared0', 'shared1'].entries()) expect(r.moved.find((one) => one.source.id === id)?.shift ?? 0).toBeCloseTo(plain.x[2 + k]!, 5);
    }), { numRuns: 60 });
  });

  it('each deviate by what the others foretell of them, shared inputs included, over the u of that difference', () => {
    fc.assert(fc.property(linear, (problem) => {
      const r = found({ unknowns: twoUnknowns, items: itemsOf(problem) });
      for (const [i, { deviation }] of r.items.entries()) {
        const others = plainly(problem, (j) => j === i);
        const c = foretelling(problem, i);
        const foretold = c.reduce((sum, value, k) => sum + value * others.x[k]!, 0);
        const variance = c.reduce((sum, value, k) => sum + c.reduce((inner, other, j) => inner + value * other * others.covariance[k]![j]!, 0), problem.own[i]! ** 2);
        expect(deviation).toBeCloseTo((problem.x[i]! - foretold) / Math.sqrt(variance), 5);
      }
    }), { numRuns: 40 });
  });

  it('each deviate by a bias of their own, taken as one more unknown, over its u; and leaving one out does what is told', () => {
    fc.assert(fc.property(linear, fc.nat({ max: 3 }), (problem, i) => {
      const r = found({ unknowns: twoUnknowns, items: itemsOf(problem) });
      const biased = found({ unknowns: [...twoUnknowns, { name: 'r', start: 0, positive: false }], items: itemsOf(problem, (j) => (j === i ? twoAndBias : twoOf)) });
      expect(r.items[i]!.deviation).toBeCloseTo(biased.unknowns['r']!.value / standardUncertainty(biased.unknowns['r']!), 5);
      const rest = found({ unknowns: twoUnknowns, items: itemsOf(problem).filter((_, j) => j !== i) });
      for (const name of ['p', 'q'] as const) expect(rest.unknowns[name]!.value - r.unknowns[name]!.value).toBeCloseTo(r.items[i]!.without![name]!, 5);
      expect(r.items[i]!.redundancy).toBeGreaterThan(0);
      expect(r.items[i]!.redundancy).toBeLessThanOrEqual(1);
      expect(biased.items[i]!.deviation).toBeNull();
    }), { numRuns: 40 });
  });
});

it('each source keeps its own degrees of freedom: two means of five, Welch and Satterthwaite’s ν (JCGM 100:2008 G.4.1, from memory)', () => {
  const [ua, ub] = [0.3, 0.4];
  const same = (u: X, x: X): number => u['p']! - x['x']!;
  const r = found({ unknowns: [{ name: 'p', start: 9, positive: false }], items: ([['a', 10, ua], ['b', 11, ub]] as const).map(([id, x, u]) => ({ id, label: '', residual: same, inputs: { x: { y: ofSource(source(id, x, u, 4)), positive: false } } })) });
  const p = r.unknowns['p']!;
  const [wa, wb] = [1 / ua ** 2, 1 / ub ** 2];
  const parts = [(wa * ua) / (wa + wb), (wb * ub) / (wa + wb)];
  expect(expanded(p, finiteSources([p])).dof).toBeCloseTo((1 / (wa + wb)) ** 2 / parts.reduce((sum, part) => sum + part ** 4 / 4, 0), 6);
});

const overScale = (u: X, x: X): number => Math.log((u['p']! * u['q']!) / (x['x']! * x['s']!));
const ofRatio = (u: X, x: X): number => Math.log(u['p']! / u['q']! / (x['x']! * x['s']!));
const ofSum = (u: X, x: X): number => Math.log((u['p']! + x['d']!) / (x['x']! * x['s']!));

describe('data drawn from a truth that is known', () => {
  /** Items of three kinds; those that share the ruler s, which itself is stated with an error, share its error. */
  const KINDS = [{ residual: overScale, truth: 6 }, { residual: ofRatio, truth: 1.5 }, { residual: ofSum, truth: 3.4 }] as const;
  const RUNS = 1500;

  it.each([1, 2, 3, 4])('random problem %i: the estimates spread by their u, and as many intervals hold the truth as they say', (seed) => {
    const stream = draws(7919 * seed);
    const n = 4 + Math.floor(stream.uniform() * 4);
    const plan = Array.from({ length: n }, (_, i) => ({ kind: KINDS[i < 3 ? i : Math.floor(stream.uniform() * 3)]!, u: 0.004 + 0.03 * stream.uniform(), shared: i === 0 || stream.uniform() < 0.6 }));
    const uScale = 0.01 + 0.03 * stream.uniform();
    const off: Record<'p' | 'q', number[]> = { p: [], q: [] };
    const chi: number[] = [];
    for (let run = 0; run < RUNS; run++) {
      const s = { y: ofSource(source('ruler', Math.exp(uScale * stream.normal()), uScale)), positive: true };
      const d = { y: ofSource(source('added', 0.4 + 0.02 * stream.normal(), 0.02)), positive: false };
      const items = plan.map(({ kind, u, shared }, i) => ({
        id: String(i), label: '', residual: kind.residual, inputs: { x: { y: ofSource(source(`x${i}`, kind.truth * Math.exp(u * stream.normal()), kind.truth * u)), positive: true }, s: shared ? s : { y: exact(1), positive: true }, d },
      }));
      const r = found({ unknowns: [{ name: 'p', start: 2.5, positive: true }, { name: 'q', start: 2.5, positive: true }], items });
      for (const [name, truth] of [['p', 3], ['q', 2]] as const) off[name].push((r.unknowns[name]!.value - truth) / standardUncertainty(r.unknowns[name]!));
      chi.push(r.chiSquared);
    }
    const k = normalQuantile(0.975);
    for (const name of ['p', 'q'] as const) {
      const held = off[name].filter((z) => Math.abs(z) <= k).length / RUNS;
      // Binomial limits at three and a half standard deviations: eight intervals are judged.
      expect(Math.abs(held - 0.95)).toBeLessThan(3.5 * Math.sqrt((0.95 * 0.05) / RUNS));
      // A sample variance of normal draws has u = √(2/n); second-order terms of a few per cent of u are left.
      expect(Math.abs(meanOf(off[name].map((z) => z * z)) - 1)).toBeLessThan(3.5 * Math.sqrt(2 / RUNS) + 0.02);
    }
    expect(Math.abs(meanOf(chi) - (n - 2))).toBeLessThan(3.5 * Math.sqrt((2 * (n - 2)) / RUNS));
  });
});
