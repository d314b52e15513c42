import { screen, within } from '@testing-library/react';
import { expect, test } from 'vitest';
import { BudgetSection } from '../../../src/page/budget/BudgetSection.tsx';
import { totalShare } from '../../../src/page/budget/BudgetTable.tsx';
import { REDUCTION } from '../reductionFixture.ts';
import { withReduction } from '../withReduction.tsx';

test('each line has the GUM’s columns', async () => {
  await withReduction(<BudgetSection />);
  const table = screen.getByRole('group', { name: 'Budget of the run mean' });
  const cells = (name: RegExp) => within(within(table).getByRole('row', { name })).getAllByRole('cell').map((cell) => cell.textContent.replaceAll(/\s/g, ' '));
  expect(cells(/^Lever arm of the thrust/)).toEqual(['280 mm', '1 mm', 'rectangular', '∞', '−0.0045 mN·s/mm', '−8.0', '25.6 %', '', 'common']);
  expect(cells(/^Scatter of the shots/)).toEqual(['–', '–', 't', '3', '–', '6.5', '16.8 %', '', 'scatter']);
});

test('shares total 100.0 % exactly, and the last row tells U from u', async () => {
  await withReduction(<BudgetSection />);
  const total = screen.getByRole('row', { name: /^Run mean/ });
  expect(total).toHaveTextContent('100.0 %');
  expect(screen.getByRole('row', { name: /^Expanded, 95 %/ })).toHaveTextContent('U = 31 µN·s (k = 1.97)');
  expect(screen.getByText(/All uncertainties in this table are standard uncertainties u/)).toBeVisible();
});

test('shares of tenths of a percent are added as tenths', () => {
  const { run } = REDUCTION;
  const [line] = run?.budget.lines ?? [];
  if (line === undefined) throw new Error('The fixture has a budget');
  expect(totalShare([0.1, 0.2, 99.7].map((share) => ({ ...line, share })))).toBe('100.0');
});

test('without a run mean there is no budget', async () => {
  await withReduction(<BudgetSection />, { reduction: { ...REDUCTION, run: null } });
  expect(screen.getByText(/No run mean yet/)).toBeVisible();
});
