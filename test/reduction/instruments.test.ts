/** One ruler for many lengths: its calibration error is one error, wherever it acts. Sensitivities by hand from the formulas beside them. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { perShotCsv } from '../../src/exports/perShotTable.ts';
import { covariance, propagate, standardUncertainty } from '../../src/metrology/uncertain.ts';
import { readBench } from '../../src/reduction/entries.ts';
import { reduce } from '../../src/reduction/reduce.ts';
import type { BudgetLine, Reduction } from '../../src/reduction/results.ts';
import { addInstrument, removeInstrument, setEntryInstrument, setInstrument, setInstrumentScale, setPartEntryInstrument, setSheetInstrument, setTitle, type Edit } from '../../src/session/edits.ts';
import type { EntryName } from '../../src/session/entries.ts';
import { entry, type Session } from '../../src/session/session.ts';
import { demoLike } from '../fixtures/demoLike.ts';
import { rowId, sessionOf, SHEET, type SessionParts } from '../fixtures/session.ts';

const RULER = { name: 'steel ruler', serial: '4711', certificate: 'C-12', due: '2027-03-31' } as const;
const SCALE = 0.001;
const withEdits = (session: Session, ...edits: readonly Edit[]): Session => edits.reduce((so, edit) => edit(so), session);
const ruler = (scale = `${100 * SCALE} %`): readonly Edit[] => [addInstrument(RULER), setInstrumentScale('i1', { text: scale })];
const measured = (...names: readonly EntryName[]): readonly Edit[] => names.map((name) => setEntryInstrument(name, 'i1'));

/** A point bob whose small swing is read as a length along the arc: I = m √(g L³) (s x/R)/r_t. */
const bench = (more: Partial<SessionParts> = {}): Session => sessionOf({
  choices: { form: 'pointBob', readingWay: 'arcRuler', dampingWay: 'none', swingForm: 'smallAngle', ...more.choices },
  entries: { bobMass: '10 g', bobDistance: '300 mm', gravity: '9.8 m/s²', leverArm: '250 mm', readingRadius: '280 mm', division: '1e-9 mm', ...more.entries },
  rows: more.rows ?? [{ rest: 0, first: 20 }, { rest: 0, first: 21 }, { rest: 0, first: 20.5 }],
});
const lineOf = (r: Reduction, id: string): BudgetLine | undefined => r.run!.budget.lines.find((line) => line.id === id);
const relative = (r: Reduction): number => lineOf(r, 'instrument.i1')!.contribution / r.run!.mean.value;

describe('two lengths measured with one ruler', () => {
  const session = withEdits(bench({ entries: { leverArm: '250.0 ± 0.5 mm', bobDistance: '300.0 ± 0.3 mm' } }), ...ruler('1 %'), ...measured('leverArm', 'bobDistance'));
  const read = readBench(session);
  const [arm, length] = [read.entries.get('leverArm')!.value!, read.entries.get('bobDistance')!.value!];

  it('share its calibration and nothing else', () => {
    // u(a, b) = a b u_s².
    expect(covariance(arm, length) / (0.25 * 0.3 * 0.01 ** 2)).toBeCloseTo(1, 9);
    expect(standardUncertainty(arm) / Math.hypot(0.0005, 0.25 * 0.01)).toBeCloseTo(1, 6);
  });

  it('have a ratio that knows nothing of it', () => {
    const ratio = propagate(({ a, b }) => a / b, { a: arm, b: length });
    expect(standardUncertainty(ratio) / (ratio.value * Math.hypot(0.5 / 250, 0.3 / 300))).toBeCloseTo(1, 3);
  });

  it('keep their own ± apart in what is said back of them', () => {
    const told = read.entries.get('leverArm')!.read;
    expect(told.u / 0.0005).toBeCloseTo(1, 9);
    expect(told.measuredWith).toEqual({ words: 'steel ruler, serial 4711, certificate C-12, due 2027-03-31', u: expect.closeTo(0.0025, 12) });
  });
});

