/** Quantities as they are shown, value and uncertainty to the same decimals, and numbers for machine files. */
import { fromSi, siUnit, unitNamed } from './units.ts';
import type { Dimension, Unit } from './units.ts';

/** Digits of an uncertainty that are shown. Source: GUM (JCGM 100:2008) 7.2.6, "at most two significant digits". */
const UNCERTAINTY_DIGITS = 2;
/** Digits of a value that has no uncertainty. */
const PLAIN_DIGITS = 6;
/** Below this share of the value an uncertainty is rounding of the arithmetic and is shown as none. */
const LEAST_SHARE = 1e-13;
/** Outside 10^-3 … 10^6 a power of ten is set apart. */
const LEAST_EXPONENT = -3;
const GREATEST_EXPONENT = 5;

/** A power of ten set apart, value and uncertainty as decimals in it. */
interface Rounded {
  readonly value: string;
  /** '' where there is none. */
  readonly spread: string;
  /** Decimals of both. */
  readonly decimals: number;
  /** '×10⁻⁵', '' for none. */
  readonly power: string;
}

/** Decimal exponent of a number, after rounding to as many significant digits as given. */
function exponentOf(value: number, digits?: number): number {
  const [, exponent = '0'] = (digits === undefined ? value.toExponential() : value.toExponential(digits - 1)).split('e');
  return value === 0 ? 0 : Number(exponent);
}

/** value × 10^shift through its decimal form, so that no digit is lost. */
function shifted(value: number, shift: number): number {
  if (shift === 0) return value;
  const [mantissa = '0', exponent = '0'] = value.toExponential().split('e');
  return Number(`${mantissa}e${Number(exponent) + shift}`);
}

/** Fixed decimals; negative decimals round to tens, hundreds, …. The sign is '-', and zero has none. */
function fixed(value: number, decimals: number): string {
  const text = decimals >= 0 ? value.toFixed(decimals) : shifted(Number(shifted(value, decimals).toFixed(0)), -decimals).toFixed(0);
  return Number(text) === 0 ? text.replace('-', '') : text;
}

const onScreen = (text: string): string => text.replace('-', '−');

const SUPERSCRIPTS = '⁰¹²³⁴⁵⁶⁷⁸⁹';
const superscript = (exponent: number): string =>
  String(exponent).replace(/\d/g, (digit) => SUPERSCRIPTS.charAt(Number(digit))).replace('-', '⁻');

const powerOf = (exponent: number): string => (exponent === 0 ? '' : `×10${superscript(exponent)}`);

/** Power of ten set apart for a greatest magnitude, 0 for none. */
function setApart(magnitude: number): number {
  const exponent = exponentOf(magnitude);
  return exponent < LEAST_EXPONENT || exponent > GREATEST_EXPONENT ? exponent : 0;
}

/** Value and uncertainty in the unit, rounded together. */
function rounded(value: number, u: number, unit: Unit): Rounded {
  if (u < 0) throw new RangeError(`format a quantity: uncertainty ${u} is negative`);
  const inUnit = fromSi(value, unit);
  if (!Number.isFinite(inUnit)) return { value: '—', spread: '', decimals: 0, power: '' };
  const uInUnit = Math.abs(fromSi(u, unit));
  if (!Number.isFinite(uInUnit) || uInUnit <= LEAST_SHARE * Math.abs(inUnit)) return roundedAlone(inUnit, PLAIN_DIGITS);
  const power = setApart(Math.max(Math.abs(inUnit), uInUnit));
  const scaledValue = shifted(inUnit, -power);
  const scaledU = shifted(uInUnit, -power);
  // The decimals are those before rounding, so that 0.0996 becomes 0.100 and 0.0994 becomes 0.099.
  const decimals = Math.min(100, UNCERTAINTY_DIGITS - 1 - exponentOf(scaledU));
  return { value: fixed(scaledValue, decimals), spread: fixed(scaledU, decimals), decimals, power: powerOf(power) };
}

