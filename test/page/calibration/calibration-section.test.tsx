import { screen, within } from '@testing-library/react';
import { describe, expect, test } from 'vitest';
import { differenceSentence } from '../../../src/page/calibration/CalibrationFactors.tsx';
import { CalibrationSection } from '../../../src/page/calibration/CalibrationSection.tsx';
import { periodSentence } from '../../../src/page/calibration/Configurations.tsx';
import { REDUCTION, stated } from '../reductionFixture.ts';
import { withReduction } from '../withReduction.tsx';

test('both calibration factors stand side by side, each with the run mean that it gives', async () => {
  await withReduction(<CalibrationSection />);
  const table = screen.getByRole('group', { name: 'Calibration factors' });
  const geometry = within(table).getByRole('row', { name: /by geometry/ });
  expect(geometry).toHaveTextContent('10.00 ± 0.24 mN·m·s/rad');
  expect(geometry).toHaveTextContent('1.252 ± 0.031 mN·s');
  const taps = within(table).getByRole('row', { name: /by taps/ });
  expect(taps).toHaveTextContent('10.08 ± 0.20 mN·m·s/rad');
  expect(taps).toHaveTextContent('(0.8 ± 1.5)');
  expect(screen.getByText(/the factor changes by 0\.9804 ± 0\.0010/)).toBeVisible();
  expect(taps).toHaveTextContent('1.262 ± 0.027 mN·s');
});

test('choosing the taps changes the session, and can be undone', async () => {
  const { store, user } = await withReduction(<CalibrationSection />);
  expect(screen.getByRole('radio', { name: /by geometry/ })).toBeChecked();
  await user.click(screen.getByRole('radio', { name: /by taps/ }));
  expect(store.state.getState().session.choices.calibration).toBe('taps');
  expect(store.state.getState().past.at(-1)?.what).toBe('impulse bits by taps');
});

test('choosing the small-angle form changes the session', async () => {
  const { store, user } = await withReduction(<CalibrationSection />);
  await user.click(screen.getByRole('radio', { name: /small-angle form/ }));
  expect(store.state.getState().session.choices.swingForm).toBe('smallAngle');
});

test('a pendulum changed between taps and shots has a column for each', async () => {
  await withReduction(<CalibrationSection />);
  const table = screen.getByRole('group', { name: 'The pendulum' });
  expect(within(table).getByRole('row', { name: /Moment of inertia/ })).toHaveTextContent('2.000 ± 0.020 g·m²2.080 ± 0.020 g·m²');
});

test('a pendulum that stays the same has one column', async () => {
  const { shots } = REDUCTION.configurations;
  if (shots === null) throw new Error('The fixture has a pendulum');
  await withReduction(<CalibrationSection />, { reduction: { ...REDUCTION, configurations: { shots, taps: { ...shots, name: 'taps' } } } });
  expect(screen.getByRole('columnheader', { name: 'As fired and as tapped' })).toBeVisible();
});

test('the taps’ scatter is held against what their own uncertainties predict', async () => {
  await withReduction(<CalibrationSection />);
  expect(screen.getByText(/3 taps of known impulse, scattering by 1\.2\s% \(standard deviation\); their own uncertainties predict 1\s%\./)).toBeVisible();
});

test('without taps the factor by taps is not known', async () => {
  await withReduction(<CalibrationSection />, {
    reduction: { ...REDUCTION, difference: null, calibrations: { ...REDUCTION.calibrations, taps: null }, evidence: REDUCTION.evidence.filter(({ id }) => id !== 'taps'), runs: { ...REDUCTION.runs, taps: null } },
  });
  expect(screen.getByRole('row', { name: /by taps/ })).toHaveTextContent('not known');
});

describe('what is said of two results', () => {
  test('up to two standard uncertainties apart they agree', () => {
    expect(differenceSentence({ relative: stated(0.008, 0.015), inU: 0.53 })).toMatch(/^The two agree\. .*\(0\.8 ± 1\.5\)\s%/);
  });

  test('further apart the sentence says where to look', () => {
    expect(differenceSentence({ relative: stated(-0.06, 0.015), inU: -4 })).toMatch(/^The two differ\. .*4\.0 standard uncertainties.*Look at the two lever arms/);
    expect(differenceSentence({ relative: stated(0.0375, 0.015), inU: 2.5 })).toMatch(/^The two part a little\./);
  });

  test('a period that differs from the predicted one is told with where to look', () => {
    expect(periodSentence({ measured: stated(1.262, 0.002), predicted: stated(1.2566, 0.005), inU: 1 })).toContain('They agree');
    expect(periodSentence({ measured: stated(1.3, 0.002), predicted: stated(1.2566, 0.005), inU: 8 })).toContain('They differ by 8.0');
  });
});
