/**
 * Ratios of speed, against a yardstick that runs in the same run: a group's cases take turns, round after round, and
 * each case's median time is divided by the yardstick's. Absolute times say something about this machine only.
 * Given a word, it runs the groups whose name begins with it, or else those that have it in their title.
 */
import { mkdtemp, rm } from 'node:fs/promises';
import { cpus } from 'node:os';
import { join } from 'node:path';
import { arch, argv, platform, stdout, version } from 'node:process';
import { fileURLToPath, pathToFileURL } from 'node:url';
import { build } from 'vite';

const ROOT = fileURLToPath(new URL('../..', import.meta.url));

/** @typedef {import('./timing.ts').Group} Group */

/**
 * The cases and all that they import as one module, as the built page would have them; what drives the browser stays outside.
 * @param {string} folder
 * @returns {Promise<readonly Group[]>}
 */
async function loadGroups(folder) {
  await build({
    configFile: false,
    root: ROOT,
    logLevel: 'warn',
    ssr: { noExternal: true, external: ['vite', 'playwright-core', '@sparticuz/chromium'] },
    build: {
      ssr: true, outDir: folder, emptyOutDir: true, copyPublicDir: false,
      rolldownOptions: { input: { cases: 'test/bench/cases.ts', longRecord: 'test/bench/longRecord.ts' }, output: { entryFileNames: '[name].mjs', chunkFileNames: '[name].mjs' } },
    },
  });
  /** @type {{ groups: readonly Group[] }} */
  const { groups } = await import(pathToFileURL(join(folder, 'cases.mjs')).href);
  return groups;
}

// Below the packages, so that what stays outside is found from there.
const folder = await mkdtemp(join(ROOT, 'node_modules', 'firstswing-bench-'));
try {
  const groups = await loadGroups(folder);
  const wanted = argv[2] ?? '';
  const named = groups.filter(({ name }) => name.startsWith(wanted));
  const chosen = named.length > 0 ? named : groups.filter(({ title }) => title.includes(wanted));
  if (chosen.length === 0) throw new Error(`Choosing what to time: no group has "${wanted}"; there are ${groups.map(({ name }) => name).join(', ')}.`);
  stdout.write(`Node ${version}, ${platform} ${arch}, ${cpus().length} × ${cpus()[0]?.model.trim() ?? 'unknown'}\n\n`);
  for (const { title, report } of chosen) stdout.write(`### ${title}\n\n${(await report({ root: ROOT, folder })).join('\n')}\n\n`);
} finally {
  await rm(folder, { recursive: true });
}
