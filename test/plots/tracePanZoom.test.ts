/** Looking along a record: what is in sight stays in the record, and what is held stays in place. */
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { afterKey, boundsOf, broughtIn, centredOn, eventBeside, panned, pinched, wheelFactor, zoomedAbout } from '../../src/plots/tracePanZoom.ts';
import type { Bounds, Sight } from '../../src/plots/tracePanZoom.ts';

const part = fc.double({ min: 0, max: 1, noNaN: true });
const anyNumber = fc.oneof(fc.double(), fc.constantFrom(NaN, Infinity, -Infinity, 0));

/** A record, and a stretch of it in sight. */
const looked = fc
  .record({ from: fc.double({ min: -1e4, max: 1e6, noNaN: true }), long: fc.double({ min: 1e-2, max: 1e5, noNaN: true }), samples: fc.integer({ min: 20, max: 10_000_000 }), a: part, b: part })
  .map(({ from, long, samples, a, b }) => {
    const bounds = boundsOf(from, from + long, long / samples);
    const size = bounds.least + a * (bounds.to - bounds.from - bounds.least);
    const sight = panned({ from: bounds.from, to: bounds.from + size }, b * (bounds.to - bounds.from), bounds);
    return { bounds, sight };
  });

/** Rounding of a time on this record's clock. */
const roundingOf = ({ from, to }: Bounds): number => 1e-14 * Math.max(Math.abs(from), Math.abs(to));

const isInside = ({ from, to }: Sight, bounds: Bounds): boolean => from >= bounds.from && to <= bounds.to && to - from >= bounds.least - 4 * roundingOf(bounds);

/** Whether a stretch of that length fits with a time at a part of it. */
const fits = (time: number, at: number, long: number, { from, to, least }: Bounds): boolean =>
  long >= least && time - at * long >= from && time + (1 - at) * long <= to;

describe('whatever is turned, dragged, pinched or pressed', () => {
  test('what is in sight lies in the record, is not empty and is never NaN', () => {
    const keys = fc.constantFrom('ArrowLeft', 'ArrowRight', 'ArrowUp', 'ArrowDown', '+', '-', 'Home', 'End', '0');
    fc.assert(fc.property(looked, anyNumber, anyNumber, keys, part, part, part, part, ({ bounds, sight }, x, y, key, a, b, c, d) => {
      expect(isInside(zoomedAbout(sight, x, y, bounds), bounds)).toBe(true);
      expect(isInside(panned(sight, x, bounds), bounds)).toBe(true);
      expect(isInside(pinched(sight, [a, b], [c, d], bounds), bounds)).toBe(true);
      expect(isInside(centredOn(sight, x, bounds), bounds)).toBe(true);
      expect(isInside(afterKey(key, sight, (sight.from + sight.to) / 2, bounds) ?? sight, bounds)).toBe(true);
    }), { numRuns: 400 });
  });

  test('a key that is none of ours leads nowhere', () => {
    const bounds = boundsOf(0, 10, 1e-3);
    expect(afterKey('a', bounds, 5, bounds)).toBe(null);
    expect(afterKey('Tab', bounds, 5, bounds)).toBe(null);
  });
});

