/**
 * Elements of a hanging film: polynomials of high degree, joined with their slopes, on a mesh laid to where the shapes bend.
 *
 * Evenly in √(1 − ξ), in which the waves of a limp film have one length, and geometrically towards a clamp, whose
 * boundary layer is √S long. Within an element: cubic Hermite functions, and functions whose second derivatives are
 * Legendre polynomials. Source: hp finite elements, any text (from memory).
 */
import type { GaussRule } from '../numeric/legendre.ts';
import { gaussRule, legendre } from '../numeric/legendre.ts';

export interface Mesh {
  /** Element ends, 0 … 1. */
  readonly nodes: readonly number[];
  readonly degree: number;
  readonly unknowns: number;
}

export interface MeshChoice {
  /** Elements evenly spaced in √(1 − ξ). */
  readonly elements: number;
  /** Degree of the polynomials, ≥ 4. */
  readonly degree: number;
}

/** Each element towards the clamp is this much shorter than the next. */
const CLAMP_GRADE = 5;

/** Mesh for a clamp's boundary layer of the given length (a share of L; 1 where there is none). */
export function layMesh(layer: number, { elements, degree }: MeshChoice): Mesh {
  const nodes = Array.from({ length: elements + 1 }, (_, j) => 1 - ((elements - j) / elements) ** 2);
  const inner: number[] = [];
  for (let edge = nodes[1]! / CLAMP_GRADE; edge > layer; edge /= CLAMP_GRADE) inner.unshift(edge);
  // The layer falls off as e^{−ξ/√S}; the innermost element holds between one and five lengths of it.
  nodes.splice(1, 0, ...inner);
  return { nodes, degree, unknowns: (nodes.length - 1) * (degree - 1) + 2 };
}

/** On −1 … 1: value and slope at both ends, and between them functions whose second derivatives are Legendre polynomials. */
function localFunctions(degree: number, eta: number, derivative: 0 | 1 | 2): Float64Array {
  const f = new Float64Array(degree + 1);
  const [a, b] = [1 - eta, 1 + eta];
  switch (derivative) {
    case 0:
      [f[0], f[1], f[degree - 1], f[degree]] = [(a * a * (2 + eta)) / 4, (a * a * b) / 4, (b * b * (2 - eta)) / 4, (-b * b * a) / 4];
      break;
    case 1:
      [f[0], f[1], f[degree - 1], f[degree]] = [(-3 * a * b) / 4, (-a * (1 + 3 * eta)) / 4, (3 * a * b) / 4, (-b * (1 - 3 * eta)) / 4];
      break;
    case 2:
      [f[0], f[1], f[degree - 1], f[degree]] = [(3 * eta) / 2, (3 * eta - 1) / 2, (-3 * eta) / 2, (3 * eta + 1) / 2];
      break;
  }
  const p = legendre(degree, eta);
  for (let j = 2; j <= degree - 2; j += 1) {
    const scale = Math.sqrt((2 * j + 1) / 2);
    // ∫P_j = (P_{j+1} − P_{j−1})/(2j + 1), twice.
    const once = (k: number): number => (p[k + 1]! - p[k - 1]!) / (2 * k + 1);
    f[j] = scale * (derivative === 2 ? p[j]! : derivative === 1 ? once(j) : (once(j + 1) - once(j - 1)) / (2 * j + 1));
  }
  return f;
}

/** ∫NN, ∫N′N′, ∫ηN′N′, ∫N″N″ over −1 … 1, and the rule that they were taken with. */
interface ElementTables {
  readonly rule: GaussRule;
  readonly mass: Float64Array;
  readonly slope: Float64Array;
  readonly slopeEta: Float64Array;
  readonly curvature: Float64Array;
}

const tablesOf = new Map<number, ElementTables>();

