/** Bands over what is left out of a record: one pattern for each reason, told apart without colour. */
import type uPlot from 'uplot';
import type { Stretch } from '../reduction/traceResults.ts';
import type { Inks } from './figure.ts';

/** Lines and dots of one tile, CSS px; the tile repeats across and down. */
export interface Hatch {
  readonly tile: number;
  readonly lines: readonly (readonly [x1: number, y1: number, x2: number, y2: number])[];
  readonly dots: readonly (readonly [x: number, y: number, radius: number])[];
}

/** Rising strokes run past the corners, so that they join from tile to tile. */
const rising = (tile: number): Hatch['lines'] => [[-1, tile + 1, tile + 1, -1], [-1, 1, 1, -1], [tile - 1, tile + 1, tile + 1, tile - 1]];
const falling = (tile: number): Hatch['lines'] => [[-1, -1, tile + 1, tile + 1], [-1, tile - 1, 1, tile + 1], [tile - 1, -1, tile + 1, 1]];

export const HATCHES: Readonly<Record<Stretch['why'], Hatch>> = {
  gap: { tile: 9, lines: rising(9), dots: [] },
  clipped: { tile: 5, lines: [[0, 2.5, 5, 2.5]], dots: [] },
  spike: { tile: 4, lines: [[2, 0, 2, 4]], dots: [] },
  blanked: { tile: 6, lines: [], dots: [[1.5, 1.5, 0.9], [4.5, 4.5, 0.9]] },
  train: { tile: 7, lines: [[0, 3.5, 7, 3.5], [3.5, 0, 3.5, 3.5]], dots: [] },
  marked: { tile: 8, lines: [...rising(8), ...falling(8)], dots: [] },
};

export const hatchInk = (why: Stretch['why'], inks: Inks): string => (why === 'marked' ? inks.look : inks.blank);

const HATCH_WIDTH = 0.8;
/** Height of the bar at the foot of a band, and its least width: a band too narrow for its pattern is still found; CSS px. */
const FOOT = 4;
const LEAST_FOOT = 2;

/** The tile of a reason as the pen's fill; null where the canvas can make none. */
function patternOf(pen: CanvasRenderingContext2D, why: Stretch['why'], inks: Inks): CanvasPattern | null {
  const px = devicePixelRatio;
  const { tile, lines, dots } = HATCHES[why];
  const canvas = document.createElement('canvas');
  canvas.width = canvas.height = Math.max(1, Math.round(tile * px));
  const tilePen = canvas.getContext('2d');
  if (tilePen === null) return null;
  const scale = canvas.width / tile;
  tilePen.scale(scale, scale);
  tilePen.strokeStyle = tilePen.fillStyle = hatchInk(why, inks);
  tilePen.lineWidth = HATCH_WIDTH;
  tilePen.beginPath();
  for (const [x1, y1, x2, y2] of lines) {
    tilePen.moveTo(x1, y1);
    tilePen.lineTo(x2, y2);
  }
  tilePen.stroke();
  for (const [x, y, radius] of dots) {
    tilePen.beginPath();
    tilePen.arc(x, y, radius, 0, 2 * Math.PI);
    tilePen.fill();
  }
  return pen.createPattern(canvas, 'repeat');
}

/** Draws the bands of stretches, in order of time, that are in sight. `from`, `to` in the units of the x axis. */
export type Bands = (u: uPlot, stretches: readonly Stretch[]) => void;

/** A drawer that keeps its tiles. */
export function bandsIn(inks: Inks): Bands {
  const tiles = new Map<Stretch['why'], CanvasPattern | null>();
  return (u, stretches) => {
    const { ctx: pen, bbox: { left, top, width, height } } = u;
    const px = devicePixelRatio;
    pen.save();
    for (const { from, to, why } of stretches) {
      const a = Math.max(left, u.valToPos(from, 'x', true));
      const b = Math.min(left + width, u.valToPos(to, 'x', true));
      if (!(b >= left && a <= left + width)) continue;
      if (!tiles.has(why)) tiles.set(why, patternOf(pen, why, inks));
      const tile = tiles.get(why);
      if (tile != null) {
        pen.fillStyle = tile;
        pen.fillRect(a, top, b - a, height);
      }
      const wide = Math.max(LEAST_FOOT * px, b - a);
      pen.fillStyle = hatchInk(why, inks);
      pen.fillRect(Math.min(a, left + width - wide), top + height - FOOT * px, wide, FOOT * px);
    }
    pen.restore();
  };
}
