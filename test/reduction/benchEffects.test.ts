/** What to check at the bench, sized through the road for the rig of methods 1.18 (elastic and friction constants typical, from memory). */
import { describe, expect, it } from 'vitest';
import { BENCH_EFFECT_IDS, BENCH_EFFECT_WORDS, type BenchEffectId } from '../../src/problems/benchEffects.ts';
import { reduce } from '../../src/reduction/reduce.ts';
import type { BenchEffect } from '../../src/reduction/results.ts';
import type { EntryName } from '../../src/session/entries.ts';
import { emptySession, type Choices, type Entry, type Session } from '../../src/session/session.ts';
import { sessionOf } from '../fixtures/session.ts';

/** 36.7 g at 0.15 m, J 2.5e-3 kg·m², κ 0.054 N·m/rad, r_t 0.30 m; 41 µN·s throw it by 1.059 mrad. */
function rig(choices: Partial<Choices> = {}, entries: Readonly<Partial<Record<EntryName, string | Entry>>> = {}, more: { readonly voltage?: number; readonly swing?: string } = {}): Session {
  const swing = more.swing ?? '1.0587';
  const shot = { rest: '0', first: swing, ...(more.voltage === undefined ? {} : { voltage: more.voltage }) };
  return sessionOf({
    choices: { form: 'bodyOfParts', readingWay: 'angle', dampingWay: 'none', ...choices },
    entries: { leverArm: '300 ± 1 mm', gravity: '9.80665 m/s²', division: '0.0001 mrad', ...entries },
    parts: [{ mass: '36.7 ± 0.1 g', distance: '150 ± 0.3 mm', ownInertia: '1674250 ± 3000 g·mm²' }],
    readingUnit: 'mrad',
    rows: [shot, shot],
  });
}

const of = (session: Session): ReadonlyMap<BenchEffectId, BenchEffect> => new Map(reduce(session, null).benchEffects.map((effect) => [effect.id, effect]));
const at = (found: ReadonlyMap<BenchEffectId, BenchEffect>, id: BenchEffectId): BenchEffect => {
  const effect = found.get(id);
  if (!effect) throw new Error(`no ${id} among ${[...found.keys()].join(', ')}`);
  return effect;
};

describe('the rig of methods 1.18', () => {
  const found = of(rig());

  it('is thrown by 41 µN·s', () => expect(reduce(rig(), null).run!.mean.value * 1e6).toBeCloseTo(41, 1));

  it.each([
    ['leads', 56, 1e6, 0], ['earthField', 0.075, 1e6, 3], ['chargedArm', 0.22, 1e3, 2], ['pivotFriction', 33, 1e6, -1], ['tilt', 10, 1e6, 9], ['feedHose', 79, 1e6, 0],
  ] as const)('%s: %f in its unit', (id, size, factor, decimals) => {
    expect(at(found, id).size.value * factor).toBeCloseTo(size, decimals);
  });

  it.each([
    ['chargedArm', 0.21, 2], ['edgeRolling', 0.0013, 4], ['wires', 0.034, 3], ['tilt', 0.0094, 4], ['heatedBracket', 0.02, 2], ['plumeWander', 0.0333, 4],
  ] as const)('%s: %f of the impulse bit, the swing or the stiffness', (id, share, decimals) => {
    expect(at(found, id).share.value).toBeCloseTo(share, decimals);
  });

  it('lists the largest first, and says which could matter', () => {
    const parts = [...found.values()].map((effect) => effect.ofImpulse);
    expect(parts).toEqual([...parts].sort((a, b) => b - a));
    expect([...found.values()].filter((effect) => effect.matters).map((effect) => effect.id)).toContain('leads');
    const { mean } = reduce(rig(), null).run!;
    for (const effect of found.values()) expect(effect.matters).toBe(effect.ofImpulse > Math.min((0.2 * mean.u) / mean.value, 0.005));
  });

  it('says what was taken for want of a typed value', () => {
    expect(at(found, 'leads').taken.map(({ what }) => what)).toEqual(['capacitance', 'charge voltage', 'circuit of']);
    const typed = of(rig({}, { capacitance: '20 µF', leadResistance: '100 mΩ' }, { voltage: 1000 }));
    expect(at(typed, 'leads').taken).toEqual([]);
    // ½ L′ E/R with 10 J and 0.1 Ω.
    expect(at(typed, 'leads').size.value).toBeCloseTo((0.5 * 0.5e-6 * 10) / 0.1, 12);
  });
});

