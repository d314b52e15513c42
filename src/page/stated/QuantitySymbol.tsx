/** A quantity's symbol with its index set low: "k_f" as k with a low f. */
import styles from './stated.module.css';

export function QuantitySymbol({ symbol }: { readonly symbol: string }) {
  const [base = '', ...index] = symbol.split('_');
  return <span className={styles.symbol}>{base}{index.length > 0 && <sub>{index.join('_')}</sub>}</span>;
}
