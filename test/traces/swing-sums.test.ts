import { describe, expect, it } from 'vitest';
import { cellsOf, evenBlocks, exposureFactor, motionColumns, motionOver, productIn, slopeColumns, swingSums, type Column, type SwingSamples } from '../../src/traces/swingSums.ts';
import { draws } from '../metrology/sources.ts';

const O = { frequency: 6.1, ratio: 0.07 };

function record(n: number, even: boolean, masked: boolean): SwingSamples {
  const { normal, uniform } = draws(4);
  const t = Float64Array.from({ length: n }, (_, i) => 3 + i * 0.01 + (even ? 0 : 0.004 * uniform()));
  const x = Float64Array.from({ length: n }, () => 5 + normal());
  return masked ? { t, x, use: Uint8Array.from({ length: n }, () => (uniform() < 0.1 ? 0 : 1)) } : { t, x };
}

/** C, D and so on, sample by sample. */
function basis(samples: SwingSamples, i: number, begins: number, knotTime: number, knotStep: number): readonly number[] {
  const s = samples.t[i]! - begins;
  const e = Math.exp(-O.ratio * O.frequency * s);
  const wd = O.frequency * Math.sqrt(1 - O.ratio ** 2);
  const [C, D] = [e * Math.cos(wd * s), e * Math.sin(wd * s)];
  return [C, D, s * C, s * D, 1, (samples.t[i]! - knotTime) / knotStep];
}

describe('sums of a cell', () => {
  it.each([['even', true, false], ['uneven', false, false], ['with samples left out', true, true]] as const)('%s: every product is that of its samples', (_, even, masked) => {
    const samples = record(3000, even, masked);
    const cells = cellsOf(samples, [8.003, 8.2, 20.0001], [3, 12, 33]);
    expect(cells[0]!.from).toBe(0);
    expect(cells.at(-1)!.to).toBe(3000);
    cells.slice(1).forEach((cell, i) => expect(cell.from).toBe(cells[i]!.to));
    const sums = swingSums(samples, cells, evenBlocks(samples, cells), O, 5, 0);
    const { normal } = draws(9);
    const columnOf = (): Column => [normal(), normal(), normal(), normal(), normal(), normal()];
    cells.forEach(({ from, to, begins, knotTime, knotStep }, k) => {
      const [one, other] = [columnOf(), columnOf()];
      let [expected, withX] = [0, 0];
      for (let i = from; i < to; i++) if (samples.use?.[i] !== 0) {
        const b = basis(samples, i, begins, knotTime, knotStep);
        const value = (column: Column): number => column.reduce((sum, c, j) => sum + c * b[j]!, 0);
        expected += value(one) * value(other);
        withX += value(one) * (samples.x[i]! - 5);
      }
      expect(productIn(sums, k, one, other) / expected).toBeCloseTo(1, 9);
      expect(Math.abs(productIn(sums, k, one, null) - withX)).toBeLessThan(1e-8 * (1 + Math.abs(expected)));
    });
  });
});

describe('the free motion', () => {
  const at = (s: number, o: typeof O, p: number, v: number): readonly [number, number] => {
    const m = motionOver(s, o);
    return [m.pp * p + m.pv * v, m.vp * p + m.vv * v];
  };

  it('goes on from where it was, and has x″ + 2ζω x′ + ω² x = 0', () => {
    const [p, v] = at(0.4, O, 0.3, -0.8);
    const whole = at(1.1, O, 0.3, -0.8);
    at(0.7, O, p, v).forEach((value, i) => expect(value).toBeCloseTo(whole[i]!, 12));
    const h = 1e-4;
    const [before, here, after] = [-h, 0, h].map((d) => at(0.5 + d, O, 0.3, -0.8)[0]);
    const x2 = (after! - 2 * here! + before!) / h ** 2;
    const x1 = (after! - before!) / (2 * h);
    expect(x1 / O.frequency).toBeCloseTo(at(0.5, O, 0.3, -0.8)[1], 6);
    expect(x2 + 2 * O.ratio * O.frequency * x1 + O.frequency ** 2 * here!).toBeCloseTo(0, 4);
  });

  it('has the slopes by frequency and damping that differences have', () => {
    const [p, v, s, h] = [0.3, -0.8, 1.7, 1e-6];
    const { position, velocity } = motionOver(s, O).slopes(p, v);
    const byFrequency = [0, 1].map((i) => (at(s, { ...O, frequency: O.frequency + h }, p, v)[i]! - at(s, { ...O, frequency: O.frequency - h }, p, v)[i]!) / (2 * h));
    const byRatio = [0, 1].map((i) => (at(s, { ...O, ratio: O.ratio + h }, p, v)[i]! - at(s, { ...O, ratio: O.ratio - h }, p, v)[i]!) / (2 * h));
    expect([position[0], velocity[0], position[1], velocity[1]].map((x) => Number(x.toFixed(6)))).toEqual([...byFrequency, ...byRatio].map((x) => Number(x.toFixed(6))));
    const columns = slopeColumns(O, p, v);
    const e = Math.exp(-O.ratio * O.frequency * s);
    const wd = O.frequency * Math.sqrt(1 - O.ratio ** 2);
    const b = [e * Math.cos(wd * s), e * Math.sin(wd * s), s * e * Math.cos(wd * s), s * e * Math.sin(wd * s), 1, 0];
    expect(columns.frequency.reduce((sum, c, i) => sum + c * b[i]!, 0)).toBeCloseTo(position[0], 10);
    expect(columns.ratio.reduce((sum, c, i) => sum + c * b[i]!, 0)).toBeCloseTo(position[1], 10);
    const motion = motionColumns(O);
    expect(motion.p.reduce((sum, c, i) => sum + c * b[i]!, 0) * p + motion.v.reduce((sum, c, i) => sum + c * b[i]!, 0) * v).toBeCloseTo(at(s, O, p, v)[0], 12);
  });

  it('seen over an exposure is the mean over it', () => {
    const [fall, turn, exposure] = [-O.ratio * O.frequency, O.frequency * Math.sqrt(1 - O.ratio ** 2), 0.2];
    const [kr, ki] = exposureFactor(fall, turn, exposure);
    const steps = 20_000;
    let mean = 0;
    for (let k = 0; k < steps; k++) {
      const s = 0.5 + ((k + 0.5) / steps - 0.5) * exposure;
      mean += (Math.exp(fall * s) * Math.cos(turn * s)) / steps;
    }
    const [C, D] = [Math.exp(fall * 0.5) * Math.cos(turn * 0.5), Math.exp(fall * 0.5) * Math.sin(turn * 0.5)];
    expect(kr * C - ki * D).toBeCloseTo(mean, 8);
    expect(exposureFactor(fall, turn, 0)).toEqual([1, 0]);
  });
});
