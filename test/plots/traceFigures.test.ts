/** The pictures of a fitted trace: what they draw is the record, the fit and what is left between the two. */
import { describe, expect, test } from 'vitest';
import { buildPyramid, type TracePicture } from '../../src/numeric/minMaxPyramid.ts';
import type { Figure } from '../../src/plots/figure.ts';
import { oneSwing } from '../../src/plots/oneSwing.ts';
import { swingsOverlaid } from '../../src/plots/swingsOverlaid.ts';
import { recordFigure } from '../../src/plots/traceRecord.ts';
import { traceSpectrum } from '../../src/plots/traceSpectrum.ts';
import type { TraceEventTold, TraceTold } from '../../src/reduction/traceResults.ts';
import { swingOver, type SwingModel } from '../../src/traces/swingModel.ts';
import { INKS } from './inksForTests.ts';

const [W, Z] = [5, 0.02];
const ROOT = Math.sqrt(1 - Z * Z);
/** What a strike of 1 makes of position, and of x′/ω_n, so long after. */
const position = (s: number): number => (Math.exp(-Z * W * s) * Math.sin(W * ROOT * s)) / ROOT;
const velocity = (s: number): number => Math.exp(-Z * W * s) * (Math.cos(W * ROOT * s) - (Z * Math.sin(W * ROOT * s)) / ROOT);
/** At rest, struck at 5 s, and again at 15 s while it still swings. */
const MODEL: SwingModel = {
  frequency: W, ratio: Z, rest: { times: [0, 30], values: [0.001, 0.0011] },
  stretches: [{ begins: 0, position: 0, velocity: 0 }, { begins: 5, position: 0, velocity: 1e-3 }, { begins: 15, position: 1e-3 * position(10), velocity: 1e-3 * velocity(10) + 1e-3 }],
};
const RATE = 100;
const T = Float64Array.from({ length: 30 * RATE + 1 }, (_, i) => i / RATE);
const X = Float32Array.from(swingOver(MODEL, T), (value, i) => value + 1e-5 * Math.sin(40 * T[i]!));
X.fill(NaN, 700, 720);
const PICTURE: TracePicture = { times: { from: 0, step: 1 / RATE }, values: X, pyramid: buildPyramid(X) };

const event = (id: string, kind: TraceEventTold['kind'], time: number): TraceEventTold => ({ id, record: `t1/${id}`, kind, listed: time, time, timeU: null, jump: { value: 1e-3, u: 2e-6 }, stepInU: 0.2, picked: 1.002e-3 });
const TOLD: TraceTold = {
  id: 't1', name: 'sensor.csv', rows: T.length, columns: [], uses: { time: 0, reading: 1, trigger: null }, from: 0, to: 30, spacing: 1 / RATE, dimension: 'length', offset: null,
  events: [event('e1', 'shot', 5), event('e2', 'tap', 15)], stretches: [{ from: 7, to: 7.2, why: 'gap' }],
  fitted: { period: { value: 1.2566, u: 1e-4 }, ratio: { value: 0.02, u: 1e-4 }, noise: 1e-5, colour: 1, model: MODEL, spectrum: { frequency: [0.1, 1, 10], amplitude: [1e-6, 2e-6, 8e-6] }, hums: [{ frequency: 6.37, amplitude: 1e-5 }], least: 2e-6, noiseEquivalent: 1e-7, noFire: null, trainsBetterFrom: null }, trains: [], camera: null,
};

const rising = ({ columns: [xs] }: Figure): boolean => [...xs].every((x, i) => i === 0 || x >= xs[i - 1]!);
const numbersOrNone = ({ columns: [, ...ys] }: Figure): boolean => ys.every((column) => [...column].every((value) => value === null || Number.isFinite(value)));

