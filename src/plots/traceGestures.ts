/** What a mouse, a pen or fingers do to a record: drag along it, zoom, move an event, choose a stretch, point at a place. */
import { panned, pinched, sameSight, wheelFactor, zoomedAbout } from './tracePanZoom.ts';
import type { Bounds, Fingers, Sight } from './tracePanZoom.ts';

export interface Gestures {
  readonly bounds: Bounds;
  sight(): Sight;
  /** The event whose sign can be taken hold of at a place within the axes, CSS px. */
  signAt(left: number, top: number): string | null;
  /** Whether a wheel is meant for the picture and not for the page. */
  isWheelOurs(event: WheelEvent): boolean;
  /** Whether the next drag chooses a stretch without Shift. */
  isChoosing(): boolean;
  look(sight: Sight): void;
  moving(id: string, time: number): void;
  /** The event was let go at a time; null: where it was. */
  moved(id: string, time: number | null): void;
  choosing(stretch: Sight): void;
  chosen(stretch: Sight): void;
  /** A click or a tap of a finger, CSS px within the axes. */
  point(time: number, left: number, top: number): void;
  hover(left: number, top: number): void;
  leave(): void;
}

/** A pointer that moves less has not dragged, CSS px. */
const STILL = 4;

type Doing =
  | { readonly what: 'pan' | 'choose'; readonly at: number; readonly sight: Sight; dragged: boolean }
  | { readonly what: 'move'; readonly at: number; readonly id: string; dragged: boolean }
  | { readonly what: 'pinch'; readonly fingers: Fingers; readonly sight: Sight };

/** Listens on the surface over the axes. The listeners go with the surface. */
export function watchGestures(over: HTMLElement, to: Gestures): void {
  const down = new Map<number, number>();
  let doing: Doing | null = null;

  const box = (): DOMRect => over.getBoundingClientRect();
  const part = (clientX: number): number => {
    const { left, width } = box();
    return (clientX - left) / (width || 1);
  };
  const timeAt = (at: number, { from, to: end }: Sight = to.sight()): number => from + Math.max(0, Math.min(1, at)) * (end - from);
  const fingers = (): Fingers => {
    const [first = 0, second = 0] = down.values();
    return [first, second];
  };
  const between = (one: number, other: number, sight: Sight): Sight => {
    const [a, b] = [timeAt(one, sight), timeAt(other, sight)];
    return a <= b ? { from: a, to: b } : { from: b, to: a };
  };

  function begin(event: PointerEvent): void {
    if (event.pointerType === 'mouse' && event.button !== 0) return;
    const { left, top } = box();
    const at = part(event.clientX);
    down.set(event.pointerId, at);
    over.setPointerCapture(event.pointerId);
    if (down.size === 2) {
      if (doing?.what === 'move' && doing.dragged) to.moved(doing.id, null);
      doing = { what: 'pinch', fingers: fingers(), sight: to.sight() };
      return;
    }
    if (down.size > 2) return;
    const sign = to.signAt(event.clientX - left, event.clientY - top);
    doing = event.shiftKey || to.isChoosing()
      ? { what: 'choose', at, sight: to.sight(), dragged: false }
      : sign === null ? { what: 'pan', at, sight: to.sight(), dragged: false } : { what: 'move', at, id: sign, dragged: false };
  }

  function go(event: PointerEvent): void {
    const { left, top, width } = box();
    if (!down.has(event.pointerId)) {
      to.hover(event.clientX - left, event.clientY - top);
      return;
    }
    const at = part(event.clientX);
    down.set(event.pointerId, at);
    if (doing === null) return;
    if (doing.what === 'pinch') {
      to.look(pinched(doing.sight, doing.fingers, fingers(), to.bounds));
      return;
    }
    if (!doing.dragged && Math.abs(at - doing.at) * width < STILL) return;
    doing.dragged = true;
    if (doing.what === 'pan') to.look(panned(doing.sight, (doing.at - at) * (doing.sight.to - doing.sight.from), to.bounds));
    else if (doing.what === 'move') to.moving(doing.id, timeAt(at));
    else to.choosing(between(doing.at, at, doing.sight));
  }

  function end(event: PointerEvent, isCalledOff: boolean): void {
    if (!down.delete(event.pointerId)) return;
    const done = doing;
    // The finger that stays goes on panning from where it is.
    doing = done?.what === 'pinch' && down.size === 1 ? { what: 'pan', at: fingers()[0], sight: to.sight(), dragged: true } : null;
    if (done === null || done.what === 'pinch') return;
    const { left, top } = box();
    const at = part(event.clientX);
    if (!done.dragged) {
      if (!isCalledOff) to.point(timeAt(at), event.clientX - left, event.clientY - top);
    } else if (done.what === 'move') to.moved(done.id, isCalledOff ? null : timeAt(at));
    else if (done.what === 'choose' && !isCalledOff) to.chosen(between(done.at, at, done.sight));
  }

  over.addEventListener('pointerdown', begin);
  over.addEventListener('pointermove', go);
  over.addEventListener('pointerup', (event) => end(event, false));
  over.addEventListener('pointercancel', (event) => end(event, true));
  over.addEventListener('pointerleave', () => to.leave());
  over.addEventListener('dblclick', () => to.look({ from: to.bounds.from, to: to.bounds.to }));
  over.addEventListener('wheel', (event) => {
    if (event.deltaY === 0 || !to.isWheelOurs(event)) return;
    const sight = to.sight();
    const next = zoomedAbout(sight, timeAt(part(event.clientX)), wheelFactor(event.deltaY, event.deltaMode), to.bounds);
    // Where there is nothing more to see the page scrolls on.
    if (sameSight(sight, next)) return;
    event.preventDefault();
    to.look(next);
  }, { passive: false });
}
