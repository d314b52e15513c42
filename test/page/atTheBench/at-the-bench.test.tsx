import { screen, within } from '@testing-library/react';
import { expect, test } from 'vitest';
import { AtTheBenchSection } from '../../../src/page/atTheBench/AtTheBenchSection.tsx';
import { PressureGroup } from '../../../src/page/bench/PressureGroup.tsx';
import { RunSection } from '../../../src/page/run/RunSection.tsx';
import type { BenchEffect, PressureResult } from '../../../src/reduction/results.ts';
import { FIRST_CHOICES } from '../../../src/session/session.ts';
import { REDUCTION } from '../reductionFixture.ts';
import { withReduction } from '../withReduction.tsx';

const LEADS: BenchEffect = {
  id: 'leads', size: { value: 5.6e-5, dimension: 'impulse' }, share: { of: 'impulse', value: 1.37 }, ofImpulse: 1.37, matters: true,
  taken: [{ what: 'capacitance', value: 1e-5, dimension: 'capacitance' }, { what: 'circuit of', value: 0.05, dimension: 'resistance' }],
};
const WIRES: BenchEffect = { id: 'wires', size: { value: 0.0018, dimension: 'rotationalStiffness' }, share: { of: 'stiffness', value: 0.034 }, ofImpulse: 0, taken: [], matters: false };
const YAW: BenchEffect = { id: 'yaw', size: { value: 0.1, dimension: 'number' }, share: { of: 'firstSwing', value: 0.1 }, ofImpulse: 0.1, taken: [], matters: true };
const with_ = (benchEffects: readonly BenchEffect[]) => ({ reduction: { ...REDUCTION, benchEffects } });

test('what could matter is listed with its size for this bench, what was taken as typical, and what to do', async () => {
  await withReduction(<AtTheBenchSection />, with_([LEADS, YAW, WIRES]));
  const items = within(screen.getByRole('list', { name: 'What could matter' })).getAllByRole('listitem');
  expect(items).toHaveLength(2);
  expect(items[0]).toHaveTextContent(/Discharge leads.*push with 56 µN·s, 140 % of the impulse bit\. Typical: capacitance 10 µF, circuit of 50 mΩ\.Keep the whole discharge loop/);
  expect(items[1]).toHaveTextContent(/read as 10 % of the first swing\./);
});

test('what is too small to matter is a fold away', async () => {
  const { user } = await withReduction(<AtTheBenchSection />, with_([LEADS, WIRES]));
  await user.click(screen.getByText('Too small to matter here: 1'));
  expect(within(screen.getByRole('list', { name: 'Too small to matter' })).getByRole('listitem')).toHaveTextContent(/1\.8 mN·m\/rad, 3\.4 % of κ: nothing of the impulse bit, as it is calibrated/);
});

test('without a run mean there is nothing to size', async () => {
  await withReduction(<AtTheBenchSection />, with_([]));
  expect(screen.getByText('Sized once there is a run mean.')).toBeVisible();
});

const PRESSURE: PressureResult = {
  meaning: 'percentOfScale', absolute: { value: 4800, u: 60 }, least: 4800, largest: 4800, mixed: false, taps: null, outside: { value: 95461, u: 942 }, outsideFrom: 'height', likeVacuum: false,
};

test('the run says at which absolute pressure it was fired, and that it is no vacuum figure', async () => {
  await withReduction(<RunSection />, { reduction: { ...REDUCTION, pressure: PRESSURE } });
  expect(screen.getByText(/^Fired at/)).toHaveTextContent('Fired at 4.800 ± 0.060 kPa absolute (± u). Outside 95.46 ± 0.94 kPa, by the height and the standard atmosphere. Not a vacuum figure.');
});

test('pressures that are mixed are told as a range, not as a mean', async () => {
  await withReduction(<RunSection />, { reduction: { ...REDUCTION, pressure: { ...PRESSURE, mixed: true, largest: 10_000 } } });
  expect(screen.getByText(/^Fired at/)).toHaveTextContent(/Fired at 4\.8 kPa to 10 kPa absolute: not one condition\./);
});

test('a person says what the gauge shows, in words that tell the dials apart', async () => {
  const said: string[] = [];
  const { user } = await withReduction(
    <PressureGroup choices={FIRST_CHOICES} pressure={null} air={null} onGauge={(meaning) => said.push(meaning)} onAir={(correct) => said.push(String(correct))}>{null}</PressureGroup>,
  );
  await user.click(screen.getByRole('radio', { name: /^percent of a fixed full scale/ }));
  await user.click(screen.getByRole('radio', { name: /^percent of the outside pressure/ }));
  await user.click(screen.getByRole('checkbox', { name: /air that the strip carries along/ }));
  expect(said).toEqual(['percentOfScale', 'percentOfOutside', 'false']);
});
