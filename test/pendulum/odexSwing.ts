/** The full damped pendulum with flexure by ODEX (Hairer and Wanner's extrapolation code), an integrator that the project does not use. */
import { createRequire } from 'node:module';

/** What is used of the package; its own sources do not pass this project's strict type check. */
interface Solver {
  relativeTolerance: number;
  absoluteTolerance: number;
  maxStepSize: number;
  solve(
    derivative: (t: number, y: number[]) => number[],
    start: number,
    state: number[],
    end: number,
    seen?: (step: number, before: number, now: number, y: number[]) => boolean | undefined,
  ): { readonly y: number[]; readonly outcome: number };
}
const { Solver } = createRequire(import.meta.url)('odex') as { readonly Solver: new (unknowns: number) => Solver };
const CONVERGED = 0;

/** A pendulum in the time ω_n t: damping ratio ζ, gravity share p. */
export interface Pendulum {
  readonly zeta: number;
  readonly p: number;
}

/** Time ω_n t, angle in rad, angular velocity θ′/ω_n in rad. */
export interface State {
  readonly time: number;
  readonly angle: number;
  readonly speed: number;
}

export const atRest = (launch: number): State => ({ time: 0, angle: 0, speed: launch });

const acceleration = ({ zeta, p }: Pendulum, angle: number, speed: number): number => -2 * zeta * speed - p * Math.sin(angle) - (1 - p) * angle;

/** One step is short against a quarter swing, so that no turning point or crossing is stepped over. */
const LONGEST = 0.4;

function integrate(pendulum: Pendulum, from: State, end: number, stop?: (angle: number, speed: number) => boolean): State {
  const solver = new Solver(2);
  solver.relativeTolerance = 1e-14;
  solver.absoluteTolerance = 1e-15 * Math.max(Math.abs(from.angle), Math.abs(from.speed));
  solver.maxStepSize = LONGEST;
  let last: State = from;
  const result = solver.solve(
    (_, [angle, speed]) => [speed!, acceleration(pendulum, angle!, speed!)],
    from.time,
    [from.angle, from.speed],
    end,
    (step, _, time, [angle, speed]) => {
      last = { time, angle: angle!, speed: speed! };
      return step > 1 && stop?.(angle!, speed!) ? false : undefined;
    },
  );
  if (!stop && result.outcome !== CONVERGED) throw new Error(`ODEX did not reach ${end}`);
  return last;
}

/** The state at the time `end`. */
export const stateAt = (pendulum: Pendulum, from: State, end: number): State => integrate(pendulum, from, end);

/** Newton in time, each step integrated anew, onto the instant found by its first step past it. */
function settle(pendulum: Pendulum, near: State, step: (state: State) => number): State {
  let state = near;
  for (let i = 0; i < 6; i++) {
    const dt = step(state);
    if (Math.abs(dt) < 1e-15 * Math.max(1, state.time)) break;
    state = integrate(pendulum, state, state.time + dt);
  }
  return state;
}

/** The next instant of zero speed after `from`. */
export function turningPointAfter(pendulum: Pendulum, from: State): State {
  // At a turning point the speed is zero but for rounding: the way back is what counts there.
  const sense = Math.sign(Math.abs(from.speed) < 1e-9 * Math.abs(from.angle) ? -from.angle : from.speed);
  const past = integrate(pendulum, from, from.time + 400, (_, speed) => speed * sense < 0);
  return settle(pendulum, past, ({ angle, speed }) => -speed / acceleration(pendulum, angle, speed));
}

/** The next passage through rest after a turning point. */
export function crossingAfter(pendulum: Pendulum, from: State): State {
  const side = Math.sign(from.angle);
  const past = integrate(pendulum, from, from.time + 400, (angle) => angle * side < 0);
  return settle(pendulum, past, ({ angle, speed }) => -angle / speed);
}

/** Turning points 1 … count after a launch from rest. */
export function turningPoints(pendulum: Pendulum, launch: number, count: number): readonly State[] {
  const found: State[] = [];
  let state = atRest(launch);
  for (let i = 0; i < count; i++) found.push((state = turningPointAfter(pendulum, state)));
  return found;
}
