/** The closed table of units that people write at a pendulum, each as its number of SI units. */
import { unitKeys } from './unit-spelling.ts';

export type Dimension =
  | 'length' | 'mass' | 'angle' | 'latitude' | 'time' | 'impulse' | 'angularImpulse' | 'pressure' | 'voltage'
  | 'momentOfInertia' | 'rotationalStiffness' | 'angularFrequency' | 'calibrationFactor' | 'acceleration' | 'number'
  | 'pixel' | 'count' | 'pixelScale' | 'stiffness' | 'force' | 'celsius' | 'density' | 'modulus' | 'capacitance' | 'resistance' | 'magneticFluxDensity' | 'sensorSlope' | 'frequency';

/** One unit; value in SI units = value × times / per, so that decimal factors are correctly rounded. */
export interface Unit {
  /** As shown on screen and in files: `mN·s`. */
  readonly symbol: string;
  readonly dimension: Dimension;
  readonly times: number;
  readonly per: number;
  /** SI units in one of it: times / per. */
  readonly factor: number;
}

/** symbol, times, per, further spellings beyond those that unit-spelling.ts derives from the symbol. */
type Row = readonly [symbol: string, times: number, per: number, ...spellings: string[]];

/**
 * lb = 0.453 592 37 kg, g_n = 9.806 65 m/s², in = 0.0254 m, all exact; lbf = lb·g_n.
 * Source: NIST SP 811 (2008), Appendix B.8, and the SI Brochure (9th ed.), Tables 8 and 9.
 */
const LBF_TIMES = 44482216152605;
const LBF_PER = 1e13;

/** SI unit first in each list. */
const ROWS: Readonly<Record<Dimension, readonly Row[]>> = {
  length: [
    ['m', 1, 1], ['cm', 1, 1e2], ['mm', 1, 1e3], ['µm', 1, 1e6], ['nm', 1, 1e9],
    ['in', 254, 1e4, '"'], ['mil', 254, 1e7, 'thou'], ['ft', 3048, 1e4, "'"],
  ],
  mass: [
    ['kg', 1, 1], ['g', 1, 1e3], ['mg', 1, 1e6], ['µg', 1, 1e9],
    ['lb', 45359237, 1e8], ['oz', 45359237, 16e8], ['grain', 6479891, 1e11],
  ],
  angle: [
    ['rad', 1, 1], ['mrad', 1, 1e3], ['µrad', 1, 1e6],
    ['°', Math.PI, 180], ['′', Math.PI, 10800, 'arcmin'], ['″', Math.PI, 648000, 'arcsec'],
  ],
  time: [['s', 1, 1], ['ms', 1, 1e3], ['µs', 1, 1e6], ['min', 60, 1]],
  impulse: [
    ['N·s', 1, 1], ['mN·s', 1, 1e3], ['µN·s', 1, 1e6], ['nN·s', 1, 1e9],
    ['kg·m/s', 1, 1], ['g·m/s', 1, 1e3], ['g·cm/s', 1, 1e5], ['g·mm/s', 1, 1e6], ['dyn·s', 1, 1e5],
    ['gf·s', 980665, 1e8], ['kgf·s', 980665, 1e5], ['pdl·s', 138254954376, 1e12],
    ['lbf·s', LBF_TIMES, LBF_PER, 'lb·s'], ['ozf·s', LBF_TIMES, 16 * LBF_PER],
  ],
  angularImpulse: [
    ['N·m·s', 1, 1, 'kg·m²/s'], ['mN·m·s', 1, 1e3], ['µN·m·s', 1, 1e6], ['nN·m·s', 1, 1e9],
  ],
  pressure: [
    ['Pa', 1, 1], ['mPa', 1, 1e3], ['hPa', 100, 1], ['kPa', 1e3, 1],
    ['bar', 1e5, 1], ['mbar', 100, 1], ['µbar', 1, 10],
    ['Torr', 101325, 760], ['mTorr', 101325, 760e3], ['mmHg', 133322387415, 1e9, 'mm Hg'], ['inHg', 133322387415 * 25.4, 1e9, 'in Hg'],
    ['atm', 101325, 1], ['psi', LBF_TIMES, LBF_PER * 0.0254 ** 2, 'lbf/in²', 'lb/in²'],
    // A dial that counts down from the outside pressure, hence the negative factors.
    ['−kPa', -1e3, 1], ['−mbar', -100, 1], ['−mmHg', -133322387415, 1e9], ['−inHg', -133322387415 * 25.4, 1e9],
  ],
  voltage: [['V', 1, 1], ['kV', 1e3, 1], ['mV', 1, 1e3]],
  momentOfInertia: [
    ['kg·m²', 1, 1], ['g·m²', 1, 1e3], ['kg·mm²', 1, 1e6], ['g·cm²', 1, 1e7], ['g·mm²', 1, 1e9], ['kg·cm²', 1, 1e4],
  ],
  rotationalStiffness: [
    ['N·m/rad', 1, 1, 'N·m'], ['mN·m/rad', 1, 1e3, 'mN·m'], ['µN·m/rad', 1, 1e6, 'µN·m'],
    ['N·mm/rad', 1, 1e3, 'N·mm'], ['N·m/°', 180, Math.PI], ['mN·m/°', 0.18, Math.PI],
  ],
  angularFrequency: [['rad/s', 1, 1, '1/s'], ['mrad/s', 1, 1e3], ['°/s', Math.PI, 180]],
  calibrationFactor: [
    ['N·m·s/rad', 1, 1, 'N·m/(rad/s)', 'N·m·s'], ['mN·m·s/rad', 1, 1e3, 'mN·m/(rad/s)', 'mN·m·s'],
    ['µN·m·s/rad', 1, 1e6, 'µN·m/(rad/s)', 'µN·m·s'],
  ],
  acceleration: [['m/s²', 1, 1, 'N/kg'], ['mm/s²', 1, 1e3], ['cm/s²', 1, 1e2], ['Gal', 1, 1e2], ['mGal', 1, 1e5]],
  number: [['1', 1, 1], ['%', 1, 1e2], ['‰', 1, 1e3], ['ppm', 1, 1e6]],
  pixel: [['px', 1, 1]],
  count: [['counts', 1, 1]],
  pixelScale: [['px/m', 1, 1], ['px/mm', 1e3, 1], ['px/cm', 1e2, 1]],
  stiffness: [['N/m', 1, 1], ['mN/m', 1, 1e3], ['N/mm', 1e3, 1], ['mN/mm', 1, 1], ['µN/mm', 1, 1e3]],
  force: [['N', 1, 1], ['mN', 1, 1e3], ['µN', 1, 1e6], ['gf', 980665, 1e8], ['mgf', 980665, 1e11]],
  celsius: [['°C', 1, 1, 'C']],
  capacitance: [['F', 1, 1], ['mF', 1, 1e3], ['µF', 1, 1e6], ['nF', 1, 1e9]],
  resistance: [['Ω', 1, 1, 'ohm'], ['mΩ', 1, 1e3, 'mohm'], ['kΩ', 1e3, 1, 'kohm']],
  magneticFluxDensity: [['T', 1, 1], ['mT', 1, 1e3], ['µT', 1, 1e6]],
  frequency: [['Hz', 1, 1, '1/s'], ['kHz', 1000, 1], ['mHz', 1, 1000], ['1/min', 1, 60]],
  sensorSlope: [['m/V', 1, 1], ['mm/V', 1, 1e3], ['µm/V', 1, 1e6], ['µm/mV', 1, 1e3], ['in/V', 254, 1e4]],
  density: [['kg/m³', 1, 1], ['g/cm³', 1e3, 1]],
  modulus: [['Pa', 1, 1], ['kPa', 1e3, 1], ['MPa', 1e6, 1], ['GPa', 1e9, 1], ['N/mm²', 1e6, 1]],
  // South counts negative, hence the negative factor.
  latitude: [['rad', 1, 1], ['°', Math.PI, 180, '°·N', 'N'], ['° S', -Math.PI, 180, 'S']],
};

