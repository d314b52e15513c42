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

describe('a trace read as it came', () => {
  it('its shots found in the swing', () => {
    const found = bits(bench(trace({ noise: 3 }), '', {}, { eventsFrom: 'found' }));
    expect(found).toHaveLength(4);
    found.forEach((bit, k) => expect(Math.abs(bit / SHOTS[k]! - 1)).toBeLessThan(0.02));
  });

  it('its list on another clock, the offset found from the shots themselves, typed, or open', () => {
    const late = TIMES.map((time) => exactly(Number((time - 3.7).toFixed(3)))).join('\n');
    const traced = bench(trace({ noise: 3 }), late, {}, { offset: 'find', refine: '50 ms' });
    expect(codes(traced)).toContain('trace-offset-found');
    expect(reduced(traced).traces[0]!.offset!.value).toBeCloseTo(3.7, 1);
    bits(traced).forEach((bit, k) => expect(Math.abs(bit / SHOTS[k]! - 1)).toBeLessThan(0.02));
    bits(bench(trace(), late, {}, { offset: '3.7 s' })).forEach((bit, k) => expect(bit / SHOTS[k]!).toBeCloseTo(1, 3));
    expect(codes(bench(trace({ jumps: [0, 0, 0, 0], noise: 3 }), late, {}, { offset: 'find' }))).toContain('trace-offset-open');
  });

  it('times that were a little wrong, moved by the fit within what is allowed', () => {
    const wrong = TIMES.map((time, k) => exactly(Number((time + 0.02 * (-1) ** k).toFixed(3)))).join('\n');
    const traced = bench(trace({ noise: 3 }), wrong, {}, { refine: '50 ms' });
    expect(codes(traced)).toContain('trace-times-moved');
    expect(codes(traced)).not.toContain('trace-position-step');
    const { records, traces } = reduced(traced);
    records.forEach(({ impulseBit }, k) => expect(Math.abs(impulseBit!.value - SHOTS[k]!)).toBeLessThan(3.5 * impulseBit!.u));
    traces[0]!.events.forEach(({ time, timeU }, k) => expect(Math.abs(time - TIMES[k]!)).toBeLessThan(4 * timeU!));
  });

  it('its discharge left out after each shot', () => {
    const { t, theta } = struck({ frequency: W, ratio: Z, share: 1, events: TIMES, jumps: SHOTS.map((i) => (i * ARM) / K), seconds: 60, rate: RATE });
    const text = ['Time (s);Displacement (µm)', ...t.map((time, i) => `${exactly(time)};${exactly(Number((1e6 * L * Math.sin(theta[i]!) + (TIMES.some((at) => time >= at && time < at + 0.05) ? 5000 : 0)).toFixed(3)))}`)].join('\n');
    bits(bench(text, list, {}, { blank: '50 ms' })).forEach((bit, k) => expect(bit / SHOTS[k]!).toBeCloseTo(1, 3));
    expect(reduced(bench(text, list, {}, { blank: '50 ms' })).traces[0]!.stretches.filter(({ why }) => why === 'blanked')).toHaveLength(4);
  });

  it('in volts by the line of its sensor, whose slope is common to all shots', () => {
    const volts = trace({ header: 'Time (s);Sensor (V)' }).split('\n').map((line, i) => (i === 0 ? line : `${line.split(';')[0]};${Number(line.split(';')[1]) / 500}`)).join('\n');
    const r = reduced(bench(volts, list, {}, {}, { sensorSlope: '500 µm/V ± 1 %' }));
    r.records.forEach(({ impulseBit }, k) => expect(impulseBit!.value / SHOTS[k]!).toBeCloseTo(1, 3));
    expect(r.run!.uCommon / r.run!.mean.value).toBeCloseTo(Math.hypot(0.01, 0.005), 3);
    expect(r.traces[0]!.dimension).toBe('voltage');
  });

  it('with about the plumb mark the offset of that line and its correlation with the slope', () => {
    const volts = trace({ header: 'Time (s);Sensor (V)' }).split('\n').map((line, i) => (i === 0 ? line : `${line.split(';')[0]};${Number(line.split(';')[1]) / 500}`)).join('\n');
    const u = (correlation: string): number => reduced(bench(volts, list, {}, {}, { sensorSlope: '500 µm/V ± 1 %', sensorOffset: '90 mm ± 3 mm', sensorCorrelation: correlation, scaleMark: '10 mm' })).records[0]!.impulseBit!.u;
    // Far from the plumb mark the angle of a millimetre depends on where it is.
    expect(u('0.9')).toBeGreaterThan(1.02 * u('0'));
    expect(u('-0.9')).toBeLessThan(0.98 * u('0'));
  });

  it('by a camera at a stated frame rate, pivot and marker both tracked, y downward', () => {
    const { t, theta } = struck({ frequency: W, ratio: Z, share: 1, events: TIMES, jumps: SHOTS.map((i) => (i * ARM) / K), seconds: 60, rate: RATE });
    const rows = t.flatMap((_, i) => (i % 4 === 0 ? [`${i / 4};${(400 + 200 * Math.sin(theta[i]!)).toFixed(5)};${(100 + 200 * Math.cos(theta[i]!)).toFixed(5)};400;100`] : []));
    const traced = bench(`frame;marker x (px);marker y (px);pivot x (px);pivot y (px)\n${rows.join('\n')}`, list, { readingWay: 'cameraPivotMarker' }, { rate: '25 fps' });
    bits(traced).forEach((bit, k) => expect(bit / SHOTS[k]!).toBeCloseTo(1, 3));
  });

  it('a stretch that a person marked as bad plays no part', () => {
    const lines = trace().split('\n').map((line, i) => (i > 3000 && i < 3100 ? `${line.split(';')[0]};${i}` : line)).join('\n');
    bits(bench(lines, list, {}, { bad: [{ id: 'e1', text: '29.9 31.1' }] })).forEach((bit, k) => expect(bit / SHOTS[k]!).toBeCloseTo(1, 3));
  });

  it('its period stands among the evidence, and serves where none was timed', () => {
    const traced = bench(trace({ noise: 3 }), list, { route: 'massesAndPeriod' });
    const r = reduced(traced);
    expect(r.problems.map((p) => p.code)).not.toContain('entry-missing');
    expect(r.records[0]!.impulseBit!.value / SHOTS[0]!).toBeCloseTo(1, 2);
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
    ['trace-two-values', `t (s);x (mm)\n${Array.from({ length: 400 }, (_, i) => `${i / 100};${Math.sin(i / 17.5) > 0 ? 5 : -5}`).join('\n')}`, '2'],
    ['trace-no-samples', 't (s);x (mm)\n1;2', '1'],
    ['trace-not-fitted', `t (s);x (mm)\n${Array.from({ length: 30 }, (_, i) => `${i};${Math.sin(i)}`).join('\n')}`, Array.from({ length: 15 }, (_, i) => String(i + 5.5)).join('\n')],
    ['trace-swing-from-bench', `t (s);x (mm)\n${Array.from({ length: 40 }, (_, i) => `${i / 10};${i}`).join('\n')}`, '2'],
    ['trace-too-close', trace(), `${list}\n${exactly(TIMES[1]! + 0.001)}\n${exactly(TIMES[1]! + 0.002)}`],
  ] as const)('%s', (code, text, events) => {
    expect(codes(bench(text, events))).toContain(code);
  });

  it.each([
    ['trace-jumps-unlisted', { events: [] }, {}],
    ['trace-no-trigger', { eventsFrom: 'trigger' }, {}],
    ['trace-unit-unknown', { timeUnit: 'moons' }, {}],
    ['trace-wrong-unit', { readingUnit: 'kg' }, {}],
    ['trace-rate-missing', { uses: { time: -1 } }, {}],
    ['trace-sensor-slope-missing', { readingUnit: 'V' }, {}],
    ['trace-pivot-missing', {}, { readingWay: 'cameraPivotMarker' }],
    ['entry-not-a-number', { blank: 'long' }, {}],
    ['trace-jumps-found', { eventsFrom: 'found' }, {}],
  ] as const)('%s', (code, more: Partial<Trace>, choices) => {
    expect(codes(bench(trace({ noise: 3 }), list, choices, more))).toContain(code);
  });

  it('bytes that are not at hand', () => {
    const { session } = bench(trace(), list);
    const r = reduce(session, null);
    expect(r.problems.map((p) => p.code)).toContain('trace-bytes-missing');
    expect(r.records).toEqual([]);
    expect(r.traces[0]!.rows).toBeNull();
  });

  it('a sensor at the end of its range, and spikes: left out, and the impulses come back', () => {
    const { t, theta } = struck({ frequency: W, ratio: Z, share: 1, events: TIMES, jumps: SHOTS.map((i) => (i * ARM) / K), seconds: 60, rate: RATE });
    const most = 300;
    const rows = t.map((time, i) => {
      const x = 1e6 * L * Math.sin(theta[i]!);
      return `${exactly(time)};${exactly(Number((i === 1500 || i === 2000 ? x + 4000 : Math.min(most, x)).toFixed(3)))}`;
    });
    const clipped = bench(`Time (s);Displacement (µm)\n${rows.filter((_, i) => i !== 1500 && i !== 2000).join('\n')}`, list);
    expect(codes(clipped)).toContain('trace-clipped');
    bits(clipped).forEach((bit, k) => expect(bit / SHOTS[k]!).toBeCloseTo(1, 3));
    const spiked = bench(trace({ noise: 3 }).split('\n').map((line, i) => (i === 1500 || i === 2000 ? `${line.split(';')[0]};9000` : line)).join('\n'), list);
    expect(codes(spiked)).toContain('trace-spikes');
    bits(spiked).forEach((bit, k) => expect(Math.abs(bit / SHOTS[k]! - 1)).toBeLessThan(0.01));
  });

  it('a record without a shot gives no impulse bit, but the scatter of jumps that are none, as shots in the same noise would have it', () => {
    const quiet = reduced(bench(trace({ jumps: [0, 0, 0, 0], noise: 20 }), ''));
    const fired = reduced(bench(trace({ noise: 20 }), list));
    expect(quiet.records).toEqual([]);
    const { noFire, noiseEquivalent } = quiet.traces[0]!.fitted!;
    expect(noFire!.jumps).toBeGreaterThan(5);
    expect(noiseEquivalent).toBe(noFire!.impulse);
    const own = Math.sqrt(fired.records[1]!.impulseBit!.u ** 2 - (0.005 * fired.records[1]!.impulseBit!.value) ** 2);
    // Eight jumps know their scatter to 25 %.
    expect(noFire!.impulse! / own).toBeGreaterThan(0.4);
    expect(noFire!.impulse! / own).toBeLessThan(1.9);
    expect(fired.traces[0]!.fitted!.noFire!.overFit).toBeGreaterThan(0.4);
    expect(fired.traces[0]!.fitted!.noFire!.overFit).toBeLessThan(1.9);
  });

  it('a record without a shot and without noise gives nothing', () => {
    const r = reduced(bench(trace({ jumps: [0, 0, 0, 0] }), ''));
    expect(r.records).toEqual([]);
    expect(r.run).toBeNull();
    expect(r.traces[0]!.fitted!.period.value).toBeCloseTo((2 * Math.PI) / W, 3);
  });
});

