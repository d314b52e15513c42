import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { CHOICE_VALUES } from '../../../src/session/session.ts';
import { layDrawing } from '../../../src/page/bench/layDrawing.ts';
import type { BenchLengths, DrawnEntry } from '../../../src/page/bench/layDrawing.ts';

const bench = (lengths: Partial<Record<DrawnEntry, number>>, over: Partial<BenchLengths> = {}): BenchLengths => ({
  form: 'uniformStrip', readingWay: 'rulerAtTip', restoring: 'gravity', screenShape: 'parallel', plume: 'carried', beam: { tilt: 0, incidence: 0, outOfPlane: 0, window: 0 }, hasPlate: false, mass: () => null, hung: 'never', parts: [], throwAngle: null, length: (name) => lengths[name] ?? null, ...over,
});
const lineOf = (drawing: ReturnType<typeof layDrawing>, entry: DrawnEntry) => {
  const found = drawing.lines.find((line) => line.entry === entry);
  if (found === undefined) throw new Error(`${entry} is not drawn`);
  return found;
};

describe('the drawing to scale', () => {
  test('all lengths are drawn to one scale', () => {
    const drawing = layDrawing(bench({ stripLength: 0.4, leverArm: 0.3, readingRadius: 0.38, tapLeverArm: 0.2 }));
    const scale = drawing.bodyEnd / 0.4;
    expect(lineOf(drawing, 'leverArm').y / scale).toBeCloseTo(0.3, 12);
    expect(lineOf(drawing, 'readingRadius').y / scale).toBeCloseTo(0.38, 12);
    expect(lineOf(drawing, 'tapLeverArm').y / scale).toBeCloseTo(0.2, 12);
    expect(drawing.scaleBar.px / drawing.scaleBar.metres).toBeCloseTo(scale, 9);
    expect(drawing.words.find((word) => word.id === 'centre')?.y).toBeCloseTo(0.2 * scale, 9);
  });

  test('a longer lever arm moves the thrust down the drawing, and the drawing follows any one length', () => {
    const short = layDrawing(bench({ stripLength: 0.4, leverArm: 0.2 }));
    const long = layDrawing(bench({ stripLength: 0.4, leverArm: 0.35 }));
    expect(lineOf(long, 'leverArm').y).toBeGreaterThan(lineOf(short, 'leverArm').y);
  });

  test('the largest throw stands at its true angle, and the reading mark where the ruler is read', () => {
    const atTip = layDrawing(bench({ stripLength: 0.4, readingRadius: 0.4 }, { throwAngle: -0.3 }));
    expect(atTip.angle).toBe(0.3);
    expect(atTip.ruler?.readingX).toBeCloseTo(atTip.bodyEnd * Math.sin(0.3), 9);
    const underLine = layDrawing(bench({ stripLength: 0.4, rulerHeight: 0.5 }, { readingWay: 'rulerUnderLine', throwAngle: 0.3 }));
    expect(underLine.ruler?.readingX).toBeCloseTo((underLine.ruler?.y ?? 0) * Math.tan(0.3), 9);
  });

  test('with nothing typed there is still a pendulum, marked as assumed', () => {
    const drawing = layDrawing(bench({}));
    expect(drawing.bodyAssumed).toBe(true);
    expect(drawing.lines.every((line) => line.assumed && Number.isFinite(line.y))).toBe(true);
  });

  test('parts above the pivot lift the drawing, and the centre of mass is that of the parts', () => {
    const parts = [{ name: 'bob', mass: 0.03, distance: 0.4 }, { name: 'counterweight', mass: 0.01, distance: -0.1 }];
    const drawing = layDrawing(bench({}, { form: 'bodyOfParts', parts }));
    const scale = drawing.bodyEnd / 0.4;
    expect(drawing.bodyTop).toBeCloseTo(-0.1 * scale, 9);
    // (0.03·0.4 − 0.01·0.1)/0.04 = 0.275, by hand.
    expect(drawing.words.find((word) => word.id === 'centre')?.y).toBeCloseTo(0.275 * scale, 9);
  });

  test('words at the side never stand on one another', () => {
    const drawing = layDrawing(bench({ stripLength: 0.4, leverArm: 0.2, tapLeverArm: 0.201, calibrationMassDistance: 0.199 }, { hung: 'taps' }));
    const heights = drawing.words.map((word) => word.wordY).toSorted((a, b) => a - b);
    expect(heights.every((height, index) => index === 0 || height - (heights[index - 1] ?? 0) >= 17)).toBe(true);
  });

  test('a laser spot moves by twice the throw', () => {
    const drawing = layDrawing(bench({ stripLength: 0.4 }, { readingWay: 'laserSpot', throwAngle: 0.1 }));
    expect(drawing.ruler).toBeNull();
    expect((drawing.laser?.spot.y ?? 0) / -(drawing.laser?.screenX ?? 1)).toBeCloseTo(Math.tan(0.2), 12);
  });
});

