/** Each thing that can be wrong with the input says so, costs its own row or entry, and leaves the rest as it was. */
import { describe, expect, it } from 'vitest';
import type { Problem, ProblemCode } from '../../src/problems/problems.ts';
import { sentence } from '../../src/problems/sentences.ts';
import { reduce } from '../../src/reduction/reduce.ts';
import type { RecordResult, Reduction } from '../../src/reduction/results.ts';
import type { EntryName } from '../../src/session/entries.ts';
import { entry, type Choices, type Session, type Sheet } from '../../src/session/session.ts';
import { demoLike, DEMO_ROWS, SHOTS, TAPS } from '../fixtures/demoLike.ts';
import { rowId, withChoices, withEntry, type Row } from '../fixtures/session.ts';

const CHOICES: Partial<Choices> = { dampingWay: 'ratio' };
const sound = (rows: readonly Row[] = DEMO_ROWS): Session => withEntry(demoLike(CHOICES, rows), 'dampingRatio', entry('0.012 ± 0.001'));
const whole = reduce(sound(), null);
const bits = (r: Reduction): ReadonlyMap<string, number | undefined> => new Map(r.records.map((record) => [record.id, record.impulseBit?.value]));
const codes = (problems: readonly Problem[]): readonly ProblemCode[] => problems.map((p) => p.code);
const recordOf = (r: Reduction, id: string): RecordResult => r.records.find((record) => record.id === id)!;

/** The session with cells of one row changed. */
function reducedWith(row: number, change: Row): Reduction {
  return reduce(sound(DEMO_ROWS.map((given, i) => (i === row - 1 ? { ...given, ...change } : given))), null);
}

/** Records whose impulse bit is another than in the sound session. */
function otherThanSound(r: Reduction): readonly string[] {
  const before = bits(whole);
  return [...bits(r)].filter(([id, value]) => value !== before.get(id)).map(([id]) => id);
}

describe('one bad reading', () => {
  const CASES: readonly (readonly [string, Row, ProblemCode, boolean])[] = [
    ['a word where the first swing should be', { first: 'twelve' }, 'cell-not-a-number', false],
    ['a word where the rest should be', { rest: 'about the same' }, 'cell-not-a-number', false],
    ['no first swing', { first: '' }, 'cell-empty', false],
    ['a unit that nobody knows', { first: '135.5 furlong' }, 'cell-unknown-unit', false],
    ['a unit of another kind', { first: '135.5 kg' }, 'cell-wrong-kind-of-unit', false],
    ['a reading longer than the radius', { first: 900 }, 'record-reading-beyond-radius', false],
    ['a number past all reason', { first: '1e300' }, 'cell-not-a-number', false],
    ['two decimal points', { first: '135.5.5' }, 'cell-not-a-number', false],
    ['a decimal comma among points', { first: '135,5' }, 'cell-not-a-number', false],
    ['a first swing equal to the rest', { first: 118.0 }, 'record-no-throw', true],
    ['a first swing on the wrong side', { first: 101.0 }, 'record-negative-throw', true],
  ];

  it.each(CASES)('costs its row alone: %s', (_, change, code, hasBit) => {
    const id = rowId(SHOTS[0]);
    const r = reducedWith(SHOTS[0], change);
    const record = recordOf(r, id);
    expect(codes(record.problems)).toContain(code);
    expect(codes(r.problems)).toContain(code);
    const found = record.problems.find((p) => p.code === code)!;
    expect([found.place.sheet, found.place.line, found.place.record]).toEqual(['s1', SHOTS[0] + 1, id]);
    expect(sentence(found)).toContain(`line ${SHOTS[0] + 1}`);
    expect(record.impulseBit !== null).toBe(hasBit);
    expect(r.run!.n).toBe(SHOTS.length - (hasBit ? 0 : 1));
    expect(otherThanSound(r)).toEqual([id]);
  });

  it('of a voltage costs the voltage and not the impulse bit', () => {
    const r = reducedWith(SHOTS[0], { voltage: 'high' });
    expect(codes(recordOf(r, rowId(SHOTS[0])).problems)).toEqual(['cell-not-a-number']);
    expect(otherThanSound(r)).toEqual([]);
  });

  it('of a kind falls back on what is filled in', () => {
    const base = sound();
    const sheet = base.sheets[0]!;
    const r = reduce({ ...base, sheets: [{ ...sheet, edits: { [SHOTS[0] + 1]: { 0: 'gizmo' } } }] }, null);
    const record = recordOf(r, rowId(SHOTS[0]));
    expect([record.kind, record.kindBy]).toEqual(['shot', 'filledIn']);
    expect(codes(record.problems)).toEqual(['cell-kind-unknown']);
    expect(otherThanSound(r)).toEqual([]);
  });

  it('just within the reach of the ruler is a reading, though its uncertainty ends beyond', () => {
    const edge = reduce(withEntry(withEntry(sound([{ rest: 0, first: 401.99 }, { rest: 0, first: 20 }, { rest: 0, first: 21 }]), 'scaleMark', entry('')), 'scaleFactor', entry('1')), null);
    expect(codes(recordOf(edge, rowId(1)).problems)).not.toContain('record-reading-beyond-radius');
    expect(recordOf(edge, rowId(1)).impulseBit!.u).toBeGreaterThan(0);
  });
});

