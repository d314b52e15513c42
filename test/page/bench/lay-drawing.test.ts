import { describe, expect, test } from 'vitest';
import { layDrawing } from '../../../src/page/bench/layDrawing.ts';
import type { BenchLengths, DrawnEntry } from '../../../src/page/bench/layDrawing.ts';

const bench = (lengths: Partial<Record<DrawnEntry, number>>, over: Partial<BenchLengths> = {}): BenchLengths => ({
  form: 'uniformStrip', readingWay: 'rulerAtTip', hung: 'never', parts: [], throwAngle: null, length: (name) => lengths[name] ?? null, ...over,
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
    expect((drawing.laser?.spotY ?? 0) / -(drawing.laser?.screenX ?? 1)).toBeCloseTo(Math.tan(0.2), 12);
  });
});
