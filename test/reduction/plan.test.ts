/** What a guessed impulse bit would show, and that the road takes it back from there. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { filmMass, readingOfClampedFilm, stiffnessNumber } from '../../src/pendulum/filmStrip.ts';
import { reduce } from '../../src/reduction/reduce.ts';
import type { Plan } from '../../src/reduction/plan.ts';
import type { EntryName } from '../../src/session/entries.ts';
import type { Choices, Entry, Session } from '../../src/session/session.ts';
import { demoLike } from '../fixtures/demoLike.ts';
import { exactly, sessionOf, withEntry, type PartTexts, type Row } from '../fixtures/session.ts';
import { Draws } from './simulated.ts';

type Texts = Readonly<Partial<Record<EntryName, string | Entry>>>;

/** Relative: the root of the road's own equation, with the digits that a reading keeps. */
const TOLERANCE = 1e-8;
const SI_UNIT = { length: 'm', angle: 'rad', pixel: 'px', count: 'counts' } as const;

const FORMS: Readonly<Record<string, { readonly choices: Partial<Choices>; readonly entries: Texts; readonly parts?: readonly PartTexts[] }>> = {
  'point bob': { choices: { form: 'pointBob' }, entries: { bobMass: '36.7 g', bobDistance: '250 mm' } },
  'strip on a flexure': { choices: { form: 'uniformStrip' }, entries: { stripMass: '12 g', stripLength: '300 mm', flexureStiffness: '5 mN·m/rad' } },
  'strip with a plate': { choices: { form: 'stripWithPlate' }, entries: { stripMass: '2 g', stripLength: '300 mm', plateMass: '8 g', plateDistance: '290 mm' } },
  'body of parts by route A': { choices: { form: 'bodyOfParts', route: 'massesAndPeriod' }, entries: { period: '1.1 s' }, parts: [{ mass: '20 g', distance: '200 mm', ownInertia: '1e5 g·mm²' }] },
  'torsion stand': { choices: { form: 'bodyOfParts', restoring: 'flexureAlone' }, entries: { flexureStiffness: '40 mN·m/rad' }, parts: [{ mass: '50 g', distance: '150 mm' }] },
  'known by period and stiffness': { choices: { form: 'periodAndStiffness' }, entries: { period: '1.2 s', staticStiffness: '54 mN·m/rad' } },
};

const READINGS: Readonly<Record<string, { readonly choices: Partial<Choices>; readonly entries: Texts }>> = {
  'ruler at the tip': { choices: { readingWay: 'rulerAtTip' }, entries: { readingRadius: '310 mm', scaleFactor: '1.01' } },
  'ruler under a line, backward': { choices: { readingWay: 'rulerUnderLine', scaleRunsBackward: true }, entries: { rulerHeight: '280 mm', parallaxGap: '5 mm', cameraDistance: '500 mm' } },
  'arc ruler': { choices: { readingWay: 'arcRuler' }, entries: { readingRadius: '310 mm' } },
  chord: { choices: { readingWay: 'chord' }, entries: { readingRadius: '310 mm' } },
  rise: { choices: { readingWay: 'rise' }, entries: { readingRadius: '310 mm' } },
  'laser, tilted screen, mirror off the pivot': { choices: { readingWay: 'laserSpot' }, entries: { screenDistance: '1 m', screenTilt: '12°', beamIncidence: '20°', mirrorRadius: '60 mm' } },
  'laser, curved screen': { choices: { readingWay: 'laserSpot', screenShape: 'curved' }, entries: { screenDistance: '1.3 m' } },
  camera: { choices: { readingWay: 'cameraMarker' }, entries: { pixelScale: '8.2 px/mm', readingRadius: '250 mm' } },
  'sensor on a face': { choices: { readingWay: 'sensorOnFace' }, entries: { sensorHeight: '200 mm', faceOffset: '4 mm' } },
  encoder: { choices: { readingWay: 'encoder' }, entries: { countsPerTurn: '20000 counts' } },
  'angle, side to side': { choices: { readingWay: 'angle', swingMeasured: 'sideToSide' }, entries: {} },
  'ruler, side to side': { choices: { readingWay: 'rulerAtTip', swingMeasured: 'sideToSide' }, entries: { readingRadius: '310 mm' } },
};

