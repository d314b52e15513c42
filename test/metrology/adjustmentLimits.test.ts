/** The adjustment at its limits: units, order, many items, items without uncertainty, items that share all, and contradiction. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { adjust, type Adjustment, type AdjustmentItem } from '../../src/metrology/adjustment.ts';
import { combine, exact, ofSource, propagate, standardUncertainty, type Uncertain } from '../../src/metrology/uncertain.ts';
import { source } from './sources.ts';

type X = Readonly<Record<string, number>>;
const value = (id: string, estimate: number, u: number): Uncertain => ofSource(source(id, estimate, u));
const plainly = (u: X, x: X): number => u['m']! - x['x']!;
const inLogs = (u: X, x: X): number => Math.log(u['m']! / x['x']!);
const item = (id: string, y: Uncertain, residual: AdjustmentItem['residual'] = inLogs, positive = true): AdjustmentItem => ({ id, label: id, residual, inputs: { x: { y, positive } } });
const one = (start = 1, positive = true): Parameters<typeof adjust>[0]['unknowns'] => [{ name: 'm', start, positive }];

function found(x: Parameters<typeof adjust>[0]): Adjustment {
  const result = adjust(x);
  if (result.status !== 'adjusted') throw new Error(result.status);
  return result;
}

/** κ + Δκ as weights tell it, J/κ as periods do, in any unit of J and κ: residuals as they come. */
const ofStiffness = (u: X, x: X): number => u['kappa']! + x['d']! - x['k']!;
const ofPeriod = (u: X, x: X): number => 4 * Math.PI ** 2 * u['J']! - x['T']! ** 2 * u['kappa']!;

describe('units and order change nothing', () => {
  const bench = (unit: number, order: readonly number[]): Adjustment => {
    const ruler = value('ruler', 1, 0.02);
    const scaled = (id: string, k: number, u: number): Uncertain => propagate(({ k: of, s }) => of * s, { k: value(id, k * unit, u * unit), s: ruler });
    const d = { y: value('added', 0.004 * unit, 0.001 * unit), positive: false };
    const items: readonly AdjustmentItem[] = [
      { id: 'weights', label: '', residual: ofStiffness, inputs: { k: { y: scaled('weights', 0.0541, 4e-4), positive: true }, d: { y: exact(0), positive: false } } },
      { id: 'pull', label: '', residual: ofStiffness, inputs: { k: { y: scaled('pull', 0.0585, 6e-4), positive: true }, d } },
      { id: 'period', label: '', residual: ofPeriod, inputs: { T: { y: value('period', 1.352, 0.004), positive: true } } },
      { id: 'again', label: '', residual: ofPeriod, inputs: { T: { y: value('again', 1.347, 0.005), positive: true } } },
    ];
    return found({ unknowns: [{ name: 'J', start: 2e-3 * unit, positive: true }, { name: 'kappa', start: 0.05 * unit, positive: true }], items: order.map((i) => items[i]!) });
  };

  it('from 10⁻⁹ to 10⁹ of the unit, the items in any order', () => {
    const first = bench(1, [0, 1, 2, 3]);
    fc.assert(fc.property(fc.double({ min: -9, max: 9, noNaN: true }), fc.shuffledSubarray([0, 1, 2, 3], { minLength: 4 }), (power, order) => {
      const unit = 10 ** power;
      const other = bench(unit, order);
      for (const name of ['J', 'kappa']) {
        expect(other.unknowns[name]!.value / unit / first.unknowns[name]!.value).toBeCloseTo(1, 8);
        expect(standardUncertainty(other.unknowns[name]!) / unit / standardUncertainty(first.unknowns[name]!)).toBeCloseTo(1, 7);
      }
      expect(other.chiSquared).toBeCloseTo(first.chiSquared, 6);
      for (const { id, deviation } of first.items) expect(other.items.find((same) => same.id === id)!.deviation).toBeCloseTo(deviation!, 6);
    }), { numRuns: 30 });
  });

  it('a signed unknown may start at zero', () => {
    const r = found({ unknowns: one(0, false), items: [item('a', value('a', 1, 0.3), plainly, false), item('b', value('b', 2, 0.4), plainly, false)] });
    expect(r.unknowns['m']!.value).toBeCloseTo(1.36, 9);
    expect(standardUncertainty(r.unknowns['m']!)).toBeCloseTo(0.24, 9);
  });

  it.each([1e-3, 1e-5, 1e-7])('two results of relative u %d that lie 3 u apart meet in the middle', (u) => {
    const r = found({ unknowns: one(), items: [item('a', value('a', 1, u)), item('b', value('b', 1 + 3 * u, u))] });
    expect((r.unknowns['m']!.value - 1) / u).toBeCloseTo(1.5, 2);
    expect(standardUncertainty(r.unknowns['m']!) / u).toBeCloseTo(Math.SQRT1_2, 2);
    expect(r.chiSquared).toBeCloseTo(4.5, 1);
  });
});

it('a hundred items that rest on two thousand sources and on one that all share keep it whole', () => {
  const shared = value('shared', 0, 0.05);
  const items = Array.from({ length: 100 }, (_, i) => {
    const parts = Array.from({ length: 20 }, (__, j) => [0.01, ofSource(source(`${i}.${j}`, 0, 1))] as const);
    return item(String(i), { ...combine([...parts, [1, shared]]), value: 10 + 0.05 * Math.sin(7 * i) }, plainly, false);
  });
  const r = found({ unknowns: one(9, false), items });
  const mean = items.reduce((sum, { inputs }) => sum + inputs['x']!.y.value / 100, 0);
  expect(r.unknowns['m']!.value).toBeCloseTo(mean, 9);
  expect(standardUncertainty(r.unknowns['m']!)).toBeCloseTo(Math.sqrt((20 * 0.01 ** 2) / 100 + 0.05 ** 2), 9);
  expect(r.moved).toHaveLength(2001);
});

