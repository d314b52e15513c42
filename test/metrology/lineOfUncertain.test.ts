/** The line through points uncertain in both axes: published data, its slopes by differences, its interval by simulation. */
import { describe, expect, it } from 'vitest';
import { curvatureTest, interceptTest, lineOfUncertain, type UncertainLine, type UncertainPoint } from '../../src/metrology/lineOfUncertain.ts';
import { anchor, combine, exact, ofSource, propagate, standardUncertainty, type Uncertain } from '../../src/metrology/uncertain.ts';
import { coverageFactor, expanded, finiteSources } from '../../src/metrology/coverage.ts';
import lines from '../reference/lines.json';
import { draws, source } from './sources.ts';

const WORDS = { id: 'line.scatter', label: 'scatter', symbol: 'y', dimension: 'number', family: { id: 'f', label: 'f' } } as const;
const value = (id: string, x: number, u: number): Uncertain => ofSource(source(id, x, u));
function fitted(points: readonly UncertainPoint[], withIntercept: boolean): UncertainLine {
  const found = lineOfUncertain(points, withIntercept, WORDS);
  if (found.status !== 'fitted') throw new Error(found.status);
  return found;
}
const pointsOf = (x: readonly number[], y: readonly number[], ux: readonly number[], uy: readonly number[]): readonly UncertainPoint[] => x.map((value1, i) => ({ x: value(`x${i}`, value1, ux[i]!), y: value(`y${i}`, y[i]!, uy[i]!) }));

describe('Pearson’s data with rounded σ (SciPy’s odr test, its origin in test/reference)', () => {
  const { inputs, expected } = lines.find(({ id }) => id === 'b02-pearson-scipytest')!;
  const { x, y, sx, sy } = inputs as Readonly<Record<'x' | 'y' | 'sx' | 'sy', readonly number[]>>;
  const { york } = expected as { readonly york: Readonly<Record<'a' | 'b' | 'sa' | 'sb' | 'S', number>> };
  const line = fitted(pointsOf(x, y, sx, sy), true);

  it('gives York’s slope, intercept and χ²', () => {
    expect(line.slope.value).toBeCloseTo(york.b, 9);
    expect(line.intercept!.value).toBeCloseTo(york.a, 9);
    expect(line.chiSquared).toBeCloseTo(york.S, 9);
    expect(line.dof).toBe(8);
  });

  it('carries u at the data, widened by √(χ²/ν) = 1.228 as the scatter is larger than stated', () => {
    expect(line.widened).toBeCloseTo(Math.sqrt(york.S / 8), 9);
    // York’s u is at the adjusted points, this one at the data: they part by a few per cent where χ²/ν is not small.
    expect(standardUncertainty(line.slope) / (york.sb * line.widened)).toBeCloseTo(1, 1);
  });

  it('its slopes in every coordinate are those of the fit itself', () => {
    for (const [i, axis] of [[0, 'x'], [4, 'y'], [8, 'x'], [9, 'y']] as const) {
      const h = 1e-6;
      const moved = (sign: number): UncertainLine => fitted(pointsOf(x.map((v, k) => (axis === 'x' && k === i ? v + sign * h : v)), y.map((v, k) => (axis === 'y' && k === i ? v + sign * h : v)), sx, sy), true);
      const slope = (moved(1).slope.value - moved(-1).slope.value) / (2 * h);
      const u = axis === 'x' ? sx[i]! : sy[i]!;
      const part = [...line.slope.own].find(([one]) => one.id === `${axis}${i}`)?.[1] ?? 0;
      expect(part / u).toBeCloseTo(slope, 5);
    }
  });

  it('its leverages sum to the two coefficients', () => {
    expect(line.points.reduce((sum, point) => sum + point.leverage, 0)).toBeCloseTo(2, 12);
  });
});

it('y = 0, 2, 4 … on a line through the origin has that slope, and u = 1/√Σx²/u² as NoInt of NIST StRD does', () => {
  // NoInt2 (NIST StRD, linear, y = b x): x 4, 5, 6; y 3, 4, 4; b = 0.727272727272727, residual sd 0.369274472937998.
  const line = fitted(pointsOf([4, 5, 6], [3, 4, 4], [0, 0, 0], [1, 1, 1]), false);
  expect(line.slope.value).toBeCloseTo(0.727272727272727, 12);
  expect(Math.sqrt(line.chiSquared / line.dof)).toBeCloseTo(0.369274472937998, 12);
  expect(standardUncertainty(line.slope)).toBeCloseTo(1 / Math.sqrt(77), 12);
});

