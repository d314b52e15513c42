/** One pass over the samples of a struck record: everything that least squares at a given frequency and damping needs, stretch by stretch. */

export interface SwingSamples {
  /** s, strictly rising. */
  readonly t: Float64Array;
  readonly x: Float64Array;
  /** 0: the sample is left out. */
  readonly use?: Uint8Array;
}

export interface Oscillation {
  /** ω_n, rad/s, > 0. */
  readonly frequency: number;
  /** ζ, −0.5 < ζ < 1: a little below 0 where noise hides the damping. */
  readonly ratio: number;
}

/** A run of samples between two events and between two knots of the rest line. */
export interface Cell {
  /** Index of the stretch between events. */
  readonly segment: number;
  /** s, where the stretch begins. */
  readonly begins: number;
  readonly from: number;
  readonly to: number;
  /** Index of the knot before it, among the finest ones. */
  readonly knot: number;
  readonly knotTime: number;
  readonly knotStep: number;
}

/** Sums kept of each cell, of C = e^{−ζωs} cos ω_d s and D = e^{−ζωs} sin ω_d s, of s C and s D, of 1 and u (from knot to knot), and of x. */
export const SUMS = 27;

/** The recurrence for evenly spaced samples begins anew after so many. */
export const BLOCK = 64;
/** Spacings that differ by less than this part of themselves are even. */
const EVEN = 1e-6;
/** Steps of two blocks that differ by less are one. */
const SAME_STEP = 1e-10;
export const EVEN_BLOCK = 1;
const WHOLE_BLOCK = 2;

/** Cells in order, every sample in one. Valid: events and knots in order; the outer knots at or beyond the ends. */
export function cellsOf({ t }: SwingSamples, events: readonly number[], knots: readonly number[]): readonly Cell[] {
  const n = t.length;
  const cells: Cell[] = [];
  let [i, knot] = [0, 0];
  for (let segment = 0; segment <= events.length; segment++) {
    const begins = segment === 0 ? t[0]! : events[segment - 1]!;
    const ends = events[segment] ?? Infinity;
    while (i < n && t[i]! < ends) {
      while (knot < knots.length - 2 && t[i]! >= knots[knot + 1]!) knot += 1;
      const stop = Math.min(ends, knot < knots.length - 2 ? knots[knot + 1]! : Infinity);
      const from = i;
      i = firstAtOrAfter(t, stop, i + 1);
      cells.push({ segment, begins, from, to: i, knot, knotTime: knots[knot]!, knotStep: knots[knot + 1]! - knots[knot]! });
    }
  }
  return cells;
}

/** First index from `low` on whose time is not before `time`. */
export function firstAtOrAfter(t: Float64Array, time: number, low: number): number {
  let [from, to] = [low, t.length];
  while (from < to) {
    const middle = (from + to) >> 1;
    if (t[middle]! < time) from = middle + 1;
    else to = middle;
  }
  return from;
}

/** Which blocks of BLOCK samples go evenly, cell by cell: EVEN_BLOCK, or WHOLE_BLOCK where none of all BLOCK is left out; else 0. */
export function evenBlocks({ t, use }: SwingSamples, cells: readonly Cell[]): Uint8Array {
  const blocks: number[] = [];
  for (const { from, to } of cells) {
    for (let at = from; at < to; at += BLOCK) {
      const end = Math.min(at + BLOCK, to);
      const step = end - at > 1 ? (t[end - 1]! - t[at]!) / (end - at - 1) : 0;
      let even = end - at === BLOCK ? WHOLE_BLOCK : EVEN_BLOCK;
      for (let i = at; i < end; i++) {
        if (Math.abs(t[i]! - t[at]! - (i - at) * step) > EVEN * step) {
          even = 0;
          break;
        }
        if (use?.[i] === 0) even = EVEN_BLOCK;
      }
      blocks.push(even);
    }
  }
  return Uint8Array.from(blocks);
}

/**
 * The sums of every cell. `base` is taken off x, so that little is lost in differences; with an exposure each sample is the mean over it,
 * by which the free motion's complex amplitude is multiplied by sinh(λt_e/2)/(λt_e/2), λ = −ζω + iω_d.
 */
