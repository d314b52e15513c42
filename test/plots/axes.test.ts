import { describe, expect, test } from 'vitest';
import { roomFor, roomForBoth, tickLabels } from '../../src/plots/axes.ts';

describe('ticks of an axis', () => {
  test('a tick has the decimals that its step needs, and no more', () => {
    expect(tickLabels([1.2, 1.22, 1.24], 0.02)).toEqual(['1.20', '1.22', '1.24']);
    expect(tickLabels([0, 2.5, 5], 2.5)).toEqual(['0.0', '2.5', '5.0']);
    expect(tickLabels([0, 50, 100], 50)).toEqual(['0', '50', '100']);
    expect(tickLabels([0, 0.025], 0.025)).toEqual(['0.000', '0.025']);
  });

  test('a tick below zero has a true minus sign, and zero has none', () => {
    expect(tickLabels([-0.1, -1e-17, 0.1], 0.1)).toEqual(['−0.1', '0.0', '0.1']);
  });
});

describe('range of an axis', () => {
  test('every value lies inside the range', () => {
    const { low, high } = roomFor([3, -1, 2]);
    expect(low).toBeLessThan(-1);
    expect(high).toBeGreaterThan(3);
  });

  test('one value alone has a range around it', () => {
    const { low, high } = roomFor([1.25]);
    expect(low).toBeLessThan(1.25);
    expect(high).toBeGreaterThan(1.25);
  });

  test('no values have a range all the same', () => {
    expect(roomFor([])).toEqual({ low: 0, high: 1 });
  });

  test('a misfire far below does not crush the shots that count', () => {
    const alone = roomFor([1.22, 1.28]);
    expect(roomForBoth([1.22, 1.28], [0.01])).toEqual(alone);
  });

  test('what is set aside near the others widens the range', () => {
    expect(roomForBoth([1.22, 1.28], [1.21]).low).toBeLessThan(1.21);
  });
});
