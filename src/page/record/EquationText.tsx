/** An equation in a line, with its symbols set as symbols: "I = K·φ/r_t". */
import { Fragment } from 'react';
import { SymbolText } from '../words.tsx';

/** A letter with an index, "r_t" or "ω_n"; the index runs to the next sign that is none of it. */
const INDEXED = /(\p{L}_[\p{L}\p{N}]+)/u;

export function EquationText({ equation }: { readonly equation: string }) {
  const pieces = equation.split(INDEXED);
  // Every second piece is a symbol; a line of text keeps its order, so the place is the key.
  return pieces.map((piece, place) => <Fragment key={`${place} ${piece}`}>{place % 2 === 1 ? <SymbolText symbol={piece} /> : piece}</Fragment>);
}