describe('the ruler in the run', () => {
  it('acts as often as lengths do: with L alone 3/2, with L and r_t 1/2, with R too −1/2, and with the readings 1/2 again', () => {
    const lines = (names: readonly EntryName[], readings: boolean): number => relative(reduce(withEdits(bench(), ...ruler(), ...measured(...names), ...(readings ? [setSheetInstrument(SHEET, 'i1')] : [])), null));
    expect(lines(['bobDistance'], false) / (1.5 * SCALE)).toBeCloseTo(1, 5);
    expect(lines(['bobDistance', 'leverArm'], false) / (0.5 * SCALE)).toBeCloseTo(1, 5);
    expect(lines(['bobDistance', 'leverArm', 'readingRadius'], false) / (-0.5 * SCALE)).toBeCloseTo(1, 5);
    expect(lines(['bobDistance', 'leverArm', 'readingRadius'], true) / (0.5 * SCALE)).toBeCloseTo(1, 5);
  });

  it('stands in the budget under its name, once, and common to the shots', () => {
    const r = reduce(withEdits(bench(), ...ruler(), ...measured('bobDistance', 'leverArm'), setSheetInstrument(SHEET, 'i1')), rowId(1));
    const lines = r.run!.budget.lines.filter(({ id }) => id.startsWith('instrument.'));
    expect(lines).toHaveLength(1);
    expect(lines[0]).toMatchObject({ label: 'Calibration of steel ruler, serial 4711, certificate C-12, due 2027-03-31', scope: 'common', estimate: 1, u: SCALE });
    expect(r.run!.uCommon).toBeCloseTo(Math.abs(lines[0]!.contribution), 15);
    expect(r.explained!.budget!.lines.find(({ id }) => id === 'instrument.i1')!.scope).toBe('common');
  });

  it('stands in the chain with the readings, their scale and the arm', () => {
    const r = reduce(withEdits(bench(), ...ruler(), ...measured('leverArm'), setSheetInstrument(SHEET, 'i1')), rowId(1));
    const steps = r.explained!.chain.filter(({ measuredWith }) => measuredWith !== undefined).map(({ id }) => id);
    expect(steps).toEqual(['rest', 'first', 'scale', 'arm']);
    expect(r.explained!.chain.find(({ id }) => id === 'scale')!.stated).toEqual({ value: 1, u: expect.closeTo(SCALE, 12) });
  });

  it('is named beside the line of the quantity that it measured', () => {
    const r = reduce(withEdits(bench({ entries: { leverArm: '250.0 ± 0.5 mm' } }), ...ruler(), ...measured('leverArm')), null);
    expect(lineOf(r, 'leverArm')!.measuredWith).toContain('serial 4711');
  });

  it('as limits counts a/√3 (GUM 4.3.7), and a typed ± sign does no harm', () => {
    const r = reduce(withEdits(bench(), addInstrument(RULER), setInstrumentScale('i1', { text: '± 0.1 %', plusMinus: 'limits' }), ...measured('bobDistance')), null);
    expect(relative(r) / (1.5 * SCALE / Math.sqrt(3))).toBeCloseTo(1, 5);
    expect(lineOf(r, 'instrument.i1')!.distribution).toBe('rectangular');
  });

  it('of two sheets acts on the readings of its own alone', () => {
    const one = withEdits(bench(), ...ruler(), setSheetInstrument(SHEET, 'i1'));
    const two: Session = { ...one, sheets: [...one.sheets, { ...bench().sheets[0]!, id: 's2', name: 'other ruler' }] };
    expect(relative(reduce(one, null)) / SCALE).toBeCloseTo(1, 6);
    expect(relative(reduce(two, null)) / (SCALE / 2)).toBeCloseTo(1, 6);
  });
});

describe('a ruler shared by taps and geometry', () => {
  // K by taps: s_h I_h r_h R/x, by geometry: m √(g L³). With one ruler for L, r_h, R and the readings: (1 + 1 − 1) − 3/2 = −1/2.
  const rows = [...[1, 2, 3].map((k) => ({ kind: 'tap' as const, rest: 0, first: 10 * k, tapImpulse: (0.01 * Math.sqrt(9.8 * 0.3 ** 3) * 10 * k) / 280 / 0.2 * 1e3 })), { rest: 0, first: 20 }, { rest: 0, first: 21 }];
  const lengths = ['bobDistance', 'tapLeverArm', 'readingRadius'] as const;
  const session = bench({ rows, entries: { tapLeverArm: '200 mm' } });

  it('cancels in their difference as far as it is in both', () => {
    const shared = reduce(withEdits(session, ...ruler('1 %'), ...measured(...lengths), setSheetInstrument(SHEET, 'i1')), null);
    expect(shared.difference!.relative.u / 0.005).toBeCloseTo(1, 2);
    const apart = lengths.reduce((so, name, k) => withEdits(so, addInstrument({ name: `ruler ${k}` }), setInstrumentScale(`i${k + 1}`, { text: '1 %' }), setEntryInstrument(name, `i${k + 1}`)), session);
    expect(reduce(apart, null).difference!.relative.u / (0.01 * Math.hypot(1.5, 1, 1))).toBeCloseTo(1, 2);
  });

  it('is found by the adjustment where it acts on the two unlike: s^½ = 1.05 makes K 1.05³ times that of the masses', () => {
    const off = bench({ rows: rows.map((row) => ('tapImpulse' in row ? { ...row, tapImpulse: 1.05 * row.tapImpulse } : row)), entries: { tapLeverArm: '200 mm', bobMass: '10 g ± 0.01 %', gravity: '9.8 m/s² ± 0.01 %', hammerFactor: '1 ± 0.01 %' } });
    // 5 % keeps the half-differences' own curvature below the tolerance.
    const r = reduce(withEdits(off, ...ruler('5 %'), ...measured(...lengths), setSheetInstrument(SHEET, 'i1')), null);
    expect(factorOf(r, 'adjustment') / factorOf(r, 'masses')).toBeCloseTo(1.05 ** 3, 2);
  });
});

