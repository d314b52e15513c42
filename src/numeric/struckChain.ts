/** Least squares of a chain of segments: each has its own position and velocity, joined to the next by a known motion, with unknowns that all share. Linear in the number of segments. */

/** From a segment to the next: the position goes on as p′ = A p + B v + g γ; v begins anew. null: the position begins anew too. */
export interface Link {
  readonly a: number;
  readonly b: number;
  /** ∂p′/∂γ by index of the shared unknown; those that are not there are 0. */
  readonly drive: readonly (readonly [index: number, slope: number])[];
}

/** A value at the joint after segment k that is linear in what stands on both sides: v′ (and p′) of the next, p and v of this one, γ. */
export interface JointValue {
  readonly nextPosition: number;
  readonly nextVelocity: number;
  readonly position: number;
  readonly velocity: number;
  readonly shared: readonly (readonly [index: number, slope: number])[];
}

/**
 * Quadratic form of one segment, its sums added to it: rows and columns (p, v, γ…, right side), of size 3 + m, row by row.
 * Only what is on and above the diagonal is read.
 */
export type AddSegment = (k: number, form: Float64Array) => void;

interface Step {
  /** v = right − byPosition p − byNext p′ − byShared γ, its own variance 1/weight. */
  readonly weight: number;
  readonly byPosition: number;
  readonly byNext: number;
  readonly byShared: Float64Array;
  readonly right: number;
  /** p = right₂ − byNext₂ p′ − byShared₂ γ, its own variance 1/weight₂. */
  readonly weight2: number;
  readonly byNext2: number;
  readonly byShared2: Float64Array;
  readonly right2: number;
}

export interface ChainSolved {
  readonly status: 'solved';
  readonly positions: Float64Array;
  readonly velocities: Float64Array;
  readonly shared: Float64Array;
  /** Variances of the shared unknowns for a variance 1 of each equation. */
  readonly variances: Float64Array;
  /** Σ r² at the solution, from the form; differences of large sums. */
  readonly sumOfSquares: number;
  readonly covariances: () => ChainCovariances;
}

/** Covariances for a variance 1 of each equation. */
export interface ChainCovariances {
  readonly shared: readonly Float64Array[];
  readonly ofJoint: (k: number, value: JointValue) => number;
  /** Covariance of a joint's value with each shared unknown. */
  readonly withShared: (k: number, value: JointValue) => Float64Array;
  /** Covariances of a joint's value with those at the joints before it, nearest first, as many as asked for. */
  readonly withEarlier: (k: number, value: JointValue, valueAt: (j: number) => JointValue, many: number) => Float64Array;
  /** Covariance of a joint's value with p and v of each segment from `first` to `last`. */
  readonly withStates: (k: number, value: JointValue, first: number, last: number) => { readonly positions: Float64Array; readonly velocities: Float64Array };
}

export type ChainResult = ChainSolved | { readonly status: 'notTold'; readonly segment: number };

/** A pivot smaller than this part of what it was made from is rounding. */
const LEAST_PIVOT = 1e-13;
/**
 * Weight of a link over that of all equations of a segment: it holds to 1e-3 of what they leave unknown. An exact one would know the
 * position after a motion that has died out better than the digits of a double can hold beside the rest.
 */
const LINK_WEIGHT = 1e6;

/** One form of each size serves all solutions, one after another: making it would cost more than solving it. */
const FORMS = new Map<number, Float64Array>();

function formOf(n: number): Float64Array {
  const kept = FORMS.get(n);
  if (kept) return kept.fill(0);
  const made = new Float64Array(n * n);
  FORMS.set(n, made);
  return made;
}

/**
 * Valid: segments ≥ 1, shared ≥ 0, links one fewer than segments.
 * Source: elimination of a block-bidiagonal least-squares problem from the first segment on, with the shared unknowns as its border; derived.
 */
