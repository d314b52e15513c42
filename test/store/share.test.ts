import { expect, test } from 'vitest';
import { share } from '../../src/store/share.ts';

test('an equal answer is the one before', () => {
  const before = { records: [{ id: 'a', u: 1 }, { id: 'b', u: Infinity }], run: null };
  expect(share(before, structuredClone(before))).toBe(before);
});

test('what changed is new, what did not is the same as before', () => {
  const before = { records: [{ id: 'a', u: 1 }, { id: 'b', u: 2 }], run: { mean: 3 } };
  const next = share(before, { records: [{ id: 'a', u: 1 }, { id: 'b', u: 5 }], run: { mean: 3 } });
  expect(next).toEqual({ records: [{ id: 'a', u: 1 }, { id: 'b', u: 5 }], run: { mean: 3 } });
  expect(next.records[0]).toBe(before.records[0]);
  expect(next.run).toBe(before.run);
});

test('an answer that is longer, shorter, fuller or poorer is taken as it is', () => {
  expect(share([1, 2], [1, 2, 3])).toEqual([1, 2, 3]);
  expect(share([1, 2, 3], [1, 2])).toEqual([1, 2]);
  expect(share({ a: 1, b: 2 }, { a: 1 })).toEqual({ a: 1 });
  expect(share({ a: 1 }, { a: 1, b: undefined })).toEqual({ a: 1, b: undefined });
  expect(share({ a: 1 }, { b: 1 })).toEqual({ b: 1 });
  expect(share(null, { a: 1 })).toEqual({ a: 1 });
  expect(share([1], { 0: 1 })).toEqual({ 0: 1 });
});
