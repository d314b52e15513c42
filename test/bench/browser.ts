/** From the drop of a long trace to its impulse bits on the built page, and how the picture of the record follows the keys, in a real browser. */
import { createHash } from 'node:crypto';
import { writeFile } from 'node:fs/promises';
import { createServer } from 'node:net';
import { join } from 'node:path';
import { env } from 'node:process';
import { chromium } from 'playwright-core';
import type { Browser, Page } from 'playwright-core';
import { build, preview } from 'vite';
import { sessionToText } from '../../src/session/file.ts';
import { FIRST_TRACE } from '../../src/session/session.ts';
import type { Session, Trace } from '../../src/session/session.ts';
import { findBrowser } from '../find-browser.mjs';
import { sessionOf } from '../fixtures/session.ts';
import { struckRecord } from './struckRecord.ts';
import { median, table } from './timing.ts';
import type { Group, Here } from './timing.ts';

const ROWS = 2_000_000;
const SHOTS = 50;
const ROUNDS = 5;
const LONG_TASK_MS = 50;
const STEP_LIMIT_MS = 60_000;
/** Between two pictures of a screen of 60 Hz. */
const FRAME_MS = 1000 / 60;
/** Pressed on the picture, several times over: nearer, along, and out to the whole again. */
const KEYS = ['+', '+', 'ArrowRight', 'ArrowRight', 'ArrowLeft', '+', 'ArrowRight', '-', '-', 'ArrowLeft', '0'] as const;
const KEY_ROUNDS = 4;

/** A thousand samples a second of a 50 g bob at 0.3 m, a shot each 40 s, read in mm with a micrometre of noise: 20 bytes a row. */
function trace(): { readonly text: string; readonly events: readonly number[] } {
  const frequency = Math.sqrt(9.80665 / 0.3);
  const events = Array.from({ length: SHOTS }, (_, k) => 10.0004 + 39.5 * k);
  const { t, x } = struckRecord({ frequency, ratio: 0.01, count: ROWS, spacing: 1e-3, events, jumps: events.map((_, k) => 1 + 0.002 * k), start: [0.05, 0.03], rest: [12.5, 12.6], noise: 1e-3, seed: 20_261_201 });
  const parts = ['time (s),displacement (mm)\n'];
  for (let i = 0; i < ROWS; i += 1) parts.push(`${t[i]!.toFixed(4)},${x[i]!.toFixed(6)}\n`);
  return { text: parts.join(''), events };
}

/** The bench is set, and the trace named by its sum: choosing the file itself completes it. */
function sessionNaming(text: string, patch: Pick<Trace, 'events' | 'eventsFrom'>): Session {
  const bench = sessionOf({
    choices: { form: 'pointBob', readingWay: 'sensorOnPoint', dampingWay: 'none' },
    entries: { bobMass: '50 g', bobDistance: '300 mm', leverArm: '280 mm', readingRadius: '300 mm ± 0.5 %', gravity: '9.80665 m/s²' },
  });
  return { ...bench, traces: [{ ...FIRST_TRACE, ...patch, id: 't1', name: 'sensor.csv', sha256: createHash('sha256').update(text).digest('hex'), bytes: text.length }] };
}

/** A port that the system calls free. */
async function freePort(): Promise<number> {
  return new Promise((resolve, reject) => {
    const probe = createServer();
    probe.once('error', reject);
    probe.listen(0, 'localhost', () => {
      const address = probe.address();
      probe.close(() => (address === null || typeof address === 'string' ? reject(new Error('Looking for a port: the probe has none.')) : resolve(address.port)));
    });
  });
}

interface Served {
  readonly address: string;
  readonly stop: () => Promise<void>;
}

/** The page, and beside it the one with PapaParse alone, built and served. */
async function served({ root, folder }: Here): Promise<Served> {
  const pages = join(folder, 'pages');
  await build({ root, logLevel: 'warn', build: { outDir: pages, emptyOutDir: true } });
  await build({ configFile: false, root: join(root, 'test', 'bench', 'papaPage'), base: './', logLevel: 'warn', build: { outDir: join(pages, 'papa'), emptyOutDir: true } });
  const server = await preview({ configFile: false, root: pages, appType: 'mpa', build: { outDir: '.' }, preview: { port: await freePort(), strictPort: true }, logLevel: 'silent' });
  const address = server.resolvedUrls?.local[0];
  if (address === undefined) throw new Error('Serving the built page: the server has no address.');
  return { address, stop: async () => server.close() };
}