const factorOf = (r: Reduction, id: string): number => r.evidence.find((row) => row.id === id)!.factor.value;

describe('a balance shared by the bob and the hammer', () => {
  // Both ways go with the mass; by its swing the hammer gives m_h √(2 g l (1 − cos 60°)) = 2.8 mN·s, and the throws say 1.2 K.
  const K = 0.01 * Math.sqrt(9.8 * 0.3 ** 3);
  const x = (280 * 0.0028 * 0.2) / K / 1.2;
  const session: Session = {
    ...bench({ entries: { bobMass: '10 g ± 3 %', bobDistance: '300 mm ± 0.1 %', gravity: '9.8 m/s² ± 0.1 %', hammerMass: '2 g', hammerLength: '200 mm', hammerFactor: '1 ± 3 %', tapLeverArm: '200 mm' } }),
    sheets: [{
      ...bench().sheets[0]!, text: `Kind;Rest;First;Hammer\ntap;0;${x};60\ntap;0;${x};60\nshot;0;20;\n`,
      columns: [{ role: 'kind', unit: '', by: 'person' }, { role: 'rest', unit: 'mm', by: 'person' }, { role: 'firstSwing', unit: 'mm', by: 'person' }, { role: 'hammerIn', unit: '°', by: 'person' }],
    }],
  };

  it('does not drag their adjustment outside what the two say: 1.0 and 1.2 with 3 % each and 20 % shared', () => {
    const r = reduce(withEdits(session, addInstrument({ name: 'balance', measures: 'mass' }), setInstrumentScale('i1', { text: '20 %' }), ...measured('bobMass', 'hammerMass')), null);
    expect(factorOf(r, 'masses') / K).toBeCloseTo(1, 9);
    expect(factorOf(r, 'taps') / K).toBeCloseTo(1.2, 6);
    expect(factorOf(r, 'adjustment') / K).toBeGreaterThan(1);
    expect(factorOf(r, 'adjustment') / K).toBeLessThan(1.2);
    const own = r.evidence.find(({ id }) => id === 'adjustment')!.factor;
    expect(own.u / own.value).toBeGreaterThan(0.19);
  });
});

describe('what an instrument does not do', () => {
  const plain = demoLike();
  const bare = reduce(plain, null);

  it('without a calibration ± it changes no number', () => {
    const named = reduce(withEdits(plain, addInstrument(RULER), ...measured('leverArm'), setPartEntryInstrument('p1', 'distance', 'i1'), setSheetInstrument(SHEET, 'i1')), null);
    expect(named.run!.mean).toEqual(bare.run!.mean);
    expect(named.entries.find(({ name }) => name === 'leverArm')!.measuredWith!.u).toBe(0);
  });

  it('taken out again it leaves the numbers as they were, and every entry as typed', () => {
    const there = withEdits(plain, ...ruler('5 %'), ...measured('leverArm'), setPartEntryInstrument('p1', 'distance', 'i1'), setSheetInstrument(SHEET, 'i1'));
    expect(reduce(there, null).run!.mean.u).toBeGreaterThan(bare.run!.mean.u);
    const without = removeInstrument('i1')(there);
    expect(without.entries).toEqual(plain.entries);
    expect(without.parts).toEqual(plain.parts);
    expect(reduce(without, null).run).toEqual(bare.run);
  });

  it.each(['mass', 'time', 'other'] as const)('one for %s does not act on a length, though it is named there', (measures) => {
    const r = reduce(withEdits(plain, ...ruler('5 %'), setInstrument('i1', { measures }), ...measured('leverArm'), setSheetInstrument(SHEET, 'i1')), null);
    expect(r.run!.mean.u).toBe(bare.run!.mean.u);
    expect(r.entries.find(({ name }) => name === 'leverArm')!.measuredWith!.words).toContain('steel ruler');
  });

  it('a mark on the scale of the readings moves with the readings’ ruler, not a second time', () => {
    const r = reduce(withEdits(plain, ...ruler('5 %'), setEntryInstrument('scaleMark', 'i1')), null);
    expect(r.run!.mean.u).toBe(bare.run!.mean.u);
  });

  it('a name of one that is not there counts as none', () => {
    expect(reduce(withEdits(plain, setEntryInstrument('leverArm', 'i9'), setSheetInstrument(SHEET, 'i9')), null).run).toEqual(bare.run);
  });
});

