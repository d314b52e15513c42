/** How the page is built, served and tested. */
import react from '@vitejs/plugin-react';
import type { Plugin } from 'vite';
import { defineConfig } from 'vitest/config';

/** What the built page may load and do: its own files, and nothing from anywhere else. */
const CONTENT_SECURITY_POLICY = [
  "default-src 'none'",
  "script-src 'self'",
  "style-src 'self'",
  "img-src 'self' data: blob:",
  "connect-src 'self'",
  "worker-src 'self'",
  "font-src 'none'",
  "manifest-src 'self'",
  "base-uri 'none'",
  "form-action 'none'",
  "frame-src 'none'",
].join('; ');

/** Only the built page carries the policy: hot reloading puts an inline script and inline styles into the page it serves. */
function contentSecurityPolicy(): Plugin {
  return {
    name: 'content-security-policy',
    apply: 'build',
    transformIndexHtml: () => [
      {
        tag: 'meta',
        attrs: { 'http-equiv': 'Content-Security-Policy', content: CONTENT_SECURITY_POLICY },
        injectTo: 'head-prepend',
      },
    ],
  };
}

const PURE_FOLDERS = 'units,problems,numeric,metrology,pendulum,readings,traces,session,reduction,exports';
const PAGE_FOLDERS = 'platform,workers,store,plots,page';

export default defineConfig({
  base: './',
  plugins: [react(), contentSecurityPolicy()],
  worker: { format: 'es' },
  build: {
    assetsInlineLimit: 0,
    modulePreload: { polyfill: false },
  },
  // Both take the next free port when theirs is taken; no port near these is on the browsers' list of refused ones.
  server: { port: 8317 },
  preview: { port: 8327 },
  test: {
    projects: [
      {
        extends: true,
        test: {
          name: 'core',
          environment: 'node',
          include: [`test/{${PURE_FOLDERS}}/**/*.test.ts`, 'test/house.test.ts'],
          setupFiles: ['test/setup/seed.ts', 'test/setup/silence.ts'],
          // A guard against what never ends, not a measure of speed: a busy machine takes several times as long.
          testTimeout: 60_000,
        },
      },
      {
        extends: true,
        test: {
          name: 'page',
          environment: 'jsdom',
          include: [`test/{${PAGE_FOLDERS}}/**/*.test.{ts,tsx}`],
          setupFiles: ['test/setup/seed.ts', 'test/setup/silence.ts', 'test/setup/browser-parts.ts'],
          testTimeout: 60_000,
        },
      },
      {
        extends: true,
        test: {
          name: 'browser',
          environment: 'node',
          include: ['test/browser/**/*.test.ts'],
          setupFiles: ['test/setup/silence.ts'],
          fileParallelism: false,
          testTimeout: 60_000,
          hookTimeout: 60_000,
        },
      },
    ],
  },
});
