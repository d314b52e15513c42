/** Quadratic and Coulomb damping from the swings, and which law the way the amplitude falls tells. */
import { ownParts, pooledMean, weightsOf } from '../metrology/pooled.ts';
import { anchor, propagate, standardUncertainty, withSensitivities, type Anchor, type Uncertain } from '../metrology/uncertain.ts';
import { chooseDampingLaw, fitDecay, type DampingTerm, type DecayReadings } from '../pendulum/decay.ts';
import { problem, type Problem } from '../problems/problems.ts';
import type { Choices } from '../session/session.ts';
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

/** The law to use: as chosen, or as the longest swing tells. */
export function lawOf(choice: Choices['dampingLaw'], swings: readonly Turning[], problems: Problem[]): Law {
  if (choice !== 'byDecay') return choice;
  const longest = swings.toSorted((a, b) => b.points.length - a.points.length)[0];
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
      problems.push(problem('swings-not-decaying', 'note', swing.place, {}));
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
  problems.push(problem('swings-not-decaying', 'doubt', {}, { ratio: pooled.mean.value }));
  return anchor({ ...pooled.mean, value: 0 });
}

/** β = b/J and θ_f = τ_f/κ on another body: b and τ_f stay. */
export const carriedTerm = (term: Anchor, from: Anchor, to: Anchor): Anchor => (from === to ? term : anchor(propagate(({ x, a, b }) => (x * a) / b, { x: term, a: from, b: to })));
