/** Budgets add up, and say of each quantity what a second reduction with that quantity changed says. */
import { describe, expect, it } from 'vitest';
import { reduce } from '../../src/reduction/reduce.ts';
import type { Budget, BudgetLine, Reduction } from '../../src/reduction/results.ts';
import { ENTRIES, type EntryName } from '../../src/session/entries.ts';
import { entry, type Choices, type Entry, type Session } from '../../src/session/session.ts';
import { demoLike, SHOTS, TAPS } from '../fixtures/demoLike.ts';
import { rowId, withEntry } from '../fixtures/session.ts';

const VARIANTS: readonly (readonly [what: string, choices: Partial<Choices>])[] = [
  ['by geometry, masses', { calibration: 'geometry' }],
  ['by geometry, route A', { calibration: 'geometry', route: 'massesAndPeriod' }],
  ['by geometry, route B, timed with the calibration mass on', { calibration: 'geometry', route: 'inertiaAndPeriod', periodTimedAs: 'taps' }],
  ['by taps', { calibration: 'taps' }],
  ['by taps, route A', { calibration: 'taps', route: 'massesAndPeriod' }],
  ['by taps, small angle, calibration mass on for the shots', { calibration: 'taps', swingForm: 'smallAngle', calibrationMassHung: 'shots' }],
  ['by geometry, calibration mass always on', { calibration: 'geometry', calibrationMassHung: 'always' }],
];

const total = (lines: readonly BudgetLine[], of: (line: BudgetLine) => number): number => lines.reduce((sum, line) => sum + of(line), 0);

/** What does not add up. */
function faultsOf({ of, lines }: Budget): readonly string[] {
  const tenths = lines.map((line) => line.share * 10);
  return [
    // In tenths, which are whole numbers: 100.0 exactly.
    ...(total(lines, (line) => Math.round(line.share * 10)) === 1000 ? [] : ['shares do not total 100.0 %']),
    ...(tenths.every((share) => Math.abs(share - Math.round(share)) < 1e-9) ? [] : ['a share has more than one decimal']),
    ...(Math.abs(total(lines, (line) => line.contribution ** 2) / of.u ** 2 - 1) < 1e-12 ? [] : ['the contributions do not make u']),
    ...(of.U === of.k * of.u ? [] : ['U is not k·u']),
    ...(new Set(lines.map(({ id }) => id)).size === lines.length ? [] : ['a quantity has two lines']),
  ];
}

/** Value and ± of an entry of the fixture, in the unit typed; the ± stands between the value and the unit. */
function scaled(typed: Entry, factor: number): Entry {
  const [, value = '', rest = ''] = /^([\d.]+)(.*)$/.exec(typed.text) ?? [];
  return { ...typed, text: `${(Number(value) * factor).toPrecision(17)}${rest}` };
}

/** Relative step: small against the curvature of the models, large against the last digits. */
const STEP = 1e-4;
/** Half-differences over u and over the step differ by (u/x)², of the order of 1e-4 at the largest u of the fixture. */
const TOLERANCE = 2e-3;

/** Slopes of the mean and of one shot's impulse bit by a change of one typed value, in its typed unit. */
function slopes(typed: Entry, put: (typed: Entry) => Session, shot: string): readonly [mean: number, shot: number] {
  const value = Number(/^[\d.]+/.exec(typed.text)?.[0]);
  const [above, below] = [1 + STEP, 1 - STEP].map((factor) => reduce(put(scaled(typed, factor)), null));
  const of = (pick: (r: Reduction) => number): number => (pick(above!) - pick(below!)) / (2 * STEP * value);
  return [of((r) => r.run!.mean.value), of((r) => r.records.find((record) => record.id === shot)!.impulseBit!.value)];
}

