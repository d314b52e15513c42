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

  it('is freed from its model by taps in place', () => {
    const r = reduce(filmSession('taps', `no;rest;first;tap\nT1;0;${(1e3 * reading).toFixed(6)};4\n${row}\n`), null);
    const bit = r.records[1]!.impulseBit!;
    expect(bit.value).toBeCloseTo(IMPULSE, 12);
    expect(bit.u / bit.value).toBeLessThan(0.01);
    expect(r.problems.map((p) => p.code)).not.toContain('film-model-alone');
  });

  it('tapped with a mass that did not hang there while firing says why there is no figure', () => {
    const base = filmSession('taps', `no;rest;first;tap\nT1;0;${(1e3 * reading).toFixed(6)};4\n${row}\n`);
    const r = reduce({ ...base, entries: { ...base.entries, calibrationMass: entry('1 g'), calibrationMassDistance: entry('180 mm') }, choices: { ...base.choices, calibrationMassHung: 'taps' } }, null);
    expect(r.run).toBeNull();
    expect(r.problems.map((p) => p.code)).toContain('change-needs-the-body');
  });
});
