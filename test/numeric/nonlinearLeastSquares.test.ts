/** Levenberg–Marquardt against NIST's certified fits and damped sinusoids. */
import { describe, expect, test } from 'vitest';
import { fitLeastSquares } from '../../src/numeric/nonlinearLeastSquares.ts';
import type { ConvergedFit, FitResult } from '../../src/numeric/nonlinearLeastSquares.ts';
import { ordinaryLine } from '../../src/numeric/lines.ts';
import reference from '../reference/fits.json' with { type: 'json' };
import { digits } from './digits.ts';

type Model = (x: number, b: readonly number[]) => number;
type Four = readonly [number, number, number, number];

/** Models as the reference spells them. */
const MODELS: Readonly<Record<string, Model>> = {
  'c06-Misra1a': (x, [b1 = NaN, b2 = NaN]) => b1 * (1 - Math.exp(-b2 * x)),
  'c06-MGH09': (x, [b1 = NaN, b2 = NaN, b3 = NaN, b4 = NaN]) => (b1 * (x * x + x * b2)) / (x * x + x * b3 + b4),
  'c06-ENSO': (x, [b1 = NaN, b2 = NaN, b3 = NaN, b4 = NaN, b5 = NaN, b6 = NaN, b7 = NaN, b8 = NaN, b9 = NaN]) => {
    const turn = 2 * Math.PI * x;
    return b1 + b2 * Math.cos(turn / 12) + b3 * Math.sin(turn / 12) + b5 * Math.cos(turn / b4) + b6 * Math.sin(turn / b4) + b8 * Math.cos(turn / b7) + b9 * Math.sin(turn / b7);
  },
  'c06-Lanczos3': (x, [b1 = NaN, b2 = NaN, b3 = NaN, b4 = NaN, b5 = NaN, b6 = NaN]) => b1 * Math.exp(-b2 * x) + b3 * Math.exp(-b4 * x) + b5 * Math.exp(-b6 * x),
};

function converged(fit: FitResult): ConvergedFit {
  if (fit.status !== 'converged') throw new Error(`no fit: ${fit.status} after ${fit.iterations}`);
  return fit;
}

const deviations = (fit: ConvergedFit): number[] => fit.covariance.map((row, j) => Math.sqrt((row[j]! * fit.sumOfSquares) / fit.dof));

// Source: NIST StRD nonlinear regression, certified values (11 digits), both of NIST's starts; Jacobian by differences.
describe.each(reference.filter((entry) => entry.id in MODELS))('$title', ({ id, inputs, expected }) => {
  const model = MODELS[id]!;
  const x = inputs.x!.map(Number);
  const y = inputs.y.map(Number);
  const { b, sd, RSS, dof } = expected;

  test.each(['start1', 'start2'] as const)('is met from its %s: parameters to 7 digits, their deviations to 6, the sum of squares to 10', (start) => {
    const fit = converged(fitLeastSquares((p) => x.map((value, i) => y[i]! - model(value, p)), inputs[start]!.map(Number)));
    fit.parameters.forEach((value, j) => expect(digits(value, Number(b![j]))).toBeGreaterThan(7));
    deviations(fit).forEach((value, j) => expect(digits(value, Number((sd as readonly string[])[j]))).toBeGreaterThan(6));
    expect(digits(fit.sumOfSquares, Number(RSS))).toBeGreaterThan(10);
    expect(fit.dof).toBe(dof);
  });
});

const dampedSwing = ([amplitude, phase, decay, frequency]: Four, offset: number, t: number): number => offset + amplitude * Math.exp(-decay * t) * Math.cos(frequency * t + phase);