it('what all points share goes through the slope afterwards and weighs nothing', () => {
  const s = anchor(value('scale', 1, 0.02));
  const bare = [1, 2, 3].map((x) => ({ x: exact(x), y: value(`y${x}`, 2 * x, 0.05) }));
  const shared = bare.map(({ x, y }, i) => ({ x: propagate(({ a, b }) => a * b, { a: x, b: s }), y: i < 0 ? x : y }));
  const [one, other] = [fitted(bare, false), fitted(shared, false)];
  expect(other.slope.value).toBeCloseTo(one.slope.value, 12);
  expect(standardUncertainty(other.slope)).toBeCloseTo(Math.hypot(standardUncertainty(one.slope), 0.02 * one.slope.value), 9);
});

it('a scale that all points share moves the slope through the origin by exactly itself, also where the points scatter', () => {
  const s = anchor(value('scale', 1, 0.05));
  const scaled = [[1, 2.1], [2, 3.9], [3, 6.3], [4, 7.6]].map(([x, y], i) => ({ x: value(`x${i}`, x!, 0.05), y: propagate(({ a, b }) => a * b, { a: value(`y${i}`, y!, 0.08), b: s }) }));
  const part = [...fitted(scaled, false).slope.through].reduce((sum, [a, c]) => sum + c * ([...a.flat.values()][0] ?? 0), 0);
  expect(part / fitted(scaled, false).slope.value).toBeCloseTo(0.05, 9);
});

describe('tests of the line', () => {
  const straight = [1, 2, 3, 4, 5].map((x, i) => ({ x: exact(x), y: value(`y${x}`, 2 * x + [0.01, -0.02, 0.015, -0.01, 0.005][i]!, 0.02) }));

  it('a line through the origin has no intercept and no bend', () => {
    expect(Math.abs(interceptTest(straight)!.t)).toBeLessThan(2);
    expect(curvatureTest(straight)!.probability).toBeGreaterThan(0.05);
  });

  it('an offset of 0.2 with u 0.02 is an intercept; x² of 0.05 is a bend', () => {
    expect(interceptTest(straight.map(({ x, y }) => ({ x, y: combine([[1, y], [1, exact(0.2)]]) })))!.probability).toBeLessThan(1e-6);
    expect(curvatureTest(straight.map(({ x, y }) => ({ x, y: combine([[1, y], [1, exact(0.05 * x.value ** 2)]]) })))!.probability).toBeLessThan(1e-3);
  });

  it('too few points have none', () => {
    expect(interceptTest(straight.slice(0, 2))).toBeNull();
    expect(curvatureTest(straight.slice(0, 3))).toBeNull();
    expect(lineOfUncertain(straight.slice(0, 1), true, WORDS).status).toBe('tooFewPoints');
    expect(lineOfUncertain([{ x: exact(0), y: value('y', 1, 0.1) }], false, WORDS).status).toBe('noSpread');
  });
});

it('its interval holds the true slope as often as it says, where the points scatter twice as much as stated', () => {
  const { normal } = draws(77);
  const runs = 2000;
  const held = { asStated: 0, twice: 0 };
  for (let n = 0; n < runs; n++) {
    for (const [name, scatter] of [['asStated', 1], ['twice', 2]] as const) {
      const points = [1, 2, 3, 4, 5, 6].map((x) => ({ x: value(`x${x}`, x + 0.02 * scatter * normal(), 0.02), y: value(`y${x}`, 3 * x + 0.05 * scatter * normal(), 0.05) }));
      const { slope } = fitted(points, false);
      const { value: b, U } = expanded(slope, finiteSources([slope]));
      if (Math.abs(b - 3) <= U) held[name] += 1;
    }
  }
  expect(coverageFactor(Infinity)).toBeCloseTo(1.96, 2);
  const limit = 3 * Math.sqrt((0.95 * 0.05) / runs);
  // Stated too small: the scatter seen, with its ν = 5, makes the interval. Stated right: widening by chance alone errs to the wide side.
  expect(Math.abs(held.twice / runs - 0.95)).toBeLessThan(limit + 0.01);
  expect(held.asStated / runs).toBeGreaterThan(0.95 - limit);
});
