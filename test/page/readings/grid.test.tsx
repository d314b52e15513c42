import { fireEvent, screen, within } from '@testing-library/react';
import { expect, test } from 'vitest';
import { RUN, csv, openReadings } from './page.tsx';

async function opened() {
  const page = await openReadings();
  await page.drop(csv(RUN));
  return page;
}

const edits = (page: Awaited<ReturnType<typeof opened>>) => page.session().sheets[0]?.edits;

test('typing replaces a cell, Enter keeps it and goes down, and what came stays in the file', async () => {
  const page = await opened();
  await page.user.click(page.cell('3', 'Rest'));
  await page.user.keyboard('12.44{Enter}');
  await page.settled();
  expect(edits(page)).toEqual({ 3: { 2: '12.44' } });
  expect(page.session().sheets[0]?.text).toBe(RUN);
  expect(page.cell('3', 'Rest')).toHaveAttribute('title', 'typed over; came as “12.40”');
  expect(page.cell('4', 'Rest')).toHaveFocus();
});

test('Escape leaves a cell as it was', async () => {
  const page = await opened();
  await page.user.click(page.cell('3', 'Rest'));
  await page.user.keyboard('99{Escape}');
  expect(edits(page)).toEqual({});
  expect(page.cell('3', 'Rest')).toHaveFocus();
});

test('F2 edits what is there, and Tab goes on to the next cell', async () => {
  const page = await opened();
  await page.user.click(page.cell('3', 'Rest'));
  await page.user.keyboard('{F2}5{Tab}');
  expect(edits(page)).toEqual({ 3: { 2: '12.405' } });
  expect(page.cell('3', 'First swing')).toHaveFocus();
});

test('a cell that was typed over is taken back to what came', async () => {
  const page = await opened();
  await page.user.click(page.cell('3', 'Rest'));
  await page.user.keyboard('13{Tab}{ArrowLeft}');
  await page.user.click(screen.getByRole('button', { name: 'restore what came' }));
  expect(edits(page)).toEqual({});
});

test('a cell left by the mouse keeps what was typed', async () => {
  const page = await opened();
  await page.user.click(page.cell('3', 'Rest'));
  await page.user.keyboard('12.5');
  await page.user.click(page.cell('5', 'Note'));
  expect(edits(page)).toEqual({ 3: { 2: '12.5' } });
});

test('Delete empties every cell of a stretched block in one step', async () => {
  const page = await opened();
  await page.user.click(page.cell('3', 'Rest'));
  await page.user.keyboard('{Shift>}{ArrowDown}{ArrowRight}{/Shift}{Delete}');
  expect(edits(page)).toEqual({ 3: { 2: '', 3: '' }, 4: { 2: '', 3: '' } });
  expect(page.store.state.getState().past).toHaveLength(2);
});

test('a block of cells is pasted across, with rows added below, and the page hears nothing of it', async () => {
  const page = await opened();
  let heard = 0;
  const listener = () => { heard += 1; };
  document.addEventListener('paste', listener);
  await page.user.click(page.cell('6', 'Rest'));
  fireEvent.paste(page.cell('6', 'Rest'), { clipboardData: { getData: () => '12.43\t12.50\n12.44\t33.00\textra\tbeyond\n' } });
  document.removeEventListener('paste', listener);
  await page.settled();
  expect(heard).toBe(0);
  expect(edits(page)).toEqual({ 6: { 2: '12.43', 3: '12.50' } });
  expect(page.session().sheets[0]?.added).toEqual([{ id: '+1', cells: ['', '', '12.44', '33.00', 'extra'] }]);
  expect(screen.getByRole('status')).toHaveTextContent('1 row added below to hold the pasted cells. 1 pasted column beyond the last of run.csv left out.');
});

test('the block under the cursor is copied with tabs', async () => {
  const page = await opened();
  await page.user.click(page.cell('3', 'Rest'));
  await page.user.keyboard('{Shift>}{ArrowDown}{ArrowRight}{/Shift}');
  const put: Record<string, string> = {};
  fireEvent.copy(page.cell('4', 'First swing'), { clipboardData: { setData: (kind: string, text: string) => { put[kind] = text; } } });
  expect(put['text/plain']).toBe('12.40\t32.10\n12.41\t32.62');
});

test('a cell that is no number is marked, and its row says what to do', async () => {
  const page = await opened();
  const cell = page.cell('5', 'First swing');
  expect(cell).toHaveAttribute('aria-invalid', 'true');
  const told = document.getElementById(cell.getAttribute('aria-describedby') ?? '');
  expect(told).toHaveTextContent(/“off”/);
  expect(told?.closest('tr')?.previousElementSibling).toBe(cell.closest('tr'));
});

test('the row under the cursor is the record that is open', async () => {
  const page = await opened();
  await page.user.click(page.cell('4', 'Rest'));
  expect(page.store.state.getState().selected).toBe('s1/4');
  expect(page.cell('4', 'Rest').closest('[role=row]')).toHaveAttribute('aria-selected', 'true');
});

