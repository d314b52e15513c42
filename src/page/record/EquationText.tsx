/** An equation in a line, with its symbols set as symbols: "I = K·φ/r_t". */
import { Fragment } from 'react';
import { SymbolText } from '../words.tsx';

/** A letter with an index, "r_t" or "ω_n"; the index runs to the next sign that is none of it. */
const INDEXED = /\p{L}_[\p{L}0-9]+|[^_]+?(?=\p{L}_|$)/gu;

export function EquationText({ equation }: { readonly equation: string }) {
  return [...equation.matchAll(INDEXED)].map(({ 0: piece, index }) => (
    <Fragment key={index}>{piece.includes('_') ? <SymbolText symbol={piece} /> : piece}</Fragment>
  ));
}
