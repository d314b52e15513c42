import fc from 'fast-check';
import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import type { FilmHold } from '../../src/pendulum/filmModes.ts';
import { filmModes, modesOver } from '../../src/pendulum/filmModes.ts';
import type { FilmFirstMaximum, FilmPulse } from '../../src/pendulum/filmResponse.ts';
import { filmFirstMaximum, filmReading, limpFirstMaximum, rigidCoefficient } from '../../src/pendulum/filmResponse.ts';
import { beamFirstMaximum } from './filmBeam.ts';

interface Case {
  readonly stiffnessNumber: number;
  readonly zoneFrom: number;
  readonly zoneTo: number;
  readonly readAt: number;
  readonly dampingRatio: number;
  readonly plateRatio: number;
  readonly hold: FilmHold;
}
type Row<Name extends string> = Readonly<Record<Name, number>>;
interface Reference {
  readonly methods: {
    readonly firstMaximum: readonly Row<'stiffnessNumber' | 'lowestFraction' | 'dampingRatio' | 'overRigid'>[];
    readonly ideal: readonly Row<'lowestFraction' | 'overRigid'>[];
    readonly plates: readonly Row<'plateRatio' | 'firstPercent' | 'modeOnePercent'>[];
    readonly plateOfTen: Row<'plateRatio' | 'firstPercentBelow' | 'modeOnePercent'>;
    readonly idealTimeInQuartersOverRootFraction: number;
    readonly modeOneOverRigidStruckAndReadAtTip: number;
  };
  readonly finiteDifferences: { readonly cases: readonly (Case & Row<'coefficient' | 'frequency'>)[] };
}
const reference = JSON.parse(readFileSync('test/reference/film-strip.json', 'utf8')) as Reference;

const TIP: Case = { stiffnessNumber: 0.0012, zoneFrom: 0.8, zoneTo: 1, readAt: 1, dampingRatio: 0, plateRatio: 0, hold: 'clamped' };
const pulseOf = (one: Case): FilmPulse => ({ ...one, dampingRatioAbove: one.dampingRatio });
const respond = (one: Partial<Case>, mesh?: { readonly elements: number; readonly degree: number }): FilmFirstMaximum => {
  const whole = { ...TIP, ...one };
  return filmFirstMaximum(filmModes(whole, mesh), pulseOf(whole));
};
const overRigid = (one: Partial<Case>): number => respond(one).largest.coefficient / rigidCoefficient({ ...TIP, ...one });

/** Printed to two decimals. */
const HALF_DIGIT = 0.005;
/** What the usual mesh leaves of a lossless ripple, relative. */
const LOSSLESS = 2e-3;

describe('the first maximum over the rigid prediction', () => {
  test.each(reference.methods.firstMaximum)('is that of methods 1.2 at S $stiffnessNumber, lowest $lowestFraction, ζ $dampingRatio', (row) => {
    const found = overRigid({ ...row, zoneFrom: 1 - row.lowestFraction });
    // One printed figure, 1.10 at S 0.0094, f 0.5, ζ 0.02, is 1.0945 here, by finite differences too (below): three modes alone give 1.096.
    const slack = row.stiffnessNumber === 0.0094 && row.lowestFraction === 0.5 && row.dampingRatio > 0 ? 0.001 : LOSSLESS * found;
    expect(Math.abs(found - row.overRigid)).toBeLessThan(HALF_DIGIT + slack);
  });

  test.each(reference.methods.plates)('with a plate of $plateRatio film masses is that of methods 1.2, as is mode 1 alone', ({ plateRatio, firstPercent, modeOnePercent }) => {
    const plate = { stiffnessNumber: 0, hold: 'hinged', zoneFrom: 1, plateRatio } as const;
    expect(Math.abs(100 * (overRigid(plate) - 1) - firstPercent)).toBeLessThan(0.08);
    expect(Math.abs(100 * (respond(plate).modeOne / rigidCoefficient({ ...TIP, ...plate }) - 1) - modeOnePercent)).toBeLessThan(0.06);
  });

  test('with a plate of ten film masses is the rigid one', () => {
    const { plateRatio, firstPercentBelow } = reference.methods.plateOfTen;
    expect(Math.abs(overRigid({ stiffnessNumber: 0, hold: 'hinged', zoneFrom: 1, plateRatio }) - 1) * 100).toBeLessThan(firstPercentBelow);
  });

  test('of mode 1 alone, struck and read at the tip of the limp film, is 1.260', () => {
    const tip = { stiffnessNumber: 0, hold: 'hinged', zoneFrom: 1, dampingRatio: 0.02 } as const;
    const undamped = respond({ ...tip, dampingRatio: 0, plateRatio: 1e-9 }).modeOne;
    expect(undamped / rigidCoefficient({ ...TIP, ...tip })).toBeCloseTo(reference.methods.modeOneOverRigidStruckAndReadAtTip, 3);
  });
});