test('a record is set aside with a reason, stays in the sheet, and counts again', async () => {
  const page = await opened();
  await page.user.click(screen.getByRole('button', { name: 'Set aside line 4' }));
  const dialog = screen.getByRole('dialog', { name: 'Set aside shot 2, line 4' });
  expect(within(dialog).getByRole('button', { name: 'Set aside' })).toBeDisabled();
  await page.user.click(within(dialog).getByLabelText('double discharge'));
  await page.user.click(within(dialog).getByRole('button', { name: 'Set aside' }));
  await page.settled();
  expect(page.session().marks['s1/4']?.setAside).toEqual({ reason: 'double discharge' });
  expect(page.cell('4', 'Rest')).toHaveTextContent('12.41');
  expect(screen.getByRole('rowheader', { name: 'line 4, shot, set aside' })).toBeVisible();
  await page.user.click(screen.getByRole('button', { name: 'Count it again: line 4' }));
  expect(page.session().marks).toEqual({});
});

test('the question for a reason can be left without one', async () => {
  const page = await opened();
  await page.user.click(screen.getByRole('button', { name: 'Set aside line 4' }));
  await page.user.click(screen.getByRole('button', { name: 'Cancel' }));
  expect(screen.queryByRole('dialog')).toBeNull();
  expect(page.session().marks).toEqual({});
});

test('the kind of a record shows how it is known and can be told by hand', async () => {
  const page = await opened();
  const kind = screen.getByLabelText('Kind of line 3');
  expect(kind).toHaveDisplayValue('shot · column');
  await page.user.selectOptions(kind, 'blank · by hand');
  await page.settled();
  expect(page.session().marks['s1/3']).toEqual({ kind: 'blank' });
  await page.user.selectOptions(screen.getByLabelText('Kind of line 3'), 'as the sheet tells');
  expect(page.session().marks).toEqual({});
});

test('a cell may be typed with its own unit', async () => {
  const page = await opened();
  await page.user.click(page.cell('5', 'First swing'));
  await page.user.keyboard('3.21 cm{Enter}');
  await page.settled();
  const record = page.store.state.getState().reduction?.records.find(({ id }) => id === 's1/5');
  expect(record?.readings.firstSwing).toBeCloseTo(0.0321, 9);
});

test('Enter on the last row typed by hand begins another, which can be removed', async () => {
  const page = await openReadings();
  await page.user.click(screen.getByRole('button', { name: 'Type readings by hand' }));
  await page.settled();
  await page.user.click(page.cell('+1', 'rest reading'));
  await page.user.keyboard('12.4{Tab}31.6{Enter}');
  await page.settled();
  expect(page.session().sheets[0]?.added.map(({ id, cells }) => [id, cells.slice(2, 4)])).toEqual([['+1', ['12.4', '31.6']], ['+2', []]]);
  expect(page.cell('+2', 'rest reading')).toHaveFocus();
  await page.user.click(screen.getByRole('button', { name: 'Remove row +2' }));
  expect(page.session().sheets[0]?.added).toHaveLength(1);
});

test('sheets follow one another in the run, and change places', async () => {
  const page = await openReadings();
  await page.drop(csv(RUN, 'shots.csv'), csv('Rest (mm),First swing (mm)\n9.1,10.4\n9.1,10.5\n', 'taps.csv'));
  expect(screen.getByRole('button', { name: 'Move shots.csv earlier in the run' })).toBeDisabled();
  await page.user.click(screen.getByRole('button', { name: 'Move taps.csv earlier in the run' }));
  await page.user.selectOptions(within(screen.getByRole('article', { name: 'taps.csv' })).getByLabelText('records'), 'all taps');
  expect(page.session().sheets.map(({ name, kindOfAll }) => [name, kindOfAll])).toEqual([['taps.csv', 'tap'], ['shots.csv', null]]);
  await page.user.click(screen.getByRole('button', { name: 'Remove sheet taps.csv' }));
  expect(page.session().sheets.map(({ name }) => name)).toEqual(['shots.csv']);
});

test('a text cut at another mark has its columns proposed anew', async () => {
  const page = await opened();
  await page.user.selectOptions(screen.getByLabelText('cells end at'), 'semicolon');
  expect(page.session().sheets[0]?.delimiter).toBe(';');
  expect(page.session().sheets[0]?.columns).toHaveLength(1);
  await page.user.selectOptions(screen.getByLabelText('cells end at'), 'as found');
  expect(page.session().sheets[0]?.columns).toHaveLength(5);
});

test('of a long sheet only the rows in sight are there, each with its place among all', async () => {
  const page = await openReadings();
  const rows = Array.from({ length: 2000 }, (_, i) => `${i + 1},12.40,${(31 + (i % 7) / 10).toFixed(2)}`).join('\n');
  await page.drop(csv(`Shot,Rest (mm),First swing (mm)\n${rows}\n`));
  const grid = screen.getByRole('grid');
  expect(grid).toHaveAttribute('aria-rowcount', '2001');
  expect(within(grid).getAllByRole('row').length).toBeLessThan(60);
  await page.user.click(page.cell('2', 'Rest'));
  await page.user.keyboard('{Control>}{End}{/Control}');
  const last = within(grid).getByRole('rowheader', { name: /^line 2001,/ });
  expect(last.closest('[role=row]')).toHaveAttribute('aria-rowindex', '2001');
});
