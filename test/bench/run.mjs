/**
 * Ratios of speed, against a yardstick that runs in the same process: each group's cases take turns, round after round,
 * and each case's median time is divided by the yardstick's. Absolute times say something about this machine only.
 */
import { mkdtemp, rm } from 'node:fs/promises';
import { cpus, tmpdir } from 'node:os';
import { join } from 'node:path';
import { arch, argv, platform, stdout, version } from 'node:process';
import { fileURLToPath, pathToFileURL } from 'node:url';
import { build } from 'vite';

const ROOT = fileURLToPath(new URL('../..', import.meta.url));
const WARM_UP_ROUNDS = 3;
const ROUNDS = 15;

/** @typedef {import('./cases.ts').Group} Group */

/**
 * The cases and all that they import as one module, as the built page would have them.
 * @param {string} folder
 * @returns {Promise<readonly Group[]>}
 */
async function loadGroups(folder) {
  await build({
    configFile: false,
    root: ROOT,
    logLevel: 'warn',
    ssr: { noExternal: true },
    build: { ssr: 'test/bench/cases.ts', outDir: folder, emptyOutDir: true, copyPublicDir: false, rolldownOptions: { output: { entryFileNames: 'cases.mjs' } } },
  });
  /** @type {{ groups: readonly Group[] }} */
  const { groups } = await import(pathToFileURL(join(folder, 'cases.mjs')).href);
  return groups;
}

/** @param {readonly number[]} times */
function median(times) {
  const sorted = times.toSorted((a, b) => a - b);
  return sorted[Math.floor(sorted.length / 2)] ?? 0;
}

/**
 * Median milliseconds of each case. Every round begins with another case, so that none always follows the same one.
 * @param {Group} group
 */
function timeGroup({ cases }) {
  /** @type {number[][]} */
  const times = cases.map(() => []);
  const answers = cases.map(({ run }) => run());
  for (let round = -WARM_UP_ROUNDS; round < ROUNDS; round += 1) {
    for (let turn = 0; turn < cases.length; turn += 1) {
      const index = (turn + round + WARM_UP_ROUNDS) % cases.length;
      const one = cases[index];
      if (one === undefined) continue;
      const begun = performance.now();
      const answer = one.run();
      const taken = performance.now() - begun;
      if (answer !== answers[index]) throw new Error(`Timing ${one.name}: it answered ${answer} after ${answers[index]}.`);
      if (round >= 0) times[index]?.push(taken);
    }
  }
  return times.map(median);
}

/** @param {Group} group */
function table(group) {
  const medians = timeGroup(group);
  const yardstick = medians[0] ?? 1;
  const width = Math.max(...group.cases.map(({ name }) => name.length));
  const rows = group.cases.map(({ name }, index) => {
    const ms = medians[index] ?? 0;
    return `| ${name.padEnd(width)} | ${(ms / yardstick).toFixed(2).padStart(7)} | ${ms.toFixed(2).padStart(9)} |`;
  });
  return [`### ${group.title}`, '', `| ${'case'.padEnd(width)} |   ratio | median ms |`, `|${'-'.repeat(width + 2)}|--------:|----------:|`, ...rows, ''].join('\n');
}

const folder = await mkdtemp(join(tmpdir(), 'firstswing-bench-'));
try {
  const groups = await loadGroups(folder);
  const wanted = argv[2];
  stdout.write(`Node ${version}, ${platform} ${arch}, ${cpus().length} × ${cpus()[0]?.model.trim() ?? 'unknown'}; medians of ${ROUNDS} interleaved rounds\n\n`);
  for (const group of groups) {
    if (wanted === undefined || group.title.includes(wanted)) stdout.write(`${table(group)}\n`);
  }
} finally {
  await rm(folder, { recursive: true });
}