function elementTables(degree: number): ElementTables {
  const kept = tablesOf.get(degree);
  if (kept) return kept;
  const size = degree + 1;
  const rule = gaussRule(size);
  const [mass, slope, slopeEta, curvature] = [0, 0, 0, 0].map(() => new Float64Array(size * size)) as [Float64Array, Float64Array, Float64Array, Float64Array];
  rule.points.forEach((eta, q) => {
    const w = rule.weights[q]!;
    const [f, d, c] = [localFunctions(degree, eta, 0), localFunctions(degree, eta, 1), localFunctions(degree, eta, 2)];
    for (let i = 0; i < size; i += 1) {
      for (let j = 0; j < size; j += 1) {
        mass[i * size + j]! += w * f[i]! * f[j]!;
        slope[i * size + j]! += w * d[i]! * d[j]!;
        slopeEta[i * size + j]! += w * eta * d[i]! * d[j]!;
        curvature[i * size + j]! += w * c[i]! * c[j]!;
      }
    }
  });
  const tables = { rule, mass, slope, slopeEta, curvature };
  tablesOf.set(degree, tables);
  return tables;
}

/** Slope unknowns are dy/dξ, so that neighbours of different length share them. */
const scaleOf = (i: number, degree: number, half: number): number => (i === 1 || i === degree ? half : 1);

/** Stiffness ∫T u′v′ + S u″v″ and mass ∫u v with the plate at the tip, both row by row, unknowns × unknowns. */
export function assemble(mesh: Mesh, S: number, P: number): { readonly stiffness: Float64Array; readonly mass: Float64Array } {
  const { nodes, degree, unknowns } = mesh;
  const tables = elementTables(degree);
  const size = degree + 1;
  const stiffness = new Float64Array(unknowns * unknowns);
  const mass = new Float64Array(unknowns * unknowns);
  for (let e = 0; e < nodes.length - 1; e += 1) {
    const half = (nodes[e + 1]! - nodes[e]!) / 2;
    const tension = 1 + P - (nodes[e + 1]! + nodes[e]!) / 2;
    const bending = S / half ** 3;
    const first = e * (degree - 1);
    for (let i = 0; i < size; i += 1) {
      for (let j = 0; j < size; j += 1) {
        const at = i * size + j;
        const scale = scaleOf(i, degree, half) * scaleOf(j, degree, half);
        const to = (first + i) * unknowns + first + j;
        mass[to]! += scale * half * tables.mass[at]!;
        stiffness[to]! += scale * ((tension / half) * tables.slope[at]! - tables.slopeEta[at]! + bending * tables.curvature[at]!);
      }
    }
  }
  mass[(unknowns - 2) * (unknowns + 1)]! += P;
  return { stiffness, mass };
}

/** Every function at ξ; past the tip along the tip's tangent. */
export function functionsAt(mesh: Mesh, height: number): Float64Array {
  const { nodes, degree, unknowns } = mesh;
  const all = new Float64Array(unknowns);
  const beyond = Math.max(0, height - 1);
  const x = Math.min(Math.max(height, 0), 1);
  let e = 0;
  while (e < nodes.length - 2 && x > nodes[e + 1]!) e += 1;
  const half = (nodes[e + 1]! - nodes[e]!) / 2;
  const f = localFunctions(degree, (x - nodes[e]!) / half - 1, 0);
  for (let i = 0; i <= degree; i += 1) all[e * (degree - 1) + i] = f[i]! * scaleOf(i, degree, half);
  all[unknowns - 1]! += beyond;
  return all;
}

/** Mean of every function over from … to. */
export function meanFunctions(mesh: Mesh, from: number, to: number): Float64Array {
  const { nodes, degree, unknowns } = mesh;
  const { rule } = elementTables(degree);
  const all = new Float64Array(unknowns);
  for (let e = 0; e < nodes.length - 1; e += 1) {
    const low = Math.max(from, nodes[e]!);
    const high = Math.min(to, nodes[e + 1]!);
    if (!(high > low)) continue;
    const half = (nodes[e + 1]! - nodes[e]!) / 2;
    rule.points.forEach((point, q) => {
      const x = (low + high + (high - low) * point) / 2;
      const f = localFunctions(degree, (x - nodes[e]!) / half - 1, 0);
      const w = (rule.weights[q]! * (high - low)) / (2 * (to - from));
      for (let i = 0; i <= degree; i += 1) all[e * (degree - 1) + i]! += w * f[i]! * scaleOf(i, degree, half);
    });
  }
  if (to > 1) {
    const beyond = to - Math.max(from, 1);
    all[unknowns - 2]! += beyond / (to - from);
    all[unknowns - 1]! += (beyond * ((to + Math.max(from, 1)) / 2 - 1)) / (to - from);
  }
  return all;
}