describe('every stand and way of reading', () => {
  const finite = (value: unknown): boolean => {
    if (typeof value === 'number') return Number.isFinite(value);
    if (typeof value === 'string') return !/NaN|Infinity|undefined/.test(value);
    return value === null || typeof value !== 'object' || Object.values(value).every(finite);
  };
  const metres = fc.option(fc.double({ min: 1e-4, max: 50, noNaN: true }), { nil: null });
  const anyBench = fc.record({
    form: fc.constantFrom(...CHOICE_VALUES.form), readingWay: fc.constantFrom(...CHOICE_VALUES.readingWay), restoring: fc.constantFrom(...CHOICE_VALUES.restoring), screenShape: fc.constantFrom(...CHOICE_VALUES.screenShape),
    plume: fc.constantFrom(...CHOICE_VALUES.plume), hung: fc.constantFrom(...CHOICE_VALUES.calibrationMassHung), hasPlate: fc.boolean(), throwAngle: fc.option(fc.double({ min: -3, max: 3, noNaN: true }), { nil: null }),
    beam: fc.record({ tilt: fc.double({ min: -1.5, max: 1.5, noNaN: true }), incidence: fc.double({ min: -1.5, max: 1.5, noNaN: true }), outOfPlane: fc.constantFrom(0, 0.2), window: fc.constantFrom(0, 0.01) }),
    lengths: fc.array(metres, { minLength: 14, maxLength: 14 }), parts: fc.array(fc.record({ name: fc.constant('p'), mass: fc.option(fc.double({ min: 1e-6, max: 10, noNaN: true }), { nil: null }), distance: fc.option(fc.double({ min: -5, max: 5, noNaN: true }), { nil: null }) }), { maxLength: 3 }),
  });
  const ENTRIES_DRAWN: readonly DrawnEntry[] = ['bobDistance', 'stripLength', 'plateDistance', 'filmLength', 'zoneFrom', 'zoneTo', 'leverArm', 'readingRadius', 'rulerHeight', 'sensorHeight', 'screenDistance', 'mirrorRadius', 'tapLeverArm', 'calibrationMassDistance'];

  test('has a drawing whose every place is a number, within its own height', () => {
    fc.assert(fc.property(anyBench, ({ lengths, ...over }) => {
      const drawing = layDrawing({ ...over, mass: () => 0.01, length: (name) => lengths[ENTRIES_DRAWN.indexOf(name)] ?? null });
      expect(finite(drawing)).toBe(true);
      expect(drawing.height).toBeLessThan(500);
      for (const { y } of drawing.lines) expect(drawing.pivot.y + y).toBeLessThanOrEqual(drawing.height);
    }), { numRuns: 300 });
  });

  test('a film has its struck zone, a plate its place, and what is not to scale is told', () => {
    const film = layDrawing(bench({ filmLength: 0.2, zoneFrom: 0.15, zoneTo: 0.2 }, { form: 'filmStrip', hasPlate: true }));
    expect((film.zone?.to ?? 0) - (film.zone?.from ?? 0)).toBeCloseTo((film.bodyEnd * 0.05) / 0.2, 9);
    expect(film.plate).toBeCloseTo(film.bodyEnd, 9);
    expect(film.told.join()).toContain('film bends');
    const plate = layDrawing(bench({ stripLength: 0.4, plateDistance: 0.3 }, { form: 'stripWithPlate', mass: (name) => (name === 'stripMass' ? 0.02 : 0.02) }));
    expect(plate.plate).toBeCloseTo(plate.bodyEnd * 0.75, 9);
    // Centre of mass of equal masses at 0.2 and 0.3 m.
    expect(plate.words.find(({ id }) => id === 'centre')?.y).toBeCloseTo((plate.bodyEnd * 0.25) / 0.4, 9);
    expect(layDrawing(bench({}, { form: 'periodAndStiffness' })).told.join()).toContain('shape is not drawn');
    expect(layDrawing(bench({}, { restoring: 'flexureAlone' })).told.join()).toContain('seen from above');
  });

  test('a mirror off the pivot, a curved screen and a window stand where they are', () => {
    const off = layDrawing(bench({ stripLength: 0.4, mirrorRadius: 0.1 }, { readingWay: 'laserSpot', throwAngle: 0.1, beam: { tilt: 0, incidence: 0.3, outOfPlane: 0.1, window: 0.01 } }));
    expect(off.laser?.mirror.y).toBeCloseTo(off.bodyEnd / 4, 9);
    expect(off.laser?.window).not.toBeNull();
    expect(off.told.join()).toContain('inclined along the pivot axis');
    const curved = layDrawing(bench({ stripLength: 0.4 }, { readingWay: 'laserSpot', screenShape: 'curved', throwAngle: 0.2 }));
    expect(Math.hypot(curved.laser?.spot.x ?? 0, curved.laser?.spot.y ?? 0)).toBeCloseTo(-(curved.laser?.screenX ?? 0), 9);
  });

  test('a chord joins rest and throw, a rise is R(1 − cos θ), a sensor looks at its height', () => {
    const chord = layDrawing(bench({ stripLength: 0.4, readingRadius: 0.4 }, { readingWay: 'chord', throwAngle: 0.3 })).reading;
    expect(chord?.is === 'chord' ? Math.hypot(chord.to.x - chord.from.x, chord.to.y - chord.from.y) : 0).toBeCloseTo(2 * Math.sin(0.15) * (chord?.is === 'chord' ? chord.from.y : 0), 9);
    const rise = layDrawing(bench({ stripLength: 0.4, readingRadius: 0.4 }, { readingWay: 'rise', throwAngle: 0.3 })).reading;
    expect(rise?.is === 'rise' ? rise.from.y - rise.to.y : 0).toBeCloseTo((rise?.is === 'rise' ? rise.from.y : 0) * (1 - Math.cos(0.3)), 9);
    const face = layDrawing(bench({ stripLength: 0.4, sensorHeight: 0.3 }, { readingWay: 'sensorOnFace' }));
    expect(face.reading?.is === 'sensor' ? face.reading.at.y : 0).toBeCloseTo(face.bodyEnd * 0.75, 9);
  });
});
