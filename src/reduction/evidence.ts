/** All evidence of the session on what a swing is worth, as items of one least-squares adjustment over J, κ and ζ of the pendulum as fired. */
import { adjust, type AdjustmentItem, type Adjusted } from '../metrology/adjustment.ts';
import { anchor, combine, exact, propagate, type Anchor, type Uncertain } from '../metrology/uncertain.ts';
import { bodyOfPeriods } from '../pendulum/calibrationMass.ts';
import { inertiaOfPeriod } from '../pendulum/forms.ts';
import type { Choices } from '../session/session.ts';
import type { BodiesByWay } from './factors.ts';
import type { Body, ByConfiguration, Change, ConfigurationName, Stand } from './stand.ts';
import type { TapCalibration } from './taps.ts';
import type { Timing } from './timings.ts';

export type EvidenceItemId = 'massesInertia' | 'massesStiffness' | 'period' | 'stiffness' | 'weights' | `timing.${string}` | `taps.${string}` | 'damping.shots' | 'damping.taps';

/** What stands on a bench as evidence, each null where it is not there. */
export interface EvidenceFacts {
  readonly choices: Choices;
  readonly stand: Stand;
  readonly change: Change | null;
  /** T₀ typed, of the configuration `choices.periodTimedAs`. */
  readonly period: Anchor | null;
  readonly timings: readonly Timing[];
  /** κ typed or from a pull per deflection; from a table of weights. */
  readonly stiffness: Uncertain | null;
  readonly weights: Uncertain | null;
  readonly taps: TapCalibration | null;
  readonly ratio: { readonly shots: Uncertain | null; readonly taps: Uncertain | null };
}

type Item = AdjustmentItem;
type X = Readonly<Record<string, number>>;

const ofInertia = (u: X, x: X): number => Math.log(u['J']! / x['J']!);
const ofStiffness = (u: X, x: X): number => Math.log((u['kappa']! + x['dK']!) / x['k']!);
const ofPeriod = (u: X, x: X): number =>
  Math.log((4 * Math.PI ** 2 * (u['J']! + x['dJ']! + x['m']! * x['r']! ** 2 + x['Jc']!)) / (u['kappa']! + x['dK']! + x['m']! * x['g']! * x['r']!)) - 2 * Math.log(x['T']!);
const ofTaps = (u: X, x: X): number => Math.log((u['J']! + x['dJ']!) * (u['kappa']! + x['dK']!)) / 2 - Math.log(x['K']!);
const ofRatio = (u: X, x: X): number => u['zeta']! * Math.sqrt((u['J']! * u['kappa']!) / ((u['J']! + x['dJ']!) * (u['kappa']! + x['dK']!))) - x['z']!;

const positive = (y: Uncertain): { readonly y: Uncertain; readonly positive: true } => ({ y, positive: true });
const signed = (y: Uncertain): { readonly y: Uncertain; readonly positive: false } => ({ y, positive: false });
const NONE = signed(exact(0));

/** ΔJ and Δκ of a configuration against the one that was fired. */
function changeInputs(change: Change, as: ConfigurationName): Readonly<Record<'dJ' | 'dK', { readonly y: Uncertain; readonly positive: boolean }>> {
  return as === 'taps' ? { dJ: signed(change.inertia), dK: signed(change.stiffness) } : { dJ: NONE, dK: NONE };
}

export const TIMING_WORDS = (timing: Timing): string => (timing.hung ? `Period with ${Number((timing.hung.mass.value * 1e3).toPrecision(4))} g at ${Number((timing.hung.radius.value * 1e3).toPrecision(4))} mm` : timing.trace !== undefined ? `Period of the swing in ${timing.trace}` : timing.configuration === 'taps' ? 'Period as tapped, table' : 'Period, table');

function timingItem(timing: Timing, { choices, stand, change }: EvidenceFacts): Item {
  const hung = timing.hung;
  const g = choices.restoring === 'flexureAlone' ? exact(0) : stand.gravity ?? exact(0);
  return {
    id: `timing.${timing.id}`, label: TIMING_WORDS(timing), residual: ofPeriod,
    inputs: {
      T: positive(timing.period), ...changeInputs(change!, timing.configuration), m: hung ? positive(hung.mass) : NONE, r: hung ? signed(hung.radius) : NONE, Jc: hung ? signed(hung.inertia) : NONE, g: signed(g),
    },
  };
}

