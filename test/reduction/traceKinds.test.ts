/** Records of every kind that a bench leaves, integrated apart from the road: the impulses come back within what is told of them. */
import { describe, expect, it } from 'vitest';
import { standardUncertainty } from '../../src/metrology/uncertain.ts';
import type { SampledRecord } from '../../src/readings/sampled/sampledRecord.ts';
import { readBench } from '../../src/reduction/entries.ts';
import { knownTraces } from '../../src/reduction/traces.ts';
import { FIRST_TRACE, type Trace } from '../../src/session/session.ts';
import { exactly, sessionOf } from '../fixtures/session.ts';
import { draws } from '../metrology/sources.ts';
import { struck } from '../traces/struck.ts';

const [W, Z] = [2 * Math.PI * 0.8, 0.01];
const PERIOD = (2 * Math.PI) / W;

interface Kind {
  readonly rate?: number;
  readonly events?: readonly number[];
  readonly jumps?: readonly number[];
  readonly seconds?: number;
  readonly start?: readonly [number, number];
  /** What the sensor makes of the swing in mm at a time. */
  readonly read?: (x: number, t: number, next: ReturnType<typeof draws>) => number;
  readonly keep?: (t: number) => boolean;
  readonly trace?: Partial<Trace>;
  readonly ratio?: number;
}

const noisy = (by: number) => (x: number, _: number, { normal }: ReturnType<typeof draws>): number => x + by * normal();

function jumpsOf({ rate = 100, events = [5, 14.5, 23], jumps, seconds = 32, start = [0, 0], read = noisy(0.01), keep = () => true, trace = {}, ratio = Z }: Kind) {
  const given = jumps ?? events.map((_, k) => 1 + 0.1 * (k % 3));
  const on = events.map((time) => Math.round(time * rate) / rate);
  const next = draws(77);
  const { t, theta } = struck({ frequency: W, ratio, share: 0, events: on, jumps: given, seconds, rate, start });
  const kept = t.map((time, i) => [time, read(theta[i]!, time, next)] as const).filter(([time]) => keep(time));
  const column = (header: string, unitText: string, values: Float64Array) => ({ header, unitText, values });
  const record = {
    rows: kept.length, columns: [column('Time', 's', Float64Array.from(kept, ([time]) => time)), column('Displacement', 'mm', Float64Array.from(kept, ([, x]) => x))], preamble: [], firstLine: 2, passedOver: [], passedOverCount: 0,
    delimiter: ',', decimal: '.', plain: true, problems: [], lineOfRow: (row: number) => row + 2,
  } as unknown as SampledRecord;
  const session = {
    ...sessionOf({ choices: { readingWay: 'sensorOnPoint' } }),
    traces: [{ ...FIRST_TRACE, id: 't1', name: 'sensor.csv', sha256: 'ab', bytes: 1, uses: { time: 0, reading: 1 }, events: on.map((time, i) => ({ id: `e${i + 1}`, text: exactly(time) })), ...trace }],
  };
  const known = knownTraces(session, new Map([['ab', record]]), readBench(session), null, [])[0]!;
  return known.jumps.map((jump, k) => ({ value: 1e3 * jump.value, u: 1e3 * standardUncertainty(jump), truth: given[k]! }));
}

const KINDS: readonly (readonly [string, Kind])[] = [
  ['at rest', {}],
  ['never at rest', { start: [0.6, 0.4] }],
  ['drifting by half a throw', { read: (x, t, next) => noisy(0.01)(x + 0.5 * Math.sin(t / 20) + 3, t, next) }],
  ['with pump hum as large as a tenth of a throw', { read: (x, t, next) => noisy(0.01)(x + 0.1 * Math.sin(2 * Math.PI * 24.3 * t), t, next) }],
  ['with a sway of the building near twice the frequency', { read: (x, t, next) => noisy(0.01)(x + 0.02 * Math.sin(2 * Math.PI * 1.5 * t + 1), t, next) }],
  ['with spikes of twice a throw', { read: (x, t, next) => noisy(0.01)(x, t, next) + (next.uniform() < 0.003 ? 2 : 0) }],
  ['with gaps', { keep: (t) => !(t > 7 && t < 8.1) && !(t > 18 && t < 18.4) && !(t > 25 && t < 28) }],
  ['in steps of a fiftieth of a throw', { read: (x, t, next) => Math.round(50 * noisy(0.004)(x, t, next)) / 50 }],
  ['with eight frames a period', { rate: 6.4, events: [5, 14.0625, 22.96875], read: noisy(0.02) }],
  ['under three frames a period', { rate: 2.2, events: [10, 50, 90], seconds: 130, read: noisy(0.02), trace: {} }],
  ['strongly damped', { ratio: 0.3, rate: 200, events: [4, 9, 14], seconds: 20 }],
];

describe('the jumps of a record', () => {
  it.each(KINDS)('%s', (_, kind) => {
    const found = jumpsOf(kind);
    expect(found.length).toBeGreaterThan(2);
    for (const { value, u, truth } of found) {
      expect(Math.abs(value - truth)).toBeLessThan(3.5 * u + 1e-6);
      expect(u).toBeLessThan(0.05 * truth);
    }
  });

  // From ten ring-downs (1/(ζω) each) to a third of a period.
  it.each([10 / (Z * W), 1 / (Z * W), 4 * PERIOD, PERIOD, PERIOD / 2, PERIOD / 3])('of shots %d s apart', (apart) => {
    const many = apart > 50 ? 4 : 12;
    const events = Array.from({ length: many }, (_, k) => 5 + k * apart);
    const found = jumpsOf({ events, rate: 40, seconds: 5 + many * apart + 10 });
    expect(found).toHaveLength(many);
    const far = found.filter(({ value, u, truth }) => Math.abs(value - truth) > 3.5 * u);
    expect(far).toEqual([]);
    for (const { u } of found) expect(u).toBeLessThan(0.03);
  });
});
