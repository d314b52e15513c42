/** Swings integrated by ODEX from a known impulse come back to it, for every form, reading, damping and calibration. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { reduce } from '../../src/reduction/reduce.ts';
import type { EntryName } from '../../src/session/entries.ts';
import type { Choices, Session } from '../../src/session/session.ts';
import { exactly, sessionOf, type PartTexts, type Row } from '../fixtures/session.ts';
import { turningPoints } from '../pendulum/odexSwing.ts';
import { bodyOf, carriedTo, factorOf, readingAt, shareOf, swingsAfter, type Body, type Piece, type Scale } from './truth.ts';

/** Relative. The integrators agree to 1e-13; sixteen digits of reading and rest leave some 1e-12 of a small throw. */
const TOLERANCE = 1e-8;
/** ms · for a slow machine; the property itself is not timed. */
const LONG = 60_000;
const DAMPING = ['none', 'ratio', 'decrement', 'swings of the records', 'free-swing record', 'typed free swing'] as const;

const between = (min: number, max: number): fc.Arbitrary<number> => fc.double({ min, max, noNaN: true });
const bench = fc.record({
  form: fc.constantFrom('pointBob', 'uniformStrip', 'bodyOfParts'),
  mass: between(2e-4, 0.5),
  length: between(0.1, 1),
  arm: between(0.3, 1),
  tapArm: between(0.3, 1),
  /** Part of the stiffness that is the flexure's. */
  flexure: fc.oneof(fc.constant(0), between(0.05, 0.9)),
  g: between(9.78, 9.84),
  way: fc.constantFrom('rulerAtTip', 'rulerUnderLine', 'laserSpot', 'angle'),
  factor: fc.oneof(fc.constant(1), between(0.9, 1.1)),
  backward: fc.boolean(),
  /** null: each record's own rest is taken as the plumb point. */
  restAngle: fc.option(between(-0.03, 0.03)),
  damping: fc.constantFrom(...DAMPING),
  ratio: between(0.0005, 0.25),
  /** First swing as a part of the widest that the scale shows. */
  size: fc.oneof(between(0.002, 0.05), between(0.05, 0.9)),
  turning: fc.integer({ min: 2, max: 6 }),
  hung: fc.constantFrom('never', 'taps', 'shots', 'always'),
  extra: fc.record({ m: between(0.05, 1), r: between(-0.3, 1), own: fc.oneof(fc.constant(0), between(0.001, 0.1)) }),
  hammer: between(0.9, 1.1),
  route: fc.constantFrom('masses', 'massesAndPeriod', 'inertiaAndPeriod'),
  timedAs: fc.constantFrom('shots', 'taps'),
  timedSize: between(0.01, 1.5),
});
type Bench = typeof bench extends fc.Arbitrary<infer T> ? T : never;

/** Widest swing that each way shows with a rest 0.03 rad off. */
const WIDEST = { rulerAtTip: 1.4, rulerUnderLine: 1.4, laserSpot: 0.7, angle: 2.2 } as const;

function piecesOf(b: Bench): { pieces: readonly Piece[]; entries: Partial<Record<EntryName, string>>; parts: readonly PartTexts[] } {
  const { mass: m, length: L } = b;
  if (b.form === 'pointBob') return { pieces: [{ m, r: L, own: 0 }], entries: { bobMass: `${exactly(m)} kg`, bobDistance: `${exactly(L)} m` }, parts: [] };
  if (b.form === 'uniformStrip') return { pieces: [{ m, r: L / 2, own: (m * L * L) / 12 }], entries: { stripMass: `${exactly(m)} kg`, stripLength: `${exactly(L)} m` }, parts: [] };
  const pieces = [{ m, r: L / 2, own: (m * L * L) / 12 }, { m: m / 3, r: 0.9 * L, own: 0 }, { m: m / 5, r: -0.2 * L, own: (m * L * L) / 1000 }];
  const parts = pieces.map((p) => ({ mass: `${exactly(p.m)} kg`, distance: `${exactly(p.r)} m`, ...(p.own === 0 ? {} : { ownInertia: `${exactly(p.own)} kg·m²` }) }));
  return { pieces, entries: {}, parts };
}

/** Cycle of the body as timed, s, by ODEX: from one turning point to the next but one; and the amplitude there. Damped swings are timed small. */
function timed(body: Body, launch: number): { period: number; amplitude: number } {
  const [first, , third] = turningPoints({ zeta: body.ratio, p: shareOf(body) }, launch, 3);
  return { period: (third!.time - first!.time) * Math.sqrt(body.inertia / body.stiffness), amplitude: first!.angle };
}
const SMALL = 1e-5;

