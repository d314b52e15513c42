/** A sketch of one swing: the pendulum at its true angle, and the decaying swing after it, as paths for an SVG. */

interface Swing {
  /** First-swing angle from rest θ_p, rad. */
  readonly angle: number;
  /** Damping-corrected first swing φ, rad. */
  readonly launch: number;
  /** Damping ratio ζ, 1. */
  readonly dampingRatio: number;
}

interface Point {
  readonly x: number;
  readonly y: number;
}

export interface SwingSketch {
  readonly width: number;
  readonly height: number;
  readonly pivot: Point;
  readonly restTip: Point;
  readonly swingTip: Point;
  /** Arc from rest to first swing, SVG path. */
  readonly arc: string;
  /** θ(t) over the cycles drawn, SVG path. */
  readonly decay: string;
  /** Rest line of the decay, from and to. */
  readonly restLine: readonly [Point, Point];
  readonly firstPeak: Point;
  /** Height of φ, the swing that there would be without damping. */
  readonly undampedY: number;
}

const WIDTH = 360;
const HEIGHT = 120;
const PIVOT = { x: 60, y: 8 };
const LENGTH = 96;
const DECAY_FROM = 140;
const DECAY_TO = 352;
const MIDDLE = 62;
const PEAK = 42;
const CYCLES = 3;
const POINTS = 180;

const at = ({ x, y }: Point): string => `${x.toFixed(1)} ${y.toFixed(1)}`;

/**
 * θ(t)/θ_p of a viscously damped pendulum, time in damped cycles from the launch.
 *
 * θ/φ = exp(−ζ ω_n t)·sin(ω_d t)/√(1 − ζ²). Valid: 0 ≤ ζ < 1.
 * Source: the free motion of a damped linear oscillator, any textbook of vibrations (from memory).
 */
function decaying(dampingRatio: number): (cycles: number) => number {
  const root = Math.sqrt(1 - dampingRatio ** 2);
  return (cycles) => {
    const phase = 2 * Math.PI * cycles;
    return (Math.exp((-dampingRatio * phase) / root) * Math.sin(phase)) / root;
  };
}

/** null where ζ is 1 or more: no swing to draw. */
export function swingSketch({ angle, launch, dampingRatio }: Swing): SwingSketch | null {
  if (!(dampingRatio >= 0 && dampingRatio < 1) || angle === 0) return null;
  const tip = (turn: number): Point => ({ x: PIVOT.x + LENGTH * Math.sin(turn), y: PIVOT.y + LENGTH * Math.cos(turn) });
  const restTip = tip(0);
  const swingTip = tip(angle);
  const swing = decaying(dampingRatio);
  const peakAt = Math.acos(dampingRatio) / (2 * Math.PI);
  const peak = swing(peakAt);
  const place = (cycles: number): Point => ({
    x: DECAY_FROM + ((DECAY_TO - DECAY_FROM) * cycles) / CYCLES,
    y: MIDDLE - (PEAK * swing(cycles)) / peak,
  });
  const line = Array.from({ length: POINTS + 1 }, (_, index) => at(place((CYCLES * index) / POINTS)));
  return {
    width: WIDTH,
    height: HEIGHT,
    pivot: PIVOT,
    restTip,
    swingTip,
    arc: `M ${at(restTip)} A ${LENGTH} ${LENGTH} 0 ${Math.abs(angle) > Math.PI ? 1 : 0} ${angle > 0 ? 0 : 1} ${at(swingTip)}`,
    decay: `M ${line.join(' L ')}`,
    restLine: [{ x: DECAY_FROM, y: MIDDLE }, { x: DECAY_TO, y: MIDDLE }],
    firstPeak: place(peakAt),
    undampedY: Math.max(2, MIDDLE - PEAK * Math.abs(launch / angle)),
  };
}
