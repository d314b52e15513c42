/** What a deflection is worth, known in several ways: each gives the calibration factor of the pendulum that made the readings. */
import { describe, expect, it } from 'vitest';
import { reduce } from '../../src/reduction/reduce.ts';
import type { EvidenceId } from '../../src/reduction/evidenceResults.ts';
import type { Reduction } from '../../src/reduction/results.ts';
import { entry, type Entry, type Session } from '../../src/session/session.ts';
import type { EntryName } from '../../src/session/entries.ts';
import { exactly, sessionOf, withChoices, withEntry } from '../fixtures/session.ts';
import { sheet, withSheets } from '../fixtures/sheets.ts';
import { Draws } from './simulated.ts';

/** The rig of methods 1.8: J 2.5e-3 kg·m², κ 0.054 N·m/rad; g 9.80665. */
const [J, KAPPA, G] = [2.5e-3, 0.054, 9.80665];
const D = 0.15;
const M = KAPPA / (G * D);
const [ARM, RADIUS, TAP_ARM, PULL_ARM] = [0.3, 0.4, 0.28, 0.25];
const K = Math.sqrt(J * KAPPA);

const ENTRIES: Partial<Record<EntryName, string | Entry>> = {
  leverArm: '0.3 m ± 0.5 mm', readingRadius: '0.4 m ± 0.4 mm', tapLeverArm: '0.28 m ± 0.5 mm', pullArm: '0.25 m ± 0.3 mm', gravity: '9.80665 m/s² ± 0.0005', hammerFactor: '1 ± 2 %', tapSpread: '1 %', timingSpread: '0.02 s', division: '0.01 mm',
};

/** Rest 0, tip over a flat ruler, undamped: φ = 2 sin(θ/2), x = R sin θ. */
const readingOf = (launch: number): number => RADIUS * 1e3 * Math.sin(2 * Math.asin(launch / 2));
const shotRow = (impulse: number, factor = K): number => readingOf((impulse * ARM) / factor);
const SHOTS = [1.1e-3, 1.2e-3, 1.15e-3, 1.18e-3, 1.13e-3].map((impulse) => [0, exactly(shotRow(impulse))] as const);

function bench(massFactor = 1, entries: Partial<Record<EntryName, string | Entry>> = {}): Session {
  const session = sessionOf({
    choices: { form: 'bodyOfParts', readingWay: 'rulerAtTip', dampingWay: 'none' },
    entries: { ...ENTRIES, ...entries },
    parts: [{ mass: `${exactly(M * massFactor)} kg ± 0.2 %`, distance: '0.15 m ± 0.3 mm', ownInertia: `${exactly((J - M * D * D) * massFactor)} kg·m² ± 1 %` }],
  });
  return withSheets(session, sheet('shots', [['rest', 'mm'], ['firstSwing', 'mm']], SHOTS, { kindOfAll: 'shot' }));
}

const row = (r: Reduction, id: EvidenceId): NonNullable<Reduction['evidence'][number]> => {
  const found = r.evidence.find((one) => one.id === id);
  if (!found) throw new Error(`no evidence ${id}: ${r.problems.map((p) => p.code).join(' ')}`);
  return found;
};
const codes = (r: Reduction): readonly string[] => r.problems.map((p) => p.code);

const period = (inertia: number, stiffness: number): number => 2 * Math.PI * Math.sqrt(inertia / stiffness);
const timed = (m: number, r: number): number => period(J + m * r * r, KAPPA + m * G * r);

const timings = (...rows: readonly (readonly [time: number, cycles: number, mass: number | '', radius: number | ''])[]) =>
  sheet('timings', [['swingsTime', 's'], ['cycles', 'counts'], ['massHung', 'g'], ['massHungAt', 'mm']], rows.map(([t, n, m, r]) => [exactly(t * n), n, m, r]));

