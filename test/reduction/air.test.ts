/** Air on a light strip, through the road: what it adds to J, what it bears, and a calibration at one pressure for firing at another. */
import { describe, expect, it } from 'vitest';
import { hingedFactor } from '../../src/pendulum/gas.ts';
import { sentence } from '../../src/problems/sentences.ts';
import { reduce } from '../../src/reduction/reduce.ts';
import type { Reduction } from '../../src/reduction/results.ts';
import type { EntryName } from '../../src/session/entries.ts';
import type { Choices, Entry } from '../../src/session/session.ts';
import { exactly, sessionOf } from '../fixtures/session.ts';

/** 25 µm polyimide, 1420 kg/m³, 19 mm wide (methods 1.13), 200 mm long, stiffened to swing as one: 134.9 mg. */
const STRIP = { width: 0.019, thickness: 25e-6, length: 0.2, density: 1420, g: 9.80665 } as const;
const MASS = STRIP.density * STRIP.thickness * STRIP.width * STRIP.length;
const ARM = 0.18;
const SHOT = 4e-6;
const TAP = 5e-6;

/** Printed: density of dry air at one atmosphere and 20 °C, kg/m³ (methods 1.13). */
const DENSITY = 1.20412;
const LONG_STRIP = (Math.PI * DENSITY * STRIP.width) / (4 * STRIP.density * STRIP.thickness);
const ADDED = LONG_STRIP * hingedFactor(STRIP.length / STRIP.width);
const BORNE = DENSITY / STRIP.density;

/** Tip reading, mm, of an undamped swing begun by an angular impulse: H = √(J κ) φ, φ = 2 sin(θ/2). */
function readingOf(moment: number, inAir: boolean): string {
  const inertia = ((MASS * STRIP.length ** 2) / 3) * (inAir ? 1 + ADDED : 1);
  const stiffness = ((MASS * STRIP.length) / 2) * STRIP.g * (inAir ? 1 - BORNE : 1);
  const swing = 2 * Math.asin(moment / Math.sqrt(inertia * stiffness) / 2);
  return exactly(1e3 * STRIP.length * Math.sin(swing));
}

type Entries = Readonly<Partial<Record<EntryName, string | Entry>>>;
const TYPED: Entries = {
  stripMass: `${exactly(1e6 * MASS)} mg`, stripLength: '200 mm', leverArm: '180 mm', tapLeverArm: '180 mm', readingRadius: '200 mm', gravity: '9.80665 m/s²', division: '0.0001 mm',
  stripWidth: '19 mm', stripThickness: '25 µm', airTemperature: '20 °C',
};

function bench({ choices = {}, entries = {}, shotInAir = false, tapInAir = true }: { readonly choices?: Partial<Choices>; readonly entries?: Entries; readonly shotInAir?: boolean; readonly tapInAir?: boolean }): Reduction {
  return reduce(sessionOf({
    choices: { form: 'uniformStrip', dampingWay: 'none', calibration: 'taps', ...choices },
    entries: { ...TYPED, ...entries },
    impulseUnit: 'µN·s',
    rows: [
      { kind: 'tap', rest: '0', first: readingOf(TAP * ARM, tapInAir), tapImpulse: '5' }, { kind: 'tap', rest: '0', first: readingOf(TAP * ARM, tapInAir), tapImpulse: '5' },
      { rest: '0', first: readingOf(SHOT * ARM, shotInAir) }, { rest: '0', first: readingOf(SHOT * ARM, shotInAir) },
    ],
  }), null);
}

const codes = (r: Reduction): readonly string[] => r.problems.map((p) => p.code);

describe('a 25 µm film 19 mm wide carries air along', () => {
  // Methods 1.13: parts of the strip's mass for an endless strip; a short one carries less.
  it.each([['101.325 kPa', 0.506, 3], ['10 kPa', 0.050, 3], ['5 kPa', 0.025, 3], ['1 kPa', 0.005, 4]] as const)('at %s it amounts to %f of the strip’s inertia', (pressure, part, decimals) => {
    const r = bench({ entries: { pressure } });
    expect(r.air.shots!.ofInertia / hingedFactor(STRIP.length / STRIP.width)).toBeCloseTo(part, decimals);
  });

  it('in air of 1.20412 kg/m³', () => {
    expect(bench({ entries: { pressure: '101.325 kPa' } }).air.shots!.density.value).toBeCloseTo(DENSITY, 4);
  });

  it('and is borne by 0.085 % of its weight', () => {
    expect(1 - bench({ entries: { pressure: '101.325 kPa' } }).air.shots!.buoyancy.value).toBeCloseTo(0.00085, 5);
  });

  it('corrects at one atmosphere, is an uncertainty where the air is too viscous, and nothing where it is too thin', () => {
    const use = (pressure: string): string | undefined => bench({ entries: { pressure } }).air.shots?.use;
    expect([use('101.325 kPa'), use('10 kPa'), use('1 kPa'), use('0.002 Pa')]).toEqual(['correction', 'uncertainty', 'magnitude', undefined]);
    const { shots } = bench({ entries: { pressure: '10 kPa' } }).air;
    expect(shots!.addedInertia.value).toBe(0);
    expect(shots!.addedInertia.u).toBeGreaterThan((0.05 * MASS * STRIP.length ** 2) / 3 / Math.sqrt(3) * 0.9);
  });
});

