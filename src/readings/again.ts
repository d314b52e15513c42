/** The same file dropped again after more shots: which of its rows are the rows of before. */
import { problem } from '../problems/problems.ts';
import type { Place, Problem } from '../problems/problems.ts';
import { proposeColumns } from './columns.ts';
import { readTable } from './table.ts';
import type { TableRead } from './table.ts';

export interface LinesAgain {
  /** Old line → new line of every row found again, whether it moved or not. */
  readonly moved: ReadonlyMap<string, string>;
  /** Old lines whose rows are gone. */
  readonly lost: readonly string[];
  /** Rows that were not there before. */
  readonly added: number;
}

interface Keyed {
  readonly line: string;
  readonly key: string;
  readonly label: string;
}

/** A row by what it says: spaces, trailing blanks, and the zeros that a spreadsheet drops (12.0, 12) make no difference. */
function keyOf(cells: readonly string[]): string {
  const plain = cells.map((cell) => {
    const text = cell.trim();
    return /^[+-]?\d+[.,]\d+$/.test(text) ? text.replace(',', '.').replace(/\.?0+$/, '') : text;
  });
  while (plain.at(-1) === '') plain.pop();
  return plain.join('\u0000');
}

function keyed(table: TableRead): Keyed[] {
  const labels = proposeColumns(table).findIndex(({ role }) => role === 'label');
  return table.rows.map(({ line, cells }) => ({ line: String(line), key: keyOf(cells), label: labels === -1 ? '' : (cells[labels] ?? '').trim() }));
}

/**
 * Aligns the rows of two versions of one table: rows that say the same, in order (rows that occur once are the anchors, and what stands
 * between two anchors is aligned in turn), equal rows by their ordinal; then rows with the same label, where a label occurs once on each side.
 */
export function linesAgain(before: TableRead, after: TableRead): LinesAgain {
  const old = keyed(before);
  const now = keyed(after);
  const moved = new Map<string, string>();
  const used = new Set<string>();
  const match = (a: Keyed, b: Keyed): void => {
    moved.set(a.line, b.line);
    used.add(b.line);
  };
  align(old, now, match);
  matchOrdinals(old.filter(({ line }) => !moved.has(line)), now.filter(({ line }) => !used.has(line)), ({ key }) => key, match, false);
  const labelled = ({ label }: Keyed): boolean => label !== '';
  matchOrdinals(
    old.filter((row) => !moved.has(row.line) && labelled(row)), now.filter((row) => !used.has(row.line) && labelled(row)), ({ label }) => label, match, true,
  );
  return { moved, lost: old.filter(({ line }) => !moved.has(line)).map(({ line }) => line), added: now.length - used.size };
}

type Match = (a: Keyed, b: Keyed) => void;

/** Patience alignment: equal ends, then rows that occur once on both sides and keep their order, then the stretches between. */
function align(old: readonly Keyed[], now: readonly Keyed[], match: Match): void {
  const stretches: [readonly Keyed[], readonly Keyed[]][] = [[old, now]];
  for (let next = stretches.pop(); next !== undefined; next = stretches.pop()) {
    let [a, b] = next;
    let head = 0;
    while (head < a.length && head < b.length && a[head]?.key === b[head]?.key) head += 1;
    for (let i = 0; i < head; i++) pair(a[i], b[i], match);
    [a, b] = [a.slice(head), b.slice(head)];
    let tail = 0;
    while (tail < a.length && tail < b.length && a.at(-1 - tail)?.key === b.at(-1 - tail)?.key) tail += 1;
    for (let i = 1; i <= tail; i++) pair(a.at(-i), b.at(-i), match);
    [a, b] = [a.slice(0, a.length - tail), b.slice(0, b.length - tail)];
    if (a.length === 0 || b.length === 0) continue;
    const anchors = inOrder(anchorsOf(a, b));
    if (anchors.length === 0) continue;
    let [fromA, fromB] = [0, 0];
    for (const [i, j] of anchors) {
      pair(a[i], b[j], match);
      stretches.push([a.slice(fromA, i), b.slice(fromB, j)]);
      [fromA, fromB] = [i + 1, j + 1];
    }
    stretches.push([a.slice(fromA), b.slice(fromB)]);
  }
}

