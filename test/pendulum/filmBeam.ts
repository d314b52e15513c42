/**
 * A hanging film by finite differences in space and leapfrog in time: masses and springs from the energy, no modes, no
 * polynomials; shares nothing with the project's own film.
 */

export interface BeamCase {
  readonly stiffnessNumber: number;
  readonly plateRatio: number;
  readonly zoneFrom: number;
  readonly zoneTo: number;
}

/** Largest tip reading up to τ = `until`, in (I/m)√(L/g), and its time; clamped, lossless, second order in 1/cells. */
export function beamFirstMaximum({ stiffnessNumber: S, plateRatio: P, zoneFrom, zoneTo }: BeamCase, until: number, cells: number): { readonly coefficient: number; readonly time: number } {
  const h = 1 / cells;
  const mass = new Float64Array(cells + 1).fill(h);
  mass[cells] = h / 2 + P;
  const speed = new Float64Array(cells + 1);
  for (let i = 1; i <= cells; i += 1) {
    const [low, high] = [Math.max((i - 0.5) * h, zoneFrom), Math.min((i + 0.5) * h, zoneTo, 1)];
    const momentum = zoneFrom === zoneTo ? (i === Math.round(zoneTo * cells) ? 1 : 0) : Math.max(0, high - low) / (zoneTo - zoneFrom);
    speed[i] = momentum / mass[i]!;
  }
  // Below the stability limit 2/ω_max with ω_max² ≤ 16 S/h⁴ + 4 T/h².
  const step = 1.2 / Math.sqrt((16 * S) / h ** 4 + (4 * (1 + P)) / h ** 2);
  const y = new Float64Array(cells + 1);
  const force = new Float64Array(cells + 1);
  let top = { coefficient: 0, time: 0 };
  // Leapfrog: the speed stands half a step behind; the first half step feels no force, since y = 0.
  for (let t = step; t <= until; t += step) {
    for (let i = 1; i <= cells; i += 1) y[i]! += step * speed[i]!;
    if (y[cells]! > top.coefficient) top = { coefficient: y[cells]!, time: t };
    force.fill(0);
    for (let i = 0; i < cells; i += 1) {
      const pull = ((1 - (i + 0.5) * h + P) * (y[i + 1]! - y[i]!)) / h;
      force[i]! += pull;
      force[i + 1]! -= pull;
    }
    for (let i = 1; i < cells; i += 1) {
      const moment = (S * (y[i - 1]! - 2 * y[i]! + y[i + 1]!)) / h ** 3;
      force[i - 1]! -= moment;
      force[i]! += 2 * moment;
      force[i + 1]! -= moment;
    }
    // The clamp mirrors the film: curvature 2y₁/h² over half a cell.
    force[1]! -= (2 * S * y[1]!) / h ** 3;
    for (let i = 1; i <= cells; i += 1) speed[i]! += (step * force[i]!) / mass[i]!;
  }
  return top;
}