export function solveChain(segments: number, shared: number, links: readonly (Link | null)[], add: AddSegment): ChainResult {
  const n = shared + 3;
  const last = n - 1;
  const form = formOf(n);
  const steps: Step[] = [];
  let most = 0;
  for (let k = 0; k < segments; k++) {
    add(k, form);
    mirror(form, n);
    if (k === segments - 1) break;
    const link = links[k]!;
    // The velocity begins anew with each segment: its weight is that of the segment's own equations.
    most = Math.max(most, form[n + 1]!);
    const step = eliminateState(form, n, link, LINK_WEIGHT * most);
    if (!step) return { status: 'notTold', segment: k };
    steps.push(step);
  }
  const end = solveEnd(form, n);
  if (!end) return { status: 'notTold', segment: segments - 1 };
  const gamma = end.solution.slice(2);
  const positions = new Float64Array(segments);
  const velocities = new Float64Array(segments);
  [positions[segments - 1], velocities[segments - 1]] = [end.solution[0]!, end.solution[1]!];
  for (let k = segments - 2; k >= 0; k--) {
    const { byPosition, byNext, byShared, right, byNext2, byShared2, right2 } = steps[k]!;
    positions[k] = right2 - byNext2 * positions[k + 1]! - dot(byShared2, gamma);
    velocities[k] = right - byPosition * positions[k]! - byNext * positions[k + 1]! - dot(byShared, gamma);
  }
  return {
    status: 'solved', positions, velocities, shared: gamma, sumOfSquares: Math.max(0, form[last * n + last]! - end.explained),
    // Many solutions are only looked at for their sum of squares.
    get variances() {
      return Float64Array.from({ length: shared }, (_, j) => end.inverse()[j + 2]![j + 2]!);
    },
    covariances: () => covariancesOf(steps, end.inverse(), shared),
  };
}

const dot = (a: Float64Array, b: Float64Array): number => {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += a[i]! * b[i]!;
  return sum;
};

function mirror(form: Float64Array, n: number): void {
  for (let i = 1; i < n; i++) for (let j = 0; j < i; j++) form[i * n + j] = form[j * n + i]!;
}

/** Takes p and v out of the form, with the link as one more equation that brings p′ in; what is left is of p′ (in the place of p), a new v, and γ. */
function eliminateState(form: Float64Array, n: number, link: Link | null, linkWeight: number): Step | null {
  const scale = Math.abs(form[0]!) + Math.abs(form[n + 1]!);
  // Row of p′ against p, v, γ and the right side, and its own place.
  const next = new Float64Array(n);
  let own = 0;
  if (link) {
    const { a, b, drive } = link;
    form[0]! += linkWeight * a * a;
    form[1]! += linkWeight * a * b;
    form[n]! += linkWeight * a * b;
    form[n + 1]! += linkWeight * b * b;
    next[0] = -linkWeight * a;
    next[1] = -linkWeight * b;
    for (const [i, g] of drive) {
      const row = (i + 2) * n;
      for (const [k, other] of drive) form[row + k + 2]! += linkWeight * g * other;
      form[row]! += linkWeight * g * a;
      form[i + 2]! += linkWeight * g * a;
      form[row + 1]! += linkWeight * g * b;
      form[n + i + 2]! += linkWeight * g * b;
      next[i + 2] = -linkWeight * g;
    }
    own = linkWeight;
  }
  const v = takeOut(form, n, 1, next, scale);
  if (!v) return null;
  own -= v.byNext * v.byNext * v.weight;
  const p = takeOut(form, n, 0, next, scale);
  if (!p) return null;
  own -= p.byNext * p.byNext * p.weight;
  for (let i = 2; i < n; i++) form[i] = form[i * n] = next[i]!;
  form[0] = own;
  return { weight: v.weight, byNext: v.byNext, byPosition: v.byPosition, byShared: v.byShared, right: v.right, weight2: p.weight, byNext2: p.byNext, byShared2: p.byShared, right2: p.right };
}

/** Takes one unknown out of the form and of the row of p′; null where its equations do not tell it. */
function takeOut(form: Float64Array, n: number, at: number, next: Float64Array, scale: number): Pick<Step, 'weight' | 'byNext' | 'byPosition' | 'byShared' | 'right'> | null {
  const base = at * n;
  const weight = form[base + at]!;
  if (!(weight > LEAST_PIVOT * scale)) return null;
  const byNext = next[at]! / weight;
  const byShared = new Float64Array(n - 3);
  for (let j = 2; j < n - 1; j++) byShared[j - 2] = form[base + j]! / weight;
  const found = { weight, byNext, byPosition: form[base]! / weight, byShared, right: form[base + n - 1]! / weight };
  for (let i = 0; i < n; i++) {
    const of = form[base + i]!;
    if (i === at || of === 0) continue;
    const part = of / weight;
    for (let j = 0; j < n; j++) form[i * n + j]! -= part * form[base + j]!;
    next[i]! -= byNext * of;
  }
  for (let i = 0; i < n; i++) form[base + i] = form[i * n + at] = 0;
  next[at] = 0;
  return found;
}

