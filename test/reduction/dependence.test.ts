/** Every number moves with what it depends on and with nothing else: one typed value, one choice at a time. */
import { describe, expect, it } from 'vitest';
import { reduce } from '../../src/reduction/reduce.ts';
import type { Reduction, RunResult } from '../../src/reduction/results.ts';
import { ENTRIES, ENTRY_NAMES, type EntryName } from '../../src/session/entries.ts';
import { entry, type Choices, type Entry, type Session } from '../../src/session/session.ts';
import { demoLike, DEMO_ROWS, FULL_ENTRIES, SHOTS, TAPS } from '../fixtures/demoLike.ts';
import { rowId, withChoices, withEntry } from '../fixtures/session.ts';

const SHOT = rowId(SHOTS[0]);
const TAP = rowId(TAPS[1]);

/** What a reader sees, by name. */
function seen(session: Session): Readonly<Record<string, unknown>> {
  const r: Reduction = reduce(session, SHOT);
  const record = (id: string): Reduction['records'][number] | undefined => r.records.find((one) => one.id === id);
  const run = (x: RunResult | null): readonly unknown[] => [x?.mean.value, x?.scatter];
  const shot = record(SHOT);
  const tap = record(TAP);
  return {
    'shot: angle': shot?.angle?.value,
    'shot: launch': shot?.launch?.value,
    'shot: by geometry': [shot?.byGeometry?.value, run(r.runs.geometry)],
    'shot: by taps': [shot?.byTaps?.value, run(r.runs.taps)],
    'tap: angle': tap?.angle?.value,
    'tap: known': tap?.knownImpulse?.value,
    'tap: by geometry': tap?.byGeometry?.value,
    'K by geometry': r.calibrations.geometry?.factor.value,
    'K by taps as taken': r.calibrations.taps?.asTaken.value,
    'change to firing': r.calibrations.taps?.change.value,
    'period as timed': r.periodCheck?.measured.value,
    'period by masses': r.periodCheck?.predicted.value,
    damping: r.damping?.ratio.value,
    'u of the run by geometry': r.runs.geometry?.mean.u,
    'u of the run by taps': r.runs.taps?.mean.u,
  };
}

function moved(before: Readonly<Record<string, unknown>>, after: Readonly<Record<string, unknown>>): readonly string[] {
  return Object.keys(before).filter((name) => JSON.stringify(before[name]) !== JSON.stringify(after[name])).sort();
}

const base = demoLike({ dampingWay: 'ratio', route: 'masses' });
const BENCH: Session = { ...base, entries: { ...base.entries, dampingRatio: entry('0.012 ± 0.001'), logDecrement: entry('0.07 ± 0.01') } };
const start = seen(BENCH);

const SHOT_BITS = ['shot: by geometry', 'shot: by taps', 'u of the run by geometry', 'u of the run by taps'];
const STAND = ['K by geometry', 'shot: by geometry', 'tap: by geometry', 'u of the run by geometry'];
/** Damping and gravity share reach both launches; with the masses the damping of the taps' configuration is another. */
const WITH_CHANGE = [...STAND, 'change to firing', 'shot: by taps', 'u of the run by taps', 'K by taps as taken', 'period by masses', 'shot: launch', 'period as timed'];

