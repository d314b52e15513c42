/** The sections that show what was reduced: fetched after the sheet itself, so that it opens sooner, and before they are needed. */
import { lazy } from 'react';

const fetchStrip = () => import('./strip/RunStrip.tsx');
const fetchRecord = () => import('./record/RecordSection.tsx');
const fetchPlan = () => import('./plan/PlanSection.tsx');
const fetchCalibration = () => import('./calibration/CalibrationSection.tsx');
const fetchRun = () => import('./run/RunSection.tsx');
const fetchBudget = () => import('./budget/BudgetSection.tsx');
const fetchAtTheBench = () => import('./atTheBench/AtTheBenchSection.tsx');
const fetchTraces = () => import('./traces/TracesSection.tsx');
const fetchTable = () => import('./table/TableSection.tsx');

export const RunStrip = lazy(async () => ({ default: (await fetchStrip()).RunStrip }));
export const RecordSection = lazy(async () => ({ default: (await fetchRecord()).RecordSection }));
export const PlanSection = lazy(async () => ({ default: (await fetchPlan()).PlanSection }));
export const CalibrationSection = lazy(async () => ({ default: (await fetchCalibration()).CalibrationSection }));
export const RunSection = lazy(async () => ({ default: (await fetchRun()).RunSection }));
export const BudgetSection = lazy(async () => ({ default: (await fetchBudget()).BudgetSection }));
export const AtTheBenchSection = lazy(async () => ({ default: (await fetchAtTheBench()).AtTheBenchSection }));
export const TracesSection = lazy(async () => ({ default: (await fetchTraces()).TracesSection }));
export const TableSection = lazy(async () => ({ default: (await fetchTable()).TableSection }));

/** Fetches all of them, so that nothing is missing where the place that served the page is gone later. */
export async function fetchSections(): Promise<void> {
  await Promise.all([fetchStrip(), fetchRecord(), fetchPlan(), fetchCalibration(), fetchRun(), fetchBudget(), fetchAtTheBench(), fetchTraces(), fetchTable()]);
}