const DAMPING: Readonly<Record<string, { readonly choices: Partial<Choices>; readonly entries: Texts }>> = {
  none: { choices: { dampingWay: 'none' }, entries: {} },
  viscous: { choices: { dampingWay: 'ratio' }, entries: { dampingRatio: '0.03' } },
  heavy: { choices: { dampingWay: 'decrement' }, entries: { logDecrement: '1.1' } },
  quadratic: { choices: { dampingWay: 'quadratic' }, entries: { quadraticDamping: '0.4' } },
  friction: { choices: { dampingWay: 'friction' }, entries: { frictionAngle: '0.4 mrad' } },
};

const EXTRAS: Readonly<Record<string, { readonly choices: Partial<Choices>; readonly entries: Texts }>> = {
  nothing: { choices: {}, entries: {} },
  'pulse, tilt, exposure': { choices: {}, entries: { pulseDuration: '40 ms', tiltInPlane: '3°', exitAhead: '50 mm', exposure: '8 ms', frameInterval: '16 ms' } },
  target: { choices: { plume: 'caught' }, entries: { momentumFactor: '1.4', captureFraction: '0.9' } },
  'delivered to the target': { choices: { plume: 'caught', reported: 'delivered' }, entries: { momentumFactor: '1.4' } },
  'mass on the taps': { choices: { calibrationMassHung: 'taps' }, entries: { calibrationMass: '4 g', calibrationMassDistance: '220 mm', calibrationMassInertia: '40 g·mm²' } },
};

const BENCH: Texts = { leverArm: '280 ± 1 mm', tapLeverArm: '240 mm', gravity: '9.81 ± 0.001 m/s²', hammerFactor: '1.02 ± 1 %' };
const GUESS = 300e-6;

interface Rig {
  readonly form: string;
  readonly reading: string;
  readonly damping: string;
  readonly extra: string;
  readonly guess?: string;
  readonly entries?: Texts;
  readonly rows?: readonly Row[];
}

function rig({ form, reading, damping, extra, guess = `${exactly(GUESS)} N·s`, entries = {}, rows }: Rig): Session {
  const chosen = [FORMS[form]!, READINGS[reading]!, DAMPING[damping]!, EXTRAS[extra]!];
  const choices = Object.assign({}, ...chosen.map((one) => one.choices)) as Partial<Choices>;
  const unit = SI_UNIT[({ encoder: 'count', camera: 'pixel', 'angle, side to side': 'angle' } as const)[reading] ?? 'length'];
  return sessionOf({
    choices, readingUnit: unit, impulseUnit: 'N·s', ...(rows ? { rows } : {}),
    ...(FORMS[form]!.parts ? { parts: FORMS[form]!.parts } : {}),
    entries: Object.assign({}, BENCH, ...chosen.map((one) => one.entries), { guessedImpulse: guess }, entries) as Texts,
  });
}

function planOf(session: Session): Plan {
  const { plan } = reduce(session, null);
  if (!plan) throw new Error('no plan');
  return plan;
}

const some = (of: object): fc.Arbitrary<string> => fc.constantFrom(...Object.keys(of));
const rigs = fc.record({ form: some(FORMS), reading: some(READINGS), damping: some(DAMPING), extra: some(EXTRAS) });

