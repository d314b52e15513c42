/** A part that is folded away: open where that is suggested, until a person opens or closes it or works in it. */
import { useState } from 'react';
import type { ReactNode } from 'react';
import styles from './traceCard.module.css';

interface Props {
  readonly title: string;
  readonly suggested: boolean;
  readonly children: ReactNode;
}

export function Fold({ title, suggested, children }: Props) {
  const [chosen, setChosen] = useState<boolean | null>(null);
  const open = chosen ?? suggested;
  return (
    <details className={styles.how} open={open}>
      <summary onClick={(event) => {
        event.preventDefault();
        setChosen(!open);
      }}>{title}</summary>
      {/* What is typed may take away what suggested it: it stays open under the hands. */}
      <div onFocus={() => setChosen(true)}>{children}</div>
    </details>
  );
}
