/** Sessions of an invented bench with a known truth: what is typed is off by errors drawn from what is stated of it. */
import type { EntryName } from '../../src/session/entries.ts';
import { entry, type Choices, type Entry, type Session } from '../../src/session/session.ts';
import { exactly, sessionOf, type PartTexts, type Row } from '../fixtures/session.ts';
import { bodyOf, carriedTo, factorOf, readingAt, swingsAfter, type Body, type Piece } from './truth.ts';

/** Numbers of one stream: Mulberry32 (32 bits a draw, from memory), normals by Box and Muller. */
export class Draws {
  private state: number;
  constructor(seed: number) {
    this.state = seed;
  }

  /** In (0, 1). */
  uniform(): number {
    this.state = (this.state + 0x6d2b79f5) | 0;
    let t = this.state;
    t = Math.imul(t ^ (t >>> 15), t | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return (((t ^ (t >>> 14)) >>> 0) + 0.5) / 2 ** 32;
  }

  normal(): number {
    return Math.sqrt(-2 * Math.log(this.uniform())) * Math.cos(2 * Math.PI * this.uniform());
  }

  /** Rectangular in ±1. */
  limits(): number {
    return 2 * this.uniform() - 1;
  }

  whole(from: number, to: number): number {
    return from + Math.floor(this.uniform() * (to - from + 1));
  }
}

export interface Scenario {
  readonly choices: Partial<Choices>;
  /** Mean impulse bit, N·s, and shot-to-shot standard deviation as a part of it. */
  readonly mean: number;
  readonly scatter: number;
  /** Rest readings wander by this much from one record to the next, mm (rectangular limits). */
  readonly restWander: number;
  /** mm. */
  readonly division: number;
  readonly eye: number;
  /** Turning points read after the first swing. */
  readonly further: number;
  readonly shots: readonly [number, number];
  readonly taps: number;
  /** A rest is read at zeros only, one before every so many shots; 0: every record has its own. */
  readonly zeroEvery: number;
}

const G = 9.8094;
const PIECES: readonly Piece[] = [{ m: 0.0184, r: 0.2, own: 245300e-9 }, { m: 0.0062, r: 0.38, own: 0 }];
const EXTRA: Piece = { m: 0.005, r: 0.3, own: 40e-9 };
const RATIO = 0.012;
const [ARM, TAP_ARM, RADIUS] = [0.38, 0.33, 0.402];
const PERIOD_AMPLITUDE = 0.05;

const SHOTS: Body = bodyOf(PIECES, G, 0, RATIO);
const TAPS: Body = carriedTo(bodyOf([...PIECES, EXTRA], G, 0, 0), SHOTS);

/** Turning points over the launch angle by ODEX at a few launches, and Lagrange's polynomial between them (to 1e-12). */
function swingTable(body: Body, count: number): (angularImpulse: number) => number[] {
  const K = factorOf(body);
  const nodes = Array.from({ length: 9 }, (_, i) => 0.002 + 0.03 * i).map((launch) => ({ launch, ratios: swingsAfter(body, launch * K, count).map((angle) => angle / launch) }));
  return (angularImpulse) => {
    const launch = angularImpulse / K;
    const weights = nodes.map((a) => nodes.reduce((w, b) => (a === b ? w : (w * (launch - b.launch)) / (a.launch - b.launch)), 1));
    return Array.from({ length: count }, (_, k) => launch * nodes.reduce((sum, node, i) => sum + weights[i]! * node.ratios[k]!, 0));
  };
}
const tables = new Map<number, Readonly<Record<'shots' | 'taps', (angularImpulse: number) => number[]>>>();
function swingsOf(count: number): Readonly<Record<'shots' | 'taps', (angularImpulse: number) => number[]>> {
  let found = tables.get(count);
  if (!found) tables.set(count, (found = { shots: swingTable(SHOTS, count), taps: swingTable(TAPS, count) }));
  return found;
}

export interface Simulated {
  readonly session: Session;
  /** True impulse bit of the first shot, N·s. */
  readonly firstShot: number;
  readonly firstShotRow: number;
}

export function simulate(scenario: Scenario, seed: number): Simulated {
  const draws = new Draws(seed);
  for (let i = 0; i < 5; i++) draws.uniform();
  /** Typed with ±u: a normal error of u. */
  const normal = (truth: number, u: number, unit: string): Entry => entry(`${exactly(truth + u * draws.normal())} ± ${exactly(u)} ${unit}`);
  const limits = (truth: number, a: number, unit: string): Entry => entry(`${exactly(truth + a * draws.limits())} ± ${exactly(a)} ${unit}`, 'limits');

  const hammer = 1 + 0.01 * draws.normal();
  // T/T₀ = √(1/(1 − ζ²)) (1 + A²/16 …); the series is exact enough at 0.05 rad (methods 1.5).
  const period = ((2 * Math.PI) / Math.sqrt(SHOTS.stiffness / SHOTS.inertia) / Math.sqrt(1 - RATIO ** 2)) * (1 + PERIOD_AMPLITUDE ** 2 / 16 + (11 * PERIOD_AMPLITUDE ** 4) / 3072);
  const entries: Partial<Record<EntryName, Entry>> = {
    leverArm: limits(ARM, 0.002, 'm'), tapLeverArm: limits(TAP_ARM, 0.001, 'm'), readingRadius: limits(RADIUS, 0.0005, 'm'), scaleFactor: limits(1, 0.001, ''),
    gravity: normal(G, 0.0002, 'm/s²'), period: normal(period, 0.002, 's'), periodAmplitude: entry(`${PERIOD_AMPLITUDE} rad`),
    calibrationMass: normal(EXTRA.m, 1e-5, 'kg'), calibrationMassDistance: limits(EXTRA.r, 0.0005, 'm'), calibrationMassInertia: entry(`${exactly(EXTRA.own)} kg·m²`),
    division: entry(`${scenario.division} mm`), readingSpread: entry(`${scenario.eye} mm`), hammerFactor: entry('1 ± 2 %', 'expanded', '2'), tapSpread: entry('1 %'),
  };
  const parts: PartTexts[] = PIECES.map((p) => ({ mass: normal(p.m, 1e-4, 'kg'), distance: limits(p.r, 0.0005, 'm'), ...(p.own > 0 ? { ownInertia: normal(p.own, 7e-7, 'kg·m²') } : {}) }));

  const count = 1 + scenario.further;
  const swings = swingsOf(count);
  const middle = 118 + scenario.division * draws.uniform();
  const read = (mm: number): number => Math.round((mm + scenario.eye * draws.normal()) / scenario.division) * scenario.division;
  const seen = (rest: number, angle: number): number => read(readingAt({ way: 'rulerAtTip', far: RADIUS * 1000, factor: 1, mark: rest, backward: false }, angle));
  const row = (kind: 'shot' | 'tap', angles: readonly number[], rest: number, withRest: boolean, tapImpulse?: number): Row => {
    const [first, ...next] = angles.map((angle) => seen(rest, angle));
    return { kind, ...(withRest ? { rest: read(rest) } : {}), first: first!, next, ...(tapImpulse === undefined ? {} : { tapImpulse }) };
  };
  const wander = (): number => middle + scenario.restWander * draws.limits();

  const rows: Row[] = [];
  for (let i = 0; i < scenario.taps; i++) {
    const stated = 0.6e-3 + (1.8e-3 * (i + 0.5)) / scenario.taps;
    const struck = hammer * stated * (1 + 0.01 * draws.normal());
    rows.push(row('tap', swings.taps(struck * TAP_ARM), wander(), true, stated));
  }
  let firstShot: number | null = null;
  let firstShotRow = 0;
  const shots = draws.whole(...scenario.shots);
  let rest = wander();
  for (let i = 0; i < shots; i++) {
    const apart = scenario.zeroEvery > 0;
    if (!apart) rest = wander();
    else if (i % scenario.zeroEvery === 0) {
      rest = wander();
      rows.push({ kind: 'zero', rest: read(rest) });
    }
    const truth = scenario.mean * (1 + scenario.scatter * draws.normal());
    rows.push(row('shot', swings.shots(truth * ARM), rest, !apart));
    if (firstShot === null) [firstShot, firstShotRow] = [truth, rows.length];
  }
  return {
    session: sessionOf({ choices: { form: 'bodyOfParts', calibrationMassHung: 'taps', ...scenario.choices }, entries, parts, rows, impulseUnit: 'N·s' }),
    firstShot: firstShot!, firstShotRow,
  };
}
