/** A small swing driven by a torque by ODEX, an integrator that the project does not use: time in ω_n t. */
import { nextTurningPoint as turningPoint, stateAt, type State } from './odexDriven.ts';

export const atRest: State = { time: 0, angle: 0, speed: 0 };

export interface Driven {
  readonly zeta: number;
  /** Torque over κ, rad, by ω_n t. */
  readonly torque: (time: number) => number;
  /** End of the torque. */
  readonly until: number;
}

/** The first turning point after the torque has ended. */
export function nextTurningPoint({ zeta, torque, until }: Driven, from: State): State {
  const after = stateAt((time, angle, speed) => torque(time) - 2 * zeta * speed - angle, from, until);
  return turningPoint((_, angle, speed) => -2 * zeta * speed - angle, { ...after, time: until }, 1);
}
