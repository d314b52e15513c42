/** Times of samples: units, counted samples and frames, gaps, repeated rows, clocks that run backward. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Problem } from '../../../src/problems/problems.ts';
import { sentence } from '../../../src/problems/sentences.ts';
import { readSampledText } from '../../../src/readings/sampled/sampledRecord.ts';
import { atSamples, timelineOf, timeUnitNamed, type SampleClock, type Timeline } from '../../../src/readings/sampled/timeline.ts';

const seconds: SampleClock = { by: 'time', column: 0, unit: timeUnitNamed('s')! };
const codes = ({ problems }: Timeline): readonly string[] => problems.map((p: Problem) => p.code);
const recordOf = (times: readonly (string | number)[], readings: readonly (string | number)[] = times.map((_, i) => i)) => readSampledText(['t,x', ...times.map((t, i) => `${t},${readings[i]}`)].join('\n') + '\n');
const even = (n: number, step = 0.01): number[] => Array.from({ length: n }, (_, i) => Number((i * step).toFixed(6)));
const rowsOf = ({ t, rows }: Timeline): number[] => (rows === null ? Array.from(t, (_, i) => i) : [...rows]);

describe('the clock', () => {
  it.each([['s', 1], ['ms', 1e-3], ['µs', 1e-6], ['min', 60], ['h', 3600], ['hours', 3600], ['sec', 1]] as const)('in %s', (unit, factor) => {
    const { t, rows, spacing } = timelineOf(recordOf(even(50, 0.25)), { by: 'time', column: 0, unit: timeUnitNamed(unit)! }, [1]);
    expect(rows).toBeNull();
    t.forEach((time, i) => expect(time).toBeCloseTo(0.25 * i * factor, 12));
    expect(spacing.usual / (0.25 * factor)).toBeCloseTo(1, 12);
  });

  it('in s takes the record’s own array', () => {
    const record = recordOf(even(50));
    expect(timelineOf(record, seconds, [1]).t).toBe(record.columns[0]!.values);
  });

  it('of samples or frames counts them at a rate, and a number left out is a frame that is missing', () => {
    const numbers = Array.from({ length: 100 }, (_, i) => i + 500).filter((n) => n !== 520 && n !== 550 && n !== 551);
    const { t, gaps, gapCount, samplesMissing, problems, uneven } = timelineOf(recordOf(numbers), { by: 'count', column: 0, rate: 60 }, [1]);
    expect(t[0]).toBe(500 / 60);
    expect(t[t.length - 1]).toBe(599 / 60);
    expect([gapCount, samplesMissing, uneven]).toEqual([2, 3, false]);
    expect(gaps.map(({ before, after, missing }) => [before, after, missing])).toEqual([[19, 20, 1], [48, 49, 2]]);
    expect(problems).toMatchObject([{ code: 'trace-samples-missing', weight: 'note', place: { line: 22 }, facts: { missing: 3, gaps: 2 } }]);
    expect(sentence(problems[0]!)).toBe('Line 22: 3 samples are missing, in 2 gaps; the first begins at 8.65 s. Nothing is filled in for them.');
  });

  it('without a column counts the rows, those that hold no number too', () => {
    const readings = Array.from({ length: 40 }, (_, i) => (i === 7 ? 'NaN' : i === 20 ? 'OVR' : `${i}.5`));
    const record = readSampledText(['x (mm)', ...readings].join('\n'));
    const line = timelineOf(record, { by: 'rate', rate: 50 }, [0]);
    expect([line.t.length, line.withoutNumber, line.samplesMissing]).toEqual([38, 2, 2]);
    expect([line.t[6], line.t[7], line.t[37]]).toEqual([6 / 50, 8 / 50, 39 / 50]);
    expect(rowsOf(line).slice(5, 9)).toEqual([5, 6, 8, 9]);
    expect([...atSamples(line, record.columns[0]!.values)].slice(5, 9)).toEqual([5.5, 6.5, 8.5, 9.5]);
    expect(codes(line)).toEqual(['trace-numbers-missing', 'trace-samples-missing']);
    expect(line.problems[0]!.place.line).toBe(9);
  });

  it('of day goes on after midnight', () => {
    const clock = Array.from({ length: 40 }, (_, i) => 86_390 + i / 2).map((s) => `${String(Math.floor(s / 3600) % 24).padStart(2, '0')}:${String(Math.floor(s / 60) % 60).padStart(2, '0')}:${(s % 60).toFixed(2).padStart(5, '0')}`);
    const { t, problems } = timelineOf(recordOf(clock), seconds, [1]);
    expect([t[0], t[39]]).toEqual([86_390, 86_409.5]);
    expect(problems).toEqual([]);
  });

  it('needs a rate above zero and a column that is there', () => {
    const record = recordOf(even(5));
    expect(() => timelineOf(record, { by: 'rate', rate: 0 }, [])).toThrow(RangeError);
    expect(() => timelineOf(record, { by: 'count', column: 0, rate: Number.NaN }, [])).toThrow(RangeError);
    expect(() => timelineOf(record, { ...seconds, column: 9 }, [])).toThrow(RangeError);
    expect(() => timelineOf(record, seconds, [9])).toThrow(RangeError);
  });
});

describe('spacing', () => {
  it('that the last digit of the times explains is even', () => {
    const line = timelineOf(recordOf(Array.from({ length: 300 }, (_, i) => (i / 60).toFixed(3))), seconds, [1]);
    expect([line.uneven, line.gapCount, codes(line)]).toEqual([false, 0, []]);
    expect(line.spacing.usual).toBeCloseTo(0.017, 9);
  });

  it('of a camera with frames of unequal length is told', () => {
    const line = timelineOf(recordOf(Array.from({ length: 300 }, (_, i) => (i / 60 + 0.002 * Math.sin(i)).toFixed(5))), seconds, [1]);
    expect(codes(line)).toEqual(['trace-spacing-uneven']);
    expect(line.spacing.least).toBeLessThan(0.0155);
    expect(line.spacing.most).toBeGreaterThan(0.0178);
  });

  it('beyond one and a half times the usual one is a gap', () => {
    const times = even(100);
    times[50] = 0.504;
    expect(timelineOf(recordOf(times), seconds, [1]).gapCount).toBe(0);
    expect(timelineOf(recordOf(times.filter((_, i) => i !== 30)), seconds, [1]).gaps).toMatchObject([{ before: 29, after: 30, missing: 1 }]);
  });
});

describe('rows out of order', () => {
  it('that repeat a time or a number are left out and counted', () => {
    const times = even(60).flatMap((t, i) => (i === 10 || i === 40 ? [t, t] : [t]));
    const line = timelineOf(recordOf(times), seconds, [1]);
    expect([line.repeated, line.t.length, codes(line)]).toEqual([2, 60, ['trace-samples-repeated']]);
    expect(rowsOf(line).slice(9, 13)).toEqual([9, 10, 12, 13]);
    expect(line.problems[0]!.place).toEqual({ column: 't', line: 13 });
  });

  it('many at one time tell of a clock that is written too coarsely, and what the rate is', () => {
    const line = timelineOf(recordOf(Array.from({ length: 400 }, (_, i) => (Math.floor(i / 10) / 100).toFixed(2))), seconds, [1]);
    expect(codes(line)).toEqual(['trace-time-coarse']);
    expect(line.problems[0]!.facts['rate']).toBeCloseTo(1000, -2);
    expect(sentence(line.problems[0]!)).toContain('Choose no time column and write the sampling rate, about 1023 a second');
  });

  it.each([
    ['one stamp too low', (i: number) => (i === 20 ? 0 : i / 10), [20]],
    ['one stamp too high', (i: number) => (i === 20 ? 900 : i / 10), [20]],
    ['two stamps too high', (i: number) => (i === 20 || i === 21 ? 900 + i : i / 10), [20, 21]],
    ['two rows that changed places', (i: number) => (i === 20 ? 2.1 : i === 21 ? 2 : i / 10), [21]],
  ] as const)('%s cost themselves alone', (_, stamp, left) => {
    const line = timelineOf(recordOf(Array.from({ length: 60 }, (_row, i) => stamp(i))), seconds, [1]);
    expect(Array.from({ length: 60 }, (_row, i) => i).filter((i) => !rowsOf(line).includes(i))).toEqual(left);
    expect(line.problems[0]).toMatchObject({ code: 'trace-time-not-rising', weight: 'doubt', facts: { left: left.length, restarts: 0 } });
  });

  it('a clock that begins again leaves the longest stretch, and says where', () => {
    const line = timelineOf(recordOf([...even(30), ...even(50), ...even(20)]), seconds, [1]);
    expect([line.t.length, line.t[0], line.backward, rowsOf(line)[0]]).toEqual([50, 0, 50, 30]);
    expect(line.problems).toMatchObject([{ code: 'trace-time-not-rising', place: { line: 32, column: 't' }, facts: { left: 50, restarts: 2 } }]);
    expect(sentence(line.problems[0]!)).toMatch(/^Line 32, column “t”: the time goes back and begins again here\. .* 50 rows are left out\./);
  });

  it('a time that falls throughout, or stands still, stops with a sentence', () => {
    const falls = timelineOf(recordOf(even(40).toReversed()), seconds, [1]);
    expect(falls.problems).toMatchObject([{ code: 'trace-time-not-rising', weight: 'stops' }]);
    const still = timelineOf(recordOf(Array.from({ length: 40 }, () => 3)), seconds, [1]);
    expect(still.problems).toMatchObject([{ code: 'trace-time-coarse', weight: 'stops' }]);
    for (const { problems } of [falls, still]) expect(sentence(problems[0]!)).toMatch(/Choose (?:another|no) .*\.$/);
    expect(still.t.length).toBe(1);
  });

  it('whatever the times, those that are kept rise, and every row is kept or counted', () => {
    fc.assert(fc.property(fc.array(fc.oneof(fc.integer({ min: 0, max: 40 }).map((n) => n / 4), fc.constant('NaN')), { minLength: 2, maxLength: 80 }), (times) => {
      const record = readSampledText(['t,x', ...times.map((t, i) => `${t},${i}`), '1e3,5', '2e3,5', '3e3,5'].join('\n'));
      if (record.columns.length < 2) return;
      const line = timelineOf(record, seconds, [1]);
      expect(line.t.length + line.repeated + line.backward + line.withoutNumber).toBe(record.rows);
      expect(line.t.every((t, i) => i === 0 || t > line.t[i - 1]!)).toBe(true);
      rowsOf(line).forEach((row, i) => expect(record.columns[0]!.values[row]).toBe(line.t[i]));
    }));
  });
});
