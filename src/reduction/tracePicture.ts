/** A trace as the page draws it: the samples that the road takes, in single precision, with the extremes of their blocks. */
import { buildPyramid, type TracePicture } from '../numeric/minMaxPyramid.ts';
import type { Session } from '../session/session.ts';
import { readBench } from './entries.ts';
import { readTrace, type TraceLibrary } from './traceRead.ts';

/** Times that leave an even row by less than this part of the spacing are drawn as even. */
const EVEN = 0.01;

/** null where the session names no such trace, its bytes are not at hand, or there is nothing to draw. `transfer`: what may be given away. */
export function pictureOfTrace(session: Session, id: string, library: TraceLibrary): { readonly picture: TracePicture; readonly transfer: ArrayBuffer[] } | null {
  const trace = session.traces.find((one) => one.id === id);
  const samples = trace && readTrace(trace, library, session.choices, readBench(session)).samples;
  if (!samples) return null;
  const { t, x } = samples;
  const n = t.length;
  const step = (t[n - 1]! - t[0]!) / (n - 1);
  let even = true;
  for (let i = 1; i < n && even; i++) even = Math.abs(t[i]! - t[0]! - i * step) < EVEN * step;
  const values = Float32Array.from(x);
  const pyramid = buildPyramid(values);
  const times = even ? { from: t[0]!, step } : t.slice();
  return { picture: { times, values, pyramid }, transfer: [values, ...pyramid.levels.flatMap(({ low, high, lowAt, highAt }) => [low, high, lowAt, highAt])].map(({ buffer }) => buffer as ArrayBuffer).concat(times instanceof Float64Array ? [times.buffer] : []) };
}
