import { screen, waitFor, within } from '@testing-library/react';
import { beforeAll, describe, expect, test } from 'vitest';
import { App } from '../../../src/page/App.tsx';
import { fetchSections } from '../../../src/page/later.ts';
import { PlanSection } from '../../../src/page/plan/PlanSection.tsx';
import { demoSession } from '../../../src/session/demo.ts';
import { setEntry } from '../../../src/session/edits.ts';
import type { EntryName } from '../../../src/session/entries.ts';
import { emptySession, type Session } from '../../../src/session/session.ts';
import { sessionOf } from '../../fixtures/session.ts';
import { onSheet, settled } from '../head/on-sheet.tsx';

/** The rig of methods 1.18, 41 µN·s, read by an arc ruler at 0.5 m: 0.5294 mm. */
function rig(entries: Readonly<Partial<Record<EntryName, string>>> = {}): Session {
  return sessionOf({
    choices: { form: 'bodyOfParts', readingWay: 'arcRuler', dampingWay: 'none' },
    entries: {
      leverArm: '300 mm', tapLeverArm: '250 mm', readingRadius: '500 mm', gravity: '9.80665 m/s²', division: '0.1 mm', guessedImpulse: '41 ± 4.1 µN·s', calibrationMass: '20 g', period: '1.352 ± 0.0013 s', ...entries,
    },
    parts: [{ mass: '36.7 g', distance: '150 mm', ownInertia: '1674250 g·mm²' }],
  });
}

const section = () => within(screen.getByRole('region', { name: 'Before the pump goes on' }));

beforeAll(fetchSections);

describe('before the pump goes on', () => {
  test('the expected throw stands in the unit that will be read, with its u', async () => {
    await onSheet(<PlanSection />, rig());
    expect(section().getByText(/^A shot of/)).toHaveTextContent('A shot of 41 µN·s would read 0.529 ± 0.053 mm');
    expect(section().getByText(/^First swing 1\.06.mrad/)).toHaveTextContent(/calibrated by geometry\. No damping is reckoned with/);
    expect(section().getByText(/^Full scale is/)).toHaveTextContent(/times the guess: 1490 mm, 171°, where the pendulum stands nearly upright\./);
  });

  test('the readings’ share and the smallest impulse bit are told, and that this guess is seen', async () => {
    await onSheet(<PlanSection />, rig());
    // 0.1 mm/√6 = 0.0408 mm, 7.7 % of 0.529 mm.
    expect(section().getByText(/^Division and eye/)).toHaveTextContent(/u = 0\.0408 mm, 7\.7 % of it\. That makes 7\.7 % of one shot’s impulse bit/);
    // 1.645 · 0.0408 mm = 0.0672 mm, 41 µN·s · 0.0672/0.5294 = 5.2 µN·s.
    expect(section().getByText(/^The smallest impulse bit/)).toHaveTextContent(/above 5\.2 µN·s \(0\.0672 mm\).* from 10\.4 µN·s \(0\.134 mm\) on/);
    expect(section().queryByText(/^A single shot of the guess/)).not.toBeInTheDocument();
  });

  test('a guess that a shot would not show is said to be one, as is one beyond the scale', async () => {
    const { user } = await onSheet(<PlanSection />, rig({ division: '1 mm' }));
    expect(section().getByText('A single shot of the guess would not be seen.')).toBeVisible();
    await user.type(section().getByRole('textbox', { name: /^Scale ends at/ }), '0.4 mm');
    await waitFor(() => expect(section().getByText('That is beyond the scale.')).toBeVisible());
  });

  test('five taps span the shots, from half to one and a half of the throw', async () => {
    await onSheet(<PlanSection />, rig());
    const rows = within(section().getByRole('table', { name: /^Taps that span the shots/ })).getAllByRole('row');
    expect(rows).toHaveLength(6);
    // 41 µN·s · 300/250 = 49.2 µN·s at the whole throw.
    expect(rows[1]).toHaveTextContent(/24\.6 µN·s0\.265 mm/);
    expect(rows[3]).toHaveTextContent(/49\.2 µN·s0\.529 mm/);
  });

  test('the places of a calibration mass stand with their periods, and the one that tells nothing is named', async () => {
    await onSheet(<PlanSection />, rig());
    // Methods 1.8: 0.45401 m.
    expect(section().getByText(/^A calibration mass of 20.g/)).toHaveTextContent(/Hung 454 mm below the pivot it leaves the period as it is/);
    const rows = within(section().getByRole('table', { name: /^Where to hang it/ })).getAllByRole('row');
    expect(rows).toHaveLength(3);
    expect(rows[2]).toHaveTextContent(/^500 mm/);
  });

  test('a guess typed on an unfinished bench waits for it', async () => {
    const { user, session } = await onSheet(<PlanSection />);
    await user.type(section().getByRole('textbox', { name: /^Guessed impulse bit/ }), '40 µN·s');
    expect(session().entries.guessedImpulse?.text).toBe('40 µN·s');
    await waitFor(() => expect(section().getByText(/^The bench does not yet tell/)).toBeVisible());
  });
});

describe('the section', () => {
  const there = () => screen.queryByRole('region', { name: 'Before the pump goes on' });

  test('stands on a sheet without readings', async () => {
    await onSheet(<App />, emptySession());
    expect(there()).toBeVisible();
  });

  test('goes once there are readings, unless a guess is typed', async () => {
    const { store } = await onSheet(<App />, demoSession());
    expect(there()).not.toBeInTheDocument();
    await settled(() => store.actions.change('guess', setEntry('guessedImpulse', { text: '1.2 mN·s' })));
    await settled();
    expect(there()).toBeVisible();
    expect(section().getByText(/^A shot of 1\.2 mN·s/)).toHaveTextContent(/would read 1\d\.\d+ ± 0\.\d+ mm/);
  });
});
