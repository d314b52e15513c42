/** Hammers of known impulse: the printed check, and two pendulums that meet, integrated through the contact. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  carriedByOwnPivot, carriedByPendulum, compactImpulse, compactSpeed, compoundImpulse, compoundSpeed, hammerInertia, pulseFullness, pushOf, sharedAngularImpulse, stuckAngularImpulse,
} from '../../src/pendulum/hammer.ts';
import { PULSE_SHAPES, type PulseShape } from '../../src/pendulum/pulse.ts';

const G = 9.80665;
const DEGREE = Math.PI / 180;

describe('the hammer of methods 1.10: 12 g on 0.25 m, 8° in, 3° back', () => {
  const HAMMER = { g: G, mass: 0.012, length: 0.25 } as const;
  // Printed to six figures.
  const PRINTED = 5e-7;

  it('comes at 0.218446 m/s and goes back at 0.081975 m/s', () => {
    expect(Math.abs(compactSpeed({ ...HAMMER, angle: 8 * DEGREE }) - 0.218446)).toBeLessThan(PRINTED);
    expect(Math.abs(compactSpeed({ ...HAMMER, angle: 3 * DEGREE }) - 0.081975)).toBeLessThan(PRINTED);
  });

  it('gave 3.60505 mN·s, and 2.62136 if its rebound were left out', () => {
    expect(Math.abs(compactImpulse({ ...HAMMER, drawn: 8 * DEGREE, rebound: 3 * DEGREE, follow: 0 }) - 3.60505e-3)).toBeLessThan(5e-9);
    expect(Math.abs(compactImpulse({ ...HAMMER, drawn: 8 * DEGREE, rebound: 0, follow: 0 }) - 2.62136e-3)).toBeLessThan(5e-9);
  });

  it('that goes on by 3° gave less than one that stops, by as much as one that comes back gave more', () => {
    const by = (rebound: number, follow: number): number => compactImpulse({ ...HAMMER, drawn: 8 * DEGREE, rebound, follow });
    expect(by(0, 0) - by(0, 3 * DEGREE)).toBeCloseTo(by(3 * DEGREE, 0) - by(0, 0), 15);
  });
});

const between = (min: number, max: number): fc.Arbitrary<number> => fc.double({ min, max, noNaN: true });

it('a compound hammer with all its mass at the contact is the compact one', () => {
  fc.assert(fc.property(between(1e-3, 1), between(0.05, 1), between(1e-3, 1.5), between(1e-3, 1.5), (mass, length, drawn, rebound) => {
    const blow = { drawn, rebound, follow: 0 };
    const compact = compactImpulse({ g: G, mass, length, ...blow });
    const compound = compoundImpulse({ g: G, mass, centre: length, inertia: mass * length * length, contact: length, ...blow });
    expect(Math.abs(compound - compact)).toBeLessThanOrEqual(1e-14 * Math.abs(compact));
  }));
});

it.each([91, -91, 180, NaN])('a hammer angle of %f° is refused', (degrees) => {
  expect(() => compactSpeed({ g: G, length: 0.2, angle: degrees * DEGREE })).toThrow(RangeError);
  expect(() => compoundSpeed({ g: G, mass: 0.1, centre: 0.2, inertia: 5e-3, angle: degrees * DEGREE })).toThrow(RangeError);
});

it('90° itself is the largest angle taken: v = √(2 g l)', () => {
  expect(compactSpeed({ g: G, length: 0.3, angle: Math.PI / 2 })).toBeCloseTo(Math.sqrt(2 * G * 0.3), 14);
});

/** Two pendulums about level axes, hanging plumb when they touch: x = l_c φ_h − r_h θ is how far the hammer is into the pendulum. */
interface Meeting {
  readonly hammer: { readonly inertia: number; readonly moment: number; readonly contact: number };
  readonly pendulum: { readonly inertia: number; readonly stiffness: number; readonly radius: number };
  /** Contact spring, N/m, and dashpot, N·s/m; `sticks`: it pulls as well as pushes. */
  readonly spring: number;
  readonly dashpot: number;
  readonly sticks: boolean;
}
type State = readonly [hammer: number, hammerSpeed: number, angle: number, speed: number];

function slope({ hammer, pendulum, spring, dashpot, sticks }: Meeting, [h, hv, a, av]: State): State {
  const into = hammer.contact * h - pendulum.radius * a;
  const closing = hammer.contact * hv - pendulum.radius * av;
  const push = into > 0 || sticks ? spring * into + dashpot * closing : 0;
  const force = sticks ? push : Math.max(0, push);
  return [hv, (-hammer.moment * G * Math.sin(h) - force * hammer.contact) / hammer.inertia, av, (-pendulum.stiffness * Math.sin(a) + force * pendulum.radius) / pendulum.inertia];
}