const DIMENSIONS = Object.keys(ROWS) as readonly Dimension[];

const UNITS: ReadonlyMap<Dimension, readonly Unit[]> = new Map(
  DIMENSIONS.map((dimension) => [
    dimension,
    ROWS[dimension].map(([symbol, times, per]): Unit => ({ symbol, dimension, times, per, factor: times / per })),
  ]),
);

/** Units by canonical key; more than one where dimensions share a sign (″ is an inch or a second of arc). */
const BY_KEY: ReadonlyMap<string, readonly Unit[]> = (() => {
  const byKey = new Map<string, Unit[]>();
  for (const dimension of DIMENSIONS) {
    ROWS[dimension].forEach(([symbol, , , ...spellings], index) => {
      const unit = UNITS.get(dimension)?.[index];
      if (unit === undefined) throw new Error(`unit table: no unit for ${symbol}`);
      for (const spelling of [symbol, ...spellings]) {
        for (const key of unitKeys(spelling)) {
          const units = byKey.get(key) ?? [];
          if (!units.includes(unit)) byKey.set(key, [...units, unit]);
        }
      }
    });
  }
  return byKey;
})();

/**
 * The unit that a person means by a text, or null where the table has none.
 *
 * Dots, exponents, both micro signs and English names are taken in every usual spelling; capitals count only where
 * they decide (mN is not MN, so `MN·s` and `Mm` are unknown). Without a dimension, a sign that several dimensions
 * share is the first of length, mass, angle, time, … that has it.
 */
export function unitNamed(text: string, dimension?: Dimension): Unit | null {
  const asked = `${dimension ?? ''}|${text}`;
  const known = ASKED.get(asked);
  if (known !== undefined) return known;
  const found = unitSpelled(text, dimension);
  if (ASKED.size >= ASKED_KEPT) ASKED.clear();
  ASKED.set(asked, found);
  return found;
}

/** A table asks for the unit of every cell, and there are few of them. */
const ASKED = new Map<string, Unit | null>();
const ASKED_KEPT = 2000;

function unitSpelled(text: string, dimension?: Dimension): Unit | null {
  for (const key of unitKeys(text)) {
    const unit = BY_KEY.get(key)?.find((one) => dimension === undefined || one.dimension === dimension);
    if (unit !== undefined) return unit;
  }
  return null;
}

/** All units of a dimension, the SI unit first. */
export function unitsOf(dimension: Dimension): readonly Unit[] {
  const units = UNITS.get(dimension);
  if (units === undefined) throw new Error(`unit table: no dimension ${String(dimension)}`);
  return units;
}

/** The coherent SI unit of a dimension (rad for angle and latitude, 1 for number). */
export function siUnit(dimension: Dimension): Unit {
  const unit = unitsOf(dimension)[0];
  if (unit === undefined) throw new Error(`unit table: ${dimension} has no units`);
  return unit;
}

/** A value in SI units, from its value in a unit. */
export function toSi(value: number, unit: Unit): number {
  return (value * unit.times) / unit.per;
}

/** A value in a unit, from its value in SI units. */
export function fromSi(value: number, unit: Unit): number {
  return (value * unit.per) / unit.times;
}
