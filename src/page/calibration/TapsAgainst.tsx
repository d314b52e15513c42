/** Taps against firings: whether the calibration is valid for these shots, each comparison ending in a sentence. */
import { placeInTapRange } from '../../reduction/beside.ts';
import type { Comparison } from '../../reduction/evidenceResults.ts';
import type { Difference, Reduction } from '../../reduction/results.ts';
import { tapRangeSentence } from '../../plots/tapsAndShots.ts';
import { withPlusMinus } from '../../units/format.ts';
import { siUnit } from '../../units/units.ts';
import { PERCENT, PLAIN, timesU } from '../stated/numberWords.ts';
import { SheetTable } from '../stated/SheetTable.tsx';

export function TapsAgainst({ reduction }: { readonly reduction: Reduction }) {
  const { ranges, comparisons, difference, traces } = reduction;
  const hasSwings = (kind: 'tap' | 'shot'): boolean => traces.some(({ events, fitted }) => fitted !== null && events.some((event) => event.kind === kind));
  if (ranges.taps === null || ranges.shots === null) return null;
  return (
    <SheetTable label="Taps against firings">
      <caption>Is the calibration valid for these shots?</caption>
      <thead>
        <tr><th scope="col">Compared</th><th scope="col">Taps against firings</th></tr>
      </thead>
      <tbody>
        <tr><th scope="row">Range of the swings</th><td>{tapRangeSentence(placeInTapRange(ranges.taps, ranges.shots))}</td></tr>
        {comparisons.map((comparison) => <tr key={comparison.id}><th scope="row">{NAMES[comparison.id]}</th><td>{comparisonSentence(comparison)}</td></tr>)}
        {hasSwings('tap') && hasSwings('shot') && <tr><th scope="row">Shape of the swings</th><td>Laid over one another, each over its own throw, <a href="#traces">under Traces</a>.</td></tr>}
        {difference !== null && <tr><th scope="row">The same shots by taps and by geometry</th><td>{sameShotsSentence(difference)}</td></tr>}
      </tbody>
    </SheetTable>
  );
}

const NAMES: Readonly<Record<Comparison['id'], string>> = { damping: 'Damping of the free swing', period: 'Period of the free swing', maximumTime: 'Time to the first maximum' };

const WHAT_IT_WOULD_MEAN: Readonly<Record<Comparison['id'], string>> = {
  damping: 'the pressure, a cable or a rub changed between them, and the damping of the first swing with it',
  maximumTime: 'one of the pulses is not short, the pendulum swung before it, or another mode was struck',
  period: 'the pendulum itself changed between them: a mass, a cable, the air it moves; the factor of the taps is then not that of the shots',
};

const AGREES = 2;

export function comparisonSentence({ id, taps, shots, relative, inU }: Comparison): string {
  const unit = id === 'damping' ? PLAIN : siUnit('time');
  const symbol = { damping: 'ζ', period: 'T₀', maximumTime: 'tₚ' }[id];
  const both = `${symbol} = ${withPlusMinus(taps.value, taps.u, unit)} after taps (brought to the pendulum as fired), ${withPlusMinus(shots.value, shots.u, unit)} after shots (± u)`;
  return Math.abs(inU) <= AGREES
    ? `${both}: agrees, ${timesU(Math.abs(inU))} standard uncertainties apart.`
    : `${both}: differs by ${withPlusMinus(relative.value, relative.u, PERCENT)}, ${timesU(Math.abs(inU))} standard uncertainties. It would mean that ${WHAT_IT_WOULD_MEAN[id]}.`;
}

function sameShotsSentence({ relative, inU }: Difference): string {
  const away = `by taps ${withPlusMinus(relative.value, relative.u, PERCENT)} (± u) from geometry`;
  return Math.abs(inU) <= AGREES
    ? `${away}: agrees, ${timesU(Math.abs(inU))} standard uncertainties apart.`
    : `${away}: differs by ${timesU(Math.abs(inU))} standard uncertainties. It would mean that a lever arm, a mass, the hammer’s calibration or the model of the pendulum is wrong.`;
}
