/** The taps: each with its known impulse, the calibration factor that they give together, and how it moved from before the firings to after. */
import { lineOfUncertain, type UncertainPoint } from '../metrology/lineOfUncertain.ts';
import { ownParts, pooledMean, weightsOf, type Pooled } from '../metrology/pooled.ts';
import type { Source } from '../metrology/source.ts';
import { fromLimits } from '../metrology/source.ts';
import { anchor, combine, exact, ofSource, propagate, standardUncertainty, type Anchor, type Uncertain } from '../metrology/uncertain.ts';
import { configurationChange } from '../pendulum/forms.ts';
import type { Choices } from '../session/session.ts';
import { LEAST } from './entries.ts';
import { familyOf } from './readings.ts';
import type { Form, Swing } from './shots.ts';
import type { Body, ByConfiguration } from './stand.ts';
import type { TapKnown } from './tapImpulse.ts';

/** Taps between which no shot was fired. */
export interface TapGroup {
  readonly where: 'before' | 'between' | 'after';
  readonly taps: readonly TapKnown[];
  /** Mean place in the run: seconds where every record has a time, else the order. */
  readonly place: number;
  readonly factor: Anchor;
  readonly pooled: Pooled;
}

export interface TapCalibration {
  /** K of the configuration of the taps, N·m·s/rad. */
  readonly asTaken: Anchor;
  readonly pooled: Pooled;
  /** Taps that have a ratio worth a weight. */
  readonly used: readonly TapKnown[];
  readonly groups: readonly TapGroup[];
  /** a of φ = a + H/K, rad, where the line has one: taken off every launch. */
  readonly intercept: Anchor | null;
  /** K at one record's place in the run, where it is interpolated between the groups. */
  readonly at: ((swing: Swing) => Uncertain) | null;
}

/** K = H/φ: calibration factor from one tap of angular impulse H = s_h I_h r_h. */
const factorOfTap = ({ moment, launch }: Readonly<Record<'moment' | 'launch', number>>): number => moment / launch;

/** A tap whose throw is within this many of its own u has no ratio worth a weight. */
const LEAST_THROW = 3;

function isWorthAWeight({ swing, angularImpulse }: TapKnown, form: Form): boolean {
  const launch = swing.launch?.[form];
  return launch !== undefined && Math.abs(launch.value) >= LEAST && Math.abs(launch.value) > LEAST_THROW * standardUncertainty(launch) && Math.abs(angularImpulse.value) >= LEAST;
}

function pooledFactor(taps: readonly TapKnown[], form: Form, id: string): Pooled {
  const factors = taps.map(({ swing, angularImpulse }) => propagate(factorOfTap, { moment: angularImpulse, launch: swing.launch![form] }));
  const own = ownParts(factors);
  return pooledMean(factors, own, { id, label: 'Scatter of the taps', symbol: 'K', dimension: 'calibrationFactor', family: familyOf('tap'), weights: weightsOf(own) });
}

type Taken = 'asOrdered' | 'before' | 'after';
const PHASE: Readonly<Record<Taken, number>> = { before: 0, asOrdered: 1, after: 2 };

/**
 * Where each record stands in the run: by time where every shot and tap has one, else by order; the taps of a sheet that a person has said
 * were taken before or after the firings stand there, in order.
 */
export function placesInRun(swings: readonly Swing[], taken: (swing: Swing) => Taken): ReadonlyMap<Swing, number> {
  const moving = swings.filter(({ record: { kind } }) => kind === 'shot' || kind === 'tap');
  const said = swings.some((swing) => taken(swing) !== 'asOrdered');
  if (!said && moving.length > 0 && moving.every(({ record }) => record.time !== null)) return new Map(swings.map((swing, order) => [swing, swing.record.time?.value ?? order]));
  const phase = (swing: Swing): number => PHASE[swing.record.kind === 'tap' ? taken(swing) : 'asOrdered'];
  return new Map([...swings].sort((a, b) => phase(a) - phase(b)).map((swing, place) => [swing, place]));
}

/** Groups of taps in the order of the run, parted by the shots. */
function groupsOf(taps: readonly TapKnown[], places: ReadonlyMap<Swing, number>, form: Form): readonly TapGroup[] {
  const shots = [...places].filter(([swing]) => swing.record.kind === 'shot').map(([, place]) => place);
  if (shots.length === 0) return [];
  const [firstShot, lastShot] = [Math.min(...shots), Math.max(...shots)];
  const passed = (place: number): number => shots.filter((shot) => shot < place).length;
  const byPassed = new Map<number, TapKnown[]>();
  for (const tap of taps) {
    const n = passed(places.get(tap.swing) ?? 0);
    byPassed.set(n, [...(byPassed.get(n) ?? []), tap]);
  }
  return [...byPassed].sort(([a], [b]) => a - b).map(([n, group]) => {
    const at = group.map((tap) => places.get(tap.swing) ?? 0);
    const place = at.reduce((sum, x) => sum + x, 0) / at.length;
    const pooled = pooledFactor(group, form, `taps.scatter.${n}`);
    const factor = anchor(factorOfLine(group, form, `taps.line.${n}`));
    return { where: place < firstShot ? 'before' : place > lastShot ? 'after' : 'between', taps: group, place, factor, pooled };
  });
}

