/** Traces whose swings are too wide for the small swing's equation: what the full pendulum changes of each jump and of the frequency. */
import { problem, type Problem } from '../problems/problems.ts';
import { angleOfReading } from '../readings/angle.ts';
import { fitLargeSwing } from '../traces/largeSwing.ts';
import { fitSwing } from '../traces/swingFit.ts';
import { restAt } from '../traces/swingModel.ts';
import { firstAtOrAfter, type SwingSamples } from '../traces/swingSums.ts';
import type { BenchRead } from './entries.ts';
import { valueOf, type ConfigurationName } from './stand.ts';
import type { Scale } from './swings.ts';
import type { TraceFit } from './traceFit.ts';
import { configurationOf, type TraceKnown } from './traces.ts';

/** What is to be added to each jump taken as a small swing, rad, and by what the frequency is to be multiplied. */
export interface WideSwing {
  readonly corrections: readonly number[];
  readonly frequencyFactor: number;
  /** Greatest angle of the record about its rest line, rad. */
  readonly amplitude: number;
  /** β of −β|θ′|θ′ where it shows, 1/rad, with its u. */
  readonly quadratic: { readonly value: number; readonly u: number } | null;
}

/** Below this the equations differ by less than 1e-4: about 2°. */
export const WIDE = 0.035;
const SAMPLES_A_PERIOD = 16;
const MOST_SAMPLES = 20_000;
/** A quadratic drag of more than this many u is taken in. */
const SHOWS = 4;
/** A greater change than this part of the jumps is told. */
const TOLD = 5e-4;

const DONE = new WeakMap<TraceFit, { readonly key: string; readonly wide: WideSwing | null | 'notFitted' }>();

type Angle = (x: number, t: number) => number;

/** Angle of a reading about the plumb mark, or about the rest line where there is none; NaN where the geometry does not reach. */
function angleBy({ fit }: TraceFit, inVolts: boolean, scale: Scale, bench: BenchRead): Angle {
  const [slope, offset] = inVolts ? [valueOf(bench, 'sensorSlope')?.value ?? 0, valueOf(bench, 'sensorOffset')?.value ?? 0] : [1, 0];
  const stand = Object.fromEntries(Object.entries(scale.stand).map(([name, { value }]) => [name, value]));
  const mark = scale.mark?.value ?? null;
  return (x, t) => {
    try {
      return mark === null ? angleOfReading(scale.way, slope * (x - restAt(fit.model, t)), 0, scale.scale.value, stand) : angleOfReading(scale.way, offset + slope * x, mark, scale.scale.value, stand);
    } catch (failure) {
      if (!(failure instanceof RangeError)) throw failure;
      return NaN;
    }
  };
}

/** So few samples as the swing needs; those that average over a shot are left out. */
function thinned({ samples: { t, x, use }, fit }: TraceFit, exposure: number): SwingSamples {
  const spacing = (t[t.length - 1]! - t[0]!) / (t.length - 1);
  const every = Math.max(1, Math.min(Math.floor((2 * Math.PI) / (fit.frequency * spacing * SAMPLES_A_PERIOD)), Math.ceil(t.length / MOST_SAMPLES)));
  const n = Math.floor((t.length - 1) / every) + 1;
  const pick = (from: ArrayLike<number>): Float64Array => Float64Array.from({ length: n }, (_, i) => from[i * every]!);
  const few = { t: pick(t), x: pick(x), use: Uint8Array.from({ length: n }, (_, i) => use?.[i * every] ?? 1) };
  if (exposure > 0) for (const event of fit.times) for (let i = firstAtOrAfter(few.t, event - exposure / 2, 0); i < n && few.t[i]! < event + exposure / 2; i++) few.use[i] = 0;
  return few;
}

function widest(angle: Angle, { t, x, use }: SwingSamples, { fit }: TraceFit): number {
  let most = 0;
  for (let i = 0; i < t.length; i++) if (use?.[i] !== 0) most = Math.max(most, Math.abs(angle(x[i]!, t[i]!) - angle(restAt(fit.model, t[i]!), t[i]!)));
  return most;
}

