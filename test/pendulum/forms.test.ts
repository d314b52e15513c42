/** The pendulum's forms and routes, against textbook bullets, a strip computed by hand and each other. */
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import {
  bobInertia, bobMoment, configurationChange, dampingCarried, geometryFactor, gravityShare, inertiaOfPeriod, naturalFrequency, partInertia, partMoment, smallPeriod, stiffness,
  stiffnessOfPeriod, stripInertia, stripMoment,
} from '../../src/pendulum/forms.ts';
import { launchOfFirstSwing } from '../../src/pendulum/launch.ts';

const G = 9.80665;
const degrees = (x: number): number => (x * Math.PI) / 180;

/** Impulse at the lever arm from the first swing, undamped, gravity alone: I = K φ/r_t. */
function impulse(inertia: number, moment: number, arm: number, firstSwing: number, g = G): number {
  const factor = geometryFactor({ inertia, stiffness: stiffness({ moment, g, flexure: 0 }) });
  return (factor * launchOfFirstSwing(firstSwing, 0, 1).launch) / arm;
}
const bob = (m: number, L: number, theta: number, g = G): number => impulse(bobInertia({ m, L }), bobMoment({ m, L }), L, theta, g);
/** First swing of a rise h on the length L. */
const ofRise = (h: number, L: number): number => Math.acos(1 - h / L);

describe('a point bob', () => {
  const mass = fc.double({ min: 1e-4, max: 10, noNaN: true });
  const length = fc.double({ min: 0.02, max: 3, noNaN: true });
  const theta = fc.double({ min: 1e-4, max: 2.5, noNaN: true });

  // Source: methods 1.1, derived from the energy.
  test('has I = 2 m √(gL) sin(θ/2) = m √(2gh)', () => {
    fc.assert(fc.property(mass, length, theta, (m, L, at) => {
      const I = bob(m, L, at);
      expect(I / (2 * m * Math.sqrt(G * L) * Math.sin(at / 2))).toBeCloseTo(1, 13);
      expect(I / (m * Math.sqrt(2 * G * 2 * L * Math.sin(at / 2) ** 2))).toBeCloseTo(1, 13);
    }));
  });

  // Source: Cutnell & Johnson, Physics, ch. 7 (attribution and answer from memory, recomputed): 896 m/s; 895.90 m/s with g = 9.80. The rise alone counts, not the length.
  test('that caught a 10.0 g bullet in 2.50 kg and rose 0.650 m tells 896 m/s, on any length', () => {
    for (const L of [0.8, 2, 10]) {
      const speed = bob(2.51, L, ofRise(0.65, L), 9.8) / 0.01;
      expect(speed).toBeCloseTo(895.9, 2);
      expect(Math.round(speed)).toBe(896);
    }
  });

  // Source: methods 5 item 5, derived; a printed 297 leaves out the bullet's mass after the impact.
  test('that caught 5 g in 1.5 kg and rose 5 cm tells 298.13 m/s, 298.08 in standard gravity', () => {
    expect(bob(1.505, 1, ofRise(0.05, 1), 9.81) / 0.005).toBeCloseTo(298.13, 2);
    expect(bob(1.505, 1, ofRise(0.05, 1)) / 0.005).toBeCloseTo(298.08, 2);
    expect(Math.round(bob(1.5, 1, ofRise(0.05, 1), 9.81) / 0.005)).toBe(297);
  });

  // Source: methods 5 item 6, derived.
  test('of 2 kg and 2.6 g on 50 cm at 13.4° moved at 0.516699 m/s with 1.03474 N·s', () => {
    const I = bob(2.0026, 0.5, degrees(13.4));
    expect(I / 2.0026).toBeCloseTo(0.516699, 6);
    expect(I).toBeCloseTo(1.03474, 5);
  });
});

