/** A pulse given as samples: read as pasted, reduced as a pulse of that shape, and told what is wrong with it. */
import { describe, expect, it } from 'vitest';
import { sentence } from '../../src/problems/sentences.ts';
import { readPulseSamples } from '../../src/readings/pulseSamples.ts';
import { reduce } from '../../src/reduction/reduce.ts';
import { sessionFromText, sessionToText } from '../../src/session/file.ts';
import type { Choices, Session } from '../../src/session/session.ts';
import { exactly, rowId, sessionOf } from '../fixtures/session.ts';
import { atRest, nextTurningPoint } from '../pendulum/odexForced.ts';

/** Point bob 100 g at 300 mm, read as an angle. */
const FREQUENCY = Math.sqrt(9.80665 / 0.3);
const FACTOR = 0.1 * 0.3 * 0.3 * FREQUENCY;
const ARM = 0.28;
const RATIO = 0.03;
/** Half-width of the pulse, s; an uneven hump. */
const LENGTH = 0.12;
const hump = (t: number): number => (t <= 0 || t >= LENGTH ? 0 : (t / LENGTH) ** 2 * (1 - t / LENGTH));

function bench(choices: Partial<Choices>, pulseSamples: string, first: number): Session {
  return {
    ...sessionOf({
      choices: { form: 'pointBob', readingWay: 'angle', dampingWay: 'ratio', pulseShape: 'measured', swingForm: 'smallAngle', ...choices },
      entries: { bobMass: '100 g', bobDistance: '300 ± 3 mm', gravity: '9.80665 m/s²', leverArm: '280 mm', division: '0.0001 mrad', dampingRatio: exactly(RATIO) },
      rows: [{ rest: 0, first: exactly(1e3 * first) }], readingUnit: 'mrad',
    }),
    pulseSamples,
  };
}

const lines = (count: number, write: (t: number, f: number) => string): string =>
  Array.from({ length: count }, (_, i) => (LENGTH * i) / (count - 1)).map((t) => write(t, hump(t))).join('\n');

describe('a measured pulse', () => {
  const impulse = 2e-3;
  // ∫ (t/τ)²(1 − t/τ) dt = τ/12.
  const force = (t: number): number => (impulse * 12 * hump(t)) / LENGTH;
  const top = nextTurningPoint({ zeta: RATIO, torque: (s) => (force(s / FREQUENCY) * ARM) / (FACTOR * FREQUENCY), until: LENGTH * FREQUENCY }, atRest);
  const samples = `t (ms);F (mN)\n${lines(241, (t, f) => `${(1e3 * t).toFixed(6)};${(7 * f).toFixed(9)}`)}`;

  it('gives the impulse of a pendulum back that another integrator drove with it', () => {
    const r = reduce(bench({}, samples, top.angle), rowId(1));
    expect(r.problems.filter(({ weight }) => weight === 'stops')).toEqual([]);
    expect(Math.abs(r.run!.mean.value / impulse - 1)).toBeLessThan(3e-5);
    const step = r.explained!.chain.find(({ id }) => id === 'correction.pulse')!;
    expect(step.label).toContain('measured');
    expect(step.factor).toBeGreaterThan(1.005);
    expect(Math.abs(reduce(bench({ correctPulse: false }, samples, top.angle), null).run!.mean.value / impulse - 1)).toBeGreaterThan(5e-3);
  });

  it('stands in the budget with what lies between its samples, less of it where they are closer', () => {
    const between = (count: number): number => {
      const text = `ms\n${lines(count, (t, f) => `${1e3 * t}\t${f}`)}`;
      const budget = reduce(bench({}, text, top.angle), rowId(1)).explained!.budget!;
      return Math.abs(budget.lines.find(({ label }) => label === 'Pulse between its samples')!.contribution);
    };
    expect(between(9)).toBeGreaterThan(4 * between(33));
    expect(between(33)).toBeGreaterThan(0);
  });

  it('is read as a spreadsheet gives it: tabs, semicolons or blanks, decimal commas, a line of names and units', () => {
    const expected = { time: [0, 0.0005, 0.0012], force: [0, 1, -0.5] };
    for (const text of ['t (ms)\tF (N)\n0\t0\n0.5\t2\n1.2\t-1', 'Zeit;Kraft\nms;N\n0;0\n0,5;2,0\n1,2;-1,0\n', '# µs\n0 0\r\n500 2\r\n1200 -1\r\n', 's\n0, 0\n0.0005, 2\n0.0012, -1']) {
      const { samples: read, problems } = readPulseSamples(text);
      expect(problems).toEqual([]);
      expect(read!.time.map((t) => Number(t.toFixed(9)))).toEqual(expected.time);
      expect(read!.force).toEqual(expected.force);
    }
    expect(readPulseSamples('0 0\n1 1\n2 0').problems.map(({ code }) => code)).toEqual(['pulse-samples-unit-assumed']);
  });

  it.each([
    ['', 'pulse-samples-missing', /Paste a time and a thrust/],
    ['ms; N\n0; 1', 'pulse-samples-missing', /one sample/],
    ['0 1\n1 two\n2 0', 'pulse-sample-not-two-numbers', /line 2: “1 two”/],
    ['0 1 2\n1 2 3', 'pulse-sample-not-two-numbers', /line 1/],
    ['ms;N\n0;1\n2;1\n2;0', 'pulse-sample-time-not-rising', /line 4/],
    ['ms\n0 0\n1 0', 'pulse-samples-no-impulse', /integral/],
    ['ms\n0 1\n1 -3\n2 0', 'pulse-samples-no-impulse', /integral/],
    ['s\n0 1\n1 1', 'pulse-reaches-the-peak', /first maximum/],
    [Array.from({ length: 20_001 }, (_, i) => `${i} 1`).join('\n'), 'pulse-samples-too-many', /20001 lines/],
  ])('that gives no correction says why: %#', (text, code, words) => {
    const r = reduce(bench({}, text, 0.05), null);
    const found = r.problems.filter((p) => p.code === code);
    expect(found).toHaveLength(1);
    expect(found[0]!.place.entry).toBe('pulseSamples');
    expect(sentence(found[0]!)).toMatch(words);
    expect(r.run).toBeNull();
  });

  it('is kept in the session’s file, and older files open without it', () => {
    const session = bench({}, samples, 0.05);
    expect(sessionFromText(sessionToText(session)).session!.pulseSamples).toBe(samples);
    const { pulseSamples: _, ...older } = session;
    expect(sessionFromText(JSON.stringify(older))).toMatchObject({ session: { pulseSamples: '' }, problems: [] });
  });
});