describe.each(VARIANTS)('the budget %s', (_, choices) => {
  const session = demoLike(choices);
  const shot = rowId(SHOTS[1]);
  const r = reduce(session, shot);

  it('adds up: shares total 100.0 % and the contributions make u, for the run and for one shot', () => {
    for (const budget of [r.runs.geometry!.budget, r.runs.taps!.budget, r.explained!.budget!]) expect(faultsOf(budget)).toEqual([]);
  });

  it('belongs to the number that is shown', () => {
    expect(r.run!.budget.of).toEqual(r.run!.mean);
    expect(r.explained!.budget!.of).toEqual(r.records.find((record) => record.id === shot)!.impulseBit);
  });

  it('splits u of the mean into scatter and common part that make it up', () => {
    for (const run of [r.runs.geometry!, r.runs.taps!]) expect(Math.hypot(run.uScatter, run.uCommon) / run.mean.u).toBeCloseTo(1, 12);
  });

  it('has a line for every entry used with an uncertainty, with its estimate, u and distribution as typed', () => {
    const typed = r.entries.filter((read) => read.used && read.u > 0);
    expect(typed.length).toBeGreaterThan(8);
    for (const read of typed) {
      const line = r.run!.budget.lines.find(({ id }) => id === read.name)!;
      expect({ id: line.id, estimate: line.estimate, u: line.u, distribution: line.distribution, dof: line.dof, scope: line.scope }).toEqual({
        id: read.name, estimate: read.value, u: read.u, distribution: read.distribution, dof: Infinity, scope: 'common',
      });
    }
  });

  it('has sensitivity coefficients that are what a change of the typed value does to the mean and to one shot', () => {
    const off: string[] = [];
    const unitOf = (name: string): number => r.entries.find((read) => read.name === name)!.value!;
    const check = (name: string, typed: Entry, put: (typed: Entry) => Session): void => {
      const perSi = Number(/^[\d.]+/.exec(typed.text)?.[0]) / unitOf(name);
      const [ofMean, ofShot] = slopes(typed, put, shot);
      for (const [budget, slope] of [[r.run!.budget, ofMean], [r.explained!.budget!, ofShot]] as const) {
        const line = budget.lines.find(({ id }) => id === name)!;
        // Relative to what the quantity could do at power one, so that a coefficient of 0 is compared with 0.
        const whole = Math.abs(budget.of.value / unitOf(name));
        const gap = Math.abs((line.sensitivity ?? Number.POSITIVE_INFINITY) - slope * perSi) / whole;
        if (!(gap < TOLERANCE)) off.push(`${name}: ${line.sensitivity} in the budget, ${slope * perSi} by change`);
        if (!(Math.abs(line.contribution - line.sensitivity! * line.u!) < 1e-15)) off.push(`${name}: contribution is not c·u`);
      }
    };
    for (const read of r.entries.filter((one) => one.used && one.u > 0)) {
      const [, part, field] = /^part\.([^.]+)\.(.+)$/.exec(read.name) ?? [];
      if (part === undefined) {
        const name = read.name as EntryName;
        check(name, session.entries[name]!, (typed) => withEntry(session, name, typed));
      } else {
        const typed = session.parts.find((p) => p.id === part)!.entries[field as 'mass']!;
        check(read.name, typed, (now) => ({ ...session, parts: session.parts.map((p) => (p.id === part ? { ...p, entries: { ...p.entries, [field!]: now } } : p)) }));
      }
    }
    expect(off).toEqual([]);
  });
});

describe('a budget', () => {
  it('names every entry by the table of the bench', () => {
    const { lines } = reduce(demoLike(), null).run!.budget;
    const known = lines.filter((line) => line.id in ENTRIES);
    expect(known.length).toBeGreaterThan(5);
    for (const line of known) expect(line.label).toBe(ENTRIES[line.id as EntryName].label);
  });

  it('counts what a zero gives to the shots that took it as common, not as scatter', () => {
    const line = reduce(demoLike(), null).run!.budget.lines.find(({ id }) => id === 'readings.zeros')!;
    expect(line.contribution).toBeGreaterThan(0);
    expect(line.scope).toBe('common');
  });

  it('of a tap opens the impulse of that tap at its own lever arm', () => {
    const r = reduce(demoLike({ calibration: 'geometry' }), rowId(TAPS[0]));
    expect(faultsOf(r.explained!.budget!)).toEqual([]);
    expect(r.explained!.budget!.lines.find(({ id }) => id === 'tapLeverArm')!.contribution).not.toBe(0);
    expect(r.explained!.budget!.lines.find(({ id }) => id === 'leverArm')!.contribution).toBe(0);
  });

  it('by taps of exact impulse and exact readings is that of the lever arms alone', () => {
    const base = demoLike({ calibration: 'taps', calibrationMassHung: 'never', dampingWay: 'none', swingForm: 'smallAngle' });
    const still = ['readingSpread', 'division', 'tapSpread', 'hammerFactor', 'scaleMark', 'scaleFactor', 'readingRadius'] as const;
    const session = still.reduce((s, name) => withEntry(s, name, entry(name === 'division' ? '1e-12 mm' : name === 'readingRadius' ? '402 mm' : name === 'scaleMark' ? '117 mm' : name === 'hammerFactor' || name === 'scaleFactor' ? '1' : '0')), base);
    const { lines } = reduce(session, rowId(SHOTS[0])).explained!.budget!;
    const arms = Math.hypot(...lines.filter(({ id }) => id === 'leverArm' || id === 'tapLeverArm').map((line) => line.contribution));
    const taps = lines.find(({ id }) => id === 'readings.taps')!;
    const all = Math.hypot(...lines.map((line) => line.contribution));
    expect(Math.hypot(arms, taps.contribution) / all).toBeCloseTo(1, 9);
  });
});
