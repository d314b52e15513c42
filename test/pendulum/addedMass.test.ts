/** Inertia by added masses: the printed values, a pendulum that is integrated, and how often the told u is right. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { bestPlaces, bodyOfTwoPeriods, fitOfTimings, inertiaLeftUnknown, massSensitivity, pairAsOne, periodFitted, tiltOfSingle, type TimedMassWithU, type TimingsFit } from '../../src/pendulum/addedMass.ts';
import { bodyOfPeriods, periodWithMass, unchangedDistance, type HungMass } from '../../src/pendulum/calibrationMass.ts';
import { smallPeriod } from '../../src/pendulum/forms.ts';
import { deviationOf, draws, meanOf } from '../metrology/sources.ts';

const G = 9.80665;
/** Methods 1.8: J 2.5e-3 kg·m², κ 0.054 N·m/rad, 20 g. */
const RIG = { inertia: 2.5e-3, stiffness: 0.054, g: G, mass: 0.02, ownInertia: 0 } as const;
const PRINTED = { without: 1.35192623, with: 1.26227738, mass: 0.02, distance: 0.35, ownInertia: 0 } as const;

describe('the printed case of methods 1.8', () => {
  it('gives J 2.500e-3 and κ 0.054 with the gravity term', () => {
    const found = bodyOfTwoPeriods({ ...PRINTED, g: G });
    if (found.status !== 'found') throw new Error(found.status);
    expect(found.inertia).toBeCloseTo(2.5e-3, 9);
    expect(found.stiffness).toBeCloseTo(0.054, 8);
  });

  it('gives −0.01911 by the formula of a torsion balance, which is told and is no number to go on with', () => {
    const found = bodyOfTwoPeriods({ ...PRINTED, g: 0 });
    expect(found.status).toBe('notPositive');
    if (found.status === 'samePeriod') throw new Error(found.status);
    expect(found.inertia).toBeCloseTo(-0.01911, 5);
  });

  it('tells nothing where both periods are one, and refuses what is no period', () => {
    expect(bodyOfTwoPeriods({ ...PRINTED, with: PRINTED.without, g: G }).status).toBe('samePeriod');
    expect(() => bodyOfTwoPeriods({ ...PRINTED, with: 0, g: G })).toThrow(RangeError);
    expect(() => bodyOfTwoPeriods({ ...PRINTED, without: NaN, g: G })).toThrow(RangeError);
  });
});

it('about an upright axis J = m r² T₀²/(T₁² − T₀²)', () => {
  // J 3 m r², so T₁²/T₀² = 4/3.
  const found = bodyOfTwoPeriods({ mass: 0.1, distance: 0.2, ownInertia: 0, g: 0, without: Math.sqrt(3), with: 2 });
  if (found.status !== 'found') throw new Error(found.status);
  expect(found.inertia).toBeCloseTo(3 * 0.1 * 0.04, 14);
});

const between = (min: number, max: number): fc.Arbitrary<number> => fc.double({ min, max, noNaN: true });
const hung = fc.record({ inertia: between(1e-6, 1), l: between(0.05, 2), mass: between(1e-4, 1), distance: between(0.02, 2), own: between(0, 0.2), flexureOnly: fc.boolean() })
  .map(({ inertia, l, mass, distance, own, flexureOnly }): HungMass => ({ inertia, stiffness: (inertia * 9.8) / l, g: flexureOnly ? 0 : G, mass, distance, ownInertia: own * mass * l * l }));