describe('masses hung and timed', () => {
  it('give J and κ with gravity in: 20 g at 0.35 m, 1.35192623 s to 1.26227738 s (methods 1.8, derived there)', () => {
    expect(timed(0, 0)).toBeCloseTo(1.35192623, 8);
    expect(timed(0.02, 0.35)).toBeCloseTo(1.26227738, 8);
    const r = reduce(withSheets(bench(1.1), timings([1.35192623, 20, '', ''], [1.26227738, 20, 20, 350])), null);
    expect(r.addedMasses!.inertia!.value).toBeCloseTo(2.5e-3, 8);
    expect(r.addedMasses!.stiffness!.value).toBeCloseTo(0.054, 6);
    // Not the 10 % that the masses are off by.
    expect(row(r, 'addedMasses').factor.value / K).toBeCloseTo(1, 5);
    expect(row(r, 'masses').factor.value / K).toBeCloseTo(1.1, 5);
  });

  it('as several masses are one fit, and its u follows the timings as the sensitivities 31 and −14 say', () => {
    const two = reduce(withSheets(bench(), timings([timed(0, 0), 100, '', ''], [timed(0.02, 0.35), 100, 20, 350])), null);
    // u(T) = √2 · 0.02 s/100; J’s own share of it from methods 1.8: 30.6 and −13.6 (there 31 and −14).
    const uT = (Math.SQRT2 * 0.02) / 100;
    const expected = Math.hypot((30.6 * uT) / timed(0.02, 0.35), (13.6 * uT) / timed(0, 0));
    expect(two.addedMasses!.inertia!.u / 2.5e-3 / expected).toBeCloseTo(1, 1);
    const several = reduce(withSheets(bench(), timings([timed(0, 0), 100, '', ''], [timed(0.02, 0.35), 100, 20, 350], [timed(0.02, 0.15), 100, 20, 150], [timed(0.03, 0.1), 100, 30, 100])), null);
    expect(several.addedMasses!.rows).toHaveLength(4);
    expect(several.addedMasses!.inertia!.value / J).toBeCloseTo(1, 6);
    expect(several.addedMasses!.inertia!.u).toBeLessThan(two.addedMasses!.inertia!.u);
  });

  it('near the place of no change say that they tell little, and where to hang the mass instead', () => {
    const r = reduce(withSheets(bench(), timings([timed(0, 0), 20, '', ''], [timed(0.02, 0.46), 20, 20, 460])), null);
    expect(codes(r).some((code) => code === 'masses-tell-little' || code === 'masses-inertia-negative')).toBe(true);
    const far = reduce(withSheets(bench(), timings([timed(0, 0), 100, '', ''], [timed(0.02, 0.35), 100, 20, 350])), null);
    expect(far.addedMasses!.sameRadius).toBeCloseTo(0.45401, 4);
    expect(far.addedMasses!.better!.radius).toBeLessThan(0.3);
  });

  it('with times that no pendulum has give a sentence, and the shots go on', () => {
    const r = reduce(withSheets(bench(), timings([timed(0, 0), 20, '', ''], [2.4, 20, 20, 350])), null);
    expect(codes(r)).toContain('masses-inertia-negative');
    expect(r.run!.n).toBe(5);
  });

  it('count where they are chosen', () => {
    const session = withSheets(bench(1.1), timings([timed(0, 0), 100, '', ''], [timed(0.02, 0.15), 100, 20, 150]));
    const r = reduce(withChoices(session, { calibration: 'addedMasses' }), null);
    expect(r.records[0]!.impulseBit!.value / 1.1e-3).toBeCloseTo(1, 5);
    expect(row(r, 'addedMasses').chosen).toBe(true);
    // What the other ways would make of the same shots stands beside it.
    expect(row(r, 'masses').mean!.value / r.run!.mean.value).toBeCloseTo(1.1, 5);
  });
});

