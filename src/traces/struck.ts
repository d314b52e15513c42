/** A sampled record cut into cells at its events: the linear problem that is solved exactly at each frequency and damping. */
import { solveChain, type ChainSolved, type Link } from '../numeric/struckChain.ts';
import { BLOCK, cellsOf, evenBlocks, motionColumns, motionOver, productIn, slopeColumns, squaresIn, swingSums, type Cell, type Column, type Oscillation, type SwingSamples } from './swingSums.ts';

/** Weight of a knot's tie to the next, in samples. */
const TIE = 1e-6;
const NO_TIMES: ReadonlySet<number> = new Set();

/** The record with its events: what stays the same whatever the frequency. */
export class Struck {
  readonly samples: SwingSamples;
  readonly events: readonly number[];
  /** Whether the swing begins anew at an event, position and all. */
  readonly isAnew: readonly boolean[];
  readonly cells: readonly Cell[];
  readonly even: Uint8Array;
  /** Block of even spacing with which each cell begins. */
  readonly firstBlock: Int32Array;
  readonly base: number;
  readonly exposure: number;
  readonly anew: ReadonlySet<number>;
  /** Stretches between the finest knots. */
  readonly finest: number;
  readonly count: number;
  readonly firstCell: Int32Array;
  /** Σ (x − x̄)² of the samples in use. */
  readonly deviations: number;

  constructor(samples: SwingSamples, events: readonly number[], exposure: number, finest: number, anew: ReadonlySet<number> = NO_TIMES) {
    this.samples = samples;
    this.events = events;
    this.anew = anew;
    this.isAnew = events.map((time) => anew.has(time));
    this.exposure = exposure;
    this.finest = finest;
    const { t, x, use } = samples;
    const [from, span] = [t[0]!, t[t.length - 1]! - t[0]!];
    this.cells = cellsOf(samples, events, Array.from({ length: finest + 1 }, (_, j) => from + (span * j) / finest));
    this.even = evenBlocks(samples, this.cells);
    this.firstBlock = new Int32Array(this.cells.length + 1);
    this.cells.forEach(({ from: first, to }, c) => (this.firstBlock[c + 1] = this.firstBlock[c]! + Math.ceil((to - first) / BLOCK)));
    let [count, sum] = [0, 0];
    for (let i = 0; i < x.length; i++) if (!use || use[i] !== 0) {
      count += 1;
      sum += x[i]!;
    }
    this.count = count;
    this.base = count > 0 ? sum / count : 0;
    let squares = 0;
    for (let i = 0; i < x.length; i++) if (!use || use[i] !== 0) squares += (x[i]! - this.base) ** 2;
    this.deviations = squares;
    this.firstCell = new Int32Array(events.length + 2).fill(this.cells.length);
    for (let c = this.cells.length - 1; c >= 0; c--) this.firstCell[this.cells[c]!.segment] = c;
    for (let k = events.length; k >= 0; k--) if (this.firstCell[k] === this.cells.length || this.firstCell[k]! > this.firstCell[k + 1]!) this.firstCell[k] = this.firstCell[k + 1]!;
  }

  get segments(): number {
    return this.events.length + 1;
  }

  begins(k: number): number {
    return k === 0 ? this.samples.t[0]! : this.events[k - 1]!;
  }

  sums(o: Oscillation): Float64Array {
    return swingSums(this.samples, this.cells, this.even, o, this.base, this.exposure);
  }

  /** Hats of the two knots about a cell, with `stretches` of the rest line (a part of `finest`). */
  hats(cell: Cell, stretches: number): { readonly at: number; readonly first: Column; readonly second: Column } {
    if (stretches === 0) return { at: 0, first: [0, 0, 0, 0, 1, 0], second: [0, 0, 0, 0, 0, 0] };
    const each = this.finest / stretches;
    const at = Math.floor(cell.knot / each);
    const into = cell.knot / each - at;
    return { at, first: [0, 0, 0, 0, 1 - into, -1 / each], second: [0, 0, 0, 0, into, 1 / each] };
  }

