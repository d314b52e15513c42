/** Finds a Chromium for the browser tests; a machine without one is told how to get it, and the tests fail there. */
import { spawnSync } from 'node:child_process';
import { existsSync, mkdirSync, readFileSync, statSync } from 'node:fs';
import { createRequire } from 'node:module';
import { tmpdir } from 'node:os';
import { delimiter, dirname, join } from 'node:path';
import { argv, env, platform, stdout } from 'node:process';
import { fileURLToPath } from 'node:url';
import { brotliDecompressSync } from 'node:zlib';

/**
 * @typedef {object} FoundBrowser
 * @property {string} executablePath
 * @property {Record<string, string>} env What the process needs beside the present environment.
 * @property {string} from Where it was found, for people.
 */

const COMMANDS = ['chromium', 'chromium-browser', 'google-chrome', 'google-chrome-stable', 'chrome'];

const KNOWN_PLACES = [
  '/Applications/Google Chrome.app/Contents/MacOS/Google Chrome',
  '/Applications/Chromium.app/Contents/MacOS/Chromium',
  'C:\\Program Files\\Google\\Chrome\\Application\\chrome.exe',
  'C:\\Program Files (x86)\\Google\\Chrome\\Application\\chrome.exe',
];

const ANSWER_LIMIT_MS = 20_000;

/**
 * Whether the program answers with its version: a launcher of a package that is not there, or a binary without its
 * libraries, does not. Windows opens a window instead of answering, so there it is enough that the file exists.
 * @param {string} path
 * @param {Record<string, string>} [extra]
 */
function answers(path, extra = {}) {
  if (!existsSync(path) || !statSync(path).isFile()) return false;
  if (platform === 'win32') return true;
  const answer = spawnSync(path, ['--version'], { env: { ...env, ...extra }, encoding: 'utf8', timeout: ANSWER_LIMIT_MS });
  return answer.status === 0 && /\d+\.\d+/.test(answer.stdout);
}

/** @returns {FoundBrowser | null} */
function ofSystem() {
  const folders = (env['PATH'] ?? '').split(delimiter).filter((folder) => folder !== '');
  const candidates = [...COMMANDS.flatMap((command) => folders.map((folder) => join(folder, command))), ...KNOWN_PLACES];
  const executablePath = candidates.find((candidate) => answers(candidate));
  return executablePath === undefined ? null : { executablePath, env: {}, from: 'the system' };
}

/**
 * The npm package carries the few system libraries that Chromium needs as well; they are used where the system has none.
 * @returns {Promise<FoundBrowser | null>}
 */
async function ofNpm() {
  if (platform !== 'linux') return null;
  let chromium;
  try {
    ({ default: chromium } = await import('@sparticuz/chromium'));
  } catch {
    return null;
  }
  const executablePath = await chromium.executablePath();
  if (answers(executablePath)) return { executablePath, env: {}, from: 'the npm package' };
  const withLibraries = { LD_LIBRARY_PATH: unpackLibraries() };
  return answers(executablePath, withLibraries) ? { executablePath, env: withLibraries, from: 'the npm package, with its own libraries' } : null;
}

function unpackLibraries() {
  const packageRoot = dirname(dirname(dirname(createRequire(import.meta.url).resolve('@sparticuz/chromium'))));
  const folder = join(tmpdir(), 'chromium-libraries');
  mkdirSync(folder, { recursive: true });
  const archive = brotliDecompressSync(readFileSync(join(packageRoot, 'bin', 'al2023.tar.br')));
  spawnSync('tar', ['-x', '-C', folder], { input: archive });
  return join(folder, 'lib');
}

/** @returns {Promise<FoundBrowser>} */
export async function findBrowser() {
  const named = env['CHROMIUM_PATH'];
  if (named !== undefined && named !== '') {
    if (answers(named)) return { executablePath: named, env: {}, from: 'CHROMIUM_PATH' };
    throw new Error(`Finding a browser: CHROMIUM_PATH names ${named}, which does not start.`);
  }
  const found = ofSystem() ?? (await ofNpm());
  if (found !== null) return found;
  throw new Error(
    [
      'Finding a browser: none on this machine. One of these is enough:',
      '  - install Chromium or Google Chrome (Debian, Ubuntu: apt-get install chromium);',
      '  - on Linux x64, run npm ci without --omit=optional, which brings one;',
      '  - set CHROMIUM_PATH to the program of a Chromium or Chrome.',
    ].join('\n'),
  );
}

if (argv[1] === fileURLToPath(import.meta.url)) {
  const { executablePath, from } = await findBrowser();
  stdout.write(`${executablePath} (from ${from})\n`);
}