describe('items of which nothing is uncertain, or all is shared', () => {
  const mass = value('mass', 1, 0.01);

  it('an exact item is met, and an uncertain one lies off it by its own u', () => {
    const r = found({ unknowns: one(), items: [item('exact', exact(1)), item('b', value('b', 1.02, 0.01))] });
    expect(r.unknowns['m']!.value).toBeCloseTo(1, 12);
    expect(standardUncertainty(r.unknowns['m']!)).toBeLessThan(1e-12);
    expect(r.items[1]!.deviation).toBeCloseTo(Math.log(1.02) / (0.01 / 1.02), 6);
    expect(r.items[0]!.deviation).toBeCloseTo(-r.items[1]!.deviation!, 6);
  });

  it('two that rest on the same readings count once', () => {
    const twice = found({ unknowns: one(), items: [item('a', mass), item('b', mass), item('c', value('c', 1.02, 0.01))] });
    const once = found({ unknowns: one(), items: [item('a', mass), item('c', value('c', 1.02, 0.01))] });
    expect(twice.unknowns['m']!.value).toBeCloseTo(once.unknowns['m']!.value, 9);
    expect(standardUncertainty(twice.unknowns['m']!)).toBeCloseTo(standardUncertainty(once.unknowns['m']!), 9);
    expect(twice.chiSquared).toBeCloseTo(once.chiSquared, 6);
  });

  it('two that rest on the same readings and lie apart are contradictory, whatever their u; so are exact ones', () => {
    for (const u of [0.1, 0.01, 1e-4]) {
      const of = value('of', 1, u);
      expect(adjust({ unknowns: one(), items: [item('a', of), item('b', combine([[1.01, of]]))] }).status).toBe('contradictory');
    }
    expect(adjust({ unknowns: one(), items: [item('a', exact(1)), item('b', exact(1.01))] }).status).toBe('contradictory');
    expect(adjust({ unknowns: one(), items: [item('a', exact(1)), item('b', exact(1.01)), item('c', value('c', 1, 0.1))] }).status).toBe('contradictory');
  });

  it('exact items of the same value agree', () => {
    const r = found({ unknowns: one(), items: [item('a', exact(5)), item('b', exact(5))] });
    expect(r.unknowns['m']!.value).toBeCloseTo(5, 9);
    expect(r.chiSquared).toBeCloseTo(0, 6);
  });
});

describe('a large χ² is shown', () => {
  it('and widens nothing: results ten u apart keep the u of results that agree', () => {
    const u = (apart: number): Adjustment => found({ unknowns: one(1, false), items: [item('a', value('a', 1, 0.01), plainly, false), item('b', value('b', 1 + apart, 0.01), plainly, false)] });
    const [agree, differ] = [u(0), u(0.1)];
    expect(standardUncertainty(differ.unknowns['m']!)).toBeCloseTo(standardUncertainty(agree.unknowns['m']!), 9);
    expect(differ.chiSquared).toBeCloseTo(50, 6);
    // Upper tail of χ² = 50 with one degree of freedom, 2(1 − Φ(7.0711)) = 1.54e-12 (from memory of Mills’ ratio: 2φ(z)/z·(1 − 1/z² + 3/z⁴)).
    const z = Math.sqrt(50);
    expect(differ.probability! / (((2 * Math.exp(-25)) / Math.sqrt(2 * Math.PI) / z) * (1 - 1 / z ** 2 + 3 / z ** 4 - 15 / z ** 6))).toBeCloseTo(1, 3);
  });
});

describe('what cannot be adjusted', () => {
  const outside = (): number => {
    throw new RangeError('outside');
  };

  it('is underdetermined without items, and where no item knows an unknown', () => {
    expect(adjust({ unknowns: one(), items: [] }).status).toBe('underdetermined');
    expect(adjust({ unknowns: [...one(), { name: 'k', start: 1, positive: true }], items: [item('a', value('a', 1, 0.1)), item('b', value('b', 1, 0.1))] }).status).toBe('underdetermined');
  });

  it('is not converged where a residual is no number or leaves its range', () => {
    for (const residual of [() => Number.NaN, () => Infinity, outside]) expect(adjust({ unknowns: one(), items: [item('a', value('a', 1, 0.1), residual), item('b', value('b', 1, 0.1))] }).status).toBe('notConverged');
  });

  it('is our mistake where a positive unknown starts at zero, and where a residual fails otherwise', () => {
    expect(() => adjust({ unknowns: one(0), items: [item('a', exact(1))] })).toThrow(RangeError);
    const broken = (): number => {
      throw new TypeError('broken');
    };
    expect(() => adjust({ unknowns: one(), items: [item('a', exact(1), broken)] })).toThrow(TypeError);
  });

  it('a step that overshoots without end is taken shorter: a shared scale of 70 %, the items as differences', () => {
    const s = value('scale', 1, 0.7);
    const scaled = (u: X, x: X): number => u['m']! - x['x']! * x['s']!;
    const items = [1, 1.2].map((x, i) => ({ id: String(i), label: '', residual: scaled, inputs: { x: { y: value(`x${i}`, x, 0.03 * x), positive: true }, s: { y: s, positive: true } } }));
    expect(found({ unknowns: one(1.1), items }).unknowns['m']!.value).toBeCloseTo(Math.sqrt(1.2), 5);
  });
});
