/** The same fit with the pendulum's own equation, for swings too wide for the linear one: amplitude bends the period, and quadratic drag the damping. */
import { solveChain, type ChainSolved, type Link } from '../numeric/struckChain.ts';
import type { SwingFit } from './swingFit.ts';
import { restAt } from './swingModel.ts';
import type { Oscillation, SwingSamples } from './swingSums.ts';

export interface LargeSwing extends Oscillation {
  readonly status: 'fitted';
  /** β of −β|θ′|θ′, 1/rad, with its u by white noise; null where it was not let free. */
  readonly quadratic: { readonly value: number; readonly u: number } | null;
  /** Jumps of θ′ over ω_n, rad. */
  readonly jumps: readonly number[];
  /** Greatest |θ| about the rest line, rad. */
  readonly amplitude: number;
  readonly sumOfSquares: number;
  readonly dof: number;
}

export type LargeSwingResult = LargeSwing | { readonly status: 'notSettled' | 'notTold' };

/** Step of the fourth-order Runge–Kutta rule in ω_n t: its error is some 1e-9 of the amplitude a period. */
const STEP = 0.03;
const ROUNDS = 25;
/** Settled where all steps are this part of what noise leaves unknown, or of rounding. */
const SETTLED = 1e-4;

interface State {
  readonly frequency: number;
  readonly ratio: number;
  readonly quadratic: number;
  readonly start: number;
  readonly velocities: readonly number[];
  readonly knots: readonly number[];
}

interface Problem {
  readonly samples: SwingSamples;
  readonly events: readonly number[];
  readonly knotTimes: readonly number[];
  readonly share: number;
  readonly isFree: boolean;
}

/** θ, θ′/ω_n and their slopes by start position, start velocity, ζ and β: ten numbers that go on in τ = ω_n t. */
type Motion = Float64Array;
const SIZE = 10;

/** d/dτ: θ″ = −(p sin θ + (1 − p)θ) − 2ζu − β|u|u, and the same linearised for each slope. */
function slopeOf(y: Motion, share: number, ratio: number, quadratic: number, out: Motion): void {
  const [theta, u] = [y[0]!, y[1]!];
  out[0] = u;
  out[1] = -(share * Math.sin(theta) + (1 - share) * theta) - 2 * ratio * u - quadratic * Math.abs(u) * u;
  const byTheta = -(share * Math.cos(theta) + 1 - share);
  const byU = -2 * ratio - 2 * quadratic * Math.abs(u);
  for (let j = 2; j < SIZE; j += 2) {
    out[j] = y[j + 1]!;
    out[j + 1] = byTheta * y[j]! + byU * y[j + 1]!;
  }
  out[7]! -= 2 * u;
  out[9]! -= Math.abs(u) * u;
}

const [K1, K2, K3, K4, AT] = Array.from({ length: 5 }, () => new Float64Array(SIZE)) as [Motion, Motion, Motion, Motion, Motion];

function goOn(y: Motion, long: number, share: number, ratio: number, quadratic: number): void {
  const steps = Math.max(1, Math.ceil(long / STEP));
  const h = long / steps;
  const along = (k: Motion, by: number): void => {
    for (let j = 0; j < SIZE; j++) AT[j] = y[j]! + by * k[j]!;
  };
  for (let i = 0; i < steps; i++) {
    slopeOf(y, share, ratio, quadratic, K1);
    along(K1, h / 2);
    slopeOf(AT, share, ratio, quadratic, K2);
    along(K2, h / 2);
    slopeOf(AT, share, ratio, quadratic, K3);
    along(K3, h);
    slopeOf(AT, share, ratio, quadratic, K4);
    for (let j = 0; j < SIZE; j++) y[j]! += (h / 6) * (K1[j]! + 2 * K2[j]! + 2 * K3[j]! + K4[j]!);
  }
}

const startOf = (theta: number, u: number): Motion => Float64Array.of(theta, u, 1, 0, 0, 1, 0, 0, 0, 0);

interface Looked {
  readonly sumOfSquares: number;
  readonly count: number;
  readonly positions: readonly number[];
  readonly before: readonly (readonly [number, number])[];
  readonly amplitude: number;
  readonly solved: ReturnType<typeof solveChain> | null;
}

