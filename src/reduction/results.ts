/** What the road returns: plain values in SI units that survive a trip from a worker; screens and exports read this and nothing else. */
import type { TraceTold } from './traceResults.ts';
import type { Line } from '../metrology/budget.ts';
import type { DateRead } from '../units/calendarDate.ts';
import type { Dimension } from '../units/units.ts';
import type { Problem } from '../problems/problems.ts';
import type { RecordKind, Role } from '../readings/meanings.ts';
import type { Session } from '../session/session.ts';
import type { BenchEffectId } from '../problems/benchEffects.ts';
import type { AirLayer } from '../pendulum/gas.ts';
import type { GaugeMeaning } from '../pendulum/pressure.ts';
import type { DecayTold } from './decayLaws.ts';
import type { AddedMassesTold, AdjustmentTold, Agreement, Comparison, EvidenceRow, ForceRecordTold, TapStudy, WeightsTold } from './evidenceResults.ts';
import type { FilmTold } from './film.ts';
import type { Plan } from './plan.ts';

/** A value with its standard uncertainty, SI. */
export interface Stated {
  readonly value: number;
  readonly u: number;
}

/** A value with everything that a table prints: u, effective degrees of freedom ν (Infinity where none is finite), coverage factor k for 95 %, U = k·u. SI. */
export interface Result extends Stated {
  readonly dof: number;
  readonly k: number;
  readonly U: number;
}

/** How a bench entry was read: the echo that stands beside the field. */
export interface EntryRead {
  readonly name: string;
  readonly label: string;
  readonly symbol: string;
  readonly dimension: Dimension;
  /** null where nothing usable is typed. */
  readonly value: number | null;
  readonly u: number;
  readonly unit: string;
  readonly distribution: 'normal' | 'rectangular' | 'exact';
  /** The entry takes part in the present choices (an unused one is kept and greyed). */
  readonly used: boolean;
  /** What it was measured with, as a report states it, and u of x by that instrument's calibration, SI; not in `u`. */
  readonly measuredWith?: { readonly words: string; readonly u: number };
}

/** An instrument as its fields were read. */
export interface InstrumentTold {
  readonly id: string;
  /** "Steel ruler, serial 4711". */
  readonly name: string;
  /** null where nothing readable is typed. */
  readonly due: DateRead | null;
  /** Relative ± of its calibration; value null for none. */
  readonly scale: EntryRead;
}

/** One line of a chain: reading → angle → corrections → impulse bit. */
export interface ChainStep {
  readonly id: string;
  readonly label: string;
  readonly symbol: string;
  readonly equation: string;
  readonly dimension: Dimension;
  readonly stated: Stated;
  /** Multiplying factor that this step applied, where it is one (damping 1.0111). */
  readonly factor?: number;
  /** Shown beside the main chain: the other form, the other calibration. */
  readonly aside?: true;
  /** Instrument that it was read or measured with. */
  readonly measuredWith?: string;
}

/** One row of an uncertainty budget (GUM columns). */
export interface BudgetLine extends Omit<Line, 'sources'> {
  readonly scope: 'common' | 'own' | 'scatter';
}

export interface Budget {
  readonly of: Result;
  readonly lines: readonly BudgetLine[];
}

/** One record's cells as read. Readings in SI (m or rad), other columns in SI. */
export interface RecordReadings {
  readonly rest: number | null;
  readonly firstSwing: number | null;
  readonly nextSwings: readonly (number | null)[];
  readonly time: number | null;
  readonly voltage: number | null;
  /** As the gauge showed it, Pa; null where it showed percent. The absolute pressure stands with the record. */
  readonly pressure: number | null;
  readonly tapImpulse: number | null;
}