describe('a planned throw', () => {
  it('fed to the road gives the guessed impulse bit back, for every form, reading, damping and correction', () => {
    fc.assert(fc.property(rigs, fc.double({ min: 0.03, max: 1.2, noNaN: true }), (which, times) => {
      const guess = times * GUESS;
      const session = rig({ ...which, guess: `${exactly(guess)} N·s` });
      const { expected, taps } = planOf(session);
      fc.pre(expected !== null);
      const sign = session.choices.scaleRunsBackward ? -1 : 1;
      const rows = [{ rest: 0, first: sign * expected.reading.value }, ...(taps ?? []).map(({ impulse, reading }): Row => ({ kind: 'tap', rest: 0, first: sign * reading, tapImpulse: impulse }))];
      const r = reduce(rig({ ...which, guess: `${exactly(guess)} N·s`, rows }), null);
      expect(Math.abs(r.records[0]!.full!.value / guess - 1)).toBeLessThan(TOLERANCE);
      expect(Math.abs(r.records[0]!.angle!.value / expected.angle - 1)).toBeLessThan(TOLERANCE);
      // What each tap states is what the road makes of its throw, and the taps give the geometry’s factor.
      for (const { byGeometry, knownImpulse } of r.records.slice(1)) expect(Math.abs(byGeometry!.value / knownImpulse!.value - 1)).toBeLessThan(TOLERANCE);
      expect(taps).toHaveLength(5);
      const [low, high] = r.ranges.taps!;
      const [shot] = r.ranges.shots!;
      expect(low).toBeLessThan(shot);
      expect(high).toBeGreaterThan(shot);
      expect(r.problems.map(({ code }) => code)).not.toContain('shots-beyond-taps');
    }), { numRuns: 150 });
  }, 60_000);

  it('of the rig of methods 1.18 is 1.059 mrad for 41 µN·s', () => {
    const plan = planOf(sessionOf({
      choices: { form: 'bodyOfParts', readingWay: 'angle', dampingWay: 'none' }, entries: { leverArm: '300 mm', gravity: '9.80665 m/s²', guessedImpulse: '41 µN·s' },
      parts: [{ mass: '36.7 g', distance: '150 mm', ownInertia: '1674250 g·mm²' }],
    }));
    expect(plan.expected!.reading.value * 1e3).toBeCloseTo(1.059, 3);
    expect([plan.dimension, plan.unit, plan.calibration]).toEqual(['angle', 'mrad', 'geometry']);
  });

  it('is as uncertain as the guess and the bench make it', () => {
    const which = { form: 'point bob', reading: 'arc ruler', damping: 'none', extra: 'nothing' };
    const u = (entries: Texts): number => {
      const { reading } = planOf(rig({ ...which, entries: { gravity: '9.81 m/s²', leverArm: '280 mm', ...entries } })).expected!;
      return reading.u / reading.value;
    };
    // Small swing: the throw goes with the impulse and the lever arm.
    expect(u({ guessedImpulse: '300 ± 30 µN·s' })).toBeCloseTo(0.1, 3);
    expect(u({ leverArm: '280 ± 14 mm' })).toBeCloseTo(0.05, 3);
    expect(u({})).toBe(0);
  });

  it('goes by the taps where there are some', () => {
    const which = { form: 'point bob', reading: 'arc ruler', damping: 'none', extra: 'nothing' };
    const byGeometry = planOf(rig(which)).expected!.reading.value;
    const taps = planOf(rig(which)).taps!;
    // The hammer tells only 0.8 of what it gives.
    const rows = taps.map(({ impulse, reading }): Row => ({ kind: 'tap', rest: 0, first: reading, tapImpulse: 0.8 * impulse }));
    const session = rig({ ...which, rows });
    const plan = planOf({ ...session, choices: { ...session.choices, calibration: 'taps' } });
    expect(plan.calibration).toBe('taps');
    expect(plan.expected!.reading.value / byGeometry).toBeCloseTo(1 / 0.8, 4);
  });

  it('is lost where the pendulum still swings more before the shot', () => {
    const which = { form: 'point bob', reading: 'arc ruler', damping: 'none', extra: 'nothing' };
    const throwOf = planOf(rig(which)).expected!.reading.value;
    expect(planOf(rig({ ...which, entries: { backgroundSwing: `${exactly(0.2 * throwOf)} m` } })).expected!.reading.value / throwOf).toBeCloseTo(1.01, 3);
    expect(planOf(rig({ ...which, entries: { backgroundSwing: `${exactly(3 * throwOf)} m` } })).expected).toBeNull();
  });

  it('reaches no result of the run, and no budget', () => {
    const [without, with_] = [demoLike(), withEntry(withEntry(demoLike(), 'guessedImpulse', '1.2 ± 0.6 mN·s'), 'scaleReach', '150 ± 1 mm')].map((session) => reduce(session, null));
    expect(with_!.plan).not.toBeNull();
    expect(without!.plan).toBeNull();
    expect([with_!.run, with_!.records, with_!.problems]).toEqual([without!.run, without!.records, without!.problems]);
  });

  it('waits for the bench, and what is missing is said', () => {
    const r = reduce(sessionOf({ entries: { guessedImpulse: '40 µN·s', stripMass: '2 g' } }), null);
    expect(r.plan).toBeNull();
    expect(r.problems.filter(({ code }) => code === 'entry-missing').map(({ place }) => place.entry)).toEqual(expect.arrayContaining(['leverArm', 'readingRadius', 'stripLength']));
  });
});

