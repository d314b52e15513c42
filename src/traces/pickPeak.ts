/** What the first maximum after a shot tells by itself: a check of its jump that uses a few samples in place of all. */
import { dampingFactor } from '../pendulum/damping.ts';
import { swingOver, type SwingModel } from './swingModel.ts';
import { firstAtOrAfter, type SwingSamples } from './swingSums.ts';

/** The first maximum is looked for up to this part of a period after the shot. */
const LATEST = 0.45;

/** The swing and the rest line as they would have gone on without the strike. */
export function swungOn(model: SwingModel, event: number): SwingModel | null {
  const stretches = model.stretches.filter(({ begins }) => begins < event);
  return stretches.length === 0 ? null : { ...model, stretches };
}

/**
 * D x_p: the highest of what the shot added to the swing that was there before, by a parabola through the extreme sample and its
 * neighbours, D taking the damping out; signed.
 * null where the next event, a sample left out, or the end of the record comes before the maximum.
 *
 * Valid: 0 ≤ ζ < 1. Source: methods 1.3, 1.17 (parabola through three frames).
 */
export function pickedThrow({ t, x, use }: SwingSamples, model: SwingModel, event: number, next: number): number | null {
  const period = (2 * Math.PI) / model.frequency;
  const until = event + LATEST * period;
  const before = swungOn(model, event);
  if (before === null || next < until || t[t.length - 1]! < until) return null;
  const [from, to] = [firstAtOrAfter(t, event, 0), firstAtOrAfter(t, until, 0)];
  const went = swingOver(before, t.subarray(from, to));
  const added = (i: number): number => x[i]! - went[i - from]!;
  let best = -1;
  for (let i = from; i < to; i++) if (use?.[i] !== 0 && (best < 0 || Math.abs(added(i)) > Math.abs(added(best)))) best = i;
  if (best <= from || best >= to - 1 || (use && (use[best - 1] === 0 || use[best + 1] === 0))) return null;
  const [a, b, c] = [added(best - 1), added(best), added(best + 1)];
  const bend = a - 2 * b + c;
  return dampingFactor(Math.min(0.99, Math.max(0, model.ratio))) * (bend === 0 ? b : b - ((a - c) * (a - c)) / (8 * bend));
}