describe('whatever is typed for an instrument', () => {
  const text = fc.oneof(fc.constantFrom('0.1 %', '± 2 %', '100 %', '500 %', '1e9', '-1 %', '0', '0,5', '0.1 mm', 'about 1', '1e-20 %'), fc.string({ maxLength: 6 }));
  it('a calibration of ±30 % and more is questioned, and one of ±100 % is refused at its field', () => {
    const told = (scale: string): readonly unknown[] => {
      const r = reduce(withEdits(demoLike(), ...ruler(scale), ...measured('leverArm')), null);
      return [r.problems.find(({ place }) => place.entry === 'instrument.i1.scale')?.code, r.run!.budget.lines.some(({ id }) => id === 'instrument.i1')];
    };
    expect(told('5 %')).toEqual([undefined, true]);
    expect(told('40 %')).toEqual(['instrument-calibration-wide', true]);
    expect(told('100 %')).toEqual(['entry-out-of-range', false]);
    expect(told('0.1 mm')).toEqual(['entry-wrong-kind-of-unit', false]);
  });

  it('the run has a mean, no NaN, and no narrower an interval than without', () => {
    const bare = reduce(demoLike(), null).run!;
    fc.assert(fc.property(text, text, text, fc.constantFrom('standard', 'limits', 'expanded'), fc.constantFrom<EntryName>('leverArm', 'readingRadius', 'tapLeverArm'), (scale, due, date, plusMinus, name) => {
      const r = reduce(withEdits(demoLike(), setTitle({ date }), addInstrument({ ...RULER, due }), setInstrumentScale('i1', { text: scale, plusMinus, k: due }), setEntryInstrument(name, 'i1')), rowId(6));
      expect(JSON.stringify(r)).not.toContain('NaN');
      expect(r.run!.mean.value / bare.mean.value).toBeCloseTo(1, 12);
      expect(r.run!.mean.u).toBeGreaterThanOrEqual(bare.mean.u * (1 - 1e-9));
    }), { numRuns: 60 });
  });
});

describe('due dates', () => {
  const codes = (date: string, due: string): readonly string[] => reduce(withEdits(demoLike(), setTitle({ date }), addInstrument({ ...RULER, due })), null).problems.filter(({ code }) => code.startsWith('instrument-')).map(({ code }) => code);

  it('a calibration that ran out before the session is noted by the instrument’s name', () => {
    expect(codes('5 May 2027', '31.3.2027')).toEqual(['instrument-overdue']);
    const found = reduce(withEdits(demoLike(), setTitle({ date: '2027-04-01' }), addInstrument(RULER)), null).problems.find(({ code }) => code === 'instrument-overdue')!;
    expect(found).toMatchObject({ weight: 'note', place: { entry: 'instrument.i1.due' }, facts: { name: 'steel ruler, serial 4711', due: '2027-03-31', date: '2027-04-01' } });
  });

  it('one due on the day itself or later is not, nor where the session has no date', () => {
    expect(codes('2027-03-31', '2027-03-31')).toEqual([]);
    expect(codes('3/2027', '2027-03')).toEqual([]);
    expect(codes('', '1999-01-01')).toEqual([]);
    expect(codes('some day', '1999-01-01')).toEqual([]);
  });

  it('a due date that is none is told, and none of it is taken', () => {
    expect(codes('2027-03-31', 'in spring')).toEqual(['instrument-due-unread']);
    expect(codes('2027-03-31', ' ')).toEqual([]);
  });
});

describe('the saved table', () => {
  it('says what each quantity and sheet was measured with, by serial, certificate and due date', () => {
    const session = withEdits(demoLike(), addInstrument({ ...RULER, due: '31.3.2027' }), setInstrumentScale('i1', { text: '0.05 %', plusMinus: 'limits' }), ...measured('leverArm'), setPartEntryInstrument('p1', 'distance', 'i1'), setSheetInstrument(SHEET, 'i1'));
    const csv = perShotCsv(session, reduce(session, null));
    const words = 'steel ruler, serial 4711, certificate C-12, due 31.3.2027';
    expect(csv).toContain(`instrument: ${words} (read as 2027-03-31); calibration, common to each length measured with it: typed “0.05 %”, relative u 0.0002886751346, rectangular`);
    expect(csv).toMatch(new RegExp(`Lever arm of the thrust r_t: typed “380 ± 2 mm”, .*measured with ${words}, whose calibration adds u 0\\.0001096965511 m`));
    expect(csv).toMatch(new RegExp(`Part 1: pivot to its centre of mass r_i: .*measured with ${words}`));
    expect(csv).toContain(`readings: bench.csv, read with ${words}`);
  });

  it('has an entry measured with nothing named as before', () => {
    const session = { ...demoLike(), entries: { ...demoLike().entries, leverArm: entry('380 mm') } };
    expect(perShotCsv(session, reduce(session, null))).not.toContain('measured with');
  });
});
