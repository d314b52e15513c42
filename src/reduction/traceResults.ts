/** What the page is told of a sampled trace: how it was read, its shots and stretches, and the fitted swing. */
import type { RecordKind } from '../readings/meanings.ts';
import type { SwingModel } from '../traces/swingModel.ts';
import type { Result, Stated } from './results.ts';

/** A shot, tap or blank of a trace; times in s on the record's clock, throws in the SI unit of the reading. */
export interface TraceEventTold {
  /** Id of the line in the session's list, or of the trigger. */
  readonly id: string;
  /** Its record in the run, where it has one. */
  readonly record: string | null;
  readonly kind: RecordKind;
  /** As listed or found, moved by the clock offset. */
  readonly listed: number;
  /** As used: refined by the fit where that was asked for. */
  readonly time: number;
  /** u of the refined time; null where it was not refined. */
  readonly timeU: number | null;
  /** Jump of x′ over ω_n: the throw that an undamped small swing from rest would show. null: not fitted. */
  readonly jump: Stated | null;
  /** Step of position over its u. */
  readonly stepInU: number;
  /** What picking the peak after it would give, damping taken out; null where no peak stands alone. */
  readonly picked: number | null;
}

/** A part of the record that plays no part in the fit. */
export interface Stretch {
  readonly from: number;
  readonly to: number;
  readonly why: 'gap' | 'clipped' | 'spike' | 'blanked' | 'marked' | 'train';
}

export interface TraceFitted {
  /** T₀ = 2π/ω_n, s. */
  readonly period: Stated;
  readonly ratio: Stated;
  /** sd of the residuals, SI unit of the reading. */
  readonly noise: number;
  /** Variance of a jump with the correlation of the residuals over that with white noise as strong (middle one of the jumps). */
  readonly colour: number;
  readonly model: SwingModel;
  /** Amplitude spectrum of the residuals: frequencies in Hz, amplitudes in the SI unit of the reading; thinned for a picture. */
  readonly spectrum: { readonly frequency: readonly number[]; readonly amplitude: readonly number[] };
  /** Lines that stand out of it: pump hum, building sway. */
  readonly hums: readonly { readonly frequency: number; readonly amplitude: number }[];
  /** u of a jump by noise alone, as a throw in the unit of the reading, and the impulse that it stands for, N·s (null without a calibration). */
  readonly least: number | null;
  readonly noiseEquivalent: number | null;
  /** Scatter of the jumps that the same fit finds where nothing was fired: how many, its sd as a throw and as an impulse, N·s (null without a calibration), and over what the fit says of the noise there (null without noise). */
  /** Pulses a second from which a train as long as a third of the longest quiet stretch tells the mean impulse bit better than single shots in that time; null where there is none. */
  readonly trainsBetterFrom: number | null;
  readonly noFire: { readonly jumps: number; readonly sd: number; readonly impulse: number | null; readonly overFit: number | null } | null;
}

export interface TraceColumn {
  readonly header: string;
  readonly unit: string;
}

/** A train of pulses read as a steady deflection. */
export interface TrainTold {
  readonly id: string;
  readonly from: number;
  readonly to: number;
  /** Pulses a second, and how many that makes. */
  readonly rate: number;
  readonly pulses: number;
  /** In the SI unit of the reading. */
  readonly deflection: Stated;
  /** Crest to crest of what each pulse leaves of its own, over the deflection. */
  readonly ripple: number;
  /** Mean impulse bit of its pulses; null without a calibration. */
  readonly impulse: Result | null;
}

/** What a camera's track tells of itself. */
export interface CameraTold {
  /** Radius of the marker's arc, px; null where the arc is too short to tell it. */
  readonly radius: Stated | null;
  /** Angle that the arc spans, rad. */
  readonly span: number;
  /** How the plumb line leans in the picture, rad. */
  readonly lean: Stated | null;
  readonly pivotBy: 'tracked' | 'typed' | 'arc' | 'none';
  /** That radius over scale × radius as stated; null where those were not typed. */
  readonly against: { readonly ratio: Stated; readonly inU: number } | null;
}

/** A sampled trace as read and fitted. */
export interface TraceTold {
  readonly id: string;
  readonly name: string;
  /** null where the bytes are not at hand. */
  readonly rows: number | null;
  readonly columns: readonly TraceColumn[];
  /** Index of the column of each use; null for none (time: by a stated rate). */
  readonly uses: { readonly time: number | null; readonly reading: number | null; readonly trigger: number | null };
  /** s on the record's clock. */
  readonly from: number;
  readonly to: number;
  /** Middle spacing of the samples, s. */
  readonly spacing: number;
  readonly dimension: 'length' | 'angle' | 'pixel' | 'count' | 'voltage';
  readonly events: readonly TraceEventTold[];
  readonly stretches: readonly Stretch[];
  readonly offset: { readonly value: number; readonly u: number | null; readonly found: boolean } | null;
  readonly fitted: TraceFitted | null;
  readonly trains: readonly TrainTold[];
  /** null where the record is no camera's track, or has no row in the picture. */
  readonly camera: CameraTold | null;
}
