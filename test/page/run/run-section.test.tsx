import { screen, within } from '@testing-library/react';
import { expect, test } from 'vitest';
import { RunSection } from '../../../src/page/run/RunSection.tsx';
import { REDUCTION } from '../reductionFixture.ts';
import { withReduction } from '../withReduction.tsx';

const row = (name: RegExp) => within(screen.getByRole('group', { name: 'What the run mean is made of' })).getByRole('row', { name });

test('the mean stands with U, and the page says that it is U', async () => {
  await withReduction(<RunSection />);
  expect(screen.getByText(/^Mean impulse bit/, { selector: 'p' })).toHaveTextContent('Mean impulse bit 1.252 ± 0.031 mN·s');
  expect(screen.getByText(/± is U, the expanded uncertainty at 95 %, k = 1\.97; 4 of 6 shots count\./)).toBeVisible();
});

test('scatter, its part of the mean, the common part, u, ν, k, U and the interval are all there, with and without what is set aside', async () => {
  await withReduction(<RunSection />);
  expect(row(/^Scatter of the shots/)).toHaveTextContent('0.0130 mN·s');
  expect(row(/^Scatter’s part/)).toHaveTextContent('0.0065 mN·s');
  expect(row(/^Common part/)).toHaveTextContent('0.0144 mN·s');
  expect(row(/^Standard uncertainty/)).toHaveTextContent('0.0158 mN·s');
  expect(row(/^Effective degrees/)).toHaveTextContent('3104');
  expect(row(/^Coverage factor/)).toHaveTextContent('1.972.78');
  expect(row(/^95 % interval/)).toHaveTextContent(/1\.221 mN·s to 1\.283 mN·s/);
  expect(row(/^Mean/)).toHaveTextContent('1.2520 mN·s1.0040 mN·s');
});

test('the section says why the common part is not divided by √n', async () => {
  await withReduction(<RunSection />);
  expect(screen.getByText(/Only the scatter of the shots is divided by √n\./)).toBeVisible();
});

test('what is set aside is listed with its reason and counts again on request', async () => {
  const { store, user } = await withReduction(<RunSection />);
  store.actions.change('set aside', (session) => ({ ...session, marks: { 's1/7': { setAside: { reason: 'misfire' } } } }));
  const table = screen.getByRole('table', { name: 'Set aside' });
  expect(within(table).getByRole('row', { name: /Shot 3/ })).toHaveTextContent('misfire');
  await user.click(screen.getByRole('button', { name: 'count again: Shot 3' }));
  expect(store.state.getState().session.marks['s1/7']?.setAside).toBe(undefined);
});

test('readings that stand in for a smaller scatter are owned up to', async () => {
  const { run } = REDUCTION;
  if (run === null) throw new Error('The fixture has a run');
  await withReduction(<RunSection />, { reduction: { ...REDUCTION, run: { ...run, readingsInsteadOfScatter: true } } });
  expect(screen.getByText(/the readings’ part stands in for s\/√n/)).toBeVisible();
});

test('blanks are told with u and are not taken off', async () => {
  await withReduction(<RunSection />);
  expect(screen.getByText(/^Blanks/)).toHaveTextContent('Blanks, reduced like shots: mean 0.0036 ± 0.0050 mN·s (± u), 1 blank. They are not taken off the shots.');
});

test('without a run mean the section says so', async () => {
  await withReduction(<RunSection />, { reduction: { ...REDUCTION, run: null, runWithSetAside: null, records: [] } });
  expect(screen.getByText(/No run mean yet/)).toBeVisible();
});
