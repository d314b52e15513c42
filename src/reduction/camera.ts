/** A camera's track of a marker: the arc that it draws, how the swing leans in the picture, and the stated scale against the radius in pixels. */
import { ofSource, propagate, standardUncertainty, type Uncertain } from '../metrology/uncertain.ts';
import { problem, type Problem } from '../problems/problems.ts';
import { pictureAngle } from '../readings/ways.ts';
import type { Choices } from '../session/session.ts';
import { fitArc, leanOf, type Arc, type ArcResult } from '../traces/cameraTrack.ts';
import { spikeSpans, maskOf } from '../traces/faults.ts';
import type { BenchRead } from './entries.ts';
import { valueOf } from './stand.ts';
import type { CameraTold } from './traceResults.ts';

/** Where the pivot is known from. */
export type PivotBy = 'tracked' | 'typed' | 'arc' | 'none';

export interface CameraTrack {
  readonly arc: ArcResult;
  readonly pivotBy: PivotBy;
}

export interface Picture {
  readonly across: Float64Array;
  readonly down: Float64Array;
  readonly pivotAcross: Float64Array | number | null;
  readonly pivotDown: Float64Array | number | null;
}

const at = (of: Float64Array | number, i: number): number => (typeof of === 'number' ? of : of[i]!);

/** The arc about a pivot that may be tracked; a marker that was lost for some frames does not bend it. */
export function trackOf(t: Float64Array, { across, down, pivotAcross, pivotDown }: Picture): CameraTrack {
  const use = maskOf(t, [...spikeSpans(t, across), ...spikeSpans(t, down)]);
  if (pivotAcross === null || pivotDown === null) return { arc: fitArc(across, down, use), pivotBy: 'none' };
  const isTracked = typeof pivotAcross !== 'number' || typeof pivotDown !== 'number';
  return { arc: fitArc(across.map((u, i) => u - at(pivotAcross, i)), down.map((v, i) => v - at(pivotDown, i)), use), pivotBy: isTracked ? 'tracked' : 'typed' };
}

/** Angle of each frame about the pivot; where none is told, about the centre of the marker's own arc. null where that is too short. */
export function anglesOf(t: Float64Array, picture: Picture): { readonly x: Float64Array; readonly camera: CameraTrack } | null {
  const camera = trackOf(t, picture);
  const { across, down } = picture;
  let { pivotAcross, pivotDown } = picture;
  if (pivotAcross === null || pivotDown === null) {
    if (camera.arc.status !== 'fitted') return null;
    [pivotAcross, pivotDown] = camera.arc.centre;
  }
  const [pu, pv] = [pivotAcross, pivotDown];
  return { x: across.map((u, i) => pictureAngle({ across: u, down: down[i]!, pivotAcross: at(pu, i), pivotDown: at(pv, i) })), camera: camera.pivotBy === 'none' ? { ...camera, pivotBy: 'arc' } : camera };
}

/** Angles about a centre that is wrong along the radius are off by its part of the radius, all alike. */
export function scaleOfArc(id: string, camera: CameraTrack | null): Uncertain | null {
  if (camera?.pivotBy !== 'arc' || camera.arc.status !== 'fitted') return null;
  const { radius, uRadius } = camera.arc;
  return { ...ofSource({ id: `${id}.arc`, label: 'Radius of the marker’s arc', symbol: 'r_px', dimension: 'number', estimate: 1, u: uRadius / radius, distribution: 'normal', dof: Infinity }), value: 1 };
}

/** Leans of less than this are not told, rad; a difference from the stated scale of fewer u neither. */
const LEANS = 0.035;
const DIFFERS = 2;

/** `rest`: the rest line in the middle of the record, px or rad as the way reads. */
export function cameraTold({ arc, pivotBy }: CameraTrack, rest: number, { readingWay }: Choices, bench: BenchRead): CameraTold {
  if (arc.status !== 'fitted') return { radius: null, span: 0, lean: readingWay === 'cameraPivotMarker' ? { value: rest, u: 0 } : null, pivotBy, against: null };
  return { radius: { value: arc.radius, u: arc.uRadius }, span: arc.span, lean: leanAt(arc, rest, readingWay, pivotBy), pivotBy, against: against(arc, bench) };
}

function leanAt(arc: Arc, rest: number, way: Choices['readingWay'], pivotBy: PivotBy): CameraTold['lean'] {
  if (way === 'cameraPivotMarker' && pivotBy !== 'arc') return { value: rest, u: 0 };
  const [a, b] = arc.centre;
  const place: readonly [number, number] = way === 'cameraPivotMarker' ? [a + arc.radius * Math.sin(rest), b + arc.radius * Math.cos(rest)] : [rest, b + Math.sqrt(Math.max(0, arc.radius ** 2 - (rest - a) ** 2))];
  return leanOf(arc, place);
}

/** Radius in the picture over scale times radius at the bench; null where either was not typed. */
function against({ radius, uRadius }: Arc, bench: BenchRead): CameraTold['against'] {
  const [scale, stated] = [valueOf(bench, 'pixelScale'), valueOf(bench, 'readingRadius')];
  if (!scale || !stated) return null;
  const ratio = propagate(({ s, r }) => radius / (s * r), { s: scale, r: stated });
  const u = Math.hypot(standardUncertainty(ratio), (ratio.value * uRadius) / radius);
  return { ratio: { value: ratio.value, u }, inU: u > 0 ? (ratio.value - 1) / u : 0 };
}

export function cameraRemarks(name: string, { lean, against: compared }: CameraTold, way: Choices['readingWay']): readonly Problem[] {
  const place = { sheetName: name };
  return [
    ...(compared && Math.abs(compared.inU) > DIFFERS ? [problem('trace-camera-scale-differs', 'doubt', place, { percent: 100 * (compared.ratio.value - 1), inU: Math.abs(compared.inU) })] : []),
    ...(way === 'cameraMarker' && lean && Math.abs(lean.value) > Math.max(LEANS, DIFFERS * lean.u) ? [problem('trace-camera-leans', 'doubt', place, { degrees: (180 / Math.PI) * lean.value, percent: 100 * (1 - Math.cos(lean.value)) })] : []),
  ];
}
