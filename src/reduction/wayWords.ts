/** What each way of knowing the calibration factor is called, in chain, table and page. */
import type { Way } from './shots.ts';

/** Short, after "by" or "Calibration factor,". */
export const WAY_WORDS: Readonly<Record<Way, string>> = {
  geometry: 'geometry', taps: 'taps', addedMasses: 'masses hung and timed', weights: 'known weights', adjustment: 'adjustment of all evidence',
};

/** What it rests on. */
export const WAY_RESTS_ON: Readonly<Record<Way, string>> = {
  geometry: 'geometry and masses', taps: 'taps of known impulse', addedMasses: 'periods with masses hung', weights: 'deflections by known weights and a period', adjustment: 'least-squares adjustment of all evidence',
};