describe('a trace whose swings are wide', () => {
  const WIDE = [0.14, 0.12, 0.1, 0.12].map((jump) => jump * 3);
  const large = (noise = 0, quiet = 1): Traced => {
    const { normal } = draws(8);
    const { t, theta } = struck({ frequency: W, ratio: Z, share: 1, events: TIMES, jumps: WIDE.map((jump) => jump * quiet), seconds: 60, rate: RATE, start: [0.02, 0.01] });
    const text = ['Time (s);Displacement (mm)', ...t.map((time, i) => `${exactly(time)};${(1e3 * (L * Math.sin(theta[i]!) + noise * normal())).toFixed(6)}`)].join('\n');
    return bench(text, list, {}, {});
  };

  it('gives the impulses of the full pendulum, and says so', () => {
    const found = bits(large());
    found.forEach((bit, k) => expect(bit / ((WIDE[k]! * K) / ARM)).toBeCloseTo(1, 4));
    const r = reduced(large());
    const told = r.problems.find(({ code }) => code === 'trace-large-swing')!;
    expect(told.facts['how']).toBe('full');
    expect(told.facts['degrees']).toBeGreaterThan(20);
    expect(told.facts['percent']).toBeGreaterThan(0.3);
    expect(r.traces[0]!.fitted!.period.value).toBeCloseTo((2 * Math.PI) / W, 4);
  });

  it('with noise, within what the fit says of it', () => {
    const r = reduced(large(2e-4));
    r.records.forEach(({ impulseBit }, k) => expect(Math.abs(impulseBit!.value - (WIDE[k]! * K) / ARM)).toBeLessThan(3.5 * impulseBit!.u));
  });

  it('and says nothing where they are small', () => {
    expect(codes(large(0, 0.05))).not.toContain('trace-large-swing');
  });
});

