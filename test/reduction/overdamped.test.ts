/** Pendulums damped up to critically and beyond: the damping by the time to the first maximum, and what the swings cannot tell. */
import { describe, expect, it } from 'vitest';
import { ratioOfPeakTime } from '../../src/pendulum/damping.ts';
import { peakTimeOfSmall } from '../../src/pendulum/launch.ts';
import { sentence } from '../../src/problems/sentences.ts';
import { reduce } from '../../src/reduction/reduce.ts';
import type { Choices, Session } from '../../src/session/session.ts';
import { exactly, rowId, sessionOf, type Row, type SessionParts } from '../fixtures/session.ts';
import { atRest, turningPointAfter } from '../pendulum/odexSwing.ts';

const FREQUENCY = Math.sqrt(9.80665 / 0.3);
const FACTOR = 0.1 * 0.3 * 0.3 * FREQUENCY;
const IMPULSE = 8e-3;
const LAUNCH = (IMPULSE * 0.28) / FACTOR;

function bench(rows: readonly Row[], entries: SessionParts['entries'], choices: Partial<Choices> = {}, freeSwing = ''): Session {
  return sessionOf({
    choices: { form: 'pointBob', readingWay: 'angle', ...choices },
    entries: { bobMass: '100 g', bobDistance: '300 mm', gravity: '9.80665 m/s²', leverArm: '280 mm', division: '0.0001 mrad', ...entries },
    rows, readingUnit: 'mrad', freeSwing,
  });
}
const codes = (session: Session): readonly string[] => reduce(session, null).problems.map(({ code }) => code);

describe('the time to the first maximum', () => {
  it.each([0.5, 1, 1.5, 3])('gives damping and impulse back at ζ = %f, as another integrator swings it', (zeta) => {
    const small = turningPointAfter({ zeta, p: 0 }, atRest(1e-4));
    const swung = turningPointAfter({ zeta, p: 1 }, atRest(LAUNCH));
    const entries = { firstMaximumTime: `${exactly(small.time / FREQUENCY)} s` };
    const r = reduce(bench([{ rest: 0, first: exactly(1e3 * swung.angle) }], entries, { dampingWay: 'maximumTime' }), rowId(1));
    expect(Math.abs(r.damping!.ratio.value / zeta - 1)).toBeLessThan(1e-6);
    expect(Math.abs(r.run!.mean.value / IMPULSE - 1)).toBeLessThan(1e-6);
    expect(r.problems.filter(({ weight }) => weight === 'stops')).toEqual([]);
    const typed = reduce(bench([{ rest: 0, first: exactly(1e3 * swung.angle) }], { dampingRatio: exactly(zeta) }, { dampingWay: 'ratio' }), null);
    expect(Math.abs(typed.run!.mean.value / IMPULSE - 1)).toBeLessThan(1e-9);
  });

  it('carries its uncertainty, and that of the frequency, into the impulse', () => {
    const swung = turningPointAfter({ zeta: 1.5, p: 1 }, atRest(LAUNCH));
    const seconds = peakTimeOfSmall(1.5) / FREQUENCY;
    const at = (t: number, u = ''): number => {
      const run = reduce(bench([{ rest: 0, first: exactly(1e3 * swung.angle) }], { firstMaximumTime: `${exactly(t)}${u} s` }, { dampingWay: 'maximumTime' }), null).run!.mean;
      return u === '' ? run.value : run.u;
    };
    const bare = reduce(bench([{ rest: 0, first: exactly(1e3 * swung.angle) }], { firstMaximumTime: `${exactly(seconds)} s` }, { dampingWay: 'maximumTime' }), null).run!.mean.u;
    // Half-difference of half-difference, through ζ.
    expect(Math.sqrt(at(seconds, ' ± 0.003') ** 2 - bare ** 2) / Math.abs((at(seconds + 0.003) - at(seconds - 0.003)) / 2)).toBeCloseTo(1, 3);
  });

  it('undoes t_p = arccosh ζ/(ω √(ζ² − 1)), arccos below critical, at every damping', () => {
    for (const zeta of [0, 1e-3, 0.02, 0.3, 0.999, 1, 1.001, 1.5, 3, 40, 1e4]) expect(Math.abs(ratioOfPeakTime(peakTimeOfSmall(zeta)) - zeta)).toBeLessThan(1e-9 * Math.max(1, zeta));
    expect(ratioOfPeakTime(Math.PI / 2)).toBeCloseTo(0, 14);
    expect(() => ratioOfPeakTime(0)).toThrow(RangeError);
    expect(() => ratioOfPeakTime(3)).toThrow(RangeError);
  });

  it('that is longer than a quarter period is told, but for what chance does', () => {
    const quarter = Math.PI / (2 * FREQUENCY);
    const found = reduce(bench([{ rest: 0, first: 30 }], { firstMaximumTime: `${exactly(1.1 * quarter)} s` }, { dampingWay: 'maximumTime' }), null);
    expect(found.problems.filter(({ code }) => code === 'maximum-time-too-late').map(sentence)).toEqual([expect.stringMatching(/later than the quarter period/)]);
    const chance = reduce(bench([{ rest: 0, first: 30 }], { firstMaximumTime: `${exactly(1.01 * quarter)} ± ${exactly(0.02 * quarter)} s` }, { dampingWay: 'maximumTime' }), null);
    expect(chance.problems.map(({ code }) => code)).not.toContain('maximum-time-too-late');
    expect(chance.damping!.ratio.value).toBe(0);
    expect(chance.damping!.ratio.u).toBeGreaterThan(0.01);
  });

  it('needs the natural frequency', () => {
    expect(codes(bench([{ rest: 0, first: 30 }], { firstMaximumTime: '0.2 s', bobMass: '' }, { dampingWay: 'maximumTime' }))).toContain('maximum-time-needs-the-body');
  });
});

