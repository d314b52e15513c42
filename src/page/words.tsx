/** Wording that several sections share. */

/** A symbol as it is set: `k_f` with its index set low, in italics. */
export function SymbolText({ symbol }: { readonly symbol: string }) {
  const [letter = '', ...index] = symbol.split('_');
  return (
    <i translate="no">
      {letter}
      {index.length > 0 && <sub>{index.join('_')}</sub>}
    </i>
  );
}
