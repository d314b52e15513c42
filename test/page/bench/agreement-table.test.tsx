import { render, screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import axe from 'axe-core';
import { expect, test, vi } from 'vitest';
import { AgreementTable } from '../../../src/page/bench/AgreementTable.tsx';
import type { Agreement, Slip } from '../../../src/reduction/evidenceResults.ts';

const stated = (value: number, u: number) => ({ value, u });
const SLIP: Slip = { id: 'lengthUnit', what: 'Strip length', from: '40 mm', to: '40 cm', edit: { is: 'entry', name: 'stripLength', text: '40 cm' } };
const OFF: Agreement = {
  checks: [{ id: 'period', measured: stated(1.1186, 0.001), predicted: stated(0.42, 0.001), relative: stated(1.66, 0.01), inU: 166 }, { id: 'taps', measured: stated(0.0105, 1e-4), predicted: stated(0.0104, 1e-4), relative: stated(0.01, 0.013), inU: 0.8 }],
  off: ['period'], slips: [SLIP],
};

test('measured stands beside predicted, and the slip that reconciles them is taken in one press', async () => {
  const take = vi.fn();
  const { container } = render(<AgreementTable agreement={OFF} onTake={take} />);
  expect(within(screen.getByRole('group', { name: 'Measured and predicted' })).getByRole('row', { name: /Period/ })).toHaveTextContent('166.0');
  expect(screen.getByText(/“Strip length” stands in the wrong unit of length: 40 mm → 40 cm/)).toBeVisible();
  await userEvent.click(screen.getByRole('button', { name: /Take it so: Strip length, 40 cm/ }));
  expect(take).toHaveBeenCalledWith(SLIP);
  expect((await axe.run(container)).violations).toEqual([]);
});

test('several slips that cannot be told apart are each named', () => {
  render(<AgreementTable agreement={{ ...OFF, slips: [SLIP, { ...SLIP, id: 'massUnit', what: 'Strip mass', from: '18 g', to: '18 kg' }] }} onTake={() => undefined} />);
  expect(screen.getByText(/do not tell them apart/)).toBeVisible();
  expect(screen.getAllByRole('button')).toHaveLength(2);
});

test('a bench that agrees says so; one that parts by too little for a slip says that', () => {
  const agrees = { checks: [OFF.checks[1]!], off: [], slips: [] };
  const { rerender } = render(<AgreementTable agreement={agrees} onTake={() => undefined} />);
  expect(screen.getByText(/It does, as far as this was measured/)).toBeVisible();
  rerender(<AgreementTable agreement={{ ...agrees, checks: [{ ...OFF.checks[1]!, inU: 2.7 }] }} onTake={() => undefined} />);
  expect(screen.getByText(/by too little for a slip of the pen/)).toBeVisible();
  rerender(<AgreementTable agreement={{ ...OFF, slips: [] }} onTake={() => undefined} />);
  expect(screen.getByText(/no single slip of the pen reconciles/)).toBeVisible();
});
