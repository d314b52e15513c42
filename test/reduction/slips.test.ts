/** Each slip of the pen planted in turn on a bench that agrees with itself, and found by name. */
import { describe, expect, it } from 'vitest';
import { reduce } from '../../src/reduction/reduce.ts';
import type { Agreement, SlipId } from '../../src/reduction/evidenceResults.ts';
import { editOf } from '../../src/reduction/slipEdit.ts';
import { entry, type Entry, type Session } from '../../src/session/session.ts';
import type { EntryName } from '../../src/session/entries.ts';
import { exactly, sessionOf, withChoices, withEntry } from '../fixtures/session.ts';
import { sheet, withSheets } from '../fixtures/sheets.ts';

/** Strip 18.4 g, 400 mm, with a plate of 6.2 g at 380 mm; g 9.8094. Worked with the formulas of methods 1.1, apart from the road. */
const [G, M, L, MP, RP] = [9.8094, 0.0184, 0.4, 0.0062, 0.38];
const J = (M * L * L) / 3 + MP * RP * RP;
const KAPPA = G * ((M * L) / 2 + MP * RP);
const K = Math.sqrt(J * KAPPA);
const T0 = 2 * Math.PI * Math.sqrt(J / KAPPA);
const [RADIUS, TAP_ARM, RATIO] = [0.402, 0.33, 0.02];
const TAPS = [0.8e-3, 1.2e-3, 1.6e-3, 2e-3];

/** Reading at the tip of a tap's first swing, damped: φ = D θ_p for small swings, sin from the energy (p = 1). */
const D = Math.exp((RATIO * Math.acos(RATIO)) / Math.sqrt(1 - RATIO * RATIO));
const tipOf = (impulse: number): number => RADIUS * Math.sin(2 * Math.asin((impulse * TAP_ARM) / K / D / 2));
/** A laser on a screen at 1.2 m: D tan 2θ. */
const spotOf = (impulse: number): number => 1.2 * Math.tan(4 * Math.asin((impulse * TAP_ARM) / K / D / 2));

const ENTRIES: Partial<Record<EntryName, string | Entry>> = {
  stripMass: '18.40 ± 0.02 g', stripLength: '400.0 ± 0.3 mm', plateMass: '6.20 ± 0.01 g', plateDistance: '380.0 ± 0.3 mm', leverArm: '370 ± 1 mm', tapLeverArm: '330.0 ± 0.5 mm', readingRadius: '402.0 ± 0.3 mm',
  gravity: '9.8094 ± 0.0005 m/s²', dampingRatio: '0.0200 ± 0.0005', hammerFactor: '1 ± 1 %', tapSpread: '0.5 %', division: '0.1 mm',
  period: `${exactly(T0 / Math.sqrt(1 - RATIO ** 2))} ± 0.001 s`, staticStiffness: `${exactly(KAPPA * 1e3)} ± 0.1 mN·m/rad`, firstMaximumTime: `${exactly((Math.acos(RATIO) / Math.sqrt(1 - RATIO ** 2) / (2 * Math.PI)) * T0)} ± 0.005 s`,
};

const taps = (reading: (impulse: number) => number, unit = 'mN·s', factor = 1e3) =>
  sheet('taps', [['tapImpulse', unit], ['rest', 'mm'], ['firstSwing', 'mm']], TAPS.map((i) => [exactly(i * factor), 100, exactly(100 + reading(i) * 1e3)]), { kindOfAll: 'tap' });

const RIGHT: Session = withSheets(sessionOf({ choices: { form: 'stripWithPlate', dampingWay: 'ratio', readingWay: 'rulerAtTip' }, entries: ENTRIES }), taps(tipOf));

const agreementOf = (session: Session): Agreement => {
  const { agreement, problems } = reduce(session, null);
  if (!agreement) throw new Error(problems.map((p) => p.code).join(' '));
  return agreement;
};

it('a bench that agrees with itself has no slip', () => {
  const { checks, off, slips } = agreementOf(RIGHT);
  expect(checks.map(({ id }) => id)).toEqual(['period', 'stiffness', 'maximumTime', 'taps']);
  for (const { relative } of checks) expect(Math.abs(relative.value)).toBeLessThan(2e-3);
  expect(off).toEqual([]);
  expect(slips).toEqual([]);
});

/** The slip planted, the entry or choice it befell, and its name. */
const PLANTED: readonly (readonly [what: string, id: SlipId, session: Session])[] = [
  ['the strip’s length in cm, written as mm', 'lengthUnit', withEntry(RIGHT, 'stripLength', '40.0 ± 0.3 mm')],
  ['the plate’s distance in m, written as mm', 'lengthUnit', withEntry(RIGHT, 'plateDistance', '0.38 mm')],
  ['the reading radius in cm, written as mm', 'lengthUnit', withEntry(RIGHT, 'readingRadius', '40.20 ± 0.03 mm')],
  ['the plate’s mass in mg, written as g', 'massUnit', withEntry(RIGHT, 'plateMass', '6200 g')],
  ['the strip’s mass in g, written as kg', 'massUnit', withEntry(RIGHT, 'stripMass', '18.40 kg')],
  ['twice the lever arm of the tap', 'diameterForRadius', withEntry(RIGHT, 'tapLeverArm', '660 ± 1 mm')],
  ['half the reading radius', 'radiusForDiameter', withEntry(RIGHT, 'readingRadius', '201.0 ± 0.2 mm')],
  ['the tap’s lever arm taken to the tip', 'tipForArm', withEntry(withEntry(RIGHT, 'leverArm', '330.0 ± 0.5 mm'), 'tapLeverArm', '402.0 ± 0.3 mm')],
  ['half the period', 'halfPeriod', withEntry(RIGHT, 'period', `${exactly(T0 / 2)} ± 0.001 s`)],
  ['the time of twenty swings as one', 'manySwings', withEntry(RIGHT, 'period', `${exactly(20 * T0)} ± 0.02 s`)],
  ['taps in µN·s, written as mN·s', 'impulseUnit', withSheets({ ...RIGHT, sheets: [] }, taps(tipOf, 'mN·s', 1e6))],
  ['stiffness in N·m, written as mN·m', 'stiffnessUnit', withEntry(RIGHT, 'staticStiffness', `${exactly(KAPPA)} mN·m/rad`)],
  ['readings from side to side, read as from rest', 'sideToSide', withSheets({ ...RIGHT, sheets: [] }, sheet('taps', [['tapImpulse', 'mN·s'], ['rest', 'mm'], ['firstSwing', 'mm']], TAPS.map((i) => [exactly(i * 1e3), 0, exactly(tipOf(i) * (1 + Math.exp((-Math.PI * RATIO) / Math.sqrt(1 - RATIO ** 2))) * 1e3)]), { kindOfAll: 'tap' }))],
];

