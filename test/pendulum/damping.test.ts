/** Damping factor and log decrement against tables, and the small exercises that textbooks set on them. */
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { dampingFactor, decrementOfRatio, logDecrement, ratioOfDecrement, restFromThree } from '../../src/pendulum/damping.ts';
import { digits } from '../numeric/digits.ts';
import reference from '../reference/pendulum.json' with { type: 'json' };

describe('the first-peak damping factor D', () => {
  // Source: methods 1.3, derived, ODE-checked at 0.05, 0.3 and 1.5.
  test('has the values of the table, to its eight decimals', () => {
    const table: Readonly<Record<string, number>> = {
      0.001: 1.00157103, 0.005: 1.00785981, 0.01: 1.01573119, 0.02: 1.03150831, 0.05: 1.07910717, 0.1: 1.15928538, 0.2: 1.32251529, 0.3: 1.48909892,
      0.5: 1.83051947, 0.7: 2.1807019, 1.5: 3.63724608,
    };
    for (const [zeta, D] of Object.entries(table)) expect(dampingFactor(Number(zeta))).toBeCloseTo(D, 8);
  });

  test('is 1 without damping and e at critical damping', () => {
    expect(dampingFactor(0)).toBe(1);
    expect(dampingFactor(1)).toBe(Math.E);
  });

  // Source: methods 1.3, derived: D = 1 + πζ/2 + (π²/8 − 1)ζ² + …
  test('begins as 1 + πζ/2 + (π²/8 − 1)ζ², on both sides of zero', () => {
    for (const zeta of [-1e-3, -1e-4, 1e-4, 1e-3]) expect(Math.abs(dampingFactor(zeta) - (1 + (Math.PI * zeta) / 2 + (Math.PI ** 2 / 8 - 1) * zeta ** 2))).toBeLessThan(Math.abs(zeta) ** 3);
  });

  test('rises smoothly through critical damping', () => {
    // dD/dζ at 1 is 2e/3 (from arccos ζ/√(1 − ζ²) = 1 − (ζ − 1)/3 + …).
    for (const h of [1e-6, 1e-5, 4.9e-5, 5.1e-5, 1e-4]) expect((dampingFactor(1 + h) - dampingFactor(1 - h)) / (2 * h)).toBeCloseTo((2 * Math.E) / 3, 7);
    let before = 0;
    for (let zeta = 0.999; zeta < 1.001; zeta += 1e-6) {
      const D = dampingFactor(zeta);
      expect(D).toBeGreaterThan(before);
      before = D;
    }
  });

  test('far below zero is refused', () => {
    for (const zeta of [-0.5, -2, NaN]) expect(() => dampingFactor(zeta)).toThrow(RangeError);
  });
});

describe('the log decrement', () => {
  // Source: any vibration handbook, e.g. Harris (from memory, recomputed independently).
  test('and the ratio of one period have the values of the table, to 14 digits, and give the damping ratio back', () => {
    const table = reference.find((e) => e.id === 'f03-logdec')!.expected as unknown as Readonly<Record<string, [number, number]>>;
    const rows = Object.entries(table).filter(([zeta]) => zeta !== 'columns');
    expect(rows.length).toBe(9);
    for (const [zeta, [delta, left]] of rows) {
      expect(digits(decrementOfRatio(Number(zeta)), delta)).toBeGreaterThan(14);
      expect(digits(ratioOfDecrement(delta), Number(zeta))).toBeGreaterThan(14);
      expect(digits(logDecrement(1, left, 1), delta)).toBeGreaterThan(14);
    }
  });

  test('and the damping ratio undo each other', () => {
    fc.assert(fc.property(fc.double({ min: 0, max: 0.99, noNaN: true }), (zeta) => {
      expect(Math.abs(ratioOfDecrement(decrementOfRatio(zeta)) - zeta)).toBeLessThan(1e-14);
    }));
  });

  // Source: methods 5 item 2, derived.
  test('with 13.0 % of the amplitude left at the 100th cycle is 0.0204022, the damping ratio 0.00324710', () => {
    const delta = logDecrement(100, 13, 100);
    expect(delta).toBeCloseTo(0.0204022, 7);
    expect(ratioOfDecrement(delta)).toBeCloseTo(0.0032471, 8);
  });

  // Source: methods 5 item 3, derived from a textbook exercise's inputs: m = 6 kg, k = 5400 N/m, x₁/x₂ = 3/2.
  test('of amplitudes as 3 to 2 is 0.405465, the ratio 0.0643978 and the dashpot 23.1832 N·s/m', () => {
    const delta = logDecrement(3, 2, 1);
    const zeta = ratioOfDecrement(delta);
    expect(delta).toBeCloseTo(0.405465, 6);
    expect(Math.exp(2 * delta)).toBeCloseTo(2.25, 12);
    expect(zeta).toBeCloseTo(0.0643978, 7);
    expect(2 * zeta * Math.sqrt(6 * 5400)).toBeCloseTo(23.1832, 4);
    expect(delta / (2 * Math.PI)).toBeCloseTo(0.0645318, 7);
    expect(delta / (2 * Math.PI) / zeta - 1).toBeCloseTo(0.00208, 5);
  });

  test('of amplitudes on opposite sides, of no cycle, or of a ratio out of 0 … 1 is refused', () => {
    expect(() => logDecrement(3, -2, 1)).toThrow(RangeError);
    expect(() => logDecrement(3, 2, 0)).toThrow(RangeError);
    expect(() => logDecrement(0, 2, 1)).toThrow(RangeError);
    for (const zeta of [-0.1, 1, NaN]) expect(() => decrementOfRatio(zeta)).toThrow(RangeError);
    expect(() => ratioOfDecrement(-0.1)).toThrow(RangeError);
  });
});

describe('three successive turning points', () => {
  // Source: methods 5 item 16 and 1.4, derived.
  test('12.40, −8.30 and 10.65 have their rest at 1.593190 and half a decrement of 0.0883298', () => {
    const { rest, halfDecrement } = restFromThree(12.4, -8.3, 10.65);
    expect(rest).toBeCloseTo(1.59319, 6);
    expect(halfDecrement).toBeCloseTo(0.0883298, 7);
    // The classical swing mean is off by the decay.
    expect((12.4 + 2 * -8.3 + 10.65) / 4).toBeCloseTo(1.6125, 12);
  });

  test('of a viscous decay about any rest give rest and decay back', () => {
    const half = fc.double({ min: 1e-3, max: 1.5, noNaN: true });
    fc.assert(fc.property(fc.double({ min: -5, max: 5, noNaN: true }), half, fc.constantFrom(-1, 1), (z, decay, side) => {
      const at = (k: number): number => z + side * 10 * (-1) ** k * Math.exp(-k * decay);
      const { rest, halfDecrement } = restFromThree(at(0), at(1), at(2));
      expect(rest).toBeCloseTo(z, 12);
      expect(halfDecrement).toBeCloseTo(decay, 12);
    }));
  });

  test('that do not alternate are refused', () => {
    expect(() => restFromThree(3, 2, 1)).toThrow(RangeError);
    expect(() => restFromThree(1, 1, 1)).toThrow(RangeError);
    expect(() => restFromThree(3, 1, 1)).toThrow(RangeError);
  });
});