/** Every item that the session holds. */
export function evidenceItems(x: EvidenceFacts): readonly Item[] {
  const { choices, stand, change } = x;
  if (!change) return [];
  const items: Item[] = [];
  if (stand.masses) {
    items.push({ id: 'massesInertia', label: 'Moment of inertia by masses and lengths', inputs: { J: positive(stand.masses.shots.inertia) }, residual: ofInertia });
    items.push({ id: 'massesStiffness', label: 'Stiffness by masses and lengths', inputs: { k: positive(stand.masses.shots.stiffness), dK: NONE }, residual: ofStiffness });
  }
  const bare = { m: NONE, r: NONE, Jc: NONE, g: NONE };
  if (x.period) items.push({ id: 'period', label: 'Timed period, typed', inputs: { T: positive(x.period), ...changeInputs(change, choices.periodTimedAs), ...bare }, residual: ofPeriod });
  for (const timing of x.timings) items.push(timingItem(timing, x));
  if (x.stiffness) items.push({ id: 'stiffness', label: 'Static stiffness, typed', inputs: { k: positive(x.stiffness), dK: NONE }, residual: ofStiffness });
  if (x.weights) items.push({ id: 'weights', label: 'Known weights', inputs: { k: positive(x.weights), dK: changeInputs(change, choices.weightsHungAs).dK }, residual: ofStiffness });
  const groups = x.taps ? (x.taps.groups.length > 1 ? x.taps.groups.map((group, i) => ({ id: `${group.where}.${i}`, label: `Taps ${group.where === 'between' ? 'between' : `${group.where} the`} firings`, factor: group.factor })) : [{ id: 'all', label: 'Taps', factor: x.taps.asTaken }]) : [];
  for (const { id, label, factor } of groups) items.push({ id: `taps.${id}`, label, inputs: { K: positive(factor), ...changeInputs(change, 'taps') }, residual: ofTaps });
  if (x.ratio.shots) items.push({ id: 'damping.shots', label: 'Damping of the swings as fired', inputs: { z: signed(x.ratio.shots), dJ: NONE, dK: NONE }, residual: ofRatio });
  if (x.ratio.taps) items.push({ id: 'damping.taps', label: 'Damping of the swings as tapped', inputs: { z: signed(x.ratio.taps), ...changeInputs(change, 'taps') }, residual: ofRatio });
  return items;
}

/** Where the adjustment starts: J and κ of the pendulum as fired, from the first evidence that tells both. */
function startOf(x: EvidenceFacts, bodies: ByConfiguration<Body> | null): { readonly J: number; readonly kappa: number } | null {
  const near = bodies?.shots ?? x.stand.masses?.shots;
  if (near) return { J: near.inertia.value, kappa: near.stiffness.value };
  const k = x.weights ?? x.stiffness;
  const T = x.period ?? x.timings.find(({ hung }) => hung === null)?.period;
  if (k && T) return { J: inertiaOfPeriod({ stiffness: k.value, period: T.value }), kappa: k.value };
  const line = bodyOfPeriods(x.timings.map(pointOf), gravityOf(x));
  return line.status === 'found' && line.inertia > 0 && line.stiffness > 0 ? { J: line.inertia, kappa: line.stiffness } : null;
}

const gravityOf = ({ choices, stand }: EvidenceFacts): number => (choices.restoring === 'flexureAlone' ? 0 : stand.gravity?.value ?? 0);

function isNegative(x: EvidenceFacts): boolean {
  const line = bodyOfPeriods([...x.timings.map(pointOf), ...(x.period ? [{ period: x.period.value, mass: 0, radius: 0, ownInertia: 0 }] : [])], gravityOf(x));
  return line.status === 'found' && !(line.inertia > 0 && line.stiffness > 0);
}

const pointOf = ({ period, hung }: Timing): { readonly period: number; readonly mass: number; readonly radius: number; readonly ownInertia: number } =>
  ({ period: period.value, mass: hung?.mass.value ?? 0, radius: hung?.radius.value ?? 0, ownInertia: hung?.inertia.value ?? 0 });