describe('a pair on a cross-arm', () => {
  const PAIR = { mass: 0.015, arm: 0.12, height: 0, ownInertia: 2e-6 } as const;

  it('at the pivot’s height lengthens the period always, and gives J back with no gravity term', () => {
    fc.assert(fc.property(between(1e-6, 1), between(0.05, 2), between(1e-4, 0.5), between(0.02, 0.5), (inertia, l, mass, arm) => {
      const one = { inertia, stiffness: (inertia * G) / l, g: G, ...pairAsOne({ mass, arm, height: 0, ownInertia: 0 }) };
      const [without, loaded] = [smallPeriod(one), periodWithMass(one)];
      expect(loaded).toBeGreaterThan(without);
      const added = 2 * mass * arm * arm;
      const J = added / ((loaded / without) ** 2 - 1);
      const found = bodyOfTwoPeriods({ ...one, without, with: loaded });
      fc.pre(found.status !== 'samePeriod');
      expect(Math.abs(found.inertia / J - 1)).toBeLessThan(1e-12);
    }));
  });

  it('is two masses: potential and kinetic energy of both', () => {
    for (const height of [-0.05, 0, 0.08]) {
      const one = pairAsOne({ ...PAIR, height });
      // Body turned by θ: z of a mass at (±a, −h) is ±a sin θ − h cos θ; the second derivative of the sum at 0 is 2h.
      const rise = (theta: number): number => [1, -1].reduce((sum, side) => sum + side * PAIR.arm * Math.sin(theta) - height * Math.cos(theta), 0);
      const curve = (rise(1e-3) - 2 * rise(0) + rise(-1e-3)) / 1e-6;
      expect(one.mass * one.distance).toBeCloseTo(PAIR.mass * curve, 7);
      expect(one.mass * one.distance ** 2 + one.ownInertia).toBeCloseTo(2 * (PAIR.mass * (PAIR.arm ** 2 + height ** 2) + PAIR.ownInertia), 15);
    }
  });

  it('single, one of them tilts the rest to where its moment is held', () => {
    const tilt = tiltOfSingle({ mass: 0.015, arm: 0.12, g: G, stiffness: 0.054 });
    expect(0.015 * G * 0.12 * Math.cos(tilt)).toBeCloseTo(0.054 * Math.sin(tilt), 15);
    expect((tilt * 180) / Math.PI).toBeGreaterThan(15);
  });
});

