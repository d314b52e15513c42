/** From two readings of a record to its first-swing angle: the way's own function about the plumb mark, or about the record's own rest. */
import { rootBetween } from '../numeric/roots.ts';
import { WAYS, type ReadingWay, type StandNumbers } from './ways.ts';

/** Stand numbers, with x the reading, mark the reading straight under the pivot, scale the true length per length read. */
export function angleOfReading(way: ReadingWay, x: number, mark: number, scale: number, stand: StandNumbers): number {
  return WAYS[way].angle(scale * (x - mark), stand);
}

/** θ_p = θ(s (x₁ − x₀)): the record's own rest is taken as the plumb point. */
export const swingFromRest = (way: ReadingWay) => (n: StandNumbers): number => angleOfReading(way, n['first']!, n['rest']!, n['scale']!, n);
/** θ_p = θ(s (x₁ − x_m)) − θ(s (x₀ − x_m)) with a known plumb mark. */
export const swingFromMark = (way: ReadingWay) => (n: StandNumbers): number =>
  angleOfReading(way, n['first']!, n['mark']!, n['scale']!, n) - angleOfReading(way, n['rest']!, n['mark']!, n['scale']!, n);

/**
 * First-swing angle from the whole way from side to side: the θ_p whose reading, less that of the return swing q θ_p on
 * the other side, is the way read; q = e^{−δ/2}, the half cycle's decay.
 *
 * Valid: viscous decay; 0 < q ≤ 1. Source: methods 1.3 (zero-free form), with the scale's curvature kept.
 * @throws RangeError where no swing below a quarter turn gives that way.
 */
export const swingFromSides = (way: ReadingWay) => (n: StandNumbers): number => {
  const total = n['scale']! * n['first']!;
  const q = n['halfDecay']!;
  const excess = (theta: number): number => WAYS[way].reading(theta, n) - WAYS[way].reading(-q * theta, n) - total;
  // A tilted screen ends before the widest swing; beyond its end the spot comes from infinity on the other side.
  for (let reach = WIDEST_FROM_SIDES; reach > LEAST_REACH; reach *= 0.8) {
    const root = rootBetween(excess, -reach, reach);
    if (root.status === 'found' && Math.abs(excess(root.x)) <= 1e-9 * Math.abs(total)) return root.x;
  }
  throw new RangeError(`side to side: no swing reads ${total}`);
};
const LEAST_REACH = 1e-3;
/** Laser and line geometries run away at a quarter turn of the beam; wider swings are not read from side to side. */
export const WIDEST_FROM_SIDES = 0.78;
