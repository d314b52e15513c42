/**
 * The whole check, step by step: types, lint, unit and component tests, build, tests in a real browser.
 * Stops at the first step that fails. The last line is the count of tests, where a failed step without tests is one failure.
 */
import { spawnSync } from 'node:child_process';
import { existsSync, mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { execPath, platform, stdout } from 'node:process';
import { fileURLToPath } from 'node:url';

const ROOT = dirname(dirname(fileURLToPath(import.meta.url)));
const STEP_LIMIT_MS = 8 * 60_000;

/** @typedef {{ passed: number, failed: number }} Count */
/** @typedef {{ numPassedTests: number, testResults: { status: string, assertionResults: { status: string }[] }[] }} Report */

/**
 * @param {string} program
 * @param {string[]} words
 * @returns {boolean} Whether it ended well.
 */
function run(program, words) {
  const ended = spawnSync(program, words, {
    cwd: ROOT,
    stdio: ['ignore', 'inherit', 'inherit'],
    timeout: STEP_LIMIT_MS,
    shell: platform === 'win32' && program === 'npm',
  });
  return ended.status === 0;
}

/**
 * @param {string} name
 * @returns {Count}
 */
function script(name) {
  return { passed: 0, failed: run('npm', ['run', '--silent', name]) ? 0 : 1 };
}

/**
 * Counts what Vitest wrote down, and does not believe a good ending alone: a skipped test, a file that could not be
 * read and a run without tests are failures too.
 * @param {string[]} projects
 * @returns {Count}
 */
function vitest(projects) {
  const reports = mkdtempSync(join(tmpdir(), 'firstswing-report-'));
  const report = join(reports, 'vitest.json');
  const endedWell = run(execPath, [
    join(ROOT, 'node_modules', 'vitest', 'vitest.mjs'),
    'run',
    ...projects.flatMap((project) => ['--project', project]),
    '--reporter=default',
    '--reporter=json',
    `--outputFile.json=${report}`,
  ]);
  /** @type {Report} */
  const written = existsSync(report) ? JSON.parse(readFileSync(report, 'utf8')) : { numPassedTests: 0, testResults: [] };
  rmSync(reports, { recursive: true });

  const passed = written.numPassedTests;
  let failed = 0;
  for (const file of written.testResults) {
    const notPassed = file.assertionResults.filter((test) => test.status !== 'passed').length;
    failed += notPassed === 0 && file.status !== 'passed' ? 1 : notPassed;
  }
  if (failed === 0 && (!endedWell || passed === 0)) failed = 1;
  return { passed, failed };
}

const steps = [
  { name: 'Types', take: () => script('typecheck') },
  { name: 'Lint', take: () => script('lint') },
  { name: 'Unit and component tests', take: () => vitest(['core', 'page']) },
  { name: 'Build', take: () => script('build') },
  { name: 'Tests in a real browser', take: () => vitest(['browser']) },
];

const total = { passed: 0, failed: 0 };
for (const { name, take } of steps) {
  stdout.write(`\n== ${name}\n`);
  const { passed, failed } = take();
  total.passed += passed;
  total.failed += failed;
  if (failed > 0) {
    stdout.write(`\n== ${name}: failed; the steps after it were not taken\n`);
    break;
  }
}

process.exitCode = total.failed === 0 ? 0 : 1;
stdout.write(`${total.passed} passed, ${total.failed} failed\n`);
