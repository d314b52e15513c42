/** A reduction with nothing in it, for tests of what is around it. */
import type { Reduction } from '../../src/reduction/results.ts';

export function bareReduction(over: Partial<Reduction> = {}): Reduction {
  return {
    problems: [], entries: [], instruments: [], sheets: [], records: [], film: null, pressure: null, air: { shots: null, taps: null }, benchEffects: [], plan: null, gravity: null, configurations: { shots: null, taps: null }, damping: null,
    decay: null,
    periodCheck: null, calibrations: { geometry: null, taps: null }, chosen: 'geometry', chosenFactor: null, evidence: [], adjustment: null, weights: null, addedMasses: null, tapStudy: null, comparisons: [], forceRecords: [], traces: [], agreement: null, difference: null,
    runs: { geometry: null, taps: null }, run: null, delivered: null, thruster: null, reported: 'thruster', plume: 'carried', corrections: [], runWithSetAside: null, blanks: null, ranges: { taps: null, shots: null }, explained: null,
    ...over,
  };
}
