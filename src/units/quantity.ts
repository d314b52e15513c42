/** Numbers and quantities as a person types them, "118.0 ± 0.3 mm" or "12,5 g", to SI values. */
import { plainText } from './unit-spelling.ts';
import { toSi, unitNamed } from './units.ts';
import type { Dimension, Unit } from './units.ts';

export type DecimalMark = '.' | ',';

export type QuantityFault = 'empty' | 'notANumber' | 'unknownUnit' | 'wrongDimension' | 'badSpread';

export type QuantityRead =
  | {
    readonly ok: true;
    /** SI. */
    readonly value: number;
    /** SI, not negative; what follows ± or stands in brackets, not interpreted; null where there is none. */
    readonly spread: number | null;
    /** The value's unit. */
    readonly unit: Unit;
    /** No unit was typed and the usual one was taken. */
    readonly unitAssumed: boolean;
    /** Decimals typed, in `unit`; 0 for "1.2e3". */
    readonly decimals: number;
    /**
     * One comma before exactly three digits, "1,234", read as a decimal comma though it may group thousands; or the
     * spread has the other mark ("1,234 ± 0.5", read as 1234). False where `decimal` is given.
     */
    readonly ambiguousComma: boolean;
  }
  | { readonly ok: false; readonly fault: QuantityFault; readonly found: string };

/** A run of digits with marks and groups between, perhaps a number. */
const BODY = String.raw`[+-]? ?(?:\d|[.,]\d)(?:[\d.,]|['’](?=\d{3}(?!\d)))*`;
/** A power of ten: e-3, ·10^-3, ×10⁻³, x10-3. */
const POWER = String.raw`[eE][+-]?\d+(?!\d)| ?[×·⋅∙*xX] ?10(?: ?\^ ?\(?[+-]?\d+\)?|[+-]\d+)(?!\d)`;
const PLUS_MINUS = /±|\+ ?\/ ?-|\+ ?-/;

const BARE = new RegExp(`^(${BODY})(${POWER})?$`);
const VALUE = new RegExp(`^(${BODY})(?: ?\\( ?([\\d.,]+) ?\\))?(${POWER})?`);
const SPREAD = new RegExp(`^(${BODY})(${POWER})?`);
const IN_BRACKETS = new RegExp(`^\\(([^()]*(?:\\([\\d.,]+\\)[^()]*)?)\\)(${POWER})?`);

/** A decimal number as typed: its digits with a point, and how many follow it. */
interface Digits {
  readonly text: string;
  readonly decimals: number;
}

/** Digits in groups of three before the decimal mark: "1,234,567", never "0,123". */
function isGrouped(text: string, mark: string): boolean {
  const [first = '', ...groups] = text.split(mark);
  return /^[1-9]\d{0,2}$/.test(first) && groups.length > 0 && groups.every((group) => /^\d{3}$/.test(group));
}

