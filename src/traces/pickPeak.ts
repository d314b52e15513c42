/** What a person would read off the trace: the first maximum after a shot, less the rest before it, with the damping taken out. */
import { dampingFactor } from '../pendulum/damping.ts';
import { restAt, type SwingModel } from './swingModel.ts';
import { firstAtOrAfter, type SwingSamples } from './swingSums.ts';

/** The first maximum is looked for up to this part of a period after the shot. */
const LATEST = 0.45;

/**
 * D (x_p − z), x_p by a parabola through the extreme sample and its neighbours, z the rest line; signed. It takes the pendulum as hanging
 * still before: what it still swung comes in whole, which is what it is compared for.
 * null where the next event, a sample left out, or the end of the record comes before the maximum.
 *
 * Valid: 0 ≤ ζ < 1. Source: methods 1.3, 1.17 (parabola through three frames).
 */
export function pickedThrow({ t, x, use }: SwingSamples, model: SwingModel, event: number, next: number): number | null {
  const period = (2 * Math.PI) / model.frequency;
  const until = event + LATEST * period;
  if (next < until || t[t.length - 1]! < until) return null;
  const [from, to] = [firstAtOrAfter(t, event, 0), firstAtOrAfter(t, until, 0)];
  let best = -1;
  for (let i = from; i < to; i++) {
    if (use && use[i] === 0) continue;
    if (best < 0 || Math.abs(x[i]! - restAt(model, t[i]!)) > Math.abs(x[best]! - restAt(model, t[best]!))) best = i;
  }
  if (best <= from || best >= to - 1 || (use && (use[best - 1] === 0 || use[best + 1] === 0))) return null;
  const [a, b, c] = [x[best - 1]!, x[best]!, x[best + 1]!];
  const bend = a - 2 * b + c;
  const peak = bend === 0 ? b : b - ((a - c) * (a - c)) / (8 * bend);
  return dampingFactor(Math.min(0.99, Math.max(0, model.ratio))) * (peak - restAt(model, t[best]!));
}
