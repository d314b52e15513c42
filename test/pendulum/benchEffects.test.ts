/** What fools people at the bench, against the printed sizes for one bench (elastic and friction constants typical, from memory). */
import { expect, test } from 'vitest';
import * as effects from '../../src/pendulum/benchEffects.ts';
import type { Bench } from '../../src/pendulum/benchEffects.ts';
import { frictionFactor } from '../../src/pendulum/dampingLaws.ts';
import { nextTurningPoint } from './odexDriven.ts';

/** J 2.5e-3 kg·m², κ 0.054 N·m/rad, 36.7 g at 0.15 m, r_t 0.30 m, 41 µN·s: θ_p = r_t I/√(J κ) = 1.059 mrad. */
const impulse = 41e-6;
const firstSwing = (0.3 * impulse) / Math.sqrt(2.5e-3 * 0.054);
const bench: Bench = { stiffness: 0.054, mass: 0.0367, centreOfMass: 0.15, g: 9.80665, leverArm: 0.3, impulse, firstSwing };

test('the bench itself swings 1.059 mrad', () => expect(firstSwing * 1000).toBeCloseTo(1.059, 3));

test('leads of a capacitor off the arm push 56 µN·s, as much as the bit; the charge across the Earth’s field 0.075 µN·s', () => {
  const leads = effects.leadsImpulse(bench, { inductancePerLength: 0.5e-6, energy: 11.25, resistance: 0.05 });
  expect(leads.impulse * 1e6).toBeCloseTo(56, 0);
  expect(leads.share).toBeGreaterThan(1);
  expect(effects.earthFieldImpulse(bench, { charge: 15e-3, length: 0.1, field: 50e-6 }).impulse * 1e6).toBeCloseTo(0.075, 10);
});

test('a charged arm is drawn with 40 µN, its rest by 0.22 mrad, 21 % of the swing', () => {
  const pull = effects.electrostaticPull(bench, { area: 0.01, voltage: 1500, gap: 0.05 });
  expect(pull.force * 1e6).toBeCloseTo(40, 0);
  expect(pull.rest * 1000).toBeCloseTo(0.22, 2);
  expect(pull.share).toBeCloseTo(0.21, 2);
});

test('counted from a charged rest a fifth of the swing on, the first swing reads 18 % low', () => {
  expect(effects.chargedRestChange(0.2)).toBeCloseTo(-0.18, 3);
  for (const z of [-0.3, 0.1, 0.5]) {
    const top = nextTurningPoint((_, angle) => -angle, { time: 0, angle: z, speed: 1 }, 1);
    expect(effects.chargedRestChange(z)).toBeCloseTo(top.angle - z - 1, 11);
  }
});

test('an edge’s rolling lever of 5 µm is 33 µrad and 3.1 % of the launch, a pin’s friction 0.67 mrad and 50 %', () => {
  const edge = effects.pivotFriction(bench, 5e-6);
  expect(edge.rest * 1e6).toBeCloseTo(33, 0);
  expect(edge.launchGain).toBeCloseTo(0.031, 3);
  const pin = effects.pivotFriction(bench, 0.2 * 0.5e-3);
  expect(pin.rest * 1000).toBeCloseTo(0.67, 2);
  expect(pin.launchGain).toBeCloseTo(0.5, 2);
  expect(pin.launchGain).toBeCloseTo(frictionFactor({ friction: pin.rest, firstSwing }) - 1, 14);
});

test('an edge of 0.2 mm radius rolling on a flat stiffens by 0.13 %', () => expect(effects.edgeRolling(bench, 0.2e-3).share).toBeCloseTo(0.0013, 4));

test('one copper wire of 0.25 mm, 50 mm long, stiffens by 0.9 … 3.4 %', () => {
  const { least, largest } = effects.wireStiffness(bench, { modulus: 120e9, diameter: 0.25e-3, bore: 0, length: 0.05 });
  expect(least.share).toBeCloseTo(0.009, 3);
  expect(largest.share).toBeCloseTo(0.034, 3);
  expect(() => effects.wireStiffness(bench, { modulus: 1, diameter: 1, bore: 1, length: 1 })).toThrow(RangeError);
});