describe('a swing measured from side to side', () => {
  it('is the first swing alone where the pendulum has no other side', () => {
    const of = (swingMeasured: Choices['swingMeasured'], ratio: string): number => reduce(bench([{ rest: 0, first: 30 }], { dampingRatio: ratio }, { dampingWay: 'ratio', swingMeasured }), null).run!.mean.value;
    for (const ratio of ['1', '1.5', '3 ± 0.1']) expect(of('sideToSide', ratio) / of('fromRest', ratio)).toBeCloseTo(1, 12);
    expect(of('sideToSide', '0.5') / of('fromRest', '0.5')).toBeCloseTo(1 / (1 + Math.exp(-Math.PI / Math.sqrt(3))), 4);
  });
});

describe('swings that never cross the rest', () => {
  it('are told as damped critically or more, with what to type', () => {
    const r = reduce(bench([{ rest: 10, first: 60, next: [30, 15] }, { rest: 10, first: 62, next: [31, 16] }], {}, { dampingWay: 'swings' }), null);
    const [found] = r.problems.filter(({ code }) => code === 'swings-never-cross-rest');
    expect(found!.facts['records']).toBe(2);
    expect(sentence(found!)).toMatch(/arccosh ζ/);
    expect(r.problems.map(({ code }) => code)).toContain('damping-none');
    expect(codes(bench([{ rest: 10, first: 60, next: [30, 15] }], {}, { dampingWay: 'maximumTime', form: 'pointBob' }))).not.toContain('swings-never-cross-rest');
  });

  it('are told of a free swing typed, too', () => {
    const r = reduce(bench([{ rest: 0, first: 30 }], {}, { dampingWay: 'swings' }, '60 30 15 8 mrad'), null);
    expect(r.problems.find(({ code }) => code === 'swings-never-cross-rest')!.place).toEqual({ entry: 'freeSwing' });
  });

  it('are not those of one side alone, noted with a blank for each swing between', () => {
    const r = reduce(bench([{ rest: 0, first: 60, next: ['', 50, '', 42] }], {}, { dampingWay: 'swings' }), null);
    expect(r.problems.map(({ code }) => code)).not.toContain('swings-never-cross-rest');
    expect(r.damping!.logDecrement.value).toBeCloseTo(Math.log(60 / 42) / 2, 2);
  });
});

describe('swings that tell no damping', () => {
  it.each([
    ['too few without a rest', [{ first: 60, next: ['', 50, '', 42] }], 'swings-too-few'],
    ['growing from one to the next', [{ rest: 0, first: 50, next: [-52, 54] }], 'swings-grow'],
    ['on the wrong side', [{ rest: 0, first: 50, next: [52, 54] }], 'swings-not-decaying'],
  ] as const)('say why: %s', (_, rows, code) => {
    const found = codes(bench(rows, {}, { dampingWay: 'swings' }));
    expect(found.filter((one) => one.startsWith('swing'))).toEqual([code]);
  });

  it('beyond a standstill are left out, and said', () => {
    const swung = [60, -50, 40, -30, 20, -10];
    const whole = reduce(bench([{ rest: 0, first: swung[0]!, next: swung.slice(1) }], {}, { dampingWay: 'swings', dampingLaw: 'friction' }), null);
    const held = reduce(bench([{ rest: 0, first: swung[0]!, next: [...swung.slice(1), 2, 2, 2] }], {}, { dampingWay: 'swings', dampingLaw: 'friction' }), null);
    expect(held.problems.map(({ code }) => code)).toContain('swing-stopped');
    expect(whole.damping!.friction.value).toBeCloseTo(5e-3, 4);
    expect(held.damping!.friction.value).toBeGreaterThan(4e-3);
  });
});
