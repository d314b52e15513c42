import { describe, expect, it } from 'vitest';
import { filmMass, readingOfClampedFilm, stiffnessNumber } from '../../src/pendulum/filmStrip.ts';
import { reduce } from '../../src/reduction/reduce.ts';
import { emptySession, entry, type Session } from '../../src/session/session.ts';

/** 25 µm polyimide, 19 mm wide, 200 mm free: S = 0.0012 (methods 1.2). */
const FILM = { thickness: 25e-6, width: 19e-3, length: 0.2, density: 1420, modulus: 2.5e9, gravity: 9.80665 } as const;
const ZONE = { zoneFrom: 0.8, zoneTo: 1 } as const;
const IMPULSE = 4e-6;

function filmSession(calibration: 'geometry' | 'taps', text: string): Session {
  const base = emptySession();
  return {
    ...base,
    entries: {
      filmThickness: entry('25 µm'), filmWidth: entry('19 mm'), filmLength: entry('200 mm'), filmDensity: entry('1420 kg/m³'), filmModulus: entry('2.5 GPa'),
      zoneFrom: entry('160 mm'), zoneTo: entry('200 mm'), leverArm: entry('180 mm'), readingRadius: entry('200 mm'), gravity: entry('9.80665 m/s²'), dampingRatio: entry('0.02'), tapLeverArm: entry('180 mm'),
      division: entry('0.001 mm'),
    },
    choices: { ...base.choices, form: 'filmStrip', dampingWay: 'ratio', calibration },
    sheets: [{
      id: 's1', name: 'film.csv', origin: 'file', text, sha256: '',
      columns: [{ role: 'label', unit: '', by: 'person' }, { role: 'rest', unit: 'mm', by: 'person' }, { role: 'firstSwing', unit: 'mm', by: 'person' }, { role: 'tapImpulse', unit: 'µN·s', by: 'person' }],
      kindOfAll: null, edits: {}, added: [],
    }],
  };
}

