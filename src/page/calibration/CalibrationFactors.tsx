/** The calibration factor by geometry and by taps, side by side, each with the run mean that it gives, and the choice between them. */
import type { Calibration, Difference, Reduction } from '../../reduction/results.ts';
import { WAY_WORDS } from '../../reduction/wayWords.ts';
import { impulseUnit } from '../../plots/impulseUnit.ts';
import { plain, withPlusMinus } from '../../units/format.ts';
import type { Unit } from '../../units/units.ts';
import { PERCENT, PLAIN, timesU } from '../stated/numberWords.ts';
import { EvidenceTable } from './EvidenceTable.tsx';

export function CalibrationFactors({ reduction }: { readonly reduction: Reduction }) {
  const { calibrations, difference } = reduction;
  return (
    <>
      <EvidenceTable reduction={reduction} />
      {calibrations.taps !== null && <p>{scatterSentence(calibrations.taps)}</p>}
      <p>{difference === null ? 'With a bench and taps of known impulse both factors stand here side by side.' : differenceSentence(difference)}</p>
      {difference !== null && <Consequence reduction={reduction} unit={impulseUnit(reduction)} />}
    </>
  );
}

function scatterSentence({ taps, scatter, expectedScatter, change }: Calibration): string {
  const count = `${taps} ${taps === 1 ? 'tap' : 'taps'} of known impulse`;
  const moved = change.value === 1 && change.u === 0 ? '' : ` From the pendulum as tapped to the one fired the factor changes by ${withPlusMinus(change.value, change.u, PLAIN)} (± u).`;
  if (scatter === null) return `${count}; their scatter is not known.${moved}`;
  const expected = expectedScatter === null ? '' : `; their own uncertainties predict ${plain(expectedScatter, PERCENT, 2)}`;
  return `${count}, scattering by ${plain(scatter, PERCENT, 2)} (standard deviation)${expected}.${moved}`;
}

/** Up to this many standard uncertainties two results agree; beyond the second, chance no longer explains it. */
const AGREES = 2;
const DIFFERS = 3;

/** What the taps' factor is beside the one of geometry, and where to look if they part. */
export function differenceSentence({ relative, inU }: Difference): string {
  const away = `The factor by taps lies ${withPlusMinus(relative.value, relative.u, PERCENT)} (± u) from the one by geometry, ${timesU(Math.abs(inU))} standard uncertainties of that difference`;
  if (Math.abs(inU) <= AGREES) return `The two agree. ${away}.`;
  const look = 'Look at the two lever arms, the hammer’s calibration, the mass hung during taps or shots, the reading radius, and whether a limp strip is reduced as a rigid one.';
  return Math.abs(inU) <= DIFFERS
    ? `The two part a little. ${away}; chance alone does that in fewer than 1 of 20 calibrations. ${look}`
    : `The two differ. ${away}; chance does not explain it. ${look}`;
}

function Consequence({ reduction, unit }: { readonly reduction: Reduction; readonly unit: Unit }) {
  const { geometry, taps } = reduction.runs;
  if (geometry === null || taps === null) return null;
  return (
    <p className="quiet">
      Run mean by geometry {withPlusMinus(geometry.mean.value, geometry.mean.U, unit)}, by taps {withPlusMinus(taps.mean.value, taps.mean.U, unit)} (± U, 95 %);
      {' '}the one by {WAY_WORDS[reduction.chosen]} counts.
    </p>
  );
}
