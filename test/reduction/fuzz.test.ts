/** Whatever is typed, the road comes to its end, and no number of its result is NaN. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { perShotCsv, perShotTabs } from '../../src/exports/perShotTable.ts';
import { sentence } from '../../src/problems/sentences.ts';
import { RECORD_KINDS, ROLES } from '../../src/readings/meanings.ts';
import { reduce } from '../../src/reduction/reduce.ts';
import { ENTRY_NAMES, PART_ENTRIES } from '../../src/session/entries.ts';
import { CHOICE_VALUES, emptySession, recordId, type Choices, type Entry, type Session } from '../../src/session/session.ts';
import { demoLike } from '../fixtures/demoLike.ts';

/** Places of a plain object at which a number is NaN. */
function nanPlaces(found: unknown, at = ''): string[] {
  if (typeof found === 'number') return Number.isNaN(found) ? [at] : [];
  if (found === null || typeof found !== 'object') return [];
  return Object.entries(found).flatMap(([key, value]) => nanPlaces(value, `${at}.${key}`));
}

/** What is wrong with the result: places of NaN, and texts that show a value of the machine's own. */
function faultsOf(session: Session, explain: string | null): readonly string[] {
  const r = reduce(session, explain);
  const texts = [...r.problems.map(sentence), perShotCsv(session, r), perShotTabs(session, r)];
  return [...nanPlaces(r), ...texts.filter((text) => /NaN|undefined|\[object/.test(text))];
}

const number = fc.oneof(
  fc.double({ noNaN: true, noDefaultInfinity: true }).map(String),
  fc.double({ min: -1000, max: 1000, noNaN: true }).map((x) => x.toPrecision(4)),
  fc.integer({ min: -12, max: 12 }).map((e) => `1e${e}`),
  fc.constantFrom('0', '-0', '1e308', '1e-308', '5e-324', '-1e300', '9'.repeat(400), '1,234', '1.234,5', '0,5', '½', '1e999'),
);
const unit = fc.constantFrom('', ' mm', ' m', ' g', ' kg', ' s', ' rad', ' mrad', '°', ' %', ' N·s', ' N·m/rad', ' m/s²', ' g·mm²', ' in', ' furlong', ' (3)', '(3) mm', ' ± 1', ' ± 400 %', ' ± 1e300', ' ± -1', ' ± x');
const quantity = fc.oneof({ weight: 4, arbitrary: fc.tuple(number, unit).map(([n, u]) => n + u) }, { weight: 1, arbitrary: fc.string({ unit: 'grapheme', maxLength: 12 }) }, { weight: 1, arbitrary: fc.constantFrom('', ' ', 'ten', '±', '-', 'Infinity', '1 2 3', '12.5.3') });
const typed: fc.Arbitrary<Entry> = fc.record({ text: quantity, plusMinus: fc.constantFrom('standard', 'limits', 'expanded'), k: fc.oneof(fc.constant(''), fc.constant('2'), quantity) });
const choices = fc.record(Object.fromEntries(Object.entries(CHOICE_VALUES).map(([name, values]) => [name, fc.constantFrom<unknown>(...values)]))) as fc.Arbitrary<unknown> as fc.Arbitrary<Choices>;
/** Entries that make a bench, some of them typed over. */
const SOUND = {
  ...demoLike().entries, bobMass: '20 g', bobDistance: '250 mm', stripMass: '20 g', stripLength: '400 mm', rulerHeight: '400 mm', screenDistance: '1 m', dampingRatio: '0.01(1)', logDecrement: '0.05(2)', latitude: '50°', height: '100 m',
  backgroundSwing: '1 mm', backgroundPhase: '60°', firstMaximumTime: '0.2 s', quadraticDamping: '0.3', frictionAngle: '0.4 mrad',
};
/** A film's measures; its modes take longer than all the rest. */
const FILM = { filmThickness: '25 µm', filmWidth: '19 mm', filmLength: '200 mm', filmDensity: '1420 kg/m³', filmModulus: '2.5 GPa', zoneFrom: '160 mm', zoneTo: '200 mm', tapContact: '3 mm', leverArm: '180 mm', readingRadius: '200 mm', tapLeverArm: '180 mm' };
const asEntries = (texts: Readonly<Record<string, string | Entry>>): Session['entries'] => Object.fromEntries(Object.entries(texts).map(([name, text]) => [name, typeof text === 'string' ? { text, plusMinus: 'standard', k: '' } : text]));
const sound = asEntries(SOUND);
const typedOver = (entries: Session['entries']) => fc.array(fc.tuple(fc.constantFrom(...ENTRY_NAMES), typed), { maxLength: 4 }).map((list) => ({ ...entries, ...Object.fromEntries(list) }));
const someEntries = typedOver(sound);
const someParts = fc.array(fc.tuple(fc.nat(1), fc.constantFrom(...(Object.keys(PART_ENTRIES) as (keyof typeof PART_ENTRIES)[])), typed), { maxLength: 2 }).map((list) => {
  const parts = demoLike().parts.map((part) => ({ ...part, entries: { ...part.entries } }));
  for (const [i, name, value] of list) parts[i] = { ...parts[i]!, entries: { ...parts[i]!.entries, [name]: value } };
  return parts;
});
/** A pulse's samples: sound ones, typed over, or anything. */
const pulse = fc.oneof(
  fc.constant('ms\n0 0\n2 1\n9 0'),
  fc.array(fc.tuple(quantity, quantity).map((pair) => pair.join(';')), { maxLength: 5 }).map((lines) => lines.join('\n')),
  fc.array(fc.tuple(fc.double({ min: 0, max: 1, noNaN: true }), fc.double({ min: -1, max: 9, noNaN: true })), { maxLength: 6 }).map((list) => list.map(([step, f], i) => `${i + step} ${f}`).join('\n')),
);
const marks = fc.dictionary(fc.integer({ min: 2, max: 13 }).map((line) => recordId('s1', line)), fc.record({ kind: fc.constantFrom(...RECORD_KINDS), setAside: fc.record({ reason: fc.string() }) }, { requiredKeys: [] }), { maxKeys: 3 });

describe('the road', () => {
  it('comes to its end without NaN whatever is typed for the bench', () => {
    fc.assert(
      fc.property(choices, someEntries, someParts, fc.oneof(fc.constant(''), quantity, fc.array(quantity, { maxLength: 6 }).map((list) => list.join(' '))), marks, pulse, (chosen, entries, parts, freeSwing, marked, pulseSamples) => {
        expect(faultsOf({ ...demoLike(), choices: chosen, entries, parts, freeSwing, marks: marked, pulseSamples }, recordId('s1', 7))).toEqual([]);
      }),
      { numRuns: 250 },
    );
  }, 60_000);

  it('comes to its end without NaN whatever is typed for a film', () => {
    const readings = fc.constantFrom<Choices['readingWay']>('rulerAtTip', 'sensorOnPoint', 'cameraMarker');
    fc.assert(
      fc.property(choices, readings, typedOver({ ...sound, ...asEntries(FILM) }), (chosen, readingWay, entries) => {
        expect(faultsOf({ ...demoLike(), choices: { ...chosen, form: 'filmStrip', readingWay }, entries }, recordId('s1', 7))).toEqual([]);
      }),
      { numRuns: 15 },
    );
  }, 60_000);

  it('comes to its end without NaN whatever stands in the cells', () => {
    const cells = fc.array(fc.tuple(fc.integer({ min: 2, max: 13 }), fc.nat(9), quantity), { maxLength: 5 }).map((list) => {
      const edits: Record<string, Record<number, string>> = {};
      for (const [line, column, text] of list) edits[line] = { ...edits[line], [column]: text };
      return edits;
    });
    const added = fc.array(fc.array(quantity, { maxLength: 11 }), { maxLength: 2 }).map((rows) => rows.map((row, i) => ({ id: `+${i + 1}`, cells: row })));
    fc.assert(
      fc.property(choices, cells, added, marks, (chosen, edits, rows, marked) => {
        const session = { ...demoLike(), entries: sound, choices: chosen, marks: marked };
        expect(faultsOf({ ...session, sheets: [{ ...session.sheets[0]!, edits, added: rows }] }, recordId('s1', 8))).toEqual([]);
      }),
      { numRuns: 250 },
    );
  }, 60_000);

  it('comes to its end whatever text is dropped, under whatever meanings of its columns', () => {
    const text = fc.oneof(fc.string({ unit: 'binary', maxLength: 200 }), fc.array(fc.array(quantity, { maxLength: 6 }).map((row) => row.join(';')), { maxLength: 8 }).map((rows) => rows.join('\n')));
    const columns = fc.array(fc.record({ role: fc.constantFrom(...ROLES), unit: fc.constantFrom('', 'mm', 'mrad', '°', 'V', 'Pa', 's', 'mN·s', 'furlong'), by: fc.constantFrom('proposal', 'person') }), { maxLength: 7 });
    fc.assert(
      fc.property(choices, text, columns, (chosen, dropped, meanings) => {
        const sheet = { ...demoLike().sheets[0]!, text: dropped, columns: meanings };
        expect(faultsOf({ ...demoLike(), entries: sound, choices: chosen, sheets: [sheet] }, recordId('s1', 2))).toEqual([]);
      }),
      { numRuns: 250 },
    );
  }, 60_000);

  it('gives an empty result and no throw for an empty session', () => {
    expect(faultsOf(emptySession(), null)).toEqual([]);
    expect(faultsOf(emptySession(), 's1/2')).toEqual([]);
    expect(reduce(emptySession(), null).run).toBeNull();
  });
});
