/** Timed periods: every record that has one, by what hung on the pendulum, freed of amplitude and damping. */
import { ownParts, pooledMean, weightsOf, type Pooled } from '../metrology/pooled.ts';
import { fromResolution, type Family, type Source } from '../metrology/source.ts';
import { anchor, exact, ofSource, propagate, type Anchor, type Uncertain } from '../metrology/uncertain.ts';
import { undampedSmallPeriod } from '../pendulum/period.ts';
import { problem, type Problem } from '../problems/problems.ts';
import type { CellRead } from '../readings/cellReads.ts';
import type { Choices } from '../session/session.ts';
import { unitNamed } from '../units/units.ts';
import { LEAST, type BenchRead } from './entries.ts';
import { placeOf, type SessionRecord } from './sheets.ts';
import { valueOf, type ByConfiguration, type ConfigurationName } from './stand.ts';

/** Timings with the same mass at the same place, or with none. */
export interface Timing {
  readonly id: string;
  /** The pendulum's own configuration, before the mass was hung. */
  readonly configuration: ConfigurationName;
  /** null: none was hung. */
  readonly hung: { readonly mass: Uncertain; readonly radius: Uncertain; readonly inertia: Uncertain } | null;
  /** T₀, undamped, small swing, s. */
  readonly period: Anchor;
  readonly pooled: Pooled;
  /** The trace whose swing it is; absent: timed by hand. */
  readonly trace?: string;
  readonly records: readonly SessionRecord[];
}

const FAMILY: Family = { id: 'readings.timings', label: 'Timed periods: starts and stops, and their scatter' };

export interface TimingFacts {
  readonly bench: BenchRead;
  readonly choices: Choices;
  readonly ratio: ByConfiguration<Anchor>;
  readonly shares: ByConfiguration<Uncertain>;
}

const resolutionOf = (cell: CellRead): number => 10 ** -cell.decimals * (unitNamed(cell.unit)?.factor ?? 1);

/** T of one record from the time of its cycles; a start and a stop each with u_t. */
function timedOf(record: SessionRecord, spread: number): Uncertain | null {
  const cell = record.swingsTime;
  const cycles = record.cycles;
  if (!cell || !(cell.value > LEAST) || !(cycles >= 0.5)) return null;
  const u = cell.spread ?? Math.hypot(Math.SQRT2 * spread, fromResolution(resolutionOf(cell)));
  const source: Source = { id: `${record.id}.time`, label: `Time of ${cycles} ${cycles === 1 ? 'cycle' : 'cycles'}`, symbol: 't', dimension: 'time', estimate: cell.value, u, distribution: 'normal', dof: Infinity, family: FAMILY };
  return propagate(({ t }) => t / cycles, { t: ofSource(source) });
}

/** One source a value: the same mass at another place is the same mass. */
function valuesOf(bench: BenchRead, records: readonly SessionRecord[], role: 'massHung' | 'massHungAt'): (cell: CellRead | null) => Uncertain | null {
  const typed = valueOf(bench, role === 'massHung' ? 'calibrationMass' : 'calibrationMassDistance');
  const spread = bench.entries.get(role === 'massHung' ? 'hungMassSpread' : 'hungAtSpread')?.read.value ?? 0;
  const made = new Map<string, Uncertain>();
  for (const cell of records.map((record) => record[role])) {
    if (!cell || made.has(String(cell.value))) continue;
    const source: Source = {
      id: `${role}.${cell.value}`, label: role === 'massHung' ? 'Mass hung for timing' : 'Place of a mass hung for timing', symbol: role === 'massHung' ? 'm_c' : 'r_c', dimension: role === 'massHung' ? 'mass' : 'length',
      estimate: cell.value, u: cell.spread ?? spread, distribution: 'normal', dof: Infinity, family: { id: role, label: role === 'massHung' ? 'Masses hung for timing' : 'Places of the masses hung for timing' },
    };
    made.set(String(cell.value), anchor(ofSource(source)));
  }
  return (cell) => (cell ? made.get(String(cell.value))! : typed);
}

