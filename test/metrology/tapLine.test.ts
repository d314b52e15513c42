/** The line of the taps: simulated taps of known slope, how well they repeat, what their common factor does to the slope. */
import { describe, expect, it } from 'vitest';
import { repeatsOf, sizesOfTaps, tapLineOf, type TapLine, type TapPoint } from '../../src/metrology/tapLine.ts';
import { coverageFactor } from '../../src/metrology/coverage.ts';
import { deviationOf, draws, meanOf } from './sources.ts';

const SAME_SIZE = 0.01;
/** K 1.2e-2 N·m·s/rad: launch φ = H/K. */
const SLOPE = 1 / 1.2e-2;
const SIZES = [4e-4, 4e-4, 8e-4, 8e-4, 8e-4, 1.2e-3, 1.6e-3, 1.6e-3, 2e-3, 2e-3];

function fitted(taps: readonly TapPoint[]): TapLine {
  const line = tapLineOf(taps, SAME_SIZE);
  if (line.status !== 'fitted') throw new Error(line.status);
  return line;
}

/** Taps of 1 % own u of the hammer and 0.3 mrad own u of the throw. `scatter`: true over stated; `factor`: true impulse over stated. */
function taps(normal: () => number, { scatter = 1, factor = 1, offset = 0, drift = 0 } = {}): readonly TapPoint[] {
  return SIZES.map((size, place) => {
    const [ux, uy] = [0.01 * size, 3e-4];
    const given = size * (1 + 0.01 * scatter * normal());
    // What is stated is the size; what was given differs from it by chance, and by the hammer's factor for all.
    return { x: size, ux, y: offset + SLOPE * factor * given * (1 + drift * (place / (SIZES.length - 1) - 0.5)) + uy * scatter * normal(), uy, place };
  });
}

describe('simulated taps', () => {
  it('the slope holds the truth as often as its u says, with scatter as stated and twice that', () => {
    const { normal } = draws(21);
    const runs = 3000;
    for (const [scatter, tolerance] of [[1, 0.025], [2, 0.01]] as const) {
      let [held, heldFree] = [0, 0];
      for (let i = 0; i < runs; i++) {
        const { origin, originScatter, free, freeScatter } = fitted(taps(normal, { scatter }));
        const k = (widened: number, dof: number): number => coverageFactor(widened > 1 ? dof : Infinity) * widened;
        if (Math.abs(origin.slope - SLOPE) <= k(originScatter.widened, originScatter.dof) * origin.uSlope) held += 1;
        if (Math.abs(free!.slope - SLOPE) <= k(freeScatter!.widened, freeScatter!.dof) * free!.uSlope) heldFree += 1;
      }
      for (const share of [held / runs, heldFree / runs]) {
        expect(share).toBeGreaterThan(0.95 - 3 * Math.sqrt((0.95 * 0.05) / runs));
        expect(share).toBeLessThan(0.95 + tolerance + 3 * Math.sqrt((0.95 * 0.05) / runs));
      }
    }
  });

  it('the hammer’s common factor goes through the slope as the slopes by x say, and leaves χ² as it is', () => {
    const { normal } = draws(22);
    const drawn = taps(normal);
    const line = fitted(drawn);
    for (const part of [line.origin, line.free!]) {
      const through = drawn.reduce((sum, { x }, i) => sum + part.slopeBy.x[i]! * x, 0);
      const h = 1e-5;
      const at = (f: number): number => {
        const moved = fitted(drawn.map((tap) => ({ ...tap, x: tap.x * f })));
        return (part === line.origin ? moved.origin : moved.free!).slope;
      };
      expect(Math.abs((at(1 + h) - at(1 - h)) / (2 * h) / through - 1)).toBeLessThan(1e-5);
      // 3 % of the factor is 3 % of the slope, not 3 %/√10; and nothing of it was in the weights. (u(x) of 1 % stays as stated, so not to the last digit.)
      expect(Math.abs(through / part.slope + 1)).toBeLessThan(0.01);
    }
    const shifted = fitted(drawn.map((tap) => ({ ...tap, x: 1.03 * tap.x, ux: 1.03 * tap.ux })));
    expect(shifted.origin.chiSquared).toBeCloseTo(line.origin.chiSquared, 9);
    expect(shifted.origin.slope * 1.03).toBeCloseTo(line.origin.slope, 9);
  });

  it('scatter as stated is not widened by more than chance; twice that is, by 2, and said to be unlikely', () => {
    const { normal } = draws(23);
    const ratio = (scatter: number): readonly number[] => Array.from({ length: 400 }, () => Math.sqrt(fitted(taps(normal, { scatter })).originScatter.chiSquared / 9));
    expect(meanOf(ratio(1).map((x) => x * x))).toBeCloseTo(1, 1);
    expect(meanOf(ratio(2))).toBeGreaterThan(1.85);
    const wide = fitted(taps(normal, { scatter: 3 }));
    expect(wide.originScatter.widened).toBeGreaterThan(1.5);
    expect(wide.originScatter.probability).toBeLessThan(0.01);
  });

  it('an intercept, a drift and straight taps are told apart', () => {
    const { normal } = draws(24);
    const plain = fitted(taps(normal));
    expect(plain.intercept!.probability).toBeGreaterThan(0.01);
    expect(plain.byOrder!.probability).toBeGreaterThan(0.01);
    expect(plain.bend!.probability).toBeGreaterThan(0.01);
    expect(plain.runs!.above + plain.runs!.below).toBe(10);
    expect(fitted(taps(normal, { offset: 3e-3 })).intercept!.probability).toBeLessThan(1e-3);
    const drifting = fitted(taps(normal, { drift: 0.08 }));
    expect(drifting.byOrder!.probability).toBeLessThan(0.01);
    expect(Math.abs(drifting.byOrder!.relative - 0.08)).toBeLessThan(0.04);
    expect(drifting.byPlace!.t).toBeCloseTo(drifting.byOrder!.t, 9);
  });
});

