import type uPlot from 'uplot';
import { afterEach, beforeEach, describe, expect, test, vi } from 'vitest';
import type { Mark } from '../../src/plots/figure.ts';
import { markSeries, markSize, traceSign } from '../../src/plots/marks.ts';
import { INKS } from './inksForTests.ts';

/** A path that remembers its strokes. */
class WrittenPath {
  readonly steps: string[] = [];
  moveTo(x: number, y: number): void {
    this.steps.push(`M ${x} ${y}`);
  }
  lineTo(x: number, y: number): void {
    this.steps.push(`L ${x} ${y}`);
  }
  arc(x: number, y: number, radius: number): void {
    this.steps.push(`arc ${x} ${y} ${radius}`);
  }
  rect(): void {
    this.steps.push('rect');
  }
  bezierCurveTo(): void {
    this.steps.push('curve');
  }
  closePath(): void {
    this.steps.push('close');
  }
}

/** A plot whose axes go from 0 to 100 over 1000 × 1000 px, y upward. */
const PLOT = {
  bbox: { left: 0, top: 0, width: 1000, height: 1000 },
  valToPos: (value: number, scale: string) => (scale === 'x' ? 10 * value : 1000 - 10 * value),
} as unknown as uPlot;

const mark = (patch: Partial<Mark>): Mark => ({
  id: 'a', kind: 'shot', setAside: false, x: 50, y: 50, whisker: 5, own: 2, across: 0, missing: false, reading: '', ...patch,
});

/** Strokes of the two series of a lone mark: its own part, then whisker and sign. */
function strokes(one: Mark): readonly [readonly string[], readonly string[]] {
  const { series } = markSeries([one], INKS);
  const stepsOf = (index: number): readonly string[] => {
    const path = series[index]?.paths?.(PLOT, index, 0, 0)?.stroke;
    if (!(path instanceof WrittenPath)) throw new Error('A series of marks has a path');
    return path.steps;
  };
  return [stepsOf(1), stepsOf(2)];
}

beforeEach(() => {
  vi.stubGlobal('Path2D', WrittenPath);
});
afterEach(() => {
  vi.unstubAllGlobals();
});

describe('the whiskers', () => {
  test('the thick one spans the record’s own part, the thin one U', () => {
    const [own, whole] = strokes(mark({}));
    expect(own).toEqual(['M 500 520', 'L 500 480']);
    expect(whole).toContain('L 500 450');
    expect(whole).toContain('L 500 550');
  });

  test('a whisker across spans its half-width to either side', () => {
    const [, whole] = strokes(mark({ across: 3 }));
    expect(whole).toContain('M 470 500');
    expect(whole).toContain('L 530 500');
  });

  test('a mark off the axes is drawn inside the edge, without whiskers', () => {
    const [own, whole] = strokes(mark({ y: -300, setAside: true }));
    expect(own).toEqual([]);
    expect(whole).toContain('arc 500 994 4');
    expect(whole.some((step) => step.startsWith('L 500'))).toBe(false);
  });
});

describe('the signs', () => {
  const sign = (patch: Partial<Mark>): string => {
    const path = new WrittenPath();
    traceSign(path as unknown as Path2D, mark(patch), 0, 0, 4);
    return path.steps.join(' ');
  };

  test('kinds of record differ by shape, before any colour', () => {
    const kinds = ['shot', 'tap', 'blank', 'zero', 'freeSwing'] as const;
    const shapes = [...kinds.map((kind) => sign({ kind })), sign({ missing: true })];
    expect(new Set(shapes).size).toBe(shapes.length);
  });

  test('what is set aside is hollow, grey and struck', () => {
    const { series } = markSeries([mark({ setAside: true })], INKS);
    expect(series[2]).toMatchObject({ fill: 'paper', stroke: 'quiet' });
    const [, counted] = strokes(mark({}));
    const [, aside] = strokes(mark({ setAside: true }));
    expect(aside).toHaveLength(counted.length + 2);
  });

  test('shots are warm and filled, taps cool and filled, blanks grey and hollow', () => {
    const style = (kind: Mark['kind']) => markSeries([mark({ kind })], INKS).series[2];
    expect(style('shot')).toMatchObject({ fill: 'warm', stroke: 'warm' });
    expect(style('tap')).toMatchObject({ fill: 'cool', stroke: 'cool' });
    expect(style('blank')).toMatchObject({ fill: 'paper', stroke: 'grey' });
  });

  test('marks shrink where many share the width', () => {
    expect(markSize(1000, 20)).toBe(4);
    expect(markSize(1000, 1000)).toBe(2);
  });
});
