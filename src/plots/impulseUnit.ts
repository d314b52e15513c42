/** The one unit in which a reduction's impulse bits are shown. */
import type { Reduction } from '../reduction/results.ts';
import { chooseUnit } from '../units/format.ts';
import type { Unit } from '../units/units.ts';

/** Fits the run mean; before there is one, the median impulse bit. */
export function impulseUnit({ run, records }: Pick<Reduction, 'run' | 'records'>): Unit {
  return chooseUnit(run === null ? records.map(({ impulseBit }) => impulseBit?.value ?? 0) : [run.mean.value], 'impulse');
}
