/** A picture kept in its place: drawn in turn the first time, again where what it is drawn from changes, and as wide as its place. */
import { useEffect, useLayoutEffect, useRef } from 'react';
import type { RefObject } from 'react';
import { inTurn } from './inTurn.ts';

interface Drawn {
  resize(width: number): void;
  remove(): void;
}

const FIRST_WIDTH = 640;

interface Place<One> {
  /** Of the element that it is drawn into. */
  readonly canvas: RefObject<HTMLDivElement | null>;
  /** null until its turn has come. */
  readonly mounted: RefObject<One | null>;
  /** CSS px. */
  readonly width: RefObject<number>;
}

/** `draw` is another function where the picture is to be another. */
export function useDrawn<One extends Drawn>(draw: (into: HTMLElement, width: RefObject<number>) => One): Place<One> {
  const canvas = useRef<HTMLDivElement>(null);
  const mounted = useRef<One | null>(null);
  const width = useRef(FIRST_WIDTH);
  const wasDrawn = useRef(false);

  useLayoutEffect(() => {
    const into = canvas.current;
    if (into === null) return undefined;
    let drawn: One | null = null;
    const put = (): void => {
      wasDrawn.current = true;
      width.current = into.clientWidth || width.current;
      drawn = draw(into, width);
      mounted.current = drawn;
    };
    // The first time there is nothing to be seen yet; later the new one takes the old one's place at once.
    const callOff = wasDrawn.current ? null : inTurn(put);
    if (callOff === null) put();
    return () => {
      callOff?.();
      mounted.current = null;
      drawn?.remove();
    };
  }, [draw]);

  useEffect(() => {
    const into = canvas.current;
    if (into === null) return undefined;
    const observer = new ResizeObserver(() => {
      const wide = into.clientWidth;
      if (wide === 0 || wide === width.current) return;
      width.current = wide;
      mounted.current?.resize(wide);
    });
    observer.observe(into);
    return () => observer.disconnect();
  }, []);

  return { canvas, mounted, width };
}
