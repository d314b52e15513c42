/** A record in which a thousand shots overlap, three a period, solved in one piece; and how that goes on with shots and samples. */
import { fitSwing, type SwingFit, type SwingOptions } from '../../src/traces/swingFit.ts';
import type { SwingSamples } from '../../src/traces/swingSums.ts';
import { draws } from '../metrology/sources.ts';
import { struckRecord } from './struckRecord.ts';
import { median, table } from './timing.ts';
import type { Group } from './timing.ts';

const PERIOD = 1.1;
const FREQUENCY = (2 * Math.PI) / PERIOD;
const RATIO = 0.01;
/** A little off, as after an edit of the list of shots. */
const START = { frequency: 1.001 * FREQUENCY, ratio: 1.1 * RATIO };
const NOISE = 0.02;
/** Records of each length, after one that warms up: how many steps a fit takes depends on the noise. */
const RECORDS = 7;

interface Train {
  readonly shots: number;
  readonly samplesAShot: number;
}

/** The first is the yardstick: a thousand shots of 200 samples. */
const TRAINS: readonly Train[] = [
  { shots: 1000, samplesAShot: 200 }, { shots: 250, samplesAShot: 200 }, { shots: 500, samplesAShot: 200 }, { shots: 2000, samplesAShot: 200 },
  { shots: 1000, samplesAShot: 400 }, { shots: 1000, samplesAShot: 800 },
];

interface Made {
  readonly samples: SwingSamples;
  readonly events: readonly number[];
  readonly jumps: readonly number[];
}

/** A shot each third of a period, somewhere between two samples, jumps from 1 to 2. */
function made({ shots, samplesAShot }: Train, seed: number): Made {
  const { uniform } = draws(seed);
  const spacing = PERIOD / 3 / samplesAShot;
  const events = Array.from({ length: shots }, (_, k) => ((k + 1) * samplesAShot + uniform()) * spacing);
  const jumps = events.map(() => 1 + uniform());
  const samples = struckRecord({ frequency: FREQUENCY, ratio: RATIO, count: (shots + 1) * samplesAShot, spacing, events, jumps, start: [0.3, 0.1], rest: [5, 5.2], noise: NOISE, seed });
  return { samples, events, jumps };
}

function solved({ samples, events }: Made, options: SwingOptions = {}): SwingFit {
  const fit = fitSwing(samples, events, options);
  if (fit.status !== 'fitted') throw new Error(`Timing ${events.length} shots: ${fit.status}`);
  return fit;
}

/** Mean square of (jump − truth)/u. */
function squareInU({ jumps }: Made, fit: SwingFit): number {
  const [ww, wz, zz] = fit.covariance;
  const squares = jumps.map((jump, k) => {
    const [byW, byZ] = [fit.byFrequency[k]!, fit.byRatio[k]!];
    return (fit.jumps[k]! - jump) ** 2 / (fit.noise ** 2 * (fit.noiseCovariance(k, k) + byW * byW * ww + 2 * byW * byZ * wz + byZ * byZ * zz));
  });
  return squares.reduce((a, b) => a + b, 0) / squares.length;
}

interface Timed {
  /** ms of each record, all found by the fit and from a start. */
  readonly alone: number[];
  readonly started: number[];
  readonly squares: number[];
}

/** Every length in turn, record after record. */
function takeTimes(): readonly Timed[] {
  const timed = TRAINS.map((): Timed => ({ alone: [], started: [], squares: [] }));
  for (let record = 0; record <= RECORDS; record += 1) {
    TRAINS.forEach((train, i) => {
      const one = made(train, 7 + record);
      const begun = performance.now();
      const fit = solved(one);
      const between = performance.now();
      solved(one, { start: START, stretches: 1 });
      const ended = performance.now();
      if (record === 0) return;
      timed[i]!.alone.push(between - begun);
      timed[i]!.started.push(ended - between);
      timed[i]!.squares.push(squareInU(one, fit));
    });
  }
  return timed;
}

const thousands = (count: number): string => count.toLocaleString('en-US');

export const manyShots: Group = {
  name: 'shots',
  title: 'Overlapping shots in one record, three a period, every jump solved with all others',
  report: async () => {
    const timed = takeTimes();
    const samples = TRAINS.map(({ shots, samplesAShot }) => (shots + 1) * samplesAShot);
    const columnsOf = (ms: (one: Timed) => readonly number[]): readonly (readonly string[])[] => {
      const each = timed.map((one, i) => median(ms(one)) / samples[i]!);
      return timed.map((one, i) => [median(ms(one)).toFixed(0), (1e6 * each[i]!).toFixed(0), (each[i]! / each[0]!).toFixed(2), (Math.max(...ms(one)) / median(ms(one))).toFixed(1)]);
    };
    const [alone, started] = [columnsOf((one) => one.alone), columnsOf((one) => one.started)];
    const off = timed.map(({ squares }) => Math.sqrt(squares.reduce((a, b) => a + b, 0) / squares.length));
    return [
      ...table(
        ['shots', 'samples a shot', 'samples', 'median ms', 'ns a sample', 'ratio', 'slowest', 'started, ms', 'ns a sample', 'ratio', 'slowest', 'off, in u'],
        TRAINS.map(({ shots, samplesAShot }, i) => [thousands(shots), String(samplesAShot), thousands(samples[i]!), ...alone[i]!, ...started[i]!, off[i]!.toFixed(2)]),
      ), '',
      `Medians of ${RECORDS} records that differ in noise and times; slowest: the slowest of them over the median. First with frequency, damping and rest line to be found, then started a little off and with a straight rest line. The last column is the root mean square of (jump − truth)/u.`,
    ];
  },
};