describe('what a place tells', () => {
  it('J follows mass, place and own inertia as its slopes say', () => {
    fc.assert(fc.property(hung, (x) => {
      const [without, loaded] = [smallPeriod(x), periodWithMass(x)];
      fc.pre(Math.abs(loaded / without - 1) > 1e-3);
      const J = (y: Partial<HungMass>): number => {
        const found = bodyOfTwoPeriods({ ...x, ...y, without, with: loaded });
        if (found.status === 'samePeriod') throw new Error(found.status);
        return found.inertia;
      };
      const h = 1e-6;
      const slopeIn = (name: 'mass' | 'distance' | 'ownInertia'): number => (J({ [name]: x[name] * (1 + h) }) - J({ [name]: x[name] * (1 - h) })) / (2 * h * x.inertia);
      const told = massSensitivity(x);
      for (const [name, value] of [['mass', told.toMass], ['distance', told.toDistance], ['ownInertia', told.toOwnInertia]] as const) {
        const seen = slopeIn(name);
        expect(Math.abs(value - seen)).toBeLessThan(1e-5 * (1 + Math.abs(told.toDistance) + Math.abs(told.toMass)));
      }
    }));
  });

  const known = { uWithout: 1e-3, uWith: 1e-3, uDistance: 0, uMass: 0 } as const;
  it('u(T)/T of 1e-3 costs 3 % at 0.35 m and 1 % at 0.15 m (methods 1.8)', () => {
    expect(inertiaLeftUnknown({ ...RIG, distance: 0.35 }, known)).toBeCloseTo(Math.hypot(31, 14) * 1e-3, 3);
    expect(inertiaLeftUnknown({ ...RIG, distance: 0.15 }, known)).toBeCloseTo(Math.hypot(10, 6.5) * 1e-3, 3);
  });

  it('0.46 m, next to where the period does not change, is hopeless', () => expect(inertiaLeftUnknown({ ...RIG, distance: 0.46 }, known)).toBeGreaterThan(0.5));

  it('1 mm of the place costs 2 % of J at 0.35 m, which the timings do not show', () => {
    const u = inertiaLeftUnknown({ ...RIG, distance: 0.35 }, { uWithout: 0, uWith: 0, uDistance: 1e-3, uMass: 0 });
    expect(u).toBeGreaterThan(0.018);
    expect(u).toBeLessThan(0.02);
  });

  it('a mass so high that nothing restores tells nothing', () => expect(inertiaLeftUnknown({ ...RIG, distance: -0.3 }, known)).toBe(Infinity));

  it('the best places lie in their regions and none beside them in the region is better', () => {
    const range = { least: -0.2, most: 0.9, hopeless: 0.2 } as const;
    for (const ownInertia of [0, 1e-4, 1.2e-3]) {
      const bare = { ...RIG, ownInertia };
      const outer = unchangedDistance(bare) ?? 0;
      const inner = outer === 0 ? 0 : ownInertia / RIG.mass / outer;
      const places = bestPlaces(bare, known, range);
      expect(places.map(({ leaves }) => leaves)).toEqual(places.map(({ leaves }) => leaves).sort((a, b) => a - b));
      expect(places.some(({ region }) => region === 'shorter')).toBe(ownInertia < 1e-3);
      for (const { region, distance, period, leaves } of places) {
        const [low, high] = { abovePivot: [-0.2, 0], nearPivot: [0, inner], shorter: [inner, outer], beyond: [outer, 0.9] }[region] as [number, number];
        expect(distance >= low && distance <= high).toBe(true);
        expect(period < smallPeriod(RIG)).toBe(region === 'shorter');
        for (let i = 0; i <= 1000; i++) {
          const r = low + (i * (high - low)) / 1000;
          // Places are tried 2.75 mm apart, which shows in the 12 mm next to the pivot.
          expect(inertiaLeftUnknown({ ...bare, distance: r }, known)).toBeGreaterThan(0.9 * leaves);
        }
      }
    }
  });

  it('about an upright axis it is as far out as it goes; backwards limits are refused', () => {
    const places = bestPlaces({ ...RIG, g: 0 }, known, { least: 0.05, most: 0.5, hopeless: 0.2 });
    expect(places.map(({ region, distance }) => [region, distance])).toEqual([['beyond', 0.5]]);
    expect(() => bestPlaces(RIG, known, { least: 0.5, most: 0.5, hopeless: 0.2 })).toThrow(RangeError);
  });
});