async function opened<Answer>(browser: Browser, address: string, work: (page: Page) => Promise<Answer>): Promise<Answer> {
  const context = await browser.newContext({ locale: 'en-US', timezoneId: 'UTC' });
  try {
    const page = await context.newPage();
    page.setDefaultTimeout(STEP_LIMIT_MS);
    await page.goto(address);
    return await work(page);
  } finally {
    await context.close();
  }
}

/** ms of PapaParse alone on the whole text. */
async function papaAlone(browser: Browser, address: string, csv: string): Promise<number> {
  return opened(browser, `${address}papa/`, async (page) => {
    await page.locator('input').setInputFiles(csv);
    const done = page.locator('body[data-rows]');
    await done.waitFor();
    if ((await done.getAttribute('data-rows')) !== String(ROWS + 1)) throw new Error('Timing PapaParse in the browser: it read another number of rows.');
    return Number(await done.getAttribute('data-ms'));
  });
}

/** ms from the drop on; long tasks are those of the page's main thread. */
interface Watched {
  /** Until the bytes are summed and their reading begins, and until they are read. */
  readonly summed: number;
  readonly read: number;
  /** Until the mean of all shots stands in the result line. */
  readonly mean: number;
  /** Until every impulse bit stands in the table. */
  readonly bits: number;
  /** Until the whole record is drawn; null where the page has no such picture. */
  readonly picture: number | null;
  readonly longTasks: readonly { readonly at: number; readonly ms: number }[];
}

const RECORD = '[role="slider"][aria-label^="The record"]';

/** Begins with the next drop. The promise stands on the window, since the drop comes from outside. */
async function watch(page: Page): Promise<void> {
  await page.evaluate(({ shots, record }) => {
    const longTasks: { at: number; ms: number }[] = [];
    const found = { begun: 0, summed: 0, read: 0, mean: 0, bits: 0, picture: 0 };
    new PerformanceObserver((list) => longTasks.push(...list.getEntries().map(({ startTime, duration }) => ({ at: startTime, ms: duration })))).observe({ type: 'longtask' });
    document.addEventListener('drop', () => {
      found.begun = performance.now();
    }, { capture: true, once: true });
    /** After the frame that shows it. */
    const shown = (what: 'mean' | 'bits' | 'picture'): void => {
      if (found[what] !== 0) return;
      found[what] = Infinity;
      requestAnimationFrame(() => {
        const { port1, port2 } = new MessageChannel();
        port1.onmessage = () => {
          found[what] = performance.now();
        };
        port2.postMessage(null);
      });
    };
    const look = (): void => {
      const reads = document.querySelector('#traces progress') !== null;
      if (reads && found.summed === 0) found.summed = performance.now();
      if (!reads && found.summed > 0 && found.read === 0) found.read = performance.now();
      const line = [...document.querySelectorAll('p[role="status"]')].find((one) => one.textContent.startsWith('Mean impulse bit'));
      if (line?.textContent.includes(`n = ${shots} of ${shots}`)) shown('mean');
      if (document.querySelectorAll('#table tbody tr').length >= shots) shown('bits');
      if (document.querySelector(`${record} canvas`) !== null) shown('picture');
    };
    new MutationObserver(look).observe(document.body, { childList: true, subtree: true, characterData: true });
    Object.assign(window, { benchWatch: { found, longTasks } });
  }, { shots: SHOTS, record: RECORD });
}

/** Drops the file on the page as a person does: by the mouse, from the system. */
async function drop(page: Page, csv: string): Promise<void> {
  const session = await page.context().newCDPSession(page);
  const data = { items: [], files: [csv], dragOperationsMask: 1 };
  for (const type of ['dragEnter', 'dragOver', 'drop'] as const) await session.send('Input.dispatchDragEvent', { type, x: 300, y: 300, data });
}

