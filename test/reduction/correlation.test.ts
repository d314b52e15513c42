/** What is common stays common, what is shared cancels, and the period is counted once. */
import { describe, expect, it } from 'vitest';
import { reduce } from '../../src/reduction/reduce.ts';
import type { BudgetLine, Reduction } from '../../src/reduction/results.ts';
import { entry, type Choices, type Session } from '../../src/session/session.ts';
import { demoLike, DEMO_ROWS, ON_THE_ZERO, SHOTS } from '../fixtures/demoLike.ts';
import { exactly, rowId, sessionOf, withEntry, type SessionParts } from '../fixtures/session.ts';

/** Impulse bits of the check in methods 3 (derived there), µN·s; u_K/K = 6 %. */
const METHODS_SHOTS = [41.2, 39.8, 42.5, 40.7, 40.1, 41.9, 38.9, 40.9] as const;

/** A point bob read by an angle and reduced by the small angle: I = m √(g L³) θ/r_t, so that any impulse bits can be read in. */
function angles(impulses: readonly number[], more: SessionParts['entries'] = {}): Session {
  const [m, L, g, arm] = [0.01, 0.3, 9.8, 0.25];
  const perRadian = (m * Math.sqrt(g * L ** 3)) / arm;
  return sessionOf({
    choices: { form: 'pointBob', readingWay: 'angle', dampingWay: 'none', swingForm: 'smallAngle' },
    entries: { bobMass: `${m} kg`, bobDistance: `${L} m`, gravity: `${g} m/s²`, leverArm: `${arm} m`, division: '1e-12 rad', ...more },
    rows: impulses.map((impulse) => ({ rest: 0, first: impulse / perRadian })),
    readingUnit: 'rad',
  });
}

const lineOf = (r: Reduction, id: string): BudgetLine => r.run!.budget.lines.find((line) => line.id === id)!;

