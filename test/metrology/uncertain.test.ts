/** Propagation against worked examples of the GUM and its supplements, and uncertain numbers against themselves without anchors. */
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { fromExpanded, fromLimits, fromResolution } from '../../src/metrology/source.ts';
import { anchor, combine, contributions, covariance, exact, ofSource, propagate, standardUncertainty, withSensitivities, type Uncertain } from '../../src/metrology/uncertain.ts';
import { digits } from '../numeric/digits.ts';
import reference from '../reference/uncertainty.json' with { type: 'json' };
import { correlation, deviationOf, draws, meanOf, source } from './sources.ts';

const value = (id: string, x: number, u: number) => ofSource(source(id, x, u));

describe('worked examples of published documents', () => {
  // Source: JCGM 100:2008 H.2, Tables H.2–H.4 (read in a copy, recomputed independently). The correlation of the simultaneous
  // means is carried by sharing: one source an observation. Half-differences differ from the partial derivatives by (u/x)², 3e-8 here.
  test('resistance, reactance and impedance from simultaneous readings have the correlations of GUM H.2, to 6 digits', () => {
    const example = reference.find((e) => e.id === 'a03-gum-h2')!;
    const { V, I_mA, phi_rad } = example.inputs as { V: number[]; I_mA: number[]; phi_rad: number[] };
    const expected = (example.expected as { exact_approach1: Record<string, number>; published: Record<string, number> });
    const n = V.length;
    const rounds = V.map((_, j) => source(`round ${j + 1}`, 0, 1, n - 1));
    const meanWithRounds = (x: readonly number[]): Uncertain => ({
      value: meanOf(x), own: new Map(rounds.map((s, j) => [s, (x[j]! - meanOf(x)) / Math.sqrt(n * (n - 1))])), through: new Map(),
    });
    const inputs = { V: meanWithRounds(V), I: meanWithRounds(I_mA.map((x) => x / 1000)), phi: meanWithRounds(phi_rad) };
    expect(digits(correlation(inputs.V, inputs.I), expected.exact_approach1.rVI!)).toBeGreaterThan(9);
    expect(digits(correlation(inputs.V, inputs.phi), expected.exact_approach1.rVphi!)).toBeGreaterThan(9);
    expect(digits(correlation(inputs.I, inputs.phi), expected.exact_approach1.rIphi!)).toBeGreaterThan(9);
    const R = propagate((x) => (x.V / x.I) * Math.cos(x.phi), inputs);
    const X = propagate((x) => (x.V / x.I) * Math.sin(x.phi), inputs);
    const Z = propagate((x) => x.V / x.I, inputs);
    const found = {
      R: R.value, X: X.value, Z: Z.value, uR: standardUncertainty(R), uX: standardUncertainty(X), uZ: standardUncertainty(Z),
      rRX: correlation(R, X), rRZ: correlation(R, Z), rXZ: correlation(X, Z),
    };
    for (const [name, got] of Object.entries(found)) expect(digits(got, expected.exact_approach1[name]!)).toBeGreaterThan(6);
    // The printed digits; u(X) is printed 0.295 where this road (the GUM's approach 1) gives 0.2956.
    expect(found.R).toBeCloseTo(expected.published.R!, 3);
    expect(Math.abs(found.uX - expected.published.uX!)).toBeLessThan(0.001);
    expect(found.rRX).toBeCloseTo(expected.published.rRX!, 3);
    expect(found.rXZ).toBeCloseTo(expected.published.rXZ!, 3);
  });

  // Source: EA-4/02 M:2013 example S2 (read in a copy, part from memory, recomputed independently).
  test('a 10 kg weight has the 29.3 mg of EA-4/02 S2', () => {
    const example = reference.find((e) => e.id === 'a17-ea402-s2')!.expected as { published: { u_mg: number }; exact: { u_mg: number } };
    const mg = 1e-3;
    const weight = combine([
      [1, value('standard', 10000.005, fromExpanded(45 * mg, 2))],
      [1, value('drift', 0, fromLimits(15 * mg))],
      [1, value('difference', 0.02, (25 * mg) / Math.sqrt(3))],
      [1, value('eccentricity', 0, fromLimits(10 * mg))],
      [1, value('buoyancy', 0, fromLimits(10 * mg))],
    ]);
    expect(weight.value).toBeCloseTo(10000.025, 9);
    expect(digits(standardUncertainty(weight) / mg, example.exact.u_mg)).toBeGreaterThan(12);
    expect(standardUncertainty(weight) / mg).toBeCloseTo(example.published.u_mg, 1);
  });

  // Source: NIST TN 1900 example E13 (read in a copy, recomputed independently).
  test('the thermal expansion of TN 1900 E13 has u = 1.76e-6, its partial derivatives met to 6 digits', () => {
    const example = reference.find((e) => e.id === 'a19-tn1900-e13')!.expected as { exact: { alpha: number; u: number } };
    const alpha = propagate((x) => (x.L1 - x.L0) / (x.L0 * (x.T1 - x.T0)), {
      L0: value('L0', 1.4999, 0.0001), T0: value('T0', 288.15, 0.02), L1: value('L1', 1.5021, 0.0002), T1: value('T1', 373.1, 0.05),
    });
    expect(digits(alpha.value, example.exact.alpha)).toBeGreaterThan(12);
    expect(digits(standardUncertainty(alpha), example.exact.u)).toBeGreaterThan(6);
  });

  // Source: JCGM 101:2008 9.3 (read in a copy, part from memory, recomputed independently). The half-differences are of first order.
  test('first order misses the air density in the mass calibration of JCGM 101 9.3, as that document says; draws find it', () => {
    const { recomputed } = reference.find((e) => e.id === 'a12-s1-93')!.expected as { recomputed: { sd_exact: number; GUF1: { u: number } } };
    const model = (x: Record<'m' | 'dm' | 'air' | 'W' | 'R', number>): number => (x.m + x.dm) * (1 + (x.air - 1.2) * (1 / x.W - 1 / x.R)) - 100000;
    const deviation = propagate(model, {
      m: value('m', 100000, 0.05), dm: value('dm', 1.234, 0.02), air: value('air', 1.2, fromLimits(0.1)), W: value('W', 8000, fromLimits(1000)), R: value('R', 8000, fromLimits(50)),
    });
    expect(deviation.value).toBeCloseTo(1.234, 9);
    expect(digits(standardUncertainty(deviation), recomputed.GUF1.u)).toBeGreaterThan(8);
    const { uniform, normal } = draws(7);
    const within = (low: number, high: number): number => low + (high - low) * uniform();
    const drawn = Array.from({ length: 100_000 }, () =>
      model({ m: 100000 + 0.05 * normal(), dm: 1.234 + 0.02 * normal(), air: within(1.1, 1.3), W: within(7000, 9000), R: within(7950, 8050) }));
    expect(deviationOf(drawn) / recomputed.sd_exact).toBeCloseTo(1, 2);
  });
});

