/** A pendulum that still swings when the shot fires: of known phase the impulse comes out whole, of unknown phase each record takes its share of doubt. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { jumpFromPeak, jumpToMaximum, swingOfPhase } from '../../src/pendulum/alreadySwinging.ts';
import { sentence } from '../../src/problems/sentences.ts';
import { proposeColumns } from '../../src/readings/columns.ts';
import { readTable } from '../../src/readings/table.ts';
import { reduce } from '../../src/reduction/reduce.ts';
import { recordId, type Choices, type Session } from '../../src/session/session.ts';
import { exactly, rowId, sessionOf, type SessionParts } from '../fixtures/session.ts';
import { nextTurningPoint } from '../pendulum/odexDriven.ts';
import { stateAt, turningPointAfter, type Pendulum } from '../pendulum/odexSwing.ts';

/** Point bob 100 g at 300 mm, read as an angle. */
const FREQUENCY = Math.sqrt(9.80665 / 0.3);
const FACTOR = 0.1 * 0.3 * 0.3 * FREQUENCY;
const ARM = 0.28;
const IMPULSE = 8e-3;
const JUMP = (IMPULSE * ARM) / FACTOR;

function bench(first: number, entries: SessionParts['entries'], choices: Partial<Choices> = {}): Session {
  return sessionOf({
    choices: { form: 'pointBob', readingWay: 'angle', dampingWay: 'ratio', ...choices },
    entries: { bobMass: '100 g', bobDistance: '300 mm', gravity: '9.80665 m/s²', leverArm: '280 mm', division: '0.0001 mrad', ...entries },
    rows: [{ rest: 0, first: exactly(1e3 * first) }], readingUnit: 'mrad',
  });
}

/** First maximum after a shot that adds JUMP to a swing, ω_d t after its maximum A₀ on the side of the thrust. */
function struckWhileSwinging(pendulum: Pendulum, amplitude: number, phase: number): number {
  const nu = Math.sqrt(1 - pendulum.zeta ** 2);
  const before = phase === 0 ? { time: 0, angle: amplitude, speed: 0 } : stateAt(pendulum, { time: 0, angle: amplitude, speed: 0 }, phase / nu);
  return turningPointAfter(pendulum, { ...before, speed: before.speed + JUMP }).angle;
}