describe('a hanging film', () => {
  const FILM = { thickness: 25e-6, width: 19e-3, length: 0.2, density: 1420, modulus: 2.5e9, gravity: 9.80665 } as const;
  const session = sessionOf({
    choices: { form: 'filmStrip', dampingWay: 'ratio' },
    entries: {
      filmThickness: '25 µm', filmWidth: '19 mm', filmLength: '200 mm', filmDensity: '1420 kg/m³', filmModulus: '2.5 GPa', zoneFrom: '160 mm', zoneTo: '200 mm', leverArm: '180 mm', readingRadius: '200 mm',
      gravity: '9.80665 m/s²', dampingRatio: '0.02', tapLeverArm: '180 mm', guessedImpulse: '4 µN·s', division: '0.5 mm',
    },
  });

  it('would move as its modes say, within what the swing’s arc adds', () => {
    const reading = readingOfClampedFilm({ stiffnessNumber: stiffnessNumber(FILM), dampingRatio: 0.02, zoneFrom: 0.8, zoneTo: 1, plateRatio: 0, readAt: 1, impulse: 4e-6, mass: filmMass(FILM), length: 0.2, gravity: 9.80665 });
    const { expected, fullScale, taps, calibrationMass } = planOf(session);
    expect(Math.abs(expected!.reading.value / reading - 1)).toBeLessThan(5e-3);
    expect(expected!.reading.u / expected!.reading.value).toBeGreaterThan(0.03);
    expect([fullScale!.end, fullScale!.angle]).toEqual(['smallSwings', (10 * Math.PI) / 180]);
    expect(taps).toHaveLength(5);
    expect(calibrationMass).toBeNull();
  });

  it('gives its guess back through the road', () => {
    const { expected } = planOf(session);
    const rows = [{ rest: 0, first: expected!.reading.value }];
    const r = reduce({ ...session, sheets: sessionOf({ rows, readingUnit: 'm' }).sheets }, null);
    expect(Math.abs(r.records[0]!.impulseBit!.value / 4e-6 - 1)).toBeLessThan(TOLERANCE);
  });
});

describe('the full scale', () => {
  const at = (reading: string, entries: Texts = {}): Plan => planOf(rig({ form: 'point bob', reading, damping: 'none', extra: 'nothing', entries }));
  // J = m L², κ = m g L: I = (2/r_t) √(J κ) sin(θ/2) (methods 1.1).
  const impulseAt = (theta: number): number => (2 * 0.0367 * 0.25 ** 1.5 * Math.sqrt(9.81) * Math.sin(theta / 2)) / 0.28;

  it.each([
    ['ruler at the tip', 'radius', Math.PI / 2], ['ruler under a line, backward', 'alongScale', Math.PI / 2], ['laser, tilted screen, mirror off the pivot', 'grazing', (Math.PI / 2 - (12 * Math.PI) / 180) / 2],
    ['chord', 'upright', 0.95 * Math.PI], ['encoder', 'upright', 0.95 * Math.PI], ['sensor on a face', 'alongScale', Math.PI / 2], ['angle, side to side', 'sides', 0.78],
  ] as const)('%s: ends by %s', (reading, end, angle) => {
    const found = at(reading).fullScale!;
    expect(found.end).toBe(end);
    expect(found.angle).toBeCloseTo(angle, 5);
    expect(found.impulse / impulseAt(angle)).toBeCloseTo(1, 5);
    expect(found.times).toBeCloseTo(found.impulse / GUESS, 12);
  });

  it('is the radius of the ruler, in what is read', () => expect(at('ruler at the tip').fullScale!.reading).toBeCloseTo(0.31 / 1.01, 9));

  it('is where the typed scale ends, and a throw beyond it is said to be', () => {
    const near = at('arc ruler', { scaleReach: '100 mm' });
    expect([near.fullScale!.end, near.expected!.beyondScale]).toEqual(['scale', false]);
    expect(near.fullScale!.reading).toBeCloseTo(0.1, 12);
    expect(near.fullScale!.impulse / impulseAt(0.1 / 0.31)).toBeCloseTo(1, 9);
    const beyond = at('arc ruler', { scaleReach: '1 mm' });
    expect([beyond.expected!.beyondScale, beyond.fullScale!.times < 1]).toEqual([true, true]);
    expect(at('arc ruler', { guessedImpulse: '1 N·s' }).expected).toBeNull();
  });

  it('holds the taps inside', () => {
    const { expected } = at('arc ruler');
    const reach = 1.2 * expected!.reading.value;
    const taps = at('arc ruler', { scaleReach: `${exactly(reach)} m` }).taps!;
    expect(taps.at(-1)!.reading).toBeCloseTo(0.95 * reach, 9);
    expect(taps[0]!.reading).toBeCloseTo(expected!.reading.value / 2, 9);
  });
});

