/** Normal gravity against values of the WGS 84 ellipsoid. */
import { describe, expect, test } from 'vitest';
import { GRAVITY_ANOMALY, normalGravity } from '../../src/pendulum/gravity.ts';
import reference from '../reference/pendulum.json' with { type: 'json' };

// Source: NIMA TR8350.2 (WGS 84) and Moritz 2000 (read in a copy, recomputed independently).
const { expected, inputs } = reference.find((e) => e.id === 'f05-wgs84') as unknown as {
  inputs: { lat_deg: number[] };
  expected: { WGS84: string[]; WGS84_at_1000m_exact: string[]; second_order_at_1000m: string[]; gradient_mGal_per_m: Readonly<Record<string, number>> };
};
const at = (degrees: number, height: number): number => normalGravity({ latitude: (degrees * Math.PI) / 180, height });

describe('normal gravity', () => {
  test('on the ellipsoid agrees at five latitudes to 1e-10 m/s²', () => {
    for (const [i, latitude] of inputs.lat_deg.entries()) expect(Math.abs(at(latitude, 0) - Number(expected.WGS84[i]))).toBeLessThan(1e-10);
  });

  test('at 1000 m has the second-order formula’s digits to 1e-10 m/s²', () => {
    for (const [i, latitude] of inputs.lat_deg.entries()) expect(Math.abs(at(latitude, 1000) - Number(expected.second_order_at_1000m[i]))).toBeLessThan(1e-10);
  });

  test('at 1000 m is within 1.1e-7 m/s² of the exact field', () => {
    for (const [i, latitude] of inputs.lat_deg.entries()) expect(Math.abs(at(latitude, 1000) - Number(expected.WGS84_at_1000m_exact[i]))).toBeLessThan(1.1e-7);
  });

  test('falls with height by the gradient of the table, to 1e-5 of it', () => {
    for (const [latitude, gradient] of Object.entries(expected.gradient_mGal_per_m)) expect((at(Number(latitude), -1) - at(Number(latitude), 1)) / 2 / 1e-5 / gradient).toBeCloseTo(1, 4);
  });

  test('is the same north and south, and grows from the equator to the poles', () => {
    expect(at(-52, 120)).toBe(at(52, 120));
    for (let latitude = 0; latitude < 90; latitude += 5) expect(at(latitude + 5, 0)).toBeGreaterThan(at(latitude, 0));
  });

  // Source: CGPM 1901, g_n = 9.80665 m/s², between the equator's and the poles' values; the real field is off the normal one by tens of mGal (common practice, no source).
  test('passes standard gravity between 45° and 46°, and its own u is 50 mGal', () => {
    expect(at(45, 0)).toBeLessThan(9.80665);
    expect(at(46, 0)).toBeGreaterThan(9.80665);
    expect(GRAVITY_ANOMALY / 1e-5).toBeCloseTo(50, 9);
  });
});