describe('a hanging film', () => {
  const reading = readingOfClampedFilm({ stiffnessNumber: stiffnessNumber(FILM), dampingRatio: 0.02, ...ZONE, plateRatio: 0, readAt: 1, impulse: IMPULSE, mass: filmMass(FILM), length: FILM.length, gravity: FILM.gravity });
  const row = `1;0;${(1e3 * reading).toFixed(6)};`;

  it('moves millimetres for a few µN·s (common practice, no source)', () => {
    expect(reading).toBeGreaterThan(1e-3);
    expect(reading).toBeLessThan(0.05);
  });

  it('gives its impulse bit back by its modes, within what the swing’s arc adds', () => {
    const r = reduce(filmSession('geometry', `no;rest;first;tap\n${row}\n`), null);
    expect(r.problems.filter((p) => p.weight === 'stops')).toEqual([]);
    const bit = r.records[0]!.impulseBit!;
    expect(Math.abs(bit.value / IMPULSE - 1)).toBeLessThan(5e-3);
    expect(r.film!.regime).toBe('limp');
    expect(bit.u / bit.value).toBeGreaterThan(0.03);
    expect(r.problems.map((p) => p.code)).toContain('film-model-alone');
  });

  it('is freed from its model by taps in place that strike what the plume strikes', () => {
    const asPlume = filmSession('taps', `no;rest;first;tap\nT1;0;${(1e3 * reading).toFixed(6)};4\n${row}\n`);
    const r = reduce({ ...asPlume, entries: { ...asPlume.entries, tapContact: entry('40 mm') } }, null);
    const bit = r.records[1]!.impulseBit!;
    expect(Math.abs(bit.value / IMPULSE - 1)).toBeLessThan(1e-9);
    expect(bit.u / bit.value).toBeLessThan(0.01);
    expect(r.problems.map((p) => p.code)).not.toContain('film-model-alone');
    expect(Math.abs(r.film!.contact!.change.value - 1)).toBeLessThan(1e-9);
  });

  it('tapped on a shorter stretch than the plume’s, or elsewhere, gives its impulse bit back all the same', () => {
    for (const [arm, contact] of [[180, 2], [150, 6]] as const) {
      const zone = { zoneFrom: (arm - contact / 2) / 200, zoneTo: (arm + contact / 2) / 200 };
      const tapped = readingOfClampedFilm({ stiffnessNumber: stiffnessNumber(FILM), dampingRatio: 0.02, ...zone, plateRatio: 0, readAt: 1, impulse: IMPULSE, mass: filmMass(FILM), length: FILM.length, gravity: FILM.gravity });
      const base = filmSession('taps', `no;rest;first;tap\nT1;0;${(1e3 * tapped).toFixed(6)};4\n${row}\n`);
      const r = reduce({ ...base, entries: { ...base.entries, tapLeverArm: entry(`${arm} mm`), tapContact: entry(`${contact} mm`) } }, null);
      const bit = r.records[1]!.impulseBit!;
      expect(Math.abs(bit.value / IMPULSE - 1)).toBeLessThan(1e-3);
      expect(Math.abs(r.film!.contact!.change.value - 1)).toBeGreaterThan(0.002);
      expect(bit.u / bit.value).toBeGreaterThan(Math.abs(r.film!.contact!.change.value - 1) / 2);
    }
  });

  it('takes a tap’s contact as 2 % of its length where nothing is typed, and what that leaves open stands in the budget', () => {
    const r = reduce(filmSession('taps', `no;rest;first;tap\nT1;0;${(1e3 * reading).toFixed(6)};4\n${row}\n`), 's1/3');
    expect(r.film!.contact).toMatchObject({ typed: false });
    expect(r.film!.contact!.length).toBeCloseTo(4e-3, 12);
    const { lines: all, of } = r.explained!.budget!;
    const lines = all.filter(({ contribution }) => Math.abs(contribution) > 1e-9 * of.u).map(({ label }) => label);
    expect(lines).toEqual(expect.arrayContaining(['Length of the tap’s contact (2 % of the film taken)', 'Tap and plume on different stretches of the film (judgement)']));
    expect(lines).not.toContain('Model of the film (judgement)');
  });

  it('has its own things to check at the bench: charge, tilt, a plume that strikes elsewhere, and a plate below it', () => {
    const bare = reduce(filmSession('geometry', `no;rest;first;tap\n${row}\n`), null).benchEffects;
    expect(bare.map(({ id }) => id).sort()).toEqual(['chargedTarget', 'plumeWander', 'tilt']);
    // 10 mm along a film struck over its lowest fifth, by the slope of its own coefficient.
    const wander = bare.find(({ id }) => id === 'plumeWander')!.ofImpulse;
    const at = (shift: number): number => readingOfClampedFilm({ stiffnessNumber: stiffnessNumber(FILM), dampingRatio: 0.02, zoneFrom: 0.8 + shift, zoneTo: 1 + shift, plateRatio: 0, readAt: 1, impulse: IMPULSE, mass: filmMass(FILM), length: FILM.length, gravity: FILM.gravity });
    expect(wander / (Math.log(at(0.05) / at(-0.05)) / 2)).toBeCloseTo(1, 6);
    // 1500 V on 40 mm × 19 mm, 50 mm from what stands opposite: ½ ε₀ A V²/s² = 3.0 µN.
    expect(bare.find(({ id }) => id === 'chargedTarget')!.size.value).toBeGreaterThan(1e-4);
    const session = filmSession('geometry', `no;rest;first;tap\n${row}\n`);
    expect(reduce({ ...session, entries: { ...session.entries, plateMass: entry('0.4 g') } }, null).benchEffects.map(({ id }) => id)).toContain('doublePendulum');
  });

  it('with a heavy plate read just beside its centre leaves no more to judgement than the plate’s turn', () => {
    const session = filmSession('geometry', `no;rest;first;tap\n${row}\n`);
    const at = (radius: string): number => reduce({ ...session, entries: { ...session.entries, plateMass: entry('1.4 g'), readingRadius: entry(radius) } }, null).film!.spread;
    expect(at('200 mm')).toBeLessThan(0.01);
    expect(at('201 mm')).toBeLessThan(0.012);
    expect(at('199 mm')).toBeLessThan(0.012);
    expect(at('204 mm')).toBeGreaterThan(at('201 mm'));
  });

  it('tapped with a mass that did not hang there while firing says why there is no figure', () => {
    const base = filmSession('taps', `no;rest;first;tap\nT1;0;${(1e3 * reading).toFixed(6)};4\n${row}\n`);
    const r = reduce({ ...base, entries: { ...base.entries, calibrationMass: entry('1 g'), calibrationMassDistance: entry('180 mm') }, choices: { ...base.choices, calibrationMassHung: 'taps' } }, null);
    expect(r.run).toBeNull();
    expect(r.problems.map((p) => p.code)).toContain('change-needs-the-body');
  });
});
