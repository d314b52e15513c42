import fc from 'fast-check';
import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import type { Source } from '../../src/metrology/source.ts';
import { contributions, exact, ofSource, propagate } from '../../src/metrology/uncertain.ts';
import type { FilmInputs, FilmReadingInputs } from '../../src/pendulum/filmStrip.ts';
import {
  arealDensity, bendingStiffness, clampedCoefficient, filmBehaviour, filmMass, filmRegime, hingedCoefficient, impulseOfClampedFilm, impulseOfCoefficient,
  impulseOfHingedFilm, LIMP_BELOW, PLATE_THAT_STIFFENS, readingOfClampedFilm, SPRINGY_ABOVE, stiffnessNumber, weightPerLength,
} from '../../src/pendulum/filmStrip.ts';

interface Sheet {
  readonly thickness: number;
  readonly width: number;
  readonly modulus: number;
  readonly density: number;
  readonly stiffnessNumbers: readonly { readonly length: number; readonly value: number }[];
}
const { sheet } = (JSON.parse(readFileSync('test/reference/film-strip.json', 'utf8')) as { readonly methods: { readonly sheet: Sheet } }).methods;
const g = 9.80665;

const FILM: FilmInputs = { stiffnessNumber: 0.0012, dampingRatio: 0.02, zoneFrom: 0.8, zoneTo: 1, plateRatio: 0, readAt: 1 };
const READ: FilmReadingInputs = { reading: 0.012, mass: 0.135e-3, length: 0.2, gravity: g };

describe('25 µm polyimide film, 19 mm wide', () => {
  test.each(sheet.stiffnessNumbers)('has the stiffness number $value at $length m, as methods 1.2 prints it', ({ length, value }) => {
    expect(Math.abs(stiffnessNumber({ ...sheet, length, gravity: g }) / value - 1)).toBeLessThan(0.03);
    expect(stiffnessNumber({ ...sheet, length, gravity: g, width: 3 * sheet.width })).toBeCloseTo(stiffnessNumber({ ...sheet, length, gravity: g }), 12);
  });

  test('weighs 0.135 g at 0.2 m and is limp there in its period', () => {
    expect(arealDensity(sheet)).toBeCloseTo(0.0355, 6);
    expect(filmMass({ ...sheet, length: 0.2 }) * 1e3).toBeCloseTo(0.1349, 4);
    expect(weightPerLength({ ...sheet, gravity: g }) * 0.2).toBeCloseTo(filmMass({ ...sheet, length: 0.2 }) * g, 12);
    expect(bendingStiffness(sheet)).toBeCloseTo((2.5e9 * 0.019 * 25e-6 ** 3) / 12, 18);
    for (const { value } of sheet.stiffnessNumbers) expect(filmRegime(value)).toBe('limp');
  });
});

describe('limp, between and springy', () => {
  test('meet where the other one moves the frequency by 6 to 7 %', () => {
    const limp = 1.20241;
    const bending = filmBehaviour({ ...FILM, stiffnessNumber: LIMP_BELOW }, 'clamped').frequency / limp - 1;
    const weight = filmBehaviour({ ...FILM, stiffnessNumber: SPRINGY_ABOVE }, 'clamped').frequency / (3.516015 * Math.sqrt(SPRINGY_ABOVE)) - 1;
    for (const share of [bending, weight]) {
      expect(share).toBeGreaterThan(0.06);
      expect(share).toBeLessThan(0.075);
    }
    expect([0, LIMP_BELOW, 0.1, SPRINGY_ABOVE, 1e6].map(filmRegime)).toEqual(['limp', 'limp', 'between', 'springy', 'springy']);
    expect(() => filmRegime(-1)).toThrow(RangeError);
  });
});

