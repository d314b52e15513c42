/** What a fitted record says of its jumps: values, covariances, the samples' part in each, model and residuals. */
import type { ChainCovariances, JointValue } from '../numeric/struckChain.ts';
import { freeSteps, type Place, type Struck } from './struck.ts';
import type { SwingFitResult } from './swingFit.ts';
import type { SwingModel } from './swingModel.ts';
import { BLOCK, blockMotion, firstAtOrAfter, motionOver, slopeColumns, type Cell, type Column, type Oscillation } from './swingSums.ts';

/** Jumps further apart in order than this share noise through the rest line alone, which is little. */
const NEIGHBOURS = 40;
/** Periods about an event in which its weights are given. */
const PERIODS_OF_WEIGHTS = 12;
/** Part of Σ (x − x̄)² above which the sum of squares of the solution is good to five digits or more. */
const BY_SUMS = 1e-6;

export function described(struck: Struck, place: Place, stretches: number, times: readonly number[], timeU: readonly (number | null)[], isFixed: boolean): SwingFitResult {
  const { o, sums, solved } = place;
  const joint = struck.solve(sums, o, stretches, (k) => timeU[k] !== null, isFixed ? null : solved);
  if (joint.status !== 'solved') return joint;
  const covariances = joint.covariances();
  const [iw, iz] = [stretches + 1, stretches + 2];
  const S = covariances.shared;
  const [ww, wz, zz] = isFixed ? [0, 0, 0] : [S[iw]![iw]!, S[iw]![iz]!, S[iz]![iz]!];
  const det = ww * zz - wz * wz;
  const jointAt = (k: number): JointValue => {
    const m = motionOver(struck.begins(k + 1) - struck.begins(k), o);
    const [byFrequency, byRatio] = m.slopes(solved.positions[k]!, solved.velocities[k]!).velocity;
    return { nextPosition: 0, nextVelocity: 1, position: -m.vp, velocity: -m.vv, shared: isFixed ? [] : [[iw, -byFrequency], [iz, -byRatio]] };
  };
  const many = struck.events.length;
  // Where the swing begins anew there is no jump to tell.
  const told = struck.events.flatMap((_, k) => (struck.isAnew[k] ? [] : [k]));
  const values = struck.events.map((_, k) => jointAt(k));
  const jumps = values.map((value, k) => solved.velocities[k + 1]! + value.position * solved.positions[k]! + value.velocity * solved.velocities[k]!);
  const withShared = values.map((value, k) => covariances.withShared(k, value));
  const by = withShared.map((row) => isFixed ? ([0, 0] as const) : [(row[iw]! * zz - row[iz]! * wz) / det, (row[iz]! * ww - row[iw]! * wz) / det] as const);
  const neighbours = Math.min(NEIGHBOURS, Math.max(0, many - 1));
  const rows = values.map((value, k) => {
    const earlier = covariances.withEarlier(k, value, (j) => values[j]!, neighbours);
    return Float64Array.from({ length: earlier.length + 1 }, (_, d) => (d === 0 ? covariances.ofJoint(k, value) : earlier[d - 1]!) - (isFixed ? 0 : by[k]![0] * withShared[k - d]![iw]! + by[k]![1] * withShared[k - d]![iz]!));
  });
  const model = modelOf(struck, place, stretches);
  let left: ReturnType<typeof residualsOf> | null = null;
  const leftOver = (): ReturnType<typeof residualsOf> => (left ??= residualsOf(struck, place, stretches));
  // From the sums where it is no small difference of them; else from the residuals themselves.
  const sumOfSquares = solved.sumOfSquares > BY_SUMS * struck.deviations ? solved.sumOfSquares : leftOver().sumOfSquares;
  const dof = struck.count - many - 2 - (stretches + 1) - 2;
  let stepsInU: readonly number[] | null = null;
  return {
    ...o, status: 'fitted', times: told.map((k) => times[k]!), timeU: told.map((k) => timeU[k]!), jumps: told.map((k) => jumps[k]!), covariance: [ww, wz, zz], byFrequency: told.map((k) => by[k]![0]), byRatio: told.map((k) => by[k]![1]), neighbours,
    noiseCovariance: (i, j) => rows[Math.max(told[i]!, told[j]!)]![Math.abs(told[i]! - told[j]!)] ?? 0,
    weightsOf: (k) => weightsAt(struck, place, stretches, covariances, values[told[k]!]!, told[k]!),
    model, sumOfSquares, dof, noise: Math.sqrt(sumOfSquares / Math.max(1, dof)),
    get residuals() {
      return leftOver().residuals;
    },
    // A solution of its own, made when it is asked for.
    get stepsInU() {
      if (stepsInU) return stepsInU;
      const steps = freeSteps(struck, place, stretches);
      stepsInU = told.map((k) => (steps && steps.noise > 0 && steps.u[k]! > 0 ? steps.step[k]! / (steps.noise * steps.u[k]!) : 0));
      return stepsInU;
    },
  };
}

