/** A hand-made reduction of an invented run: round numbers that a reader can check in the head, not the road's own. */
import type {
  BudgetLine, Calibration, Configuration, RecordReadings, RecordResult, Reduction, Result, RunResult, Stated,
} from '../../src/reduction/results.ts';
import type { RecordKind } from '../../src/readings/meanings.ts';
import { problem } from '../../src/problems/problems.ts';

/** Calibration factor of the fixture's pendulum, N·m·s/rad, and its lever arm, m. */
export const FACTOR = 0.01;
export const ARM = 0.28;
const TAP_ARM = 0.25;

export const stated = (value: number, u: number): Stated => ({ value, u });
export const result = (value: number, u: number, dof = Infinity, k = 2): Result => ({ value, u, dof, k, U: k * u });

const NO_READINGS: RecordReadings = {
  rest: null, firstSwing: null, nextSwings: [], time: null, voltage: null, pressure: null, tapImpulse: null,
};

interface Made {
  readonly order: number;
  readonly kind: RecordKind;
  readonly label: string;
  /** Damping-corrected first swing, rad; null for a record without one. */
  readonly swing: number | null;
  readonly note?: string;
  readonly setAside?: string;
  readonly known?: number;
}

export function record({ order, kind, label, swing, note = '', setAside, known }: Made): RecordResult {
  const arm = kind === 'tap' ? TAP_ARM : ARM;
  const impulse = swing === null ? null : (FACTOR * swing) / arm;
  const bit = impulse === null ? null : result(impulse, Math.hypot(4e-6, 0.01 * impulse), 120, 1.98);
  return {
    id: `s1/${order + 1}`, sheet: 's1', line: String(order + 1), order, kind, kindBy: 'column', label, note,
    setAside: setAside ?? null,
    problems: swing === null && kind === 'shot' ? [problem('record-no-rest', 'stops', { record: `s1/${order + 1}`, sheet: 's1', sheetName: 'run.csv', line: order + 1 })] : [],
    readings: {
      ...NO_READINGS,
      rest: 0.0124,
      firstSwing: swing === null ? null : 0.0124 + 0.55 * swing,
      voltage: kind === 'shot' ? 1500 : null,
      tapImpulse: known ?? null,
    },
    pressure: null,
    angle: swing === null ? null : stated(swing / 1.0157, 1.2e-4),
    launch: swing === null ? null : stated(swing, 1.22e-4),
    full: bit,
    smallAngle: bit === null ? null : { ...bit, value: bit.value * 1.0002 },
    byGeometry: bit,
    byTaps: bit === null ? null : result(bit.value * 1.008, bit.u * 0.7, 24, 2.06),
    impulseBit: bit,
    delivered: bit,
    thruster: kind === 'tap' ? null : bit,
    ownU: bit === null ? 0 : 4e-6,
    knownImpulse: known === undefined ? null : stated(known, 0.02 * known),
    angularImpulse: known !== undefined ? stated(known * TAP_ARM, 0.021 * known * TAP_ARM) : swing === null ? null : stated(FACTOR * swing, 0.01 * FACTOR * swing),
  };
}

export const RECORDS: readonly RecordResult[] = [
  record({ order: 1, kind: 'zero', label: 'Z1', swing: null }),
  record({ order: 2, kind: 'tap', label: 'T1', swing: 0.030, known: 0.0012 }),
  record({ order: 3, kind: 'tap', label: 'T2', swing: 0.040, known: 0.00161 }),
  record({ order: 4, kind: 'shot', label: '1', swing: 0.0350 }),
  record({ order: 5, kind: 'shot', label: '2', swing: 0.0356 }),
  record({ order: 6, kind: 'shot', label: '3', swing: 0.0004, note: 'no fire', setAside: 'misfire' }),
  record({ order: 7, kind: 'blank', label: 'B1', swing: 0.0001 }),
  record({ order: 8, kind: 'shot', label: '4', swing: 0.0344 }),
  record({ order: 9, kind: 'shot', label: '5', swing: null }),
  record({ order: 10, kind: 'shot', label: '6', swing: 0.0352, note: '=cmd' }),
  record({ order: 11, kind: 'tap', label: 'T3', swing: 0.038, known: 0.00151 }),
];

const LINES: readonly BudgetLine[] = [
  { id: 'stripMass', label: 'Strip mass', symbol: 'm', dimension: 'mass', estimate: 0.1, u: 1e-4, distribution: 'normal', dof: Infinity, sensitivity: 0.0125, contribution: 1.2e-5, share: 57.6, scope: 'common' },
  { id: 'leverArm', label: 'Lever arm of the thrust', symbol: 'r_t', dimension: 'length', estimate: ARM, u: 0.001, distribution: 'rectangular', dof: Infinity, sensitivity: -0.0045, contribution: -8e-6, share: 25.6, scope: 'common' },
  { id: 'scatter', label: 'Scatter of the shots', symbol: 's/√n', dimension: 'impulse', estimate: null, u: null, distribution: 't', dof: 3, sensitivity: null, contribution: 6.5e-6, share: 16.8, scope: 'scatter' },
];

