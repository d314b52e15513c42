/** What kind of record a row is: as told by the sheet, or by hand. */
import { RECORD_KINDS } from '../../readings/meanings.ts';
import type { RecordKind } from '../../readings/meanings.ts';
import type { RecordResult } from '../../reduction/results.ts';
import { isRecordKind } from '../../session/edits.ts';
import { KIND_BY_LABELS, KIND_LABELS } from './tradeWords.ts';
import styles from './grid.module.css';

interface KindSelectProps {
  readonly name: string;
  /** Kind given by hand, if any. */
  readonly mark: RecordKind | undefined;
  readonly result: RecordResult | undefined;
  readonly spot: { readonly 'data-spot': string; readonly tabIndex: number };
  readonly onKind: (kind: RecordKind | null) => void;
}

export function KindSelect({ name, mark, result, spot, onKind }: KindSelectProps) {
  const told = result === undefined || result.kindBy === 'person' ? 'as the sheet tells' : `${KIND_LABELS[result.kind]} · ${KIND_BY_LABELS[result.kindBy]}`;
  return (
    <select
      className={mark === undefined ? styles.kindSelect : `${styles.kindSelect} ${styles.byHand}`}
      aria-label={`Kind of ${name}`}
      value={mark ?? ''}
      onChange={(chosen) => onKind(isRecordKind(chosen.target.value) ? chosen.target.value : null)}
      {...spot}
    >
      <option value="">{told}</option>
      {RECORD_KINDS.map((kind) => (
        <option key={kind} value={kind}>{`${KIND_LABELS[kind]} · ${KIND_BY_LABELS.person}`}</option>
      ))}
    </select>
  );
}
