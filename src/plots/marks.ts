/** The signs of the figures: kinds of record by shape, thin whiskers for U, thick ones for the record's own part of it. */
import type uPlot from 'uplot';
import type { RecordKind } from '../readings/meanings.ts';
import type { Inks, Mark } from './figure.ts';

/** Marks that are drawn alike. */
interface Group {
  readonly kind: RecordKind;
  readonly setAside: boolean;
  readonly missing: boolean;
  /** Indices into the figure's marks. */
  readonly members: readonly number[];
}

/** Half the size of a mark where there is room for it, CSS px. */
const LARGEST_MARK = 4;
const SMALLEST_MARK = 2;
const OWN_WIDTH = 4;

function groupsOf(marks: readonly Mark[]): readonly Group[] {
  const groups = new Map<string, Group & { members: number[] }>();
  marks.forEach(({ kind, setAside, missing }, index) => {
    const key = `${kind} ${setAside} ${missing}`;
    const group = groups.get(key) ?? { kind, setAside, missing, members: [] };
    group.members.push(index);
    groups.set(key, group);
  });
  return [...groups.values()];
}

export function inkOf(kind: RecordKind, inks: Inks): string {
  switch (kind) {
    case 'shot': return inks.shot;
    case 'tap': return inks.tap;
    case 'blank':
    case 'zero':
    case 'freeSwing':
    case 'weight':
    case 'period': return inks.blank;
  }
}

/** Half-size of the marks for the room that each has along x, CSS px. */
export function markSize(plotWidth: number, marks: number): number {
  return Math.max(SMALLEST_MARK, Math.min(LARGEST_MARK, (plotWidth / Math.max(marks, 1)) * 0.35));
}

/** Outline of one sign around a centre, canvas px. */
export function traceSign(path: Path2D, mark: Mark, x: number, y: number, size: number): void {
  if (mark.missing) {
    path.moveTo(x - size, y - size);
    path.lineTo(x + size, y + size);
    path.moveTo(x + size, y - size);
    path.lineTo(x - size, y + size);
    return;
  }
  switch (mark.kind) {
    case 'shot':
      path.moveTo(x + size, y);
      path.arc(x, y, size, 0, 2 * Math.PI);
      break;
    case 'tap':
      path.moveTo(x, y - 1.2 * size);
      path.lineTo(x + 1.15 * size, y + 0.85 * size);
      path.lineTo(x - 1.15 * size, y + 0.85 * size);
      path.closePath();
      break;
    case 'blank':
      path.rect(x - 0.9 * size, y - 0.9 * size, 1.8 * size, 1.8 * size);
      break;
    case 'weight':
      path.rect(x - 0.9 * size, y - 0.4 * size, 1.8 * size, 1.3 * size);
      break;
    case 'period':
      path.moveTo(x + size, y);
      path.arc(x, y, size, 0, 2 * Math.PI);
      break;
    case 'zero':
      path.moveTo(x, y - 1.4 * size);
      path.lineTo(x, y + 1.4 * size);
      break;
    case 'freeSwing':
      path.moveTo(x - 1.4 * size, y);
      path.bezierCurveTo(x - 0.9 * size, y - 2 * size, x - 0.5 * size, y - 2 * size, x, y);
      path.bezierCurveTo(x + 0.5 * size, y + 1.4 * size, x + 0.9 * size, y + 1.4 * size, x + 1.4 * size, y);
      break;
  }
}

/** The stroke through a sign that is set aside, canvas px. */
function traceStrike(path: Path2D, x: number, y: number, size: number): void {
  path.moveTo(x - 1.9 * size, y + 1.9 * size);
  path.lineTo(x + 1.9 * size, y - 1.9 * size);
}

/** Where a mark is drawn, canvas px: at its place, or just inside the edge where its place is off the axes. */
function placeOf(u: uPlot, mark: Mark, size: number): { readonly x: number; readonly y: number; readonly isOff: boolean } {
  const room = 1.5 * size;
  const { left, top, width, height } = u.bbox;
  const [x, y] = [u.valToPos(mark.x, 'x', true), u.valToPos(mark.y, 'y', true)];
  const isOff = x < left || x > left + width || y < top || y > top + height;
  if (!isOff) return { x, y, isOff };
  return { x: Math.max(left + room, Math.min(left + width - room, x)), y: Math.max(top + room, Math.min(top + height - room, y)), isOff };
}

