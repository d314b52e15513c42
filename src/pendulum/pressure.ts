/** Absolute pressure from what a gauge shows, and the station pressure where no barometer was read. */

/** Pa. Source: definition of the standard atmosphere. */
export const STANDARD_ATMOSPHERE = 101_325;

/**
 * What the number on the gauge means. percentOfScale: percent of a fixed full scale below the outside pressure (most
 * dials: 101.325 kPa, 29.92 inHg); percentOfOutside: percent of the outside pressure itself.
 */
export type GaugeMeaning = 'absolute' | 'gauge' | 'percentOfScale' | 'percentOfOutside';

export interface GaugeReading {
  readonly meaning: GaugeMeaning;
  /** Pa (gauge: negative below the outside); percent where the meaning says so. */
  readonly reading: number;
  /** Station pressure, Pa; not used for 'absolute'. */
  readonly outside: number;
  /** Full scale of the dial, Pa; used for 'percentOfScale'. */
  readonly fullScale: number;
}

/** belowZero: dial, scale and barometer contradict each other (or the dial is no better than that); `pressure` as computed, ≤ 0. */
export interface AbsolutePressure {
  readonly status: 'found' | 'belowZero';
  readonly pressure: number;
}

/**
 * Absolute pressure, Pa: p; p_out + p_gauge; p_out − (pct/100) p_FS; p_out (1 − pct/100).
 *
 * Valid: outside and full scale > 0 Pa where they are used.
 * Source: methods 1.15; common practice.
 * @throws RangeError outside.
 */
export function absolutePressure({ meaning, reading, outside, fullScale }: GaugeReading): AbsolutePressure {
  if (!Number.isFinite(reading) || (meaning !== 'absolute' && !(outside > 0)) || (meaning === 'percentOfScale' && !(fullScale > 0))) {
    throw new RangeError(`pressure: reading ${reading}, outside ${outside} Pa, full scale ${fullScale} Pa`);
  }
  const pressure = pressureOf({ meaning, reading, outside, fullScale });
  return { status: pressure > 0 ? 'found' : 'belowZero', pressure };
}

function pressureOf({ meaning, reading, outside, fullScale }: GaugeReading): number {
  switch (meaning) {
    case 'absolute':
      return reading;
    case 'gauge':
      return outside + reading;
    case 'percentOfScale':
      return outside - (reading / 100) * fullScale;
    case 'percentOfOutside':
      return outside * (1 - reading / 100);
  }
}

/** Standard uncertainty of a dial of an accuracy class (percent of full scale, limits): class/100 × p_FS/√3, Pa. Source: EN 837-1 classes 1.6, 2.5 (from memory); GUM 4.3.7. */
export function dialUncertainty({ accuracyClass, fullScale }: Readonly<Record<'accuracyClass' | 'fullScale', number>>): number {
  if (!(accuracyClass >= 0 && fullScale > 0)) throw new RangeError(`dial: class ${accuracyClass}, full scale ${fullScale} Pa`);
  return ((accuracyClass / 100) * fullScale) / Math.sqrt(3);
}

/** Radius with which the standard atmosphere turns height into geopotential height, m. */
const EARTH_RADIUS = 6_356_766;
const SEA_LEVEL_TEMPERATURE = 288.15;
/** K/m of geopotential height. */
const LAPSE = 0.0065;
const GRAVITY = 9.80665;
/** R* = 8314.32 J/(kmol·K) and 28.9644 kg/kmol of that standard. */
const GAS_CONSTANT = 8314.32 / 28.9644;

/**
 * Pressure of the standard atmosphere at a geopotential height H: 101 325 (1 − 0.0065 H/288.15)^{g₀/(R·0.0065)} Pa.
 *
 * Valid: −500 … 11 000 m. Source: US Standard Atmosphere 1976 = ISO 2533:1975 below 32 km.
 * @throws RangeError outside.
 */
export function standardPressure(geopotentialHeight: number): number {
  if (!(geopotentialHeight >= -500 && geopotentialHeight <= 11_000)) throw new RangeError(`standard atmosphere: ${geopotentialHeight} m is not in −500 … 11 000 m`);
  return STANDARD_ATMOSPHERE * (1 - (LAPSE * geopotentialHeight) / SEA_LEVEL_TEMPERATURE) ** (GRAVITY / (GAS_CONSTANT * LAPSE));
}

/** H = r h/(r + h): geopotential height of a height above the sea, m. */
export const geopotentialHeight = (height: number): number => (EARTH_RADIUS * height) / (EARTH_RADIUS + height);

/** Standard deviation of the pressure at sea level about the standard one by the weather, middle latitudes, Pa. Common practice, no source. */
export const WEATHER = 1000;

/**
 * Station pressure where only the height is known, with its standard uncertainty, Pa: the standard atmosphere and the
 * weather, which shrinks with the pressure.
 *
 * Valid: h −500 … 11 000 m above the sea. A forecast's "sea-level" pressure is no station pressure.
 */
export function stationPressureOfHeight(height: number): { readonly pressure: number; readonly u: number } {
  const pressure = standardPressure(geopotentialHeight(height));
  return { pressure, u: (WEATHER * pressure) / STANDARD_ATMOSPHERE };
}

/** Station pressure from one reduced to sea level, by the ratio of the standard atmosphere at that height. Valid: as standardPressure. */
export const stationOfSeaLevel = ({ seaLevel, height }: Readonly<Record<'seaLevel' | 'height', number>>): number =>
  (seaLevel * standardPressure(geopotentialHeight(height))) / STANDARD_ATMOSPHERE;

/** Above this pressure the plume drives gas at the target, and the figure is no vacuum impulse bit. Pa; a judgement, the user's to change. */
export const COMPARABLE_WITH_VACUUM_BELOW = 0.1;