describe('a tap', () => {
  it('without its impulse does not calibrate, and the others do', () => {
    const r = reducedWith(TAPS[0], { tapImpulse: '' });
    expect(codes(recordOf(r, rowId(TAPS[0])).problems)).toContain('record-tap-without-impulse');
    expect(r.calibrations.taps!.taps).toBe(TAPS.length - 1);
    expect(otherThanSound(r)).toEqual([]);
  });

  it('without a lever arm for it asks for the lever arm, and geometry goes on', () => {
    const r = reduce(withEntry(sound(), 'tapLeverArm', entry('')), null);
    expect(r.problems.filter((p) => p.code === 'entry-missing').map((p) => p.place.entry)).toEqual(['tapLeverArm']);
    expect(r.runs.geometry).toEqual(whole.runs.geometry && { ...whole.runs.geometry, budget: r.runs.geometry!.budget });
    expect(r.runs.taps).toBeNull();
  });
});

describe('one bad entry', () => {
  const CASES: readonly (readonly [EntryName, string, ProblemCode])[] = [
    ['leverArm', 'a span', 'entry-not-a-number'],
    ['leverArm', '-380 mm', 'entry-out-of-range'],
    ['leverArm', '0 mm', 'entry-out-of-range'],
    ['leverArm', '380 furlong', 'entry-unknown-unit'],
    ['leverArm', '380 g', 'entry-wrong-kind-of-unit'],
    ['leverArm', '1e200 mm', 'entry-out-of-range'],
    ['readingRadius', '', 'entry-missing'],
    ['calibrationMass', '-5 g', 'entry-out-of-range'],
    ['flexureStiffness', '-1 mN·m/rad', 'entry-out-of-range'],
    ['scaleFactor', '0', 'entry-out-of-range'],
    ['gravity', 'heavy', 'entry-not-a-number'],
    ['dampingRatio', '-0.1', 'entry-out-of-range'],
    ['division', '-0.5 mm', 'entry-out-of-range'],
    ['hammerFactor', '1 ± two', 'entry-not-a-number'],
  ];

  it.each(CASES)('says which and why: %s “%s”', (name, text, code) => {
    const r = reduce(withEntry(sound(), name, entry(text)), rowId(SHOTS[0]));
    const found = r.problems.filter((p) => p.place.entry === name && p.weight === 'stops');
    expect(codes(found)).toContain(code);
    for (const p of found) expect(sentence(p).length).toBeGreaterThan(20);
    // What does not rest on it is as it was.
    expect(r.records.map(({ readings }) => readings)).toEqual(whole.records.map(({ readings }) => readings));
  });

  it('of negative mass stops geometry and names the part', () => {
    const base = sound();
    const parts = base.parts.map((part, i) => (i === 1 ? { ...part, entries: { ...part.entries, mass: entry('-6.2 g') } } : part));
    const r = reduce({ ...base, parts }, null);
    expect(r.problems.filter((p) => p.code === 'entry-out-of-range').map((p) => p.place.entry)).toEqual(['part.p2.mass']);
    expect(r.runs.geometry).toBeNull();
    expect(recordOf(r, rowId(SHOTS[0])).angle).toEqual(recordOf(whole, rowId(SHOTS[0])).angle);
  });

  it('of a coverage factor is told as such', () => {
    const r = reduce(withEntry(sound(), 'leverArm', entry('380 ± 2 mm', 'expanded', 'many')), null);
    expect(codes(r.problems.filter((p) => p.place.entry === 'leverArm'))).toContain('entry-not-a-number');
  });

  it('of a mass hung so high that nothing restores is told, and no number is made up', () => {
    const base = sound();
    const parts = base.parts.map((part, i) => (i === 0 ? { ...part, entries: { ...part.entries, distance: entry('-900 mm') } } : part));
    const r = reduce({ ...base, parts }, null);
    expect(codes(r.problems)).toContain('bench-unstable');
    expect(r.runs.geometry).toBeNull();
  });

  it('of a timing amplitude past upright is told, and geometry by masses goes on', () => {
    const r = reduce(withEntry(sound(), 'periodAmplitude', entry('200 °')), null);
    expect(r.problems.some((p) => p.place.entry === 'periodAmplitude' && p.weight === 'stops')).toBe(true);
    expect(r.periodCheck).toBeNull();
    expect(r.runs.geometry!.mean).toEqual(whole.runs.geometry!.mean);
  });

  it.each(['0.1 ± 0.9', '0.001 ± 5', '0.999999', '1', '1.5', '40', '1e6'])('of the damping ratio “%s” goes through to some end', (text) => {
    const r = reduce(withEntry(sound(), 'dampingRatio', entry(text)), rowId(SHOTS[0]));
    for (const record of r.records) expect(codes(record.problems)).not.toContain('record-reading-beyond-radius');
  });

  it.each(['31.6 -29.1 26.9 furlong', '31.6 kg', 'x y z', '31.6 -29.1', '1e300 -1e300 1e299 mm', '10 20 30 40 mm'])('in the free swing “%s” stops nothing but the damping', (freeSwing) => {
    const r = reduce({ ...withChoices(sound(), { dampingWay: 'swings' }), freeSwing }, null);
    expect(r.run!.n).toBe(SHOTS.length);
  });

  it('where a typed free swing is no list of readings says so', () => {
    const r = reduce({ ...withChoices(sound(), { dampingWay: 'swings' }), freeSwing: '31.6 -29.1 26.9 furlong' }, null);
    expect(r.problems.filter((p) => p.place.entry === 'freeSwing').map((p) => p.weight)).toEqual(['stops']);
  });
});

