/** Bare numbers as the sections print them: degrees of freedom, coverage factors, ratios, counts of uncertainties. */
import { alignedParts } from '../../units/format.ts';
import { siUnit, unitNamed } from '../../units/units.ts';
import type { Unit } from '../../units/units.ts';

export const PLAIN: Unit = siUnit('number');
export const PERCENT: Unit = unitNamed('%', 'number') ?? PLAIN;

/** From here on Student's t is the normal one to the digits shown. */
const MANY = 10_000;

/** ν, effective degrees of freedom: cut to the whole below (GUM G.4.1 note 1, from memory), ∞ from ten thousand on. */
export function degreesOfFreedom(dof: number): string {
  return dof >= MANY ? '∞' : String(Math.floor(dof));
}

export const coverageFactor = (k: number): string => k.toFixed(2);

/** "1.4", "−0.3": how many standard uncertainties. */
export function timesU(count: number): string {
  const text = count.toFixed(1);
  return Number(text) === 0 ? '0.0' : text.replace('-', '−');
}

/** A correcting factor with the digits that a correction needs. */
export const correctingFactor = (factor: number): string => factor.toFixed(5);

/** A value (SI) to the decimals that two digits of its uncertainty need, with its unit. */
export function roundedAs(value: number, spread: number, unit: Unit): string {
  const { whole, fraction, unit: after } = alignedParts(value, spread, unit);
  return `${whole}${fraction}${after === '' ? '' : `\u00A0${after}`}`;
}