describe('a film’s behaviour', () => {
  test('has the modal masses and the static figure of methods 1.2 at its ends', () => {
    const springy = filmBehaviour({ ...FILM, stiffnessNumber: 1e6 }, 'clamped');
    expect(springy.modalTipMass).toBeCloseTo(0.25, 4);
    expect(springy.staticOverModal).toBeCloseTo(0.971, 3);
    expect(springy.staticTipStiffness / 3e6).toBeCloseTo(1, 5);
    const limp = filmBehaviour({ ...FILM, stiffnessNumber: 0 }, 'hinged');
    expect(limp.modalTipMass).toBeCloseTo(0.2695, 4);
    expect(limp.staticTipStiffness).toBe(0);
  });

  test('read as rigid in mode 1 overstates a limp film 1.260, 1.237 and 1.283 times: rigid ω, route B, route A (methods 1.2)', () => {
    const { frequency, modalTipMass } = filmBehaviour({ ...FILM, stiffnessNumber: 0 }, 'hinged');
    const impulse = modalTipMass * frequency;
    expect(Math.sqrt(1.5) / 3 / impulse).toBeCloseTo(1.26, 3);
    expect(frequency / 3 / impulse).toBeCloseTo(1.237, 3);
    expect(1 / 2 / frequency / impulse).toBeCloseTo(1.283, 3);
  });

  test('tells the effective mass, the period and the quarter', () => {
    const film = filmBehaviour(FILM, 'clamped');
    expect(film.effectiveMass * film.largest.coefficient * film.frequency).toBeCloseTo(1, 14);
    expect(film.period * film.frequency).toBeCloseTo(2 * Math.PI, 14);
    expect(film.timeInQuarters).toBeCloseTo(film.largest.time / (film.period / 4), 14);
    expect(film.timeInQuarters).toBeLessThan(0.6);
    expect(film.modeOneOverRigid).toBeLessThan(film.overRigid);
  });

  test('with neither stiffness, plate nor damping is the closed limit, which a film read elsewhere has not', () => {
    const ideal = filmBehaviour({ ...FILM, stiffnessNumber: 0, dampingRatio: 0 }, 'clamped');
    expect(ideal.largest.coefficient).toBeCloseTo(2 / Math.sqrt(0.2), 12);
    expect(ideal.overRigid).toBeCloseTo(2.03, 2);
    expect(() => filmBehaviour({ ...FILM, stiffnessNumber: 0, dampingRatio: 0, readAt: 0.9 }, 'clamped')).toThrow(RangeError);
    expect(() => filmBehaviour({ ...FILM, stiffnessNumber: 0, dampingRatio: 0, zoneTo: 0.9 }, 'clamped')).toThrow(RangeError);
  });

  test('with the plate that stiffens it is read as rigid to 1 %, clamped or hinged, struck and read there', () => {
    for (const hold of ['clamped', 'hinged'] as const) {
      const film = filmBehaviour({ ...FILM, zoneFrom: 1, plateRatio: PLATE_THAT_STIFFENS, dampingRatio: 0 }, hold);
      expect(Math.abs(film.overRigid - 1)).toBeLessThan(0.01);
    }
  });
});