describe('tapped at one atmosphere, fired in vacuum', () => {
  const entries: Entries = { pressure: '0.002 Pa', tapPressure: '101.325 kPa' };

  it('swings √1.5 as far for the same impulse, less what the short strip and buoyancy leave of it', () => {
    const change = bench({ entries }).calibrations.taps!.change.value;
    expect(1 / change).toBeCloseTo(Math.sqrt((1 + ADDED) * (1 - BORNE)), 5);
    expect(1 / change / Math.sqrt(1.5)).toBeGreaterThan(0.98);
  });

  it('gives the shots’ impulse back by the taps and by the geometry', () => {
    for (const calibration of ['taps', 'geometry'] as const) {
      const { run } = bench({ entries, choices: { calibration } });
      expect(run!.mean.value / SHOT).toBeCloseTo(1, 4);
    }
  });

  it('is off by a fifth where the air is not corrected for', () => {
    expect(bench({ entries, choices: { correctAir: false } }).run!.mean.value / SHOT).toBeCloseTo(Math.sqrt((1 + ADDED) * (1 - BORNE)), 4);
  });

  it('has what the air’s viscosity leaves open in its budget by taps, and not by the geometry of the vacuum', () => {
    const lines = (calibration: 'taps' | 'geometry'): readonly string[] => bench({ entries, choices: { calibration } }).run!.budget.lines.filter((line) => line.contribution !== 0).map((line) => line.id);
    expect(lines('taps')).toContain('air.flow');
    expect(lines('geometry')).not.toContain('air.flow');
  });

  it('is warned of where no width is typed', () => {
    const r = bench({ entries: { ...entries, stripWidth: '' } });
    expect(r.problems.filter((p) => p.code === 'air-needs-width').map((p) => [p.weight, sentence(p)])).toEqual([['doubt', expect.stringMatching(/calibration changes between them/)]]);
    expect(r.calibrations.taps!.change.value).toBe(1);
  });

  it('damps the taps apart from the shots', () => {
    const two = reduce(sessionOf({
      choices: { form: 'pointBob', calibration: 'taps' },
      entries: { bobMass: '1 g', bobDistance: '200 mm', leverArm: '200 mm', tapLeverArm: '200 mm', readingRadius: '200 mm', gravity: '9.81 m/s²', ...entries },
      rows: [{ kind: 'tap', rest: '0', first: '10.0', next: ['-8.0', '6.4'], tapImpulse: '0.1' }, { rest: '0', first: '10.0', next: ['-9.9', '9.8'] }],
    }), null);
    expect(two.configurations.taps!.dampingRatio.value).toBeGreaterThan(5 * two.configurations.shots!.dampingRatio.value);
  });
});

describe('tapped at the pressure of the shots', () => {
  it('needs no correction, and owes the air nothing', () => {
    const r = bench({ entries: { pressure: '5 kPa' }, tapInAir: false });
    expect(r.calibrations.taps!.change).toEqual({ value: 1, u: 0 });
    expect(r.run!.budget.lines.filter((line) => line.id.startsWith('air') && line.contribution !== 0)).toEqual([]);
  });

  it('carries the air as an uncertainty where the geometry calibrates', () => {
    const r = bench({ entries: { pressure: '5 kPa' }, choices: { calibration: 'geometry' } });
    expect(r.run!.mean.value / SHOT).toBeCloseTo(1, 3);
    // Half of 2.3 % added, up to 2.3 times of it, as limits.
    expect(r.run!.uCommon / r.run!.mean.value).toBeGreaterThan(0.006);
    expect(codes(r)).toContain('air-on-strip');
  });
});

it('a strip wider than long is left without air, and said so', () => {
  expect(codes(bench({ entries: { pressure: '101.325 kPa', stripWidth: '300 mm', stripThickness: '' } }))).toContain('air-not-reckoned');
});

it('a hanging film tapped at one atmosphere changes like its strip', () => {
  const r = reduce(sessionOf({
    choices: { form: 'filmStrip', dampingWay: 'ratio', calibration: 'taps' },
    entries: {
      filmThickness: '25 µm', filmWidth: '19 mm', filmLength: '200 mm', filmDensity: '1420 kg/m³', filmModulus: '2.5 GPa', zoneFrom: '160 mm', zoneTo: '200 mm', leverArm: '180 mm', tapLeverArm: '180 mm',
      readingRadius: '200 mm', gravity: '9.80665 m/s²', dampingRatio: '0.02', division: '0.001 mm', airTemperature: '20 °C', pressure: '0.002 Pa', tapPressure: '101.325 kPa',
      // As wide as the plume, so that the air alone changes the factor.
      tapContact: '40 mm',
    },
    impulseUnit: 'µN·s',
    rows: [{ kind: 'tap', rest: '0', first: '10.0', tapImpulse: '4' }, { rest: '0', first: '10.0' }],
  }), null);
  expect(1 / r.calibrations.taps!.change.value).toBeCloseTo(Math.sqrt((1 + ADDED) * (1 - BORNE)), 4);
});
