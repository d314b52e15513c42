/** Effective degrees of freedom, coverage factors and expanded uncertainty against the GUM's examples and table. */
import { describe, expect, test } from 'vitest';
import { coverageFactor, COVERAGE_PROBABILITY, effectiveDegreesOfFreedom, expanded, finiteSources } from '../../src/metrology/coverage.ts';
import { fromLimits } from '../../src/metrology/source.ts';
import { anchor, combine, contributions, ofSource, propagate, standardUncertainty } from '../../src/metrology/uncertain.ts';
import { tQuantile } from '../../src/numeric/quantiles.ts';
import { digits } from '../numeric/digits.ts';
import reference from '../reference/uncertainty.json' with { type: 'json' };
import { source } from './sources.ts';

// Source: JCGM 100:2008 Annex H.1, Table H.1 (read in a copy, part from memory, recomputed independently).
describe('the end gauge of GUM H.1, to first order', () => {
  const { published, exact: expected } = reference.find((e) => e.id === 'a01-gum-h1')!.expected as unknown as Readonly<Record<'published' | 'exact', Record<string, number>>>;
  const sources = {
    ls: source('ls', 50000623, 25, 18), d0: source('d0', 215, 5.8, 24), d1: source('d1', 0, 3.9, 5), d2: source('d2', 0, 6.7, 8),
    as: source('as', 11.5e-6, fromLimits(2e-6)), da: source('da', 0, fromLimits(1e-6), 50), dt: source('dt', 0, fromLimits(0.05), 2),
    theta: source('theta', -0.1, 0.2), Delta: source('Delta', 0, 0.5 / Math.SQRT2),
  };
  const d = combine([[1, ofSource(sources.d0)], [1, ofSource(sources.d1)], [1, ofSource(sources.d2)]]);
  const theta = combine([[1, ofSource(sources.theta)], [1, ofSource(sources.Delta)]]);
  const model = (x: Record<'ls' | 'd' | 'da' | 'theta' | 'as' | 'dt', number>): number => x.ls + x.d - x.ls * (x.da * x.theta + x.as * x.dt);
  const inputs = { ls: ofSource(sources.ls), d, da: ofSource(sources.da), theta, as: ofSource(sources.as), dt: ofSource(sources.dt) };
  const length = propagate(model, inputs);

  test('its inputs are those of the table: u(d) 9.7 nm with 25.4 degrees of freedom, u(θ) 0.41 °C', () => {
    const found = expanded(d, finiteSources([d]));
    expect(digits(found.u, expected.u_d!)).toBeGreaterThan(12);
    expect(digits(found.dof, expected.nu_d!)).toBeGreaterThan(12);
    expect(digits(standardUncertainty(theta), expected.u_theta!)).toBeGreaterThan(12);
    expect(found.u).toBeCloseTo(published.u_d!, 1);
    expect(standardUncertainty(theta)).toBeCloseTo(published.u_theta!, 2);
  });

  // The half-difference of two lengths of 5e7 nm is rounded to 4e-9 nm.
  test('contributions, u_c = 31.664 nm and ν_eff = 16.752 agree to 8 digits, with anchors or without', () => {
    const anchored = propagate(model, { ...inputs, d: anchor(d), theta: anchor(theta) });
    for (const y of [length, anchored]) {
      const parts = contributions(y);
      expect(digits(Math.abs(parts.get(sources.da)!), expected.comp_dalpha!)).toBeGreaterThan(8);
      expect(digits(Math.abs(parts.get(sources.dt)!), expected.comp_dtheta!)).toBeGreaterThan(8);
      expect(parts.get(sources.ls)!).toBeCloseTo(expected.comp_ls!, 7);
      const found = expanded(y, finiteSources([y]));
      expect(found.value).toBe(expected.l);
      expect(digits(found.u, expected.uc!)).toBeGreaterThan(8);
      expect(digits(found.dof, expected.nu_eff!)).toBeGreaterThan(8);
      expect(Math.round(found.u)).toBe(published.uc);
      expect(Math.abs(found.dof - published.nu_eff!)).toBeLessThan(0.1);
    }
  });

  test('k of 95 % at ν_eff lies between the table’s 2.12 for 16 and 2.11 for 17, and U = k u', () => {
    const found = expanded(length, finiteSources([length]));
    expect(found.k).toBeLessThan(2.1199);
    expect(found.k).toBeGreaterThan(2.1098);
    expect(found.U).toBe(found.k * found.u);
  });

  test('k of 99 % at 16 whole degrees of freedom is the printed 2.92 and gives U = 92.48 nm (printed 93)', () => {
    const found = expanded(length, finiteSources([length]));
    const k = tQuantile(0.995, Math.floor(found.dof));
    expect(digits(k, expected.t995_16!)).toBeGreaterThan(12);
    expect(k).toBeCloseTo(published.k99!, 2);
    expect(digits(k * found.u, expected.U99!)).toBeGreaterThan(8);
    expect(Math.abs(k * found.u - published.U99!)).toBeLessThan(1);
  });
});

