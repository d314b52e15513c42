/** Where to hang a calibration mass, with the period that it would make there and how well that tells J. */
import type { PlannedMass } from '../../reduction/planMass.ts';
import { chooseUnit, plain } from '../../units/format.ts';
import { siUnit } from '../../units/units.ts';
import { PERCENT, PLAIN } from '../stated/numberWords.ts';
import { Quantity } from '../stated/Quantity.tsx';
import { SheetTable } from '../stated/SheetTable.tsx';
import styles from './plan.module.css';

const DIGITS = 3;
const SECONDS = siUnit('time');
const length = (value: number): string => plain(value, chooseUnit([value], 'length'), DIGITS);

export function MassPlaces({ mass: { mass, massTaken, period, unchangedAt, timing, timingTaken, places } }: { readonly mass: PlannedMass }) {
  return (
    <>
      <p className={styles.words}>
        A calibration mass of {plain(mass, chooseUnit([mass], 'mass'), DIGITS)}{massTaken && ' (taken, as none is typed)'} makes J known from two periods, without it{' '}
        <Quantity value={period.value} spread={period.u} unit={SECONDS} />.
        {unchangedAt !== null && <> Hung {length(unchangedAt)} below the pivot it leaves the period as it is and tells nothing: well above or well below. A pair on a cross-arm at pivot height, one on each side, is best.</>}
        {places.length === 0 && ' No place on this pendulum tells J: take a heavier one, or a cross-arm.'}
      </p>
      {places.length > 0 && (
        <SheetTable label="Where to hang a calibration mass">
          <caption>Where to hang it <span>each period timed to {plain(timing, PERCENT, 2)}{timingTaken && ' (taken)'}</span></caption>
          <thead>
            <tr>
              <th scope="col">Below the pivot</th><th scope="col">Period with it ± u</th><th scope="col">∂ln J/∂ln T with</th><th scope="col">∂ln J/∂ln T without</th><th scope="col">Leaves J known to</th>
            </tr>
          </thead>
          <tbody>
            {places.map((place) => (
              <tr key={place.distance}>
                <th scope="row" className="num">{length(place.distance)}</th>
                <td><Quantity value={place.period.value} spread={place.period.u} unit={SECONDS} /></td>
                <td className="num">{plain(place.toWith, PLAIN, 2)}</td>
                <td className="num">{plain(place.toWithout, PLAIN, 2)}</td>
                <td className="num">{plain(place.inertiaTo, PERCENT, 2)}</td>
              </tr>
            ))}
          </tbody>
        </SheetTable>
      )}
    </>
  );
}
