/** The pendulum as fired and as tapped, its damping, and its timed period beside the predicted one. */
import type { Configuration, PeriodCheck, Reduction, Stated } from '../../reduction/results.ts';
import { chooseUnit, withPlusMinus } from '../../units/format.ts';
import type { Dimension } from '../../units/units.ts';
import { siUnit } from '../../units/units.ts';
import { Aligned, alignedColumn } from '../stated/Aligned.tsx';
import { PLAIN, timesU } from '../stated/numberWords.ts';
import { SymbolText } from '../words.tsx';
import { SheetTable } from '../stated/SheetTable.tsx';

interface Row {
  readonly label: string;
  readonly symbol: string;
  readonly dimension: Dimension;
  readonly of: (configuration: Configuration) => Stated;
}

const ROWS: readonly Row[] = [
  { label: 'Moment of inertia', symbol: 'J', dimension: 'momentOfInertia', of: (one) => one.momentOfInertia },
  { label: 'Stiffness, gravity and flexure', symbol: 'κ', dimension: 'rotationalStiffness', of: (one) => one.stiffness },
  { label: 'Share of gravity in it', symbol: 'Mgd/κ', dimension: 'number', of: (one) => one.gravityShare },
  { label: 'Natural frequency', symbol: 'ω_n', dimension: 'angularFrequency', of: (one) => one.naturalFrequency },
  { label: 'Undamped period, small swing', symbol: 'T_0', dimension: 'time', of: (one) => one.period },
  { label: 'Damping ratio', symbol: 'ζ', dimension: 'number', of: (one) => one.dampingRatio },
  { label: 'Damping correction of the first swing', symbol: 'D', dimension: 'number', of: (one) => one.dampingFactor },
];

const HEADS: Readonly<Record<Configuration['name'], string>> = { shots: 'As fired', taps: 'As tapped' };

const isAlike = (one: Configuration, other: Configuration): boolean =>
  ROWS.every(({ of }) => of(one).value === of(other).value);

export function Configurations({ reduction }: { readonly reduction: Reduction }) {
  const { shots, taps } = reduction.configurations;
  const there = [shots, taps].filter((one) => one !== null);
  const alike = shots !== null && taps !== null && isAlike(shots, taps);
  const shown = alike ? [shots] : there;
  return (
    <>
      {shown.length > 0 && (
        <SheetTable label="The pendulum">
          <caption>The pendulum (± u)</caption>
          <thead>
            <tr>
              <th scope="col">Quantity</th>
              <th scope="col">Symbol</th>
              {shown.map(({ name }) => <th key={name} scope="col">{alike ? 'As fired and as tapped' : HEADS[name]}</th>)}
            </tr>
          </thead>
          <Body configurations={shown} />
        </SheetTable>
      )}
      <Damping reduction={reduction} />
      {reduction.periodCheck !== null && <p>{periodSentence(reduction.periodCheck)}</p>}
    </>
  );
}

function Body({ configurations }: { readonly configurations: readonly Configuration[] }) {
  const columns = configurations.map((configuration) => alignedColumn(ROWS.map(({ of, dimension }) => {
    const { value, u } = of(configuration);
    const unit = chooseUnit(configurations.map((one) => of(one).value), dimension);
    return { value, spread: u, unit };
  })));
  return (
    <tbody>
      {ROWS.map(({ label, symbol }, row) => (
        <tr key={symbol}>
          <th scope="row">{label}</th>
          <td><SymbolText symbol={symbol} /></td>
          {columns.map((column, index) => <td key={configurations[index]?.name}><Aligned column={column} row={row} /></td>)}
        </tr>
      ))}
    </tbody>
  );
}

const WAYS: Readonly<Record<NonNullable<Reduction['damping']>['way'], string>> = {
  swings: 'from successive swings',
  decrement: 'from the typed log decrement',
  ratio: 'from the typed damping ratio',
  maximumTime: 'from the time to the first maximum',
  quadratic: 'from the typed quadratic damping',
  friction: 'from the typed friction of the pivot',
  none: 'taken as none',
};

/** By the law that holds; a pendulum damped critically or more has no log decrement. */
function dampingInNumbers({ law, ratio, logDecrement, quadratic, friction }: NonNullable<Reduction['damping']>): string {
  if (law === 'quadratic') return `quadratic, β = ${withPlusMinus(quadratic.value, quadratic.u, PLAIN)} per radian`;
  if (law === 'friction') return `friction of the pivot, θ_f = ${withPlusMinus(friction.value, friction.u, chooseUnit([friction.value], 'angle'))}`;
  return ratio.value < 1
    ? `log decrement per full cycle δ = ${withPlusMinus(logDecrement.value, logDecrement.u, PLAIN)}`
    : `damping ratio ζ = ${withPlusMinus(ratio.value, ratio.u, PLAIN)}: it comes back without crossing its rest`;
}

function Damping({ reduction }: { readonly reduction: Reduction }) {
  const { damping } = reduction;
  if (damping === null) return null;
  return (
    <p>
      Damping {WAYS[damping.way]}{damping.way === 'swings' ? ` of ${damping.records} ${damping.records === 1 ? 'record' : 'records'}` : ''}:
      {' '}{dampingInNumbers(damping)} (± u).
    </p>
  );
}

const AGREES = 2;

export function periodSentence({ measured, predicted, inU }: PeriodCheck): string {
  const unit = siUnit('time');
  const both = `Period timed, freed of damping and amplitude, ${withPlusMinus(measured.value, measured.u, unit)}; masses and lengths predict ${withPlusMinus(predicted.value, predicted.u, unit)} (± u).`;
  return Math.abs(inU) <= AGREES
    ? `${both} They agree, ${timesU(Math.abs(inU))} standard uncertainties apart.`
    : `${both} They differ by ${timesU(Math.abs(inU))} standard uncertainties: look at the masses, the lengths, the flexure, and the count of cycles. A period does not reveal a limp strip reduced as a rigid one.`;
}
