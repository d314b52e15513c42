/** A quantity within a sentence or as an answer: value ± uncertainty, the unit lighter. */
import { alignedParts } from '../../units/format.ts';
import type { Unit } from '../../units/units.ts';

interface Props {
  /** SI. */
  readonly value: number;
  /** u or U, SI; the words beside it say which. 0 for none. */
  readonly spread: number;
  readonly unit: Unit;
}

export function Quantity({ value, spread, unit }: Props) {
  const parts = alignedParts(value, spread, unit);
  const bracketed = parts.spread !== '' && (parts.unit.startsWith('×') || parts.unit === '%');
  return (
    <span className="num">
      {bracketed ? '(' : ''}{parts.whole}{parts.fraction}{parts.spread === '' ? '' : ` ± ${parts.spread}`}{bracketed ? ')' : ''}
      {parts.unit !== '' && <span className="unit">{'\u00A0'}{parts.unit}</span>}
    </span>
  );
}