/** The same thinned record by the small swing's equation and by the full one: what noise does is the same in both, and their difference is the equations'. */
function compare(found: TraceFit, angle: Angle, small: (jump: number, k: number) => number, few: SwingSamples, amplitude: number, share: number): WideSwing | 'notFitted' {
  const { fit } = found;
  const use = few.use!.slice();
  const theta = Float64Array.from(few.x, (value, i) => angle(value, few.t[i]!));
  theta.forEach((value, i) => {
    if (!Number.isNaN(value)) return;
    theta[i] = 0;
    use[i] = 0;
  });
  const start = { frequency: fit.frequency, ratio: fit.ratio };
  const options = { start, stretches: fit.model.rest.times.length - 1 };
  const linear = fitSwing({ ...few, use }, fit.times, options);
  const inAngle = fitSwing({ t: few.t, x: theta, use }, fit.times, options);
  if (linear.status !== 'fitted' || inAngle.status !== 'fitted') return 'notFitted';
  const samples = { t: few.t, x: theta, use };
  const plainOne = fitLargeSwing(samples, inAngle, share);
  if (plainOne.status !== 'fitted') return 'notFitted';
  const dragged = fitLargeSwing(samples, inAngle, share, true);
  const shows = dragged.status === 'fitted' && dragged.quadratic !== null && dragged.quadratic.value > SHOWS * dragged.quadratic.u;
  const full = shows ? dragged : plainOne;
  return {
    corrections: full.jumps.map((jump, k) => jump - small(linear.jumps[k]!, k)), frequencyFactor: full.frequency / linear.frequency, amplitude: Math.max(amplitude, full.amplitude), quadratic: shows ? dragged.quadratic : null,
  };
}

/** By trace; those of small swings have none. `shareOf`: gravity share p of the stand. */
export function wideSwings(known: readonly TraceKnown[], bench: BenchRead, scale: Scale | null, shareOf: (name: ConfigurationName) => number, problems: Problem[]): ReadonlyMap<string, WideSwing> {
  const wide = new Map<string, WideSwing>();
  if (!scale) return wide;
  for (const one of known) {
    const { trace, read, fitted: { found } } = one;
    if (!found || found.fit.jumps.length === 0 || found.fit.covariance[0] === 0) continue;
    const { fit } = found;
    const share = shareOf(configurationOf(found));
    const angle = angleBy(found, read.inVolts, scale, bench);
    // As a throw from the rest line, with no regard to how far it goes.
    const small = (jump: number, k: number): number => {
      const rest = restAt(fit.model, fit.times[k]!);
      return angle(rest + jump, fit.times[k]!) - angle(rest, fit.times[k]!);
    };
    const key = JSON.stringify([scale.way, scale.scale.value, scale.mark?.value ?? null, Object.values(scale.stand).map(({ value }) => value), share, fit.jumps.map(small)]);
    const kept = DONE.get(found);
    let made = kept?.key === key ? kept.wide : undefined;
    if (made === undefined) {
      const few = thinned(found, read.exposure);
      const amplitude = widest(angle, few, found);
      made = amplitude > WIDE ? compare(found, angle, small, few, amplitude, share) : null;
      if (made !== null && made !== 'notFitted' && !made.corrections.every(Number.isFinite)) made = 'notFitted';
      DONE.set(found, { key, wide: made });
    }
    tell(trace.name, made, fit.jumps.map(small), problems);
    if (made !== null && made !== 'notFitted') wide.set(trace.id, made);
  }
  return wide;
}

function tell(sheetName: string, made: WideSwing | null | 'notFitted', throws: readonly number[], problems: Problem[]): void {
  if (made === null) return;
  const jumps = throws.map((angle) => (Number.isFinite(angle) ? Math.abs(angle) : 0));
  if (made === 'notFitted') {
    // Of the order of θ²/8 of a jump of θ.
    problems.push(problem('trace-large-swing', 'doubt', { sheetName }, { how: 'small', degrees: (180 / Math.PI) * Math.max(...jumps), percent: 100 * (Math.max(...jumps) ** 2 / 8) }));
    return;
  }
  const most = Math.max(...made.corrections.map((by, k) => (jumps[k]! > 0 ? Math.abs(by) / jumps[k]! : 0)));
  if (most > TOLD || Math.abs(made.frequencyFactor - 1) > TOLD || made.quadratic) problems.push(problem('trace-large-swing', 'note', { sheetName }, { how: 'full', degrees: (180 / Math.PI) * made.amplitude, percent: 100 * most, drag: made.quadratic?.value ?? 0 }));
}
