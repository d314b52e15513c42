/** The impulse table as tab-separated text, as it is pasted into a spreadsheet. */
import type { RecordResult } from '../../reduction/results.ts';
import { tenDigits } from '../../units/format.ts';
import { fromSi, siUnit, unitNamed } from '../../units/units.ts';
import type { Unit } from '../../units/units.ts';

const ANGLE: Unit = unitNamed('mrad', 'angle') ?? siUnit('angle');

/** Characters that make a spreadsheet take a cell for a formula; a leading apostrophe keeps the cell a text. */
const FORMULA = /^[=+\-@\t\r]/;

/** One cell of words: no tab or line end in it, and no formula. */
function words(text: string): string {
  const flat = text.replaceAll(/[\t\r\n]+/g, ' ');
  return FORMULA.test(flat) && Number.isNaN(Number(flat)) ? `'${flat}` : flat;
}

const number = (value: number | undefined, unit: Unit): string => (value === undefined ? '' : tenDigits(fromSi(value, unit)));

/** Numbers to ten digits with a decimal point; empty cells where there is none. */
export function tableText(records: readonly RecordResult[], unit: Unit): string {
  const head = [
    'Record', 'Kind', `First swing (${ANGLE.symbol})`, `u (${ANGLE.symbol})`, `Impulse bit (${unit.symbol})`, `u (${unit.symbol})`, `U (${unit.symbol})`, 'k', 'Set aside', 'Note',
  ];
  const rows = records.map(({ label, order, kind, angle, impulseBit, setAside, note }) => [
    words(label === '' ? String(order) : label),
    kind,
    number(angle?.value, ANGLE),
    number(angle?.u, ANGLE),
    number(impulseBit?.value, unit),
    number(impulseBit?.u, unit),
    number(impulseBit?.U, unit),
    impulseBit === null ? '' : tenDigits(impulseBit.k),
    words(setAside ?? ''),
    words(note),
  ]);
  return [head, ...rows].map((cells) => cells.join('\t')).join('\r\n');
}
