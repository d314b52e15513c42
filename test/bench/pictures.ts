/** Timing of what the pictures of a sampled trace are drawn from. */
import { buildPyramid, window } from '../../src/numeric/minMaxPyramid.ts';
import type { TracePicture } from '../../src/numeric/minMaxPyramid.ts';
import { QUICK, timed } from './timing.ts';
import type { Group } from './timing.ts';

/** Two columns a pixel of a picture 1200 px wide. */
const COLUMNS = 2400;

/** A long swing with noise from a small generator. */
function invented(samples: number): TracePicture {
  const values = new Float32Array(samples);
  let state = 20_261_201;
  for (let i = 0; i < samples; i += 1) {
    state = (state * 48271) % 2147483647;
    values[i] = 1e-3 * Math.sin(i / 900) + 1e-5 * (state / 2147483647);
  }
  return { times: { from: 0, step: 1e-3 }, values, pyramid: buildPyramid(values) };
}

const drawnOf = (picture: TracePicture, from: number, part: number): number => {
  const whole = picture.values.length * 1e-3;
  const { times } = window(picture, from * whole, (from + part) * whole, COLUMNS);
  return times.length + (times[0] ?? 0) + (times.at(-1) ?? 0);
};

/** The same columns by a look at every sample. */
function everySample({ values }: TracePicture): number {
  let count = 0;
  const wide = values.length / COLUMNS;
  for (let column = 0; column < COLUMNS; column += 1) {
    let [low, high] = [Infinity, -Infinity];
    for (let i = Math.ceil(column * wide); i < (column + 1) * wide; i += 1) {
      const value = values[i]!;
      if (value < low) low = value;
      if (value > high) high = value;
    }
    count += high > low ? 2 : 1;
  }
  return count;
}

export const pictures: Group = {
  name: 'pictures',
  title: `Lowest and highest of a record in ${COLUMNS} columns`,
  report: timed(() => {
    const [short, long] = [invented(2_000_000), invented(10_000_000)];
    return [
      { name: '2,000,000 samples, each looked at', run: () => everySample(short) },
      { name: '2,000,000 samples, whole', run: () => drawnOf(short, 0, 1) },
      { name: '2,000,000 samples, 40 % of it', run: () => drawnOf(short, 0.31, 0.4) },
      { name: '2,000,000 samples, 2 % of it', run: () => drawnOf(short, 0.31, 0.02) },
      { name: '10,000,000 samples, whole', run: () => drawnOf(long, 0, 1) },
      { name: '10,000,000 samples, 40 % of it', run: () => drawnOf(long, 0.31, 0.4) },
      { name: 'pyramid of 2,000,000 samples', run: () => buildPyramid(short.values).levels[0]!.low.length },
      { name: 'pyramid of 10,000,000 samples', run: () => buildPyramid(long.values).levels[0]!.low.length },
    ];
  }, QUICK),
};
