/** Where on the sheet a problem is settled, and the way there. */
import type { Problem, ProblemCode } from '../../problems/problems.ts';
import { sheetElement } from '../readings/sheetRows.ts';

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
  'swings-grow': 'choice-dampingWay',
  'swings-never-cross-rest': 'choice-dampingWay',
  'period-differs': 'entry-period',
  'bench-unstable': 'bench-heading',
  'bench-inertia-not-positive': 'choice-route',
  'shots-beyond-taps': 'calibration',
  'taps-scatter-more-than-stated': 'calibration',
  'calibrations-differ': 'calibration',
  'pressures-mixed': 'choice-gaugeMeaning',
  'gauge-meaning-unclear': 'choice-gaugeMeaning',
  'not-a-vacuum-figure': 'choice-gaugeMeaning',
};

const isOfACell = ({ code, place }: Problem): boolean => place.sheet !== undefined && (code.startsWith('cell-') || place.record === undefined);

/** Problems that stand with a record and are settled on the bench, for all records at once. */
const SETTLED_ON_THE_BENCH: ReadonlySet<ProblemCode> = new Set<ProblemCode>(['gauge-meaning-unclear']);

/** A few words for the link: where it leads. */
export function placeWords(problem: Problem): string {
  if (SETTLED_ON_THE_BENCH.has(problem.code)) return 'settle it';
  if (problem.place.entry !== undefined) return 'to the field';
  if (isOfACell(problem)) return problem.place.record === undefined ? 'to the sheet' : 'to the cell';
  return problem.place.record === undefined ? 'settle it' : 'open the record';
}

function goTo(found: HTMLElement | null): void {
  if (found === null) return;
  const target = found.matches('section, article') ? (found.querySelector<HTMLElement>('h2, h3') ?? found) : found;
  const field = target.matches('fieldset, label') ? (target.querySelector<HTMLElement>('input:checked, input') ?? target) : target;
  if (!field.matches('input, select, textarea, button, a, [tabindex]')) field.tabIndex = -1;
  for (let fold = field.closest('details'); fold !== null; fold = fold.parentElement?.closest('details') ?? null) fold.open = true;
  field.scrollIntoView({ block: 'center' });
  field.focus({ preventScroll: true });
}

/** Brings an element into view and gives it the focus; a section takes it by its heading, a choice by what is chosen. */
export const goToElement = (id: string): void => goTo(document.getElementById(id));

/** The faulty cell of the selected record, else its row, else the sheet. */
function goToRow(sheet: string): void {
  const article = document.getElementById(sheetElement(sheet));
  const row = article?.querySelector('tr[aria-selected="true"]');
  goTo(row?.querySelector<HTMLElement>('[aria-invalid="true"]') ?? row?.querySelector<HTMLElement>('[data-spot]') ?? article ?? document.getElementById('readings-heading'));
}

/** Goes to where a problem is settled: its field, its cell, its record, or the choice or section that settles it. */
export function goToProblem(problem: Problem, select: (record: string) => void): void {
  const { entry, sheet, record } = problem.place;
  if (SETTLED_ON_THE_BENCH.has(problem.code)) {
    goToElement(SETTLED_AT[problem.code] ?? 'bench-heading');
    return;
  }
  if (entry !== undefined) {
    goToElement(`entry-${entry}`);
    return;
  }
  if (record !== undefined) select(record);
  if (sheet !== undefined && isOfACell(problem)) {
    // The grid brings the selected record's row into sight first.
    requestAnimationFrame(() => requestAnimationFrame(() => goToRow(sheet)));
    return;
  }
  goToElement(record === undefined ? (SETTLED_AT[problem.code] ?? 'readings-heading') : 'record');
}
