/** One factor's interval on an axis that all rows of the table share, so that the rows make one picture: thin U, thick u, the chosen one's interval as the band behind. */
import styles from './calibration.module.css';

/** Ends of the shared axis: factor less the chosen one, relative. */
export interface IntervalAxis {
  readonly low: number;
  readonly high: number;
}

interface Props {
  readonly axis: IntervalAxis;
  /** Relative to the chosen factor: place, u and U. */
  readonly at: number;
  readonly u: number;
  readonly U: number;
  /** U of the chosen factor, relative. */
  readonly band: number;
  readonly chosen: boolean;
  readonly words: string;
}

const WIDTH = 240;
const HEIGHT = 28;
const MIDDLE = HEIGHT / 2;
const CAP = 4;

/** Axis that holds every interval with a little room. */
export function intervalAxis(rows: readonly { readonly at: number; readonly U: number }[]): IntervalAxis {
  const low = Math.min(0, ...rows.map(({ at, U }) => at - U));
  const high = Math.max(0, ...rows.map(({ at, U }) => at + U));
  const room = 0.05 * (high - low || 1);
  return { low: low - room, high: high + room };
}

export function IntervalMark({ axis, at, u, U, band, chosen, words }: Props) {
  const x = (value: number): number => ((value - axis.low) / (axis.high - axis.low)) * WIDTH;
  return (
    <svg className={styles.interval} viewBox={`0 0 ${WIDTH} ${HEIGHT}`} role="img" aria-label={words} preserveAspectRatio="none">
      <rect className={styles.band} x={x(-band)} y={0} width={x(band) - x(-band)} height={HEIGHT} />
      <line className={styles.middle} x1={x(0)} x2={x(0)} y1={0} y2={HEIGHT} />
      <path className={styles.whisker} d={`M${x(at - U)} ${MIDDLE}H${x(at + U)}M${x(at - U)} ${MIDDLE - CAP}V${MIDDLE + CAP}M${x(at + U)} ${MIDDLE - CAP}V${MIDDLE + CAP}`} />
      <path className={styles.thick} d={`M${x(at - u)} ${MIDDLE}H${x(at + u)}`} />
      <circle className={chosen ? styles.chosenMark : styles.mark} cx={x(at)} cy={MIDDLE} r={4} />
    </svg>
  );
}
