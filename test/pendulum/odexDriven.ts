/** A pendulum with any damping and any force by ODEX (Hairer and Wanner's extrapolation code), an integrator that the project does not use. */
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
  ): { readonly y: number[] };
}
const { Solver } = createRequire(import.meta.url)('odex') as { readonly Solver: new (unknowns: number) => Solver };

export interface State {
  readonly time: number;
  readonly angle: number;
  readonly speed: number;
}
/** θ″ in the time ω_n t. */
export type Acceleration = (time: number, angle: number, speed: number) => number;

const LONGEST = 0.3;

function integrate(acceleration: Acceleration, from: State, end: number, stop?: (speed: number) => boolean): State {
  const solver = new Solver(2);
  solver.relativeTolerance = 1e-13;
  solver.absoluteTolerance = 1e-16;
  solver.maxStepSize = LONGEST;
  let last = from;
  solver.solve(
    (time, [angle, speed]) => [speed!, acceleration(time, angle!, speed!)],
    from.time,
    [from.angle, from.speed],
    end,
    (step, _, time, [angle, speed]) => {
      last = { time, angle: angle!, speed: speed! };
      return step > 1 && stop?.(speed!) ? false : undefined;
    },
  );
  return last;
}

export const stateAt = (acceleration: Acceleration, from: State, end: number): State => integrate(acceleration, from, end);

/** The next turning point of a motion whose speed has the sign of `sense` until then. */
export function nextTurningPoint(acceleration: Acceleration, from: State, sense: 1 | -1): State {
  let state = integrate(acceleration, from, from.time + 100, (speed) => speed * sense < 0);
  for (let i = 0; i < 6; i++) {
    const dt = -state.speed / acceleration(state.time, state.angle, state.speed);
    if (Math.abs(dt) < 1e-15) break;
    state = integrate(acceleration, state, state.time + dt);
  }
  return state;
}
