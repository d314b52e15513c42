/**
 * Least-squares adjustment: unknowns and every input they rest on are found together, each input's stated value being one of the observations,
 * so that what several items share stays shared and a common scale error cannot drag the result outside the data.
 */
import { incompleteGamma } from '../numeric/specialFunctions.ts';
import { checkOf, gainsOf, stepOf, type LinearItems, type Step } from './gaussHelmert.ts';
import type { Source } from './source.ts';
import { contributions, type Uncertain } from './uncertain.ts';

export interface AdjustmentInput {
  readonly y: Uncertain;
  /** A quantity that is positive and multiplies: it moves with its sources as x₀ exp(Σ c_s δ_s/x₀), so that products of powers stay exact. */
  readonly positive: boolean;
}

type Numbers = Readonly<Record<string, number>>;

export interface AdjustmentItem {
  readonly id: string;
  readonly label: string;
  readonly inputs: Readonly<Record<string, AdjustmentInput>>;
  /** Predicted less measured, 0 where the item is met exactly; in any unit, best as a logarithm, in which products of powers are straight. Captures nothing. */
  readonly residual: (unknowns: Numbers, inputs: Numbers) => number;
}

export interface Unknown {
  readonly name: string;
  /** Any value of the right size; above zero for a positive unknown, which moves by its logarithm. */
  readonly start: number;
  readonly positive: boolean;
}

export interface AdjustedItemResult {
  readonly id: string;
  readonly label: string;
  /** (Measured − what the other items say of it) over the u of that difference; null where no other item checks it. */
  readonly deviation: number | null;
  /** Part of what the item says by itself that the others say too, 0 … 1. */
  readonly redundancy: number;
  /** Change of each unknown if the item were left out, to first order: relative for a positive unknown; null where it could not be. */
  readonly without: Numbers | null;
}

export interface Adjustment {
  readonly status: 'adjusted';
  readonly unknowns: Readonly<Record<string, Uncertain>>;
  readonly chiSquared: number;
  /** Items less unknowns. */
  readonly dof: number;
  /** Chance of a χ² as large or larger; null where nothing is checked. */
  readonly probability: number | null;
  readonly items: readonly AdjustedItemResult[];
  /** Adjusted less stated value of each source, in its u; largest first. */
  readonly moved: readonly { readonly source: Source; readonly shift: number }[];
  readonly iterations: number;
}

/** Contradictory: items that share all their sources, or have none, lie apart, so that nothing uncertain is left to explain it. */
export type Adjusted = Adjustment | { readonly status: 'underdetermined' | 'notConverged' | 'contradictory'; readonly unknowns?: undefined };

/** What every item is allowed beside its sources, as a part of its own size and of its own u: items that rest on the very same readings would else contradict each other in the last digits. */
const FLOOR = { ofSize: 1e-9, ofU: 1e-6 };
/** Times its floor that an item may be off before it counts as contradicted by those with the same sources. */
const FLOOR_STRETCH = 5;
/** Parts of the step that are tried in turn: whole steps settle fast, and only where they overshoot without end are shorter ones needed. */
const STEP_PARTS = [1, 0.5, 0.2];
const ITERATIONS = 60;
/** Change, in u, below which the adjustment has settled; below which it has where rounding lets it shrink no further; and what of a stretched floor is such rounding. */
const SETTLED = { fine: 1e-9, coarse: 1e-6, ofStretch: 1e-4 };
/** Half-width of the differences for the slopes, in u of an input and as a part of the value: the larger one, so that a tiny u is not lost in rounding. */
const STEP = { ofU: 1e-4, ofValue: 1e-5 };

/** One input with its sources by index. */
interface Input {
  readonly name: string;
  readonly centre: number;
  readonly positive: boolean;
  readonly parts: readonly (readonly [index: number, c: number])[];
  readonly u: number;
}

interface Prepared {
  readonly unknowns: readonly Unknown[];
  readonly items: readonly { readonly item: AdjustmentItem; readonly inputs: readonly Input[] }[];
  readonly sources: readonly Source[];
}

function prepare(unknowns: readonly Unknown[], items: readonly AdjustmentItem[]): Prepared {
  const index = new Map<Source, number>();
  const inputOf = ([name, { y, positive }]: [string, AdjustmentInput]): Input => {
    const parts = [...contributions(y)].filter(([, c]) => c !== 0).map(([source, c]) => {
      if (!index.has(source)) index.set(source, index.size);
      return [index.get(source)!, c] as const;
    });
    return { name, centre: y.value, positive: positive && y.value > 0, parts, u: Math.sqrt(parts.reduce((sum, [, c]) => sum + c * c, 0)) };
  };
  const prepared = items.map((item) => ({ item, inputs: Object.entries(item.inputs).map(inputOf) }));
  return { unknowns, items: prepared, sources: [...index.keys()] };
}

