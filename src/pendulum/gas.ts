/** The gas about a light strip: its density, viscosity and mean free path, and what it adds to inertia, stiffness and damping. */

/** R of dry air, J/(kg·K). Source: ISO 2533:1975 (from memory). */
export const DRY_AIR = 287.05287;
const KELVIN = 273.15;

function checkGas(pressure: number, temperature: number): void {
  if (!(pressure >= 0 && temperature > 0 && temperature < Infinity && pressure < Infinity)) throw new RangeError(`gas: ${pressure} Pa, ${temperature} K`);
}
type AirState = Readonly<Record<'pressure' | 'temperature', number>>;

/** Density of dry air as an ideal gas: ρ = p/(R T) · kg/m³. Valid: p ≥ 0 Pa, T > 0 K (0.05 % at one atmosphere). Source: ISO 2533. */
export function dryAirDensity({ pressure, temperature }: AirState): number {
  checkGas(pressure, temperature);
  return pressure / (DRY_AIR * temperature);
}

/**
 * Density of moist air: ρ = (0.34848 p − 0.009 h e^{0.061 t})/(273.15 + t), p in hPa, h in percent, t in °C · kg/m³.
 *
 * Valid: 900 … 1100 hPa, 10 … 30 °C, h up to 0.8 (2e-4 relative). For the weighing room, not for the chamber.
 * Source: OIML R 111-1:2004 E.3-1, an approximation of the CIPM formula.
 * @throws RangeError where the humidity is not in 0 … 1.
 */
export function moistAirDensity({ pressure, temperature, humidity }: Readonly<Record<'pressure' | 'temperature' | 'humidity', number>>): number {
  checkGas(pressure, temperature);
  if (!(humidity >= 0 && humidity <= 1)) throw new RangeError(`moist air: humidity ${humidity} is not in 0 … 1`);
  const t = temperature - KELVIN;
  return ((0.34848 * pressure) / 100 - 0.009 * 100 * humidity * Math.exp(0.061 * t)) / temperature;
}

/** Viscosity of air: μ = 1.458e-6 T^1.5/(T + 110.4) Pa·s, whatever the pressure. Valid: 100 … 1900 K. Source: Sutherland; US Standard Atmosphere 1976. */
export function airViscosity(temperature: number): number {
  checkGas(0, temperature);
  return (1.458e-6 * temperature ** 1.5) / (temperature + 110.4);
}

/** ν = μ/ρ · m²/s. Valid: p > 0. */
export function kinematicViscosity(air: AirState): number {
  if (!(air.pressure > 0)) throw new RangeError(`kinematic viscosity: ${air.pressure} Pa`);
  return airViscosity(air.temperature) / dryAirDensity(air);
}

/** Mean free path of air: λ = (μ/p)√(π R T/2) · m. Valid: p > 0 Pa. Source: kinetic theory; 6.6 mm at 1 Pa (methods 1.13). */
export function meanFreePath({ pressure, temperature }: AirState): number {
  if (!(pressure > 0)) throw new RangeError(`mean free path: ${pressure} Pa`);
  return (airViscosity(temperature) / pressure) * Math.sqrt((Math.PI * DRY_AIR * temperature) / 2);
}

/** m′ = π ρ b²/4 · kg/m · added mass per length of a long flat strip of width b moving face-on. Source: Newman, Marine Hydrodynamics, Table 4.3 (from memory). */
export const addedMassPerLength = ({ density, width }: Readonly<Record<'density' | 'width', number>>): number => (Math.PI * density * width * width) / 4;

/** Length over width, and the factor on the long strip's added mass. */
type FactorTable = readonly (readonly [number, number])[];
/** Source: DNV-RP-C205 App. D, rectangular plate (from memory; methods 1.13 reproduced it within 0.002). */
const MOVING_FACE_ON: FactorTable = [[1, 0.579], [1.5, 0.69], [2, 0.757], [3, 0.83], [4, 0.872], [5, 0.897], [8, 0.934], [10, 0.947]];
/** Source: methods 1.13, a panel method. */
const HINGED_AT_SHORT_END: FactorTable = [[1, 0.51], [1.5, 0.62], [2, 0.69], [3, 0.78], [4, 0.82], [5, 0.86], [8, 0.91], [10, 0.92]];

/** Standard uncertainty of the tables with their interpolation. */
export const U_OF_FINITE_LENGTH = 0.005;

/** Straight in width/length between the entries, and on to 1 for the endless strip. */
function lookUp(table: FactorTable, slenderness: number): number {
  if (!(slenderness >= 1)) throw new RangeError(`added mass: length over width ${slenderness} is below 1`);
  const x = 1 / slenderness;
  const above = table.findIndex(([ratio]) => ratio >= slenderness);
  const [near, far] = above === -1 ? [table[table.length - 1]!, [Infinity, 1] as const] : above === 0 ? [table[0]!, table[0]!] : [table[above - 1]!, table[above]!];
  const [x0, x1] = [1 / near[0], 1 / far[0]];
  return x0 === x1 ? near[1] : near[1] + ((x - x0) / (x1 - x0)) * (far[1] - near[1]);
}

/** Factor of finite length for a strip moving face-on as a whole. Valid: length/width ≥ 1. @throws RangeError below. */
export const translationFactor = (slenderness: number): number => lookUp(MOVING_FACE_ON, slenderness);
/** Factor of finite length for a strip swinging about one short end. Valid: length/width ≥ 1. @throws RangeError below. */
export const hingedFactor = (slenderness: number): number => lookUp(HINGED_AT_SHORT_END, slenderness);