/** J and κ of both configurations from those as fired. */
export function bodiesFrom(inertia: Uncertain, stiffness: Uncertain, change: Change, stand: Stand): ByConfiguration<Body> | null {
  const share = (name: ConfigurationName): Anchor => stand.masses?.[name].gravityShare ?? anchor(exact(stand.shareUnknown));
  const shots: Body = { inertia: anchor(inertia), stiffness: anchor(stiffness), gravityShare: share('shots') };
  const same = [change.inertia, change.stiffness].every((y) => y.value === 0 && y.own.size === 0 && y.through.size === 0);
  const taps: Body = same ? shots : { inertia: anchor(combine([[1, inertia], [1, change.inertia]])), stiffness: anchor(combine([[1, stiffness], [1, change.stiffness]])), gravityShare: share('taps') };
  return [shots, taps].every((body) => body.inertia.value > 0 && body.stiffness.value > 0) ? { shots, taps } : null;
}

const moved = (y: Uncertain, by: Uncertain, from: ConfigurationName, to: ConfigurationName): Uncertain => (from === to ? y : combine([[1, y], [to === 'taps' ? 1 : -1, by]]));

/** κ of one configuration as that of another. */
export const stiffnessAs = (kappa: Uncertain, from: ConfigurationName, to: ConfigurationName, change: Change): Uncertain => moved(kappa, change.stiffness, from, to);

/** κ known statically and a period: J = κ T₀²/4π², each in its own configuration, both brought to the pendulum as fired. */
export function bodiesOfStiffness(kappa: Uncertain, kappaAs: ConfigurationName, period: Anchor, periodAs: ConfigurationName, change: Change, stand: Stand): ByConfiguration<Body> | null {
  const fired = moved(kappa, change.stiffness, kappaAs, 'shots');
  const timed = moved(fired, change.stiffness, 'shots', periodAs);
  const inertia = moved(propagate(inertiaOfPeriod, { stiffness: timed, period }), change.inertia, periodAs, 'shots');
  return bodiesFrom(inertia, fired, change, stand);
}

export interface EvidenceFound {
  readonly bodies: BodiesByWay;
  /** Adjustment of all; null with nothing to adjust. */
  readonly all: Adjusted | null;
  /** J and κ by the timings alone. */
  readonly timed: Adjusted | null;
  /** The timings give a J or κ that is not above zero. */
  readonly negative: boolean;
}

export function evidenceFrom(x: EvidenceFacts, geometry: ByConfiguration<Body> | null): EvidenceFound {
  const { change } = x;
  const start = startOf(x, geometry);
  if (!change || !start) return { bodies: {}, all: null, timed: null, negative: isNegative(x) };
  const solve = (items: readonly Item[]): Adjusted | null => {
    if (items.length < 2) return null;
    const zeta = x.ratio.shots ?? x.ratio.taps;
    const withRatio = zeta !== null && items.some(({ id }) => id.startsWith('damping.'));
    return adjust({
      unknowns: [{ name: 'J', start: start.J, positive: true }, { name: 'kappa', start: start.kappa, positive: true }, ...(withRatio ? [{ name: 'zeta', start: zeta.value, positive: false }] : [])],
      items,
    });
  };
  const bodiesOf = (of: Adjusted | null): ByConfiguration<Body> | null => {
    if (of?.status !== 'adjusted') return null;
    const [J, kappa] = [of.unknowns['J'], of.unknowns['kappa']];
    return J && kappa ? bodiesFrom(J, kappa, change, x.stand) : null;
  };
  const all = solve(evidenceItems(x));
  const negative = isNegative(x);
  const timed = !negative && x.timings.some(({ hung }) => hung !== null) ? solve(x.timings.map((timing) => timingItem(timing, x)).concat(x.period && x.timings.every(({ hung }) => hung !== null) ? evidenceItems({ ...x, timings: [], weights: null, stiffness: null, taps: null, ratio: { shots: null, taps: null }, stand: { ...x.stand, masses: null } }) : [])) : null;
  const [k, kAs] = x.weights ? [x.weights, x.choices.weightsHungAs] as const : [x.stiffness, 'shots'] as const;
  const bare = x.period ?? x.timings.find(({ hung, configuration }) => hung === null && configuration === x.choices.periodTimedAs)?.period ?? null;
  return { bodies: { adjustment: bodiesOf(all), addedMasses: bodiesOf(timed), weights: k && bare ? bodiesOfStiffness(k, kAs, bare, x.choices.periodTimedAs, change, x.stand) : null }, all, timed, negative };
}