function made(b: Bench): { session: Session; impulse: number; tap: number; bodies: Readonly<Record<'shots' | 'taps', Body>> } {
  const { pieces, entries, parts } = piecesOf(b);
  const weight = bodyOf(pieces, b.g, 0, 0).weight;
  const flexure = (weight * b.flexure) / (1 - b.flexure);
  const zeta = b.damping === 'none' ? 0 : b.ratio;
  const extra: Piece = { m: b.extra.m * b.mass, r: b.extra.r * b.length, own: b.extra.own * b.mass * b.length ** 2 };
  const hangsIn = (which: 'shots' | 'taps'): boolean => b.hung === which || b.hung === 'always';
  const shots = bodyOf([...pieces, ...(hangsIn('shots') ? [extra] : [])], b.g, flexure, zeta);
  const taps = carriedTo(bodyOf([...pieces, ...(hangsIn('taps') ? [extra] : [])], b.g, flexure, 0), shots);
  const bodies = { shots, taps };

  const restAngle = b.restAngle ?? 0;
  const scale: Scale = { way: b.way, far: 0.8 * b.length, factor: b.factor, mark: b.way === 'angle' ? 0.2 : 0.118, backward: b.backward };
  const seen = (angle: number): number => readingAt(scale, restAngle + angle);
  const arm = b.arm * b.length;
  const tapArm = b.tapArm * b.length;
  // As launches: a first swing never is wider than its launch.
  const impulse = (b.size * WIDEST[b.way] * factorOf(shots)) / arm;
  const tap = (0.7 * b.size * WIDEST[b.way] * factorOf(taps)) / tapArm;
  const shotSwings = swingsAfter(shots, impulse * arm, b.turning).map(seen);
  const tapSwings = swingsAfter(taps, tap * tapArm, b.turning).map(seen);
  const inRecords = b.damping === 'swings of the records';
  const free = swingsAfter(shots, 0.8 * b.size * WIDEST[b.way] * factorOf(shots), Math.max(3, b.turning)).map(seen);
  const row = (kind: 'shot' | 'tap', swings: readonly number[], tapImpulse?: number): Row => ({
    kind, rest: seen(0), first: swings[0]!, ...(inRecords ? { next: swings.slice(1) } : {}), ...(tapImpulse === undefined ? {} : { tapImpulse }),
  });
  const rows: Row[] = [
    ...(b.damping === 'free-swing record' ? [{ kind: 'freeSwing', first: free[0]!, next: free.slice(1) } as const] : []),
    row('tap', tapSwings, tap / b.hammer), row('shot', shotSwings),
  ];
  const delta = (2 * Math.PI * zeta) / Math.sqrt(1 - zeta * zeta);
  const unit = b.way === 'angle' ? 'rad' : 'm';
  const farEntry = { rulerAtTip: 'readingRadius', rulerUnderLine: 'rulerHeight', laserSpot: 'screenDistance', angle: null }[b.way] as EntryName | null;
  const dampingWay: Choices['dampingWay'] = b.damping === 'none' || b.damping === 'ratio' || b.damping === 'decrement' ? b.damping : 'swings';
  const timing = timed(bodies[b.timedAs], zeta === 0 ? b.timedSize : SMALL);
  return {
    session: sessionOf({
      choices: {
        form: b.form, readingWay: b.way, scaleRunsBackward: b.backward, dampingWay, route: b.route, periodTimedAs: b.timedAs, calibrationMassHung: b.hung,
      },
      entries: {
        ...entries, gravity: `${exactly(b.g)} m/s²`, leverArm: `${exactly(arm)} m`, tapLeverArm: `${exactly(tapArm)} m`, hammerFactor: exactly(b.hammer), scaleFactor: exactly(b.factor),
        ...(flexure > 0 ? { flexureStiffness: `${exactly(flexure)} N·m/rad` } : {}),
        ...(farEntry ? { [farEntry]: `${exactly(scale.far)} m` } : {}),
        ...(b.restAngle !== null && b.way !== 'angle' ? { scaleMark: `${exactly(scale.mark)} m` } : {}),
        ...(b.damping === 'ratio' ? { dampingRatio: exactly(zeta) } : b.damping === 'decrement' ? { logDecrement: exactly(delta) } : {}),
        ...(b.hung === 'never' ? {} : {
          calibrationMass: `${exactly(extra.m)} kg`, calibrationMassDistance: `${exactly(extra.r)} m`, ...(extra.own > 0 ? { calibrationMassInertia: `${exactly(extra.own)} kg·m²` } : {}),
        }),
        period: `${exactly(timing.period)} s`, periodAmplitude: `${exactly(timing.amplitude)} rad`,
      },
      parts, rows, readingUnit: unit, impulseUnit: 'N·s',
      ...(b.damping === 'typed free swing' ? { freeSwing: `${free.map(exactly).join(' ')} ${unit}` } : {}),
    }),
    impulse, tap, bodies,
  };
}

const off = (found: number | undefined, truth: number): number => Math.abs((found ?? Number.POSITIVE_INFINITY) / truth - 1);

describe('a swing integrated from a known impulse', () => {
  it('gives the impulse back, by geometry and by taps, for every form, reading, damping, calibration mass and route', () => {
    fc.assert(
      fc.property(bench, (b) => {
        const { session, impulse, tap, bodies } = made(b);
        const r = reduce(session, null);
        expect(r.problems.filter((p) => p.weight === 'stops')).toEqual([]);
        const shot = r.records.find((record) => record.kind === 'shot')!;
        const struck = r.records.find((record) => record.kind === 'tap')!;
        const gaps = {
          geometry: off(shot.byGeometry?.value, impulse),
          taps: off(shot.byTaps?.value, impulse),
          tapByGeometry: off(struck.byGeometry?.value, tap),
          tapByTaps: off(struck.byTaps?.value, tap),
          run: off(r.run?.mean.value, impulse),
          factor: off(r.calibrations.taps?.factor.value, factorOf(bodies.shots)),
          asTaken: off(r.calibrations.taps?.asTaken.value, factorOf(bodies.taps)),
          period: off(r.periodCheck?.measured.value, r.periodCheck?.predicted.value ?? 0),
        };
        for (const [what, gap] of Object.entries(gaps)) if (!(gap < TOLERANCE)) throw new Error(`${what} is off by ${gap}`);
      }),
      { numRuns: 500 },
    );
  }, LONG);
});
