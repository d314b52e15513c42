/** The thrust line out of true: how much of the thrust turns the pendulum. */

/**
 * Torque over r_t F of a thrust that is tilted, r_t measured along the arm to an exit standing e ahead of the arm's line:
 *
 *   (cos α + (e/r_t) sin α) cos γ
 *
 * α tilt in the swing plane, positive where the thrust turns towards the pivot; γ tilt out of the plane. Where r_t is
 * the perpendicular distance to the thrust line, α is in it already: give α = 0. Exact, not only of first order.
 *
 * Valid: r_t > 0 m, |α|, |γ| < π/2 rad; e in m, of either sign.
 * Source: methods 1.1; derived (moment of a force at (e, −r_t) along (cos α, sin α)).
 */
export function alignmentFactor({ inPlane, outOfPlane, exitAhead, leverArm }: Readonly<Record<'inPlane' | 'outOfPlane' | 'exitAhead' | 'leverArm', number>>): number {
  const right = Math.PI / 2;
  if (!(leverArm > 0 && Math.abs(inPlane) < right && Math.abs(outOfPlane) < right)) {
    throw new RangeError(`alignment: lever arm ${leverArm} m, tilts ${inPlane} and ${outOfPlane} rad`);
  }
  return (Math.cos(inPlane) + (exitAhead / leverArm) * Math.sin(inPlane)) * Math.cos(outOfPlane);
}

/**
 * Mean and standard deviation of cos α where α is known as α₀ with the standard uncertainty u: near α₀ = 0 the
 * half-difference is nil, while the cosine is below 1 on average by u²/2, with a standard deviation of u²/√2.
 *
 * mean = e^{−u²/2} cos α₀;  variance = ½(1 + e^{−2u²} cos 2α₀) − mean², α normal.
 *
 * Valid: u ≥ 0 rad. Source: characteristic function of the normal distribution; derived.
 */
export function cosineOfUncertainTilt({ tilt, u }: Readonly<Record<'tilt' | 'u', number>>): { readonly mean: number; readonly deviation: number } {
  if (!(u >= 0)) throw new RangeError(`tilt: standard uncertainty ${u} rad is negative`);
  const v = u * u;
  const mean = Math.exp(-v / 2) * Math.cos(tilt);
  // ½(1 − e^{−v})[1 − e^{−v} cos 2α₀], which does not cancel for a small u.
  const variance = -0.5 * Math.expm1(-v) * (-Math.expm1(-v) + Math.exp(-v) * 2 * Math.sin(tilt) ** 2);
  return { mean, deviation: Math.sqrt(variance) };
}
