/** A sampled trace through the whole road: impulses in, a record integrated apart from the road, the impulses out. */
import { describe, expect, it } from 'vitest';
import { reduce } from '../../src/reduction/reduce.ts';
import { readSampledText } from '../../src/readings/sampled/sampledRecord.ts';
import type { Reduction } from '../../src/reduction/results.ts';
import type { TraceLibrary } from '../../src/reduction/traceRead.ts';
import { FIRST_TRACE, type Session, type Trace } from '../../src/session/session.ts';
import { exactly, sessionOf, withChoices } from '../fixtures/session.ts';
import { draws } from '../metrology/sources.ts';
import { struck } from '../traces/struck.ts';

/** 50 g at 0.3 m, read on a point at 0.3 m by a displacement sensor. */
const [M, L, G, ARM, TAP_ARM, Z] = [0.05, 0.3, 9.80665, 0.28, 0.25, 0.01];
const W = Math.sqrt(G / L);
const K = M * L * L * W;
const RATE = 100;
const on = (time: number): number => Math.round(time * RATE) / RATE;

const SHOTS = [1.1e-4, 1.2e-4, 0.9e-4, 1.05e-4];
const TIMES = [5, 17, 24.5, 26].map(on);

function trace({ noise = 0, header = 'Time (s);Displacement (µm)', events = TIMES, jumps = SHOTS.map((i) => (i * ARM) / K), trigger = false }: { readonly noise?: number; readonly header?: string; readonly events?: readonly number[]; readonly jumps?: readonly number[]; readonly trigger?: boolean } = {}): string {
  const { normal } = draws(5);
  const { t, theta } = struck({ frequency: W, ratio: Z, share: 1, events, jumps, seconds: 60, rate: RATE, start: [0.0005, 0.0003] });
  const rows = t.map((time, i) => `${exactly(time)};${exactly(Number((1e6 * L * Math.sin(theta[i]!) + 40 + 0.1 * time + noise * normal()).toFixed(4)))}${trigger ? `;${events.some((at) => time >= at && time < at + 0.02) ? 5 : 0}` : ''}`);
  return [trigger ? `${header};Trigger (V)` : header, ...rows].join('\n');
}

/** A session with one trace, and the record that its bytes hold. */
interface Traced {
  readonly session: Session;
  readonly library: TraceLibrary;
}

function bench(text: string, events: string, choices = {}, more: Partial<Trace> = {}, entries = {}): Traced {
  const session = withChoices(sessionOf({
    choices: { form: 'pointBob', readingWay: 'sensorOnPoint', dampingWay: 'none' },
    entries: { bobMass: '50 g', bobDistance: '300 mm', leverArm: '280 mm', readingRadius: '300 mm ± 0.5 %', tapLeverArm: '250 mm', gravity: `${G} m/s²`, ...entries },
  }), choices);
  const lines = events === '' ? [] : events.split('\n').map((line, i) => ({ id: `e${i + 1}`, text: line }));
  return { session: { ...session, traces: [{ ...FIRST_TRACE, id: 't1', name: 'sensor.csv', sha256: 'ab', bytes: text.length, events: lines, ...more }] }, library: new Map([['ab', readSampledText(text, { place: { sheetName: 'sensor.csv' } })]]) };
}
const list = TIMES.map(exactly).join('\n');
const reduced = ({ session, library }: Traced): Reduction => reduce(session, null, library);
const bits = (traced: Traced): readonly number[] => reduced(traced).records.filter(({ kind }) => kind === 'shot').map(({ impulseBit }) => impulseBit!.value);
const codes = (traced: Traced): readonly string[] => reduced(traced).problems.map((p) => p.code);

