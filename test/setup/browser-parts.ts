/** The parts of a browser that jsdom lacks and the page or uPlot asks for, with nothing behind them; the real ones are met in test/browser. */
import '@testing-library/jest-dom/vitest';
import { cleanup } from '@testing-library/react';
import { afterEach } from 'vitest';

Object.assign(globalThis, { IS_REACT_ACT_ENVIRONMENT: true });
afterEach(cleanup);

class StillObserver {
  observe(): void {}
  unobserve(): void {}
  disconnect(): void {}
}

class BlankPath {
  addPath(): void {}
  arc(): void {}
  bezierCurveTo(): void {}
  closePath(): void {}
  lineTo(): void {}
  moveTo(): void {}
  quadraticCurveTo(): void {}
  rect(): void {}
}

/** A 2-D context that takes every setting and every call, and draws nothing. */
function blankContext(canvas: HTMLCanvasElement): unknown {
  const settings: Record<PropertyKey, unknown> = {
    canvas,
    measureText: (text: string) => ({ width: 6 * text.length }),
  };
  return new Proxy(settings, {
    get: (known, name) => (name in known ? known[name] : () => undefined),
  });
}

Object.assign(globalThis, {
  matchMedia: (media: string) => Object.assign(new EventTarget(), { media, matches: false, onchange: null }),
  ResizeObserver: StillObserver,
  IntersectionObserver: StillObserver,
  Path2D: BlankPath,
});

Object.defineProperty(HTMLCanvasElement.prototype, 'getContext', {
  configurable: true,
  value(this: HTMLCanvasElement, kind: string) {
    return kind === '2d' ? blankContext(this) : null;
  },
});

Object.assign(Element.prototype, { scrollIntoView: () => undefined });

if (!('showModal' in HTMLDialogElement.prototype)) {
  Object.assign(HTMLDialogElement.prototype, {
    show(this: HTMLDialogElement) {
      this.open = true;
    },
    showModal(this: HTMLDialogElement) {
      this.open = true;
    },
    close(this: HTMLDialogElement, answer?: string) {
      if (answer !== undefined) this.returnValue = answer;
      this.open = false;
      this.dispatchEvent(new Event('close'));
    },
  });
}