/** Goes along the whole record once: residuals at this state, and with `solve` the step that lowers their squares. */
function lookAt({ samples: { t, x, use }, events, knotTimes, share, isFree }: Problem, state: State, solve: boolean): Looked {
  const { frequency: w, ratio, quadratic, knots } = state;
  const globals = knots.length + 2 + (isFree ? 1 : 0);
  const n = globals + 3;
  const segments = events.length + 1;
  const forms: Float64Array[] = [];
  const links: Link[] = [];
  const positions: number[] = [state.start];
  const before: (readonly [number, number])[] = [];
  let [sumOfSquares, count, amplitude, i, knot] = [0, 0, 0, 0, 0];
  const row = new Float64Array(n);
  for (let k = 0; k < segments; k++) {
    const form = solve ? new Float64Array(n * n) : null;
    const begins = k === 0 ? t[0]! : events[k - 1]!;
    const ends = events[k] ?? Infinity;
    const y = startOf(positions[k]!, state.velocities[k]!);
    let at = begins;
    for (; i < t.length && t[i]! < ends; i++) {
      if (use && use[i] === 0) continue;
      goOn(y, w * (t[i]! - at), share, ratio, quadratic);
      at = t[i]!;
      while (knot < knotTimes.length - 2 && at >= knotTimes[knot + 1]!) knot += 1;
      const isLevel = knotTimes.length < 2;
      const part = isLevel ? 0 : (at - knotTimes[knot]!) / (knotTimes[knot + 1]! - knotTimes[knot]!);
      const rest = isLevel ? knots[0]! : knots[knot]! * (1 - part) + knots[knot + 1]! * part;
      const r = x[i]! - rest - y[0]!;
      sumOfSquares += r * r;
      count += 1;
      amplitude = Math.max(amplitude, Math.abs(y[0]!));
      if (!form) continue;
      row.fill(0);
      row[0] = y[2]!;
      row[1] = y[4]!;
      row[2 + knot] = 1 - part;
      if (!isLevel) row[3 + knot] = part;
      row[2 + knots.length] = (at - begins) * y[1]!;
      row[3 + knots.length] = y[6]!;
      if (isFree) row[4 + knots.length] = y[8]!;
      row[n - 1] = r;
      addRow(form, row, n, 2 + knot, isLevel ? 2 + knot : 3 + knot, 2 + knots.length);
    }
    if (form) forms.push(form);
    if (k === segments - 1) break;
    goOn(y, w * (ends - at), share, ratio, quadratic);
    const s = ends - begins;
    positions.push(y[0]!);
    before.push([y[0]!, y[1]!]);
    links.push({ a: y[2]!, b: y[4]!, drive: [[knots.length, s * y[1]!], [knots.length + 1, y[6]!], ...(isFree ? [[knots.length + 2, y[8]!] as const] : [])] });
  }
  const solved = solve ? solveChain(segments, globals, links, (k, form) => {
    const own = forms[k]!;
    for (let j = 0; j < form.length; j++) form[j]! += own[j]!;
  }) : null;
  return { sumOfSquares, count, positions, before, amplitude, solved };
}

/** Adds a row of few places that are not 0 to the form above its diagonal. */
function addRow(form: Float64Array, row: Float64Array, n: number, firstKnot: number, lastKnot: number, rest: number): void {
  const places: number[] = [0, 1];
  for (let j = firstKnot; j <= lastKnot; j++) places.push(j);
  for (let j = rest; j < n; j++) places.push(j);
  for (let a = 0; a < places.length; a++) for (let b = a; b < places.length; b++) form[places[a]! * n + places[b]!]! += row[places[a]!]! * row[places[b]!]!;
}

function stepped(state: State, { velocities, shared, positions }: ChainSolved, part: number): State {
  const m = state.knots.length;
  return {
    frequency: state.frequency + part * shared[m]!, ratio: state.ratio + part * shared[m + 1]!, quadratic: state.quadratic + part * (shared[m + 2] ?? 0),
    start: state.start + part * positions[0]!, velocities: state.velocities.map((v, k) => v + part * velocities[k]!), knots: state.knots.map((z, j) => z + part * shared[j]!),
  };
}

/**
 * ω_n, ζ, the rest line, the start and all jumps of a record in angle, by Gauss–Newton steps along the full equation
 * θ″ = −ω_n²[p sin θ + (1 − p)θ] − 2ζω_n θ′ − β|θ′|θ′, from a linear fit of the same record.
 *
 * Valid: |θ| well below π; x in rad. Source: shooting with the variational equations (fourth-order Runge–Kutta); derived.
 */
export function fitLargeSwing(samples: SwingSamples, linear: SwingFit, share: number, withQuadratic = false): LargeSwingResult {
  const { model } = linear;
  const level = model.rest.times.length < 2;
  const problem: Problem = { samples, events: linear.times, knotTimes: level ? [samples.t[0]!] : model.rest.times, share, isFree: withQuadratic };
  let state: State = {
    frequency: linear.frequency, ratio: linear.ratio, quadratic: 0, start: model.stretches[0]!.position, velocities: model.stretches.map(({ velocity }) => velocity),
    knots: level ? [restAt(model, samples.t[0]!)] : model.rest.values,
  };
  let here = lookAt(problem, state, true);
  for (let round = 0; round < ROUNDS; round++) {
    const { solved } = here;
    if (solved?.status !== 'solved') return { status: 'notTold' };
    const m = state.knots.length;
    const noise2 = here.sumOfSquares / Math.max(1, here.count - m - 3 - linear.jumps.length);
    const isSettled = [m, m + 1].every((j) => solved.shared[j]! ** 2 <= SETTLED ** 2 * noise2 * solved.variances[j]! + 1e-26) || (solved.shared[m]! / state.frequency) ** 2 < 1e-24;
    if (isSettled) return resultOf(problem, state, here, noise2);
    let next: { readonly state: State; readonly looked: Looked } | null = null;
    for (let part = 1; part > 1e-3 && !next; part /= 2) {
      const tried = stepped(state, solved, part);
      if (!(tried.frequency > 0 && Math.abs(tried.ratio) < 0.95)) continue;
      const looked = lookAt(problem, tried, true);
      if (looked.sumOfSquares <= here.sumOfSquares * (1 + 1e-12)) next = { state: tried, looked };
    }
    if (!next) return resultOf(problem, state, here, noise2);
    state = next.state;
    here = next.looked;
  }
  return { status: 'notSettled' };
}

function resultOf({ events, isFree }: Problem, state: State, { before, amplitude, sumOfSquares, count, solved }: Looked, noise2: number): LargeSwing {
  const m = state.knots.length;
  const variance = solved?.status === 'solved' ? solved.variances[m + 2] : undefined;
  return {
    status: 'fitted', frequency: state.frequency, ratio: state.ratio, quadratic: isFree && variance !== undefined ? { value: state.quadratic, u: Math.sqrt(noise2 * variance) } : null,
    jumps: events.map((_, k) => state.velocities[k + 1]! - before[k]![1]), amplitude, sumOfSquares, dof: count - m - events.length - 4 - (isFree ? 1 : 0),
  };
}