export interface RecordResult {
  readonly id: string;
  readonly sheet: string;
  readonly line: string;
  /** One-based place in the run, all kinds together. */
  readonly order: number;
  readonly kind: RecordKind;
  /** How the kind is known. */
  readonly kindBy: 'person' | 'column' | 'sheet' | 'filledIn';
  readonly label: string;
  readonly note: string;
  /** Reason, or null where the record counts. */
  readonly setAside: string | null;
  readonly problems: readonly Problem[];
  readonly readings: RecordReadings;
  /** Absolute pressure, Pa; null where it is not known. */
  readonly pressure: Stated | null;
  /** First-swing angle from rest, θ_p, rad. */
  readonly angle: Stated | null;
  /** Damping-corrected, small-angle-equivalent first swing φ = θ′(0⁺)/ω_n, rad, by the full pendulum. */
  readonly launch: Stated | null;
  /** I_bit by each form, with the chosen calibration, N·s. */
  readonly full: Result | null;
  readonly smallAngle: Result | null;
  /** I_bit by each calibration, with the chosen form. */
  readonly byGeometry: Result | null;
  readonly byTaps: Result | null;
  /** The one that counts (chosen form and calibration). For a tap: the impulse at its own lever arm. */
  readonly impulseBit: Result | null;
  /** I_bit before and after the target's momentum factor and capture, N·s; equal where the pendulum carries the thruster. */
  readonly delivered: Result | null;
  readonly thruster: Result | null;
  /** The part of u that is this record's own (readings), N·s: the thick part of the whisker. */
  readonly ownU: number;
  /** A tap's stated impulse, N·s. */
  readonly knownImpulse: Stated | null;
  /** Angular impulse with its u: of a tap, as stated times its lever arm; of others, K·φ. N·m·s. */
  readonly angularImpulse: Stated | null;
}

export interface RunResult {
  readonly n: number;
  readonly of: number;
  readonly mean: Result;
  /** Standard deviation of the shots, s. NaN never: null for one shot. */
  readonly scatter: number | null;
  /** s/√n, or the readings' part where s is smaller or n is 1. */
  readonly uScatter: number;
  readonly uCommon: number;
  /** True where the readings' own uncertainty stood in for a smaller scatter. */
  readonly readingsInsteadOfScatter: boolean;
  readonly budget: Budget;
}

export interface Configuration {
  readonly name: 'shots' | 'taps';
  /** J, kg·m²; κ, N·m/rad; ω_n, rad/s; undamped small period T₀, s; ζ; gravity share Mgd/κ. */
  readonly momentOfInertia: Stated;
  readonly stiffness: Stated;
  readonly naturalFrequency: Stated;
  readonly period: Stated;
  readonly dampingRatio: Stated;
  readonly gravityShare: Stated;
  /** First-peak damping correction D(ζ). */
  readonly dampingFactor: Stated;
}

/** One way of knowing the calibration factor of the firing configuration. */
export interface Calibration {
  readonly way: 'geometry' | 'taps';
  /** K, N·m·s/rad. */
  readonly factor: Result;
  /** K of the configuration it was taken in, before the change to the firing configuration. */
  readonly asTaken: Stated;
  /** √(J_f κ_f/(J_c κ_c)). */
  readonly change: Stated;
  readonly taps: number;
  /** Observed relative scatter of the taps and what their own uncertainties predict. */
  readonly scatter: number | null;
  readonly expectedScatter: number | null;
}

export interface PeriodCheck {
  /** Undamped zero-amplitude period as timed, and as masses and lengths predict, s, of the configuration it was timed in. */
  readonly measured: Stated;
  readonly predicted: Stated;
  /** (measured − predicted)/u(difference). */
  readonly inU: number;
}

export interface Difference {
  /** (taps − geometry)/geometry, relative. */
  readonly relative: Stated;
  readonly inU: number;
}

/** Pressure of the run, absolute, Pa. */
export interface PressureResult {
  readonly meaning: GaugeMeaning;
  /** Mean of the shots that count, with their range in its u; of mixed pressures it is of no one condition. */
  readonly absolute: Stated;
  readonly least: number;
  readonly largest: number;
  readonly mixed: boolean;
  /** Of the taps; null where it is that of the shots. */
  readonly taps: Stated | null;
  readonly outside: Stated | null;
  readonly outsideFrom: 'barometer' | 'height' | null;
  /** No shot was fired above the pressure up to which a figure counts as a vacuum one. */
  readonly likeVacuum: boolean;
}

/** What the air about a light strip does in one configuration. */
export interface AirResult {
  readonly use: AirLayer['use'];
  readonly pressure: Stated;
  /** kg/m³. */
  readonly density: Stated;
  /** √(2ν/ω), m. */
  readonly layer: number;
  /** kg·m², as J takes it: corrected, or 0 with its uncertainty. */
  readonly addedInertia: Stated;
  readonly buoyancy: Stated;
  /** The formula's added inertia over the strip's own. */
  readonly ofInertia: number;
}

/** One thing that fools people at the bench, sized for this bench. */
export interface BenchEffect {
  readonly id: BenchEffectId;
  readonly size: { readonly value: number; readonly dimension: Dimension };
  readonly share: { readonly of: 'impulse' | 'firstSwing' | 'stiffness'; readonly value: number };
  /** Largest part of the impulse bit that it makes by the present calibration and route. */
  readonly ofImpulse: number;
  /** Typical values taken for what is not typed, SI; in problems/benchEffects.ts by name. */
  readonly taken: readonly { readonly what: string; readonly value: number; readonly dimension: Dimension }[];
  /** More than a fifth of the run's relative u, or more than half a percent. */
  readonly matters: boolean;
}

