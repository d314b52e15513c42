import { screen, waitFor, within } from '@testing-library/react';
import { describe, expect, test } from 'vitest';
import { BenchSection } from '../../../src/page/bench/BenchSection.tsx';
import { SheetHead } from '../../../src/page/readings/SheetHead.tsx';
import { BudgetTable } from '../../../src/page/budget/BudgetTable.tsx';
import { ChainTable } from '../../../src/page/record/ChainTable.tsx';
import { readTable } from '../../../src/readings/table.ts';
import { reduce } from '../../../src/reduction/reduce.ts';
import { addInstrument, setEntry, setEntryInstrument, setInstrumentScale, setSheetInstrument, setTitle } from '../../../src/session/edits.ts';
import type { Edit } from '../../../src/session/edits.ts';
import { emptySession } from '../../../src/session/session.ts';
import type { Session } from '../../../src/session/session.ts';
import { unitNamed } from '../../../src/units/units.ts';
import { demoLike } from '../../fixtures/demoLike.ts';
import { rowId, SHEET } from '../../fixtures/session.ts';
import { onSheet, settled } from '../head/on-sheet.tsx';

const withEdits = (session: Session, ...edits: readonly Edit[]): Session => edits.reduce((so, edit) => edit(so), session);
const ARM = setEntry('leverArm', { text: '118.0 ± 0.3 mm' });
const RULER = addInstrument({ name: 'steel ruler', serial: '4711', due: '2027-03-31' });
const instruments = () => within(screen.getByRole('group', { name: 'Instruments' }));
const textbox = (name: string) => screen.getByRole('textbox', { name });

describe('instruments', () => {
  test('a bench without any asks of no quantity what it was measured with', async () => {
    await onSheet(<BenchSection />, withEdits(emptySession(), ARM));
    expect(screen.queryByRole('combobox', { name: /measured with/ })).not.toBeInTheDocument();
    expect(instruments().getByRole('button', { name: 'Add an instrument' })).not.toBeVisible();
  });

  test('one is added by hand with name, serial, certificate and due date, and chosen beside the quantities that it measures', async () => {
    const { user, session } = await onSheet(<BenchSection />, withEdits(emptySession(), ARM, setEntry('gravity', { text: '9.81' }), setEntry('stripMass', { text: '2 g' })));
    await user.click(instruments().getByText('Instruments'));
    await user.click(instruments().getByRole('button', { name: 'Add an instrument' }));
    await user.type(textbox('Name of instrument 1'), 'steel ruler');
    await user.type(textbox('Serial of instrument 1'), '4711');
    await user.type(textbox('Certificate of instrument 1'), 'C-12');
    await user.type(textbox('Due of instrument 1'), '03/04/2027');
    await user.type(textbox('Calibration ± of instrument 1'), '0.1 %');
    await waitFor(() => expect(textbox('Due of instrument 1')).toHaveAccessibleDescription('due read as 3 Apr 2027, day first; else write 2027-03-04'));
    expect(textbox('Calibration ± of instrument 1')).toHaveAccessibleDescription(/calibration u = 0\.1/);
    expect(screen.queryByRole('combobox', { name: /^Strip mass: measured with/ })).not.toBeInTheDocument();
    await user.selectOptions(screen.getByRole('combobox', { name: 'Lever arm of the thrust: measured with' }), 'steel ruler');
    expect(session().entries.leverArm).toEqual({ text: '118.0 ± 0.3 mm', plusMinus: 'standard', k: '', instrument: 'i1' });
    // 0.1 % of 118 mm.
    expect(await screen.findByText(/^adds u = 0\.12/)).toBeVisible();
  });

  test('one that measures something else is named and has no ± to share', async () => {
    const { user, session } = await onSheet(<BenchSection />, withEdits(emptySession(), ARM, RULER));
    await user.selectOptions(screen.getByRole('combobox', { name: 'What instrument 1 measures' }), 'something else');
    expect(session().instruments[0]?.measures).toBe('other');
    expect(screen.queryByRole('textbox', { name: 'Calibration ± of instrument 1' })).not.toBeInTheDocument();
    expect(screen.getByRole('combobox', { name: 'Lever arm of the thrust: measured with' })).toBeVisible();
  });

  test('one taken out leaves the quantity as typed, and undo brings both back', async () => {
    const { user, session, store } = await onSheet(<BenchSection />, withEdits(emptySession(), ARM, RULER, setEntryInstrument('leverArm', 'i1')));
    const before = session();
    await user.click(instruments().getByRole('button', { name: 'take out steel ruler, serial 4711' }));
    expect(session()).toEqual(withEdits(emptySession(), ARM));
    await settled(() => store.actions.undo());
    expect(session()).toEqual(before);
  });

  test('a calibration that ran out before the session is told at its due date', async () => {
    await onSheet(<BenchSection />, withEdits(emptySession(), RULER, setTitle({ date: '2027-05-01' })));
    expect(await instruments().findByText(/was due on 31 Mar 2027, before the session of 1 May 2027/)).toBeVisible();
  });

  test('two of one name are told apart by their serials', async () => {
    await onSheet(<BenchSection />, withEdits(emptySession(), ARM, RULER, addInstrument({ name: 'steel ruler', serial: '4712' })));
    const options = within(screen.getByRole('combobox', { name: 'Lever arm of the thrust: measured with' })).getAllByRole('option').map(({ textContent }) => textContent);
    expect(options).toEqual(['not said', 'steel ruler, serial 4711', 'steel ruler, serial 4712']);
  });
});

describe('what readings were read with', () => {
  test('is chosen at the head of the sheet', async () => {
    const first = withEdits(demoLike(), RULER, addInstrument({ name: 'balance', measures: 'mass' }));
    const sheet = first.sheets[0]!;
    const { user, session } = await onSheet(<SheetHead sheet={sheet} table={readTable(sheet.text, { place: {} })} rows={12} isFirst isLast headingId="h" />, first);
    const select = screen.getByRole('combobox', { name: 'bench.csv: readings read with' });
    expect(within(select).queryByRole('option', { name: 'balance' })).not.toBeInTheDocument();
    await user.selectOptions(select, 'steel ruler');
    expect(session().sheets[0]?.instrument).toBe('i1');
  });

  test('stands in the chain and in the budget, which has the instrument as one line', async () => {
    const session = withEdits(demoLike(), RULER, setInstrumentScale('i1', { text: '0.1 %' }), setEntryInstrument('leverArm', 'i1'), setSheetInstrument(SHEET, 'i1'));
    const { explained, run } = reduce(session, rowId(6));
    const unit = unitNamed('mN·s')!;
    await onSheet(<><ChainTable chain={explained!.chain} impulse={unit} /><BudgetTable budget={run!.budget} of="run mean" unit={unit} /></>);
    expect(screen.getByRole('rowheader', { name: /^First swing x.*with steel ruler, serial 4711, due 2027-03-31/ })).toBeVisible();
    expect(screen.getAllByRole('rowheader', { name: /^Lever arm of the thrust.*with steel ruler/ })).toHaveLength(2);
    expect(screen.getAllByRole('rowheader', { name: /^Calibration of steel ruler, serial 4711/ })).toHaveLength(1);
  });
});
