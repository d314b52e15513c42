/** Every way of reading through the whole road: an impulse in, its swing as that way would show it, the impulse out. */
import { describe, expect, it } from 'vitest';
import { turningPoints } from '../pendulum/odexSwing.ts';
import { READING_WAYS, WAYS, type ReadingWay } from '../../src/readings/ways.ts';
import { reduce } from '../../src/reduction/reduce.ts';
import { emptySession, entry, type Choices, type Session } from '../../src/session/session.ts';

const G = 9.80665;
const FACTOR = Math.sqrt(0.1 * 0.3 * 0.3 * 0.1 * G * 0.3);
const ARM = 0.28;
const IMPULSE = 0.03;
const ZETA = 0.02;
/** First maximum of the damped pendulum, by an integrator that the road does not use. */
const [FIRST, RETURN] = turningPoints({ zeta: ZETA, p: 1 }, (IMPULSE * ARM) / FACTOR, 2).map(({ angle }) => angle) as [number, number];

const TEXTS = {
  readingRadius: '400 mm', rulerHeight: '380 mm', screenDistance: '1200 mm', screenTilt: '5°', beamIncidence: '10°', mirrorRadius: '30 mm', windowThickness: '10 mm', windowIndex: '1.52',
  pixelScale: '4 px/mm', cameraYaw: '6°', cameraToPlane: '900 mm', pivotAcross: '320 px', pivotDown: '40 px', sensorHeight: '300 mm', faceOffset: '15 mm', countsPerTurn: '20000 counts',
} as const;
const STAND = {
  readingRadius: 0.4, rulerHeight: 0.38, screenDistance: 1.2, screenTilt: Math.PI / 36, beamIncidence: Math.PI / 18, mirrorRadius: 0.03, beamOutOfPlane: 0, windowThickness: 0.01, windowIndex: 1.52, screenShape: 0,
  pixelScale: 4000, cameraYaw: Math.PI / 30, cameraToPlane: 0.9, pivotAcross: 320, pivotDown: 40, sensorHeight: 0.3, faceOffset: 0.015, countsPerTurn: 20000,
};
const UNIT = { length: 'm', angle: 'rad', pixel: 'px', count: 'counts' } as const;

function session(way: ReadingWay, rows: readonly string[], choices: Partial<Choices> = {}): Session {
  const base = emptySession();
  const unit = UNIT[WAYS[way].reads];
  const stand = Object.fromEntries(Object.entries(TEXTS).map(([name, text]) => [name, entry(text)]));
  return {
    ...base,
    entries: { bobMass: entry('100 g'), bobDistance: entry('300 mm'), gravity: entry(`${G} m/s²`), leverArm: entry('280 mm'), dampingRatio: entry(String(ZETA)), division: entry(`1e-9 ${unit}`), ...stand },
    choices: { ...base.choices, form: 'pointBob', readingWay: way, dampingWay: 'ratio', ...choices },
    sheets: [{
      id: 's1', name: 'way.csv', origin: 'file', text: ['kind;rest;first;rest down;first down;time', ...rows].join('\n'), sha256: '', decimal: '.',
      columns: [
        { role: 'kind', unit: '', by: 'person' }, { role: 'rest', unit, by: 'person' }, { role: 'firstSwing', unit, by: 'person' }, { role: 'restDown', unit: 'px', by: 'person' },
        { role: 'firstSwingDown', unit: 'px', by: 'person' }, { role: 'time', unit: 's', by: 'person' },
      ],
      kindOfAll: null, edits: {}, added: [],
    }],
  };
}

const bitOf = (s: Session): number => {
  const r = reduce(s, null);
  expect(r.problems.filter((p) => p.weight === 'stops').map((p) => [p.code, p.facts])).toEqual([]);
  return r.records.find((record) => record.kind === 'shot')!.impulseBit!.value / IMPULSE;
};

describe('an impulse', () => {
  it.each(READING_WAYS.filter((way) => way !== 'cameraPivotMarker'))('comes back to 1e-8 read as %s', (way) => {
    const rest = 0.0123;
    expect(bitOf(session(way, [`shot;${rest};${rest + WAYS[way].reading(FIRST, STAND)};;;`]))).toBeCloseTo(1, 8);
  });

  it('comes back from a picture of pivot and marker, its rows counted downward', () => {
    const at = (theta: number): readonly [number, number] => [320 + 600 * Math.sin(theta), 40 + 600 * Math.cos(theta)];
    const [[x0, y0], [x1, y1]] = [at(0.01), at(0.01 + FIRST)];
    expect(bitOf(session('cameraPivotMarker', [`shot;${x0};${x1};${y0};${y1};`]))).toBeCloseTo(1, 8);
  });

  it.each(['rulerAtTip', 'laserSpot', 'angle'] as const)('comes back from the way from side to side, to the O(ζθ²) that the small swing’s q leaves out: %s', (way) => {
    const total = WAYS[way].reading(FIRST, STAND) - WAYS[way].reading(RETURN, STAND);
    expect(Math.abs(bitOf(session(way, [`shot;;${total};;;`], { swingMeasured: 'sideToSide' })) - 1)).toBeLessThan(ZETA * FIRST ** 2);
  });

  it('comes back with its rest interpolated between two zeros, in time', () => {
    const x = 0.4 * Math.sin(FIRST);
    const rows = ['zero;0.0100;;;;0', `shot;;${0.0103 + x};;;30`, 'zero;0.0110;;;;100'];
    expect(bitOf(session('rulerAtTip', rows, { zeroTaken: 'interpolated' }))).toBeCloseTo(1, 8);
    expect(Math.abs(bitOf(session('rulerAtTip', rows)) - 1)).toBeGreaterThan(1e-3);
  });
});