function roundedAlone(value: number, digits: number): Rounded {
  const power = setApart(value);
  const inPower = shifted(value, -power);
  const decimals = value === 0 ? 0 : digits - 1 - exponentOf(inPower, digits);
  const text = fixed(inPower, decimals);
  const trimmed = text.includes('.') ? text.replace(/\.?0+$/, '') : text;
  return { value: trimmed, spread: '', decimals: Math.max(0, decimals), power: powerOf(power) };
}

/** Unit after a number: no space before °, ′, ″; nothing for 1. Source: SI Brochure (9th ed.), 5.4.3. */
function unitAfter(unit: Unit): string {
  if (unit.symbol === '1') return '';
  return /^[°′″]$/.test(unit.symbol) ? unit.symbol : ` ${unit.symbol}`;
}

/** A sign that would seem to belong to the uncertainty alone: "5 ± 1 %" reads as 1 % of 5. */
const needsBrackets = (unit: Unit): boolean => /^[%‰°′″]$|^ppm$/.test(unit.symbol);

/**
 * Value with its standard uncertainty in brackets, in its last digits: `1.247(31) mN·s`.
 *
 * @param value SI
 * @param u SI, ≥ 0; 0 or not finite: the value alone to six significant digits
 * Source: GUM (JCGM 100:2008) 7.2.2 and 7.2.6.
 * @throws RangeError when u is negative
 */
export function shortNotation(value: number, u: number, unit: Unit): string {
  const shown = rounded(value, u, unit);
  if (shown.spread === '') return `${onScreen(shown.value)}${shown.power}${unitAfter(unit)}`;
  // An uncertainty with digits on both sides of the decimal sign keeps the sign: 12.3(1.2), as 12.3(12) is misread.
  const digits = Number(shown.spread) >= 1 ? shown.spread : shown.spread.replace(/^0?\.0*/, '');
  return `${onScreen(shown.value)}(${digits})${shown.power}${unitAfter(unit)}`;
}

/**
 * Value with a half-width after ±: `1.247 ± 0.031 mN·s`; the reader of the page is told what the ± means.
 *
 * @param value SI
 * @param halfwidth SI, ≥ 0; 0 or not finite: the value alone to six significant digits
 * @throws RangeError when the half-width is negative
 */
export function withPlusMinus(value: number, halfwidth: number, unit: Unit): string {
  const shown = rounded(value, halfwidth, unit);
  if (shown.spread === '') return `${onScreen(shown.value)}${shown.power}${unitAfter(unit)}`;
  const both = `${onScreen(shown.value)} ± ${shown.spread}`;
  const bracketed = shown.power !== '' || needsBrackets(unit) ? `(${both})` : both;
  return `${bracketed}${shown.power}${unitAfter(unit)}`;
}

/** A value (SI) in a unit to so many significant digits, without trailing zeros: `9.80665 m/s²`. */
export function plain(value: number, unit: Unit, significant = PLAIN_DIGITS): string {
  const inUnit = fromSi(value, unit);
  if (!Number.isFinite(inUnit)) return `—${unitAfter(unit)}`;
  const shown = roundedAlone(inUnit, significant);
  return `${onScreen(shown.value)}${shown.power}${unitAfter(unit)}`;
}

/** Parts of a shown quantity, for a column aligned at the decimal sign. */
export interface AlignedParts {
  /** Sign and digits before the decimal sign: '−1'. */
  readonly whole: string;
  /** Decimal sign and the digits after it, '.247'; '' for none. */
  readonly fraction: string;
  /** Uncertainty to the same decimals, '0.031'; '' for none. */
  readonly spread: string;
  /** Power of ten, if any, and unit: 'mN·s', '×10⁻⁵ N·s'. */
  readonly unit: string;
}

/** A value and its uncertainty (SI) in parts. @throws RangeError when u is negative */
export function alignedParts(value: number, u: number, unit: Unit): AlignedParts {
  const shown = rounded(value, u, unit);
  const [whole = '', fraction] = onScreen(shown.value).split('.');
  return {
    whole,
    fraction: fraction === undefined ? '' : `.${fraction}`,
    spread: shown.spread,
    unit: `${shown.power}${unitAfter(unit)}`.trim(),
  };
}

