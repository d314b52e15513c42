/** What a figure is before it is drawn: marks, columns, drawing options, one sentence, and the same numbers as a table. */
import type uPlot from 'uplot';
import type { RecordKind } from '../readings/meanings.ts';

/** Colours of a figure, read from the page's custom properties (inks.ts). */
export interface Inks {
  readonly paper: string;
  readonly ink: string;
  readonly quiet: string;
  readonly rule: string;
  readonly shot: string;
  readonly tap: string;
  readonly blank: string;
  readonly look: string;
  /** Fill of an interval band. */
  readonly band: string;
  /** Font family of the axes. */
  readonly font: string;
}

/** One record in a figure, in the units of its axes. */
export interface Mark {
  /** Record id. */
  readonly id: string;
  readonly kind: RecordKind;
  readonly setAside: boolean;
  readonly x: number;
  readonly y: number;
  /** Half-width of the expanded interval, k·u (thin whisker). */
  readonly whisker: number;
  /** The record's own part of it, k·u_own (thick whisker). */
  readonly own: number;
  /** Half-width along x, where x is uncertain too. */
  readonly across: number;
  /** No impulse bit could be had: drawn as a cross on the zero line. */
  readonly missing: boolean;
  /** What a reader is told of this mark. */
  readonly reading: string;
}

/** The numbers of a figure as text, for the table below it. */
export interface FigureTable {
  readonly head: readonly string[];
  readonly rows: readonly { readonly id: string; readonly cells: readonly string[] }[];
}

export interface Figure {
  /** Name of the figure, for assistive technology and as its title. */
  readonly title: string;
  /** The figure in a sentence or two. */
  readonly summary: string;
  /** In ascending x, one to one with the rows of `columns`. */
  readonly marks: readonly Mark[];
  readonly columns: uPlot.AlignedData;
  readonly options: Omit<uPlot.Options, 'width'>;
  readonly table: FigureTable;
  /** Whether the mark nearest along x is meant by a pointer, or the nearest on the sheet. */
  readonly nearest: 'x' | 'both';
}