test('a tilt of 10 µrad moves the rest by 0.9 % of the swing; a tilted torsion axis adds M g d sin φ', () => {
  expect(effects.standTilt(bench, 10e-6).share).toBeCloseTo(0.0094, 4);
  expect(effects.torsionAxisTilt(bench, { tilt: 0.01, offAxis: 0.15 }).share).toBeCloseTo(0.01, 4);
});

test('10 g on 50 mm of aluminium 10 K warmer move the centre of mass 3.1 µm and the rest 21 µrad, 2 %', () => {
  const heat = effects.heatedBracket(bench, { mass: 0.01, length: 0.05, expansion: effects.ALUMINIUM_EXPANSION, warming: 10 });
  expect(heat.centreOfMassMoved * 1e6).toBeCloseTo(3.1, 1);
  expect(heat.rest * 1e6).toBeCloseTo(21, 0);
  expect(heat.share).toBeCloseTo(0.02, 3);
  // All flexure: 10 K take 0.3 … 0.5 % off κ.
  expect(effects.warmedFlexure({ ...bench, mass: 0 }, { warming: 10, perKelvin: effects.MODULUS_CHANGE }).share).toBeCloseTo(-0.004, 12);
});

test('a body on two wires struck 5 mm off its centre yaws by 10 % of the swing at a reading point 50 mm off it', () => {
  const yaw = effects.yawOnWires({ offLine: 5e-3, readOff: 0.05, gyration: 0.05, halfSpacing: 0.05 });
  expect(yaw.share).toBeCloseTo(0.1, 14);
  expect(yaw.frequencyRatio).toBe(1);
  expect(() => effects.yawOnWires({ offLine: 1, readOff: 1, gyration: 0, halfSpacing: 1 })).toThrow(RangeError);
});

test('a plate on a limp tape is read true at its centre of mass only', () => {
  expect(effects.plateOnTape('centreOfMass')).toEqual({ least: -0.02, largest: 0.02, firstMaximumMisleads: false });
  expect(effects.plateOnTape('bottomEdge')).toEqual({ least: 0.1, largest: 0.26, firstMaximumMisleads: true });
});

test('a plume that wanders 10 mm of 280 mm is 3.6 % of the bit', () => expect(effects.plumeWander({ ...bench, leverArm: 0.28 }, 0.01).share).toBeCloseTo(0.036, 3));

test('a hose of 1 mm bore at 2 bar pushes with 0.157 N; 1 % less for 50 ms is 79 µN·s', () => {
  const hose = effects.hosePush(bench, { pressure: 2e5, bore: 1e-3, drop: 0.01, duration: 0.05 });
  expect(hose.force).toBeCloseTo(0.157, 3);
  expect(hose.impulse * 1e6).toBeCloseTo(79, 0);
});

test('1 g of polymer at 1 % moisture is 10 mg, more than 2000 shots of 3.1 µg', () => {
  const { mass, shots } = effects.moistureInWeighing({ polymer: 1e-3, moisture: 0.01, massBit: 3.1e-9 });
  expect(mass * 1e6).toBeCloseTo(10, 12);
  expect(shots).toBeGreaterThan(2000);
  expect(() => effects.moistureInWeighing({ polymer: 1, moisture: 1, massBit: 0 })).toThrow(RangeError);
});

test('a bench without stiffness, lever arm, impulse bit or swing has no sizes', () => {
  expect(() => effects.standTilt({ ...bench, stiffness: 0 }, 1)).toThrow(RangeError);
  expect(() => effects.standTilt({ ...bench, impulse: 0 }, 1)).toThrow(RangeError);
  expect(() => effects.pivotFriction(bench, -1)).toThrow(RangeError);
  expect(() => effects.electrostaticPull(bench, { area: 1, voltage: 1, gap: 0 })).toThrow(RangeError);
});

// Common practice, no source: 0.5 µF at 8 kV; 0.04 µF at 12 kV; 0.0011 µF at 10 kV. Methods 4: 10 µF at 1500 V.
test.each([[0.5e-6, 8e3, 16], [0.04e-6, 12e3, 2.88], [0.0011e-6, 10e3, 0.055], [10e-6, 1500, 11.25]])('a bank of %d F at %d V holds %d J', (capacitance, voltage, energy) => {
  expect(effects.storedEnergy({ capacitance, voltage }) / energy).toBeCloseTo(1, 12);
});