/** The last segment's state and the shared unknowns, by Cholesky with the columns scaled. */
function solveEnd(form: Float64Array, n: number): { readonly solution: Float64Array; readonly inverse: () => readonly Float64Array[]; readonly explained: number } | null {
  const m = n - 1;
  // Plain arrays: small typed ones are dear to make.
  const size = new Array<number>(m).fill(0);
  for (let i = 0; i < m; i++) {
    size[i] = Math.sqrt(form[i * n + i]!);
    if (!(size[i]! > 0)) return null;
  }
  const lower = new Array<number>(m * m).fill(0);
  for (let i = 0; i < m; i++) {
    for (let j = 0; j <= i; j++) {
      let sum = form[i * n + j]! / (size[i]! * size[j]!);
      for (let k = 0; k < j; k++) sum -= lower[i * m + k]! * lower[j * m + k]!;
      if (i === j) {
        if (!(sum > LEAST_PIVOT)) return null;
        lower[i * m + i] = Math.sqrt(sum);
      } else lower[i * m + j] = sum / lower[j * m + j]!;
    }
  }
  // L y = b, Lᵀ x = y.
  const y = new Array<number>(m).fill(0);
  let explained = 0;
  for (let i = 0; i < m; i++) {
    let sum = form[i * n + m]! / size[i]!;
    for (let k = 0; k < i; k++) sum -= lower[i * m + k]! * y[k]!;
    y[i] = sum / lower[i * m + i]!;
    explained += y[i]! ** 2;
  }
  const solution = new Float64Array(m);
  for (let i = m - 1; i >= 0; i--) {
    let sum = y[i]!;
    for (let k = i + 1; k < m; k++) sum -= lower[k * m + i]! * solution[k]!;
    solution[i] = sum / lower[i * m + i]!;
  }
  for (let i = 0; i < m; i++) solution[i]! /= size[i]!;
  let inverse: readonly Float64Array[] | null = null;
  return { solution, explained, inverse: () => (inverse ??= inverseOf(lower, size)) };
}

/** L⁻¹, then (L Lᵀ)⁻¹ = L⁻ᵀ L⁻¹, the scale taken off. */
function inverseOf(lower: readonly number[], size: readonly number[]): readonly Float64Array[] {
  const m = size.length;
  const below = new Array<number>(m * m).fill(0);
  for (let j = 0; j < m; j++) {
    below[j * m + j] = 1 / lower[j * m + j]!;
    for (let i = j + 1; i < m; i++) {
      let sum = 0;
      for (let k = j; k < i; k++) sum -= lower[i * m + k]! * below[k * m + j]!;
      below[i * m + j] = sum / lower[i * m + i]!;
    }
  }
  const inverse = Array.from({ length: m }, () => new Float64Array(m));
  for (let i = 0; i < m; i++) for (let j = 0; j <= i; j++) {
    let sum = 0;
    for (let k = i; k < m; k++) sum += below[k * m + i]! * below[k * m + j]!;
    inverse[i]![j] = inverse[j]![i] = sum / (size[i]! * size[j]!);
  }
  return inverse;
}

/** Variances and covariances of one segment's state, and with the shared unknowns. */
interface StateCovariance {
  readonly pp: number;
  readonly pv: number;
  readonly vv: number;
  readonly pg: Float64Array;
  readonly vg: Float64Array;
}