describe('known weights', () => {
  /** Pull over a pulley: tan θ = F r_w/κ (gravity alone, methods 1.9); found here as the least of κ(1 − cos θ) − F r_w sin θ. */
  const equilibrium = (force: number): number => {
    let [low, high] = [0, 1.4];
    for (let i = 0; i < 200; i++) {
      const [a, b] = [low + (high - low) / 3, high - (high - low) / 3];
      const energy = (t: number): number => KAPPA * (1 - Math.cos(t)) - force * PULL_ARM * Math.sin(t);
      if (energy(a) < energy(b)) high = b;
      else low = a;
    }
    return (low + high) / 2;
  };
  const reading = (milligrams: number, lag = 0): string => exactly(12 + RADIUS * 1e3 * Math.sin(equilibrium(milligrams * 1e-6 * G) + lag));
  const weights = (lag = 0) => sheet('weights', [['weight', 'mg'], ['loading', 'mm'], ['unloading', 'mm']], [0, 500, 1000, 2000, 4000].map((w) => [w, reading(w, -lag), reading(w, lag)]));
  const LARGEST = equilibrium(4000e-6 * G);

  it('give κ as the slope of moment against angle, also at large angles, and K with the period', () => {
    expect(LARGEST).toBeGreaterThan(0.15);
    const r = reduce(withEntry(withSheets(bench(1.1), weights()), 'period', `${exactly(timed(0, 0))} s ± 1 ms`), null);
    expect(r.weights!.stiffness.value / KAPPA).toBeCloseTo(1, 5);
    expect(row(r, 'weights').factor.value / K).toBeCloseTo(1, 5);
    expect(r.weights!.hysteresis).toBeCloseTo(0, 6);
  });

  it('part by their hysteresis between loading and unloading, which is common to all', () => {
    const free = reduce(withSheets(bench(), weights()), null).weights!;
    const lagging = reduce(withSheets(bench(), weights(0.002)), null).weights!;
    expect(lagging.hysteresis).toBeCloseTo(0.002, 4);
    // Limits of h over the largest angle, rectangular.
    const added = (0.002 / LARGEST / Math.sqrt(3)) * KAPPA;
    expect(Math.hypot(free.stiffness.u, added)).toBeLessThan(lagging.stiffness.u * 1.02);
  });

  it('of one size, or that pull the wrong way, give a sentence', () => {
    const one = sheet('weights', [['weight', 'mg'], ['loading', 'mm']], [[500, 13], [500, 13.1]]);
    expect(codes(reduce(withSheets(bench(), one), null))).toContain('weights-too-few');
    const wrong = sheet('weights', [['weight', 'mg'], ['loading', 'mm']], [[0, 15], [500, 13], [1000, 11]]);
    expect(codes(reduce(withSheets(bench(), wrong), null))).toContain('weights-wrong-way');
  });

  it('are what the body known by period and stiffness takes where no stiffness is typed', () => {
    const r = reduce(withChoices(withEntry(withSheets(bench(), weights()), 'period', `${exactly(timed(0, 0))} s`), { form: 'periodAndStiffness' }), null);
    expect(r.configurations.shots!.momentOfInertia.value / J).toBeCloseTo(1, 4);
    expect(r.records[0]!.impulseBit!.value / 1.1e-3).toBeCloseTo(1, 4);
  });
});

const tapSheet = (id: string, impulses: readonly number[], factor = K, more = {}) =>
  sheet(id, [['tapImpulse', 'mN·s'], ['rest', 'mm'], ['firstSwing', 'mm']], impulses.map((i) => [exactly(i * 1e3), 0, exactly(readingOf((i * TAP_ARM) / factor))]), { kindOfAll: 'tap', ...more });
const SIZES = [0.8e-3, 1e-3, 1.2e-3, 1.4e-3];

