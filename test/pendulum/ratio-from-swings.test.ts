/** The damping ratio from successive turning points: exact swings give it back, readings with scatter give it with the u that is told. */
import { describe, expect, test } from 'vitest';
import { ratioFromSwings, type TurningPoint } from '../../src/pendulum/damping.ts';
import { launchOfFirstSwing, nextTurningPoint } from '../../src/pendulum/launch.ts';
import { deviationOf, draws, meanOf } from '../metrology/sources.ts';
import { turningPoints } from './odexSwing.ts';

/** Turning points of a swing by ODEX, from the mark of a scale whose rest reading is `rest`. */
function swing(first: number, zeta: number, p: number, count: number, rest: number): readonly TurningPoint[] {
  const { launch } = launchOfFirstSwing(first, zeta, p);
  return turningPoints({ zeta, p }, launch, count).map(({ angle }, number) => ({ number, angle: rest + angle }));
}

const RATIOS = [0.002, 0.01, 0.05, 0.1, 0.3] as const;
const SHARES = [0, 0.5, 1, 2] as const;
const FIRST = [0.001, 0.02, 0.2, 0.6] as const;

describe('turning points of an exact swing give ζ, rest and amplitude back', () => {
  test('to 1e-12 of a radian and of ζ, from two with the rest to eight with or without, at any gravity share', () => {
    for (const zeta of RATIOS) for (const p of SHARES) for (const first of FIRST) for (const count of [2, 3, 4, 8]) for (const known of [true, false]) {
      if (count === 2 && !known) continue;
      const found = ratioFromSwings(known ? 0.013 : null, swing(first, zeta, p, count, 0.013), p);
      expect(found.status).toBe('found');
      expect(Math.abs(found.dampingRatio - zeta)).toBeLessThan(1e-12);
      expect(Math.abs(found.rest - 0.013)).toBeLessThan(1e-12);
      expect(Math.abs(found.amplitude - first)).toBeLessThan(1e-12);
      expect(found.sensitivities.length).toBe(count + (known ? 1 : 0));
    }
  });

  test('to 1e-9 with turning points that were not read', () => {
    for (const zeta of RATIOS) for (const p of SHARES) for (const first of [0.02, 0.4]) {
      const all = swing(first, zeta, p, 8, -0.002);
      for (const kept of [[0, 2], [0, 1, 4], [0, 3, 7], [1, 2, 3], [2, 5], [0, 2, 4, 6], [1, 6, 7]]) {
        const points = kept.map((k) => all[k]!);
        const found = ratioFromSwings(-0.002, points, p);
        expect(found.status).toBe('found');
        expect(Math.abs(found.dampingRatio - zeta)).toBeLessThan(1e-9);
        expect(Math.abs(found.amplitude / first - 1)).toBeLessThan(1e-9);
      }
      for (const kept of [[0, 1, 4], [0, 2, 3], [1, 2, 3], [1, 6, 7], [0, 2, 5, 6]]) {
        const found = ratioFromSwings(null, kept.map((k) => all[k]!), p);
        expect(found.status).toBe('found');
        expect(Math.abs(found.dampingRatio - zeta)).toBeLessThan(1e-9);
      }
    }
  });

  // (1 + q)/(q − q³) = 1/(q(1 − q)): first, return and fourth reading fit q = e^{−δ/2} and 1 − q alike.
  test('as the lighter of two dampings where the numbers 0, 1, 3 fit both', () => {
    const q = Math.exp(-0.7);
    const fit = (left: number) => ratioFromSwings(null, [0, 1, 3].map((number) => ({ number, angle: 0.01 * (-left) ** number })), 0).dampingRatio;
    const zetaOf = (left: number): number => -Math.log(left) / Math.hypot(Math.PI, Math.log(left));
    expect(q).toBeLessThan(0.5);
    expect(fit(1 - q)).toBeCloseTo(zetaOf(1 - q), 9);
    expect(fit(q)).toBeCloseTo(zetaOf(1 - q), 9);
  });

  test('at 115°, where the amplitude falls twice as fast as a small one, to 1e-9', () => {
    for (const zeta of RATIOS) {
      const found = ratioFromSwings(null, swing(2, zeta, 1, 6, 0), 1);
      expect(found.status).toBe('found');
      expect(Math.abs(found.dampingRatio - zeta)).toBeLessThan(1e-9);
    }
  });

  test('as zero where nothing damps', () => {
    for (const first of FIRST) expect(Math.abs(ratioFromSwings(null, swing(first, 0, 1, 6, 0.01), 1).dampingRatio)).toBeLessThan(1e-13);
  });

  test('on the other side of a scale alike', () => {
    const found = ratioFromSwings(null, swing(0.3, 0.02, 1, 5, 0.1).map((point) => ({ ...point, angle: -point.angle })), 1);
    expect(found.dampingRatio).toBeCloseTo(0.02, 12);
    expect(found.amplitude).toBeCloseTo(-0.3, 12);
  });

  test('in any zero of the scale: shifting all readings changes nothing but the rest', () => {
    const points = swing(0.2, 0.05, 0.7, 5, 0);
    const shifted = ratioFromSwings(null, points.map((point) => ({ ...point, angle: point.angle + 0.5 })), 0.7);
    const found = ratioFromSwings(null, points, 0.7);
    expect(shifted.dampingRatio).toBeCloseTo(found.dampingRatio, 12);
    expect(shifted.rest - found.rest).toBeCloseTo(0.5, 12);
  });

  // Source: methods 5 item 16, derived.
  test('12.40, −8.30 and 10.65 have half a decrement of 0.0883298', () => {
    const scale = 1e-5;
    const found = ratioFromSwings(null, [12.4, -8.3, 10.65].map((x, number) => ({ number, angle: x * scale })), 1);
    expect((Math.PI * found.dampingRatio) / Math.sqrt(1 - found.dampingRatio ** 2)).toBeCloseTo(0.0883298, 7);
    expect(found.rest / scale).toBeCloseTo(1.59319, 6);
  });
});

