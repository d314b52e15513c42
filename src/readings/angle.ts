/** From the reading of a scale to the pendulum's angle: module-level functions of numbers, one pair a way of reading. */

export type ReadingWay = 'rulerAtTip' | 'rulerUnderLine' | 'laserSpot' | 'angle';

/** x reading, m or rad · mark reading straight under the pivot (laser: where the beam meets the screen square) · far R, H or D, m · scale true length per length read. */
export type AngleInputs = Readonly<Record<'x' | 'mark' | 'far' | 'scale', number>>;

/**
 * Angle θ of the pendulum from its plumb line, rad, by the way of reading:
 * - rulerAtTip: flat horizontal ruler read square under the tip, θ = asin(s (x − x₀)/R); valid |s (x − x₀)| ≤ R
 * - rulerUnderLine: ruler crossed by the pendulum's line, θ = atan(s (x − x₀)/H)
 * - laserSpot: flat screen square to the rest beam, θ = ½ atan(s (x − x₀)/D)
 * - angle: θ = s (x − x₀)
 *
 * Source: methods 2, derived by geometry.
 * @throws RangeError where a ruler reading lies farther out than its radius.
 */
export function angleOfReading(way: ReadingWay, { x, mark, far, scale }: AngleInputs): number {
  const out = scale * (x - mark);
  switch (way) {
    case 'rulerAtTip':
      if (Math.abs(out) > far) throw new RangeError(`ruler at the tip: ${out} m is beyond the radius ${far} m`);
      return Math.asin(out / far);
    case 'rulerUnderLine':
      return Math.atan(out / far);
    case 'laserSpot':
      return Math.atan(out / far) / 2;
    case 'angle':
      return out;
  }
}

const MODELS = {
  rulerAtTip: (x: AngleInputs) => angleOfReading('rulerAtTip', x),
  rulerUnderLine: (x: AngleInputs) => angleOfReading('rulerUnderLine', x),
  laserSpot: (x: AngleInputs) => angleOfReading('laserSpot', x),
  angle: (x: AngleInputs) => angleOfReading('angle', x),
} as const;
export const angleModel = (way: ReadingWay): ((x: AngleInputs) => number) => MODELS[way];

export type SwingInputs = Readonly<Record<'first' | 'rest' | 'far' | 'scale', number>>;
export type MarkedSwingInputs = Readonly<Record<'first' | 'rest' | 'mark' | 'far' | 'scale', number>>;

const fromRest = (way: ReadingWay) => ({ first, rest, far, scale }: SwingInputs): number => angleOfReading(way, { x: first, mark: rest, far, scale });
const fromMark = (way: ReadingWay) => ({ first, rest, mark, far, scale }: MarkedSwingInputs): number =>
  angleOfReading(way, { x: first, mark, far, scale }) - angleOfReading(way, { x: rest, mark, far, scale });

/** First-swing angle where the record's own rest is taken as the plumb point: θ_p = θ(x₁; x₀ = rest). */
export const swingFromRest = { rulerAtTip: fromRest('rulerAtTip'), rulerUnderLine: fromRest('rulerUnderLine'), laserSpot: fromRest('laserSpot'), angle: fromRest('angle') } as const;
/** First-swing angle with a known plumb mark: θ_p = θ(x₁) − θ(rest). */
export const swingFromMark = { rulerAtTip: fromMark('rulerAtTip'), rulerUnderLine: fromMark('rulerUnderLine'), laserSpot: fromMark('laserSpot'), angle: fromMark('angle') } as const;
