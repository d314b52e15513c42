/** The evidence in plain numbers: every way's calibration factor beside the chosen one, the adjustment, the masses hung, and what a colleague would say of them. */
import { expanded, finiteSources } from '../metrology/coverage.ts';
import type { Adjusted } from '../metrology/adjustment.ts';
import { propagate, standardUncertainty, type Anchor, type Uncertain } from '../metrology/uncertain.ts';
import { unchangedDistance } from '../pendulum/calibrationMass.ts';
import { problem, type Problem } from '../problems/problems.ts';
import type { Choices } from '../session/session.ts';
import type { EvidenceFound } from './evidence.ts';
import { TIMING_WORDS } from './evidence.ts';
import { fired, type Factors } from './factors.ts';
import type { PlannedMass } from './planMass.ts';
import type { AddedMassesTold, AdjustmentTold, EvidenceId, EvidenceRow, TapStudy } from './evidenceResults.ts';
import { stated, type Run } from './run.ts';
import { geometryAnchor } from './shots.ts';
import type { Body, ByConfiguration } from './stand.ts';
import type { Timing } from './timings.ts';
import { WAY_WORDS } from './wayWords.ts';

export interface RowFacts {
  readonly choices: Choices;
  readonly factors: Factors;
  readonly run: Run | null;
  /** Bodies by each route that the entries allow. */
  readonly routes: Readonly<Record<Choices['route'], ByConfiguration<Body> | null>>;
  readonly found: EvidenceFound;
  readonly timings: readonly Timing[];
  readonly weights: number;
}

interface Candidate {
  readonly id: EvidenceId;
  readonly choice: EvidenceRow['choice'];
  readonly factor: Anchor | null;
  readonly readings: number;
}

const GROUP_ID = { before: 'tapsBefore', between: 'tapsBetween', after: 'tapsAfter' } as const;

function candidates({ choices, factors, routes, found, timings, weights }: RowFacts): readonly Candidate[] {
  const { tapCalibration, change } = factors;
  const shown = (body: ByConfiguration<Body> | null | undefined): Anchor | null => (body ? geometryAnchor(body.shots) : null);
  const groups = tapCalibration && tapCalibration.groups.length > 1 && change ? tapCalibration.groups : [];
  const timed = timings.reduce((sum, timing) => sum + timing.pooled.n, 0);
  const geometry: readonly Candidate[] =
    choices.form === 'filmStrip' ? [{ id: 'film', choice: { calibration: 'geometry' }, factor: factors.geometry.shots, readings: 0 }]
    : choices.form === 'periodAndStiffness' ? [{ id: 'stiffnessAndPeriod', choice: { calibration: 'geometry' }, factor: factors.geometry.shots, readings: 0 }]
    : (['masses', 'massesAndPeriod', 'inertiaAndPeriod'] as const).map((route) => ({
      id: route, choice: { calibration: 'geometry', route }, factor: choices.calibration === 'geometry' && choices.route === route ? factors.geometry.shots : shown(routes[route]), readings: 0,
    }));
  return [
    ...geometry,
    { id: weights > 0 ? 'weights' : 'stiffnessAndPeriod', choice: { calibration: 'weights' }, factor: choices.form === 'periodAndStiffness' && weights === 0 ? null : factors.weights.shots, readings: weights },
    { id: 'addedMasses', choice: { calibration: 'addedMasses' }, factor: factors.addedMasses.shots, readings: timed },
    { id: 'taps', choice: { calibration: 'taps' }, factor: factors.taps.shots, readings: tapCalibration?.pooled.n ?? 0 },
    ...groups.map((group): Candidate => ({ id: GROUP_ID[group.where], choice: null, factor: fired(group.factor, change!), readings: group.taps.length })),
    { id: 'adjustment', choice: { calibration: 'adjustment' }, factor: found.all?.status === 'adjusted' ? factors.adjustment.shots : null, readings: 0 },
  ];
}

export function evidenceRows(x: RowFacts): readonly EvidenceRow[] {
  const { choices, factors, run } = x;
  const chosen = factors[choices.calibration].shots;
  const finite = (y: Uncertain): ReturnType<typeof expanded> => expanded(y, finiteSources([y]));
  return candidates(x).flatMap(({ id, choice, factor, readings }): EvidenceRow[] => {
    if (!factor) return [];
    const isChosen = choice !== null && choice.calibration === choices.calibration && (choice.route === undefined || choice.route === choices.route);
    const mean = !run ? null : isChosen || !chosen ? run.mean : propagate(({ m, k, c }) => (m * k) / c, { m: run.mean, k: factor, c: chosen });
    return [{
      id, choice, readings, chosen: isChosen, factor: finite(factor), mean: mean && finite(mean),
      apart: isChosen || !chosen ? null : stated(propagate(({ k, c }) => k / c - 1, { k: factor, c: chosen })),
    }];
  });
}

/** Shifts of shared inputs worth a line, in u. */
const WORTH_A_LINE = 0.2;

export function adjustmentTold(all: Adjusted | null): AdjustmentTold | null {
  if (all === null) return null;
  const nothing: AdjustmentTold = { status: 'underdetermined', inertia: null, stiffness: null, ratio: null, chiSquared: 0, dof: 0, probability: null, items: [], pullsMost: null, moved: [] };
  if (all.status !== 'adjusted') return { ...nothing, status: all.status };
  const [J, kappa, zeta] = [all.unknowns['J']!, all.unknowns['kappa']!, all.unknowns['zeta']];
  const uK = standardUncertainty(propagate(({ j, k }) => Math.sqrt(j * k), { j: J, k: kappa })) / Math.sqrt(J.value * kappa.value);
  const items = all.items.map(({ id, label, deviation, without }) => ({ id, label, deviation, pull: without === null || uK === 0 ? null : (without['J']! + without['kappa']!) / 2 / uK }));
  const pulling = items.filter(({ deviation }) => deviation !== null).sort((a, b) => Math.abs(b.deviation!) - Math.abs(a.deviation!))[0];
  return {
    status: 'adjusted', inertia: stated(J), stiffness: stated(kappa), ratio: zeta ? stated(zeta) : null, chiSquared: all.chiSquared, dof: all.dof, probability: all.probability, items,
    pullsMost: pulling?.label ?? null,
    moved: all.moved.filter(({ source, shift }) => Math.abs(shift) > WORTH_A_LINE && source.family === undefined).map(({ source, shift }) => ({ label: source.label, shift })),
  };
}

