/** The pressure of the run in words: absolute, with u, and what it means for the figure. */
import type { PressureResult } from '../../reduction/results.ts';
import { chooseUnit, plain } from '../../units/format.ts';
import { Quantity } from './Quantity.tsx';

export function FiredAt({ pressure: { absolute, least, largest, mixed, taps, outside, outsideFrom, likeVacuum } }: { readonly pressure: PressureResult }) {
  const unit = chooseUnit([absolute.value], 'pressure');
  return (
    <>
      {mixed
        ? <>Fired at {plain(least, unit, 3)} to {plain(largest, unit, 3)} absolute: not one condition.</>
        : <>Fired at <Quantity value={absolute.value} spread={absolute.u} unit={unit} /> absolute (± u).</>}
      {taps !== null && <>{' '}Tapped at <Quantity value={taps.value} spread={taps.u} unit={chooseUnit([taps.value], 'pressure')} />.</>}
      {outside !== null && outsideFrom === 'height' && <>{' '}Outside <Quantity value={outside.value} spread={outside.u} unit={chooseUnit([outside.value], 'pressure')} />, by the height and the standard atmosphere.</>}
      {!likeVacuum && <strong>{' '}Not a vacuum figure.</strong>}
    </>
  );
}
