/** Keeps what did not change: a new answer takes over the equal parts of the one before, so that a component sees by identity what it need not draw again. */

const isList = (value: unknown): value is readonly unknown[] => Array.isArray(value);
const isPlain = (value: unknown): value is Record<string, unknown> => typeof value === 'object' && value !== null && !isList(value);

/** `next`, with every part that equals its counterpart in `before` replaced by that counterpart. Valid: plain data, as a worker sends it. */
export function share<Data>(before: unknown, next: Data): Data;
export function share(before: unknown, next: unknown): unknown {
  if (Object.is(before, next)) return before;
  if (isList(before) && isList(next)) {
    const shared = next.map((part, index) => share(before[index], part));
    return shared.length === before.length && shared.every((part, index) => Object.is(part, before[index])) ? before : shared;
  }
  if (isPlain(before) && isPlain(next)) {
    const names = Object.keys(next);
    const shared = Object.fromEntries(names.map((name) => [name, share(before[name], next[name])]));
    const isSame = names.length === Object.keys(before).length && names.every((name) => name in before && Object.is(shared[name], before[name]));
    return isSame ? before : shared;
  }
  return next;
}
