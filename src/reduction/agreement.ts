/** Does the bench agree with itself? What was measured beside what masses and lengths predict of it. */
import { anchor, propagate, standardUncertainty } from '../metrology/uncertain.ts';
import { naturalFrequency } from '../pendulum/forms.ts';
import { peakTimeOfSmall } from '../pendulum/launch.ts';
import { problem, type Problem } from '../problems/problems.ts';
import { entry, type Choices, type Session } from '../session/session.ts';
import { stiffnessAs } from './evidence.ts';
import { groundOf, type Ground, type GroundRecords } from './ground.ts';
import type { Agreement, AgreementCheck } from './evidenceResults.ts';
import { stated } from './run.ts';
import { readSheets, type SessionRecord } from './sheets.ts';
import { isOff, partOf, slipsThatReconcile, withoutSpreads, type Check } from './slips.ts';
import { periodOfBody, typedStiffness, valueOf } from './stand.ts';

/** What was measured against what masses and lengths predict; of a body known otherwise, nothing. */
export function checksOf(choices: Choices, { bench, stand: { masses }, change, period, weights, damping, known }: Ground): readonly Check[] {
  if (!masses) return [];
  const tapFactor = known[choices.swingForm].tapCalibration?.asTaken ?? null;
  const checks: Check[] = [];
  if (period) checks.push({ id: 'period', measured: period, predicted: periodOfBody(masses[choices.periodTimedAs]) });
  const typed = choices.form === 'periodAndStiffness' ? null : typedStiffness(bench);
  const kappa = typed ?? (weights && change && stiffnessAs(weights.stiffness, choices.weightsHungAs, 'shots', change));
  if (kappa) checks.push({ id: 'stiffness', measured: kappa, predicted: masses.shots.stiffness });
  const peak = valueOf(bench, 'firstMaximumTime');
  if (peak && choices.dampingWay !== 'maximumTime') {
    const frequency = propagate(naturalFrequency, { inertia: masses.shots.inertia, stiffness: masses.shots.stiffness });
    checks.push({ id: 'maximumTime', measured: peak, predicted: propagate(({ w, z }) => peakTimeOfSmall(z) / w, { w: frequency, z: damping.ratio.shots }) });
  }
  if (tapFactor) checks.push({ id: 'taps', measured: tapFactor, predicted: anchor(propagate(({ J, k }) => Math.sqrt(J * k), { J: masses.taps.inertia, k: masses.taps.stiffness })) });
  return checks;
}

export function checkTold(check: Check): AgreementCheck {
  const gap = partOf(check);
  const u = standardUncertainty(gap);
  return { id: check.id, measured: stated(check.measured), predicted: stated(check.predicted), relative: stated(gap), inU: u === 0 ? 0 : gap.value / u };
}

/** Damping once found from swings stays: no slip of the pen moves it by what matters here. */
function withDampingKnown(session: Session, { damping: { way, law, ratio, quadratic, friction } }: Ground): Session {
  if (way !== 'swings') return session;
  const known = law === 'quadratic' ? { name: 'quadraticDamping', text: String(quadratic.shots.value) } as const : law === 'friction' ? { name: 'frictionAngle', text: `${friction.shots.value} rad` } as const : { name: 'dampingRatio', text: String(ratio.shots.value) } as const;
  return { ...session, choices: { ...session.choices, dampingWay: law === 'viscous' ? 'ratio' : law }, entries: { ...session.entries, [known.name]: entry(known.text) } };
}

/** Records that the checks rest on, and as many of the taps as tell a factor: each slip goes along the road once. */
const TAPS_ENOUGH = 6;

function recordsForChecks(records: readonly SessionRecord[], counts: (record: SessionRecord) => boolean): ReadonlySet<string> {
  let taps = 0;
  return new Set(records.filter((record) => {
    if (!counts(record)) return false;
    if (record.kind === 'tap') return (taps += 1) <= TAPS_ENOUGH;
    return record.kind === 'zero' || record.kind === 'weight' || record.kind === 'period' || record.swingsTime !== null;
  }).map(({ id }) => id));
}

export function agreementOf(session: Session, ground: Ground, { records, counts, library }: Pick<GroundRecords, 'records' | 'counts' | 'library'>): Agreement | null {
  const checks = checksOf(session.choices, ground);
  if (checks.length === 0) return null;
  const off = checks.filter(isOff).map(({ id }) => id);
  if (off.length === 0) return { checks: checks.map(checkTold), off, slips: [] };
  const kept = recordsForChecks(records, counts);
  const again = (slipped: Session): readonly Check[] => {
    // Texts are cut once and kept; only the columns that a slip renames are read anew.
    const few = (slipped.sheets === session.sheets ? records : readSheets(slipped).records).filter(({ id }) => kept.has(id));
    return checksOf(slipped.choices, groundOf(slipped, { records: few, counts, counted: few, exactly: true, ...(library ? { library } : {}) }, []));
  };
  return { checks: checks.map(checkTold), off, slips: slipsThatReconcile({ asTyped: session, bare: withDampingKnown(withoutSpreads(session), ground) }, checks, off, again) };
}

/** What a colleague says on looking over one's shoulder. */
export function agreementRemark(agreement: Agreement | null): readonly Problem[] {
  if (agreement === null || agreement.off.length === 0) return [];
  const [first, ...others] = agreement.slips;
  const edit = first?.edit;
  return [problem('bench-disagrees', 'doubt', edit?.is === 'entry' ? { entry: edit.name } : {}, {
    off: agreement.off.join(' '), slips: agreement.slips.length, ...(first ? { slip: first.id, what: first.what, from: first.from, to: first.to } : {}), ...(others[0] ? { other: others[0].id, otherWhat: others[0].what, otherTo: others[0].to } : {}),
  })];
}
