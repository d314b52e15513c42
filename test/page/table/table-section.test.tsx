import { fireEvent, screen, within } from '@testing-library/react';
import { afterEach, expect, test, vi } from 'vitest';
import { perShotCsv } from '../../../src/exports/perShotTable.ts';
import type * as Download from '../../../src/platform/download.ts';
import { TableSection } from '../../../src/page/table/TableSection.tsx';
import { tableText } from '../../../src/page/table/tableText.ts';
import { unitNamed } from '../../../src/units/units.ts';
import { RECORDS, record, REDUCTION } from '../reductionFixture.ts';
import { withReduction } from '../withReduction.tsx';

const saved = vi.hoisted(() => ({ calls: [] as [string, string, string][] }));
vi.mock('../../../src/platform/download.ts', async (original) => ({
  ...(await original<typeof Download>()),
  saveTextAsFile: (name: string, text: string, type: string) => saved.calls.push([name, text, type]),
}));

afterEach(() => {
  saved.calls.length = 0;
});

const table = () => screen.getByRole('group', { name: 'Impulse table' });
const row = (name: RegExp) => within(table()).getByRole('row', { name });

test('every record has a row with its impulse bit, u, U and k', async () => {
  await withReduction(<TableSection />);
  expect(within(table()).getAllByRole('row')).toHaveLength(RECORDS.length + 1);
  expect(within(row(/Shot 1/)).getAllByRole('cell').map((cell) => cell.textContent.replaceAll(/\s/g, ' '))).toEqual(['34.46 ± 0.12', '1.2500', '0.0131', '0.0260', '1.98', '', '']);
});

test('a record set aside stays in the table, struck through, with its reason', async () => {
  await withReduction(<TableSection />);
  expect(row(/Shot 3/)).toHaveTextContent('misfire');
  expect(within(row(/Shot 3/)).getByText(/Shot 3/, { selector: 'del' })).toBeVisible();
});

test('the unit of the table can be chosen', async () => {
  const { user } = await withReduction(<TableSection />);
  await user.selectOptions(screen.getByRole('combobox', { name: 'Unit' }), 'µN·s');
  expect(within(table()).getByRole('columnheader', { name: 'Impulse bit (µN·s)' })).toBeVisible();
  expect(row(/Shot 1/)).toHaveTextContent('1250.0');
});

test('a record’s name opens it', async () => {
  const { store, user } = await withReduction(<TableSection />);
  await user.click(screen.getByRole('button', { name: 'Tap T2' }));
  expect(store.state.getState().selected).toBe('s1/4');
});

test('the saved table is the one of the exports, byte for byte', async () => {
  const { store, user } = await withReduction(<TableSection />);
  await user.click(screen.getByRole('button', { name: 'Save table (CSV)' }));
  const { session, reduction } = store.state.getState();
  if (reduction === null) throw new Error('The reduction has come');
  expect(saved.calls).toEqual([['impulse-table.csv', perShotCsv(session, reduction), 'text/csv;charset=utf-8']]);
});

test('the copied table is tab-separated', async () => {
  const { user } = await withReduction(<TableSection />);
  await user.click(screen.getByRole('button', { name: 'Copy for a spreadsheet' }));
  const text = await navigator.clipboard.readText();
  expect(text.split('\r\n')).toHaveLength(RECORDS.length + 1);
  expect(screen.getByText('Copied.')).toBeVisible();
});

test('a copied note that begins like a formula stays a note, and a negative number a number', () => {
  const unit = unitNamed('mN·s', 'impulse');
  if (unit === null) throw new Error('mN·s is a unit');
  const lines = tableText([record({ order: 1, kind: 'shot', label: '-1', swing: -0.028, note: '=HYPERLINK("x")\t!' })], unit).split('\r\n');
  const cells = lines[1]?.split('\t') ?? [];
  expect(cells[0]).toBe('-1');
  expect(Number(cells[4])).toBe(-1);
  expect(cells.at(-1)).toBe('\'=HYPERLINK("x") !');
});

test('a long table stands on leaves of two hundred rows', async () => {
  const many = Array.from({ length: 250 }, (_, index) => record({ order: index + 1, kind: 'shot', label: String(index + 1), swing: 0.035 }));
  await withReduction(<TableSection />, { reduction: { ...REDUCTION, records: many } });
  expect(screen.getByLabelText('Impulse table').querySelectorAll('tbody tr')).toHaveLength(200);
  expect(screen.getByText('rows 1 to 200 of 250')).toBeInTheDocument();
  fireEvent.click(screen.getByText('Rows after'));
  expect(screen.getByText('Shot 201')).toBeInTheDocument();
});