it('a column in the wrong kind of unit gives its problem and no number', () => {
  const s = session('rulerAtTip', ['shot;0;0.1;;;']);
  const [sheet] = s.sheets;
  const r = reduce({ ...s, sheets: [{ ...sheet!, columns: sheet!.columns.map((column) => (column.role === 'firstSwing' ? { ...column, unit: '°' } : column)) }] }, null);
  expect(r.problems.map((p) => p.code)).toContain('reading-wrong-kind-of-unit');
  expect(r.records[0]!.impulseBit).toBeNull();
});

describe('a rest before and a rest after', () => {
  const after = (rows: readonly string[], choices: Partial<Choices> = {}): Session => {
    const s = session('rulerAtTip', [], choices);
    const [sheet] = s.sheets;
    return {
      ...s, entries: { ...s.entries, division: entry('0.5 mm') },
      sheets: [{ ...sheet!, text: ['rest;first;after', ...rows].join('\n'), kindOfAll: 'shot', columns: [{ role: 'rest', unit: 'mm', by: 'person' }, { role: 'firstSwing', unit: 'mm', by: 'person' }, { role: 'restAfter', unit: 'mm', by: 'person' }] }],
    };
  };
  const x = 400 * Math.sin(FIRST);

  it('leave the one before as the rest, and tell of a move', () => {
    const r = reduce(after([`10;${10 + x};13`]), null);
    expect(r.records[0]!.impulseBit!.value / IMPULSE).toBeCloseTo(1, 8);
    expect(r.problems.find((p) => p.code === 'record-zero-moved')!.facts).toMatchObject({ move: expect.closeTo(3, 9), unit: 'mm' });
    expect(reduce(after([`10;${10 + x};10.5`]), null).problems.map((p) => p.code)).not.toContain('record-zero-moved');
  });

  it('as their mean carry half the move as limits of that record alone', () => {
    const [before, mean] = (['before', 'mean'] as const).map((restTaken) => reduce(after([`10;${10 + x};12`], { restTaken }), null).records[0]!);
    expect(mean!.angle!.value).toBeLessThan(before!.angle!.value);
    // u of the two rests’ mean (each 0.5 mm/√12) and 1 mm/√3, over R.
    const division = 0.5 / Math.sqrt(12);
    const expected = Math.hypot(division, division / Math.SQRT2, 1 / Math.sqrt(3)) / 400 / Math.cos(FIRST);
    expect(mean!.angle!.u / expected).toBeCloseTo(1, 2);
  });
});

it('damping comes from turning points in a picture of pivot and marker', () => {
  const turns = turningPoints({ zeta: ZETA, p: 1 }, (IMPULSE * ARM) / FACTOR, 4).map(({ angle }) => angle);
  const at = (theta: number): string => `${320 + 600 * Math.sin(theta)};${40 + 600 * Math.cos(theta)}`;
  const s = session('cameraPivotMarker', [], { dampingWay: 'swings' });
  const [sheet] = s.sheets;
  const pair = (across: 'rest' | 'firstSwing' | 'nextSwing', down: 'restDown' | 'firstSwingDown' | 'nextSwingDown') => [{ role: across, unit: 'px', by: 'person' }, { role: down, unit: 'px', by: 'person' }] as const;
  const columns = [...pair('rest', 'restDown'), ...pair('firstSwing', 'firstSwingDown'), ...turns.slice(1).flatMap(() => pair('nextSwing', 'nextSwingDown'))];
  const r = reduce({ ...s, sheets: [{ ...sheet!, text: `${columns.map(({ role }) => role).join(';')}\n${[0, ...turns].map(at).join(';')}\n`, kindOfAll: 'shot', columns }] }, null);
  expect(r.damping!.ratio.value).toBeCloseTo(ZETA, 6);
  expect(r.records[0]!.impulseBit!.value / IMPULSE).toBeCloseTo(1, 6);
});

it('the distortion of the lens is common to all readings of a picture', () => {
  const s = session('cameraMarker', [1, 0.9, 1.1].map((f) => `shot;0;${WAYS.cameraMarker.reading(FIRST * f, STAND)};;;`));
  const u = (text: string): number => { const { mean } = reduce({ ...s, entries: { ...s.entries, lensDistortion: entry(text) } }, null).run!; return mean.u / mean.value; };
  expect(Math.sqrt(u('1 %') ** 2 - u('0 %') ** 2)).toBeCloseTo(0.01, 3);
});