describe('taps', () => {
  it('strike from half to one and a half of the throw at their own lever arm, harder by the calibration mass', () => {
    const which = { form: 'point bob', reading: 'arc ruler', damping: 'none' };
    const [bare, loaded] = ['nothing', 'mass on the taps'].map((extra) => planOf(rig({ ...which, extra })));
    expect(bare!.taps!.map(({ reading }) => reading / bare!.expected!.reading.value)).toEqual([0.5, 0.75, 1, 1.25, 1.5].map((part) => expect.closeTo(part, 9) as number));
    expect(bare!.taps![2]!.impulse / ((GUESS * 0.28) / 0.24 / 1.02)).toBeCloseTo(1, 9);
    const [J, kappa] = [0.0367 * 0.25 ** 2, 0.0367 * 9.81 * 0.25];
    const change = Math.sqrt(((J + 0.004 * 0.22 ** 2 + 40e-9) * (kappa + 0.004 * 9.81 * 0.22)) / (J * kappa));
    loaded!.taps!.forEach((tap, i) => expect(tap.impulse / bare!.taps![i]!.impulse / change).toBeCloseTo(1, 9));
  });

  it('are left out without their lever arm', () => {
    const { tapLeverArm: _left, ...entries } = rig({ form: 'point bob', reading: 'arc ruler', damping: 'none', extra: 'nothing' }).entries;
    expect(planOf({ ...rig({ form: 'point bob', reading: 'arc ruler', damping: 'none', extra: 'nothing' }), entries }).taps).toBeNull();
  });
});

describe('what the readings make of it', () => {
  const which = { form: 'point bob', reading: 'arc ruler', damping: 'viscous', extra: 'nothing' };

  it('is what the road says of such a shot', () => {
    const session = rig({ ...which, entries: { division: '0.5 mm', readingSpread: '0.15 mm', dampingRatio: '0.03 ± 0.002' } });
    const { reading, expected } = planOf(session);
    const r = reduce({ ...session, sheets: sessionOf({ rows: [{ rest: 0, first: expected!.reading.value }], readingUnit: 'm' }).sheets }, null);
    const bit = r.records[0]!.impulseBit!;
    expect(reading!.shotU / bit.u).toBeCloseTo(1, 6);
    expect((reading!.ofImpulse * GUESS) / r.records[0]!.ownU).toBeCloseTo(1, 6);
    // Two readings of 0.5 mm/√12 and 0.15 mm each.
    expect(reading!.u).toBeCloseTo(Math.SQRT2 * Math.hypot(0.5e-3 / Math.sqrt(12), 0.15e-3), 15);
    expect(reading!.ofThrow).toBeCloseTo(reading!.u / expected!.reading.value, 15);
    expect(reading!.share).toBeCloseTo((reading!.ofImpulse * GUESS / bit.u) ** 2, 6);
  });

  it('is left open where neither division nor eye is typed', () => {
    const { reading, least } = planOf(rig(which));
    expect([reading, least]).toEqual([null, null]);
  });

  it('from side to side is one reading', () => {
    const { reading } = planOf(rig({ ...which, reading: 'ruler, side to side', entries: { division: '0.5 mm' } }));
    expect(reading!.u).toBeCloseTo(0.5e-3 / Math.sqrt(12), 15);
  });
});

