/** The scale of the stand, from the way of reading and what was typed: lengths, the ruler's scale with its parallax, the plumb mark. */
import type { Source } from '../metrology/source.ts';
import { anchor, exact, ofSource, propagate, type Anchor, type Uncertain } from '../metrology/uncertain.ts';
import { parallaxScale, WAYS } from '../readings/ways.ts';
import type { Choices } from '../session/session.ts';
import { ENTRY_NAMES } from '../session/entries.ts';
import { hasPlumbMark, type BenchRead } from './entries.ts';
import { timesScale } from './instruments.ts';
import { valueOf } from './stand.ts';
import type { Scale } from './swings.ts';

const SHAPES: Readonly<Record<Choices['screenShape'], number>> = { parallel: 0, square: 1, curved: 2 };

/** null where a length that the way needs is missing. */
export function scaleOf(bench: BenchRead, choices: Choices): Scale | null {
  const way = WAYS[choices.readingWay];
  const stand: Record<string, Uncertain> = {};
  for (const name of [...way.needs, ...Object.keys(way.mayHave)]) {
    const entry = ENTRY_NAMES.find((known) => known === name);
    const typed = entry === undefined ? null : valueOf(bench, entry);
    const otherwise = way.mayHave[name];
    if (!typed && otherwise === undefined) return null;
    stand[name] = name === 'screenShape' ? exact(SHAPES[choices.screenShape]) : (typed ?? exact(otherwise!));
  }
  const scale = rulerScale(bench, choices);
  return {
    way: choices.readingWay, stand, scale, bySheet: scalesBySheet(scale, bench), mark: hasPlumbMark(choices) ? valueOf(bench, 'scaleMark') : null,
    sense: choices.scaleRunsBackward ? -1 : 1, sideToSide: choices.swingMeasured === 'sideToSide',
  };
}

/** s of the sheets whose readings were read with an instrument that has a calibration ± of its own. */
function scalesBySheet(scale: Uncertain, bench: BenchRead): Scale['bySheet'] {
  const made = new Map<Anchor, Anchor>();
  return new Map([...bench.readWith].flatMap(([sheet, { factor }]) => {
    if (!factor) return [];
    if (!made.has(factor)) made.set(factor, timesScale(scale, factor));
    return [[sheet, made.get(factor)!] as const];
  }));
}

/** s of the readings of one sheet. */
export const scaleOfSheet = ({ scale, bySheet }: Scale, sheet: string): Uncertain => bySheet.get(sheet) ?? scale;

/** The lens's distortion over the picture: one relative uncertainty of all its readings. */
function withLens(scale: Uncertain, bench: BenchRead, { readingWay }: Choices): Uncertain {
  const u = bench.entries.get('lensDistortion')?.read.value ?? 0;
  if (readingWay !== 'cameraMarker' || !(u > 0)) return scale;
  const lens: Source = { id: 'lensDistortion', label: 'Distortion of the lens', symbol: 'u_k', dimension: 'number', estimate: 1, u, distribution: 'normal', dof: Infinity };
  return anchor(propagate(({ s, k }) => s * k, { s: scale, k: ofSource(lens) }));
}

/** s, with the shrinking of a pointer seen in front of its ruler: common to all readings. */
function rulerScale(bench: BenchRead, choices: Choices): Uncertain {
  const typed = withLens(valueOf(bench, 'scaleFactor') ?? exact(1), bench, choices);
  const gap = valueOf(bench, 'parallaxGap');
  const cameraDistance = valueOf(bench, 'cameraDistance');
  if (!gap || !cameraDistance || !choices.readingWay.startsWith('ruler')) return typed;
  return anchor(propagate(({ scale, ...parallax }) => scale * parallaxScale(parallax), { scale: typed, gap, cameraDistance }));
}
