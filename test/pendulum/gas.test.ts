/** Air about a light strip. The film: 25 µm polyimide, 1420 kg/m³, 19 mm wide, 0.2 m long, T about 0.73 s. */
import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import {
  addedInertia, addedMassPerLength, addedMassRatio, airLayer, airViscosity, boundaryLayer, buoyancyFactor, dryAirDensity, freeMolecularDrag, freeMolecularRatio, hingedFactor,
  kinematicViscosity, meanFreePath, moistAirDensity, quadraticDrag, tipReynolds, translationFactor,
} from '../../src/pendulum/gas.ts';

const cases = JSON.parse(readFileSync(new URL('../reference/air.json', import.meta.url), 'utf8')) as readonly { readonly id: string; readonly inputs: unknown; readonly expected: unknown }[];
const expectedOf = <T>(id: string): T => cases.find((one) => one.id === id)!.expected as T;
const ROOM = 293.15;
const at = (pressure: number) => ({ pressure, temperature: ROOM });
const ATMOSPHERE = 101_325;
const FILM = { width: 0.019, length: 0.2, arealDensity: 25e-6 * 1420 };
const OMEGA = (2 * Math.PI) / 0.73;
const off = (a: number, b: number): number => Math.abs(a / b - 1);

describe('air', () => {
  test('dry has the ideal-gas density with R = 287.05287 J/(kg·K) (from memory; recomputed independently)', () => {
    const expected = expectedOf<Readonly<Record<string, number>>>('f08-dryair');
    for (const [celsius, key] of [[0, '0C_101325'], [15, '15C_101325'], [20, '20C_101325']] as const) {
      expect(off(dryAirDensity({ pressure: ATMOSPHERE, temperature: celsius + 273.15 }), expected[key]!)).toBeLessThan(1e-12);
    }
    // Printed with R rounded to 287.05.
    expect(off(dryAirDensity(at(ATMOSPHERE)), 1.20412)).toBeLessThan(1.5e-5);
  });

  test('moist has the density of OIML R 111 E.3-1, and that of CIPM-2007 within 2e-4 in a room (from memory; recomputed independently)', () => {
    const expected = expectedOf<Readonly<Record<string, number>>>('f07-cipm2007');
    const moist = (celsius: number, pressure: number, humidity: number): number => moistAirDensity({ pressure, temperature: celsius + 273.15, humidity });
    expect(off(moist(20, ATMOSPHERE, 0.5), expected['oiml_approx_20_101325_0.5']!)).toBeLessThan(1e-12);
    for (const key of ['20,101325,0.5', '15,101325,0', '25,101325,0.5', '20,100000,0.5', '27,110000,0.8']) {
      const [t, p, h] = key.split(',').map(Number) as [number, number, number];
      expect(off(moist(t, p, h), expected[key]!)).toBeLessThan(2.5e-4);
    }
    expect(() => moist(20, 1e5, 2)).toThrow(RangeError);
  });

  test('has Sutherland’s viscosity, as in US Standard Atmosphere 1976', () => {
    const expected = expectedOf<readonly number[]>('f09-sutherland');
    [0, 15, 20, 25, 40, 100].forEach((celsius, i) => expect(off(airViscosity(celsius + 273.15), expected[i]!)).toBeLessThan(1e-12));
    const published = expectedOf<{ readonly geometric_published: Readonly<Record<string, readonly number[]>> }>('f06-ussa76').geometric_published;
    const heights = Object.keys(published).filter((height) => height !== 'columns');
    expect(heights.length).toBeGreaterThan(5);
    for (const height of heights) {
      const [T, , , , mu] = published[height]!;
      expect(off(airViscosity(T!), mu!)).toBeLessThan(1e-4);
    }
  });

  test('has a mean free path of 6.6 mm at 1 Pa', () => {
    expect(meanFreePath(at(1)) * 1000).toBeCloseTo(6.6, 1);
    expect(() => meanFreePath(at(0))).toThrow(RangeError);
    expect(() => dryAirDensity({ pressure: -1, temperature: ROOM })).toThrow(RangeError);
  });
});

