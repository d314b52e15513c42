/** Cameras and slow samplers at a first maximum. */
import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { blurLength, exposureFactor, missedPeak, noiseThatBiases, parabolaPeak, parabolaResidual, rowDelay } from '../../src/pendulum/peakSampling.ts';

const cases = JSON.parse(readFileSync(new URL('../reference/peak-sampling.json', import.meta.url), 'utf8')) as readonly {
  readonly id: string;
  readonly inputs: { readonly fTe?: readonly number[] };
  readonly expected: readonly number[] | Readonly<Record<string, readonly [number, number]>>;
}[];
const caseOf = (id: string) => cases.find((one) => one.id === id)!;
const STEP_30_FPS = (2 * Math.PI) / 30;

describe('an exposure', () => {
  test('leaves sin(πf t)/(πf t) of the swing (from memory; recomputed independently)', () => {
    const { inputs, expected } = caseOf('h04-sinc');
    inputs.fTe!.forEach((share, i) => expect(exposureFactor(2 * Math.PI * share)).toBeCloseTo((expected as readonly number[])[i]!, 14));
  });

  test('of 1/60 s leaves 0.999543 of a period of 1 s, nothing taken at none', () => {
    expect(exposureFactor(2 * Math.PI / 60)).toBeCloseTo(0.999543, 6);
    expect(exposureFactor(0)).toBe(1);
    expect(Math.abs(exposureFactor(1.999e-4) - exposureFactor(2.001e-4))).toBeLessThan(1e-11);
    expect(() => exposureFactor(7)).toThrow(RangeError);
  });

  test('blurs a mark at mid-swing by A ω t', () => expect(blurLength({ amplitude: -2, naturalFrequency: 6, exposure: 0.01 })).toBeCloseTo(0.12, 15));
  test('of a rolling shutter comes later for a lower row', () => {
    expect(rowDelay({ row: 540, rows: 1080, readout: 0.02 })).toBeCloseTo(0.01, 15);
    expect(() => rowDelay({ row: 2, rows: 1, readout: 0.02 })).toThrow(RangeError);
  });
});

describe('the highest frame', () => {
  test('at 30 frames a second and a period of 1 s is at worst 0.548 % low, 0.183 % on average, with a deviation of 0.164 %', () => {
    const { worst, mean, deviation } = missedPeak(STEP_30_FPS);
    expect(worst).toBeCloseTo(-0.00548, 5);
    expect(mean).toBeCloseTo(-0.00183, 5);
    // The printed third digit is one too high: the formula beside it, (ω Δt)²/√720, gives 0.1635 %, the exact form 0.1633 %.
    expect(Math.abs(deviation - 0.00164)).toBeLessThan(1e-5);
  });

  test('has the mean and deviation of frames at every position', () => {
    for (const step of [0.03, 0.049, 0.051, 0.4, 1]) {
      const lows = Array.from({ length: 2000 }, (_, i) => -2 * Math.sin((step * ((i + 0.5) / 2000 - 0.5)) / 2) ** 2);
      const mean = lows.reduce((sum, x) => sum + x, 0) / 2000;
      const deviation = Math.sqrt(lows.reduce((sum, x) => sum + (x - mean) ** 2, 0) / 2000);
      const found = missedPeak(step);
      expect(Math.abs(found.mean / mean - 1)).toBeLessThan(1e-5);
      expect(Math.abs(found.deviation / deviation - 1)).toBeLessThan(1e-5);
    }
    expect(() => missedPeak(0)).toThrow(RangeError);
  });
});

describe('the parabola through three frames', () => {
  test('has the reference vertices (from memory; recomputed independently)', () => {
    const expected = caseOf('h03-parabolic').expected as Readonly<Record<string, readonly [number, number]>>;
    for (const [name, [offset, peak]] of Object.entries(expected)) {
      const [, n, d] = /^cos_N(\d+)_d(.*)$/.exec(name) ?? [];
      const triple = n === undefined ? name.slice(1, -1).split(',').map(Number) : [-1, 0, 1].map((k) => Math.cos((2 * Math.PI * (k - Number(d))) / Number(n)));
      const found = parabolaPeak(triple[0]!, triple[1]!, triple[2]!);
      // A vertex midway between two frames is found to the rounding of their differences.
      expect(found.offset).toBeCloseTo(offset, 12);
      expect(found.peak).toBeCloseTo(peak, 14);
    }
  });

  test('leaves at worst −4.5e-5 at 30 frames a second, −5.9e-4 at ω Δt = 0.4, −9.1e-3 at 0.8', () => {
    expect(parabolaResidual(STEP_30_FPS).worst).toBeCloseTo(-4.5e-5, 6);
    expect(parabolaResidual(0.4).worst).toBeCloseTo(-5.9e-4, 5);
    expect(parabolaResidual(0.8).worst).toBeCloseTo(-9.1e-3, 4);
    const { worst, mean, deviation } = parabolaResidual(0.4);
    expect(mean).toBeLessThan(0);
    expect(mean).toBeGreaterThan(worst);
    expect(deviation).toBeLessThan(-worst);
    expect(parabolaResidual(0.005).worst).toBe(0);
    expect(() => parabolaResidual(2)).toThrow(RangeError);
  });

  test('takes 0.85 … 1 of one frame’s noise, as differences show', () => {
    const norm = (d: number): number => Math.hypot(...parabolaPeak(Math.cos(0.2 * (1 + d)), Math.cos(0.2 * d), Math.cos(0.2 * (1 - d))).weights);
    expect(norm(0)).toBe(1);
    expect(norm(0.4999)).toBeCloseTo(0.85, 2);
    const { weights } = parabolaPeak(0.3, 1, 0.9);
    const h = 1e-6;
    expect((parabolaPeak(0.3 + h, 1, 0.9).peak - parabolaPeak(0.3 - h, 1, 0.9).peak) / (2 * h)).toBeCloseTo(weights[0], 8);
    expect((parabolaPeak(0.3, 1 + h, 0.9).peak - parabolaPeak(0.3, 1 - h, 0.9).peak) / (2 * h)).toBeCloseTo(weights[1], 8);
    expect((parabolaPeak(0.3, 1, 0.9 + h).peak - parabolaPeak(0.3, 1, 0.9 - h).peak) / (2 * h)).toBeCloseTo(weights[2], 8);
  });

  test('is refused on a straight line, and biased by noise of half the fall between frames', () => {
    expect(() => parabolaPeak(1, 2, 3)).toThrow(RangeError);
    expect(noiseThatBiases(1, 0.2)).toBeCloseTo(0.01, 15);
  });
});