describe('a whole sheet', () => {
  const sheetWith = (change: Partial<Sheet>): Session => {
    const base = sound();
    return { ...base, sheets: [{ ...base.sheets[0]!, ...change }] };
  };

  it('that is empty says so', () => {
    const r = reduce(sheetWith({ text: '' }), null);
    expect(codes(r.problems)).toContain('file-empty');
    expect(r.records).toEqual([]);
    expect(r.run).toBeNull();
  });

  it('with a header and no rows says so', () => {
    const text = `${sound().sheets[0]!.text.split('\n')[0]}\n`;
    expect(codes(reduce(sheetWith({ text }), null).problems)).toContain('file-no-rows');
  });

  it('without a column of first swings says so', () => {
    const columns = sound().sheets[0]!.columns.map((column) => (column.role === 'firstSwing' ? { ...column, role: 'ignored' as const } : column));
    const r = reduce(sheetWith({ columns }), null);
    expect(codes(r.problems)).toContain('column-missing');
    expect(r.run).toBeNull();
  });

  it('of commas with decimal commas tells each row, and uses none of their numbers', () => {
    const columns = sound().sheets[0]!.columns.slice(1, 4);
    const r = reduce(sheetWith({ text: 'No,Rest,First\n1,118,0,135,5\n2,118,0,137,0\n3,118,136\n', columns, decimal: '.' }), null);
    expect(r.records.map((record) => codes(record.problems).includes('decimal-comma-in-comma-file'))).toEqual([true, true, false]);
    expect(r.records.map((record) => record.impulseBit !== null)).toEqual([false, false, true]);
  });

  it('beside a sound one leaves that one as it was', () => {
    const base = sound();
    const r = reduce({ ...base, sheets: [...base.sheets, { ...base.sheets[0]!, id: 's2', text: 'no table at all\n' }] }, null);
    expect(otherThanSound(r).filter((id) => !id.startsWith('s2/'))).toEqual([]);
  });
});