describe('standard uncertainties of what is known otherwise than from a sample', () => {
  // Source: JCGM 100:2008 4.3.7, F.2.2.1, 4.3.3 (clause numbers from memory); NIST TN 1297 4.3–4.4 (read): divide a 95 % interval by 1.960, a 99 % one by 2.576.
  test('limits divide by √3, a division by √12, an interval by its factor', () => {
    expect(fromLimits(0.5)).toBeCloseTo(0.288675, 6);
    expect(fromResolution(0.5)).toBeCloseTo(0.144338, 6);
    expect(fromResolution(1)).toBeCloseTo(0.29, 2);
    expect(fromExpanded(1.96, 1.96)).toBe(1);
    expect(fromExpanded(5.152, 2.576)).toBe(2);
  });
});

describe('draws and half-differences agree', () => {
  // Source: JCGM 101:2008, propagation of distributions; the model is methods 1.1, point bob. 100 000 draws know a standard deviation to 0.2 %.
  test('for the impulse bit of a point bob with inputs known to 1 … 4 %, within 1 %', () => {
    const model = (x: Record<'m' | 'g' | 'L' | 'theta', number>): number => 2 * x.m * Math.sqrt(x.g * x.L) * Math.sin(x.theta / 2);
    const [m, g, L, theta] = [[0.0367, 0.0004], [9.80665, 0.0005], [0.3, 0.006], [0.35, 0.014]] as const;
    const I = propagate(model, { m: value('m', ...m), g: value('g', ...g), L: value('L', ...L), theta: value('theta', ...theta) });
    const { normal } = draws(20);
    const drawn = Array.from({ length: 100_000 }, () => model({ m: m[0] + m[1] * normal(), g: g[0] + g[1] * normal(), L: L[0] + L[1] * normal(), theta: theta[0] + theta[1] * normal() }));
    expect(deviationOf(drawn) / standardUncertainty(I)).toBeGreaterThan(0.99);
    expect(deviationOf(drawn) / standardUncertainty(I)).toBeLessThan(1.01);
    expect(meanOf(drawn) / I.value).toBeCloseTo(1, 3);
  });

  test('for two impulse bits that share mass and length, in their covariance too', () => {
    const model = (x: Record<'m' | 'L' | 'theta', number>): number => 2 * x.m * Math.sqrt(9.80665 * x.L) * Math.sin(x.theta / 2);
    const m = value('m', 0.0367, 0.0011);
    const L = value('L', 0.3, 0.012);
    const first = propagate(model, { m, L, theta: value('first', 0.1, 0.002) });
    const second = propagate(model, { m, L, theta: value('second', 0.12, 0.002) });
    const { normal } = draws(21);
    const pairs = Array.from({ length: 100_000 }, () => {
      const shared = { m: 0.0367 + 0.0011 * normal(), L: 0.3 + 0.012 * normal() };
      return [model({ ...shared, theta: 0.1 + 0.002 * normal() }), model({ ...shared, theta: 0.12 + 0.002 * normal() })] as const;
    });
    const [a, b] = [meanOf(pairs.map((p) => p[0])), meanOf(pairs.map((p) => p[1]))];
    const drawn = pairs.reduce((sum, p) => sum + (p[0] - a) * (p[1] - b), 0) / (pairs.length - 1);
    expect(drawn / covariance(first, second)).toBeGreaterThan(0.98);
    expect(drawn / covariance(first, second)).toBeLessThan(1.02);
  });
});

