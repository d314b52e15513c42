import { screen, waitFor, within } from '@testing-library/react';
import { describe, expect, test } from 'vitest';
import { BenchSection } from '../../../src/page/bench/BenchSection.tsx';
import { setEntry } from '../../../src/session/edits.ts';
import { emptySession } from '../../../src/session/session.ts';
import { demoLike as sample } from '../../fixtures/demoLike.ts';
import { onSheet, settled } from '../head/on-sheet.tsx';

const field = (name: RegExp) => screen.getByRole('textbox', { name });
const group = (name: string) => within(screen.getByRole('group', { name }));

describe('the bench', () => {
  test('a quantity typed as people write it is kept word for word and echoed with its standard uncertainty', async () => {
    const { user, session } = await onSheet(<BenchSection />);
    await user.type(field(/^Lever arm of the thrust/), '118.0 ± 0.3 mm');
    await user.selectOptions(screen.getByRole('combobox', { name: /^Lever arm of the thrust: what ± means/ }), 'limits');
    expect(session().entries.leverArm).toEqual({ text: '118.0 ± 0.3 mm', plusMinus: 'limits', k: '' });
    // 0.3/√3 = 0.173 mm, GUM (JCGM 100:2008) 4.3.7.
    await waitFor(() => expect(field(/^Lever arm of the thrust/)).toHaveAccessibleDescription(/118\.00.mm, u = 0\.17.mm \(rectangular\)/));
  });

  test('an expanded uncertainty asks for its coverage factor', async () => {
    const { user, session } = await onSheet(<BenchSection />);
    await user.type(field(/^Local g g$/), '9.81(2)');
    await user.selectOptions(screen.getByRole('combobox', { name: /^Local g: what ± means/ }), 'expanded');
    await user.type(screen.getByRole('textbox', { name: 'Local g: coverage factor k' }), '2,5');
    expect(session().entries.gravity).toEqual({ text: '9.81(2)', plusMinus: 'expanded', k: '2,5' });
    await waitFor(() => expect(field(/^Local g g$/)).toHaveAccessibleDescription(/u = 0\.0080/));
  });

  test('a word where a number belongs is told at its field, which is marked, and stays as typed', async () => {
    const { user } = await onSheet(<BenchSection />);
    const typed = field(/^Strip length/);
    await user.type(typed, 'long');
    await waitFor(() => expect(typed).toBeInvalid());
    expect(typed).toHaveAccessibleDescription(/long/);
    expect(typed).toHaveValue('long');
  });

  test('the entries that a form does not use are out of the way; one that was typed is kept and says so', async () => {
    const { user } = await onSheet(<BenchSection />, setEntry('stripMass', { text: '2 g' })(emptySession()));
    await user.click(screen.getByRole('radio', { name: 'point bob' }));
    expect(field(/^Bob mass/)).toBeVisible();
    expect(screen.queryByRole('textbox', { name: /^Strip length/ })).not.toBeInTheDocument();
    expect(field(/^Strip mass/)).toHaveAccessibleDescription(/not used by the present choices/);
  });

  test('a body is built up of parts, each with its three quantities, and a part can be taken out', async () => {
    const { user, session } = await onSheet(<BenchSection />);
    await user.click(screen.getByRole('radio', { name: 'body of parts' }));
    await user.click(screen.getByRole('button', { name: 'Add a part' }));
    await user.click(screen.getByRole('button', { name: 'Add a part' }));
    await user.type(screen.getByRole('textbox', { name: 'Name of part 2' }), 'plate');
    await user.type(within(screen.getByRole('group', { name: 'plate' })).getByRole('textbox', { name: /^Mass/ }), '6.2 g');
    await user.click(screen.getByRole('button', { name: 'take out part 1' }));
    expect(session().parts).toEqual([{ id: 'p2', name: 'plate', entries: { mass: { text: '6.2 g', plusMinus: 'standard', k: '' } } }]);
  });

  test('every choice of the bench is a native control that says what it chooses', async () => {
    const { user, session } = await onSheet(<BenchSection />);
    await user.click(screen.getByRole('radio', { name: /^laser spot/ }));
    await user.click(screen.getByRole('radio', { name: 'log decrement, typed' }));
    await user.click(screen.getByRole('radio', { name: 'from latitude and height' }));
    await user.click(screen.getByRole('radio', { name: /^A: masses/ }));
    await user.click(screen.getByRole('radio', { name: 'as tapped' }));
    await user.click(screen.getByRole('radio', { name: 'during taps only' }));
    await user.click(screen.getByRole('checkbox', { name: /numbers fall/ }));
    expect(session().choices).toMatchObject({
      readingWay: 'laserSpot', dampingWay: 'decrement', gravityWay: 'place', route: 'massesAndPeriod', periodTimedAs: 'taps', calibrationMassHung: 'taps', scaleRunsBackward: true,
    });
    for (const name of [/^Mirror to screen/, /^Log decrement/, /^Latitude/, /^Height/, /^Pivot to calibration mass/]) expect(field(name)).toBeVisible();
  });

  test('a measured pulse is pasted line by line, and a line that is none is told there', async () => {
    const { user, session } = await onSheet(<BenchSection />, sample());
    await user.click(screen.getByRole('radio', { name: /^as measured/ }));
    const samples = screen.getByRole('textbox', { name: 'Samples of the pulse' });
    await user.type(samples, 'ms; N\n0; 0\n1,5; two');
    expect(session().pulseSamples).toBe('ms; N\n0; 0\n1,5; two');
    await waitFor(() => expect(samples).toHaveAccessibleDescription(/one sample is not enough|“1,5; two” is not a time and a thrust/));
    await user.click(screen.getByRole('radio', { name: 'rectangular' }));
    expect(samples).toBeVisible();
  });

  test('readings in −kPa are settled by one press where the gauge stands', async () => {
    const session = sample();
    const sheet = session.sheets[0]!;
    const columns = sheet.columns.map((column) => (column.role === 'pressure' ? { ...column, unit: '−kPa' } : column));
    const { user, session: now } = await onSheet(<BenchSection />, { ...session, sheets: [{ ...sheet, columns }] });
    await user.click(await screen.findByRole('button', { name: '−kPa counts from the outside pressure' }));
    expect(now().choices.gaugeMeaning).toBe('gauge');
    await waitFor(() => expect(screen.queryByText(/what the gauge shows is not settled/)).not.toBeInTheDocument());
  });

  test('typing one quantity is one step to undo', async () => {
    const { user, store, session } = await onSheet(<BenchSection />);
    await user.type(field(/^Lever arm of the thrust/), '118 mm');
    await settled(() => store.actions.undo());
    expect(session()).toEqual(emptySession());
  });

  test('where work can hurt a caution stands in its place', async () => {
    const { user } = await onSheet(<BenchSection />);
    expect(group('Thrust').getByText(/^Stored charge:/)).toBeVisible();
    expect(group('Pressure').getByText(/^Vacuum:/)).toBeVisible();
    expect(group('Taps').getByText(/^Hammer:/)).toBeVisible();
    expect(screen.queryByText(/^Laser:/)).not.toBeInTheDocument();
    await user.click(screen.getByRole('radio', { name: /^laser spot/ }));
    expect(group('Reading').getByText(/^Laser:/)).toBeVisible();
  });

  test('the drawing shows the lengths as read', async () => {
    const { user } = await onSheet(<BenchSection />);
    await user.type(field(/^Strip length/), '250(1) mm');
    await waitFor(() => expect(screen.getByText('250.0 mm', { selector: 'tspan' })).toBeVisible());
  });
});
