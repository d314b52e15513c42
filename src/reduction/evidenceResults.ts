/** Results of the calibration's evidence: every way of knowing K, the adjustment, weights, masses hung, the taps as a line, and whether the bench agrees with itself. */
import type { Role } from '../readings/meanings.ts';
import type { Session } from '../session/session.ts';
import type { Result, Stated } from './results.ts';

export type EvidenceId = 'masses' | 'massesAndPeriod' | 'inertiaAndPeriod' | 'stiffnessAndPeriod' | 'film' | 'addedMasses' | 'weights' | 'taps' | 'tapsBefore' | 'tapsBetween' | 'tapsAfter' | 'adjustment';

/** One way of knowing the calibration factor of the pendulum as fired, beside the one that counts. */
export interface EvidenceRow {
  readonly id: EvidenceId;
  /** What choosing it sets; null: shown only. */
  readonly choice: { readonly calibration: Session['choices']['calibration']; readonly route?: Session['choices']['route'] } | null;
  readonly chosen: boolean;
  /** K, N·m·s/rad. */
  readonly factor: Result;
  /** Taps, timings or weights that it rests on; 0 where it rests on entries alone. */
  readonly readings: number;
  /** (this − chosen)/chosen, with the u of that difference: what both share cancels; null of the chosen one. */
  readonly apart: Stated | null;
  /** Run mean that it gives, N·s. */
  readonly mean: Result | null;
}

/** The least-squares adjustment of all evidence. */
export interface AdjustmentTold {
  readonly status: 'adjusted' | 'underdetermined' | 'notConverged' | 'contradictory';
  readonly inertia: Stated | null;
  readonly stiffness: Stated | null;
  readonly ratio: Stated | null;
  readonly chiSquared: number;
  readonly dof: number;
  /** Chance of a χ² as large or larger. */
  readonly probability: number | null;
  readonly items: readonly AdjustedItem[];
  /** Item that lies farthest from what the others say of it, in the u of that. */
  readonly pullsMost: string | null;
  /** Shared inputs that the adjustment moves by more than a fifth of their u, largest first: shift in u. */
  readonly moved: readonly { readonly label: string; readonly shift: number }[];
}

export interface AdjustedItem {
  readonly id: string;
  readonly label: string;
  /** Normalised deviation; null where no other item checks it. */
  readonly deviation: number | null;
  /** Change of K if the item were left out, in u(K); null where the rest does not tell K. */
  readonly pull: number | null;
}

/** Deflections by known weights. */
export interface WeightsTold {
  readonly weights: number;
  /** κ, N·m/rad, of the configuration they hung on. */
  readonly stiffness: Stated;
  /** Intercept over its u. */
  readonly interceptInU: number;
  /** Half-width between loading and unloading, rad; null without both. */
  readonly hysteresis: number | null;
  /** (b_unloading − b_loading)/(b_unloading + b_loading): a pulley’s friction; null without two weights in each. */
  readonly slopesPart: number | null;
  readonly chiSquared: number;
  readonly dof: number;
  readonly points: readonly { readonly record: string; readonly moment: number; readonly angle: number; readonly unloading: boolean; readonly residual: number }[];
}

/** Periods with masses hung, of one configuration. */
export interface AddedMassesTold {
  readonly status: 'found' | 'tooFew' | 'negative' | 'notFound';
  readonly inertia: Stated | null;
  readonly stiffness: Stated | null;
  readonly rows: readonly { readonly label: string; readonly timings: number; readonly period: Stated; readonly deviation: number | null }[];
  /** Radius at which a small mass does not change the period, m. */
  readonly sameRadius: number | null;
  /** Where to hang the mass instead, m, where its place tells little; else null. */
  readonly better: { readonly radius: number; readonly uInertia: number } | null;
}

