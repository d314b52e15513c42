/** The air about a light strip: the inertia that it adds and the weight that it bears, at the pressure of firing and of tapping. */
import { fromLimits, type Source } from '../metrology/source.ts';
import { anchor, exact, ofSource, propagate, standardUncertainty, type Anchor, type Uncertain } from '../metrology/uncertain.ts';
import { addedInertia, airLayer, buoyancyFactor, dryAirDensity, U_OF_FINITE_LENGTH, type AirLayer } from '../pendulum/gas.ts';
import { filmMass } from '../pendulum/filmStrip.ts';
import { problem, type Problem } from '../problems/problems.ts';
import type { EntryName } from '../session/entries.ts';
import type { Choices } from '../session/session.ts';
import type { BenchRead } from './entries.ts';
import { gasDiffers, type Pressures } from './pressure.ts';
import type { AirResult } from './results.ts';
import { stated } from './run.ts';
import { valueOf, type ByConfiguration } from './stand.ts';

/** What the air does in one configuration. */
export interface AirEffect {
  /** J_air · kg·m² · added to J; 0 with its uncertainty where the formula does not correct. */
  readonly inertia: Uncertain;
  /** 1 − ρ/ρ_solid on the strip's own weight. */
  readonly buoyancy: Uncertain;
  readonly use: AirLayer['use'];
  readonly told: AirResult;
}

/** The strip that moves the air, and about how fast: length and mass, and ω of a swing, rad/s. */
export interface StripInAir {
  readonly mass: Uncertain;
  readonly length: Uncertain;
  readonly width: Uncertain | null;
  readonly thickness: Uncertain | null;
  readonly frequency: number;
}

const KELVIN = 273.15;
/** A room. */
const ROOM = { celsius: 20, u: 5 } as const;
/** Below this pressure the air on a strip is not worth a word, Pa: half a percent of the mass of a 25 µm film 19 mm wide (methods 1.13). */
const WORTH_A_WORD = 1000;
/** A thin film without a thickness typed is at least so dense, kg/m³ (polyethylene 920, from memory). */
const LEAST_DENSE = 900;
/** Effects alike within this part of the strip's inertia are one. */
const ALIKE = 1e-4;

const NONE: ByConfiguration<AirEffect | null> = { shots: null, taps: null };

const densityOf = ({ p, t }: Readonly<Record<'p' | 't', number>>): number => dryAirDensity({ pressure: p, temperature: KELVIN + t });
type Formula = Readonly<Record<'density' | 'width' | 'length' | 'flow' | 'finite' | 'doubt', number>>;
/** The formula, and by how much the air's viscosity may exceed it: flow is anywhere from −1 to 1. */
const corrected = ({ density, width, length, flow, finite, doubt }: Formula): number => addedInertia({ density, width, length }) * (1 + doubt * flow + finite);
/** Too viscous to correct: the whole of it either way. */
const uncorrected = ({ density, width, length, flow, doubt }: Formula): number => addedInertia({ density, width, length }) * (1 + doubt) * flow;
const buoyed = ({ density, mass, length, width, thickness }: Readonly<Record<'density' | 'mass' | 'length' | 'width' | 'thickness', number>>): number =>
  buoyancyFactor({ density, solidDensity: mass / (length * width * thickness) });

/** For the air's layer alone, which hardly feels it. */
const GRAVITY = 9.80665;
/** ω₁ √(L/g) of a limp film. Source: methods 1.2, half the first zero of J₀. */
const LIMP_FILM = 1.2024;

