/** A sampled trace in the built page: dropped, its shots found, looked along by keys, pointer and wheel, moved, kept over a reload, saved and opened again. */
import { readFile } from 'node:fs/promises';
import type { Page } from 'playwright-core';
import { exactly } from '../fixtures/session.ts';
import { draws } from '../metrology/sources.ts';
import { struck } from '../traces/struck.ts';
import { expect, test } from './served-page.ts';

/** 50 g at 0.3 m, read by a sensor on a point there; each shot 0.1 mN·s on an arm of 0.28 m. */
const [M, L, G, ARM] = [0.05, 0.3, 9.80665, 0.28];
const W = Math.sqrt(G / L);
const K = M * L * L * W;
const BIT = 1e-4;
const EVENTS = [4, 12.5, 21, 29.5];

function lauf(): string {
  const { normal } = draws(41);
  const { t, theta } = struck({ frequency: W, ratio: 0.008, share: 1, events: EVENTS, jumps: EVENTS.map(() => (BIT * ARM) / K), seconds: 40, rate: 200, start: [2e-4, 0] });
  return ['Wegsensor am Pendel, erfundener Lauf', 'Abtastrate;200 Hz', '', 'Zeit (s);Weg (µm)', ...t.map((time, i) => `${exactly(time)};${(3e5 * Math.sin(theta[i]!) + 12 + 2 * normal()).toFixed(2)}`.replaceAll('.', ','))].join('\r\n');
}

async function describeBench(page: Page): Promise<void> {
  await page.getByRole('radio', { name: /^point bob/ }).check();
  await page.getByRole('radio', { name: /^displacement sensor on a point/ }).check();
  for (const [label, text] of [['Bob mass', '50 g'], ['Pivot to bob', '300 mm'], ['Pivot to reading point', '300 mm'], ['Lever arm of the thrust', '280 mm'], ['Local g', '9.80665 m/s²']] as const) await page.getByRole('textbox', { name: label }).first().fill(text);
}

/** The mean as the result line says it, µN·s. */
async function meanOf(page: Page, shots: string): Promise<number> {
  await page.locator(`text=/n = ${shots}/`).first().waitFor();
  const line = await page.getByText(/Mean impulse bit/).first().locator('..').innerText();
  const [, digits = '', unit = ''] = /([\d.]+)\s*±\s*[\d.]+\s*([µmn]?N·s)/.exec(line) ?? [];
  return Number(digits) * ({ 'µN·s': 1, 'mN·s': 1e3, 'nN·s': 1e-3 }[unit] ?? Number.NaN);
}

const file = () => ({ name: 'wegsensor.csv', mimeType: 'text/csv', buffer: Buffer.from(lauf(), 'utf8') });

test('a dropped trace gives its shots’ impulse bits, is looked along, outlives the page, and goes with the session’s file', async ({ page }) => {
  await describeBench(page);
  const chooser = page.getByLabel('Open a session file, tables of readings, or traces');
  await chooser.setInputFiles(file());
  const card = page.getByRole('article', { name: 'wegsensor.csv' });
  await card.getByText(/8001 samples/).waitFor();
  await card.getByText('How it is read').click();
  await card.getByRole('combobox', { name: 'Shots and taps are' }).selectOption('found');
  expect(await meanOf(page, '4 of 4')).toBeCloseTo(100, 0);

  const record = card.getByRole('slider', { name: /^The record wegsensor\.csv/ });
  await record.focus();
  await page.keyboard.press('PageDown');
  await page.keyboard.press('PageDown');
  await expect.poll(async () => record.getAttribute('aria-valuetext')).toMatch(/Shot 2, 12\.50/);
  await card.getByRole('figure', { name: 'The swing after shot 2' }).waitFor();
  await page.keyboard.press('+');
  await expect.poll(async () => record.getAttribute('aria-valuetext')).toMatch(/^10\.000\d* s to 30\.000\d* s/);
  await page.keyboard.press('0');

  // Along by the pointer, nearer by the wheel, which the page keeps while the picture has not been taken up.
  const over = record.locator('.u-over');
  const box = (await over.boundingBox())!;
  await over.scrollIntoViewIfNeeded();
  await record.focus();
  const at = (await over.boundingBox())!;
  await page.mouse.move(at.x + box.width / 2, at.y + box.height / 2);
  await page.mouse.wheel(0, -250);
  await expect.poll(async () => record.getAttribute('aria-valuetext')).toMatch(/^10\.0/);
  await page.mouse.down();
  await page.mouse.move(at.x + box.width / 4, at.y + box.height / 2, { steps: 4 });
  await page.mouse.up();
  await expect.poll(async () => record.getAttribute('aria-valuetext')).toMatch(/^15\.0/);
  await page.keyboard.press('0');

  // A shot taken out, and back by undo.
  await page.keyboard.press('PageDown');
  await page.keyboard.press('Delete');
  await page.locator('text=/n = 3 of 3/').first().waitFor();
  await page.getByRole('button', { name: /^undo/ }).click();
  await page.locator('text=/n = 4 of 4/').first().waitFor();

  const [download] = await Promise.all([page.waitForEvent('download'), page.getByRole('button', { name: 'save session' }).click()]);
  const saved = await readFile(await download.path());
  expect(saved.toString('utf8')).toContain('"traceBytes"');

  await page.getByText(/kept \d\d:\d\d/).waitFor();
  await page.waitForTimeout(1500);
  await page.reload();
  expect(await meanOf(page, '4 of 4')).toBeCloseTo(100, 0);
  await page.getByRole('slider', { name: /^The record wegsensor\.csv/ }).waitFor();

  await page.getByRole('button', { name: 'new', exact: true }).click();
  await page.evaluate(async () => {
    for (const { name } of await indexedDB.databases()) if (name !== undefined) indexedDB.deleteDatabase(name);
  });
  await chooser.setInputFiles({ name: 'lauf.json', mimeType: 'application/json', buffer: saved });
  expect(await meanOf(page, '4 of 4')).toBeCloseTo(100, 0);
});