describe('sizes and sides', () => {
  it('are told with their own u: 1 % apart is one size, 3 % of exact impulses are two', () => {
    const of = (x: readonly number[], u: number): number => sizesOfTaps(x.map((value) => ({ x: value, ux: u * Math.abs(value) })), SAME_SIZE).length;
    expect(of([1, 1.005, 0.998, 2], 0)).toBe(2);
    expect(of([1, 1.03], 0)).toBe(2);
    expect(of([1, 1.03], 0.02)).toBe(1);
    expect(of([1, -1], 0)).toBe(2);
    expect(of([], 0)).toBe(0);
  });

  it('one size has no intercept and no bend; two sizes no bend; one side is said', () => {
    const tap = (x: number, y: number, place: number): TapPoint => ({ x, y, ux: 0.01 * Math.abs(x), uy: 1e-3, place });
    const one = fitted([tap(1, 2, 0), tap(1, 2.001, 1), tap(1, 1.999, 2), tap(1.002, 2.003, 3)]);
    expect([one.sizes, one.sides, one.free, one.intercept, one.bend]).toEqual([1, 1, null, null, null]);
    const two = fitted([tap(1, 2, 0), tap(1, 2.001, 1), tap(2, 4, 2), tap(2, 3.999, 3)]);
    expect(two.sizes).toBe(2);
    expect(two.intercept).not.toBeNull();
    expect(two.bend).toBeNull();
    expect(fitted([tap(1, 2, 0), tap(-1, -2, 1)]).sides).toBe(2);
  });

  it('no taps, and taps without an impulse, have no line', () => {
    expect(tapLineOf([], SAME_SIZE).status).toBe('noTaps');
    expect(tapLineOf([{ x: 0, y: 1, ux: 0.1, uy: 0.1, place: 0 }], SAME_SIZE).status).toBe('noSpread');
  });

  it('a single tap has its slope and nothing to test', () => {
    const line = fitted([{ x: 1, y: 2, ux: 0.01, uy: 0.01, place: 0 }]);
    expect(line.origin.slope).toBeCloseTo(2, 12);
    expect([line.free, line.intercept, line.byOrder, line.repeats, line.originScatter.probability]).toEqual([null, null, null, null, null]);
  });
});

describe('repeated taps of one size', () => {
  it('by hand: 9, 10, 11 at 1 and 19, 21 at 2 give √[(0.01 + 0.01 + 2·0.0025)/3]', () => {
    const tap = (x: number, y: number): TapPoint => ({ x, y, ux: 0, uy: 0.05 * y, place: 0 });
    const found = repeatsOf(sizesOfTaps([tap(1, 9), tap(1, 10), tap(2, 19), tap(1, 11), tap(2, 21), tap(5, 50)], SAME_SIZE))!;
    expect(found.relative).toBeCloseTo(Math.sqrt(0.025 / 3), 14);
    expect(found.dof).toBe(3);
    expect(found.sizes).toBe(2);
    expect(found.expected).toBeCloseTo(0.05, 14);
    // χ² = 0.025/0.0025 = 10 with ν = 3: chance 0.0186 (any table of chi-square: 9.837 at 2 %, 11.345 at 1 %, from memory).
    expect(found.probability).toBeGreaterThan(0.01);
    expect(found.probability).toBeLessThan(0.02);
  });

  it('many simulated ones scatter as their own u predict, pooled', () => {
    const { normal } = draws(25);
    const found = Array.from({ length: 400 }, () => fitted(taps(normal)).repeats!);
    expect(found[0]!.dof).toBe(5);
    expect(Math.sqrt(meanOf(found.map(({ relative }) => relative ** 2))) / found[0]!.expected).toBeCloseTo(1, 1);
    // Chances are level between 0 and 1.
    expect(meanOf(found.map(({ probability }) => probability!))).toBeCloseTo(0.5, 1);
    expect(deviationOf(found.map(({ probability }) => probability!))).toBeCloseTo(1 / Math.sqrt(12), 1);
  });

  it('none repeated, none told; exact ones have no chance', () => {
    const exact = (x: number, y: number): TapPoint => ({ x, y, ux: 0, uy: 0, place: 0 });
    expect(repeatsOf(sizesOfTaps([exact(1, 1), exact(2, 2)], SAME_SIZE))).toBeNull();
    expect(repeatsOf(sizesOfTaps([exact(1, 1), exact(1, 1.1)], SAME_SIZE))!.probability).toBeNull();
    expect(repeatsOf(sizesOfTaps([exact(1, 1), exact(1, 1)], SAME_SIZE))!.relative).toBe(0);
  });
});
