/** Puts a sampled record on the sheet with uPlot: draws what is in sight of it again at each move. */
import uPlot from 'uplot';
import 'uplot/dist/uPlot.min.css';
import { frame } from './axes.ts';
import type { Inks } from './figure.ts';
import { watchGestures } from './traceGestures.ts';
import type { Gestures } from './traceGestures.ts';
import { bandsIn } from './traceHatch.ts';
import { sameSight } from './tracePanZoom.ts';
import type { Sight } from './tracePanZoom.ts';
import { RECORD_HEIGHT, SIGNS_HEIGHT } from './traceRecord.ts';
import type { InSight, RecordEvent, RecordFigure } from './traceRecord.ts';
import { drawChosen, drawPlace, drawSigns, drawStretch, eventNear } from './traceSigns.ts';

/** What a record is looked at with. */
export interface Looking {
  readonly sight: Sight;
  /** Whether the height is that of what is in sight, or of the whole record. */
  readonly fitsHeight: boolean;
  readonly selected: string | null;
  /** An event that is being moved, or whose move is not yet reduced, and where to. */
  readonly moving: { readonly id: string; readonly time: number } | null;
  /** Place pointed to, s. */
  readonly place: number | null;
  /** A stretch chosen to be left out. */
  readonly chosen: Sight | null;
}

/** What the page is told; the rest of the gestures is answered here. */
export type RecordPointing = Pick<Gestures, 'isWheelOurs' | 'isChoosing' | 'look' | 'moving' | 'moved' | 'choosing' | 'chosen'> & {
  pick(event: RecordEvent): void;
  point(time: number): void;
  /** The event under the pointer, or null; places are CSS px from the corner of the picture. */
  hover(event: RecordEvent | null, left: number, top: number): void;
};

export interface MountedRecord {
  show(looking: Looking): void;
  resize(width: number): void;
  remove(): void;
}

/** Columns for each CSS px across, each drawn from its lowest to its highest. */
const COLUMNS = 1;
const LEAST_COLUMNS = 100;

/** Draws the record into an element; `remove` takes it and its listeners away. */
export function mountRecord(figure: RecordFigure, inks: Inks, into: HTMLElement, width: number, first: Looking, pointing: RecordPointing): MountedRecord {
  let looking = first;
  let wide = width;
  const columns = (): number => Math.max(LEAST_COLUMNS, Math.round(COLUMNS * wide));
  const whole = figure.look(figure.bounds, columns()).y;
  const look = (): InSight => figure.look(looking.sight, columns());
  let shown = look();
  const height = (): InSight['y'] => (looking.fitsHeight ? shown.y : whole);
  const drawBands = bandsIn(inks);

  const present = (): readonly RecordEvent[] => {
    const { moving } = looking;
    if (moving === null) return figure.events;
    return figure.events.map((event) => (event.id === moving.id ? { ...event, time: moving.time } : event)).sort((a, b) => a.time - b.time);
  };

  const fixed = frame({ low: 0, high: 1 }, { low: 0, high: 1 }, RECORD_HEIGHT);
  const plot = new uPlot(
    {
      ...fixed,
      width,
      axes: figure.axes,
      series: figure.series,
      scales: {
        x: { time: false, range: () => [looking.sight.from, looking.sight.to] },
        y: { range: () => [height().low, height().high] },
      },
      hooks: {
        drawAxes: [(u) => {
          if (looking.chosen !== null) drawStretch(u, looking.chosen, inks);
          drawBands(u, figure.stretches);
        }],
        draw: [(u) => {
          const events = present();
          drawSigns(u, events, looking.selected, inks);
          const selected = events.find(({ id }) => id === looking.selected);
          if (selected !== undefined) drawChosen(u, selected, inks);
          if (looking.place !== null) drawPlace(u, looking.place, inks);
        }],
      },
    },
    shown.columns,
    into,
  );

  const lookAgain = (): void => {
    shown = look();
    plot.batch(() => {
      plot.setData(shown.columns, false);
      plot.setScale('x', { min: looking.sight.from, max: looking.sight.to });
      plot.setScale('y', { min: height().low, max: height().high });
    });
  };

  watchGestures(plot.over, {
    bounds: figure.bounds,
    sight: () => looking.sight,
    signAt: (left, top) => (top <= SIGNS_HEIGHT ? (eventNear(plot, present(), left)?.id ?? null) : null),
    isWheelOurs: pointing.isWheelOurs,
    isChoosing: pointing.isChoosing,
    look: pointing.look,
    moving: pointing.moving,
    moved: pointing.moved,
    choosing: pointing.choosing,
    chosen: pointing.chosen,
    point: (time, left, top) => {
      const event = top <= SIGNS_HEIGHT ? eventNear(plot, present(), left) : null;
      if (event === null) pointing.point(time);
      else pointing.pick(event);
    },
    hover: (left, top) => {
      const event = top <= SIGNS_HEIGHT ? eventNear(plot, present(), left) : null;
      const x = event === null ? 0 : plot.valToPos(event.time, 'x');
      plot.over.classList.toggle('on-sign', event !== null);
      pointing.hover(event, x + plot.over.offsetLeft, plot.over.offsetTop + SIGNS_HEIGHT);
    },
    leave: () => pointing.hover(null, 0, 0),
  });

  return {
    show: (next) => {
      const before = looking;
      looking = next;
      if (!sameSight(before.sight, next.sight) || before.fitsHeight !== next.fitsHeight) lookAgain();
      else plot.redraw(false);
    },
    resize: (next) => {
      wide = next;
      shown = look();
      plot.batch(() => {
        plot.setData(shown.columns, false);
        plot.setSize({ width: next, height: RECORD_HEIGHT });
      });
    },
    remove: () => plot.destroy(),
  };
}
