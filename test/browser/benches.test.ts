/** A bench described once is kept on the device, and used again for another session after the page was closed. */
import { expect, test } from './served-page.ts';

test('a bench kept under a name outlives the page, with its instruments, and begins a new session', async ({ page }) => {
  const arm = page.getByRole('textbox', { name: 'Lever arm of the thrust' }).first();
  await arm.fill('290(1) mm');
  await page.getByText('Instruments', { exact: true }).click();
  await page.getByRole('button', { name: 'Add an instrument' }).click();
  await page.getByRole('textbox', { name: 'Name of instrument 1' }).fill('steel ruler');
  await page.getByRole('combobox', { name: 'Lever arm of the thrust: measured with' }).selectOption('steel ruler');
  await page.getByText('Keep this bench, or use one again').click();
  await page.getByRole('textbox', { name: 'Name to keep this bench under' }).fill('long strip');
  await page.getByRole('button', { name: 'Keep this bench' }).click();
  await page.getByText('“long strip” is kept on this device.').waitFor();
  await page.getByRole('button', { name: 'new', exact: true }).click();
  await expect.poll(async () => arm.inputValue()).toBe('');
  await page.getByText(/kept \d\d:\d\d/).waitFor();
  await page.waitForTimeout(1500);

  await page.reload();
  await page.getByText('Keep this bench, or use one again').click();
  await page.getByRole('button', { name: 'New session with long strip' }).click();
  await expect.poll(async () => arm.inputValue()).toBe('290(1) mm');
  await expect.poll(async () => page.getByRole('textbox', { name: 'Name of instrument 1' }).inputValue()).toBe('steel ruler');
  await page.getByRole('button', { name: /^undo/ }).click();
  await expect.poll(async () => arm.inputValue()).toBe('');
});
