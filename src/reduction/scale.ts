/** The scale of the stand, from the way of reading and what was typed: lengths, the ruler's scale with its parallax, the plumb mark. */
import { anchor, exact, propagate, type Uncertain } from '../metrology/uncertain.ts';
import { parallaxScale, WAYS } from '../readings/ways.ts';
import type { Choices } from '../session/session.ts';
import { ENTRY_NAMES } from '../session/entries.ts';
import { hasPlumbMark, type BenchRead } from './entries.ts';
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
  return {
    way: choices.readingWay, stand, scale: rulerScale(bench, choices), mark: hasPlumbMark(choices) ? valueOf(bench, 'scaleMark') : null,
    sense: choices.scaleRunsBackward ? -1 : 1, sideToSide: choices.swingMeasured === 'sideToSide',
  };
}

/** s, with the shrinking of a pointer seen in front of its ruler: common to all readings. */
function rulerScale(bench: BenchRead, choices: Choices): Uncertain {
  const typed = valueOf(bench, 'scaleFactor') ?? exact(1);
  const gap = valueOf(bench, 'parallaxGap');
  const cameraDistance = valueOf(bench, 'cameraDistance');
  if (!gap || !cameraDistance || !choices.readingWay.startsWith('ruler')) return typed;
  return anchor(propagate(({ scale, ...parallax }) => scale * parallaxScale(parallax), { scale: typed, gap, cameraDistance }));
}
