/** A pendulum struck at known times, by fourth-order Runge–Kutta at tiny steps: the full equation, in angle. */

export interface Struck {
  /** ω_n, rad/s; ζ; gravity share. */
  readonly frequency: number;
  readonly ratio: number;
  readonly share: number;
  /** Times, s, on the fine grid (a multiple of 1/(8 rate)), and jumps of θ′/ω_n, rad. */
  readonly events: readonly number[];
  readonly jumps: readonly number[];
  readonly seconds: number;
  readonly rate: number;
  /** θ and θ′/ω_n at the start. */
  readonly start?: readonly [number, number];
}

export function struck({ frequency: w, ratio: z, share: p, events, jumps, seconds, rate, start = [0, 0] }: Struck): { readonly t: number[]; readonly theta: number[] } {
  const steps = 8;
  const h = 1 / rate / steps;
  let [x, v] = [start[0], start[1] * w];
  const f = (a: number, b: number): readonly [number, number] => [b, -2 * z * w * b - w * w * (p * Math.sin(a) + (1 - p) * a)];
  const [t, theta]: [number[], number[]] = [[], []];
  let next = 0;
  for (let i = 0; i <= seconds * rate; i++) {
    const now = i / rate;
    t.push(now);
    theta.push(x);
    for (let k = 0; k < steps; k++) {
      if (next < events.length && Math.abs(now + k * h - events[next]!) < h / 2) v += w * jumps[next++]!;
      const [a1, b1] = f(x, v);
      const [a2, b2] = f(x + (h / 2) * a1, v + (h / 2) * b1);
      const [a3, b3] = f(x + (h / 2) * a2, v + (h / 2) * b2);
      const [a4, b4] = f(x + h * a3, v + h * b3);
      x += (h / 6) * (a1 + 2 * a2 + 2 * a3 + a4);
      v += (h / 6) * (b1 + 2 * b2 + 2 * b3 + b4);
    }
  }
  return { t, theta };
}