/** What each entry reaches, by the equations of methods 1 and 2. */
const REACHES: Readonly<Partial<Record<EntryName, readonly string[]>>> = {
  leverArm: SHOT_BITS,
  tapLeverArm: ['K by taps as taken', 'shot: by taps', 'u of the run by taps', 'tap: by geometry'],
  readingRadius: ['shot: angle', 'shot: launch', 'tap: angle', ...SHOT_BITS, 'tap: by geometry', 'K by taps as taken'],
  scaleFactor: ['shot: angle', 'shot: launch', 'tap: angle', ...SHOT_BITS, 'tap: by geometry', 'K by taps as taken'],
  scaleMark: ['shot: angle', 'shot: launch', 'tap: angle', ...SHOT_BITS, 'tap: by geometry', 'K by taps as taken'],
  gravity: WITH_CHANGE,
  flexureStiffness: WITH_CHANGE,
  dampingRatio: ['damping', 'shot: launch', ...SHOT_BITS, 'tap: by geometry', 'K by taps as taken', 'period as timed'],
  logDecrement: [],
  hammerFactor: ['tap: known', 'K by taps as taken', 'shot: by taps', 'u of the run by taps'],
  calibrationMass: ['tap: by geometry', 'change to firing', 'shot: by taps', 'u of the run by taps', 'K by taps as taken'],
  calibrationMassDistance: ['tap: by geometry', 'change to firing', 'shot: by taps', 'u of the run by taps', 'K by taps as taken'],
  calibrationMassInertia: ['tap: by geometry', 'change to firing', 'shot: by taps', 'u of the run by taps', 'K by taps as taken'],
  period: ['period as timed'],
  periodAmplitude: ['period as timed'],
  periodCycles: ['period as timed'],
  tapSpread: ['u of the run by taps'],
  division: ['u of the run by geometry', 'u of the run by taps'],
  readingSpread: ['u of the run by geometry', 'u of the run by taps'],
};
const BY_BOTH = ['shot: by geometry', 'shot: by taps'];
/** Entries that the bench of these tests leaves empty: what they reach once typed; nothing where they feed the plan or the remarks alone. */
const AWAKENED: Readonly<Partial<Record<EntryName, { readonly typed: string; readonly beside?: Readonly<Partial<Record<EntryName, string>>>; readonly reaches: readonly string[] }>>> = {
  parallaxGap: { typed: '5 mm', beside: { cameraDistance: '500 mm' }, reaches: ['shot: angle', 'tap: angle'] },
  cameraDistance: { typed: '500 mm', beside: { parallaxGap: '5 mm' }, reaches: ['shot: angle', 'tap: angle'] },
  eyeShift: { typed: '30 mm', beside: { parallaxGap: '5 mm', cameraDistance: '500 mm' }, reaches: ['u of the run by geometry'] },
  // Of traces in volts alone.
  sensorSlope: { typed: '2 mm/V', reaches: [] },
  sensorOffset: { typed: '1 mm', reaches: [] },
  sensorCorrelation: { typed: '0.5', reaches: [] },
  pulseDuration: { typed: '50 ms', reaches: BY_BOTH },
  tiltInPlane: { typed: '3°', beside: { exitAhead: '50 mm' }, reaches: BY_BOTH },
  exitAhead: { typed: '50 mm', beside: { tiltInPlane: '3°' }, reaches: BY_BOTH },
  tiltOutOfPlane: { typed: '4 ± 1°', reaches: BY_BOTH },
  exposure: { typed: '20 ms', reaches: ['shot: launch', 'K by taps as taken'] },
  frameInterval: { typed: '30 ms', reaches: ['shot: launch', 'u of the run by geometry'] },
  backgroundSwing: { typed: '1 mm', reaches: ['shot: launch', 'u of the run by geometry'] },
  backgroundPhase: { typed: '60°', beside: { backgroundSwing: '1 mm' }, reaches: ['shot: launch', 'u of the run by geometry'] },
  backgroundTime: { typed: '0.2 s', beside: { backgroundSwing: '1 mm' }, reaches: ['shot: launch', 'u of the run by geometry'] },
  propellantUsed: { typed: '100 mg', beside: { propellantDistance: '380 mm' }, reaches: ['shot: by geometry'] },
  propellantDistance: { typed: '380 mm', beside: { propellantUsed: '100 mg' }, reaches: ['shot: by geometry'] },
  guessedImpulse: { typed: '1.2 mN·s', reaches: [] },
  scaleReach: { typed: '300 mm', reaches: [] },
  pressure: { typed: '2 mPa', reaches: [] },
  tapPressure: { typed: '2 mPa', reaches: [] },
  capacitance: { typed: '10 µF', reaches: [] },
  leadResistance: { typed: '50 mΩ', reaches: [] },
  vacuumBelow: { typed: '1 Pa', reaches: [] },
  // Those of timings, weights and hammers have their records in evidence.test.ts; this bench has none.
  pullArm: { typed: '250 mm', reaches: [] },
  staticStiffness: { typed: '54 mN·m/rad', reaches: [] },
  forcePerDeflection: { typed: '0.5 mN/mm', beside: { pullArm: '250 mm' }, reaches: [] },
  firstMaximumTime: { typed: '0.28 s', reaches: [] },
  timingSpread: { typed: '0.1 s', reaches: [] },
  hungMassSpread: { typed: '1 mg', reaches: [] },
  hungAtSpread: { typed: '0.5 mm', reaches: [] },
  hungMassInertia: { typed: '10 g·mm²', reaches: [] },
  weightFactor: { typed: '1 ± 1 %', reaches: [] },
  weightSpread: { typed: '1 %', reaches: [] },
  hammerMass: { typed: '12 g', reaches: [] },
  hammerLength: { typed: '250 mm', reaches: [] },
  hammerAngleSpread: { typed: '0.2°', reaches: [] },
  hammerZero: { typed: '0 ± 0.5°', reaches: [] },
};
/** These weigh the taps against each other, and so may move what rests on their mean. */
const WEIGHS_TAPS: ReadonlySet<string> = new Set(['K by taps as taken', 'shot: by taps']);

