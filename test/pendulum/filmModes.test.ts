import fc from 'fast-check';
import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { gaussRule } from '../../src/numeric/legendre.ts';
import type { FilmHold, FilmModes } from '../../src/pendulum/filmModes.ts';
import { filmModes, LEAST_STIFFNESS_NUMBER, modalTipMass, modesAt, modesOver } from '../../src/pendulum/filmModes.ts';

interface Reference {
  readonly methods: Readonly<Record<'limpFrequency' | 'clampedFrequencyAt00012' | 'springyFrequency' | 'limpModalMass' | 'springyModalMass' | 'springyStaticMass', number>>;
  readonly bessel: { readonly zeros: readonly number[]; readonly j1: readonly number[] };
  readonly cantilever: { readonly roots: readonly number[] };
}
const reference = JSON.parse(readFileSync('test/reference/film-strip.json', 'utf8')) as Reference;

const film = (stiffnessNumber: number, hold: FilmHold = 'clamped', plateRatio = 0): FilmModes => filmModes({ stiffnessNumber, plateRatio, hold });
const relative = (found: number, expected: number): number => Math.abs(found / expected - 1);

/** ∫ over 0 … 1 on panels that shrink towards the clamp; a quadrature of the test's own. */
function integral(f: (x: number) => number): number {
  const { points, weights } = gaussRule(12);
  const ends = [0, ...Array.from({ length: 9 }, (_, i) => 4 ** (i - 9)), ...Array.from({ length: 20 }, (_, i) => 0.25 + (0.75 * (i + 1)) / 20)];
  let sum = 0;
  for (let e = 0; e + 1 < ends.length; e += 1) {
    const half = (ends[e + 1]! - ends[e]!) / 2;
    points.forEach((point, q) => (sum += half * weights[q]! * f(ends[e]! + half * (1 + point))));
  }
  return sum;
}

describe('the limp film is Bernoulli’s hanging chain', () => {
  const limp = film(0);

  test('its frequencies are half the zeros of J₀', () => {
    reference.bessel.zeros.forEach((zero, n) => expect(relative(limp.frequencies[n]!, zero / 2)).toBeLessThan(1e-8));
    expect(limp.frequencies[0]).toBeCloseTo(reference.methods.limpFrequency, 5);
  });

  test('its modal masses with the tip at 1 are J₁² at the zeros, 0.2695 of the film for the first', () => {
    reference.bessel.j1.forEach((j1, n) => expect(relative(modalTipMass(limp, n), j1 * j1)).toBeLessThan(1e-7));
    expect(modalTipMass(limp, 0)).toBeCloseTo(reference.methods.limpModalMass, 5);
  });
});

describe('the springy film is a cantilever', () => {
  test('its frequencies are the squares of the roots of cos b cosh b = −1', () => {
    const springy = film(1e6);
    reference.cantilever.roots.forEach((root, n) => expect(relative(springy.frequencies[n]!, root * root * 1e3)).toBeLessThan(2e-6));
    expect(springy.frequencies[0]! / 1e3).toBeCloseTo(reference.methods.springyFrequency, 3);
  });

  test('its modal mass is 0.2500 of the film, a static pull at the tip tells 0.2427', () => {
    const springy = film(1e6);
    expect(modalTipMass(springy, 0)).toBeCloseTo(reference.methods.springyModalMass, 4);
    expect(1 / (springy.staticTipCompliance * springy.frequencies[0]! ** 2)).toBeCloseTo(reference.methods.springyStaticMass, 4);
    // k = 3EI/L³, any handbook.
    expect(relative(1 / springy.staticTipCompliance, 3e6)).toBeLessThan(1e-6);
  });
});

test('a stiff film on a hinge is the rigid strip, √1.5 and a third of the mass', () => {
  const rigid = film(100, 'hinged');
  expect(relative(rigid.frequencies[0]!, Math.sqrt(1.5))).toBeLessThan(1e-5);
  expect(relative(modalTipMass(rigid, 0), 1 / 3)).toBeLessThan(1e-4);
});

test('a heavy plate makes it a simple pendulum', () => {
  const { frequencies } = film(0, 'hinged', 1e4);
  expect(frequencies[0]! - 1).toBeGreaterThan(0);
  expect(frequencies[0]! - 1).toBeLessThan(1e-5);
});

test('clamping hides the film’s limpness: at S = 0.0012 the frequency is that of the rigid strip, 1.226', () => {
  expect(film(0.0012).frequencies[0]).toBeCloseTo(reference.methods.clampedFrequencyAt00012, 3);
});