function modelOf(struck: Struck, { o, solved }: Place, stretches: number): SwingModel {
  const { t } = struck.samples;
  const [from, span] = [t[0]!, t[t.length - 1]! - t[0]!];
  return {
    frequency: o.frequency, ratio: o.ratio,
    stretches: Array.from({ length: struck.segments }, (_, k) => ({ begins: struck.begins(k), position: solved.positions[k]!, velocity: solved.velocities[k]! })),
    rest: { times: Array.from({ length: stretches + 1 }, (_, j) => from + (span * j) / Math.max(1, stretches)), values: Array.from(solved.shared.slice(0, stretches + 1), (value) => value + struck.base) },
  };
}

/** Calls back with every sample in use: C and D of its stretch, as seen over the exposure, and the hats of the rest line. */
function eachSample(struck: Struck, o: Oscillation, stretches: number, cells: readonly [number, number], take: (i: number, cell: Cell, c: number, d: number, knot: number, first: number, second: number) => void): void {
  const { t, use } = struck.samples;
  const motion = blockMotion(t, o, struck.exposure);
  let block = struck.firstBlock[cells[0]]!;
  for (let k = cells[0]; k < cells[1]; k++) {
    const cell = struck.cells[k]!;
    const { at, first, second } = struck.hats(cell, stretches);
    for (let from = cell.from; from < cell.to; from += BLOCK) {
      motion.begin(from, Math.min(from + BLOCK, cell.to), cell.begins, struck.even[block++] !== 0);
      for (let i = from; i < motion.end; i++) {
        motion.at(i);
        if (!use || use[i] !== 0) {
          const u = (t[i]! - cell.knotTime) / cell.knotStep;
          take(i, cell, motion.c, motion.d, at, first[4] + first[5] * u, second[4] + second[5] * u);
        }
      }
    }
  }
}

function residualsOf(struck: Struck, { o, solved }: Place, stretches: number): { readonly residuals: Float64Array; readonly sumOfSquares: number } {
  const { x } = struck.samples;
  const residuals = new Float64Array(x.length);
  const root = Math.sqrt(1 - o.ratio * o.ratio);
  let sumOfSquares = 0;
  eachSample(struck, o, stretches, [0, struck.cells.length], (i, cell, c, d, knot, first, second) => {
    const [p, v] = [solved.positions[cell.segment]!, solved.velocities[cell.segment]!];
    const r = x[i]! - struck.base - (c * p + (d * (o.ratio * p + v)) / root + first * solved.shared[knot]! + (second === 0 ? 0 : second * solved.shared[knot + 1]!));
    residuals[i] = r;
    sumOfSquares += r * r;
  });
  return { residuals, sumOfSquares };
}

/** The samples' part in jump k: each row of the problem times the covariances of the jump with the unknowns. */
function weightsAt(struck: Struck, { o, solved }: Place, stretches: number, covariances: ChainCovariances, value: JointValue, k: number): { readonly from: number; readonly weights: Float64Array } {
  const reach = (PERIODS_OF_WEIGHTS * 2 * Math.PI) / o.frequency;
  const event = struck.events[k]!;
  let [first, last] = [k, k + 1];
  while (first > 0 && struck.begins(first) > event - reach) first -= 1;
  while (last < struck.segments - 1 && struck.begins(last + 1) < event + reach) last += 1;
  const { positions, velocities } = covariances.withStates(k, value, first, last);
  const gamma = covariances.withShared(k, value);
  const [iw, iz] = [stretches + 1, stretches + 2];
  const { t } = struck.samples;
  const [from, to] = [firstAtOrAfter(t, event - reach, 0), firstAtOrAfter(t, event + reach, 0)];
  const weights = new Float64Array(to - from);
  const root = Math.sqrt(1 - o.ratio * o.ratio);
  eachSample(struck, o, stretches, [struck.firstCell[first]!, struck.firstCell[last + 1]!], (i, cell, c, d, knot, one, other) => {
    if (i < from || i >= to) return;
    const [P, V] = [positions[cell.segment - first]!, velocities[cell.segment - first]!];
    const by = slopeColumns(o, solved.positions[cell.segment]!, solved.velocities[cell.segment]!);
    const s = t[i]! - cell.begins;
    const slope = (column: Column): number => column[0] * c + column[1] * d + s * (column[2] * c + column[3] * d);
    weights[i - from] = c * P + (d * (o.ratio * P + V)) / root + one * gamma[knot]! + (other === 0 ? 0 : other * gamma[knot + 1]!) + (iw < gamma.length ? slope(by.frequency) * gamma[iw]! + slope(by.ratio) * gamma[iz]! : 0);
  });
  return { from, weights };
}