describe('what a stiffness beside κ does to the impulse bit', () => {
  const wires = (choices: Partial<Choices>, entries = {}): number => {
    const effect = at(of(rig(choices, entries)), 'wires');
    return effect.ofImpulse / effect.share.value;
  };
  it('is half of it by masses alone, all by route A, nothing by route B', () => {
    expect(wires({ route: 'masses' })).toBeCloseTo(0.5, 12);
    expect(wires({ route: 'massesAndPeriod' }, { period: '1.352 s' })).toBeCloseTo(1, 12);
    expect(wires({ route: 'inertiaAndPeriod' }, { period: '1.352 s' })).toBe(0);
  });
});

describe('each bench has its own', () => {
  it('a target has no leads, and may be charged', () => {
    const found = of(rig({ plume: 'caught', reported: 'delivered' }));
    expect([found.has('leads'), found.has('feedHose'), found.has('chargedTarget')]).toEqual([false, false, true]);
  });

  it('a torsion stand has no pivot friction and does not follow a tilt, but its axis does', () => {
    const found = of(rig({ restoring: 'flexureAlone' }, { flexureStiffness: '54 mN·m/rad' }));
    expect([found.has('pivotFriction'), found.has('tilt'), found.has('axisTilt')]).toEqual([false, false, true]);
    // All of κ is flexure, and 10 K take 0.4 % of it.
    expect(at(found, 'warmedFlexure').share.value).toBeLessThan(0);
  });

  it('a bob on two wires may yaw, a plate on a light strip is a double pendulum', () => {
    const swung = { leverArm: '300 mm', gravity: '9.81 m/s²', division: '0.001 mm', readingRadius: '330 mm' };
    const rows = [{ rest: '0', first: '1.0' }, { rest: '0', first: '1.0' }];
    const bob = sessionOf({ choices: { form: 'pointBob', dampingWay: 'none' }, entries: { ...swung, bobMass: '50 g', bobDistance: '300 mm' }, rows });
    expect(at(of(bob), 'yaw').ofImpulse).toBeCloseTo(0.1, 12);
    const plate = (radius: string): Session => sessionOf({
      choices: { form: 'stripWithPlate', dampingWay: 'none' }, entries: { ...swung, readingRadius: radius, stripMass: '1 g', stripLength: '300 mm', plateMass: '20 g', plateDistance: '300 mm' }, rows,
    });
    expect(at(of(plate('330 mm')), 'doublePendulum').size.value).toBe(0.26);
    expect(at(of(plate('300 mm')), 'doublePendulum').size.value).toBe(0.02);
  });

  it('a body known by its period alone is sized without its mass', () => {
    const r = of(sessionOf({
      choices: { form: 'periodAndStiffness', readingWay: 'angle', dampingWay: 'none' },
      entries: { period: '1.352 s', staticStiffness: '54 mN·m/rad', leverArm: '300 mm', gravity: '9.81 m/s²', division: '0.001 mrad' }, readingUnit: 'mrad', rows: [{ rest: '0', first: '1.06' }],
    }));
    expect([r.has('tilt'), r.has('wires'), r.has('pivotFriction')]).toEqual([true, true, false]);
  });

  it('nothing is sized without a run mean', () => expect(reduce(emptySession(), null).benchEffects).toEqual([]));
});

it('everything has a name, what it does, and what to do about it', () => {
  for (const id of BENCH_EFFECT_IDS) {
    const { name, does, toDo } = BENCH_EFFECT_WORDS[id];
    expect([name, does, toDo].every((words) => words.length > 5)).toBe(true);
    expect(toDo).toMatch(/^[A-Z].*\.$/);
  }
});
