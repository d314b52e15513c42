import { screen, within } from '@testing-library/react';
import { describe, expect, test } from 'vitest';
import { agreementSentence } from '../../../src/page/calibration/Adjustment.tsx';
import { CalibrationSection } from '../../../src/page/calibration/CalibrationSection.tsx';
import { weightsSentence } from '../../../src/page/calibration/Masses.tsx';
import { driftSentence, lineSentence } from '../../../src/page/calibration/TapLine.tsx';
import { comparisonSentence } from '../../../src/page/calibration/TapsAgainst.tsx';
import type { AdjustmentTold, TapStudy } from '../../../src/reduction/evidenceResults.ts';
import type { Reduction } from '../../../src/reduction/results.ts';
import { REDUCTION, result, stated } from '../reductionFixture.ts';
import { withReduction } from '../withReduction.tsx';

const TAKEN = { byMean: stated(0.01, 1.5e-4), atFirst: stated(0.00985, 1e-4), atLast: stated(0.01015, 1e-4) };

const STUDY: TapStudy = {
  taps: 3, sizes: 3, sides: 1, chiSquared: 1.2, dof: 2, probability: 0.55, widened: 1, intercept: { t: 0.4, probability: 0.69 }, curvature: null, repeatability: { relative: 0.012, dof: 4, expected: 0.014, probability: 0.6 }, alongRun: { relative: 0.03, t: 2.9, probability: 0.01 }, runs: { runs: 3, expected: 4.2, probability: 0.4 },
  points: REDUCTION.records.filter(({ kind }) => kind === 'tap').map(({ id }, place) => ({ record: id, place, residual: 0.5 - place, leverage: 0.3 })),
  groups: [{ where: 'before', taps: 2, factor: stated(0.0098, 1e-4) }, { where: 'after', taps: 1, factor: stated(0.0102, 1e-4) }],
  drift: { from: 'before', to: 'after', relative: stated(0.041, 0.014), inU: 2.9, ...TAKEN },
};

const ADJUSTMENT: AdjustmentTold = {
  status: 'adjusted', inertia: stated(2e-3, 1e-5), stiffness: stated(0.05, 2e-4), ratio: null, chiSquared: 9.5, dof: 2, probability: 0.0087,
  items: [{ id: 'period', label: 'Timed period, typed', deviation: 0.8, pull: 0.1 }, { id: 'taps.all', label: 'Taps', deviation: -3.1, pull: 1.4 }, { id: 'damping.shots', label: 'Damping of the swings as fired', deviation: null, pull: null }],
  pullsMost: 'Taps', moved: [{ label: 'Hammer calibration', shift: 1.2 }],
};

const WITH: Reduction = {
  ...REDUCTION, tapStudy: STUDY, adjustment: ADJUSTMENT,
  comparisons: [{ id: 'damping', taps: stated(0.01, 5e-4), shots: stated(0.0102, 3e-4), relative: stated(0.02, 0.06), inU: 0.33 }],
  addedMasses: {
    status: 'found', inertia: stated(2e-3, 5e-5), stiffness: stated(0.05, 2e-4), sameRadius: 0.454, better: { radius: 0.15, uInertia: 0.012 },
    rows: [{ label: 'Period, table', timings: 3, period: stated(1.256, 0.001), deviation: 0.2 }, { label: 'Period with 20 g at 350 mm', timings: 3, period: stated(1.2, 0.001), deviation: -0.2 }],
  },
  weights: { weights: 5, stiffness: stated(0.05, 3e-4), interceptInU: 0.3, hysteresis: 0.001, slopesPart: 0.02, chiSquared: 4, dof: 8, points: [] },
};

test('every way stands in one table with its interval in a picture, and choosing one changes the session', async () => {
  const { store, user } = await withReduction(<CalibrationSection />, { reduction: { ...WITH, evidence: [...REDUCTION.evidence, { id: 'adjustment', choice: { calibration: 'adjustment' }, chosen: false, readings: 0, factor: result(0.01003, 5e-5), apart: stated(0.003, 0.01), mean: result(1.255e-3, 1e-5) }] } });
  const table = screen.getByRole('group', { name: 'Calibration factors' });
  expect(within(table).getAllByRole('img')).toHaveLength(3);
  expect(within(table).getByRole('img', { name: /by adjustment: 10\.03/ })).toBeInTheDocument();
  await user.click(screen.getByRole('radio', { name: /by adjustment/ }));
  expect(store.state.getState().session.choices.calibration).toBe('adjustment');
});