describe('impulses come back from a trace', () => {
  it('of a pendulum never at rest on a drifting rest line, the last two shots a cycle and a half apart', () => {
    const found = bits(bench(trace(), list));
    expect(found).toHaveLength(4);
    found.forEach((bit, k) => expect(bit / SHOTS[k]!).toBeCloseTo(1, 3));
  });

  it('with noise within their u, the trace’s own frequency and damping told', () => {
    const r = reduced(bench(trace({ noise: 20 }), list));
    r.records.forEach(({ impulseBit }, k) => expect(Math.abs(impulseBit!.value - SHOTS[k]!)).toBeLessThan(3.5 * impulseBit!.u));
    expect(r.traces[0]!.fitted!.period.value).toBeCloseTo((2 * Math.PI) / W, 3);
    expect(Math.abs(r.traces[0]!.fitted!.ratio.value - Z)).toBeLessThan(4 * r.traces[0]!.fitted!.ratio.u);
    expect(r.traces[0]!.fitted!.noise * 1e6).toBeCloseTo(20, 0);
    // The reading radius is common to all shots, the noise is not.
    expect(r.run!.uCommon / r.run!.mean.value).toBeGreaterThan(0.0049);
  });

  it('at the times of a trigger where no list is written', () => {
    const found = bits(bench(trace({ trigger: true }), '', {}, { eventsFrom: 'trigger' }));
    // The trigger rises between two samples: half a sample early.
    found.forEach((bit, k) => expect(Math.abs(bit / SHOTS[k]! - 1)).toBeLessThan(0.03));
  });

  it('by taps that are in the same trace', () => {
    const [a, b] = [1e-4, 1.3e-4];
    const text = trace({ jumps: [(a * TAP_ARM) / K, SHOTS[1]! * ARM / K, (b * TAP_ARM) / K, SHOTS[3]! * ARM / K] });
    const events = [`${TIMES[0]} tap 0.1 mN·s`, TIMES[1], `${TIMES[2]} tap 0.13 mN·s`, TIMES[3]].join('\n');
    const r = reduced(bench(text, events, { calibration: 'taps' }));
    expect(r.calibrations.taps!.factor.value / K).toBeCloseTo(1, 3);
    expect(r.records.filter(({ kind }) => kind === 'shot').map(({ impulseBit }) => impulseBit!.value / SHOTS[1]!)[0]).toBeCloseTo(1, 3);
  });
});

describe('what is wrong with a trace is said, and the rest goes on', () => {
  it('a wrong time is a step of the position', () => {
    const wrong = ['5.06', ...TIMES.slice(1).map(exactly)].join('\n');
    expect(codes(bench(trace({ noise: 5 }), wrong))).toContain('trace-position-step');
    expect(codes(bench(trace({ noise: 5 }), list))).not.toContain('trace-position-step');
  });

  it.each([
    ['trace-events-outside', trace(), `${list}\n400`],
    ['trace-event-not-read', trace(), `${list}\nsoon`],
    ['trace-no-samples', 'nothing here', list],
    ['trace-time-not-rising', `t (s);x (mm)\n${Array.from({ length: 40 }, (_, i) => `${i === 30 ? 2 : i};${i % 7}`).join('\n')}`, '5'],
    ['trace-constant', `t (s);x (mm)\n${Array.from({ length: 40 }, (_, i) => `${i};3`).join('\n')}`, '5'],
    ['trace-unit-assumed', trace({ header: 'Time;Displacement' }), list],
    ['trace-not-fitted', `t (s);x (mm)\n${Array.from({ length: 40 }, (_, i) => `${i};${i}`).join('\n')}`, '5'],
  ] as const)('%s', (code, text, events) => {
    expect(codes(bench(text, events))).toContain(code);
  });

  it('a record without a shot gives no impulse bit', () => {
    const r = reduced(bench(trace({ jumps: [0, 0, 0, 0] }), ''));
    expect(r.records).toEqual([]);
    expect(r.run).toBeNull();
    expect(r.traces[0]!.fitted!.period.value).toBeCloseTo((2 * Math.PI) / W, 3);
  });
});
