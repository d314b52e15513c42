/** Pressures as gauges show them, through the road to absolute ones. */
import { describe, expect, it } from 'vitest';
import { perShotCsv } from '../../src/exports/perShotTable.ts';
import { sentence } from '../../src/problems/sentences.ts';
import { reduce } from '../../src/reduction/reduce.ts';
import type { Reduction } from '../../src/reduction/results.ts';
import { entry, type Choices, type Entry, type Session } from '../../src/session/session.ts';
import type { EntryName } from '../../src/session/entries.ts';
import { rowId, sessionOf, type Row } from '../fixtures/session.ts';

type Entries = Readonly<Partial<Record<EntryName, string | Entry>>>;

/** A bob that swings 3 mrad at each shot; the pressure column in a unit of the test's own. */
function bench(choices: Partial<Choices>, entries: Entries, pressures: readonly (string | undefined)[] = [undefined, undefined], unit = 'Pa'): Session {
  const rows: readonly Row[] = pressures.map((pressure) => ({ rest: '0.00', first: '1.50', ...(pressure === undefined ? {} : { pressure }) }));
  const session = sessionOf({
    choices: { form: 'pointBob', dampingWay: 'none', ...choices },
    entries: { bobMass: '50 ± 0.1 g', bobDistance: '500 ± 1 mm', leverArm: '500 ± 1 mm', readingRadius: '500 ± 1 mm', gravity: '9.81 ± 0.001 m/s²', ...entries },
    rows,
  });
  const [sheet] = session.sheets;
  return { ...session, sheets: [{ ...sheet!, columns: sheet!.columns.map((column) => (column.role === 'pressure' ? { ...column, unit } : column)) }] };
}

const codes = (r: Reduction): readonly string[] => r.problems.map((p) => p.code);
const kPa = (r: Reduction): number => r.pressure!.absolute.value / 1000;
const PRESSURE = /pressure|vacuum|gauge|barometer|height-/;

describe('percent of the outside pressure', () => {
  // Common practice, no source: what a ratio dial leaves of 101.325 kPa.
  it.each([['95.26', 4.80, 2], ['83', 17.2, 1], ['66', 34.5, 1]] as const)('a ratio dial at %s % leaves %f kPa', (shown, left, decimals) => {
    const r = reduce(bench({ gaugeMeaning: 'percentOfOutside' }, { barometer: '101.325 ± 0.1 kPa' }, [shown, shown], '%'), null);
    expect(kPa(r)).toBeCloseTo(left, decimals);
    expect(r.records.map((record) => record.pressure!.value)).toEqual([r.pressure!.absolute.value, r.pressure!.absolute.value]);
    expect(reduce(bench({ gaugeMeaning: 'percentOfOutside' }, { barometer: '101.325 kPa', pressure: `${shown} %` }), null).pressure!.absolute.value).toBeCloseTo(r.pressure!.absolute.value, 9);
  });
});

describe('what a dial at 95 % and 98.0 kPa outside leaves (methods 1.15)', () => {
  const at = (choices: Partial<Choices>, entries: Entries): Reduction => reduce(bench(choices, entries, ['95', '95'], '%'), null);

  it('is 1.741 kPa on a fixed scale and 4.900 kPa by the ratio; by the ratio of a standard atmosphere it would be 5.066', () => {
    expect(kPa(at({ gaugeMeaning: 'percentOfScale' }, { barometer: '98.0 kPa' }))).toBeCloseTo(1.741, 3);
    expect(kPa(at({ gaugeMeaning: 'percentOfOutside' }, { barometer: '98.0 kPa' }))).toBeCloseTo(4.9, 3);
    expect(kPa(at({ gaugeMeaning: 'percentOfOutside' }, { barometer: '1 atm' }))).toBeCloseTo(5.066, 3);
  });

  it('is not known until a person has said what the percent are of', () => {
    const r = at({}, { barometer: '98.0 kPa' });
    expect(r.pressure).toBeNull();
    expect(r.records.map((record) => record.pressure)).toEqual([null, null]);
    expect(r.problems.filter((p) => p.code === 'gauge-meaning-unclear').map(sentence)).toEqual([expect.stringMatching(/nobody has said of what/)]);
    expect(r.problems.find((p) => p.code === 'gauge-meaning-unclear')!.place.record).toBe(rowId(1));
    expect(r.run).not.toBeNull();
  });

  it('is known to no better than the class of the dial, 2.5 % of full scale as limits', () => {
    const r = at({ gaugeMeaning: 'percentOfScale' }, { barometer: '98.0 kPa', dialClass: '2.5 %' });
    // 2.5 % of 101.325 kPa over √3, and the last digit, 1 % of it, over √12.
    expect(r.pressure!.absolute.u).toBeCloseTo(Math.hypot((0.025 * 101_325) / Math.sqrt(3), (0.01 * 101_325) / Math.sqrt(12)), 6);
    // Both shots share the dial: two readings alike tell no more than one.
    expect(r.records[0]!.pressure!.u).toBeCloseTo(r.pressure!.absolute.u, 6);
  });

  it('cannot be had without an outside pressure', () => {
    const r = at({ gaugeMeaning: 'percentOfScale' }, {});
    expect(r.pressure).toBeNull();
    expect(codes(r)).toContain('outside-pressure-missing');
  });
});

