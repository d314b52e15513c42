/** Propellant that leaves the pendulum during a run: the lighter pendulum swings further for the same impulse bit. */

/**
 * Relative change of the swing per impulse by a mass lost at r_p below the pivot:
 *
 *   √[J κ/((J − Δm r²)(κ − Δm g r))] − 1 ≈ ½(Δm r²/J + Δm g r/κ)
 *
 * Valid: Δm ≥ 0 kg (negative: mass gained), less than what would leave J or κ at nothing. r_p in m, negative above the pivot.
 * Source: methods 1.11, 1.12; derived from K = √(J κ).
 * @throws RangeError outside.
 */
export function swingGainOfMassLost({ massLost, radius, inertia, stiffness, g }: Readonly<Record<'massLost' | 'radius' | 'inertia' | 'stiffness' | 'g', number>>): number {
  const ofInertia = (massLost * radius * radius) / inertia;
  const ofStiffness = (massLost * g * radius) / stiffness;
  if (!(inertia > 0 && stiffness > 0 && ofInertia < 1 && ofStiffness < 1)) {
    throw new RangeError(`propellant: ${massLost} kg at ${radius} m leaves no pendulum of ${inertia} kg·m², ${stiffness} N·m/rad`);
  }
  return Math.expm1(-0.5 * (Math.log1p(-ofInertia) + Math.log1p(-ofStiffness)));
}