describe('sensitivities of ζ to each reading', () => {
  /** Largest difference from a numerical perturbation, as a share of the whole. */
  function gap(first: number, zeta: number, p: number, rest: number | null): number {
    const points: TurningPoint[] = [{ number: 0, angle: first }];
    for (let number = 1; number < 6; number++) points.push({ number, angle: nextTurningPoint(points.at(-1)!.angle, zeta, p) });
    const found = ratioFromSwings(rest, points, p);
    const before = rest === null ? 0 : 1;
    const step = 1e-4 * first;
    const moved = (i: number, by: number): number =>
      ratioFromSwings(rest === null ? null : rest + (i === 0 ? by : 0), points.map((point, j) => ({ ...point, angle: point.angle + (j + before === i ? by : 0) })), p).dampingRatio;
    const whole = Math.hypot(...found.sensitivities);
    return Math.max(...found.sensitivities.map((c, i) => Math.abs((moved(i, step) - moved(i, -step)) / (2 * step) - c) / whole));
  }

  test('agree with perturbed readings to 1e-6 at a small swing', () => {
    for (const zeta of [0.002, 0.05, 0.3]) for (const p of [0, 1]) for (const rest of [null, 0]) expect(gap(0.003, zeta, p, rest)).toBeLessThan(1e-6);
  });

  test('are off by a part of the order ζ θ² at a large one: below 0.4 % at 20° and 4 % at 57°', () => {
    for (const zeta of [0.002, 0.05, 0.3]) for (const rest of [null, 0]) {
      expect(gap(0.35, zeta, 1, rest)).toBeLessThan(0.004);
      expect(gap(1, zeta, 1, rest)).toBeLessThan(0.04);
    }
  });

  // Source: methods 1.4, derived: u(δ) = (u_x/n) √[1/(x₀ − z)² + 1/(x_n − z)²], rest known.
  test('of two turning points on one side with a sure rest are those of the log decrement', () => {
    const [x0, x2] = [0.01, 0.01 * Math.exp(-0.3)];
    const { sensitivities, dampingRatio } = ratioFromSwings(0, [{ number: 0, angle: x0 }, { number: 2, angle: x2 }], 0);
    const slope = (1 - dampingRatio ** 2) ** 1.5 / (2 * Math.PI);
    expect(sensitivities[1]).toBeCloseTo(slope / x0, 9);
    expect(sensitivities[2]).toBeCloseTo(-slope / x2, 9);
  });

  test('sum to zero: moving every reading alike leaves ζ as it is', () => {
    for (const rest of [null, 0]) {
      const { sensitivities } = ratioFromSwings(rest, swing(0.2, 0.05, 1, 6, 0), 1);
      expect(Math.abs(sensitivities.reduce((a, b) => a + b, 0)) / Math.hypot(...sensitivities)).toBeLessThan(1e-9);
    }
  });
});

