/** One record opened: the chain from its readings to its impulse bit, each step with its value, uncertainty and equation. */
import { exact, propagate, type Uncertain } from '../metrology/uncertain.ts';
import { dampingFactor } from '../pendulum/damping.ts';
import { WAYS } from '../readings/ways.ts';
import type { Dimension } from '../units/units.ts';
import { budgetOfRecord, stated } from './run.ts';
import { expanded, finiteSources } from '../metrology/coverage.ts';
import { swingBefore } from './background.ts';
import { factorAt, launchAt } from './factors.ts';
import type { Road } from './road.ts';
import type { ChainStep, Reduction } from './results.ts';
import type { Form, Swing, Way } from './shots.ts';
import { valueOf } from './stand.ts';
import { WAY_WORDS } from './wayWords.ts';
import type { Damping, Scale } from './swings.ts';

function angleEquation(scale: Scale): string {
  const { equation } = WAYS[scale.way];
  if (scale.sideToSide) return `${equation}, x the way from side to side shared as 1 : q, q = e^(−δ/2)`;
  return scale.mark ? `${equation}; θ_p = θ(s (x₁ − x_m)) − θ(s (x₀ − x_m))` : `${equation}; θ_p = θ(s (x₁ − x₀))`;
}

const EQUATION_OF_MOTION: Readonly<Record<Damping['law'], string>> = {
  viscous: 'φ = θ′(0⁺)/ω_n: θ″ + 2ζω_n θ′ + ω_n²[p sin θ + (1 − p)θ] = 0, solved back from θ_p',
  quadratic: 'φ = θ′(0⁺)/ω_n: θ″ + β|θ′|θ′ + ω_n²[p sin θ + (1 − p)θ] = 0, solved back from θ_p',
  friction: 'φ = θ′(0⁺)/ω_n: θ″ + ω_n²[θ_f sgn θ′ + p sin θ + (1 − p)θ] = 0, solved back from θ_p',
};

function factorEquation(way: Way, tap: boolean): string {
  switch (way) {
    case 'geometry': return 'K = √(J κ)';
    case 'taps': return tap ? 'K = mean of s_h I_h r_h/φ over the taps' : 'K = (mean of s_h I_h r_h/φ over the taps) · K_f/K_c, K = √(J κ) (of a film by its modes)';
    case 'addedMasses': return 'K = √(J κ), J and κ from T_i²(κ + m_i g r_i) = 4π²(J + m_i r_i²)';
    case 'weights': return 'K = κ T_0/2π, κ from known weights';
    case 'adjustment': return 'K = √(J κ), J and κ by least squares over all evidence';
  }
}

/** One record opened; its chain is empty where the stand is not known. */
export function explained(swing: Swing, road: Road): NonNullable<Reduction['explained']> {
  const y = road.impulse(swing, road.form, road.way);
  return {
    record: swing.record.id, chain: road.scale ? chainOf(swing, road.scale, road) : [],
    budget: y ? budgetOfRecord(y, expanded(y, finiteSources([y])), road.bench.sources) : null,
  };
}

