/** Quadratic and Coulomb damping from the swings, and which law the way the amplitude falls tells. */
import { ownParts, pooledMean, weightsOf } from '../metrology/pooled.ts';
import { anchor, propagate, standardUncertainty, withSensitivities, type Anchor, type Uncertain } from '../metrology/uncertain.ts';
import { turningPointsOf } from '../pendulum/dampingLaws.ts';
import { chooseDampingLaw, fitDecay, uOfTerm, type DampingTerm, type DecayReadings } from '../pendulum/decay.ts';
import { problem, type Problem } from '../problems/problems.ts';
import type { Choices } from '../session/session.ts';
import type { Stated } from './results.ts';
import type { Turning } from './swings.ts';

const TERM: Readonly<Record<Exclude<Choices['dampingLaw'], 'byDecay'>, DampingTerm>> = { viscous: 'ratio', quadratic: 'quadratic', friction: 'friction' };
const LAW: Readonly<Record<DampingTerm, Exclude<Choices['dampingLaw'], 'byDecay'>>> = { ratio: 'viscous', quadratic: 'quadratic', friction: 'friction' };
export type Law = Exclude<Choices['dampingLaw'], 'byDecay'>;

/** Readings without any stated uncertainty count alike. rad. */
const ALIKE = 1e-6;

function decayReadings({ rest, points, slopes, gravityShare }: Turning): DecayReadings {
  const u = points.map((p, i) => Math.abs(slopes[i]!) * standardUncertainty(p.reading));
  const restU = rest ? Math.abs(rest.slope) * standardUncertainty(rest.reading) : 0;
  const known = u.every((x) => x > 0) && (!rest || restU > 0);
  return {
    points: points.map(({ number, angle }) => ({ number, angle })), u: known ? u : u.map(() => ALIKE),
    rest: rest ? { angle: rest.angle, u: known ? restU : ALIKE } : null, gravityShare,
  };
}

/** How the amplitude of the longest swing falls, against what each law makes of it. */
export interface DecayTold {
  /** Record id; null: the free swing typed on the bench. */
  readonly record: string | null;
  /** Law that is used. */
  readonly law: Law;
  /** Turning points: their number and amplitude from the rest, rad. */
  readonly readings: readonly { readonly number: number; readonly amplitude: Stated }[];
  /** Fits by each law that has one. */
  readonly fits: readonly DecayOfLaw[];
}

export interface DecayOfLaw {
  readonly law: Law;
  /** ζ; β, 1/rad; θ_f, rad. */
  readonly parameter: Stated;
  readonly chiSquared: number;
  /** 0: the fit goes through every reading, and χ² says nothing. */
  readonly dof: number;
  /** Amplitudes at the turning points 0, 1, …, rad. */
  readonly amplitudes: readonly number[];
}

const bySize = (swings: readonly Turning[]): readonly Turning[] => swings.toSorted((a, b) => b.points.length - a.points.length);

/** Fewer turning points lie on every law's line alike. */
const LEAST_TOLD = 4;

/** null where no law fits the longest swing, or it has too few turning points to show any. */
export function decayTold(law: Law, swings: readonly Turning[]): DecayTold | null {
  const longest = bySize(swings)[0];
  if (!longest || longest.points.length < LEAST_TOLD) return null;
  const readings = decayReadings(longest);
  const last = longest.points.at(-1)!.number;
  const found = (Object.keys(TERM) as Law[]).flatMap((one) => {
    const fit = fitDecay([TERM[one]], readings);
    return fit.status === 'found' ? [{ law: one, fit }] : [];
  });
  const rest = longest.rest?.angle ?? found.find((one) => one.law === law)?.fit.rest ?? found[0]?.fit.rest;
  if (rest === undefined) return null;
  return {
    record: longest.place.record ?? null, law,
    readings: readings.points.map(({ number, angle }, i) => ({ number, amplitude: { value: Math.abs(angle - rest), u: readings.u[i]! } })),
    fits: found.map(({ law: one, fit }) => ({
      law: one, parameter: { value: fit.damping[TERM[one]], u: uOfTerm(fit, 0) }, chiSquared: fit.chiSquared, dof: fit.dof,
      amplitudes: turningPointsOf(fit.amplitude, fit.damping, readings.gravityShare, last).map(Math.abs),
    })),
  };
}

/** The law to use: as chosen, or as the longest swing tells. */
export function lawOf(choice: Choices['dampingLaw'], swings: readonly Turning[], problems: Problem[]): Law {
  if (choice !== 'byDecay') return choice;
  const longest = bySize(swings)[0];
  const chosen = longest && chooseDampingLaw(decayReadings(longest));
  if (!chosen || chosen.best === null || chosen.status === 'tooFew' || chosen.status === 'notToldApart') {
    // Where the readings leave it open, the law that does least to the numbers of a light swing is taken, and said.
    const possible = (chosen?.possible ?? []).map((term) => LAW[term]).join(', ');
    const used = chosen?.possible.includes('ratio') === false && chosen.best !== null ? LAW[chosen.best] : 'viscous';
    problems.push(problem('damping-laws-not-told-apart', 'note', {}, { possible, used }));
    return used;
  }
  const law = LAW[chosen.best];
  if (chosen.status !== 'told') problems.push(problem('damping-law-fits-badly', 'doubt', {}, { used: law }));
  return law;
}

/** β or θ_f of each swing, pooled like the damping ratio. null where no swing gives one. */
export function termFromSwings(law: 'quadratic' | 'friction', swings: readonly Turning[], problems: Problem[]): Anchor | null {
  const items: Uncertain[] = [];
  for (const swing of swings) {
    const fit = fitDecay([TERM[law]], decayReadings(swing));
    if (fit.status !== 'found') {
      const code = fit.status === 'tooFew' ? 'swings-too-few' : fit.status === 'noLimit' ? 'swings-fit-unsettled' : 'swings-not-decaying';
      problems.push(problem(code, 'note', swing.place, {}));
      continue;
    }
    const inputs = [...(swing.rest ? [[swing.rest.slope, swing.rest.reading] as const] : []), ...swing.points.map((p, i) => [swing.slopes[i]!, p.reading] as const)];
    items.push(withSensitivities(fit.damping[TERM[law]], inputs.map(([slope, reading], i) => [fit.sensitivities[i]! * slope, reading] as const)));
  }
  if (items.length === 0) return null;
  const own = ownParts(items);
  const pooled = pooledMean(items, own, {
    id: `damping.${law}.scatter`, label: law === 'quadratic' ? 'Scatter of the quadratic damping' : 'Scatter of the pivot’s friction', symbol: law === 'quadratic' ? 'β' : 'θ_f',
    dimension: law === 'quadratic' ? 'number' : 'angle', weights: weightsOf(own), family: { id: `damping.${law}.scatter`, label: 'Scatter of the damping among the swings' },
  });
  if (pooled.mean.value >= 0) return anchor(pooled.mean);
  problems.push(problem('swings-grow', 'doubt', {}, { value: -pooled.mean.value }));
  return anchor({ ...pooled.mean, value: 0 });
}

/** β = b/J and θ_f = τ_f/κ on another body: b and τ_f stay. */
export const carriedTerm = (term: Anchor, from: Anchor, to: Anchor): Anchor => (from === to ? term : anchor(propagate(({ x, a, b }) => (x * a) / b, { x: term, a: from, b: to })));