/** One step of the classical Runge–Kutta method. */
function step(meeting: Meeting, y: State, dt: number): State {
  const add = (a: State, b: State, k: number): State => [a[0] + k * b[0], a[1] + k * b[1], a[2] + k * b[2], a[3] + k * b[3]];
  const k1 = slope(meeting, y);
  const k2 = slope(meeting, add(y, k1, dt / 2));
  const k3 = slope(meeting, add(y, k2, dt / 2));
  const k4 = slope(meeting, add(y, k3, dt));
  return [0, 1, 2, 3].map((i) => y[i]! + (dt / 6) * (k1[i]! + 2 * k2[i]! + 2 * k3[i]! + k4[i]!)) as unknown as State;
}

/** The hammer alone, from rest at −φ to plumb. */
function fall(meeting: Meeting, drawn: number): State {
  const alone = { ...meeting, spring: 0, dashpot: 0, sticks: false };
  let y: State = [-drawn, 0, 0, 0];
  while (y[0] < 0) y = step(alone, y, 1e-4);
  // Newton in time onto plumb.
  for (let i = 0; i < 4; i++) y = step(alone, y, -y[0] / y[1]);
  return y;
}

/** Angle at which a hammer alone turns back, from here. */
function turn(meeting: Meeting, from: State): number {
  const alone = { ...meeting, spring: 0, dashpot: 0, sticks: false };
  const sense = Math.sign(from[1]);
  let y: State = [from[0], from[1], 0, 0];
  while (y[1] * sense > 0) y = step(alone, y, 1e-4);
  for (let i = 0; i < 4; i++) y = step(alone, y, -y[1] / slope(alone, y)[1]);
  return y[0];
}

/** Uniform rod of 60 g and 0.3 m with a 20 g tip, which strikes at 0.29 m. */
const ROD = { mass: 0.08, centre: (0.06 * 0.15 + 0.02 * 0.3) / 0.08, inertia: (0.06 * 0.3 ** 2) / 3 + 0.02 * 0.3 ** 2, contact: 0.29 } as const;
const HAMMER = { inertia: ROD.inertia, moment: ROD.mass * ROD.centre, contact: ROD.contact };
const CONTACT_STEP = 2e-7;

describe('a compound hammer that meets a pendulum, integrated through the contact', () => {
  const cases = [
    { name: 'comes back from a heavy pendulum', inertia: 0.02, dashpot: 0, back: true },
    { name: 'comes back little where the contact is soft and lossy', inertia: 0.02, dashpot: 30, back: true },
    { name: 'goes on through with a light pendulum', inertia: 4e-4, dashpot: 0, back: false },
  ] as const;

  it.each(cases)('$name: its angles tell what the pendulum got', ({ inertia, dashpot, back }) => {
    const meeting: Meeting = { hammer: HAMMER, pendulum: { inertia, stiffness: 0.3, radius: 0.25 }, spring: 2e6, dashpot, sticks: false };
    const drawn = 12 * DEGREE;
    let y = fall(meeting, drawn);
    expect(Math.abs(y[1] / compoundSpeed({ ...ROD, g: G, angle: drawn }) - 1)).toBeLessThan(1e-10);
    do y = step(meeting, y, CONTACT_STEP);
    while (HAMMER.contact * y[0] - meeting.pendulum.radius * y[2] > 0);
    const end = turn(meeting, y);
    expect(end < 0).toBe(back);
    const impulse = compoundImpulse({ ...ROD, g: G, drawn, rebound: back ? -end : 0, follow: back ? 0 : end });
    const got = (inertia * y[3]) / meeting.pendulum.radius;
    // Gravity acts through the half millisecond of the contact as well, to that order.
    expect(Math.abs(impulse / got - 1)).toBeLessThan(2e-4);
  });
});

/** First maximum of both together, held by a stiff, well damped bond. */
function thrown(meeting: Meeting, start: State): number {
  let y = start;
  let t = 0;
  // Once the bond has settled, longer steps.
  while (y[3] > 0 || t < 1e-3) {
    const dt = 5e-6;
    y = step(meeting, y, dt);
    t += dt;
  }
  return y[2];
}