describe('a camera’s track', () => {
  /** A marker 400 px below (320, 60) at 1.3333 px/mm, the plumb line leaning by `lean`; y downward. */
  const [R, LEAN_AT] = [400, [320, 60]] as const;
  const film = ({ lean = 0, noise = 0, swing = 1, pivot = false }: { readonly lean?: number; readonly noise?: number; readonly swing?: number; readonly pivot?: boolean }): string => {
    const { normal } = draws(21);
    const { t, theta } = struck({ frequency: W, ratio: Z, share: 1, events: TIMES, jumps: SHOTS.map((i) => (swing * i * ARM) / K), seconds: 60, rate: RATE, start: [0.002, 0] });
    return [`t (s);x (px);y (px)${pivot ? ';pivot x (px);pivot y (px)' : ''}`, ...t.map((time, i) => `${exactly(time)};${(LEAN_AT[0] + R * Math.sin(theta[i]! + lean) + noise * normal()).toFixed(3)};${(LEAN_AT[1] + R * Math.cos(theta[i]! + lean) + noise * normal()).toFixed(3)}${pivot ? `;${LEAN_AT[0]};${LEAN_AT[1]}` : ''}`)].join('\n');
  };
  const large = 150;

  it('without a pivot is read about the centre of its own arc, whose u goes into every impulse bit', () => {
    const r = reduced(bench(film({ swing: large, noise: 0.3 }), list, { readingWay: 'cameraPivotMarker' }));
    expect(r.traces[0]!.camera!.pivotBy).toBe('arc');
    const { radius } = r.traces[0]!.camera!;
    expect(Math.abs(radius!.value - R)).toBeLessThan(4 * radius!.u);
    r.records.forEach(({ impulseBit }, k) => expect(Math.abs(impulseBit!.value - large * SHOTS[k]!)).toBeLessThan(3.5 * impulseBit!.u));
    expect(r.run!.uCommon / r.run!.mean.value).toBeGreaterThan(0.9 * (radius!.u / radius!.value));
  });

  it('that is too short for that says that the pivot is wanted', () => {
    expect(codes(bench(film({ swing: 5, noise: 0.3 }), list, { readingWay: 'cameraPivotMarker' }))).toContain('trace-pivot-missing');
  });

  it('tells its radius in pixels against the stated scale, and how it leans', () => {
    const entries = { readingRadius: '300 mm ± 0.5 mm', pixelScale: '1.3333 px/mm ± 0.3 %' };
    const good = reduced(bench(film({ swing: large, noise: 0.3 }), list, { readingWay: 'cameraMarker' }, {}, entries));
    expect(Math.abs(good.traces[0]!.camera!.against!.inU)).toBeLessThan(3.5);
    expect(good.problems.map(({ code }) => code)).not.toContain('trace-camera-leans');
    const leaning = reduced(bench(film({ swing: large, noise: 0.3, lean: 0.07 }), list, { readingWay: 'cameraMarker' }, {}, entries));
    expect(leaning.traces[0]!.camera!.lean!.value).toBeCloseTo(0.07, 2);
    expect(leaning.problems.map(({ code }) => code)).toContain('trace-camera-leans');
    const wrong = reduced(bench(film({ swing: large, noise: 0.3 }), list, { readingWay: 'cameraMarker' }, {}, { ...entries, pixelScale: '1.25 px/mm ± 0.3 %' }));
    expect(wrong.problems.find(({ code }) => code === 'trace-camera-scale-differs')!.facts['percent']).toBeCloseTo(6.7, 0);
  });

  it('about a tracked pivot is not moved by a lean', () => {
    const found = bits(bench(film({ lean: 0.1, pivot: true }), list, { readingWay: 'cameraPivotMarker' }));
    found.forEach((bit, k) => expect(bit / SHOTS[k]!).toBeCloseTo(1, 2));
  });
});