function valueOf({ centre, positive, parts }: Input, delta: Float64Array): number {
  let moved = 0;
  for (const [s, c] of parts) moved += c * delta[s]!;
  return positive ? centre * Math.exp(moved / centre) : centre + moved;
}

const unknownsAt = (unknowns: readonly Unknown[], p: readonly number[]): Record<string, number> =>
  Object.fromEntries(unknowns.map(({ name, positive }, k) => [name, positive ? Math.exp(p[k]!) : p[k]!]));

/** Where the adjustment stands: p (logarithms of positive unknowns) with the size of each, and δ. */
interface Place {
  readonly p: readonly number[];
  readonly size: readonly number[];
  readonly delta: Float64Array;
}

/** A residual outside its range is no number here; the step that led there is then taken shorter. */
function residualAt({ residual }: AdjustmentItem, unknowns: Numbers, x: Numbers): number {
  try {
    return residual(unknowns, x);
  } catch (outside) {
    if (outside instanceof RangeError) return Number.NaN;
    throw outside;
  }
}

function linearise({ unknowns, items, sources }: Prepared, { p, size, delta }: Place): LinearItems {
  const at = unknownsAt(unknowns, p);
  const steps = size.map((of) => STEP.ofValue * of);
  const beside = steps.map((h, k) => [h, -h].map((by) => unknownsAt(unknowns, p.map((value, j) => (j === k ? value + by : value)))));
  const g: number[] = [];
  const A: number[][] = [];
  const B: Float64Array[] = [];
  const floor: number[] = [];
  for (const { item, inputs } of items) {
    const x: Record<string, number> = Object.fromEntries(inputs.map((input) => [input.name, valueOf(input, delta)]));
    const slopes = beside.map(([above, below], k) => (residualAt(item, above!, x) - residualAt(item, below!, x)) / (2 * steps[k]!));
    const row = new Float64Array(sources.length);
    for (const { name, centre, positive, parts, u } of inputs) {
      if (parts.length === 0) continue;
      const here = x[name]!;
      const stretched = positive ? here / centre : 1;
      const h = Math.max(STEP.ofU * u * stretched, STEP.ofValue * Math.abs(here));
      const slope = ((residualAt(item, at, { ...x, [name]: here + h }) - residualAt(item, at, { ...x, [name]: here - h })) / (2 * h)) * stretched;
      for (const [s, c] of parts) row[s]! += slope * c;
    }
    g.push(residualAt(item, at, x));
    A.push(slopes);
    B.push(row);
    floor.push(Math.hypot(FLOOR.ofSize * slopes.reduce((sum, slope, k) => sum + Math.abs(slope) * size[k]!, 0), FLOOR.ofU * Math.sqrt(row.reduce((sum, slope) => sum + slope * slope, 0))));
  }
  return { g, A, B, floor };
}

/** Size of each unknown: 1 of a logarithm; else the larger of value and u, so that a start at zero does no harm. */
const sizesOf = (unknowns: readonly Unknown[], p: readonly number[], u: readonly number[]): number[] =>
  unknowns.map(({ positive }, k) => (positive ? 1 : Math.max(Math.abs(p[k]!), u[k] ?? 0) || 1));

/**
 * Adjustment of the unknowns p and of all sources δ (each in its u, stated at 0): min Σ δ_s² with g_i(p, x(δ)) = 0 for every item.
 *
 * Iterated Gauss–Helmert (`gaussHelmert.ts`), slopes taken anew at the adjusted unknowns and inputs, which is what keeps a shared
 * scale error from pulling the result below all data (R. W. Peelle's puzzle, 1987, from memory). The unknowns keep their
 * contributions by source, du = −(AᵀV⁻¹A)⁻¹AᵀV⁻¹B dδ at the solution. u is never scaled by √(χ²/ν).
 *
 * Valid: at least as many items as unknowns; residuals near 0 at `start`. An item is allowed a part of 10⁻⁹ of itself and 10⁻⁶ of its u
 * beside its sources, so that exact items and items of the same sources are met; where that does not do, they are contradictory.
 * Source: Mikhail & Ackermann, Observations and Least Squares (1976), combined adjustment; all inputs as observations as in the
 * CODATA adjustments (Mohr & Taylor, Rev. Mod. Phys. 72 (2000) 351, appendix E), both from memory.
 * @throws RangeError where a positive unknown starts at or below zero
 */