describe('half-differences', () => {
  const factor = fc.double({ min: -1e3, max: 1e3, noNaN: true });
  const positive = fc.double({ min: 0.5, max: 50, noNaN: true });

  test('give a linear model its coefficients', () => {
    fc.assert(fc.property(fc.array(fc.tuple(factor, factor, fc.double({ min: 1e-3, max: 10, noNaN: true })), { minLength: 1, maxLength: 6 }), (terms) => {
      const inputs = Object.fromEntries(terms.map(([, x, u], i) => [`x${i}`, value(`x${i}`, x, u)]));
      const y = propagate((x) => terms.reduce((sum, [c], i) => sum + c * x[`x${i}`]!, 0), inputs);
      const u = Math.hypot(...terms.map(([c, , uncertainty]) => c * uncertainty));
      // The difference of two sums of up to 6e6 leaves 1e-9.
      expect(Math.abs(standardUncertainty(y) - u)).toBeLessThanOrEqual(1e-9 + 1e-9 * u);
    }));
  });

  test('give a product of powers the sum of squared relative uncertainties', () => {
    fc.assert(fc.property(positive, positive, (a, b) => {
      const y = propagate((x) => x.a * Math.sqrt(x.b), { a: value('a', a, a * 1e-4), b: value('b', b, b * 2e-4) });
      // Source: JCGM 100:2008 5.1.6 eq. (12), from memory. Next order: (2e-4)²/8.
      expect(standardUncertainty(y) / y.value / Math.hypot(1e-4, 1e-4) - 1).toBeCloseTo(0, 7);
    }));
  });

  test('leave a value without uncertainty exact', () => {
    const y = propagate((x) => x.a * x.b, { a: exact(3), b: ofSource(source('b', 4, 0)) });
    expect(y.value).toBe(12);
    expect(standardUncertainty(y)).toBe(0);
    expect(contributions(y).size).toBe(0);
  });

  test('count one source once however many inputs it enters by', () => {
    const ruler = value('ruler', 2, 0.1);
    const double = propagate((x) => x.a + x.b, { a: ruler, b: ruler });
    const none = propagate((x) => x.a - x.b, { a: ruler, b: ruler });
    expect(standardUncertainty(double)).toBeCloseTo(0.2, 12);
    expect(standardUncertainty(none)).toBeLessThan(1e-15);
  });
});