describe('a uniform rigid strip', () => {
  // Source: methods 5 item 15, derived: 1.000 g, 0.300 m, struck at 0.280 m, 5°.
  test('of 1 g and 0.3 m struck at 0.28 m swings 0.897294 s and takes 65.4513 µN·s to 5°, 65.4720 by the small angle', () => {
    const [m, L] = [1e-3, 0.3];
    const inertia = stripInertia({ m, L });
    const kappa = stiffness({ moment: stripMoment({ m, L }), g: G, flexure: 0 });
    expect(inertia).toBeCloseTo(3e-5, 16);
    expect(smallPeriod({ inertia, stiffness: kappa })).toBeCloseTo(0.897294, 6);
    expect(impulse(inertia, stripMoment({ m, L }), 0.28, degrees(5)) * 1e6).toBeCloseTo(65.4513, 4);
    expect((geometryFactor({ inertia, stiffness: kappa }) * degrees(5) * 1e6) / 0.28).toBeCloseTo(65.472, 4);
  });

  // Source: methods 1.1, derived.
  test('struck at its end has I = m √(2gL/3) sin(θ/2), and ω = √(3g/2L)', () => {
    fc.assert(fc.property(fc.double({ min: 1e-4, max: 1, noNaN: true }), fc.double({ min: 0.05, max: 2, noNaN: true }), fc.double({ min: 1e-4, max: 2, noNaN: true }), (m, L, theta) => {
      const [inertia, moment] = [stripInertia({ m, L }), stripMoment({ m, L })];
      expect(impulse(inertia, moment, L, theta) / (m * Math.sqrt((2 * G * L) / 3) * Math.sin(theta / 2))).toBeCloseTo(1, 13);
      expect(naturalFrequency({ inertia, stiffness: moment * G }) / Math.sqrt((3 * G) / (2 * L))).toBeCloseTo(1, 14);
    }));
  });

  test('is a rod of its own inertia mL²/12 about its middle (parallel axes)', () => {
    expect(stripInertia({ m: 0.02, L: 0.4 })).toBeCloseTo(partInertia({ m: 0.02, r: 0.2, J: (0.02 * 0.4 ** 2) / 12 }), 15);
    expect(stripMoment({ m: 0.02, L: 0.4 })).toBeCloseTo(partMoment({ m: 0.02, r: 0.2 }), 15);
  });

  test('with a plate at its end is the sum of both, and a part above the pivot takes static moment away', () => {
    const inertia = stripInertia({ m: 1e-3, L: 0.3 }) + partInertia({ m: 2e-3, r: 0.3, J: 1e-7 });
    expect(inertia).toBeCloseTo(3e-5 + 1.8e-4 + 1e-7, 15);
    expect(partMoment({ m: 2e-3, r: -0.1 })).toBeCloseTo(-2e-4, 15);
    expect(partInertia({ m: 2e-3, r: -0.1, J: 0 })).toBeCloseTo(2e-5, 15);
  });
});