describe('degrees of freedom and coverage factors', () => {
  // Source: JCGM 100:2008 G.4.1 EXAMPLE (from memory, recomputed independently).
  test('a product of three factors with 10, 5 and 15 readings has ν_eff = 19.0 and U = 2.2 %', () => {
    const { inputs, expected } = reference.find((e) => e.id === 'a07-ws-g4') as unknown as {
      inputs: { u_rel_pct: number[]; n: number[] }; expected: Readonly<Record<'published' | 'exact', Record<string, number>>>;
    };
    const u = Math.hypot(...inputs.u_rel_pct);
    const dof = effectiveDegreesOfFreedom(inputs.u_rel_pct.map((part, i) => [part, inputs.n[i]! - 1] as const), u);
    expect(digits(u, expected.exact.uc_pct!)).toBeGreaterThan(13);
    expect(digits(dof, expected.exact.nu_eff!)).toBeGreaterThan(13);
    // Not cut to a whole number: at 18.9987 the factor is that of 19 within 1e-5, where floor would give 18 and 2.101.
    expect(coverageFactor(dof)).toBeCloseTo(expected.exact.t95_19!, 4);
    expect(coverageFactor(dof) * u).toBeCloseTo(expected.exact.U!, 4);
    expect(coverageFactor(dof) * u).toBeCloseTo(expected.published.U95_pct!, 1);
    const factors = inputs.u_rel_pct.map((part, i) => ofSource(source(`X${i + 1}`, 5, 0.05 * part, inputs.n[i]! - 1)));
    const product = propagate((x) => x.a * x.b * x.c, { a: factors[0]!, b: factors[1]!, c: factors[2]! });
    expect(expanded(product, finiteSources([product])).dof).toBeCloseTo(expected.exact.nu_eff!, 9);
  });

  // Source: JCGM 100:2008 Table G.2, columns 95 % and 99 % (read in a copy, part from memory, recomputed independently).
  test('every factor of the 95 % column of Table G.2 agrees to its printed digits', () => {
    expect(COVERAGE_PROBABILITY).toBe(0.95);
    const table = reference.find((e) => e.id === 'a06-gum-g2')!.expected as unknown as Readonly<Record<string, number[]>>;
    expect(Object.keys(table).length).toBe(28);
    for (const [dof, row] of Object.entries(table)) {
      const nu = dof === 'inf' ? Infinity : Number(dof);
      const half = nu >= 100 ? 0.0005001 : 0.005001;
      expect(Math.abs(coverageFactor(nu) - row[2]!)).toBeLessThan(half);
    }
  });

  test('k falls with the degrees of freedom, toward 1.960', () => {
    const factors = [0.5, 1, 1.5, 2, 4.4, 10, 30.2, 1e3, 1e7, Infinity].map(coverageFactor);
    expect(factors).toEqual([...factors].sort((a, b) => b - a));
    expect(new Set(factors).size).toBe(factors.length);
    expect(factors.at(-1)).toBeCloseTo(1.959963985, 9);
  });

  test('a factor asked again, after many others, is the same', () => {
    const k = coverageFactor(7.25);
    for (let i = 0; i < 6000; i++) coverageFactor(1000 + i);
    expect(coverageFactor(7.25)).toBe(k);
  });

  test('sources known otherwise than from a sample leave ν_eff infinite and k at 1.96', () => {
    const y = combine([[1, ofSource(source('a', 1, 0.2))], [1, ofSource(source('b', 1, 0.1))]]);
    expect(expanded(y, finiteSources([y]))).toMatchObject({ value: 2, dof: Infinity });
    expect(expanded(y, finiteSources([y])).k).toBeCloseTo(1.96, 4);
  });

  test('one source of finite ν behind an anchor and beside it counts once, its parts added with their signs', () => {
    const s = ofSource(source('s', 1, 0.1, 4));
    const shared = anchor(combine([[1, s], [1, ofSource(source('other', 0, 0.3))]]));
    const y = combine([[2, shared], [-1, s]]);
    // The source acts with 2 − 1 = 1: part 0.1; the other with 2: part 0.6. ν_eff = 4 (0.37/0.01)².
    const found = expanded(y, finiteSources([y]));
    expect(found.u).toBeCloseTo(Math.sqrt(0.37), 12);
    expect(found.dof).toBeCloseTo(4 * 37 ** 2, 6);
  });

  test('an exact value has U = 0', () => {
    const y = ofSource(source('a', 3, 0));
    expect(expanded(y, finiteSources([y]))).toMatchObject({ value: 3, u: 0, U: 0, dof: Infinity });
  });
});