describe('the swing after one shot', () => {
  const both = oneSwing(TOLD, PICTURE, TOLD.events[0]!, 'Shot 1', INKS)!;

  test('runs from before the shot to some periods after it, in order, with no NaN', () => {
    for (const figure of [both.swing, both.residuals]) {
      expect(rising(figure)).toBe(true);
      expect(numbersOrNone(figure)).toBe(true);
      const [xs] = figure.columns;
      expect(xs[0]!).toBeCloseTo(-0.6 * 1.2566, 1);
      expect(xs.at(-1)!).toBeCloseTo(3 * 1.2566, 1);
    }
  });

  test('draws readings and fit in one unit, and their difference over the noise', () => {
    const [, readings, fit] = both.swing.columns;
    const apart = [...readings!].map((value, i) => (value === null ? 0 : Math.abs(value! - fit![i]!)));
    // 10 µm of hum in a picture in mm.
    expect(Math.max(...apart)).toBeCloseTo(0.01, 3);
    expect(Math.max(...[...both.residuals.columns[1]!].map((value) => Math.abs(value ?? 0)))).toBeCloseTo(1, 2);
  });

  test('has no reading where there is no sample, and says what it draws', () => {
    const [xs, readings] = both.swing.columns;
    expect([...xs].every((x, i) => !(x > 2.005 && x < 2.19) || readings![i] === null)).toBe(true);
    expect(both.swing.summary).toContain('Throw 1.0000 ± 0.0040 mm (2u)');
    expect(both.residuals.summary).toMatch(/^Reading less fitted swing, over the noise of the record\. 0 of \d+ samples here lie beyond ±2/);
  });

  test('is none before a fit', () => {
    expect(oneSwing({ ...TOLD, fitted: null }, PICTURE, TOLD.events[0]!, 'Shot 1', INKS)).toBe(null);
  });
});

describe('what the fit leaves, by frequency', () => {
  test('names what stands out and where the pendulum itself is', () => {
    const figure = traceSpectrum(TOLD, INKS)!;
    expect(figure.summary).toContain('the pendulum’s own, 0.796 Hz');
    expect(figure.summary).toContain('6.37 Hz (10 µm)');
    expect([...figure.columns[1]!]).toEqual([1, 2, 8]);
  });

  test('is none before a fit', () => {
    expect(traceSpectrum({ ...TOLD, fitted: null }, INKS)).toBe(null);
  });
});

describe('swings laid over one another', () => {
  test('are over their throw, without the swing that was there before', () => {
    const figure = swingsOverlaid([{ told: TOLD, picture: PICTURE }], INKS)!;
    expect(figure.columns).toHaveLength(3);
    const [xs] = figure.columns;
    // The hum is 1 % of a throw.
    for (const column of figure.columns.slice(1)) [...column].filter((value) => value !== null).forEach((value) => expect(Math.abs(value! - position(xs[[...column].indexOf(value)]!))).toBeLessThan(0.0101));
    expect(figure.summary).toContain('1 of shots (whole lines), 1 of taps (dashed)');
  });

  test('have nothing of what is left out of the fit', () => {
    const wild = Float32Array.from(X);
    for (let i = 505; i < 520; i++) wild[i] = 5;
    const picture = { times: { from: 0, step: 1 / RATE }, values: wild, pyramid: buildPyramid(wild) };
    const figure = swingsOverlaid([{ told: { ...TOLD, stretches: [...TOLD.stretches, { from: 5.04, to: 5.2, why: 'blanked' }] }, picture }], INKS)!;
    expect(figure.summary).toMatch(/are at most \d\.\d % of the throw apart/);
  });

  test('want a tap and a shot that stand clear of the noise', () => {
    const quiet = { ...TOLD, events: TOLD.events.map((one) => ({ ...one, jump: { value: 1e-5, u: 2e-6 } })) };
    expect(swingsOverlaid([{ told: quiet, picture: PICTURE }], INKS)).toBe(null);
    expect(swingsOverlaid([{ told: { ...TOLD, events: TOLD.events.slice(0, 1) }, picture: PICTURE }], INKS)).toBe(null);
  });
});

describe('the whole record', () => {
  const figure = recordFigure(TOLD, PICTURE, INKS);

  test('tells what is in it, by kind, and what is left out', () => {
    expect(figure.summary).toContain('3 001 samples');
    expect(figure.summary).toContain('In it 1 shot, 1 tap');
    expect(figure.summary).toContain('1 × no samples');
    expect(figure.events.map(({ name }) => name)).toEqual(['Shot 1', 'Tap 1']);
  });

  test('what is in sight has the extremes of the record there, in the unit of the picture', () => {
    const { columns, y } = figure.look({ from: 4, to: 9 }, 200);
    const seen = [...columns[1]!].filter((value): value is number => value !== null);
    const there = Array.from(X.subarray(400, 901)).filter((value) => !Number.isNaN(value)).map((value) => value * 1e3);
    expect(Math.max(...seen)).toBeCloseTo(Math.max(...there), 5);
    expect(Math.min(...seen)).toBeCloseTo(Math.min(...there), 5);
    expect(y.low).toBeLessThan(Math.min(...there));
    expect(y.high).toBeGreaterThan(Math.max(...there));
  });

  test('is broken where no samples are', () => {
    const { columns } = figure.look({ from: 6.9, to: 7.3 }, 400);
    const [xs, ys] = columns;
    expect([...xs].some((x, i) => x > 6.99 && x < 7.21 && ys![i] === null)).toBe(true);
  });
});