describe('the ideal limp film', () => {
  test.each(reference.methods.ideal)('reads $overRigid times the rigid prediction, struck over its lowest $lowestFraction', ({ lowestFraction, overRigid: printed }) => {
    const rigid = rigidCoefficient({ ...TIP, zoneFrom: 1 - lowestFraction });
    expect(Math.abs(limpFirstMaximum(lowestFraction).coefficient / rigid - printed)).toBeLessThan(HALF_DIGIT + 1e-3);
  });

  test('has its maximum at 1.531 √f of a quarter period', () => {
    const quarter = Math.PI / 2 / filmModes({ ...TIP, stiffnessNumber: 0 }).frequencies[0]!;
    for (const f of [0.2, 0.5, 1]) expect(limpFirstMaximum(f).time / quarter / Math.sqrt(f)).toBeCloseTo(reference.methods.idealTimeInQuartersOverRootFraction, 3);
  });

  test('is neared from below as the sixth root of the stiffness number, no faster', () => {
    for (const f of [0.2, 0.5]) {
      const ideal = limpFirstMaximum(f);
      const found = [1e-7, 1e-6, 1e-5, 1e-4].map((S) => respond({ stiffnessNumber: S, zoneFrom: 1 - f }).largest);
      const shortfalls = found.map(({ coefficient }) => 1 - coefficient / ideal.coefficient);
      for (let i = 0; i + 1 < shortfalls.length; i += 1) {
        expect(shortfalls[i]!).toBeGreaterThan(0);
        expect(Math.log10(shortfalls[i + 1]! / shortfalls[i]!)).toBeGreaterThan(0.11);
        expect(Math.log10(shortfalls[i + 1]! / shortfalls[i]!)).toBeLessThan(0.21);
      }
      // The crest comes early by some tenth still at S = 1e-7.
      for (let i = 0; i + 1 < found.length; i += 1) expect(found[i]!.time).toBeGreaterThan(found[i + 1]!.time);
      expect(found[0]!.time).toBeLessThan(ideal.time);
      expect(found[0]!.time).toBeGreaterThan(0.87 * ideal.time);
    }
  });
});

describe('against finite differences', () => {
  test.each(reference.finiteDifferences.cases)('the damped film agrees at S $stiffnessNumber, zone $zoneFrom … $zoneTo, plate $plateRatio, $hold', (one) => {
    const { largest, frequency } = respond(one);
    expect(Math.abs(largest.coefficient / one.coefficient - 1)).toBeLessThan(2e-4);
    expect(Math.abs(frequency / one.frequency - 1)).toBeLessThan(1e-5);
  });

  // Lossless, stepped through time from the pulse by a program of the test's own; struck at a cell's middle line where at a point.
  test.each([
    { stiffnessNumber: 0.0012, plateRatio: 0, zoneFrom: 0.8, zoneTo: 1 },
    { stiffnessNumber: 0.0094, plateRatio: 0, zoneFrom: 0, zoneTo: 1 },
    { stiffnessNumber: 0.0012, plateRatio: 1, zoneFrom: 1, zoneTo: 1 },
    { stiffnessNumber: 1, plateRatio: 0, zoneFrom: 0.5, zoneTo: 1 },
  ])('a beam stepped through time has the same first maximum at S $stiffnessNumber, plate $plateRatio, zone from $zoneFrom', (one) => {
    const { largest, frequency } = respond(one);
    const [coarse, fine] = [120, 240].map((cells) => beamFirstMaximum(one, Math.PI / frequency, cells));
    const extrapolated = fine!.coefficient + (fine!.coefficient - coarse!.coefficient) / 3;
    expect(Math.abs(largest.coefficient / extrapolated - 1)).toBeLessThan(LOSSLESS);
    expect(Math.abs(largest.time / fine!.time - 1)).toBeLessThan(0.02);
  });
});