/** One path of every thick whisker of a group. */
function ownPath(u: uPlot, marks: readonly Mark[], group: Group): uPlot.Series.Paths {
  const stroke = new Path2D();
  for (const index of group.members) {
    const mark = marks[index];
    if (mark === undefined || mark.own === 0 || placeOf(u, mark, 0).isOff) continue;
    const x = u.valToPos(mark.x, 'x', true);
    stroke.moveTo(x, u.valToPos(mark.y - mark.own, 'y', true));
    stroke.lineTo(x, u.valToPos(mark.y + mark.own, 'y', true));
  }
  return { stroke, fill: null, clip: null, flags: 0 };
}

/** One path of every thin whisker, sign and strike of a group, and one of what is filled. */
function signPath(u: uPlot, marks: readonly Mark[], group: Group, pixels: number): uPlot.Series.Paths {
  const stroke = new Path2D();
  const fill = new Path2D();
  const size = markSize(u.bbox.width / pixels, marks.length) * pixels;
  for (const index of group.members) {
    const mark = marks[index];
    if (mark === undefined) continue;
    const { x, y, isOff } = placeOf(u, mark, size);
    if (mark.whisker > 0 && !isOff) {
      whisker(stroke, x, y, size, u.valToPos(mark.y + mark.whisker, 'y', true), u.valToPos(mark.y - mark.whisker, 'y', true));
    }
    if (mark.across > 0 && !isOff) {
      stroke.moveTo(u.valToPos(mark.x - mark.across, 'x', true), y);
      stroke.lineTo(x - size, y);
      stroke.moveTo(x + size, y);
      stroke.lineTo(u.valToPos(mark.x + mark.across, 'x', true), y);
    }
    traceSign(stroke, mark, x, y, size);
    if (mark.setAside) traceStrike(stroke, x, y, size);
    traceSign(fill, mark, x, y, size);
  }
  return { stroke, fill, clip: null, flags: 0 };
}

/** The two ends of a whisker, each from the edge of the sign outward, with short caps. */
function whisker(path: Path2D, x: number, y: number, size: number, top: number, bottom: number): void {
  if (y - top > size) {
    path.moveTo(x, y - size);
    path.lineTo(x, top);
  }
  if (bottom - y > size) {
    path.moveTo(x, y + size);
    path.lineTo(x, bottom);
  }
  for (const end of [top, bottom]) {
    path.moveTo(x - 0.7 * size, end);
    path.lineTo(x + 0.7 * size, end);
  }
}

/** Columns and series for marks: each group has its thick whiskers first and its signs over them. */
export function markSeries(marks: readonly Mark[], inks: Inks): { readonly columns: uPlot.AlignedData; readonly series: uPlot.Series[] } {
  const columns: [number[], ...(number | null)[][]] = [marks.map((mark) => mark.x)];
  const series: uPlot.Series[] = [{}];
  for (const group of groupsOf(marks)) {
    const members = new Set(group.members);
    const column = marks.map((mark, index) => (members.has(index) ? mark.y : null));
    const ink = group.missing ? inks.look : group.setAside ? inks.quiet : inkOf(group.kind, inks);
    const hollow = group.setAside || group.kind === 'blank';
    columns.push(column, column);
    series.push(
      { label: `${group.kind}, own part`, stroke: ink, width: OWN_WIDTH, cap: 'butt', points: { show: false }, paths: (u) => ownPath(u, marks, group) },
      {
        label: group.kind,
        stroke: ink,
        width: group.kind === 'zero' || group.kind === 'freeSwing' || hollow ? 1.5 : 1,
        fill: hollow ? inks.paper : group.kind === 'freeSwing' ? 'transparent' : ink,
        points: { show: false },
        paths: (u) => signPath(u, marks, group, devicePixelRatio),
      },
    );
  }
  return { columns, series };
}
