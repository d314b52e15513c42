/** What lies under the marks: the zero line, a run mean with its interval, a calibration line with its band. */
import type uPlot from 'uplot';
import type { Inks } from './figure.ts';

/** Runs a drawing inside the plotting area only, and leaves the pen as it was. */
function within(u: uPlot, draw: (pen: CanvasRenderingContext2D) => void): void {
  const { ctx, bbox } = u;
  ctx.save();
  ctx.beginPath();
  ctx.rect(bbox.left, bbox.top, bbox.width, bbox.height);
  ctx.clip();
  draw(ctx);
  ctx.restore();
}

/** A thin line at y = 0. */
export function zeroLine(u: uPlot, inks: Inks): void {
  within(u, (pen) => {
    const y = Math.round(u.valToPos(0, 'y', true)) + 0.5;
    pen.strokeStyle = inks.quiet;
    pen.lineWidth = devicePixelRatio;
    pen.beginPath();
    pen.moveTo(u.bbox.left, y);
    pen.lineTo(u.bbox.left + u.bbox.width, y);
    pen.stroke();
  });
}

/** A dotted line from top to bottom at a place along x. */
export function dottedUpright(u: uPlot, at: number, ink: string): void {
  within(u, (pen) => {
    const px = devicePixelRatio;
    const x = Math.round(u.valToPos(at, 'x', true)) + 0.5;
    pen.strokeStyle = ink;
    pen.lineWidth = px;
    pen.setLineDash([2 * px, 3 * px]);
    pen.beginPath();
    pen.moveTo(x, u.bbox.top);
    pen.lineTo(x, u.bbox.top + u.bbox.height);
    pen.stroke();
  });
}

export interface Mean {
  readonly value: number;
  /** U, and the part of it that more shots would shrink, k·s/√n; in the units of the axis. */
  readonly half: number;
  readonly scatter: number;
}

/** How dark the scatter's part lies on the band. */
const SCATTER_INK = 0.22;

/** The mean as a line, mean ± U as a band with the scatter's part darker in it. */
export function meanBand(u: uPlot, { value: mean, half, scatter }: Mean, inks: Inks): void {
  within(u, (pen) => {
    const { left, width } = u.bbox;
    const [top, middle, bottom] = [mean + half, mean, mean - half].map((value) => u.valToPos(value, 'y', true)) as [number, number, number];
    pen.fillStyle = inks.band;
    pen.fillRect(left, top, width, bottom - top);
    const inner = u.valToPos(mean + scatter, 'y', true);
    pen.globalAlpha = SCATTER_INK;
    pen.fillStyle = inks.shot;
    pen.fillRect(left, inner, width, 2 * (middle - inner));
    pen.globalAlpha = 1;
    pen.strokeStyle = inks.shot;
    pen.lineWidth = 1.25 * devicePixelRatio;
    pen.beginPath();
    pen.moveTo(left, middle);
    pen.lineTo(left + width, middle);
    pen.stroke();
  });
}

/** Lines of words need this much between them, CSS px. */
const LINE_APART = 14;

/** Names the line and the edges of the mean's band in the margin to the right of the axes. */
export function meanNames(u: uPlot, { value, half }: Mean, inks: Inks): void {
  const { ctx: pen, bbox } = u;
  const px = devicePixelRatio;
  const names: readonly (readonly [string, number])[] = [['Ī + U', value + half], ['Ī', value], ['Ī − U', value - half]];
  const places = names.map(([name, at]) => ({ name, y: u.valToPos(at, 'y', true) }));
  const [top, middle] = places;
  if (top === undefined || middle === undefined) return;
  const isThin = middle.y - top.y < LINE_APART * px;
  pen.save();
  pen.fillStyle = inks.ink;
  pen.font = `${12 * px}px ${inks.font}`;
  pen.textAlign = 'left';
  pen.textBaseline = 'middle';
  for (const { name, y } of isThin ? [{ name: 'Ī ± U', y: middle.y }] : places) pen.fillText(name, bbox.left + bbox.width + 6 * px, y);
  pen.restore();
}

interface Ray {
  /** Slope in the units of the axes, and its half-width. */
  readonly slope: number;
  readonly half: number;
  readonly dashed: boolean;
  readonly ink: string;
}

/** A line through the origin with its band. */
export function rayBand(u: uPlot, { slope, half, dashed, ink }: Ray, inks: Inks): void {
  within(u, (pen) => {
    const far = u.scales['x']?.max ?? 0;
    const from = [u.valToPos(0, 'x', true), u.valToPos(0, 'y', true)] as const;
    const end = u.valToPos(far, 'x', true);
    if (half > 0) {
      pen.fillStyle = inks.band;
      pen.beginPath();
      pen.moveTo(...from);
      pen.lineTo(end, u.valToPos((slope + half) * far, 'y', true));
      pen.lineTo(end, u.valToPos((slope - half) * far, 'y', true));
      pen.closePath();
      pen.fill();
    }
    pen.strokeStyle = ink;
    pen.lineWidth = 1.25 * devicePixelRatio;
    if (dashed) pen.setLineDash([5 * devicePixelRatio, 4 * devicePixelRatio]);
    pen.beginPath();
    pen.moveTo(...from);
    pen.lineTo(end, u.valToPos(slope * far, 'y', true));
    pen.stroke();
  });
}

/** A line through points in the units of the axes, dashed where dashes are given (CSS px). */
export function curve(u: uPlot, points: readonly (readonly [number, number])[], { ink, dash }: { readonly ink: string; readonly dash: readonly number[] }): void {
  within(u, (pen) => {
    pen.strokeStyle = ink;
    pen.lineWidth = 1.25 * devicePixelRatio;
    pen.setLineDash(dash.map((length) => length * devicePixelRatio));
    pen.beginPath();
    points.forEach(([x, y], i) => (i === 0 ? pen.moveTo(u.valToPos(x, 'x', true), u.valToPos(y, 'y', true)) : pen.lineTo(u.valToPos(x, 'x', true), u.valToPos(y, 'y', true))));
    pen.stroke();
  });
}

/** A bracket along the bottom from one x to another, with words over it. */
export function bracket(u: uPlot, from: number, to: number, ink: string, font: string, words: string): void {
  within(u, (pen) => {
    const px = devicePixelRatio;
    const [a, b] = [u.valToPos(from, 'x', true), u.valToPos(to, 'x', true)];
    const base = u.bbox.top + u.bbox.height - 5 * px;
    pen.strokeStyle = ink;
    pen.lineWidth = 1.5 * px;
    pen.beginPath();
    pen.moveTo(a, base - 5 * px);
    pen.lineTo(a, base);
    pen.lineTo(b, base);
    pen.lineTo(b, base - 5 * px);
    pen.stroke();
    pen.fillStyle = ink;
    pen.font = `${12 * px}px ${font}`;
    pen.textBaseline = 'bottom';
    const wide = pen.measureText(words).width;
    const right = u.bbox.left + u.bbox.width;
    pen.textAlign = 'left';
    pen.fillText(words, Math.max(u.bbox.left + 4 * px, Math.min((a + b) / 2 - wide / 2, right - wide - 4 * px)), base - 6 * px);
  });
}
