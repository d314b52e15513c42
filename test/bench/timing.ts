/** Times of cases that take turns in one process, and tables of their ratios. */

export interface Case {
  readonly name: string;
  /** Does the work once, and answers with a number that depends on all of it and is the same each time. */
  readonly run: () => number;
}

/** Where a group finds the project, and where it may put files for as long as it runs. */
export interface Here {
  readonly root: string;
  readonly folder: string;
}

export interface Group {
  /** By which it is asked for: one word. */
  readonly name: string;
  readonly title: string;
  /** Makes its inputs, takes its times and returns its lines; the inputs go with it. */
  readonly report: (here: Here) => Promise<readonly string[]>;
}

/** Quick cases are run often, slow ones a few times. */
interface Rounds {
  readonly rounds: number;
  readonly warmUp: number;
}

export const QUICK: Rounds = { rounds: 15, warmUp: 3 };
export const SLOW: Rounds = { rounds: 5, warmUp: 1 };

export function median(times: readonly number[]): number {
  const sorted = times.toSorted((a, b) => a - b);
  return sorted[Math.floor(sorted.length / 2)] ?? 0;
}

/** Median milliseconds of each case. Every round begins with another case, so that none always follows the same one. */
export function mediansOf(cases: readonly Case[], { rounds, warmUp }: Rounds): number[] {
  const times = cases.map((): number[] => []);
  const answers = cases.map(({ run }) => run());
  for (let round = -warmUp; round < rounds; round += 1) {
    for (let turn = 0; turn < cases.length; turn += 1) {
      const index = (turn + round + warmUp) % cases.length;
      const one = cases[index]!;
      const begun = performance.now();
      const answer = one.run();
      const taken = performance.now() - begun;
      if (answer !== answers[index]) throw new Error(`Timing ${one.name}: it answered ${answer} after ${answers[index]}.`);
      if (round >= 0) times[index]!.push(taken);
    }
  }
  return times.map(median);
}

/** A table whose first column holds words and whose others hold numbers. */
export function table(head: readonly string[], rows: readonly (readonly string[])[]): readonly string[] {
  const widths = head.map((word, i) => Math.max(word.length, ...rows.map((row) => row[i]!.length)));
  const line = (cells: readonly string[]): string => `| ${cells.map((cell, i) => (i === 0 ? cell.padEnd(widths[i]!) : cell.padStart(widths[i]!))).join(' | ')} |`;
  return [line(head), `|${widths.map((width, i) => (i === 0 ? '-'.repeat(width + 2) : `${'-'.repeat(width + 1)}:`)).join('|')}|`, ...rows.map(line)];
}

/** Each case's time over that of the first. */
export const ratios = (names: readonly string[], ms: readonly number[]): readonly string[] =>
  table(['case', 'ratio', 'median ms'], names.map((name, i) => [name, (ms[i]! / ms[0]!).toFixed(2), ms[i]!.toFixed(2)]));

/** A group of cases of which the first is the yardstick. */
export const timed = (make: () => readonly Case[], rounds: Rounds): Group['report'] => async () => {
  const cases = make();
  return [...ratios(cases.map(({ name }) => name), mediansOf(cases, rounds)), '', `Medians of ${rounds.rounds} rounds.`];
};