declare global {
  interface Window {
    /** Moments on the page's clock, ms; 0 until they come. */
    benchWatch: { readonly found: Readonly<Record<'begun' | 'summed' | 'read' | 'mean' | 'bits' | 'picture', number>>; readonly longTasks: Watched['longTasks'] };
  }
}

async function seen(page: Page): Promise<Watched> {
  const settled = (what: 'mean' | 'bits' | 'picture') => page.waitForFunction((which) => window.benchWatch.found[which] > 0 && window.benchWatch.found[which] < Infinity, what, { timeout: STEP_LIMIT_MS });
  await settled('mean');
  await settled('bits');
  // What the page has no picture of will not come.
  const hasPicture = await page.waitForSelector(RECORD, { timeout: 5000 }).then(() => settled('picture')).then(() => true, () => false);
  await page.waitForTimeout(300);
  return page.evaluate((withPicture) => {
    const { found: { begun, summed, read, mean, bits, picture }, longTasks } = window.benchWatch;
    return { summed: summed - begun, read: read - begun, mean: mean - begun, bits: bits - begun, picture: withPicture ? picture - begun : null, longTasks: longTasks.map(({ at, ms }) => ({ at: at - begun, ms })) };
  }, hasPicture);
}

/** Of one key on the picture: script until it is drawn, all work until the frame is out, and the whole wait, ms. */
interface Pressed {
  readonly script: number;
  readonly work: number;
  readonly wait: number;
}

async function pressKeys(page: Page): Promise<readonly Pressed[]> {
  return page.evaluate(async ({ record, keys, rounds }) => {
    const surface = document.querySelector<HTMLElement>(record);
    if (surface === null) return [];
    surface.scrollIntoView({ block: 'center' });
    surface.focus();
    const frame = (): Promise<number> => new Promise((resolve) => {
      requestAnimationFrame(() => resolve(performance.now()));
    });
    const turn = (): Promise<void> => new Promise((resolve) => {
      const { port1, port2 } = new MessageChannel();
      port1.onmessage = () => resolve();
      port2.postMessage(null);
    });
    await frame();
    const pressed: { script: number; work: number; wait: number }[] = [];
    for (let round = -1; round < rounds; round += 1) {
      for (const key of keys) {
        await frame();
        await turn();
        const begun = performance.now();
        surface.dispatchEvent(new KeyboardEvent('keydown', { key, bubbles: true, cancelable: true }));
        // What the handler put off until its own end.
        await Promise.resolve();
        await Promise.resolve();
        const scripted = performance.now();
        const inFrame = await frame();
        await turn();
        const ended = performance.now();
        if (round >= 0) pressed.push({ script: scripted - begun, work: scripted - begun + ended - inFrame, wait: ended - begun });
      }
    }
    return pressed;
  }, { record: RECORD, keys: [...KEYS], rounds: KEY_ROUNDS });
}

interface Round {
  readonly watched: Watched;
  readonly pressed: readonly Pressed[];
}

async function dropped(browser: Browser, address: string, session: string, csv: string): Promise<Round> {
  return opened(browser, address, async (page) => {
    await page.getByLabel('Open a session file, tables of readings, or traces').setInputFiles(session);
    await page.getByText('are not on this device').waitFor();
    await page.waitForTimeout(500);
    await watch(page);
    await drop(page, csv);
    const watched = await seen(page);
    return { watched, pressed: await pressKeys(page) };
  });
}

function longTaskWords(rounds: readonly Round[], until: (watched: Watched) => number | null): string {
  const within = rounds.map(({ watched }) => watched.longTasks.filter(({ at, ms }) => at + ms > 0 && at < (until(watched) ?? 0)));
  const counts = within.map((tasks) => tasks.length);
  const [longest] = within.flat().toSorted((a, b) => b.ms - a.ms);
  return `${counts.join(', ')}${longest === undefined ? '' : `; the longest ${longest.ms.toFixed(0)} ms, from ${longest.at.toFixed(0)} ms on`}`;
}