describe('readings with scatter', () => {
  // 2000 swings know a standard deviation to 1.6 %, a mean to 0.022 of it.
  test.each([
    { first: 0.01, zeta: 0.02, p: 1, count: 5, rest: true },
    { first: 0.01, zeta: 0.02, p: 1, count: 3, rest: false },
    { first: 0.3, zeta: 0.02, p: 1, count: 6, rest: false },
    { first: 0.3, zeta: 0.15, p: 0.5, count: 4, rest: true },
    { first: 0.02, zeta: 0.1, p: 1, count: 12, rest: false },
  ])('give the spread of ζ that is told, within 5 %: $count turning points of $first rad, ζ = $zeta', ({ first, zeta, p, count, rest }) => {
    const { normal } = draws(99);
    const exact: TurningPoint[] = [{ number: 0, angle: first }];
    for (let number = 1; number < count; number++) exact.push({ number, angle: nextTurningPoint(exact.at(-1)!.angle, zeta, p) });
    const u = 0.002 * first;
    const told = u * Math.hypot(...ratioFromSwings(rest ? 0 : null, exact, p).sensitivities);
    const found = Array.from({ length: 2000 }, () => {
      const fit = ratioFromSwings(rest ? u * normal() : null, exact.map((point) => ({ ...point, angle: point.angle + u * normal() })), p);
      expect(fit.status).toBe('found');
      return fit.dampingRatio;
    });
    expect(deviationOf(found) / told).toBeGreaterThan(0.95);
    expect(deviationOf(found) / told).toBeLessThan(1.05);
    expect(Math.abs(meanOf(found) - zeta) / told).toBeLessThan(0.08);
  });

  test('do not bias ζ toward damping where nothing damps: it comes out below zero as often as above', () => {
    const { normal } = draws(5);
    const found = Array.from({ length: 1000 }, () => {
      const fit = ratioFromSwings(null, [0.1, -0.1, 0.1, -0.1].map((angle, number) => ({ number, angle: angle + 2e-4 * normal() })), 1);
      expect(fit.status).toBe('found');
      return fit.dampingRatio;
    });
    expect(Math.abs(meanOf(found))).toBeLessThan((4 * deviationOf(found)) / Math.sqrt(1000));
    const below = found.filter((zeta) => zeta < 0).length;
    expect(below).toBeGreaterThan(440);
    expect(below).toBeLessThan(560);
  });

  test('larger than what is left of the late turning points do not spoil the early ones', () => {
    const { normal } = draws(3);
    for (let run = 0; run < 50; run++) {
      const points: TurningPoint[] = [{ number: 0, angle: 0.05 }];
      for (let number = 1; number < 30; number++) points.push({ number, angle: nextTurningPoint(points.at(-1)!.angle, 0.1, 1) });
      const fit = ratioFromSwings(null, points.map((point) => ({ ...point, angle: point.angle + 5e-4 * normal() })), 1);
      expect(fit.status).toBe('found');
      expect(Math.abs(fit.dampingRatio - 0.1)).toBeLessThan(0.02);
    }
  });
});

describe('swings that tell no damping ratio', () => {
  const points = (...angles: number[]): readonly TurningPoint[] => angles.map((angle, number) => ({ number, angle }));

  test('are too few below two turning points and the rest, or three', () => {
    for (const [rest, given] of [[0, []], [0, [0.1]], [null, [0.1, -0.09]], [null, []]] as const) expect(ratioFromSwings(rest, points(...given), 1).status).toBe('tooFew');
    // All of one side: the rest cannot be told from the decay.
    expect(ratioFromSwings(null, [0, 2, 4].map((number) => ({ number, angle: 0.1 * 0.98 ** number })), 1).status).toBe('tooFew');
    expect(ratioFromSwings(0, points(0.1, -0.09), 1).status).toBe('found');
  });

  test('do not decay where they do not alternate', () => {
    for (const [rest, given] of [[0, [0.1, 0.09]], [null, [0.3, 0.2, 0.1]], [null, [0.1, 0.1, 0.1]], [0, [0, -0.1]]] as const) {
      expect(ratioFromSwings(rest, points(...given), 1)).toMatchObject({ status: 'notDecaying', sensitivities: [] });
    }
  });

  test('never give a number that is none', () => {
    const { uniform } = draws(17);
    for (let run = 0; run < 500; run++) {
      const given = Array.from({ length: 2 + Math.floor(5 * uniform()) }, () => uniform() - 0.5);
      const found = ratioFromSwings(run % 2 === 0 ? null : 0.2 * (uniform() - 0.5), points(...given), uniform());
      expect([found.dampingRatio, found.rest, found.amplitude, ...found.sensitivities].every(Number.isFinite)).toBe(true);
    }
  });
});
