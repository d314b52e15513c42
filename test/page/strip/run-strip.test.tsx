import { screen, within } from '@testing-library/react';
import { expect, test } from 'vitest';
import { RunStrip } from '../../../src/page/strip/RunStrip.tsx';
import { REDUCTION } from '../reductionFixture.ts';
import { withReduction } from '../withReduction.tsx';

const strip = () => screen.getByRole('slider', { name: 'The run in order: selected record' });

test('the strip is a figure with a name and a summary', async () => {
  await withReduction(<RunStrip />);
  expect(screen.getByRole('figure', { name: 'The run in order' })).toHaveAccessibleDescription(/6 shots, 3 taps, 1 blank, 1 zero/);
});

test('no records, no strip', async () => {
  await withReduction(<RunStrip />, { reduction: { ...REDUCTION, records: [] } });
  expect(screen.queryByRole('figure')).toBe(null);
});

test('arrow keys walk through the records in the order of the run, Home and End to its ends', async () => {
  const { store, user } = await withReduction(<RunStrip />);
  await user.click(strip());
  strip().focus();
  await user.keyboard('{Home}');
  expect(store.state.getState().selected).toBe('s1/2');
  await user.keyboard('{ArrowRight}{ArrowRight}{ArrowRight}');
  expect(store.state.getState().selected).toBe('s1/5');
  expect(strip()).toHaveAttribute('aria-valuetext', 'Shot 1, 1.250 ± 0.026 mN·s (U)');
  expect(strip()).toHaveAttribute('aria-valuenow', '4');
  await user.keyboard('{ArrowLeft}');
  expect(store.state.getState().selected).toBe('s1/4');
  await user.keyboard('{End}');
  expect(store.state.getState().selected).toBe('s1/12');
  await user.keyboard('{ArrowRight}');
  expect(store.state.getState().selected).toBe('s1/12');
});

test('Enter leads to the record that is open', async () => {
  const { user } = await withReduction(<><RunStrip /><section id="record"><h2>Record</h2></section></>, { selected: 's1/5' });
  strip().focus();
  await user.keyboard('{Enter}');
  expect(screen.getByRole('heading', { name: 'Record' })).toHaveFocus();
});

test('the strip’s numbers open as a table with a row for each record', async () => {
  const { user } = await withReduction(<RunStrip />);
  expect(screen.queryByRole('table')).toBe(null);
  await user.click(screen.getByText('As a table'));
  const table = screen.getByRole('table', { name: 'The run in order' });
  expect(within(table).getAllByRole('row')).toHaveLength(REDUCTION.records.length + 1);
  expect(within(table).getByRole('row', { name: /^1 Shot 1\.250 ± 0\.026/ })).toHaveTextContent('0.0079');
});