/** The decimal mark that a number's own digits prove, if they do. */
function provenMark(body: string): DecimalMark | null {
  const digits = body.replace(/[+ '’-]/g, '');
  const points = digits.split('.').length - 1;
  const commas = digits.split(',').length - 1;
  if (points > 0 && commas > 0) return digits.lastIndexOf('.') > digits.lastIndexOf(',') ? '.' : ',';
  if (points > 1) return ',';
  if (commas > 1) return '.';
  if (points === 1 && !isGrouped(digits, '.')) return '.';
  return commas === 1 && !isGrouped(digits, ',') ? ',' : null;
}

/** Digits of a body, or null where its marks and groups are no number. */
function readDigits(body: string, decimal: DecimalMark | undefined): Digits | null {
  const [, sign = '', unsigned = ''] = /^([+-]?) ?(.*)$/.exec(body) ?? [];
  const mark = decimal ?? provenMark(body) ?? (unsigned.includes(',') ? ',' : '.');
  const pieces = unsigned.split(mark);
  const [spaced = '', fraction = ''] = pieces;
  if (pieces.length > 2 || /[.,'’]/.test(fraction)) return null;
  const separators = new Set(spaced.match(/[^\d]/g));
  const [separator] = separators;
  if (separators.size > 1 || (separator !== undefined && !isGrouped(spaced, separator))) return null;
  const whole = spaced.replace(/\D/g, '');
  if (whole === '' && fraction === '') return null;
  return { text: `${sign === '-' ? '-' : ''}${whole === '' ? '0' : whole}.${fraction === '' ? '0' : fraction}`, decimals: fraction.length };
}

/** Exponent of a typed power of ten, 0 for none. */
function exponentOf(power: string | undefined): number {
  if (power === undefined) return 0;
  const exponent = /^[eE]/.test(power) ? power.slice(1) : power.replace(/^ ?. ?10 ?\^? ?\(?/, '').replace(')', '');
  return Number(exponent);
}

/** Digits times a power of ten, correctly rounded; null where it overflows. */
function scaled(digits: Digits, exponent: number): number | null {
  const value = Number(`${digits.text}e${exponent}`);
  if (!Number.isFinite(value)) return null;
  return value === 0 ? 0 : value;
}

/**
 * A number from a bare cell; null where it is none (a word, a unit, hexadecimal, Infinity, nothing).
 *
 * Without `decimal` a single comma is a decimal comma, and with both marks the later one is the decimal mark. With it,
 * the other mark may only group thousands, so that "12,5" under a decimal point is no number.
 */
export function readNumber(text: string, decimal?: DecimalMark): number | null {
  const match = BARE.exec(typedText(text));
  if (match?.[1] === undefined) return null;
  const digits = readDigits(match[1], decimal);
  return digits === null ? null : scaled(digits, exponentOf(match[2]));
}

/** Text with thin and no-break spaces between groups of three as apostrophes; an ordinary space parts two numbers. */
function typedText(text: string): string {
  return plainText(text.replace(/(?<=\d)[\u00A0\u2007\u2009\u202F](?=\d{3}(?!\d))/g, "'"));
}

/** The parts of a typed quantity, before anything is converted. */
interface Parts {
  readonly body: string;
  /** Digits in brackets right after the value. */
  readonly short: string | undefined;
  readonly power: string | undefined;
  readonly unit: string;
  /** Text after ±, undefined where there is no ±. */
  readonly spread: string | undefined;
}

function partsOf(text: string): Parts | null {
  const match = VALUE.exec(text);
  if (match?.[1] === undefined) return null;
  const rest = text.slice(match[0].length).trim();
  const sign = PLUS_MINUS.exec(rest);
  const unit = sign === null ? rest : rest.slice(0, sign.index).trim();
  const spread = sign === null ? undefined : rest.slice(sign.index + sign[0].length).trim();
  return { body: match[1], short: match[2], power: match[3], unit, spread };
}

/** Spread as typed: number, unit text. */
interface TypedSpread {
  readonly number: number;
  readonly unit: string;
}

const isShare = (unit: Unit | null): unit is Unit => unit !== null && unit.dimension === 'number' && unit.symbol !== '1';

const refuse = (fault: QuantityFault, found: string): QuantityRead => ({ ok: false, fault, found });

/**
 * A quantity from what was typed: value, spread and unit in SI.
 *
 * Forms: `118.0 ± 0.3 mm` (also +/-, +-), `(118.0 ± 0.3) mm`, `118.0(3) mm`, `118.0(1.5) mm`, `11.8 cm ± 3 mm`,
 * `118 mm ± 1 %` (of the value), `(1.20 ± 0.02)e-3 N·s`, `1.20(2)×10⁻³ N·s`, a number alone.
 * A ± in % after a value without % is a part of the value, in every dimension.
 *
 * Source for digits in brackets: GUM (JCGM 100:2008) 7.2.2.
 * @throws RangeError when `unitIfNone` is no unit of the dimension
 */
export function readQuantity(text: string, dimension: Dimension, unitIfNone: string, decimal?: DecimalMark): QuantityRead {
  const usual = unitNamed(unitIfNone, dimension);
  if (usual === null) throw new RangeError(`read a quantity: ${unitIfNone} is no unit of ${dimension}`);
  let plain = typedText(text);
  if (plain === '') return refuse('empty', '');
  const late = /^([^(].*\S) ?\( ?((?:±|\+ ?\/? ?-).*)\)$/.exec(plain);
  if (late !== null) plain = `${late[1] ?? ''} ${late[2] ?? ''}`;

  const bracket = IN_BRACKETS.exec(plain);
  const parts = partsOf(bracket?.[1]?.trim() ?? plain);
  if (parts === null) return refuse('notANumber', text.trim());
  const outer = bracket === null ? '' : plain.slice(bracket[0].length).trim();
  if (outer !== '' && parts.unit !== '') return refuse('unknownUnit', outer);
  const outerExponent = exponentOf(bracket?.[2]);

  const spreadMatch = parts.spread === undefined ? null : SPREAD.exec(parts.spread);
  const spreadBody = spreadMatch?.[1] ?? parts.short;
  const mark = decimal ?? agreedMark(parts.body, spreadBody);
  const digits = readDigits(parts.body, mark);
  if (digits === null) return refuse('notANumber', text.trim());
  const exponent = exponentOf(parts.power) + outerExponent;
  const number = scaled(digits, exponent);
  if (number === null) return refuse('notANumber', text.trim());

  const spread = typedSpread(parts, spreadMatch, mark, digits, exponent, outerExponent);
  if (spread === 'bad') return refuse('badSpread', parts.spread || parts.short || text.trim());

  const typedUnit = parts.unit !== '' ? parts.unit : outer;
  const spreadUnit = spread === null ? '' : spread.unit;
  const spreadIsShare = spreadUnit !== '' && isShare(unitNamed(spreadUnit));
  const valueUnit = typedUnit === '' && !spreadIsShare ? spreadUnit : typedUnit;
  const unit = valueUnit === '' ? usual : unitNamed(valueUnit, dimension);
  if (unit === null) return refuseUnit(valueUnit, text);
  const value = toSi(number, unit);

  const spreadSi = spread === null ? null : spreadInSi(spread, value, unit, dimension);
  if (spreadSi !== null && typeof spreadSi !== 'number') return spreadSi;
  return {
    ok: true,
    value,
    spread: spreadSi,
    unit,
    unitAssumed: valueUnit === '',
    decimals: Math.max(0, digits.decimals - exponent),
    ambiguousComma: decimal === undefined && mayGroup(parts.body, mark),
  };
}

/** The decimal mark that the value proves, or else the spread; undefined where neither does. */
function agreedMark(body: string, spreadBody: string | undefined): DecimalMark | undefined {
  return provenMark(body) ?? (spreadBody === undefined ? null : provenMark(spreadBody)) ?? undefined;
}

/** A value's only mark may be the decimal mark or group thousands, and the spread does not confirm it as decimal. */
function mayGroup(body: string, mark: DecimalMark | undefined): boolean {
  if (provenMark(body) !== null) return false;
  const digits = body.replace(/[+ -]/g, '');
  return (isGrouped(digits, ',') && mark !== ',') || (isGrouped(digits, '.') && mark === ',');
}

function typedSpread(
  parts: Parts,
  match: RegExpExecArray | null,
  mark: DecimalMark | undefined,
  valueDigits: Digits,
  exponent: number,
  outerExponent: number,
): TypedSpread | null | 'bad' {
  if (parts.spread !== undefined) {
    if (parts.short !== undefined || match?.[1] === undefined) return 'bad';
    const digits = readDigits(match[1], mark);
    const number = digits === null ? null : scaled(digits, exponentOf(match[2]) + outerExponent);
    if (number === null || number < 0 || match[1].startsWith('-')) return 'bad';
    return { number, unit: parts.spread.slice(match[0].length).trim() };
  }
  if (parts.short === undefined) return null;
  const digits = readDigits(parts.short, mark);
  if (digits === null) return 'bad';
  const places = /^\d+$/.test(parts.short) ? exponent - valueDigits.decimals : exponent;
  const number = scaled(digits, places);
  return number === null ? 'bad' : { number, unit: '' };
}

/** The spread in SI; in the value's unit where it has none, a part of the value where it is in % and the value is not. */
function spreadInSi(spread: TypedSpread, value: number, unit: Unit, dimension: Dimension): number | QuantityRead {
  if (spread.unit === '') return Math.abs(toSi(spread.number, unit));
  const share = unitNamed(spread.unit, 'number');
  if (isShare(share) && !isShare(unit)) return Math.abs(value) * toSi(spread.number, share);
  const own = unitNamed(spread.unit, dimension);
  return own === null ? refuseUnit(spread.unit, spread.unit) : Math.abs(toSi(spread.number, own));
}

function refuseUnit(unitText: string, text: string): QuantityRead {
  if (/^[-+.,\d]/.test(unitText)) return refuse('notANumber', text.trim());
  return refuse(unitNamed(unitText) === null ? 'unknownUnit' : 'wrongDimension', unitText);
}