/** The taps as a line. */
export interface TapStudy {
  readonly taps: number;
  /** Different sizes, and sides of rest that they threw to. */
  readonly sizes: number;
  readonly sides: number;
  /** About the line through the origin, by what belongs to each tap. */
  readonly chiSquared: number;
  readonly dof: number;
  readonly probability: number | null;
  /** √(χ²/ν) where above 1. */
  readonly widened: number;
  readonly intercept: { readonly t: number; readonly probability: number } | null;
  readonly curvature: { readonly t: number; readonly probability: number } | null;
  /** Relative sd of repeated taps of one size; null without repeats. */
  readonly repeatability: { readonly relative: number; readonly dof: number; /** What the taps' own u predict. */ readonly expected: number; readonly probability: number | null } | null;
  /** Change of the taps' slope from first to last, relative, tested against none. */
  readonly alongRun: { readonly relative: number; readonly t: number; readonly probability: number } | null;
  /** Runs of one sign among the residuals in order. */
  readonly runs: { readonly runs: number; readonly expected: number; readonly probability: number } | null;
  /** Residual in its u; place in the run: order, or s where all have a time. */
  readonly points: readonly { readonly record: string; readonly place: number; readonly residual: number; readonly leverage: number }[];
  readonly groups: readonly { readonly where: 'before' | 'between' | 'after'; readonly taps: number; readonly factor: Stated }[];
  /** byMean: K with half the range as limits; atFirst, atLast: K interpolated to the first and the last shot. */
  readonly drift: { readonly from: string; readonly to: string; readonly relative: Stated; readonly inU: number; readonly byMean: Stated; readonly atFirst: Stated; readonly atLast: Stated } | null;
}

/** The pendulum after taps, brought to that as fired, and after shots. */
export interface Comparison {
  readonly id: 'damping' | 'period' | 'maximumTime';
  readonly taps: Stated;
  readonly shots: Stated;
  /** (shots − taps)/taps. */
  readonly relative: Stated;
  readonly inU: number;
}

/** One thing that was measured and that masses and lengths predict. */
export interface AgreementCheck {
  readonly id: 'period' | 'stiffness' | 'maximumTime' | 'taps';
  /** s, N·m/rad, s, N·m·s/rad. */
  readonly measured: Stated;
  readonly predicted: Stated;
  /** measured/predicted − 1, with the u of that. */
  readonly relative: Stated;
  readonly inU: number;
}

/** One edit of the session that a slip would be mended by. */
export type SlipEdit =
  | { readonly is: 'entry'; readonly name: string; readonly text: string }
  | { readonly is: 'choice'; readonly name: 'swingMeasured'; readonly value: Session['choices']['swingMeasured'] }
  /** role null: as it is. */
  | { readonly is: 'column'; readonly sheet: string; readonly indices: readonly number[]; readonly role: Role | null; readonly unit: string };

export type SlipId =
  | 'lengthUnit' | 'massUnit' | 'inertiaUnit' | 'diameterForRadius' | 'radiusForDiameter' | 'tipForArm' | 'degreesForRadians' | 'radiansForDegrees' | 'beamAngle' | 'halfBeamAngle' | 'sideToSide' | 'fromRest'
  | 'halfPeriod' | 'manySwings' | 'halfCycles' | 'impulseUnit' | 'weightUnit' | 'stiffnessUnit' | 'reboundForFollow' | 'followForRebound';

/** A single slip that would reconcile the numbers. */
export interface Slip {
  readonly id: SlipId;
  /** What it befell: label of an entry or a column. */
  readonly what: string;
  /** As typed, and as it would have to stand. */
  readonly from: string;
  readonly to: string;
  readonly edit: SlipEdit;
}

export interface Agreement {
  readonly checks: readonly AgreementCheck[];
  /** Checks that are off; empty where the bench agrees with itself. */
  readonly off: readonly AgreementCheck['id'][];
  /** Single slips that would reconcile all of them, the likeliest first; at most three are told. */
  readonly slips: readonly Slip[];
}

/** A record of the hammer's force and the pulses found in it. */
export interface ForceRecordTold {
  readonly id: string;
  readonly name: string;
  /** Impulse N·s over the whole answer; byContact N·s up to the first return to rest; peak N; time s. */
  readonly pulses: readonly { readonly impulse: Stated; readonly byContact: number; readonly peak: number; readonly time: number; readonly after: string }[];
}
