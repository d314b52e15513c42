/** What a hanging film is, in words beside its measures: regime, first maximum, the model's spread. */
import type { Reduction } from '../../reduction/results.ts';
import { chooseUnit, plain, withPlusMinus } from '../../units/format.ts';
import { siUnit, unitNamed } from '../../units/units.ts';

const ONE = siUnit('number');
const PERCENT = unitNamed('%', 'number') ?? ONE;
const DIGITS = 3;

export function FilmWords({ film }: { readonly film: Reduction['film'] }) {
  if (film === null) return null;
  return (
    <p className="quiet">
      The film is {film.regime}: stiffness number EI/(w′L³) {plain(film.stiffnessNumber.value, ONE, DIGITS)}, first-mode period{' '}
      {plain(film.period, chooseUnit([film.period], 'time'), DIGITS)}, first maximum at {plain(film.quarters, ONE, DIGITS)} of a quarter period. Read as a rigid strip it would
      come out {plain(film.overRigid, ONE, DIGITS)} times as large. Spread of the model {plain(film.spread, PERCENT, 2)} (u), common to all shots; taps in place do away with it.
      {film.contact !== null && (
        <>
          {' '}A tap strikes {plain(film.contact.length, chooseUnit([film.contact.length], 'length'), 2)} of it{film.contact.typed ? '' : ' (2 % of its length, taken)'}, the plume its zone: the factor by taps
          is multiplied by {withPlusMinus(film.contact.change.value, film.contact.change.u, ONE)} (± u) for that.
        </>
      )}
    </p>
  );
}