describe('the smallest impulse bit that can be seen', () => {
  const which = { form: 'point bob', reading: 'arc ruler', damping: 'viscous', extra: 'nothing' };
  const [division, eye] = [0.5e-3, 0.2e-3];
  const least = planOf(rig({ ...which, entries: { division: '0.5 mm', readingSpread: '0.2 mm' } })).least!;
  const draws = new Draws(20260101);
  const read = (x: number, u: number): number => Math.round((x + u * draws.normal()) / division) * division;
  /** Throws of one impulse as they would be written down, the rest anywhere on the ruler. */
  const written = (throwOf: number, n: number, u = eye): readonly Row[] => Array.from({ length: n }, () => {
    const rest = 0.1 + division * draws.uniform();
    return { kind: 'blank', rest: read(rest, u), first: read(rest + throwOf, u) };
  });

  it('by Currie’s factors (Anal. Chem. 40, 586, 1968, from memory) has s₀ as rounded blanks scatter through the road', () => {
    const n = 600;
    const { blanks } = reduce(rig({ ...which, rows: written(0, n), entries: { division: '0.5 mm', readingSpread: '0.2 mm' } }), null);
    // Of n draws a standard deviation is known to 1/√(2n); four of that.
    expect(Math.abs((1.645 * blanks!.scatter!) / least.decision.impulse - 1)).toBeLessThan(4 / Math.sqrt(2 * n));
    expect(least.detection.impulse / least.decision.impulse).toBeCloseTo(2, 5);
  });

  it('errs one time in twenty on either side', () => {
    // An eye of two divisions smooths the steps of the rounding; what is left of them moves the fraction by less than this.
    const [n, steps] = [40_000, 0.015];
    const coarse = 2 * division;
    const { decision, detection } = planOf(rig({ ...which, entries: { division: '0.5 mm', readingSpread: `${exactly(coarse)} m` } })).least!;
    const said = (throwOf: number): number => written(throwOf, n, coarse).filter(({ rest, first }) => Number(first) - Number(rest) > decision.reading).length / n;
    expect(Math.abs(said(0) - 0.05)).toBeLessThan(steps);
    expect(Math.abs(said(detection.reading) - 0.95)).toBeLessThan(steps);
  });

  it('grows by the swing before the shot and the friction of the pivot', () => {
    const with_ = (entries: Texts, damping = 'none'): number => planOf(rig({ ...which, damping, entries: { division: '0.5 mm', ...entries } })).least!.decision.reading;
    const s0 = (0.5e-3 * Math.SQRT2) / Math.sqrt(12);
    expect(with_({})).toBeCloseTo(1.645 * s0, 12);
    expect(with_({ backgroundSwing: '1 mm' })).toBeCloseTo(1.645 * Math.hypot(s0, 1e-3 / Math.SQRT2), 12);
    expect(with_({ frictionAngle: '3 mrad' }, 'friction')).toBeCloseTo(1.645 * Math.hypot(s0, (3e-3 * 0.31) / Math.sqrt(3)), 12);
  });

  it('tells whether the guess would be seen', () => {
    const seen = (times: number): string => planOf(rig({ ...which, guess: `${exactly(times * least.decision.impulse)} N·s`, entries: { division: '0.5 mm', readingSpread: '0.2 mm' } })).least!.guessSeen;
    expect([0.9, 1.5, 2.1].map(seen)).toEqual(['no', 'perhaps', 'surely']);
  });

  it('of a rise is far larger than of the ruler at its tip: a rise is poor at small swings', () => {
    const rise = planOf(rig({ ...which, reading: 'rise', entries: { division: '0.5 mm', readingSpread: '0.2 mm' } })).least!;
    expect(rise.decision.impulse).toBeGreaterThan(10 * least.decision.impulse);
  });
});

