/** The timed period brought back to a small, undamped swing. */

/** Nodes of the period integral; the integrand is smooth and periodic, so the trapezoid rule converges geometrically. */
const NODES = 64;

/**
 * T/T₀ of an undamped swing of amplitude A with gravity share p:
 * T/T₀ = (2/π) ∫₀^{π/2} A cos φ / √(2[p(cos θ − cos A) + (1 − p)(A² − θ²)/2]) dφ, θ = A sin φ.
 *
 * Valid: 0 ≤ A < π (p = 1: to 1e-14 up to 170°), 0 ≤ p, above 1 where gravity and flexure still restore at A. At p = 1 it is 2K(sin A/2)/π.
 * Source: energy integral; series 1 + p A²/16 + … (methods 1.5).
 * @throws RangeError where A is no amplitude of a swing.
 */
export function periodRatio(amplitude: number, gravityShare: number): number {
  const A = Math.abs(amplitude);
  if (!(A < Math.PI)) throw new RangeError(`period ratio: amplitude ${amplitude} rad is not below π`);
  if (gravityShare * Math.sin(A) + (1 - gravityShare) * A < 0) throw new RangeError(`period ratio: nothing restores at ${amplitude} rad with gravity share ${gravityShare}`);
  if (A < 1e-4) return 1 + (gravityShare * A * A) / 16;
  let sum = 0;
  for (let i = 0; i < NODES; i++) {
    const phi = ((i + 0.5) * Math.PI) / (2 * NODES);
    const theta = A * Math.sin(phi);
    // cos θ − cos A = 2 sin((A+θ)/2) sin((A−θ)/2), without cancellation; A − θ = A(1 − sin φ) likewise.
    const short = A * 2 * Math.sin((Math.PI / 2 - phi) / 2) ** 2;
    const gravity = 2 * Math.sin((A + theta) / 2) * Math.sin(short / 2);
    const flexure = ((A + theta) * short) / 2;
    sum += (A * Math.cos(phi)) / Math.sqrt(2 * (gravityShare * gravity + (1 - gravityShare) * flexure));
  }
  return sum / NODES;
}

/**
 * Amplitude that stands for n decaying cycles: √⟨A²⟩, ⟨A²⟩ = A₀² (1 − e^{−2nδ})/(2nδ).
 *
 * Valid: A₀ ≥ 0, n ≥ 0, δ ≥ 0; A₀ itself at nδ = 0. Source: methods 1.5, derived from T ∝ 1 + A²/16.
 */
export function meanSquareAmplitude(amplitude: number, cycles: number, logDecrement: number): number {
  const x = 2 * cycles * logDecrement;
  return x === 0 ? amplitude : amplitude * Math.sqrt(-Math.expm1(-x) / x);
}

/**
 * Undamped small period from the timed one: T₀ = T √(1 − ζ²)/(T/T₀)(√⟨A²⟩).
 *
 * Valid: 0 ≤ ζ < 1. Source: methods 1.3, 1.5.
 */
export function undampedSmallPeriod(x: Readonly<Record<'timed' | 'dampingRatio' | 'amplitude' | 'cycles' | 'gravityShare', number>>): number {
  const z = Math.min(Math.max(x.dampingRatio, 0), 0.999);
  const delta = (2 * Math.PI * z) / Math.sqrt(1 - z * z);
  return (x.timed * Math.sqrt(1 - z * z)) / periodRatio(meanSquareAmplitude(x.amplitude, x.cycles, delta), x.gravityShare);
}
