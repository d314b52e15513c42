import { act, renderHook, screen, within } from '@testing-library/react';
import type { ReactNode } from 'react';
import { expect, test } from 'vitest';
import { useReadingsIntake } from '../../../src/page/readings/intake.ts';
import { StoreProvider } from '../../../src/store/hooks.tsx';
import { RUN, csv, openReadings } from './page.tsx';

test('a chosen file becomes a sheet in one step, and its column meanings are shown to be checked', async () => {
  const page = await openReadings();
  await page.drop(csv(RUN));
  const [sheet] = page.session().sheets;
  expect(sheet?.name).toBe('run.csv');
  expect(sheet?.text).toBe(RUN);
  expect(sheet?.columns.map(({ role, by }) => `${role} ${by}`)).toEqual(
    ['label proposal', 'kind proposal', 'rest proposal', 'firstSwing proposal', 'note proposal'],
  );
  expect(page.store.state.getState().past).toHaveLength(1);
  expect(screen.getByText('Column meanings proposed: check them')).toBeVisible();
  expect(screen.getByText(/Rest reading, by “rest” in its header; mm, as the header says/)).toBeVisible();
  expect(screen.getByRole('status')).toHaveTextContent('run.csv: 5 rows taken in.');
  await act(async () => page.store.actions.undo());
  expect(page.session().sheets).toEqual([]);
});

test('a column has another meaning and another unit when the person says so', async () => {
  const page = await openReadings();
  await page.drop(csv(RUN));
  await page.user.selectOptions(screen.getByLabelText('Unit of Rest (mm)'), 'cm');
  await page.user.selectOptions(screen.getByLabelText('Meaning of Note'), 'charge voltage');
  expect(page.session().sheets[0]?.columns[2]).toEqual({ role: 'rest', unit: 'cm', by: 'person' });
  expect(page.session().sheets[0]?.columns[4]).toEqual({ role: 'voltage', unit: 'V', by: 'person' });
});

test('columns that are right are no proposal any more', async () => {
  const page = await openReadings();
  await page.drop(csv(RUN));
  await page.user.click(screen.getByRole('button', { name: 'The columns are right' }));
  expect(page.session().sheets[0]?.columns.every(({ by }) => by === 'person')).toBe(true);
  expect(screen.queryByText('Column meanings proposed: check them')).toBeNull();
});

test('the same file after more shots keeps what was set aside, and says so', async () => {
  const page = await openReadings();
  await page.drop(csv(RUN));
  await page.user.selectOptions(screen.getByLabelText('Unit of Rest (mm)'), 'cm');
  await page.user.click(screen.getByRole('button', { name: 'Set aside line 5' }));
  await page.user.click(screen.getByLabelText('misfire: no discharge'));
  await page.user.click(screen.getByRole('button', { name: 'Set aside' }));
  await page.drop(csv(RUN.replace('T1,tap', 'T0,tap,12.39,31.60,\nT1,tap') + '4,shot,12.42,32.40,\n'));
  expect(page.session().sheets).toHaveLength(1);
  expect(page.session().marks).toEqual({ 's1/6': { setAside: { reason: 'misfire: no discharge' } } });
  expect(page.session().sheets[0]?.columns[2]).toEqual({ role: 'rest', unit: 'cm', by: 'person' });
  expect(screen.getByRole('status')).toHaveTextContent('run.csv again: 2 rows more; 1 set aside kept. Column meanings are kept.');
});

test('a set-aside row that is gone from the newer file is named with its reason', async () => {
  const page = await openReadings();
  await page.drop(csv(RUN));
  await page.user.click(screen.getByRole('button', { name: 'Set aside line 5' }));
  await page.user.type(screen.getByLabelText('Other reason, typed'), 'laser off');
  await page.user.click(screen.getByRole('button', { name: 'Set aside' }));
  await page.drop(csv(RUN.replace('3,shot,12.41,off,no light\n', '')));
  expect(screen.getByRole('status')).toHaveTextContent('1 set-aside row no longer in the file: line 5 before (laser off)');
});

test('a newer file can be added as another sheet instead, and the first is as it was', async () => {
  const page = await openReadings();
  await page.drop(csv(RUN));
  const newer = `${RUN}4,shot,12.42,32.40,\n`;
  await page.drop(csv(newer));
  await page.user.click(screen.getByRole('button', { name: 'add it as another sheet instead' }));
  expect(page.session().sheets.map(({ name, text }) => [name, text])).toEqual([['run.csv', RUN], ['run.csv (2)', newer]]);
});

test('another file of the same name is a sheet of its own', async () => {
  const page = await openReadings();
  await page.drop(csv(RUN));
  await page.drop(csv('Rest (mm),First swing (mm)\n9.1,10.4\n9.1,10.5\n'));
  expect(page.session().sheets.map(({ name }) => name)).toEqual(['run.csv', 'run.csv (2)']);
});

test('the same file unchanged changes nothing', async () => {
  const page = await openReadings();
  await page.drop(csv(RUN));
  const before = page.session();
  await page.drop(csv(RUN));
  expect(page.session()).toBe(before);
  expect(screen.getByRole('status')).toHaveTextContent('run.csv is here already, word for word; nothing has changed.');
});

test('a file that is no table is refused with a sentence, and the rest stays', async () => {
  const page = await openReadings();
  await page.drop(csv(RUN));
  const before = page.session();
  await page.drop(new File([new Uint8Array([0x50, 0x4b, 3, 4, 0, 0, 1])], 'workbook.csv'), csv('', 'nothing.csv'));
  expect(page.session()).toBe(before);
  expect(screen.getByRole('alert')).toHaveTextContent(/workbook\.csv: .*zip archive/);
  expect(screen.getByRole('alert')).toHaveTextContent(/nothing\.csv: /);
});

test('cells pasted from a spreadsheet become a sheet', async () => {
  const page = await openReadings();
  await page.user.click(screen.getByRole('button', { name: 'Paste readings…' }));
  await page.user.click(screen.getByLabelText('Cells from a spreadsheet, or lines of a file'));
  await page.user.paste('Rest (mm)\tFirst swing (mm)\n12,40\t32,10\n12,41\t32,62\n');
  await page.user.click(screen.getByRole('button', { name: 'Take these readings' }));
  await page.told(1);
  expect(page.session().sheets[0]).toMatchObject({ name: 'pasted readings', origin: 'paste' });
  expect(page.cell('2', 'Rest')).toHaveTextContent('12,40');
  expect(screen.getByRole('combobox', { name: 'decimal' })).toHaveDisplayValue('comma, as found');
});

test('a file dropped anywhere on the page is told in the readings', async () => {
  const page = await openReadings();
  const wrapper = ({ children }: { children: ReactNode }) => <StoreProvider store={page.store}>{children}</StoreProvider>;
  const elsewhere = renderHook(() => useReadingsIntake(), { wrapper });
  await act(() => elsewhere.result.current.takeFiles([csv(RUN, 'dropped.csv')]));
  await page.told(1);
  expect(within(screen.getByRole('status')).getByText(/dropped\.csv: 5 rows taken in/)).toBeVisible();
});

test('rows are typed by hand into a sheet of their own', async () => {
  const page = await openReadings();
  await page.user.click(screen.getByRole('button', { name: 'Type readings by hand' }));
  expect(page.session().sheets[0]?.origin).toBe('typed');
  expect(screen.getByRole('button', { name: 'Type readings by hand' })).toBeDisabled();
});
