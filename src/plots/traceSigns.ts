/** Signs of the shots and taps along the top of a record, the chosen one ringed; the place pointed to; a stretch chosen to be left out. */
import type uPlot from 'uplot';
import type { Inks, Mark } from './figure.ts';
import { inkOf, markSize, traceSign } from './marks.ts';
import type { Sight } from './tracePanZoom.ts';
import { SIGNS_HEIGHT } from './traceRecord.ts';
import type { RecordEvent } from './traceRecord.ts';

/** An event further than this from a pointer is not meant, CSS px. */
const REACH = 9;
/** Room for each sign from which on it has a line down to the record, and its number beside it; CSS px. */
const ROOM_FOR_LINES = 16;
const ROOM_FOR_NUMBERS = 44;
const RING = 8;

const SIGN_OF: Omit<Mark, 'kind' | 'missing'> = { id: '', setAside: false, x: 0, y: 0, whisker: 0, own: 0, across: 0, reading: '' };

const isIn = ({ time }: { readonly time: number }, u: uPlot): boolean => time >= (u.scales['x']?.min ?? Infinity) && time <= (u.scales['x']?.max ?? -Infinity);

/** The event at a place across the picture, CSS px within the axes; null for none. */
export function eventNear(u: uPlot, events: readonly RecordEvent[], left: number): RecordEvent | null {
  let best: RecordEvent | null = null;
  let least = REACH;
  for (const event of events) {
    if (!isIn(event, u)) continue;
    const away = Math.abs(u.valToPos(event.time, 'x') - left);
    if (away <= least) [best, least] = [event, away];
  }
  return best;
}

function upright(pen: CanvasRenderingContext2D, x: number, top: number, height: number, dash: readonly number[]): void {
  pen.setLineDash(dash.map((long) => long * devicePixelRatio));
  pen.beginPath();
  pen.moveTo(x, top);
  pen.lineTo(x, top + height);
  pen.stroke();
  pen.setLineDash([]);
}

/** The signs that are in sight; events in order of time. */
export function drawSigns(u: uPlot, events: readonly RecordEvent[], chosen: string | null, inks: Inks): void {
  const { ctx: pen, bbox: { left, top, width, height } } = u;
  const px = devicePixelRatio;
  const seen = events.filter((event) => isIn(event, u));
  const room = width / px / Math.max(1, seen.length);
  const size = markSize(width / px, seen.length) * px;
  const y = top + (SIGNS_HEIGHT / 2) * px;
  pen.save();
  pen.lineWidth = px;
  pen.fillStyle = inks.paper;
  if (seen.length > 0) pen.fillRect(left, top, width, SIGNS_HEIGHT * px);
  pen.font = `${11 * px}px ${inks.font}`;
  pen.textAlign = 'left';
  pen.textBaseline = 'middle';
  for (const { id, kind, time, missing, name } of seen) {
    const x = u.valToPos(time, 'x', true);
    const ink = missing ? inks.look : inkOf(kind, inks);
    pen.strokeStyle = inks.quiet;
    if (room >= ROOM_FOR_LINES && id !== chosen) upright(pen, x, top + SIGNS_HEIGHT * px, height - SIGNS_HEIGHT * px, [1, 3]);
    const sign = new Path2D();
    traceSign(sign, { ...SIGN_OF, kind, missing }, x, y, size);
    pen.strokeStyle = pen.fillStyle = ink;
    pen.lineWidth = 1.5 * px;
    if (kind !== 'blank' && !missing) pen.fill(sign);
    pen.stroke(sign);
    if (room >= ROOM_FOR_NUMBERS) {
      pen.fillStyle = inks.ink;
      pen.fillText(name.replace(/^\D*\s(?=\d+$)/, ''), x + size + 3 * px, y);
    }
  }
  pen.restore();
}

/** A line and a ring at the chosen event. */
export function drawChosen(u: uPlot, event: RecordEvent, inks: Inks): void {
  if (!isIn(event, u)) return;
  const { ctx: pen, bbox: { top, height } } = u;
  const px = devicePixelRatio;
  const x = u.valToPos(event.time, 'x', true);
  pen.save();
  pen.strokeStyle = inks.ink;
  pen.lineWidth = px;
  upright(pen, x, top, height, [2, 3]);
  pen.lineWidth = 2 * px;
  pen.beginPath();
  pen.arc(x, top + (SIGNS_HEIGHT / 2) * px, RING * px, 0, 2 * Math.PI);
  pen.stroke();
  pen.restore();
}

/** A thin line at the place pointed to, with a wedge at its foot. */
export function drawPlace(u: uPlot, time: number, inks: Inks): void {
  if (!isIn({ time }, u)) return;
  const { ctx: pen, bbox: { top, height } } = u;
  const px = devicePixelRatio;
  const x = u.valToPos(time, 'x', true);
  const foot = top + height;
  pen.save();
  pen.strokeStyle = pen.fillStyle = inks.ink;
  pen.lineWidth = px;
  upright(pen, x, top + SIGNS_HEIGHT * px, height - SIGNS_HEIGHT * px, []);
  pen.beginPath();
  pen.moveTo(x, foot - 7 * px);
  pen.lineTo(x - 5 * px, foot);
  pen.lineTo(x + 5 * px, foot);
  pen.closePath();
  pen.fill();
  pen.restore();
}

/** A frame about a stretch that is chosen. */
export function drawStretch(u: uPlot, { from, to }: Sight, inks: Inks): void {
  const { ctx: pen, bbox: { left, top, width, height } } = u;
  const px = devicePixelRatio;
  const a = Math.max(left, u.valToPos(from, 'x', true));
  const b = Math.min(left + width, u.valToPos(to, 'x', true));
  if (!(b > a)) return;
  pen.save();
  pen.fillStyle = inks.band;
  pen.globalAlpha = 0.55;
  pen.fillRect(a, top, b - a, height);
  pen.globalAlpha = 1;
  pen.strokeStyle = inks.ink;
  pen.lineWidth = 1.5 * px;
  pen.setLineDash([5 * px, 3 * px]);
  pen.strokeRect(a, top + px, b - a, height - 2 * px);
  pen.restore();
}
