/** The complete elliptic integral against tables. */
import { expect, test } from 'vitest';
import { completeEllipticK } from '../../src/numeric/ellipticIntegral.ts';
import reference from '../reference/elliptic-integral.json' with { type: 'json' };
import { digits } from './digits.ts';

const byId = (id: string): [number, number][] => Object.entries(reference.find((entry) => entry.id === id)!.expected).map(([at, value]) => [Number(at), Number(value)]);

// Source: Abramowitz & Stegun Table 17.1; DLMF 19 (part from memory; recomputed independently).
test('K agrees with the table to 15 digits', () => {
  for (const [m, k] of byId('f01-ellipk')) expect(digits(completeEllipticK(m), k)).toBeGreaterThan(14.5);
});

// Source: textbook period ratios T/T₀ = 2K(sin²(θ/2))/π (source from memory; recomputed independently).
test('2K/π is the period ratio of a simple pendulum, to 14 digits', () => {
  for (const [degrees, ratio] of byId('f02-period')) {
    const half = (degrees * Math.PI) / 360;
    expect(digits((2 * completeEllipticK(Math.sin(half) ** 2)) / Math.PI, ratio)).toBeGreaterThan(14);
  }
});

// K(−m) = K(m/(1 + m))/√(1 + m) (DLMF 19.7.2, from memory).
test('K of a negative parameter follows the imaginary-modulus transformation', () => {
  for (const m of [0.1, 1, 50]) expect(digits(completeEllipticK(-m), completeEllipticK(m / (1 + m)) / Math.sqrt(1 + m))).toBeGreaterThan(14);
});

test('a parameter of 1 or more is refused', () => {
  for (const m of [1, 2, NaN, -Infinity]) expect(() => completeEllipticK(m)).toThrow(RangeError);
});
