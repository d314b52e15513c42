/** The swing drawn: the pendulum at its true angle, and how the swing dies away after the first peak. */
import { swingSketch } from '../../plots/swingSketch.ts';
import { plain } from '../../units/format.ts';
import { siUnit, unitNamed } from '../../units/units.ts';
import styles from './record.module.css';

interface Props {
  /** θ_p and φ, rad. */
  readonly angle: number;
  readonly launch: number;
  /** ζ, 1. */
  readonly dampingRatio: number;
  /** T_0, s. */
  readonly period: number;
}

const DEGREE = unitNamed('°', 'angle') ?? siUnit('angle');

export function SwingPicture({ angle, launch, dampingRatio, period }: Props) {
  const sketch = swingSketch({ angle, launch, dampingRatio });
  if (sketch === null) return null;
  const { width, height, pivot, restTip, swingTip, firstPeak } = sketch;
  const [restFrom, restTo] = sketch.restLine;
  const degrees = plain(angle, DEGREE, 3);
  return (
    <figure className={styles.swing} aria-label="The swing">
      <svg viewBox={`0 0 ${width} ${height}`} role="img" aria-label={`Rest and first swing, ${degrees} apart, drawn to the true angle; beside it the swing dying away.`}>
        <line className={styles.rest} x1={pivot.x} y1={pivot.y} x2={restTip.x} y2={restTip.y} />
        <line className={styles.arm} x1={pivot.x} y1={pivot.y} x2={swingTip.x} y2={swingTip.y} />
        <path className={styles.arc} d={sketch.arc} />
        <circle className={styles.pivot} cx={pivot.x} cy={pivot.y} r="2.5" />
        <circle className={styles.tip} cx={swingTip.x} cy={swingTip.y} r="3.5" />
        <line className={styles.rest} x1={restFrom.x} y1={restFrom.y} x2={restTo.x} y2={restTo.y} />
        <line className={styles.undamped} x1={restFrom.x} y1={sketch.undampedY} x2={restTo.x} y2={sketch.undampedY} />
        <path className={styles.decay} d={sketch.decay} />
        <circle className={styles.tip} cx={firstPeak.x} cy={firstPeak.y} r="3.5" />
      </svg>
      <figcaption className="quiet">
        Left: rest (dashed) and first swing, {degrees}, at its true angle. Right: the swing dying away, a sketch from ζ and T₀ = {plain(period, siUnit('time'), 4)};
        {' '}the dotted line is the damping-corrected first swing φ.
      </figcaption>
    </figure>
  );
}
