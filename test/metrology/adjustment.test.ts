/** The adjustment against closed forms, York's line, an independent minimisation and full Monte Carlo. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { adjust, type Adjustment, type AdjustmentItem } from '../../src/metrology/adjustment.ts';
import { anchor, combine, covariance, exact, ofSource, propagate, standardUncertainty, type Uncertain } from '../../src/metrology/uncertain.ts';
import type { Source } from '../../src/metrology/source.ts';
import { tQuantile } from '../../src/numeric/quantiles.ts';
import lines from '../reference/lines.json';
import { Draws } from '../reduction/simulated.ts';

const source = (id: string, estimate: number, u: number): Source => ({ id, label: id, symbol: id, dimension: 'number', estimate, u, distribution: 'normal', dof: Infinity });
const value = (id: string, estimate: number, u: number): Uncertain => ofSource(source(id, estimate, u));
type X = Readonly<Record<string, number>>;

const plainly = (u: X, x: X): number => u['m']! - x['x']!;
const inLogs = (u: X, x: X): number => Math.log(u['m']! / x['x']!);
/** Measured value x times a scale s is m. */
const scaled = (u: X, x: X): number => u['m']! / (x['s']! * x['x']!) - 1;

const item = (id: string, y: Uncertain, residual: AdjustmentItem['residual'] = plainly, positive = false): AdjustmentItem => ({ id, label: id, inputs: { x: { y, positive } }, residual });
const one = (start: number, positive = false): Parameters<typeof adjust>[0]['unknowns'] => [{ name: 'm', start, positive }];
function found(x: Parameters<typeof adjust>[0]): Adjustment {
  const result = adjust(x);
  if (result.status !== 'adjusted') throw new Error(result.status);
  return result;
}

describe('two measurements of one quantity', () => {
  it('of independent uncertainties give the weighted mean, its u and χ² = (x₁ − x₂)²/(u₁² + u₂²)', () => {
    const r = found({ unknowns: one(9), items: [item('a', value('a', 10, 0.3)), item('b', value('b', 11, 0.4))] });
    const [wa, wb] = [1 / 0.09, 1 / 0.16];
    expect(r.unknowns['m']!.value).toBeCloseTo((10 * wa + 11 * wb) / (wa + wb), 9);
    expect(standardUncertainty(r.unknowns['m']!)).toBeCloseTo(1 / Math.sqrt(wa + wb), 9);
    expect(r.chiSquared).toBeCloseTo(1 / 0.25, 9);
    expect(r.dof).toBe(1);
    // Upper tail of χ² = 4 with one degree of freedom: 2(1 − Φ(2)) = 0.04550026 (normal table).
    expect(r.probability).toBeCloseTo(0.04550026, 7);
    // The measured one less what the other says, over √(u₁² + u₂²).
    expect(r.items.map(({ deviation }) => deviation)).toEqual([expect.closeTo(-2, 8), expect.closeTo(2, 8)]);
    expect(r.items[0]!.without!['m']).toBeCloseTo(11 - r.unknowns['m']!.value, 8);
  });

  it('that share an additive error keep it whole: u² = own part + shared²', () => {
    const shared = value('zero', 0, 0.5);
    const of = (id: string, x: number, u: number): Uncertain => combine([[1, value(id, x, u)], [1, shared]]);
    const r = found({ unknowns: one(9), items: [item('a', of('a', 10, 0.3)), item('b', of('b', 11, 0.4))] });
    const [wa, wb] = [1 / 0.09, 1 / 0.16];
    expect(r.unknowns['m']!.value).toBeCloseTo((10 * wa + 11 * wb) / (wa + wb), 8);
    expect(standardUncertainty(r.unknowns['m']!)).toBeCloseTo(Math.sqrt(1 / (wa + wb) + 0.25), 8);
    expect(r.chiSquared).toBeCloseTo(4, 8);
  });

  it('of 1.0 and 1.2 with 3 % own and 20 % shared scale combine between them, not to 0.63 (Peelle’s puzzle)', () => {
    const s = anchor(value('scale', 1, 0.2));
    const [a, b] = [value('a', 1, 0.03), value('b', 1.2, 0.036)];
    const with2 = (id: string, y: Uncertain, positive: boolean): AdjustmentItem => ({ id, label: id, inputs: { x: { y, positive }, s: { y: s, positive } }, residual: scaled });
    const r = found({ unknowns: one(1.1, true), items: [with2('a', a, false), with2('b', b, false)] });
    // Independently: for a scale of 1 the best x₁, x₂ meet in the weighted mean, which no scale improves on.
    const [wa, wb] = [1 / 0.03 ** 2, 1 / 0.036 ** 2];
    expect(r.unknowns['m']!.value).toBeCloseTo((1 * wa + 1.2 * wb) / (wa + wb), 6);
    // What a linear covariance at the data gives, and must not: (V⁻¹1)ᵀx/(1ᵀV⁻¹1).
    const [v11, v22, v12] = [0.03 ** 2 + 0.2 ** 2, 0.036 ** 2 + 0.24 ** 2, 0.2 * 0.24];
    const naive = ((v22 - v12) * 1 + (v11 - v12) * 1.2) / (v11 + v22 - 2 * v12);
    expect(naive).toBeLessThan(0.9);
    expect(r.unknowns['m']!.value).toBeGreaterThan(1);
    // Given as finished values, each with its shared part: in the logarithm the same holds.
    const finished = (y: Uncertain): Uncertain => propagate(({ p, q }) => p * q, { p: y, q: s });
    const logs = found({ unknowns: one(1.1, true), items: [item('a', finished(a), inLogs, true), item('b', finished(b), inLogs, true)] });
    expect(logs.unknowns['m']!.value).toBeGreaterThan(1);
    expect(logs.unknowns['m']!.value).toBeLessThan(1.2);
    expect(standardUncertainty(logs.unknowns['m']!) / logs.unknowns['m']!.value).toBeCloseTo(Math.hypot(0.2, 0.03 / Math.SQRT2), 3);
  });
});