describe('stiffness, period and inertia', () => {
  // Source: methods 1.8, derived: J = 2.5e-3 kg·m², κ = 0.054 N·m/rad, a mass of 20 g hung at 0.35, 0.15 and 0.46 m.
  test('of the bench example are 1.35192623 s, and 1.26227738, 1.18156036 and 1.35749238 s with a mass added', () => {
    expect(smallPeriod({ inertia: 2.5e-3, stiffness: 0.054 })).toBeCloseTo(1.35192623, 8);
    for (const [r, period] of [[0.35, 1.26227738], [0.15, 1.18156036], [0.46, 1.35749238]] as const) {
      const loaded = { inertia: 2.5e-3 + partInertia({ m: 0.02, r, J: 0 }), stiffness: 0.054 + stiffness({ moment: partMoment({ m: 0.02, r }), g: G, flexure: 0 }) };
      expect(smallPeriod(loaded)).toBeCloseTo(period, 8);
    }
  });

  test('route A and route B undo the period', () => {
    const number = fc.double({ min: 1e-6, max: 10, noNaN: true });
    fc.assert(fc.property(number, number, (inertia, kappa) => {
      const period = smallPeriod({ inertia, stiffness: kappa });
      expect(inertiaOfPeriod({ stiffness: kappa, period }) / inertia).toBeCloseTo(1, 13);
      expect(stiffnessOfPeriod({ inertia, period }) / kappa).toBeCloseTo(1, 13);
      expect(naturalFrequency({ inertia, stiffness: kappa }) * period).toBeCloseTo(2 * Math.PI, 12);
    }));
  });

  // Source: methods 1.1, table of routes: A (Mgd + k_f) T θ/(2πr), +1 in T; B 2πJθ/(T r), −1 in T.
  test('route A’s factor is κT/2π and grows with the period, route B’s is 2πJ/T and falls with it', () => {
    const [kappa, inertia] = [0.054, 2.5e-3];
    const A = (period: number): number => geometryFactor({ inertia: inertiaOfPeriod({ stiffness: kappa, period }), stiffness: kappa });
    const B = (period: number): number => geometryFactor({ inertia, stiffness: stiffnessOfPeriod({ inertia, period }) });
    expect(A(1.35)).toBeCloseTo((kappa * 1.35) / (2 * Math.PI), 14);
    expect(B(1.35)).toBeCloseTo((2 * Math.PI * inertia) / 1.35, 14);
    expect(A(1.35 * 1.01) / A(1.35)).toBeCloseTo(1.01, 12);
    expect(B(1.35 * 1.01) / B(1.35)).toBeCloseTo(1 / 1.01, 12);
  });

  // Source: methods 1.18, derived: 36.7 g at 0.15 m, r_t 0.30 m, 41 µN·s swings 1.059 mrad.
  test('of the bench example turn 41 µN·s at 0.30 m into 1.059 mrad', () => {
    expect(stiffness({ moment: partMoment({ m: 0.0367, r: 0.15 }), g: G, flexure: 0 })).toBeCloseTo(0.054, 4);
    expect((41e-6 * 0.3) / geometryFactor({ inertia: 2.5e-3, stiffness: 0.054 }) * 1e3).toBeCloseTo(1.059, 3);
  });

  test('a flexure takes its share of the stiffness', () => {
    const kappa = stiffness({ moment: 5e-3, g: G, flexure: 0.0122583125 });
    expect(gravityShare({ moment: 5e-3, g: G, stiffness: kappa })).toBeCloseTo(0.8, 6);
    expect(gravityShare({ moment: 5e-3, g: G, stiffness: 5e-3 * G })).toBe(1);
  });
});

describe('another configuration at the shots than at the taps', () => {
  // Source: methods 1.11, derived: J_f = 2.5e-3, κ_f = 0.054, 5 g at 0.35 m in the calibration only. S is 1/K, so S_f/S_c = 1/(K_f/K_c).
  const extra = { inertia: partInertia({ m: 5e-3, r: 0.35, J: 0 }), stiffness: partMoment({ m: 5e-3, r: 0.35 }) * G };
  const change = configurationChange({ inertiaShots: 2.5e-3, stiffnessShots: 0.054, inertiaTaps: 2.5e-3 + extra.inertia, stiffnessTaps: 0.054 + extra.stiffness });

  test('5 g taken off at 0.35 m make the pendulum 1.280887 times as sensitive (the inertia alone: 1.115796)', () => {
    expect(1 / change).toBeCloseTo(1.280887, 6);
    expect(Math.sqrt((2.5e-3 + extra.inertia) / 2.5e-3)).toBeCloseTo(1.115796, 6);
  });

  test('carries the damping ratio by the calibration factors, the damping torque being the same', () => {
    const factor = { taps: geometryFactor({ inertia: 2.5e-3 + extra.inertia, stiffness: 0.054 + extra.stiffness }), shots: geometryFactor({ inertia: 2.5e-3, stiffness: 0.054 }) };
    expect(factor.shots / factor.taps).toBeCloseTo(change, 14);
    const torque = 2 * 0.01 * factor.taps;
    const carried = dampingCarried({ ratio: 0.01, factorFrom: factor.taps, factorTo: factor.shots });
    expect(2 * carried * factor.shots).toBeCloseTo(torque, 14);
    expect(carried).toBeCloseTo(0.01280887, 7);
  });
});
