/** One record opened: the chain from its readings to its impulse bit, each step with its value, uncertainty and equation. */
import { exact, propagate, type Uncertain } from '../metrology/uncertain.ts';
import { dampingFactor } from '../pendulum/damping.ts';
import { WAYS } from '../readings/ways.ts';
import type { Dimension } from '../units/units.ts';
import { stated } from './run.ts';
import type { ChainStep } from './results.ts';
import type { Form, Swing, Way } from './shots.ts';
import type { Damping, Scale } from './swings.ts';

function angleEquation(scale: Scale): string {
  const { equation } = WAYS[scale.way];
  if (scale.sideToSide) return `${equation}, x the way from side to side shared as 1 : q, q = e^(−δ/2)`;
  return scale.mark ? `${equation}; θ_p = θ(s (x₁ − x_m)) − θ(s (x₀ − x_m))` : `${equation}; θ_p = θ(s (x₁ − x₀))`;
}

export interface Explained {
  readonly swing: Swing;
  readonly scale: Scale;
  readonly damping: Damping;
  readonly share: Uncertain;
  /** The lever arm that this record's impulse acts at: r_t, or r_h for a tap. */
  readonly arm: Uncertain | null;
  /** Calibration factor of the record's configuration, by each way. */
  readonly factor: Readonly<Record<Way, Uncertain | null>>;
  /** Impulse by form and way. */
  readonly impulse: (form: Form, way: Way) => Uncertain | null;
  readonly chosen: { readonly form: Form; readonly way: Way };
  readonly known: Uncertain | null;
}

/** Chain of a record that has both readings; steps that could not be taken are left out. */
export function chainOf(x: Explained): readonly ChainStep[] {
  const { swing, scale, damping, chosen } = x;
  const reading: Dimension = scale.way === 'cameraPivotMarker' ? 'angle' : WAYS[scale.way].reads;
  const steps: ChainStep[] = [];
  const add = (id: string, label: string, symbol: string, equation: string, dimension: Dimension, y: Uncertain | null, more: { factor?: number; aside?: true } = {}): void => {
    if (y) steps.push({ id, label, symbol, equation, dimension, stated: stated(y), ...more });
  };
  const tap = swing.record.kind === 'tap';
  add('rest', 'Rest reading', 'x₀', '', reading, swing.readings.rest);
  add('first', 'First swing', 'x₁', '', reading, swing.readings.first);
  if (swing.readings.rest && swing.readings.first) {
    add('throw', 'Throw', 'x₁ − x₀', 'reading less rest', reading, propagate(({ a, b }) => a - b, { a: swing.readings.first, b: swing.readings.rest }));
  }
  add('angle', 'First-swing angle', 'θ_p', (scale.sense === -1 ? '−' : '') + angleEquation(scale), 'angle', swing.angle);
  if (!swing.angle || !swing.launch) return steps;
  const ratio = damping.ratio[swing.configuration];
  const D = propagate(({ z }) => dampingFactor(z), { z: ratio });
  add('ratio', 'Damping ratio', 'ζ', 'ζ = δ/√(4π² + δ²)', 'number', ratio);
  add('damping', 'Damping of the first swing', 'D', 'D = exp[ζ arccos ζ/√(1 − ζ²)]', 'number', D, { factor: D.value });
  const other: Form = chosen.form === 'full' ? 'smallAngle' : 'full';
  add('share', 'Gravity share of the stiffness', 'p', 'p = M g d/κ', 'number', x.share);
  const form = (f: Form, aside: boolean): void => {
    const y = swing.launch![f];
    const label = f === 'full' ? 'Launch, full pendulum' : 'Launch, small angle';
    const equation = f === 'full' ? 'φ = θ′(0⁺)/ω_n: θ″ + 2ζω_n θ′ + ω_n²[p sin θ + (1 − p)θ] = 0, solved back from θ_p' : 'φ = D θ_p';
    const factor = swing.angle!.value === 0 ? 1 : y.value / swing.angle!.value;
    add(`launch.${f}`, label, 'φ', equation, 'angle', y, aside ? { factor, aside: true } : { factor });
  };
  form(chosen.form, false);
  form(other, true);
  const way = (w: Way, aside: boolean): void => {
    const label = w === 'geometry' ? 'Calibration factor, geometry' : 'Calibration factor, taps';
    const equation = w === 'geometry' ? 'K = √(J κ)' : tap ? 'K = mean of s_h I_h r_h/φ over the taps' : 'K = (mean of s_h I_h r_h/φ over the taps) · √(J_f κ_f/(J_c κ_c))';
    add(`factor.${w}`, label, 'K', equation, 'calibrationFactor', x.factor[w], aside ? { aside: true } : {});
  };
  way(chosen.way, false);
  way(chosen.way === 'geometry' ? 'taps' : 'geometry', true);
  const K = x.factor[chosen.way];
  if (K) add('moment', 'Angular impulse', 'H', 'H = K φ', 'angularImpulse', propagate(({ k, f }) => k * f, { k: K, f: swing.launch[chosen.form] }));
  add('arm', tap ? 'Lever arm of the tap' : 'Lever arm of the thrust', tap ? 'r_h' : 'r_t', '', 'length', x.arm);
  const out = tap ? 'Impulse of the tap, as read' : 'Impulse bit';
  add('impulse', out, 'I_bit', tap ? 'I = H/r_h' : 'I_bit = H/r_t', 'impulse', x.impulse(chosen.form, chosen.way));
  add('impulse.otherForm', `${out}, ${other === 'full' ? 'full pendulum' : 'small angle'}`, 'I_bit', '', 'impulse', x.impulse(other, chosen.way), { aside: true });
  add('impulse.otherWay', `${out}, by ${chosen.way === 'geometry' ? 'taps' : 'geometry'}`, 'I_bit', '', 'impulse', x.impulse(chosen.form, chosen.way === 'geometry' ? 'taps' : 'geometry'), { aside: true });
  if (tap) add('known', 'Impulse of the tap, as stated', 'I_h', 's_h I_h', 'impulse', x.known ?? exact(0), { aside: true });
  return x.known || !tap ? steps : steps.filter((s) => s.id !== 'known');
}
