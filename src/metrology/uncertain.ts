/**
 * A value with what it owes to each source, so that correlation needs no bookkeeping
 * (B. D. Hall’s uncertain numbers, Metrologia 2006, from memory; JCGM 100:2008 clause 5).
 *
 * What many results share (the lever arm, the calibration factor, a damping ratio from hundreds of swings) is an
 * anchor: a result keeps only its sensitivity to the anchor, so a thousand shots do not each carry the sources of all.
 */
import type { Source } from './source.ts';

export interface Uncertain {
  readonly value: number;
  /** u_i(y) by source · unit of the value · signed c_i u(x_i). */
  readonly own: ReadonlyMap<Source, number>;
  /** ∂y/∂a by anchor. */
  readonly through: ReadonlyMap<Anchor, number>;
}

/** An uncertain value that many results share, with its contributions laid flat. */
export interface Anchor extends Uncertain {
  readonly flat: ReadonlyMap<Source, number>;
}

const NO_SOURCES: ReadonlyMap<Source, number> = new Map();
const NO_ANCHORS: ReadonlyMap<Anchor, number> = new Map();

export const exact = (value: number): Uncertain => ({ value, own: NO_SOURCES, through: NO_ANCHORS });

/** The value of one source: x with u(x). */
export function ofSource(source: Source): Uncertain {
  return source.u === 0 ? exact(source.estimate) : { value: source.estimate, own: new Map([[source, source.u]]), through: NO_ANCHORS };
}

/** u_i(y) by source, anchors opened. */
export function contributions(y: Uncertain): ReadonlyMap<Source, number> {
  if (y.through.size === 0) return y.own;
  const all = new Map(y.own);
  for (const [anchor, c] of y.through) for (const [source, part] of anchor.flat) all.set(source, (all.get(source) ?? 0) + c * part);
  return all;
}

export function anchor(y: Uncertain): Anchor {
  const flat = contributions(y);
  const through = new Map<Anchor, number>();
  const made: Anchor = { value: y.value, flat, own: NO_SOURCES, through };
  through.set(made, 1);
  return made;
}

const inner = new WeakMap<Anchor, WeakMap<Anchor, number>>();

/** Covariance of two anchors, u(a, b) = Σ u_i(a) u_i(b); kept, since every shot asks again. */
function anchorCovariance(a: Anchor, b: Anchor): number {
  let row = inner.get(a);
  if (!row) inner.set(a, (row = new WeakMap()));
  const kept = row.get(b);
  if (kept !== undefined) return kept;
  const [small, large] = a.flat.size <= b.flat.size ? [a.flat, b.flat] : [b.flat, a.flat];
  let sum = 0;
  for (const [source, part] of small) sum += part * (large.get(source) ?? 0);
  row.set(b, sum);
  return sum;
}

/**
 * Covariance u(y, z) = Σ u_i(y) u_i(z) over all sources.
 * Source: JCGM 100:2008 F.1.2.3 (from memory).
 */
export function covariance(y: Uncertain, z: Uncertain): number {
  let sum = 0;
  for (const [source, part] of y.own) sum += part * (z.own.get(source) ?? 0);
  for (const [a, c] of y.through) for (const [b, d] of z.through) sum += c * d * anchorCovariance(a, b);
  for (const [a, c] of y.through) for (const [source, part] of z.own) sum += c * part * (a.flat.get(source) ?? 0);
  for (const [a, c] of z.through) for (const [source, part] of y.own) sum += c * part * (a.flat.get(source) ?? 0);
  return sum;
}

/** Combined standard uncertainty u_c(y) · unit of y · JCGM 100:2008 5.1.2, sources independent. */
export function standardUncertainty(y: Uncertain): number {
  if (y.own.size === 0 && y.through.size === 1) {
    // Most inputs of a shot are one anchor each, whose own u is asked for again and again.
    for (const [a, c] of y.through) return Math.abs(c) * Math.sqrt(Math.max(0, anchorCovariance(a, a)));
  }
  return Math.sqrt(Math.max(0, covariance(y, y)));
}

/** Linear combination Σ c_j y_j, exact in the sources. */
export function combine(terms: readonly (readonly [c: number, y: Uncertain])[]): Uncertain {
  let value = 0;
  const own = new Map<Source, number>();
  const through = new Map<Anchor, number>();
  for (const [c, y] of terms) {
    value += c * y.value;
    addScaled(own, y.own, c);
    addScaled(through, y.through, c);
  }
  return { value, own, through };
}

function addScaled<K>(into: Map<K, number>, parts: ReadonlyMap<K, number>, c: number): void {
  if (c !== 0) for (const [key, part] of parts) into.set(key, (into.get(key) ?? 0) + c * part);
}

export type Model<Name extends string> = (x: Readonly<Record<Name, number>>) => number;

/** Quarterings of the step before a model counts as defined at its estimate alone: from any u that the bench takes to the last digits of the smallest estimate. */
const NARROWINGS = 60;

/**
 * y = f(x₁, …) with u_i(y) from half-differences Z_i = ½[f(x_i + u_i) − f(x_i − u_i)].
 *
 * Where f ends within one standard uncertainty of an input (a reading near the edge of the ruler's reach, a mass of
 * twice its uncertainty), the half-difference is taken over a quarter of the step, and so on, and scaled up.
 * Source: JCGM 100:2008 5.1.3 note 2 (clause number from memory).
 * @throws RangeError from the model, where it throws at the estimates.
 */
export function propagate<Name extends string>(model: Model<Name>, inputs: Readonly<Record<Name, Uncertain>>): Uncertain {
  const names = Object.keys(inputs) as Name[];
  const x = {} as Record<Name, number>;
  for (const name of names) x[name] = inputs[name].value;
  const value = model(x);
  const own = new Map<Source, number>();
  const through = new Map<Anchor, number>();
  for (const name of names) {
    const input = inputs[name];
    const u = standardUncertainty(input);
    if (u === 0) continue;
    const c = slopeAbout(model, x, name, u);
    addScaled(own, input.own, c);
    addScaled(through, input.through, c);
  }
  return { value, own, through };
}

function slopeAbout<Name extends string>(model: Model<Name>, x: Record<Name, number>, name: Name, u: number): number {
  const centre = x[name];
  let failure: RangeError | undefined;
  let step = u;
  for (let i = 0; i <= NARROWINGS; i++, step /= 4) {
    try {
      x[name] = centre + step;
      const above = model(x);
      x[name] = centre - step;
      const c = (above - model(x)) / (2 * step);
      x[name] = centre;
      if (Number.isFinite(c)) return c;
    } catch (ended) {
      x[name] = centre;
      if (!(ended instanceof RangeError)) throw ended;
      failure = ended;
    }
  }
  // An error is made only here: the trace it takes costs more than the slope.
  throw failure ?? new RangeError(`propagate: no slope of the model in ${name} about ${centre}`);
}

/** An uncertain value whose sensitivities are already known: y with ∂y/∂x_j for each x_j (implicit derivatives of a fit). */
export function withSensitivities(value: number, terms: readonly (readonly [c: number, x: Uncertain])[]): Uncertain {
  return { ...combine(terms), value };
}
