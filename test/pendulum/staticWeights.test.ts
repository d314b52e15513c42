/** Static deflection: where the energy of pendulum and weight is least, found apart from the moments that the project balances. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { hysteresisOf, linearAngle, outriggerMoment, outriggerMomentAt, pulleyMoment, restUnderLoad, threadMoment, type Load, type LoadedReading } from '../../src/pendulum/staticWeights.ts';
import { weightedLine } from '../../src/numeric/lines.ts';

const between = (min: number, max: number): fc.Arbitrary<number> => fc.double({ min, max, noNaN: true });

/** Energy of pendulum and load, J: places of the weights, no moments. */
function energy(stiffness: number, share: number, load: Load, angle: number): number {
  const own = stiffness * (2 * share * Math.sin(angle / 2) ** 2 + ((1 - share) * angle * angle) / 2);
  const [x, z] = [Math.sin(angle), -Math.cos(angle)];
  switch (load.by) {
    case 'thread':
      return own - load.force * load.arm * x;
    case 'pulley':
      // The weight rises by what the thread gets longer.
      return own + load.force * Math.hypot(load.reach - load.arm * x, load.lift - load.arm - load.arm * z);
    case 'outrigger':
      // The arm stands out on the far side of the swing: (−a, −h) turned by θ.
      return own + load.force * (-load.arm * x + load.height * z);
  }
}

/** Place of the least energy on (−90°, 90°) by thirds. */
function least(stiffness: number, share: number, load: Load): number {
  let [low, high] = [-1.5, 1.5];
  for (let i = 0; i < 200; i++) {
    const [a, b] = [low + (high - low) / 3, high - (high - low) / 3];
    if (energy(stiffness, share, load, a) < energy(stiffness, share, load, b)) high = b;
    else low = a;
  }
  return (low + high) / 2;
}
/** A minimum is found to the root of the rounding. */
const BY_THIRDS = 2e-7;

const loads = (moment: number): fc.Arbitrary<Load> => fc.oneof(
  between(0.05, 0.5).map((arm): Load => ({ by: 'thread', force: moment / arm, arm })),
  fc.tuple(between(0.05, 0.5), between(1.2, 10), between(-0.05, 0.05)).map(([arm, reach, lift]): Load => ({ by: 'pulley', force: moment / arm, arm, reach: reach * arm, lift: lift * arm })),
  fc.tuple(between(0.02, 0.3), between(-0.2, 1)).map(([arm, height]): Load => ({ by: 'outrigger', force: moment / arm, arm, height: height * arm })),
);

describe('where a loaded pendulum comes to rest', () => {
  it('is where the energy of pendulum and weight is least', () => {
    fc.assert(fc.property(between(0.01, 1), between(0, 1), between(-0.6, 0.6).chain(loads), (stiffness, share, shape) => {
      const load = { ...shape, force: shape.force * stiffness };
      const rest = restUnderLoad({ stiffness, share }, load);
      if (rest.status !== 'found') throw new Error(rest.status);
      // A pulley close by, pushed against, has no single least place; pulls alone are compared there.
      fc.pre(load.by !== 'pulley' || load.force >= 0);
      expect(Math.abs(rest.angle - least(stiffness, share, load))).toBeLessThan(BY_THIRDS);
    }));
  });

  it('gravity alone and a level thread: tan θ = F r_w/(M g d) (methods 1.9)', () => {
    const rest = restUnderLoad({ stiffness: 0.054, share: 1 }, { by: 'thread', force: 0.05, arm: 0.3 });
    if (rest.status !== 'found') throw new Error(rest.status);
    expect(Math.tan(rest.angle)).toBeCloseTo((0.05 * 0.3) / 0.054, 14);
  });

  it('no weight, no deflection; a load that turns it over has no rest; κ must restore', () => {
    expect(restUnderLoad({ stiffness: 1, share: 1 }, { by: 'thread', force: 0, arm: 0.3 })).toEqual({ status: 'found', angle: 0 });
    expect(restUnderLoad({ stiffness: 0.1, share: 1 }, { by: 'outrigger', force: 1, arm: 0.1, height: -0.2 }).status).toBe('none');
    expect(() => restUnderLoad({ stiffness: 0, share: 1 }, { by: 'thread', force: 1, arm: 0.3 })).toThrow(RangeError);
    expect(() => pulleyMoment({ force: 1, arm: 0.3, angle: 0.5, reach: 0.1, lift: 0 })).toThrow(RangeError);
  });
});