/** Timings of the records that count, grouped by what hung. */
export function timingsOf(records: readonly SessionRecord[], { bench, choices, ratio, shares }: TimingFacts, problems: Problem[]): readonly Timing[] {
  const timed = records.filter((record) => record.swingsTime !== null);
  if (timed.length === 0) return [];
  const massOf = valuesOf(bench, timed, 'massHung');
  const radiusOf = valuesOf(bench, timed, 'massHungAt');
  const spread = bench.entries.get('timingSpread')?.read.value ?? 0;
  if (spread === 0 && timed.some((record) => record.swingsTime!.spread === null)) problems.push(problem('timing-spread-missing', 'doubt', { entry: 'timingSpread' }, { timings: timed.length }));
  const inertia = valueOf(bench, 'hungMassInertia') ?? exact(0);
  const groups = new Map<string, { readonly hung: Timing['hung']; readonly configuration: ConfigurationName; readonly items: { readonly record: SessionRecord; readonly period: Uncertain }[] }>();
  for (const record of timed) {
    const T = timedOf(record, spread);
    const isHung = (record.massHung !== null && record.massHung.value !== 0) || (record.massHung === null && record.massHungAt !== null);
    const [mass, radius] = isHung ? [massOf(record.massHung), radiusOf(record.massHungAt)] : [null, null];
    if (!T || (isHung && (!mass || !radius))) {
      problems.push(problem(T ? 'timing-without-place' : 'timing-not-positive', 'doubt', placeOf(record), {}));
      continue;
    }
    const configuration: ConfigurationName = record.kind === 'tap' ? 'taps' : record.kind === 'shot' ? 'shots' : choices.periodTimedAs;
    const amplitude = record.amplitude ? exact(Math.abs(record.amplitude.value)) : valueOf(bench, 'periodAmplitude') ?? exact(0);
    if (!(amplitude.value < Math.PI)) {
      problems.push(problem('timing-not-positive', 'doubt', placeOf(record), {}));
      continue;
    }
    const period = propagate(undampedSmallPeriod, { timed: T, dampingRatio: ratio[configuration], amplitude, cycles: exact(record.cycles), gravityShare: shares[configuration] });
    const key = `${configuration}/${mass?.value ?? ''}/${radius?.value ?? ''}`;
    const group = groups.get(key) ?? { hung: mass && radius ? { mass, radius, inertia } : null, configuration, items: [] };
    group.items.push({ record, period });
    groups.set(key, group);
  }
  remarkHeavy([...groups.values()].flatMap(({ hung }) => (hung ? [hung.mass.value] : [])), bench, problems);
  return [...groups].map(([id, { hung, configuration, items }]) => {
    const periods = items.map(({ period }) => period);
    const own = ownParts(periods);
    const pooled = pooledMean(periods, own, { id: `timings.scatter.${id}`, label: 'Scatter of the timings', symbol: 'T', dimension: 'time', family: FAMILY, weights: weightsOf(own) });
    return { id, configuration, hung, period: anchor(pooled.mean), pooled, records: items.map(({ record }) => record) };
  });
}

/** Entries that are the pendulum's own masses. */
const OWN_MASSES = ['bobMass', 'stripMass', 'plateMass'] as const;

function remarkHeavy(hung: readonly number[], bench: BenchRead, problems: Problem[]): void {
  const own = OWN_MASSES.map((name) => bench.entries.get(name)).flatMap((entry) => (entry?.read.used === true && entry.value ? [entry.value.value] : []));
  const parts = bench.parts.flatMap(({ entries }) => entries.get('mass')?.value?.value ?? []);
  const pendulum = [...own, ...parts].reduce((a, b) => a + b, 0);
  const heaviest = Math.max(0, ...hung);
  if (pendulum > 0 && heaviest > pendulum) problems.push(problem('mass-heavier-than-pendulum', 'doubt', {}, { mass: heaviest, pendulum }));
}

/** T₀ of the bare pendulum in one configuration, from the table of timings. */
export const barePeriod = (timings: readonly Timing[], configuration: ConfigurationName): Anchor | null => timings.find((timing) => timing.hung === null && timing.configuration === configuration)?.period ?? null;