// Source: damped-sinusoid least-squares references, computed here from deterministic data of 6 decimals, recomputed independently.
describe.each(reference.filter((entry) => entry.id.startsWith('h02')))('$title', ({ inputs, expected }) => {
  const dt = inputs.dt!;
  const { y } = inputs;
  const generator = inputs.generator!;
  const truth = expected.fit!;
  const sd = expected.sd as { readonly A: number; readonly phi: number; readonly gamma: number; readonly omega: number; readonly c: number };
  const order = ['A', 'phi', 'gamma', 'omega', 'c'] as const;
  const residuals = ([A = NaN, phi = NaN, gamma = NaN, omega = NaN, c = NaN]: readonly number[]): number[] => y.map((value, i) => Number(value) - dampedSwing([A, phi, gamma, omega], c, i * dt));
  const jacobian = ([A = NaN, phi = NaN, gamma = NaN, omega = NaN]: readonly number[]): number[][] =>
    y.map((_, i) => {
      const t = i * dt;
      const envelope = Math.exp(-gamma * t);
      const cosine = envelope * Math.cos(omega * t + phi);
      const sine = envelope * Math.sin(omega * t + phi);
      return [-cosine, A * sine, t * A * cosine, t * A * sine, -1];
    });
  const start = [generator.A * 1.2, generator.phi + 0.2, generator.gamma * 1.5, generator.omega * 1.02, generator.c];

  test.each([['by differences', {}], ['in closed form', { jacobian }]] as const)('is met with the Jacobian %s: parameters to a millionth of their deviation, deviations to 7 digits', (_, options) => {
    const fit = converged(fitLeastSquares(residuals, start, options));
    order.forEach((name, j) => expect(Math.abs(fit.parameters[j]! - truth[name])).toBeLessThan(1e-6 * sd[name] + 1e-12));
    deviations(fit).forEach((value, j) => expect(digits(value, sd[order[j]!])).toBeGreaterThan(7));
    expect(digits(fit.sumOfSquares, expected.rss!)).toBeGreaterThan(8);
  });
});

describe('the fit', () => {
  const x = [0, 1, 2, 3, 4];

  test('of a straight line is the ordinary line', () => {
    const y = [1, 3.2, 4.8, 7.1, 9];
    const fit = converged(fitLeastSquares(([a = NaN, b = NaN]) => x.map((value, i) => y[i]! - a - b * value), [0, 0]));
    const line = ordinaryLine(x, y);
    if (line.status !== 'fitted') throw new Error(line.status);
    expect(digits(fit.parameters[0]!, line.intercept)).toBeGreaterThan(10);
    expect(digits(fit.parameters[1]!, line.slope)).toBeGreaterThan(10);
    expect(digits(fit.covariance[0]![1]! * line.s ** 2, line.covariance)).toBeGreaterThan(9);
  });

  test('of data without scatter converges, a parameter that is zero included', () => {
    const fit = converged(fitLeastSquares(([a = NaN, b = NaN, c = NaN]) => x.map((value) => Math.exp(-0.3 * value) - a * Math.exp(-b * value) - c), [2, 0.5, 0.1]));
    [1, 0.3, 0].forEach((value, j) => expect(Math.abs(fit.parameters[j]! - value)).toBeLessThan(1e-10));
  });

  test('that starts at the minimum stays there', () => {
    expect(fitLeastSquares(([a = NaN]) => [a - 1, a - 3], [2])).toMatchObject({ status: 'converged', parameters: [2], iterations: 0 });
  });

  test('of two parameters that do one thing, or of one that does nothing, is singular', () => {
    const together = fitLeastSquares(([a = NaN, b = NaN]) => x.map((value) => value * value - (a + b) * value), [5, 1]);
    const idle = fitLeastSquares(([a = NaN, b = NaN]) => x.map((value) => value * value - a * value + b - b), [5, 1]);
    for (const fit of [together, idle]) expect([fit.status, fit.covariance]).toEqual(['singular', null]);
  });

  test('that runs out of iterations says so', () => {
    expect(fitLeastSquares(([a = NaN]) => x.map((value) => Math.exp(-0.3 * value) - Math.exp(-a * value)), [5], { iterationLimit: 2 })).toMatchObject({ status: 'limit', covariance: null, iterations: 2 });
  });

  test('steps back where the model has no value', () => {
    // The root of a negative parameter is no number; the first full step goes there.
    const fit = converged(fitLeastSquares(([a = NaN]) => [10 * Math.sqrt(a) - 1, 0.1], [4]));
    expect(digits(fit.parameters[0]!, 0.01)).toBeGreaterThan(9);
  });

  test('refuses a start without residuals, or with fewer residuals than parameters', () => {
    expect(() => fitLeastSquares(() => [NaN, 1], [1])).toThrow(RangeError);
    expect(() => fitLeastSquares(() => [1], [1, 2])).toThrow(RangeError);
    expect(() => fitLeastSquares(() => [1], [])).toThrow(RangeError);
    expect(() => fitLeastSquares(() => [1, 2], [1], { scales: [0] })).toThrow(RangeError);
  });
});