export function swingSums({ t, x, use }: SwingSamples, cells: readonly Cell[], even: Uint8Array, { frequency: w, ratio: z }: Oscillation, base: number, exposure: number): Float64Array {
  const sums = new Float64Array(cells.length * SUMS);
  const root = Math.sqrt(1 - z * z);
  const [fall, turn] = [-z * w, w * root];
  const [kr, ki] = exposureFactor(fall, turn, exposure);
  let block = 0;
  const powers = new Float64Array(15);
  let powersStep = NaN;
  for (let k = 0; k < cells.length; k++) {
    const { begins, from, to, knotTime, knotStep } = cells[k]!;
    let cc = 0, cd = 0, dd = 0, scc = 0, scd = 0, sdd = 0, sscc = 0, sscd = 0, ssdd = 0;
    let c1 = 0, d1 = 0, sc1 = 0, sd1 = 0, cu = 0, du = 0, scu = 0, sdu = 0, cx = 0, dx = 0, scx = 0, sdx = 0;
    let n = 0, su = 0, suu = 0, sx = 0, sux = 0, sxx = 0;
    for (let at = from; at < to; at += BLOCK) {
      const end = Math.min(at + BLOCK, to);
      const kind = even[block++]!;
      const isEven = kind !== 0;
      const step = isEven && end - at > 1 ? (t[end - 1]! - t[at]!) / (end - at - 1) : 0;
      const [first, stepFall] = [t[at]! - begins, Math.exp(fall * step)];
      const [rc, rd] = [stepFall * Math.cos(turn * step), stepFall * Math.sin(turn * step)];
      const e0 = Math.exp(fall * first);
      const [c0, d0] = [e0 * Math.cos(turn * first), e0 * Math.sin(turn * first)];
      let c = kr * c0 - ki * d0;
      let d = kr * d0 + ki * c0;
      if (kind === WHOLE_BLOCK) {
        if (!(Math.abs(step - powersStep) <= SAME_STEP * step)) {
          blockPowers(rc, rd, powers);
          powersStep = step;
        }
        const l0r = powers[0]!, l0i = powers[1]!, l1r = powers[2]!, l1i = powers[3]!, l2r = powers[4]!, l2i = powers[5]!;
        const q0r = powers[6]!, q0i = powers[7]!, q1r = powers[8]!, q1i = powers[9]!, q2r = powers[10]!, q2i = powers[11]!;
        const m0 = powers[12]!, m1 = powers[13]!, m2 = powers[14]!;
        // Σ i^m A_i, and halves of Σ i^m |A_i|², Σ i^m A_i², of A_i = C_i + iD_i = A_0 ρ^i.
        const [a0r, a0i, a1r, a1i, a2r, a2i] = [c * l0r - d * l0i, c * l0i + d * l0r, c * l1r - d * l1i, c * l1i + d * l1r, c * l2r - d * l2i, c * l2i + d * l2r];
        const [size, re, im] = [(c * c + d * d) / 2, (c * c - d * d) / 2, c * d];
        const [s0, s1, s2] = [size * m0, size * m1, size * m2];
        const [e0r, e0i, e1r, e1i, e2r, e2i] = [re * q0r - im * q0i, re * q0i + im * q0r, re * q1r - im * q1i, re * q1i + im * q1r, re * q2r - im * q2i, re * q2i + im * q2r];
        const [f, h] = [first, step];
        const [p0, p1, p2, x0, x1, x2, y0, y1, y2] = [s0 + e0r, s1 + e1r, s2 + e2r, e0i, e1i, e2i, s0 - e0r, s1 - e1r, s2 - e2r];
        cc += p0; cd += x0; dd += y0;
        scc += f * p0 + h * p1; scd += f * x0 + h * x1; sdd += f * y0 + h * y1;
        const [ff, fh, hh] = [f * f, 2 * f * h, h * h];
        sscc += ff * p0 + fh * p1 + hh * p2; sscd += ff * x0 + fh * x1 + hh * x2; ssdd += ff * y0 + fh * y1 + hh * y2;
        const [u0, v] = [(t[at]! - knotTime) / knotStep, step / knotStep];
        c1 += a0r; d1 += a0i;
        sc1 += f * a0r + h * a1r; sd1 += f * a0i + h * a1i;
        cu += u0 * a0r + v * a1r; du += u0 * a0i + v * a1i;
        const [g0, g1, g2] = [f * u0, f * v + h * u0, h * v];
        scu += g0 * a0r + g1 * a1r + g2 * a2r; sdu += g0 * a0i + g1 * a1i + g2 * a2i;
        n += BLOCK; su += BLOCK * u0 + v * FIRST_POWERS; suu += BLOCK * u0 * u0 + 2 * u0 * v * FIRST_POWERS + v * v * SECOND_POWERS;
        let bcx = 0, bdx = 0, bicx = 0, bidx = 0, bx = 0, bix = 0;
        for (let i = 0; i < BLOCK; i++) {
          const y = x[at + i]! - base;
          const cy = c * y, dy = d * y;
          bcx += cy; bdx += dy; bicx += i * cy; bidx += i * dy;
          bx += y; bix += i * y; sxx += y * y;
          const next = rc * c - rd * d;
          d = rc * d + rd * c;
          c = next;
        }
        cx += bcx; dx += bdx; scx += f * bcx + h * bicx; sdx += f * bdx + h * bidx;
        sx += bx; sux += u0 * bx + v * bix;
        continue;
      }
      for (let i = at; i < end; i++) {
        const s = isEven ? first + (i - at) * step : t[i]! - begins;
        if (!isEven && i > at) {
          const e = Math.exp(fall * s);
          const [p, q] = [e * Math.cos(turn * s), e * Math.sin(turn * s)];
          c = kr * p - ki * q;
          d = kr * q + ki * p;
        }
        if (use === undefined || use[i] !== 0) {
          const y = x[i]! - base;
          const u = (t[i]! - knotTime) / knotStep;
          const pcc = c * c, pcd = c * d, pdd = d * d, sc = s * c, sd = s * d;
          cc += pcc; cd += pcd; dd += pdd;
          scc += s * pcc; scd += s * pcd; sdd += s * pdd;
          sscc += sc * sc; sscd += sc * sd; ssdd += sd * sd;
          c1 += c; d1 += d; sc1 += sc; sd1 += sd;
          cu += c * u; du += d * u; scu += sc * u; sdu += sd * u;
          cx += c * y; dx += d * y; scx += sc * y; sdx += sd * y;
          n += 1; su += u; suu += u * u; sx += y; sux += u * y; sxx += y * y;
        }
        if (isEven) {
          const next = rc * c - rd * d;
          d = rc * d + rd * c;
          c = next;
        }
      }
    }
    sums.set([cc, cd, dd, scc, scd, sdd, sscc, sscd, ssdd, c1, d1, sc1, sd1, cu, du, scu, sdu, cx, dx, scx, sdx, n, su, suu, sx, sux, sxx], k * SUMS);
  }
  return sums;
}