/** Chain of a record that has both readings; steps that could not be taken are left out. */
function chainOf(swing: Swing, scale: Scale, road: Road): readonly ChainStep[] {
  const { damping, corrections, reported } = road;
  const chosen = { form: road.form, way: road.way };
  const c = swing.configuration;
  const factorBy = (w: Way): Uncertain | null => factorAt(road.factors[road.form], w, swing);
  const known = road.taps.find((tap) => tap.swing === swing)?.impulse ?? null;
  const reading: Dimension = scale.way === 'cameraPivotMarker' ? 'angle' : WAYS[scale.way].reads;
  const steps: ChainStep[] = [];
  const add = (id: string, label: string, symbol: string, equation: string, dimension: Dimension, y: Uncertain | null, more: Partial<Pick<ChainStep, 'factor' | 'aside' | 'measuredWith'>> = {}): void => {
    if (y) steps.push({ id, label, symbol, equation, dimension, stated: stated(y), ...more });
  };
  const tap = swing.record.kind === 'tap';
  const readWith = road.bench.readWith.get(swing.record.sheet)?.words;
  const by = (words: string | undefined): Pick<ChainStep, 'measuredWith'> => (words === undefined ? {} : { measuredWith: words });
  add('rest', 'Rest reading', 'x₀', '', reading, swing.readings.rest, by(readWith));
  add('first', 'First swing', 'x₁', '', reading, swing.readings.first, by(readWith));
  if (swing.readings.rest && swing.readings.first) {
    add('throw', 'Throw', 'x₁ − x₀', 'reading less rest', reading, propagate(({ a, b }) => a - b, { a: swing.readings.first, b: swing.readings.rest }));
  }
  const scaled = scale.bySheet.get(swing.record.sheet);
  if (scaled) add('scale', 'Scale of the readings', 's', 'scale of the ruler times the calibration of what was read with', 'number', scaled, by(readWith));
  const { jump } = swing;
  if (jump) {
    add('jump', 'Jump of the swing in its trace', 'Δx′/ω_n', 'all jumps of the record by least squares, position continuous', jump.dimension, jump.value);
    if (jump.dimension === 'voltage') add('slope', 'Slope of the sensor', 'b_s', 'x = a_s + b_s V', 'sensorSlope', valueOf(road.bench, 'sensorSlope'));
  }
  add('angle', jump ? 'The same as an angle' : 'First-swing angle', jump ? 'φ' : 'θ_p', (scale.sense === -1 ? '−' : '') + (jump ? WAYS[scale.way].equation : angleEquation(scale)), 'angle', swing.angle);
  if (!swing.angle || !swing.launch) return steps;
  const ratio = damping.ratio[swing.configuration];
  const D = propagate(({ z }) => dampingFactor(z), { z: ratio });
  if (jump) {
    // The damping is in the fit.
  } else if (damping.law === 'viscous') {
    add('ratio', 'Damping ratio', 'ζ', 'ζ = δ/√(4π² + δ²)', 'number', ratio);
    add('damping', 'Damping of the first swing', 'D', 'D = exp[ζ arccos ζ/√(1 − ζ²)]', 'number', D, { factor: D.value });
  } else if (damping.law === 'quadratic') add('quadratic', 'Quadratic damping', 'β', 'J θ″ = −b|θ′|θ′ − …, β = b/J', 'number', damping.quadratic[swing.configuration]);
  else add('friction', 'Friction of the pivot', 'θ_f', 'θ_f = τ_f/κ', 'angle', damping.friction[swing.configuration]);
  const { amplitude: background, state: before } = swingBefore(corrections.background, swing.record);
  const other: Form = chosen.form === 'full' ? 'smallAngle' : 'full';
  add('share', 'Gravity share of the stiffness', 'p', 'p = M g d/κ', 'number', road.shares[c]);
  const form = (f: Form, aside: boolean): void => {
    const y = swing.launch![f];
    if (jump) {
      if (!aside) add(`launch.${f}`, 'Launch', 'φ', 'φ = Δθ′/ω_n, the jump itself', 'angle', y, { factor: 1 });
      return;
    }
    const label = f === 'full' ? 'Launch, full pendulum' : 'Launch, small angle';
    const equation = before ? `φ = [θ′(0⁺) − θ′(0⁻)]/ω_n: ${f === 'full' ? 'the full pendulum' : 'the same with p = 0'} solved back from θ_p to x_f` : f === 'full' ? EQUATION_OF_MOTION[damping.law] : damping.law === 'viscous' ? 'φ = D θ_p' : 'the same with p = 0';
    const factor = swing.angle!.value === 0 ? 1 : y.value / swing.angle!.value;
    add(`launch.${f}`, label, 'φ', equation, 'angle', y, aside ? { factor, aside: true } : { factor });
  };
  for (const one of corrections.reading) add(`correction.${one.id}`, one.label, one.symbol, one.equation, 'number', one.factor, { factor: one.factor.value });
  if (before) {
    add('before.deflection', 'Deflection at the shot', 'x_f', 'of the swing before it, A_0 and φ_0 damped on to the shot', 'angle', before.deflection);
    add('before.speed', 'Speed at the shot', 'v_f/ω_n', 'of the swing before it, along the thrust positive', 'angle', before.speed);
  } else if (background > 0) add('before.amplitude', 'Swing before the shot, phase not known', 'A_0', 'φ = (a + √(a² − A_0²))/2, a the launch without it; ± A_0/√2 of this record alone', 'angle', exact(background));
  form(chosen.form, false);
  form(other, true);
  const way = (w: Way, aside: boolean): void => {
    add(`factor.${w}`, `Calibration factor, ${WAY_WORDS[w]}`, 'K', factorEquation(w, tap), 'calibrationFactor', factorBy(w), aside ? { aside: true } : {});
  };
  way(chosen.way, false);
  way(chosen.way === 'geometry' ? 'taps' : 'geometry', true);
  const K = factorBy(chosen.way);
  const intercept = chosen.way === 'taps' ? road.factors[chosen.form].tapCalibration?.intercept ?? null : null;
  add('intercept', 'Intercept of the taps’ line', 'a', 'φ = a + H/K over the taps', 'angle', intercept);
  if (K) add('moment', 'Angular impulse', 'H', intercept ? 'H = K (φ − a)' : 'H = K φ', 'angularImpulse', propagate(({ k, f }) => k * f, { k: K, f: launchAt(road.factors[chosen.form], chosen.way, swing.launch[chosen.form]) }));
  add('arm', tap ? 'Lever arm of the tap' : 'Lever arm of the thrust', tap ? 'r_h' : 'r_t', '', 'length', road.arms[c], by(road.bench.entries.get(tap ? 'tapLeverArm' : 'leverArm')?.read.measuredWith?.words));
  const target = !tap && corrections.target.length > 0;
  if (!tap) for (const one of corrections.impulse ?? []) add(`correction.${one.id}`, one.label, one.symbol, one.equation, 'number', one.factor, { factor: one.factor.value });
  const all = !tap && (corrections.impulse ?? []).length > 0 ? ' · corrections' : '';
  if (target) {
    add('delivered', 'Momentum delivered to the target', 'I_tgt', `I_tgt = H/r_t${all}`, 'impulse', road.delivered(swing, chosen.form, chosen.way));
    for (const one of corrections.target) add(`correction.${one.id}`, one.label, one.symbol, one.equation, 'number', one.factor, { factor: one.factor.value, ...(reported === 'delivered' ? { aside: true as const } : {}) });
    add('thruster', 'Thruster impulse bit, inferred', 'I_bit', 'I_bit = I_tgt/(f_cap β_m)', 'impulse', road.thruster(swing), reported === 'delivered' ? { aside: true } : {});
  }
  const out = tap ? 'Impulse of the tap, as read' : target && reported === 'delivered' ? 'Momentum delivered, as reported' : 'Impulse bit';
  add('impulse', out, 'I_bit', tap ? 'I = H/r_h' : target ? '' : `I_bit = H/r_t${all}`, 'impulse', road.impulse(swing, chosen.form, chosen.way));
  add('impulse.otherForm', `${out}, ${other === 'full' ? 'full pendulum' : 'small angle'}`, 'I_bit', '', 'impulse', road.impulse(swing, other, chosen.way), { aside: true });
  add('impulse.otherWay', `${out}, by ${WAY_WORDS[chosen.way === 'geometry' ? 'taps' : 'geometry']}`, 'I_bit', '', 'impulse', road.impulse(swing, chosen.form, chosen.way === 'geometry' ? 'taps' : 'geometry'), { aside: true });
  if (tap) add('known', 'Impulse of the tap, as stated', 'I_h', 's_h I_h', 'impulse', known ?? exact(0), { aside: true });
  return known || !tap ? steps : steps.filter((s) => s.id !== 'known');
}