function pair(a: Keyed | undefined, b: Keyed | undefined, match: Match): void {
  if (a !== undefined && b !== undefined) match(a, b);
}

/** Places of the rows that occur exactly once on each side, in the order of the first. */
function anchorsOf(a: readonly Keyed[], b: readonly Keyed[]): [number, number][] {
  const once = (rows: readonly Keyed[]): Map<string, number> => {
    const at = new Map<string, number>();
    rows.forEach(({ key }, i) => at.set(key, at.has(key) ? -1 : i));
    return at;
  };
  const inB = once(b);
  return [...once(a)].flatMap(([key, i]): [number, number][] => {
    const j = inB.get(key) ?? -1;
    return i === -1 || j === -1 ? [] : [[i, j]];
  });
}

/** The longest choice of pairs that keeps the order on both sides. */
function inOrder(pairs: readonly [number, number][]): [number, number][] {
  const ends: number[] = [];
  const before: number[] = [];
  pairs.forEach(([, j], at) => {
    let low = 0;
    let high = ends.length;
    while (low < high) {
      const middle = (low + high) >> 1;
      if ((pairs[ends[middle] ?? 0]?.[1] ?? 0) < j) low = middle + 1;
      else high = middle;
    }
    before[at] = low === 0 ? -1 : (ends[low - 1] ?? -1);
    ends[low] = at;
  });
  const chosen: [number, number][] = [];
  for (let at = ends.at(-1) ?? -1; at >= 0; at = before[at] ?? -1) {
    const one = pairs[at];
    if (one !== undefined) chosen.push(one);
  }
  return chosen.reverse();
}

/** Pairs the k-th of equal ones with the k-th; with `onlyOnce`, only such as occur once on each side. */
function matchOrdinals(old: readonly Keyed[], now: readonly Keyed[], by: (row: Keyed) => string, match: Match, onlyOnce: boolean): void {
  const group = (rows: readonly Keyed[]): Map<string, Keyed[]> => {
    const groups = new Map<string, Keyed[]>();
    for (const row of rows) groups.set(by(row), [...(groups.get(by(row)) ?? []), row]);
    return groups;
  };
  const theirs = group(now);
  for (const [key, ours] of group(old)) {
    const others = theirs.get(key) ?? [];
    if (onlyOnce && (ours.length !== 1 || others.length !== 1)) continue;
    ours.forEach((row, i) => pair(row, others[i], match));
  }
}

export interface NamedText {
  readonly name: string;
  readonly text: string;
}

/** Two texts are versions of one file: the same name, or the same header and at least half of the earlier rows again. */
export function sameFile(a: NamedText, b: NamedText): boolean {
  if (a.name !== '' && a.name === b.name) return true;
  const before = readTable(a.text);
  const after = readTable(b.text);
  if (before.rows.length === 0 || before.headers.join('\u0000') !== after.headers.join('\u0000')) return false;
  const left = new Map<string, number>();
  for (const { cells } of after.rows) left.set(keyOf(cells), (left.get(keyOf(cells)) ?? 0) + 1);
  let again = 0;
  for (const { cells } of before.rows) {
    const key = keyOf(cells);
    const times = left.get(key) ?? 0;
    if (times > 0) again += 1;
    left.set(key, times - 1);
  }
  return again * 2 >= before.rows.length;
}

/** Tells of rows that are gone; nothing where none is. `marked`: how many of them carry a decision of the person's. */
export function lostRowProblems(lost: number, marked: number, place: Place): Problem[] {
  return lost === 0 ? [] : [problem('same-file-rows-lost', marked > 0 ? 'doubt' : 'note', place, { lost, marked })];
}