/** Σ i and Σ i² over a block. */
const FIRST_POWERS = (BLOCK * (BLOCK - 1)) / 2;
const SECOND_POWERS = ((BLOCK - 1) * BLOCK * (2 * BLOCK - 1)) / 6;

/** Over a block, of ρ = rc + i rd: Σ i^m ρ^i and Σ i^m ρ^{2i} (real and imaginary part, m = 0, 1, 2), and Σ i^m |ρ|^{2i}. */
function blockPowers(rc: number, rd: number, out: Float64Array): void {
  out.fill(0);
  let [c, d] = [1, 0];
  for (let i = 0; i < BLOCK; i++) {
    const [qr, qi, m] = [c * c - d * d, 2 * c * d, c * c + d * d];
    out[0]! += c; out[1]! += d; out[2]! += i * c; out[3]! += i * d; out[4]! += i * i * c; out[5]! += i * i * d;
    out[6]! += qr; out[7]! += qi; out[8]! += i * qr; out[9]! += i * qi; out[10]! += i * i * qr; out[11]! += i * i * qi;
    out[12]! += m; out[13]! += i * m; out[14]! += i * i * m;
    const next = rc * c - rd * d;
    d = rc * d + rd * c;
    c = next;
  }
}

/** C and D of sample after sample of a block, by recurrence where it is even. */
export function blockMotion(t: Float64Array, { frequency: w, ratio: z }: Oscillation, exposure: number) {
  const root = Math.sqrt(1 - z * z);
  const [fall, turn] = [-z * w, w * root];
  const [kr, ki] = exposureFactor(fall, turn, exposure);
  let [from, begins, isEven, rc, rd] = [0, 0, false, 1, 0];
  const motion = {
    c: 0, d: 0, end: 0,
    begin(first: number, end: number, stretchBegins: number, even: boolean): void {
      [from, begins, isEven, motion.end] = [first, stretchBegins, even, end];
      const step = even && end - first > 1 ? (t[end - 1]! - t[first]!) / (end - first - 1) : 0;
      const e = Math.exp(fall * step);
      [rc, rd] = [e * Math.cos(turn * step), e * Math.sin(turn * step)];
    },
    /** To be called for each sample of the block, in order. */
    at(i: number): void {
      if (isEven && i > from) {
        const next = rc * motion.c - rd * motion.d;
        motion.d = rc * motion.d + rd * motion.c;
        motion.c = next;
        return;
      }
      const s = t[i]! - begins;
      const e = Math.exp(fall * s);
      const [p, q] = [e * Math.cos(turn * s), e * Math.sin(turn * s)];
      motion.c = kr * p - ki * q;
      motion.d = kr * q + ki * p;
    },
  };
  return motion;
}