describe('a train of pulses', () => {
  /** Fifty pulses a second from 20 s to 40 s, and two shots, one on each side. */
  const pulsed = (noise = 0): Traced => {
    const { normal } = draws(12);
    const inTrain = Array.from({ length: 1000 }, (_, k) => on(20 + (k + 0.5) / 50));
    const small = (2e-6 * ARM) / K;
    const events = [8, ...inTrain, 50];
    const jumps = [(1e-4 * ARM) / K, ...inTrain.map(() => small), (1.2e-4 * ARM) / K];
    const { t, theta } = struck({ frequency: W, ratio: Z, share: 1, events, jumps, seconds: 70, rate: RATE, start: [0, 0] });
    const text = ['Time (s);Displacement (µm)', ...t.map((time, i) => `${exactly(time)};${(3e5 * Math.sin(theta[i]!) + noise * normal()).toFixed(3)}`)].join('\n');
    return bench(text, '8\n50', {}, { trains: [{ id: 'p1', text: '20 40 50 Hz' }] });
  };

  it('read as a steady deflection gives its mean impulse bit, and the shots beside it theirs', () => {
    const r = reduced(pulsed());
    const [train] = r.traces[0]!.trains;
    expect(train!.pulses).toBe(1000);
    expect(train!.impulse!.value / 2e-6).toBeCloseTo(1, 2);
    expect(bits(pulsed()).map((bit) => bit * 1e4)).toEqual([expect.closeTo(1, 2), expect.closeTo(1.2, 2)]);
    expect(r.problems.map(({ code }) => code)).not.toContain('trace-position-step');
  });

  it('has an uncertainty of its own, and what is common', () => {
    const { impulse, deflection } = reduced(pulsed(5)).traces[0]!.trains[0]!;
    expect(Math.abs(impulse!.value - 2e-6)).toBeLessThan(3.5 * impulse!.u + 1e-8);
    // The reading radius, 0.5 %.
    expect(impulse!.u / impulse!.value).toBeGreaterThan(0.005);
    expect(deflection.u).toBeGreaterThan(0);
  });

  it('the page says from which rate on it is the better way', () => {
    const quiet = reduced(bench(trace({ noise: 5 }), list));
    expect(quiet.traces[0]!.fitted!.trainsBetterFrom).toBeGreaterThan(0.05);
    expect(quiet.traces[0]!.fitted!.trainsBetterFrom).toBeLessThan(50);
  });

  it('that is too slow, cannot be read, or has no rest beside it, is said', () => {
    const { session, library } = pulsed();
    const withTrain = (text: string, events: Trace['events'] = []): readonly string[] => codes({ session: { ...session, traces: [{ ...session.traces[0]!, events, trains: [{ id: 'p1', text }] }] }, library });
    expect(withTrain('20 40 1.2 Hz')).toContain('trace-train-slow');
    expect(withTrain('20 40')).toContain('trace-train-not-read');
    expect(withTrain('20 40 50 Hz', [{ id: 'a', text: '19.95' }, { id: 'b', text: '40.05' }])).toContain('trace-train-not-fitted');
  });
});