export function adjust({ unknowns, items }: { readonly unknowns: readonly Unknown[]; readonly items: readonly AdjustmentItem[] }): Adjusted {
  if (unknowns.some(({ positive, start }) => positive && !(start > 0))) throw new RangeError('adjust: a positive unknown starts at or below zero');
  if (items.length === 0 || items.length < unknowns.length) return { status: 'underdetermined' };
  const prepared = prepare(unknowns, items);
  for (const part of STEP_PARTS) {
    const found = iterate(prepared, part);
    if (found.status !== 'notConverged') return found;
  }
  return { status: 'notConverged' };
}

function iterate(prepared: Prepared, part: number): Adjusted {
  const { unknowns, sources } = prepared;
  const start = unknowns.map(({ start: value, positive }) => (positive ? Math.log(value) : value));
  let place: Place = { p: start, size: sizesOf(unknowns, start, []), delta: new Float64Array(sources.length) };
  let last = Infinity;
  for (let iteration = 1; iteration <= ITERATIONS; iteration++) {
    const linear = linearise(prepared, place);
    const step = stepOf(linear, place.delta);
    if (step === 'underdetermined' && iteration === 1) return { status: 'underdetermined' };
    if (typeof step === 'string') break;
    const u = step.covariance.map((row, k) => Math.sqrt(row[k]!));
    const to = adjustedSources(linear, step, sources.length);
    const change = to.reduce((most, value, s) => Math.max(most, Math.abs(value - place.delta[s]!)), step.change.reduce((most, dp, k) => Math.max(most, Math.abs(dp) / u[k]!), 0));
    const p = place.p.map((value, k) => value + part * step.change[k]!);
    place = { p, size: sizesOf(unknowns, p, u), delta: place.delta.map((value, s) => value + part * (to[s]! - value)) };
    const noBetter = change >= last / 2;
    const stretch = stretchOf(linear, step);
    if (noBetter && stretch > FLOOR_STRETCH && change <= SETTLED.ofStretch * stretch) return { status: 'contradictory' };
    if (change <= SETTLED.fine || (noBetter && change <= SETTLED.coarse)) return resultOf(prepared, place, iteration);
    last = change;
  }
  return { status: 'notConverged' };
}

/** δ′ = −BᵀV⁻¹(w + A dp). */
function adjustedSources({ B }: LinearItems, { pulls }: Step, sources: number): Float64Array {
  const delta = new Float64Array(sources);
  for (const [i, row] of B.entries()) for (let s = 0; s < sources; s++) delta[s]! -= row[s]! * pulls[i]!;
  return delta;
}

/** Largest share that a floor takes of an item, in times the floor. */
const stretchOf = ({ floor }: LinearItems, { pulls }: Step): number => pulls.reduce((most, pull, i) => Math.max(most, Math.abs(pull * floor[i]!)), 0);

function resultOf(prepared: Prepared, place: Place, iterations: number): Adjusted {
  const { unknowns, items, sources } = prepared;
  const linear = linearise(prepared, place);
  const step = stepOf(linear, place.delta);
  if (typeof step === 'string') return { status: 'notConverged' };
  if (stretchOf(linear, step) > FLOOR_STRETCH) return { status: 'contradictory' };
  const gains = items.map((_, i) => gainsOf(step, i));
  const values = unknownsAt(unknowns, place.p);
  const found = Object.fromEntries(unknowns.map(({ name, positive }, k): [string, Uncertain] => {
    const value = values[name]!;
    const parts = new Float64Array(sources.length);
    for (const [i, row] of linear.B.entries()) for (let s = 0; s < parts.length; s++) parts[s]! -= gains[i]![k]! * row[s]!;
    return [name, { value, own: new Map(sources.map((source, s) => [source, (positive ? value : 1) * parts[s]!] as const).filter(([, part]) => part !== 0)), through: new Map() }];
  }));
  const itemResults = items.map(({ item: { id, label } }, i): AdjustedItemResult => {
    const check = checkOf(step, i);
    if (check === null) return { id, label, deviation: null, redundancy: 0, without: null };
    // The residual is predicted less measured, the deviation measured less predicted.
    return { id, label, deviation: -check.deviation, redundancy: check.redundancy, without: Object.fromEntries(unknowns.map(({ name }, k) => [name, check.without[k]!])) };
  });
  const dof = items.length - unknowns.length;
  const moved = sources.map((source, s) => ({ source, shift: place.delta[s]! })).sort((a, b) => Math.abs(b.shift) - Math.abs(a.shift));
  return { status: 'adjusted', unknowns: found, chiSquared: step.chiSquared, dof, probability: dof > 0 ? incompleteGamma(dof / 2, step.chiSquared / 2).upper : null, items: itemResults, moved, iterations };
}