describe('anchors change nothing but the bookkeeping', () => {
  const uncertainty = fc.double({ min: 1e-3, max: 0.05, noNaN: true });
  const coefficient = fc.double({ min: -2, max: 2, noNaN: true });
  const mixture = fc.tuple(coefficient, coefficient, coefficient);
  const models = [
    (x: Record<'a' | 'b' | 'c', number>): number => x.a + 2 * x.b - 0.5 * x.c,
    (x: Record<'a' | 'b' | 'c', number>): number => x.a * Math.exp(0.3 * x.b) + x.c,
    (x: Record<'a' | 'b' | 'c', number>): number => Math.sin(x.a) * (2 + x.b * x.c),
  ];
  const plan = fc.record({
    u: fc.array(uncertainty, { minLength: 6, maxLength: 6 }),
    mixtures: fc.tuple(mixture, mixture, mixture, mixture),
    chosen: fc.tuple(...[0, 1, 2, 3].map(() => fc.nat(models.length - 1))),
  });

  /** Two results by way of shared values on two levels; `keep` makes a shared value an anchor or leaves it as it is. */
  function results({ u, mixtures, chosen }: typeof plan extends fc.Arbitrary<infer P> ? P : never, sources: ReturnType<typeof source>[], keep: (y: Uncertain) => Uncertain): readonly [Uncertain, Uncertain] {
    const s = u.map((_, i) => ofSource(sources[i]!));
    const mix = ([a, b, c]: readonly [number, number, number], x: Uncertain, y: Uncertain, z: Uncertain) => combine([[a, x], [b, y], [c, z]]);
    const low = keep(propagate(models[chosen[0]!]!, { a: s[0]!, b: s[1]!, c: s[2]! }));
    const lowToo = keep(mix(mixtures[0], s[1]!, s[2]!, s[3]!));
    const high = keep(propagate(models[chosen[1]!]!, { a: low, b: lowToo, c: s[0]! }));
    const one = propagate(models[chosen[2]!]!, { a: mix(mixtures[1], low, high, s[4]!), b: high, c: s[4]! });
    const other = withSensitivities(1, [[mixtures[2][0], one], [mixtures[2][1], propagate(models[chosen[3]!]!, { a: lowToo, b: mix(mixtures[3], high, s[5]!, s[1]!), c: low })]]);
    return [one, other];
  }

  test('values, contributions, variances and covariances are those of the expression without anchors, to 1e-9', () => {
    let withAnchors = 0;
    fc.assert(fc.property(plan, (p) => {
      const sources = p.u.map((u, i) => source(`s${i}`, 0.3 + 0.1 * i, u));
      const plain = results(p, sources, (y) => y);
      const anchored = results(p, sources, anchor);
      if (anchored.every((y) => y.through.size > 0)) withAnchors++;
      const size = Math.max(...plain.map(standardUncertainty), 1e-6);
      for (const i of [0, 1] as const) {
        expect(Math.abs(anchored[i].value - plain[i].value)).toBeLessThanOrEqual(1e-12 * (1 + Math.abs(plain[i].value)));
        expect(Math.abs(standardUncertainty(anchored[i]) - standardUncertainty(plain[i]))).toBeLessThanOrEqual(1e-9 * size);
        const [flat, open] = [contributions(anchored[i]), contributions(plain[i])];
        for (const s of sources) expect(Math.abs((flat.get(s) ?? 0) - (open.get(s) ?? 0))).toBeLessThanOrEqual(1e-9 * size);
        const squares = [...flat.values()].reduce((sum, part) => sum + part * part, 0);
        expect(Math.abs(Math.sqrt(squares) - standardUncertainty(anchored[i]))).toBeLessThanOrEqual(1e-9 * size);
      }
      expect(Math.abs(covariance(...anchored) - covariance(...plain))).toBeLessThanOrEqual(1e-9 * size * size);
      // Asked the other way round, and between one with anchors and one without.
      expect(Math.abs(covariance(anchored[1], anchored[0]) - covariance(...plain))).toBeLessThanOrEqual(1e-9 * size * size);
      expect(Math.abs(covariance(anchored[0], plain[1]) - covariance(...plain))).toBeLessThanOrEqual(1e-9 * size * size);
    }));
    expect(withAnchors).toBeGreaterThan(50);
  });

  test('an anchor of an anchor has the same contributions', () => {
    const a = anchor(combine([[2, value('x', 1, 0.1)], [-3, value('y', 1, 0.2)]]));
    const again = anchor(a);
    expect([...again.flat.values()]).toEqual([...a.flat.values()]);
    expect(covariance(a, again)).toBeCloseTo(0.04 + 0.36, 14);
  });
});

describe('two runs on one calibration', () => {
  // Source: methods 3, derived: shots of 40 and 30 µN·s, s = 1.2, n = 8, calibration factor known to 6 %.
  const factor = anchor(value('K', 1, 0.06));
  const run = (id: string, mean: number): Uncertain => propagate((x) => x.K * x.y, { K: factor, y: value(id, mean, 1.2 / Math.sqrt(8)) });
  const [one, other] = [run('one', 40), run('other', 30)];

  test('leave the calibration in their difference by the difference alone: 0.85, not 0.60', () => {
    const difference = combine([[1, one], [-1, other]]);
    expect(standardUncertainty(difference)).toBeCloseTo(Math.hypot(10 * 0.06, 0.6), 9);
    expect(standardUncertainty(difference)).toBeCloseTo(0.85, 2);
  });

  test('cancel the calibration in their ratio', () => {
    const ratio = propagate((x) => x.a / x.b, { a: one, b: other });
    expect(standardUncertainty(ratio) / ratio.value).toBeCloseTo(Math.hypot(1.2 / 40, 1.2 / 30) / Math.sqrt(8), 4);
    expect(Math.abs(contributions(ratio).get([...factor.flat.keys()][0]!)! / ratio.value)).toBeLessThan(0.0004);
  });
});