const onLine = (u: X, x: X): number => u['a']! + u['b']! * x['x']! - x['y']!;

it('agrees with York’s line through Pearson’s data with rounded σ (SciPy’s odr test, its origin in test/reference)', () => {
  const set = lines.find(({ id }) => id === 'b02-pearson-scipytest')!;
  const { x: xs, y: ys, sx, sy } = set.inputs as Readonly<Record<'x' | 'y' | 'sx' | 'sy', readonly number[]>>;
  const { york } = set.expected as { readonly york: Readonly<Record<'a' | 'b' | 'sb' | 'S', number>> };
  const r = found({
    unknowns: [{ name: 'a', start: 5.4, positive: false }, { name: 'b', start: -0.4, positive: false }],
    items: xs.map((x, i) => ({ id: String(i), label: '', residual: onLine, inputs: { x: { y: value(`x${i}`, x, sx[i]!), positive: false }, y: { y: value(`y${i}`, ys[i]!, sy[i]!), positive: false } } })),
  });
  expect(r.unknowns['b']!.value).toBeCloseTo(york.b, 7);
  expect(r.unknowns['a']!.value).toBeCloseTo(york.a, 7);
  expect(r.chiSquared).toBeCloseTo(york.S, 6);
  // York's u are at the adjusted points, the adjustment's too.
  expect(standardUncertainty(r.unknowns['b']!) / york.sb).toBeCloseTo(1, 5);
});

const inverse = (u: X, x: X): number => Math.log((u['m']! * u['k']!) / (x['x']! * x['s']!));
const ratio = (u: X, x: X): number => Math.log(u['m']! / u['k']! / (x['x']! * x['s']!));

describe('against itself', () => {
  const items = (shift = 0): readonly AdjustmentItem[] => {
    const s = anchor(value('scale', 1, 0.02));
    const make = (id: string, y: number, residual: AdjustmentItem['residual']): AdjustmentItem => ({ id, label: id, residual, inputs: { x: { y: value(id, y, 0.01 * y), positive: true }, s: { y: s, positive: true } } });
    return [make('a', 6 * (1 + shift), inverse), make('b', 1.5, ratio), make('c', 6.1, inverse), make('d', 1.52, ratio)];
  };
  const unknowns = [{ name: 'm', start: 3, positive: true }, { name: 'k', start: 2, positive: true }];

  it('an item left out moves the unknowns as told', () => {
    const all = found({ unknowns, items: items() });
    for (const [i, left] of all.items.entries()) {
      const rest = found({ unknowns, items: items().filter((_, j) => j !== i) });
      for (const name of ['m', 'k']) expect(Math.log(rest.unknowns[name]!.value / all.unknowns[name]!.value)).toBeCloseTo(left.without![name]!, 5);
    }
  });

  it('contributions are the slopes of the whole adjustment in the stated values', () => {
    const [low, middle, high] = [-1e-5, 0, 1e-5].map((shift) => found({ unknowns, items: items(shift) }));
    const part = [...middle!.unknowns['m']!.own].find(([x]) => x.id === 'a')![1];
    const slope = (high!.unknowns['m']!.value - low!.unknowns['m']!.value) / (2e-5 * 6);
    expect(part / 0.06).toBeCloseTo(slope, 4);
    expect(covariance(middle!.unknowns['m']!, middle!.unknowns['k']!)).not.toBe(0);
  });

  it('the order of the items changes nothing', () => {
    fc.assert(fc.property(fc.shuffledSubarray([0, 1, 2, 3], { minLength: 4 }), (order) => {
      const given = items();
      const [first, other] = [found({ unknowns, items: given }), found({ unknowns, items: order.map((i) => given[i]!) })];
      expect(other.unknowns['m']!.value / first.unknowns['m']!.value).toBeCloseTo(1, 9);
      expect(other.chiSquared).toBeCloseTo(first.chiSquared, 6);
    }), { numRuns: 10 });
  });
});

