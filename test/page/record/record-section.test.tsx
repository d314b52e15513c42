import { screen, within } from '@testing-library/react';
import { expect, test } from 'vitest';
import { RecordSection } from '../../../src/page/record/RecordSection.tsx';
import { withReduction } from '../withReduction.tsx';

test('without a chosen record the section offers the first shot', async () => {
  const { store, user } = await withReduction(<RecordSection />);
  await user.click(screen.getByRole('button', { name: 'Open Shot 1' }));
  expect(store.state.getState().selected).toBe('s1/5');
  expect(screen.getByRole('heading', { name: 'Shot 1 record 4 of 11' })).toBeVisible();
});

test('the chain shows each step with its value, u and factor, the steps beside it last', async () => {
  await withReduction(<RecordSection />, { selected: 's1/5' });
  const rows = within(screen.getByRole('group', { name: 'From reading to impulse bit' })).getAllByRole('row').slice(1);
  expect(rows.map((row) => row.textContent.replaceAll(/\s/g, ' '))).toEqual([
    'Rest x0as read12.40 ± 0.15 mm',
    'First-swing angle θpθp = asin(x/R)34.46 ± 0.12 mrad',
    'Damping-corrected φφ = D θp35.00 ± 0.12 mrad× 1.01573',
    'Impulse bit IbitI = K φ / rt1.250 ± 0.013 mN·s',
    'beside: By the small-angle form IbitI = J ωn θp D / rt1.250 ± 0.013 mN·s',
  ]);
});

test('both forms and both calibrations stand side by side with their distance in u', async () => {
  await withReduction(<RecordSection />, { selected: 's1/5' });
  const table = screen.getByRole('group', { name: 'The other ways beside it' });
  expect(within(table).getByRole('row', { name: /^full pendulum/ })).toHaveTextContent('full pendulum (chosen)1.250 ± 0.026 mN·s');
  expect(within(table).getByRole('row', { name: /^small-angle form/ })).toHaveTextContent('0.02');
  // 0.8 % of 1.25 mN·s against u = 13.1 µN·s.
  expect(within(table).getByRole('row', { name: /^taps/ })).toHaveTextContent(/0\.8\s%0\.8$/);
});

test('the record’s budget is short first and has the GUM’s columns when asked', async () => {
  const { user } = await withReduction(<RecordSection />, { selected: 's1/5' });
  const budget = screen.getByRole('group', { name: 'Budget of the shot 1' });
  expect(within(budget).queryByRole('columnheader', { name: 'Distribution' })).toBe(null);
  await user.click(screen.getByRole('button', { name: 'All columns of this budget' }));
  expect(within(budget).getByRole('columnheader', { name: 'Distribution' })).toBeVisible();
});

test('record before and record after walk through the run and stop at its ends', async () => {
  const { store, user } = await withReduction(<RecordSection />, { selected: 's1/3' });
  await user.click(screen.getByRole('button', { name: 'Record before' }));
  expect(store.state.getState().selected).toBe('s1/2');
  expect(screen.getByRole('button', { name: 'Record before' })).toBeDisabled();
  await user.click(screen.getByRole('button', { name: 'Record after' }));
  expect(store.state.getState().selected).toBe('s1/3');
});

test('a record set aside says why, and counts again on request', async () => {
  const { store, user } = await withReduction(<RecordSection />, { selected: 's1/7' });
  expect(screen.getByText(/Set aside: misfire\. It does not count\./)).toBeVisible();
  store.actions.change('set aside', (session) => ({ ...session, marks: { 's1/7': { setAside: { reason: 'misfire' } } } }));
  await user.click(screen.getByRole('button', { name: 'Count again' }));
  expect(store.state.getState().session.marks['s1/7']?.setAside).toBe(undefined);
});

test('a record is set aside from here with a reason', async () => {
  const { store, user } = await withReduction(<RecordSection />, { selected: 's1/5' });
  await user.click(screen.getByRole('button', { name: 'Set aside…' }));
  await user.click(screen.getByRole('radio', { name: 'double discharge' }));
  await user.click(screen.getByRole('button', { name: 'Set aside' }));
  expect(store.state.getState().session.marks['s1/5']?.setAside).toEqual({ reason: 'double discharge' });
});

test('a record without an impulse bit says what is in the way', async () => {
  await withReduction(<RecordSection />, { selected: 's1/10' });
  expect(screen.getByRole('heading', { name: /^Shot 5/ })).toBeVisible();
  expect(screen.getAllByRole('listitem')[0]).toHaveTextContent(/rest/i);
});

test('the swing is drawn with its angle in words', async () => {
  await withReduction(<RecordSection />, { selected: 's1/5' });
  expect(screen.getByRole('img', { name: /first swing, 1\.97° apart/ })).toBeVisible();
});
