/** Reads the colours of figures from the page's custom properties, and tells when they change. */
import type { Inks } from './figure.ts';

const PROPERTIES: Readonly<Record<keyof Inks, string>> = {
  paper: '--film',
  ink: '--ink',
  quiet: '--rule-strong',
  rule: '--rule',
  shot: '--shot',
  tap: '--tap',
  blank: '--blank',
  look: '--look',
  band: '--shot-soft',
  font: '--sans',
};

/** The colours as they stand now, in the light or the dark. */
export function readInks(from: Element = document.documentElement): Inks {
  const style = getComputedStyle(from);
  const read = (name: keyof Inks): string => style.getPropertyValue(PROPERTIES[name]).trim();
  return {
    paper: read('paper'), ink: read('ink'), quiet: read('quiet'), rule: read('rule'), shot: read('shot'), tap: read('tap'),
    blank: read('blank'), look: read('look'), band: read('band'), font: read('font') || 'sans-serif',
  };
}

const CHANGING = ['(prefers-color-scheme: dark)', 'print'] as const;

/** Calls when the colours may have changed: light to dark, screen to paper. @returns a function that stops it. */
export function watchInks(changed: () => void): () => void {
  const queries = CHANGING.map((query) => matchMedia(query));
  for (const query of queries) query.addEventListener('change', changed);
  return () => {
    for (const query of queries) query.removeEventListener('change', changed);
  };
}