describe('the air’s added mass', () => {
  test('is 50.6 % of the film at one atmosphere, 5.0 % at 10 kPa, 2.5 % at 5 kPa, 0.5 % at 1 kPa', () => {
    for (const [pressure, percent, digits] of [[ATMOSPHERE, 50.6, 1], [1e4, 5, 1], [5e3, 2.5, 1], [1e3, 0.5, 1]] as const) {
      expect(100 * addedMassRatio({ density: dryAirDensity(at(pressure)), ...FILM })).toBeCloseTo(percent, digits);
    }
  });

  test('per length is that of the plate of half-width a, π ρ a², and sums up to the inertia of the film', () => {
    expect(addedMassPerLength({ density: 1.2, width: 0.02 })).toBeCloseTo(Math.PI * 1.2 * 0.01 ** 2, 16);
    const density = dryAirDensity(at(ATMOSPHERE));
    const own = (FILM.arealDensity * FILM.width * FILM.length ** 3) / 3;
    expect(off(addedInertia({ density, ...FILM }) / own, addedMassRatio({ density, ...FILM }) * hingedFactor(0.2 / 0.019))).toBeLessThan(1e-14);
  });

  test('takes the tabled factors at their entries, goes between them, and tends to 1', () => {
    for (const [ratio, translation, hinged] of [[1, 0.579, 0.51], [1.5, 0.69, 0.62], [2, 0.757, 0.69], [3, 0.83, 0.78], [4, 0.872, 0.82], [5, 0.897, 0.86], [8, 0.934, 0.91], [10, 0.947, 0.92]] as const) {
      expect(translationFactor(ratio)).toBeCloseTo(translation, 15);
      expect(hingedFactor(ratio)).toBeCloseTo(hinged, 15);
    }
    for (let ratio = 1; ratio < 30; ratio += 0.1) {
      expect(translationFactor(ratio + 0.1)).toBeGreaterThan(translationFactor(ratio));
      expect(hingedFactor(ratio + 0.1)).toBeGreaterThan(hingedFactor(ratio));
      expect(hingedFactor(ratio)).toBeLessThan(translationFactor(ratio));
    }
    expect(translationFactor(1e9)).toBeCloseTo(1, 8);
    expect(() => translationFactor(0.5)).toThrow(RangeError);
  });

  test('is a correction at one atmosphere, an uncertainty at 5 kPa, an order of magnitude at 1 kPa, nothing at 0.1 Pa', () => {
    for (const [pressure, millimetres, digits] of [[ATMOSPHERE, 1.9, 1], [5e3, 8.4, 1], [1e3, 19, 0]] as const) {
      expect(1000 * boundaryLayer(at(pressure), OMEGA)).toBeCloseTo(millimetres, digits);
    }
    expect([ATMOSPHERE, 5e3, 1e3, 0.1].map((pressure) => airLayer(at(pressure), OMEGA, FILM.width).use)).toEqual(['correction', 'uncertainty', 'magnitude', 'none']);
    expect(airLayer(at(ATMOSPHERE), OMEGA, FILM.width).doubt).toBeCloseTo(0.39, 2);
    expect(() => airLayer(at(1), OMEGA, 0)).toThrow(RangeError);
    expect(() => boundaryLayer(at(1), 0)).toThrow(RangeError);
    expect(() => kinematicViscosity(at(0))).toThrow(RangeError);
  });
});

test('buoyancy takes 0.085 % off a polymer’s weight at one atmosphere', () => {
  expect(1 - buoyancyFactor({ density: dryAirDensity(at(ATMOSPHERE)), solidDensity: 1420 })).toBeCloseTo(8.5e-4, 5);
  expect(() => buoyancyFactor({ density: 2, solidDensity: 1 })).toThrow(RangeError);
});

describe('the air’s damping', () => {
  test('is quadratic with β 5.1 /rad at one atmosphere and 0.25 at 5 kPa, C_D 2, as the torque summed along the strip gives', () => {
    const beta = (pressure: number): number => quadraticDrag({ density: dryAirDensity(at(pressure)), dragCoefficient: 2, ...FILM });
    expect(beta(ATMOSPHERE)).toBeCloseTo(5.1, 1);
    expect(beta(5e3)).toBeCloseTo(0.25, 2);
    const density = dryAirDensity(at(ATMOSPHERE));
    let torque = 0;
    for (let i = 0; i < 10_000; i++) {
      const r = ((i + 0.5) * FILM.length) / 10_000;
      torque += (0.5 * density * 2 * FILM.width * r * r * r * FILM.length) / 10_000;
    }
    expect(off(beta(ATMOSPHERE), torque / ((FILM.arealDensity * FILM.width * FILM.length ** 3) / 3))).toBeLessThan(1e-7);
  });

  test('has a tip’s Reynolds number of 164 at one atmosphere, 8 at 5 kPa, 1.6 at 1 kPa, at 0.13 m/s', () => {
    const reynolds = (pressure: number): number => tipReynolds(at(pressure), { speed: 0.13, width: FILM.width });
    expect(reynolds(ATMOSPHERE)).toBeCloseTo(164, 0);
    expect(reynolds(5e3)).toBeCloseTo(8, 0);
    expect(reynolds(1e3)).toBeCloseTo(1.6, 1);
  });

  test('of free molecules is 9.82e-3 kg/(m²·s) per Pa, ζ 0.0016 of the film at 0.1 Pa', () => {
    expect(freeMolecularDrag({ pressure: 1, temperature: 293 })).toBeCloseTo(9.82e-3, 5);
    expect(freeMolecularRatio(at(0.1), { naturalFrequency: OMEGA, ...FILM })).toBeCloseTo(0.0016, 4);
    expect(() => freeMolecularRatio(at(0.1), { naturalFrequency: 0, ...FILM })).toThrow(RangeError);
  });
});