describe('taps before and after the firings', () => {
  const session = withSheets(bench(), tapSheet('before', SIZES, K * 0.98, { taken: 'before' }), tapSheet('after', SIZES, K * 1.02, { taken: 'after' }));
  const by = (tapDrift: 'together' | 'mean' | 'interpolated'): Reduction => reduce(withChoices(session, { calibration: 'taps', tapDrift }), null);

  it('stand apart as groups, and their difference is tested without what both share', () => {
    const { tapStudy } = by('together');
    expect(tapStudy!.groups.map(({ where }) => where)).toEqual(['before', 'after']);
    expect(tapStudy!.drift!.relative.value).toBeCloseTo(1.02 / 0.98 - 1, 4);
    // The hammer’s 2 % is common; each group’s own 1 % over √4 remains, twice.
    expect(tapStudy!.drift!.relative.u).toBeCloseTo(Math.SQRT2 * 0.005, 3);
    expect(codes(by('together'))).toContain('taps-drifted');
  });

  it('as their mean carry half their difference as rectangular limits', () => {
    const [together, mean] = [by('together'), by('mean')];
    const k = (r: Reduction): number => r.chosenFactor!.value;
    expect(k(mean) / K).toBeCloseTo(1, 4);
    const relative = (r: Reduction): number => r.chosenFactor!.u / k(r);
    expect(relative(mean) ** 2 - 0.02 ** 2).toBeGreaterThan((0.04 / 2 / Math.sqrt(3)) ** 2);
    expect(codes(mean)).not.toContain('taps-drifted');
    expect(together.run!.n).toBe(5);
  });

  it('interpolated give each shot the factor of its place', () => {
    const r = by('interpolated');
    const geometry = r.records.filter((one) => one.kind === 'shot').map((one) => one.byTaps!.value / one.byGeometry!.value);
    for (const [i, ratio] of geometry.slice(1).entries()) expect(ratio).toBeGreaterThan(geometry[i]!);
    expect(geometry[2]).toBeCloseTo(1, 3);
  });
});

describe('a swinging hammer', () => {
  const hammered = (rows: readonly (readonly (string | number)[])[], choices = {}) => withChoices(
    withSheets(bench(1, { hammerMass: '12 g', hammerLength: '0.25 m', hammerFactor: '1', tapSpread: '0 %' }), sheet('taps', [['hammerIn', '°'], ['hammerRebound', '°'], ['hammerFollow', '°'], ['rest', 'mm'], ['firstSwing', 'mm']], rows)), choices);
  const impulseOf = (rows: readonly (readonly (string | number)[])[], choices = {}): number | undefined => reduce(hammered(rows, choices), null).records.find((r) => r.kind === 'tap')?.knownImpulse?.value;

  it('of 12 g at 0.25 m, 8° in and 3° back, gave 3.60505 mN·s (methods 1.10, derived there)', () => {
    expect(impulseOf([[8, 3, '', 0, 20]])! * 1e3).toBeCloseTo(3.60505, 5);
    // The same angle on through: the difference of the two speeds, 0.218446 and 0.081975 m/s.
    expect(impulseOf([[8, '', 3, 0, 20]])! * 1e3).toBeCloseTo(12 * (0.218446 - 0.081975), 3);
    expect(impulseOf([[8, '', '', 0, 20]])! * 1e3).toBeCloseTo(2.62136, 4);
  });

  it('as a compound one gives the same where all its mass is at one point', () => {
    const compound = { hammerForm: 'compound' } as const;
    const session = (entries: Partial<Record<EntryName, string>>) => ({ ...hammered([[8, 3, '', 0, 20]], compound), entries: { ...hammered([[8, 3, '', 0, 20]]).entries, ...Object.fromEntries(Object.entries(entries).map(([name, text]) => [name, entry(text)])) } });
    const known = (entries: Partial<Record<EntryName, string>>): number => reduce(session(entries), null).records.find((r) => r.kind === 'tap')!.knownImpulse!.value;
    expect(known({ hammerContact: '0.25 m', hammerInertia: `${exactly(0.012 * 0.25 ** 2)} kg·m²` }) * 1e3).toBeCloseTo(3.60505, 5);
    expect(known({ hammerContact: '0.25 m', hammerPeriod: `${exactly(2 * Math.PI * Math.sqrt(0.25 / G))} s` }) * 1e3).toBeCloseTo(3.60505, 5);
  });

  it('that stays brings its mass with it: the pendulum as tapped swings with it', () => {
    const r = reduce(hammered([[8, '', '', 0, 20]], { hammerAfter: 'stays' }), null);
    expect(r.configurations.taps!.momentOfInertia.value - r.configurations.shots!.momentOfInertia.value).toBeCloseTo(0.012 * TAP_ARM ** 2, 9);
    expect(r.records.find((one) => one.kind === 'tap')!.knownImpulse!.value * 1e3).toBeCloseTo(2.62136, 4);
    const change = Math.sqrt((J * KAPPA) / ((J + 0.012 * TAP_ARM ** 2) * (KAPPA + 0.012 * G * TAP_ARM)));
    expect(r.calibrations.taps!.change.value).toBeCloseTo(change, 6);
  });

  it('that stays on its own pivot adds m r_h² and m g r_h²/l of a compact one', () => {
    const r = reduce(hammered([[8, '', '', 0, 20]], { hammerAfter: 'staysOnItsPivot' }), null);
    const [shots, taps] = [r.configurations.shots!, r.configurations.taps!];
    expect(taps.momentOfInertia.value - shots.momentOfInertia.value).toBeCloseTo(0.012 * TAP_ARM ** 2, 9);
    expect(taps.stiffness.value - shots.stiffness.value).toBeCloseTo((0.012 * G * TAP_ARM ** 2) / 0.25, 9);
  });

  it('drawn beyond 90°, with both angles after the blow, or without its mass gives a sentence on that tap', () => {
    expect(codes(reduce(hammered([[95, 3, '', 0, 20]]), null))).toContain('hammer-angle-too-wide');
    expect(codes(reduce(hammered([[8, 3, 2, 0, 20]]), null))).toContain('tap-both-rebound-and-follow');
    const { hammerMass: _without, ...entries } = hammered([]).entries;
    expect(codes(reduce({ ...hammered([[8, 3, '', 0, 20]]), entries }, null))).toContain('hammer-entry-missing');
  });
});