const longer = (typed: Entry): Entry => ({ ...typed, text: typed.text.replace(/^[\d.]+/, (value) => String(Number(value) * 1.03)) });

describe('one entry typed otherwise', () => {
  it.each(Object.entries(REACHES))('moves what it reaches and nothing else: %s', (name, reaches) => {
    const typed = BENCH.entries[name as EntryName]!;
    const found = moved(start, seen(withEntry(BENCH, name as EntryName, longer(typed))));
    const spreads = name === 'tapSpread' || name === 'division' || name === 'readingSpread';
    expect(spreads ? found.filter((what) => !WEIGHS_TAPS.has(what)) : found).toEqual([...new Set(reaches)].sort());
  });

  it.each([['0.mass'], ['0.distance'], ['0.ownInertia'], ['1.mass'], ['1.distance']])('moves the stand through part %s', (path) => {
    const [index, name] = path.split('.') as [string, 'mass'];
    const parts = BENCH.parts.map((part, i) => (i === Number(index) ? { ...part, entries: { ...part.entries, [name]: longer(part.entries[name]!) } } : part));
    const found = moved(start, seen({ ...BENCH, parts }));
    for (const what of ['K by geometry', 'shot: by geometry', 'change to firing', 'shot: by taps', 'period by masses']) expect(found).toContain(what);
    for (const what of ['shot: angle', 'tap: angle', 'tap: known', 'damping']) expect(found).not.toContain(what);
  });

  it.each(Object.keys(FULL_ENTRIES).filter((name) => /±/.test(FULL_ENTRIES[name as keyof typeof FULL_ENTRIES].text)))('with its ± alone moves no value but u: %s', (name) => {
    const typed = BENCH.entries[name as EntryName]!;
    const after = seen(withEntry(BENCH, name as EntryName, { ...typed, text: typed.text.replace(/± ([\d.]+)/, (_, u: string) => `± ${Number(u) * 3}`) }));
    const found = moved(start, after);
    // The taps' weights are as good as their u, whose half-differences know the curvature of the models.
    expect(found.filter((what) => !what.startsWith('u of') && !WEIGHS_TAPS.has(what))).toEqual([]);
    expect(Math.abs(Number(after['K by taps as taken']) / Number(start['K by taps as taken']) - 1)).toBeLessThan(1e-6);
    expect(found.some((what) => what.startsWith('u of'))).toBe(!name.startsWith('period'));
  });

  it('that the choices do not use moves nothing', () => {
    const used = new Set(reduce(BENCH, null).entries.filter((read) => read.used).map((read) => read.name));
    const unused = ENTRY_NAMES.filter((name) => !used.has(name));
    for (const name of ['bobMass', 'stripLength', 'rulerHeight', 'logDecrement', 'latitude', 'filmThickness', 'momentumFactor', 'pixelScale']) expect(unused).toContain(name);
    for (const name of unused) expect(moved(start, seen(withEntry(BENCH, name, entry(`7 ± 1 ${ENTRIES[name].unit === '1' ? '' : ENTRIES[name].unit}`))))).toEqual([]);
  });

  it.each(Object.entries(AWAKENED))('that stood empty moves what it reaches: %s', (name, { typed, beside, reaches }) => {
    const quiet = Object.entries(beside ?? {}).reduce((session, [other, text]) => withEntry(session, other as EntryName, entry(text)), BENCH);
    const found = moved(seen(quiet), seen(withEntry(quiet, name as EntryName, entry(typed))));
    for (const what of reaches) expect(found).toContain(what);
    expect(reaches.length === 0 ? found : []).toEqual([]);
  });

  it('covers every entry that the choices use', () => {
    const used = reduce(BENCH, null).entries.filter((read) => read.used && !read.name.startsWith('part.')).map((read) => read.name);
    expect(used.filter((name) => REACHES[name as EntryName] === undefined && AWAKENED[name as EntryName] === undefined)).toEqual([]);
  });
});