export function run(mean: Result, n = 4, of = 6): RunResult {
  return {
    n, of, mean, scatter: 1.3e-5, uScatter: 6.5e-6, uCommon: 1.442e-5, readingsInsteadOfScatter: false,
    budget: { of: mean, lines: LINES },
  };
}

const configuration = (name: 'shots' | 'taps', inertia: number): Configuration => ({
  name,
  momentOfInertia: stated(inertia, 2e-5),
  stiffness: stated(0.05, 5e-4),
  naturalFrequency: stated(5, 0.02),
  period: stated(1.25664, 0.005),
  dampingRatio: stated(0.01, 4e-4),
  gravityShare: stated(0.9, 0.01),
  dampingFactor: stated(1.01573, 6e-4),
});

const calibration = (way: 'geometry' | 'taps', factor: number): Calibration => ({
  way,
  factor: result(factor, way === 'geometry' ? 1.2e-4 : 0.9e-4, way === 'geometry' ? Infinity : 12, way === 'geometry' ? 1.96 : 2.18),
  asTaken: stated(factor * 1.02, 1.0e-4),
  change: stated(1 / 1.02, 1e-3),
  taps: way === 'taps' ? 3 : 0,
  scatter: way === 'taps' ? 0.012 : null,
  expectedScatter: way === 'taps' ? 0.01 : null,
});

export const REDUCTION: Reduction = {
  problems: [],
  entries: [], instruments: [],
  sheets: [],
  records: RECORDS,
  film: null,
  pressure: null,
  air: { shots: null, taps: null },
  benchEffects: [],
  plan: null,
  gravity: stated(9.80665, 0),
  configurations: { shots: configuration('shots', 2.0e-3), taps: configuration('taps', 2.08e-3) },
  damping: { way: 'swings', law: 'viscous', quadratic: stated(0, 0), friction: stated(0, 0), ratio: stated(0.01, 4e-4), logDecrement: stated(0.06283, 2.5e-3), records: 6 },
  decay: null,
  periodCheck: { measured: stated(1.262, 0.002), predicted: stated(1.25664, 0.005), inU: 1.0 },
  chosenFactor: calibration('geometry', FACTOR).factor,
  evidence: [
    { id: 'masses', choice: { calibration: 'geometry', route: 'masses' }, chosen: true, factor: calibration('geometry', FACTOR).factor, readings: 0, apart: null, mean: result(1.252e-3, 1.58e-5, 310, 1.968) },
    { id: 'taps', choice: { calibration: 'taps' }, chosen: false, factor: calibration('taps', FACTOR * 1.008).factor, readings: 3, apart: stated(0.008, 0.015), mean: result(1.262e-3, 1.3e-5, 18, 2.1) },
  ],
  adjustment: null,
  weights: null,
  addedMasses: null,
  tapStudy: null,
  comparisons: [],
  forceRecords: [],
  traces: [],
  agreement: null,
  calibrations: { geometry: calibration('geometry', FACTOR), taps: calibration('taps', FACTOR * 1.008) },
  chosen: 'geometry',
  difference: { relative: stated(0.008, 0.015), inU: 0.53 },
  runs: { geometry: run(result(1.252e-3, 1.58e-5, 310, 1.968)), taps: run(result(1.262e-3, 1.3e-5, 18, 2.1)) },
  run: run(result(1.252e-3, 1.58e-5, 310, 1.968)),
  delivered: run(result(1.252e-3, 1.58e-5, 310, 1.968)),
  thruster: run(result(1.252e-3, 1.58e-5, 310, 1.968)),
  reported: 'thruster',
  plume: 'carried',
  corrections: [],
  runWithSetAside: run(result(1.004e-3, 2.5e-4, 4, 2.776), 5, 6),
  blanks: { n: 1, mean: stated(3.6e-6, 5e-6), scatter: null },
  ranges: { taps: [0.030, 0.040], shots: [0.0344, 0.0356] },
  explained: {
    record: 's1/5',
    chain: [
      { id: 'rest', label: 'Rest', symbol: 'x_0', equation: 'as read', dimension: 'length', stated: stated(0.0124, 1.5e-4) },
      { id: 'angle', label: 'First-swing angle', symbol: 'θ_p', equation: 'θ_p = asin(x/R)', dimension: 'angle', stated: stated(0.03446, 1.2e-4) },
      { id: 'damping', label: 'Damping-corrected', symbol: 'φ', equation: 'φ = D θ_p', dimension: 'angle', stated: stated(0.035, 1.22e-4), factor: 1.01573 },
      { id: 'impulse', label: 'Impulse bit', symbol: 'I_bit', equation: 'I = K φ / r_t', dimension: 'impulse', stated: stated(1.25e-3, 1.31e-5) },
      { id: 'other-form', label: 'By the small-angle form', symbol: 'I_bit', equation: 'I = J ω_n θ_p D / r_t', dimension: 'impulse', stated: stated(1.25025e-3, 1.31e-5), aside: true },
    ],
    budget: { of: result(1.25e-3, 1.31e-5, 120, 1.98), lines: LINES.slice(0, 2).map((line, index) => ({ ...line, share: index === 0 ? 69.2 : 30.8 })) },
  },
};
