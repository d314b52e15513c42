/** What is said of the damping beside its number: how the swing dies by each law, and damping carried to other gas. */
import { describe, expect, it } from 'vitest';
import { turningPointsOf } from '../../src/pendulum/dampingLaws.ts';
import { sentence } from '../../src/problems/sentences.ts';
import { reduce } from '../../src/reduction/reduce.ts';
import type { Choices, Session } from '../../src/session/session.ts';
import { rowId, sessionOf, type Row, type SessionParts } from '../fixtures/session.ts';

function bench(rows: readonly Row[], entries: SessionParts['entries'] = {}, choices: Partial<Choices> = {}, freeSwing = ''): Session {
  return sessionOf({
    choices: { form: 'pointBob', readingWay: 'angle', dampingWay: 'swings', ...choices },
    entries: { bobMass: '100 g', bobDistance: '300 mm', gravity: '9.80665 m/s²', leverArm: '280 mm', tapLeverArm: '280 mm', division: '0.01 mrad', ...entries },
    rows, readingUnit: 'mrad', freeSwing,
  });
}
const codes = (session: Session): readonly string[] => reduce(session, null).problems.map(({ code }) => code);

describe('how the longest swing dies away', () => {
  const quadratic = turningPointsOf(0.06, { ratio: 0, quadratic: 0.8, friction: 0 }, 1, 7);
  const mrad = quadratic.map((angle) => (1e3 * angle).toFixed(5));
  const session = bench([{ rest: 0, first: 50, next: [-49] }, { rest: 0, first: mrad[0]!, next: mrad.slice(1) }], {}, { dampingLaw: 'byDecay' });

  it('is told by each law with its fit, against the amplitudes read', () => {
    const { decay } = reduce(session, null);
    expect(decay!.record).toBe(rowId(2));
    expect(decay!.law).toBe('quadratic');
    expect(decay!.readings.map(({ number }) => number)).toEqual([0, 1, 2, 3, 4, 5, 6, 7]);
    decay!.readings.forEach(({ number, amplitude }) => expect(Math.abs(amplitude.value - Math.abs(quadratic[number]!))).toBeLessThan(1e-7));
    expect(decay!.readings[0]!.amplitude.u).toBeCloseTo(1e-5 / Math.sqrt(12), 12);
    const by = new Map(decay!.fits.map((fit) => [fit.law, fit]));
    expect([...by.keys()].sort()).toEqual(['friction', 'quadratic', 'viscous']);
    expect(by.get('quadratic')!.parameter.value).toBeCloseTo(0.8, 3);
    expect(by.get('quadratic')!.chiSquared).toBeLessThan(1);
    expect(by.get('viscous')!.chiSquared).toBeGreaterThan(1000);
    by.get('quadratic')!.amplitudes.forEach((amplitude, number) => expect(Math.abs(amplitude - Math.abs(quadratic[number]!))).toBeLessThan(1e-6));
  });

  it('is not told where the damping is typed', () => {
    expect(reduce(bench([{ rest: 0, first: 50, next: [-49, 48] }], { dampingRatio: '0.01' }, { dampingWay: 'ratio' }), null).decay).toBeNull();
  });

  it('is not told of swings with three turning points, which every law fits', () => {
    expect(reduce(bench([{ rest: 0, first: 50, next: [-49, 48] }]), null).decay).toBeNull();
  });

  it('is that of the free swing typed on the bench, where that is the longest', () => {
    expect(reduce(bench([{ rest: 0, first: 50, next: [-49] }], {}, {}, '60 -58 56 -54 52 mrad'), null).decay!.record).toBeNull();
  });
});

describe('damping carried over', () => {
  const rows: readonly Row[] = [{ kind: 'tap', rest: 0, first: 40, tapImpulse: 5 }, { rest: 0, first: 50, next: [-48, 46] }, { rest: 0, first: 51, next: [-49, 47] }];

  it('to gas of another pressure may be anything from none to twice as much, and says so', () => {
    const other = bench(rows, { pressure: '0.01 Pa', tapPressure: '100 kPa' }, { calibration: 'taps' });
    const same = bench(rows, { pressure: '0.01 Pa', tapPressure: '0.01 Pa' }, { calibration: 'taps' });
    const found = reduce(other, null).problems.find(({ code }) => code === 'damping-carried-over')!;
    expect(found.weight).toBe('doubt');
    expect(sentence(found)).toMatch(/another pressure/);
    const relative = (session: Session): number => reduce(session, null).calibrations.taps!.factor.u / reduce(session, null).calibrations.taps!.factor.value;
    const ratio = reduce(other, null).damping!.ratio.value;
    expect(Math.sqrt(relative(other) ** 2 - relative(same) ** 2) / ((Math.PI / 2) * (ratio / Math.sqrt(3)))).toBeCloseTo(1, 1);
    const line = reduce(other, rowId(2)).explained!.budget!.lines.find(({ label }) => label === 'Damping carried over to gas of another pressure')!;
    expect(line.contribution).not.toBe(0);
    expect(codes(same)).not.toContain('damping-carried-over');
  });
});

describe('what is not said of the bench', () => {
  it('a run without any pressure cannot be called a vacuum figure, and that is noted once', () => {
    const rows: readonly Row[] = [{ rest: 0, first: 50 }, { rest: 0, first: 51 }];
    const found = reduce(bench(rows), null).problems.filter(({ code }) => code === 'pressure-not-stated');
    expect(found.map(({ weight, place }) => [weight, place])).toEqual([['note', { entry: 'pressure' }]]);
    expect(codes(bench(rows, { pressure: '0.01 Pa' }))).not.toContain('pressure-not-stated');
    expect(codes(bench([{ rest: 0, first: 50, pressure: 5 }, { rest: 0, first: 51, pressure: 5 }]))).not.toContain('pressure-not-stated');
    expect(codes(bench([{ kind: 'tap', rest: 0, first: 50, tapImpulse: 5 }]))).not.toContain('pressure-not-stated');
  });

  it.each([['tiltInPlane', '95°'], ['tiltOutOfPlane', '90°'], ['tiltInPlane', '10 rad']] as const)('a thrust turned out of leverage stops the figure and not the page: %s %s', (name, typed) => {
    const r = reduce(bench([{ rest: 0, first: 50 }], { [name]: typed }), null);
    expect(r.run).toBeNull();
    expect(r.problems.find(({ code }) => code === 'tilt-leaves-no-leverage')!.place).toEqual({ entry: name });
  });
});
