/** Worked cases from outside through the whole road, and the size that practice expects. */
import { describe, expect, it } from 'vitest';
import { reduce } from '../../src/reduction/reduce.ts';
import { entry, type Session } from '../../src/session/session.ts';
import { demoLike, SHOTS } from '../fixtures/demoLike.ts';
import { exactly, rowId, sessionOf, withChoices, withEntry, type Row } from '../fixtures/session.ts';

/** Rigid strip 1.000 g, 0.300 m, struck at 0.280 m, 5°: the worked strip of methods 5 (derived there, g = 9.80665). */
const STRIP: Session = sessionOf({
  choices: { form: 'uniformStrip', readingWay: 'angle', dampingWay: 'none' },
  entries: { stripMass: '1.000 g', stripLength: '0.300 m', leverArm: '0.280 m', gravity: '9.80665 m/s²' },
  rows: [{ rest: 0, first: 5 }], readingUnit: '°',
});

describe('the worked rigid strip', () => {
  const r = reduce(STRIP, rowId(1));
  const shot = r.records[0]!;

  it('gives its impulse bit by the full pendulum and by the small angle', () => {
    expect(r.problems.filter((p) => p.weight === 'stops')).toEqual([]);
    expect(shot.full!.value * 1e6).toBeCloseTo(65.4513, 4);
    expect(shot.smallAngle!.value * 1e6).toBeCloseTo(65.472, 4);
    expect(r.configurations.shots!.momentOfInertia.value).toBeCloseTo(3e-5, 18);
    expect(r.configurations.shots!.period.value).toBeCloseTo(0.897294, 6);
  });

  it('opens into a chain whose every step leads to the next', () => {
    const step = (id: string): number => r.explained!.chain.find((one) => one.id === id)!.stated.value;
    expect(step('throw')).toBeCloseTo((5 * Math.PI) / 180, 15);
    expect(step('launch.full')).toBeCloseTo(2 * Math.sin((2.5 * Math.PI) / 180), 14);
    expect(step('launch.smallAngle')).toBeCloseTo((5 * Math.PI) / 180, 15);
    expect(step('moment') / (step('factor.geometry') * step('launch.full'))).toBeCloseTo(1, 14);
    expect(step('impulse') / (step('moment') / step('arm'))).toBeCloseTo(1, 14);
    expect(step('impulse')).toBe(shot.impulseBit!.value);
    expect(step('impulse.otherForm')).toBe(shot.smallAngle!.value);
  });
});

describe('small angle against full pendulum', () => {
  // Methods 1.1, (θ/2)/sin(θ/2); derived there.
  it.each([[1, 1.0000127], [5, 1.0003174], [10, 1.0012704], [20, 1.0050951], [45, 1.0261722], [90, 1.1107207]])('over-states at %d° by the factor %d', (degrees, factor) => {
    const session = { ...STRIP, sheets: sessionOf({ rows: [{ rest: 0, first: degrees }], readingUnit: '°' }).sheets };
    const { full, smallAngle } = reduce(session, null).records[0]!;
    expect(smallAngle!.value / full!.value).toBeCloseTo(factor, 7);
  });

  it('differs by a note of its own where the difference exceeds the uncertainty', () => {
    const session = { ...withEntry(STRIP, 'leverArm', entry('0.280 m ± 0.1 %')), sheets: sessionOf({ rows: [{ rest: 0, first: 45 }], readingUnit: '°' }).sheets };
    expect(reduce(session, null).problems.map((p) => p.code)).toContain('forms-differ');
  });
});

