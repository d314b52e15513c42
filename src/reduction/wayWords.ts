/** What each way of knowing the calibration factor is called, in chain, table and page. */
import type { EvidenceId } from './evidenceResults.ts';
import type { Way } from './shots.ts';

/** Short, after "by" or "Calibration factor,". */
export const WAY_WORDS: Readonly<Record<Way, string>> = {
  geometry: 'geometry', taps: 'taps', addedMasses: 'masses hung and timed', weights: 'known weights', adjustment: 'adjustment of all evidence',
};

/** What it rests on. */
export const WAY_RESTS_ON: Readonly<Record<Way, string>> = {
  geometry: 'geometry and masses', taps: 'taps of known impulse', addedMasses: 'periods with masses hung', weights: 'deflections by known weights and a period', adjustment: 'least-squares adjustment of all evidence',
};

/** Every row of the evidence, as an export names it. */
export const EVIDENCE_NAMES: Readonly<Record<EvidenceId, string>> = {
  masses: 'masses and lengths alone', massesAndPeriod: 'geometry and timed period (route A)', inertiaAndPeriod: 'inertia and timed period (route B)', stiffnessAndPeriod: 'static stiffness and period (route C)', film: 'modes of the film',
  addedMasses: 'masses hung and timed', weights: 'known weights and period', taps: 'taps', tapsBefore: 'taps before the firings', tapsBetween: 'taps between the firings', tapsAfter: 'taps after the firings', adjustment: 'adjustment of all evidence',
};