describe('a ruler that runs backward', () => {
  const mirrored = sound(DEMO_ROWS.map((row) => ({
    ...row, ...(row.rest === undefined ? {} : { rest: 240 - Number(row.rest) }), ...(row.first === undefined ? {} : { first: 240 - Number(row.first) }), ...(row.next ? { next: row.next.map((x) => 240 - Number(x)) } : {}),
  })));

  it('gives one problem for the run, not one a shot', () => {
    const r = reduce(mirrored, null);
    expect(codes(r.problems)).toContain('all-throws-negative');
    expect(codes(r.problems)).not.toContain('record-negative-throw');
    expect(r.run!.mean.value).toBeLessThan(0);
  });

  it('and is marked so gives the same impulse bits as the ruler the other way round', () => {
    const r = reduce(withEntry(withChoices(mirrored, { scaleRunsBackward: true }), 'scaleMark', entry('123 ± 0.5 mm', 'limits')), null);
    expect(codes(r.problems)).not.toContain('all-throws-negative');
    const before = bits(whole);
    expect([...bits(r)].filter(([id, value]) => value !== undefined && !(Math.abs(value - before.get(id)!) <= 1e-12 * Math.abs(value)))).toEqual([]);
    expect(r.run!.mean.u / whole.run!.mean.u).toBeCloseTo(1, 12);
  });
});

describe('what else is worth a look', () => {
  const has = (session: Session, code: ProblemCode): boolean => codes(reduce(session, null).problems).includes(code);

  it('is said', () => {
    expect(has(withEntry(sound(), 'gravity', entry('')), 'gravity-assumed')).toBe(true);
    expect(has(withChoices(sound(), { dampingWay: 'none' }), 'damping-none')).toBe(true);
    expect(has(sound(DEMO_ROWS.slice(0, 7)), 'few-shots')).toBe(true);
    expect(has(sound(DEMO_ROWS.filter((row) => row.kind !== 'shot')), 'no-shots')).toBe(true);
    expect(has(withEntry(sound(), 'division', entry('')), 'division-from-readings')).toBe(true);
    expect(has(withEntry(sound(), 'hammerFactor', entry('1.5 ± 0.01')), 'calibrations-differ')).toBe(true);
    expect(has(withEntry(sound(), 'period', entry('1.5 ± 0.001 s')), 'period-differs')).toBe(true);
    expect(has(withChoices(sound(DEMO_ROWS.map((row) => (row.kind === 'tap' && row.tapImpulse === 2.4 ? { ...row, first: '' } : row))), { calibration: 'taps' }), 'shots-beyond-taps')).toBe(true);
    expect(has(withEntry(sound(), 'leverArm', entry('380 ± 190 mm')), 'entry-uncertainty-large')).toBe(true);
    expect(has(withEntry(sound(), 'leverArm', entry('380 mm')), 'entry-no-uncertainty')).toBe(true);
    expect(has(withEntry(sound(), 'leverArm', entry('380 ± 2')), 'entry-unit-assumed')).toBe(true);
    expect(has(sound(DEMO_ROWS.map((row, i) => (i === 6 ? { ...row, pressure: 0.02 } : row))), 'pressures-mixed')).toBe(true);
    expect(has(sound(DEMO_ROWS.map((row) => (row.kind === 'shot' ? { ...row, rest: 118, first: 135.5 } : row))), 'all-on-one-division')).toBe(true);
    expect(has(sound(DEMO_ROWS.map((row) => (row.kind === 'shot' ? { ...row, rest: 118, first: 135.5 } : row))), 'scatter-below-reading')).toBe(true);
    expect(has(sound(DEMO_ROWS.map((row, i) => (i === 5 ? { ...row, rest: undefined as never } : i === 4 ? { ...row, kind: 'blank' } : row))), 'record-no-rest')).toBe(true);
  });

  it('is not said of a bench where nothing is amiss', () => {
    expect(codes(whole.problems.filter((p) => p.weight === 'stops'))).toEqual([]);
    expect(codes(reduce(withEntry(sound(), 'gravity', entry('9.8094 ± 0.0002 m/s²')), null).problems)).not.toContain('gravity-assumed');
  });

  it('stays on the record it is about, into the table', () => {
    const r = reducedWith(SHOTS[0], { first: 101.0 });
    expect(codes(recordOf(r, rowId(SHOTS[0])).problems)).toEqual(['record-negative-throw']);
    for (const record of r.records) for (const p of record.problems) expect(p.place.record).toBe(record.id);
  });
});
