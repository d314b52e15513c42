/** The mark of a record's kind, by shape first: disc, triangle, hollow square, tick, wave; hollow and struck where it is set aside. */
import type { RecordKind } from '../../readings/meanings.ts';
import styles from './kindMark.module.css';

const SHAPES: Readonly<Record<RecordKind, string>> = {
  shot: 'M7 2.5a4.5 4.5 0 1 1 0 9a4.5 4.5 0 1 1 0-9z',
  tap: 'M7 2.2 12 11.4H2z',
  blank: 'M3 3h8v8H3z',
  zero: 'M7 3v8',
  freeSwing: 'M1.5 7c1.4-5.5 2.8-5.5 4.2 0s2.8 4 3.8 0 1.8-2.5 3 0',
  weight: 'M3.5 5h7l1.5 6.5H2zM5.5 5a1.5 1.5 0 0 1 3 0',
  period: 'M7 2.5a4.5 4.5 0 1 1 0 9a4.5 4.5 0 1 1 0-9zM7 4.5V7l2 1.5',
};

export function KindMark({ kind, setAside }: { readonly kind: RecordKind; readonly setAside: boolean }) {
  const classes = [styles.mark, styles[kind], setAside ? styles.aside : ''].join(' ');
  return (
    <svg className={classes} viewBox="0 0 14 14" aria-hidden="true">
      <path d={SHAPES[kind]} />
      {setAside && <path className={styles.strike} d="M0.5 13.5 13.5 0.5" />}
    </svg>
  );
}