test('the adjustment is opened where the evidence does not agree, and says what pulls most', async () => {
  await withReduction(<CalibrationSection />, { reduction: WITH });
  const table = screen.getByRole('group', { name: 'Items of the adjustment' });
  expect(within(table).getByRole('row', { name: /Taps/ })).toHaveTextContent('−3.1');
  expect(within(table).getByRole('row', { name: /Damping/ })).toHaveTextContent('not checked by another');
  expect(screen.getByText(/Hammer calibration 1\.2/)).toBeVisible();
  expect(agreementSentence(ADJUSTMENT)).toMatch(/^The evidence does not agree within its uncertainties: χ² = 9\.5 for 2 .* Farthest .*: Taps, by −3\.1/);
  expect(agreementSentence({ ...ADJUSTMENT, chiSquared: 1, probability: 0.6 })).toMatch(/^The evidence agrees/);
});

test('the taps’ line and what to do with taps before and after are choices that can be undone', async () => {
  const { store, user } = await withReduction(<CalibrationSection />, { reduction: WITH });
  await user.click(screen.getByRole('radio', { name: /with an intercept/ }));
  await user.click(screen.getByRole('radio', { name: /interpolated to each shot/ }));
  expect(store.state.getState().session.choices).toMatchObject({ tapLine: 'withIntercept', tapDrift: 'interpolated' });
  expect(store.state.getState().past).toHaveLength(2);
  expect(screen.getByText(/As their mean K is 10\.00 ± 0\.15 .*; interpolated, 9\.85 .* at the first shot and 10\.15 .* That is a drift/)).toBeVisible();
});

test('taps stand against firings, and masses hung with where to hang them instead', async () => {
  await withReduction(<CalibrationSection />, { reduction: WITH });
  expect(within(screen.getByRole('group', { name: 'Taps against firings' })).getByRole('row', { name: /Damping of the free swing/ })).toHaveTextContent('agrees, 0.3 standard uncertainties apart');
  expect(screen.getByText(/leaves the period as it is and tells nothing\. At 150\s?mm two timings tell J best, to 1\.2\s%/)).toBeVisible();
});

describe('what is said of the taps', () => {
  test('a line through the origin, straight, scattering as stated', () => {
    expect(lineSentence(STUDY)).toBe('3 taps of 3 sizes. It goes through the origin (off by 0.4 u, chance 69 %). They scatter as stated (χ² = 1.2 for 2). Repeated taps of one size part by 1.2 % (standard deviation, 4 degrees of freedom); their own uncertainties predict 1.4 %. Along the run their slope changes by 3 % (chance 1 %).');
  });

  test('a line that misses the origin, bends, and scatters more than stated', () => {
    const said = lineSentence({ ...STUDY, intercept: { t: 3.2, probability: 0.004 }, curvature: { t: 2.8, probability: 0.01 }, chiSquared: 20, probability: 0.0001, widened: 3.2 });
    expect(said).toContain('misses the origin by 3.2 u');
    expect(said).toContain('bends by 2.8 u');
    expect(said).toContain('scatter 3.2 times as much as stated');
  });

  test('no drift is said as such', () => {
    expect(driftSentence({ ...STUDY, drift: { from: 'before', to: 'after', relative: stated(0.004, 0.014), inU: 0.3, ...TAKEN } })).toContain('That is no drift');
  });
});

test('a difference says what it would mean', () => {
  const said = comparisonSentence({ id: 'period', taps: stated(1.25, 0.001), shots: stated(1.27, 0.001), relative: stated(0.016, 0.0011), inU: 14 });
  expect(said).toMatch(/differs by .*14\.0 standard uncertainties\. It would mean that the pendulum itself changed/);
});

test('known weights say what hysteresis they showed', () => {
  expect(weightsSentence(WITH.weights!)).toMatch(/^5 known weights give κ = .*Loading and unloading part by 2\s?mrad; half of it/);
});