/** A column as found in a sheet, with what was proposed and why. */
export interface SheetColumn {
  readonly header: string;
  readonly role: Role;
  readonly unit: string;
  readonly by: 'proposal' | 'person';
}

export interface SheetResult {
  readonly id: string;
  readonly name: string;
  readonly columns: readonly SheetColumn[];
  /** Rows in order: line, cells as shown (edits applied), record id or null for a row that is no record. */
  readonly rows: readonly { readonly line: string; readonly cells: readonly string[]; readonly record: string; readonly edited: readonly number[] }[];
}

export interface Reduction {
  readonly problems: readonly Problem[];
  readonly entries: readonly EntryRead[];
  readonly instruments: readonly InstrumentTold[];
  readonly sheets: readonly SheetResult[];
  readonly records: readonly RecordResult[];
  /** The film strip's own figures; null for any other stand. */
  readonly film: FilmTold | null;
  readonly pressure: PressureResult | null;
  readonly air: { readonly shots: AirResult | null; readonly taps: AirResult | null };
  /** Largest first; empty without a run mean. */
  readonly benchEffects: readonly BenchEffect[];
  /** What a guessed impulse bit would show; null without a guess, or where the bench does not tell. */
  readonly plan: Plan | null;
  readonly gravity: Stated | null;
  readonly configurations: { readonly shots: Configuration | null; readonly taps: Configuration | null };
  /** Where ζ comes from, in a few words, and how many swings it rests on. */
  readonly damping: { readonly way: Session['choices']['dampingWay']; readonly law: 'viscous' | 'quadratic' | 'friction'; /** β, 1/rad, and θ_f, rad. */ readonly quadratic: Stated; readonly friction: Stated; readonly ratio: Stated; readonly logDecrement: Stated; readonly records: number } | null;
  /** How the amplitude of the longest swing falls; null where the damping is not from swings, or they are short. */
  readonly decay: DecayTold | null;
  readonly periodCheck: PeriodCheck | null;
  readonly calibrations: { readonly geometry: Calibration | null; readonly taps: Calibration | null };
  readonly chosen: Session['choices']['calibration'];
  /** K of the pendulum as fired, by the chosen way. */
  readonly chosenFactor: Result | null;
  readonly evidence: readonly EvidenceRow[];
  readonly adjustment: AdjustmentTold | null;
  readonly weights: WeightsTold | null;
  readonly addedMasses: AddedMassesTold | null;
  readonly tapStudy: TapStudy | null;
  readonly traces: readonly TraceTold[];
  readonly forceRecords: readonly ForceRecordTold[];
  readonly comparisons: readonly Comparison[];
  /** null where nothing measured stands against a prediction. */
  readonly agreement: Agreement | null;
  readonly difference: Difference | null;
  readonly runs: { readonly geometry: RunResult | null; readonly taps: RunResult | null };
  readonly run: RunResult | null;
  /** The run mean of the momentum delivered to the target and of the inferred impulse bit of the thruster; equal where the pendulum carries the thruster. */
  readonly delivered: RunResult | null;
  readonly thruster: RunResult | null;
  readonly reported: 'thruster' | 'delivered';
  readonly plume: 'carried' | 'caught';
  /** Factors common to all shots, in the order in which they act. */
  readonly corrections: readonly { readonly id: string; readonly label: string; readonly symbol: string; readonly equation: string; readonly factor: Stated }[];
  /** The chosen run with the set-aside shots counted too; null where none is set aside. */
  readonly runWithSetAside: RunResult | null;
  /** Blanks, same road: mean and scatter of the pseudo impulse bits; null without blanks. */
  readonly blanks: { readonly n: number; readonly mean: Stated; readonly scatter: number | null } | null;
  /** Range of φ of the taps and of the shots that count, rad. */
  readonly ranges: { readonly taps: readonly [number, number] | null; readonly shots: readonly [number, number] | null };
  /** The record asked about, opened: chain and budget. */
  readonly explained: { readonly record: string; readonly chain: readonly ChainStep[]; readonly budget: Budget | null } | null;
}

/** reduce(session): pure; `explain` names the record whose chain is wanted. */
export type Reduce = (session: Session, explain: string | null) => Reduction;