describe('modes', () => {
  test('are orthogonal in mass, the plate included, and carry the modal mass 1/ω²', () => {
    for (const [S, P, hold] of [[1e-5, 0, 'clamped'], [0.0094, 0.5, 'clamped'], [1, 0, 'hinged'], [0, 2, 'hinged']] as const) {
      const modes = film(S, hold, P);
      const tip = modesAt(modes, 1);
      for (const [i, k] of [[0, 0], [1, 1], [5, 5], [0, 1], [0, 3], [2, 5], [4, 6]] as const) {
        const product = integral((x) => modesAt(modes, x)[i]! * modesAt(modes, x)[k]!) + P * tip[i]! * tip[k]!;
        const scaled = product * modes.frequencies[i]! * modes.frequencies[k]!;
        expect(Math.abs(scaled - (i === k ? 1 : 0))).toBeLessThan(1e-6);
      }
    }
  });

  test('have potential energy ∫T y′² + S y″² = 1 between tension and bending, by differences of the shape', () => {
    for (const [S, P] of [[0.0012, 0], [0.0094, 1], [1, 0]] as const) {
      const modes = film(S, 'clamped', P);
      for (const n of [0, 2]) {
        const h = 1e-4;
        const at = (x: number): number => modesAt(modes, Math.abs(x))[n]!;
        const energy = integral((x) => {
          const middle = Math.min(Math.max(x, h), 1 - h);
          const slope = (at(middle + h) - at(middle - h)) / (2 * h);
          const curvature = (at(middle + h) - 2 * at(middle) + at(middle - h)) / h ** 2;
          return (1 - x + P) * slope ** 2 + S * curvature ** 2;
        });
        expect(Math.abs(energy - 1)).toBeLessThan(5e-3);
      }
    }
  });

  test('have the mean over a zone that their values have, also where it reaches past the tip along the tangent', () => {
    const modes = film(0.0012);
    const { points, weights } = gaussRule(40);
    for (const [from, to] of [[0.8, 1], [0.31, 0.62], [0.9, 1.05], [1.02, 1.05]] as const) {
      const mean = modesOver(modes, from, to);
      for (const n of [0, 3]) {
        const parts = from < 1 && to > 1 ? [[from, 1], [1, to]] as const : [[from, to]] as const;
        const expected = parts.reduce((sum, [a, b]) => sum + points.reduce((s, p, q) => s + weights[q]! * modesAt(modes, (a + b + (b - a) * p) / 2)[n]!, 0) * (b - a) / 2 / (to - from), 0);
        expect(mean[n]).toBeCloseTo(expected, 8);
      }
    }
  });

  test('do not move at the hold, and not turn there at a clamp', () => {
    const modes = film(0.01);
    expect(Math.abs(modesAt(modes, 0)[0]!)).toBeLessThan(1e-15);
    expect(Math.abs(modesAt(modes, 1e-6)[0]!)).toBeLessThan(1e-10);
  });
});

test('no stiffness from 1e-7 to 1e6 needs more elements than the usual for its first five frequencies', () => {
  for (const P of [0, 0.3, 3]) {
    for (const S of [1e-7, 1e-5, 1e-3, 0.1, 10, 1e3, 1e6]) {
      const [usual, fine] = [film(S, 'clamped', P), filmModes({ stiffnessNumber: S, plateRatio: P, hold: 'clamped' }, { elements: 18, degree: 10 })];
      for (let n = 0; n < 5; n += 1) expect(relative(usual.frequencies[n]!, fine.frequencies[n]!)).toBeLessThan(1e-6);
    }
  }
});

test('more elements bring the fifteenth frequency to rest', () => {
  const fifteenth = (elements: number): number => filmModes({ stiffnessNumber: 1e-4, plateRatio: 0, hold: 'clamped' }, { elements, degree: 6 }).frequencies[14]!;
  const exact = filmModes({ stiffnessNumber: 1e-4, plateRatio: 0, hold: 'clamped' }, { elements: 20, degree: 11 }).frequencies[14]!;
  const gaps = [4, 6, 8, 12].map((elements) => relative(fifteenth(elements), exact));
  for (let i = 1; i < gaps.length; i += 1) expect(gaps[i]!).toBeLessThan(gaps[i - 1]!);
  expect(gaps.at(-1)).toBeLessThan(1e-4);
});

test('a stiffer film and a clamped one are never slower', () => {
  const log = fc.double({ min: Math.log(1e-7), max: Math.log(1e2), noNaN: true });
  fc.assert(fc.property(log, fc.double({ min: 0.05, max: 1, noNaN: true }), fc.double({ min: 0, max: 5, noNaN: true }), (lnS, more, P) => {
    const S = Math.exp(lnS);
    for (const n of [0, 1]) {
      expect(film(S * (1 + more), 'clamped', P).frequencies[n]!).toBeGreaterThan(film(S, 'clamped', P).frequencies[n]!);
      expect(film(S, 'clamped', P).frequencies[n]! * (1 + 1e-9)).toBeGreaterThan(film(S, 'hinged', P).frequencies[n]!);
    }
  }), { numRuns: 12 });
});

test('a film outside the range throws', () => {
  for (const S of [-1e-3, LEAST_STIFFNESS_NUMBER / 2, 1e7, Number.NaN]) expect(() => film(S)).toThrow(RangeError);
  expect(() => film(0.1, 'clamped', -0.1)).toThrow(RangeError);
});