describe('the outside pressure', () => {
  const gauge = (entries: Entries): Reduction => reduce(bench({ gaugeMeaning: 'gauge' }, { pressure: '-90.0 kPa', ...entries }), null);

  it('follows from the height where no barometer was read, uncertain by the weather', () => {
    const r = gauge({ height: '500 m' });
    // Standard atmosphere at 500 m of geopotential height: 95.461 kPa (methods 1.15); 500 m above the sea is 4 cm less of it.
    expect(r.pressure!.outside!.value / 1000).toBeCloseTo(95.461, 2);
    expect(r.pressure!.outside!.u).toBeCloseTo((1000 * 95.461) / 101.325, 0);
    expect(r.pressure!.outsideFrom).toBe('height');
    expect(kPa(r)).toBeCloseTo(5.461, 2);
  });

  it('is the barometer’s where one was read, unless it stands for the sea', () => {
    const r = gauge({ barometer: '95.5 ± 0.1 kPa', height: '500 m' });
    expect(kPa(r)).toBeCloseTo(5.5, 12);
    expect(codes(r)).not.toContain('barometer-at-sea-level');
    expect(codes(gauge({ barometer: '101.3 kPa', height: '500 m' }))).toContain('barometer-at-sea-level');
  });

  it('is not reckoned above the standard atmosphere', () => {
    expect(codes(gauge({ height: '20000 m' }))).toContain('height-beyond-atmosphere');
  });

  it('plays no part for an absolute gauge', () => {
    const r = reduce(bench({}, { pressure: '0.002 Pa', height: '20000 m' }), null);
    expect(r.pressure!.outside).toBeNull();
    expect(codes(r).filter((code) => PRESSURE.test(code))).toEqual([]);
  });
});

describe('units of the column', () => {
  const at = (unit: string, shown: string, choices: Partial<Choices> = {}): Reduction => reduce(bench(choices, { barometer: '101.325 kPa' }, [shown, shown], unit), null);

  // NIST SP 811 App. B: 1 torr = 133.322 Pa, 1 inHg = 3.38639 kPa.
  it.each([['kPa', '5', 5], ['mbar', '50', 5], ['Torr', '37.5', 4.9996], ['inHg', '1.5', 5.0796]] as const)('%s, absolute', (unit, shown, left) => {
    expect(kPa(at(unit, shown))).toBeCloseTo(left, 3);
  });

  it.each([['−kPa', '96.3', 5.025], ['−kPa', '-96.3', 5.025], ['−inHg', '28.4', 5.152]] as const)('%s counts down from the outside pressure, once the gauge is said to show that', (unit, shown, left) => {
    expect(codes(at(unit, shown))).toContain('gauge-meaning-unclear');
    expect(at(unit, shown).pressure).toBeNull();
    expect(kPa(at(unit, shown, { gaugeMeaning: 'gauge' }))).toBeCloseTo(left, 3);
  });

  it('kPa where the gauge is said to show percent is asked about', () => {
    expect(codes(at('kPa', '5', { gaugeMeaning: 'percentOfScale' }))).toContain('gauge-meaning-unclear');
  });
});

