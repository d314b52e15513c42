import { expect, test } from 'vitest';
import type { FilmSpreadInputs } from '../../src/pendulum/filmSpread.ts';
import { filmModelSpread } from '../../src/pendulum/filmSpread.ts';
import { clampedCoefficient, filmBehaviour, hingedCoefficient, PLATE_THAT_STIFFENS } from '../../src/pendulum/filmStrip.ts';

const BARE: FilmSpreadInputs = {
  stiffnessNumber: 0.0094, dampingRatio: 0.02, zoneFrom: 0.5, zoneTo: 1, plateRatio: 0, readAt: 1, hold: 'clamped', holdKnown: false, relativeStiffness: 0.3,
};

test('the parts add in squares, and each is the difference that it names', () => {
  const { standard, parts } = filmModelSpread(BARE);
  expect(Object.values(parts).reduce((sum, part) => sum + part * part, 0)).toBeCloseTo(standard ** 2, 14);
  const X = clampedCoefficient(BARE);
  expect(parts.hold).toBeCloseTo(Math.abs(Math.log(hingedCoefficient(BARE) / X)) / Math.sqrt(3), 12);
  expect(parts.ripple).toBeCloseTo(Math.log(X / filmBehaviour(BARE, 'clamped').modeOne) / Math.sqrt(3), 12);
  expect(parts.higherModes).toBeGreaterThan(0);
  expect(parts.stiffness).toBeGreaterThan(0);
});

test('what is known adds nothing: the hold, the stiffness, no damping', () => {
  const { parts } = filmModelSpread({ ...BARE, holdKnown: true, relativeStiffness: 0, dampingRatio: 0 });
  expect([parts.hold, parts.stiffness, parts.higherModes]).toEqual([0, 0, 0]);
  expect(filmModelSpread({ ...BARE, stiffnessNumber: 0 }).parts.hold).toBe(0);
});

test('the hold is judged from either side alike', () => {
  expect(filmModelSpread({ ...BARE, hold: 'hinged' }).parts.hold).toBeCloseTo(filmModelSpread(BARE).parts.hold, 12);
});

test('a bare film leaves some per cent to judgement, a plate of three film masses below one', () => {
  expect(filmModelSpread({ ...BARE, stiffnessNumber: 0.0012, zoneFrom: 0.8 }).standard).toBeGreaterThan(0.03);
  expect(filmModelSpread({ ...BARE, stiffnessNumber: 1e-5, zoneFrom: 0.8 }).standard).toBeGreaterThan(0.1);
  expect(filmModelSpread({ ...BARE, stiffnessNumber: 0.0012, zoneFrom: 1, plateRatio: PLATE_THAT_STIFFENS }).standard).toBeLessThan(0.01);
});

test('a relative uncertainty of the stiffness number of 1 or more throws', () => {
  expect(() => filmModelSpread({ ...BARE, relativeStiffness: 1 })).toThrow(RangeError);
});

test('read on its plate, beside the centre of mass, leaves the plate’s turn to judgement and no whip of the film’s end', () => {
  const plate = { ...BARE, stiffnessNumber: 0.0012, zoneFrom: 0.95, plateRatio: 10 };
  for (const readAt of [0.98, 1.005, 1.02]) {
    const { standard, parts } = filmModelSpread({ ...plate, readAt });
    expect(parts.plateTurn).toBeCloseTo((2 * Math.abs(readAt - 1)) / Math.sqrt(3), 12);
    expect(parts.ripple).toBeLessThan(0.01);
    expect(standard).toBeLessThan(parts.plateTurn + 0.02);
    expect(clampedCoefficient({ ...plate, readAt })).toBeCloseTo(readAt * clampedCoefficient({ ...plate, readAt: 1 }), 12);
  }
  expect(filmModelSpread({ ...plate, readAt: 1 }).parts.plateTurn).toBe(0);
  expect(filmModelSpread({ ...plate, plateRatio: 0, readAt: 1.005 }).parts.plateTurn).toBe(0);
});

test('a first crest far below the largest reading is taken for none', () => {
  const struckNearPlate = { ...BARE, stiffnessNumber: 0.0012, dampingRatio: 0.02, zoneFrom: 0.95, plateRatio: 0.5, readAt: 0.9 };
  const { earliest, largest } = filmBehaviour(struckNearPlate, 'clamped');
  expect(earliest.coefficient / largest.coefficient).toBeGreaterThan(0.4);
});
