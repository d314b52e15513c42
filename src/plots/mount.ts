/** Puts a figure on the sheet with uPlot, marks the selected record, and tells where the pointer is. */
import uPlot from 'uplot';
import 'uplot/dist/uPlot.min.css';
import type { Figure, Inks, Mark } from './figure.ts';

export interface Pointing {
  /** The record under the pointer, or null; places are CSS px from the figure's corner. */
  hover(mark: Mark | null, left: number, top: number): void;
  pick(mark: Mark): void;
}

export interface Mounted {
  resize(width: number): void;
  select(record: string | null): void;
  remove(): void;
}

/** A pointer further than this from every mark means none, CSS px. */
const REACH = 40;

interface Where {
  readonly mark: Mark;
  readonly left: number;
  readonly top: number;
}

function nearestMark(u: uPlot, figure: Figure, left: number, top: number): Where | null {
  let best: Where | null = null;
  let least = Infinity;
  for (const mark of figure.marks) {
    const x = u.valToPos(mark.x, 'x');
    const y = u.valToPos(mark.y, 'y');
    const away = figure.nearest === 'x' ? Math.abs(x - left) : Math.hypot(x - left, y - top);
    if (away < least) {
      least = away;
      best = { mark, left: x, top: y };
    }
  }
  return least <= REACH ? best : null;
}

/** A line and a ring at the selected record. */
function drawSelected(u: uPlot, mark: Mark, inks: Inks): void {
  const pen = u.ctx;
  const px = devicePixelRatio;
  const x = u.valToPos(mark.x, 'x', true);
  const { top, height } = u.bbox;
  const y = Math.max(top, Math.min(top + height, u.valToPos(mark.y, 'y', true)));
  pen.save();
  pen.strokeStyle = inks.ink;
  pen.lineWidth = px;
  pen.setLineDash([2 * px, 3 * px]);
  pen.beginPath();
  pen.moveTo(x, top);
  pen.lineTo(x, top + height);
  pen.stroke();
  pen.setLineDash([]);
  pen.lineWidth = 2 * px;
  pen.beginPath();
  pen.arc(x, y, 8 * px, 0, 2 * Math.PI);
  pen.stroke();
  pen.restore();
}

/** Draws the figure into an element; `remove` takes it and its listeners away. */
export function mountFigure(figure: Figure, inks: Inks, into: HTMLElement, width: number, selected: string | null, pointing: Pointing): Mounted {
  let chosen = selected;
  const showSelected = (u: uPlot): void => {
    const mark = figure.marks.find(({ id }) => id === chosen);
    if (mark !== undefined) drawSelected(u, mark, inks);
  };
  const { hooks } = figure.options;
  const plot = new uPlot(
    { ...figure.options, width, hooks: { ...hooks, draw: [...(hooks?.draw ?? []), showSelected] } },
    figure.columns,
    into,
  );
  const at = (event: MouseEvent): Where | null => {
    const box = plot.over.getBoundingClientRect();
    return nearestMark(plot, figure, event.clientX - box.left, event.clientY - box.top);
  };
  plot.over.addEventListener('pointermove', (event) => {
    const where = at(event);
    pointing.hover(where?.mark ?? null, (where?.left ?? 0) + plot.over.offsetLeft, (where?.top ?? 0) + plot.over.offsetTop);
  });
  plot.over.addEventListener('pointerleave', () => pointing.hover(null, 0, 0));
  plot.over.addEventListener('click', (event) => {
    const where = at(event);
    if (where !== null) pointing.pick(where.mark);
  });
  return {
    resize: (wide) => plot.setSize({ width: wide, height: figure.options.height }),
    select: (record) => {
      chosen = record;
      plot.redraw(false);
    },
    remove: () => plot.destroy(),
  };
}
