/** Renders only the rows of a long sheet that are in sight, every row of one height; all of them for printing. */
import { useEffect, useRef, useState } from 'react';
import type { RefObject } from 'react';
import { flushSync } from 'react-dom';

/** Sheets up to this many rows are rendered whole. */
const WHOLE_UP_TO = 150;
/** Height of a row of a long sheet, px; the style sheet has the same. */
const ROW_HEIGHT = 30;
/** Rows rendered beyond either edge, so that scrolling shows no gap. */
const BEYOND = 10;
/** Height taken before the frame is measured, px. */
const FRAME_HEIGHT = 600;

export interface RowWindow {
  readonly frame: RefObject<HTMLDivElement | null>;
  /** Rows first … last − 1 are rendered. */
  readonly first: number;
  readonly last: number;
  readonly windowed: boolean;
  readonly rowHeight: number;
  readonly page: number;
  readonly onScroll: () => void;
  /** Scrolls the frame, and only the frame, until the row is in sight. */
  readonly bring: (row: number) => void;
  /** The row is about to be so far out of sight that it is not rendered any more. */
  readonly isFarOff: (row: number) => boolean;
}

export function useRowWindow(rows: number): RowWindow {
  const frame = useRef<HTMLDivElement>(null);
  const [{ top, height }, setView] = useState({ top: 0, height: FRAME_HEIGHT });
  const printing = usePrinting();
  const windowed = rows > WHOLE_UP_TO && !printing;
  const first = windowed ? Math.max(0, Math.min(rows, Math.floor(top / ROW_HEIGHT)) - BEYOND) : 0;
  const last = windowed ? Math.min(rows, Math.ceil((top + height) / ROW_HEIGHT) + BEYOND) : rows;

  function look(element: HTMLDivElement) {
    setView({ top: element.scrollTop, height: element.clientHeight === 0 ? FRAME_HEIGHT : element.clientHeight });
  }

  function onScroll() {
    if (windowed && frame.current !== null) look(frame.current);
  }

  function bring(row: number) {
    const element = frame.current;
    if (element === null) return;
    const headHeight = element.querySelector('thead')?.offsetHeight ?? 0;
    const shown = windowed ? null : (element.querySelectorAll('tr[data-row]')[row] ?? null);
    const [start, rowHeight] = shown instanceof HTMLElement ? [shown.offsetTop - headHeight, shown.offsetHeight] : [row * ROW_HEIGHT, ROW_HEIGHT];
    const seen = Math.max(rowHeight, element.clientHeight - headHeight);
    if (start < element.scrollTop) element.scrollTop = start;
    else if (start + rowHeight > element.scrollTop + seen) element.scrollTop = start + rowHeight - seen;
    if (windowed) look(element);
  }

  function isFarOff(row: number): boolean {
    const element = frame.current;
    if (!windowed || element === null) return false;
    const from = row * ROW_HEIGHT - element.scrollTop;
    return from < -BEYOND * ROW_HEIGHT || from > element.clientHeight + (BEYOND - 1) * ROW_HEIGHT;
  }

  return { frame, first, last, windowed, rowHeight: ROW_HEIGHT, page: Math.max(1, Math.floor(height / ROW_HEIGHT) - 2), onScroll, bring, isFarOff };
}

/** True from just before the browser prints until after. */
function usePrinting(): boolean {
  const [printing, setPrinting] = useState(false);
  useEffect(() => {
    // The browser takes the page as it stands when the listener returns.
    const before = () => flushSync(() => setPrinting(true));
    const after = () => setPrinting(false);
    addEventListener('beforeprint', before);
    addEventListener('afterprint', after);
    return () => {
      removeEventListener('beforeprint', before);
      removeEventListener('afterprint', after);
    };
  }, []);
  return printing;
}