it('a force held for a while taps by F τ, less what its length takes from the first swing (methods 1.6: 1.016641 at a tenth of the period)', () => {
  const T = timed(0, 0);
  const taps = (tau: number) => sheet('taps', [['tapForce', 'mN'], ['tapDuration', 'ms'], ['rest', 'mm'], ['firstSwing', 'mm']], [[10, exactly(tau * 1e3), 0, 20]]);
  const known = (tau: number): number => reduce(withSheets(bench(1, { hammerFactor: '1' }), taps(tau)), null).records.find((r) => r.kind === 'tap')!.knownImpulse!.value;
  expect(known(1e-5) / (0.01 * 1e-5)).toBeCloseTo(1, 6);
  expect((0.01 * T) / 10 / known(T / 10)).toBeCloseTo(1.016641, 4);
});

describe('force records of the hammer', () => {
  /** Half-sine pulses of known area, 1 ms, at 50 kHz, on a level of 0.03 N with noise; the area of a half-sine is 2Fτ/π. */
  const record = (impulses: readonly number[]): string => {
    const draws = new Draws(3);
    const tau = 1e-3;
    const lines = ['Time (ms);Force (N)'];
    for (let i = 0; i < impulses.length * 1000; i++) {
      const t = i / 50e3;
      const k = Math.floor(i / 1000);
      const s = t - k * 0.02 - 0.008;
      const F = s > 0 && s < tau ? ((impulses[k]! * Math.PI) / (2 * tau)) * Math.sin((Math.PI * s) / tau) : 0;
      lines.push(`${exactly(Number((t * 1e3).toFixed(3)))};${exactly(F + 0.03 + 0.002 * draws.normal())}`);
    }
    return lines.join('\n');
  };
  const tapped = (texts: readonly string[], taps: number): Session => ({
    ...withSheets(bench(1, { hammerFactor: '1', tapSpread: '0 %' }), sheet('taps', [['rest', 'mm'], ['firstSwing', 'mm']], Array.from({ length: taps }, (_, i) => [0, exactly(readingOf((SIZES[i]! * TAP_ARM) / K))]), { kindOfAll: 'tap' })),
    forceRecords: texts.map((text, i) => ({ id: `f${i + 1}`, name: `force${i + 1}.csv`, text, sha256: '' })),
  });

  it('give the taps their impulses in order, one record of many or one each', () => {
    for (const texts of [[record(SIZES)], SIZES.map((impulse) => record([impulse]))]) {
      const r = reduce(tapped(texts, 4), null);
      const known = r.records.filter(({ kind }) => kind === 'tap').map(({ knownImpulse }) => knownImpulse!);
      known.forEach((impulse, i) => expect(Math.abs(impulse.value - SIZES[i]!)).toBeLessThan(4 * impulse.u + 1e-3 * SIZES[i]!));
      expect(Math.abs(r.calibrations.taps!.factor.value / K - 1)).toBeLessThan(2e-3);
    }
  });

  it('that do not fit the taps are given to none, and say so; a file of words is told by name', () => {
    const r = reduce(tapped([record(SIZES.slice(0, 3))], 4), null);
    expect(codes(r)).toContain('force-records-do-not-fit');
    expect(r.calibrations.taps).toBeNull();
    const words = reduce(tapped(['nothing here'], 1), null);
    expect(words.problems.find((p) => p.code === 'force-record-no-samples')!.place.sheetName).toBe('force1.csv');
    expect(codes(reduce(tapped(['t (s);F (N)\n0;0\n2;0\n1;0\n'], 1), null))).toContain('force-record-time-not-rising');
    const flat = ['t (s);F (N)', ...Array.from({ length: 100 }, (_, i) => `${i};0.0${i % 3}`)].join('\n');
    expect(codes(reduce(tapped([flat], 1), null))).toContain('force-record-no-pulse');
  });
});