/** The strip of the bench and about its ω; null for a form that is none, or without its mass and length. */
export function stripInAir(bench: BenchRead, choices: Choices): StripInAir | null {
  const value = (name: EntryName): number => valueOf(bench, name)?.value ?? 0;
  if (choices.form === 'filmStrip') {
    const [thickness, width, length, density] = [valueOf(bench, 'filmThickness'), valueOf(bench, 'filmWidth'), valueOf(bench, 'filmLength'), valueOf(bench, 'filmDensity')];
    if (!thickness || !width || !length || !density) return null;
    const mass = valueOf(bench, 'filmMass') ?? propagate(filmMass, { density, thickness, width, length });
    return { mass, length, width, thickness, frequency: LIMP_FILM * Math.sqrt(GRAVITY / length.value) };
  }
  const [mass, length] = [valueOf(bench, 'stripMass'), valueOf(bench, 'stripLength')];
  if ((choices.form !== 'uniformStrip' && choices.form !== 'stripWithPlate') || !mass || !length) return null;
  const [plate, r] = choices.form === 'stripWithPlate' ? [value('plateMass'), value('plateDistance')] : [0, 0];
  const inertia = (mass.value * length.value ** 2) / 3 + plate * r * r;
  const weight = choices.restoring === 'flexureAlone' ? 0 : GRAVITY * ((mass.value * length.value) / 2 + plate * r);
  const kappa = weight + value('flexureStiffness');
  return kappa > 0 ? { mass, length, width: valueOf(bench, 'stripWidth'), thickness: valueOf(bench, 'stripThickness'), frequency: Math.sqrt(kappa / inertia) } : null;
}

/**
 * Added inertia and buoyancy of the strip in each configuration; one object for both where shots and taps swing in the
 * same air. Null where no pressure or no width is known, or the air is too thin to flow.
 */
export function airOf(bench: BenchRead, choices: Choices, strip: StripInAir | null, pressures: Pressures, problems: Problem[]): ByConfiguration<AirEffect | null> {
  const { shots, taps } = pressures;
  if (!choices.correctAir || !strip || !shots) return NONE;
  const differs = taps !== null && gasDiffers(pressures);
  const { width } = strip;
  const entry: EntryName = choices.form === 'filmStrip' ? 'filmWidth' : 'stripWidth';
  if (!width) {
    const most = Math.max(shots.value, taps?.value ?? 0);
    if (most >= WORTH_A_WORD && (differs || choices.calibration === 'geometry')) {
      problems.push(problem('air-needs-width', differs ? 'doubt' : 'note', { entry }, differs ? { shots: shots.value, taps: taps.value } : { shots: shots.value }));
    }
    return NONE;
  }
  try {
    const of = effectsOf(bench, { ...strip, width });
    const fired = of(shots);
    const effects = { shots: fired, taps: !taps || taps === shots ? fired : alike(fired, of(taps), strip) };
    if (fired && fired.told.ofInertia > ALIKE) {
      problems.push(problem('air-on-strip', 'note', { entry }, { use: fired.use, percent: 100 * fired.told.ofInertia, pressure: shots.value }));
    }
    return effects;
  } catch (failure) {
    if (!(failure instanceof RangeError)) throw failure;
    problems.push(problem('air-not-reckoned', 'doubt', { entry }, {}));
    return NONE;
  }
}

/** The taps' effect, or the shots' where the two are one. */
function alike(shots: AirEffect | null, taps: AirEffect | null, { mass, length }: StripInAir): AirEffect | null {
  if (!shots || !taps) return shots === taps ? shots : taps;
  const own = (mass.value * length.value ** 2) / 3;
  const near = (a: Uncertain, b: Uncertain, scale: number): boolean =>
    Math.abs(a.value - b.value) < ALIKE * scale && Math.abs(standardUncertainty(a) - standardUncertainty(b)) < ALIKE * scale;
  return near(shots.inertia, taps.inertia, own) && near(shots.buoyancy, taps.buoyancy, 1) ? shots : taps;
}