/** Six significant digits: for what an adjustment's slopes by differences tell, whose last digits differ from engine to engine. */
export const sixDigits = (value: number): string => tenDigits(Number(value.toPrecision(6)));

/**
 * A number for machine files: rounded to 10 significant digits, written as the shortest text that reads back as the
 * rounded number (no trailing zeros; `1.234e-7` outside 1e-6 … 1e21), with '-' and '.', the same bytes from engines whose results
 * differ in a last bit. Infinity is `Infinity`.
 *
 * @throws RangeError for NaN
 */
export function tenDigits(value: number): string {
  if (Number.isNaN(value)) throw new RangeError('write a number: it is NaN');
  return String(Number(value.toPrecision(10)));
}

/** Units that a column is shown in, rising; the usual one, for a column without numbers, first apart. */
const FAMILIES: Readonly<Record<Dimension, readonly [usual: string, ...family: string[]]>> = {
  length: ['mm', 'nm', 'µm', 'mm', 'm'],
  mass: ['g', 'µg', 'mg', 'g', 'kg'],
  angle: ['mrad', 'µrad', 'mrad', 'rad'],
  latitude: ['°', '°'],
  time: ['s', 'µs', 'ms', 's'],
  impulse: ['mN·s', 'nN·s', 'µN·s', 'mN·s', 'N·s'],
  angularImpulse: ['mN·m·s', 'nN·m·s', 'µN·m·s', 'mN·m·s', 'N·m·s'],
  pressure: ['Pa', 'mPa', 'Pa', 'kPa'],
  voltage: ['V', 'mV', 'V', 'kV'],
  momentOfInertia: ['g·m²', 'g·mm²', 'kg·mm²', 'g·m²', 'kg·m²'],
  rotationalStiffness: ['mN·m/rad', 'µN·m/rad', 'mN·m/rad', 'N·m/rad'],
  angularFrequency: ['rad/s', 'rad/s'],
  calibrationFactor: ['mN·m·s/rad', 'µN·m·s/rad', 'mN·m·s/rad', 'N·m·s/rad'],
  acceleration: ['m/s²', 'mm/s²', 'm/s²'],
  frequency: ['Hz', 'mHz', 'Hz', 'kHz'],
  sensorSlope: ['mm/V', 'µm/V', 'mm/V', 'm/V'],
  number: ['1', '1'],
  pixel: ['px', 'px'],
  count: ['counts', 'counts'],
  pixelScale: ['px/mm', 'px/mm'],
  stiffness: ['mN/mm', 'mN/m', 'N/m', 'N/mm'],
  force: ['mN', 'µN', 'mN', 'N'],
  celsius: ['°C', '°C'],
  density: ['kg/m³', 'kg/m³'],
  modulus: ['GPa', 'Pa', 'kPa', 'MPa', 'GPa'],
  capacitance: ['µF', 'nF', 'µF', 'mF', 'F'],
  resistance: ['Ω', 'mΩ', 'Ω', 'kΩ'],
  magneticFluxDensity: ['µT', 'µT', 'mT', 'T'],
};

/** The unit in which the median magnitude of the values (SI, zeros and non-finite ones left out) lies in 1 … 1000. */
export function chooseUnit(values: readonly number[], dimension: Dimension): Unit {
  const [usual, ...family] = FAMILIES[dimension];
  const magnitudes = values.map(Math.abs).filter((one) => one > 0 && Number.isFinite(one)).sort((a, b) => a - b);
  const median = magnitudes[Math.floor(magnitudes.length / 2)];
  if (median === undefined) return named(usual, dimension);
  const rising = family.map((symbol) => named(symbol, dimension));
  return rising.findLast((unit) => fromSi(median, unit) >= 1) ?? rising[0] ?? siUnit(dimension);
}

function named(symbol: string, dimension: Dimension): Unit {
  const unit = unitNamed(symbol, dimension);
  if (unit === null) throw new Error(`choose a unit: ${symbol} is no unit of ${dimension}`);
  return unit;
}