describe('one choice made otherwise', () => {
  const CHOICES: readonly (readonly [Partial<Choices>, readonly string[]])[] = [
    [{ dampingWay: 'none' }, ['damping', 'shot: launch', ...SHOT_BITS]],
    [{ dampingWay: 'swings' }, ['damping', 'shot: launch', ...SHOT_BITS]],
    [{ dampingWay: 'decrement' }, ['damping', 'shot: launch', ...SHOT_BITS]],
    [{ route: 'massesAndPeriod' }, ['K by geometry', 'shot: by geometry', 'change to firing']],
    [{ route: 'inertiaAndPeriod' }, ['K by geometry', 'shot: by geometry', 'change to firing']],
    [{ periodTimedAs: 'taps' }, ['period as timed', 'period by masses']],
    [{ calibrationMassHung: 'never' }, ['tap: by geometry', 'change to firing', 'shot: by taps']],
    [{ calibrationMassHung: 'shots' }, ['K by geometry', 'shot: by geometry', 'change to firing', 'shot: by taps']],
    [{ calibrationMassHung: 'always' }, ['K by geometry', 'shot: by geometry', 'change to firing', 'shot: by taps']],
    [{ swingForm: 'smallAngle' }, ['shot: launch', 'shot: by geometry']],
    [{ scaleRunsBackward: true }, ['shot: angle', 'shot: by geometry', 'tap: angle']],
  ];

  it.each(CHOICES)('moves what rests on it: %j', (choices, reaches) => {
    const found = moved(start, seen(withChoices(BENCH, choices)));
    for (const what of reaches) expect(found).toContain(what);
  });

  it('of the calibration moves no number of either way, only which of them counts', () => {
    const [geometry, taps] = (['geometry', 'taps'] as const).map((calibration) => reduce(withChoices(BENCH, { calibration }), null));
    expect(geometry!.runs).toEqual(taps!.runs);
    expect(geometry!.run).toEqual(geometry!.runs.geometry);
    expect(taps!.run).toEqual(taps!.runs.taps);
    expect(geometry!.records.map((r) => [r.byGeometry, r.byTaps])).toEqual(taps!.records.map((r) => [r.byGeometry, r.byTaps]));
    for (const record of taps!.records) expect(record.impulseBit).toEqual(record.byTaps);
  });

  it('of the form moves neither form, only which of them counts', () => {
    const [full, small] = (['full', 'smallAngle'] as const).map((swingForm) => reduce(withChoices(BENCH, { swingForm }), null));
    expect(full!.records.map((r) => [r.full, r.smallAngle])).toEqual(small!.records.map((r) => [r.full, r.smallAngle]));
    for (const record of small!.records) expect(record.impulseBit).toEqual(record.smallAngle);
  });

  it('of what the ± means moves u by its divisor and no value', () => {
    const u = (typed: Entry): number => reduce(withEntry(BENCH, 'leverArm', typed), null).entries.find((read) => read.name === 'leverArm')!.u;
    expect(u(entry('380 ± 3 mm'))).toBeCloseTo(3e-3, 15);
    // NIST TN 1297 4.3, 4.6: a/√3 for rectangular limits, U/k for an expanded uncertainty.
    expect(u(entry('380 ± 3 mm', 'limits'))).toBeCloseTo(3e-3 / Math.sqrt(3), 15);
    expect(u(entry('380 ± 3 mm', 'expanded'))).toBeCloseTo(1.5e-3, 15);
    expect(u(entry('380 ± 3 mm', 'expanded', '3'))).toBeCloseTo(1e-3, 15);
  });
});