describe('several timings as a fit', () => {
  const PLACES = [{ mass: 0, radius: 0, ownInertia: 0 }, { mass: 0.02, radius: 0.1, ownInertia: 1e-6 }, { mass: 0.02, radius: 0.2, ownInertia: 1e-6 }, { mass: 0.05, radius: 0.2, ownInertia: 3e-6 }, { mass: 0.02, radius: -0.1, ownInertia: 1e-6 }] as const;
  const timed = (uRelative: number, stray: (i: number) => number = () => 0): readonly TimedMassWithU[] => PLACES.map((place, i) => {
    const period = periodWithMass({ inertia: 2.5e-3, stiffness: 0.054, g: G, mass: place.mass, distance: place.radius, ownInertia: place.ownInertia });
    return { ...place, period: period * (1 + uRelative * stray(i)), uPeriod: period * uRelative };
  });
  function fit(timings: readonly TimedMassWithU[], g = G): TimingsFit {
    const found = fitOfTimings(timings, g);
    if (found.status !== 'fitted') throw new Error(found.status);
    return found;
  }

  it('exact periods give J and κ back, and χ² 0', () => {
    const found = fit(timed(1e-4));
    expect(found.inertia).toBeCloseTo(2.5e-3, 14);
    expect(found.stiffness).toBeCloseTo(0.054, 13);
    expect(found.chiSquared).toBeLessThan(1e-15);
    expect(found.dof).toBe(3);
    for (const place of PLACES) expect(periodFitted(found, place, G)).toBeCloseTo(periodWithMass({ ...RIG, mass: place.mass, distance: place.radius, ownInertia: place.ownInertia }), 12);
    const unweighted = bodyOfPeriods(timed(1e-4), G);
    if (unweighted.status !== 'found') throw new Error(unweighted.status);
    expect(unweighted.inertia).toBeCloseTo(2.5e-3, 14);
  });

  it('two timings are the formula of two periods, exactly', () => {
    const two = timed(1e-3, (i) => [0.7, 0, -1.1, 0, 0][i]!).filter((_, i) => i === 0 || i === 2);
    const [a, b] = [two[0]!, two[1]!];
    const direct = bodyOfTwoPeriods({ mass: b.mass, distance: b.radius, ownInertia: b.ownInertia, g: G, without: a.period, with: b.period });
    if (direct.status !== 'found') throw new Error(direct.status);
    for (const found of [fit(two), bodyOfPeriods(two, G)]) {
      if (!('inertia' in found)) throw new Error(found.status);
      expect(Math.abs(found.inertia / direct.inertia - 1)).toBeLessThan(1e-11);
      expect(Math.abs(found.stiffness / direct.stiffness - 1)).toBeLessThan(1e-11);
    }
  });

  it('J and κ follow each period as their slopes say, with residuals as they come', () => {
    const base = timed(1e-3, (i) => [0.7, -1.2, 0.4, 1.5, -0.3][i]!);
    const found = fit(base);
    for (const [i, { period }] of base.entries()) {
      const h = 1e-6 * period;
      const moved = (sign: number): TimingsFit => fit(base.map((timing, k) => (k === i ? { ...timing, period: period + sign * h, uPeriod: (timing.uPeriod / period) * (period + sign * h) } : timing)));
      const [up, down] = [moved(1), moved(-1)];
      // The weights follow κ a little; the slopes leave that out: of the order of the residuals, 1e-3.
      expect(Math.abs((up.inertia - down.inertia) / (2 * h) / found.byPeriod[i]!.inertia - 1)).toBeLessThan(2e-2);
      expect(Math.abs((up.stiffness - down.stiffness) / (2 * h) / found.byPeriod[i]!.stiffness - 1)).toBeLessThan(2e-2);
    }
  });

  it('a thousand strayed series scatter by the u that is told, with χ² of its mean ν', () => {
    const { normal } = draws(41);
    const fits = Array.from({ length: 1000 }, () => fit(timed(3e-4, () => normal())));
    const J = fits.map(({ inertia }) => inertia);
    const told = meanOf(fits.map(({ uInertia }) => uInertia));
    expect(Math.abs(deviationOf(J) / told - 1)).toBeLessThan(0.08);
    expect(Math.abs(deviationOf(fits.map(({ stiffness }) => stiffness)) / meanOf(fits.map(({ uStiffness }) => uStiffness)) - 1)).toBeLessThan(0.08);
    // Three times the sd of a mean of a thousand.
    expect(Math.abs(meanOf(J) - 2.5e-3)).toBeLessThan((3 * told) / Math.sqrt(1000));
    expect(Math.abs(meanOf(fits.map(({ chiSquared }) => chiSquared)) - 3)).toBeLessThan(3 * Math.sqrt(6 / 1000));
    expect(Math.abs(deviationOf(fits.map(({ residuals }) => residuals[0]!)) - 1)).toBeLessThan(0.5);
  });

  it('periods without the gravity they were taken in give no pendulum, which is said', () => {
    const found = fitOfTimings(timed(1e-4).slice(0, 3), 0);
    expect(found.status).toBe('notPositive');
  });

  it('timings that part nothing tell nothing; one timing is too few; no u is refused', () => {
    const one = timed(1e-4)[1]!;
    expect(fitOfTimings([one, one], G).status).toBe('notTold');
    expect(fitOfTimings([one], G).status).toBe('tooFew');
    expect(() => fitOfTimings([one, { ...one, uPeriod: 0 }], G)).toThrow(RangeError);
  });
});