describe('the damping of the first swing', () => {
  // Methods 1.3, D(ζ); derived there, ODE-checked.
  it.each([[0.001, 1.00157103], [0.01, 1.01573119], [0.05, 1.07910717], [0.2, 1.32251529], [0.5, 1.83051947], [1.5, 3.63724608]])('of ζ = %d is corrected by D = %d', (zeta, D) => {
    const r = reduce(withEntry(withChoices(STRIP, { dampingWay: 'ratio', swingForm: 'smallAngle' }), 'dampingRatio', entry(exactly(zeta))), null);
    expect(r.configurations.shots!.dampingFactor.value).toBeCloseTo(D, 8);
    expect(r.records[0]!.launch!.value / r.records[0]!.angle!.value).toBeCloseTo(D, 8);
  });

  it('is had from the 13 % of the amplitude left at the 100th cycle: δ = 0.0204022 (methods 5, derived)', () => {
    const r = reduce(withEntry(withChoices(STRIP, { dampingWay: 'decrement' }), 'logDecrement', entry(exactly(Math.log(100 / 13) / 100))), null);
    expect(r.damping!.logDecrement.value).toBeCloseTo(0.0204022, 7);
    expect(r.damping!.ratio.value).toBeCloseTo(0.0032471, 8);
  });

  it('is had from three turning points 12.40, −8.30, 10.65 without a rest: δ/2 = 0.0883298 (methods 5, derived)', () => {
    // As angles of a pendulum that a flexure alone drives, so that the small swing's law is exact.
    const free: Row = { kind: 'freeSwing', first: 12.4, next: [-8.3, 10.65] };
    const session: Session = {
      ...sessionOf({
        choices: { form: 'uniformStrip', readingWay: 'angle' },
        entries: { stripMass: '1e-9 g', stripLength: '0.3 m', leverArm: '0.28 m', gravity: '9.80665 m/s²', flexureStiffness: '10 N·m/rad' },
        rows: [free, { rest: 0, first: 5 }], readingUnit: 'mrad',
      }),
    };
    expect(reduce(session, null).damping!.logDecrement.value / 2).toBeCloseTo(0.0883298, 7);
  });
});

describe('a calibration mass on for the taps alone', () => {
  it('changes the calibration factor by the 1.280887 of methods 1.11 (derived there), not by the inertia alone', () => {
    // J_f = 2.5e-3, κ_f = 0.054: one part of its own inertia with its weight at a distance that makes κ_f.
    const [g, m] = [9.80665, 0.02];
    const r0 = 0.054 / (m * g);
    const session = sessionOf({
      choices: { form: 'bodyOfParts', readingWay: 'angle', dampingWay: 'none', calibrationMassHung: 'taps', swingForm: 'smallAngle' },
      entries: { gravity: `${g} m/s²`, leverArm: '0.3 m', tapLeverArm: '0.3 m', calibrationMass: '5 g', calibrationMassDistance: '0.35 m' },
      parts: [{ mass: `${m} kg`, distance: `${exactly(r0)} m`, ownInertia: `${exactly(2.5e-3 - m * r0 * r0)} kg·m²` }],
      rows: [{ kind: 'tap', rest: 0, first: 50, tapImpulse: 1 }, { rest: 0, first: 50 }], readingUnit: 'mrad',
    });
    const r = reduce(session, null);
    expect(r.configurations.shots!.momentOfInertia.value).toBeCloseTo(2.5e-3, 15);
    expect(r.configurations.shots!.stiffness.value).toBeCloseTo(0.054, 14);
    // S_fire/S_cal = K_cal/K_fire.
    expect(1 / r.calibrations.taps!.change.value).toBeCloseTo(1.280887, 6);
  });
});

describe('the size that practice expects', () => {
  // Common practice, no source: table-top pulsed plasma thrusters give a few µN·s to a few mN·s, and a strip of film moves millimetres for a few µN·s.
  it('is a few millimetres for a few µN·s on a strip of a few tenths of a gram', () => {
    for (const [mass, length] of [[0.1, 200], [0.2, 200], [0.3, 250]] as const) {
      const strip = sessionOf({
        choices: { form: 'uniformStrip', dampingWay: 'none' },
        entries: { stripMass: `${mass} g`, stripLength: `${length} mm`, leverArm: `${0.9 * length} mm`, readingRadius: `${length} mm`, gravity: '9.81 m/s²' },
        rows: [{ rest: 50, first: 52 }, { rest: 50, first: 60 }],
      });
      const [small, large] = reduce(strip, null).records.map((record) => record.impulseBit!.value);
      expect(small).toBeGreaterThan(0.3e-6);
      expect(small).toBeLessThan(3e-6);
      expect(large).toBeGreaterThan(1e-6);
      expect(large).toBeLessThan(20e-6);
    }
  });

  it('holds for the invented bench of the tests: between a few µN·s and a few mN·s', () => {
    const mean = reduce(demoLike(), rowId(SHOTS[0])).run!.mean.value;
    expect(mean).toBeGreaterThan(2e-6);
    expect(mean).toBeLessThan(9e-3);
  });
});
