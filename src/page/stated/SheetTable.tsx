/** A table that scrolls in its own frame where the sheet is narrow. */
import type { ReactNode } from 'react';
import styles from './stated.module.css';

export function SheetTable({ label, children }: { readonly label: string; readonly children: ReactNode }) {
  return (
    <div className={styles.scroll} role="group" aria-label={label} tabIndex={0}>
      <table className={styles.table}>{children}</table>
    </div>
  );
}