/** Taps as points of their line: angular impulse along, launch up. */
export const pointsOfTaps = (taps: readonly TapKnown[], form: Form): readonly UncertainPoint[] => taps.map(({ swing, angularImpulse }) => ({ x: angularImpulse, y: swing.launch![form] }));

export const TAP_SCATTER = { id: 'taps.line', label: 'Scatter of the taps about their line', symbol: 'φ', dimension: 'angle', family: familyOf('tap') } as const;

/** The same line the other way round, H against φ: its slope is K itself, exact in the hammer's calibration. With errors in both axes it is one line. */
const factorPoints = (taps: readonly TapKnown[], form: Form): readonly UncertainPoint[] => pointsOfTaps(taps, form).map(({ x, y }) => ({ x: y, y: x }));

/**
 * K of the line H = K φ through the origin, errors in both axes. The mean of the single K_i = H_i/φ_i is not it: a tap that read large
 * by chance has a small K_i and a large weight, −0.65 % where each throw is known to 5 % (simulated), which no number of taps takes off.
 */
function factorOfLine(taps: readonly TapKnown[], form: Form, id: string): Uncertain {
  const line = lineOfUncertain(factorPoints(taps, form), false, { ...TAP_SCATTER, id });
  return line.status === 'fitted' ? line.slope : pooledFactor(taps, form, id).mean;
}

export function calibrationFromTaps(taps: readonly TapKnown[], form: Form, places: ReadonlyMap<Swing, number>, { tapDrift: drift, tapLine }: Choices): TapCalibration | null {
  const used = taps.filter((tap) => isWorthAWeight(tap, form));
  if (used.length === 0) return null;
  const pooled = pooledFactor(used, form, 'taps.scatter');
  const groups = groupsOf(used, places, form);
  const together: TapCalibration = { asTaken: anchor(factorOfLine(used, form, 'taps.line')), pooled, used, groups, intercept: null, at: null };
  if (tapLine === 'withIntercept') {
    const line = lineOfUncertain(factorPoints(used, form), true, TAP_SCATTER);
    if (line.status === 'fitted' && line.slope.value !== 0) return { ...together, asTaken: anchor(line.slope), intercept: anchor(propagate(({ A, K }) => -A / K, { A: line.intercept!, K: line.slope })) };
  }
  if (groups.length < 2 || drift === 'together') return together;
  if (drift === 'mean') return { ...together, asTaken: anchor(meanWithDrift(groups)) };
  return { ...together, at: (swing) => interpolated(groups, places.get(swing) ?? 0) };
}

/** Mean of the groups; half their range as limits of one common source (JCGM 100:2008 4.3.7, clause from memory): |K_a − K_b|/(2√3) for two. */
export function meanWithDrift(groups: readonly TapGroup[]): Uncertain {
  const values = groups.map(({ factor }) => factor.value);
  const half = (Math.max(...values) - Math.min(...values)) / 2;
  const source: Source = { id: 'taps.drift', label: 'Calibration before and after', symbol: 'K', dimension: 'calibrationFactor', estimate: 0, u: fromLimits(half), distribution: 'rectangular', dof: Infinity };
  return combine([...groups.map(({ factor }) => [1 / groups.length, factor] as const), [1, half === 0 ? exact(0) : ofSource(source)]]);
}

/** K between two groups, straight in the place; at the ends the nearest group. */
export function interpolated(groups: readonly TapGroup[], place: number): Uncertain {
  const after = groups.findIndex((group) => group.place >= place);
  if (after === 0) return groups[0]!.factor;
  if (after === -1) return groups.at(-1)!.factor;
  const [a, b] = [groups[after - 1]!, groups[after]!];
  const f = (place - a.place) / (b.place - a.place);
  return combine([[1 - f, a.factor], [f, b.factor]]);
}

/** K_f/K_c, exactly 1 where the two configurations are one; null where the bodies are not known. */
export function changeToFiring(bodies: ByConfiguration<Body> | null, differs: boolean): Uncertain | null {
  if (!differs) return exact(1);
  if (!bodies) return null;
  return propagate(configurationChange, {
    inertiaShots: bodies.shots.inertia, stiffnessShots: bodies.shots.stiffness, inertiaTaps: bodies.taps.inertia, stiffnessTaps: bodies.taps.stiffness,
  });
}