function covariancesOf(steps: readonly Step[], inverse: readonly Float64Array[], shared: number): ChainCovariances {
  const S = inverse.slice(2).map((row) => row.slice(2));
  const states: StateCovariance[] = new Array(steps.length + 1);
  states[steps.length] = { pp: inverse[0]![0]!, pv: inverse[0]![1]!, vv: inverse[1]![1]!, pg: inverse[0]!.slice(2), vg: inverse[1]!.slice(2) };
  for (let k = steps.length - 1; k >= 0; k--) states[k] = before(steps[k]!, states[k + 1]!, S, shared);

  /** Covariances with some value of p, v of segment k from those of segment k + 1 and of γ; `noise` is its covariance with what only segment k adds. */
  function back(k: number, next: { readonly p: number; readonly v: number }, withShared: Float64Array, noise: readonly [number, number] = [0, 0]): { readonly p: number; readonly v: number } {
    const { byPosition, byNext, byShared, byNext2, byShared2 } = steps[k]!;
    const p = -byNext2 * next.p - dot(byShared2, withShared) + noise[1];
    return { p, v: -byPosition * p - byNext * next.p - dot(byShared, withShared) + noise[0] };
  }

  /** How much of segment k's own noise, of v and of p, a value at its joint holds, times its variance. */
  function noiseOf(k: number, { position, velocity }: JointValue): readonly [number, number] {
    const { weight, weight2, byPosition } = steps[k]!;
    // The noise of p reaches v too.
    return [velocity / weight, (position - byPosition * velocity) / weight2];
  }

  function withShared(k: number, value: JointValue): Float64Array {
    const [here, next] = [states[k]!, states[k + 1]!];
    const found = new Float64Array(shared);
    for (let j = 0; j < shared; j++) {
      let sum = value.nextPosition * next.pg[j]! + value.nextVelocity * next.vg[j]! + value.position * here.pg[j]! + value.velocity * here.vg[j]!;
      for (const [i, slope] of value.shared) sum += slope * S[i]![j]!;
      found[j] = sum;
    }
    return found;
  }

  /** Covariance of a joint's value with p and v on both sides of it. */
  function around(k: number, value: JointValue, gamma: Float64Array): { readonly here: { readonly p: number; readonly v: number }; readonly next: { readonly p: number; readonly v: number } } {
    const next = states[k + 1]!;
    // What p and v of segment k are made of, carried back from p′ and from v′ of the next.
    const byP = back(k, { p: next.pp, v: next.pv }, next.pg);
    const byV = back(k, { p: next.pv, v: next.vv }, next.vg);
    const ofShared = (g: Float64Array): number => value.shared.reduce((sum, [i, slope]) => sum + slope * g[i]!, 0);
    const nextP = value.nextPosition * next.pp + value.nextVelocity * next.pv + value.position * byP.p + value.velocity * byP.v + ofShared(next.pg);
    const nextV = value.nextPosition * next.pv + value.nextVelocity * next.vv + value.position * byV.p + value.velocity * byV.v + ofShared(next.vg);
    return { next: { p: nextP, v: nextV }, here: back(k, { p: nextP, v: nextV }, gamma, noiseOf(k, value)) };
  }

  const along = (value: JointValue, here: { readonly p: number; readonly v: number }, next: { readonly p: number; readonly v: number }, gamma: Float64Array): number =>
    value.nextPosition * next.p + value.nextVelocity * next.v + value.position * here.p + value.velocity * here.v + value.shared.reduce((sum, [i, slope]) => sum + slope * gamma[i]!, 0);

  return {
    shared: S,
    withShared,
    ofJoint(k, value) {
      const gamma = withShared(k, value);
      const { here, next } = around(k, value, gamma);
      return along(value, here, next, gamma);
    },
    withEarlier(k, value, valueAt, many) {
      const gamma = withShared(k, value);
      let next = around(k, value, gamma).here;
      const found = new Float64Array(Math.min(many, k));
      for (let i = 0; i < found.length; i++) {
        const j = k - 1 - i;
        const here = back(j, next, gamma);
        found[i] = along(valueAt(j), here, next, gamma);
        next = here;
      }
      return found;
    },
    withStates(k, value, first, last) {
      const positions = new Float64Array(last - first + 1);
      const velocities = new Float64Array(last - first + 1);
      const gamma = withShared(k, value);
      const put = (s: number, { p, v }: { readonly p: number; readonly v: number }): void => {
        if (s < first || s > last) return;
        positions[s - first] = p;
        velocities[s - first] = v;
      };
      const { here, next } = around(k, value, gamma);
      put(k + 1, next);
      put(k, here);
      let at = here;
      for (let s = k - 1; s >= first; s--) put(s, (at = back(s, at, gamma)));
      for (let s = Math.max(first, k + 2); s <= last; s++) {
        // From the later segment's state back to the joint.
        const later = states[s]!;
        let [p, v] = [{ p: later.pp, v: later.pv }, { p: later.pv, v: later.vv }];
        for (let j = s - 1; j > k; j--) [p, v] = [back(j, p, later.pg), back(j, v, later.vg)];
        const [hereP, hereV] = [back(k, p, later.pg), back(k, v, later.vg)];
        put(s, { p: along(value, hereP, p, later.pg), v: along(value, hereV, v, later.vg) });
      }
      return { positions, velocities };
    },
  };
}

function before({ weight, byPosition, byNext, byShared, weight2, byNext2, byShared2 }: Step, next: StateCovariance, S: readonly Float64Array[], shared: number): StateCovariance {
  const times = (row: Float64Array): Float64Array => Float64Array.from(S, (column) => dot(row, column));
  const [S1, S2] = [times(byShared), times(byShared2)];
  const pg = Float64Array.from({ length: shared }, (_, j) => -byNext2 * next.pg[j]! - S2[j]!);
  const pn = -byNext2 * next.pp - dot(byShared2, next.pg);
  const pp = 1 / weight2 - byNext2 * pn - dot(byShared2, pg);
  const vg = Float64Array.from({ length: shared }, (_, j) => -byPosition * pg[j]! - byNext * next.pg[j]! - S1[j]!);
  const vn = -byPosition * pn - byNext * next.pp - dot(byShared, next.pg);
  const pv = -byPosition * pp - byNext * pn - dot(byShared, pg);
  return { pp, pv, vv: 1 / weight - byPosition * pv - byNext * vn - dot(byShared, vg), pg, vg };
}
