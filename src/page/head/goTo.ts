/** Where on the sheet a problem is settled, and the way there. */
import type { Place, Problem, ProblemCode } from '../../problems/problems.ts';

/** Problems of the whole run carry no place of their own: the field, choice or section that settles them. */
const SETTLED_AT: Partial<Record<ProblemCode, string>> = {
  'all-throws-negative': 'choice-scaleRunsBackward',
  'all-on-one-division': 'entry-division',
  'division-from-readings': 'entry-division',
  'scatter-below-reading': 'entry-readingSpread',
  'forms-differ': 'calibration',
  'damping-none': 'choice-dampingWay',
  'damping-from-few': 'choice-dampingWay',
  'damping-carried-over': 'choice-dampingWay',
  'period-differs': 'entry-period',
  'bench-unstable': 'bench-heading',
  'bench-inertia-not-positive': 'choice-route',
  'shots-beyond-taps': 'calibration',
  'taps-scatter-more-than-stated': 'calibration',
  'calibrations-differ': 'calibration',
};

/** Id of the element that settles a problem, the nearest that is known; null for a record, which is opened instead. */
export function placeOf(problem: Problem): string | null {
  if (problem.place.entry !== undefined) return `entry-${problem.place.entry}`;
  if (problem.place.record !== undefined) return null;
  return SETTLED_AT[problem.code] ?? 'readings-heading';
}

/** A few words for the link: where it leads. */
export function placeWords({ entry, record, sheetName, line, column }: Place): string {
  if (entry !== undefined) return 'to the field';
  if (record !== undefined) return 'open the record';
  const words = [sheetName, line === undefined ? undefined : `line ${line}`, column === undefined ? undefined : `column ${column}`];
  const known = words.filter((word) => word !== undefined && word !== '');
  return known.length === 0 ? 'settle it' : `to ${known.join(', ')}`;
}

/** Brings an element into view and gives it the focus; a section takes it by its heading. */
export function goToElement(id: string): void {
  const found = document.getElementById(id);
  if (found === null) return;
  const target = found.matches('section') ? (found.querySelector<HTMLElement>('h2') ?? found) : found;
  const field = target.matches('fieldset, label') ? (target.querySelector<HTMLElement>('input:checked, input') ?? target) : target;
  if (!field.matches('input, select, textarea, button, a, [tabindex]')) field.tabIndex = -1;
  field.scrollIntoView({ block: 'center' });
  field.focus({ preventScroll: true });
}