describe('the place of a calibration mass', () => {
  /** The rig of methods 1.8: J 2.5e-3 kg·m², κ 0.054 N·m/rad with g 9.80665; 20 g. */
  const rigOf = (entries: Texts = {}, choices: Partial<Choices> = {}): Session => sessionOf({
    choices: { form: 'periodAndStiffness', readingWay: 'angle', dampingWay: 'none', ...choices },
    entries: { period: '1.35192623 s', staticStiffness: '54 mN·m/rad', gravity: '9.80665 m/s²', leverArm: '300 mm', tapLeverArm: '600 mm', guessedImpulse: '41 µN·s', calibrationMass: '20 g', ...entries },
  });

  it('is away from 0.45401 m on either side (methods 1.8)', () => {
    const { unchangedAt, places, mass, massTaken, length, timingTaken, period } = planOf(rigOf()).calibrationMass!;
    expect(unchangedAt).toBeCloseTo(0.45401, 5);
    expect([mass, massTaken, length, timingTaken]).toEqual([0.02, false, 0.6, true]);
    expect(period.value).toBeCloseTo(1.35192623, 8);
    expect(places).toHaveLength(2);
    const [above, below] = places;
    expect(above!.distance).toBeLessThan(0.3);
    expect(below!.distance).toBeCloseTo(0.6, 12);
    expect(above!.period.value).toBeLessThan(period.value);
    expect(below!.period.value).toBeGreaterThan(period.value);
    // At 0.15 m the sensitivities are 10 and −6.5 there; the best place is no worse.
    expect(Math.hypot(above!.toWith, above!.toWithout)).toBeLessThanOrEqual(Math.hypot(10.1, 6.5));
    expect(above!.inertiaTo).toBeCloseTo(1e-3 * Math.hypot(above!.toWith, above!.toWithout), 12);
  });

  it('tells J as well as the timing of the period is typed', () => {
    const { timing, timingTaken } = planOf(rigOf({ period: '1.35192623 ± 0.0027 s' })).calibrationMass!;
    expect(timing).toBeCloseTo(0.0027 / 1.35192623, 12);
    expect(timingTaken).toBe(false);
  });

  it('is one only where the pendulum ends at the place of no change, as a point bob does', () => {
    const { unchangedAt, places, massTaken, mass } = planOf(rig({ form: 'point bob', reading: 'encoder', damping: 'none', extra: 'nothing', entries: { leverArm: '250 mm' } })).calibrationMass!;
    expect(unchangedAt).toBeCloseTo(0.25, 12);
    expect(places).toHaveLength(1);
    // J/L² is the bob itself, 36.7 g.
    expect([massTaken, mass]).toEqual([true, 0.02]);
  });

  it('is the end of a torsion stand, where no place is without effect', () => {
    const { unchangedAt, places, length } = planOf(rig({ form: 'torsion stand', reading: 'encoder', damping: 'none', extra: 'nothing' })).calibrationMass!;
    expect(unchangedAt).toBeNull();
    expect(places.map(({ distance }) => distance)).toEqual([length]);
  });

  it.each(['taps', 'shots', 'always'] as const)('is reckoned from the pendulum without it, hung %s', (hung) => {
    const [J, kappa] = [2.5e-3, 0.054];
    const hangs = hung === 'always' || hung === 'shots';
    const [loadedJ, loadedKappa] = [J + 0.02 * 0.15 ** 2, kappa + 0.02 * 9.80665 * 0.15];
    const session = rigOf({
      calibrationMassDistance: '150 mm',
      period: `${exactly(2 * Math.PI * Math.sqrt(hangs ? loadedJ / loadedKappa : J / kappa))} s`, staticStiffness: `${exactly(hangs ? loadedKappa : kappa)} N·m/rad`,
    }, { calibrationMassHung: hung });
    expect(planOf(session).calibrationMass!.unchangedAt).toBeCloseTo(0.45401, 5);
  });
});

it('a plan survives the trip between threads', () => {
  const plan = planOf(rig({ form: 'point bob', reading: 'camera', damping: 'heavy', extra: 'target' }));
  expect(structuredClone(plan)).toEqual(plan);
  expect([plan.dimension, plan.unit]).toEqual(['pixel', 'px']);
});

it('for a picture of pivot and marker knows what a pixel is worth once the marker’s radius is typed, and claims nothing before', () => {
  const entries = { bobMass: '50 g', bobDistance: '500 mm', leverArm: '500 mm', tapLeverArm: '500 mm', gravity: '9.80665 m/s²', pivotAcross: '500 px', pivotDown: '100 px', division: '1 px', guessedImpulse: '1 mN·s' };
  const of = (more: Readonly<Record<string, string>>): Plan => planOf(sessionOf({ choices: { form: 'pointBob', readingWay: 'cameraPivotMarker', dampingWay: 'none' }, entries: { ...entries, ...more } }));
  expect(of({}).reading).toBeNull();
  expect(of({}).least).toBeNull();
  const plan = of({ markerRadius: '800 px' });
  // One reading to 1 px at 800 px: 1/√12/800 rad; a throw has two.
  expect(plan.reading!.u).toBeCloseTo((Math.SQRT2 * 1) / Math.sqrt(12) / 800, 9);
  expect(plan.least!.detection.impulse).toBeGreaterThan(0);
});