describe('taps against firings', () => {
  const withTimes = (shot: number, tap: number): Session => withSheets(
    { ...bench(), sheets: [] },
    sheet('shots', [['rest', 'mm'], ['firstSwing', 'mm'], ['maximumTime', 's'], ['swingsTime', 's'], ['cycles', 'counts']], SHOTS.map(([rest, first]) => [rest, first, exactly(Number((shot / 4).toFixed(3))), exactly(Number((20 * shot).toFixed(2))), 20]), { kindOfAll: 'shot' }),
    sheet('taps', [['tapImpulse', 'mN·s'], ['rest', 'mm'], ['firstSwing', 'mm'], ['maximumTime', 's'], ['swingsTime', 's'], ['cycles', 'counts']], SIZES.map((i) => [exactly(i * 1e3), 0, exactly(readingOf((i * TAP_ARM) / K)), exactly(Number((tap / 4).toFixed(3))), exactly(Number((20 * tap).toFixed(2))), 20]), { kindOfAll: 'tap' }),
  );
  const T = timed(0, 0);

  it('agree in period and time to the first maximum where the pendulum is the same', () => {
    const { comparisons } = reduce(withTimes(T, T), null);
    expect(comparisons.map(({ id }) => id)).toEqual(['period', 'maximumTime']);
    for (const { inU } of comparisons) expect(Math.abs(inU)).toBeLessThan(2);
  });

  it('differ where it changed by 2 % between them', () => {
    for (const { inU, relative } of reduce(withTimes(T, T * 1.02), null).comparisons) {
      expect(inU).toBeLessThan(-5);
      expect(relative.value).toBeCloseTo(1 / 1.02 - 1, 2);
    }
  });
});

