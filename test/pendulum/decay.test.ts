/** Damping laws fitted to turning points, and the choice among them, on swings with known damping. */
import { describe, expect, test } from 'vitest';
import { chooseDampingLaw, DAMPING_TERMS, fitDecay, slopeOfStraightened, straightened, uOfTerm } from '../../src/pendulum/decay.ts';
import type { DampingTerm, DecayFit, DecayReadings } from '../../src/pendulum/decay.ts';
import { ratioFromSwings } from '../../src/pendulum/damping.ts';
import { turningPointsOf, UNDAMPED } from '../../src/pendulum/dampingLaws.ts';
import type { Damping } from '../../src/pendulum/dampingLaws.ts';

/** Normal deviates from a seeded generator of the tests' own (mulberry32, Box and Muller). */
function normals(seed: number): () => number {
  let a = seed;
  const uniform = (): number => {
    a = (a + 0x6d2b79f5) | 0;
    let t = Math.imul(a ^ (a >>> 15), 1 | a);
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t;
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
  return () => Math.sqrt(-2 * Math.log(1 - uniform())) * Math.cos(2 * Math.PI * uniform());
}

interface Swing {
  readonly first: number;
  readonly damping: Partial<Damping>;
  readonly count: number;
  readonly u: number;
  readonly rest?: number;
  readonly p?: number;
}
function readingsOf({ first, damping, count, u, rest = 0.02, p = 1 }: Swing, noise: () => number): DecayReadings {
  const angles = turningPointsOf(first, { ...UNDAMPED, ...damping }, p, count - 1);
  return { points: angles.map((angle, number) => ({ number, angle: rest + angle + u * noise() })), u: angles.map(() => u), rest: null, gravityShare: p };
}
const silent = (): number => 0;
function found(fit: ReturnType<typeof fitDecay>): DecayFit {
  if (fit.status !== 'found') throw new Error(fit.status);
  return fit;
}

const CASES: readonly (readonly [DampingTerm, number])[] = [['ratio', 0.03], ['quadratic', 0.6], ['friction', 0.006]];

describe('the fit of a damping law', () => {
  test('gives the law’s parameter, the rest and the first amplitude back from turning points without scatter', () => {
    for (const [term, value] of CASES) for (const p of [1, 0.5]) for (const first of [0.3, -0.3]) {
      const fit = found(fitDecay([term], readingsOf({ first, damping: { [term]: value }, count: 9, u: 1e-4, p }, silent)));
      expect(Math.abs(fit.damping[term] / value - 1)).toBeLessThan(1e-9);
      expect(Math.abs(fit.rest - 0.02)).toBeLessThan(1e-12);
      expect(Math.abs(fit.amplitude - first)).toBeLessThan(1e-11);
      expect(fit.dof).toBe(6);
    }
  });

  test('gives two laws together back', () => {
    const fit = found(fitDecay(['ratio', 'quadratic'], readingsOf({ first: 0.4, damping: { ratio: 0.01, quadratic: 0.3 }, count: 16, u: 1e-4 }, silent)));
    expect(Math.abs(fit.damping.ratio / 0.01 - 1)).toBeLessThan(1e-7);
    expect(Math.abs(fit.damping.quadratic / 0.3 - 1)).toBeLessThan(1e-7);
  });

  test('finds the ratio that the viscous fit of equal weights finds, and its sensitivities', () => {
    const noise = normals(5);
    const readings = readingsOf({ first: 0.2, damping: { ratio: 0.04 }, count: 7, u: 5e-4 }, noise);
    const fit = found(fitDecay(['ratio'], readings));
    const other = ratioFromSwings(null, readings.points, 1);
    expect(Math.abs(fit.damping.ratio - other.dampingRatio)).toBeLessThan(2e-3 * uOfTerm(fit, 0));
    const largest = Math.max(...other.sensitivities.map(Math.abs));
    fit.sensitivities.forEach((c, i) => expect(Math.abs(c - other.sensitivities[i]!)).toBeLessThan(5e-3 * largest));
  });

  test('tells by its sensitivities how the parameter follows each reading', () => {
    const noise = normals(6);
    for (const [term, value] of CASES) {
      const base: DecayReadings = { ...readingsOf({ first: 0.2, damping: { [term]: value }, count: 6, u: 3e-4 }, noise), rest: { angle: 0.0203, u: 2e-4 } };
      const fit = found(fitDecay([term], base));
      const h = 1e-6;
      fit.sensitivities.forEach((c, i) => {
        const at = (d: number): number =>
          found(fitDecay([term], { ...base, rest: { angle: 0.0203 + (i === 0 ? d : 0), u: 2e-4 }, points: base.points.map((point, k) => ({ ...point, angle: point.angle + (k + 1 === i ? d : 0) })) })).damping[term];
        const largest = Math.max(...fit.sensitivities.map(Math.abs));
        expect(Math.abs((at(h) - at(-h)) / (2 * h) - c)).toBeLessThan(0.03 * largest);
      });
    }
  });

  test('states the scatter of its parameter: the spread over many noisy swings is its standard uncertainty', () => {
    const noise = normals(7);
    for (const [term, value] of CASES) {
      const fits = Array.from({ length: 150 }, () => found(fitDecay([term], readingsOf({ first: 0.2, damping: { [term]: value }, count: 8, u: 5e-4 }, noise))));
      const scaled = fits.map((fit) => (fit.damping[term] - value) / uOfTerm(fit, 0));
      const mean = scaled.reduce((sum, x) => sum + x, 0) / scaled.length;
      const deviation = Math.sqrt(scaled.reduce((sum, x) => sum + x * x, 0) / scaled.length);
      // Sampling: u of the mean 1/√150, of the deviation 1/√300; four of them.
      expect(Math.abs(mean)).toBeLessThan(4 / Math.sqrt(150));
      expect(Math.abs(deviation - 1)).toBeLessThan(4 / Math.sqrt(300));
      const chi = fits.reduce((sum, fit) => sum + fit.chiSquared, 0) / 150;
      expect(Math.abs(chi - 5)).toBeLessThan(4 * Math.sqrt(10 / 150));
    }
  });

  test('says so where there are too few readings, and where no swing goes the other way', () => {
    const readings = readingsOf({ first: 0.2, damping: { ratio: 0.02 }, count: 2, u: 1e-4 }, silent);
    expect(fitDecay(['ratio'], readings).status).toBe('tooFew');
    const oneSided = { ...readings, points: [0.2, 0.3, 0.5].map((angle, number) => ({ number, angle })), u: [1e-4, 1e-4, 1e-4], rest: { angle: 0, u: 1e-4 } };
    expect(fitDecay(['ratio'], oneSided).status).toBe('notDecaying');
    expect(() => fitDecay(['ratio'], { ...readings, u: [0, 1] })).toThrow(RangeError);
  });

  test('uses turning points that begin late and leave numbers out', () => {
    const whole = readingsOf({ first: 0.3, damping: { quadratic: 0.5 }, count: 12, u: 1e-4 }, silent);
    const some = [1, 2, 5, 8, 11].map((n) => whole.points[n]!);
    const fit = found(fitDecay(['quadratic'], { ...whole, points: some, u: some.map(() => 1e-4) }));
    expect(Math.abs(fit.damping.quadratic / 0.5 - 1)).toBeLessThan(1e-8);
    const sameSide = [0, 2, 4, 6].map((n) => whole.points[n]!);
    const fromOneSide = found(fitDecay(['quadratic'], { ...whole, points: sameSide, u: sameSide.map(() => 1e-4), rest: { angle: 0.02, u: 1e-4 } }));
    expect(Math.abs(fromOneSide.damping.quadratic / 0.5 - 1)).toBeLessThan(1e-8);
  });
});

describe('the choice of the damping law', () => {
  test('names the law that the swing follows where the readings can tell', () => {
    const noise = normals(11);
    for (const [term, value] of CASES) {
      const choice = chooseDampingLaw(readingsOf({ first: 0.3, damping: { [term]: value }, count: 20, u: 3e-4 }, noise));
      expect(choice).toMatchObject({ status: 'told', best: term, possible: [term], mixed: null });
      expect(new Set(choice.fits.map((fit) => fit.terms[0]))).toEqual(new Set(DAMPING_TERMS));
    }
  });

  test('leaves the true law among the possible ones where noise hides which it is, in nearly every swing', () => {
    const noise = normals(12);
    let [lost, undecided] = [0, 0];
    for (let i = 0; i < 25; i++) for (const [term, value] of CASES) {
      const choice = chooseDampingLaw(readingsOf({ first: 0.05, damping: { [term]: value * (term === 'quadratic' ? 6 : term === 'friction' ? 1 / 6 : 1) }, count: 6, u: 1e-3 }, noise));
      if (!choice.possible.includes(term)) lost++;
      if (choice.status === 'notToldApart') undecided++;
    }
    // 1 % of 75 are to be expected.
    expect(lost).toBeLessThanOrEqual(4);
    expect(undecided).toBeGreaterThan(60);
  });

  test('does not tell laws apart on a swing that hardly falls', () => {
    const choice = chooseDampingLaw(readingsOf({ first: 0.1, damping: { ratio: 1e-5 }, count: 10, u: 3e-4 }, normals(13)));
    expect(choice.status).toBe('notToldApart');
    expect(choice.possible).toHaveLength(3);
  });

  test('asks for two laws together where air drags in both ways', () => {
    const choice = chooseDampingLaw(readingsOf({ first: 0.5, damping: { ratio: 0.008, quadratic: 0.3 }, count: 40, u: 1e-4 }, normals(14)));
    expect(choice.status).toBe('mixed');
    expect(choice.mixed?.terms).toEqual(['ratio', 'quadratic']);
    expect(Math.abs(choice.mixed!.damping.ratio - 0.008)).toBeLessThan(4 * uOfTerm(choice.mixed!, 0));
  });

  test('says that no law fits where the swing was disturbed', () => {
    const readings = readingsOf({ first: 0.3, damping: { ratio: 0.02 }, count: 10, u: 3e-4 }, silent);
    const points = readings.points.map((point, i) => ({ ...point, angle: point.angle + (i === 4 ? 0.02 : i === 6 ? -0.015 : 0) }));
    expect(chooseDampingLaw({ ...readings, points }).status).toBe('noneFits');
  });

  test('says that three readings are too few to choose by', () => {
    expect(chooseDampingLaw(readingsOf({ first: 0.3, damping: { ratio: 0.02 }, count: 3, u: 3e-4 }, silent)).status).toBe('tooFew');
  });
});

test('ln A, 1/A and A fall in straight lines, each under its own law', () => {
  for (const [term, value] of [['ratio', 0.001], ['quadratic', 0.05], ['friction', 1e-5]] as const) {
    const angles = turningPointsOf(0.01, { ...UNDAMPED, [term]: value }, 1, 8);
    const perCycle = (straightened(term, Math.abs(angles[8]!)) - straightened(term, angles[0]!)) / 4;
    expect(Math.abs(perCycle / slopeOfStraightened(term, value) - 1)).toBeLessThan(2e-3);
  }
  expect(() => straightened('ratio', 0)).toThrow(RangeError);
});
