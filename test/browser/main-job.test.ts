/** The whole job by hand, in the built page: readings in, bench described, a shot set aside, the table out. */
import { readFile } from 'node:fs/promises';
import type { Page } from 'playwright-core';
import { sessionFromText } from '../../src/session/file.ts';
import { perShotCsv } from '../../src/exports/perShotTable.ts';
import { reduce } from '../../src/reduction/reduce.ts';
import { expect, test } from './served-page.ts';

/** Invented readings, as somebody at a German-speaking bench would have written them. */
const RUN = [
  'Pendel Versuch 7, Lineal 0,5 mm',
  '',
  'Nr.;Art;Ladespannung (V);Ruhe (mm);Ausschlag (mm);Rückschwung (mm);Hammer (mN·s);Bemerkung',
  'T1;Schlag;;41,0;52,5;30,0;0,50;',
  'T2;Schlag;;41,0;64,0;19,0;1,00;',
  'T3;Schlag;;41,0;58,0;24,5;0,75;',
  '1;Schuss;1200;41,0;57,0;25,5;;',
  '2;Schuss;1201;41,0;56,5;26,0;;',
  '3;Schuss;1199;41,0;41,5;;;kein Blitz',
  '4;Schuss;1200;41,5;58,0;26,0;;"laut; hell"',
  '5;Schuss;1198;41,0;56,5;26,0;;',
  '6;Schuss;1200;41,0;57,5;25,5;;',
  '',
].join('\r\n');

async function dropFile(page: Page, name: string, text: string): Promise<void> {
  const transfer = await page.evaluateHandle(([fileName, content]) => {
    const data = new DataTransfer();
    data.items.add(new File([content], fileName, { type: 'text/csv' }));
    return data;
  }, [name, text] as const);
  await page.dispatchEvent('body', 'dragover', { dataTransfer: transfer });
  await page.dispatchEvent('body', 'drop', { dataTransfer: transfer });
}

async function savedBy(page: Page, click: () => Promise<void>): Promise<string> {
  const [download] = await Promise.all([page.waitForEvent('download'), click()]);
  return readFile(await download.path(), 'utf8');
}

test('a dropped run becomes the table that its reduction says, byte for byte', async ({ page }) => {
  await dropFile(page, 'versuch7.csv', RUN);
  await page.getByText('versuch7.csv').first().waitFor();

  for (const [label, text] of [
    ['Strip mass', '12,00 ± 0,02 g'], ['Strip length', '310.0 ± 0.5 mm'], ['Lever arm of the thrust', '290(1) mm'],
    ['Pivot to reading point', '310.0 ± 0.5 mm'], ['Local g', '9.8118 m/s²'], ['Lever arm of the tap', '280 ± 1 mm'], ['Hammer calibration', '1 ± 2 %'],
  ] as const) await page.getByRole('textbox', { name: label }).first().fill(text);
  // check() also asserts that the choice shows at once, before the results that follow it.
  await page.getByRole('radio', { name: /by taps/ }).check();

  const mean = page.locator('text=/n = 6 of 6/').first();
  await mean.waitFor();

  // Shot 3 did not discharge: line 9 of the file.
  await page.getByRole('row', { name: /kein Blitz/ }).first().getByRole('button', { name: /set aside/i }).click();
  await page.getByRole('radio', { name: 'misfire: no discharge' }).check();
  await page.getByRole('dialog').getByRole('button', { name: 'Set aside' }).click();
  await page.locator('text=/n = 5 of 6/').first().waitFor();

  const table = await savedBy(page, async () => page.getByRole('button', { name: 'Save table (CSV)' }).click());
  const saved = await savedBy(page, async () => page.getByRole('button', { name: 'save session' }).click());
  const { session } = sessionFromText(saved);
  expect(session).not.toBeNull();
  const reduction = reduce(session!, null);
  expect(table).toBe(perShotCsv(session!, reduction));
  expect(reduction.run!.n).toBe(5);
  expect(reduction.records.find((r) => r.label === '3')!.setAside).toBe('misfire: no discharge');
  expect(session!.sheets[0]!.text).toBe(RUN);
});

test('what was typed survives a reload, and undo takes it back', async ({ page }) => {
  await page.getByRole('textbox', { name: 'Strip mass' }).first().fill('12,5 g');
  await page.getByText(/kept \d\d:\d\d/).waitFor();
  await page.waitForTimeout(1500);
  await page.reload();
  const field = page.getByRole('textbox', { name: 'Strip mass' }).first();
  await expect.poll(async () => field.inputValue()).toBe('12,5 g');
  await field.fill('13 g');
  await page.getByRole('button', { name: /^undo/ }).click();
  await expect.poll(async () => field.inputValue()).toBe('12,5 g');
});

test('the demo opens in one click, shows its mean, and opens a record by the keyboard', async ({ page }) => {
  await page.getByRole('button', { name: /demo/i }).first().click();
  await page.getByText('Demo: invented, not a measurement').waitFor();
  await page.locator('text=/n = 22 of 24/').first().waitFor();
  const strip = page.getByRole('application').or(page.locator('[tabindex="0"][aria-label*="run" i]')).first();
  await strip.focus();
  await page.keyboard.press('Home');
  await page.keyboard.press('ArrowRight');
  await page.locator('#record').getByText(/T2|Tap T2/).first().waitFor();
});