function keyLines(pressed: readonly Pressed[]): readonly string[] {
  if (pressed.length === 0) return ['The page has no picture of the whole record, so no key was pressed on it.'];
  const row = (name: string, of: (one: Pressed) => number): readonly string[] => {
    const ms = pressed.map(of);
    return [name, (median(ms) / FRAME_MS).toFixed(2), median(ms).toFixed(1), Math.max(...ms).toFixed(1)];
  };
  return [
    ...table(['a key on the picture of the whole record', 'of a frame', 'median ms', 'longest ms'], [row('handler and drawing, in script', ({ script }) => script), row('with what the frame does after it', ({ work }) => work), row('from the key to the frame, waiting included', ({ wait }) => wait)]), '',
    `${pressed.length} keys: nearer, farther, along, whole. A frame is ${FRAME_MS.toFixed(1)} ms.`,
  ];
}

const LIST = (events: readonly number[]): Trace['events'] => events.map((time, i) => ({ id: `e${i + 1}`, text: `${time.toFixed(4)} s` }));

async function inBrowser(browser: Browser, here: Here): Promise<readonly string[]> {
  const { text, events } = trace();
  const csv = join(here.folder, 'sensor.csv');
  await writeFile(csv, text);
  const sessions = { listed: join(here.folder, 'listed.json'), found: join(here.folder, 'found.json') };
  await writeFile(sessions.listed, sessionToText(sessionNaming(text, { events: LIST(events), eventsFrom: 'list' })));
  await writeFile(sessions.found, sessionToText(sessionNaming(text, { events: [], eventsFrom: 'found' })));
  const { address, stop } = await served(here);
  try {
    const papa: number[] = [];
    const listed: Round[] = [];
    const found: Round[] = [];
    for (let round = -1; round < ROUNDS; round += 1) {
      const alone = await papaAlone(browser, address, csv);
      const byList = await dropped(browser, address, sessions.listed, csv);
      const byFinding = await dropped(browser, address, sessions.found, csv);
      if (round < 0) continue;
      papa.push(alone);
      listed.push(byList);
      found.push(byFinding);
    }
    const yardstick = median(papa);
    const row = (name: string, ms: readonly number[]): readonly string[] => [name, (median(ms) / yardstick).toFixed(2), median(ms).toFixed(0), Math.max(...ms).toFixed(0)];
    const drawn = listed.flatMap(({ watched: { picture } }) => picture ?? []);
    return [
      ...table(['case', 'ratio', 'median ms', 'longest ms'], [
        row('PapaParse alone on the text as a string', papa),
        row('drop to the bytes summed', listed.map(({ watched }) => watched.summed)),
        row('drop to the rows read', listed.map(({ watched }) => watched.read)),
        row('drop to the mean of the listed shots', listed.map(({ watched }) => watched.mean)),
        row('drop to all listed shots in the table', listed.map(({ watched }) => watched.bits)),
        ...(drawn.length === listed.length ? [row('drop to the picture of the whole record', drawn)] : []),
        row('drop to all shots in the table, found in the swing', found.map(({ watched }) => watched.bits)),
      ]), '',
      `Medians of ${ROUNDS} rounds, each in a page with nothing kept. ${browser.browserType().name()} ${browser.version()}.`, '',
      `Tasks over ${LONG_TASK_MS} ms on the main thread in each round, from the drop to all listed shots in the table: ${longTaskWords(listed, ({ bits }) => bits)}.`,
      `The same to the picture of the whole record: ${longTaskWords(listed, ({ picture }) => picture)}.`, '',
      ...keyLines(listed.flatMap(({ pressed }) => pressed)),
    ];
  } finally {
    await stop();
  }
}

async function report(here: Here): Promise<readonly string[]> {
  let program: Awaited<ReturnType<typeof findBrowser>>;
  try {
    program = await findBrowser();
  } catch (reason) {
    return [`No browser here. ${reason instanceof Error ? reason.message : String(reason)}`];
  }
  const browser = await chromium.launch({ executablePath: program.executablePath, env: { ...env, ...program.env } });
  try {
    return await inBrowser(browser, here);
  } finally {
    await browser.close();
  }
}

export const browserGroup: Group = { name: 'browser', title: `In the browser: a trace of ${ROWS} rows, 40 MB, ${SHOTS} shots, on a bench that is set`, report };