/** sinh(λt/2)/(λt/2) for λ = fall + i turn; 1 without exposure. */
export function exposureFactor(fall: number, turn: number, exposure: number): readonly [number, number] {
  const [a, b] = [(fall * exposure) / 2, (turn * exposure) / 2];
  const size = a * a + b * b;
  if (size < 1e-18) return [1, 0];
  const [re, im] = [Math.sinh(a) * Math.cos(b), Math.cosh(a) * Math.sin(b)];
  return [(re * a + im * b) / size, (im * a - re * b) / size];
}

/** A column of the problem within one cell: its coefficients on C, D, sC, sD, 1 and u. */
export type Column = readonly [number, number, number, number, number, number];

/** Where the sum of two of (C, D, sC, sD, 1, u, x) stands. */
const AT: readonly (readonly number[])[] = [
  [0, 1, 3, 4, 9, 13, 17], [1, 2, 4, 5, 10, 14, 18], [3, 4, 6, 7, 11, 15, 19], [4, 5, 7, 8, 12, 16, 20], [9, 10, 11, 12, 21, 22, 24], [13, 14, 15, 16, 22, 23, 25],
];

/** Σ of the product of two columns over a cell; null stands for x. */
export function productIn(sums: Float64Array, cell: number, one: Column, other: Column | null): number {
  const base = cell * SUMS;
  let total = 0;
  for (let i = 0; i < 6; i++) {
    const a = one[i]!;
    if (a === 0) continue;
    const row = AT[i]!;
    if (other === null) total += a * sums[base + row[6]!]!;
    else {
      let inner = 0;
      for (let j = 0; j < 6; j++) if (other[j] !== 0) inner += other[j]! * sums[base + row[j]!]!;
      total += a * inner;
    }
  }
  return total;
}

export const squaresIn = (sums: Float64Array, cell: number): number => sums[cell * SUMS + 26]!;
export const countIn = (sums: Float64Array, cell: number): number => sums[cell * SUMS + 21]!;

/** ∂/∂p and ∂/∂v of the free motion from (p, v = x′/ω_n), as columns. */
export function motionColumns({ ratio: z }: Oscillation): { readonly p: Column; readonly v: Column } {
  const root = Math.sqrt(1 - z * z);
  return { p: [1, z / root, 0, 0, 0, 0], v: [0, 1 / root, 0, 0, 0, 0] };
}

/** ∂/∂ω and ∂/∂ζ of the free motion from (p, v), as columns. Source: derivatives of e^{−ζωs}[p cos ω_d s + (ζp + v)/√(1−ζ²) sin ω_d s], derived. */
export function slopeColumns({ frequency: w, ratio: z }: Oscillation, p: number, v: number): { readonly frequency: Column; readonly ratio: Column } {
  const root = Math.sqrt(1 - z * z);
  return {
    frequency: [0, 0, v, -(p + z * v) / root, 0, 0],
    ratio: [0, p / root ** 3 + (v * z) / root ** 3, -(w * (p + z * v)) / root ** 2, (-w * v) / root, 0, 0],
  };
}

/** State after s as four factors, and its slopes by ω and ζ. */
export function motionOver(s: number, { frequency: w, ratio: z }: Oscillation) {
  const root = Math.sqrt(1 - z * z);
  const e = Math.exp(-z * w * s);
  const [C, D] = [e * Math.cos(w * root * s), e * Math.sin(w * root * s)];
  const [sC, sD] = [s * C, s * D];
  return {
    pp: C + (z / root) * D, pv: D / root, vp: -D / root, vv: C - (z / root) * D,
    /** Slopes of the position and of the velocity after s. */
    slopes: (p: number, v: number) => ({
      position: [v * sC - ((p + z * v) / root) * sD, ((p + v * z) / root ** 3) * D - ((w * (p + z * v)) / root ** 2) * sC - ((w * v) / root) * sD] as const,
      velocity: [
        p * ((z / root) * sD - sC) + v * (-2 * z * sC + ((2 * z * z - 1) / root) * sD),
        p * ((-z / root ** 3) * D + (w / root) * sD + ((w * z) / root ** 2) * sC) + v * (((w * (2 * z * z - 1)) / root ** 2) * sC + ((2 * w * z) / root) * sD - D / root ** 3),
      ] as const,
    }),
  };
}