/** What is common to both configurations is one source: the temperature, the flow, the tables of finite length. */
function effectsOf(bench: BenchRead, strip: StripInAir & { readonly width: Uncertain }): (pressure: Anchor) => AirEffect | null {
  const source = (id: string, label: string, symbol: string, u: number, distribution: Source['distribution']): Uncertain =>
    ofSource({ id, label, symbol, dimension: 'number', estimate: 0, u, distribution, dof: Infinity });
  const flow = source('air.flow', 'Added mass of the air, its viscosity', 'J_a', fromLimits(1), 'rectangular');
  const finite = source('air.length', 'Added mass of the air, length of the strip', 'J_a', U_OF_FINITE_LENGTH, 'normal');
  const solid = source('air.solid', 'Buoyancy, strip of unknown density', 'ρ_s', fromLimits(1), 'rectangular');
  const t = valueOf(bench, 'airTemperature')
    ?? ofSource({ id: 'airTemperature', label: 'Temperature of the gas, a room’s', symbol: 't_g', dimension: 'celsius', estimate: ROOM.celsius, u: ROOM.u, distribution: 'normal', dof: Infinity });
  const { width, length, mass, thickness, frequency } = strip;
  const own = (mass.value * length.value ** 2) / 3;
  return (pressure) => {
    const layer = airLayer({ pressure: pressure.value, temperature: KELVIN + t.value }, frequency, width.value);
    if (layer.use === 'none') return null;
    const density = anchor(propagate(densityOf, { p: pressure, t }));
    const doubt = exact(layer.doubt);
    const corrects = layer.use === 'correction';
    const inertia = propagate(corrects ? corrected : uncorrected, { density, width, length, flow, finite, doubt });
    const buoyancy = thickness
      ? propagate(buoyed, { density, mass, length, width, thickness })
      : propagate(({ rho, s }) => 1 - (rho / LEAST_DENSE) * s, { rho: density, s: solid });
    const formula = addedInertia({ density: density.value, width: width.value, length: length.value });
    const told: AirResult = {
      use: layer.use, pressure: stated(pressure), density: stated(density), layer: layer.thickness, addedInertia: stated(inertia), buoyancy: stated(buoyancy), ofInertia: formula / own,
    };
    return { inertia: anchor(inertia), buoyancy: anchor(buoyancy), use: layer.use, told };
  };
}

/** A film's calibration factors in the air about it. */
export interface FilmInAir {
  readonly geometry: ByConfiguration<Anchor | null>;
  /** K as fired over K as tapped, by the air and by where they are struck; null where both are alike. */
  readonly change: Uncertain | null;
  /** Period in air over that in vacuum, as fired. */
  readonly stretch: number;
}

type FilmLoad = Readonly<Record<'added' | 'buoyancy' | 'mass' | 'length' | 'plate', number>>;
/** What the air makes of the film's inertia and of its weight, a plate at its end among them; the modes keep their shape (without a plate exactly). */
const loads = ({ added, buoyancy, mass, length, plate }: FilmLoad): { readonly inertia: number; readonly weight: number } => ({
  inertia: 1 + added / ((mass / 3 + plate) * length * length),
  weight: 1 - (1 - buoyancy) * (mass / 2 / (mass / 2 + plate)),
});
/** K in air over K in vacuum: √(inertia × weight). */
const filmFactor = (x: FilmLoad): number => {
  const { inertia, weight } = loads(x);
  return Math.sqrt(inertia * weight);
};

export function filmInAir({ factors, change: zones }: { readonly factors: ByConfiguration<Anchor | null>; readonly change: Uncertain | null }, air: ByConfiguration<AirEffect | null>, film: Readonly<Record<'mass' | 'length', Uncertain>>, plate: Uncertain | null): FilmInAir {
  const inputs = (one: AirEffect): Record<keyof FilmLoad, Uncertain> => ({ added: one.inertia, buoyancy: one.buoyancy, mass: film.mass, length: film.length, plate: plate ?? exact(0) });
  const factorOf = (one: AirEffect | null): Anchor => anchor(one ? propagate(filmFactor, inputs(one)) : exact(1));
  const shots = factorOf(air.shots);
  const taps = air.taps === air.shots ? shots : factorOf(air.taps);
  const times = (k: Anchor | null, f: Anchor): Anchor | null => k && anchor(propagate(({ a, b }) => a * b, { a: k, b: f }));
  const load = air.shots ? loads({ added: air.shots.inertia.value, buoyancy: air.shots.buoyancy.value, mass: film.mass.value, length: film.length.value, plate: plate?.value ?? 0 }) : { inertia: 1, weight: 1 };
  return {
    geometry: { shots: times(factors.shots, shots), taps: times(factors.taps, taps) },
    change: shots === taps ? zones : propagate(({ f, c, z }) => (z * f) / c, { f: shots, c: taps, z: zones ?? exact(1) }),
    stretch: Math.sqrt(load.inertia / load.weight),
  };
}
