/** Plumes on targets, and propellant that leaves the pendulum. */
import { describe, expect, test } from 'vitest';
import { captureFraction, diffuseMomentumFactor, halfAngleSeen, inverseOfUndeclaredFactor, meanCosine, reemissionSpeed, SPECIES_MASS, thrusterImpulse } from '../../src/pendulum/target.ts';
import type { Species } from '../../src/pendulum/target.ts';
import { swingGainOfMassLost } from '../../src/pendulum/propellant.ts';

/** Midpoint rule. */
function integral(f: (x: number) => number, from: number, to: number, pieces = 20_000): number {
  const h = (to - from) / pieces;
  let sum = 0;
  for (let i = 0; i < pieces; i++) sum += f(from + (i + 0.5) * h);
  return sum * h;
}

describe('the momentum factor', () => {
  test('left undeclared between 1 and 2 makes 1/β on average ln 2, 4 % above 1/1.5, with a deviation of a fifth', () => {
    const { mean, deviation } = inverseOfUndeclaredFactor();
    expect(mean).toBeCloseTo(Math.LN2, 15);
    expect(mean * 1.5 - 1).toBeCloseTo(0.04, 3);
    expect(deviation).toBeCloseTo(0.14, 3);
    expect(deviation / mean).toBeCloseTo(0.2, 2);
  });

  test('between any two limits has the mean and deviation of 1/β by quadrature', () => {
    const { mean, deviation } = inverseOfUndeclaredFactor(1.2, 1.7);
    const first = integral((b) => 1 / b, 1.2, 1.7) / 0.5;
    const second = integral((b) => 1 / (b * b), 1.2, 1.7) / 0.5;
    expect(mean).toBeCloseTo(first, 9);
    expect(deviation).toBeCloseTo(Math.sqrt(second - first * first), 6);
    expect(() => inverseOfUndeclaredFactor(2, 1)).toThrow(RangeError);
  });

  // Printed values, from kinetic theory.
  test('of diffuse re-emission is 1.53 for cold nitrogen at 700 m/s, and 1.015 … 1.057 for plasmas at 10 km/s', () => {
    expect(reemissionSpeed({ wallTemperature: 300, relativeMass: SPECIES_MASS.nitrogenMolecule })).toBeCloseTo(374, 0);
    const factor = (species: Species, plumeSpeed: number): number => diffuseMomentumFactor({ plumeSpeed, wallTemperature: 300, relativeMass: SPECIES_MASS[species] });
    expect(factor('nitrogenMolecule', 700)).toBeCloseTo(1.53, 2);
    for (const [species, printed] of [['tungsten', 1.015], ['copper', 1.025], ['nitrogenMolecule', 1.037], ['fluorine', 1.045], ['carbon', 1.057]] as const) {
      expect(factor(species, 1e4)).toBeCloseTo(printed, 3);
    }
    expect(() => factor('carbon', 0)).toThrow(RangeError);
    expect(() => reemissionSpeed({ wallTemperature: 0, relativeMass: 1 })).toThrow(RangeError);
  });

  test('and the captured share divide what was delivered', () => {
    expect(thrusterImpulse({ delivered: 30e-6, momentumFactor: 1.5, captured: 0.8 })).toBeCloseTo(25e-6, 18);
    expect(() => thrusterImpulse({ delivered: 1, momentumFactor: 0, captured: 1 })).toThrow(RangeError);
  });
});

describe('the capture of a plume', () => {
  test('is the share of axial momentum within the half-angle, by quadrature over solid angle', () => {
    for (const exponent of [0, 1, 3.5, 10]) for (const halfAngle of [0.05, 0.5, 1.2]) {
      const axial = (phi: number): number => Math.cos(phi) ** (exponent + 1) * Math.sin(phi);
      const share = integral(axial, 0, halfAngle) / integral(axial, 0, Math.PI / 2);
      expect(Math.abs(captureFraction({ exponent, halfAngle }) / share - 1)).toBeLessThan(1e-7);
      const all = integral((phi) => Math.cos(phi) ** exponent * Math.sin(phi), 0, Math.PI / 2);
      expect(Math.abs(meanCosine(exponent) / (integral(axial, 0, Math.PI / 2) / all) - 1)).toBeLessThan(1e-7);
    }
    expect(captureFraction({ exponent: 2, halfAngle: Math.PI / 2 })).toBe(1);
    expect(captureFraction({ exponent: 2, halfAngle: 0 })).toBeCloseTo(0, 15);
  });

  test('needs a plume that can be summed and a target before the source', () => {
    expect(halfAngleSeen({ radius: 0.05, distance: 0.05 })).toBeCloseTo(Math.PI / 4, 15);
    expect(() => captureFraction({ exponent: -1, halfAngle: 1 })).toThrow(RangeError);
    expect(() => captureFraction({ exponent: 1, halfAngle: 2 })).toThrow(RangeError);
    expect(() => halfAngleSeen({ radius: 0, distance: 1 })).toThrow(RangeError);
  });
});

test('propellant that leaves below the pivot lets the pendulum swing further, by ½(Δm r²/J + Δm g r/κ)', () => {
  const bench = { inertia: 2.5e-3, stiffness: 0.054, g: 9.80665 };
  const gain = swingGainOfMassLost({ ...bench, massLost: 1e-6, radius: 0.3 });
  expect(gain / (0.5 * ((1e-6 * 0.09) / 2.5e-3 + (1e-6 * 9.80665 * 0.3) / 0.054))).toBeCloseTo(1, 4);
  expect(swingGainOfMassLost({ ...bench, massLost: 1e-6, radius: -0.3 })).toBeLessThan(gain);
  expect(() => swingGainOfMassLost({ ...bench, massLost: 1, radius: 0.3 })).toThrow(RangeError);
});

// Printed: J 2.5e-3, κ 0.054, 5 g at 0.35 m in calibration only: S_fire/S_cal = 1.280887.
test('5 g that leaves at 0.35 m changes the swing per impulse as between two configurations: 1.280887', () => {
  const loaded = { inertia: 2.5e-3 + 5e-3 * 0.35 ** 2, stiffness: 0.054 + 5e-3 * 9.80665 * 0.35, g: 9.80665 };
  expect(1 + swingGainOfMassLost({ ...loaded, massLost: 5e-3, radius: 0.35 })).toBeCloseTo(1.280887, 6);
});