describe('zooming', () => {
  test('about a point keeps the point where it is, unless the record ends there', () => {
    fc.assert(fc.property(looked, part, fc.double({ min: 0.05, max: 20, noNaN: true }), ({ bounds, sight }, at, factor) => {
      const point = sight.from + at * (sight.to - sight.from);
      const next = zoomedAbout(sight, point, factor, bounds);
      const long = (sight.to - sight.from) * factor;
      fc.pre(fits(point, at, long, bounds));
      expect(Math.abs((point - next.from) - at * (next.to - next.from))).toBeLessThan(10 * roundingOf(bounds) + 1e-12 * long);
    }));
  });

  test('in and out by the same is where it was, away from the ends', () => {
    const bounds = boundsOf(0, 1000, 1e-3);
    const there = zoomedAbout({ from: 400, to: 480 }, 430, 0.3, bounds);
    const back = zoomedAbout(there, 430, 1 / 0.3, bounds);
    expect(back.from).toBeCloseTo(400, 9);
    expect(back.to).toBeCloseTo(480, 9);
  });

  test('stops at eight samples and at the whole record', () => {
    const bounds = boundsOf(0, 100, 0.01);
    const close = zoomedAbout({ from: 20, to: 30 }, 25, 1e-9, bounds);
    expect(close.to - close.from).toBeCloseTo(0.08, 12);
    expect(zoomedAbout({ from: 20, to: 30 }, 25, 1e9, bounds)).toEqual({ from: 0, to: 100 });
  });

  test('a turn of the wheel counts alike in pixels, lines and pages, and no single turn runs away', () => {
    expect(wheelFactor(250, 0)).toBe(2);
    expect(wheelFactor(-250, 0)).toBe(0.5);
    expect(wheelFactor(3, 1)).toBe(wheelFactor(48, 0));
    expect(wheelFactor(1, 2)).toBe(wheelFactor(400, 0));
    expect(wheelFactor(1e9, 0)).toBeLessThan(4);
  });
});

describe('two fingers', () => {
  test('keep what is under them, unless the record ends there', () => {
    fc.assert(fc.property(looked, part, part, part, part, ({ bounds, sight }, a, b, c, d) => {
      const long = sight.to - sight.from;
      if (Math.abs(a - b) < 0.05 || Math.abs(c - d) < 0.05 || (a < b) !== (c < d)) return;
      const next = pinched(sight, [a, b], [c, d], bounds);
      const wanted = (long * Math.abs(a - b)) / Math.abs(c - d);
      const first = sight.from + a * long;
      if (!fits(first, c, wanted, bounds)) return;
      const slack = 20 * roundingOf(bounds) + 1e-12 * wanted;
      expect(Math.abs(next.from + c * (next.to - next.from) - first)).toBeLessThan(slack);
      expect(Math.abs(next.from + d * (next.to - next.from) - (sight.from + b * long))).toBeLessThan(slack);
    }));
  });

  test('that lie together move the picture and do not change its length', () => {
    const bounds = boundsOf(0, 100, 0.01);
    expect(pinched({ from: 40, to: 60 }, [0.5, 0.5], [0.25, 0.25], bounds)).toEqual({ from: 45, to: 65 });
  });
});

test('panning keeps the length of what is in sight', () => {
  fc.assert(fc.property(looked, fc.double({ min: -1e5, max: 1e5, noNaN: true }), ({ bounds, sight }, by) => {
    const next = panned(sight, by, bounds);
    expect(Math.abs((next.to - next.from) - (sight.to - sight.from))).toBeLessThan(8 * roundingOf(bounds));
  }));
});

describe('the events beside a time', () => {
  const events = [{ time: 1 }, { time: 4 }, { time: 9 }];

  test('are the next and the one before, not the one at it', () => {
    expect(eventBeside(events, 4, 1)).toBe(events[2]);
    expect(eventBeside(events, 4, -1)).toBe(events[0]);
    expect(eventBeside(events, 9, 1)).toBe(null);
    expect(eventBeside([], 0, -1)).toBe(null);
  });

  test('an event in sight leaves the sight, one beyond is brought to its middle', () => {
    const bounds = boundsOf(0, 100, 0.01);
    expect(broughtIn({ from: 10, to: 20 }, 12, bounds)).toEqual({ from: 10, to: 20 });
    expect(broughtIn({ from: 10, to: 20 }, 50, bounds)).toEqual({ from: 45, to: 55 });
    expect(broughtIn({ from: 10, to: 20 }, 99, bounds)).toEqual({ from: 90, to: 100 });
  });
});

test('a record of one sample, or one whose spacing is not known, can be looked at', () => {
  for (const bounds of [boundsOf(5, 5, 0), boundsOf(5, 5, 1e-3), boundsOf(0, 0, NaN)]) {
    expect(bounds.to).toBeGreaterThan(bounds.from);
    expect(isInside(zoomedAbout(bounds, 5, 0.5, bounds), bounds)).toBe(true);
  }
});
