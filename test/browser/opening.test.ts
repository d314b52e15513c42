import { onTestFinished } from 'vitest';
import { expect, serveBuiltPageBelow, test } from './served-page.ts';

test('the built page opens without a request beyond its own folder', async ({ openPage }) => {
  const below = await serveBuiltPageBelow('a/b');
  onTestFinished(below.stop);
  const page = await openPage(below.address);
  await page.locator('#root > *').first().waitFor();
  await page.waitForLoadState('networkidle');
  expect(new URL(page.url()).pathname).toBe('/a/b/');
  expect(await page.title()).toContain('Firstswing');
});
