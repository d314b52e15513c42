/** The u that a trace reports against the spread of its results over noise realisations, and how often its intervals hold the truth. */
import { describe, expect, it } from 'vitest';
import { combine, standardUncertainty } from '../../src/metrology/uncertain.ts';
import { readBench } from '../../src/reduction/entries.ts';
import { knownTraces } from '../../src/reduction/traces.ts';
import type { SampledRecord } from '../../src/readings/sampled/sampledRecord.ts';
import { FIRST_TRACE, type Session } from '../../src/session/session.ts';
import { exactly, sessionOf } from '../fixtures/session.ts';
import { draws } from '../metrology/sources.ts';
import { struck } from '../traces/struck.ts';

const [W, Z, RATE] = [2.72, 0.011, 40];
const EVENTS = [6, 15, 24, 26.5, 33, 42, 51].map((time) => Math.round(time * RATE) / RATE);
const JUMPS = [1, 1.1, 0.9, 1, 1.2, 0.8, 1];
const { t: TIMES, theta } = struck({ frequency: W, ratio: Z, share: 0, events: EVENTS, jumps: JUMPS, seconds: 60, rate: RATE, start: [0.1, 0.05] });
const T = Float64Array.from(TIMES);

const SESSION: Session = {
  ...sessionOf({ choices: { readingWay: 'sensorOnPoint' } }),
  traces: [{ ...FIRST_TRACE, id: 't1', name: 'sensor.csv', sha256: 'ab', bytes: 1, timeUnit: 's', readingUnit: 'mm', uses: { time: 0, reading: 1 }, events: EVENTS.map((time, i) => ({ id: `e${i + 1}`, text: exactly(time) })) }],
};
const BENCH = readBench(SESSION);

const column = (header: string, unitText: string, values: Float64Array) => ({ header, unitText, values });

/** A record as the reader makes it, without the text. */
function recordOf(x: Float64Array): SampledRecord {
  return { rows: x.length, columns: [column('Time', 's', T), column('Displacement', 'mm', x)], preamble: [], firstLine: 2, passedOver: [], passedOverCount: 0, delimiter: ',', decimal: '.', plain: true, problems: [], lineOfRow: (row: number) => row + 2 } as unknown as SampledRecord;
}

type Noise = (next: ReturnType<typeof draws>) => () => number;
const white: Noise = ({ normal }) => () => 0.05 * normal();
const carried = (rho: number): Noise => ({ normal }) => {
  let last = normal();
  return () => (last = rho * last + Math.sqrt(1 - rho * rho) * normal()) * 0.05;
};
/** A building's sway of another phase each time, in white noise. */
const sway: Noise = ({ normal, uniform }) => {
  const phase = 2 * Math.PI * uniform();
  let i = 0;
  return () => 0.03 * normal() + 0.03 * Math.sin((2 * Math.PI * 0.9 * i++) / RATE + phase);
};

function study(noise: Noise, runs: number) {
  let [squares, held, meanSquares, heldMean] = [0, 0, 0, 0];
  for (let run = 0; run < runs; run++) {
    const next = noise(draws(7000 + run));
    const { jumps } = knownTraces(SESSION, new Map([['ab', recordOf(Float64Array.from(theta, (value) => 12 + value + next()))]]), BENCH, null, [])[0]!;
    jumps.forEach((jump, k) => {
      const z = (1e3 * jump.value - JUMPS[k]!) / (1e3 * standardUncertainty(jump));
      squares += z * z;
      if (Math.abs(z) < 1.96) held += 1;
    });
    const mean = combine(jumps.map((jump) => [1 / jumps.length, jump] as const));
    const z = (1e3 * mean.value - JUMPS.reduce((a, b) => a + b) / JUMPS.length) / (1e3 * standardUncertainty(mean));
    meanSquares += z * z;
    if (Math.abs(z) < 1.96) heldMean += 1;
  }
  const many = runs * JUMPS.length;
  return { ratio: Math.sqrt(squares / many), held: held / many, meanRatio: Math.sqrt(meanSquares / runs), heldMean: heldMean / runs };
}

describe('over noise realisations', () => {
  it.each([
    ['white', 1000, white], ['carried from sample to sample by 0.9', 1000, carried(0.9)], ['carried by 0.99', 300, carried(0.99)], ['with a sway of the building of another phase each time', 300, sway],
  ] as const)('%s (%d): u is the spread, and 95 % intervals hold the truth so often, of each shot and of their mean', (_, runs, noise) => {
    const { ratio, held, meanRatio, heldMean } = study(noise, runs);
    // The spread of so many results is known to 3 to 6 %, and the correlation is estimated; a wide u is no danger.
    expect(ratio).toBeGreaterThan(0.85);
    expect(ratio).toBeLessThan(1.06);
    expect(meanRatio).toBeGreaterThan(0.85);
    expect(meanRatio).toBeLessThan(1.1);
    expect(held).toBeGreaterThan(0.935);
    expect(held).toBeLessThan(0.98);
    expect(heldMean).toBeGreaterThan(0.92);
    expect(heldMean).toBeLessThan(0.985);
  }, 120_000);
});