describe('the impulse bit from a film’s first maximum', () => {
  test('gives back the impulse that made the reading', () => {
    const inputs = fc.record({
      lnS: fc.double({ min: -14, max: 2, noNaN: true }), dampingRatio: fc.double({ min: 0, max: 0.2, noNaN: true }), zoneFrom: fc.double({ min: 0.1, max: 0.9, noNaN: true }),
      plateRatio: fc.double({ min: 0, max: 4, noNaN: true }), impulse: fc.double({ min: 1e-7, max: 1e-3, noNaN: true }),
    });
    fc.assert(fc.property(inputs, ({ lnS, impulse, ...more }) => {
      const film = { ...FILM, ...more, stiffnessNumber: Math.exp(lnS) };
      const reading = readingOfClampedFilm({ ...film, ...READ, impulse });
      expect(impulseOfClampedFilm({ ...film, ...READ, reading }) / impulse).toBeCloseTo(1, 12);
    }), { numRuns: 15 });
  });

  test('is the rigid strip’s over the factor that reading it as rigid overstates', () => {
    // m √(2gL/3) sin(θ/2) for a rigid strip struck at its tip (methods 1.1), times L/r_t with r_t = 0.9 L; sin(θ/2) ≈ x/2L.
    const rigid = (READ.mass * Math.sqrt((2 * g * READ.length) / 3) * READ.reading) / (2 * READ.length) / 0.9;
    expect(rigid / impulseOfClampedFilm({ ...FILM, ...READ })).toBeCloseTo(filmBehaviour(FILM, 'clamped').overRigid, 10);
  });

  test('takes its coefficient from a table as well, and differs with the hold', () => {
    const film = { ...FILM, ...READ, stiffnessNumber: 0.05 };
    expect(impulseOfCoefficient({ ...film, coefficient: clampedCoefficient(film) })).toBe(impulseOfClampedFilm(film));
    expect(impulseOfCoefficient({ ...film, coefficient: hingedCoefficient(film) })).toBe(impulseOfHingedFilm(film));
    expect(Math.abs(impulseOfHingedFilm(film) / impulseOfClampedFilm(film) - 1)).toBeGreaterThan(0.05);
  });

  test('propagates by half-differences: each input has its line, those about an end included', () => {
    const of = (symbol: string, estimate: number, u: number): Source => ({ id: symbol, label: symbol, symbol, dimension: 'number', estimate, u, distribution: 'normal', dof: Infinity });
    const u = { stiffnessNumber: 0.0004, dampingRatio: 0.005, zoneFrom: 0.03, zoneTo: 0.01, readAt: 0.005, reading: 0.0002, mass: 1e-6, length: 5e-4 };
    const all = { ...FILM, ...READ };
    const uncertain = Object.fromEntries(Object.entries(all).map(([name, value]) => [name, name in u ? ofSource(of(name, value, u[name as keyof typeof u])) : exact(value)])) as Record<keyof typeof all, ReturnType<typeof exact>>;
    const impulse = propagate(impulseOfClampedFilm, uncertain);
    const lines = new Map([...contributions(impulse)].map(([line, part]) => [line.id, part / impulse.value]));
    expect(lines.size).toBe(8);
    expect(lines.get('reading')).toBeCloseTo(0.0002 / 0.012, 8);
    expect(lines.get('mass')).toBeCloseTo(1e-6 / 0.135e-3, 8);
    expect(lines.get('length')).toBeCloseTo(-5e-4 / 0.4, 5);
    // A stiffer film answers less, so a reading stands for more; so does a damped one; a plume lower on the film stands for less.
    expect(lines.get('stiffnessNumber')).toBeGreaterThan(0.01);
    expect(lines.get('dampingRatio')).toBeGreaterThan(0.003);
    expect(lines.get('zoneFrom')).toBeLessThan(-0.01);
    const undamped = propagate(impulseOfClampedFilm, { ...uncertain, dampingRatio: ofSource(of('dampingRatio', 0, 0.005)) });
    expect([...contributions(undamped).values()].every(Number.isFinite)).toBe(true);
  });

  test('asked again in any order is the same', () => {
    const films = [0.001, 0.002, 0.003, 0.004, 0.005, 0.006, 0.007, 0.008, 0.009, 0.01, 0.011, 0.012, 0.013, 0.014].map((stiffness) => ({ ...FILM, stiffnessNumber: stiffness }));
    const first = films.map(clampedCoefficient);
    expect(films.toReversed().map(clampedCoefficient).toReversed()).toEqual(first);
  });

  test('outside its range throws', () => {
    for (const wrong of [{ stiffnessNumber: -1 }, { plateRatio: -0.1 }, { dampingRatio: 1 }, { zoneFrom: 1.1 }, { readAt: -1 }]) expect(() => clampedCoefficient({ ...FILM, ...wrong })).toThrow(RangeError);
  });
});