describe('pressures that cannot be', () => {
  it.each([
    ['pressure-below-zero', { gaugeMeaning: 'percentOfScale' }, '98.5', '%', /which cannot be/],
    ['pressure-below-zero', { gaugeMeaning: 'absolute' }, '-90', 'kPa', /counts from the outside/],
    ['pressure-beyond-dial', { gaugeMeaning: 'percentOfOutside' }, '101', '%', /not on a dial/],
  ] as const)('%s: %o at %s %s', (code, choices, shown, unit, words) => {
    const r = reduce(bench(choices, { barometer: '98.0 kPa' }, [shown, shown], unit), null);
    expect(r.records.map((record) => record.pressure)).toEqual([null, null]);
    // Told once, not in every row.
    expect(r.problems.filter((p) => p.code === code).map(sentence)).toEqual([expect.stringMatching(words)]);
  });

  it('above the outside pressure: a dial that counts down, written without its sign', () => {
    expect(codes(reduce(bench({ gaugeMeaning: 'gauge' }, { barometer: '98 kPa' }, ['95', '95'], 'kPa'), null))).toContain('pressure-above-outside');
  });
});

describe('a figure that is no vacuum impulse bit', () => {
  const said = (pressure: string, more: Partial<Choices> = {}, entries: Entries = {}): readonly string[] =>
    reduce(bench(more, { pressure, ...entries }), null).problems.filter((p) => p.code === 'not-a-vacuum-figure').map(sentence);

  it('is said to be none above 0.1 Pa, a judgement that can be changed', () => {
    expect(said('0.09 Pa')).toEqual([]);
    expect(said('5 Pa')).toEqual([expect.stringMatching(/not a vacuum impulse bit/)]);
    expect(said('5 Pa', {}, { vacuumBelow: '10 Pa' })).toEqual([]);
  });

  it('is said so in stronger words at kilopascals, where the plume drives gas at the target', () => {
    expect(said('5 kPa', { plume: 'caught' })).toEqual([expect.stringMatching(/stops within centimetres.*blast of driven gas.*do not set it beside vacuum figures/)]);
    expect(said('5 Pa', { plume: 'caught' })).toEqual([expect.stringMatching(/gas that the plume drives at it/)]);
  });
});

describe('the run', () => {
  it('says so where one mean is taken over absolute pressures that differ', () => {
    const near = reduce(bench({ gaugeMeaning: 'percentOfScale' }, { barometer: '101.325 kPa' }, ['95', '94'], '%'), null);
    expect(codes(near)).not.toContain('pressures-mixed');
    // 95 % and 90 % look alike, and are 5 and 10 kPa.
    const mixed = reduce(bench({ gaugeMeaning: 'percentOfScale' }, { barometer: '101.325 kPa' }, ['95', '90'], '%'), null);
    expect(codes(mixed)).toContain('pressures-mixed');
    expect(mixed.pressure!.mixed).toBe(true);
    expect([mixed.pressure!.least / 1000, mixed.pressure!.largest / 1000]).toEqual([expect.closeTo(5.066, 3), expect.closeTo(10.133, 3)]);
    // Range of 5.066 kPa as a rectangle about the mean is more than a reading to the nearest percent.
    expect(mixed.pressure!.absolute.u).toBeGreaterThan(5066 / Math.sqrt(12));
  });

  it('leaves the shots set aside out of its pressure', () => {
    const session = bench({}, {}, ['0.002', '0.02']);
    const r = reduce({ ...session, marks: { [rowId(2)]: { setAside: { reason: 'leak' } } } }, null);
    expect(r.pressure!.absolute.value).toBeCloseTo(0.002, 12);
    expect(r.records[1]!.pressure!.value).toBeCloseTo(0.02, 12);
  });

  it('writes each shot’s absolute pressure with its u, and what the gauge meant', () => {
    const session = bench({ gaugeMeaning: 'percentOfOutside' }, { barometer: entry('101.325 ± 0.2 kPa') }, ['95.26', '95.26'], '%');
    const csv = perShotCsv(session, reduce(session, null));
    expect(csv).toMatch(/absolute pressure \(Pa\),u of absolute pressure \(Pa\)/);
    expect(csv).toMatch(/a dial in percent of the outside pressure, outside 101325 Pa.*by barometer; not a vacuum figure/);
    expect(csv).toMatch(/,4802\.805,/);
  });
});
