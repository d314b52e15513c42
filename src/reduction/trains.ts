/** Trains of pulses in traces: the mean impulse bit of each, κθ/(r ℓ), by the same factors as a shot. */
import { combine, ofSource, propagate, type Uncertain } from '../metrology/uncertain.ts';
import type { Source } from '../metrology/source.ts';
import { ripple } from '../traces/steadyTrain.ts';
import { restAt } from '../traces/swingModel.ts';
import type { BenchRead } from './entries.ts';
import type { Result } from './results.ts';
import type { Swing } from './shots.ts';
import type { Scale } from './swings.ts';
import type { TrainFit } from './traceFit.ts';
import { recordOf, throwAngle, type TraceKnown } from './traces.ts';
import type { TrainTold } from './traceResults.ts';

/** A train as the swing that one pulse of its mean would make: H = κθ/r = K ωθ/r, so that its launch is ωθ/r whichever way K is known. */
export interface TrainSwing extends TrainFit {
  readonly trace: string;
  readonly deflection: Uncertain;
  readonly swing: Swing;
}

/** κ of a pendulum of gravity share p bends with the angle: κ(p sin θ + (1 − p) θ). */
export function trainSwings(known: readonly TraceKnown[], bench: BenchRead, scale: Scale | null, share: Uncertain): readonly TrainSwing[] {
  return known.flatMap(({ trace, read, fitted: { found }, frequency, ratio }) => {
    if (!found || !frequency || !ratio) return [];
    return found.trains.map(({ train, steady }, k): TrainSwing => {
      const label = 'Noise of the trains';
      const noise = ofSource({ id: `${trace.id}.${train.id}`, label, symbol: 'x', dimension: 'length', estimate: 0, u: 1, distribution: 'normal', dof: Infinity, family: { id: 'traces.trains', label } });
      const deflection: Uncertain = { ...combine([[steady.u, noise], [steady.byFrequency, frequency], [steady.byRatio, ratio]]), value: steady.deflection };
      const rateSource: Source = { id: `${trace.id}.${train.id}.rate`, label: 'Repetition rate of the train', symbol: 'r', dimension: 'frequency', estimate: train.rate, u: train.spread, distribution: train.spread > 0 ? 'normal' : 'exact', dof: Infinity };
      const theta = scale && throwAngle(deflection, restAt(found.fit.model, train.from), read.inVolts, scale, bench);
      const launch = theta && propagate(({ theta: a, p, w, r }) => (w * (p * Math.sin(a) + (1 - p) * a)) / r, { theta, p: share, w: frequency, r: ofSource(rateSource) });
      return {
        train, steady, trace: trace.id, deflection,
        swing: { record: recordOf(trace, { id: train.id, kind: 'shot', impulse: '' }, train.from, k + 1), configuration: 'shots', readings: { restFrom: null, rest: null, first: null, next: [] }, angle: launch, launch: launch && { full: launch, smallAngle: launch } },
      };
    });
  });
}

export function trainTold({ train, steady, deflection, swing }: TrainSwing, frequency: number, ratio: number, u: number, impulse: Result | null): TrainTold {
  return {
    id: train.id, from: train.from, to: train.to, rate: train.rate, pulses: Math.round((train.to - train.from) * train.rate), deflection: { value: steady.deflection, u }, ripple: ripple(train.rate, { frequency, ratio }),
    impulse: swing.launch === null || deflection.value === 0 ? null : impulse,
  };
}