describe('the run mean', () => {
  const run = reduce(angles(METHODS_SHOTS.map((x) => x * 1e-6), { leverArm: entry('0.25 m ± 6 %') }), null).run!;

  it('keeps a common 6 % whole: the worked numbers of methods 3', () => {
    expect(run.mean.value * 1e6).toBeCloseTo(40.75, 9);
    expect(run.scatter! * 1e6).toBeCloseTo(1.15635, 5);
    expect(run.uScatter * 1e6).toBeCloseTo(0.40883, 5);
    // Half-differences of 1/r over ±6 % exceed the slope by 0.06² = 0.36 %.
    expect(run.uCommon * 1e6).toBeCloseTo(2.445 / (1 - 0.06 ** 2), 5);
    expect(run.mean.u * 1e6).toBeCloseTo(Math.hypot(2.445 / (1 - 0.06 ** 2), 0.40883), 5);
    expect(run.mean.dof / (7 * (run.mean.u / run.uScatter) ** 4)).toBeCloseTo(1, 9);
  });

  it('is not the wrong 0.956 of everything divided by √n', () => {
    expect(run.mean.u * 1e6).toBeGreaterThan(2 * 0.956);
  });

  it('keeps its common part when shots are added, while the scatter part falls as 1/√n', () => {
    const many = reduce(angles([...METHODS_SHOTS, ...METHODS_SHOTS, ...METHODS_SHOTS, ...METHODS_SHOTS].map((x) => x * 1e-6), { leverArm: entry('0.25 m ± 6 %') }), null).run!;
    expect(many.uCommon / run.uCommon).toBeCloseTo(1, 9);
    expect(many.uScatter / run.uScatter).toBeCloseTo(Math.sqrt(7 / 31), 9);
  });

  it('has each shot keep the common part too, so that two shots correlate by u_c²/(u_c² + u_r²)', () => {
    const r = reduce(angles(METHODS_SHOTS.map((x) => x * 1e-6), { leverArm: entry('0.25 m ± 6 %'), readingSpread: entry('1 mrad') }), rowId(1));
    const shot = r.records[0]!.impulseBit!;
    const common = r.explained!.budget!.lines.find((line) => line.id === 'leverArm')!.contribution;
    expect(Math.abs(common) / shot.value).toBeCloseTo(0.06 / (1 - 0.06 ** 2), 9);
    expect(Math.hypot(common, r.records[0]!.ownU) / shot.u).toBeCloseTo(1, 9);
  });

  it('takes the readings for the scatter where the shots scatter less than they would by their readings', () => {
    const same = reduce(angles([4e-5, 4e-5, 4e-5, 4e-5], { readingSpread: entry('1 mrad') }), null).run!;
    expect(same.readingsInsteadOfScatter).toBe(true);
    expect(same.scatter).toBe(0);
    expect(same.uScatter).toBeGreaterThan(0);
  });

  it('of a few shots that came out alike by chance has no narrower interval than their scatter makes', () => {
    // Three shots, s a little below what the readings make: t(2) s/√3 is wider than 1.96 u_reading/√3.
    const shots = [4.0e-5, 4.1e-5, 4.2e-5];
    const alone = reduce(angles(shots), null).run!;
    const readings = reduce(angles(shots, { readingSpread: entry('2 mrad') }), null).run!;
    expect(readings.readingsInsteadOfScatter).toBe(true);
    expect(readings.mean.U / alone.mean.U).toBeGreaterThan(1 - 1e-6);
    // And where the readings make far more than the scatter, they are known as well as they are stated.
    expect(reduce(angles(shots, { readingSpread: entry('20 mrad') }), null).run!.mean.k).toBeCloseTo(1.96, 2);
  });

  it('has the u of its one shot where there is one, and no scatter', () => {
    const r = reduce(angles([4e-5], { readingSpread: entry('1 mrad'), leverArm: entry('0.25 m ± 1 %') }), null);
    expect(r.run!.scatter).toBeNull();
    expect(r.run!.mean.u / r.records[0]!.impulseBit!.u).toBeCloseTo(1, 12);
  });
});

describe('taps against geometry', () => {
  it('lets the lever arm of the thrust cancel in the ratio, which both ways share', () => {
    const session = demoLike({ calibrationMassHung: 'never' });
    const [tight, loose] = [entry('380 ± 0.001 mm'), entry('380 ± 38 mm')].map((arm) => reduce(withEntry(session, 'leverArm', arm), null));
    expect(loose!.run!.mean.u).toBeGreaterThan(3 * tight!.run!.mean.u);
    expect(loose!.difference!.relative.value).toBeCloseTo(tight!.difference!.relative.value, 12);
    expect(loose!.difference!.relative.u).toBeCloseTo(tight!.difference!.relative.u, 12);
    expect(tight!.difference!.relative.value).toBeCloseTo(tight!.runs.taps!.mean.value / tight!.runs.geometry!.mean.value - 1, 12);
  });

  it('lets the scatter of the shots cancel, which both ways reduce alike', () => {
    const wide = reduce(demoLike({ dampingWay: 'none' }, DEMO_ROWS.map((row, i) => (i === 5 ? { ...row, first: 150 } : row))), null);
    expect(wide.runs.geometry!.uScatter / wide.runs.geometry!.mean.value).toBeGreaterThan(0.1);
    expect(wide.difference!.relative.u).toBeLessThan(0.05);
  });
});

/** d ln I/d ln T by typing two periods a little apart. */
function powerOfPeriod(choices: Partial<Choices>): { power: number; inBudget: number } {
  const session = demoLike(choices);
  const at = (T: number): Reduction => reduce(withEntry(session, 'period', entry(`${exactly(T)} ± 0.002 s`)), null);
  const [middle, step] = [1.125, 1e-4];
  const power = Math.log(at(middle * (1 + step)).run!.mean.value / at(middle * (1 - step)).run!.mean.value) / Math.log((1 + step) / (1 - step));
  const r = at(middle);
  return { power, inBudget: (lineOf(r, 'period').sensitivity! * middle) / r.run!.mean.value };
}