describe('one record changed', () => {
  const rows = DEMO_ROWS;
  const of = (row: number, change: Partial<(typeof rows)[number]>): Reduction => reduce(demoLike({ dampingWay: 'none' }, rows.map((r, i) => (i === row - 1 ? { ...r, ...change } : r))), null);
  const whole = reduce(demoLike({ dampingWay: 'none' }), null);

  it('moves its own impulse bit and the mean, and no other shot', () => {
    const r = of(SHOTS[0], { first: 139 });
    const other = whole.records.filter((record, i) => record.impulseBit?.value !== r.records[i]!.impulseBit?.value).map(({ id }) => id);
    expect(other).toEqual([SHOT]);
    expect(r.run!.mean.value).not.toBe(whole.run!.mean.value);
  });

  it('moves every shot by taps where it is a tap, and none by geometry', () => {
    const r = of(TAPS[1], { tapImpulse: 1.7 });
    for (const n of SHOTS) {
      const [one, other] = [whole, r].map((x) => x.records.find(({ id }) => id === rowId(n))!);
      expect(other!.byTaps!.value).not.toBe(one!.byTaps!.value);
      expect(other!.byGeometry!.value).toBe(one!.byGeometry!.value);
    }
  });

  it('set aside with a reason leaves the mean and stays in the table with its numbers', () => {
    const session = { ...demoLike({ dampingWay: 'none' }), marks: { [SHOT]: { setAside: { reason: 'misfire' } } } };
    const r = reduce(session, null);
    const shot = r.records.find(({ id }) => id === SHOT)!;
    expect(shot.setAside).toBe('misfire');
    expect(shot.impulseBit!.value).toBe(whole.records.find(({ id }) => id === SHOT)!.impulseBit!.value);
    expect([r.run!.n, r.run!.of]).toEqual([SHOTS.length - 1, SHOTS.length]);
    expect(r.runWithSetAside!.mean.value).toBeCloseTo(whole.run!.mean.value, 15);
    expect(whole.runWithSetAside).toBeNull();
  });

  it('set aside is a tap that no longer calibrates', () => {
    const r = reduce({ ...demoLike(), marks: { [TAP]: { setAside: { reason: 'slipped' } } } }, null);
    expect(r.calibrations.taps!.taps).toBe(TAPS.length - 1);
  });
});

describe('reduce', () => {
  it('gives the same for the same session, and leaves the session as it was', () => {
    const session = demoLike();
    const before = JSON.stringify(session);
    expect(reduce(session, SHOT)).toEqual(reduce(session, SHOT));
    expect(JSON.stringify(session)).toBe(before);
  });

  it('returns plain values that survive a trip between threads', () => {
    const r = reduce(demoLike(), SHOT);
    expect(structuredClone(r)).toEqual(r);
  });
});
