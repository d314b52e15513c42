/**
 * What every browser test stands on: the built page served from a folder, and a Chromium page that fails its test on
 * anything said on the console, any failure in the page, any breach of its policy and any request beyond its folder.
 */
import { existsSync } from 'node:fs';
import { cp, mkdtemp, rm } from 'node:fs/promises';
import { createServer } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { chromium } from 'playwright-core';
import type { BrowserContext, Page } from 'playwright-core';
import { preview } from 'vite';
import { test as plainTest } from 'vitest';
import { findBrowser } from '../find-browser.mjs';

export { expect } from 'vitest';

const BUILT = fileURLToPath(new URL('../../dist', import.meta.url));

/** The tests drive the page by hand, so a step that takes longer than this is one that will not come. */
const STEP_LIMIT_MS = 15_000;

interface Served {
  /** Address of the page's own folder, ending in a slash. */
  readonly address: string;
  readonly stop: () => Promise<void>;
}

/** A port that the system calls free. Such ports lie above those that browsers refuse. */
async function freePort(): Promise<number> {
  return new Promise((resolve, reject) => {
    const probe = createServer();
    probe.once('error', reject);
    probe.listen(0, 'localhost', () => {
      const address = probe.address();
      probe.close(() => {
        if (address === null || typeof address === 'string') reject(new Error('Looking for a port: the probe has none.'));
        else resolve(address.port);
      });
    });
  });
}

async function serveFolder(folder: string): Promise<Served> {
  const server = await preview({
    configFile: false,
    root: folder,
    appType: 'mpa',
    build: { outDir: '.' },
    preview: { port: await freePort(), strictPort: true },
    logLevel: 'silent',
  });
  const address = server.resolvedUrls?.local[0];
  if (address === undefined) throw new Error('Serving the built page: the server has no address.');
  return { address, stop: async () => server.close() };
}

function builtFolder(): string {
  if (!existsSync(join(BUILT, 'index.html'))) throw new Error('Opening the built page: there is none. Run npm run build first.');
  return BUILT;
}

/** A copy of the built page in a folder below its server's root, as on a shared static host. */
export async function serveBuiltPageBelow(path: string): Promise<Served> {
  const root = await mkdtemp(join(tmpdir(), 'firstswing-served-'));
  await cp(builtFolder(), join(root, path), { recursive: true });
  const served = await serveFolder(root);
  return {
    address: new URL(`${path}/`, served.address).href,
    stop: async () => {
      await served.stop();
      await rm(root, { recursive: true });
    },
  };
}

/** Opens `address` in a page of its own, whose storage nobody else has; `findings` fills with all that must not happen. */
async function openWatched(context: BrowserContext, address: string, findings: string[]): Promise<Page> {
  context.on('console', (message) => findings.push(`console ${message.type()}: ${message.text()}`));
  context.on('weberror', (failure) => findings.push(`failure in the page: ${String(failure.error())}`));
  context.on('request', (request) => {
    const url = request.url();
    if (!url.startsWith(address) && !url.startsWith('blob:') && !url.startsWith('data:')) findings.push(`request beyond the page's folder: ${url}`);
  });
  context.on('response', (response) => {
    if (response.status() >= 400) findings.push(`answer ${response.status()}: ${response.url()}`);
  });
  await context.exposeBinding('reportBreach', (_source, breach: string) => findings.push(`breach of the page's policy: ${breach}`));
  await context.addInitScript(() => {
    document.addEventListener('securitypolicyviolation', (breach) => {
      const report: unknown = Reflect.get(globalThis, 'reportBreach');
      if (typeof report === 'function') Reflect.apply(report, undefined, [`${breach.effectiveDirective} ${breach.blockedURI}`]);
    });
  });
  const page = await context.newPage();
  page.on('websocket', (socket) => findings.push(`socket: ${socket.url()}`));
  page.setDefaultTimeout(STEP_LIMIT_MS);
  await page.goto(address);
  // Drawn, and its listeners set with the frame after: what is dropped before that is nobody's.
  await page.getByRole('button', { name: 'save session' }).waitFor();
  await page.evaluate(async () => new Promise((done) => {
    requestAnimationFrame(() => requestAnimationFrame(() => setTimeout(done, 0)));
  }));
  return page;
}

/**
 * Vitest's `test`, with
 * - `page`: the built page, open in a browser context of its own;
 * - `openPage(address)`: the same for a page served elsewhere;
 * - `served`, `browser`: shared by the tests of a file;
 * - `findings`: what the watch has found so far; the test fails when it is not empty at the end.
 */
export const test = plainTest
  .extend('found', { scope: 'file' }, async () => findBrowser())
  .extend('browser', { scope: 'file' }, async ({ found }, { onCleanup }) => {
    const browser = await chromium.launch({ executablePath: found.executablePath, env: { ...process.env, ...found.env } });
    onCleanup(async () => browser.close());
    return browser;
  })
  .extend('built', { scope: 'file' }, () => builtFolder())
  .extend('served', { scope: 'file' }, async ({ built }, { onCleanup }) => {
    const served = await serveFolder(built);
    onCleanup(served.stop);
    return served;
  })
  .extend('findings', ({ task }, { onCleanup }) => {
    const findings: string[] = [];
    onCleanup(() => {
      if (findings.length > 0) throw new Error(`In the page during "${task.name}":\n${findings.join('\n')}`);
    });
    return findings;
  })
  .extend('openPage', ({ browser, findings }, { onCleanup }) => {
    const contexts: BrowserContext[] = [];
    onCleanup(async () => {
      for (const context of contexts) await context.close();
    });
    return async (address: string): Promise<Page> => {
      // Named, because a Chromium started without a locale calls its language en-US@posix, which Intl refuses.
      const context = await browser.newContext({ acceptDownloads: true, locale: 'en-US', timezoneId: 'UTC' });
      contexts.push(context);
      return openWatched(context, address, findings);
    };
  })
  .extend('page', async ({ openPage, served }) => openPage(served.address));