describe('moments', () => {
  it('a far pulley at the right height is the level thread, a point at the pivot’s height the plain outrigger', () => {
    const angle = 0.2;
    expect(pulleyMoment({ force: 2, arm: 0.3, angle, reach: 1e9, lift: 0 })).toBeCloseTo(threadMoment({ force: 2, arm: 0.3, angle }), 8);
    expect(outriggerMomentAt({ force: 2, arm: 0.3, height: 0, angle })).toBe(outriggerMoment({ force: 2, arm: 0.3, angle }));
  });

  it('a pulley 1 m off that is 20 mm too high costs 2e-4 at rest and next to nothing of the slope', () => {
    expect(pulleyMoment({ force: 1, arm: 0.3, angle: 0, reach: 1, lift: 0.02 }) / 0.3).toBeCloseTo(1 - 0.02 ** 2 / 2, 6);
  });

  it('κ is the slope of moment against linearAngle, whatever the angle', () => {
    fc.assert(fc.property(between(0.01, 1), between(0, 1), fc.constantFrom<Load>({ by: 'thread', force: 1, arm: 0.2 }, { by: 'outrigger', force: 1, arm: 0.1, height: 0.05 }), (stiffness, share, shape) => {
      const points = [0.1, 0.2, 0.3, 0.4].map((part) => {
        const load = { ...shape, force: (part * stiffness) / shape.arm };
        const rest = restUnderLoad({ stiffness, share }, load);
        if (rest.status !== 'found') throw new Error(rest.status);
        const { angle } = rest;
        return { x: linearAngle({ angle, share }), y: load.by === 'outrigger' ? outriggerMomentAt({ ...load, angle }) : threadMoment({ ...load, angle }) };
      });
      const line = weightedLine(points.map(({ x }) => x), points.map(({ y }) => y), points.map(() => 1));
      if (line.status !== 'fitted') throw new Error(line.status);
      expect(Math.abs(line.slope / stiffness - 1)).toBeLessThan(1e-10);
      expect(Math.abs(line.intercept)).toBeLessThan(1e-11 * stiffness);
    }));
  });
});

describe('loading and unloading', () => {
  const KAPPA = 0.05;
  const WEIGHTS = [1, 2, 3, 4].map((n) => n * 1e-3);
  const series = (angleOf: (moment: number, unloading: boolean) => number): readonly LoadedReading[] => [false, true].flatMap((unloading) => WEIGHTS.map((moment) => ({ moment, unloading, angle: angleOf(moment, unloading) })));
  function of(readings: readonly LoadedReading[]): Exclude<ReturnType<typeof hysteresisOf>, { status: 'noPairs' }> {
    const found = hysteresisOf(readings);
    if (found.status !== 'found') throw new Error(found.status);
    return found;
  }
  const slopeOf = (readings: readonly LoadedReading[]): number => {
    const line = weightedLine(readings.map(({ moment }) => moment), readings.map(({ angle }) => angle), readings.map(() => 1));
    if (line.status !== 'fitted') throw new Error(line.status);
    return line.slope;
  };

  it('friction in the pivot shifts the branches by τ_f/κ and parts no slopes', () => {
    const readings = series((moment, unloading) => (moment + (unloading ? 1 : -1) * 1e-4) / KAPPA);
    const found = of(readings);
    expect(found.halfWidth).toBeCloseTo(1e-4 / KAPPA, 14);
    expect(found.widest).toBeCloseTo(1e-4 / KAPPA, 14);
    expect(found.slopesPart).toBeCloseTo(0, 12);
    expect(found.pairs).toBe(4);
    expect(1 / slopeOf(readings)).toBeCloseTo(KAPPA, 14);
  });

  it('friction of 3 % in the pulley parts the slopes by 0.03, and both branches together give κ', () => {
    const readings = series((moment, unloading) => (moment * (1 + (unloading ? 0.03 : -0.03))) / KAPPA);
    const found = of(readings);
    expect(found.slopesPart).toBeCloseTo(0.03, 14);
    expect(found.widest).toBeCloseTo((0.03 * 4e-3) / KAPPA, 14);
    expect(1 / slopeOf(readings)).toBeCloseTo(KAPPA, 14);
    // Loading alone is wrong by all of it.
    expect(1 / slopeOf(readings.filter(({ unloading }) => !unloading)) / KAPPA).toBeCloseTo(1 / 0.97, 12);
  });

  it('reads pairs through the cosine of a known angle, and none where only one branch was read', () => {
    const readings = series((moment, unloading) => moment / KAPPA + (unloading ? 1e-3 : 0)).map((reading) => ({ ...reading, moment: reading.moment * (reading.unloading ? 0.9995 : 1) }));
    expect(of(readings).pairs).toBe(4);
    expect(hysteresisOf(readings.filter(({ unloading }) => !unloading)).status).toBe('noPairs');
    expect(hysteresisOf([]).status).toBe('noPairs');
    expect(of([readings[0]!, readings[4]!]).slopesPart).toBeNull();
  });
});