describe('planted in turn and found', () => {
  it.each(PLANTED)('%s', (_, id, session) => {
    const { off, slips } = agreementOf(session);
    expect(off).not.toEqual([]);
    expect(slips.map((slip) => slip.id)).toContain(id);
    // Pressed, it reconciles the bench.
    const mended = editOf(slips.find((slip) => slip.id === id)!.edit)(session);
    expect(agreementOf(mended).off).toEqual([]);
  });

  it('the doubled angle of a laser beam, forgotten', () => {
    const laser = withSheets({ ...withChoices(withEntry(RIGHT, 'screenDistance', '600 ± 1 mm'), { readingWay: 'laserSpot' }), sheets: [] }, taps(spotOf));
    const { slips } = agreementOf(laser);
    expect(slips.map(({ id }) => id)).toContain('beamAngle');
    expect(agreementOf(withEntry(laser, 'screenDistance', '1200 ± 2 mm')).off).toEqual([]);
  });

  it('angles in degrees, read as radians', () => {
    const radians = TAPS.map((i) => 2 * Math.asin((i * TAP_ARM) / K / D / 2));
    const angles = withSheets({ ...withChoices(RIGHT, { readingWay: 'angle' }), sheets: [] }, sheet('taps', [['tapImpulse', 'mN·s'], ['rest', '°'], ['firstSwing', '°']], TAPS.map((i, n) => [exactly(i * 1e3), 0, exactly(radians[n]!)]), { kindOfAll: 'tap' }));
    const { slips } = agreementOf(withEntry(angles, 'division', entry('0.0001 rad')));
    expect(slips.map(({ id }) => id)).toContain('degreesForRadians');
  });

  it('half cycles counted as cycles in the log decrement of a heavily damped swing', () => {
    const zeta = 0.2;
    const delta = (2 * Math.PI * zeta) / Math.sqrt(1 - zeta ** 2);
    const heavy = Math.exp((zeta * Math.acos(zeta)) / Math.sqrt(1 - zeta ** 2));
    const reading = (impulse: number): number => RADIUS * Math.sin(2 * Math.asin((impulse * TAP_ARM) / K / heavy / 2));
    const { dampingRatio: _ratio, firstMaximumTime: _time, period: _period, ...entries } = ENTRIES;
    const session = withSheets(sessionOf({ choices: { form: 'stripWithPlate', dampingWay: 'decrement', readingWay: 'rulerAtTip' }, entries: { ...entries, logDecrement: `${exactly(delta / 2)} ± 0.01` } }), taps(reading));
    expect(agreementOf(session).slips.map(({ id }) => id)).toContain('halfCycles');
  });
});

describe('what no single slip explains', () => {
  it('is said so: two slips at once', () => {
    const two = withEntry(withEntry(RIGHT, 'stripLength', '40.0 mm'), 'plateMass', '9.9 g');
    const { off, slips } = agreementOf(two);
    expect(off).not.toEqual([]);
    expect(slips).toEqual([]);
    expect(reduce(two, null).problems.map((p) => p.code)).toContain('bench-disagrees');
  });

  it('a hammer that is 8 % off is no slip of the pen', () => {
    const off = withSheets({ ...RIGHT, sheets: [] }, taps((i) => tipOf(i * 1.08)));
    expect(agreementOf(off).off).toEqual(['taps']);
    expect(agreementOf(off).slips).toEqual([]);
  });
});

it('of two slips that the numbers do not tell apart, both are named', () => {
  // Taps alone: their lever arm doubled and their impulses’ … no; the reading radius halved and the arm doubled do the same.
  const { period: _period, staticStiffness: _stiffness, firstMaximumTime: _time, ...entries } = ENTRIES;
  const session = withSheets(sessionOf({ choices: { form: 'stripWithPlate', dampingWay: 'ratio', readingWay: 'rulerAtTip' }, entries: { ...entries, tapLeverArm: '660 ± 1 mm' } }), taps(tipOf));
  const { slips } = agreementOf(session);
  expect(slips.length).toBeGreaterThan(1);
  const told = reduce(session, null).problems.find((p) => p.code === 'bench-disagrees');
  expect(told!.facts['slips']).toBe(slips.length);
});

it('the difference keeps what both sides share: by route A the period is in both', () => {
  const check = agreementOf(withChoices(RIGHT, { route: 'massesAndPeriod' })).checks.find(({ id }) => id === 'period')!;
  // Predicted by masses alone: u of the ratio is that of the timed period and of the lengths, not twice the period’s.
  const uT = 0.001 / T0;
  expect(check.relative.u).toBeGreaterThan(uT * 0.9);
  expect(check.relative.u).toBeLessThan(uT * 2);
});
