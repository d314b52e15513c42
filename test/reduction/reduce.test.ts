import { describe, expect, it } from 'vitest';
import { reduce } from '../../src/reduction/reduce.ts';
import { emptySession, entry, type Session } from '../../src/session/session.ts';

/** Rigid strip 1.000 g, 0.300 m, struck at 0.280 m, 5°: methods 5 item 15 (derived there). */
function strip(): Session {
  const base = emptySession();
  return {
    ...base,
    entries: {
      stripMass: entry('1.000 g'), stripLength: entry('0.300 m'), leverArm: entry('0.280 m'), gravity: entry('9.80665 m/s²'), readingRadius: entry('300 mm'),
    },
    choices: { ...base.choices, readingWay: 'angle', dampingWay: 'none' },
    sheets: [{
      id: 's1', name: 'angles.csv', origin: 'file', text: 'shot;rest (deg);first swing (deg)\n1;0;5\n', sha256: '',
      columns: [{ role: 'label', unit: '', by: 'person' }, { role: 'rest', unit: '°', by: 'person' }, { role: 'firstSwing', unit: '°', by: 'person' }],
      kindOfAll: null, edits: {}, added: [],
    }],
  };
}

describe('the road', () => {
  it('gives the impulse bit of the worked rigid strip by the full pendulum and by the small angle', () => {
    const r = reduce(strip(), 's1/2');
    expect(r.problems.filter((p) => p.weight === 'stops')).toEqual([]);
    const shot = r.records[0]!;
    expect(shot.full!.value).toBeCloseTo(65.4513e-6, 10);
    expect(shot.smallAngle!.value).toBeCloseTo(65.4720e-6, 10);
    expect(r.configurations.shots!.period.value).toBeCloseTo(0.897294, 6);
    console.info(JSON.stringify(r, null, 1).slice(0, 6000));
  });
});