describe('a swing before the shot, its phase known', () => {
  it.each([0, 0.02, 0.1, 0.4])('gives the impulse of a small swing back at every phase, damped with ζ = %f', (zeta) => {
    for (const degrees of [0, 35, 90, 150, 200, 290, 400]) {
      const first = struckWhileSwinging({ zeta, p: 0 }, 0.012, (degrees * Math.PI) / 180);
      const r = reduce(bench(first, { dampingRatio: exactly(zeta), backgroundSwing: '12 mrad', backgroundPhase: `${degrees}°` }, { swingForm: 'smallAngle' }), null);
      expect(Math.abs(r.run!.mean.value / IMPULSE - 1)).toBeLessThan(1e-9);
    }
  });

  it('gives the impulse of the full pendulum back, to A₀²/16 of the phase', () => {
    for (const degrees of [60, 120, 240]) {
      const first = struckWhileSwinging({ zeta: 0.03, p: 1 }, 0.03, (degrees * Math.PI) / 180);
      const r = reduce(bench(first, { dampingRatio: '0.03', backgroundSwing: '30 mrad', backgroundPhase: `${degrees}°` }), null);
      expect(Math.abs(r.run!.mean.value / IMPULSE - 1)).toBeLessThan(4 * (0.03 ** 2 / 16) * (0.03 / JUMP) * ((degrees * Math.PI) / 180));
    }
  });

  it('is told as well by the time since its last maximum', () => {
    const seconds = 0.31;
    const zeta = 0.05;
    const first = struckWhileSwinging({ zeta, p: 0 }, 0.012, FREQUENCY * seconds * Math.sqrt(1 - zeta ** 2));
    const r = reduce(bench(first, { dampingRatio: '0.05', backgroundSwing: '12 mrad', backgroundTime: '0.31 s' }, { swingForm: 'smallAngle' }), null);
    expect(Math.abs(r.run!.mean.value / IMPULSE - 1)).toBeLessThan(1e-9);
  });

  it('is in the chain and, with amplitude and phase, in the budget; unknown phase and the switch stay', () => {
    const first = struckWhileSwinging({ zeta: 0.02, p: 1 }, 0.012, 1);
    const typed = { dampingRatio: '0.02', backgroundSwing: '12 ± 0.5 mrad', backgroundPhase: '57.3 ± 5°' } as const;
    const known = reduce(bench(first, typed), rowId(1)).explained!;
    expect(known.chain.map(({ id }) => id)).toEqual(expect.arrayContaining(['before.deflection', 'before.speed']));
    expect(known.budget!.lines.filter(({ contribution }) => contribution !== 0).map(({ label }) => label)).toEqual(expect.arrayContaining(['Swing before the shot', 'Phase of that swing at the shot']));
    const unknown = reduce(bench(first, { dampingRatio: '0.02', backgroundSwing: '12 mrad' }), rowId(1)).explained!;
    expect(unknown.chain.map(({ id }) => id)).toContain('before.amplitude');
    expect(unknown.budget!.of.u).toBeGreaterThan(2 * known.budget!.of.u);
    const off = reduce(bench(first, typed, { correctBackground: false }), rowId(1)).explained!;
    expect(off.chain.map(({ id }) => id).filter((id) => id.startsWith('before.'))).toEqual([]);
  });

  it('moves the impulse by as much as half-differences in amplitude and phase say', () => {
    const first = struckWhileSwinging({ zeta: 0.02, p: 1 }, 0.012, 1);
    const at = (amplitude: number, degrees: number): number => reduce(bench(first, { dampingRatio: '0.02', backgroundSwing: `${amplitude} mrad`, backgroundPhase: `${degrees}°` }), null).run!.mean.value;
    const u = Math.hypot((at(12.5, 57) - at(11.5, 57)) / 2, (at(12, 62) - at(12, 52)) / 2);
    const bare = reduce(bench(first, { dampingRatio: '0.02', backgroundSwing: '12 mrad', backgroundPhase: '57°' }), null).run!.mean.u;
    const whole = reduce(bench(first, { dampingRatio: '0.02', backgroundSwing: '12 ± 0.5 mrad', backgroundPhase: '57 ± 5°' }), null).run!.mean.u;
    // The two are taken through the state at the shot, half-difference of half-difference.
    expect(Math.sqrt(whole ** 2 - bare ** 2) / u).toBeCloseTo(1, 2);
  });

  it('that no shot along the thrust fits says so', () => {
    const r = reduce(bench(0.005, { dampingRatio: '0.02', backgroundSwing: '12 mrad', backgroundPhase: '0°' }), null);
    expect(r.run).toBeNull();
    expect(r.problems.find(({ code }) => code === 'background-not-this-shot')!.place.record).toBe(rowId(1));
    const off = reduce(bench(0.05, { dampingRatio: '0.02', backgroundSwing: '900 mm' }, { readingWay: 'rulerAtTip' }), null);
    expect(off.problems.map(({ code }) => code)).not.toContain('background-not-this-shot');
  });

  it('has no phase on a pendulum damped critically, nor one to use on a film', () => {
    const r = reduce(bench(0.05, { dampingRatio: '1.5', backgroundSwing: '2 mrad', backgroundPhase: '10°' }), null);
    expect(r.problems.filter(({ code }) => code === 'background-phase-not-used').map(sentence)).toEqual([expect.stringContaining('no phase')]);
    expect(r.run).not.toBeNull();
  });
});