describe('the reading after a pulse', () => {
  test('starts from rest with the struck zone’s own speed', () => {
    const damped = { ...TIP, stiffnessNumber: 0.05, dampingRatio: 0.01, zoneFrom: 0.5 };
    const modes = filmModes(damped);
    expect(filmReading(modes, pulseOf(damped), 0)).toBe(0);
    // I/(m f): 2 for the lower half. The free end's ripple is averaged by looking at the path, not the speed.
    expect(filmReading(modes, pulseOf(damped), 0.05) / 0.05).toBeCloseTo(2, 1);
  });

  test('holds the pulse’s energy: the modes’ shares add to 1/f', () => {
    for (const f of [0.2, 0.5, 1]) {
      const { frequencies, ...modes } = filmModes({ ...TIP, stiffnessNumber: 0.0012 });
      const struck = modesOver({ frequencies, ...modes }, 1 - f, 1);
      const sum = struck.reduce((all, c, n) => all + (c * frequencies[n]!) ** 2, 0);
      expect(sum * f).toBeGreaterThan(0.985);
      expect(sum * f).toBeLessThan(1 + 1e-9);
    }
  });

  test('struck at a and read at b is that struck at b and read at a', () => {
    const height = fc.double({ min: 0.2, max: 1, noNaN: true });
    fc.assert(fc.property(height, height, fc.double({ min: 0.1, max: 4, noNaN: true }), (a, b, time) => {
      const modes = filmModes({ ...TIP, stiffnessNumber: 0.01 });
      const read = (struck: number, readAt: number): number =>
        filmReading(modes, { zoneFrom: struck, zoneTo: struck, readAt, dampingRatio: 0.02, dampingRatioAbove: 0.02 }, time);
      expect(read(a, b)).toBeCloseTo(read(b, a), 10);
    }), { numRuns: 15 });
  });

  test('is nowhere in the first half period above what is called its largest', () => {
    fc.assert(fc.property(fc.double({ min: -11, max: 2, noNaN: true }), fc.double({ min: 0, max: 0.1, noNaN: true }), fc.double({ min: 0, max: 0.9, noNaN: true }), (lnS, ratio, zoneFrom) => {
      const one = { ...TIP, stiffnessNumber: Math.exp(lnS), dampingRatio: ratio, zoneFrom };
      const modes = filmModes(one);
      const { largest, earliest, frequency } = filmFirstMaximum(modes, pulseOf(one));
      for (let k = 1; k < 200; k += 1) {
        const reading = filmReading(modes, pulseOf(one), ((Math.PI / frequency) * k) / 200);
        expect(reading).toBeLessThan(largest.coefficient * (1 + 1e-3));
      }
      expect(earliest.time).toBeLessThanOrEqual(largest.time);
      expect(earliest.coefficient).toBeLessThanOrEqual(largest.coefficient);
    }), { numRuns: 12 });
  });

  test('is smaller with more damping, in every mode or in those above the first', () => {
    const modes = filmModes(TIP);
    const X = (dampingRatio: number, dampingRatioAbove: number): number => filmFirstMaximum(modes, { ...TIP, dampingRatio, dampingRatioAbove }).largest.coefficient;
    expect(X(0.01, 0.01)).toBeLessThan(X(0, 0));
    expect(X(0.05, 0.05)).toBeLessThan(X(0.01, 0.01));
    expect(X(0.05, 0.05)).toBeLessThan(X(0.05, 0));
  });

  test('goes on smoothly below no damping, so that half-differences about it exist', () => {
    const modes = filmModes(TIP);
    const X = (ratio: number): number => filmFirstMaximum(modes, { ...TIP, dampingRatio: ratio, dampingRatioAbove: ratio }).largest.coefficient;
    const [below, at, above] = [X(-0.001), X(0), X(0.001)] as [number, number, number];
    expect(below).toBeGreaterThan(at);
    expect(Math.abs((below - at) / (at - above) - 1)).toBeLessThan(0.3);
    expect(Number.isFinite(X(-0.3))).toBe(true);
  });

  test('has a first crest before the largest where the film ripples: S 0.0094, lowest fifth', () => {
    const { earliest, largest } = respond({ stiffnessNumber: 0.0094 });
    expect(earliest.time).toBeLessThan(largest.time * 0.95);
    expect(earliest.coefficient).toBeLessThan(largest.coefficient);
    expect(earliest.coefficient).toBeGreaterThan(0.9 * largest.coefficient);
  });

  test('of a stiff hinged strip struck at the centre of percussion is the rigid prediction', () => {
    // Struck at 2/3 the hinge feels no kick, yet the film still bends a little; S sets how little.
    expect(Math.abs(overRigid({ stiffnessNumber: 1e4, hold: 'hinged', zoneFrom: 2 / 3, zoneTo: 2 / 3, dampingRatio: 0.001 }) - 1)).toBeLessThan(0.01);
    expect(respond({ stiffnessNumber: 100, hold: 'hinged' }).modeOne / rigidCoefficient(TIP)).toBeCloseTo(1, 3);
  });
});

test('the usual mesh gives damped first maxima to 5e-4 and lossless ones to 3e-3 of a much finer one', () => {
  for (const stiffnessNumber of [1e-7, 1e-5, 1e-3, 0.1, 10]) {
    for (const zoneFrom of [0, 0.8]) {
      for (const dampingRatio of [0, 0.02]) {
        const one = { stiffnessNumber, zoneFrom, dampingRatio };
        const gap = Math.abs(respond(one).largest.coefficient / respond(one, { elements: 18, degree: 10 }).largest.coefficient - 1);
        expect(gap).toBeLessThan(dampingRatio > 0 ? 5e-4 : 3e-3);
      }
    }
  }
});

test('a pulse or a fraction outside its range throws', () => {
  for (const wrong of [{ zoneFrom: 0.9, zoneTo: 0.8 }, { zoneTo: 1.5 }, { readAt: 0 }, { dampingRatio: 1 }, { dampingRatio: Number.NaN }]) expect(() => respond(wrong)).toThrow(RangeError);
  for (const f of [0, 1.1, Number.NaN]) expect(() => limpFirstMaximum(f)).toThrow(RangeError);
});