  links(o: Oscillation, free: Free, slopes: Slopes | null, shared: number): readonly (Link | null)[] {
    return this.events.map((_, k): Link | null => {
      if (free(k) || this.isAnew[k]) return null;
      const m = motionOver(this.begins(k + 1) - this.begins(k), o);
      if (!slopes) return { a: m.pp, b: m.pv, drive: [] };
      const [byFrequency, byRatio] = m.slopes(slopes.positions[k]!, slopes.velocities[k]!).position;
      return { a: m.pp, b: m.pv, drive: [[shared - 2, byFrequency], [shared - 1, byRatio]] };
    });
  }

  /** Everything at (ω, ζ): states, jumps and rest line, and with `slopes` the step that lowers the sum of squares. */
  solve(sums: Float64Array, o: Oscillation, stretches: number, free: Free, slopes: Slopes | null): ReturnType<typeof solveChain> {
    const knots = stretches + 1;
    const shared = knots + (slopes ? 2 : 0);
    const n = shared + 3;
    const last = n - 1;
    const { p, v } = motionColumns(o);
    return solveChain(this.segments, shared, this.links(o, free, slopes, shared), (k, form) => {
      // Knots with no sample about them go on from their neighbours; the others do not feel it.
      if (k === 0) for (let j = 2; j < 2 + stretches; j++) {
        form[j * n + j]! += TIE;
        form[(j + 1) * n + j + 1]! += TIE;
        form[j * n + j + 1]! -= TIE;
      }
      for (let c = this.firstCell[k]!; c < this.firstCell[k + 1]! && this.cells[c]!.segment === k; c++) {
        const { at, first, second } = this.hats(this.cells[c]!, stretches);
        const columns: (readonly [number, Column])[] = [[0, p], [1, v], [2 + at, first]];
        if (stretches > 0) columns.push([3 + at, second]);
        if (slopes) {
          const by = slopeColumns(o, slopes.positions[k]!, slopes.velocities[k]!);
          columns.push([shared, by.frequency], [shared + 1, by.ratio]);
        }
        for (const [i, [row, one]] of columns.entries()) {
          for (const [column, other] of columns.slice(i)) form[Math.min(row, column) * n + Math.max(row, column)]! += productIn(sums, c, one, other);
          form[row * n + last]! += productIn(sums, c, one, null);
        }
        form[last * n + last]! += squaresIn(sums, c);
      }
    });
  }
}

/** Whether the position may step at an event. */
export type Free = (event: number) => boolean;
export const NONE: Free = () => false;
export const ALL: Free = () => true;

interface Slopes {
  readonly positions: Float64Array;
  readonly velocities: Float64Array;
}

export interface Place {
  readonly o: Oscillation;
  readonly sums: Float64Array;
  readonly solved: ChainSolved;
}

export function placeAt(struck: Struck, o: Oscillation, stretches: number, free: Free = NONE): Place | { readonly status: 'notTold'; readonly segment: number } {
  const sums = struck.sums(o);
  const solved = struck.solve(sums, o, stretches, free, null);
  return solved.status === 'solved' ? { o, sums, solved } : solved;
}

export const isPlace = (found: Place | { readonly status: 'notTold' }): found is Place => 'o' in found;

/** Position step and jump of velocity at each event with both left free, and their u with unit noise. */
export function freeSteps(struck: Struck, { sums, o }: Place, stretches: number): { readonly step: Float64Array; readonly jump: Float64Array; readonly u: Float64Array; readonly noise: number } | null {
  const free = struck.solve(sums, o, stretches, ALL, null);
  if (free.status !== 'solved') return null;
  const covariances = free.covariances();
  const many = struck.events.length;
  const [step, jump, u] = [new Float64Array(many), new Float64Array(many), new Float64Array(many)];
  for (let k = 0; k < many; k++) {
    const m = motionOver(struck.begins(k + 1) - struck.begins(k), o);
    const [p, v] = [free.positions[k]!, free.velocities[k]!];
    step[k] = free.positions[k + 1]! - (m.pp * p + m.pv * v);
    jump[k] = free.velocities[k + 1]! - (m.vp * p + m.vv * v);
    u[k] = Math.sqrt(Math.max(0, covariances.ofJoint(k, { nextPosition: 1, nextVelocity: 0, position: -m.pp, velocity: -m.pv, shared: [] })));
  }
  const dof = struck.count - 2 * struck.segments - (stretches + 1) - 2;
  return { step, jump, u, noise: dof > 0 ? Math.sqrt(free.sumOfSquares / dof) : 0 };
}