describe('a hammer that stays', () => {
  const PENDULUM = { inertia: 4e-3, stiffness: 0.15, radius: 0.22 } as const;

  it('on its own pivot: H over √(ΣJ Σκ) is the throw, with J_h(r_h/l_c)² and not m r_h²', () => {
    const meeting: Meeting = { hammer: HAMMER, pendulum: PENDULUM, spring: 2e6, dashpot: 150, sticks: true };
    const start = fall(meeting, 4 * DEGREE);
    const H = sharedAngularImpulse({ inertia: ROD.inertia, speed: start[1], radius: PENDULUM.radius, contact: ROD.contact });
    const add = carriedByOwnPivot({ ...ROD, radius: PENDULUM.radius, g: G });
    const first = thrown(meeting, start);
    const predicted = H / Math.sqrt((PENDULUM.inertia + add.inertia) * (PENDULUM.stiffness + add.stiffness));
    // Small-angle form at 5°: θ against 2 sin(θ/2) of gravity, 3e-4.
    expect(Math.abs((2 * Math.sin(first / 2)) / predicted - 1)).toBeLessThan(3e-4);
    const plain = carriedByPendulum({ mass: ROD.mass, radius: PENDULUM.radius, g: G });
    expect(Math.abs(H / Math.sqrt((PENDULUM.inertia + plain.inertia) * (PENDULUM.stiffness + plain.stiffness)) / first - 1)).toBeGreaterThan(0.02);
  });

  it('compact, on a thread as long as the arm: borne by the thread or by the pendulum it is the same', () => {
    const radius = 0.22;
    const own = carriedByOwnPivot({ mass: 0.01, centre: radius, inertia: 0.01 * radius ** 2, contact: radius, radius, g: G });
    const borne = carriedByPendulum({ mass: 0.01, radius, g: G });
    expect(own.inertia).toBeCloseTo(borne.inertia, 15);
    expect(own.stiffness).toBeCloseTo(borne.stiffness, 15);
    const speed = compactSpeed({ g: G, length: radius, angle: 0.1 });
    expect(sharedAngularImpulse({ inertia: 0.01 * radius ** 2, speed: speed / radius, radius, contact: radius })).toBeCloseTo(stuckAngularImpulse({ mass: 0.01, speed, radius }), 15);
  });

  it('on a longer thread it stiffens the pendulum less: m g r_h²/l', () => {
    const own = carriedByOwnPivot({ mass: 0.01, centre: 0.5, inertia: 0.01 * 0.25, contact: 0.5, radius: 0.2, g: G });
    expect(own.inertia).toBeCloseTo(0.01 * 0.04, 15);
    expect(own.stiffness).toBeCloseTo((0.01 * G * 0.04) / 0.5, 15);
  });
});

it('J_h by the timed period is that of a rod: T = 2π√(2L/3g)', () => {
  const [mass, L] = [0.06, 0.3];
  const period = 2 * Math.PI * Math.sqrt((2 * L) / (3 * G));
  expect(hammerInertia({ mass, centre: L / 2, period, g: G })).toBeCloseTo((mass * L * L) / 3, 15);
});

describe('a force held for a while', () => {
  const shapeOf: Readonly<Record<Exclude<PulseShape, 'exponential'>, (x: number) => number>> = {
    rectangular: () => 1, halfSine: (x) => Math.sin(Math.PI * x), triangle: (x) => 1 - Math.abs(2 * x - 1), versedSine: (x) => (1 - Math.cos(2 * Math.PI * x)) / 2,
  };

  it('has the fullness of its shape', () => {
    for (const [shape, f] of Object.entries(shapeOf)) {
      const n = 10_000;
      const sum = Array.from({ length: n }, (_, i) => f((i + 0.5) / n)).reduce((a, b) => a + b, 0) / n;
      expect(Math.abs(pulseFullness(shape as PulseShape) - sum)).toBeLessThan(1e-7);
    }
    expect(pulseFullness('exponential')).toBe(1);
  });

  it('throws the pendulum as far as the blow that is felt: integrated', () => {
    const [w, zeta, force, duration] = [6, 0.03, 0.02, 0.2];
    for (const [shape, f] of Object.entries(shapeOf)) {
      const push = pushOf({ shape: shape as PulseShape, force, duration, naturalFrequency: w, dampingRatio: zeta });
      if (push.status !== 'found') throw new Error(push.status);
      // Unit inertia and lever arm: θ'' + 2ζω θ' + ω² θ = F.
      let [t, x, v] = [0, 0, 0];
      const h = 1e-5;
      while (v >= 0) {
        const a = (time: number, x1: number, v1: number): number => (time < duration ? force * f(time / duration) : 0) - 2 * zeta * w * v1 - w * w * x1;
        const vMid = v + (h / 2) * a(t, x, v);
        const xMid = x + (h / 2) * v;
        [x, v] = [x + h * vMid, v + h * a(t + h / 2, xMid, vMid)];
        t += h;
      }
      const D = Math.exp((zeta * Math.acos(zeta)) / Math.sqrt(1 - zeta * zeta));
      expect(Math.abs((x * w * D) / push.felt - 1)).toBeLessThan(2e-4);
    }
  });

  it('of no length is no impulse, of more than half a period no tap', () => {
    for (const shape of PULSE_SHAPES) expect(pushOf({ shape, force: 1, duration: 0, naturalFrequency: 5, dampingRatio: 0.01 })).toEqual({ status: 'found', impulse: 0, felt: 0 });
    expect(pushOf({ shape: 'rectangular', force: 1, duration: 1, naturalFrequency: 5, dampingRatio: 0.01 }).status).toBe('peakInsidePulse');
  });
});
