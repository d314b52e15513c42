/** A value and its uncertainty in a table cell, so that a column stands aligned at the decimal sign. */
import type { CSSProperties } from 'react';
import { alignedParts } from '../../units/format.ts';
import type { AlignedParts } from '../../units/format.ts';
import type { Unit } from '../../units/units.ts';
import styles from './stated.module.css';

/** A quantity of a column; `spread` is u or U as the column's head says, 0 for none. SI. */
export interface Cell {
  readonly value: number;
  readonly spread: number;
  readonly unit: Unit;
}

export interface AlignedColumn {
  readonly parts: readonly (AlignedParts | null)[];
  readonly whole: CSSProperties;
  readonly fraction: CSSProperties;
  readonly spread: CSSProperties;
}

/** A decimal point is about half as wide as a figure. */
const wide = (text: string): number => (text.includes('.') ? text.length - 0.5 : text.length);
const widest = (texts: readonly string[]): CSSProperties => ({ minWidth: `${Math.max(0, ...texts.map(wide))}ch` });

/** An uncertainty smaller than this part of its value would make the whole column as wide as its own digits; it is left out. */
const SHOWN_FROM = 1e-6;
const shownSpread = ({ value, spread }: Cell): number => (spread < SHOWN_FROM * Math.abs(value) ? 0 : spread);

/** The cells of one column, in order; null where there is none. */
export function alignedColumn(cells: readonly (Cell | null)[]): AlignedColumn {
  return columnOf(cells.map((cell) => (cell === null ? null : alignedParts(cell.value, shownSpread(cell), cell.unit))));
}

/** A column of values (SI) without uncertainties, all to the decimals that two digits of `resolution` (SI) need. */
export function alignedTo(values: readonly (number | null)[], resolution: number, unit: Unit): AlignedColumn {
  return columnOf(values.map((value) => (value === null ? null : { ...alignedParts(value, resolution, unit), spread: '' })));
}

const NUMBER_AND_UNIT = /^(?<whole>[^.×\u00A0]*)(?<fraction>[^\u00A0]*)(?:\u00A0(?<unit>.*))?$/u;

/** A column of numbers that are words already, "380 mm", "7.3×10⁻⁴", each in its own unit; null where there is none. */
export function alignedWords(words: readonly (string | null)[]): AlignedColumn {
  return columnOf(words.map((word) => {
    const { whole = '', fraction = '', unit = '' } = NUMBER_AND_UNIT.exec(word?.replaceAll(' ', '\u00A0') ?? '')?.groups ?? {};
    return word === null ? null : { whole, fraction, spread: '', unit };
  }));
}

function columnOf(parts: readonly (AlignedParts | null)[]): AlignedColumn {
  const there = parts.filter((part) => part !== null);
  return {
    parts,
    whole: widest(there.map(({ whole }) => whole)),
    fraction: widest(there.map(({ fraction }) => fraction)),
    spread: widest(there.map(({ spread }) => (spread === '' ? '' : `± ${spread}`))),
  };
}

interface Props {
  readonly column: AlignedColumn;
  readonly row: number;
  /** Units stand in the head of the column. */
  readonly bare?: boolean;
}

export function Aligned({ column, row, bare = false }: Props) {
  const parts = column.parts[row] ?? null;
  if (parts === null) return <span className="quiet">–</span>;
  return (
    <span className={`num ${styles.aligned}`}>
      <span className={styles.whole} style={column.whole}>{parts.whole}</span>
      <span className={styles.fraction} style={column.fraction}>{parts.fraction}</span>
      {parts.spread !== '' && <span className={styles.spread} style={column.spread}>{'\u00A0±\u00A0'}{parts.spread}</span>}
      {!bare && parts.unit !== '' && <span className={`unit ${styles.unitAfter}`}>{/^[°′″]$/.test(parts.unit) ? '' : '\u00A0'}{parts.unit}</span>}
    </span>
  );
}