describe('the timed period', () => {
  // Table of methods 1.1: route A +1, route B −1; J from the period is not counted again.
  it.each([
    ['route A, +1', 'massesAndPeriod', 1],
    ['route B, −1', 'inertiaAndPeriod', -1],
  ] as const)('counts once by %s: the impulse bit goes as T to the power of this', (_, route, power) => {
    const found = powerOfPeriod({ route, calibrationMassHung: 'never', dampingWay: 'none' });
    expect(found.power).toBeCloseTo(power, 3);
    expect(found.inBudget).toBeCloseTo(power, 3);
  });

  it('changes nothing but the period check where masses alone are the route', () => {
    const session = demoLike({ route: 'masses' });
    const [one, other] = ['1.125 ± 0.002 s', '1.4 ± 0.1 s'].map((T) => reduce(withEntry(session, 'period', entry(T)), rowId(SHOTS[0])));
    const without = (r: Reduction): unknown => ({
      ...r, periodCheck: null, evidence: [], adjustment: null, agreement: null, problems: [], entries: [], run: r.run!.mean, delivered: r.delivered!.mean, thruster: r.thruster!.mean, runs: [r.runs.geometry!.mean, r.runs.taps!.mean], explained: r.explained!.chain,
    });
    expect(without(one!)).toEqual(without(other!));
    expect(one!.periodCheck!.predicted).toEqual(other!.periodCheck!.predicted);
    expect(one!.periodCheck!.measured.value).not.toBe(other!.periodCheck!.measured.value);
    expect(lineOf(one!, 'period').contribution).toBe(0);
  });

  it('does nothing to the impulse bit by taps in one configuration, on any route', () => {
    for (const route of ['masses', 'massesAndPeriod', 'inertiaAndPeriod'] as const) {
      expect(powerOfPeriod({ route, calibration: 'taps', calibrationMassHung: 'never', dampingWay: 'none', swingForm: 'smallAngle' }).power).toBeCloseTo(0, 9);
    }
  });
});

describe('a zero that served several shots as rest', () => {
  const of = (rest: string): Reduction => reduce(demoLike({ dampingWay: 'none' }, DEMO_ROWS.map((row, i) => (i === 4 ? { ...row, rest } : row))), rowId(ON_THE_ZERO[0]));

  it('moves exactly these shots', () => {
    const [here, there] = [of('118.0'), of('119.0')];
    const moved = here.records.filter((record, i) => record.impulseBit?.value !== there.records[i]!.impulseBit?.value && record.kind === 'shot').map(({ id }) => id);
    expect(moved).toEqual(ON_THE_ZERO.map(rowId));
  });

  it('is one source for all of them: in the mean its part is that of one reading times the share of the shots that took it', () => {
    const r = of('118.0 ± 2.0');
    const one = r.explained!.budget!.lines.find(({ id }) => id.endsWith('.rest'))!;
    const inMean = lineOf(r, 'readings.zeros');
    expect(inMean.contribution / ((Math.abs(one.contribution) * ON_THE_ZERO.length) / SHOTS.length)).toBeCloseTo(1, 2);
    expect(inMean.scope).toBe('common');
  });
});

describe('the hammer’s calibration', () => {
  it('reaches every shot by taps whole, however many taps there are', () => {
    const r = reduce(withEntry(demoLike({ calibration: 'taps' }), 'hammerFactor', entry('1 ± 5 %')), null);
    expect(Math.abs(lineOf(r, 'hammerFactor').contribution) / r.run!.mean.value).toBeCloseTo(0.05, 6);
    expect(r.runs.geometry!.budget.lines.find(({ id }) => id === 'hammerFactor')!.contribution).toBe(0);
  });
});
