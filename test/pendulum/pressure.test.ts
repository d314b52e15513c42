/** Gauges, dials and the standard atmosphere. */
import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { absolutePressure, dialUncertainty, geopotentialHeight, STANDARD_ATMOSPHERE, standardPressure, stationOfSeaLevel, stationPressureOfHeight } from '../../src/pendulum/pressure.ts';
import type { GaugeMeaning } from '../../src/pendulum/pressure.ts';

const atmosphere = (JSON.parse(readFileSync(new URL('../reference/air.json', import.meta.url), 'utf8')) as readonly {
  readonly id: string;
  readonly expected: {
    readonly geopotential: Readonly<Record<string, { readonly p: number }>>;
    readonly geometric_published: Readonly<Record<string, readonly number[]>>;
    readonly geometric_exact: Readonly<Record<string, readonly number[]>>;
  };
}[]).find(({ id }) => id === 'f06-ussa76')!.expected;

const left = (meaning: GaugeMeaning, reading: number, outside = STANDARD_ATMOSPHERE, fullScale = STANDARD_ATMOSPHERE): number =>
  absolutePressure({ meaning, reading, outside, fullScale }).pressure;

describe('what a gauge leaves', () => {
  // Common practice, no source.
  test('a ratio dial at 95.26 % leaves 4.80 kPa, at 83 % 17.2 kPa, at 66 % 34.5 kPa of a standard atmosphere', () => {
    expect(left('percentOfOutside', 95.26) / 1000).toBeCloseTo(4.8, 2);
    expect(left('percentOfOutside', 83) / 1000).toBeCloseTo(17.2, 1);
    expect(Math.abs(left('percentOfOutside', 66) / 1000 - 34.5)).toBeLessThan(0.051);
  });

  test('95 % with 98.0 kPa outside is 1.741 kPa on a fixed scale and 4.900 kPa on a ratio dial', () => {
    expect(left('percentOfScale', 95, 98_000) / 1000).toBeCloseTo(1.741, 3);
    expect(left('percentOfOutside', 95, 98_000) / 1000).toBeCloseTo(4.9, 12);
    expect(left('percentOfOutside', 95) / 1000).toBeCloseTo(5.066, 3);
  });

  test('50 % of a standard atmosphere is 380 torr, 50.66 kPa', () => {
    expect(left('percentOfOutside', 50) / 133.322).toBeCloseTo(380, 2);
    expect(left('percentOfScale', 50) / 1000).toBeCloseTo(50.66, 2);
  });

  test('absolute and gauge readings need no dial', () => {
    expect(left('absolute', 3)).toBe(3);
    expect(left('gauge', -98_000, 100_000)).toBe(2000);
  });

  test('dial and barometer that contradict each other are said to be below zero', () => {
    expect(absolutePressure({ meaning: 'percentOfScale', reading: 98, outside: 95_000, fullScale: STANDARD_ATMOSPHERE })).toMatchObject({ status: 'belowZero' });
    expect(absolutePressure({ meaning: 'gauge', reading: -90_000, outside: 95_000, fullScale: 1 }).status).toBe('found');
    expect(() => left('gauge', -1, 0)).toThrow(RangeError);
    expect(() => left('percentOfScale', 1, 1, 0)).toThrow(RangeError);
  });

  test('a dial of class 1.6 … 2.5 hides the pressure near full scale within 1.6 … 2.5 kPa', () => {
    expect(dialUncertainty({ accuracyClass: 2.5, fullScale: 100_000 }) * Math.sqrt(3)).toBeCloseTo(2500, 9);
    expect(() => dialUncertainty({ accuracyClass: -1, fullScale: 1 })).toThrow(RangeError);
  });
});

describe('the standard atmosphere', () => {
  test('has the pressures of US Standard Atmosphere 1976 by geopotential height', () => {
    for (const [height, { p }] of Object.entries(atmosphere.geopotential)) expect(Math.abs(standardPressure(Number(height)) / p - 1)).toBeLessThan(1e-6);
  });

  test('has its pressures by height above the sea', () => {
    for (const [height, [, p]] of Object.entries(atmosphere.geometric_exact)) expect(Math.abs(standardPressure(geopotentialHeight(Number(height))) / p! - 1)).toBeLessThan(1e-6);
    const published = Object.entries(atmosphere.geometric_published).filter(([height]) => Number(height) <= 10_000);
    expect(published).toHaveLength(6);
    for (const [height, [, p]] of published) {
      expect(Math.abs(standardPressure(geopotentialHeight(Number(height))) / p! - 1)).toBeLessThan(5e-5);
    }
  });

  test('gives 95.461 kPa at 500 m, known to a weather’s 1 kPa', () => {
    const { pressure, u } = stationPressureOfHeight(500);
    expect(pressure / 1000).toBeCloseTo(95.461, 3);
    expect(u).toBeCloseTo(942, 0);
    expect(stationOfSeaLevel({ seaLevel: STANDARD_ATMOSPHERE, height: 500 })).toBeCloseTo(pressure, 6);
    expect(() => standardPressure(20_000)).toThrow(RangeError);
  });
});