describe('a swing before the shot read at each shot', () => {
  const zeta = 0.03;
  const SHOTS = [[12, 0.1], [8, 0.37], [15, 0.62]] as const;
  /** One row a shot, its own swing before it and the time since that swing's maximum. */
  function logged(times: 'timed' | 'untimed', entries: SessionParts['entries'] = {}): Session {
    const rows = SHOTS.map(([amplitude, seconds], i) => {
      const first = struckWhileSwinging({ zeta, p: 0 }, 1e-3 * amplitude, FREQUENCY * seconds * Math.sqrt(1 - zeta ** 2));
      return `${i + 1};0;${exactly(1e3 * first)};${amplitude};${times === 'timed' ? seconds : ''}`;
    });
    const text = ['Shot;Rest (mrad);First swing (mrad);Swing before (mrad);Time since maximum (s)', ...rows, '4;0;40;0;'].join('\n');
    const base = bench(0.05, { dampingRatio: exactly(zeta), ...entries }, { swingForm: 'smallAngle' });
    return { ...base, sheets: [{ ...base.sheets[0]!, text, columns: proposeColumns(readTable(text)) }] };
  }

  it('is told from its header, and gives each shot’s impulse back', () => {
    const session = logged('timed');
    expect(session.sheets[0]!.columns.map(({ role, unit }) => [role, unit])).toEqual([['label', ''], ['rest', 'mrad'], ['firstSwing', 'mrad'], ['swingBefore', 'mrad'], ['timeSinceMaximum', 's']]);
    const r = reduce(session, recordId('s1', 2));
    for (const record of r.records.slice(0, 3)) expect(Math.abs(record.impulseBit!.value / IMPULSE - 1)).toBeLessThan(1e-9);
    expect(r.explained!.chain.map(({ id }) => id)).toContain('before.deflection');
    expect(r.explained!.budget!.lines.map(({ label }) => label)).toEqual(expect.arrayContaining(['Swing before the shot', 'Time since the maximum before the shot']));
  });

  it('goes before the one typed for all shots; a shot from rest says 0', () => {
    const plain = reduce(logged('timed'), null).records.map(({ impulseBit }) => impulseBit!.value);
    const typed = reduce(logged('timed', { backgroundSwing: '20 mrad', backgroundPhase: '90°' }), null).records.map(({ impulseBit }) => impulseBit!.value);
    expect(typed).toEqual(plain);
    expect(reduce(logged('timed'), recordId('s1', 5)).explained!.chain.map(({ id }) => id).filter((id) => id.startsWith('before.'))).toEqual([]);
  });

  it('without its time is of unknown phase, by each shot’s own amplitude', () => {
    const r = reduce(logged('untimed'), recordId('s1', 2));
    expect(r.explained!.chain.find(({ id }) => id === 'before.amplitude')!.stated.value).toBeCloseTo(0.012, 12);
    // K A₀/(√2 r_t) of each, but for how the bias goes with it.
    r.records.slice(0, 3).forEach(({ ownU }, i) => expect(ownU / ((FACTOR * 1e-3 * SHOTS[i]![0]) / (Math.SQRT2 * ARM))).toBeCloseTo(1, 1));
  });

  it('in another kind of unit costs that column alone', () => {
    const session = logged('timed');
    const sheet = session.sheets[0]!;
    const r = reduce({ ...session, sheets: [{ ...sheet, columns: sheet.columns.map((column) => (column.role === 'swingBefore' ? { ...column, unit: 'mm' } : column)) }] }, null);
    expect(r.problems.filter(({ code }) => code === 'reading-wrong-kind-of-unit')).toHaveLength(4);
    expect(r.run!.n).toBe(4);
  });
});

describe('the jump to a first maximum', () => {
  it('is that of the small viscous swing without the time of its maximum', () => {
    fc.assert(
      fc.property(fc.double({ min: -0.3, max: 0.3, noNaN: true }), fc.double({ min: -0.3, max: 0.3, noNaN: true }), fc.double({ min: 0, max: 0.6, noNaN: true }), (deflection, speed, ratio) => {
        const top = nextTurningPoint((_, angle, v) => -2 * ratio * v - angle, { time: 0, angle: deflection, speed: speed + 1 }, 1);
        const found = jumpToMaximum(top.angle, { deflection, speed }, { ratio, quadratic: 0, friction: 0 }, 0);
        expect(Math.abs(found - 1)).toBeLessThan(1e-10);
        expect(Math.abs(found - jumpFromPeak({ peak: top.angle, peakDelay: top.time, dampingRatio: ratio }, { deflection, speed }))).toBeLessThan(1e-9);
      }),
      { numRuns: 40 },
    );
  });

  it('holds for the full pendulum with all three dampings', () => {
    const damping = { ratio: 0.03, quadratic: 0.4, friction: 0.004 };
    for (const [deflection, speed] of [[0.1, -0.2], [-0.3, 0.1], [-0.2, -0.2]] as const) {
      const top = nextTurningPoint((_, angle, v) => -2 * damping.ratio * v - damping.quadratic * Math.abs(v) * v - damping.friction * Math.sign(v) - 0.7 * Math.sin(angle) - 0.3 * angle, { time: 0, angle: deflection, speed: speed + 1 }, 1);
      expect(Math.abs(jumpToMaximum(top.angle, { deflection, speed }, damping, 0.7) - 1)).toBeLessThan(1e-9);
    }
    expect(() => jumpToMaximum(0.1, { deflection: 0.2, speed: 0 }, damping, 1)).toThrow(RangeError);
    expect(() => jumpToMaximum(0.1, { deflection: -0.2, speed: 0 }, { ratio: 0, quadratic: 0, friction: 0 }, 1)).toThrow(RangeError);
    expect(() => swingOfPhase({ amplitude: 1, phase: 0, ratio: 1 })).toThrow(RangeError);
  });
});
