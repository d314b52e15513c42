/** The rules of the house that a reader of one file cannot see: who may import whom, what files are called, which words do not stand in them. */
import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { basename, extname, join, posix } from 'node:path';
import { fileURLToPath } from 'node:url';
import { describe, expect, test } from 'vitest';
import { PROBLEM_CODES } from '../src/problems/problems.ts';

const ROOT = fileURLToPath(new URL('..', import.meta.url));

/** From the bottom up; a folder may import itself and what stands before it. */
const ORDER = [
  'units', 'problems', 'numeric', 'metrology', 'pendulum', 'readings', 'traces', 'session', 'reduction', 'exports',
  'platform', 'workers', 'store', 'plots', 'page', 'main.tsx',
];
const PURE = ORDER.slice(0, ORDER.indexOf('platform'));

/** Each package, and the folders it may enter by. A package that is not here may not be imported at all. */
const GATES: Readonly<Record<string, readonly string[]>> = {
  papaparse: ['readings'],
  'fft.js': ['numeric'],
  'idb-keyval': ['platform'],
  '@noble/hashes': ['workers'],
  zustand: ['store'],
  uplot: ['plots'],
  react: ['store', 'page', 'main.tsx'],
  'react-dom': ['page', 'main.tsx'],
};

const NOT_OURS = new Set(['node_modules', 'dist', 'coverage', '.git']);

function filesBelow(folder: string): string[] {
  if (!existsSync(join(ROOT, folder))) return [];
  return readdirSync(join(ROOT, folder), { withFileTypes: true }).flatMap((entry) => {
    if (NOT_OURS.has(entry.name)) return [];
    const path = posix.join(folder, entry.name);
    return entry.isDirectory() ? filesBelow(path) : [path];
  });
}

function text(path: string): string {
  return readFileSync(join(ROOT, path), 'utf8');
}

const everyFile = filesBelow('.');
const isCode = (path: string) => /\.(ts|tsx|mjs)$/.test(path);
const sources = everyFile.filter((path) => path.startsWith('src/') && isCode(path));
const folderOf = (path: string) => path.split('/')[1] ?? '';

interface Import {
  readonly from: string;
  readonly what: string;
}

const IMPORTS = [
  /\b(?:import|export)\s[^'"`;]*?\bfrom\s*['"]([^'"]+)['"]/g,
  /\bimport\s*\(?\s*['"]([^'"]+)['"]/g,
  /\bnew\s+URL\(\s*['"]([^'"]+)['"]\s*,\s*import\.meta\.url/g,
];

const imports: Import[] = sources.flatMap((from) =>
  IMPORTS.flatMap((form) => [...text(from).matchAll(form)].map((found) => ({ from, what: found[1] ?? '' }))),
);
const isRelative = ({ what }: Import) => what.startsWith('.');
const packageOf = (what: string) => what.split('/').slice(0, what.startsWith('@') ? 2 : 1).join('/');
const targetOf = ({ from, what }: Import) => posix.join(posix.dirname(from), what.replace(/\?.*$/, ''));
const told = ({ from, what }: Import) => `${from} imports ${what}`;

/** Lines of `paths` in which `pattern` is found, as file:line. */
function linesWith(pattern: RegExp, paths: readonly string[]): string[] {
  return paths.flatMap((path) =>
    text(path)
      .split('\n')
      .flatMap((line, index) => (pattern.test(line) ? [`${path}:${index + 1}: ${line.trim()}`] : [])),
  );
}

describe('imports', () => {
  test('every source file stands in a folder of the house', () => {
    expect(sources.filter((path) => !ORDER.includes(folderOf(path)))).toEqual([]);
    expect(imports.length).toBeGreaterThan(0);
  });

  test('imports go downward only', () => {
    const upward = imports.filter(
      (one) => isRelative(one) && ORDER.indexOf(folderOf(targetOf(one))) > ORDER.indexOf(folderOf(one.from)),
    );
    expect(upward.map(told)).toEqual([]);
  });

  test('a relative import stays in src and names its file with the extension', () => {
    const strays = imports.filter((one) => isRelative(one) && !(targetOf(one).startsWith('src/') && extname(targetOf(one)) !== ''));
    expect(strays.map(told)).toEqual([]);
  });

  test('each package enters by its own folder', () => {
    const strays = imports.filter((one) => !isRelative(one) && !GATES[packageOf(one.what)]?.includes(folderOf(one.from)));
    expect(strays.map(told)).toEqual([]);
  });

  test('the pure folders hold no component', () => {
    expect(sources.filter((path) => PURE.includes(folderOf(path)) && path.endsWith('.tsx'))).toEqual([]);
  });
});

describe('files', () => {
  test('a file is named for its topic', () => {
    const nameless = /^(utils?|helpers?|common|misc|shared|types|index)\./;
    expect(everyFile.filter((path) => isCode(path) && nameless.test(basename(path)))).toEqual([]);
  });

  test('no file only passes on what others export', () => {
    expect(linesWith(/^export\s+(\*|(type\s+)?\{[^}]*\})\s+from\b/, sources)).toEqual([]);
  });

  test('every test file belongs to a project that runs it', () => {
    const tests = everyFile.filter((path) => /\.(test|spec)\./.test(path));
    const run = new RegExp(
      String.raw`^test/(house\.test\.ts|(${[...PURE, 'browser'].join('|')})/.*\.test\.ts|(platform|workers|store|plots|page)/.*\.test\.tsx?)$`,
    );
    expect(tests.filter((path) => !run.test(path))).toEqual([]);
  });

  test('the lock file holds no download address', () => {
    expect(linesWith(/"resolved"/, ['package-lock.json'])).toEqual([]);
  });

  test('the page has no inline script and no inline style', () => {
    expect(linesWith(/\sstyle=|<style|\son[a-z]+=|<script(?![^>]*\ssrc=)/, ['index.html'])).toEqual([]);
  });
});

describe('problems', () => {
  const inQuotes = (code: string) => new RegExp(`['"]${code}['"]`);

  test('every problem has its sentence', () => {
    const sentences = text('src/problems/sentences.ts');
    expect(PROBLEM_CODES.filter((code) => !inQuotes(code).test(sentences))).toEqual([]);
  });

  test('every problem is found by some step', () => {
    const steps = sources.filter((path) => !['problems', 'plots', 'page'].includes(folderOf(path))).map(text).join('\n');
    expect(PROBLEM_CODES.filter((code) => !inQuotes(code).test(steps))).toEqual([]);
  });
});

describe('words', () => {
  const code = everyFile.filter((path) => isCode(path) || path === 'index.html' || path === '.ci/run');
  const written = everyFile.filter((path) => path !== 'package-lock.json' && /\.(ts|tsx|mjs|json|md|css|html|svg|csv|txt)$|^\.ci\//.test(path));

  // The brackets keep this list from finding itself.
  test('nothing is left to be done later', () => {
    expect(linesWith(/\b(TOD[O]|FIXM[E]|XX[X]|HAC[K])\b/, code)).toEqual([]);
  });

  test('no check is turned off', () => {
    expect(linesWith(/\bas an[y]\b(?! [a-z])|ts-(ignor[e]|expect-erro[r]|nochec[k])|(es|ox)lint-disabl[e]/, code)).toEqual([]);
    expect(linesWith(/\b(test|it|describe)\.(ski[p]|onl[y]|tod[o]|fail[s])\b|toBeDefine[d]\(\)/, code)).toEqual([]);
  });

  test('no path of one machine is written down', () => {
    expect(linesWith(/\/(hom[e]|roo[t]|User[s]|wor[k]|tm[p])\//, written)).toEqual([]);
  });
});