export function addedMassesTold({ timed, bodies: { addedMasses: bodies }, negative }: EvidenceFound, timings: readonly Timing[], gravity: number, planned: PlannedMass | null): AddedMassesTold | null {
  if (!timings.some(({ hung }) => hung !== null)) return null;
  const deviations = new Map(timed?.status === 'adjusted' ? timed.items.map(({ id, deviation }) => [id, deviation]) : []);
  const rows = timings.map((timing) => ({ label: TIMING_WORDS(timing), timings: timing.pooled.n, period: stated(timing.period), deviation: deviations.get(`timing.${timing.id}`) ?? null }));
  const none = { inertia: null, stiffness: null, rows, sameRadius: null, better: null };
  if (negative) return { status: 'negative', ...none };
  if (timed === null) return { status: 'tooFew', ...none };
  if (timed.status !== 'adjusted') return { status: timed.status === 'underdetermined' ? 'tooFew' : 'notFound', ...none };
  if (!bodies) return { status: 'negative', ...none };
  const { inertia, stiffness } = bodies.shots;
  const heaviest = timings.flatMap(({ hung }) => (hung ? [hung.mass.value] : [])).sort((a, b) => b - a)[0] ?? 0;
  const best = planned?.places.reduce<PlannedMass['places'][number] | null>((a, b) => (a === null || b.inertiaTo < a.inertiaTo ? b : a), null) ?? null;
  return {
    status: 'found', inertia: stated(inertia), stiffness: stated(stiffness), rows,
    sameRadius: heaviest > 0 ? unchangedDistance({ inertia: inertia.value, stiffness: stiffness.value, g: gravity, mass: heaviest, ownInertia: 0 }) : null,
    better: best && { radius: best.distance, uInertia: best.inertiaTo },
  };
}

/** u(J)/J beyond which masses hung have told little (methods 1.8: beyond about 1 %). */
const TELLS_LITTLE = 0.02;
const DRIFTED = 2;
/** Chance below which a line is said to miss the origin, to bend, or evidence to contradict itself. */
const UNLIKELY = 0.05;

export interface EvidenceRemarks {
  readonly choices: Choices;
  readonly chosenKnown: boolean;
  readonly anyShots: boolean;
  readonly study: TapStudy | null;
  readonly adjustment: AdjustmentTold | null;
  readonly masses: AddedMassesTold | null;
  readonly runRelativeU: number | null;
}

export function evidenceRemarks({ choices, chosenKnown, anyShots, study, adjustment, masses, runRelativeU }: EvidenceRemarks): readonly Problem[] {
  const found: Problem[] = [];
  const way = choices.calibration;
  if (!chosenKnown && anyShots && way !== 'geometry' && way !== 'taps') found.push(problem('chosen-evidence-missing', 'stops', {}, { way: `by ${WAY_WORDS[way]}` }));
  if (study) {
    const byTaps = way === 'taps' ? 'doubt' : 'note';
    if (study.sizes === 1 && study.taps > 1) found.push(problem('taps-one-size', byTaps, {}, { taps: study.taps }));
    if (study.intercept && study.intercept.probability < UNLIKELY && choices.tapLine === 'throughOrigin') found.push(problem('taps-intercept', byTaps, {}, { t: study.intercept.t, percent: 100 * study.intercept.probability }));
    if (study.curvature && study.curvature.probability < UNLIKELY / 5) found.push(problem('taps-curved', byTaps, {}, { t: study.curvature.t, percent: 100 * study.curvature.probability }));
    const { drift } = study;
    if (drift && Math.abs(drift.inU) > DRIFTED && choices.tapDrift === 'together') {
      found.push(problem('taps-drifted', byTaps, {}, { from: drift.from, to: drift.to, percent: 100 * drift.relative.value, inU: drift.inU }, runRelativeU ? drift.relative.value / 2 / runRelativeU : undefined));
    }
  }
  if (masses?.status === 'negative') found.push(problem('masses-inertia-negative', 'doubt', {}, {}));
  if (masses?.status === 'found' && masses.inertia && masses.inertia.u > TELLS_LITTLE * masses.inertia.value) {
    const better = masses.better && masses.better.uInertia < masses.inertia.u / masses.inertia.value ? { better: masses.better.radius, betterPercent: 100 * masses.better.uInertia } : {};
    found.push(problem('masses-tell-little', way === 'addedMasses' ? 'doubt' : 'note', {}, { percent: (100 * masses.inertia.u) / masses.inertia.value, ...better }));
  }
  if (adjustment && adjustment.status === 'adjusted' && adjustment.probability !== null && adjustment.probability < UNLIKELY) {
    const worst = adjustment.items.find(({ label }) => label === adjustment.pullsMost);
    found.push(problem('evidence-contradicts', way === 'adjustment' ? 'doubt' : 'note', {}, { chiSquared: adjustment.chiSquared, dof: adjustment.dof, percent: 100 * adjustment.probability, ...(worst?.deviation ? { item: worst.label, deviation: worst.deviation } : {}) }));
  }
  return found;
}