it.each([[0.001, 1.2], [0.01, 1.2], [0.05, 1.02], [0.2, 0.9]])('two items that rest on one source alone, of relative u %d, are adjusted beside a third that is off by %d', (u, off) => {
  // J ∝ m and κ ∝ m; K = √(Jκ) ∝ m: the weighted mean of ln m by its own u and by the tap’s 2 %.
  const m = anchor(value('mass', 1, u));
  const scaledBy = (c: number): Uncertain => propagate(({ x }) => c * x, { x: m });
  const r = found({
    unknowns: [{ name: 'm', start: 3, positive: true }, { name: 'k', start: 2, positive: true }],
    items: [
      { id: 'J', label: '', residual: (p, x) => Math.log(p['m']! / x['x']!), inputs: { x: { y: scaledBy(3), positive: true } } },
      { id: 'k', label: '', residual: (p, x) => Math.log(p['k']! / x['x']!), inputs: { x: { y: scaledBy(2), positive: true } } },
      { id: 'tap', label: '', residual: (p, x) => Math.log(p['m']! * p['k']!) / 2 - Math.log(x['x']!), inputs: { x: { y: value('tap', Math.sqrt(6) * off, 0.02 * Math.sqrt(6) * off), positive: true } } },
    ],
  });
  const expected = (Math.log(off) * u ** 2) / (u ** 2 + 0.02 ** 2);
  expect(Math.log((r.unknowns['m']!.value * r.unknowns['k']!.value) / 6) / 2).toBeCloseTo(expected, 5);
  expect(r.unknowns['m']!.value / r.unknowns['k']!.value).toBeCloseTo(1.5, 6);
});

describe('what cannot be adjusted says so', () => {
  it('with fewer items than unknowns, or items that tell one combination only', () => {
    const s = value('a', 6, 0.1);
    const unknowns = [{ name: 'm', start: 3, positive: true }, { name: 'k', start: 2, positive: true }];
    const product = (id: string): AdjustmentItem => ({ id, label: id, residual: inverse, inputs: { x: { y: id === 'a' ? s : value(id, 6, 0.1), positive: true }, s: { y: exact(1), positive: true } } });
    expect(adjust({ unknowns, items: [product('a')] }).status).toBe('underdetermined');
    expect(adjust({ unknowns, items: [product('a'), product('b'), product('c')] }).status).toBe('underdetermined');
  });

  it('exact items that agree are met, and an item that nothing checks has no deviation', () => {
    const r = found({ unknowns: one(1), items: [item('a', exact(5))] });
    expect(r.unknowns['m']!.value).toBeCloseTo(5, 9);
    expect(r.items[0]!.deviation).toBeNull();
    expect(r.probability).toBeNull();
  });
});

it('its interval holds the truth as often as it says where two items share an input', () => {
  const draws = new Draws(20261201);
  const runs = 2000;
  let held = 0;
  let chi = 0;
  for (let n = 0; n < runs; n++) {
    const scale = 1 + 0.03 * draws.normal();
    const s = anchor(value('s', scale, 0.03));
    const make = (id: string, truth: number, residual: AdjustmentItem['residual'], shared: boolean, u: number): AdjustmentItem =>
      ({ id, label: id, residual, inputs: { x: { y: value(id, (truth / 1) * (1 + u * draws.normal()), u * truth), positive: true }, s: { y: shared ? s : exact(1), positive: true } } });
    const r = found({ unknowns: [{ name: 'm', start: 3, positive: true }, { name: 'k', start: 2, positive: true }], items: [make('a', 6, inverse, true, 0.01), make('b', 1.5, ratio, true, 0.02), make('c', 6, inverse, false, 0.02), make('d', 1.5, ratio, false, 0.03)] });
    const m = r.unknowns['m']!;
    if (Math.abs(m.value - 3) <= tQuantile(0.975, 1e6) * standardUncertainty(m)) held += 1;
    chi += r.chiSquared;
  }
  // Binomial limits of 95 % in 2000 at three standard deviations.
  expect(Math.abs(held / runs - 0.95)).toBeLessThan(3 * Math.sqrt((0.95 * 0.05) / runs));
  expect(Math.abs(chi / runs - 2)).toBeLessThan(3 * Math.sqrt(4 / runs));
});