describe('the adjustment of all evidence', () => {
  const all = (massFactor: number, hammer = 1): Session => withEntry(withSheets(bench(massFactor), timings([timed(0, 0), 100, '', ''], [timed(0.02, 0.15), 100, 20, 150]), tapSheet('taps', SIZES, K * hammer)), 'period', `${exactly(timed(0, 0))} s ± 1 ms`);

  it('meets evidence that agrees, and is better known than each part', () => {
    const r = reduce(all(1), null);
    expect(row(r, 'adjustment').factor.value / K).toBeCloseTo(1, 5);
    expect(r.adjustment!.chiSquared).toBeLessThan(1e-3);
    expect(r.adjustment!.dof).toBe(r.adjustment!.items.length - 2);
    for (const { factor } of r.evidence.filter(({ id }) => id !== 'adjustment')) expect(row(r, 'adjustment').factor.u).toBeLessThanOrEqual(factor.u * (1 + 1e-9));
  });

  it('shows a hammer that is 20 % off as what pulls most, and widens nothing for it', () => {
    const [right, wrong] = [reduce(all(1), null), reduce(all(1, 1.2), null)];
    expect(wrong.adjustment!.pullsMost).toBe('Taps');
    expect(wrong.adjustment!.items.find(({ label }) => label === 'Taps')!.deviation).toBeGreaterThan(5);
    expect(codes(wrong)).toContain('evidence-contradicts');
    expect(row(wrong, 'adjustment').factor.u / row(wrong, 'adjustment').factor.value).toBeCloseTo(row(right, 'adjustment').factor.u / row(right, 'adjustment').factor.value, 3);
  });

  it('is one more way that can count', () => {
    const r = reduce(withChoices(all(1), { calibration: 'adjustment' }), null);
    expect(r.run!.mean.value / 1.152e-3).toBeCloseTo(1, 4);
    expect(row(r, 'adjustment').chosen).toBe(true);
  });

  it('says where the chosen evidence is not there', () => {
    const r = reduce(withChoices(bench(), { calibration: 'weights' }), null);
    expect(codes(r)).toContain('chosen-evidence-missing');
    expect(r.run).toBeNull();
  });

  it('holds the true factor as often as it says', () => {
    const draws = new Draws(42);
    const runs = 150;
    let held = 0;
    for (let n = 0; n < runs; n++) {
      const off = (u: number): number => 1 + u * draws.normal();
      const hammer = off(0.02);
      const factor = K;
      const session = withSheets(
        sessionOf({
          choices: { form: 'bodyOfParts', readingWay: 'rulerAtTip', dampingWay: 'none' },
          entries: { ...ENTRIES, leverArm: '0.3 m', readingRadius: '0.4 m', gravity: '9.80665 m/s²', tapLeverArm: '0.28 m', division: '0.001 mm' },
          parts: [{ mass: `${exactly(M * off(0.01))} kg ± 1 %`, distance: '0.15 m', ownInertia: `${exactly((J - M * D * D) * off(0.02))} kg·m² ± 2 %` }],
        }),
        sheet('shots', [['rest', 'mm'], ['firstSwing', 'mm']], SHOTS, { kindOfAll: 'shot' }),
        timings([timed(0, 0) + (Math.SQRT2 * 0.02 * draws.normal()) / 50, 50, '', ''], [timed(0.02, 0.15) + (Math.SQRT2 * 0.02 * draws.normal()) / 50, 50, 20, 150]),
        sheet('taps', [['tapImpulse', 'mN·s'], ['rest', 'mm'], ['firstSwing', 'mm']], SIZES.map((i) => [exactly(i * 1e3), 0, exactly(readingOf((i * hammer * off(0.01) * TAP_ARM) / factor))]), { kindOfAll: 'tap' }),
      );
      const { factor: found } = row(reduce(session, null), 'adjustment');
      if (Math.abs(found.value - K) <= found.U) held += 1;
    }
    // Binomial: 95 % of 150 within three standard deviations.
    expect(held / runs).toBeGreaterThan(0.95 - 3 * Math.sqrt((0.95 * 0.05) / runs));
  });
});