/**
 * J_air = m′ L³/3 × hinged factor · kg·m² · what the air adds to a strip hinged at its end.
 * Valid: L ≥ b > 0 m, b ≫ boundary layer (see airLayer). Source: methods 1.13.
 */
export const addedInertia = ({ density, width, length }: Readonly<Record<'density' | 'width' | 'length', number>>): number =>
  (addedMassPerLength({ density, width }) * length ** 3 * hingedFactor(length / width)) / 3;

/** Added over own mass of a long strip: π ρ b/(4 σ_s), σ_s = areal density, kg/m². */
export const addedMassRatio = ({ density, width, arealDensity }: Readonly<Record<'density' | 'width' | 'arealDensity', number>>): number =>
  (Math.PI * density * width) / (4 * arealDensity);

/** 1 − ρ/ρ_solid: factor of buoyancy on the gravity part M g d of the stiffness; the inertia is unchanged. Valid: 0 ≤ ρ < ρ_solid. */
export function buoyancyFactor({ density, solidDensity }: Readonly<Record<'density' | 'solidDensity', number>>): number {
  if (!(density >= 0 && solidDensity > density)) throw new RangeError(`buoyancy: ${density} kg/m³ about ${solidDensity} kg/m³`);
  return 1 - density / solidDensity;
}

/** √(2ν/ω) · m · thickness of the layer of air that a swing drags along. Valid: p > 0, ω > 0. Source: Stokes' second problem. */
export function boundaryLayer(air: AirState, naturalFrequency: number): number {
  if (!(naturalFrequency > 0)) throw new RangeError(`boundary layer: ω ${naturalFrequency} rad/s`);
  return Math.sqrt((2 * kinematicViscosity(air)) / naturalFrequency);
}

/**
 * How the added-mass formula may be used. correction: correct by it, with `doubt`; uncertainty: too viscous, carry the
 * whole as an uncertainty; magnitude: only its order; none: the gas is too thin to flow round the strip.
 */
export interface AirLayer {
  readonly use: 'correction' | 'uncertainty' | 'magnitude' | 'none';
  readonly thickness: number;
  /** Half-width, relative to the formula's added mass, by which viscosity may exceed it: 4δ/b, not above 1. */
  readonly doubt: number;
}

/** Width over boundary layer from which the formula corrects, and below which it is only an order of magnitude. Judgement. */
const CORRECTS_FROM = 8;
const MAGNITUDE_BELOW = 2;

/**
 * Validity of the added mass at a pressure: b against √(2ν/ω).
 *
 * The doubt is the excess 4δ/b that a round rod of this width has over the frictionless flow.
 * Source: methods 1.13 (b ≫ √(2ν/ω)); Stokes' cylinder for a thin layer, C_m = 1 + 4(πβ)^{−1/2}, β = b²ω/(2πν) (from memory).
 */
export function airLayer(air: AirState, naturalFrequency: number, width: number): AirLayer {
  if (!(width > 0)) throw new RangeError(`boundary layer: width ${width} m`);
  const thickness = boundaryLayer(air, naturalFrequency);
  const doubt = Math.min(1, (4 * thickness) / width);
  if (meanFreePath(air) > width) return { use: 'none', thickness, doubt };
  const ratio = width / thickness;
  return { use: ratio >= CORRECTS_FROM ? 'correction' : ratio >= MAGNITUDE_BELOW ? 'uncertainty' : 'magnitude', thickness, doubt };
}

/** Drag coefficient of a plate in a steady stream; larger at a small swing/width. Source: from memory (Keulegan and Carpenter 1958 for the latter). */
export const STEADY_DRAG = 2;
/** Re = v b/ν from which the drag is quadratic with a constant coefficient. */
export const QUADRATIC_ABOVE_REYNOLDS = 100;

/** β = 3 ρ C_D L/(8 σ_s) · 1/rad · quadratic damping of a uniform strip hinged at its end. Valid: all > 0. Source: methods 1.13, derived. */
export const quadraticDrag = ({ density, dragCoefficient, length, arealDensity }: Readonly<Record<'density' | 'dragCoefficient' | 'length' | 'arealDensity', number>>): number =>
  (3 * density * dragCoefficient * length) / (8 * arealDensity);

/** Re = v b/ν of the strip's tip. */
export const tipReynolds = (air: AirState, { speed, width }: Readonly<Record<'speed' | 'width', number>>): number => (Math.abs(speed) * width) / kinematicViscosity(air);

/**
 * G = p √(8/(π R T)) (1 + π/4) · kg/(m²·s) · free-molecular drag of a plate per area of one face and speed, diffuse re-emission.
 *
 * Valid: mean free path ≫ width, no wall near. Source: kinetic theory, derived; methods 1.13 (9.82e-3 per Pa for air at 293 K).
 */
export function freeMolecularDrag({ pressure, temperature }: AirState): number {
  checkGas(pressure, temperature);
  return pressure * Math.sqrt(8 / (Math.PI * DRY_AIR * temperature)) * (1 + Math.PI / 4);
}

/** ζ = G/(2 ω σ_s) · 1 · damping ratio of a uniform strip in a free-molecular gas. Valid: ω, σ_s > 0. */
export function freeMolecularRatio(air: AirState, { naturalFrequency, arealDensity }: Readonly<Record<'naturalFrequency' | 'arealDensity', number>>): number {
  if (!(naturalFrequency > 0 && arealDensity > 0)) throw new RangeError(`gas damping: ω ${naturalFrequency} rad/s, ${arealDensity} kg/m²`);
  return freeMolecularDrag(air) / (2 * naturalFrequency * arealDensity);
}
